"""The register in: first load, correction, dated change, starting values, waiting rows."""

from __future__ import annotations

import json
from collections.abc import Callable
from datetime import date
from pathlib import Path
from typing import Any

import pytest
from small_works import LOCATIONS, PARTS, VESSELS, write, write_register

from fleet.errors import FileRefused, Refused
from fleet.intake import check_register
from fleet.intake.results import Intake
from fleet.store import Engine, models
from fleet.tasks.register import RegisterLoaded, load_register
from fleet.tasks.surveys import SurveysLoaded

TODAY = date(2026, 12, 1)
Load = Callable[..., RegisterLoaded]
Survey = Callable[..., SurveysLoaded]
Rows = Callable[..., list[dict[str, Any]]]
Count = Callable[[], int]

ONE = "vessel,rules,design_code,in_service_on,nameplate_mawp [MPa]"


def test_the_first_load_is_one_entry_with_every_row(works: Engine, rows: Rows, entries: Count) -> None:
    assert entries() == 1
    kinds = [row["kind"] for row in rows(models.Entity)]
    assert {kind: kinds.count(kind) for kind in kinds} == {
        "vessel": 2,
        "part": 2,
        "location": 3,
        "relief device": 2,
    }
    assert len(rows(models.Inspection)) == 4
    assert [row["rows_loaded"] for row in rows(models.SourceFile)] == [2, 2, 3, 4, 2]


def test_what_was_written_is_kept_beside_what_was_understood(works: Engine, rows: Rows) -> None:
    part = rows(models.Part)[0]
    assert part["nominal_thickness_mm"] == 14.0
    assert json.loads(part["written"])["nominal_thickness"] == "14 mm"


def test_the_same_file_again_changes_nothing_and_says_so(
    works: Engine, tmp_path: Path, entries: Count
) -> None:
    again = load_register(works, write_register(tmp_path), by="A. Keel", today=TODAY)
    assert again.loaded == 0
    assert again.entry_no is None
    assert "vessels.csv was loaded before; nothing of it was changed." in again.sentence()
    assert {one.code for one in again.doubts} == {"already loaded"}
    assert entries() == 1


def test_other_bytes_that_say_the_same_write_nothing(works: Engine, load: Load, entries: Count) -> None:
    inches = PARTS.replace("inside_diameter [mm]", "inside_diameter [in]").replace(
        ",1000,", ",39.37007874015748,"
    )
    again = load(inches.replace(",800,", ",31.49606299212598,"), VESSELS + "\n")
    assert again.unchanged == 4
    assert again.loaded == 0
    assert again.entry_no is None
    assert entries() == 1


def test_a_correction_takes_over_the_day_of_the_row_it_replaces(
    works: Engine, load: Load, rows: Rows
) -> None:
    before = {row["entity_id"]: row for row in rows(models.Part)}
    loaded = load(PARTS.replace(",14,138", ",13,138"))
    assert loaded.wrote == {"parts": 1}
    assert loaded.unchanged == 1
    after = rows(models.Part)
    changed = next(row for row in after if row["nominal_thickness_mm"] == 13)
    assert changed["replaces_id"] == before[changed["entity_id"]]["id"]
    assert changed["valid_from"] == before[changed["entity_id"]]["valid_from"]
    assert len(after) == 2


def test_a_column_that_the_file_lacks_stays_as_it_is(works: Engine, load: Load, rows: Rows) -> None:
    load("vessel,part,shape,material\nV-101,shell,cylinder,steel\n")
    part = next(row for row in rows(models.Part) if row["material"] == "steel")
    assert part["inside_diameter_mm"] == 1000
    assert json.loads(part["written"])["inside_diameter"] == "1000 mm"


def test_a_blank_cell_takes_the_value_back(works: Engine, load: Load, rows: Rows) -> None:
    load("vessel,part,shape,static_head [MPa]\nV-101,shell,cylinder,\n")
    part = next(row for row in rows(models.Part) if row["static_head_mpa"] is None)
    assert "static_head" not in json.loads(part["written"])


def test_a_change_holds_from_its_day_and_the_first_row_before(works: Engine, load: Load, rows: Rows) -> None:
    changed = date(2020, 1, 1)
    load(VESSELS.replace("feed drum", "slop drum"), from_on=changed)
    of = {
        day: [row["service"] for row in rows(models.Vessel, day)]
        for day in (date(2019, 12, 31), changed, TODAY)
    }
    assert of[date(2019, 12, 31)] == ["feed drum", "flash drum"]
    assert sorted(of[changed]) == ["flash drum", "slop drum"]
    assert of[changed] == of[TODAY]


def test_the_first_row_holds_from_the_beginning_even_under_a_day(load: Load, rows: Rows) -> None:
    load(VESSELS, from_on=date(2024, 1, 1))
    assert len(rows(models.Vessel, date(2011, 1, 1))) == 2
    load(VESSELS.replace("feed drum", "slop drum"), from_on=date(2015, 1, 1))
    assert rows(models.Vessel, date(2014, 12, 31))[0]["service"] == "feed drum"
    assert "slop drum" in {row["service"] for row in rows(models.Vessel, date(2015, 1, 1))}


def test_a_correction_of_a_change_leaves_the_rows_before_it(works: Engine, load: Load, rows: Rows) -> None:
    load(VESSELS.replace("feed drum", "slop drum"), from_on=date(2020, 1, 1))
    load(VESSELS.replace("feed drum", "slops drum"))
    assert {row["service"] for row in rows(models.Vessel, date(2019, 1, 1))} == {"feed drum", "flash drum"}
    assert {row["service"] for row in rows(models.Vessel, TODAY)} == {"slops drum", "flash drum"}
    load(VESSELS.replace("feed drum", "slop tank"), from_on=date(2020, 1, 1))
    assert {row["service"] for row in rows(models.Vessel, date(2020, 1, 1))} == {"slop tank", "flash drum"}
    assert len(rows(models.Vessel)) == 2


STARTING = (
    f"{ONE},current_mawp [MPa],current_mawp_from,current_mawp_basis,state,last_internal_on,last_external_on\n"
    "V-1,api510,asme8-1,2005-01-01,2.5,2.0,2015-06-01,thin shell,idle,2019-03-01,2023-03-01\n"
)
BASELINE = """\
vessel,part,location,baseline_thickness [in],baseline_on,state
V-101,shell,1,0.55,2009-11-01,
V-101,shell,2,0.56,,withdrawn
"""


def test_starting_values_become_the_facts_they_stand_for(load: Load, rows: Rows) -> None:
    loaded = load(STARTING)
    assert loaded.wrote == {"vessels": 1, "inspections": 2, "starting values": 2}
    (decision,) = rows(models.Decision)
    assert (decision["kind"], decision["pressure_mpa"], decision["reason"]) == (
        "re-rating",
        2.0,
        "thin shell",
    )
    assert decision["effective_on"] == date(2015, 6, 1)
    assert json.loads(decision["written"]) == {"pressure": "2.0 MPa"}
    looks = {(row["kind"], row["done_on"], row["extent"]) for row in rows(models.Inspection)}
    assert looks == {("internal", date(2019, 3, 1), "full"), ("external", date(2023, 3, 1), "full")}
    (state,) = rows(models.DatedState)
    assert (state["state"], state["from_on"], state["date_known"]) == ("idle", TODAY, "no")


def test_a_baseline_becomes_a_reading_and_one_without_its_day_does_not(load: Load, rows: Rows) -> None:
    load(VESSELS, PARTS, BASELINE)
    (reading,) = rows(models.Reading)
    assert (reading["kind"], reading["taken_on"], reading["thickness_mm"]) == (
        "baseline",
        date(2009, 11, 1),
        13.97,
    )
    assert json.loads(reading["written"]) == {"thickness": "0.55 in"}
    assert [row["state"] for row in rows(models.DatedState)] == ["withdrawn"]


def test_starting_values_that_agree_write_nothing_again(load: Load, entries: Count) -> None:
    load(STARTING)
    load(VESSELS, PARTS, BASELINE)
    before = entries()
    again = load(STARTING + "\n")
    assert (again.loaded, again.refused) == (0, None)
    assert load(BASELINE + "\n").loaded == 0
    assert entries() == before


@pytest.mark.parametrize(
    ("was", "now", "command"),
    [
        (",2.0,2015-06-01", ",1.8,2015-06-01", "fleet decide"),
        (",2015-06-01", ",2016-06-01", "fleet decide"),
        (",idle,", ",out of service,", "fleet state set"),
        (",2019-03-01", ",2024-03-01", "fleet inspection add"),
        (",2023-03-01", ",2024-03-01", "fleet inspection add"),
    ],
)
def test_a_starting_value_that_differs_names_the_command(
    load: Load, entries: Count, was: str, now: str, command: str
) -> None:
    load(STARTING)
    before = entries()
    again = load(STARTING.replace(was, now))
    assert again.refused is not None
    (fault,) = again.faults
    assert fault.code == "differs from the record"
    assert command in fault.remedy
    assert entries() == before


def test_a_blank_current_mawp_means_nameplate_and_another_is_a_decision(load: Load) -> None:
    load(f"{ONE}\nV-1,api510,asme8-1,2005-01-01,2.5\n")
    line = f"{ONE},current_mawp [MPa]\nV-1,api510,asme8-1,2005-01-01,2.5,"
    assert load(f"{line}2.5\n").refused is None
    assert load(f"{line}2.0\n").refused is not None


def test_an_inspection_that_stands_in_both_sheets_is_written_once(load: Load, rows: Rows) -> None:
    load(STARTING, "vessel,kind,done_on,inspector\nV-1,internal,2019-03-01,R. Salt\n")
    internal = [row for row in rows(models.Inspection) if row["kind"] == "internal"]
    assert [row["inspector"] for row in internal] == ["R. Salt"]


def test_a_current_mawp_without_its_day_holds_since_in_service_and_says_so(load: Load, rows: Rows) -> None:
    load(f"{ONE},current_mawp [MPa]\nV-1,api510,asme8-1,2005-01-01,2.5,2.0\n")
    (decision,) = rows(models.Decision)
    assert decision["effective_on"] == date(2005, 1, 1)
    assert [row["code"] for row in rows(models.Doubt)] == ["missing datum"]


def test_dry_run_says_what_would_be_done_and_writes_nothing(load: Load, entries: Count) -> None:
    loaded = load(VESSELS, PARTS, LOCATIONS, dry_run=True)
    assert loaded.wrote == {"vessels": 2, "parts": 2, "locations": 3}
    assert "Would be written: 2 vessels, 2 parts, 3 locations" in loaded.sentence()
    assert entries() == 0


BAD_PARTS = PARTS.replace("V-102,shell,cylinder,800", "V-102,shell,cylinder,eight")


def test_a_faulty_file_is_refused_whole_and_another_of_the_load_is_not(load: Load, rows: Rows) -> None:
    loaded = load(VESSELS, BAD_PARTS)
    assert isinstance(loaded.refused, FileRefused)
    assert loaded.refused.where == "register-1.csv"
    assert [fault.code for fault in loaded.refused.faults] == ["text in a number column"]
    assert len(rows(models.Vessel)) == 2
    assert rows(models.Part) == []
    assert loaded.as_json()["loaded"] == 2


def test_parked_rows_wait_once_and_settle_when_they_come_in_order(
    load: Load, rows: Rows, entries: Count
) -> None:
    loaded = load(VESSELS, BAD_PARTS, park=True, names=("v.csv", "p.csv"))
    assert (loaded.parked, loaded.refused) == (1, None)
    assert [row["status"] for row in rows(models.ParkedRow)] == ["waiting"]
    before = entries()
    assert load(BAD_PARTS, park=True, names=("p.csv",)).parked == 1
    assert entries() == before, "the same row waits already"
    assert load(PARTS, names=("p.csv",)).wrote == {"parts": 1}
    assert [row["status"] for row in rows(models.ParkedRow)] == ["settled"]


def test_a_doubt_is_kept_and_cleared_by_the_row_that_settles_it(load: Load, rows: Rows) -> None:
    head = "vessel,rules,design_code,in_service_on,design_pressure [MPa],nameplate_mawp [MPa]"
    load(f"{head}\nV-1,api510,asme8-1,2005-01-01,2.5,\n")
    assert [(row["code"], row["status"]) for row in rows(models.Doubt)] == [("nameplate blank", "open")]
    load(f"{head},service\nV-1,api510,asme8-1,2005-01-01,2.5,,feed\n")
    assert [row["status"] for row in rows(models.Doubt)] == ["open"], "it stands once, not twice"
    load(f"{head}\nV-1,api510,asme8-1,2005-01-01,2.5,2.4\n")
    assert [row["status"] for row in rows(models.Doubt)] == ["cleared"]


def test_nothing_is_written_on_what_somebody_else_changed_meanwhile(
    engine: Engine, load: Load, tmp_path: Path, monkeypatch: pytest.MonkeyPatch, entries: Count
) -> None:
    load(f"{ONE}\nV-9,api510,asme8-1,2005-01-01,2.5\n")
    read = check_register.read_register

    def slow(*args: Any, **how: Any) -> Intake:
        found = read(*args, **how)
        monkeypatch.setattr(check_register, "read_register", read)
        load(f"{ONE}\nV-8,api510,asme8-1,2005-01-01,2.5\n", names=("other.csv",))
        return found

    monkeypatch.setattr(check_register, "read_register", slow)
    with pytest.raises(Refused, match="somebody else wrote to the record"):
        load_register(engine, [write(tmp_path, "v.csv", VESSELS)], by="A. Keel", today=TODAY)
    assert entries() == 2


def test_a_blank_cell_takes_a_value_off_the_record_and_says_so(works: Engine, load: Load, rows: Rows) -> None:
    done = load("vessel,part,shape,structural_minimum [mm]\nV-101,shell,cylinder,6\n")
    assert "value taken off the record" not in {one.code for one in done.doubts}
    done = load("vessel,part,shape,structural_minimum [mm]\nV-101,shell,cylinder,\n")
    (told,) = [one for one in done.doubts if one.code == "value taken off the record"]
    assert told.found == "structural_minimum was 6 mm"
    assert told.code in {row["code"] for row in rows(models.Doubt)}


def test_the_same_bytes_tell_of_a_change_when_a_day_is_named(works: Engine, tmp_path: Path) -> None:
    path = write(tmp_path, "parts.csv", "vessel,part,shape,material\nV-101,shell,cylinder,SA-516-70\n")
    first = load_register(works, [path], by="A. Keel", today=TODAY)
    assert first.loaded == 1
    other = write(tmp_path, "other.csv", "vessel,part,shape,material\nV-101,shell,cylinder,SA-285-C\n")
    load_register(works, [other], by="A. Keel", today=TODAY)
    again = load_register(works, [path], by="A. Keel", today=TODAY, from_on=date(2026, 6, 1))
    assert again.loaded == 1


def test_an_inspection_whose_extent_nobody_said_can_be_told_again_with_it(works: Engine, load: Load) -> None:
    blank = load("vessel,kind,done_on\nV-101,internal,2025-05-05\n")
    assert blank.loaded == 1
    full = load("vessel,kind,done_on,extent\nV-101,internal,2025-05-05,full\n")
    assert full.loaded == 1
    again = load("vessel,kind,done_on,extent,inspector\nV-101,internal,2025-05-05,full,R. Salt\n")
    assert again.loaded == 0
