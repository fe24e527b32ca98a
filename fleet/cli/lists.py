"""``fleet appraise``, ``show``, ``due``, ``gaps``, ``derating``: what is known, for people to act on."""

from __future__ import annotations

from datetime import date
from pathlib import Path
from typing import Annotated

import typer

from fleet.cli import output
from fleet.cli.options import (
    DEFAULT_DATABASE,
    AsJson,
    AsOf,
    By,
    CarryTo,
    Database,
    KnownAt,
    Units,
    name_of,
    read_day,
    today,
)
from fleet.errors import UsageProblem


def add_to(app: typer.Typer) -> None:
    """Add these commands to the command line.

    Parameters
    ----------
    app : typer.Typer
        The command line [-].
    """
    for name, command in (
        ("appraise", appraise),
        ("show", show),
        ("due", due),
        ("gaps", gaps),
        ("derating", derating),
    ):
        app.command(name)(command)


def appraise(
    tags: Annotated[list[str] | None, typer.Argument(metavar="TAG", help="vessels; all without one")] = None,
    as_of: AsOf = None,
    known_at: KnownAt = None,
    carry_to: CarryTo = None,
    save: Annotated[
        str | None, typer.Option("--save", metavar="NAME", help="keep this appraisal under a name, for good")
    ] = None,
    by: By = None,
    units: Units = "si",
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Appraise every vessel: standing, MAWP, life, due dates.

    Example:  fleet appraise --as-of 2026-12-01 --save "list 2026"
    """
    from fleet.tasks import appraisals
    from fleet.tasks.database import open_database

    if save is not None and tags:
        raise UsageProblem("--save", "single vessels are named", "save an appraisal of the whole register")
    engine = open_database(database)
    if save is not None:
        appraisals.refuse_saved_name(engine, save)
    made = appraisals.appraise_fleet(
        engine, as_of=as_of or today(), known_at=known_at, carry_to=carry_to, tags=tags or ()
    )
    if save is not None:
        number = appraisals.save_appraisal(engine, made, name=save, by=name_of(by))
        output.aside(f"Saved as {save!r} in journal entry {number}.")
    if as_json:
        from fleet.reports import jsonout

        output.show(jsonout.appraise(made.appraisal))
    else:
        from fleet.reports import text
        from fleet.tasks.printing import display

        views = made.appraisal.views() if tags else None
        output.say(text.appraise(made.appraisal, display(units), views))


def show(
    tag: Annotated[str, typer.Argument(metavar="TAG", help="the vessel")],
    as_of: AsOf = None,
    known_at: KnownAt = None,
    carry_to: CarryTo = None,
    units: Units = "si",
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Show one vessel: parts, locations, rates, life, MAWP.

    Example:  fleet show D-1203 --as-of 2026-12-01
    """
    from fleet.tasks.appraisals import show_vessel
    from fleet.tasks.database import open_database

    view = show_vessel(
        open_database(database), tag, as_of=as_of or today(), known_at=known_at, carry_to=carry_to
    )
    if as_json:
        output.show(view.as_json())
    else:
        from fleet.reports import text
        from fleet.tasks.printing import display

        output.say(text.show(view, display(units)))


def due(
    until: Annotated[
        date | None,
        typer.Option(
            "--until", parser=read_day, metavar="DATE", help="leave out what falls due after this day"
        ),
    ] = None,
    as_of: AsOf = None,
    known_at: KnownAt = None,
    units: Units = "si",
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """List what to inspect when; overdue first.

    Example:  fleet due --until 2027-12-31
    """
    from fleet.tasks.appraisals import appraise_fleet
    from fleet.tasks.database import open_database

    made = appraise_fleet(open_database(database), as_of=as_of or today(), known_at=known_at)
    if as_json:
        from fleet.reports import jsonout

        output.show(jsonout.due(made.appraisal, until))
    else:
        from fleet.reports import text
        from fleet.tasks.printing import display

        output.say(text.due(made.appraisal, until, display(units)))


def gaps(
    as_of: AsOf = None,
    known_at: KnownAt = None,
    units: Units = "si",
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """List what was never measured or recorded.

    Example:  fleet gaps --json
    """
    from fleet.tasks.appraisals import appraise_fleet
    from fleet.tasks.database import open_database

    made = appraise_fleet(open_database(database), as_of=as_of or today(), known_at=known_at)
    if as_json:
        from fleet.reports import jsonout

        output.show(jsonout.gaps(made.appraisal, made.waiting))
    else:
        from fleet.reports import text
        from fleet.tasks.printing import display

        output.say(text.gaps(made.appraisal, made.waiting, display(units)))


def derating(
    to: Annotated[
        Path | None, typer.Option("-o", "--output", metavar="FILE.xlsx", help="the workbook to write")
    ] = None,
    as_of: AsOf = None,
    known_at: KnownAt = None,
    units: Units = "si",
    database: Database = DEFAULT_DATABASE,
    as_json: AsJson = False,
) -> None:
    """Write the yearly list for management as a workbook.

    With --json the list itself is printed, and the workbook is written only where a file is named.

    Example:  fleet derating -o derating-2026.xlsx --as-of 2026-12-01
    """
    from fleet.tasks.appraisals import appraise_fleet
    from fleet.tasks.database import open_database
    from fleet.tasks.yearly import write_yearly_list

    if to is None and not as_json:
        raise UsageProblem("fleet derating", "no workbook is named", "give -o FILE.xlsx")
    made = appraise_fleet(open_database(database), as_of=as_of or today(), known_at=known_at)
    if to is not None:
        write_yearly_list(made, to, units=units)
    if as_json:
        from fleet.reports import jsonout

        output.show(jsonout.derating(made.appraisal))
    else:
        from fleet.reports import text
        from fleet.tasks.printing import display

        output.say(text.derating(made.appraisal, str(to), display(units)))
