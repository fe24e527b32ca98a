"""Sheet `The year`: a letter that opens with the caution, tells the story and adds up the blocks."""

from __future__ import annotations

from typing import TYPE_CHECKING

from fleet import words
from fleet.reports.figures import Figures
from fleet.reports.source import AppraisalLike, heaviness, reconciled
from fleet.reports.story import story
from fleet.reports.workbook import ink
from fleet.reports.workbook.page import Page, Stamp

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

MEANING: dict[str, str] = {
    **words.STANDING_MEANING,
    words.RE_GAUGE: "the short-term rate governs by less than the reading error can tell; gauge again first",
    words.IDLE: "idle, protected or not; the days ahead all count",
    words.OUT_OF_SERVICE: "out of service",
    words.RETIRED: "retired; kept on the list so that it adds up",
}
"""What each block of the list says [text]."""
LETTERS = {"prose": 112, "strong": 100}
"""Letters that surely fit on a line of the letter [count]."""


def draw(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
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
    """
    page = Page(book, "The year", stamp)
    sheet = page.sheet
    sheet.column_dimensions["A"].width = 1.6
    sheet.column_dimensions["B"].width = 26
    sheet.column_dimensions["C"].width = 10
    sheet.column_dimensions["D"].width = 82
    page.title("The year")
    _sentence(page, words.CAUTION, "strong")
    page.row += 1
    for sentence in story(appraisal, figures):
        row = _sentence(page, sentence.text, "prose")
        if sentence.relief_above_today:
            sheet.cell(row, page.GUTTER).fill = ink.ochre()
    page.row += 1
    _blocks(page, appraisal)


def _sentence(page: Page, text: str, style: str) -> int:
    return page.sentence(text, style, columns=3, letters=LETTERS[style], height=15.5)


def _blocks(page: Page, appraisal: AppraisalLike) -> None:
    for place, head in enumerate(("Block of the list", "Vessels", "What it says")):
        page.put(page.row, page.FIRST + place, head, ("head tag", "head number", "head")[place])
    page.row += 1
    total = 0
    for block, members in reconciled(appraisal).items():
        total += len(members)
        page.put(page.row, page.FIRST, block, "tag")
        page.put(page.row, page.FIRST + 1, len(members), "cell")
        page.put(page.row, page.FIRST + 2, MEANING[block], "cell")
        if block in words.STANDINGS:
            page.sheet.cell(page.row, page.GUTTER).border = ink.rule(heaviness(block))
        page.row += 1
    page.put(page.row, page.FIRST, "all blocks together", "head tag")
    page.put(page.row, page.FIRST + 1, total, "total").style = "total"
    page.put(page.row, page.FIRST + 2, f"the register holds {appraisal.count}", "head")
