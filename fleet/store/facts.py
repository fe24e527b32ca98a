"""Facts in force: what the record says of a day, as it was known at an entry."""

from __future__ import annotations

import datetime as dt
from collections.abc import Callable, Sequence
from itertools import compress
from typing import Any

from sqlalchemy import Boolean, Connection, Date, Select, Table, or_, select
from sqlalchemy.types import TypeEngine

from fleet.errors import OurFault
from fleet.store.engine import raw_rows
from fleet.store.models import Base, table_of


def columns(
    conn: Connection,
    model: type[Base],
    *,
    known: int,
    as_of: dt.date | None = None,
    only: Sequence[str] | None = None,
) -> dict[str, list[Any]]:
    """Read the rows of a table that are in force, column by column.

    A row is in force when no row up to the entry `known` replaces it and it was not taken back. Of the rows
    of a register table that describe the same entity, the one with the latest `valid_from` up to `as_of`
    holds; the first one holds from the beginning.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    model : type
        The model of the table [-].
    known : int
        Number of the last entry that counts [count].
    as_of : datetime.date, optional
        The day; without it the latest rows of the register hold. It selects rows of the register only:
        whether a reading, inspection or decision lies after the day is the reader's to judge [date].
    only : sequence of str, optional
        Only these columns [text].

    Returns
    -------
    dict of str to list
        Every column by its name, rows in the order of their keys, None where blank.
    """
    table = table_of(model)
    wanted = list(only) if only is not None else [column.name for column in table.columns]
    extra = [name for name in ("id", "entity_id", "valid_from", "withdrawn_because") if name in table.columns]
    names = list(dict.fromkeys([*wanted, *extra]))
    statement = (
        select(*(table.c[name] for name in names)).where(table.c.entry_no <= known).order_by(table.c.id)
    )
    read = _fetch(conn, statement, table, names)
    keep = _not_replaced(conn, table, known, read["id"])
    if "withdrawn_because" in read:
        keep = [
            kept and because is None for kept, because in zip(keep, read["withdrawn_because"], strict=True)
        ]
    if "valid_from" in read:
        keep = _latest(read, keep, as_of)
    if all(keep):
        return {name: read[name] for name in wanted}
    return {name: list(compress(read[name], keep)) for name in wanted}


def history(conn: Connection, model: type[Base], entity_id: int) -> list[dict[str, Any]]:
    """Read every row that was ever written about an entity, replaced or not.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    model : type
        The model of the table [-].
    entity_id : int
        Key of the vessel, part, location or relief device [count].

    Returns
    -------
    list of dict
        The rows in the order of their keys, each with `replaced_by`, the key of the row that replaces it or
        None.
    """
    table = table_of(model)
    if not model.ABOUT:
        raise OurFault(f"table {table.name}", "its rows are about no entity", "report this with the command")
    about = or_(*(table.c[name] == entity_id for name in model.ABOUT))
    names = [column.name for column in table.columns]
    read = _fetch(conn, select(table).where(about).order_by(table.c.id), table, names)
    rows = [dict(zip(names, row, strict=True)) for row in zip(*read.values(), strict=True)]
    followers: dict[int, int] = {}
    if "replaces_id" in table.columns:
        # A correction may be about another entity (a reading moved to its right location), so look at every
        # follower.
        keys = [row["id"] for row in rows]
        for start in range(0, len(keys), 500):
            lot = keys[start : start + 500]
            found = conn.execute(select(table.c.replaces_id, table.c.id).where(table.c.replaces_id.in_(lot)))
            followers.update({row.replaces_id: row.id for row in found})
    return [{**row, "replaced_by": followers.get(row["id"])} for row in rows]


def _fetch(
    conn: Connection, statement: Select[Any], table: Table, names: Sequence[str]
) -> dict[str, list[Any]]:
    """Fetch columns, each turned into its own type as a whole."""
    gathered: list[list[Any]] = [[] for _ in names]
    for lot in raw_rows(conn, statement):
        for column, part in zip(gathered, zip(*lot, strict=True), strict=True):
            column.extend(part)
    result: dict[str, list[Any]] = {}
    for name, values in zip(names, gathered, strict=True):
        read = _reader(table.c[name].type) if conn.dialect.name == "sqlite" else None
        result[name] = values if read is None else [read(value) for value in values]
    return result


def _reader(kind: TypeEngine[Any]) -> Callable[[Any], Any] | None:
    """Choose what SQLite's texts and numbers are read as."""
    if isinstance(kind, Date):
        return _remembered(dt.date.fromisoformat)
    return _remembered(bool) if isinstance(kind, Boolean) else None


def _remembered(read: Callable[[Any], Any]) -> Callable[[Any], Any]:
    """Remember what was read: a million readings were taken on a few hundred days."""
    memory: dict[Any, Any] = {None: None}

    def look(value: Any) -> Any:
        try:
            return memory[value]
        except KeyError:
            return memory.setdefault(value, read(value))

    return look


def _not_replaced(conn: Connection, table: Table, known: int, keys: list[int]) -> list[bool]:
    if "replaces_id" not in table.columns:
        return [True] * len(keys)
    statement = select(table.c.replaces_id).where(table.c.replaces_id.is_not(None), table.c.entry_no <= known)
    replaced = {row[0] for lot in raw_rows(conn, statement) for row in lot}
    return [key not in replaced for key in keys]


def _latest(read: dict[str, list[Any]], keep: list[bool], as_of: dt.date | None) -> list[bool]:
    """Of the rows of each entity, keep the latest up to the day; the first holds from the beginning."""
    order = sorted(
        (index for index, kept in enumerate(keep) if kept),
        key=lambda index: (read["valid_from"][index], read["id"][index]),
    )
    chosen: dict[int, int] = {}
    for index in order:
        entity = read["entity_id"][index]
        if entity not in chosen or as_of is None or read["valid_from"][index] <= as_of:
            chosen[entity] = index
    kept_indexes = set(chosen.values())
    return [index in kept_indexes for index in range(len(keep))]


def successors(conn: Connection, model: type[Base], *, known: int) -> dict[int, int]:
    """Tell for every replaced row of a table which row stands for it now.

    A fact names another by its key, and that other one may have been corrected since.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    model : type
        The model of the table [-].
    known : int
        Number of the last entry that counts [count].

    Returns
    -------
    dict of int to int
        Key of the replaced row to the key of the last row of its line; rows never replaced are not in it.
    """
    table = table_of(model)
    statement = select(table.c.replaces_id, table.c.id).where(
        table.c.replaces_id.is_not(None), table.c.entry_no <= known
    )
    following = {before: after for lot in raw_rows(conn, statement) for before, after in lot}
    last: dict[int, int] = {}
    for before in sorted(
        following, reverse=True
    ):  # a row replaces an earlier one: the later ones are known first
        after = following[before]
        last[before] = last.get(after, after)
    return last
