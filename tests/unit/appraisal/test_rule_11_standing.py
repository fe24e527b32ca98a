"""Rule 11, standing, flags and block: one location, required 10 mm by its structural minimum, read on 2024-01-01."""

from __future__ import annotations

from datetime import date
from typing import Any

import numpy as np
import pytest
from handsums import FIRST, LAST, add_steady, days_after, outside_hoop, steady
from invented import Fleet, ordinal

from fleet import words
from fleet.appraisal import appraise
from fleet.appraisal.inputs import (
    Decisions,
    IdleTimes,
    Inputs,
    Inspections,
    Locations,
    Parts,
    Readings,
    Relief,
    Restarts,
    Settings,
    Vessels,
)

PLANNED: dict[str, Any] = {
    "next_survey_day": ordinal("2027-01-01")
}  # three years and a day after the last reading


@pytest.mark.parametrize(
    ("wall", "rate", "standing"),
    [
        (9.99, 0.01, "below required"),
        (10.4, 0.01, "at required"),  # less than 0.41125 above
        (10.45, 0.25, "used up by its rate"),  # 10.45 - 0.25·2.0 = 9.95 today
        (11.0, 0.25, "rating short"),  # 11 - 0.5·3.0 = 9.5 on the carry-to date
        (12.0, 0.25, "running out"),  # retires 2032, within 10 years
        (14.0, 0.25, "rating held"),  # retires 2040
    ],
)
def test_rule_11_1_every_standing_of_a_measured_vessel(wall: float, rate: float, standing: str) -> None:
    view = steady(wall, rate, **PLANNED).view()
    assert view.standing == standing
    assert view.parts[0].locations[0].standing == standing


def test_rule_11_1_no_verdict_where_nothing_was_measured() -> None:
    fleet = Fleet()
    fleet.vessel()
    fleet.location(fleet.part())
    assert fleet.view().standing == "no verdict"


def test_rule_11_1_the_order_is_worst_first() -> None:
    assert words.STANDINGS == (
        "below required", "at required", "used up by its rate", "rating short", "no verdict", "running out",
        "rating held",
    )  # fmt: skip


@pytest.mark.parametrize(("first", "second"), [(9.99, 10.4), (10.4, 11.0), (11.0, 12.0), (12.0, 14.0)])
def test_rule_11_1_the_worst_location_gives_the_standing(first: float, second: float) -> None:
    def both(*walls: float) -> str:
        fleet = Fleet()
        fleet.vessel(inspected=LAST, **PLANNED)
        for number, wall in enumerate(walls):
            rate = 0.01 if wall < 10.5 else 0.25
            add_steady(fleet, 0, f"part {number}", wall, rate, structural_minimum_mm=10.0)
        return fleet.view().standing

    worse = steady(first, 0.01 if first < 10.5 else 0.25, **PLANNED).view().standing
    assert both(first, second) == both(second, first) == worse


def test_rule_11_2_used_up_is_by_the_single_loss_to_the_as_of_date() -> None:
    # 10.5 - 0.25·Y = 10 after two years = 730.5 days
    fleet = steady(10.5, 0.25, **PLANNED)
    assert fleet.view(days_after(LAST, 730)).standing == "rating short"
    assert fleet.view(days_after(LAST, 731)).standing == "used up by its rate"


def test_rule_11_3_short_by_wall_at_the_carry_to_date() -> None:
    # 11.5 - 0.5·Y = 10 after three years = 1095.75 days
    fleet = steady(11.5, 0.25)
    assert fleet.view(carry_to=days_after(LAST, 1095)).standing == "running out"
    assert fleet.view(carry_to=days_after(LAST, 1096)).standing == "rating short"


def test_rule_11_3_short_by_pressure_at_the_carry_to_date() -> None:
    # no structural minimum; 5.1195 mm for 1 MPa: a wall of 6.1195 at 0.25 holds two years at twice the loss, 730.5 days
    fleet = steady(outside_hoop(1.0) + 1.0, 0.25, required=0.0)
    assert fleet.view("2024-02-01", carry_to=days_after(LAST, 730)).standing == "running out"
    short = fleet.view("2024-02-01", carry_to=days_after(LAST, 731))
    assert short.standing == "rating short"
    assert short.projected_mawp_mpa is not None
    assert short.projected_mawp_mpa < 1.0


def short_of(part: float) -> str:
    """Give the standing where the limit of a flange lies a small part below the current MAWP."""
    fleet = steady(14.0, 0.25)
    fleet.parts[0]["other_pressure_limit_mpa"] = 1.0 - part
    return fleet.view().standing


def test_rule_11_3_short_by_the_projected_mawp_within_a_relative_tolerance_of_one_millionth() -> None:
    assert short_of(0.9e-6) == "rating held"
    assert short_of(1.1e-6) == "rating short"


def test_rule_11_4_running_out_within_ten_years() -> None:
    # as-of 2026-01-01 plus 10 years = 3652 days is 2035-12-31, 4382 days after the last reading: life 11.997 years
    assert days_after("2026-01-01", 3652) == days_after(LAST, 731 + 3652)
    assert steady(10.0 + 0.25 * 4383 / 365.25, 0.25, inspected="2026-01-01").view().standing == "running out"
    assert (
        steady(10.0 + 0.25 * 4384.5 / 365.25, 0.25, inspected="2026-01-01").view().standing == "rating held"
    )


def test_rule_11_4_running_out_within_twice_the_internal_interval() -> None:
    # the shell, life 3 years, sets an interval of 2: as-of 2024-02-01 plus 4 years of 1461 days is 2028-02-01
    fleet = steady(10.75, 0.25, next_survey_day=ordinal("2024-03-01"))
    add_steady(fleet, 0, "within", 11.02, 0.25, structural_minimum_mm=10.0)  # life 4.08 years: 2028-01-30
    add_steady(fleet, 0, "beyond", 11.75, 0.25, structural_minimum_mm=10.0)  # life 7 years
    view = fleet.view("2024-02-01")
    assert view.internal_interval_years == pytest.approx(2.0)
    assert view.standing == "running out"
    assert [part.locations[0].standing for part in view.parts] == [
        "running out",
        "running out",
        "rating held",
    ]


def test_rule_11_5_flag_overdue() -> None:
    assert "overdue" in steady(12.0, 0.25).view("2028-06-01").flags
    assert "overdue" not in steady(12.0, 0.25).view().flags


def test_rule_11_5_flag_survey_within_the_year() -> None:
    assert steady(14.0, 0.25, next_survey_day=ordinal("2026-09-01")).view().flags == (
        "survey within the year",
    )


def doubtful_rate() -> Fleet:
    """Give a vessel held by its long-term rate whose short-term rate, within its error, would use it up.

    20 years from 13.4 to 12.8 and 2 years from there to 12.4: long 1.0/22 = 0.045, short 0.4/2 = 0.2 mm/year; their
    difference of 0.155 is less than three errors of 0.25·√(1/4 + 1/484 + (1/2 - 1/22)²) = 0.17.
    """
    fleet = Fleet()
    fleet.vessel(inspected=LAST, next_survey_day=ordinal("2027-01-01"))
    fleet.part(structural_minimum_mm=11.5)
    fleet.location()
    fleet.read(0, ("2002-01-01", 13.4), ("2022-01-01", 12.8), (LAST, 12.4))
    return fleet


def test_rule_11_5_flag_re_gauge() -> None:
    # 12.4 - 0.4·3.0 = 11.2 < 11.5, and 12.4 - 0.09·3.0 = 12.13; by 0.045 it lives 19.8 years
    view = doubtful_rate().view()
    assert (view.standing, view.flags, view.block) == ("rating short", ("re-gauge",), "re-gauge")


@pytest.mark.parametrize(
    ("state", "flag"), [("idle", "idle"), ("idle protected", "idle"), ("out of service",) * 2]
)
def test_rule_11_5_flag_idle_and_out_of_service(state: str, flag: str) -> None:
    view = steady(14.0, 0.25, state=state).view()
    assert flag in view.flags
    assert view.standing == "rating held"


@pytest.mark.parametrize("state", ["idle", "out of service"])
def test_rule_11_5_a_vessel_at_rest_may_be_overdue(state: str) -> None:
    assert steady(12.0, 0.25, state=state).view("2028-06-01").flags == ("overdue", state)


def test_rule_11_6_a_carry_to_date_that_is_the_half_life_date_reads_held_by_half_life() -> None:
    view = steady(14.0, 0.25, inspected="2025-01-01").view()  # half of 16 years: 2032-01-01
    assert (view.carry_to_on, view.standing, view.held_by_half_life) == (
        date(2032, 1, 1),
        "rating held",
        True,
    )
    planned = steady(14.0, 0.25, inspected="2025-01-01", next_survey_day=ordinal("2030-01-01")).view()
    assert not planned.held_by_half_life
    by_cap = steady(20.0, 0.25, inspected="2025-01-01").view()
    assert (by_cap.standing, by_cap.held_by_half_life) == ("rating held", False)


def test_rule_11_6_a_vessel_running_out_is_held_by_half_life_too() -> None:
    view = steady(12.0, 0.25).view()
    assert (view.carry_to_on, view.standing) == (date(2028, 1, 1), "running out")
    assert view.held_by_half_life


@pytest.mark.parametrize(
    ("state", "block"),
    [
        ("retired", "retired"),
        ("out of service", "out of service"),
        ("idle", "idle"),
        ("idle protected", "idle"),
        ("in service", "re-gauge"),
        ("", "re-gauge"),
    ],
)
def test_rule_11_7_the_first_block_that_fits(state: str, block: str) -> None:
    fleet = doubtful_rate()
    fleet.vessels[0]["state"] = state
    view = fleet.view()
    assert (view.block, view.standing) == (block, "rating short")


def test_rule_11_7_else_the_standing_is_the_block() -> None:
    assert steady(12.0, 0.25).view().block == "running out"
    assert steady(9.0, 0.25).view().block == "below required"


def test_rule_11_7_blocks_in_order_and_each_vessel_in_exactly_one() -> None:
    after_the_standings = ("re-gauge", "idle", "out of service", "retired")
    assert (*words.STANDINGS, *after_the_standings) == words.BLOCKS
    fleet = Fleet()
    cases = [(9.9, ""), (10.2, ""), (14.0, ""), (14.0, "idle"), (14.0, "retired"), (14.0, "out of service")]
    for number, (wall, state) in enumerate(cases):
        fleet.vessel(f"V-{number}", inspected=LAST, state=state)
        add_steady(fleet, number, "shell", wall, 0.25, structural_minimum_mm=10.0)
    blocks = [view.block for view in fleet.appraise("2024-02-01").views()]
    assert blocks == ["below required", "at required", "rating held", "idle", "retired", "out of service"]


def test_rule_11_8_life_3_on_the_plateau_prints_both() -> None:
    view = steady(10.75, 0.25).view("2024-02-01")  # life 3: interval 2 years, 730 days; half life 1.5 years
    assert view.carry_to_on == days_after(LAST, 730)
    assert view.standing == "rating short"  # 10.75 - 0.5·2.0 = 9.75
    assert (view.clause_interval_years, view.half_life_on_plateau_years) == pytest.approx((2.0, 1.5))
    assert view.rating_holds_until == days_after(LAST, 547)  # 1.5 years = 547.875 days
    assert not view.held_by_half_life


def test_rule_11_8_off_the_plateau_nothing_of_it_is_printed() -> None:
    view = steady(11.0 + 1e-9, 0.25).view("2024-02-01")  # life 4: half life is the interval
    assert (view.clause_interval_years, view.half_life_on_plateau_years) == (None, None)


def many(count: int, seed: int) -> Inputs:
    """Give vessels of one location whose half life falls before the cap: life from 4 to 19 years."""
    random = np.random.default_rng(seed)
    last = np.floor(ordinal("2025-01-01") + 365 * random.random(count))
    first = last - np.floor(1000 + 6000 * random.random(count))
    rate = 0.03 + random.random(count)
    diameter = 300 + 3000 * random.random(count)
    pressure = 0.2 + 2 * random.random(count)
    # required by hoop on the outside radius Ro = D/2 + 60; the wall is that and 4.001 to 19 years of loss
    required = pressure * (diameter / 2 + 60) / (137.0 * 0.85 + 0.4 * pressure)
    wall = required + rate * (4.001 + 15 * random.random(count))
    rows = np.arange(count, dtype=np.int64)
    lots = {"nominal_thickness_mm": 60.0, "allowable_stress_mpa": 137.0, "joint_efficiency_long": 0.85,
            "joint_efficiency_circ": 0.85, "static_head_mpa": 0.0}  # fmt: skip
    return Inputs(
        vessels=Vessels.of(
            count, tag=[f"V-{i}" for i in rows], rules=["api510"] * count, design_code=["asme8-1"] * count,
            code_edition=["2001"] * count, in_service_day=first, nameplate_mawp_mpa=pressure,
        ),
        parts=Parts.of(
            count, vessel=rows, part=["shell"] * count, shape=["cylinder"] * count, loss_side=["inside"] * count,
            inside_diameter_mm=diameter, **{name: np.full(count, value) for name, value in lots.items()},
        ),
        locations=Locations.of(
            count, part=rows, location=["1"] * count, rate_floor_mm_per_year=np.full(count, 0.025),
            observation_window_days=np.full(count, 90.0),
        ),
        readings=Readings.of(
            2 * count, location=np.tile(rows, 2), taken_day=np.concatenate((first, last)),
            thickness_mm=np.concatenate((wall + rate * (last - first) / 365.25, wall)),
            result=["read"] * (2 * count), kind=["reading"] * (2 * count), status=["accepted"] * (2 * count),
            error_mm=np.full(2 * count, 0.01), reading_id=np.arange(2 * count),
        ),
        restarts=Restarts.of(0), idle_times=IdleTimes.of(0),
        inspections=Inspections.of(
            count, vessel=rows, kind=["internal"] * count, done_day=last, extent=["full"] * count
        ),
        decisions=Decisions.of(0), relief=Relief.of(0), settings=Settings(),
    )  # fmt: skip


def test_rule_11_3_half_life_tie_none_of_ten_thousand_vessels_flips_to_rating_short() -> None:
    appraisal = appraise(many(10_000, seed=510), as_of=date(2026, 1, 1))
    judged = appraisal.judged
    assert (judged.due.governing >= 0).all()
    assert (judged.carry.day == judged.half_life_day).all()
    said = {words.STANDINGS[k] for k in np.unique(judged.vessel_standing)}
    assert said == {"running out", "rating held"}


def test_rule_11_3_one_day_after_half_life_nearly_all_of_them_would_be_short() -> None:
    # the tie is a tie: rounded up, or with a coarse tolerance, it would not hold
    inputs = many(300, seed=7)
    days = appraise(inputs, as_of=date(2026, 1, 1)).judged.half_life_day
    later = [
        appraise(inputs, as_of=date(2026, 1, 1), carry_to=date.fromordinal(int(day) + 1)) for day in days[:20]
    ]
    short = [
        words.STANDINGS[each.judged.vessel_standing[i]] == "rating short" for i, each in enumerate(later)
    ]
    assert all(short)


def test_rule_11_1_standing_comes_from_unrounded_figures() -> None:
    # 9.9999 prints as 9.99, rounded down, and 10.0000001 as 10.00
    assert steady(9.99999, 0.01).view("2024-01-01").standing == "below required"
    kept: dict[str, Any] = {"error_mm": 1e-9}
    fleet = Fleet()
    fleet.vessel(inspected=LAST)
    fleet.part(structural_minimum_mm=10.0)
    fleet.location(rate_floor_mm_per_year=0.0)
    fleet.read(0, (FIRST, 10.0000001), (LAST, 10.0000001), **kept)
    assert fleet.view("2024-01-01").standing == "rating held"
