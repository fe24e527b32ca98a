"""Sheet `How to read`: words, standings, rounding, formulas and rules with their status, journal."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import TYPE_CHECKING

from fleet import formula, words
from fleet.reports import cite
from fleet.reports.figures import Figures
from fleet.reports.source import AppraisalLike, Grounds, heaviness
from fleet.reports.workbook import ink
from fleet.reports.workbook.page import Column, Page, Stamp
from fleet.reports.workbook.the_year import MEANING

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

WORDS: tuple[tuple[str, str], ...] = (
    (
        "wall used",
        "the least of the last observation and every earlier one of the present history: metal does not grow",
    ),
    (
        "long-term, short-term rate",
        "loss per year since the first observation of the present history; since the one before last",
    ),
    (
        "planning rate",
        "the rate used for life, interval and projection; never below the owner's floor",
    ),
    (
        "least measurable rate",
        "the smallest loss rate that two readings can show, given their error and span",
    ),
    (
        "required thickness",
        (
            "the least wall that holds the current MAWP plus static head, or the structural, external-"
            "pressure or axial-load minimum, the largest"
        ),
    ),
    (
        "current MAWP",
        "what the vessel may carry today: nameplate, or the re-rated value in force",
    ),
    (
        "MAWP today",
        "what the wall on the as-of date may carry at the top of the vessel",
    ),
    (
        "carry-to date",
        (
            "the day up to which the wall must carry the pressure: the next survey certain to be made, else "
            "the due date"
        ),
    ),
    (
        "projected MAWP",
        (
            "what the wall projected to the carry-to date may carry, with the loss factor of the rule set; "
            "never above the greater of nameplate and current MAWP"
        ),
    ),
    (
        "uncapped",
        "the same without that cap",
    ),
    (
        "held by half life",
        (
            "the carry-to date is a half-life date, by which twice the loss uses up exactly what is there; a "
            "margin would say nothing"
        ),
    ),
    (
        "life left, retirement",
        (
            "from the as-of date to the day on which the wall reaches the required thickness at the planning "
            "rate"
        ),
    ),
    (
        "measured parts only, known parts only",
        (
            "some part was never measured, or lacks what its figures need; the figures speak for the others. Where "
            "every part was measured and something else is missing they stand 'without what was not assessed'"
        ),
    ),
    (
        "set by",
        (
            "hoop, axial, end: by pressure, in that direction of stress. structural, external, axial load, given: "
            "by a minimum as given on the register (structural_minimum, required_thickness_external, "
            "required_thickness_axial, required_thickness_given); it is not worked out here and no lower pressure "
            "makes it smaller"
        ),
    ),
    (
        "by pressure alone",
        (
            "said where the wall is below what is required, or comes down to a minimum that is no matter of "
            "pressure: the sentence speaks of the pressure and not of the wall"
        ),
    ),
    (
        "written",
        "a pressure as somebody wrote it, beside the same pressure in the unit printed",
    ),
    (
        "filter and sort",
        (
            "The list may be filtered but not sorted: its blocks have headings of their own, which sorting would "
            "part from their vessels"
        ),
    ),
    (
        "status of a clause",
        (
            "confirmed: the clause or a reproduction was read; secondary: from worked examples or training "
            "papers; from memory: not confirmed; ours: a choice of this project"
        ),
    ),
)
"""The words of the list, in plain English [text]."""

NO_CLAUSE = "no clause: a choice of this project"
"""What stands in place of a clause where there is none [text]."""

ROUNDING = (
    "Each figure is worked out unrounded and rounded once, in the unit printed, to the safe side: what is "
    "required, rates, static head, operating pressure and relief settings up; walls, pressures carried, "
    "margins, life and dates down. A figure equal to one that prints exactly is moved by no digit (a "
    "nudge of 1e-9 of its value). Standings come from the unrounded figures. A year is 365.25 days."
)
"""How figures are rounded [text]."""


def draw(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp, grounds: Grounds) -> None:
    """Draw the sheet.

    Parameters
    ----------
    book : Workbook
        The workbook [-].
    appraisal : AppraisalLike
        The appraisal [-].
    figures : Figures
        How figures are printed [-].
    stamp : Stamp
        What stands on every printed page [-].
    grounds : Grounds
        Settings, rules and program version [-].
    """
    page = Page(book, "How to read", stamp)
    page.title("How to read", words.CAUTION)
    page.heads(
        [
            Column("What", 40),
            Column("What it says", 78),
            Column("Clause", 30),
            Column("Standard or rule set, edition", 40),
            Column("Status", 12),
        ]
    )
    _standings(page)
    _section(page, "Words", WORDS)
    _section(page, "Rounding", [("to the safe side", ROUNDING)])
    _formulas(page, cite.formulas_of(appraisal.views()))
    _rules(page, grounds)
    _section(page, "Settings", [(what, counted(says)) for what, says in grounds.settings])
    record = [
        ("as of", appraisal.as_of.isoformat()),
        ("the list ends on", appraisal.list_end_on.isoformat()),
        ("journal entry", str(appraisal.journal_no)),
        ("journal head", appraisal.journal_head),
        (
            "which head that is",
            "the head of the record from which this list was read; what is recorded later has another",
        ),
        ("units", figures.display.name),
        ("program version", grounds.program_version or "not told"),
        ("this file", "drawn from the record; writing it again from the same record gives the same bytes"),
    ]
    _section(page, "The record", record)
    page.finish()


def counted(amount: str) -> str:
    """Put the unit of a span of time into singular or plural.

    Parameters
    ----------
    amount : str
        A number and its unit [text].

    Returns
    -------
    str
        As it was, where the unit is none of time.

    Examples
    --------
    >>> counted("1 years"), counted("10 year"), counted("0.5 year"), counted("0.25 mm")
    ('1 year', '10 years', '0.5 years', '0.25 mm')
    """
    number, _, unit = amount.partition(" ")
    one = unit.removesuffix("s")
    if one not in {"day", "month", "year"}:
        return amount
    return f"{number} {one}" if number == "1" else f"{number} {one}s"


def _standings(page: Page) -> None:
    page.block("Standings, worst first; the rule at the left is as heavy as the news")
    for standing in words.STANDINGS:
        page.line([standing, MEANING[standing], "", "", ""], standing=standing)
    page.block("Other blocks and flags")
    for block in (words.RE_GAUGE, words.IDLE, words.OUT_OF_SERVICE, words.RETIRED):
        page.line([block, MEANING[block], "", "", ""])
    page.line([words.OVERDUE, "an inspection was due before the as-of date", "", "", ""])
    page.line([words.SURVEY_WITHIN_YEAR, "the carry-to date lies within the life of the list", "", "", ""])
    row = page.line([words.RELIEF_ABOVE_NOW, "the one bar of ochre stands beside this sentence", "", "", ""])
    page.sheet.cell(row, page.GUTTER).border = ink.rule(heaviness(words.RATING_HELD))


def _section(page: Page, head: str, pairs: Iterable[tuple[str, str]]) -> None:
    page.block(head)
    told = False
    for what, says in pairs:
        page.line([what, says, "", "", ""])
        told = True
    if not told:
        page.none()


def _formulas(page: Page, names: Sequence[str]) -> None:
    page.block("Formulas that the figures rest on")
    for name in names:
        found = formula.REGISTER.get(name)
        if found is None:
            page.line([name, "not in the register of formulas of this program", "", "", "unknown"])
            continue
        limits = "; ".join(f"{limit.printed} ({limit.status})" for limit in found.limits)
        says = found.printed + (f"   within {limits}" if limits else "")
        page.line([name, says, found.clause, f"{found.standard}, {found.edition}", found.status])
    if not names:
        page.none()


def _rules(page: Page, grounds: Grounds) -> None:
    page.block("Values of the rule sets in use")
    for title, values in (grounds.rules or {}).items():
        for value in values:
            amount = counted(f"{value.value:g}" + ("" if value.unit in {"", "-"} else f" {value.unit}"))
            clause = NO_CLAUSE if value.clause in {"", "-"} else value.clause
            page.line([value.meaning, amount, clause, title, value.status])
    if not grounds.rules:
        page.none("not told")
