"""Read a file into raw sheets: every cell with its own type, row and column numbers as the file has them."""

from __future__ import annotations

import csv
import hashlib
import io
import re
from pathlib import Path

from fleet import errors
from fleet.intake.cells import Book, Cell, Place, Sheet, is_blank, refusal
from fleet.intake.headings import known_names

_BINARY = re.compile(r"[\x00-\x08\x0e-\x1f\x7f]")
_OLD_WORKBOOK = b"\xd0\xcf\x11\xe0"


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
