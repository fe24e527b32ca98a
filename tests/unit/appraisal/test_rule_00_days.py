"""What stands before rule 1: what counts, how days are counted, and that nothing is rounded before it is judged.

Hand sums: a cylinder of 1000 mm inside and 14 mm nominal, loss inside, has the outside radius 514 mm; at 1 MPa with
S = 100 MPa, E = 1 it needs P·Ro / (S·E + 0.4·P) = 514 / 100.4 mm.
"""

from __future__ import annotations

from datetime import date, timedelta

import pytest
from invented import location_of, one_cylinder, ordinal

NEEDED = 514 / 100.4  # 5.1195…

# 2012, 2016, 2020 and 2024 are leap years: from one 1 January to the next of these lie 1461 days, 4 years exactly
LINE = (("2020-01-01", 13.6), ("2024-01-01", 11.2))  # 2.4 mm in 4 years: 0.6 mm/year


def test_rule_0_1_a_reading_after_the_as_of_date_does_not_count() -> None:
    view = one_cylinder(*LINE, ("2025-06-01", 6.0)).view("2025-05-31")
    assert location_of(view).last_thickness_mm == 11.2
    assert location_of(one_cylinder(*LINE, ("2025-06-01", 6.0)).view("2025-06-01")).last_thickness_mm == 6.0


def test_rule_0_1_an_inspection_after_the_as_of_date_does_not_count() -> None:
    fleet = one_cylinder(*LINE)
    fleet.inspect(0, "internal", "2026-01-02")
    assert fleet.view("2026-01-01").last_internal_on == date(2020, 1, 1)
    assert fleet.view("2026-01-02").last_internal_on == date(2026, 1, 2)


def test_rule_0_1_a_restart_after_the_as_of_date_does_not_count() -> None:
    fleet = one_cylinder(*LINE)
    fleet.restart(0, "new metal", "2026-01-02")
    assert location_of(fleet.view("2026-01-01")).wall_used_mm == 11.2
    assert location_of(fleet.view("2026-01-02")).wall_used_mm is None


def test_rule_0_1_a_decision_after_the_as_of_date_does_not_count() -> None:
    fleet = one_cylinder(*LINE)
    fleet.decide(0, "chosen rate", "2026-01-02", rate_mm_per_year=0.9, review_day=ordinal("2030-01-01"))
    assert location_of(fleet.view("2026-01-01")).rate_basis == "long-term"
    assert location_of(fleet.view("2026-01-02")).rate_basis == "chosen"


def test_rule_0_2_a_year_is_365_and_a_quarter_days() -> None:
    # 2021-01-01 to 2022-01-01 are 365 days, 0.9993 years
    rate = location_of(
        one_cylinder(("2021-01-01", 12.0), ("2022-01-01", 10.0)).view()
    ).long_term_rate_mm_per_year
    assert rate == pytest.approx(2.0 * 365.25 / 365, rel=1e-12)


def test_rule_0_3_the_retirement_date_is_a_whole_day_rounded_down() -> None:
    # (11.2 - 5.11952) / 0.6 = 10.134 years = 3701.49 days
    days = (11.2 - NEEDED) / 0.6 * 365.25
    assert 3701.4 < days < 3701.6
    assert one_cylinder(*LINE).view().retirement_on == date(2024, 1, 1) + timedelta(3701)


def test_rule_0_3_a_half_life_date_is_rounded_down_though_nearer_to_the_next_day() -> None:
    # half of that life is 1850.745 days: the nearest day would be the 1851st
    view = one_cylinder(*LINE).view()
    assert view.internal_due_on == date(2024, 1, 1) + timedelta(1850)
    assert view.carry_to_on == view.internal_due_on


def test_rule_0_3_the_cap_of_ten_years_is_rounded_down() -> None:
    # 3652.5 days; 2030-01-01 lies 3653 days after 2020-01-01
    view = one_cylinder(("2020-01-01", 12.0), ("2024-01-01", 11.9)).view()
    assert view.internal_due_on == date(2029, 12, 31)


def test_rule_0_3_the_carry_to_date_of_an_overdue_vessel_is_rounded_down() -> None:
    # due 2020 + 10 years; as of 2030-01-01 the list lives 365.25 days
    view = one_cylinder(("2020-01-01", 12.0), ("2024-01-01", 11.9)).view("2030-01-01")
    assert view.carry_to_on == date(2031, 1, 1)  # 365 days on


def test_rule_0_4_the_projection_goes_to_the_whole_day() -> None:
    place = location_of(one_cylinder(*LINE).view())
    assert place.projected_thickness_mm == pytest.approx(11.2 - 2 * 0.6 * 1850 / 365.25, rel=1e-12)


def test_rule_0_4_life_left_is_counted_from_whole_day_to_whole_day() -> None:
    view = one_cylinder(*LINE).view("2026-01-01")  # 731 days after 2024-01-01
    assert view.life_left_years == pytest.approx((3701 - 731) / 365.25, rel=1e-12)


def test_rule_0_5_no_loss_is_given_back_when_the_carry_to_date_lies_before_the_last_observation() -> None:
    place = location_of(one_cylinder(*LINE).view("2024-06-01", carry_to=date(2021, 1, 1)))
    assert place.projected_thickness_mm == 11.2


def test_rule_0_5_life_left_is_never_negative() -> None:
    view = one_cylinder(("2016-01-01", 13.6), ("2020-01-01", 5.6)).view(
        "2026-01-01"
    )  # 2 mm/year, gone in 2020
    assert view.retirement_on is not None
    assert view.retirement_on < date(2026, 1, 1)
    assert view.life_left_years == 0.0


def test_rule_0_5_remaining_life_is_never_negative() -> None:
    place = location_of(one_cylinder(("2016-01-01", 13.6), ("2020-01-01", 4.0)).view())
    assert place.remaining_life_years == 0.0


@pytest.mark.parametrize(
    ("wall", "standing"), [(NEEDED - 1e-7, "below required"), (NEEDED + 1e-7, "at required")]
)
def test_rule_0_6_the_standing_comes_from_unrounded_figures(wall: float, standing: str) -> None:
    # both walls print as 5.12 mm
    fleet = one_cylinder(("2020-01-01", 5.2), ("2024-01-01", wall), next_survey_day=ordinal("2024-01-01"))
    assert fleet.view("2024-01-01").standing == standing
