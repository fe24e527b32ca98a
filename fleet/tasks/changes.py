"""Compare the rows of a register file with what is on record: what is new, what differs, what is the same."""

from __future__ import annotations

import json
import math
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date
from typing import Any

from fleet.intake.results import Intake, Row, Value
from fleet.intake.tables import TABLES
from fleet.store import models
from fleet.tasks.names import Names
from fleet.tasks.reader import Reader
from fleet.words import Notice, notice

BEGINNING = date(1, 1, 1)
"""The day from which the first row of an entity holds [date]."""

Path = tuple[str, ...]


@dataclass(frozen=True)
class Kind:
    """How one table of the register is kept.

    Parameters
    ----------
    entity : str
        What its rows describe [text].
    model : type
        The table of the store [-].
    names : tuple of str
        The columns that name a row, from the outside in [text].
    parent : str or None
        The column of the store that holds the parent's entity [text].
    """

    entity: str
    model: type[models.Base]
    names: tuple[str, ...]
    parent: str | None


KINDS: dict[str, Kind] = {
    "vessels": Kind("vessel", models.Vessel, ("vessel",), None),
    "parts": Kind("part", models.Part, ("vessel", "part"), "vessel_id"),
    "locations": Kind("location", models.Location, ("vessel", "part", "location"), "part_id"),
    "relief": Kind("relief device", models.ReliefDevice, ("vessel", "device"), "vessel_id"),
}
"""The tables of the register in the order in which they are written."""


@dataclass(frozen=True)
class Change:
    """One row to be written.

    Parameters
    ----------
    table : str
        The table it came from [text].
    path : tuple of str
        The names of the entity, from the outside in [text].
    new : bool
        Whether the entity is not on record yet [-].
    values : dict
        Every column of the store's row but its entity and parent [-].
    row : Row
        The row of the file [-].
    """

    table: str
    path: Path
    new: bool
    values: dict[str, Any]
    row: Row


@dataclass(frozen=True)
class Compared:
    """The rows of a load, compared with the record.

    Parameters
    ----------
    changes : tuple of Change
        What is to be written, outer entities first [-].
    unchanged : int
        Rows that say what is on record already [count].
    taken_off : tuple of (tuple of str, Notice)
        Values that a blank cell takes off the record, each with what it is about [-].
    rows : tuple of (str, tuple of str, bool, Row)
        Every row: its table, its path, whether its entity is new, the row itself [-].
    """

    changes: tuple[Change, ...]
    unchanged: int
    taken_off: tuple[tuple[Path, Notice], ...]
    rows: tuple[tuple[str, Path, bool, Row], ...]


RegisterRows = dict[str, dict[int, dict[str, Any]]]
"""Table, then entity, to its row in force."""


def register_rows(reader: Reader, from_on: date | None) -> RegisterRows:
    """Fetch the rows that a load is compared with.

    Parameters
    ----------
    reader : Reader
        The record as of the day of the load [-].
    from_on : date or None
        The day of a change; None for a correction of what holds on the day of the load [date].

    Returns
    -------
    RegisterRows
    """
    at = reader if from_on is None else Reader(reader.conn, as_of=from_on, known=reader.known)
    found: RegisterRows = {}
    for table, kind in KINDS.items():
        columns = at.rows(kind.model)
        rows = (dict(zip(columns, values, strict=True)) for values in zip(*columns.values(), strict=True))
        found[table] = {row["entity_id"]: row for row in rows}
    return found


def compare(intake: Intake, in_force: RegisterRows, *, names: Names, from_on: date | None) -> Compared:
    """Compare the rows of a load with the record.

    Parameters
    ----------
    intake : Intake
        The typed rows [-].
    in_force : RegisterRows
        The rows on record [-].
    names : Names
        The entities on record [-].
    from_on : date or None
        The day of a change; None for a correction of what holds on the day of the load [date].

    Returns
    -------
    Compared
    """
    changes: list[Change] = []
    taken_off: list[tuple[Path, Notice]] = []
    rows: list[tuple[str, Path, bool, Row]] = []
    unchanged = 0
    for table, kind in KINDS.items():
        for row in intake.rows(table):
            path = tuple(str(row.values[name]) for name in kind.names)
            entity = _entity(names, kind, path)
            before = None if entity is None else in_force[table].get(entity)
            rows.append((table, path, entity is None, row))
            values = _merged(table, kind, row, before)
            if before is not None and _says_the_same(values, before):
                unchanged += 1
                continue
            if before is not None:
                about = path[:1] if table == "relief" else path
                taken_off += [(about, one) for one in _taken_off(table, kind, row, values, before)]
            values |= _dating(before, from_on)
            changes.append(Change(table, path, entity is None, values, row))
    return Compared(tuple(changes), unchanged, tuple(taken_off), tuple(rows))


def _taken_off(
    table: str, kind: Kind, row: Row, values: Mapping[str, Any], before: Mapping[str, Any]
) -> list[Notice]:
    """Tell the values on record that the row takes away without putting another in their place."""
    was = json.loads(before["written"]) if before["written"] else {}
    return [
        notice(
            "value taken off the record", f"{row.where}, {name}", f"{name} was {was.get(name, before[field])}"
        )
        for field, name in _kept_fields(table, kind).items()
        if before[field] not in {None, ""} and values[field] in {None, ""}
    ]


def _entity(names: Names, kind: Kind, path: Path) -> int | None:
    if kind.entity == "relief device":
        vessel = names.get(path[0])
        return None if vessel is None else names.by_key.get((kind.entity, vessel, path[1]))
    return names.get(*path)


def _kept_fields(table: str, kind: Kind) -> dict[str, str]:
    """Give the columns of a file that the store keeps in the row itself: field to column name."""
    stored = models.table_of(kind.model).columns
    return {
        column.field: column.name
        for column in TABLES[table]
        if column.field in stored and column.name not in kind.names
    }


def _merged(table: str, kind: Kind, row: Row, before: Mapping[str, Any] | None) -> dict[str, Any]:
    """Lay the row of the file over the row on record; a column that the file lacks stays as it is."""
    kept = _kept_fields(table, kind)
    values: dict[str, Any] = {field: None if before is None else before[field] for field in kept}
    written: dict[str, str] = {}
    if before is not None and before["written"]:
        written = json.loads(before["written"])
    for field, name in kept.items():
        if field not in row.values or _equal(row.values[field], values[field]):
            continue
        values[field] = row.values[field]
        written.pop(name, None)
        if name in row.written:
            written[name] = row.written[name]
    return {**values, "written": written or None}


def _says_the_same(values: Mapping[str, Any], before: Mapping[str, Any]) -> bool:
    return all(_equal(value, before[field]) for field, value in values.items() if field != "written")


def _equal(one: Value, other: Value) -> bool:
    if isinstance(one, float | int) and isinstance(other, float | int):
        return math.isclose(one, other, rel_tol=1e-9, abs_tol=1e-12)
    return one == other


def _dating(before: Mapping[str, Any] | None, from_on: date | None) -> dict[str, Any]:
    """Say from when the row holds and what it replaces.

    The first row of an entity holds from the beginning. A correction takes over the day of the row it replaces,
    and so does a change on the very day on which that row began.
    """
    if before is None:
        return {"valid_from": BEGINNING}
    if from_on is None or from_on == before["valid_from"]:
        return {"valid_from": before["valid_from"], "replaces_id": before["id"]}
    return {"valid_from": from_on}
