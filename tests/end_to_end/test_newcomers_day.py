"""A newcomer's first day, through the installed command: files in, figures out, and every way to go wrong."""

from __future__ import annotations

import json
import time
from datetime import UTC, datetime
from pathlib import Path

import pytest
from installed import document, fleet
from listed import compare_list
from small_works import SURVEYS, write, write_register, write_surveys

AS_OF = ("--as-of", "2026-12-01")
VESSEL_KEYS = [
    "vessel", "as_of", "carry_to_on", "carry_to_basis", "rules", "design_code", "current_mawp_mpa",
    "nameplate_mawp_mpa", "mawp_today_mpa", "projected_mawp_mpa", "projected_mawp_uncapped_mpa",
    "governing_pressure", "governing_life", "governing_due", "retirement_on", "life_left_years",
    "internal_due_on", "external_due_on", "internal_interval_years", "rating_holds_until", "standing", "flags",
    "parts_measured", "parts_total", "relief", "doubts", "gaps", "journal_head",
]  # fmt: skip
PART_KEYS = [
    "part", "shape", "required_thickness_mm", "required_by", "mawp_today_mpa", "projected_mawp_mpa",
    "projected_mawp_uncapped_mpa", "locations",
]  # fmt: skip
LOCATION_KEYS = [
    "location", "observations", "last_on", "last_thickness_mm", "wall_used_mm", "long_term_rate_mm_per_year",
    "short_term_rate_mm_per_year", "planning_rate_mm_per_year", "rate_basis",
    "least_measurable_rate_mm_per_year", "required_thickness_mm", "remaining_life_years",
    "life_at_least_measurable_rate_years", "retirement_on", "half_life_interval_years",
    "projected_thickness_mm", "mawp_today_mpa", "projected_mawp_mpa", "doubts",
]  # fmt: skip


@pytest.fixture(scope="module")
def db(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Do the newcomer's morning: an empty database, the register, three surveys."""
    folder = tmp_path_factory.mktemp("works")
    path = folder / "works.db"
    assert fleet("new", db=path).returncode == 0
    loaded = fleet("register", "load", *write_register(folder), "--by", "A. Keel", db=path)
    assert loaded.returncode == 0, loaded.stderr
    surveys = fleet("survey", "load", *write_surveys(folder), "--by", "B. Stern", db=path)
    assert surveys.returncode == 0, surveys.stderr
    assert [line for line in surveys.stdout.splitlines() if "loaded" in line] == [
        f"{name}: 3 readings loaded. Journal entry {number}." for number, name in enumerate(SURVEYS, start=2)
    ]
    return path


def test_show_gives_the_object_of_the_contract(db: Path) -> None:
    shown = document("show", "V-101", *AS_OF, db=db)
    assert list(shown) == [*VESSEL_KEYS, "parts"]
    (part,) = shown["parts"]
    assert list(part) == PART_KEYS
    north, south = part["locations"]
    assert list(north) == LOCATION_KEYS
    assert (north["location"], north["observations"], north["last_on"]) == ("1", 3, "2026-06-03")
    assert north["last_thickness_mm"] == pytest.approx(0.4646 * 25.4, abs=1e-12)
    # worked by hand: 2.5·514 / (138 + 0.4·2.5) on the outside radius of 1000 + 2·14 mm
    assert part["required_thickness_mm"] == pytest.approx(2.5 * 514 / 139, rel=1e-9)
    # from 12.6 mm on 2021-06-01 to 0.4646 inch on 2026-06-03: 1828 days
    short = (12.6 - 0.4646 * 25.4) / (1828 / 365.25)
    assert north["short_term_rate_mm_per_year"] == pytest.approx(short, rel=1e-9)
    assert south["rate_basis"] in {"long-term", "short-term"}


def test_appraise_gives_the_vessels_of_show(db: Path) -> None:
    listed = document("appraise", *AS_OF, db=db)
    assert list(listed) == ["as_of", "journal_head", "vessels"]
    for vessel in listed["vessels"]:
        assert list(vessel) == VESSEL_KEYS
        shown = document("show", vessel["vessel"], *AS_OF, db=db)
        assert {key: value for key, value in shown.items() if key != "parts"} == vessel
    one = document("appraise", "V-102", *AS_OF, db=db)
    assert [vessel["vessel"] for vessel in one["vessels"]] == ["V-102"]


def test_due_and_gaps_give_lists(db: Path) -> None:
    due = document("due", *AS_OF, db=db)
    assert {row["vessel"] for row in due} == {"V-101", "V-102"}
    near = document("due", "--until", "2027-01-01", *AS_OF, db=db)
    assert len(near) < len(due)
    gaps = document("gaps", *AS_OF, db=db)
    assert {(row["code"], row["vessel"]) for row in gaps} >= {("part not read at last visit", "V-102")}
    assert all(list(row) == ["code", "where", "found", "remedy", "vessel"] for row in gaps)


def test_text_is_read_from_the_top_and_carries_the_caution(db: Path) -> None:
    for words in (("show", "V-101"), ("appraise",), ("due",), ("gaps",)):
        done = fleet(*words, *AS_OF, db=db)
        assert done.returncode == 0, done.stderr
        assert done.stderr == ""
        assert "fleet computes and records; it does not decide." in done.stdout.replace("\n", " ")
    told = {units: fleet("show", "V-101", *AS_OF, "--units", units, db=db).stdout for units in ("si", "us")}
    assert "MPa" in told["si"]
    assert "psi" in told["us"]


def test_the_workbook_says_cell_by_cell_what_the_document_says(db: Path, tmp_path: Path) -> None:
    book = tmp_path / "list.xlsx"
    assert fleet("derating", "-o", book, *AS_OF, db=db).returncode == 0
    listed = document("derating", *AS_OF, db=db)
    compare_list(book, listed, count=2)


def test_loading_everything_again_changes_nothing(db: Path) -> None:
    before = document("journal", "verify", db=db)
    folder = db.parent
    register = fleet("register", "load", *write_register(folder), db=db)
    surveys = fleet("survey", "load", *write_surveys(folder), db=db)
    assert (register.returncode, surveys.returncode) == (0, 0)
    assert "was loaded before" in register.stdout
    assert surveys.stdout.count("loaded before; nothing was changed.") == 3
    assert document("journal", "verify", db=db) == before
    assert before["whole"]


def test_as_of_an_earlier_day_less_is_true(db: Path) -> None:
    then = document("show", "V-101", "--as-of", "2022-01-01", db=db)
    north = then["parts"][0]["locations"][0]
    assert (north["observations"], north["last_on"]) == (2, "2021-06-01")


def test_an_unknown_tag_ends_with_1_and_tells_the_nearest(db: Path) -> None:
    done = fleet("show", "V101", db=db)
    assert (done.returncode, done.stdout) == (1, "")
    assert "did you mean V-101?" in done.stderr
    error = document("show", "V101", db=db, code=1)["error"]
    assert error["error"] == "UnknownTag"
    assert "V-101" in error["remedy"]


def test_a_wrong_word_ends_with_2_and_a_wrong_file_with_3(db: Path, tmp_path: Path) -> None:
    assert fleet("show", db=db).returncode == 2
    assert fleet("show", "V-101", "--as-of", "1.12.2026", db=db).returncode == 2
    assert fleet("show", "V-101", db=tmp_path / "none.db").returncode == 3
    (tmp_path / "words.db").write_text("no database at all, only words " * 100, encoding="utf-8")
    assert fleet("show", "V-101", db=tmp_path / "words.db").returncode == 3
    assert document("show", "V-101", db=tmp_path / "none.db", code=3)["error"]["error"] == "DatabaseProblem"


def test_a_refused_survey_tells_what_is_thin_and_gives_one_document(db: Path, tmp_path: Path) -> None:
    head = "vessel,part,location,taken_on,thickness [mm]"
    bad = write(tmp_path, "bad.csv", f"{head}\nV-101,shell,1,2026-11-03,9.1\nV-101,shell,2,2026-11-03,n/a\n")
    done = fleet("survey", "load", bad, db=db)
    assert done.returncode == 1
    assert done.stdout.startswith("Thin: 1 reading at or below")
    told = document("survey", "load", bad, db=db, code=1)
    assert list(told) == ["loaded", "parked", "faults", "doubts", "thin"]
    assert told["loaded"] == 0
    assert [one["code"] for one in told["faults"]] == ["text in a number column"]
    assert [one["location"] for one in told["thin"]] == ["1"]


def test_what_was_known_then_is_repeated_byte_for_byte(tmp_path: Path) -> None:
    path = tmp_path / "fleet.db"
    fleet("new", db=path)
    fleet("register", "load", *write_register(tmp_path), db=path)
    first, *_, last = write_surveys(tmp_path)
    fleet("survey", "load", first, db=path)
    time.sleep(0.01)
    then = datetime.now(UTC).isoformat()
    asked = ("show", "V-101", *AS_OF, "--known-at", then, "--json")
    before = fleet(*asked, db=path)
    assert before.returncode == 0
    fleet("survey", "load", last, db=path)
    assert fleet(*asked, db=path).stdout == before.stdout
    assert fleet("show", "V-101", *AS_OF, "--json", db=path).stdout != before.stdout


def test_parked_rows_wait_in_the_gaps_until_they_come_right(tmp_path: Path) -> None:
    path = tmp_path / "fleet.db"
    fleet("new", db=path)
    fleet("register", "load", *write_register(tmp_path), db=path)
    head = "vessel,part,location,taken_on,thickness [mm]"
    text = f"{head}\nV-101,shell,1,2026-11-03,12\nV-101,shell,02,2026-11-03,12.5\n"
    done = document("survey", "load", write(tmp_path, "s.csv", text), "--park-bad-rows", db=path)
    assert (done["loaded"], done["parked"], len(done["faults"])) == (1, 1, 1)

    def waiting() -> list[str]:
        return [row["where"] for row in document("gaps", db=path) if row["code"] == "parked row"]

    assert waiting() == ["s.csv, row 3"]
    fleet("survey", "load", write(tmp_path, "s.csv", text.replace(",02,", ",2,")), db=path)
    assert waiting() == []


def test_show_answers_at_once(db: Path) -> None:
    began = time.perf_counter()
    fleet("show", "V-101", *AS_OF, db=db)
    assert time.perf_counter() - began < 5, "well under two seconds on a machine with nothing else to do"


def test_the_document_is_the_same_whatever_the_units(db: Path) -> None:
    si, us = (
        fleet("show", "V-101", *AS_OF, "--units", units, "--json", db=db).stdout for units in ("si", "us")
    )
    assert json.loads(si) == json.loads(us)
