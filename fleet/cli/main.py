"""The command ``fleet``: its first screen, its commands, and the one place where errors become text.

Every exception carries its exit code; `run` prints its three parts and ends the process with that code.
"""

from __future__ import annotations

import os
import sys
from collections.abc import Sequence
from typing import Annotated

import typer

import fleet
from fleet.cli import database, journal, lists, output, register, rules, survey
from fleet.errors import DatabaseProblem, FleetError, OurFault, Refused, UsageProblem
from fleet.words import CAUTION

app = typer.Typer(
    name="fleet",
    add_completion=False,
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
    help=(
        "Thickness surveys, remaining life and the yearly derating list for a fleet of pressure vessels.\n\n"
        f"{CAUTION}\n\n"
        "Example:  fleet demo"
    ),
)


@app.callback(invoke_without_command=True)
def first_screen(
    context: typer.Context,
    version: Annotated[bool, typer.Option("--version", help="print the version and stop")] = False,
) -> None:
    """Print the first screen when no command is named."""
    if version:
        output.say(fleet.__version__)
    elif context.invoked_subcommand is None:
        output.say(context.get_help())


for _module in (database, register, survey, lists, journal, rules):
    _module.add_to(app)


def run(arguments: Sequence[str] | None = None) -> None:
    """Run the command line and end the process with the right exit code.

    Parameters
    ----------
    arguments : sequence of str, optional
        The words after ``fleet``; those of the process where absent [text].

    Raises
    ------
    SystemExit
        Always: 0 done, 1 refused, 2 usage, 3 database, 70 our fault.
    """
    words = list(sys.argv[1:] if arguments is None else arguments)
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(
                errors="replace"
            )  # a terminal without a character prints '?', never a traceback
    output.begin(as_json="--json" in words)
    code: object = 0
    try:
        code = app(args=words, prog_name="fleet", standalone_mode=False)
    except FleetError as problem:
        _end(problem)
    except Exception as problem:  # the last net: whatever else happens is told in three parts
        if os.environ.get("FLEET_DEBUG"):
            raise
        if type(problem).__name__ == "NoArgsIsHelpError":  # a group named alone: its commands are the answer
            typer.echo(str(problem), err=True)
            raise SystemExit(UsageProblem.exit_code) from None
        _end(_translated(problem))
    raise SystemExit(code if isinstance(code, int) else 0)


def _end(problem: FleetError) -> None:
    """Tell the error and leave with its exit code."""
    output.error(problem)
    raise SystemExit(problem.exit_code)


def _translated(problem: Exception) -> FleetError:
    """Give a stray exception its three parts."""
    said = " ".join(str(problem).split())[:200] or type(problem).__name__
    if callable(told := getattr(problem, "format_message", None)):  # the option parser's own
        command = getattr(getattr(problem, "ctx", None), "command_path", "fleet")
        return UsageProblem(command, str(told()).rstrip("."), f"see '{command} --help'")
    if type(problem).__name__ == "Abort":  # what the option parser makes of Ctrl-C
        return Refused("fleet", "stopped by you", "nothing was half written; run the command again")
    if type(problem).__module__.startswith("sqlalchemy"):
        return DatabaseProblem(
            "the database", said, "check that it is whole, writable and not in use; then try again"
        )
    if isinstance(problem, OSError):
        return Refused(
            str(problem.filename or "a file"),
            problem.strerror or said,
            "check the path, the rights and the space left",
        )
    return OurFault(
        "fleet itself",
        f"{type(problem).__name__}: {said}",
        "set FLEET_DEBUG=1, run the command again and report what it prints; nothing was half written",
    )
