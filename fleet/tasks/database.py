"""Databases as such: make one, open one, bring one to the tables of this version."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from fleet.store import Engine, migrate
from fleet.store import engine as engines


@dataclass(frozen=True)
class Upgraded:
    """What an upgrade did.

    Parameters
    ----------
    place : str
        The database [text].
    before, after : str or None
        Its schema before and after [text].
    """

    place: str
    before: str | None
    after: str | None


def new_database(address: str | Path) -> str:
    """Make an empty database.

    Parameters
    ----------
    address : str or pathlib.Path
        A path or an SQLAlchemy address [text].

    Returns
    -------
    str
        Where it is, for a person to read [text].

    Raises
    ------
    Refused
        If it holds something already.
    DatabaseProblem
        If it cannot be made there.
    """
    engine = engines.make_engine(address, must_exist=False)
    migrate.new_database(engine)
    return engines.place(engine)


def open_database(address: str | Path) -> Engine:
    """Open a database that has the tables of this version.

    Parameters
    ----------
    address : str or pathlib.Path
        A path or an SQLAlchemy address [text].

    Returns
    -------
    sqlalchemy.Engine

    Raises
    ------
    DatabaseProblem
        If none is there, it cannot be read, or it has the tables of another version.
    """
    engine = engines.make_engine(address)
    migrate.require_current(engine)
    return engine


def upgrade_database(address: str | Path) -> Upgraded:
    """Bring a database to the tables of this version; facts stay as they are.

    Parameters
    ----------
    address : str or pathlib.Path
        A path or an SQLAlchemy address [text].

    Returns
    -------
    Upgraded

    Raises
    ------
    DatabaseProblem
        If none is there, it holds no record of fleet, or it cannot be written.
    """
    engine = engines.make_engine(address)
    before = migrate.current(engine)
    if before is None or before > migrate.head():
        migrate.require_current(engine)  # says that it holds no record of fleet, or a newer one
    if before != migrate.head():
        migrate.upgrade(engine)
    return Upgraded(engines.place(engine), before, migrate.current(engine))
