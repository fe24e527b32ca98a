"""Rule 7, due dates under the API 510 rule set: cap 10 years inside and 5 outside, half life, short-life rule."""

from __future__ import annotations

from datetime import date

import pytest
from handsums import FIRST, LAST, days_after, steady
from invented import Fleet, codes, location_of, ordinal

from fleet.appraisal.views import Place

TEN_YEARS = 3652  # 3652.5 days, rounded down
FIVE_YEARS = 1826  # 1826.25 days


def test_rule_7_1_half_life_governs_from_the_last_observation() -> None:
    # life 8 years, half 4, from 2024-01-01; the cap would give 2029-12-31
    view = steady(12.0, 0.25, inspected="2020-01-01").view()
    assert view.internal_due_on == date(2028, 1, 1)
    assert view.internal_interval_years == pytest.approx(4.0, rel=1e-12)


def test_rule_7_1_the_cap_governs_from_the_last_inspection() -> None:
    # life 40 years, half 20
    view = steady(20.0, 0.25, inspected="2020-01-01").view()
    assert view.internal_due_on == days_after("2020-01-01", TEN_YEARS)
    assert view.internal_interval_years == 10.0


def test_rule_7_1_the_cap_may_govern_by_date_though_the_half_life_is_shorter() -> None:
    # life 16 years, half 8 from 2024 is 2032; 2016 + 10 is 2025-12-31: the interval still is 8 years
    view = steady(14.0, 0.25, inspected="2016-01-01").view()
    assert view.internal_due_on == days_after("2016-01-01", TEN_YEARS)
    assert view.governing_due is None
    assert view.internal_interval_years == pytest.approx(8.0, rel=1e-12)


def test_rule_7_2_the_governing_location_is_named_and_null_where_the_cap_governs() -> None:
    assert steady(12.0, 0.25).view().governing_due == Place("shell", "L1")
    assert steady(20.0, 0.25).view().governing_due is None


def test_rule_7_1_two_locations_with_different_last_dates() -> None:
    # L1: life 8 from 2024, half 2028-01-01. head: 13 mm in 2016 at 0.2/year, life 15, half 7.5 years = 2739.375 days
    fleet = steady(12.0, 0.25)
    head = fleet.part(0, "head", structural_minimum_mm=10.0)
    fleet.read(fleet.location(head), ("2008-01-01", 13.0 + 0.2 * 2922 / 365.25), (FIRST, 13.0))
    view = fleet.view("2022-01-01")
    assert location_of(view, "head").half_life_interval_years == pytest.approx(7.5)
    assert location_of(view, "head").last_on == date(2016, 1, 1)
    view = fleet.view("2024-02-01")
    assert view.internal_due_on == days_after(FIRST, 2739)  # 2023-07-02, before 2028
    assert view.governing_due == Place("head", "L1")
    assert "overdue" in view.flags


@pytest.mark.parametrize(
    ("wall", "years"),
    [(11.0, 2.0), (10.99, 2.0), (10.75, 2.0), (10.5, 2.0), (10.475, 1.9), (11.1, 2.2)],
)
def test_rule_7_3_below_four_years_the_whole_life_up_to_two(wall: float, years: float) -> None:
    # lives 4.0, 3.96, 3.0, 2.0, 1.9 and 4.4 years at 0.25 mm/year
    view = steady(wall, 0.25).view("2024-01-01")
    assert view.internal_interval_years == pytest.approx(years, rel=1e-9)


def test_rule_7_3_short_life_due_date_is_rounded_down() -> None:
    assert steady(10.75, 0.25).view("2024-02-01").internal_due_on == days_after(LAST, 730)  # 730.5 days


def test_rule_7_4_without_an_inspection_counted_from_in_service_with_a_gap() -> None:
    view = steady(20.0, 0.25, inspected=None, in_service_day=ordinal("2021-03-01")).view()
    assert view.internal_due_on == days_after("2021-03-01", TEN_YEARS)
    assert view.external_due_on == days_after("2021-03-01", FIVE_YEARS)
    assert {"no inspection on record", "no external on record"} <= set(codes(view.gaps))
    assert (view.last_internal_on, view.last_external_on) == (None, None)


def test_rule_7_4_the_interval_needs_no_inspection_on_record() -> None:
    assert steady(12.0, 0.25, inspected=None).view().internal_interval_years == pytest.approx(4.0)


def test_rule_7_5_external_is_the_lesser_of_its_cap_and_the_internal_interval() -> None:
    assert steady(20.0, 0.25, inspected=LAST).view().external_due_on == days_after(LAST, FIVE_YEARS)
    # half life 4 years = 1461 days
    assert steady(12.0, 0.25, inspected=LAST).view().external_due_on == days_after(LAST, 1461)


def test_rule_7_5_an_internal_inspection_is_no_external_one() -> None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "internal", LAST)
    view = fleet.view()
    assert view.internal_due_on == days_after(LAST, TEN_YEARS)
    assert view.external_due_on == days_after("2018-01-01", FIVE_YEARS)


def on_stream(**decision: object) -> date | None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "on-stream", LAST)
    if decision:
        fleet.decide(0, "on-stream acceptance", **decision)  # type: ignore[arg-type]  # dates and words by name
    return fleet.view().internal_due_on


GROUNDS = "general loss only, life above ten years, access not possible"


def test_rule_7_6_on_stream_counts_only_with_an_acceptance() -> None:
    assert on_stream() == days_after("2018-01-01", TEN_YEARS)
    assert on_stream(day="2023-06-01", reason=GROUNDS) == days_after(LAST, TEN_YEARS)


def test_rule_7_6_an_acceptance_that_is_over_no_longer_counts() -> None:
    old = days_after("2018-01-01", TEN_YEARS)
    assert on_stream(day="2023-06-01", reason=GROUNDS, until_day=ordinal("2025-12-31")) == old
    assert on_stream(day="2023-06-01", reason=GROUNDS, review_day=ordinal("2025-12-31")) == old
    assert on_stream(day="2026-01-02", reason=GROUNDS) == old


def test_rule_7_6_an_acceptance_without_grounds_does_not_count() -> None:
    assert on_stream(day="2023-06-01") == days_after("2018-01-01", TEN_YEARS)


def test_rule_7_6_the_acceptance_of_one_vessel_is_not_that_of_another() -> None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "on-stream", LAST)
    fleet.vessel("V-2")
    fleet.decide(1, "on-stream acceptance", "2023-06-01", reason=GROUNDS)
    assert fleet.view().internal_due_on == days_after("2018-01-01", TEN_YEARS)


def test_rule_7_7_a_thickness_survey_alone_renews_nothing_but_half_life() -> None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    before = fleet.view().internal_due_on
    fleet.read(0, ("2025-06-01", 19.6))
    assert fleet.view().internal_due_on == before == days_after("2018-01-01", TEN_YEARS)


def test_rule_7_7_an_internal_look_without_readings_renews_the_cap_but_not_half_life() -> None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "internal", "2025-06-01")
    view = fleet.view()
    assert view.internal_due_on == days_after("2025-06-01", TEN_YEARS)
    assert view.last_internal_on == date(2025, 6, 1)
    fleet = steady(12.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "internal", "2025-06-01")
    assert fleet.view().internal_due_on == date(2028, 1, 1)  # still half life from the last observation


def test_rule_7_8_an_inspection_of_named_parts_does_not_renew_the_vessel() -> None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "internal", LAST, extent="shell")
    assert fleet.view().internal_due_on == days_after("2018-01-01", TEN_YEARS)


def test_rule_7_8_an_inspection_after_the_as_of_date_does_not_count_yet() -> None:
    fleet = steady(20.0, 0.25, inspected="2018-01-01")
    fleet.inspect(0, "internal", "2026-01-02")
    assert fleet.view().internal_due_on == days_after("2018-01-01", TEN_YEARS)
    assert fleet.view("2026-01-02").internal_due_on == days_after("2026-01-02", TEN_YEARS)


def deferred(until: str, decided: str = "2027-06-01", wall: float = 20.0) -> Fleet:
    fleet = steady(wall, 0.25, inspected="2018-01-01")
    fleet.decide(0, "deferral", decided, until_day=ordinal(until))
    return fleet


def test_rule_7_9_a_deferral_within_the_terms_moves_the_date() -> None:
    view = deferred("2028-03-31").view("2027-07-01")  # due 2027-12-31... moved by 90 days
    assert days_after("2018-01-01", TEN_YEARS) == date(2028, 1, 1)
    assert view.internal_due_on == date(2028, 3, 31)
    assert not {"deferral beyond terms", "deferral not in force"} & set(codes(view.doubts))


def test_rule_7_9_a_deferral_gives_half_a_year_at_most() -> None:
    # 10 % of 10 years is a year, the cap half a year: 182.625 days
    view = deferred("2028-12-31").view("2027-07-01")
    assert view.internal_due_on == days_after("2028-01-01", 182)
    assert "deferral beyond terms" in codes(view.doubts)


def test_rule_7_9_a_deferral_gives_a_tenth_of_the_interval_at_most() -> None:
    # half life 4 years: due 2028-01-01, a tenth is 0.4 years = 146.1 days
    view = deferred("2028-12-31", wall=12.0).view("2027-07-01")
    assert view.internal_due_on == days_after("2028-01-01", 146)


def test_rule_7_9_a_deferral_after_the_due_date_moves_nothing() -> None:
    view = deferred("2028-06-01", decided="2028-01-02").view("2028-02-01")
    assert view.internal_due_on == date(2028, 1, 1)
    assert "overdue" in view.flags
    assert "deferral not in force" in codes(view.doubts)


def test_rule_7_9_a_second_deferral_moves_nothing_more() -> None:
    fleet = deferred("2028-02-01")
    fleet.decide(0, "deferral", "2027-12-01", until_day=ordinal("2028-06-01"))
    view = fleet.view("2027-12-15")
    assert view.internal_due_on == date(2028, 2, 1)
    assert "deferral not in force" in codes(view.doubts)


def test_rule_7_9_a_deferral_ends_with_the_inspection_it_put_off() -> None:
    fleet = deferred("2028-02-01")
    fleet.inspect(0, "internal", "2028-01-15")
    view = fleet.view("2028-02-01")
    assert view.internal_due_on == days_after("2028-01-15", TEN_YEARS)
    assert "deferral not in force" not in codes(view.doubts)


def test_rule_7_9_a_deferral_to_an_earlier_date_moves_nothing() -> None:
    assert deferred("2027-08-01").view("2027-07-01").internal_due_on == date(2028, 1, 1)


def test_rule_7_1_a_blank_datum_never_puts_the_due_date_off() -> None:
    # required is 10 mm at least by the structural minimum, so the life is 8 years at most, whatever the stress
    fleet = steady(12.0, 0.25)
    known = fleet.view("2028-06-01")
    fleet.parts[0]["allowable_stress_mpa"] = None
    blank = fleet.view("2028-06-01")
    assert known.internal_due_on == date(2028, 1, 1)
    assert blank.internal_due_on is None or blank.internal_due_on <= date(2028, 1, 1)
    assert "overdue" in known.flags
    assert "overdue" in blank.flags


def test_rule_7_9_a_deferral_before_the_last_inspection_does_not_use_up_the_next() -> None:
    fleet = deferred("2028-02-01")
    fleet.inspect(0, "internal", "2028-01-15")  # due again 2038-01-14, 3652 days later
    fleet.decide(0, "deferral", "2037-06-01", until_day=ordinal("2038-03-01"))
    assert fleet.view("2037-07-01").internal_due_on == date(2038, 3, 1)
