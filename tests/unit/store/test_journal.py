"""The journal: entries, numbers, digests, and what is refused. On both engines."""

from __future__ import annotations

import datetime as dt
import math
from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from sqlalchemy import Engine

import fleet
from fleet import errors
from fleet.store import facts, journal
from fleet.store.models import (
    Entity,
    Inspection,
    JournalHead,
    Reading,
    SavedAppraisal,
    Setting,
    Survey,
    Vessel,
)
from fleet.store.record import FIRST_PREVIOUS

Fill = Callable[[Engine], dict[str, int]]
DAY = dt.date(2020, 1, 2)
KNOWN_DIGESTS = ["297199e7c7f017c4", "57ba666f56658fa0", "d0e9d5087ed4eaf4"]
SETTING = {"key": "floor", "value": "0.025 mm/year", "from_on": DAY}


def _reading(at: int, **values: Any) -> dict[str, Any]:
    row = {"location_id": at, "taken_on": DAY, "thickness_mm": 10.0, "result": "read"}
    return {**row, "kind": "reading", "status": "accepted", **values}


def test_an_empty_journal_has_head_zero(engine: Engine) -> None:
    with engine.connect() as conn:
        assert journal.head(conn) == journal.Head(0, FIRST_PREVIOUS)
        assert journal.verify(conn) == []
        assert journal.number_at(conn, dt.datetime.now(dt.UTC)) == 0


def test_an_entry_says_who_when_why_and_what_it_wrote(engine: Engine) -> None:
    at = dt.datetime(2026, 12, 1, 9, 30, tzinfo=dt.timezone(dt.timedelta(hours=2)))
    with journal.writer(
        engine, task="setting set", by="A. Keel", role="engineer", why="policy", at=at
    ) as entry:
        assert entry.no == 1
        assert entry.add(Setting, [SETTING, SETTING]) == [1, 2]
    assert entry.wrote
    with engine.connect() as conn:
        [row] = journal.entries(conn)
        head = journal.head(conn)
    assert row["at"] == "2026-12-01T07:30:00.000000+00:00"
    assert (row["by"], row["role"], row["why"], row["task"]) == (
        "A. Keel",
        "engineer",
        "policy",
        "setting set",
    )
    assert row["program_version"] == fleet.__version__
    assert row["wrote"] == {"setting": [1, 2]}
    assert row["previous_hash"] == FIRST_PREVIOUS
    assert head == journal.Head(1, row["hash"])


def test_an_entry_that_adds_nothing_is_no_entry(engine: Engine) -> None:
    with journal.writer(engine, task="register load", by="A. Keel") as entry:
        assert entry.add(Setting, []) == []
    assert not entry.wrote
    with engine.connect() as conn:
        assert journal.head(conn).no == 0


def test_an_entry_that_fails_leaves_nothing(engine: Engine) -> None:
    def fail(entry: journal.Entry) -> None:
        entry.add(Setting, [SETTING])
        raise RuntimeError("midway")

    with (
        pytest.raises(RuntimeError, match="midway"),
        journal.writer(engine, task="register load", by="A. Keel") as entry,
    ):
        fail(entry)
    with engine.connect() as conn:
        assert journal.head(conn).no == 0
        assert facts.columns(conn, Setting, known=9)["id"] == []


def test_entries_follow_each_other(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with engine.connect() as conn:
        rows = journal.entries(conn)
        assert [row["no"] for row in rows] == [1, 2, 3]
        assert [row["previous_hash"] for row in rows[1:]] == [row["hash"] for row in rows[:-1]]
        assert journal.entries(conn, numbers=[2]) == rows[1:2]
        assert journal.verify(conn) == []


def test_keys_run_on_within_and_across_entries(engine: Engine, fill: Fill) -> None:
    location = fill(engine)["location"]
    with journal.writer(engine, task="survey load", by="B. Stern") as entry:
        assert entry.add(Reading, [_reading(location)]) == [4]
        assert entry.add(Reading, [_reading(location), _reading(location)]) == [5, 6]
    with engine.connect() as conn:
        assert journal.entries(conn)[-1]["wrote"] == {"reading": [4, 6]}
        assert journal.verify(conn) == []


def test_the_digest_is_the_same_in_whatever_order_tables_are_written(engine: Engine, fill: Fill) -> None:
    vessel = fill(engine)["vessel"]
    inspection = {"vessel_id": vessel, "kind": "external", "done_on": DAY}
    with journal.writer(engine, task="x", by="A. Keel") as entry:
        entry.add(Setting, [SETTING])
        entry.add(Inspection, [inspection])
        entry.add(Setting, [SETTING])
    with engine.connect() as conn:
        assert journal.verify(conn) == []


def test_the_digest_does_not_depend_on_the_engine(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with engine.connect() as conn:
        digests = [row["facts_digest"][:16] for row in journal.entries(conn)]
    # Reckoned once; both engines have to give the same, today and after every later migration.
    assert digests == KNOWN_DIGESTS


def test_a_time_becomes_the_last_entry_written_by_then(engine: Engine) -> None:
    start = dt.datetime(2026, 1, 1, tzinfo=dt.UTC)
    for days in (0, 1, 1, 5):
        with journal.writer(engine, task="x", by="A. Keel", at=start + dt.timedelta(days=days)) as entry:
            entry.add(Setting, [SETTING])
    with engine.connect() as conn:
        numbers = [journal.number_at(conn, start + dt.timedelta(days=days)) for days in (-1, 0, 0.5, 1, 4, 9)]
        assert numbers == [0, 1, 1, 3, 3, 4]
        with pytest.raises(errors.OurFault, match="time zone"):
            journal.number_at(conn, dt.datetime(2026, 1, 1))  # noqa: DTZ001  refused for want of a zone


def test_time_never_runs_backwards(engine: Engine) -> None:
    ahead = dt.datetime.now(dt.UTC) + dt.timedelta(days=1)
    with journal.writer(engine, task="x", by="A. Keel", at=ahead) as entry:
        entry.add(Setting, [SETTING])
    with journal.writer(engine, task="x", by="A. Keel") as entry:
        entry.add(Setting, [SETTING])
    with engine.connect() as conn:
        assert [row["at"] for row in journal.entries(conn)] == [ahead.isoformat(timespec="microseconds")] * 2
    early = ahead - dt.timedelta(seconds=1)
    with (
        pytest.raises(errors.Refused, match="before the last entry"),
        journal.writer(engine, task="x", by="A. Keel", at=early),
    ):
        pass


def test_somebody_must_be_named(engine: Engine) -> None:
    with pytest.raises(errors.Refused, match="nobody is named"), journal.writer(engine, task="x", by=" "):
        pass
    naive = dt.datetime(2026, 1, 1)  # noqa: DTZ001  refused for want of a zone
    with (
        pytest.raises(errors.OurFault, match="no time zone"),
        journal.writer(engine, task="x", by="A", at=naive),
    ):
        pass


@pytest.mark.parametrize(
    ("column", "value", "words"),
    [
        ("thickness_mm", math.nan, "finite"),
        ("thickness_mm", math.inf, "finite"),
        ("thickness_mm", "12.7", "number"),
        ("thickness_mm", True, "number"),
        ("taken_on", dt.datetime(2020, 1, 1, tzinfo=dt.UTC), "date without time"),
        ("taken_on", "2020-01-01", "date without time"),
        ("note", 7, "text"),
        ("note", "a\x00b", "null character"),
        ("note", "\ud800", "surrogates"),
        ("source_row", 1.5, "cannot be recorded"),
        ("source_row", 2**31, "32 bits"),
        ("source_row", "3", "whole number"),
        ("thickness_mm", -1.0, "ck_reading_thickness_mm_positive"),
        ("thickness_mm", 0.0, "ck_reading_thickness_mm_positive"),
        ("result", "no echo", "ck_reading_thickness_fits_result"),
        ("status", "queried", "ck_reading_status_has_reason"),
        ("kind", "guess", "ck_reading_kind_known"),
        ("location_id", 999, "(?i)foreign key"),
    ],
)
def test_what_cannot_be_kept_is_refused(
    engine: Engine, fill: Fill, column: str, value: object, words: str
) -> None:
    location = fill(engine)["location"]
    with (
        pytest.raises(errors.Refused, match=words),
        journal.writer(engine, task="survey load", by="B. Stern") as entry,
    ):
        entry.add(Reading, [_reading(location), _reading(location, **{column: value})])
    with engine.connect() as conn:
        assert journal.head(conn).no == 3
        assert len(facts.columns(conn, Reading, known=9)["id"]) == 3


def test_columns_must_be_known_and_filled(engine: Engine) -> None:
    with journal.writer(engine, task="x", by="A. Keel") as entry:
        with pytest.raises(errors.OurFault, match="no such column to write: colour, entry_no"):
            entry.add(Setting, [{**SETTING, "colour": "grey", "entry_no": 4}])
        with pytest.raises(errors.OurFault, match="from_on is blank"):
            entry.add(Setting, [{"key": "floor", "value": "0"}])
        with pytest.raises(errors.OurFault, match="holds no facts"):
            entry.add(JournalHead, [{"no": 1}])


def test_a_failed_write_cannot_be_passed_over(engine: Engine, fill: Fill) -> None:
    """What a failed statement left behind would be in no digest: the entry is refused as a whole."""
    location = fill(engine)["location"]

    def pass_over(entry: journal.Entry) -> None:
        entry.add(Setting, [SETTING])
        with pytest.raises(errors.Refused, match="thickness_mm_positive"):
            entry.add(Reading, [_reading(location), _reading(location, thickness_mm=-1.0)])

    with (
        pytest.raises(errors.OurFault, match="passed over"),
        journal.writer(engine, task="survey load", by="B. Stern") as entry,
    ):
        pass_over(entry)
    with engine.connect() as conn:
        assert journal.head(conn).no == 3
        assert journal.verify(conn) == []


def test_one_row_is_replaced_once(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    again = _reading(ids["location"], replaces_id=ids["reading"])
    with journal.writer(engine, task="reading correct", by="A. Keel") as entry:
        with pytest.raises(errors.Refused, match="two rows replace the same one"):
            entry.add(Reading, [again, again])
        entry.add(Reading, [again])
    with journal.writer(engine, task="reading correct", by="A. Keel") as entry:
        with pytest.raises(errors.Refused, match=f"row {ids['reading']}: it was corrected before"):
            entry.add(Reading, [again])
        assert not entry.wrote


def test_a_tag_is_given_once(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    twice: list[dict[str, object]] = [
        {"kind": "vessel", "tag": "D-101"},
        {"kind": "part", "parent_id": ids["vessel"], "tag": "shell"},
    ]
    for row in twice:
        with (
            pytest.raises(errors.Refused, match=r"uq_entity|is there already"),
            journal.writer(engine, task="register load", by="A. Keel") as entry,
        ):
            entry.add(Entity, [row])
    with journal.writer(engine, task="register load", by="A. Keel") as entry:
        entry.add(Entity, [{"kind": "vessel", "tag": "shell"}])
        entry.add(Entity, [{"kind": "location", "parent_id": ids["vessel"], "tag": "shell"}])


def test_numbers_of_other_libraries_are_kept_as_plain_ones(engine: Engine, fill: Fill) -> None:
    location = fill(engine)["location"]
    with journal.writer(engine, task="survey load", by="B. Stern") as entry:
        [key] = entry.add(
            Reading,
            [_reading(int(location), thickness_mm=np.float64(12.5), source_row=np.int64(4), average_mm=13)],
        )
    with engine.connect() as conn:
        row = facts.columns(conn, Reading, known=4)
        assert journal.verify(conn) == []
    at = row["id"].index(key)
    assert (row["thickness_mm"][at], row["source_row"][at], row["average_mm"][at]) == (12.5, 4, 13.0)


def test_a_vessel_needs_some_pressure(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    row = {"entity_id": ids["vessel"], "valid_from": DAY, "rules": "api510", "design_code": "asme8-1"}
    with (
        pytest.raises(errors.Refused, match="ck_vessel_some_pressure_given"),
        journal.writer(engine, task="register load", by="A. Keel") as entry,
    ):
        entry.add(Vessel, [{**row, "in_service_on": DAY}])


TEXTS = st.text(st.characters(exclude_categories=["Cs"], exclude_characters="\x00"), max_size=30)


@settings(
    max_examples=25, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture]
)  # the database goes on growing, which does no harm here
@given(
    value=TEXTS,
    number=st.floats(allow_nan=False, allow_infinity=False),
    day=st.dates(),
    whole=st.integers(0, 2**31 - 1),
)
def test_whatever_is_kept_comes_back_and_verifies(
    engine: Engine, value: str, number: float, day: dt.date, whole: int
) -> None:
    with journal.writer(engine, task="x", by="A. Keel", why=value) as entry:
        entry.add(Survey, [{"name": value, "taken_from_on": day, "written": {"n": number, "t": value}}])
        [vessel] = entry.add(Entity, [{"kind": "vessel", "tag": f"V{entry.no}"}])
        if math.isfinite(number):
            row = {"entity_id": vessel, "valid_from": day, "rules": value, "design_code": "x"}
            rest = {"in_service_on": day, "design_pressure_mpa": 1.0, "operating_pressure_mpa": number}
            entry.add(Vessel, [{**row, **rest}])
        saved = {"name": f"{entry.no}", "as_of_on": day, "known_no": whole, "program_version": value}
        entry.add(SavedAppraisal, [{**saved, "journal_hash": "", "document": value}])
    with engine.connect() as conn:
        assert journal.verify(conn) == []
        known = journal.head(conn).no
        assert facts.columns(conn, Survey, known=known)["name"][-1] == value
        assert facts.columns(conn, Survey, known=known)["taken_from_on"][-1] == day
        assert facts.columns(conn, Vessel, known=known)["operating_pressure_mpa"][-1] == number
