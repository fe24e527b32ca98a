"""The options that several commands share, each read in one way only."""

from __future__ import annotations

import re
from datetime import UTC, date, datetime, time
from pathlib import Path
from typing import Annotated

import typer

from fleet.errors import UsageProblem

DEFAULT_DATABASE = "fleet.db"
_DAY = re.compile(r"\d{4}-\d{2}-\d{2}")
_UNITS = ("si", "us")


def read_day(text: str) -> date:
    """Read an ISO date.

    Parameters
    ----------
    text : str
        The date as typed, for instance ``2026-12-01`` [date].

    Returns
    -------
    date

    Raises
    ------
    typer.BadParameter
        If it is not a date of the calendar in that form.

    Examples
    --------
    >>> read_day("2026-12-01")
    datetime.date(2026, 12, 1)
    """
    found = _day(text)
    if found is None:
        raise typer.BadParameter(f"{text!r} is not a date; write it as 2026-12-01")
    return found


def read_moment(text: str) -> datetime:
    """Read an ISO date or time; a bare date means the end of that day in UTC.

    Parameters
    ----------
    text : str
        The moment as typed; a time without an offset is taken as UTC [date].

    Returns
    -------
    datetime
        The moment in UTC.

    Raises
    ------
    typer.BadParameter
        If it is neither a date nor a time.

    Examples
    --------
    >>> read_moment("2026-12-01T08:30:00+02:00").isoformat()
    '2026-12-01T06:30:00+00:00'
    >>> read_moment("2026-12-01").isoformat()
    '2026-12-01T23:59:59.999999+00:00'
    """
    day = _day(text)
    if day is not None:
        return datetime.combine(day, time.max, tzinfo=UTC)
    try:
        moment = datetime.fromisoformat(text.strip())
        return moment.replace(tzinfo=UTC) if moment.tzinfo is None else moment.astimezone(UTC)
    except (ValueError, OverflowError):
        raise typer.BadParameter(
            f"{text!r} is neither a date nor a time; write 2026-12-01 or 2026-12-01T08:30:00"
        ) from None


def _day(text: str) -> date | None:
    """Read a date in its one accepted form; `date.fromisoformat` alone takes several."""
    if not _DAY.fullmatch(text.strip()):
        return None
    try:
        return date.fromisoformat(text.strip())
    except ValueError:
        return None


def read_units(text: str) -> str:
    """Read the name of a unit system.

    Parameters
    ----------
    text : str
        ``si`` or ``us`` [text].

    Returns
    -------
    str

    Raises
    ------
    typer.BadParameter
        If it is neither.

    Examples
    --------
    >>> read_units("US")
    'us'
    """
    if text.strip().lower() not in _UNITS:
        raise typer.BadParameter(f"{text!r} is not a unit system; write si or us")
    return text.strip().lower()


Database = Annotated[
    str,
    typer.Option(
        "--db", envvar="FLEET_DB", metavar="DATABASE", help="the database: a path or an SQLAlchemy address"
    ),
]
AsJson = Annotated[
    bool, typer.Option("--json", help="print exactly one JSON document, in mm, MPa, °C, mm/year, years")
]
AsOf = Annotated[
    date | None,
    typer.Option(
        "--as-of", parser=read_day, metavar="DATE", help="count what is true by this date (default: today)"
    ),
]
KnownAt = Annotated[
    datetime | None,
    typer.Option(
        "--known-at", parser=read_moment, metavar="TIME", help="use only what was on record by this time"
    ),
]
CarryTo = Annotated[
    date | None,
    typer.Option(
        "--carry-to",
        parser=read_day,
        metavar="DATE",
        help="carry the pressure to this date instead of the one the rules give",
    ),
]
Units = Annotated[
    str, typer.Option("--units", parser=read_units, metavar="si|us", help="units of what is printed")
]
By = Annotated[
    str | None,
    typer.Option(
        "--by",
        envvar="FLEET_BY",
        metavar="NAME",
        help="who does this, for the journal (default: the name you are logged in by)",
    ),
]
DryRun = Annotated[bool, typer.Option("--dry-run", help="check everything and write nothing")]
Park = Annotated[
    bool, typer.Option("--park-bad-rows", help="load the good rows; the others wait in 'fleet gaps'")
]
Files = Annotated[list[Path], typer.Argument(metavar="FILE...", help="CSV files or workbooks")]


def today() -> date:
    """Give the date on this machine's calendar.

    Returns
    -------
    date
    """
    return datetime.now().astimezone().date()


def name_of(by: str | None) -> str:
    """Give the name that the journal keeps.

    Parameters
    ----------
    by : str or None
        The name as given, or None for the name under which the person is logged in [text].

    Returns
    -------
    str

    Raises
    ------
    UsageProblem
        If no name was given and none can be had from the machine.

    Examples
    --------
    >>> name_of("M. Okafor")
    'M. Okafor'
    """
    if by is not None and by.strip():
        return by.strip()
    import getpass

    try:
        return getpass.getuser()
    except (OSError, KeyError, ImportError):
        raise UsageProblem("--by", "no name was given and the machine knows none", "give --by NAME") from None
