"""Appraise, show, save; the same question gives the same answer."""

from __future__ import annotations

import json
from collections.abc import Callable
from datetime import UTC, date, datetime
from pathlib import Path
from typing import Any

import pytest

from fleet.errors import CheckFailed, DatabaseProblem, Refused, UnknownTag, UsageProblem
from fleet.reports import jsonout
from fleet.store import Engine, models
from fleet.store.engine import make_engine
from fleet.tasks.appraisals import appraise_fleet, save_appraisal, show_vessel
from fleet.tasks.database import new_database, open_database, upgrade_database
from fleet.tasks.events import set_setting
from fleet.tasks.history import journal_entries, journal_text, verify_journal
from fleet.tasks.surveys import SurveysLoaded

TODAY = date(2026, 12, 1)
Survey = Callable[..., SurveysLoaded]
Rows = Callable[..., list[dict[str, Any]]]


def test_a_vessel_shown_alone_is_the_vessel_of_the_list(surveyed: Engine) -> None:
    made = appraise_fleet(surveyed, as_of=TODAY)
    for view in made.appraisal.views():
        assert show_vessel(surveyed, view.vessel, as_of=TODAY).as_json() == view.as_json()


def test_an_unknown_tag_tells_the_nearest(surveyed: Engine) -> None:
    with pytest.raises(UnknownTag, match="did you mean V-101"):
        show_vessel(surveyed, "v101", as_of=TODAY)
    with pytest.raises(UnknownTag, match="vessel 'V-7'"):
        appraise_fleet(surveyed, as_of=TODAY, tags=["V-101", "V-7"])


def test_a_vessel_that_was_not_known_yet_is_unknown(surveyed: Engine) -> None:
    with pytest.raises(UnknownTag, match="load the register first"):
        show_vessel(surveyed, "V-101", as_of=TODAY, known_at=datetime(2001, 1, 1, tzinfo=UTC))


def test_carrying_back_in_time_is_no_question(surveyed: Engine) -> None:
    with pytest.raises(UsageProblem, match="lies before the as-of date"):
        appraise_fleet(surveyed, as_of=TODAY, carry_to=date(2026, 11, 30))


@pytest.mark.parametrize("day", [date.min, date(1799, 12, 31), date(2201, 1, 1), date.max])
def test_a_day_outside_any_works_time_is_no_question(surveyed: Engine, day: date) -> None:
    with pytest.raises(UsageProblem, match="is no day of a works"):
        appraise_fleet(surveyed, as_of=day)
    if day > TODAY:
        with pytest.raises(UsageProblem, match="--carry-to"):
            appraise_fleet(surveyed, as_of=TODAY, carry_to=day)


def test_the_carry_to_date_asked_for_is_the_one_answered(surveyed: Engine) -> None:
    view = show_vessel(surveyed, "V-101", as_of=TODAY, carry_to=date(2029, 1, 1))
    assert view.carry_to_on == date(2029, 1, 1)


def test_what_was_known_then_is_answered_byte_for_byte_the_same(surveyed: Engine, survey: Survey) -> None:
    def answer() -> str:
        return jsonout.dumps(jsonout.derating(appraise_fleet(surveyed, as_of=TODAY, known_at=then).appraisal))

    then = datetime.now(UTC)
    before = answer()
    survey("vessel,part,location,taken_on,thickness [mm]\nV-101,shell,1,2026-11-03,10\n")
    set_setting(surveyed, key="reading_error_mm", value=0.5, from_on=date(2000, 1, 1), by="A. Keel")
    assert answer() == before
    now = jsonout.dumps(jsonout.derating(appraise_fleet(surveyed, as_of=TODAY).appraisal))
    assert now != before


def test_a_saved_appraisal_never_changes_and_its_name_is_taken(surveyed: Engine, rows: Rows) -> None:
    made = appraise_fleet(surveyed, as_of=TODAY)
    save_appraisal(surveyed, made, name="list 2026", by="A. Keel")
    (saved,) = rows(models.SavedAppraisal)
    assert (saved["as_of_on"], saved["known_no"]) == (TODAY, made.appraisal.journal_no)
    document = json.loads(saved["document"])
    assert [vessel["vessel"] for vessel in document["vessels"]] == ["V-101", "V-102"]
    assert document["vessels"][0]["parts"]
    with pytest.raises(Refused, match="never changes"):
        save_appraisal(surveyed, made, name="list 2026", by="A. Keel")
    with pytest.raises(Refused, match="the name is blank"):
        save_appraisal(surveyed, made, name=" ", by="A. Keel")


def test_the_grounds_name_settings_rule_sets_and_version(surveyed: Engine) -> None:
    set_setting(
        surveyed, key="reading_error_mm", value=0.3, from_on=TODAY, by="A. Keel", vessel="V-101", part="shell"
    )
    grounds = appraise_fleet(surveyed, as_of=TODAY).grounds
    assert ("reading error", "0.25 mm") in grounds.settings
    assert ("reading error, V-101 / shell", "0.3 mm") in grounds.settings
    assert [title.split(",")[0] for title in grounds.rules or ()] == ["API 510", "Choices of this project"]


def test_a_row_that_waits_for_an_unknown_vessel_is_a_gap_of_no_vessel(
    surveyed: Engine, survey: Survey
) -> None:
    survey("vessel,part,location,taken_on,thickness [mm]\nV-999,shell,1,2026-06-03,9\n", park=True)
    made = appraise_fleet(surveyed, as_of=TODAY)
    (waiting,) = made.waiting
    assert waiting.code == "parked row"
    assert "survey.csv" in waiting.where
    assert "unknown vessel" in waiting.found
    assert jsonout.gaps(made.appraisal, made.waiting)[-1]["vessel"] is None


def test_the_journal_tells_who_wrote_about_a_vessel(surveyed: Engine, survey: Survey) -> None:
    survey("vessel,part,location,taken_on,thickness [mm]\nV-102,shell,1,2026-07-03,9\n")
    assert [one["no"] for one in journal_entries(surveyed)] == [1, 2, 3, 4, 5]
    assert [one["no"] for one in journal_entries(surveyed, "V-101")] == [1, 2, 3, 4]
    assert "B. Stern  survey load" in journal_text(journal_entries(surveyed, "V-102"))
    with pytest.raises(UnknownTag, match="did you mean V-101"):
        journal_entries(surveyed, "V 101")


def test_a_whole_journal_is_whole_and_a_changed_one_is_not(tmp_path: Path) -> None:
    new_database(tmp_path / "fleet.db")
    engine = open_database(tmp_path / "fleet.db")
    set_setting(engine, key="reading_error_mm", value=0.5, from_on=TODAY, by="A. Keel")
    checked = verify_journal(engine)
    assert checked.whole
    assert checked.failed is None
    assert verify_journal(engine, against=checked.hash).whole
    with engine.begin() as conn:
        for (name,) in conn.exec_driver_sql("SELECT name FROM sqlite_master WHERE type='trigger'").all():
            conn.exec_driver_sql(f"DROP TRIGGER {name}")
        conn.exec_driver_sql("UPDATE setting SET value = '0.1'")
    broken = verify_journal(engine)
    assert not broken.whole
    assert [one.what for one in broken.findings] == ["altered"]
    assert broken.guard_missing
    assert "setting" in broken.text()
    assert isinstance(broken.failed, CheckFailed)
    assert broken.as_json()["whole"] is False


def test_a_database_is_made_once_and_opened_only_if_it_is_ours(tmp_path: Path) -> None:
    new_database(tmp_path / "fleet.db")
    with pytest.raises(Refused, match="holds something already"):
        new_database(tmp_path / "fleet.db")
    with pytest.raises(DatabaseProblem, match="no database is there"):
        open_database(tmp_path / "other.db")
    (tmp_path / "blank.db").touch()
    with pytest.raises(DatabaseProblem, match="holds no record of fleet"):
        open_database(tmp_path / "blank.db")
    with pytest.raises(DatabaseProblem, match="holds no record of fleet"):
        upgrade_database(tmp_path / "blank.db")
    done = upgrade_database(tmp_path / "fleet.db")
    assert done.before == done.after


def test_a_database_of_another_version_names_what_to_do(tmp_path: Path) -> None:
    new_database(tmp_path / "fleet.db")
    for version, remedy in (("0000", "newer|upgrade"), ("9999", "install the newer version")):
        with make_engine(tmp_path / "fleet.db").begin() as conn:
            conn.exec_driver_sql(f"UPDATE alembic_version SET version_num = '{version}'")
        with pytest.raises(DatabaseProblem, match=remedy):
            open_database(tmp_path / "fleet.db")
    with pytest.raises(DatabaseProblem, match="install the newer version"):
        upgrade_database(tmp_path / "fleet.db")
