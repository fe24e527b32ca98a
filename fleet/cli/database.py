"""``fleet demo``, ``fleet new``, ``fleet db``: databases as such."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from fleet.cli import output
from fleet.cli.options import DEFAULT_DATABASE, AsJson, Database, Units

databases = typer.Typer(
    name="db",
    rich_markup_mode=None,
    no_args_is_help=True,
    help="Look after the database itself.\n\nExample:  fleet db upgrade",
)


def add_to(app: typer.Typer) -> None:
    """Add these commands to the command line.

    Parameters
    ----------
    app : typer.Typer
        The command line [-].
    """
    app.command("demo")(demo)
    app.command("new")(new)
    databases.command("upgrade")(upgrade)
    app.add_typer(databases)


def demo(
    folder: Annotated[
        Path, typer.Argument(metavar="FOLDER", help="where to build it; it must hold no demo yet")
    ] = Path("brackwater"),
    units: Units = "si",
    as_json: AsJson = False,
) -> None:
    """Build the invented Brackwater Works: database, surveys, appraisal, every list.

    Example:  fleet demo brackwater
    """
    from fleet.tasks.demo import build_demo

    built = build_demo(folder, units=units, progress=output.aside)
    if as_json:
        output.show(built.document)
    else:
        output.say(built.text)


def new(database: Database = DEFAULT_DATABASE, as_json: AsJson = False) -> None:
    """Make an empty database.

    Example:  fleet new --db works.db
    """
    from fleet.tasks.database import new_database

    place = new_database(database)
    if as_json:
        output.show({"database": place})
    else:
        output.say(f"{place}: an empty database was made. Next: fleet register load FILE")


def upgrade(database: Database = DEFAULT_DATABASE, as_json: AsJson = False) -> None:
    """Bring a database to the tables of this version; its facts stay as they are.

    Example:  fleet db upgrade --db works.db
    """
    from fleet.tasks.database import upgrade_database

    done = upgrade_database(database)
    if as_json:
        output.show({"database": done.place, "from": done.before, "to": done.after})
    elif done.before == done.after:
        output.say(f"{done.place}: nothing to do, it is at {done.after}")
    else:
        output.say(f"{done.place}: brought from {done.before or 'nothing'} to {done.after}")
