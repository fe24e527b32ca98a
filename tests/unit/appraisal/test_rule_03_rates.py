"""Rule 3: the measured rates, the planning rate and what the readings can show.

From one 1 January of 2000, 2004, 2008, … to the next lie 4 years exactly. Reading error s = 0.25 mm. The shell needs
514 / 100.4 = 5.1195 mm.
"""

from __future__ import annotations

import math
from datetime import date, timedelta
from typing import Any

import pytest
from invented import Fleet, codes, location_of, one_cylinder, ordinal

from fleet.appraisal.inputs import DEFAULT_RATE_FLOOR_MM_PER_YEAR
from fleet.appraisal.views import LocationView, VesselView

NEEDED = 514 / 100.4
STEADY = (("2020-01-01", 12.0), ("2024-01-01", 11.2))  # 0.2 mm/year


def view_of(*taken: tuple[str, float | None], expected: float | None = None, floor: float = 0.025,
            nominal: float | None = 14.0, **reading: Any) -> VesselView:  # fmt: skip
    fleet = Fleet()
    fleet.vessel()
    fleet.part(expected_rate_mm_per_year=expected, nominal_thickness_mm=nominal)
    fleet.location(rate_floor_mm_per_year=floor)
    fleet.read(0, *taken, **reading)
    return fleet.view()


def rate_of(view: VesselView) -> tuple[object, str]:
    place = location_of(view)
    return place.planning_rate_mm_per_year, place.rate_basis


def chosen(rate: float, *, second: str = "", day: str = "2024-06-01", review: str = "2030-01-01",
           expected: float | None = None) -> Fleet:  # fmt: skip
    fleet = Fleet()
    fleet.vessel()
    fleet.part(expected_rate_mm_per_year=expected)
    fleet.location()
    fleet.read(0, *STEADY)
    fleet.decide(0, "chosen rate", day, rate_mm_per_year=rate, review_day=ordinal(review), decided_by="A",
                 second_by=second)  # fmt: skip
    return fleet


def test_rule_3_1_the_long_term_rate_is_from_the_first_to_the_last_observation() -> None:
    place = location_of(view_of(("2012-01-01", 13.0), ("2020-01-01", 12.2), ("2024-01-01", 11.8)))
    assert place.long_term_rate_mm_per_year == pytest.approx(1.2 / 12)


def test_rule_3_2_the_short_term_rate_is_over_the_last_two_observations() -> None:
    place = location_of(view_of(("2012-01-01", 13.0), ("2020-01-01", 12.8), ("2024-01-01", 12.0)))
    assert place.short_term_rate_mm_per_year == pytest.approx(0.8 / 4)


def test_rule_3_2_one_observation_shows_no_rate() -> None:
    place = location_of(view_of(("2024-01-01", 12.0)))
    assert (place.long_term_rate_mm_per_year, place.short_term_rate_mm_per_year) == (None, None)


@pytest.mark.parametrize(("day", "counts"), [("2020-12-30", False), ("2021-01-01", True)])
def test_rule_3_3_over_less_than_a_year_a_loss_within_the_error_does_not_count(
    day: str, counts: bool
) -> None:
    # 364 and 366 days; 1.0 mm is within 1.06 mm
    view = view_of(("2012-01-01", 12.8), ("2020-01-01", 12.6), (day, 11.6))
    assert (rate_of(view)[1] == "short-term") is counts
    assert ("short-term rate not counted" in codes(location_of(view).doubts)) is not counts


@pytest.mark.parametrize(("loss", "counts"), [(1.06, False), (1.07, True)])
def test_rule_3_3_over_less_than_a_year_a_noticeable_loss_counts(loss: float, counts: bool) -> None:
    view = view_of(("2012-01-01", 12.8), ("2020-01-01", 12.6), ("2020-07-01", 12.6 - loss))
    assert (rate_of(view)[1] == "short-term") is counts


def test_rule_3_3_short_term_within_error_over_half_a_year_leaves_the_long_term_rate() -> None:
    # 1.2 mm from 2012 to 2020-07-01, 3104 days
    view = view_of(("2012-01-01", 12.8), ("2020-01-01", 12.6), ("2020-07-01", 11.6))
    assert rate_of(view) == (pytest.approx(1.2 * 365.25 / 3104), "long-term")


def test_rule_3_4_the_least_measurable_rate() -> None:
    place = location_of(view_of(("2012-01-01", 13.0), ("2020-01-01", 12.8), ("2024-01-01", 12.0)))
    assert place.least_measurable_rate_mm_per_year == pytest.approx(
        1.645 * math.sqrt(2) * 0.25 / 12, rel=1e-12
    )


def test_rule_3_4_two_different_errors_add_as_squares() -> None:
    fleet = one_cylinder()
    fleet.read(0, ("2016-01-01", 12.0), error_mm=0.4)
    fleet.read(0, ("2024-01-01", 11.0), error_mm=0.3)
    found = location_of(fleet.view()).least_measurable_rate_mm_per_year
    assert found == pytest.approx(1.645 * 0.5 / 8, rel=1e-12)


def test_rule_3_4_a_history_from_nominal_can_show_only_what_its_readings_span() -> None:
    # new metal in 2016, read in 2020 and 2024: two readings, 4 years apart
    fleet = one_cylinder(("2020-01-01", 13.2), ("2024-01-01", 13.0))
    fleet.restart(0, "new metal", "2016-01-01")
    found = location_of(fleet.view()).least_measurable_rate_mm_per_year
    assert found == pytest.approx(1.645 * math.sqrt(2) * 0.25 / 4, rel=1e-12)


def test_rule_3_5_chosen_rate_effective() -> None:
    assert rate_of(chosen(0.3).view()) == (0.3, "chosen")


def test_rule_3_5_the_nearest_choice_wins() -> None:
    fleet = chosen(0.3)
    fleet.decide(0, "chosen rate", "2024-07-01", part=0, location=0, rate_mm_per_year=0.4,
                 review_day=ordinal("2030-01-01"))  # fmt: skip
    fleet.decide(0, "chosen rate", "2024-08-01", rate_mm_per_year=0.5, review_day=ordinal("2030-01-01"))
    assert rate_of(fleet.view()) == (0.4, "chosen")


def test_rule_3_6_chosen_rate_lapsed_by_observation() -> None:
    fleet = chosen(0.1, second="B")
    fleet.read(0, ("2025-06-01", 11.0))
    view = fleet.view()
    assert rate_of(view)[1] == "long-term"
    assert "chosen rate lapsed" in codes(view.doubts)


@pytest.mark.parametrize(("as_of", "basis"), [("2029-12-31", "chosen"), ("2030-01-01", "long-term")])
def test_rule_3_6_chosen_rate_lapsed_by_review_date(as_of: str, basis: str) -> None:
    view = chosen(0.1, second="B").view(as_of)
    assert rate_of(view)[1] == basis
    assert ("chosen rate lapsed" in codes(view.doubts)) is (basis != "chosen")


def test_rule_3_6_a_queried_high_reading_is_no_next_observation() -> None:
    fleet = chosen(0.3)
    fleet.read(0, ("2025-06-01", 13.0), status="queried")
    assert rate_of(fleet.view()) == (0.3, "chosen")


def test_rule_3_7_chosen_rate_below_the_measured_needs_a_second_name() -> None:
    view = chosen(0.1).view()
    assert rate_of(view) == (pytest.approx(0.2), "long-term")
    assert "chosen rate needs a second name" in codes(view.doubts)
    view = chosen(0.1, second="B").view()
    assert rate_of(view) == (0.1, "chosen")
    assert "chosen rate needs a second name" not in codes(view.doubts)


def test_rule_3_7_chosen_rate_below_the_expected_needs_a_second_name() -> None:
    assert "chosen rate needs a second name" in codes(chosen(0.3, expected=0.4).view().doubts)
    view = chosen(0.3, second="B", expected=0.4).view()
    assert rate_of(view) == (0.3, "chosen")
    assert "chosen rate needs a second name" not in codes(view.doubts)


def test_rule_3_7_a_missing_second_name_does_not_slow_the_rate() -> None:
    # 0.2 measured over a span that could show the expected 0.4; with a second name the chosen 0.3 would govern
    rate = location_of(chosen(0.3, expected=0.4).view()).planning_rate_mm_per_year
    assert rate is not None
    assert rate >= 0.3


def test_rule_3_8_chosen_rate_is_bound_by_the_floor() -> None:
    assert rate_of(chosen(0.01, second="B").view()) == (0.025, "floor")


def test_rule_3_9_the_greater_of_the_two_measured_rates_governs() -> None:
    faster = view_of(("2012-01-01", 13.0), ("2020-01-01", 12.8), ("2024-01-01", 12.0))  # 0.0833 and 0.2
    assert rate_of(faster) == (pytest.approx(0.2), "short-term")
    slower = view_of(("2012-01-01", 13.0), ("2020-01-01", 12.0), ("2024-01-01", 11.8))  # 0.1 and 0.05
    assert rate_of(slower) == (pytest.approx(0.1), "long-term")


def test_rule_3_10_without_a_measured_rate_the_expected_governs() -> None:
    # from nominal it would be 2 mm in 24 years, 0.083
    assert rate_of(view_of(("2024-01-01", 12.0), expected=0.05)) == (0.05, "expected")


def test_rule_3_11_without_either_the_rate_runs_from_nominal() -> None:
    view = view_of(("2024-01-01", 11.6))  # in service since 2000-01-01: 2.4 mm in 24 years
    assert rate_of(view) == (pytest.approx(0.1), "from nominal")
    assert "rate from nominal" in codes(view.gaps)


def test_rule_3_12_without_any_there_is_no_rate_and_a_gap() -> None:
    view = view_of(("2024-01-01", 11.6), nominal=None)
    place = location_of(view)
    assert (place.planning_rate_mm_per_year, place.rate_basis) == (None, "none")
    assert (place.remaining_life_years, place.retirement_on) == (None, None)
    assert "no rate" in codes(view.gaps)
    assert view.standing == "no verdict"


def test_rule_3_13_planning_rate_floor() -> None:
    assert DEFAULT_RATE_FLOOR_MM_PER_YEAR == 0.025
    assert rate_of(view_of(("2020-01-01", 12.0), ("2024-01-01", 11.96))) == (0.025, "floor")  # 0.01 measured
    assert rate_of(view_of(("2020-01-01", 12.0), ("2024-01-01", 11.96), floor=0.05)) == (0.05, "floor")


def test_rule_3_13_planning_rate_floor_of_zero_leaves_the_measured_rate() -> None:
    view = view_of(("2020-01-01", 12.0), ("2024-01-01", 11.96), floor=0.0)
    assert rate_of(view) == (pytest.approx(0.01), "long-term")


def test_rule_3_14_expected_rate_holds_over_a_span_too_short_to_show_it() -> None:
    # over 4 years 1.645·√2·0.25/4 = 0.1454 mm/year can be shown; 0.14 could not
    assert rate_of(view_of(("2020-01-01", 12.0), ("2024-01-01", 11.8), expected=0.14)) == (0.14, "expected")


def test_rule_3_14_expected_rate_gives_way_after_a_long_enough_span() -> None:
    view = view_of(("2020-01-01", 12.0), ("2024-01-01", 11.8), expected=0.15)
    assert rate_of(view) == (pytest.approx(0.05), "long-term")


def test_rule_3_14_a_faster_measured_rate_governs_over_the_expected() -> None:
    view = view_of(("2020-01-01", 12.0), ("2024-01-01", 11.2), expected=0.14)
    assert rate_of(view) == (pytest.approx(0.2), "long-term")


def test_rule_3_14_the_floor_gives_way_to_no_span() -> None:
    # 24 years show 0.0242 mm/year; the floor still binds
    assert rate_of(view_of(("2000-01-01", 12.0), ("2024-01-01", 12.0))) == (0.025, "floor")


def test_rule_3_15_a_loss_below_what_the_readings_can_show_is_said_with_the_life_at_that_rate() -> None:
    view = view_of(("2020-01-01", 12.0), ("2024-01-01", 11.6))  # 0.1 measured, 0.1454 could be shown
    place = location_of(view)
    assert "loss below what readings can show" in codes(place.doubts)
    least = 1.645 * math.sqrt(2) * 0.25 / 4
    assert place.life_at_least_measurable_rate_years == pytest.approx((11.6 - NEEDED) / least, rel=1e-9)
    assert place.remaining_life_years == pytest.approx((11.6 - NEEDED) / 0.1, rel=1e-9)


def test_rule_3_15_a_loss_that_the_readings_show_is_not_doubted() -> None:
    view = view_of(("2020-01-01", 12.0), ("2024-01-01", 11.4))  # 0.15 measured
    assert "loss below what readings can show" not in codes(location_of(view).doubts)


def test_rule_3_16_there_is_no_infinite_life() -> None:
    place = location_of(view_of(("2020-01-01", 12.0), ("2024-01-01", 12.0), floor=0.0))
    assert place.planning_rate_mm_per_year == 0.0
    assert (place.remaining_life_years, place.retirement_on, place.half_life_interval_years) == (
        None,
        None,
        None,
    )
    assert place.life_at_least_measurable_rate_years is not None
    assert math.isfinite(place.life_at_least_measurable_rate_years)


# short 4 years, long 16: 0.25·√(1/16 + 1/256 + (1/4 - 1/16)²) = 0.07967 mm/year, three times that 0.2390
def shell(*walls: float, error: float = 0.25, locations: int = 1, withdrawn: int = 0) -> Fleet:
    fleet = Fleet()
    fleet.vessel()
    fleet.part()
    for number in range(locations):
        fleet.location(name=f"L{number + 1}")
        days = ("2008-01-01", "2020-01-01", "2024-01-01")
        fleet.read(number, *zip(days, walls, strict=True), error_mm=error)
    for number in range(withdrawn):
        place = fleet.location(name=f"W{number + 1}", state="withdrawn")
        fleet.read(place, ("2008-01-01", 12.0), ("2020-01-01", 11.0), ("2024-01-01", 11.0))
    return fleet


RISING = (7.7, 7.5, 6.9)  # long 0.8 / 16 = 0.05, short 0.6 / 4 = 0.15


@pytest.mark.parametrize(("error", "doubtful"), [(0.105, True), (0.104, False)])
def test_rule_3_17_the_standard_error_of_the_difference(error: float, doubtful: bool) -> None:
    # the difference is 0.1 mm/year: 3·e is 0.10038 with s = 0.105 mm and 0.09943 with s = 0.104 mm
    three = 3 * error * math.sqrt(1 / 16 + 1 / 256 + (1 / 4 - 1 / 16) ** 2)
    assert (three > 0.1) is doubtful
    assert ("re-gauge" in shell(*RISING, error=error).view().flags) is doubtful


def test_rule_3_18_short_term_only_within_error_is_listed_under_re_gauge() -> None:
    # (6.9 - 5.1195) / 0.15 = 11.9 years, to November 2035: running out as of 2026. By 0.05: 35.6 years
    view = shell(*RISING).view()
    assert view.standing == "running out"
    assert "re-gauge" in view.flags
    assert view.block == "re-gauge"
    assert rate_of(view) == (pytest.approx(0.15), "short-term")  # the figures stay


def test_rule_3_18_it_says_which_points_by_when() -> None:
    view = shell(*RISING).view()
    assert [(place.part, place.location) for place in view.re_gauge] == [("shell", "L1")]
    # to required at twice the loss: (6.9 - 5.1195) / 0.30 years = 2167.7 days
    assert view.re_gauge_by == date(2024, 1, 1) + timedelta(2167)


def test_rule_3_18_a_vessel_that_the_long_term_rate_would_not_hold_is_not_excused() -> None:
    # long 2.4 / 16 = 0.15, short 0.2: by either rate retired before 2036
    view = shell(9.3, 7.7, 6.9).view()
    assert view.standing == "running out"
    assert "re-gauge" not in view.flags
    assert view.block == "running out"


def test_rule_3_19_a_shift_shared_by_most_locations_is_tested_on_their_mean_and_said() -> None:
    # long 1.44 / 16 = 0.09, short 0.96 / 4 = 0.24: 0.15 apart. One location: under 0.2390. Mean of four: error 0.0398
    walls = (8.34, 7.86, 6.9)
    one, four = shell(*walls).view(), shell(*walls, locations=4).view()
    assert "shared shift" not in codes(one.doubts)
    assert "re-gauge" in one.flags
    assert "shared shift" in codes(four.doubts)


def test_rule_3_19_a_mean_within_its_error_is_no_shared_shift() -> None:
    # four locations, 0.1 apart: three times 0.0398 is 0.1195
    assert "shared shift" not in codes(shell(*RISING, locations=4).view().doubts)


def test_rule_3_19_a_shift_of_the_few_is_not_shared() -> None:
    # s = 0.05 mm: the mean of three rising by 0.15 and four falling by 0.056 is 0.032, above three errors of 0.006
    fleet = shell(8.34, 7.86, 6.9, locations=3, error=0.05)
    for number in range(4):
        place = fleet.location(name=f"S{number}")
        fleet.read(place, ("2008-01-01", 8.3), ("2020-01-01", 7.1), ("2024-01-01", 7.0), error_mm=0.05)
    assert "shared shift" not in codes(fleet.view().doubts)


def test_rule_3_19_one_location_shares_its_shift_with_none() -> None:
    assert "shared shift" not in codes(shell(8.34, 7.86, 6.9, error=0.05).view().doubts)


def test_rule_3_19_withdrawn_locations_have_no_say() -> None:
    assert "shared shift" in codes(shell(8.34, 7.86, 6.9, locations=4, withdrawn=5).view().doubts)


def test_rule_3_19_a_shared_gain_is_said_too() -> None:
    # four locations read 0.9 mm more than four years before, each within 1.06 mm; their mean is known to 0.18 mm
    view = shell(9.0, 8.0, 8.9, locations=4).view()
    assert "apparent gain" not in codes(view.doubts)
    assert "shared shift" in codes(view.doubts)


def measured(place: LocationView) -> tuple[float | None, float | None]:
    return place.long_term_rate_mm_per_year, place.short_term_rate_mm_per_year


def test_rule_3_9_a_rate_is_never_negative() -> None:
    assert measured(location_of(view_of(("2020-01-01", 12.0), ("2024-01-01", 12.5)))) == (0.0, 0.0)
