"""Rule 1: which readings count, and which make one observation together.

Reading error s = 0.25 mm: a loss or gain is noticeable above 3·√2·0.25 = 1.0607 mm.
"""

from __future__ import annotations

from datetime import date

import pytest
from invented import Fleet, codes, location_of, one_cylinder, part_of

from fleet.appraisal.inputs import DEFAULT_READING_ERROR_MM
from fleet.appraisal.views import LocationView


def place(*taken: tuple[str, float | None], window: float = 90.0, error: float = 0.25) -> LocationView:
    fleet = Fleet()
    fleet.vessel()
    fleet.part()
    fleet.location(observation_window_days=window)
    fleet.read(0, *taken, error_mm=error)
    return location_of(fleet.view())


def with_status(status: str, queried: tuple[str, float], *rest: tuple[str, float | None]) -> Fleet:
    fleet = one_cylinder(*rest)
    fleet.read(0, queried, status=status)
    return fleet


@pytest.mark.parametrize(("second", "observations"), [("2020-03-31", 1), ("2020-04-01", 2)])
def test_rule_1_1_readings_up_to_90_days_after_the_first_are_one_observation(
    second: str, observations: int
) -> None:
    assert place(("2020-01-01", 12.0), (second, 12.0)).observations == observations  # 90 and 91 days


def test_rule_1_1_the_90_days_run_from_the_reading_that_opens_the_observation() -> None:
    # the 61st and the 121st day: the third reading is within 90 days of the second, not of the first
    assert place(("2020-01-01", 12.0), ("2020-03-02", 12.0), ("2020-05-01", 12.0)).observations == 2


def test_rule_1_1_the_window_is_a_setting() -> None:
    assert place(("2020-01-01", 12.0), ("2020-01-21", 12.0), window=10.0).observations == 2


def test_rule_1_1_two_readings_14_days_apart_are_one_observation() -> None:
    seen = place(("2016-01-01", 12.6), ("2020-01-01", 12.0), ("2020-01-15", 11.8))
    assert seen.observations == 2
    assert seen.short_term_rate_mm_per_year == seen.long_term_rate_mm_per_year  # not 0.2 mm in 14 days


def test_rule_1_1_a_reading_that_does_not_count_neither_opens_nor_closes_an_observation() -> None:
    # the queried 10.5 is above the 9.0 before it, does not count, and cannot part 12.0 from 11.8 a month later
    rest = (("2015-01-01", 9.0), ("2020-01-01", 12.0), ("2020-02-01", 11.8))
    assert location_of(with_status("queried", ("2020-01-10", 10.5), *rest).view()).observations == 2


def test_rule_1_2_an_observation_is_the_least_of_its_readings() -> None:
    assert place(("2020-01-01", 12.0), ("2020-01-10", 11.7), ("2020-01-20", 11.9)).last_thickness_mm == 11.7


def test_rule_1_3_it_is_dated_the_day_its_least_reading_was_taken() -> None:
    assert place(("2020-01-01", 12.0), ("2020-01-10", 11.7), ("2020-01-20", 11.9)).last_on == date(
        2020, 1, 10
    )


def test_rule_1_3_of_equal_readings_the_earliest_gives_the_day() -> None:
    assert place(("2020-01-05", 11.7), ("2020-01-20", 11.7), ("2020-01-01", 12.0)).last_on == date(2020, 1, 5)


def test_rule_1_4_a_noticeable_loss_keeps_readings_14_days_apart_apart() -> None:
    seen = place(("2020-01-01", 12.0), ("2020-01-15", 10.9))  # 1.1 mm
    assert seen.observations == 2
    assert seen.short_term_rate_mm_per_year == pytest.approx(1.1 * 365.25 / 14, rel=1e-9)
    assert seen.planning_rate_mm_per_year == seen.short_term_rate_mm_per_year


def test_rule_1_4_a_loss_within_the_error_does_not() -> None:
    assert place(("2020-01-01", 12.0), ("2020-01-15", 11.0)).observations == 1  # 1.0 mm


def test_rule_1_4_the_loss_is_from_the_greatest_reading_of_the_observation() -> None:
    assert place(("2020-01-01", 11.5), ("2020-01-10", 12.0), ("2020-01-20", 10.8)).observations == 2  # 1.2 mm


def test_rule_1_4_a_gain_does_not_keep_readings_apart() -> None:
    seen = place(("2020-01-01", 10.0), ("2020-01-15", 12.0))
    assert (seen.observations, seen.last_thickness_mm, seen.last_on) == (1, 10.0, date(2020, 1, 1))


def test_rule_1_5_the_error_of_a_reading_is_a_quarter_of_a_millimetre_unless_set() -> None:
    assert DEFAULT_READING_ERROR_MM == 0.25


def test_rule_1_5_another_error_moves_the_threshold() -> None:
    # s = 0.1: 3·√2·0.1 = 0.424
    assert place(("2020-01-01", 12.0), ("2020-01-15", 11.5), error=0.1).observations == 2
    assert place(("2020-01-01", 12.0), ("2020-01-15", 11.6), error=0.1).observations == 1


def test_rule_1_6_queried_low_reading_governs_and_is_marked() -> None:
    fleet = with_status("queried", ("2020-01-01", 10.0), ("2016-01-01", 12.0))
    view = fleet.view()
    assert location_of(view).wall_used_mm == 10.0
    assert location_of(view).planning_rate_mm_per_year == pytest.approx(0.5)  # 2 mm in 4 years
    assert "queried low reading governs" in codes(view.doubts)


def test_rule_1_6_queried_low_reading_goes_on_governing_after_a_higher_one() -> None:
    view = with_status("queried", ("2020-01-01", 10.0), ("2016-01-01", 12.0), ("2024-01-01", 11.8)).view()
    assert location_of(view).wall_used_mm == 10.0
    assert "queried low reading governs" in codes(view.doubts)


def test_rule_1_6_a_voided_reading_is_gone() -> None:
    view = with_status("voided", ("2020-01-01", 10.0), ("2016-01-01", 12.0)).view()
    assert location_of(view).wall_used_mm == 12.0
    assert "queried low reading governs" not in codes(view.doubts)


def test_rule_1_6_the_mark_outlives_a_change_of_service_as_long_as_the_wall_rests_on_the_reading() -> None:
    fleet = with_status("queried", ("2020-01-01", 10.0), ("2016-01-01", 12.0))
    fleet.restart(0, "new service", "2022-01-01")
    view = fleet.view()
    assert location_of(view).wall_used_mm == 10.0
    assert "queried low reading governs" in codes(view.doubts)


def test_rule_1_7_queried_high_reading_does_not_count() -> None:
    view = with_status("queried", ("2024-01-01", 13.0), ("2016-01-01", 12.0), ("2020-01-01", 11.6)).view()
    seen = location_of(view)
    assert (seen.observations, seen.last_on, seen.last_thickness_mm) == (2, date(2020, 1, 1), 11.6)
    assert "queried high reading left out" in codes(view.doubts)


def test_rule_1_7_a_first_reading_is_expected_at_nominal() -> None:
    high = with_status("queried", ("2016-01-01", 15.0), ("2020-01-01", 12.0)).view()
    assert location_of(high).observations == 1
    low = with_status("queried", ("2016-01-01", 13.5), ("2020-01-01", 12.0)).view()
    assert location_of(low).observations == 2


def test_rule_1_7_a_queried_reading_does_not_slow_the_rate() -> None:
    # 0.2 mm/year from 2012 to 2020 expects 10.8 mm in 2024; a queried 11.5 is higher than that
    rest = (("2012-01-01", 13.2), ("2016-01-01", 12.4), ("2020-01-01", 11.6))
    rate = location_of(with_status("queried", ("2024-01-01", 11.5), *rest).view()).planning_rate_mm_per_year
    assert rate is not None
    assert rate >= 0.2 - 1e-9


@pytest.mark.parametrize("result", ["no echo", "no access", "lamination"])
def test_rule_1_8_no_thickness_is_a_gap_and_never_a_number(result: str) -> None:
    fleet = one_cylinder(("2016-01-01", 12.0), ("2020-01-01", 11.6))
    fleet.location(name="L2")
    fleet.read(1, ("2016-01-01", 12.0), ("2024-01-01", 11.6))
    fleet.read(0, ("2024-01-01", None), result=result)
    view = fleet.view()
    seen = location_of(view)
    assert (seen.observations, seen.last_thickness_mm, seen.last_on) == (2, 11.6, date(2020, 1, 1))
    expected = "no echo at last visit" if result == "no echo" else "location not read at last visit"
    assert expected in codes(view.gaps)


def test_rule_1_8_a_location_that_never_gave_a_thickness_is_a_gap() -> None:
    fleet = one_cylinder(("2020-01-01", 12.0))
    fleet.location(name="L2")
    fleet.read(1, ("2020-01-01", None), result="no access")
    view = fleet.view()
    assert location_of(view, name="L2").wall_used_mm is None
    assert "location never measured" in codes(view.gaps)


def test_rule_1_8_no_access_after_no_echo_does_not_clear_the_no_echo() -> None:
    fleet = one_cylinder(("2016-01-01", 12.0), ("2020-01-01", 11.6))
    fleet.location(name="L2")
    fleet.read(1, ("2016-01-01", 12.0), ("2024-02-01", 11.6))
    fleet.read(0, ("2024-02-01", None), result="no echo")
    assert fleet.view().standing == "no verdict"
    fleet.read(0, ("2024-02-15", None), result="no access")  # another try on the same outing
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "no echo at last visit" in codes(view.gaps)


def test_rule_1_9_the_wall_used_is_the_least_of_the_present_history() -> None:
    seen = place(("2016-01-01", 12.0), ("2020-01-01", 11.0), ("2024-01-01", 11.6))
    assert (seen.last_thickness_mm, seen.wall_used_mm) == (11.6, 11.0)


def test_rule_1_9_metal_that_is_gone_is_not_in_the_present_history() -> None:
    fleet = one_cylinder(("2016-01-01", 8.0), ("2024-01-01", 13.8))
    fleet.restart(0, "new metal", "2020-01-01")
    assert location_of(fleet.view()).wall_used_mm == 13.8


def test_rule_1_10_rates_use_the_wall_used() -> None:
    # the long-term rate ends at 11.0, not at 11.6: 1.0 mm in 8 years; since 2020 nothing was lost
    seen = place(("2016-01-01", 12.0), ("2020-01-01", 11.0), ("2024-01-01", 11.6))
    assert seen.long_term_rate_mm_per_year == pytest.approx(0.125)
    assert seen.short_term_rate_mm_per_year == 0.0
    assert seen.planning_rate_mm_per_year == pytest.approx(0.125)


def test_rule_1_10_a_low_reading_in_the_middle_does_not_slow_the_rate() -> None:
    # without the queried 11.0 the last span shows 11.8 to 10.9: 0.225 mm/year; its presence must not improve that
    rest = (("2012-01-01", 12.0), ("2020-01-01", 11.8), ("2024-01-01", 10.9))
    without = location_of(one_cylinder(*rest).view()).planning_rate_mm_per_year
    assert without == pytest.approx(0.225)
    slower = location_of(with_status("queried", ("2016-01-01", 11.0), *rest).view()).planning_rate_mm_per_year
    assert slower is not None
    assert slower >= 0.225 - 1e-9


def test_rule_1_11_gain_of_0_6_mm_is_no_doubt() -> None:
    view = one_cylinder(("2016-01-01", 12.0), ("2020-01-01", 11.0), ("2024-01-01", 11.6)).view()
    assert "apparent gain" not in codes(view.doubts)
    assert location_of(view).wall_used_mm == 11.0


def test_rule_1_11_gain_of_1_2_mm_is_a_doubt_and_the_wall_used_stays() -> None:
    view = one_cylinder(("2016-01-01", 12.0), ("2020-01-01", 11.0), ("2024-01-01", 12.2)).view()
    assert "apparent gain" in codes(view.doubts)
    assert "apparent gain" in codes(location_of(view).doubts)
    assert location_of(view).wall_used_mm == 11.0
    assert location_of(view).planning_rate_mm_per_year == pytest.approx(0.125)


def test_rule_1_11_a_gain_in_two_steps_is_a_doubt() -> None:
    # 11.0 to 11.8 to 12.6: 1.6 mm more than the least wall of the history, in steps of 0.8
    view = one_cylinder(("2016-01-01", 11.0), ("2020-01-01", 11.8), ("2024-01-01", 12.6)).view()
    assert part_of(view).locations[0].wall_used_mm == 11.0
    assert "apparent gain" in codes(view.doubts)
