"""Canonical lines: the one text of a fact row from which digests are made, the same on every engine.

A line is a JSON array: the table's name, then name and value of every column that holds something, in the
order of the names. Blank columns leave no trace, so a column that a later migration adds does not change
the lines of older rows; for the same reason no column is ever renamed. Floats are written by `repr`, dates
in ISO form, times as the UTC text they are stored as. The column `mark` holds digits of the line's own
digest and is not part of it.
"""

from __future__ import annotations

import datetime as dt
import hashlib
import json
import math
import operator
from collections.abc import Callable, Mapping, Sequence
from typing import Any

from sqlalchemy import Boolean, Column, Date, Double, Integer, Table, Text

from fleet.errors import OurFault, Refused

MARK_DIGITS = 16
"""How many hexadecimal digits of a line's digest stand in the row [count]."""


def _other(value: object) -> str:
    """Write what JSON has no form for; only a row that was tampered with holds anything but dates."""
    return value.isoformat() if isinstance(value, dt.date) else repr(value)


_ENCODE = json.JSONEncoder(separators=(",", ":"), default=_other).encode

Value = str | float | int | bool | dt.date | None


def line(table: str, values: Mapping[str, Any]) -> bytes:
    r"""Write the canonical line of a row.

    Parameters
    ----------
    table : str
        Name of the table [text].
    values : mapping of str to object
        Column names and values, as stored or as read back raw from either engine [-].

    Returns
    -------
    bytes
        The line with its line feed.

    Examples
    --------
    >>> line("reading", {"taken_on": dt.date(2026, 12, 1), "thickness_mm": 12.7, "note": None, "mark": "ab"})
    b'["reading","taken_on","2026-12-01","thickness_mm",12.7]\n'
    """
    parts: list[Any] = [table]
    for name in sorted(values):
        value = values[name]
        if value is not None and name != "mark":
            parts += (name, value)
    return _ENCODE(parts).encode("ascii") + b"\n"


def mark(text: bytes) -> str:
    """Give the digits of a line's digest that stand in the row.

    Parameters
    ----------
    text : bytes
        A canonical line [text].

    Returns
    -------
    str
    """
    return hashlib.sha256(text).hexdigest()[:MARK_DIGITS]


def digest(parts: Sequence[object]) -> str:
    """Give the SHA-256 of a JSON array, as it stands in the journal.

    Parameters
    ----------
    parts : sequence of object
        Texts, numbers and None in a fixed order [-].

    Returns
    -------
    str
        64 hexadecimal digits.
    """
    return hashlib.sha256(_ENCODE(list(parts)).encode("ascii")).hexdigest()


def entry_hash(values: Mapping[str, Any]) -> str:
    """Give the hash of a journal entry, which ties it to the entry before it.

    Parameters
    ----------
    values : mapping of str to object
        The columns of the entry [-].

    Returns
    -------
    str
        64 hexadecimal digits.
    """
    names = (
        "no",
        "at",
        "by",
        "role",
        "why",
        "task",
        "program_version",
        "wrote",
        "facts_digest",
        "previous_hash",
    )
    return digest(["journal", *(values[name] for name in names)])


def _text(value: object) -> str:
    if not isinstance(value, str):
        raise TypeError("text")
    if "\x00" in value:
        raise ValueError("no engine keeps a null character in text")
    if not value.isascii():
        value.encode("utf-8")  # half a character raises UnicodeEncodeError
    return str(value)


def _json(value: object) -> str:
    if isinstance(value, str):
        return _text(value)
    return _text(json.dumps(value, ensure_ascii=False, allow_nan=False, sort_keys=False))


def _number(value: object) -> float:
    if isinstance(value, (bool, str)) or not hasattr(value, "__float__"):
        raise TypeError("a number")
    number = float(value)
    if not math.isfinite(number):
        raise ValueError("a finite number; what is missing is None")
    return number + 0.0  # SQLite keeps no negative zero, so none is digested


def _whole(value: object) -> int:
    if isinstance(value, (bool, str)):
        raise TypeError("a whole number")
    if isinstance(value, float) and value.is_integer():
        value = int(value)
    number = operator.index(value)  # type: ignore[arg-type]  # what has no index raises TypeError, as wanted
    if not -(2**31) <= number < 2**31:
        raise ValueError("a whole number of 32 bits")
    return number


def _date(value: object) -> dt.date:
    if isinstance(value, dt.datetime) or not isinstance(value, dt.date):
        raise TypeError("a date without time")
    return dt.date(value.year, value.month, value.day)


def _truth(value: object) -> bool:
    if value is True or value is False:
        return value
    raise TypeError("True or False")


_KINDS: tuple[tuple[type[Any], Callable[[object], Any]], ...] = (
    (Text, _text),
    (Double, _number),
    (Integer, _whole),
    (Boolean, _truth),
    (Date, _date),
)


def _reader(column: Column[Any]) -> Callable[[object], Any]:
    if column.info.get("json"):
        return _json
    for kind, read in _KINDS:
        if isinstance(column.type, kind):
            return read
    raise OurFault(f"column {column}", f"type {column.type} has no canonical form", "add it to canonical.py")


class Plan:
    """Know how the rows of one table are checked before they are stored.

    Parameters
    ----------
    table : sqlalchemy.Table
        The table [-].
    """

    def __init__(self, table: Table) -> None:
        self.table = table
        self.names = [column.name for column in table.columns]
        self._own = {"id", "entry_no", "mark"}
        self._readers = {
            column.name: _reader(column) for column in table.columns if column.name not in self._own
        }
        self._needed = [name for name in self._readers if not table.c[name].nullable]
        self._blank: dict[str, Value] = dict.fromkeys(sorted(self._own | self._readers.keys()))
        del self._blank["mark"]
        for column in table.columns:
            if column.default is not None:
                self._blank[column.name] = column.default.arg  # type: ignore[attr-defined]  # plain values only

    def checked(self, row: Mapping[str, object], *, row_id: int, entry_no: int) -> dict[str, Value]:
        """Turn a caller's row into the values that are stored, and refuse what no engine keeps faithfully.

        Parameters
        ----------
        row : mapping of str to object
            Column names and values; an absent column is blank [-].
        row_id : int
            Key of the row [-].
        entry_no : int
            Number of the entry that writes it [-].

        Returns
        -------
        dict
            Every column but `mark`, with a value of the column's own type.

        Raises
        ------
        fleet.errors.OurFault
            When a column is not of this table, or one that may not be blank is.
        fleet.errors.Refused
            When a value cannot be kept: not a number, infinite, not a date, half a character.
        """
        name = self.table.name
        if not row.keys() <= self._readers.keys():
            odd = ", ".join(sorted(row.keys() - self._readers.keys()))
            raise OurFault(f"table {name}", f"no such column to write: {odd}", "report this with the command")
        values: dict[str, Value] = {**self._blank, "id": row_id, "entry_no": entry_no}
        for column, value in row.items():
            if value is None:
                continue
            try:
                values[column] = self._readers[column](value)
            except (TypeError, ValueError) as problem:
                raise Refused(
                    f"table {name}, column {column}",
                    f"{value!r} cannot be recorded ({problem})",
                    "correct the value; nothing was recorded",
                ) from problem
        for column in self._needed:
            if values[column] is None:
                raise OurFault(f"table {name}", f"{column} is blank", "report this with the command")
        return values


def plain(values: Mapping[str, Any], booleans: frozenset[str]) -> dict[str, Any]:
    """Give raw values of either engine the form in which they were written: SQLite keeps True as 1.

    Parameters
    ----------
    values : mapping of str to object
        Column names and raw values [-].
    booleans : frozenset of str
        Names of the columns that hold True or False [text].

    Returns
    -------
    dict
    """
    return {
        name: bool(value) if name in booleans and value in {0, 1} else value for name, value in values.items()
    }
