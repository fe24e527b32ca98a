"""Rule 8, the date to which the wall must carry the pressure."""

from __future__ import annotations

from datetime import date

import pytest
from handsums import LAST, days_after, outside_hoop, steady
from invented import codes, ordinal


def test_rule_8_1_the_planned_survey_if_given_and_not_past() -> None:
    view = steady(12.0, 0.25, next_survey_day=ordinal("2027-05-01")).view()
    assert (view.carry_to_on, view.carry_to_basis) == (date(2027, 5, 1), "planned survey")


def test_rule_8_1_a_survey_planned_for_the_as_of_date_is_not_past() -> None:
    view = steady(12.0, 0.25, next_survey_day=ordinal("2026-01-01")).view()
    assert (view.carry_to_on, view.carry_to_basis) == (date(2026, 1, 1), "planned survey")


def test_rule_8_1_a_planned_survey_that_is_past_is_left_aside() -> None:
    view = steady(12.0, 0.25, next_survey_day=ordinal("2025-12-31")).view()
    assert (view.carry_to_on, view.carry_to_basis) == (date(2028, 1, 1), "internal due date")


def test_rule_8_2_planned_survey_after_due_is_a_doubt_and_still_the_carry_to_date() -> None:
    view = steady(12.0, 0.25, next_survey_day=ordinal("2028-01-02")).view()
    assert "planned after due" in codes(view.doubts)
    assert view.carry_to_on == date(2028, 1, 2)
    on_time = steady(12.0, 0.25, next_survey_day=ordinal("2028-01-01")).view()
    assert "planned after due" not in codes(on_time.doubts)


def test_rule_8_3_else_the_internal_due_date_never_the_external() -> None:
    # external due 2024-01-01 + 4 years of 1461 days is 2028-01-01; inside by its cap much later
    view = steady(20.0, 0.25, inspected=LAST).view()
    assert view.external_due_on == days_after(LAST, 1826)
    assert view.internal_due_on == view.carry_to_on == days_after(LAST, 3652)


def test_rule_8_4_overdue_is_due_before_the_as_of_date() -> None:
    fleet = steady(12.0, 0.25)  # inside and outside due 2028-01-01
    assert "overdue" not in fleet.view("2028-01-01").flags
    assert "overdue" in fleet.view("2028-01-02").flags


def test_rule_8_5_overdue_vessel_whose_due_date_is_past_is_carried_over_the_life_of_the_list() -> None:
    view = steady(12.0, 0.25).view("2028-06-01")
    assert view.internal_due_on == date(2028, 1, 1)
    assert (view.carry_to_on, view.carry_to_basis) == (days_after("2028-06-01", 365), "life of the list")


def test_rule_8_5_overdue_vessel_is_carried_to_a_later_planned_survey() -> None:
    later = steady(12.0, 0.25, next_survey_day=ordinal("2029-09-01")).view("2028-06-01")
    assert (later.carry_to_on, later.carry_to_basis) == (date(2029, 9, 1), "planned survey")
    sooner = steady(12.0, 0.25, next_survey_day=ordinal("2028-09-01")).view("2028-06-01")
    assert (sooner.carry_to_on, sooner.carry_to_basis) == (days_after("2028-06-01", 365), "life of the list")


def test_rule_8_5_the_life_of_the_list_is_a_setting() -> None:
    fleet = steady(12.0, 0.25)
    fleet.list_life_years = 2.0
    assert fleet.view("2028-06-01").carry_to_on == days_after("2028-06-01", 730)


def test_rule_8_5_due_on_the_as_of_date_is_not_past() -> None:
    view = steady(12.0, 0.25).view("2028-01-01")
    assert (view.carry_to_on, view.carry_to_basis) == (date(2028, 1, 1), "internal due date")


def test_rule_8_6_a_past_external_date_only_sets_the_flag() -> None:
    fleet = steady(20.0, 0.25, inspected=None)
    fleet.inspect(0, "internal", LAST)
    fleet.inspect(0, "external", "2019-01-01")
    view = fleet.view()
    assert view.external_due_on == days_after("2019-01-01", 1826)
    assert "overdue" in view.flags
    assert (view.carry_to_on, view.carry_to_basis) == (days_after(LAST, 3652), "internal due date")


def test_rule_8_7_a_carry_to_date_within_the_life_of_the_list_is_flagged_with_the_figure_of_its_end() -> None:
    view = steady(12.0, 0.25, required=0.0, nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0,
                  next_survey_day=ordinal("2026-07-01")).view()  # fmt: skip
    assert "survey within the year" in view.flags
    assert view.list_end_on == date(2027, 1, 1)
    # 1096 days from 2024-01-01 to the end of the list, twice 0.25 mm/year
    wall = 12.0 - 2 * 0.25 * 1096 / 365.25
    assert view.projected_mawp_at_list_end_mpa == pytest.approx(outside_hoop(0.0, wall), rel=1e-9)


def test_rule_8_7_a_later_carry_to_date_has_neither_flag_nor_figure() -> None:
    view = steady(12.0, 0.25, next_survey_day=ordinal("2027-07-01")).view()
    assert "survey within the year" not in view.flags
    assert view.projected_mawp_at_list_end_mpa is None


def test_rule_8_7_the_figure_at_the_end_of_the_list_has_no_standing() -> None:
    # on 2026-07-01 the wall still carries, at the end of the list it would not: 10.85 - 0.5·2.50 and - 0.5·3.00
    view = steady(11.25, 0.25, next_survey_day=ordinal("2026-04-01")).view()
    held = 11.25 - 0.5 * (ordinal("2026-04-01") - ordinal(LAST)) / 365.25
    late = 11.25 - 0.5 * 1096 / 365.25
    assert late < 10.0 < held
    assert view.standing == "running out"


def test_rule_8_8_missing_next_survey_on_is_a_gap() -> None:
    assert "no planned survey" in codes(steady(12.0, 0.25).view().gaps)
    assert "no planned survey" not in codes(
        steady(12.0, 0.25, next_survey_day=ordinal("2027-01-01")).view().gaps
    )


@pytest.mark.parametrize("as_of", ["2026-01-01", "2028-06-01"])
def test_rule_8_9_carry_to_asks_about_another_date_overdue_or_not(as_of: str) -> None:
    fleet = steady(12.0, 0.25, next_survey_day=ordinal("2027-05-01"))
    view = fleet.view(as_of, carry_to=date(2030, 1, 1))
    assert (view.carry_to_on, view.carry_to_basis) == (date(2030, 1, 1), "date asked for")
    # 2192 days at twice 0.25
    assert view.parts[0].locations[0].projected_thickness_mm == pytest.approx(
        12 - 0.5 * 2192 / 365.25, rel=1e-12
    )


def test_rule_8_9_the_date_asked_for_moves_no_due_date() -> None:
    fleet = steady(12.0, 0.25)
    assert fleet.view(carry_to=date(2030, 1, 1)).internal_due_on == fleet.view().internal_due_on
