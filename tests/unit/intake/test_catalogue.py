"""One small file for every fault and doubt of a file, and the table that lists them."""

from __future__ import annotations

import datetime as dt
import itertools
from dataclasses import dataclass
from pathlib import Path

import openpyxl
import pytest
import xlsxwriter

from fleet import words
from fleet.intake.check_readings import read_survey
from fleet.intake.check_register import read_register
from fleet.intake.known import History, KnownRegister
from fleet.intake.results import Intake

FILES = Path(__file__).parent / "files"
TODAY = dt.date(2025, 1, 1)


@dataclass(frozen=True)
class Example:
    code: str
    file: str
    where: str
    """The place that the message must name."""


EXAMPLES = (
    Example("not a workbook", "survey-not-a-workbook.xlsx", "survey-not-a-workbook.xlsx"),
    Example("empty file", "survey-empty-file.csv", "survey-empty-file.csv"),
    Example("no table found", "survey-no-table-found.csv", "survey-no-table-found.csv"),
    Example("missing column", "survey-missing-column.csv", "survey-missing-column.csv, row 1"),
    Example("missing unit", "survey-missing-unit.csv", "survey-missing-unit.csv, cell E1"),
    Example("unknown unit", "survey-unknown-unit.csv", "survey-unknown-unit.csv, cell E1"),
    Example("absolute pressure", "register-absolute-pressure.csv", "register-absolute-pressure.csv, cell E1"),
    Example("unknown column", "survey-unknown-column.csv", "survey-unknown-column.csv, cell E1"),
    Example("column twice", "survey-column-twice.csv", "survey-column-twice.csv, cell F1"),
    Example("merged header", "survey-merged-header.xlsx", "survey-merged-header.xlsx, sheet readings, cell B1"),
    Example("missing value", "survey-missing-value.csv", "survey-missing-value.csv, cell B2"),
    Example("unreadable number", "survey-unreadable-number.csv", "survey-unreadable-number.csv, cell E2"),
    Example(
        "text in a number column",
        "survey-text-in-a-number-column.csv",
        "survey-text-in-a-number-column.csv, cell E2",
    ),
    Example(
        "number out of range", "register-number-out-of-range.csv", "register-number-out-of-range.csv, cell D2"
    ),
    Example(
        "negative or zero thickness",
        "survey-negative-or-zero-thickness.csv",
        "survey-negative-or-zero-thickness.csv, cell E2",
    ),
    Example("unreadable date", "survey-unreadable-date.csv", "survey-unreadable-date.csv, cell D2"),
    Example("date in the future", "survey-date-in-the-future.csv", "survey-date-in-the-future.csv, cell D2"),
    Example(
        "date before in-service",
        "survey-date-before-in-service.csv",
        "survey-date-before-in-service.csv, cell D2",
    ),
    Example("unknown choice", "survey-unknown-choice.csv", "survey-unknown-choice.csv, cell F2"),
    Example("unknown vessel", "survey-unknown-vessel.csv", "survey-unknown-vessel.csv, cell A2"),
    Example("unknown part", "survey-unknown-part.csv", "survey-unknown-part.csv, cell B2"),
    Example("unknown location", "survey-unknown-location.csv", "survey-unknown-location.csv, cell C2"),
    Example("duplicate reading", "survey-duplicate-reading.csv", "survey-duplicate-reading.csv, cell C2"),
    Example("duplicate row", "register-duplicate-row.csv", "register-duplicate-row.csv, cell B2"),
    Example("error cell", "survey-error-cell.xlsx", "survey-error-cell.xlsx, sheet readings, cell E2"),
    Example(
        "formula without value",
        "survey-formula-without-value.xlsx",
        "survey-formula-without-value.xlsx, sheet readings, cell E2",
    ),
    Example(
        "thickness and no reading",
        "survey-thickness-and-no-reading.csv",
        "survey-thickness-and-no-reading.csv, cell E2",
    ),
    Example(
        "thickness or result missing",
        "survey-thickness-or-result-missing.csv",
        "survey-thickness-or-result-missing.csv, cell E2",
    ),
    Example(
        "name turned into a date",
        "survey-name-turned-into-a-date.xlsx",
        "survey-name-turned-into-a-date.xlsx, sheet readings, cell C2",
    ),
    Example(
        "average below thickness",
        "survey-average-below-thickness.csv",
        "survey-average-below-thickness.csv, cell F2",
    ),
    Example("unknown rule set", "register-unknown-rule-set.csv", "register-unknown-rule-set.csv, cell B2"),
    Example("unknown design code", "register-unknown-design-code.csv", "register-unknown-design-code.csv, cell C2"),
    Example(
        "differs from the record",
        "register-differs-from-the-record.csv",
        "register-differs-from-the-record.csv, cell F2",
    ),
    Example(
        "thickness far above nominal",
        "survey-thickness-far-above-nominal.csv",
        "survey-thickness-far-above-nominal.csv, cell E2",
    ),
    Example("suspected unit slip", "survey-suspected-unit-slip.csv", "survey-suspected-unit-slip.csv, cell E2"),
    Example("apparent gain", "survey-apparent-gain.csv", "survey-apparent-gain.csv, cell E2"),
    Example("large loss", "survey-large-loss.csv", "survey-large-loss.csv, cell E2"),
    Example("does not apply", "register-does-not-apply.csv", "register-does-not-apply.csv, cell D2"),
    Example("nameplate blank", "register-nameplate-blank.csv", "register-nameplate-blank.csv, cell E2"),
    Example("written as text", "survey-written-as-text.xlsx", "survey-written-as-text.xlsx, sheet readings, cell E2"),
    Example("already loaded", "survey-already-loaded.csv", "survey-already-loaded.csv"),
    Example("already on record", "survey-already-on-record.csv", "survey-already-on-record.csv, cell E2"),
    Example("sheet not taken", "survey-sheet-not-taken.xlsx", "survey-sheet-not-taken.xlsx, sheet vessels"),
    Example(
        "baseline incomplete", "register-baseline-incomplete.csv", "register-baseline-incomplete.csv, row 2"
    ),
)  # fmt: skip

HEADINGS = ("vessel", "part", "location", "taken_on", "thickness [mm]", "result")
DAY = dt.datetime(2024, 6, 1)  # noqa: DTZ001 - a sheet knows no zones


def _write_workbook(path: Path) -> None:
    """Write the examples that only a workbook can hold."""
    if path.stem == "survey-formula-without-value":
        book = openpyxl.Workbook()
        sheet = book.active
        assert sheet is not None
        sheet.title = "readings"
        sheet.append(HEADINGS)
        sheet.append(["D-101", "shell", "1", DAY, "=24.2/2", "read"])
        book.save(path)
        return
    with xlsxwriter.Workbook(str(path), {"default_date_format": "yyyy-mm-dd"}) as written:
        page = written.add_worksheet("readings")
        page.write_row(0, 0, HEADINGS)
        page.write_row(1, 0, ("D-101", "shell", "1"))
        page.write_datetime(1, 3, DAY)
        page.write_number(1, 4, 12.1)
        match path.stem:
            case "survey-merged-header":
                page.merge_range(0, 1, 0, 2, "part")
            case "survey-error-cell":
                page.write_formula(1, 4, "=1/0", None, "#DIV/0!")
            case "survey-name-turned-into-a-date":
                page.write_datetime(1, 2, DAY)
            case "survey-written-as-text":
                page.write_string(1, 4, "12.1")
            case "survey-sheet-not-taken":
                written.add_worksheet("vessels").write_row(
                    0, 0, ("vessel", "rules", "design_code", "in_service_on", "nameplate_mawp [psi]")
                )
            case _:
                raise AssertionError(path)


def load(example: Example, folder: Path, known: KnownRegister, history: History) -> Intake:
    path = FILES / example.file
    if not path.exists():
        path = folder / example.file
        _write_workbook(path)
    if example.file.startswith("survey"):
        return read_survey(path, known=known, history=history, today=TODAY)
    return read_register(
        [path], known=known, today=TODAY, rule_sets={"api510"}, design_codes={"asme8-1", "membrane"}
    )


def codes_of_files() -> list[str]:
    doubts = itertools.takewhile(lambda code: code != "queried low reading governs", words.DOUBTS)
    return [*words.FAULTS, *doubts]


def test_every_code_of_a_file_has_one_example() -> None:
    assert sorted(example.code for example in EXAMPLES) == sorted(codes_of_files())


def test_no_example_file_lies_about_unused() -> None:
    used = {example.file for example in EXAMPLES} | {"survey-good.csv"}
    assert {path.name for path in FILES.iterdir()} <= used


@pytest.mark.parametrize("example", EXAMPLES, ids=lambda example: example.code)
def test_example_raises_its_code_at_its_place(
    example: Example, tmp_path: Path, known: KnownRegister, history: History
) -> None:
    intake = load(example, tmp_path, known, history)
    is_fault = example.code in words.FAULTS
    notices = intake.faults if is_fault else intake.doubts
    assert (example.code, example.where) in [(one.code, one.where) for one in notices]
    assert all(one.found and one.remedy for one in (*intake.faults, *intake.doubts))
    assert intake.refused == bool(intake.faults)
    assert not is_fault or not any(typed.rows for typed in intake.tables)


@pytest.mark.parametrize("example", EXAMPLES, ids=lambda example: example.code)
def test_example_raises_hardly_anything_else(
    example: Example, tmp_path: Path, known: KnownRegister, history: History
) -> None:
    also = {
        "merged header": {"missing column"},  # the second of the merged headings is lost
        "suspected unit slip": {"large loss"},  # as written, it is one
    }
    intake = load(example, tmp_path, known, history)
    codes = {one.code for one in (*intake.faults, *intake.doubts)}
    assert codes - {example.code} <= also.get(example.code, set())


def test_a_good_file_raises_nothing(known: KnownRegister, history: History) -> None:
    intake = read_survey(FILES / "survey-good.csv", known=known, history=history, today=TODAY)
    assert (intake.faults, intake.doubts, intake.thin) == ((), (), ())
    first, second = intake.rows("readings")
    assert first.values == {
        "vessel": "D-101",
        "part": "shell",
        "location": "1",
        "taken_on": dt.date(2024, 6, 1),
        "thickness_mm": 12.1,
        "result": "read",
    }
    assert first.written == {"thickness": "12.1 mm"}
    assert (first.row_no, first.where) == (2, "survey-good.csv, row 2")
    assert second.values["thickness_mm"] is None
    assert second.values["result"] == "no echo"
    assert second.written == {}
