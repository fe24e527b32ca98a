"""The one function that makes every engine; the one place that turns a driver's trouble into plain words."""

from __future__ import annotations

import sqlite3
from collections.abc import Iterator
from pathlib import Path
from typing import Any, NoReturn
from urllib.parse import quote

from sqlalchemy import Connection, Engine, Executable, create_engine, event, exc
from sqlalchemy.engine import URL, ExceptionContext, make_url
from sqlalchemy.pool import NullPool

from fleet.errors import DatabaseProblem, FleetError, RecordIsClosed, Refused, UsageProblem

CLOSED = "the record is closed"
"""How every refusal of the guard begins, on both engines [text]."""

WRITES = "fleet_writes"
"""Execution option of a connection whose transactions take the write lock at once."""

LOCK = 5_133_118_225
"""Number of the advisory lock of writers in PostgreSQL, the same for every one of them [-]."""

DEFAULT_TIMEOUT_S = 30.0
"""How long a writer or reader waits for another's lock [s]."""

_BACKUP = "restore the last backup"

# What a driver says (a part of its words, or an SQLSTATE) -> what it means and what to do.
_TROUBLES: tuple[tuple[tuple[str, ...], str, str], ...] = (
    (("unable to open database file",), "the file cannot be opened", "check the folder and its permissions"),
    (
        ("file is not a database", "unsupported file format"),
        "the file is not a database of fleet",
        "check the path; 'fleet new' makes an empty database",
    ),
    (("malformed", "XX001", "XX002"), "the database is damaged", f"keep the damaged file and {_BACKUP}"),
    (
        ("readonly", "25006", "42501"),
        "it may only be read, not written",
        "ask for permission to write to it and to its folder, or work on a copy",
    ),
    (
        ("is locked", "55P03"),
        "somebody else is writing and did not finish in time",
        "try again; nothing was recorded",
    ),
    (
        ("disk is full", "53100"),
        "there is no room left on its disk",
        "make room and try again; nothing was recorded",
    ),
    (
        ("disk I/O error", "58030"),
        "its disk does not answer",
        "check the disk or share; nothing was recorded",
    ),
    (
        ("no such table", "no such column", "42P01", "42703"),
        "it lacks a table or column of this version",
        "run 'fleet db upgrade', or 'fleet new' for a new database",
    ),
)


def make_engine(
    address: str | Path, *, must_exist: bool = True, timeout_s: float = DEFAULT_TIMEOUT_S
) -> Engine:
    """Make the engine for a database.

    Parameters
    ----------
    address : str or pathlib.Path
        A path, or an SQLAlchemy address that begins with ``sqlite:///`` or ``postgresql://`` [text].
    must_exist : bool, optional
        Whether a missing SQLite file is refused; if not, it is made at the first use [-].
    timeout_s : float, optional
        How long to wait for another's lock [s].

    Returns
    -------
    sqlalchemy.Engine

    Raises
    ------
    fleet.errors.DatabaseProblem
        When the file is missing or is a folder. Everything else shows at the first use, also as this.
    fleet.errors.UsageProblem
        When the address is of no kind known here.

    Examples
    --------
    >>> make_engine("sqlite:///fleet.db", must_exist=False).dialect.name
    'sqlite'
    """
    url = _address(address)
    if url.get_backend_name() == "sqlite":
        engine = _sqlite(url, must_exist=must_exist, timeout_s=timeout_s)
    else:
        engine = create_engine(
            url,
            poolclass=NullPool,
            connect_args={
                "connect_timeout": max(2, round(timeout_s)),
                "options": f"-c lock_timeout={round(timeout_s * 1000)}",
            },
        )
    event.listen(engine.dialect, "handle_error", _plain_words)
    return engine


def place(engine: Engine) -> str:
    """Name a database for a message, without its password.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The engine [-].

    Returns
    -------
    str
    """
    return _name(engine.url)


def raw_rows(conn: Connection, statement: Executable, *, size: int = 20_000) -> Iterator[list[Any]]:
    """Fetch rows as the driver gives them, in lots: three times as fast as through row objects.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    statement : sqlalchemy.Executable
        A select [-].
    size : int, optional
        Rows in a lot [count].

    Yields
    ------
    list of tuple

    Raises
    ------
    fleet.errors.DatabaseProblem
        When the database is damaged or goes away meanwhile.
    """
    result = conn.execute(statement)
    cursor = result.cursor
    try:
        while True:
            try:
                rows = cursor.fetchmany(size)
            except conn.dialect.loaded_dbapi.Error as problem:
                _say(problem, _name(conn.engine.url))
            if not rows:
                return
            yield list(rows)
    finally:
        result.close()


def lock(conn: Connection) -> None:
    """Take the write lock until the transaction ends; in SQLite it was taken with BEGIN IMMEDIATE.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        A connection with the execution option `WRITES` [-].
    """
    if conn.dialect.name == "postgresql":
        conn.exec_driver_sql(f"SELECT pg_advisory_xact_lock({LOCK})")


def hold(conn: Connection) -> None:
    """Keep writers out until the transaction ends; in SQLite every reader does.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    """
    if conn.dialect.name == "postgresql":
        conn.exec_driver_sql(f"SELECT pg_advisory_xact_lock_shared({LOCK})")


def _address(address: str | Path) -> URL:
    text = str(address)
    if "://" not in text:
        return URL.create("sqlite", database=text)
    try:
        url = make_url(text)
    except exc.ArgumentError as problem:
        raise UsageProblem(text, "it is no database address", "give a path, or postgresql://...") from problem
    if url.drivername in {"sqlite", "sqlite+pysqlite"}:
        return url
    if url.drivername in {"postgresql", "postgresql+psycopg"}:
        return url.set(drivername="postgresql+psycopg")
    raise UsageProblem(
        url.render_as_string(hide_password=True),
        f"'{url.drivername}' is no kind of database known here",
        "give a path, sqlite:///PATH or postgresql://...",
    )


def _name(url: URL) -> str:
    if url.get_backend_name() == "sqlite":
        return url.database or ":memory:"
    return url.render_as_string(hide_password=True).replace("postgresql+psycopg", "postgresql")


def _sqlite(url: URL, *, must_exist: bool, timeout_s: float) -> Engine:
    name = url.database
    if name is None or name in {"", ":memory:"}:
        raise UsageProblem("sqlite", "a database in memory would be lost at once", "give the path of a file")
    path = Path(name)
    if path.is_dir():
        raise DatabaseProblem(name, "it is a folder", "give the path of the file")
    if must_exist and not path.exists():
        raise DatabaseProblem(name, "no database is there", "check the path, or make one with 'fleet new'")
    mode = "rw" if must_exist else "rwc"

    def connect() -> sqlite3.Connection:
        address = f"file:{quote(str(path.absolute()))}?mode={mode}"
        # No isolation level: sqlite3 then begins no transaction of its own, and DDL obeys ours.
        conn = sqlite3.connect(address, uri=True, timeout=timeout_s, isolation_level=None)
        try:
            conn.execute("PRAGMA foreign_keys = ON")
            # One file that can be mailed and copied; the statement also shows a file that is no database.
            conn.execute("PRAGMA journal_mode = DELETE")
        except sqlite3.Error:
            conn.close()
            raise
        return conn

    engine = create_engine(url, creator=connect, poolclass=NullPool)
    event.listen(engine, "begin", _begin)
    return engine


def _begin(conn: Connection) -> None:
    """Begin by our own word: a writer takes the lock at once, so that two never wait for each other."""
    conn.exec_driver_sql("BEGIN IMMEDIATE" if conn.get_execution_options().get(WRITES) else "BEGIN")


def _plain_words(context: ExceptionContext) -> None:
    """Raise our own exception in place of the driver's."""
    original = context.original_exception
    if isinstance(original, FleetError):
        return
    engine = context.engine
    where = _name(engine.url) if engine is not None else "the database"
    if isinstance(context.sqlalchemy_exception, exc.DBAPIError):
        _say(original, where)


def _say(problem: BaseException, where: str) -> NoReturn:
    """Raise what a driver's trouble means."""
    state = getattr(problem, "sqlstate", None) or ""
    words = str(problem).strip().split("\n")[0]
    if CLOSED in words:
        raise RecordIsClosed(
            where, words, "record a correction: a new row that replaces the old one"
        ) from problem
    for marks, what, remedy in _TROUBLES:
        if state in marks or any(mark in words for mark in marks):
            raise DatabaseProblem(where, what, remedy) from problem
    kind = type(problem).__name__
    if kind == "IntegrityError" or state.startswith("23"):
        raise Refused(
            where, f"a rule of the database forbids it ({words})", "correct the values; nothing was recorded"
        ) from problem
    server = hasattr(problem, "sqlstate")  # SQLite's errors have none
    if server and kind == "OperationalError" and (not state or state.startswith(("08", "28", "3D", "57"))):
        raise DatabaseProblem(
            where, f"it does not answer ({words})", "check the address and that the server runs"
        ) from problem
    raise DatabaseProblem(
        where, f"it refused a statement ({words})", "report this with the command"
    ) from problem
