"""The demo through the installed command: what it builds, and that the works come out as their story says."""

from __future__ import annotations

import json
import time
import tomllib
from collections import Counter
from pathlib import Path
from typing import Any

import pytest
from installed import document, fleet
from listed import compare_list

from fleet.store.places import data_folder

AS_OF = ("--as-of", "2026-12-01")
EXPECTED: dict[str, Any] = tomllib.loads(
    (data_folder("sample_data") / "expected.toml").read_text(encoding="utf-8")
)
FILES = {
    "README.md",
    "brackwater_register.xlsx",
    "surveys",
    "derating.xlsx",
    "derating.json",
    "list.txt",
    "due.txt",
    "gaps.txt",
    "thin.txt",
    "fleet.db",
}

pytestmark = pytest.mark.slow


@pytest.fixture(scope="module")
def built(tmp_path_factory: pytest.TempPathFactory) -> tuple[Path, str, float]:
    """Build the demo once: its folder, what was printed, how long it took."""
    folder = tmp_path_factory.mktemp("demo") / "brackwater"
    began = time.perf_counter()
    done = fleet("demo", folder)
    assert done.returncode == 0, done.stderr
    return folder, done.stdout, time.perf_counter() - began


@pytest.fixture(scope="module")
def listed(built: tuple[Path, str, float]) -> dict[str, dict[str, Any]]:
    """Give the vessels of the yearly list by tag, as the demo wrote them."""
    rows: list[dict[str, Any]] = json.loads((built[0] / "derating.json").read_text(encoding="utf-8"))
    return {row["vessel"]: row for row in rows}


def test_the_folder_holds_what_was_promised_and_nothing_else(built: tuple[Path, str, float]) -> None:
    folder, printed, _ = built
    assert {path.name for path in folder.iterdir()} == FILES
    for name in FILES:
        assert f"  {name} " in printed


def test_the_story_is_printed_with_the_caution_and_adds_up(built: tuple[Path, str, float]) -> None:
    told = " ".join(built[1].split())
    assert "fleet computes and records; it does not decide." in told
    assert "as of 2026-12-01" in told
    assert f"The register holds {EXPECTED['counts']['vessels']} vessels: " in told
    assert f"= {EXPECTED['counts']['vessels']}." in told


def test_it_takes_under_fifteen_seconds_on_a_free_machine(built: tuple[Path, str, float]) -> None:
    assert built[2] < 60, "under 15 s on two cores with nothing else to do"


@pytest.mark.parametrize("vessel", EXPECTED["vessel"], ids=lambda vessel: vessel["tag"])
def test_every_vessel_stands_as_its_story_says(
    listed: dict[str, dict[str, Any]], vessel: dict[str, Any]
) -> None:
    found = listed[vessel["tag"]]
    assert (found["block"], found["flags"]) == (vessel["block"], vessel["flags"])
    assert found["standing"] == vessel.get("standing", found["standing"])


def test_every_vessel_of_the_register_is_in_exactly_one_block(listed: dict[str, dict[str, Any]]) -> None:
    assert sorted(listed) == sorted(vessel["tag"] for vessel in EXPECTED["vessel"])
    assert len(listed) == EXPECTED["counts"]["vessels"]


def test_the_record_is_whole_and_holds_what_the_files_hold(built: tuple[Path, str, float]) -> None:
    db = built[0] / "fleet.db"
    assert document("journal", "verify", db=db)["whole"]
    wrote: Counter[str] = Counter()
    entries = document("journal", "show", db=db)
    for entry in entries:
        wrote.update(entry["wrote"])
    counts = EXPECTED["counts"]
    assert len(entries) >= 10
    assert wrote["vessel"] == counts["vessels"]
    assert wrote["part"] == counts["parts"]
    assert wrote["location"] == counts["locations"]
    assert wrote["survey"] == counts["survey_files"]
    assert wrote["restart"] == counts["restarts"]
    assert wrote["appraisal"] == 1
    events = [entry["task"] for entry in entries]
    assert events[0] == "register load"
    assert events[-1] == "appraise"


def test_the_workbook_says_cell_by_cell_what_the_document_says(
    built: tuple[Path, str, float], listed: dict[str, dict[str, Any]]
) -> None:
    compare_list(built[0] / "derating.xlsx", list(listed.values()), count=len(listed))


def test_the_record_answers_as_the_demo_did(
    built: tuple[Path, str, float], listed: dict[str, dict[str, Any]]
) -> None:
    folder = built[0]
    db = folder / "fleet.db"
    entries = document("journal", "show", db=db)
    known = next(entry["at"] for entry in reversed(entries) if entry["task"] != "appraise")
    again = document("derating", *AS_OF, "--known-at", known, db=db)
    assert again == list(listed.values())
    text = fleet("due", *AS_OF, "--known-at", known, db=db).stdout
    assert text == (folder / "due.txt").read_text(encoding="utf-8")


def test_the_refused_sheet_is_refused_and_its_thin_reading_told_first(built: tuple[Path, str, float]) -> None:
    (sheet,) = (data_folder("sample_data") / "refused").glob("*.csv")
    told = document("survey", "load", sheet, db=built[0] / "fleet.db", code=1)
    assert told["loaded"] == 0
    assert told["faults"]
    assert told["thin"]


def test_an_existing_demo_is_left_alone(built: tuple[Path, str, float]) -> None:
    before = (built[0] / "fleet.db").read_bytes()
    again = fleet("demo", built[0])
    assert again.returncode == 1
    assert "fleet demo FOLDER" in again.stderr
    assert (built[0] / "fleet.db").read_bytes() == before
    assert {path.name for path in built[0].iterdir()} == FILES
