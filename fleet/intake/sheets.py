"""Read a file into raw sheets: every cell with its own type, row and column numbers as the file has them."""

from __future__ import annotations

import csv
import datetime as dt
import hashlib
import io
import re
from dataclasses import dataclass, field
from pathlib import Path

from fleet import errors, words

Cell = str | float | int | bool | dt.date | dt.datetime | dt.time | dt.timedelta | None
"""What a cell can hold; blank is None or text without a letter."""

_BINARY = re.compile(r"[\x00-\x08\x0e-\x1f\x7f]")
_OLD_WORKBOOK = b"\xd0\xcf\x11\xe0"
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


def read_file(path: str | Path) -> Book:
    """Read a workbook or CSV file into raw sheets.

    Parameters
    ----------
    path : str or Path
        The file; what it is, is told from its content and not from its name [text].

    Returns
    -------
    Book
        Its sheets, with at least one cell that is not blank [-].

    Raises
    ------
    Refused
        Where the file cannot be opened.
    FileRefused
        Where it is neither a workbook nor text (`not a workbook`), or holds nothing (`empty file`).
    """
    path = Path(path)
    try:
        data = path.read_bytes()
    except OSError as error:
        reason = error.strerror or type(error).__name__
        raise errors.Refused(
            str(path), f"cannot be read: {reason}", "check the name and the rights"
        ) from error
    name = path.name
    if data[:4] == _OLD_WORKBOOK:
        raise refusal("not a workbook", name, "an old or a password-protected workbook")
    if data[:2] == b"PK":
        from fleet.intake.workbook import read_workbook

        sheets = read_workbook(data, name)
    else:
        sheets = (_read_csv(data, name),)
    if not any(sheet.errors or sheet.unsaved or _holds_something(sheet) for sheet in sheets):
        raise refusal("empty file", name, "no cell holds anything")
    return Book(name, hashlib.sha256(data).hexdigest(), sheets)


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


def _holds_something(sheet: Sheet) -> bool:
    return any(not is_blank(cell) for row in sheet.rows for cell in row)


# -----------------------------------------------------------------------------------------------------------
# CSV
# -----------------------------------------------------------------------------------------------------------
def _read_csv(data: bytes, name: str) -> Sheet:
    text = _decoded(data)
    if text is None or _BINARY.search(text):
        raise refusal("not a workbook", name, "neither a workbook nor text")
    try:
        rows = _split(text, _delimiter(text))
    except csv.Error as error:
        raise refusal("not a workbook", name, f"not readable as CSV: {error}") from error
    return Sheet(Place(name), rows)


def _decoded(data: bytes) -> str | None:
    if data.startswith((b"\xff\xfe", b"\xfe\xff")):
        encodings: tuple[str, ...] = ("utf-16",)
    else:
        encodings = ("utf-8-sig", "cp1252", "latin-1")
    for encoding in encodings:
        try:
            return data.decode(encoding)
        except UnicodeDecodeError:
            continue
    return None


def _split(text: str, delimiter: str) -> list[list[Cell]]:
    return [list(row) for row in csv.reader(io.StringIO(text, newline=""), delimiter=delimiter)]


def _delimiter(text: str) -> str:
    """Choose the mark between cells: the one by which most columns of one row are known."""
    from fleet.intake.headings import known_names

    head = "\n".join(text.splitlines()[:100])
    best, most = ",", 0
    for delimiter in (",", ";", "\t"):
        try:
            rows = _split(head, delimiter)
        except csv.Error:
            continue
        count = max((known_names(row) for row in rows), default=0)
        if count > most:
            best, most = delimiter, count
    return best
