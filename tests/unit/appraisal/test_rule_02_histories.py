"""Rule 2: what a restart begins, and how long the old rate goes on.

From one 1 January of 2000, 2004, 2008, … to the next of them lie 1461 days, 4 years exactly. Nominal is 14 mm.
"""

from __future__ import annotations

from datetime import date

import pytest
from invented import Fleet, codes, location_of, one_cylinder, ordinal

from fleet.appraisal.views import LocationView

OLD = (("2004-01-01", 13.6), ("2012-01-01", 12.0))  # 1.6 mm in 8 years: 0.2 mm/year


def restarted(kind: str, day: str, *taken: tuple[str, float | None], expected: float | None = None) -> Fleet:
    fleet = Fleet()
    fleet.vessel()
    fleet.part(expected_rate_mm_per_year=expected)
    fleet.location()
    fleet.read(0, *taken)
    fleet.restart(0, kind, day)
    return fleet


def rate_of(place: LocationView) -> tuple[object, str]:
    return place.planning_rate_mm_per_year, place.rate_basis


def planned(fleet: Fleet) -> float:
    rate = location_of(fleet.view()).planning_rate_mm_per_year
    assert rate is not None
    return rate


def test_rule_2_1_a_restart_concerns_only_the_locations_it_names() -> None:
    fleet = restarted("new metal", "2016-01-01", *OLD, ("2020-01-01", 13.9))
    fleet.location(name="L2")
    fleet.read(1, *OLD, ("2020-01-01", 11.0))
    view = fleet.view()
    assert location_of(view, name="L1").wall_used_mm == 13.9
    assert location_of(view, name="L2").observations == 3
    assert location_of(view, name="L2").long_term_rate_mm_per_year == pytest.approx(2.6 / 16)


def test_rule_2_2_new_metal_starts_from_the_baseline_measured_then() -> None:
    fleet = restarted("new metal", "2016-01-01", *OLD, ("2020-01-01", 13.9), ("2024-01-01", 13.5))
    fleet.read(0, ("2016-01-01", 14.3), kind="baseline")
    place = location_of(fleet.view())
    assert place.observations == 3
    assert place.long_term_rate_mm_per_year == pytest.approx(0.8 / 8)
    assert place.short_term_rate_mm_per_year == pytest.approx(0.4 / 4)
    assert rate_of(place) == (pytest.approx(0.1), "long-term")


def test_rule_2_2_a_reading_on_the_day_of_new_metal_is_of_the_new_metal() -> None:
    assert (
        location_of(restarted("new metal", "2016-01-01", *OLD, ("2016-01-01", 14.3)).view()).wall_used_mm
        == 14.3
    )


def test_rule_2_2_readings_on_either_side_of_a_restart_are_never_one_observation() -> None:
    place = location_of(restarted("new metal", "2012-02-01", *OLD, ("2012-03-01", 14.3)).view())
    assert (place.observations, place.wall_used_mm) == (1, 14.3)


@pytest.mark.parametrize(("wall", "observations"), [(13.6, 1), (14.5, 0)])
def test_rule_2_2_queried_readings_of_new_metal_are_not_judged_by_the_metal_that_is_gone(
    wall: float, observations: int
) -> None:
    # expected is nominal, 14, not the 12.0 of the old course
    fleet = restarted("new metal", "2016-01-01", *OLD)
    fleet.read(0, ("2020-01-01", wall), status="queried")
    assert location_of(fleet.view()).observations == observations


def test_rule_2_3_new_metal_without_a_baseline_starts_from_nominal_marked_so() -> None:
    # 14 mm in 2016, 13.8 in 2020, 13.2 in 2024: 0.1 mm/year from nominal, 0.15 over the last span
    view = restarted("new metal", "2016-01-01", *OLD, ("2020-01-01", 13.8), ("2024-01-01", 13.4)).view()
    place = location_of(view)
    assert place.long_term_rate_mm_per_year == pytest.approx(0.6 / 8)
    assert place.short_term_rate_mm_per_year == pytest.approx(0.4 / 4)
    view = restarted("new metal", "2016-01-01", *OLD, ("2020-01-01", 13.2), ("2024-01-01", 13.0)).view()
    assert rate_of(location_of(view)) == (pytest.approx(1.0 / 8), "from nominal")
    assert "rate from nominal" in codes(view.gaps)


@pytest.mark.parametrize(("first", "start"), [("2016-03-31", 13.9), ("2016-04-01", 14.0)])
def test_rule_2_3_a_first_reading_later_than_the_window_is_no_baseline(first: str, start: float) -> None:
    place = location_of(restarted("new metal", "2016-01-01", (first, 13.9), ("2024-01-01", 13.0)).view())
    begun = ordinal(first) if start == 13.9 else ordinal("2016-01-01")
    years = (ordinal("2024-01-01") - begun) / 365.25
    assert place.long_term_rate_mm_per_year == pytest.approx((start - 13.0) / years)


def test_rule_2_4_new_service_opens_with_the_last_observation_dated_the_day_of_the_change() -> None:
    # the 0.8 mm from 12.0 to 11.2 are put on the 4 years since the change, not on the 8 since 2012
    place = location_of(restarted("new service", "2016-01-01", *OLD, ("2020-01-01", 11.2)).view())
    assert place.observations == 2
    assert place.long_term_rate_mm_per_year == pytest.approx(0.8 / 4)


def test_rule_2_4_the_wall_goes_on_through_a_new_service() -> None:
    # metal does not grow: the 12.0 of before still is the wall used
    place = location_of(restarted("new service", "2016-01-01", *OLD, ("2020-01-01", 12.4)).view())
    assert place.wall_used_mm == 12.0


def test_rule_2_4_a_new_service_that_nobody_has_read_since_forgives_no_loss() -> None:
    fleet = restarted("new service", "2016-01-01", *OLD)
    place = location_of(fleet.view("2020-01-01"))
    assert (place.last_on, place.wall_used_mm) == (date(2012, 1, 1), 12.0)
    assert rate_of(place) == (pytest.approx(0.2), "before restart")
    assert fleet.appraise("2020-01-01").judged.today_mm[0] == pytest.approx(12.0 - 8 * 0.2)  # 8 years, not 4


def test_rule_2_5_course_replaced_mid_life_with_one_reading_after() -> None:
    # from nominal 0.4 mm in 8 years, 0.05; the old 0.2 goes on
    place = location_of(restarted("new metal", "2016-01-01", *OLD, ("2024-01-01", 13.6)).view())
    assert (place.observations, place.wall_used_mm) == (1, 13.6)
    assert rate_of(place) == (pytest.approx(0.2), "before restart")


def test_rule_2_5_course_replaced_with_no_reading_after_has_no_wall() -> None:
    view = restarted("new metal", "2016-01-01", *OLD).view()
    assert location_of(view).wall_used_mm is None
    assert view.standing == "no verdict"


def test_rule_2_5_what_the_readings_show_governs_where_it_is_the_greatest() -> None:
    view = restarted("new metal", "2016-01-01", *OLD, ("2024-01-01", 10.8)).view()  # 3.2 mm in 8 years
    assert rate_of(location_of(view)) == (pytest.approx(0.4), "from nominal")
    assert "rate from nominal" in codes(view.gaps)


def test_rule_2_5_the_expected_rate_governs_where_it_is_the_greatest() -> None:
    place = location_of(restarted("new metal", "2016-01-01", *OLD, ("2024-01-01", 13.6), expected=0.3).view())
    assert rate_of(place) == (0.3, "expected")


def test_rule_2_5_change_of_service_with_one_reading_after() -> None:
    slower = location_of(restarted("new service", "2016-01-01", *OLD, ("2024-01-01", 11.6)).view())
    assert rate_of(slower) == (pytest.approx(0.2), "before restart")  # 0.4 mm in 8 years shown
    faster = location_of(restarted("new service", "2016-01-01", *OLD, ("2024-01-01", 8.8)).view())
    assert rate_of(faster) == (pytest.approx(0.4), "long-term")  # 3.2 mm in 8 years shown


@pytest.mark.parametrize("kind", ["new metal", "new service"])
def test_rule_2_5_two_observations_after_let_the_old_rate_go(kind: str) -> None:
    walls = (13.6, 13.4) if kind == "new metal" else (11.8, 11.6)
    taken = (("2020-01-01", walls[0]), ("2024-01-01", walls[1]))
    place = location_of(restarted(kind, "2016-01-01", *OLD, *taken).view())
    assert place.planning_rate_mm_per_year == pytest.approx(0.6 / 8 if kind == "new metal" else 0.4 / 8)
    assert place.rate_basis != "before restart"


def test_rule_2_5_the_baseline_that_opens_the_history_is_not_an_observation_after_it() -> None:
    # as the last observation before a change of service is not: one look has been taken since the new course went in
    fleet = restarted("new metal", "2016-01-01", *OLD, ("2024-01-01", 13.9))
    fleet.read(0, ("2016-01-01", 14.3), kind="baseline")
    assert rate_of(location_of(fleet.view())) == (pytest.approx(0.2), "before restart")


def test_rule_2_5_a_reading_on_the_day_of_the_change_is_not_an_observation_after_it() -> None:
    taken = (("2016-01-01", 11.2), ("2024-01-01", 11.0))
    assert planned(restarted("new service", "2016-01-01", *OLD, *taken)) >= 0.2 - 1e-9


def test_rule_2_5_a_queried_reading_does_not_split_one_observation_after_the_restart_in_two() -> None:
    # 11.6 and 11.5 a month apart are one observation; the queried 10.4 between them does not count
    fleet = restarted("new service", "2016-01-01", ("2004-01-01", 11.6), ("2012-01-01", 10.0))
    fleet.read(0, ("2024-01-01", 11.6), ("2024-02-01", 11.5))
    fleet.read(0, ("2024-01-15", 10.4), status="queried")
    assert rate_of(location_of(fleet.view())) == (pytest.approx(0.2), "before restart")


def test_rule_2_5_two_restarts_one_after_the_other_keep_the_old_rate() -> None:
    fleet = restarted("new metal", "2014-01-01", *OLD, ("2024-01-01", 13.6))
    fleet.restart(0, "new service", "2016-01-01")
    place = location_of(fleet.view())
    assert (place.observations, place.wall_used_mm) == (1, 13.6)  # the 12.0 of before is metal that is gone
    assert rate_of(place) == (pytest.approx(0.2), "before restart")


def test_rule_2_5_two_changes_of_service_one_after_the_other_keep_the_greater_old_rate() -> None:
    # 0.2 before 2014; 12.0 to 11.8 in the 4 years of the first change, 0.05; nobody has read since the second
    fleet = restarted("new service", "2012-01-02", *OLD, ("2016-01-02", 11.8))
    fleet.restart(0, "new service", "2020-01-01")
    place = location_of(fleet.view())
    assert place.wall_used_mm == 11.8
    assert rate_of(place) == (pytest.approx(0.2), "before restart")


def test_rule_2_5_a_rate_chosen_before_the_change_does_not_undercut_what_is_expected_after_it() -> None:
    fleet = restarted("new service", "2016-01-01", *OLD, expected=0.3)
    fleet.decide(0, "chosen rate", "2014-01-01", rate_mm_per_year=0.1, review_day=ordinal("2030-01-01"),
                 decided_by="A", second_by="B")  # fmt: skip
    assert planned(fleet) >= 0.3


def test_rule_2_5_the_old_rate_survives_a_baseline_that_is_taken_as_nominal() -> None:
    # before: one reading, 12.4 in 2004, 4 years after nominal in 2000: 0.4 mm/year
    fleet = restarted("new metal", "2008-01-01", ("2004-01-01", 12.4), ("2024-01-01", 13.2))
    assert rate_of(location_of(fleet.view())) == (pytest.approx(0.4), "before restart")
    fleet.read(0, ("2008-01-01", 14.0), kind="baseline")
    assert rate_of(location_of(fleet.view())) == (pytest.approx(0.4), "before restart")


def test_rule_2_6_baseline_equal_to_nominal_is_taken_as_nominal_with_a_doubt() -> None:
    fleet = one_cylinder(("2012-01-01", 13.2))
    fleet.read(0, ("2004-01-01", 14.0), kind="baseline")
    view = fleet.view()
    place = location_of(view)
    assert place.observations == 1
    assert place.long_term_rate_mm_per_year is None
    assert rate_of(place) == (pytest.approx(0.8 / 8), "from nominal")
    assert "baseline equals nominal" in codes(view.doubts)
    assert "rate from nominal" in codes(view.gaps)


def test_rule_2_6_a_baseline_one_digit_off_nominal_is_a_reading() -> None:
    fleet = one_cylinder(("2012-01-01", 13.2))
    fleet.read(0, ("2004-01-01", 14.01), kind="baseline")
    view = fleet.view()
    assert location_of(view).observations == 2
    assert rate_of(location_of(view)) == (pytest.approx(0.81 / 8), "long-term")
    assert "baseline equals nominal" not in codes(view.doubts)


def test_rule_2_6_an_ordinary_reading_equal_to_nominal_is_a_reading() -> None:
    assert location_of(one_cylinder(("2004-01-01", 14.0), ("2012-01-01", 13.2)).view()).observations == 2


def test_rule_2_6_a_baseline_taken_as_nominal_is_not_a_measurement() -> None:
    fleet = one_cylinder()
    fleet.read(0, ("2004-01-01", 14.0), kind="baseline")
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "part never measured" in codes(view.gaps)
