"""``fleet journal``: who changed what, and whether the chain is whole."""

from __future__ import annotations

from typing import Annotated

import typer

from fleet.cli import output
from fleet.cli.options import DEFAULT_DATABASE, AsJson, Database

journal = typer.Typer(
    name="journal",
    rich_markup_mode=None,
    no_args_is_help=True,
    help="Who changed what, and is the record whole.\n\nExample:  fleet journal verify",
)


def add_to(app: typer.Typer) -> None:
    """Add these commands to the command line.

    Parameters
    ----------
    app : typer.Typer
        The command line [-].
    """
    journal.command("show")(show)
    journal.command("verify")(verify)
    app.add_typer(journal)


def show(
    tag: Annotated[
        str | None, typer.Argument(metavar="TAG", help="only entries that wrote about this vessel")
    ] = None,
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Show the journal, entry by entry.

    Example:  fleet journal show D-1203
    """
    from fleet.tasks.database import open_database
    from fleet.tasks.history import journal_entries, journal_text

    entries = journal_entries(open_database(database), tag)
    if as_json:
        output.show(entries)
    else:
        output.say(journal_text(entries))


def verify(
    head: Annotated[
        str | None,
        typer.Option("--head", metavar="HASH", help="a head printed earlier; it must be in the chain"),
    ] = None,
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Check that no entry and no fact was altered, dropped, swapped or added.

    Example:  fleet journal verify --head 5f3c9a1b2d4e
    """
    from fleet.tasks.database import open_database
    from fleet.tasks.history import verify_journal

    found = verify_journal(open_database(database), against=head)
    if as_json:
        output.show(found.as_json())
    else:
        output.say(found.text())
    if found.failed is not None:
        raise found.failed
