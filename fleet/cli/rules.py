"""``fleet rules show``: a rule set, each value with its clause and status."""

from __future__ import annotations

from typing import Annotated

import typer

from fleet.cli import output
from fleet.cli.options import AsJson

rules = typer.Typer(
    name="rules",
    rich_markup_mode=None,
    no_args_is_help=True,
    help="The rule sets and where their values come from.\n\nExample:  fleet rules show api510",
)


def add_to(app: typer.Typer) -> None:
    """Add these commands to the command line.

    Parameters
    ----------
    app : typer.Typer
        The command line [-].
    """
    rules.callback()(_only_subcommands)
    rules.command("show")(show)
    app.add_typer(rules)


def _only_subcommands() -> None:
    """Keep `show` a subcommand although it is the only one."""


def show(
    name: Annotated[
        str | None, typer.Argument(metavar="NAME", help="rule set; all are named without it")
    ] = None,
    as_json: AsJson = False,
) -> None:
    """Show a rule set with the clause and the status of every value.

    Example:  fleet rules show api510
    """
    from fleet.tasks.rule_sets import rule_set_document, rule_set_text

    if as_json:
        output.show(rule_set_document(name))
    else:
        output.say(rule_set_text(name))
