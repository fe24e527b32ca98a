"""Readings in: what is recorded, what is told first, what waits, what is refused."""

from __future__ import annotations

import json
from collections.abc import Callable
from datetime import date
from pathlib import Path
from typing import Any

import pytest
from small_works import SURVEYS, write, write_surveys

from fleet.errors import FileRefused
from fleet.store import Engine, models
from fleet.tasks.events import add_restart
from fleet.tasks.surveys import SurveysLoaded, load_surveys, thin_text

TODAY = date(2026, 12, 1)
Survey = Callable[..., SurveysLoaded]
Rows = Callable[..., list[dict[str, Any]]]
Count = Callable[[], int]
HEAD = "vessel,part,location,taken_on,thickness [mm]"


def test_readings_are_recorded_as_written_and_as_understood(surveyed: Engine, rows: Rows) -> None:
    readings = rows(models.Reading)
    assert len(readings) == 9
    inch = next(row for row in readings if row["taken_on"] == date(2026, 6, 3) and row["thickness_mm"])
    assert inch["thickness_mm"] == pytest.approx(11.80084, abs=1e-9)
    assert json.loads(inch["written"]) == {"thickness": "0.4646 in"}
    assert inch["source_row"] == 2
    assert [row["result"] for row in readings if row["thickness_mm"] is None] == ["no access"]


def test_a_survey_knows_its_file_its_days_and_its_people(works: Engine, survey: Survey, rows: Rows) -> None:
    survey(f"{HEAD},technician\nV-101,shell,1,2026-06-03,12,Lund\nV-101,shell,2,2026-06-05,13,Lund\n")
    (made,) = rows(models.Survey)
    assert (made["name"], made["technician"]) == ("survey", "Lund")
    assert (made["taken_from_on"], made["taken_to_on"]) == (date(2026, 6, 3), date(2026, 6, 5))
    files = {row["id"]: row["name"] for row in rows(models.SourceFile)}
    assert files[made["source_file_id"]] == "survey.csv"


def test_each_file_is_one_entry(surveyed: Engine, entries: Count) -> None:
    assert entries() == 1 + len(SURVEYS)


def test_thin_readings_are_told_against_alert_and_required(works: Engine, survey: Survey) -> None:
    loaded = survey(f"{HEAD}\nV-101,shell,1,2026-06-03,10.4\nV-101,shell,2,2026-06-03,9.0\n")
    assert [(one["location"], one["which"]) for one in loaded.thin] == [
        ("1", "alert"),
        ("2", "alert and required"),
    ]
    # 2.5 MPa on the outside radius of 1000 mm + 2 · 14 mm: t = P·Ro / (S·E + 0.4·P) = 2.5·514 / (138 + 1)
    assert loaded.thin[1]["required_thickness_mm"] == pytest.approx(2.5 * 514 / 139, rel=1e-9)
    told = thin_text(loaded.thin, "si").splitlines()
    assert told[0] == "Thin: 2 readings at or below alert or required thickness"
    assert told[1] == "  V-101 / shell / 1  2026-06-03  wall 10.40 mm, at or below alert 10.50 mm"
    assert told[3] == (
        "  V-101 / shell / 2  2026-06-03  wall 9.00 mm, at or below required 9.25 mm and alert 10.50 mm"
    )
    assert "0.409 in" in thin_text(loaded.thin, "us")


def test_thin_readings_are_told_when_the_file_is_refused(
    works: Engine, survey: Survey, entries: Count
) -> None:
    loaded = survey(f"{HEAD}\nV-101,shell,1,2026-06-03,9.0\nV-101,shell,9,2026-06-03,12\n")
    assert isinstance(loaded.refused, FileRefused)
    assert [one["location"] for one in loaded.thin] == ["1"]
    assert loaded.as_json()["loaded"] == 0
    assert list(loaded.as_json()) == ["loaded", "parked", "faults", "doubts", "thin"]
    assert entries() == 1


def test_a_thin_reading_at_a_location_or_part_that_is_not_on_record_is_told(
    works: Engine, survey: Survey
) -> None:
    # V-101 needs 2.5·514/(138 + 0.4·2.5) = 9.24 mm
    loaded = survey(
        f"{HEAD}\nV-101,shell,N7,2024-01-01,9.0\nV-101,bottom,1,2024-01-01,9.0\nV-101,bottom,2,2024-01-01,9.5\n"
    )
    assert [(thin["part"], thin["location"], thin["which"]) for thin in loaded.thin] == [
        ("shell", "N7", "alert and required"),
        ("bottom", "1", "required"),
    ]


def test_the_same_file_again_changes_nothing_and_says_so(
    surveyed: Engine, tmp_path: Path, entries: Count
) -> None:
    before = entries()
    again = load_surveys(surveyed, write_surveys(tmp_path), by="B. Stern", today=TODAY)
    assert again.text().count("loaded before; nothing was changed.") == 3
    assert (again.as_json()["loaded"], again.refused) == (0, None)
    assert entries() == before


def test_rows_on_record_are_passed_over_in_another_file(surveyed: Engine, survey: Survey, rows: Rows) -> None:
    loaded = survey(SURVEYS["2021-06-02_all.csv"] + "V-102,shell,1,2022-06-01,9.4\n", name="more.csv")
    assert loaded.as_json()["loaded"] == 1
    assert [one.code for one in loaded.files[0].doubts] == ["already on record"] * 3
    assert len(rows(models.Reading)) == 10


def test_dry_run_tells_and_writes_nothing(works: Engine, survey: Survey, entries: Count) -> None:
    loaded = survey(f"{HEAD}\nV-101,shell,1,2026-06-03,9.0\n", dry_run=True)
    assert loaded.text() == "survey.csv: 1 reading would be loaded."
    assert len(loaded.thin) == 1
    assert entries() == 1


def test_parked_rows_wait_and_a_corrected_file_settles_them(
    works: Engine, survey: Survey, rows: Rows, entries: Count
) -> None:
    text = f"{HEAD}\nV-101,shell,1,2026-06-03,12\nV-101,shell,9,2026-06-03,13\n"
    loaded = survey(text, park=True)
    assert (loaded.as_json()["loaded"], loaded.as_json()["parked"], loaded.refused) == (1, 1, None)
    assert [one.code for one in loaded.waiting] == ["unknown location"]
    before = entries()
    survey(text, park=True)
    assert entries() == before, "the same row waits already"
    survey(text.replace("shell,9", "shell,2"))
    assert [row["status"] for row in rows(models.ParkedRow)] == ["settled"]
    assert len(rows(models.Reading)) == 2


def test_a_row_of_another_year_does_not_settle_one_that_waits(
    works: Engine, survey: Survey, rows: Rows
) -> None:
    survey(f"{HEAD}\nV-101,shell,1,2025-06-03,12\nV-101,shell,9,2025-06-03,13\n", park=True)
    survey(f"{HEAD}\nV-101,shell,1,2026-06-03,12\nV-101,shell,2,2026-06-03,13\n")
    assert [row["status"] for row in rows(models.ParkedRow)] == ["waiting"]


def test_a_good_file_loads_beside_a_refused_one(works: Engine, tmp_path: Path, rows: Rows) -> None:
    good = write(tmp_path, "good.csv", f"{HEAD}\nV-101,shell,1,2026-06-03,12\n")
    bad = write(tmp_path, "bad.csv", f"{HEAD}\nV-101,shell,1,2026-06-04,\n")
    loaded = load_surveys(works, [bad, good], by="B. Stern", today=TODAY)
    assert loaded.refused is not None
    assert loaded.refused.where == "bad.csv"
    assert [row["thickness_mm"] for row in rows(models.Reading)] == [12]


def test_a_reading_far_above_nominal_is_queried_and_its_doubt_kept(
    works: Engine, survey: Survey, rows: Rows
) -> None:
    survey(f"{HEAD}\nV-101,shell,1,2026-06-03,28\n")
    (reading,) = rows(models.Reading)
    assert reading["status"] == "queried"
    assert reading["status_because"]
    (doubt,) = rows(models.Doubt)
    assert (doubt["code"], doubt["reading_id"]) == ("thickness far above nominal", reading["id"])
    assert None not in (doubt["vessel_id"], doubt["part_id"], doubt["location_id"])


def test_a_gain_is_a_doubt_within_a_history_and_none_over_new_metal(surveyed: Engine, survey: Survey) -> None:
    thicker = f"{HEAD}\nV-101,shell,1,2026-09-03,14\n"
    assert [one.code for one in survey(thicker, dry_run=True).files[0].doubts] == ["apparent gain"]
    add_restart(
        surveyed,
        vessel="V-101",
        part="shell",
        locations=["1"],
        kind="new metal",
        what="replaced",
        happened_on=date(2026, 8, 1),
        reason="new plate",
        by="A. Keel",
    )
    assert survey(thicker, dry_run=True).files[0].doubts == ()


def test_a_new_service_leaves_the_last_wall_as_the_one_to_compare_with(
    surveyed: Engine, survey: Survey
) -> None:
    add_restart(
        surveyed,
        vessel="V-101",
        part="shell",
        locations=["1"],
        kind="new service",
        what="changed service",
        happened_on=date(2026, 8, 1),
        reason="sour feed",
        by="A. Keel",
    )
    thicker = f"{HEAD}\nV-101,shell,1,2026-09-03,14\n"
    assert [one.code for one in survey(thicker).files[0].doubts] == ["apparent gain"]
