"""Fetch what an appraisal is made from: the register and the record in force, as arrays.

Only what is true by the as-of date counts, as known up to one journal entry. Tables are joined by dictionaries
and NumPy; nothing is computed here that an engineer would call a figure.
"""

from __future__ import annotations

from collections.abc import Collection
from datetime import date

import numpy as np

from fleet.appraisal.inputs import (
    DEFAULT_RATE_FLOOR_MM_PER_YEAR,
    DEFAULT_WINDOW_DAYS,
    Inputs,
    Ints,
    Locations,
    Parts,
    Settings,
    Vessels,
)
from fleet.store import models
from fleet.tasks import settings as levels
from fleet.tasks.columns import Index, Tree, as_written, by_day, chain, count, days, pick, same
from fleet.tasks.reader import Columns, Reader
from fleet.tasks.record import (
    decisions_of,
    fetch_inspections,
    fetch_readings,
    fetch_recorded,
    fetch_relief,
    fetch_restarts,
    fetch_states,
    idle_times,
    re_ratings,
    state_of,
)


def fetch_inputs(record: Reader, *, tags: Collection[str] | None = None) -> Inputs:
    """Fetch everything an appraisal is made from.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    tags : collection of str, optional
        The vessels wanted; all of the register where absent [text].

    Returns
    -------
    Inputs
        Vessels sorted by tag; parts and locations in the order in which they were first loaded.
    """
    tree = _tree(record, tags)
    in_force = levels.in_force(record)
    states = fetch_states(record)
    readings, reading_days = fetch_readings(record, tree, in_force)
    decisions = by_day(record.rows(models.Decision), "decided_on", record.as_of)
    return Inputs(
        vessels=_vessels(record.as_of, tree, states, decisions),
        parts=_parts(tree, states),
        locations=_locations(tree, states, in_force),
        readings=readings,
        restarts=fetch_restarts(record, tree),
        idle_times=idle_times(tree, states),
        inspections=fetch_inspections(record, tree),
        decisions=decisions_of(tree, decisions),
        relief=fetch_relief(record, tree),
        settings=Settings(list_life_years=in_force.of_database("list_life_years", 1.0)),
        recorded=fetch_recorded(record, tree, reading_days),
        journal_head=record.head(),
        journal_no=record.known,
    )


def _tree(record: Reader, tags: Collection[str] | None) -> Tree:
    entities = record.rows(models.Entity)
    name = dict(zip(entities["id"], entities["tag"], strict=True))

    vessels = record.rows(models.Vessel)
    order = sorted(range(count(vessels)), key=lambda row: name[vessels["entity_id"][row]])
    if tags is not None:
        wanted = set(tags)
        order = [row for row in order if name[vessels["entity_id"][row]] in wanted]
    vessels = pick(vessels, order)
    vessels["tag"] = [name[entity] for entity in vessels["entity_id"]]
    vessel = {entity: row for row, entity in enumerate(vessels["entity_id"])}

    parts, part, part_vessel = _children(record.rows(models.Part), "vessel_id", vessel)
    parts["part"] = [name[entity] for entity in parts["entity_id"]]
    locations, location, location_part = _children(record.rows(models.Location), "part_id", part)
    locations["location"] = [name[entity] for entity in locations["entity_id"]]
    return Tree(vessels, parts, locations, vessel, part, location, part_vessel, location_part)


def _children(columns: Columns, parent: str, parents: Index) -> tuple[Columns, Index, Ints]:
    """Keep the children of known parents, in the parents' order and then in the order of first load."""
    rows = [row for row in range(count(columns)) if columns[parent][row] in parents]
    rows.sort(key=lambda row: (parents[columns[parent][row]], columns["entity_id"][row]))
    kept = pick(columns, rows)
    index = {entity: row for row, entity in enumerate(kept["entity_id"])}
    return kept, index, np.array([parents[entity] for entity in kept[parent]], dtype=np.int64)


def _vessels(as_of: date, tree: Tree, states: Columns, decisions: Columns) -> Vessels:
    columns, count = tree.vessels, len(tree.vessel)
    state, undated = state_of(states, tree.vessel)
    current = np.full(count, np.nan)
    basis = np.full(count, "", dtype=np.object_)
    written = np.full(count, "", dtype=np.object_)
    for row in re_ratings(decisions, as_of):
        place = tree.vessel.get(decisions["vessel_id"][row])
        if place is not None:
            current[place] = decisions["pressure_mpa"][row]
            written[place] = as_written(decisions["written"][row], "pressure")
            basis[place] = decisions["reason"][row] or ""
    return Vessels.of(
        count,
        **same(columns, Vessels),
        state=state,
        state_undated=undated,
        in_service_day=days(columns["in_service_on"]),
        next_survey_day=days(columns["next_survey_on"]),
        current_mawp_mpa=current,
        current_mawp_basis=basis,
        nameplate_mawp_written=[as_written(each, "nameplate_mawp") for each in columns["written"]],
        current_mawp_written=written,
        operating_pressure_written=[as_written(each, "operating_pressure") for each in columns["written"]],
    )


def _parts(tree: Tree, states: Columns) -> Parts:
    state, _ = state_of(states, tree.part)
    return Parts.of(len(tree.part), **same(tree.parts, Parts), vessel=tree.part_vessel, state=state)


def _locations(tree: Tree, states: Columns, in_force: levels.Levels) -> Locations:
    state, _ = state_of(states, tree.location)
    places = chain(tree)
    return Locations.of(
        len(tree.location),
        **same(tree.locations, Locations),
        part=tree.location_part,
        state=state,
        rate_floor_mm_per_year=in_force.nearest(
            "rate_floor_mm_per_year", places, DEFAULT_RATE_FLOOR_MM_PER_YEAR
        ),
        observation_window_days=in_force.nearest("observation_window_days", places, DEFAULT_WINDOW_DAYS),
    )
