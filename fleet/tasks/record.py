"""Fetch the record: states, readings, restarts, inspections, decisions, relief devices, doubts."""

from __future__ import annotations

from datetime import date

import numpy as np

from fleet.appraisal.inputs import (
    DEFAULT_READING_ERROR_MM,
    Bools,
    Decisions,
    Floats,
    IdleTimes,
    Inspections,
    Ints,
    Readings,
    RecordedNotice,
    Relief,
    Restarts,
    Texts,
)
from fleet.store import models
from fleet.tasks import settings as levels
from fleet.tasks.columns import (
    Index,
    Tree,
    as_written,
    by_day,
    chain,
    count,
    days,
    of_index,
    pick,
    same,
)
from fleet.tasks.notices import recorded_notices
from fleet.tasks.reader import Columns, Reader


def re_ratings(decisions: Columns, as_of: date) -> list[int]:
    """Give the re-ratings effective by the as-of date, the one in force of each vessel last.

    Parameters
    ----------
    decisions : Columns
        The decisions of the as-of date [-].
    as_of : date
        The day the figures are about [date].

    Returns
    -------
    list of int
    """
    rows = [
        row
        for row, kind in enumerate(decisions["kind"])
        if kind == "re-rating" and (decisions["effective_on"][row] or decisions["decided_on"][row]) <= as_of
    ]
    return sorted(
        rows,
        key=lambda row: (
            decisions["effective_on"][row] or decisions["decided_on"][row],
            decisions["entry_no"][row],
            decisions["id"][row],
        ),
    )


def fetch_states(record: Reader) -> Columns:
    """Fetch the dated states begun by the as-of date, in the order in which they began.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].

    Returns
    -------
    Columns
    """
    columns = by_day(record.rows(models.DatedState), "from_on", record.as_of)
    order = sorted(
        range(count(columns)),
        key=lambda row: (columns["from_on"][row], columns["entry_no"][row], columns["id"][row]),
    )
    return pick(columns, order)


def state_of(states: Columns, index: Index) -> tuple[Texts, Bools]:
    """Give the state in force of each entity, and whether the day it began is unknown.

    Parameters
    ----------
    states : Columns
        The dated states in the order in which they began [-].
    index : dict of int to int
        Entity to index [count].

    Returns
    -------
    tuple of Texts and Bools
    """
    state = np.full(len(index), "", dtype=np.object_)
    undated = np.zeros(len(index), dtype=np.bool_)
    for row, entity in enumerate(states["subject_id"]):
        place = index.get(entity)
        if place is not None:
            state[place] = states["state"][row]
            undated[place] = states["date_known"][row] == "no"
    return state, undated


def idle_times(tree: Tree, states: Columns) -> IdleTimes:
    """Give the spans of the state `idle protected`; a span that goes on has no end.

    Parameters
    ----------
    tree : Tree
        The register by index [-].
    states : Columns
        The dated states in the order in which they began [-].

    Returns
    -------
    IdleTimes
    """
    spans: list[tuple[int, float, float]] = []
    begun: dict[int, float] = {}
    for row, entity in enumerate(states["subject_id"]):
        place = tree.vessel.get(entity)
        if place is None:
            continue
        day = float(states["from_on"][row].toordinal())
        protected = states["state"][row] == "idle protected"
        if place in begun and not protected:
            spans.append((place, begun.pop(place), day))
        elif protected:
            begun.setdefault(place, day)
    spans += [(place, day, np.nan) for place, day in begun.items()]
    spans = sorted(span for span in spans if not span[1] >= span[2])
    return IdleTimes.of(
        len(spans),
        vessel=[span[0] for span in spans],
        from_day=[span[1] for span in spans],
        to_day=[span[2] for span in spans],
    )


def fetch_readings(record: Reader, tree: Tree, in_force: levels.Levels) -> tuple[Readings, dict[int, date]]:
    """Fetch the readings that count, and the day of every reading in force for the doubts about them.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    tree : Tree
        The register by index [-].
    in_force : Levels
        The settings in force [-].

    Returns
    -------
    tuple of Readings and dict of int to date
    """
    every = record.rows(models.Reading)
    reading_days = dict(zip(every["id"], every["taken_on"], strict=True))
    for before, now in record.successors(models.Reading).items():
        if now in reading_days:  # a doubt told of a reading stands by the day of what replaced it
            reading_days[before] = reading_days[now]
    rows = [
        row
        for row, day in enumerate(every["taken_on"])
        if day <= record.as_of
        and every["status"][row] != "voided"
        and every["location_id"][row] in tree.location
    ]
    columns = pick(every, rows)
    place = np.array([tree.location[entity] for entity in columns["location_id"]], dtype=np.int64)
    surveys = record.rows(models.Survey)
    name = dict(zip(surveys["id"], surveys["name"], strict=True))
    error = dict(zip(surveys["id"], surveys["reading_error_mm"], strict=True))
    for before, now in record.successors(models.Survey).items():
        name[before], error[before] = name.get(now), error.get(now)
    table = Readings.of(
        len(rows),
        **same(columns, Readings),
        location=place,
        reading_id=columns["id"],
        taken_day=days(columns["taken_on"]),
        survey=[name.get(survey) for survey in columns["survey_id"]],
        error_mm=_reading_error(
            tree, in_force, place, [error.get(survey) for survey in columns["survey_id"]]
        ),
    )
    return table, reading_days


def _reading_error(tree: Tree, in_force: levels.Levels, place: Ints, survey: list[float | None]) -> Floats:
    """Resolve the reading error: location, else survey, else part, vessel, database."""
    places = chain(tree)
    register = np.array(tree.locations["reading_error_mm"], dtype=np.float64)  # None becomes NaN
    own = in_force.given("reading_error_mm", places[0])
    nearest = np.where(np.isnan(own), register, own)[place]
    told = np.array(survey, dtype=np.float64)
    wider = in_force.nearest("reading_error_mm", places[1:], DEFAULT_READING_ERROR_MM)[place]
    resolved: Floats = np.where(~np.isnan(nearest), nearest, np.where(~np.isnan(told), told, wider))
    return resolved


def fetch_restarts(record: Reader, tree: Tree) -> Restarts:
    """Fetch the restarts, a row for every location that each begins anew.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    tree : Tree
        The register by index [-].

    Returns
    -------
    Restarts
    """
    columns = by_day(record.rows(models.Restart), "happened_on", record.as_of)
    named = record.rows(models.RestartLocation)
    of_part: dict[int, list[int]] = {}
    for row, part in enumerate(tree.location_part):
        of_part.setdefault(tree.parts["entity_id"][part], []).append(row)
    by_restart: dict[int, set[int]] = {restart: set() for restart in columns["id"]}
    own = set(named["restart_id"])
    now = record.successors(models.Restart)
    for restart, entity in zip(named["restart_id"], named["location_id"], strict=True):
        # A corrected restart that names no locations of its own keeps those of the one it replaces.
        stands = restart if restart in by_restart or now.get(restart) in own else now.get(restart)
        if stands in by_restart and entity in tree.location:
            by_restart[stands].add(tree.location[entity])
    rows: list[tuple[int, int]] = []
    for row, restart in enumerate(columns["id"]):
        whole = of_part.get(columns["part_id"][row], []) if columns["whole_part"][row] else []
        rows += [(place, row) for place in sorted(by_restart[restart].union(whole))]
    return Restarts.of(
        len(rows),
        location=[place for place, _ in rows],
        kind=[columns["kind"][row] for _, row in rows],
        what=[columns["what"][row] for _, row in rows],
        happened_day=days(columns["happened_on"][row] for _, row in rows),
    )


def fetch_inspections(record: Reader, tree: Tree) -> Inspections:
    """Fetch the inspections done by the as-of date.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    tree : Tree
        The register by index [-].

    Returns
    -------
    Inspections
    """
    every = by_day(record.rows(models.Inspection), "done_on", record.as_of)
    columns, vessel = of_index(every, "vessel_id", tree.vessel)
    return Inspections.of(
        len(vessel), **same(columns, Inspections), vessel=vessel, done_day=days(columns["done_on"])
    )


def decisions_of(tree: Tree, decisions: Columns) -> Decisions:
    """Give every decision but the re-ratings, which stand in the current MAWP.

    Parameters
    ----------
    tree : Tree
        The register by index [-].
    decisions : Columns
        The decisions of the as-of date [-].

    Returns
    -------
    Decisions
    """
    counted = pick(decisions, [row for row, kind in enumerate(decisions["kind"]) if kind != "re-rating"])
    columns, vessel = of_index(counted, "vessel_id", tree.vessel)
    return Decisions.of(
        len(vessel),
        **same(columns, Decisions),
        vessel=vessel,
        part=[tree.part.get(entity, -1) for entity in columns["part_id"]],
        location=[tree.location.get(entity, -1) for entity in columns["location_id"]],
        decided_day=days(columns["decided_on"]),
        until_day=days(columns["until_on"]),
        review_day=days(columns["review_on"]),
    )


def fetch_relief(record: Reader, tree: Tree) -> Relief:
    """Fetch the relief devices linked to the vessels.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    tree : Tree
        The register by index [-].

    Returns
    -------
    Relief
    """
    columns, vessel = of_index(record.rows(models.ReliefDevice), "vessel_id", tree.vessel)
    entities = record.rows(models.Entity)
    name = dict(zip(entities["id"], entities["tag"], strict=True))
    device = [name[entity] for entity in columns["entity_id"]]
    order = sorted(range(len(device)), key=lambda row: (vessel[row], device[row]))
    return Relief.of(
        len(order),
        vessel=vessel[order],
        device=[device[row] for row in order],
        set_pressure_mpa=[columns["set_pressure_mpa"][row] for row in order],
        written=[as_written(columns["written"][row], "set_pressure") for row in order],
    )


def fetch_recorded(record: Reader, tree: Tree, reading_days: dict[int, date]) -> tuple[RecordedNotice, ...]:
    """Fetch the open doubts and the rows that wait, each at its vessel.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    tree : Tree
        The register by index [-].
    reading_days : dict of int to date
        The day of every reading in force [date].

    Returns
    -------
    tuple of RecordedNotice
    """
    found = recorded_notices(record, reading_days=reading_days)
    part_vessel = {entity: int(tree.part_vessel[row]) for entity, row in tree.part.items()}
    rows: list[RecordedNotice] = []
    for one in found:
        location = tree.location.get(one.location_id or 0, -1)
        vessel = tree.vessel.get(one.vessel_id or 0, part_vessel.get(one.part_id or 0, -1))
        if vessel < 0 and location >= 0:
            vessel = int(tree.part_vessel[tree.location_part[location]])
        if vessel >= 0:
            rows.append(RecordedNotice(vessel, location, one.notice))
    return tuple(rows)
