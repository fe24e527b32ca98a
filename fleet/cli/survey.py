"""``fleet survey load``: readings in; what is thin is told first, whatever happens to the file."""

from __future__ import annotations

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
    Units,
    name_of,
    today,
)

survey = typer.Typer(
    name="survey",
    rich_markup_mode=None,
    no_args_is_help=True,
    help="Thickness readings from the field.\n\nExample:  fleet survey load 2026-11-14_columns.csv",
)


def add_to(app: typer.Typer) -> None:
    """Add these commands to the command line.

    Parameters
    ----------
    app : typer.Typer
        The command line [-].
    """
    survey.callback()(_only_subcommands)
    survey.command("load")(load)
    app.add_typer(survey)


def _only_subcommands() -> None:
    """Keep `load` a subcommand although it is the only one."""


def load(
    files: Files,
    dry_run: DryRun = False,
    park: Park = False,
    by: By = None,
    units: Units = "si",
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Load thickness readings from CSV files or workbooks; each file as a whole or not at all.

    Every reading at or below its alert or required thickness is told first, also when the file is refused.

    Example:  fleet survey load 2026-11-14_columns.csv --by "M. Okafor"
    """
    from fleet.tasks.database import open_database
    from fleet.tasks.surveys import load_surveys, thin_text

    loaded = load_surveys(
        open_database(database), files, by=name_of(by), park=park, dry_run=dry_run, today=today()
    )
    if as_json:
        output.show(loaded.as_json())
    else:
        for text in (
            thin_text(loaded.thin, units),
            loaded.text(),
            output.notices(loaded.waiting, "Left waiting"),
            output.notices(loaded.doubts_of_loaded, "Doubts"),
        ):
            if text:
                output.say(text)
    if loaded.refused is not None:
        raise loaded.refused
