"""The yearly list as a workbook, read back cell by cell."""

from __future__ import annotations

import os
import zipfile
from collections.abc import Callable, Iterator
from dataclasses import replace
from datetime import date
from io import BytesIO
from pathlib import Path
from typing import Any

import openpyxl
import pytest

import fleet.mechanics.rating  # noqa: F401 the register of formulas is filled by its import
from fleet import units, words
from fleet.appraisal.views import PartView, ReliefView, VesselView, WaysOut
from fleet.errors import OurFault, Refused, UsageProblem
from fleet.reports.figures import NONE, Figures
from fleet.reports.source import AppraisalLike
from fleet.reports.workbook import write_derating
from fleet.reports.workbook.ink import OCHRE
from fleet.reports.workbook.package import workbook_bytes
from fleet.reports.workbook.page import DANGEROUS
from fleet.reports.workbook.shortlists import is_running_out
from fleet.reports.workbook.timetable import rows, year_heads
from fleet.rules import load_rule_set
from fleet.words import notice

SHEETS = [
    "The year",
    "The list",
    "Timetable",
    "Running out",
    "Re-gauge",
    "What each figure rests on",
    "Doubts",
    "Gaps",
    "How to read",
]
Maker = Callable[..., VesselView]
Many = Callable[..., AppraisalLike]


def _read(appraisal: AppraisalLike, **options: Any) -> Any:
    return openpyxl.load_workbook(BytesIO(workbook_bytes(appraisal, **options)))


@pytest.fixture(scope="module")
def book(appraisal: AppraisalLike) -> Any:
    """The workbook of the invented fleet, drawn once and only read."""
    return _read(appraisal)


def _cells(book: Any) -> Iterator[Any]:
    for sheet in book.worksheets:
        for row in sheet.iter_rows():
            yield from row


def _head_row(sheet: Any) -> int:
    return next(row for row in range(1, 12) if sheet.cell(row, 2).value in {"Vessel", "What"})


def _rows(sheet: Any) -> list[dict[str, Any]]:
    """Give the rows of a table by heading: those that have something in the first and the second column."""
    head = _head_row(sheet)
    heads = [cell.value for cell in sheet[head]][1:]
    return [
        dict(zip(heads, [cell.value for cell in line][1:], strict=True))
        for line in sheet.iter_rows(min_row=head + 1)
        if line[1].value is not None and line[2].value is not None
    ]


def test_the_sheets_bear_the_names_of_the_contract(book: Any) -> None:
    assert book.sheetnames == SHEETS


def test_every_vessel_is_on_the_list_exactly_once_beneath_its_block(
    appraisal: AppraisalLike, book: Any
) -> None:
    sheet = book["The list"]
    block, found = "", []
    for line in sheet.iter_rows(min_row=_head_row(sheet) + 1):
        tag, beside = line[1].value, line[2].value
        if tag is None:
            block = beside.partition(":")[0]
        else:
            found.append((tag, beside))
            assert beside == block
    assert sorted(found) == sorted((view.vessel, view.block) for view in appraisal.views())


def test_empty_blocks_are_named(book: Any) -> None:
    sheet = book["The list"]
    heads = [line[2].value for line in sheet.iter_rows(min_row=_head_row(sheet) + 1) if line[1].value is None]
    assert [head.partition(":")[0] for head in heads] == list(words.BLOCKS)
    assert "out of service: none" in heads


def test_the_year_adds_up(appraisal: AppraisalLike, book: Any) -> None:
    sheet = book["The year"]
    counts = {row[1].value: row[2].value for row in sheet.iter_rows() if isinstance(row[2].value, int)}
    assert counts.pop("all blocks together") == appraisal.count
    assert tuple(counts) == words.BLOCKS
    assert sum(counts.values()) == appraisal.count
    assert sheet["B2"].value == words.CAUTION


@pytest.mark.parametrize("name", ["si", "us"])
def test_figures_are_numbers_rounded_once_to_the_safe_side(appraisal: AppraisalLike, name: str) -> None:
    figures = Figures(units.display(name))
    pressure, length = figures.unit("pressure"), figures.unit("length")
    listed = {row["Vessel"]: row for row in _rows(_read(appraisal, units=name)["The list"])}
    for view in appraisal.views():
        row = listed[view.vessel]
        assert row[f"Projected MAWP [{pressure}]"] == (figures.carries(view.projected_mawp_mpa).value or NONE)
        assert row[f"MAWP today [{pressure}]"] == (figures.carries(view.mawp_today_mpa).value or NONE)
        if view.relief:
            assert (
                row[f"Relief, lowest set [{pressure}]"]
                == figures.asked(view.relief[0].set_pressure_mpa).value
            )
    assert listed["C-201"][f"Required thickness [{length}]"] == figures.needed(10.121).value
    assert listed["C-201"]["Retirement"].date() == date(2045, 3, 2)


def test_number_formats_keep_the_decimals_of_the_unit(book: Any) -> None:
    sheet = book["The list"]
    head = _head_row(sheet)
    column = next(cell.column for cell in sheet[head] if cell.value == "Projected MAWP [MPa]")
    formats = {
        sheet.cell(row, column).number_format
        for row in range(head + 1, sheet.max_row + 1)
        if isinstance(sheet.cell(row, column).value, float)
    }
    assert formats == {"0.000_)"}


def test_held_by_half_life_stands_instead_of_a_margin(book: Any) -> None:
    listed = {row["Vessel"]: row for row in _rows(book["The list"])}
    assert listed["G-012"]["Margin then [MPa]"] == words.HELD_BY_HALF_LIFE
    assert listed["E-310"]["Margin then [MPa]"] == -0.177
    assert listed["G-012"]["At list's end [MPa]"] == 1.58
    assert listed["E-310"]["At list's end [MPa]"] is None
    assert listed["F-007"]["Parts measured"] == "measured parts only: 1 of 2"


def test_dates_of_known_parts_are_never_printed_as_those_of_the_vessel(
    make_vessel: Maker, make_appraisal: Many
) -> None:
    ways = WaysOut(date(2067, 7, 27), None, date(2109, 5, 15))
    whole = make_vessel("W").parts_known
    made = (
        make_vessel("P", standing=words.NO_VERDICT, parts_total=3, ways_out=ways, life_left_years=7.0),
        make_vessel("Q", standing=words.NO_VERDICT, parts_total=whole, ways_out=ways, life_left_years=7.0),
        make_vessel("W", standing=words.RUNNING_OUT, ways_out=ways),
        make_vessel("X", standing=words.RATING_SHORT, block=words.RETIRED, ways_out=ways),
    )
    book = _read(make_appraisal(made))
    listed = {row["Vessel"]: row for row in _rows(book["The list"])}
    dates = ("Dates speak for", "Current MAWP holds until", "Repair or renew by")
    assert [listed["P"][head] for head in dates] == [
        "measured parts only: 2 of 3",
        "known parts only, 2 of 3: 2067-07-27",
        "known parts only, 2 of 3: 2109-05-15",
    ]
    assert [listed["Q"][head] for head in dates] == [
        "without what was not assessed",
        "without what was not assessed: 2067-07-27",
        "without what was not assessed: 2109-05-15",
    ]
    assert listed["W"]["Dates speak for"] in {"", None}
    assert [listed["W"][head].date() for head in dates[1:]] == [date(2067, 7, 27), date(2109, 5, 15)]
    assert [listed["X"][head] for head in dates[1:]] == [None, None]
    heads = [cell.value for cell in book["The list"]["C"]]
    assert "no verdict: 2; pressures, life and dates of what is known only" in heads
    running = {row["Vessel"]: row for row in _rows(book["Running out"])}
    assert running["P"]["Dates speak for"] == "measured parts only: 2 of 3"
    assert running["P"]["Current MAWP holds until"] == "known parts only, 2 of 3: 2035-02-02"


def test_the_list_says_when_the_cap_comes_before_the_interval(
    make_vessel: Maker, make_appraisal: Many
) -> None:
    made = make_appraisal((make_vessel("A", internal_interval_years=3.72), make_vessel("B")))
    listed = {row["Vessel"]: row for row in _rows(_read(made)["The list"])}
    assert listed["A"]["Interval in words"] == (
        "The cap of the rule set, counted from the last look, comes first; "
        "half life allows 3.7 years from the last reading."
    )
    assert listed["B"]["Interval in words"] in {"", None}


def test_margins_are_against_what_the_wall_carries_today(book: Any) -> None:
    row = next(row for row in _rows(book["The list"]) if row["Vessel"] == "D-101")
    assert row["Margin today, operating [MPa]"] == -0.038
    assert row["Margin today, relief [MPa]"] == -0.088


def test_text_of_others_never_starts_a_formula(
    make_vessel: Maker, make_part: Callable[..., PartView], make_appraisal: Many
) -> None:
    evil = [f"{start}cmd|' /C calc'!A0" for start in DANGEROUS] + ["#N/A", "=1+1"]
    made = tuple(
        make_vessel(
            f"{text}{number}",
            service=text,
            sentence=text,
            flags=(text,),
            parts=(make_part(text, material=text),),
            doubts=(notice("apparent gain", text, text, text),),
            gaps=(notice("no rate", text, text, text),),
            relief=(ReliefView(text, 1.6, words.RELIEF_ABOVE_NOW, None),),
        )
        for number, text in enumerate(evil)
    )
    content = workbook_bytes(make_appraisal(made), settings=[("=a", "=b")], program_version="=1")
    seen = 0
    for cell in _cells(openpyxl.load_workbook(BytesIO(content))):
        assert cell.data_type != "f", cell.coordinate
        assert cell.data_type != "e", cell.coordinate
        if isinstance(cell.value, str) and cell.value.startswith(DANGEROUS):
            assert cell.quotePrefix, cell.coordinate
            seen += 1
    assert seen > 50
    with zipfile.ZipFile(BytesIO(content)) as book:
        for name in book.namelist():
            if name.startswith("xl/worksheets/sheet"):
                assert b"<f>" not in book.read(name), name


def test_characters_that_a_workbook_cannot_hold_are_shown_as_such(
    make_vessel: Maker, make_appraisal: Many
) -> None:
    sheet = _read(make_appraisal((make_vessel("V-1", service="a\x07b"),)))["The list"]
    assert _rows(sheet)[0]["Service"] == "a�b"


def test_the_same_record_gives_the_same_bytes(appraisal: AppraisalLike, book: Any) -> None:
    assert workbook_bytes(appraisal) == workbook_bytes(appraisal)
    assert book.properties.created.date() == date(2026, 12, 1)
    assert book.properties.modified.date() == date(2026, 12, 1)


def test_one_ochre_bar_per_relief_sentence_and_no_other_fill(book: Any) -> None:
    filled = [cell for cell in _cells(book) if cell.fill.fill_type is not None]
    assert [(cell.parent.title, cell.fill.start_color.rgb) for cell in filled] == [("The year", OCHRE)]
    beside = book["The year"].cell(filled[0].row, 2).value
    assert words.RELIEF_ABOVE_NOW in beside


def test_every_font_is_of_the_one_ink(book: Any) -> None:
    inks = {cell.font.color.rgb for cell in _cells(book) if cell.value is not None}
    assert inks == {"FF16213A"}


def test_every_page_is_ready_to_print(appraisal: AppraisalLike, book: Any) -> None:
    for sheet in book.worksheets:
        assert sheet.page_setup.orientation == "landscape"
        assert sheet.page_setup.paperSize == 9
        assert sheet.sheet_properties.pageSetUpPr.fitToPage
        assert sheet.page_setup.fitToHeight == 0
        assert words.CAUTION in sheet.oddHeader.right.text
        assert appraisal.journal_head in sheet.oddFooter.left.text
        assert "&P of &N" in sheet.oddFooter.right.text
    for name in SHEETS[1:]:
        sheet = book[name]
        assert sheet.freeze_panes is not None
        assert sheet.print_title_rows is not None
        assert sheet.auto_filter.ref is not None
        assert all(
            sheet.column_dimensions[cell.column_letter].width >= 3 for cell in sheet[_head_row(sheet)][1:]
        )


def test_the_stair_divides_the_years_that_hold_from_those_that_do_not(book: Any) -> None:
    sheet = book["Timetable"]
    head, years = _head_row(sheet), 10
    for row in range(head + 1, sheet.max_row):
        says, current = sheet.cell(row, 3).value, sheet.cell(row, 4).value
        if says is None:
            break
        cells = [sheet.cell(row, 5 + year) for year in range(years + 1)]
        heavy = [
            number
            for number, cell in enumerate(cells)
            if cell.border.left is not None and cell.border.left.style == "thick"
        ]
        if says in {"no figure", "no verdict", "retired"}:
            assert heavy == []
            continue
        first = years if says == "holds" else next(k for k in range(years) if int(says[:4]) == 2027 + k)
        assert heavy == [first]
        assert all(cell.value >= current for cell in cells[:first])
        if "by its wall" not in says:
            assert all(cell.value < current for cell in cells[first:years])


def test_the_stair_never_steps_back(book: Any) -> None:
    sheet = book["Timetable"]
    said = [row["First year short"] for row in _rows(sheet) if row["Current MAWP [MPa]"] is not None]
    steps = [9999 if word == "holds" else int(word[:4]) for word in said if word[:2] not in {"no", "re"}]
    assert steps == sorted(steps)
    assert [word[:2] for word in said][-2:] == ["no", "re"]


def test_beneath_the_timetable_every_vessel_is_named_once_more(appraisal: AppraisalLike, book: Any) -> None:
    sheet = book["Timetable"]
    said = [
        cell.value
        for cell in sheet["B"]
        if cell.value and str(cell.value).startswith(("First short on", "Hold", "No figure", "Retired:"))
    ]
    named = [tag for text in said for tag in text.partition(": ")[2].split(", ") if tag != "none"]
    assert sorted(named) == sorted(view.vessel for view in appraisal.views())


def test_no_verdict_is_never_said_to_hold(make_vessel: Maker, make_appraisal: Many) -> None:
    made = make_appraisal((make_vessel("A", standing=words.NO_VERDICT),), drops={"A": 0.0})
    years = tuple(made.timetable().years)
    assert rows(made.views(), made.timetable())[0].says(years) == words.NO_VERDICT


def test_a_retired_vessel_stands_last_and_outside_the_stair(make_vessel: Maker, make_appraisal: Many) -> None:
    made = make_appraisal(
        (
            make_vessel("A", block=words.RETIRED, standing=words.BELOW_REQUIRED),
            make_vessel("B", standing=words.NO_VERDICT),
            make_vessel("C", rating_holds_until=date(2099, 1, 1)),
        ),
        drops={"A": 0.5, "B": 0.0, "C": 0.0},
    )
    years = tuple(made.timetable().years)
    found = [(row.view.vessel, row.says(years)) for row in rows(made.views(), made.timetable())]
    assert found == [("C", "holds"), ("B", "no verdict"), ("A", "retired")]


def test_a_wall_that_fails_before_its_pressure_is_short_in_that_year(
    make_vessel: Maker, make_appraisal: Many
) -> None:
    made = make_appraisal((make_vessel("A", rating_holds_until=date(2029, 1, 1)),), drops={"A": 0.0})
    years = tuple(made.timetable().years)
    assert rows(made.views(), made.timetable())[0].says(years) == "2029, by its wall"


@pytest.mark.parametrize(
    ("as_of", "says", "head"),
    [
        (date(2026, 12, 1), "on 1 December of each year", "2027 [MPa]"),
        (date(2024, 2, 29), "on the day that heads each column", "2025-02-28 [MPa]"),
    ],
)
def test_the_heading_of_the_timetable_says_the_days_of_its_columns(
    make_vessel: Maker, make_appraisal: Many, as_of: date, says: str, head: str
) -> None:
    made = make_appraisal((make_vessel("A"),), as_of=as_of)
    sheet = _read(made)["Timetable"]
    assert sheet["B2"].value == f"What each wall carries {says} [MPa], capped as on the list."
    assert [cell.value for cell in sheet[_head_row(sheet)]][4] == head


def test_years_that_fall_together_are_told_apart() -> None:
    assert year_heads([date(2028, 1, 1), date(2028, 12, 31)]) == ["2028-01-01", "2028-12-31"]


def test_running_out_is_soonest_first_and_leaves_out_what_holds(book: Any) -> None:
    found = [row["Vessel"] for row in _rows(book["Running out"])]
    assert found == ["D-101", "D-103", "D-102", "G-012"]


def test_the_window_of_running_out(make_vessel: Maker) -> None:
    worse = make_vessel(standing=words.NO_VERDICT, life_left_years=7.9, internal_interval_years=4.0)
    assert is_running_out(worse)
    assert not is_running_out(replace(worse, life_left_years=8.1))
    assert not is_running_out(replace(worse, life_left_years=10.1, internal_interval_years=None))
    assert not is_running_out(replace(worse, standing=words.RATING_HELD))
    assert not is_running_out(replace(worse, block=words.RETIRED))


def test_re_gauge_names_the_points_and_the_day(book: Any) -> None:
    (row,) = _rows(book["Re-gauge"])
    assert (row["Vessel"], row["Part"], row["Location"]) == ("H-044", "shell course 1", "L-02")
    assert row["Gauge by"].date() == date(2027, 6, 1)


def test_a_row_per_location_and_one_for_a_part_without_any(appraisal: AppraisalLike, book: Any) -> None:
    found = _rows(book["What each figure rests on"])
    expected = [
        (view.vessel, part.part, place.location if place else "none laid out")
        for view in appraisal.views()
        for part in view.parts
        for place in part.locations or (None,)
    ]
    assert sorted((row["Vessel"], row["Part"], row["Location"]) for row in found) == sorted(expected)
    assert all("Remaining life" not in head for head in found[0])


def test_doubts_and_gaps_carry_what_to_do(book: Any) -> None:
    assert [(row["Vessel"], row["Code"], row["To do"]) for row in _rows(book["Gaps"])] == [
        ("F-007", "part never measured", "measure it"),
        ("F-007", "no relief device", "load its relief devices"),
    ]
    (doubt,) = _rows(book["Doubts"])
    assert (doubt["Code"], doubt["Found"]) == ("apparent gain", "0.60 mm more than in 2021")


def test_a_status_short_of_confirmed_stands_beside_figure_and_formula(
    make_vessel: Maker, make_part: Callable[..., PartView], make_appraisal: Many
) -> None:
    name = "thick_sphere_thickness_newer"
    made = make_appraisal((make_vessel("B-1", parts=(make_part(formulas=(name,)),)),))
    rules = load_rule_set("api510")
    book = _read(made, rules={f"{rules.title}, {rules.edition}": list(rules.values.values())})
    assert "(from memory)" in _rows(book["The list"])[0]["Required by clause"]
    assert _rows(book["The list"])[0]["By the rules"] == "api510 (secondary)"
    assert "(from memory)" in _rows(book["What each figure rests on"])[0]["Required by clause"]
    read = _rows(book["How to read"])
    formulas = {row["What"]: row["Status"] for row in read if row["What"].startswith("thick_sphere")}
    assert formulas == {name: "from memory", name.replace("thickness", "pressure"): "from memory"}
    loss = next(row for row in read if row["What"] == rules.values["loss_factor"].meaning)
    assert loss["Status"] == rules.values["loss_factor"].status


def test_how_to_read_tells_the_record(appraisal: AppraisalLike) -> None:
    read = {
        row["What"]: row["What it says"]
        for row in _rows(_read(appraisal, settings=[("rate floor", "0.025 mm/year")])["How to read"])
    }
    assert read["journal head"] == appraisal.journal_head
    assert read["rate floor"] == "0.025 mm/year"
    assert set(words.STANDINGS) <= set(read)
    assert read["program version"]


def test_how_to_read_counts_its_years_and_says_where_no_clause_stands(appraisal: AppraisalLike) -> None:
    sets = {name: load_rule_set(name) for name in ("api510", "choices")}
    rules = {one.title: list(one.values.values()) for one in sets.values()}
    read = _rows(_read(appraisal, rules=rules, settings=[("list life", "1 years")])["How to read"])
    told = {row["What"]: row for row in read}
    assert told[sets["api510"].values["internal_cap_years"].meaning]["What it says"] == "10 years"
    choice = told[sets["choices"].values["list_life_years"].meaning]
    assert (choice["What it says"], choice["Clause"]) == ("1 year", "no clause: a choice of this project")
    assert told["list life"]["What it says"] == "1 year"
    assert "filtered but not sorted" in told["filter and sort"]["What it says"]
    assert "from which this list was read" in told["which head that is"]["What it says"]
    assert "as given on the register (structural_minimum" in told["set by"]["What it says"]


def test_an_empty_register_makes_a_workbook_that_says_none(make_appraisal: Many) -> None:
    book = _read(make_appraisal(()))
    for name in ("Running out", "Re-gauge", "What each figure rests on", "Doubts", "Gaps"):
        assert "none" in [cell.value for cell in book[name]["B"]]


def test_a_list_that_does_not_add_up_is_not_written(
    tmp_path: Path, make_vessel: Maker, make_appraisal: Many
) -> None:
    with pytest.raises(OurFault, match="do not use the list"):
        write_derating(make_appraisal((make_vessel(),), claimed=3), tmp_path / "list.xlsx")
    assert list(tmp_path.iterdir()) == []


def test_the_file_replaces_the_old_one_and_leaves_nothing_beside(
    tmp_path: Path, appraisal: AppraisalLike
) -> None:
    path = tmp_path / "list.xlsx"
    path.write_text("old")
    assert write_derating(appraisal, path) == path
    assert openpyxl.load_workbook(path).sheetnames == SHEETS
    assert [each.name for each in tmp_path.iterdir()] == ["list.xlsx"]


def test_places_where_no_file_can_go_are_refused(tmp_path: Path, appraisal: AppraisalLike) -> None:
    with pytest.raises(Refused, match="there is no folder"):
        write_derating(appraisal, tmp_path / "nowhere" / "list.xlsx")
    with pytest.raises(Refused, match=r"does not end in \.xlsx"):
        write_derating(appraisal, tmp_path / "list.csv")
    (tmp_path / "folder.xlsx").mkdir()
    with pytest.raises(Refused, match="a folder bears that name"):
        write_derating(appraisal, tmp_path / "folder.xlsx")
    with pytest.raises(UsageProblem, match="use si or us"):
        write_derating(appraisal, tmp_path / "list.xlsx", units="metric")


def test_a_locked_file_is_refused_and_the_old_one_stays(
    tmp_path: Path, appraisal: AppraisalLike, monkeypatch: pytest.MonkeyPatch
) -> None:
    path = tmp_path / "list.xlsx"
    path.write_text("old")

    def locked(*_: object) -> None:
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr(os, "replace", locked)
    monkeypatch.setattr(Path, "replace", locked)
    with pytest.raises(Refused, match="cannot be written: Permission denied; close it where it is open"):
        write_derating(appraisal, path)
    assert path.read_text() == "old"
    assert [each.name for each in tmp_path.iterdir()] == ["list.xlsx"]
