"""Rule 10, from locations to parts and the vessel, and what withholds a verdict."""

from __future__ import annotations

import math
from typing import Any

import pytest
from handsums import FIRST, LAST, add_steady, days_after, steady
from invented import Fleet, codes, location_of, ordinal, part_of

from fleet.appraisal.views import Place


def pair(**vessel: Any) -> Fleet:
    """Give a sound vessel: shell and head, each with locations L1 and L2 read in 2016 and 2024."""
    fleet = Fleet()
    row: dict[str, Any] = {"inspected": LAST, "next_survey_day": ordinal("2027-06-01")}
    fleet.vessel(**(row | vessel))
    for name in ("shell", "head"):
        part = add_steady(fleet, 0, name, 13.0, 0.1)
        fleet.read(fleet.location(part, "L2"), (FIRST, 13.8), (LAST, 13.0))
    return fleet


SHELL_1, SHELL_2, HEAD_1, HEAD_2 = range(4)


def test_rule_10_1_pressure_and_life_governed_by_different_locations() -> None:
    fleet = Fleet()
    fleet.vessel(
        inspected=LAST, nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0, next_survey_day=ordinal("2025-01-01")
    )
    # thick wall with a structural minimum near, and fast: life (13 - 10) / 0.5 = 6 years
    add_steady(fleet, 0, "skirted", 13.0, 0.5, structural_minimum_mm=10.0)
    # thicker, slow, and twice as wide: carries less pressure, 100·14 / (1014 - 5.6), needs 1014 / 100.4 = 10.1 mm
    add_steady(fleet, 0, "shell", 14.0, 0.05, inside_diameter_mm=2000.0)
    view = fleet.view("2024-06-01")
    assert view.governing_life == Place("skirted", "L1")
    assert view.governing_pressure == Place("shell", "L1")
    assert view.governing_due == Place("skirted", "L1")
    assert view.retirement_on == days_after(LAST, 2191)  # 6 years = 2191.5 days
    wall = 14.0 - 2 * 0.05 * 366 / 365.25
    assert view.projected_mawp_mpa == pytest.approx(100 * wall / (1014 - 0.4 * wall), rel=1e-9)


def test_rule_10_1_earliest_retirement_is_not_shortest_life() -> None:
    fleet = Fleet()
    fleet.vessel(inspected=LAST)
    # life 6 years from 2024; life 12 years from 2016, that is to 2028-01-01 (4383 days)
    add_steady(fleet, 0, "shell", 13.0, 0.5, structural_minimum_mm=10.0)
    head = fleet.part(0, "head", structural_minimum_mm=10.0)
    fleet.read(fleet.location(head), ("2008-01-02", 16.0), (FIRST, 13.0 + 1e-12))
    view = fleet.view("2024-06-01")
    years = 13.0 - 10.0
    rate = 3.0 / ((ordinal(FIRST) - ordinal("2008-01-02")) / 365.25)
    assert view.governing_life == Place("head", "L1")
    assert view.retirement_on == days_after(FIRST, math.floor(years / rate * 365.25 + 1e-6))


def test_rule_10_2_no_thickness_is_paired_with_another_locations_rate() -> None:
    fleet = Fleet()
    fleet.vessel(inspected=LAST)
    thin = add_steady(fleet, 0, "shell", 11.0, 0.05, structural_minimum_mm=10.0)
    fleet.read(fleet.location(thin, "L2"), (FIRST, 20.0), (LAST, 16.0))
    view = fleet.view("2024-06-01")
    # thin and slow: 1 / 0.05 = 20 years; thick and fast: 6 / 0.5 = 12 years; never 1 / 0.5 = 2 years
    lives = [location_of(view, "shell", name).remaining_life_years for name in ("L1", "L2")]
    assert lives == pytest.approx([20.0, 12.0])
    assert view.retirement_on == days_after(LAST, 4383)


def test_rule_10_3_part_never_measured_gives_no_verdict() -> None:
    fleet = pair()
    assert fleet.view().standing == "rating held"
    fleet.location(fleet.part(0, "boot"), "L1")
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "part never measured" in codes(view.gaps)


def test_rule_10_3_part_without_any_location_gives_no_verdict() -> None:
    fleet = pair()
    fleet.part(0, "boot")
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "part without location" in codes(view.gaps)


def test_rule_10_3_vessel_without_any_part_gives_no_verdict() -> None:
    fleet = Fleet()
    fleet.vessel()
    view = fleet.view()
    assert (view.standing, view.parts_total, view.mawp_today_mpa) == ("no verdict", 0, None)
    assert "no part" in codes(view.gaps)


def test_rule_10_3_a_withdrawn_part_is_not_waited_for() -> None:
    fleet = pair()
    fleet.part(0, "boot", state="withdrawn")
    view = fleet.view()
    assert (view.standing, view.parts_total) == ("rating held", 2)
    assert "withdrawn" in codes(view.gaps)


def test_rule_10_4_a_part_without_a_needed_datum_gives_no_verdict() -> None:
    fleet = pair()
    fleet.parts[1]["allowable_stress_mpa"] = None
    view = fleet.view()
    assert view.standing == "no verdict"
    assert (part_of(view, "head").mawp_today_mpa, part_of(view, "shell").mawp_today_mpa) == (None, 1.0)


def test_rule_10_4_a_part_without_any_rate_gives_no_verdict() -> None:
    fleet = pair()
    boot = fleet.part(
        0, "boot", inside_diameter_mm=None, outside_diameter_mm=1028.0, nominal_thickness_mm=None
    )
    fleet.read(fleet.location(boot), (LAST, 13.0))
    view = fleet.view()
    assert location_of(view, "boot").planning_rate_mm_per_year is None
    assert view.standing == "no verdict"
    assert "no rate" in codes(view.gaps)


def test_rule_10_5_no_echo_at_last_visit_gives_no_verdict() -> None:
    fleet = pair()
    fleet.read(SHELL_1, ("2025-06-01", None), result="no echo")
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "no echo at last visit" in codes(view.gaps)


def test_rule_10_5_no_echo_answered_by_a_thickness_is_over() -> None:
    fleet = pair()
    fleet.read(SHELL_1, ("2025-06-01", None), result="no echo")
    fleet.read(SHELL_1, ("2025-06-20", 12.9))
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    assert fleet.view().standing == "rating held"


def test_rule_10_5_no_echo_and_a_thickness_of_the_same_day_is_a_thickness() -> None:
    fleet = pair()
    fleet.read(SHELL_1, ("2025-06-01", None), result="no echo")
    fleet.read(SHELL_1, ("2025-06-01", 12.9))
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    assert fleet.view().standing == "rating held"


@pytest.mark.parametrize("result", ["no access", "lamination"])
@pytest.mark.parametrize("again", ["2025-06-02", "2025-06-11"])
def test_rule_10_5_no_echo_is_not_answered_by_another_failure_of_the_same_visit(
    result: str, again: str
) -> None:
    fleet = pair()
    fleet.read(SHELL_1, ("2025-06-01", None), result="no echo")
    fleet.read(SHELL_1, (again, None), result=result)
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "no echo at last visit" in codes(view.gaps)


@pytest.mark.parametrize("result", ["no access", "lamination", "no echo"])
def test_rule_10_6_all_of_a_part_skipped_at_the_last_visit_gives_no_verdict(result: str) -> None:
    fleet = pair()
    for place in (SHELL_1, SHELL_2):
        fleet.read(place, ("2025-06-01", None), result=result)
    view = fleet.view()
    assert view.standing == "no verdict"
    assert "part not read at last visit" in codes(view.gaps)


def test_rule_10_6_a_visit_to_one_part_is_no_visit_to_another() -> None:
    fleet = pair()
    fleet.read(SHELL_1, ("2025-06-01", 12.9))
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    view = fleet.view()
    assert view.standing == "rating held"
    assert "part not read at last visit" not in codes(view.gaps)


@pytest.mark.parametrize("result", ["no access", "lamination"])
def test_rule_10_7_another_skipped_location_carries_its_earlier_wall_on_with_a_gap(result: str) -> None:
    fleet = pair()
    fleet.read(SHELL_1, ("2025-06-01", None), result=result)
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    view = fleet.view()
    assert view.standing == "rating held"
    assert location_of(view, "shell", "L1").wall_used_mm == 13.0
    assert [gap.where for gap in view.gaps if gap.code == "location not read at last visit"] == [
        "V-1 / shell / L1"
    ]


def test_rule_10_7_a_location_left_out_without_a_word_is_a_gap_too() -> None:
    fleet = pair()
    fleet.read(SHELL_2, ("2025-06-01", 12.9))
    view = fleet.view()
    assert view.standing == "rating held"
    assert [gap.where for gap in view.gaps if gap.code == "location not read at last visit"] == [
        "V-1 / shell / L1"
    ]


@pytest.mark.parametrize(
    ("wall", "rate", "standing"),
    [
        (9.9, 0.1, "below required"),
        (10.2, 0.01, "at required"),
        (10.5, 0.3, "used up by its rate"),  # 10.5 - 0.3·2.0 = 9.9
        (11.0, 0.25, "rating short"),  # 11 - 0.25·2.0 = 10.5; 11 - 0.5·3.4 = 9.3
        (13.0, 0.1, "no verdict"),
    ],
)
def test_rule_10_8_what_is_known_to_be_rating_short_or_worse_stands(
    wall: float, rate: float, standing: str
) -> None:
    fleet = steady(wall, rate, next_survey_day=ordinal("2027-06-01"))
    fleet.part(0, "never measured")
    assert fleet.view().standing == standing


def test_rule_10_8_running_out_and_held_give_way_to_no_verdict() -> None:
    fleet = steady(12.0, 0.25, next_survey_day=ordinal("2027-06-01"))
    assert fleet.view().standing == "running out"
    fleet.part(0, "never measured")
    assert fleet.view().standing == "no verdict"


def test_rule_10_8_a_wall_below_its_known_minimum_is_told_though_a_datum_is_missing() -> None:
    fleet = steady(9.9, 0.1)
    fleet.parts[0]["joint_efficiency_long"] = None
    view = fleet.view()
    assert view.standing == "below required"
    assert part_of(view).required_thickness_mm is None


def test_rule_10_9_the_known_figures_are_still_shown() -> None:
    fleet = pair()
    fleet.part(0, "boot")
    view = fleet.view()
    assert (view.parts_measured, view.parts_total) == (2, 3)
    assert view.mawp_today_mpa == 1.0
    assert view.projected_mawp_mpa == 1.0
    assert view.retirement_on is not None


def test_rule_10_10_vacuum_without_minimum_is_no_verdict() -> None:
    view = pair(external_design_pressure_mpa=0.1).view()
    assert view.standing == "no verdict"
    assert codes(view.gaps).count("vacuum not assessed") == 2


def test_rule_10_10_vacuum_with_minimum_has_its_verdict() -> None:
    fleet = pair(external_design_pressure_mpa=0.1)
    fleet.parts[0]["required_thickness_external_mm"] = 9.0
    assert fleet.view().standing == "no verdict"  # the head still lacks its own
    fleet.parts[1]["required_thickness_external_mm"] = 9.0
    view = fleet.view()
    assert view.standing == "rating held"
    assert (part_of(view).required_thickness_mm, part_of(view).required_by) == (9.0, "external")


def test_rule_10_10_external_pressure_blank_is_taken_as_none_with_a_gap() -> None:
    view = pair(external_design_pressure_mpa=None).view()
    assert view.standing == "rating held"
    assert "external pressure blank" in codes(view.gaps)


def test_rule_10_11_taller_than_five_diameters_without_axial_load_minimum_is_a_doubt() -> None:
    fleet = pair()
    fleet.parts[0] |= {"length_mm": 5001.0, "required_thickness_axial_mm": None}
    fleet.parts[1] |= {"shape": "hemispherical head", "joint_efficiency": 1.0, "length_mm": None,
                       "joint_efficiency_long": None, "joint_efficiency_circ": None,
                       "required_thickness_axial_mm": None}  # fmt: skip
    assert "wind and weight not assessed" in codes(fleet.view().doubts)
    fleet.parts[0]["length_mm"] = 4000.0
    assert "wind and weight not assessed" not in codes(fleet.view().doubts)
    fleet.parts[0] |= {"length_mm": 9000.0, "required_thickness_axial_mm": 4.0}
    assert "wind and weight not assessed" not in codes(fleet.view().doubts)


def test_rule_10_11_the_courses_of_a_shell_stand_on_one_another() -> None:
    fleet = pair()
    for part in fleet.parts:
        part |= {"length_mm": 2600.0, "required_thickness_axial_mm": None}
    assert "wind and weight not assessed" in codes(fleet.view().doubts)


def test_rule_10_11_the_minimum_of_a_nozzle_says_nothing_of_the_tower() -> None:
    fleet = pair()
    for part in fleet.parts:
        part |= {"length_mm": 2600.0, "required_thickness_axial_mm": None}
    neck = add_steady(fleet, 0, "N1", 13.0, 0.1, shape="nozzle neck", inside_diameter_mm=300.0)
    fleet.parts[neck]["required_thickness_axial_mm"] = 0.0
    assert "wind and weight not assessed" in codes(fleet.view().doubts)
