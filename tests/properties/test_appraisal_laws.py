"""Laws of an appraisal that hold for any numbers: more wall, faster loss, more doubt, another order of rows, more rows.

Two things the rules themselves except, so that no law is claimed there: a queried reading that is not the last of its
location (rule 1 leaves a high one out of the rates too), and an expected rate large enough to have shown in the
measured span (rule 3 leaves it behind).
"""

from __future__ import annotations

import copy
import sys
import time
from collections.abc import Callable
from dataclasses import replace
from datetime import date
from typing import Any

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from invented import Fleet, ordinal

from fleet.appraisal import appraise
from fleet.appraisal.inputs import Inputs
from fleet.appraisal.views import LocationView, VesselView
from fleet.words import NO_VERDICT, STANDINGS

AS_OF = date(2026, 1, 1)
CARRY_TO = date(2028, 7, 1)
moderate = settings(max_examples=25, deadline=None, suppress_health_check=[HealthCheck.too_slow])

SHAPES: tuple[dict[str, Any], ...] = (
    {"shape": "cylinder"},
    {"shape": "sphere"},
    {"shape": "ellipsoidal head", "axis_ratio": 2.0},
    {"shape": "torispherical head", "crown_radius_mm": 1000.0, "knuckle_radius_mm": 100.0},
    {"shape": "cone", "half_apex_angle_deg": 25.0},
    {"shape": "hemispherical head"},
)


@st.composite
def fleets(draw: st.DrawFn) -> Fleet:
    """Draw one vessel of one to three parts, each with one to three locations read one to four times."""
    fleet = Fleet()
    fleet.vessel(
        inspected=draw(st.sampled_from(["2012-01-01", "2020-01-01", None])),
        nameplate_mawp_mpa=draw(st.sampled_from([1.0, 2.5])),
        current_mawp_mpa=draw(st.sampled_from([None, 0.8, 1.3])),
        next_survey_day=draw(st.sampled_from([float("nan"), ordinal("2026-08-01"), ordinal("2029-01-01")])),
    )
    for number in range(draw(st.integers(1, 3))):
        part = fleet.part(0, f"part {number}", loss_side=draw(st.sampled_from(["inside", "outside", "both", ""])),
                          structural_minimum_mm=draw(st.sampled_from([0.0, 6.0])),
                          static_head_mpa=draw(st.sampled_from([0.0, 0.05])),
                          **draw(st.sampled_from(SHAPES)))  # fmt: skip
        for place in range(draw(st.integers(1, 3))):
            here = fleet.location(part, f"L{place}")
            wall = draw(st.floats(9.0, 15.0))
            day = ordinal("2006-01-01") + draw(st.integers(0, 500))
            for _ in range(draw(st.integers(1, 4))):
                fleet.read(here, (date.fromordinal(int(day)).isoformat(), wall))
                wall -= draw(st.floats(-0.5, 1.5))
                day += draw(st.integers(200, 2000))
    return fleet


def look(fleet: Fleet) -> VesselView:
    return fleet.view(AS_OF, carry_to=CARRY_TO)


def changed(fleet: Fleet, change: Callable[[Fleet], None]) -> VesselView:
    other = copy.deepcopy(fleet)
    change(other)
    return look(other)


def rank(view: VesselView) -> int:
    return STANDINGS.index(view.standing)


def places(view: VesselView) -> list[LocationView]:
    return [place for part in view.parts for place in part.locations]


def no_better(worse: float | None, than: float | None) -> bool:
    """Say whether a figure is absent or no greater than another, within rounding."""
    return worse is None or (than is not None and worse <= than * (1 + 1e-9) + 1e-9)


def assert_no_better(worse: VesselView, than: VesselView, *, or_absent: bool = False) -> None:
    # worse or absent: where a verdict rested on what is now missing, the worst that is still known stands
    assert rank(worse) <= (max(rank(than), STANDINGS.index(NO_VERDICT)) if or_absent else rank(than))
    for one, other in zip(places(worse), places(than), strict=True):
        assert no_better(one.mawp_today_mpa, other.mawp_today_mpa)
        assert no_better(one.projected_mawp_mpa, other.projected_mawp_mpa)
        assert one.retirement_on is None or (other.retirement_on and one.retirement_on <= other.retirement_on)


def last_of(fleet: Fleet, place: int) -> dict[str, Any]:
    rows = [row for row in fleet.readings if row["location"] == place]
    return max(rows, key=lambda row: float(row["taken_day"]))


def first_of(fleet: Fleet, place: int) -> dict[str, Any]:
    rows = [row for row in fleet.readings if row["location"] == place]
    return min(rows, key=lambda row: float(row["taken_day"]))


@moderate
@given(fleet=fleets(), more=st.floats(0.0, 3.0), data=st.data())
def test_more_wall_never_lowers_mawp_life_or_standing(fleet: Fleet, more: float, data: st.DataObject) -> None:
    place = data.draw(st.integers(0, len(fleet.locations) - 1))

    def thicker(other: Fleet) -> None:
        for row in other.readings:
            if row["location"] == place:
                row["thickness_mm"] += more

    assert_no_better(look(fleet), than=changed(fleet, thicker))


@moderate
@given(fleet=fleets(), more=st.floats(0.0, 3.0), data=st.data())
def test_faster_loss_never_lengthens_life(fleet: Fleet, more: float, data: st.DataObject) -> None:
    place = data.draw(st.integers(0, len(fleet.locations) - 1))

    def faster(other: Fleet) -> None:
        first = first_of(other, place)
        rest = [
            row["thickness_mm"] for row in other.readings if row["location"] == place and row is not first
        ]
        # where the first reading is itself the least, raising it is more wall, not a faster loss
        if rest and first["thickness_mm"] >= min(rest):
            first["thickness_mm"] += more

    assert_no_better(changed(fleet, faster), than=look(fleet))


@moderate
@given(fleet=fleets(), rates=st.tuples(st.floats(0.0, 0.5), st.floats(0.0, 0.5)))
def test_a_higher_floor_never_lengthens_life(fleet: Fleet, rates: tuple[float, float]) -> None:
    def with_floor(rate: float) -> Callable[[Fleet], None]:
        def change(other: Fleet) -> None:
            for row in other.locations:
                row["rate_floor_mm_per_year"] = rate

        return change

    slow, fast = sorted(rates)
    # a rate of nought gives no retirement date at all: start the comparison above it
    assert_no_better(changed(fleet, with_floor(0.001 + fast)), than=changed(fleet, with_floor(0.001 + slow)))


@moderate
@given(fleet=fleets(), lower=st.floats(0.0, 3.0), data=st.data())
def test_a_lower_last_reading_never_improves(fleet: Fleet, lower: float, data: st.DataObject) -> None:
    place = data.draw(st.integers(0, len(fleet.locations) - 1))

    def thinner(other: Fleet) -> None:
        last_of(other, place)["thickness_mm"] -= lower

    assert_no_better(changed(fleet, thinner), than=look(fleet))


@moderate
@given(fleet=fleets(), data=st.data())
def test_querying_the_last_reading_never_improves(fleet: Fleet, data: st.DataObject) -> None:
    place = data.draw(st.integers(0, len(fleet.locations) - 1))

    def query(other: Fleet) -> None:
        last_of(other, place)["status"] = "queried"

    assert_no_better(changed(fleet, query), than=look(fleet), or_absent=True)


@moderate
@given(fleet=fleets(), data=st.data())
def test_a_queried_reading_lower_than_expected_goes_on_governing_and_never_improves(
    fleet: Fleet, data: st.DataObject
) -> None:
    place = data.draw(st.integers(0, len(fleet.locations) - 1))
    rows = sorted(
        (row for row in fleet.readings if row["location"] == place), key=lambda row: float(row["taken_day"])
    )
    walls = [row["thickness_mm"] for row in rows]
    chosen = data.draw(st.integers(0, len(rows) - 1))
    if walls[chosen] > min([14.0, *walls[:chosen]]):
        return

    def query(other: Fleet) -> None:
        other.readings[fleet.readings.index(rows[chosen])]["status"] = "queried"

    queried, accepted = changed(fleet, query), look(fleet)
    assert [each.wall_used_mm for each in places(queried)] == [each.wall_used_mm for each in places(accepted)]
    assert_no_better(queried, than=accepted, or_absent=True)
    assert "queried low reading governs" in [doubt.code for doubt in queried.doubts]


@moderate
@given(
    fleet=fleets(),
    result=st.sampled_from(["no echo", "no access", "lamination"]),
    days=st.integers(1, 500),
    data=st.data(),
)
def test_a_failed_reading_never_improves(fleet: Fleet, result: str, days: int, data: st.DataObject) -> None:
    place = data.draw(st.integers(0, len(fleet.locations) - 1))

    def fail(other: Fleet) -> None:
        day = date.fromordinal(int(last_of(other, place)["taken_day"]) + days).isoformat()
        other.read(place, (day, None), result=result)

    assert_no_better(changed(fleet, fail), than=look(fleet), or_absent=True)


@moderate
@given(
    fleet=fleets(),
    column=st.sampled_from(
        ["allowable_stress_mpa", "static_head_mpa", "inside_diameter_mm", "nominal_thickness_mm"]
    ),
    data=st.data(),
)
def test_a_blank_datum_never_improves(fleet: Fleet, column: str, data: st.DataObject) -> None:
    part = data.draw(st.integers(0, len(fleet.parts) - 1))

    def blank(other: Fleet) -> None:
        other.parts[part][column] = None

    assert_no_better(changed(fleet, blank), than=look(fleet), or_absent=True)


@moderate
@given(fleet=fleets(), name=st.sampled_from(["lined", "vacuum", "unread part", "unread location"]))
def test_what_was_never_told_or_measured_never_improves(fleet: Fleet, name: str) -> None:
    def doubt(other: Fleet) -> None:
        if name == "lined":
            other.parts[0] |= {
                "lining": "integral clad",
                "lining_counts_in_strength": "no",
                "lining_thickness_mm": 3.0,
            }
        elif name == "vacuum":
            other.vessels[0]["external_design_pressure_mpa"] = 0.1
        elif name == "unread part":
            other.part(0, "boot")
        else:
            other.location(0, "unread")

    before, after = look(fleet), changed(fleet, doubt)
    assert rank(after) <= rank(before) or after.standing == NO_VERDICT
    for figure in ("mawp_today_mpa", "projected_mawp_mpa"):
        if name != "lined":
            assert no_better(getattr(after, figure), getattr(before, figure))


def plain(view: VesselView) -> dict[str, Any]:
    """Give the object of the contract with its lists in order of name, less the names that a tie may swap."""
    document = view.as_json()
    for key in ("governing_pressure", "governing_life", "governing_due"):
        document[key] = document[key] is None
    for key in ("doubts", "gaps"):
        document[key] = sorted(str(entry) for entry in document[key])
    for part in document["parts"]:
        part["locations"] = sorted(part["locations"], key=lambda place: str(place["location"]))
    document["parts"] = sorted(document["parts"], key=lambda part: str(part["part"]))
    return document


def shuffled(fleet: Fleet, seed: int) -> Fleet:
    """Put parts, locations and readings in another order."""
    mixed = np.random.default_rng(seed)
    other = copy.deepcopy(fleet)
    family = ((other.locations, other.parts, "part"), (other.readings, other.locations, "location"))
    for children, parents, key in family:
        order = mixed.permutation(len(parents)).tolist()
        parents[:] = [parents[old] for old in order]
        for row in children:
            row[key] = order.index(row[key])
    for rows in (other.readings, other.inspections):
        rows[:] = [rows[old] for old in mixed.permutation(len(rows)).tolist()]
    return other


@moderate
@given(fleet=fleets(), seed=st.integers(0, 1000))
def test_the_order_of_rows_does_not_matter(fleet: Fleet, seed: int) -> None:
    assert plain(shuffled(fleet, seed).view(AS_OF)) == plain(fleet.view(AS_OF))


@settings(moderate, max_examples=8)
@given(first=fleets(), second=fleets())
def test_the_order_of_vessels_does_not_matter(first: Fleet, second: Fleet) -> None:
    def joined(one: Fleet, other: Fleet) -> Fleet:
        out = copy.deepcopy(one)
        vessels, parts, places = len(one.vessels), len(one.parts), len(one.locations)
        later = copy.deepcopy(other)
        for rows, key, shift in ((later.parts, "vessel", vessels), (later.inspections, "vessel", vessels),
                                 (later.locations, "part", parts), (later.readings, "location", places)):  # fmt: skip
            for row in rows:
                row[key] += shift
        for name in ("vessels", "parts", "locations", "readings", "inspections"):
            getattr(out, name).extend(getattr(later, name))
        return out

    there, back = joined(first, second), joined(second, first)
    alone = [plain(fleet.view(AS_OF)) for fleet in (first, second)]
    assert [plain(there.view(AS_OF, vessel=i)) for i in (0, 1)] == alone
    assert [plain(back.view(AS_OF, vessel=i)) for i in (1, 0)] == alone


def big(vessels: int, places: int = 10, surveys: int = 4) -> Inputs:
    """Give many vessels of one cylinder with many locations, each read at every survey."""
    small = Fleet()
    small.vessel()
    small.part()
    small.location()
    small.read(0, ("2010-01-01", 13.0))
    table = small.inputs()
    rng = np.random.default_rng(1)
    n, m = vessels * places, vessels * places * surveys

    def repeat(rows: Any, count: int, **columns: Any) -> Any:
        return replace(rows, **({name: np.repeat(getattr(rows, name)[:1], count) for name in rows.__dataclass_fields__}
                                | columns))  # fmt: skip

    loss = rng.random(n) * 0.2
    survey = np.repeat(np.arange(surveys), n)
    return replace(
        table,
        vessels=repeat(table.vessels, vessels),
        parts=repeat(table.parts, vessels, vessel=np.arange(vessels)),
        locations=repeat(table.locations, n, part=np.repeat(np.arange(vessels), places)),
        readings=repeat(
            table.readings, m, location=np.tile(np.arange(n), surveys),
            taken_day=ordinal("2010-01-01") + 1400.0 * survey,
            thickness_mm=13.0 - np.tile(loss, surveys) * survey * 1400 / 365.25,
        ),
        inspections=repeat(table.inspections, vessels, vessel=np.arange(vessels)),
    )  # fmt: skip


def calls(inputs: Inputs) -> int:
    """Count the Python functions that one appraisal calls."""
    number = 0

    def count(_frame: object, event: str, _arg: object) -> None:
        nonlocal number
        number += event == "call"

    sys.setprofile(count)
    try:
        appraise(inputs, as_of=AS_OF)
    finally:
        sys.setprofile(None)
    return number


def test_no_python_loop_runs_over_locations_or_readings() -> None:
    few, many = big(50, places=4), big(50, places=80, surveys=4)
    assert len(many.locations) == 20 * len(few.locations) == 4_000
    assert calls(many) < 1.05 * calls(few)


@pytest.mark.slow
def test_twenty_times_more_locations_cost_no_more_than_they_should() -> None:
    def seconds(inputs: Inputs) -> float:
        best = float("inf")
        for _ in range(3):
            begun = time.perf_counter()
            appraise(inputs, as_of=AS_OF)
            best = min(best, time.perf_counter() - begun)
        return best

    few, many = big(100), big(2000)
    assert len(many.locations) == 20 * len(few.locations) == 20_000
    assert seconds(many) < 60 * seconds(few)
