"""The files of Brackwater Works, read with nothing but csv, openpyxl and tomllib: counts, planted troubles.

Every trouble of the README has one test here, and no test is without its line there. fleet itself is not used.
"""

from __future__ import annotations

import csv
import math
import re
import subprocess
import sys
import tomllib
from collections.abc import Callable
from datetime import date, datetime, timedelta
from functools import cache
from pathlib import Path
from typing import Any

import openpyxl
import pytest

WORKS = Path(__file__).parents[2] / "sample_data"
AS_OF = date(2026, 12, 1)
TO_MM = {"mm": 1.0, "in": 25.4, "inch": 25.4, "thou": 0.0254}
AT_REQUIRED_MM = 1.645 * 0.25
DOUBTFUL_MM = 3 * math.sqrt(2) * 0.25
Row = dict[str, Any]
Check = Callable[[], None]
PLANTED: dict[str, str] = {}


def planted(name: str) -> Callable[[Check], Check]:
    """Tie a test to the trouble it finds."""

    def tie(check: Check) -> Check:
        PLANTED[name] = check.__name__
        return check

    return tie


@cache
def expected() -> dict[str, Any]:
    return tomllib.loads((WORKS / "expected.toml").read_text(encoding="utf-8"))


@cache
def events() -> dict[str, Any]:
    return tomllib.loads((WORKS / "events.toml").read_text(encoding="utf-8"))


@cache
def register() -> dict[str, list[Row]]:
    book = openpyxl.load_workbook(WORKS / "brackwater_register.xlsx")
    return {sheet.title: table(grid(sheet)) for sheet in book.worksheets}


def grid(sheet: Any) -> list[list[Any]]:
    return [[plain(cell) for cell in line] for line in sheet.iter_rows(values_only=True)]


def plain(cell: Any) -> Any:
    return cell.date() if isinstance(cell, datetime) else cell


def table(lines: list[list[Any]]) -> list[Row]:
    """Rows below the header, by column name without its unit; `written in` keeps the units."""
    top = next(i for i, line in enumerate(lines) if line and line[0] in {"vessel", "device"})
    headings = [re.fullmatch(r"(\w+)(?: \[(.+)\])?", str(cell)) for cell in lines[top] if cell is not None]
    assert all(headings)
    names = [heading[1] for heading in headings if heading]
    units = {heading[1]: heading[2] for heading in headings if heading and heading[2]}
    rows = [
        dict(zip(names, line, strict=False)) for line in lines[top + 1 :] if any(c is not None for c in line)
    ]
    return [row | {"written in": units, "header row": top + 1} for row in rows]


@cache
def readings() -> list[Row]:
    """Every reading of every survey file, in the order of the files, walls in mm."""
    found = []
    for path in sorted((WORKS / "surveys").iterdir()):
        if path.suffix == ".csv":
            with path.open(encoding="utf-8-sig", newline="") as file:
                rows = table([[cell or None for cell in line] for line in csv.reader(file)])
        else:
            rows = table(grid(openpyxl.load_workbook(path).worksheets[0]))
        for row in rows:
            row["file"] = f"surveys/{path.name}"
            if isinstance(row["taken_on"], str):
                row["taken_on"] = date.fromisoformat(row["taken_on"])
            if row["thickness"] is not None:
                row["mm"] = float(row["thickness"]) * TO_MM[row["written in"]["thickness"]]
            found.append(row)
    return found


def trouble(name: str) -> Row:
    return next(t for t in expected()["trouble"] if t["name"] == name)


def walls(tag: str, part: str, location: str) -> list[tuple[date, float]]:
    """Dated walls of one location, ascending."""
    where = (tag, part, location)
    here = [r for r in readings() if (r["vessel"], r["part"], r["location"]) == where and "mm" in r]
    return sorted((r["taken_on"], r["mm"]) for r in here)


def planted_walls(name: str) -> list[tuple[date, float]]:
    t = trouble(name)
    return walls(t["vessel"], t["part"], t["location"])


def planted_reading(name: str) -> Row:
    t = trouble(name)
    where = (t["vessel"], t["part"], t["location"], t["file"])
    found = [r for r in readings() if (r["vessel"], r["part"], r["location"], r["file"]) == where]
    assert len(found) == 1
    return found[0]


def vessel(tag: str) -> Row:
    return next(row for row in register()["vessels"] if row["vessel"] == tag)


def part(tag: str, name: str) -> Row:
    return next(row for row in register()["parts"] if (row["vessel"], row["part"]) == (tag, name))


def course_needs(tag: str, name: str, pressure: float) -> float:
    """Wall of a shell course by UG-27 in its outside-radius form (ASME BPVC Section VIII-1, Appendix 1-1)."""
    p = part(tag, name)
    P = pressure + p["static_head"] / 1000
    Ro = p["inside_diameter"] / 2 + p["nominal_thickness"]
    return float(P * Ro / (p["allowable_stress"] * p["joint_efficiency_long"] + 0.4 * P))


def rate(walls_: list[tuple[date, float]]) -> float:
    (start, first), (end, last) = walls_[0], walls_[-1]
    return (first - last) / ((end - start).days / 365.25)


def event(listed_under: str, tag: str, /, **more: str) -> Row:
    found = [
        e for e in events()[listed_under] if e["vessel"] == tag and all(e[k] == v for k, v in more.items())
    ]
    assert len(found) == 1
    return dict(found[0])


def relief_mpa(tag: str) -> list[float]:
    rows = [row for row in register()["relief"] if row["vessel"] == tag]
    return [
        row["set_pressure"] * 0.006894757293168 for row in rows if row["written in"]["set_pressure"] == "psi"
    ]


# ----------------------------------------------------------------------------------------------------
# The works as a whole
# ----------------------------------------------------------------------------------------------------
def test_the_works_are_as_large_as_they_should_be() -> None:
    sheets, counts = register(), expected()["counts"]
    files = {row["file"] for row in readings()}
    assert 30 <= len(sheets["vessels"]) == counts["vessels"] <= 35
    assert 90 <= len(sheets["parts"]) == counts["parts"]
    assert 400 <= len(sheets["locations"]) == counts["locations"]
    assert 3000 <= len(readings()) == counts["readings"]
    assert 20 <= len(files) == counts["survey_files"]
    assert len(sheets["inspections"]) == counts["inspections"]
    assert len(sheets["relief"]) == counts["relief"]
    days = [row["taken_on"] for row in readings()]
    assert (max(days) - min(days)).days > 15 * 365
    assert max(days) <= AS_OF
    assert len(events()["restart"]) == counts["restarts"] >= 1
    assert len(events()["decision"]) == counts["decisions"] >= 1
    assert len(events()["dated_state"]) == counts["dated_states"] >= 1
    for name, count in expected()["readings_in_file"].items():
        assert sum(row["file"] == f"surveys/{name}" for row in readings()) == count


def test_a_dozen_vessels_are_without_trouble() -> None:
    free = [v for v in expected()["vessel"] if v["trouble_free"]]
    assert len(free) >= 12
    assert {v["standing"] for v in free} == {"rating held"}
    assert all(not v["flags"] for v in free)


def test_every_standing_flag_and_block_is_meant_to_occur() -> None:
    vessels = expected()["vessel"]
    assert {v["standing"] for v in vessels if "standing" in v} == {
        "below required", "at required", "used up by its rate", "rating short", "no verdict", "running out",
        "rating held",
    }  # fmt: skip
    assert {flag for v in vessels for flag in v["flags"]} == {
        "overdue", "survey within the year", "re-gauge", "idle", "out of service",
    }  # fmt: skip
    assert {"retired", "out of service", "idle", "re-gauge"} <= {v["block"] for v in vessels}


def test_the_register_of_a_trouble_free_vessel_has_no_hole() -> None:
    free = {v["tag"] for v in expected()["vessel"] if v["trouble_free"]}
    for row in register()["vessels"]:
        if row["vessel"] in free:
            assert None not in {row[name] for name in (
                "code_edition", "nameplate_mawp", "external_design_pressure", "next_survey_on", "operating_pressure",
            )}  # fmt: skip
    for row in register()["parts"]:
        if row["vessel"] in free and row["shape"] != "other":
            assert None not in {row[name] for name in (
                "allowable_stress", "stress_basis", "static_head", "structural_minimum", "required_thickness_axial",
                "loss_side", "lining", "nominal_thickness",
            )}  # fmt: skip


def test_every_row_stands_under_one_that_exists() -> None:
    sheets = register()
    tags = [row["vessel"] for row in sheets["vessels"]]
    parts = [(row["vessel"], row["part"]) for row in sheets["parts"]]
    locations = [(row["vessel"], row["part"], row["location"]) for row in sheets["locations"]]
    assert len(set(tags)) == len(tags)
    assert len(set(parts)) == len(parts)
    assert len(set(locations)) == len(locations)
    assert {tag for tag, _ in parts} == set(tags)
    assert {row[:2] for row in locations} == set(parts)
    assert all(isinstance(row["location"], str) and len(row["location"]) == 2 for row in sheets["locations"])
    assert {(r["vessel"], r["part"], r["location"]) for r in readings()} <= set(locations)
    assert {row["vessel"] for row in sheets["relief"] + sheets["inspections"]} <= set(tags)


def test_no_location_is_read_twice_on_one_day_nor_before_service() -> None:
    keys = [(r["vessel"], r["location"], r["taken_on"]) for r in readings()]
    assert len(set(keys)) == len(keys)
    begun = {row["vessel"]: row["in_service_on"] for row in register()["vessels"]}
    assert all(r["taken_on"] >= begun[r["vessel"]] for r in readings())
    assert all(r["thickness"] is not None or r["result"] in {"no echo", "no access"} for r in readings())


def test_the_day_in_a_files_name_is_not_before_its_readings() -> None:
    for row in readings():
        handed_in = date.fromisoformat(row["file"].removeprefix("surveys/")[:10])
        assert timedelta(0) <= handed_in - row["taken_on"] <= timedelta(days=14)


def test_events_name_what_the_register_knows() -> None:
    locations = {(row["vessel"], row["part"], row["location"]) for row in register()["locations"]}
    for one in [e for kind in events().values() for e in kind]:
        spots = one.get("locations", [one["location"]] if "location" in one else [])
        assert {(one["vessel"], one["part"], spot) for spot in spots} <= locations if spots else True
        assert vessel(one["vessel"])
        assert one["entered_on"] <= AS_OF


def test_the_generator_writes_these_very_files(tmp_path: Path) -> None:
    done = subprocess.run(
        [sys.executable, "-B", WORKS / "make_brackwater.py", tmp_path],
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stderr
    texts = [p.relative_to(tmp_path) for p in tmp_path.rglob("*") if p.suffix in {".csv", ".toml", ".md"}]
    assert len(texts) > 20
    for path in texts:
        assert (tmp_path / path).read_bytes() == (WORKS / path).read_bytes(), path
    for path in tmp_path.rglob("*.xlsx"):
        ours, theirs = (
            openpyxl.load_workbook(path),
            openpyxl.load_workbook(WORKS / path.relative_to(tmp_path)),
        )
        assert [grid(s) for s in ours.worksheets] == [grid(s) for s in theirs.worksheets], path


def test_the_second_reckoning_agrees_with_what_is_meant() -> None:
    done = subprocess.run(
        [sys.executable, "-B", WORKS / "make_brackwater.py", "--check"],
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stdout + done.stderr


def test_every_trouble_is_named_in_the_readme_and_found_by_one_test() -> None:
    readme = (WORKS / "README.md").read_text(encoding="utf-8")
    section = readme.split("## The planted troubles")[1].split("## ")[0]
    named = re.findall(r"^\| (.+?) \|", section, flags=re.MULTILINE)[1:]
    meant = [t["name"] for t in expected()["trouble"]]
    assert named == meant
    assert len(set(meant)) == len(meant) == expected()["counts"]["troubles"]
    assert set(PLANTED) == set(meant)
    assert len(set(PLANTED.values())) == len(PLANTED)
    for t in expected()["trouble"]:
        assert (WORKS / t["file"]).exists()
        assert vessel(t["vessel"])
    for name in {name for v in expected()["vessel"] for name in v["troubles"]}:
        assert name in meant


def test_the_files_hold_the_doubts_that_are_listed_and_no_other() -> None:
    nominal = {
        (row["vessel"], row["part"]): row["nominal_thickness"] + (row["lining_thickness"] or 0)
        for row in register()["parts"]
    }
    began = {(e["vessel"], spot): e["happened_on"] for e in events()["restart"] for spot in e["locations"]}
    found: dict[tuple[str, str], int] = {}
    before: dict[tuple[str, str], list[tuple[date, float]]] = {}
    for row in sorted((r for r in readings() if "mm" in r), key=lambda r: r["taken_on"]):
        key = (row["vessel"], row["location"])
        if row["mm"] > 1.25 * nominal[row["vessel"], row["part"]]:
            code = (row["file"], "thickness far above nominal")
            found[code] = found.get(code, 0) + 1
            continue
        if key in began and row["taken_on"] >= began[key]:
            before[key] = []
            del began[key]
        past = before.setdefault(key, [])
        gain = row["mm"] - past[-1][1] if past else 0.0
        usual = (
            5 * max(rate(past), 0) * (row["taken_on"] - past[-1][0]).days / 365.25
            if len(past) > 1
            else math.inf
        )
        if gain > DOUBTFUL_MM or -gain > max(DOUBTFUL_MM, usual):
            code = (row["file"], "apparent gain" if gain > 0 else "large loss")
            found[code] = found.get(code, 0) + 1
        past.append((row["taken_on"], row["mm"]))
    listed = {(d["file"], d["code"]): d["count"] for d in expected()["loading_doubt"]}
    assert found == {
        k: n for k, n in listed.items() if k[1] not in {"nameplate blank", "suspected unit slip"}
    }


# ----------------------------------------------------------------------------------------------------
# One test for each planted trouble
# ----------------------------------------------------------------------------------------------------
@planted("wall below required")
def test_planted_wall_below_required() -> None:
    last = planted_reading("wall below required")
    assert last["mm"] < course_needs("D-203", "course 1", 1.8) - 0.2
    assert last["mm"] < part("D-203", "course 1")["alert_thickness"]


@planted("wall at required within the reading error")
def test_planted_wall_at_required() -> None:
    over = planted_reading("wall at required within the reading error")["mm"] - course_needs(
        "D-313", "course 1", 0.7
    )
    assert 0.1 < over < AT_REQUIRED_MM - 0.1


@planted("used up by its rate")
def test_planted_used_up_by_its_rate() -> None:
    history, need = planted_walls("used up by its rate"), course_needs("D-214", "course 1", 1.2)
    day, wall = history[-1]
    assert day.year == 2024
    assert wall > need + AT_REQUIRED_MM
    assert wall - rate(history) * (AS_OF - day).days / 365.25 < need


@planted("rating short with all three ways out")
def test_planted_rating_short() -> None:
    history, need = (
        planted_walls("rating short with all three ways out"),
        course_needs("D-112", "course 2", 1.9),
    )
    day, wall = history[-1]
    ahead = (vessel("D-112")["next_survey_on"] - day).days / 365.25
    assert wall - rate(history) * (AS_OF - day).days / 365.25 > need + AT_REQUIRED_MM
    assert wall - 2 * rate(history) * ahead < need - 0.1
    assert ahead < 2 < (wall - need) / rate(history) < 4


@planted("re-check within ninety days")
def test_planted_recheck() -> None:
    name = trouble("re-check within ninety days")["file"]
    again = [r for r in readings() if r["file"] == name]
    assert len(again) == 8
    for row in again:
        (before, _), (after, _) = walls("D-112", "course 2", row["location"])[-2:]
        assert 0 < (after - before).days < 90


@planted("relief device set above what the wall carries today")
def test_planted_relief_above_the_wall() -> None:
    rerated = event("decision", "D-206", kind="re-rating")
    assert rerated["pressure"] == "1.9 MPa"
    _, wall = planted_walls("relief device set above what the wall carries today")[-1]
    lowest = min(relief_mpa("D-206"))
    assert course_needs("D-206", "course 1", 1.9) < wall < course_needs("D-206", "course 1", lowest) - 0.5


@planted("rate doubled after a change of service")
def test_planted_rate_doubled() -> None:
    restart = event("restart", "D-216", kind="new service")
    history = planted_walls("rate doubled after a change of service")
    old = [w for w in history if w[0] < restart["happened_on"]]
    new = [w for w in history if w[0] > restart["happened_on"]]
    assert len(new) >= 2
    assert 1.8 < rate(new) / rate(old[-4:]) < 3


@planted("held by half life")
def test_planted_held_by_half_life() -> None:
    assert vessel("D-216")["next_survey_on"] is None
    life = (planted_walls("held by half life")[-1][1] - course_needs("D-216", "course 1", 1.1)) / 0.26
    assert 6 < life < 10


@planted("no planned survey")
def test_planted_no_planned_survey() -> None:
    blank = {row["vessel"] for row in register()["vessels"] if row["next_survey_on"] is None}
    assert blank - {"D-128"} == {"D-126", trouble("no planned survey")["vessel"]}


@planted("suspected unit slip")
def test_planted_unit_slip() -> None:
    row = planted_reading("suspected unit slip")
    nominal = part("D-216", "course 2")["nominal_thickness"]
    assert row["written in"]["thickness"] == "inch"
    assert row["mm"] > 1.25 * nominal
    assert 0.2 * nominal < float(row["thickness"]) < 1.25 * nominal


@planted("two locations swapped")
def test_planted_swap() -> None:
    t = trouble("two locations swapped")
    day = planted_reading("two locations swapped")["taken_on"]
    other = next(
        row["location"]
        for row in register()["locations"]
        if (row["vessel"], row["part"]) == (t["vessel"], t["part"])
        and abs(dict(walls(t["vessel"], t["part"], row["location"]))[day] - 13.2) < 0.8
        and max(w for _, w in walls(t["vessel"], t["part"], row["location"])) > 15.5
        and row["location"] != t["location"]
    )
    for here, sign in ((t["location"], 1), (other, -1)):
        history = walls(t["vessel"], t["part"], here)
        at = [d for d, _ in history].index(day)
        assert sign * (history[at][1] - history[at - 1][1]) > DOUBTFUL_MM
        assert sign * (history[at][1] - history[at + 1][1]) > DOUBTFUL_MM


@planted("wind and weight not assessed")
def test_planted_wind_not_assessed() -> None:
    pieces = [row for row in register()["parts"] if row["vessel"] == "T-304"]
    courses = [row for row in pieces if row["shape"] == "cylinder"]
    assert sum(row["length"] for row in courses) > 5 * max(row["inside_diameter"] for row in courses)
    assert all(row["required_thickness_axial"] is None for row in pieces)


@planted("doubled echo on a thin wall")
def test_planted_doubled_echo() -> None:
    row, history = (
        planted_reading("doubled echo on a thin wall"),
        planted_walls("doubled echo on a thin wall"),
    )
    before = [w for d, w in history if d < row["taken_on"]][-1]
    assert before == pytest.approx(2.4, abs=0.15)
    assert row["mm"] == pytest.approx(4.8, abs=0.2)
    assert row["mm"] > 1.25 * part("D-126", "drain N6")["nominal_thickness"]


@planted("overdue")
def test_planted_overdue() -> None:
    last = vessel("D-126")["last_internal_on"]
    later = [r for r in register()["inspections"] if r["vessel"] == "D-126" and r["kind"] != "external"]
    assert all(row["done_on"] < last for row in later)
    assert last.replace(year=last.year + 10) < AS_OF


@planted("hot survey corrected twice")
def test_planted_hot_survey() -> None:
    name = trouble("hot survey corrected twice")["file"]
    hot = [r for r in readings() if r["file"] == name and r["vessel"] == "D-402"]
    assert {float(r["wall_temperature"]) for r in hot} == {240.0}
    assert {r["temperature_corrected"] for r in hot} == {"yes"}
    falls = []
    for row in hot:
        history = walls("D-402", row["part"], row["location"])
        assert history[-1][0] == row["taken_on"]
        falls.append((history[-2][1] - history[-1][1]) / history[-1][1])
    assert 0.035 < sum(falls) / len(falls) < 0.055  # about 1 % per 55 °C (API 574, 10.4.1.4)


@planted("apparent gain")
def test_planted_gain() -> None:
    row, history = planted_reading("apparent gain"), planted_walls("apparent gain")
    before = [w for d, w in history if d < row["taken_on"]][-1]
    assert row["mm"] - before > DOUBTFUL_MM
    assert row["mm"] < 1.25 * part("D-205", "north head")["nominal_thickness"]


@planted("course replaced mid-history")
def test_planted_new_course() -> None:
    restart = event("restart", "T-303", kind="new metal")
    history = planted_walls("course replaced mid-history")
    old = [w for w in history if w[0] < restart["happened_on"]]
    new = [w for w in history if w[0] >= restart["happened_on"]]
    assert len(old) >= 3
    assert len(new) >= 3
    assert (new[0][0] - restart["happened_on"]).days < 7
    assert new[0][1] > old[-1][1] + 2


@planted("head never measured")
def test_planted_head_never_measured() -> None:
    marked = [
        row for row in register()["locations"] if (row["vessel"], row["part"]) == ("D-125", "south head")
    ]
    assert len(marked) == 4
    assert not [r for r in readings() if (r["vessel"], r["part"]) == ("D-125", "south head")]


@planted("no relief device on the register")
def test_planted_no_relief_device() -> None:
    linked = {row["vessel"] for row in register()["relief"]}
    assert {row["vessel"] for row in register()["vessels"]} - linked == {"D-125", "D-128"}


@planted("pressure and life governed by different locations")
def test_planted_pressure_and_life() -> None:
    thick = planted_walls("pressure and life governed by different locations")
    top = min(
        (walls("T-151", "course 4", r["location"]) for r in register()["locations"]
         if (r["vessel"], r["part"]) == ("T-151", "course 4")),
        key=lambda history: history[-1][1],
    )  # fmt: skip
    over_thick = thick[-1][1] - course_needs("T-151", "course 1", 2.8)
    over_top = top[-1][1] - course_needs("T-151", "course 4", 2.8)
    assert over_top < over_thick - 1
    assert over_thick / rate(thick) < 10 < over_top / max(rate(top), 0.025)


@planted("withdrawn location")
def test_planted_withdrawn_location() -> None:
    state = event("dated_state", "T-151", state="withdrawn")
    t = trouble("withdrawn location")
    assert (state["part"], state["location"]) == (t["part"], t["location"])
    assert max(planted_walls("withdrawn location"))[0] < state["from_on"]


@planted("clad vessel")
def test_planted_clad_vessel() -> None:
    assert {row["lining"] for row in register()["parts"] if row["vessel"] == "F-141"} == {"integral clad"}
    read = [r for r in readings() if r["vessel"] == "F-141"]
    assert {r["includes_lining"] for r in read} == {"yes"}
    assert min(r["mm"] for r in read) > part("F-141", "course 1")["nominal_thickness"]


@planted("derated years ago")
def test_planted_derated_vessel() -> None:
    row = vessel("D-205")
    assert row["current_mawp"] < row["nameplate_mawp"]
    assert row["current_mawp_from"] == date(2016, 4, 1)
    assert row["current_mawp_basis"]


@planted("chosen rate")
def test_planted_chosen_rate() -> None:
    chosen = event("decision", "D-205", kind="chosen rate")
    last = max(r["taken_on"] for r in readings() if r["vessel"] == "D-205")
    assert last < chosen["decided_on"] < AS_OF < chosen["review_on"]
    assert chosen["decided_by"] != chosen["second_by"]


@planted("idle and protected for four years")
def test_planted_idle_and_protected() -> None:
    stopped = event("dated_state", "D-215", state="idle protected")["from_on"]
    started = event("dated_state", "D-215", state="in service")["from_on"]
    assert 3.9 < (started - stopped).days / 365.25 < 4.1
    assert not [r for r in readings() if r["vessel"] == "D-215" and stopped <= r["taken_on"] < started]


@planted("structural minimum governs")
def test_planted_structural_minimum() -> None:
    assert part("D-422", "course 1")["structural_minimum"] > 2 * course_needs("D-422", "course 1", 0.3)


@planted("survey planned after the due date")
def test_planted_survey_after_due() -> None:
    day, wall = planted_walls("structural minimum governs")[-1]
    half = (wall - 6.0) / rate(planted_walls("structural minimum governs")) / 2
    assert (vessel("D-422")["next_survey_on"] - day).days / 365.25 > half + 0.2


@planted("vacuum vessel with its external minimum")
def test_planted_vacuum_with_minimum() -> None:
    assert vessel("H-221S")["external_design_pressure"] > 0
    pieces = [row for row in register()["parts"] if row["vessel"] == "H-221S"]
    assert all(row["required_thickness_external"] > 0 for row in pieces)
    assert part("H-221S", "course 1")["required_thickness_external"] > course_needs(
        "H-221S", "course 1", 0.35
    )


@planted("vacuum vessel without its external minimum")
def test_planted_vacuum_without_minimum() -> None:
    assert vessel("T-222")["external_design_pressure"] > 0
    pieces = [row for row in register()["parts"] if row["vessel"] == "T-222"]
    assert all(row["required_thickness_external"] is None for row in pieces)


@planted("local thin area with a scan")
def test_planted_local_thin_area() -> None:
    t = trouble("local thin area with a scan")
    marked = [row for row in register()["locations"] if row["damage"] == "local"]
    assert [(row["vessel"], row["part"], row["location"]) for row in marked] == [
        (t["vessel"], t["part"], t["location"])
    ]
    with (WORKS / t["file"]).open(encoding="utf-8", newline="") as file:
        lines = list(csv.reader(file))
    assert lines[0][0] == "axial across [mm]"
    wall = [float(cell) for line in lines[1:] for cell in line[1:]]
    assert len({len(line) for line in lines}) == 1
    assert min(wall) == pytest.approx(planted_walls("local thin area with a scan")[-1][1], abs=0.1)
    assert max(wall) > min(wall) + 2


@planted("one low last reading")
def test_planted_one_low_reading() -> None:
    history = planted_walls("one low last reading")
    (before, was), (day, wall) = history[-2:]
    short = (was - wall) / ((day - before).days / 365.25)
    assert short > 3 * rate(history)
    assert was - wall < DOUBTFUL_MM


@planted("on-stream inspection accepted in place of internal")
def test_planted_on_stream_inspection() -> None:
    accepted = event("decision", "T-152", kind="on-stream acceptance")
    looks = [row for row in register()["inspections"] if row["vessel"] == "T-152"]
    onstream = max(row["done_on"] for row in looks if row["kind"] == "on-stream")
    internal = max(row["done_on"] for row in looks if row["kind"] == "internal")
    assert accepted["decided_on"] <= onstream
    assert internal.replace(year=internal.year + 10) < AS_OF < onstream.replace(year=onstream.year + 10)


@planted("deferral in force")
def test_planted_deferral() -> None:
    deferral = event("decision", "R-411", kind="deferral")
    last = max(
        row["done_on"]
        for row in register()["inspections"]
        if (row["vessel"], row["kind"]) == ("R-411", "internal")
    )
    due = last.replace(year=last.year + 10)
    assert deferral["decided_on"] < due < AS_OF < deferral["until_on"]
    assert (deferral["until_on"] - due).days < 182


@planted("retired vessel")
def test_planted_retired_vessel() -> None:
    gone = event("dated_state", "D-128", state="retired")["from_on"]
    assert max(r["taken_on"] for r in readings() if r["vessel"] == "D-128") < gone


@planted("out of service")
def test_planted_out_of_service() -> None:
    assert event("dated_state", "R-413", state="out of service")["from_on"] < AS_OF


@planted("idle now")
def test_planted_idle_now() -> None:
    states = [e for e in events()["dated_state"] if e["vessel"] == "D-511"]
    assert [e["state"] for e in states] == ["idle"]


@planted("no echo at the last visit")
def test_planted_no_echo() -> None:
    row = planted_reading("no echo at the last visit")
    assert row["result"] == "no echo"
    assert row["thickness"] is None
    assert row["taken_on"] == max(r["taken_on"] for r in readings() if r["vessel"] == "D-511")


@planted("location never measured")
def test_planted_location_never_measured() -> None:
    assert not planted_walls("location never measured")
    assert [r for r in readings() if (r["vessel"], r["part"]) == ("D-313", "top head")]


@planted("location measured once")
def test_planted_location_measured_once() -> None:
    assert len(planted_walls("location measured once")) == 1


@planted("baseline equal to nominal")
def test_planted_baseline_equal_to_nominal() -> None:
    t = trouble("baseline equal to nominal")
    key = (t["vessel"], t["part"], t["location"])
    row = next(r for r in register()["locations"] if (r["vessel"], r["part"], r["location"]) == key)
    assert row["baseline_thickness"] == part("D-313", "top head")["nominal_thickness"]


@planted("old receiver with thin papers")
def test_planted_thin_papers() -> None:
    row = vessel("R-413")
    assert row["nameplate_mawp"] is None
    assert row["design_pressure"] > 0
    assert row["code_edition"] is None
    assert part("R-413", "top head")["joint_efficiency"] is None


@planted("blank cells that count as none")
def test_planted_blank_cells() -> None:
    assert part("D-511", "west head")["lining"] is None
    assert part("D-511", "course 1")["structural_minimum"] is None
    assert part("D-511", "course 1")["loss_side"] is None


@planted("sheet in inches")
def test_planted_sheet_in_inches() -> None:
    rows = [r for r in readings() if r["file"] == trouble("sheet in inches")["file"]]
    assert {r["written in"]["thickness"] for r in rows} == {"in"}
    assert max(float(r["thickness"]) for r in rows) < 2


@planted("sheet in thousandths of an inch")
def test_planted_sheet_in_thou() -> None:
    rows = [r for r in readings() if r["file"] == trouble("sheet in thousandths of an inch")["file"]]
    assert {r["written in"]["thickness"] for r in rows} == {"thou"}
    assert min(float(r["thickness"]) for r in rows) > 300


@planted("title and blank rows above the table")
def test_planted_title_above_the_table() -> None:
    rows = [r for r in readings() if r["file"] == trouble("title and blank rows above the table")["file"]]
    assert {r["header row"] for r in rows} == {4}
