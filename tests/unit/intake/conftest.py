"""A small register on record, and ways to write small workbooks."""

from __future__ import annotations

import datetime as dt
import hashlib
from collections.abc import Callable, Sequence
from pathlib import Path

import pytest
import xlsxwriter

from fleet.intake.known import History, KnownLocation, KnownPart, KnownRegister, KnownVessel, Recorded

TODAY = dt.date(2025, 1, 1)
FILES = Path(__file__).parent / "files"

Writer = Callable[[str, Sequence[Sequence[object]]], Path]


@pytest.fixture
def known() -> KnownRegister:
    loaded = hashlib.sha256((FILES / "survey-already-loaded.csv").read_bytes()).hexdigest()
    return KnownRegister(
        vessels={
            "D-101": KnownVessel(dt.date(2010, 5, 1), {"current_mawp_mpa": (1.5,), "state": ("in service",)})
        },
        parts={
            ("D-101", "shell"): KnownPart("cylinder", 12.7),
            ("D-101", "head"): KnownPart("torispherical head", 14.0, "overlay", 3.0, "no"),
        },
        locations={
            ("D-101", "shell", "1"): KnownLocation(8.0, 7.5, 0.25),
            ("D-101", "shell", "2"): KnownLocation(8.0, 7.5, 0.25),
            ("D-101", "shell", "3"): KnownLocation(),
            ("D-101", "head", "1"): KnownLocation(required_thickness_mm=10.0),
        },
        files={loaded: "survey-already-loaded.csv on 2022-06-02"},
    )


@pytest.fixture
def history() -> History:
    return History(
        {
            ("D-101", "shell", "1"): (
                Recorded(dt.date(2012, 6, 1), 12.7),
                Recorded(dt.date(2018, 6, 1), 12.4),
            )
        }
    )


@pytest.fixture
def workbook(tmp_path: Path) -> Writer:
    """Write one sheet of cells to an XLSX file; the sheet takes its name from what stands before the colon."""

    def write(name: str, rows: Sequence[Sequence[object]]) -> Path:
        sheet_name, _, file_name = name.rpartition(":")
        path = tmp_path / (file_name or "book.xlsx")
        with xlsxwriter.Workbook(str(path), {"default_date_format": "yyyy-mm-dd"}) as book:
            sheet = book.add_worksheet(sheet_name or "readings")
            for row_no, row in enumerate(rows):
                for column_no, cell in enumerate(row):
                    if isinstance(cell, dt.date):
                        sheet.write_datetime(row_no, column_no, dt.datetime(cell.year, cell.month, cell.day))  # noqa: DTZ001 - a sheet knows no zones
                    elif cell is not None:
                        sheet.write(row_no, column_no, cell)
        return path

    return write
