"""Fetch what an appraisal is made from: the register and the record in force, as arrays.

Only what is true by the as-of date counts, as known up to one journal entry. Tables are joined by dictionaries
and NumPy; nothing is computed here that an engineer would call a figure.
"""

from __future__ import annotations

from collections.abc import Collection
from datetime import date, datetime

import numpy as np
from sqlalchemy import Connection, select

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
from fleet.store import journal, models
from fleet.store.record import FIRST_PREVIOUS
from fleet.tasks import settings as levels
from fleet.tasks.columns import Columns, Index, Moment, Tree, by_day, chain, count, days, fetch, pick, same
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


def fetch_inputs(conn: Connection, *, as_of: date, known: int, tags: Collection[str] | None = None) -> Inputs:
    """Fetch everything an appraisal is made from.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection; nothing is written [-].
    as_of : date
        The day the figures are about [date].
    known : int
        Number of the last journal entry that may be read [count].
    tags : collection of str, optional
        The vessels wanted; all of the register where absent [text].

    Returns
    -------
    Inputs
        Vessels sorted by tag; parts and locations in the order in which they were first loaded.
    """
    moment = Moment(as_of, known)
    tree = _tree(conn, moment, tags)
    in_force = levels.in_force(conn, as_of=as_of, known=known)
    states = fetch_states(conn, moment)
    readings, reading_days = fetch_readings(conn, moment, tree, in_force)
    decisions = by_day(fetch(conn, models.Decision, moment), "decided_on", as_of)
    return Inputs(
        vessels=_vessels(moment, tree, states, decisions),
        parts=_parts(tree, states),
        locations=_locations(tree, states, in_force),
        readings=readings,
        restarts=fetch_restarts(conn, moment, tree),
        idle_times=idle_times(tree, states),
        inspections=fetch_inspections(conn, moment, tree),
        decisions=decisions_of(tree, decisions),
        relief=fetch_relief(conn, moment, tree),
        settings=Settings(list_life_years=in_force.of_database("list_life_years", 1.0)),
        recorded=fetch_recorded(conn, moment, tree, reading_days),
        journal_head=journal_hash(conn, known),
        journal_no=known,
    )


def journal_hash(conn: Connection, known: int) -> str:
    """Give the hash of a journal entry.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    known : int
        Number of the entry; 0 for a journal without entries [count].

    Returns
    -------
    str
        The hash; for number 0 the hash that entry 1 follows [text].
    """
    if known == 0:
        return FIRST_PREVIOUS
    return str(conn.execute(select(models.Journal.hash).where(models.Journal.no == known)).scalar_one())


def known_number(conn: Connection, known_at: datetime | None) -> int:
    """Turn a moment into the number of the last journal entry made by then.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    known_at : datetime or None
        The moment in UTC; None for everything on record [date].

    Returns
    -------
    int
    """
    return journal.head(conn).no if known_at is None else journal.number_at(conn, known_at)


def _tree(conn: Connection, moment: Moment, tags: Collection[str] | None) -> Tree:
    entities = fetch(conn, models.Entity, moment)
    name = dict(zip(entities["id"], entities["tag"], strict=True))

    vessels = fetch(conn, models.Vessel, moment, dated=True)
    order = sorted(range(count(vessels)), key=lambda row: name[vessels["entity_id"][row]])
    if tags is not None:
        wanted = set(tags)
        order = [row for row in order if name[vessels["entity_id"][row]] in wanted]
    vessels = pick(vessels, order)
    vessels["tag"] = [name[entity] for entity in vessels["entity_id"]]
    vessel = {entity: row for row, entity in enumerate(vessels["entity_id"])}

    parts, part, part_vessel = _children(fetch(conn, models.Part, moment, dated=True), "vessel_id", vessel)
    parts["part"] = [name[entity] for entity in parts["entity_id"]]
    locations, location, location_part = _children(
        fetch(conn, models.Location, moment, dated=True), "part_id", part
    )
    locations["location"] = [name[entity] for entity in locations["entity_id"]]
    return Tree(vessels, parts, locations, vessel, part, location, part_vessel, location_part)


def _children(columns: Columns, parent: str, parents: Index) -> tuple[Columns, Index, Ints]:
    """Keep the children of known parents, in the parents' order and then in the order of first load."""
    rows = [row for row in range(count(columns)) if columns[parent][row] in parents]
    rows.sort(key=lambda row: (parents[columns[parent][row]], columns["entity_id"][row]))
    kept = pick(columns, rows)
    index = {entity: row for row, entity in enumerate(kept["entity_id"])}
    return kept, index, np.array([parents[entity] for entity in kept[parent]], dtype=np.int64)


def _vessels(moment: Moment, tree: Tree, states: Columns, decisions: Columns) -> Vessels:
    columns, count = tree.vessels, len(tree.vessel)
    state, undated = state_of(states, tree.vessel)
    current = np.full(count, np.nan)
    basis = np.full(count, "", dtype=np.object_)
    for row in re_ratings(decisions, moment.as_of):
        place = tree.vessel.get(decisions["vessel_id"][row])
        if place is not None:
            current[place] = decisions["pressure_mpa"][row]
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
