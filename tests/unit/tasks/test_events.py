"""Restarts, states, decisions and settings: what is recorded and what is refused."""

from __future__ import annotations

import math
from collections.abc import Callable
from datetime import date
from typing import Any

import pytest

from fleet.errors import Refused, UnknownTag
from fleet.store import Engine, models
from fleet.tasks.events import add_decision, add_restart, set_setting, set_state

Rows = Callable[..., list[dict[str, Any]]]
Count = Callable[[], int]
DAY = date(2024, 5, 1)
RESTART: dict[str, Any] = {
    "vessel": "V-101",
    "part": "shell",
    "locations": ["1"],
    "kind": "new metal",
    "what": "replaced",
    "happened_on": DAY,
    "reason": "new course",
    "by": "A. Keel",
}
DECISION: dict[str, Any] = {
    "vessel": "V-101",
    "kind": "re-rating",
    "decided_on": DAY,
    "decided_by": "A. Keel",
    "reason": "thin",
    "by": "A. Keel",
    "pressure_mpa": 2.0,
}


def test_a_restart_names_its_locations_and_keeps_the_walls_measured_then(works: Engine, rows: Rows) -> None:
    add_restart(works, **RESTART, baselines_mm={"1": 13.9})
    (restart,) = rows(models.Restart)
    assert (restart["kind"], restart["happened_on"], restart["whole_part"]) == ("new metal", DAY, False)
    assert len(rows(models.RestartLocation)) == 1
    (baseline,) = rows(models.Reading)
    assert (baseline["kind"], baseline["taken_on"], baseline["thickness_mm"]) == ("baseline", DAY, 13.9)


@pytest.mark.parametrize(
    ("change", "found"),
    [
        ({"kind": "new paint"}, "kind is 'new paint'"),
        ({"what": "mended"}, "what is 'mended'"),
        ({"locations": []}, "no location is named"),
        ({"baselines_mm": {"1": math.nan}}, "the baseline of 1 is nan mm"),
        ({"baselines_mm": {"1": 0.0}}, "the baseline of 1 is 0.0 mm"),
    ],
)
def test_a_restart_that_says_too_little_is_refused(
    works: Engine, entries: Count, change: dict[str, Any], found: str
) -> None:
    with pytest.raises(Refused, match=found):
        add_restart(works, **{**RESTART, **change})
    assert entries() == 1


@pytest.mark.parametrize(
    ("change", "remedy"),
    [
        ({"vessel": "V101"}, "did you mean V-101"),
        ({"part": "shel"}, "did you mean shell"),
        ({"locations": ["1", "77"]}, "for instance 1, 2"),
    ],
)
def test_an_unknown_name_tells_the_nearest(works: Engine, change: dict[str, Any], remedy: str) -> None:
    with pytest.raises(UnknownTag, match=remedy):
        add_restart(works, **{**RESTART, **change})


def test_a_state_is_of_a_vessel_a_part_or_a_location(works: Engine, rows: Rows) -> None:
    about: dict[str, Any] = {"vessel": "V-101", "from_on": DAY, "reason": "moved", "by": "A. Keel"}
    set_state(works, state="idle", **about)
    set_state(works, state="withdrawn", part="shell", location="2", **about)
    assert [(row["state"], row["date_known"]) for row in rows(models.DatedState)] == [
        ("idle", "yes"),
        ("withdrawn", "yes"),
    ]
    with pytest.raises(Refused, match="state is 'withdrawn'"):
        set_state(works, state="withdrawn", **about)
    with pytest.raises(Refused, match="state is 'idle'"):
        set_state(works, state="idle", part="shell", **about)
    with pytest.raises(Refused, match="its part is not named"):
        set_state(works, state="withdrawn", location="2", **about)


@pytest.mark.parametrize(
    ("change", "found"),
    [
        ({"kind": "hope"}, "kind is 'hope'"),
        ({"pressure_mpa": None}, "pressure_mpa is missing"),
        ({"pressure_mpa": math.nan}, "the pressure is nan MPa"),
        ({"pressure_mpa": 0.0}, "the pressure is 0.0 MPa"),
        ({"reason": ""}, "reason is missing"),
        ({"decided_by": ""}, "decided_by is missing"),
        ({"kind": "deferral"}, "until_on is missing"),
        ({"kind": "chosen rate"}, "rate_mm_per_year is missing"),
        ({"kind": "chosen rate", "rate_mm_per_year": 0.1}, "rests_on is missing"),
        ({"kind": "chosen rate", "rate_mm_per_year": 0.1, "rests_on": "x"}, "review_on is missing"),
        (
            {"kind": "chosen rate", "rate_mm_per_year": -0.1, "rests_on": "x", "review_on": DAY},
            "the rate is -0.1 mm/year",
        ),
    ],
)
def test_a_decision_that_says_too_little_is_refused(
    works: Engine, entries: Count, change: dict[str, Any], found: str
) -> None:
    with pytest.raises(Refused, match=found):
        add_decision(works, **{**DECISION, **change})
    assert entries() == 1


def test_a_decision_keeps_what_was_written(works: Engine, rows: Rows) -> None:
    add_decision(works, **DECISION, written={"pressure": "290 psi"}, second_by="R. Salt")
    (row,) = rows(models.Decision)
    assert (row["pressure_mpa"], row["second_by"], row["written"]) == (
        2.0,
        "R. Salt",
        '{"pressure": "290 psi"}',
    )


@pytest.mark.parametrize(
    ("key", "value", "place", "found"),
    [
        ("reading_errror_mm", 0.2, {}, "no setting of that name"),
        ("reading_error_mm", 0.0, {}, "0.0 cannot be its value"),
        ("reading_error_mm", math.nan, {}, "nan cannot be its value"),
        ("rate_floor_mm_per_year", -0.1, {}, "-0.1 cannot be its value"),
        ("list_life_years", 2.0, {"vessel": "V-101"}, "it was to be set for vessel V-101"),
    ],
)
def test_a_setting_that_cannot_be_is_refused(
    works: Engine, key: str, value: float, place: dict[str, Any], found: str
) -> None:
    with pytest.raises(Refused, match=found):
        set_setting(works, key=key, value=value, from_on=DAY, by="A. Keel", **place)


def test_a_floor_of_nothing_may_be_chosen_by_name(works: Engine, rows: Rows) -> None:
    set_setting(works, key="rate_floor_mm_per_year", value=0.0, from_on=DAY, by="A. Keel")
    assert [(row["key"], row["value"]) for row in rows(models.Setting)] == [("rate_floor_mm_per_year", "0.0")]
