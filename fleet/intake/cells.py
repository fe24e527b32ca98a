"""What a sheet is made of: its cells, the place of each, and what a cell says."""

from __future__ import annotations

import datetime as dt
from dataclasses import dataclass, field

from fleet import errors, words

Cell = str | float | int | bool | dt.date | dt.datetime | dt.time | dt.timedelta | None
"""What a cell can hold; blank is None or text without a letter."""

_SPACES = dict.fromkeys(map(ord, "\u00a0\u2007\u202f\t\r\n\x0b\x0c"), " ") | dict.fromkeys(
    map(ord, "\u200b\ufeff"), ""
)


@dataclass(frozen=True)
class Place:
    """Where a sheet stands, and how its cells are named in messages.

    Parameters
    ----------
    file : str
        Name of the file [text].
    sheet : str
        Name of the sheet; empty for CSV [text].
    """

    file: str
    sheet: str = ""

    @property
    def text(self) -> str:
        """The file, and the sheet where there is one."""
        return f"{self.file}, sheet {self.sheet}" if self.sheet else self.file

    def cell(self, row_no: int, column_no: int) -> str:
        """Name one cell.

        Parameters
        ----------
        row_no, column_no : int
            Its row and column, counted from 1 [count].

        Returns
        -------
        str
            The place, in the one form all messages use [text].

        Examples
        --------
        >>> Place("north.xlsx", "readings").cell(7, 28)
        'north.xlsx, sheet readings, cell AB7'
        """
        return f"{self.text}, cell {letters(column_no)}{row_no}"

    def row(self, row_no: int) -> str:
        """Name one row.

        Parameters
        ----------
        row_no : int
            The row, counted from 1 [count].

        Returns
        -------
        str
            The place [text].

        Examples
        --------
        >>> Place("north.csv").row(7)
        'north.csv, row 7'
        """
        return f"{self.text}, row {row_no}"


@dataclass(frozen=True)
class Sheet:
    """One sheet as it stands in the file.

    Parameters
    ----------
    place : Place
        File and sheet [text].
    rows : list of list
        The cells; the first row is row 1, the first cell is column A; rows may be of unequal length [-].
    errors : dict
        (row, column), counted from 1, to the spreadsheet error the cell holds [text].
    unsaved : frozenset
        (row, column) of formulas whose result was not saved [count].
    merged : tuple
        Merged areas: first row, first column, last row, last column, counted from 1 [count].
    typed : bool
        Whether the file tells numbers from text; CSV does not [-].
    """

    place: Place
    rows: list[list[Cell]]
    errors: dict[tuple[int, int], str] = field(default_factory=dict)
    unsaved: frozenset[tuple[int, int]] = frozenset()
    merged: tuple[tuple[int, int, int, int], ...] = ()
    typed: bool = False


@dataclass(frozen=True)
class Book:
    """One file, read.

    Parameters
    ----------
    file : str
        Its name [text].
    sha256 : str
        The digest of its bytes [text].
    sheets : tuple of Sheet
        Its sheets, in order [-].
    """

    file: str
    sha256: str
    sheets: tuple[Sheet, ...]


def letters(column_no: int) -> str:
    """Give the letters of a column.

    Parameters
    ----------
    column_no : int
        The column, counted from 1 [count].

    Returns
    -------
    str
        Its letters [text].

    Examples
    --------
    >>> letters(1), letters(26), letters(27), letters(703)
    ('A', 'Z', 'AA', 'AAA')
    """
    name = ""
    while column_no > 0:
        column_no, rest = divmod(column_no - 1, 26)
        name = chr(65 + rest) + name
    return name


def clean(text: str) -> str:
    r"""Strip a text, and make every odd space and control character a plain space.

    Parameters
    ----------
    text : str
        The text as it stands [text].

    Returns
    -------
    str
        The text as it is kept [text].

    Examples
    --------
    >>> clean(" north\u00a0 shell\n")
    'north shell'
    """
    if not text.isascii() or not text.isprintable():
        text = text.translate(_SPACES)
        if not text.isprintable():
            text = "".join(letter if letter.isprintable() else " " for letter in text)
    return " ".join(text.split())


def is_blank(cell: Cell) -> bool:
    """Tell whether a cell holds nothing.

    Parameters
    ----------
    cell : Cell
        The cell [-].

    Returns
    -------
    bool
        Whether it is blank [-].

    Examples
    --------
    >>> is_blank("  "), is_blank(0.0)
    (True, False)
    """
    if isinstance(cell, str):
        return not cell or (not "!" <= cell[0] <= "~" and not clean(cell))
    return cell is None


def show(cell: Cell) -> str:
    """Write a cell as text, the way a person sees it.

    Parameters
    ----------
    cell : Cell
        The cell [-].

    Returns
    -------
    str
        Its text; whole numbers without a decimal point, dates as ISO dates [text].

    Examples
    --------
    >>> show(7.0), show("007"), show(True), show(dt.date(2026, 12, 1))
    ('7', '007', 'TRUE', '2026-12-01')
    """
    if cell is None:
        return ""
    if isinstance(cell, str):
        return clean(cell)
    if isinstance(cell, bool):
        return "TRUE" if cell else "FALSE"
    if isinstance(cell, float):
        return str(int(cell)) if cell.is_integer() and abs(cell) < 1e15 else repr(cell)
    if isinstance(cell, dt.datetime):
        return cell.isoformat(sep=" ")
    return str(cell)


def refusal(code: str, where: str, found: str) -> errors.FileRefused:
    """Build the refusal of a whole file from one fault.

    Parameters
    ----------
    code : str
        A fault of the catalogue [text].
    where, found : str
        The file, and what was found [text].

    Returns
    -------
    FileRefused
        The exception, carrying the fault [-].

    Examples
    --------
    >>> refusal("empty file", "north.csv", "0 bytes").faults[0].code
    'empty file'
    """
    fault = words.notice(code, where, found)
    return errors.FileRefused(where, f"{code}: {found}", fault.remedy, faults=(fault,))
