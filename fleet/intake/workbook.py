"""Read an XLSX workbook: cells by calamine, and one scan of the sheet's XML for what calamine leaves blank.

Calamine gives empty text for a spreadsheet error and for a formula whose result was not saved; unless the XML
is looked through once more, a broken reading looks like one that was never taken.
"""

from __future__ import annotations

import html
import io
import re
import zipfile
import zlib
from collections.abc import Iterator

from fleet.intake.cells import Cell, Place, Sheet, refusal

_MOST_BYTES = 2**31
_MOST_CELLS = 50_000_000

_TAG = rb"<(?:\w+:)?"
_RELATION = re.compile(_TAG + rb"Relationship\b([^>]*)>")
_SHEET = re.compile(_TAG + rb"sheet\b([^>]*)>")
_ROW_NO = re.compile(rb"""row\b[^>]*?\br=["'](\d+)["']""")
_FAR_COLUMN = re.compile(rb"""\br=["']([A-Z]{2,3})\d+["'](?:[^>]*[^>/])?>""")
_ERROR = re.compile(_TAG + rb"""c\b([^>]*\bt=["']e["'][^>]*)>""")
_FORMULA = re.compile(
    _TAG + rb"c\b([^>]*)>\s*" + _TAG + rb"f\b(?:[^>]*/>|[^>]*>[^<]*</(?:\w+:)?f>)"
    rb"\s*(" + _TAG + rb"v\b(?:[^>]*/>|[^>]*>([^<]*)<))?"
)
_FORMULA_TAG = re.compile(_TAG + rb"f[\s/>]")
_FORMULA_MARKS = (b"<f>", b"<f ", b"<f/", b":f>", b":f ", b":f/")
_VALUE = re.compile(_TAG + rb"v\b[^>]*>([^<]*)<")
_MERGED = re.compile(_TAG + rb"""mergeCell\b[^>]*?\bref=["']([A-Z]+)(\d+):([A-Z]+)(\d+)["']""")
_ATTRIBUTE = re.compile(rb"""([\w:]+)\s*=\s*(?:"([^"]*)"|'([^']*)')""")
_CELL_NAME = re.compile(rb"([A-Z]+)(\d+)")
_ROW_OR_CELL = re.compile(_TAG + rb"(row|c)\b([^>]*)>")


def read_workbook(data: bytes, name: str) -> tuple[Sheet, ...]:
    """Read every worksheet of an XLSX workbook.

    Parameters
    ----------
    data : bytes
        The file [-].
    name : str
        Its name, for messages [text].

    Returns
    -------
    tuple of Sheet
        The worksheets in order; chart sheets are left out [-].

    Raises
    ------
    FileRefused
        Where it is no XLSX workbook, is damaged, or reaches over more cells than a survey can have.
    """
    from python_calamine import CalamineError, CalamineWorkbook, SheetTypeEnum

    scans = _scan(data, name)
    sheets = []
    try:
        book = CalamineWorkbook.from_filelike(io.BytesIO(data))
        for about in book.sheets_metadata:
            if about.typ != SheetTypeEnum.WorkSheet:
                continue
            if about.name not in scans:
                raise refusal("not a workbook", name, f"its sheet '{about.name}' cannot be found in it")
            cells = book.get_sheet_by_name(about.name).to_python(skip_empty_area=False)
            rows: list[list[Cell]] = [list(row) for row in cells]
            sheets.append(_sheet(Place(name, about.name), rows, scans[about.name]))
    except (CalamineError, ValueError, OSError) as error:
        raise refusal("not a workbook", name, f"damaged: {error}") from error
    return tuple(sheets)


def _sheet(place: Place, rows: list[list[Cell]], xml: bytes) -> Sheet:
    errors = dict(_error_cells(xml))
    unsaved = frozenset(_unsaved(xml)) - errors.keys()
    at = xml.find(b"mergeCell")
    found = _MERGED.findall(xml, max(at - 64, 0)) if at >= 0 else []
    merged = tuple((int(r1), _column_no(c1), int(r2), _column_no(c2)) for c1, r1, c2, r2 in found)
    last = max((row_no for row_no, _ in (*errors, *unsaved)), default=0)
    rows.extend([] for _ in range(last - len(rows)))
    return Sheet(place, rows, errors, unsaved, merged, typed=True)


# -----------------------------------------------------------------------------------------------------------
# The scan
# -----------------------------------------------------------------------------------------------------------
def _scan(data: bytes, name: str) -> dict[str, bytes]:
    """Give the XML of every worksheet by the sheet's name."""
    try:
        with zipfile.ZipFile(io.BytesIO(data)) as archive:
            names = set(archive.namelist())
            if "xl/workbook.xml" not in names:
                raise refusal("not a workbook", name, "a ZIP file that is no .xlsx workbook")
            if sum(entry.file_size for entry in archive.infolist()) > _MOST_BYTES:
                raise refusal("not a workbook", name, "unpacked it is larger than 2 GB")
            targets = _relations(archive)
            found = {}
            for about in map(_attributes, _SHEET.findall(_plain(archive.read("xl/workbook.xml")))):
                path = targets.get(next((v for k, v in about.items() if k.endswith(":id")), ""), "")
                if path in names:
                    xml = _plain(archive.read(path))
                    _refuse_stray_cells(xml, Place(name, about.get("name", "")))
                    found[about.get("name", "")] = xml
            return found
    except (zipfile.BadZipFile, zlib.error, RuntimeError, NotImplementedError, EOFError, OSError) as error:
        raise refusal("not a workbook", name, f"damaged: {error}") from error


def _relations(archive: zipfile.ZipFile) -> dict[str, str]:
    try:
        xml = _plain(archive.read("xl/_rels/workbook.xml.rels"))
    except KeyError:
        return {}
    found = {}
    for about in map(_attributes, _RELATION.findall(xml)):
        target = about.get("Target", "")
        found[about.get("Id", "")] = target.lstrip("/") if target.startswith("/") else "xl/" + target
    return found


def _plain(xml: bytes) -> bytes:
    return xml.decode("utf-16").encode() if xml[:2] in {b"\xff\xfe", b"\xfe\xff"} else xml


def _attributes(tag: bytes) -> dict[str, str]:
    return {
        key.decode(): html.unescape((double or single).decode("utf-8", "replace"))
        for key, double, single in _ATTRIBUTE.findall(tag)
    }


def _refuse_stray_cells(xml: bytes, place: Place) -> None:
    """Refuse a sheet that one stray cell makes too large to be laid out."""
    last = _ROW_NO.search(xml, max(xml.rfind(b"<row "), xml.rfind(b":row "), 0))
    rows = int(last.group(1)) if last else 0
    columns = max((_column_no(letters) for letters in set(_FAR_COLUMN.findall(xml))), default=26)
    if rows * columns > _MOST_CELLS:
        raise refusal("not a workbook", place.text, f"it reaches over {rows} rows and {columns} columns")


def _error_cells(xml: bytes) -> Iterator[tuple[tuple[int, int], str]]:
    if b't="e"' not in xml and b"t='e'" not in xml:
        return
    for match in _ERROR.finditer(xml):
        value = _VALUE.search(xml, match.end())
        text = value.group(1).decode("utf-8", "replace") if value else ""
        yield _position(xml, match), html.unescape(text) or "an error"


def _unsaved(xml: bytes) -> Iterator[tuple[int, int]]:
    if not any(mark in xml for mark in _FORMULA_MARKS):
        return
    for tag in _FORMULA_TAG.finditer(xml):
        match = _FORMULA.match(xml, xml.rfind(b"<", 0, tag.start()))
        if match is None:
            continue
        _, value, text = match.groups()
        # A text formula may rightly give empty text; it then has a value, an empty one.
        is_empty_text = value is not None and _attributes(match.group(1)).get("t") == "str"
        if not text and not is_empty_text:
            yield _position(xml, match)


def _position(xml: bytes, match: re.Match[bytes]) -> tuple[int, int]:
    """Row and column of a cell; counted where the cell does not name them."""
    name = _CELL_NAME.fullmatch(_attributes(match.group(1)).get("r", "").encode())
    if name:
        return int(name.group(2)), _column_no(name.group(1))
    row_no = column_no = 0
    for tag in _ROW_OR_CELL.finditer(xml, 0, match.end()):
        about = _attributes(tag.group(2))
        if tag.group(1) == b"row":
            row_no, column_no = int(about.get("r", row_no + 1)), 0
        else:
            named = _CELL_NAME.fullmatch(about.get("r", "").encode())
            column_no = _column_no(named.group(1)) if named else column_no + 1
    return row_no, column_no


def _column_no(letters: bytes) -> int:
    number = 0
    for letter in letters:
        number = number * 26 + letter - 64
    return number
