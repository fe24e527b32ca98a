"""The story of Brackwater Works, by the installed command: every planted trouble, and the workbook cell by cell.

What is expected stands in sample_data/expected.toml. The record is read with sqlite3, the workbook with openpyxl.
"""

from __future__ import annotations

import json
import re
import shutil
import sqlite3
import subprocess
import tomllib
import zipfile
from collections import Counter
from collections.abc import Callable, Iterator
from datetime import date, datetime
from fractions import Fraction as Q
from functools import cache
from math import ceil, floor
from pathlib import Path
from typing import Any

import openpyxl
import pytest

from fleet import words

WORKS = Path(__file__).parents[2] / "sample_data"
EXPECTED: dict[str, Any] = tomllib.loads((WORKS / "expected.toml").read_text(encoding="utf-8"))
VESSELS = {v["tag"]: v for v in EXPECTED["vessel"]}
AS_OF = ("--as-of", "2026-12-01")
Ask = Callable[..., str]
Json = dict[str, Any]


@pytest.fixture(scope="module")
def ask(brackwater: Path, fleet_command: str) -> Ask:
    """Give a function that puts a question to the command, once for each question."""

    @cache
    def told(*question: str) -> str:
        command = [fleet_command, *question, "--db", str(brackwater / "fleet.db"), *AS_OF]
        return subprocess.run(command, capture_output=True, text=True, check=True).stdout

    return told


@pytest.fixture(scope="module")
def listed(ask: Ask) -> list[Json]:
    found: list[Json] = json.loads(ask("derating", "--json"))
    return found


@pytest.fixture(scope="module")
def by_tag(listed: list[Json]) -> dict[str, Json]:
    return {v["vessel"]: v for v in listed}


@pytest.fixture(scope="module")
def record(brackwater: Path) -> Iterator[sqlite3.Connection]:
    with sqlite3.connect(f"file:{brackwater / 'fleet.db'}?mode=ro", uri=True) as connection:
        yield connection
    connection.close()


@pytest.fixture(scope="module")
def saved(record: sqlite3.Connection) -> list[Json]:
    """Give the appraisal that the demo saved: every vessel with its parts and locations."""
    [text] = record.execute("SELECT document FROM appraisal").fetchone()
    found: list[Json] = json.loads(text)["vessels"]
    return found


@pytest.fixture(scope="module")
def book(brackwater: Path) -> Any:
    return openpyxl.load_workbook(brackwater / "derating.xlsx")


def count(record: sqlite3.Connection, table: str, where: str = "1") -> int:
    return int(record.execute(f"SELECT count(*) FROM {table} WHERE {where}").fetchone()[0])


# ----------------------------------------------------------------------------------------------------
# The demo itself
# ----------------------------------------------------------------------------------------------------
def test_the_demo_takes_less_than_15_seconds(demo_run: Any) -> None:
    print(f"fleet demo: {demo_run.cpu_seconds:.1f} s of one processor")  # noqa: T201 the time is worth reading
    assert demo_run.cpu_seconds < 15


def test_the_demo_prints_caution_story_list_and_sum(demo_run: Any) -> None:
    running = " ".join(demo_run.stdout.split())
    assert words.CAUTION in running
    assert running.index(words.CAUTION) < running.index("On 2026-12-01 the register holds 34 vessels")
    for tag in VESSELS:
        assert re.search(rf"\b{tag}\b", demo_run.stdout), tag
    [terms, total] = re.findall(r"The register holds 34 vessels: (.+?) = (\d+)\.", running)[0]
    assert sum(int(n) for n in re.findall(r"(\d+) [a-z]", terms)) == int(total) == len(VESSELS)
    assert "Brackwater Works, an invented works" in demo_run.stdout


def test_the_record_holds_what_was_handed_in(record: sqlite3.Connection) -> None:
    counts = EXPECTED["counts"]
    tables = {
        "vessels": count(record, "vessel"),
        "parts": count(record, "part"),
        "locations": count(record, "location"),
        "relief": count(record, "relief_device"),
        "survey_files": count(record, "survey"),
        "readings": count(record, "reading", "kind = 'reading'"),
        "restarts": count(record, "restart"),
        "dated_states": count(record, "dated_state"),
    }
    assert tables == {name: counts[name] for name in tables}
    assert 30 <= tables["vessels"] <= 35
    assert tables["parts"] >= 90
    assert tables["locations"] >= 400
    assert tables["readings"] >= 3000
    assert count(record, "inspection") >= counts["inspections"] >= 1
    assert count(record, "decision") >= counts["decisions"] >= 1
    assert tables["restarts"] >= 1
    assert count(record, "journal") >= 10
    assert count(record, "parked_row") == 0
    files = "SELECT name, rows_loaded FROM source_file WHERE kind = 'survey'"
    assert dict(record.execute(files).fetchall()) == EXPECTED["readings_in_file"]


def test_the_files_raise_the_doubts_that_are_expected_and_no_other(record: sqlite3.Connection) -> None:
    found = Counter(
        (where.split(",")[0], code) for where, code in record.execute("SELECT where_text, code FROM doubt")
    )
    meant = {(d["file"].removeprefix("surveys/"), d["code"]): d["count"] for d in EXPECTED["loading_doubt"]}
    assert found == meant


def test_the_journal_is_whole(brackwater: Path, fleet_command: str) -> None:
    command = [fleet_command, "journal", "verify", "--db", str(brackwater / "fleet.db")]
    subprocess.run(command, capture_output=True, check=True)


def test_the_same_question_gets_the_same_bytes(brackwater: Path, fleet_command: str) -> None:
    for question in (["appraise"], ["show", "D-203"]):
        command = [fleet_command, *question, "--db", str(brackwater / "fleet.db"), *AS_OF, "--json"]
        one, two = (subprocess.run(command, capture_output=True, check=True).stdout for _ in range(2))
        assert one == two


def test_the_refused_sheet_is_refused_and_tells_its_thin_reading(
    brackwater: Path, fleet_command: str, tmp_path: Path
) -> None:
    database = tmp_path / "fleet.db"
    shutil.copyfile(brackwater / "fleet.db", database)
    sheet = WORKS / "refused" / "2026-11-20_D-203.csv"
    command = [fleet_command, "survey", "load", str(sheet), "--db", str(database), "--json"]
    done = subprocess.run(command, capture_output=True, text=True, check=False)
    told = json.loads(done.stdout)
    assert (done.returncode, told["loaded"]) == (1, 0)
    assert {"unreadable date", "unknown part", "text in a number column"} == {
        f["code"] for f in told["faults"]
    }
    assert any("11.92" in json.dumps(thin) for thin in told["thin"])
    with sqlite3.connect(database) as copy:
        assert count(copy, "reading", "kind = 'reading'") == EXPECTED["counts"]["readings"]
    copy.close()


# ----------------------------------------------------------------------------------------------------
# Standings, flags, blocks, ways out
# ----------------------------------------------------------------------------------------------------
@pytest.mark.parametrize("tag", VESSELS)
def test_each_vessel_stands_where_it_should(by_tag: dict[str, Json], tag: str) -> None:
    meant, found = VESSELS[tag], by_tag[tag]
    assert found["block"] == meant["block"]
    assert found["standing"] == meant.get("standing", found["standing"])
    if meant["block"] != words.RETIRED:
        assert found["flags"] == meant["flags"]
    if meant["trouble_free"]:
        assert (found["standing"], found["flags"]) == (words.RATING_HELD, [])


def test_every_standing_flag_and_block_occurs(listed: list[Json]) -> None:
    assert {v["standing"] for v in listed} == set(words.STANDINGS)
    assert {flag for v in listed for flag in v["flags"]} >= set(words.FLAGS)
    assert {v["block"] for v in listed} == set(words.BLOCKS)
    assert sum(VESSELS[v["vessel"]]["trouble_free"] for v in listed) >= 12


def test_the_blocks_follow_one_another_worst_first(listed: list[Json]) -> None:
    order = [words.BLOCKS.index(v["block"]) for v in listed]
    assert order == sorted(order)
    assert len({v["vessel"] for v in listed}) == len(listed) == len(VESSELS)


def test_every_way_out_occurs(ask: Ask) -> None:
    page = " ".join(ask("show", "D-112").split())
    for way in ("Look again by 2027-", "Re-rate to 1.870 MPa", "Repair or renew by 2028-"):
        assert way in page
    assert "Re-rate to" not in ask("show", "D-422")  # a structural minimum governs: no lower pressure helps
    assert "Repair or renew" in ask("show", "D-203")


# ----------------------------------------------------------------------------------------------------
# The planted troubles
# ----------------------------------------------------------------------------------------------------
CODED = [t for t in EXPECTED["trouble"] if "code" in t]


def parts_of(told: Json) -> dict[str, Json]:
    return {p["part"]: p for p in told["parts"]}


def spot(ask: Ask, tag: str, part: str, location: str) -> Json:
    told = json.loads(ask("show", tag, "--json"))
    found: Json = next(s for s in parts_of(told)[part]["locations"] if s["location"] == location)
    return found


@pytest.mark.parametrize("trouble", CODED, ids=[t["name"] for t in CODED])
def test_each_trouble_is_told_by_its_word(
    ask: Ask, by_tag: dict[str, Json], book: Any, trouble: Json
) -> None:
    tag, code = trouble["vessel"], trouble["code"]
    told = json.loads(ask("show", tag, "--json"))
    here = [s for p in told["parts"] for s in p["locations"]]
    notices = [
        n for n in told["doubts"] + told["gaps"] + [d for s in here for d in s["doubts"]] if n["code"] == code
    ]
    if code in words.CATALOGUE:
        assert notices, code
        path = [tag, *(trouble[name] for name in ("part", "location") if name in trouble)]
        file = Path(trouble["file"]).name
        assert any(
            n["where"].startswith(f"{file}, ")
            or all(one == other for one, other in zip(n["where"].split(" / "), path, strict=False))
            for n in notices
        ), notices
    elif code == words.HELD_BY_HALF_LIFE:
        assert told["carry_to_on"] == told["internal_due_on"]
        row = next(r for r in rows_of(book, "The list") if r["Vessel"] == tag)
        assert code in " ".join(ask("show", tag).split())
        assert row["Margin then [MPa]"] == code
    elif code == words.RELIEF_ABOVE_NOW:
        assert code in {device["now"] for device in told["relief"]}
    else:
        assert code in {told["standing"], *told["flags"], by_tag[tag]["block"]}
    if code == told["standing"] and "location" in trouble:
        at = {"part": trouble["part"], "location": trouble["location"]}
        assert at in (told["governing_pressure"], told["governing_life"])


def recheck(ask: Ask, record: sqlite3.Connection) -> None:
    found = spot(ask, "D-112", "course 2", "12")
    assert (found["last_on"], found["last_thickness_mm"], found["observations"]) == ("2025-10-28", 19.73, 8)
    assert readings_of(record, "D-112", "course 2", "12") == 9


def doubled_rate(ask: Ask, record: sqlite3.Connection) -> None:
    found = spot(ask, "D-216", "course 1", "05")
    assert found["observations"] == 4  # the one that opens the new history and three after it
    assert found["planning_rate_mm_per_year"] > 2 * 0.12
    assert readings_of(record, "D-216", "course 1", "05") == 7


def replaced_course(ask: Ask, record: sqlite3.Connection) -> None:
    told = json.loads(ask("show", "T-303", "--json"))
    assert {s["observations"] for s in parts_of(told)["course 2"]["locations"]} == {3}
    assert {s["observations"] for s in parts_of(told)["course 1"]["locations"]} == {7}


def clad(ask: Ask, record: sqlite3.Connection) -> None:
    found = spot(ask, "F-141", "course 1", "06")
    ahead = (date(2028, 3, 15) - date.fromisoformat(found["last_on"])).days / 365.25
    metal = found["wall_used_mm"] - 3 - 2 * found["planning_rate_mm_per_year"] * ahead
    assert found["projected_thickness_mm"] == pytest.approx(metal, abs=1e-9)


def derated(ask: Ask, record: sqlite3.Connection) -> None:
    told = json.loads(ask("show", "D-205", "--json"))
    assert (told["current_mawp_mpa"], told["nameplate_mawp_mpa"]) == (1.6, 2.1)
    assert told["projected_mawp_mpa"] <= 2.1


def chosen_rate(ask: Ask, record: sqlite3.Connection) -> None:
    found = spot(ask, "D-205", "course 1", "06")
    assert (found["rate_basis"], found["planning_rate_mm_per_year"]) == ("chosen", 0.16)


def idle_years(ask: Ask, record: sqlite3.Connection) -> None:
    found = spot(ask, "D-215", "course 1", "05")
    where = "vessel.tag = 'D-215' AND entity.tag = '05'"
    walls = record.execute(
        f"SELECT taken_on, thickness_mm FROM {READINGS} WHERE {where} ORDER BY 1"
    ).fetchall()
    days = (date.fromisoformat(walls[-1][0]) - date.fromisoformat(walls[0][0])).days
    days -= (date(2020, 11, 1) - date(2016, 11, 1)).days
    assert found["long_term_rate_mm_per_year"] == pytest.approx(
        (walls[0][1] - walls[-1][1]) / (days / 365.25)
    )


def external_minimum(ask: Ask, record: sqlite3.Connection) -> None:
    part = parts_of(json.loads(ask("show", "H-221S", "--json")))["course 1"]
    assert (part["required_by"], part["required_thickness_mm"]) == ("external", 11.0)


def on_stream(ask: Ask, record: sqlite3.Connection) -> None:
    told = json.loads(ask("show", "T-152", "--json"))
    assert told["internal_due_on"] == "2033-09-18"  # ten years of 365.25 days after 2023-09-19
    assert told["flags"] == []


def deferral(ask: Ask, record: sqlite3.Connection) -> None:
    told = json.loads(ask("show", "R-411", "--json"))
    assert told["internal_due_on"] == "2027-03-31"
    assert "overdue" not in told["flags"]


def inches(ask: Ask, record: sqlite3.Connection) -> None:
    assert first_wall(record, "D-313", "2011-06-16_nitrate.csv", "in") > 5


def thou(ask: Ask, record: sqlite3.Connection) -> None:
    assert first_wall(record, "B-501", "2013-04-18_storage.csv", "thou") > 20


def title_rows(ask: Ask, record: sqlite3.Connection) -> None:
    loaded = "SELECT rows_loaded FROM source_file WHERE name = '2012-09-20_utilities.xlsx'"
    assert record.execute(loaded).fetchone() == (119,)


READINGS = (
    "reading JOIN entity ON entity.id = reading.location_id JOIN entity part ON part.id = entity.parent_id "
    "JOIN entity vessel ON vessel.id = part.parent_id"
)
UNCODED: dict[str, Callable[[Ask, sqlite3.Connection], None]] = {
    "re-check within ninety days": recheck,
    "rate doubled after a change of service": doubled_rate,
    "course replaced mid-history": replaced_course,
    "clad vessel": clad,
    "derated years ago": derated,
    "chosen rate": chosen_rate,
    "idle and protected for four years": idle_years,
    "vacuum vessel with its external minimum": external_minimum,
    "on-stream inspection accepted in place of internal": on_stream,
    "deferral in force": deferral,
    "sheet in inches": inches,
    "sheet in thousandths of an inch": thou,
    "title and blank rows above the table": title_rows,
}


def readings_of(record: sqlite3.Connection, tag: str, part: str, location: str) -> int:
    where = f"vessel.tag = '{tag}' AND part.tag = '{part}' AND entity.tag = '{location}'"
    return count(record, READINGS, where)


def first_wall(record: sqlite3.Connection, tag: str, file: str, unit: str) -> float:
    """See that the first wall of a vessel in a file is kept as written and understood; give it in mm."""
    found = record.execute(
        f"SELECT reading.thickness_mm, reading.written FROM {READINGS} JOIN survey ON survey.id = survey_id "
        "JOIN source_file ON source_file.id = survey.source_file_id WHERE vessel.tag = ? AND source_file.name = ?",
        (tag, file),
    ).fetchone()
    number, written_unit = json.loads(found[1])["thickness"].rsplit(" ", 1)
    assert written_unit == unit
    assert found[0] == pytest.approx(float(number) * {"in": 25.4, "thou": 0.0254}[unit])
    return float(found[0])


@pytest.mark.parametrize("name", UNCODED)
def test_each_trouble_without_a_word_shows_in_the_figures(
    ask: Ask, record: sqlite3.Connection, name: str
) -> None:
    UNCODED[name](ask, record)


def test_no_trouble_is_without_a_test() -> None:
    assert {t["name"] for t in EXPECTED["trouble"]} == {t["name"] for t in CODED} | set(UNCODED)
    assert len(EXPECTED["trouble"]) == EXPECTED["counts"]["troubles"]


def test_pressure_and_life_are_governed_by_different_places(by_tag: dict[str, Json]) -> None:
    found = by_tag["T-151"]
    assert found["governing_pressure"]["part"] == "course 4"
    assert found["governing_life"] == {"part": "course 1", "location": "06"}


# ----------------------------------------------------------------------------------------------------
# The workbook, cell by cell
# ----------------------------------------------------------------------------------------------------
def down(value: float | None, decimals: int) -> Any:
    return None if value is None else floor(Q(value) * (1 + Q(1, 10**9)) * 10**decimals) / 10**decimals


def up(value: float | None, decimals: int) -> Any:
    return None if value is None else ceil(Q(value) * (1 - Q(1, 10**9)) * 10**decimals) / 10**decimals


def same(cell: Any, figure: Any) -> bool:
    """Tell whether a cell says a figure; a dash or a blank says that there is none."""
    if isinstance(cell, datetime):
        cell = cell.date().isoformat()
    if isinstance(cell, str):
        cell = " ".join(cell.split())  # long places break their line
    return cell in {None, "–", ""} if figure is None else bool(cell == figure)


def place(found: Json | None, otherwise: str | None = None) -> str | None:
    return otherwise if found is None else f"{found['part']} / {found['location']}"


def rows_of(book: Any, sheet: str) -> list[Json]:
    """Give the rows of a sheet by heading: those that fill the first two columns of the table."""
    lines = [[cell.value for cell in line] for line in book[sheet].iter_rows()]
    head = next(i for i, line in enumerate(lines) if "Vessel" in line[:2])
    rows = [dict(zip(lines[head], line, strict=True)) for line in lines[head + 1 :] if line[1] and line[2]]
    return [row for row in rows if row["Vessel"] in VESSELS]


def test_the_list_says_what_json_says(book: Any, listed: list[Json]) -> None:
    rows = rows_of(book, "The list")
    assert [row["Vessel"] for row in rows] == [v["vessel"] for v in listed]
    for row, v in zip(rows, listed, strict=True):
        meant = {
            "Block": v["block"],
            "Standing": v["standing"],
            "Flags": ", ".join(v["flags"]) or None,
            "Current MAWP [MPa]": down(v["current_mawp_mpa"], 3),
            "MAWP today [MPa]": down(v["mawp_today_mpa"], 3),
            "Projected MAWP [MPa]": down(v["projected_mawp_mpa"], 3),
            "Projected, uncapped [MPa]": down(v["projected_mawp_uncapped_mpa"], 3),
            "Carried to": v["carry_to_on"],
            "Governs pressure": place(v["governing_pressure"]),
            "Relief, lowest set [MPa]": up(
                min((d["set_pressure_mpa"] for d in v["relief"]), default=None), 3
            ),
            "Life left [years]": down(v["life_left_years"], 1),
            "Retirement": v["retirement_on"],
            "Internal or on-stream due": v["internal_due_on"],
            "External due": v["external_due_on"],
            "Governs due": place(v["governing_due"], "cap of the rule set" if v["internal_due_on"] else "–"),
            "Interval [years]": down(v["internal_interval_years"], 1),
            "Governs life": place(v["governing_life"]),
            "Doubts": len(v["doubts"]),
            "Gaps": len(v["gaps"]),
        }
        wrong = {name: (row[name], figure) for name, figure in meant.items() if not same(row[name], figure)}
        assert not wrong, (v["vessel"], wrong)


def test_what_each_figure_rests_on_says_what_json_says(book: Any, saved: list[Json]) -> None:
    rows = rows_of(book, "What each figure rests on")
    told = {
        (v["vessel"], p["part"], s["location"]): s for v in saved for p in v["parts"] for s in p["locations"]
    }
    assert len(rows) == len(told) >= EXPECTED["counts"]["locations"] - 1
    for row in rows:
        s = told.pop((row["Vessel"], row["Part"], row["Location"]))
        meant = {
            "Times observed": s["observations"],
            "Last on": s["last_on"],
            "Last wall [mm]": down(s["last_thickness_mm"], 2),
            "Wall used [mm]": down(s["wall_used_mm"], 2),
            "Long-term rate [mm/year]": up(s["long_term_rate_mm_per_year"], 3),
            "Short-term rate [mm/year]": up(s["short_term_rate_mm_per_year"], 3),
            "Least measurable rate [mm/year]": up(s["least_measurable_rate_mm_per_year"], 3),
            "Planning rate [mm/year]": up(s["planning_rate_mm_per_year"], 3),
            "Required thickness [mm]": up(s["required_thickness_mm"], 2),
            "Retirement": s["retirement_on"],
            "Half-life interval [years]": down(s["half_life_interval_years"], 1),
            "Life at least measurable rate [years]": down(s["life_at_least_measurable_rate_years"], 1),
            "Projected wall [mm]": down(s["projected_thickness_mm"], 2),
            "MAWP today [MPa]": down(s["mawp_today_mpa"], 3),
            "Projected MAWP [MPa]": down(s["projected_mawp_mpa"], 3),
        }
        wrong = {name: (row[name], figure) for name, figure in meant.items() if not same(row[name], figure)}
        assert not wrong, (row["Vessel"], row["Part"], row["Location"], wrong)
    assert not told


def test_the_saved_appraisal_is_what_show_says(ask: Ask, saved: list[Json]) -> None:
    told = json.loads(ask("show", "T-151", "--json"))
    kept: Json = next(v for v in saved if v["vessel"] == "T-151")
    for name, value in told.items():
        if name != "journal_head":  # the saving is an entry of its own
            assert kept[name] == value, name


def test_the_sheets_of_doubts_and_gaps_say_what_json_says(book: Any, listed: list[Json]) -> None:
    for sheet, name in (("Doubts", "doubts"), ("Gaps", "gaps")):
        found = Counter(
            (r["Vessel"], r["Code"], r["Where"], r["Found"], r["To do"]) for r in rows_of(book, sheet)
        )
        meant = Counter(
            (v["vessel"], n["code"], n["where"], n["found"], n["remedy"]) for v in listed for n in v[name]
        )
        assert found == meant


def test_the_sum_of_the_blocks_is_the_register(book: Any, listed: list[Json]) -> None:
    cells = [[c.value for c in line if c.value is not None] for line in book["The year"].iter_rows()]
    head = next(i for i, line in enumerate(cells) if line[:2] == ["Block of the list", "Vessels"])
    blocks = {line[0]: line[1] for line in cells[head + 1 :]}
    assert blocks.pop("all blocks together") == sum(blocks.values()) == len(VESSELS)
    assert blocks == Counter(v["block"] for v in listed)


def test_the_list_carries_its_caution_and_no_formula(book: Any, brackwater: Path) -> None:
    first = [cell.value for line in book.worksheets[0].iter_rows(max_row=6) for cell in line]
    assert words.CAUTION in first
    for sheet in book.worksheets:
        for line in sheet.iter_rows():
            for cell in line:
                assert cell.data_type != "f", (sheet.title, cell.coordinate)
                if isinstance(cell.value, str):
                    assert not cell.value.startswith(("=", "+", "@", "\t", "\r")), (
                        sheet.title,
                        cell.coordinate,
                    )
    with zipfile.ZipFile(brackwater / "derating.xlsx") as package:
        sheets = [name for name in package.namelist() if name.startswith("xl/worksheets/sheet")]
        assert len(sheets) == len(book.worksheets)
        assert not [name for name in sheets if b"<f>" in package.read(name) or b"<f " in package.read(name)]


def test_the_workbook_prints_landscape_and_keeps_its_headings(book: Any) -> None:
    for sheet in book.worksheets:
        assert sheet.page_setup.orientation == "landscape"
        assert sheet.sheet_properties.pageSetUpPr.fitToPage
        assert sheet.page_setup.paperSize in {"1", "9", 1, 9}
        assert sheet.page_setup.fitToWidth >= 1
        if sheet.title != "The year":
            assert sheet.freeze_panes, sheet.title
            assert sheet.auto_filter.ref, sheet.title
            assert sheet.print_title_rows, sheet.title


def test_the_json_file_of_the_demo_is_the_list(brackwater: Path, listed: list[Json]) -> None:
    kept = json.loads((brackwater / "derating.json").read_text(encoding="utf-8"))
    for one, other in zip(kept, listed, strict=True):
        for name, value in other.items():
            if name != "journal_head":
                assert one[name] == value, name
