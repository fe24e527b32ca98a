"""Laws of intake: any sheet loads or is refused with place and remedy; row order and units do not matter."""

from __future__ import annotations

import csv
import datetime as dt
import io
import random
import tempfile
from pathlib import Path

import openpyxl
from hypothesis import given, settings
from hypothesis import strategies as st

from fleet import words
from fleet.intake import tables
from fleet.intake.check_readings import read_survey
from fleet.intake.check_register import read_register
from fleet.intake.known import History, KnownLocation, KnownPart, KnownRegister, KnownVessel, Recorded
from fleet.intake.results import Intake

TODAY = dt.date(2025, 1, 1)
KNOWN = KnownRegister(
    vessels={"V-1": KnownVessel(dt.date(2010, 1, 1))},
    parts={("V-1", "shell"): KnownPart("cylinder", 12.7, "overlay", 2.0)},
    locations={("V-1", "shell", str(n)): KnownLocation(9.0, 8.0) for n in range(1, 8)},
)
HISTORY = History(
    {
        ("V-1", "shell", "1"): (Recorded(dt.date(2012, 1, 1), 12.7), Recorded(dt.date(2016, 1, 1), 12.5)),
        ("V-1", "shell", "2"): (Recorded(dt.date(2016, 1, 1), float("nan")),),
    }
)
HEADINGS = [
    column.heading(unit)
    for columns in tables.TABLES.values()
    for column in columns
    for unit in ("mm", "in", "psi", "furlong")
]
cells = st.one_of(
    st.none(),
    st.sampled_from(
        ["V-1", "shell", "1", "2024-06-01", "12.1", "0.48", "read", "no echo", "cylinder", "yes", "=1+1"]
    ),
    st.sampled_from(HEADINGS),
    st.text(st.characters(exclude_categories=["Cs", "Cc"]), max_size=6),
    st.floats(allow_nan=False, allow_infinity=False),
    st.integers(-5, 10**6),
    st.booleans(),
    st.dates(dt.date(1901, 1, 1)),
)
headers = st.lists(st.sampled_from(HEADINGS), max_size=8)
sheets = st.tuples(headers, st.lists(st.lists(cells, max_size=8), max_size=6)).map(
    lambda pair: [pair[0], *pair[1]]
)


def check(intake: Intake) -> None:
    """The file loads, or is refused with the place and the remedy of each fault."""
    for notice in (*intake.faults, *intake.doubts):
        assert notice.where.startswith("any.")
        assert notice.remedy
        assert notice.found
        assert notice.kind in {"fault", "doubt"}
        assert notice.code in words.CATALOGUE
    assert intake.refused == bool(intake.faults)
    if intake.refused:
        assert not any(typed.rows for typed in intake.tables)
    for typed in intake.tables:
        for row in typed.rows:
            assert all(row.values[column.field] for column in tables.TABLES[typed.table] if column.required)


def load_both(path: Path) -> None:
    check(read_survey(path, known=KNOWN, history=HISTORY, today=TODAY))
    for park in (False, True):
        survey = read_survey(path, known=KNOWN, history=HISTORY, today=TODAY, park=park)
        register = read_register(
            [path], known=KNOWN, today=TODAY, rule_sets={"api510"}, design_codes={"membrane"}, park=park
        )
        if not park:
            check(survey)
            check(register)


@settings(max_examples=60, deadline=None)
@given(sheets, st.sampled_from(["readings", "parts", "Sheet1"]))
def test_any_workbook_loads_or_is_refused(rows: list[list[object]], title: str) -> None:
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "any.xlsx"
        book = openpyxl.Workbook()
        sheet = book.active
        assert sheet is not None
        sheet.title = title
        for row in rows:
            sheet.append(row)
        book.save(path)
        load_both(path)


@settings(max_examples=60, deadline=None)
@given(sheets, st.sampled_from([",", ";", "\t"]))
def test_any_csv_loads_or_is_refused(rows: list[list[object]], delimiter: str) -> None:
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "any.csv"
        text = io.StringIO()
        csv.writer(text, delimiter=delimiter).writerows(rows)
        path.write_text(text.getvalue(), encoding="utf-8", newline="")
        load_both(path)


@settings(max_examples=100, deadline=None)
@given(st.binary(max_size=300), st.sampled_from([b"", b"PK\x03\x04", b"\xff\xfe", b"vessel,part,location\n"]))
def test_any_bytes_load_or_are_refused(data: bytes, head: bytes) -> None:
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "any.bin"
        path.write_bytes(head + data)
        load_both(path)


walls = st.integers(min_value=300, max_value=700)  # thousandths of an inch
readings = st.lists(
    st.tuples(st.integers(1, 7), st.dates(dt.date(2017, 1, 1), TODAY), walls),
    min_size=1,
    max_size=12,
    unique_by=lambda one: (one[0], one[1]),
)


def survey(rows: list[tuple[int, dt.date, int]], unit: str) -> tuple[set[object], set[object], list[object]]:
    """Load readings written in a unit; give rows, doubts and thin readings in no order, by what they are about."""
    scale = {"in": 0.001, "mil": 1.0, "mm": 0.0254}[unit]
    lines = [f"vessel,part,location,taken_on,thickness [{unit}]"]
    lines += [f"V-1,shell,{place},{day},{round(wall * scale, 10)}" for place, day, wall in rows]
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "any.csv"
        path.write_text("\n".join(lines), encoding="utf-8")
        intake = read_survey(path, known=KNOWN, history=HISTORY, today=TODAY)
    assert intake.faults == ()
    loaded = intake.rows("readings")
    about = {
        (row.values["location"], row.values["taken_on"], row.values["thickness_mm"], row.query)
        for row in loaded
    }
    doubts = {
        (row.values["location"], row.values["taken_on"], doubt.code) for row in loaded for doubt in row.doubts
    }
    thin = sorted((one["location"], one["taken_on"], one["thickness_mm"]) for one in intake.thin)
    return set(about), set(doubts), list(thin)


@settings(max_examples=50, deadline=None)
@given(readings, st.randoms())
def test_order_of_rows_and_unit_of_the_sheet_do_not_matter(
    rows: list[tuple[int, dt.date, int]], shuffler: random.Random
) -> None:
    first = survey(rows, "in")
    shuffled = list(rows)
    shuffler.shuffle(shuffled)
    assert survey(shuffled, "in") == first
    assert survey(rows, "mil") == first
    assert survey(rows, "mm") == first
