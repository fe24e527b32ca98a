"""Raw sheets: encodings, delimiters, workbooks, and the places that messages name."""

from __future__ import annotations

import datetime as dt
import io
import re
import zipfile
from collections.abc import Callable, Sequence
from pathlib import Path

import openpyxl
import pytest
import xlsxwriter

from fleet import errors
from fleet.intake.sheets import read_file

Writer = Callable[[str, Sequence[Sequence[object]]], Path]
TEXT = "vessel,part,location,taken_on,thickness [mm],note\nD-101,shell,007,2024-06-01,12.1,Höhe ½\n"


@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "cp1252", "utf-16"])
def test_csv_in_any_usual_encoding(tmp_path: Path, encoding: str) -> None:
    path = tmp_path / "a.csv"
    path.write_bytes(TEXT.encode(encoding))
    assert read_file(path).sheets[0].rows[1] == ["D-101", "shell", "007", "2024-06-01", "12.1", "Höhe ½"]


@pytest.mark.parametrize("delimiter", [",", ";", "\t"])
def test_csv_with_any_usual_mark_between_cells(tmp_path: Path, delimiter: str) -> None:
    path = tmp_path / "a.csv"
    path.write_text(TEXT.replace(",", delimiter), encoding="utf-8")
    assert read_file(path).sheets[0].rows[0][:3] == ["vessel", "part", "location"]


def test_rows_of_csv_count_as_a_spreadsheet_counts_them(tmp_path: Path) -> None:
    path = tmp_path / "a.csv"
    path.write_text('vessel,note\r\n\r\nD-1,"two\r\nlines"\r\nD-2,\r\n', encoding="utf-8")
    assert [row[:1] for row in read_file(path).sheets[0].rows] == [["vessel"], [], ["D-1"], ["D-2"]]


@pytest.mark.parametrize(
    ("data", "found"),
    [
        (b"\xd0\xcf\x11\xe0rest of an old workbook", "an old or a password-protected workbook"),
        (b"%PDF-1.7\x00\x01", "neither a workbook nor text"),
        (b"PK\x03\x04 broken", "damaged"),
        (b"\xff\xfe\x00", "neither a workbook nor text"),
    ],
)
def test_not_a_workbook(tmp_path: Path, data: bytes, found: str) -> None:
    path = tmp_path / "a.xlsx"
    path.write_bytes(data)
    with pytest.raises(errors.FileRefused, match=found) as caught:
        read_file(path)
    assert [fault.code for fault in caught.value.faults] == ["not a workbook"]


def test_a_zip_that_is_no_workbook(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with zipfile.ZipFile(path, "w") as archive:
        archive.writestr("content.xml", "<a/>")
    with pytest.raises(errors.FileRefused, match=r"no \.xlsx workbook"):
        read_file(path)


@pytest.mark.parametrize("data", [b"", b"\n\n", b" , ,\n", "\ufeff".encode()])
def test_empty_csv(tmp_path: Path, data: bytes) -> None:
    path = tmp_path / "a.csv"
    path.write_bytes(data)
    with pytest.raises(errors.FileRefused, match="empty file"):
        read_file(path)


def test_empty_workbook(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    openpyxl.Workbook().save(path)
    with pytest.raises(errors.FileRefused, match="empty file"):
        read_file(path)


def test_no_such_file(tmp_path: Path) -> None:
    with pytest.raises(errors.Refused, match="cannot be read: No such file"):
        read_file(tmp_path / "a.csv")
    with pytest.raises(errors.Refused, match="cannot be read"):
        read_file(tmp_path)


def test_cells_of_a_workbook_keep_type_and_place(workbook: Writer) -> None:
    path = workbook("any:a.xlsx", [[], [None, "007", 7, dt.date(2024, 6, 1), True]])
    (sheet,) = read_file(path).sheets
    assert sheet.rows[1] == ["", "007", 7.0, dt.date(2024, 6, 1), True]
    assert sheet.place.cell(2, 2) == "a.xlsx, sheet any, cell B2"
    assert sheet.typed


def test_dates_of_a_workbook_that_counts_from_1904(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    options = {"date_1904": True, "default_date_format": "yyyy-mm-dd"}
    with xlsxwriter.Workbook(str(path), options) as book:
        book.add_worksheet().write_datetime(0, 0, dt.datetime(2024, 6, 1))  # noqa: DTZ001 - sheets know no zones
    assert read_file(path).sheets[0].rows == [[dt.date(2024, 6, 1)]]


def _with_sheet_xml(path: Path, change: Callable[[str], str]) -> None:
    """Rewrite the XML of the first sheet of a workbook."""
    with zipfile.ZipFile(path) as archive:
        parts = {name: archive.read(name) for name in archive.namelist()}
    name = "xl/worksheets/sheet1.xml"
    parts[name] = change(parts[name].decode()).encode()
    with zipfile.ZipFile(path, "w") as archive:
        for part, data in parts.items():
            archive.writestr(part, data)


def test_errors_unsaved_formulas_and_merged_cells_are_found_with_their_addresses(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        sheet = book.add_worksheet("first")
        sheet.write(0, 0, "x")
        sheet.write_formula(4, 1, "=1/0", None, "#DIV/0!")
        sheet.write_formula(4, 2, "=NA()", None, "#N/A")
        sheet.write_formula(6, 27, "=A1", None, "")
        sheet.write_formula(7, 1, "=A1", None, 3)
        sheet.merge_range(2, 0, 2, 3, "title")
    (read,) = read_file(path).sheets
    assert read.errors == {(5, 2): "#DIV/0!", (5, 3): "#N/A"}
    assert read.unsaved == {(7, 28)}
    assert read.merged == ((3, 1, 3, 4),)
    assert len(read.rows) >= 7


def test_an_empty_text_result_is_a_result(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        book.add_worksheet().write_formula(0, 0, '=""', None, "")
        book.worksheets()[0].write(0, 1, "x")
    _with_sheet_xml(path, lambda xml: xml.replace('<c r="A1">', '<c r="A1" t="str">'))
    assert read_file(path).sheets[0].unsaved == frozenset()


def test_cells_without_address_are_counted(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        sheet = book.add_worksheet()
        sheet.write_row(0, 0, [1, 2, 3])
        sheet.write_formula(1, 0, "=1", None, 1)
        sheet.write_formula(1, 1, "=1/0", None, "#DIV/0!")
        sheet.write_formula(1, 2, "=A1", None, "")
    _with_sheet_xml(path, lambda xml: re.sub(r'<c r="[A-Z]+\d+"', "<c", xml))
    (read,) = read_file(path).sheets
    assert read.errors == {(2, 2): "#DIV/0!"}
    assert read.unsaved == {(2, 3)}


def test_a_stray_cell_at_the_end_of_the_sheet_is_refused_not_laid_out(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        book.add_worksheet("far").write(1_048_575, 16_383, "x")
    with pytest.raises(errors.FileRefused, match="reaches over 1048576 rows and 16384 columns"):
        read_file(path)


def test_chart_sheets_are_left_out(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        book.add_worksheet("one").write(0, 0, 1)
        chart = book.add_chart({"type": "line"})
        chart.add_series({"values": "=one!$A$1:$A$2"})
        book.add_chartsheet("chart").set_chart(chart)
    assert [sheet.place.sheet for sheet in read_file(path).sheets] == ["one"]


def test_sheet_names_with_marks_of_xml(tmp_path: Path) -> None:
    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        book.add_worksheet('P&ID <north> "7"'.replace("<", "(").replace(">", ")")).write(0, 0, 1)
    assert read_file(path).sheets[0].place.sheet == 'P&ID (north) "7"'


def test_a_truncated_workbook(tmp_path: Path) -> None:
    buffer = io.BytesIO()
    book = openpyxl.Workbook()
    book.save(buffer)
    path = tmp_path / "a.xlsx"
    path.write_bytes(buffer.getvalue()[:-200])
    with pytest.raises(errors.FileRefused, match="not a workbook"):
        read_file(path)
