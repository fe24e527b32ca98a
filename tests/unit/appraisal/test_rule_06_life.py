"""Rule 6, remaining life and the walls about required: required 10 mm, reading error 0.25 mm."""

from __future__ import annotations

from datetime import date

import pytest
from handsums import FIRST, LAST, add_steady, steady
from invented import Fleet, location_of


def test_rule_6_1_life_is_wall_less_required_over_the_planning_rate() -> None:
    place = location_of(steady(12.0, 0.25).view("2024-01-01"))
    assert place.remaining_life_years == pytest.approx(8.0, rel=1e-12)  # (12 - 10) / 0.25
    assert place.retirement_on == date(2032, 1, 1)


@pytest.mark.parametrize("wall", [10.0, 9.9])
def test_rule_6_1_life_is_nought_at_or_below_required(wall: float) -> None:
    place = location_of(steady(wall, 0.25).view("2024-01-01"))
    assert place.remaining_life_years == 0.0
    assert place.retirement_on == date(2024, 1, 1)


def test_rule_6_1_the_date_is_a_whole_day_rounded_down() -> None:
    # (11.01 - 10) / 0.25 = 4.04 years = 1475.61 days
    place = location_of(steady(11.01, 0.25).view("2024-01-01"))
    assert place.retirement_on == date.fromordinal(date(2024, 1, 1).toordinal() + 1475)


def test_rule_6_2_a_wall_below_required_is_said_so() -> None:
    assert steady(9.999, 0.25).view("2024-01-01").standing == "below required"


def test_rule_6_3_a_wall_at_required_within_reading_error() -> None:
    # 1.645 · 0.25 = 0.41125 above 10
    assert steady(10.0, 0.1).view("2024-01-01").standing == "at required"
    assert steady(10.411, 0.1).view("2024-01-01").standing == "at required"
    assert steady(10.412, 0.1).view("2024-01-01").standing != "at required"


def test_rule_6_3_the_reading_error_of_the_location_decides() -> None:
    # s = 1.0: up to 11.645
    fleet = Fleet()
    fleet.vessel(inspected=LAST)
    fleet.part(structural_minimum_mm=10.0)
    fleet.location()
    fleet.read(0, (FIRST, 12.5), (LAST, 11.6), error_mm=1.0)
    assert fleet.view("2024-01-01").standing == "at required"


def test_rule_6_3_the_wall_used_brings_its_own_reading_error() -> None:
    # the least wall, 10.5, was read with s = 1.0 and is within 1.645 of required; the better gauge read 10.55 later
    fleet = Fleet()
    fleet.vessel(inspected=LAST)
    fleet.part(structural_minimum_mm=10.0)
    fleet.location()
    fleet.read(0, ("2012-01-01", 11.5), (FIRST, 10.5), error_mm=1.0)
    fleet.read(0, (LAST, 10.55), error_mm=0.1)
    assert fleet.view("2024-01-01").standing == "at required"


def test_rule_6_1_no_life_is_infinite() -> None:
    fleet = Fleet()
    fleet.vessel(inspected=LAST)
    part = add_steady(fleet, 0, "shell", 12.0, 0.0, structural_minimum_mm=10.0)
    assert part == 0
    place = location_of(fleet.view("2024-01-01"))
    assert place.remaining_life_years == pytest.approx(2.0 / 0.025, rel=1e-12)  # the floor
    fleet.locations[0]["rate_floor_mm_per_year"] = 0.0
    place = location_of(fleet.view("2024-01-01"))
    assert (place.remaining_life_years, place.retirement_on) == (None, None)


def test_rule_6_1_life_left_is_counted_from_the_as_of_date_and_never_negative() -> None:
    fleet = steady(12.0, 0.25)  # retires 2032-01-01
    assert fleet.view("2028-01-01").life_left_years == pytest.approx(4.0, rel=1e-12)
    assert fleet.view("2033-01-01").life_left_years == 0.0
