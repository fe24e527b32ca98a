"""The journal: every change of the record is one entry, one transaction, one link of a chain of hashes.

A writer takes the lock first, reads the head, writes its facts, then the entry with the digest of them all,
then moves the head. So numbers are commit order, and no two entries follow the same one.
"""

from __future__ import annotations

import contextlib
import datetime as dt
import hashlib
import json
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from sqlalchemy import Connection, Engine, Insert, Table, func, insert, select, update

import fleet
from fleet.errors import DatabaseProblem, OurFault, RecordIsClosed, Refused
from fleet.store.canonical import Plan, Value, entry_hash, line, mark
from fleet.store.engine import WRITES, lock, place
from fleet.store.models import Base, Journal, JournalHead, table_of
from fleet.store.verify import Finding, verify

__all__ = ["Entry", "Finding", "Head", "entries", "head", "number_at", "verify", "writer"]

_JOURNAL = table_of(Journal)
_HEAD = table_of(JournalHead)
_LOT = 20_000


@dataclass(frozen=True)
class Head:
    """The end of the journal.

    Parameters
    ----------
    no : int
        Number of the last entry, 0 when there is none [count].
    hash : str
        Its hash, as printed on lists and calculations [text].
    """

    no: int
    hash: str


class Entry:
    """One entry while it is being written; made by `writer` only.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        The connection of the entry's transaction, also for reading [-].
    no : int
        Number of the entry [count].
    at : datetime.datetime
        When it is written, in UTC [date].
    """

    def __init__(self, conn: Connection, no: int, at: dt.datetime) -> None:
        self.conn = conn
        self.no = no
        self.at = at
        self._plans: dict[str, Plan] = {}
        self._next: dict[str, int] = {}
        self._lines: dict[str, list[bytes]] = {}
        self._first: dict[str, int] = {}
        self._broken = False

    @property
    def wrote(self) -> bool:
        """Tell whether any fact was added."""
        return bool(self._lines)

    def add(self, model: type[Base], rows: Sequence[Mapping[str, object]]) -> list[int]:
        """Add facts to the record.

        Parameters
        ----------
        model : type
            The model of the table [-].
        rows : sequence of mapping
            Column names and values; an absent column is blank. `written` may be a mapping [-].

        Returns
        -------
        list of int
            The keys of the new rows, in the order of `rows`.

        Raises
        ------
        fleet.errors.Refused
            When a value cannot be kept, breaks a rule of the table, or the row to replace was replaced
            before.
        fleet.errors.OurFault
            When a column is not of this table, or one that may not be blank is.
        """
        if not rows:
            return []
        table = table_of(model)
        name = table.name
        if "entry_no" not in table.columns:
            raise OurFault(f"table {name}", "it holds no facts", "report this with the command")
        plan = self._plans.setdefault(name, Plan(table))
        start = self._next.get(name) or self._last_id(table) + 1
        self._refuse_replaced(table, rows)
        values = [
            plan.checked(row, row_id=row_id, entry_no=self.no) for row_id, row in enumerate(rows, start=start)
        ]
        lines = [line(name, row) for row in values]
        for row, canonical in zip(values, lines, strict=True):
            row["mark"] = mark(canonical)
        self._broken = (
            True  # until the rows are in: a failure leaves some of them, which nobody may pass over
        )
        try:
            _insert_many(self.conn, table, plan.names, values)
        except RecordIsClosed as problem:
            raise Refused(
                f"table {name}", "a row of that name or key is there already", "correct the row on record"
            ) from problem
        self._broken = False
        self._first.setdefault(name, start)
        self._next[name] = start + len(rows)
        self._lines.setdefault(name, []).extend(lines)
        return list(range(start, start + len(rows)))

    def _last_id(self, table: Table) -> int:
        return int(self.conn.scalar(select(func.coalesce(func.max(table.c.id), 0))) or 0)

    def _refuse_replaced(self, table: Table, rows: Sequence[Mapping[str, object]]) -> None:
        wanted = [row["replaces_id"] for row in rows if row.get("replaces_id") is not None]
        if not wanted:
            return
        if len(set(wanted)) < len(wanted):
            raise Refused(
                f"table {table.name}",
                "two rows replace the same one",
                "correct it once; nothing was recorded",
            )
        for start in range(0, len(wanted), 500):
            lot = wanted[start : start + 500]
            taken = self.conn.scalar(
                select(func.min(table.c.replaces_id)).where(table.c.replaces_id.in_(lot))
            )
            if taken is not None:
                raise Refused(
                    f"table {table.name}, row {taken}",
                    "it was corrected before",
                    "correct the row that replaced it; nothing was recorded",
                )

    def _digest(self) -> str:
        total = hashlib.sha256()
        for name in sorted(self._lines):
            for canonical in self._lines[name]:
                total.update(canonical)
        return total.hexdigest()

    def _ranges(self) -> str:
        ranges = {name: [self._first[name], self._next[name] - 1] for name in sorted(self._first)}
        return json.dumps(ranges, separators=(",", ":"))


@contextlib.contextmanager
def writer(
    engine: Engine,
    *,
    task: str,
    by: str,
    role: str | None = None,
    why: str | None = None,
    at: dt.datetime | None = None,
) -> Iterator[Entry]:
    """Open a journal entry: one transaction that holds the write lock from its first moment.

    When the block ends well, the entry is written and committed; when it raises, nothing is left. When the
    block added nothing, no entry is written.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    task : str
        What is being done, as a command's name [text].
    by : str
        Who does it [text].
    role : str, optional
        In what role [text].
    why : str, optional
        For what reason [text].
    at : datetime.datetime, optional
        When; now if not given. Needs a time zone and may not lie before the last entry [date].

    Yields
    ------
    Entry

    Raises
    ------
    fleet.errors.DatabaseProblem
        When the lock cannot be had in time, or the database cannot be written.
    fleet.errors.Refused
        When `by` is blank, or `at` lies before the last entry.
    """
    if not by.strip():
        raise Refused("the journal", "nobody is named as the one who does this", "give a name")
    if at is not None and at.tzinfo is None:
        raise OurFault("the journal", f"{at} has no time zone", "report this with the command")
    with engine.connect() as plain_conn:
        conn = plain_conn.execution_options(**{WRITES: True})
        with conn.begin():
            lock(conn)
            last = head(conn)
            moment = _moment(conn, last, at)
            entry = Entry(conn, last.no + 1, moment)
            yield entry
            if entry._broken:  # noqa: SLF001  the two are one thing in two parts
                raise OurFault(
                    "the journal", "a failed write was passed over", "report this with the command"
                )
            if entry.wrote:
                _close(entry, last, task=task, by=by, role=role, why=why)


def head(conn: Connection) -> Head:
    """Read the end of the journal.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].

    Returns
    -------
    Head

    Raises
    ------
    fleet.errors.DatabaseProblem
        When the database has no journal.
    """
    row = conn.execute(select(_HEAD.c.no, _HEAD.c.hash)).one_or_none()
    if row is None:
        raise DatabaseProblem(
            place(conn.engine), "its journal has no head", "keep the file and restore the last backup"
        )
    return Head(no=row.no, hash=row.hash)


def number_at(conn: Connection, when: dt.datetime) -> int:
    """Turn a time into the number of the last entry written by then.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    when : datetime.datetime
        The time, with its time zone [date].

    Returns
    -------
    int
        0 when nothing was written by then.

    Raises
    ------
    fleet.errors.OurFault
        When the time has no time zone.
    """
    if when.tzinfo is None:
        raise OurFault("the journal", f"{when} has no time zone", "report this with the command")
    return int(conn.scalar(select(func.max(_JOURNAL.c.no)).where(_JOURNAL.c.at <= _utc(when))) or 0)


def entries(conn: Connection, *, numbers: Sequence[int] | None = None) -> list[dict[str, Any]]:
    """Read journal entries, in order.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    numbers : sequence of int, optional
        Only these [count].

    Returns
    -------
    list of dict
        Every column by its name; `wrote` says which rows of which table, first and last key.
    """
    statement = select(_JOURNAL).order_by(_JOURNAL.c.no)
    wanted = None if numbers is None else set(numbers)
    rows = (dict(row) for row in conn.execute(statement).mappings())
    return [
        {**row, "wrote": json.loads(row["wrote"])} for row in rows if wanted is None or row["no"] in wanted
    ]


def _utc(when: dt.datetime) -> str:
    return when.astimezone(dt.UTC).isoformat(timespec="microseconds")


def _moment(conn: Connection, last: Head, at: dt.datetime | None) -> dt.datetime:
    """Choose the time of the entry: never before the last, so that times stand in the order of numbers."""
    before = conn.scalar(select(_JOURNAL.c.at).where(_JOURNAL.c.no == last.no))
    previous = None if before is None else dt.datetime.fromisoformat(before)
    if at is None:
        now = dt.datetime.now(dt.UTC)
        return now if previous is None else max(now, previous)
    if previous is not None and at < previous:
        raise Refused("the journal", f"{_utc(at)} lies before the last entry ({before})", "give a later time")
    return at.astimezone(dt.UTC)


def _close(entry: Entry, last: Head, *, task: str, by: str, role: str | None, why: str | None) -> None:
    """Write the entry and move the head."""
    values: dict[str, Any] = {
        "no": entry.no,
        "at": _utc(entry.at),
        "by": by,
        "role": role,
        "why": why,
        "task": task,
        "program_version": fleet.__version__,
        "wrote": entry._ranges(),  # noqa: SLF001  the two are one thing in two parts
        "facts_digest": entry._digest(),  # noqa: SLF001  the same
        "previous_hash": last.hash,
    }
    values["hash"] = entry_hash(values)
    entry.conn.execute(insert(_JOURNAL), values)
    moved = entry.conn.execute(
        update(_HEAD).where(_HEAD.c.no == last.no).values(no=entry.no, hash=values["hash"])
    )
    if moved.rowcount != 1:
        raise OurFault("the journal", "its head moved under the lock", "report this with the command")


def _insert_many(
    conn: Connection, table: Table, names: Sequence[str], rows: Sequence[Mapping[str, Value]]
) -> None:
    """Insert through the driver's own executemany: twice as fast as through row objects."""
    statement: Insert = insert(table)
    compiled = statement.compile(dialect=conn.dialect, column_keys=list(names))
    order = compiled.positiontup or list(names)
    binders = [table.c[name].type.dialect_impl(conn.dialect).bind_processor(conn.dialect) for name in order]
    for start in range(0, len(rows), _LOT):
        columns = [
            [row[name] for row in rows[start : start + _LOT]]
            if bind is None
            else [bind(row[name]) for row in rows[start : start + _LOT]]
            for name, bind in zip(order, binders, strict=True)
        ]
        if compiled.positional:
            conn.exec_driver_sql(str(compiled), list(zip(*columns, strict=True)))
        else:
            conn.exec_driver_sql(
                str(compiled), [dict(zip(order, row, strict=True)) for row in zip(*columns, strict=True)]
            )
