"""Rule 13, the ways out for every vessel not held."""

from __future__ import annotations

from datetime import date

import pytest
from handsums import LAST, add_steady, days_after, outside_hoop, steady
from invented import Fleet, ordinal

from fleet.appraisal.views import WaysOut


def short(**vessel: object) -> Fleet:
    """Give a vessel that is short on 2027-01-01: 7.1195 mm, 2 above what 1 MPa needs, at 0.5 mm/year."""
    given = {"next_survey_day": ordinal("2027-01-01")} | vessel
    return steady(outside_hoop(1.0) + 2.0, 0.5, required=0.0, **given)


def ways(fleet: Fleet, as_of: str = "2026-01-01") -> WaysOut:
    found = fleet.view(as_of).ways_out
    assert found is not None
    return found


def test_rule_13_1_the_date_to_which_the_current_mawp_holds() -> None:
    # 2 mm at twice 0.5 mm/year: two years = 730.5 days
    view = short().view("2024-06-01")
    assert view.standing == "rating short"
    assert view.rating_holds_until == ways(short(), "2024-06-01").rating_holds_until == days_after(LAST, 730)


def test_rule_13_1_the_rating_does_not_hold_where_a_given_limit_lies_below_it() -> None:
    fleet = steady(14.0, 0.25)
    fleet.parts[0]["other_pressure_limit_mpa"] = 0.8
    view = fleet.view()
    assert view.standing == "rating short"
    assert view.rating_holds_until is None or view.rating_holds_until <= date(2026, 1, 1)


def test_rule_13_2_the_pressure_that_reaches_the_carry_to_date() -> None:
    wall = outside_hoop(1.0) + 2.0 - 2 * 0.5 * 1096 / 365.25
    assert ways(short(), "2024-06-01").pressure_that_reaches_mpa == pytest.approx(
        outside_hoop(0.0, wall), rel=1e-9
    )


def test_rule_13_2_it_is_the_least_of_all_parts() -> None:
    fleet = short()
    add_steady(fleet, 0, "head", outside_hoop(1.0) + 1.9, 0.5)
    wall = outside_hoop(1.0) + 1.9 - 2 * 0.5 * 1096 / 365.25
    assert ways(fleet, "2024-06-01").pressure_that_reaches_mpa == pytest.approx(
        outside_hoop(0.0, wall), rel=1e-9
    )


def test_rule_13_3_none_where_the_structural_minimum_governs() -> None:
    assert ways(steady(11.0, 0.25, next_survey_day=ordinal("2027-01-01"))).pressure_that_reaches_mpa is None


@pytest.mark.parametrize("minimum", ["required_thickness_external_mm", "required_thickness_axial_mm"])
def test_rule_13_3_none_where_another_minimum_that_is_no_pressure_governs(minimum: str) -> None:
    fleet = steady(11.0, 0.25, required=0.0, next_survey_day=ordinal("2027-01-01"))
    fleet.parts[0][minimum] = 10.0
    assert fleet.view().standing == "rating short"
    assert ways(fleet).pressure_that_reaches_mpa is None


def test_rule_13_3_none_where_a_wall_is_at_its_structural_minimum() -> None:
    # 10.3 mm is at required; no lower pressure helps, whatever the carry-to date
    fleet = steady(10.3, 0.025, next_survey_day=ordinal("2026-06-01"))
    assert fleet.view().standing == "at required"
    assert ways(fleet).pressure_that_reaches_mpa is None


def test_rule_13_3_a_structural_minimum_that_does_not_govern_leaves_the_pressure() -> None:
    fleet = short()
    fleet.parts[0]["structural_minimum_mm"] = 3.0
    assert ways(fleet, "2024-06-01").pressure_that_reaches_mpa is not None


def test_rule_13_4_the_date_by_which_repair_or_renewal_is_needed() -> None:
    # 2 mm at 0.5 mm/year: four years
    assert ways(short(), "2024-06-01").renew_by == date(2028, 1, 1)
    assert short().view("2024-06-01").retirement_on == date(2028, 1, 1)


def test_rule_13_5_every_vessel_not_held_has_them_and_a_held_one_none() -> None:
    planned = {"next_survey_day": ordinal("2027-01-01")}
    for wall, rate in ((9.99, 0.01), (10.4, 0.01), (10.45, 0.25), (11.0, 0.25), (12.0, 0.25)):
        assert steady(wall, rate, **planned).view().ways_out is not None
    assert steady(14.0, 0.25, **planned).view().ways_out is None


def test_rule_13_5_no_verdict_has_them_for_what_is_known() -> None:
    fleet = steady(14.0, 0.25)
    fleet.part(0, "never measured")
    assert fleet.view().standing == "no verdict"
    assert ways(fleet).renew_by == date(2040, 1, 1)


def test_rule_13_5_no_pressure_reaches_where_a_part_was_never_measured() -> None:
    # what an unmeasured part carries is not known: no pressure of the vessel can be promised to reach the date
    fleet = steady(14.0, 0.25, required=0.0)
    fleet.part(0, "never measured")
    assert ways(fleet).pressure_that_reaches_mpa is None


def test_rule_13_5_no_pressure_reaches_where_a_given_thickness_is_used_up() -> None:
    # the box of shape other is below its given thickness on the carry-to date: what it carries then is not known
    fleet = steady(14.0, 0.025, required=0.0, next_survey_day=ordinal("2027-01-01"))
    add_steady(fleet, 0, "box", 11.0, 0.25, shape="other", required_thickness_given_mm=10.0)
    assert fleet.view().standing == "rating short"
    assert ways(fleet).pressure_that_reaches_mpa is None
