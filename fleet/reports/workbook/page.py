"""One sheet of the workbook: columns declared once, text that never starts a formula, a page that prints."""

from __future__ import annotations

import textwrap
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from itertools import pairwise
from typing import TYPE_CHECKING, Any

from fleet import words
from fleet.reports.figures import NONE, Figure
from fleet.reports.source import heaviness
from fleet.reports.workbook import ink

if TYPE_CHECKING:
    from openpyxl.cell import Cell
    from openpyxl.workbook import Workbook

Value = str | int | float | date | Figure | None
"""What a cell takes; a `Figure` brings its decimals along, None is a blank."""

WIDTH_OF_LETTER = 0.75
"""Width of a letter of a table, in widths of a digit of the default face [-]."""
PADDING = 1.4
"""Room at the sides of a column, in the same measure [-]."""
FULL_PAGE = 150.0
"""Width of A4 landscape between its margins: a narrower page would not be filled, and broken too late [-]."""
LINE_HEIGHT = 9.8
"""Height of a line of a table [point]."""

DANGEROUS = ("=", "+", "-", "@", "\t", "\r")
"""What a spreadsheet program may take for the start of a formula."""


@dataclass(frozen=True)
class Column:
    """One column of a sheet.

    Parameters
    ----------
    head : str
        Its heading, with the unit in brackets [text].
    widest : int
        Characters beyond which its text is broken over lines [count].
    number : bool
        Whether it holds numbers and its heading stands to the right [-].
    group : str
        Heading over this and the following columns; empty to go on with the one before [text].
    least : int
        Characters for which there is always room [count].
    """

    head: str
    widest: int = 14
    number: bool = False
    group: str = ""
    least: int = 0


@dataclass(frozen=True)
class Stamp:
    """What stands on every printed page.

    Parameters
    ----------
    as_of : str
        The as-of date [text].
    journal : str
        Number and hash of the journal head [text].
    """

    as_of: str
    journal: str


class Page:
    """A sheet under construction; rows are added from the top.

    Parameters
    ----------
    book : Workbook
        The workbook [-].
    name : str
        Name of the sheet [text].
    stamp : Stamp
        What stands on every printed page [-].
    """

    GUTTER = 1
    FIRST = 2

    def __init__(self, book: Workbook, name: str, stamp: Stamp) -> None:
        self.sheet: Any = book.create_sheet(name)
        self.row = 1
        self.name = name
        self.columns: Sequence[Column] = ()
        self._wide: list[int] = []
        self._lines: dict[int, list[str]] = {}
        self._head_row = self._first_head_row = self._kept = 0
        self._last_row = 0
        self.sheet.sheet_view.showGridLines = False
        self._print_setup(stamp)

    def _print_setup(self, stamp: Stamp) -> None:
        sheet = self.sheet
        sheet.page_setup.orientation = "landscape"
        sheet.page_setup.paperSize = 9  # A4; fitting to the width serves Letter as well
        sheet.sheet_properties.pageSetUpPr.fitToPage = True
        sheet.page_setup.fitToWidth = 1
        sheet.page_setup.fitToHeight = 0
        margins = sheet.page_margins
        margins.left = margins.right = 0.4
        margins.top, margins.bottom, margins.header, margins.footer = 0.6, 0.7, 0.3, 0.3
        for part, text, size in (
            (sheet.oddHeader.left, f"{self.name}, {stamp.as_of}", 9),
            (sheet.oddHeader.right, words.CAUTION, 7),
            (sheet.oddFooter.left, f"Journal head {stamp.journal}", 7),
        ):
            part.text = _plain(text)
            part.font, part.size, part.color = ink.FACE, size, ink.INK[2:]
        sheet.oddFooter.right.text = "page &P of &N"
        sheet.oddFooter.right.font, sheet.oddFooter.right.size = ink.FACE, 7

    def title(self, text: str, *notes: str) -> None:
        """Set the title of the sheet and a note or two beneath it.

        Parameters
        ----------
        text : str
            The title [text].
        *notes : str
            The notes [text].
        """
        self.put(self.row, self.FIRST, text, "title")
        self.sheet.row_dimensions[self.row].height = 25
        self.row += 1
        for note in notes:
            self.put(self.row, self.FIRST, note, "note")
            self.row += 1

    def heads(self, columns: Sequence[Column], *, freeze: int = 1) -> None:
        """Set the headings, freeze them with the first columns, and repeat them on every printed page.

        Parameters
        ----------
        columns : sequence of Column
            The columns [-].
        freeze : int
            Columns at the left that stay in sight [count].
        """
        from openpyxl.utils import get_column_letter

        self.columns = columns
        self._wide = [
            max(column.least, *(len(word) + 1 for word in column.head.split())) for column in columns
        ]
        self._first_head_row, self._kept = self.row, freeze
        if any(column.group for column in columns):
            for number, column in enumerate(columns, self.FIRST):
                self.put(self.row, number, column.group or None, "group")
            self.row += 1
        for number, column in enumerate(columns, self.FIRST):
            style = "head number" if column.number else "head tag" if number == self.FIRST else "head"
            self.put(self.row, number, column.head, style)
        self._head_row = self._last_row = self.row
        self._lines[self.row] = [column.head for column in columns]
        self.sheet.freeze_panes = self.sheet.cell(self.row + 1, self.FIRST + freeze)
        self.sheet.print_title_rows = f"{self._first_head_row}:{self.row}"
        self.sheet.print_title_cols = f"A:{get_column_letter(self.FIRST + freeze - 1)}"
        self.row += 1

    def line(self, values: Sequence[Value], *, standing: str | None = None) -> int:
        """Set one row of the table.

        Parameters
        ----------
        values : sequence of Value
            One per column [-].
        standing : str, optional
            The standing whose rule stands at the left [text].

        Returns
        -------
        int
            Number of the row [count].
        """
        self._lines[self.row] = [value if isinstance(value, str) else "" for value in values]
        for place, (value, column) in enumerate(zip(values, self.columns, strict=True)):
            style = "cell right" if column.number else "tag" if place == 0 else "cell"
            self.put(self.row, place + self.FIRST, value, style)
            self._wide[place] = max(self._wide[place], min(column.widest, _longest(value, column.widest)))
        if standing is not None:
            self.sheet.cell(self.row, self.GUTTER).border = ink.rule(heaviness(standing))
        self._last_row = self.row
        self.row += 1
        return self.row - 1

    def block(self, text: str, *, aside: int = 0) -> None:
        """Set the heading of a block.

        Parameters
        ----------
        text : str
            The heading [text].
        aside : int
            Columns by which it stands further in, beside those that are repeated on a second page [count].
        """
        self.sheet.row_dimensions[self.row].height = 20
        self.put(self.row, self.FIRST + aside, text, "block")
        self._last_row = self.row
        self.row += 1

    def sentence(self, text: str, style: str, *, columns: int, letters: int, height: float = 12.5) -> int:
        """Set a sentence across several columns; merged cells do not grow, so the lines are counted.

        Parameters
        ----------
        text : str
            The sentence [text].
        style : str
            Its style [text].
        columns : int
            Columns it runs across [count].
        letters : int
            Letters that surely fit on a line [count].
        height : float
            Height of a line, in points [-].

        Returns
        -------
        int
            Number of the row [count].
        """
        row = self.row
        self.put(row, self.FIRST, text, style)
        self.sheet.merge_cells(
            start_row=row, end_row=row, start_column=self.FIRST, end_column=self.FIRST + columns - 1
        )
        lines = len(textwrap.wrap(text, letters)) or 1
        self.sheet.row_dimensions[row].height = min(height * lines + 3, 409)  # the most that Excel allows
        self.row += 1
        return row

    def none(self, text: str = "none") -> None:
        """Say that there is nothing to list.

        Parameters
        ----------
        text : str
            How it is said [text].
        """
        self.put(self.row, self.FIRST, text, "note")
        self._last_row = self.row
        self.row += 1

    def finish(self, *, breaks_before: Sequence[str] = (), elastic: Sequence[str] = ()) -> None:
        """Set filter, widths and heights once every row of the table is there.

        Parameters
        ----------
        breaks_before : sequence of str
            Headings of the columns with which the second and further printed pages begin [text].
        elastic : sequence of str
            Headings of the columns, one on each page, that take up the differences in width [text].
        """
        from openpyxl.utils import get_column_letter

        heads = [column.head for column in self.columns]
        widths = [letters * WIDTH_OF_LETTER + PADDING for letters in self._wide]
        widths[0] += 1  # the tag stands a little in from its rule
        last = get_column_letter(self.FIRST + len(heads) - 1)
        if breaks_before:
            turns = [0, *(heads.index(head) for head in breaks_before), len(heads)]
            _even_out(widths, turns, self._kept, [heads.index(head) for head in elastic])
            self.sheet.page_setup.fitToWidth = len(turns) - 1
            self.sheet.page_setup.pageOrder = "overThenDown"
            # a title would be cut off where its column is repeated; the head of the page names the sheet
            self.sheet.print_area = f"A{self._first_head_row}:{last}{self._last_row}"
        self.sheet.column_dimensions["A"].width = 1.3
        for number, width in enumerate(widths, self.FIRST):
            self.sheet.column_dimensions[get_column_letter(number)].width = round(width, 2)
        for row, texts in self._lines.items():
            self.sheet.row_dimensions[row].height = _height(texts, widths, bold=row == self._head_row)
        self.sheet.auto_filter.ref = f"B{self._head_row}:{last}{self._last_row}"

    def put(self, row: int, column: int, value: Value, style: str) -> Cell:
        """Set one cell; text is always text, whatever it begins with.

        Parameters
        ----------
        row, column : int
            The cell [count].
        value : Value
            The value; numbers and dates bring their own style along [-].
        style : str
            Style of text and blanks [text].

        Returns
        -------
        Cell
        """
        cell: Cell = self.sheet.cell(row, column)
        if isinstance(value, Figure):
            style = style if value.value is None else ink.number_style(value.decimals)
            value = NONE if value.value is None else value.value
        elif isinstance(value, date):
            style = "date"
        elif isinstance(value, int):
            style = ink.number_style(0)
        cell.style = style
        if isinstance(value, str):
            _write_text(cell, value)
        else:
            cell.value = value
        return cell


def _write_text(cell: Any, text: str) -> None:
    from openpyxl.cell.cell import ILLEGAL_CHARACTERS_RE

    cell.value = ILLEGAL_CHARACTERS_RE.sub("\ufffd", text)
    cell.data_type = "s"  # openpyxl takes a leading '=' for a formula and '#N/A' for an error
    if text.startswith(DANGEROUS):
        cell.quotePrefix = True


def _even_out(widths: list[float], turns: Sequence[int], kept: int, elastic: Sequence[int]) -> None:
    """Make the printed pages equally wide, the first by a hair the widest, so that each is broken at its turn."""
    repeated = sum(widths[:kept])
    pages = [(repeated if start else 0) + sum(widths[start:end]) for start, end in pairwise(turns)]
    widest = max(*pages, FULL_PAGE) + 0.3 * len(pages)
    for number, (page, column) in enumerate(zip(pages, elastic, strict=True)):
        widths[column] += widest - 0.3 * number - page


def _height(texts: Sequence[str], widths: Sequence[float], *, bold: bool) -> float:
    """Count the lines of the tallest cell: Excel does not do so before somebody touches the row."""
    face = WIDTH_OF_LETTER * (1.08 if bold else 1.0)
    lines = max(
        sum(
            len(textwrap.wrap(line, _room(width, face), break_on_hyphens=False)) or 1
            for line in text.split("\n")
        )
        for text, width in zip(texts, widths, strict=True)
    )
    return min(lines * LINE_HEIGHT + 3, 409)  # the most that Excel allows


def _room(width: float, face: float) -> int:
    """Letters that surely fit on a line of a column."""
    return max(int((width - 0.5) / face), 1)


def _plain(text: str) -> str:
    """Keep a header or footer from reading an ampersand as a command."""
    return text.replace("&", "&&")


def _longest(value: Value, widest: int) -> int:
    if isinstance(value, date):
        return 11  # digits are wider than letters
    text = "" if value is None else str(value)
    longest_line = max((len(line) for line in text.split("\n")), default=0)
    longest_word = max((len(word) for word in text.split()), default=0)
    return max(min(longest_line, widest), min(longest_word, 40))
