"""``fleet register load``: vessels, parts, locations, relief devices, inspections."""

from __future__ import annotations

from datetime import date
from typing import Annotated

import typer

from fleet.cli import output
from fleet.cli.options import (
    DEFAULT_DATABASE,
    AsJson,
    By,
    Database,
    DryRun,
    Files,
    Park,
    name_of,
    read_day,
    today,
)

register = typer.Typer(
    name="register",
    rich_markup_mode=None,
    no_args_is_help=True,
    help="What stands in the works.\n\nExample:  fleet register load register.xlsx",
)


def add_to(app: typer.Typer) -> None:
    """Add these commands to the command line.

    Parameters
    ----------
    app : typer.Typer
        The command line [-].
    """
    register.callback()(_only_subcommands)
    register.command("load")(load)
    app.add_typer(register)


def _only_subcommands() -> None:
    """Keep `load` a subcommand although it is the only one."""


def load(
    files: Files,
    from_on: Annotated[
        date | None,
        typer.Option(
            "--from",
            parser=read_day,
            metavar="DATE",
            help="the rows tell of a change on this day; without it they correct what is on record",
        ),
    ] = None,
    dry_run: DryRun = False,
    park: Park = False,
    by: By = None,
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Load vessels, parts, locations, relief devices and inspections from CSV files or workbooks.

    The files of one command are checked together; each is loaded as a whole or not at all. A row that says what
    is on record already writes nothing.

    Example:  fleet register load register.xlsx --dry-run
    """
    from fleet.tasks.database import open_database
    from fleet.tasks.register import load_register

    loaded = load_register(
        open_database(database),
        files,
        from_on=from_on,
        by=name_of(by),
        dry_run=dry_run,
        park=park,
        today=today(),
    )
    if as_json:
        output.show(loaded.as_json())
    else:
        output.say(loaded.sentence())
        for text in (
            output.notices(loaded.waiting, "Left waiting"),
            output.notices(loaded.doubts_of_loaded, "Doubts"),
        ):
            if text:
                output.say(text)
    if loaded.refused is not None:
        raise loaded.refused
