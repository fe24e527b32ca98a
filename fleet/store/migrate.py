"""Bring a database to the schema of this version, or say that it is not there yet."""

from __future__ import annotations

import re
from pathlib import Path

from sqlalchemy import Connection, Engine, inspect, text

from fleet.errors import DatabaseProblem, Refused
from fleet.store.engine import WRITES, lock, place
from fleet.store.places import data_folder


def migrations_folder() -> Path:
    """Find the migrations, in a wheel or in a checkout.

    Returns
    -------
    pathlib.Path
    """
    return data_folder("migrations")


def head(folder: Path | None = None) -> str:
    """Name the newest revision that this version knows, without importing Alembic.

    Parameters
    ----------
    folder : pathlib.Path, optional
        The migrations, if not this version's own [text].

    Returns
    -------
    str
        The number at the head of the newest file's name.

    Examples
    --------
    >>> head() >= "0001"
    True
    """
    return max(_numbers(folder or migrations_folder()))


def current(engine: Engine) -> str | None:
    """Name the revision of a database.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].

    Returns
    -------
    str or None
        None when the database has no schema of ours.

    Raises
    ------
    fleet.errors.DatabaseProblem
        When the database cannot be read.
    """
    with engine.connect() as conn:
        return _current(conn)


def is_current(engine: Engine) -> bool:
    """Tell whether a database has the schema of this version.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].

    Returns
    -------
    bool
    """
    return current(engine) == head()


def require_current(engine: Engine) -> None:
    """Refuse a database that has another schema than this version's.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].

    Raises
    ------
    fleet.errors.DatabaseProblem
        When it has no schema of ours, an older one or a newer one.
    """
    there, here = current(engine), head()
    if there is None:
        raise DatabaseProblem(
            place(engine),
            "it holds no record of fleet",
            "check the path; 'fleet new' makes an empty database",
        )
    if there not in _numbers(migrations_folder()):
        raise DatabaseProblem(
            place(engine),
            f"its schema {there} is newer than this version's {here}",
            "install the newer version of fleet",
        )
    if there != here:
        raise DatabaseProblem(
            place(engine), f"its schema is {there}, this version needs {here}", "run 'fleet db upgrade'"
        )


def new_database(engine: Engine) -> None:
    """Fill an empty database with the schema of this version and its guard.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        An empty database, or an SQLite file that is not there yet [-].

    Raises
    ------
    fleet.errors.Refused
        When the database holds something already.
    """
    with engine.connect() as conn:
        if inspect(conn).get_table_names():
            raise Refused(
                place(engine), "it holds something already", "give another path, or use what is there"
            )
    upgrade(engine)


def upgrade(engine: Engine, *, to: str = "head", folder: Path | None = None) -> None:
    """Bring a database to a revision, in one transaction: either the whole of it or nothing.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    to : str, optional
        The revision [text].
    folder : pathlib.Path, optional
        The migrations, if not this version's own [text].

    Raises
    ------
    fleet.errors.DatabaseProblem
        When the database cannot be written, or bears a revision that this version does not know.
    """
    from alembic import command
    from alembic.config import Config
    from alembic.util import CommandError

    config = Config()
    # The value is read through ConfigParser, in which a percent sign has a meaning of its own.
    config.set_main_option("script_location", str(folder or migrations_folder()).replace("%", "%%"))
    with engine.connect() as plain_conn:
        conn = plain_conn.execution_options(**{WRITES: True})
        prepare(conn)
        with conn.begin():
            lock(conn)
            config.attributes["connection"] = conn
            try:
                command.upgrade(config, to)
            except CommandError as error:
                raise DatabaseProblem(
                    place(engine),
                    f"its schema is not one that this version can bring up: {error}",
                    "open it with the version that made it, or go back to a backup",
                ) from error


def prepare(conn: Connection) -> None:
    """Let tables be rebuilt: SQLite must not follow references while a table is away.

    The switch has no effect within a transaction, so it is thrown before one begins; `finish` looks at every
    reference before the transaction ends.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        A connection without a transaction [-].
    """
    if conn.dialect.name == "sqlite":
        raw = conn.connection.driver_connection
        if raw is not None:
            raw.execute("PRAGMA foreign_keys = OFF")


def finish(conn: Connection) -> None:
    """Put up the guard and look at every reference, before a migration's transaction ends.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        The connection of the migration [-].

    Raises
    ------
    fleet.errors.DatabaseProblem
        When a reference leads nowhere.
    """
    from fleet.store import guard

    guard.install(conn)
    if conn.dialect.name == "sqlite":
        broken = conn.exec_driver_sql("PRAGMA foreign_key_check").all()
        if broken:
            raise DatabaseProblem(
                place(conn.engine),
                f"{len(broken)} references lead nowhere, the first in {broken[0][0]} row {broken[0][1]}",
                "keep the file and restore the last backup; nothing was changed",
            )


def _numbers(folder: Path) -> list[str]:
    names = (re.match(r"(\d{4})_", path.name) for path in (folder / "versions").glob("*.py"))
    return [match.group(1) for match in names if match]


def _current(conn: Connection) -> str | None:
    if "alembic_version" not in inspect(conn).get_table_names():
        return None
    found = conn.scalar(text("SELECT version_num FROM alembic_version"))
    return None if found is None else str(found)
