"""Rule 9, projection and MAWP: cylinder on an outside radius of 514 mm, S = 100 MPa; P = S·E·t / (Ro - 0.4·t)."""

from __future__ import annotations

import math
from datetime import date

import pytest
from handsums import FIRST, LAST, add_steady, outside_hoop, steady
from invented import Fleet, location_of, ordinal, part_of

from fleet.appraisal.views import PartView

DAYS_TO_AS_OF = 731  # 2024-01-01 to 2026-01-01
WALL_TODAY = 12.0 - 0.25 * DAYS_TO_AS_OF / 365.25
WALL_2028 = 12.0 - 2 * 0.25 * 4.0  # 10 mm, twice the loss


def roomy(wall: float = 12.0, **part: object) -> Fleet:
    """Give a vessel with no structural minimum, plated for 9 MPa and used at 1."""
    fleet = Fleet()
    fleet.vessel(
        inspected=LAST, nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0, next_survey_day=ordinal("2028-01-01")
    )
    add_steady(fleet, 0, "shell", wall, 0.25, **part)
    return fleet


def shell(**part: object) -> PartView:
    return part_of(roomy(**part).view())  # type: ignore[arg-type]  # the wall comes by its own name


def test_rule_9_1_twice_the_loss_to_the_carry_to_date() -> None:
    place = location_of(roomy().view())
    assert place.projected_thickness_mm == pytest.approx(10.0, rel=1e-12)
    assert place.projected_mawp_mpa == pytest.approx(100 * 10 / (514 - 4), rel=1e-12)


def test_rule_9_1_counted_from_the_last_observation_not_from_the_as_of_date() -> None:
    fleet = roomy()
    assert location_of(fleet.view("2024-06-01")).projected_thickness_mm == pytest.approx(10.0, rel=1e-12)


def test_rule_9_1_a_carry_to_date_before_the_last_observation_takes_nothing_off() -> None:
    place = location_of(roomy().view(carry_to=date(2020, 1, 1)))
    assert place.projected_thickness_mm == 12.0


def test_rule_9_1_a_projected_wall_is_never_below_nought() -> None:
    place = location_of(roomy().view(carry_to=date(2090, 1, 1)))
    assert (place.projected_thickness_mm, place.projected_mawp_mpa) == (0.0, 0.0)


def test_rule_9_2_mawp_today_takes_the_single_loss_to_the_as_of_date() -> None:
    assert shell().mawp_today_mpa == pytest.approx(outside_hoop(0.0, WALL_TODAY), rel=1e-9)


def test_rule_9_3_the_weaker_direction_decides() -> None:
    # axial, E = 0.3: P = 2·S·E·t / (Ro - 1.4·t) = 60·10 / (514 - 14)
    assert shell(joint_efficiency_circ=0.3).projected_mawp_mpa == pytest.approx(600 / 500, rel=1e-12)


def test_rule_9_3_the_geometry_is_corroded() -> None:
    # sphere: P = 2·S·E·t / (Ro - 0.8·t); outside loss: P = 2·S·E·t / (R + 0.2·t)
    assert shell(shape="sphere").projected_mawp_mpa == pytest.approx(2000 / 506, rel=1e-12)
    assert shell(shape="sphere", loss_side="outside").projected_mawp_mpa == pytest.approx(
        2000 / 502, rel=1e-12
    )


def test_rule_9_3_a_cone_has_grown() -> None:
    cos = math.cos(math.radians(30.0))
    # D = 1000 + 2·4/cos; P = 2·S·E·t·cos / (D + 1.2·t·cos)
    expected = 2000 * cos / (1000 + 8 / cos + 12 * cos)
    part = shell(shape="cone", half_apex_angle_deg=30.0)
    assert part.projected_mawp_mpa == pytest.approx(expected, rel=1e-12)


def test_rule_9_3_a_torispherical_crown_has_grown() -> None:
    # L = 1004, M = (3 + √10.04) / 4; P = 2·S·E·t / (L·M + 0.2·t)
    part = shell(shape="torispherical head", crown_radius_mm=1000.0, knuckle_radius_mm=100.0)
    expected = 2000 / (1004 * (3 + math.sqrt(10.04)) / 4 + 2)
    assert part.projected_mawp_mpa == pytest.approx(expected, rel=1e-12)


def test_rule_9_3_a_flat_cover_by_its_thickness() -> None:
    # P = S·E·t² / (C·d²) = 100·100 / (0.3·90000)
    part = shell(shape="flat cover", cover_factor=0.3, inside_diameter_mm=300.0)
    assert part.projected_mawp_mpa == pytest.approx(10000 / 27000, rel=1e-12)


def test_rule_9_4_less_static_head() -> None:
    assert shell(static_head_mpa=0.2).projected_mawp_mpa == pytest.approx(1000 / 510 - 0.2, rel=1e-12)


def test_rule_9_4_never_below_nought() -> None:
    part = shell(static_head_mpa=5.0)
    assert (part.projected_mawp_mpa, part.projected_mawp_uncapped_mpa, part.mawp_today_mpa) == (0.0, 0.0, 0.0)


def test_rule_9_5_never_above_nameplate_and_the_uncapped_figure_beside() -> None:
    view = steady(12.0, 0.25, next_survey_day=ordinal("2028-01-01")).view()
    assert (view.mawp_today_mpa, view.projected_mawp_mpa) == (1.0, 1.0)
    assert view.projected_mawp_uncapped_mpa == pytest.approx(1000 / 510, rel=1e-12)


def test_rule_9_5_derated_years_ago_required_at_current_cap_at_nameplate() -> None:
    view = steady(12.0, 0.25, required=0.0, current_mawp_mpa=0.6).view()
    assert view.parts[0].required_thickness_mm == pytest.approx(outside_hoop(0.6), rel=1e-12)
    assert (view.current_mawp_mpa, view.nameplate_mawp_mpa, view.mawp_today_mpa) == (0.6, 1.0, 1.0)
    assert view.standing == "rating held"


def test_rule_9_5_rerated_above_nameplate_the_current_mawp_is_the_cap() -> None:
    view = steady(12.0, 0.25, required=0.0, current_mawp_mpa=1.4).view()
    assert view.mawp_today_mpa == 1.4


def test_rule_9_5_nameplate_blank_means_design_pressure() -> None:
    view = steady(12.0, 0.25, required=0.0, nameplate_mawp_mpa=None, design_pressure_mpa=0.9).view()
    assert (view.nameplate_mawp_mpa, view.current_mawp_mpa, view.mawp_today_mpa) == (0.9, 0.9, 0.9)
    assert "nameplate blank" in [doubt.code for doubt in view.doubts]


def test_rule_9_6_never_above_a_given_other_limit() -> None:
    part = shell(other_pressure_limit_mpa=1.25)
    assert (part.projected_mawp_mpa, part.mawp_today_mpa) == (1.25, 1.25)
    assert shell(other_pressure_limit_mpa=3.0).projected_mawp_mpa == pytest.approx(1000 / 510, rel=1e-12)


def test_rule_9_6_a_limit_below_current_makes_the_rating_short() -> None:
    assert roomy(other_pressure_limit_mpa=0.8).view().standing == "rating short"


def test_rule_9_7_a_figure_that_cannot_be_had_has_a_gap_that_says_why() -> None:
    # plain mechanics holds while r >= 10·t: 12 mm in a bore of 100 mm has no figure, though 1 MPa needs 0.6 mm only
    fleet = Fleet()
    fleet.vessel(inspected=LAST, design_code="membrane")
    add_steady(fleet, 0, "N1", 12.0, 0.25, shape="nozzle neck", inside_diameter_mm=100.0)
    view = fleet.view()
    said = "outside formula limits" in [gap.code for gap in view.gaps] and view.standing == "no verdict"
    assert said or part_of(view, "N1").projected_mawp_mpa is not None


def test_rule_9_1_a_thickness_before_the_first_of_the_history_is_not_projected() -> None:
    place = location_of(roomy().view(FIRST))
    assert place.observations == 1
    assert place.last_on == date(2016, 1, 1)
