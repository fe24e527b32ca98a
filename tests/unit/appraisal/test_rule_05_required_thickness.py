"""Rule 5, required thickness: every figure reckoned here from the formula of the clause, P = 1 MPa, S = 100 MPa.

Formulas: ASME BPVC Section VIII Division 1, UG-27, UG-32, UG-34 and Appendix 1, as read in secondary material.
"""

from __future__ import annotations

import math
from typing import Any

import pytest
from handsums import outside_hoop
from invented import Fleet, codes, location_of, part_of

from fleet.appraisal.views import PartView, VesselView

READ = (("2015-01-01", 13.5), ("2025-01-01", 13.0))
COS_30 = math.cos(math.radians(30.0))


def view_with(**part: Any) -> VesselView:
    fleet = Fleet()
    fleet.vessel(**part.pop("vessel", {}))
    fleet.part(**part)
    fleet.location()
    fleet.read(0, *READ)
    return fleet.view()


def shell_with(**part: Any) -> PartView:
    return part_of(view_with(**part))


@pytest.mark.parametrize(
    ("minimum", "by"),
    [
        ("structural_minimum_mm", "structural"),
        ("required_thickness_external_mm", "external"),
        ("required_thickness_axial_mm", "axial load"),
    ],
)
def test_rule_5_1_the_largest_of_all_minima_is_required(minimum: str, by: str) -> None:
    larger, smaller = shell_with(**{minimum: 6.0}), shell_with(**{minimum: 5.0})
    assert (larger.required_thickness_mm, larger.required_by) == (6.0, by)
    assert smaller.required_by == "hoop"
    assert smaller.required_thickness_mm == pytest.approx(514 / 100.4, rel=1e-12)


def test_rule_5_1_at_current_mawp_plus_static_head() -> None:
    # current 0.9 on a nameplate of 2.0, and 0.1 of liquid: 1.0 MPa at the lowest point
    part = shell_with(static_head_mpa=0.1, vessel={"nameplate_mawp_mpa": 2.0, "current_mawp_mpa": 0.9})
    assert part.required_thickness_mm == pytest.approx(514 / 100.4, rel=1e-12)


def test_rule_5_2_the_long_seam_goes_with_hoop() -> None:
    # P·Ro / (S·E + 0.4·P), E = 0.7
    part = shell_with(joint_efficiency_long=0.7)
    assert part.required_thickness_mm == pytest.approx(514 / 70.4, rel=1e-12)
    assert part.required_by == "hoop"


def test_rule_5_2_the_girth_seam_goes_with_axial_stress() -> None:
    # P = 2·S·E·t / (R - 0.4·t), R = 514 - t: t = P·514 / (2·S·E + 1.4·P), E = 0.3
    part = shell_with(joint_efficiency_circ=0.3)
    assert part.required_thickness_mm == pytest.approx(514 / 61.4, rel=1e-12)
    assert part.required_by == "axial"


def test_rule_5_2_a_nozzle_neck_uses_both_seams_as_a_cylinder_does() -> None:
    assert shell_with(shape="nozzle neck", joint_efficiency_long=0.7).required_by == "hoop"
    assert shell_with(shape="nozzle neck", joint_efficiency_circ=0.3).required_by == "axial"


def test_rule_5_2_a_cone_uses_both_seams() -> None:
    cone = {"shape": "cone", "half_apex_angle_deg": 30.0}
    # across = 1000 + 28/cos; hoop t = P·across / (2·cos·(S·E - 0.6·P) + 2·P/cos)
    across = 1000 + 28 / COS_30
    hoop = shell_with(**cone, joint_efficiency_long=0.7)
    assert hoop.required_thickness_mm == pytest.approx(across / (2 * COS_30 * 69.4 + 2 / COS_30), rel=1e-12)
    # axial t = P·across / (2·cos·(2·S·E + 0.4·P) + 2·P/cos)
    axial = shell_with(**cone, joint_efficiency_circ=0.3)
    assert axial.required_thickness_mm == pytest.approx(across / (2 * COS_30 * 60.4 + 2 / COS_30), rel=1e-12)
    assert (hoop.required_by, axial.required_by) == ("hoop", "axial")


@pytest.mark.parametrize(
    ("shape", "more", "expected"),
    [
        # P·Ro / (2·S·E + 0.8·P) on 514 mm, E = 0.8
        ("sphere", {}, 514 / 160.8),
        ("hemispherical head", {}, 514 / 160.8),
        # K = 1: P·Do / (2·S·E + 1.8·P) on 1028 mm
        ("ellipsoidal head", {"axis_ratio": 2.0}, 1028 / 161.8),
        # d·√(C·P / (S·E))
        ("flat cover", {"cover_factor": 0.3, "inside_diameter_mm": 300.0}, 300 * math.sqrt(0.3 / 80)),
    ],
)
def test_rule_5_3_spheres_heads_and_covers_use_the_written_efficiency(
    shape: str, more: dict[str, Any], expected: float
) -> None:
    part = shell_with(shape=shape, joint_efficiency=0.8, **more)
    assert part.required_thickness_mm == pytest.approx(expected, rel=1e-12)
    assert part.required_by == ("hoop" if shape == "sphere" else "end")


def test_rule_5_3_a_torispherical_head_uses_the_written_efficiency() -> None:
    # loss outside, nothing grows: P·L·M / (2·S·E - 0.2·P), M = (3 + √10) / 4
    part = shell_with(shape="torispherical head", joint_efficiency=0.8, loss_side="outside",
                      crown_radius_mm=1000.0, knuckle_radius_mm=100.0)  # fmt: skip
    assert part.required_thickness_mm == pytest.approx(1000 * (3 + math.sqrt(10)) / 4 / 159.8, rel=1e-12)


def test_rule_5_4_cylinder_inside_loss_keeps_the_outside_radius() -> None:
    assert shell_with(loss_side="inside").required_thickness_mm == pytest.approx(5.119521912, abs=1e-9)


def test_rule_5_4_a_given_outside_diameter_stays_with_loss_inside() -> None:
    part = shell_with(inside_diameter_mm=None, outside_diameter_mm=1020.0, loss_side="inside")
    assert part.required_thickness_mm == pytest.approx(510 / 100.4, rel=1e-12)


def test_rule_5_4_sphere_inside_loss_keeps_the_outside_radius() -> None:
    assert shell_with(shape="sphere").required_thickness_mm == pytest.approx(514 / 200.8, rel=1e-12)


def test_rule_5_5_cylinder_outside_loss_keeps_the_inside_radius() -> None:
    # P·R / (S·E - 0.6·P)
    assert shell_with(loss_side="outside").required_thickness_mm == pytest.approx(500 / 99.4, rel=1e-12)


def test_rule_5_5_sphere_outside_loss_keeps_the_inside_radius() -> None:
    # P·R / (2·S·E - 0.2·P)
    part = shell_with(shape="sphere", loss_side="outside")
    assert part.required_thickness_mm == pytest.approx(500 / 199.8, rel=1e-12)


def test_rule_5_6_loss_from_both_sides_counts_as_inside() -> None:
    assert shell_with(loss_side="both").required_thickness_mm == pytest.approx(514 / 100.4, rel=1e-12)


def test_rule_5_6_a_blank_loss_side_counts_as_inside_with_a_gap() -> None:
    view = view_with(loss_side="")
    assert part_of(view).required_thickness_mm == pytest.approx(514 / 100.4, rel=1e-12)
    assert "loss side blank" in codes(view.gaps)
    assert "loss side blank" not in codes(view_with(loss_side="both").gaps)


def test_rule_5_6_the_side_of_a_location_beats_that_of_its_part() -> None:
    fleet = Fleet()
    fleet.vessel()
    fleet.part(loss_side="")
    fleet.location(loss_side="outside")
    fleet.read(0, *READ)
    view = fleet.view()
    assert location_of(view).required_thickness_mm == pytest.approx(500 / 99.4, rel=1e-12)
    assert "loss side blank" not in codes(view.gaps)


def test_rule_5_7_the_diameter_of_an_ellipsoidal_head_grows_with_the_loss() -> None:
    # 13 mm left of 14, less 0.05 on the as-of date: D = 1000 + 2·1.05; 2·S·E·t / (K·D + 0.2·t), K = 1
    roomy = {"nameplate_mawp_mpa": 9.0, "current_mawp_mpa": 1.0}
    part = shell_with(shape="ellipsoidal head", axis_ratio=2.0, vessel=roomy)
    wall = 13.0 - 0.5 / 3653 * 365
    assert part.mawp_today_mpa == pytest.approx(200 * wall / (1000 + 2 * (14 - wall) + 0.2 * wall), rel=1e-9)


@pytest.mark.parametrize("side", ["inside", "both", ""])
def test_rule_5_7_the_crown_of_a_torispherical_head_grows_with_the_loss(side: str) -> None:
    part = shell_with(
        shape="torispherical head", crown_radius_mm=1000.0, knuckle_radius_mm=100.0, loss_side=side
    )
    t = 14.0
    for _ in range(
        60
    ):  # t = P·L·M / (2·S·E - 0.2·P) with L = 1000 + 14 - t and M from it and the new knuckle
        crown = 1014.0 - t
        t = crown * (3 + math.sqrt(crown / 100)) / 4 / 199.8
    assert part.required_thickness_mm == pytest.approx(t, rel=1e-12)
    assert t > 1000 * (3 + math.sqrt(10)) / 4 / 199.8


def test_rule_5_7_the_crown_of_a_hemispherical_head_grows_with_the_loss() -> None:
    part = shell_with(shape="hemispherical head", inside_diameter_mm=None, crown_radius_mm=500.0)
    assert part.required_thickness_mm == pytest.approx(514 / 200.8, rel=1e-12)


def test_rule_5_7_the_axis_ratio_stays_as_new() -> None:
    # q = 2.5: K = (2 + 6.25) / 6 = 1.375, whatever the loss: P·K·Do / (2·S·E + 2·P·(K - 0.1))
    part = shell_with(shape="ellipsoidal head", axis_ratio=2.5)
    assert part.required_thickness_mm == pytest.approx(1.375 * 1028 / (200 + 2 * 1.275), rel=1e-12)


@pytest.mark.parametrize(
    ("shape", "more", "expected"),
    [
        ("hemispherical head", {}, 500 / 199.8),
        ("ellipsoidal head", {"axis_ratio": 2.0}, 1000 / 199.8),
        ("torispherical head", {"crown_radius_mm": 1000.0, "knuckle_radius_mm": 100.0},
         1000 * (3 + math.sqrt(10)) / 4 / 199.8),
    ],
)  # fmt: skip
def test_rule_5_8_with_loss_from_outside_no_head_grows(
    shape: str, more: dict[str, Any], expected: float
) -> None:
    part = shell_with(shape=shape, loss_side="outside", **more)
    assert part.required_thickness_mm == pytest.approx(expected, rel=1e-12)


def cone_fleet(at: float | None, side: str = "outside") -> PartView:
    fleet = Fleet()
    fleet.vessel()
    fleet.part(shape="cone", half_apex_angle_deg=30.0, loss_side=side)
    fleet.location(diameter_at_mm=at)
    fleet.read(0, *READ)
    return part_of(fleet.view())


def test_rule_5_9_cone_diameter_at_the_location_if_given() -> None:
    # loss outside: P·D / (2·cos·(S·E - 0.6·P)) on 600 mm
    assert cone_fleet(600.0).required_thickness_mm == pytest.approx(600 / (2 * COS_30 * 99.4), rel=1e-12)


def test_rule_5_9_cone_large_end_if_no_diameter_is_given() -> None:
    assert cone_fleet(None).required_thickness_mm == pytest.approx(1000 / (2 * COS_30 * 99.4), rel=1e-12)


def test_rule_5_9_a_diameter_at_a_location_is_no_matter_of_a_cylinder() -> None:
    fleet = Fleet()
    fleet.vessel()
    fleet.part()
    fleet.location(diameter_at_mm=100.0)
    fleet.read(0, *READ)
    assert location_of(fleet.view()).required_thickness_mm == pytest.approx(514 / 100.4, rel=1e-12)


def test_rule_5_10_a_cone_grows_by_twice_the_loss_over_the_cosine() -> None:
    t = cone_fleet(600.0, "inside").required_thickness_mm
    assert t is not None
    grown = 600 + 2 * (14 - t) / COS_30
    assert t == pytest.approx(grown / (2 * COS_30 * 99.4), rel=1e-12)


@pytest.mark.parametrize(
    ("shape", "more"),
    [
        ("cylinder", {}),
        ("nozzle neck", {}),
        ("sphere", {}),
        ("hemispherical head", {}),
        ("ellipsoidal head", {"axis_ratio": 2.0}),
        ("torispherical head", {"crown_radius_mm": 1000.0, "knuckle_radius_mm": 100.0}),
        ("cone", {"half_apex_angle_deg": 20.0}),
        ("flat cover", {"cover_factor": 0.3, "gasket_diameter_mm": 300.0}),
    ],
)
@pytest.mark.parametrize("side", ["inside", "outside"])
def test_rule_5_11_a_wall_of_just_the_required_thickness_carries_just_the_pressure(
    shape: str, more: dict[str, Any], side: str
) -> None:
    needed = shell_with(shape=shape, loss_side=side, **more).required_thickness_mm
    assert needed is not None
    fleet = Fleet()
    fleet.vessel(nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0)
    fleet.part(shape=shape, loss_side=side, **more)
    fleet.location(rate_floor_mm_per_year=0.0)
    fleet.read(0, ("2015-01-01", needed), ("2025-01-01", needed))
    assert part_of(fleet.view()).mawp_today_mpa == pytest.approx(1.0, rel=1e-9)


@pytest.mark.parametrize(
    ("shape", "blank", "named"),
    [
        ("cylinder", "allowable_stress_mpa", "allowable_stress"),
        ("cylinder", "joint_efficiency_long", "joint_efficiency_long"),
        ("cylinder", "joint_efficiency_circ", "joint_efficiency_circ"),
        ("cylinder", "static_head_mpa", "static_head"),
        ("cylinder", "inside_diameter_mm", "inside_diameter"),
        ("nozzle neck", "joint_efficiency_long", "joint_efficiency_long"),
        ("sphere", "joint_efficiency", "joint_efficiency"),
        ("sphere", "inside_diameter_mm", "inside_diameter"),
        ("hemispherical head", "inside_diameter_mm", "inside_diameter"),
        ("ellipsoidal head", "axis_ratio", "axis_ratio"),
        ("ellipsoidal head", "joint_efficiency", "joint_efficiency"),
        ("torispherical head", "crown_radius_mm", "crown_radius"),
        ("torispherical head", "knuckle_radius_mm", "knuckle_radius"),
        ("cone", "half_apex_angle_deg", "half_apex_angle"),
        ("cone", "joint_efficiency_circ", "joint_efficiency_circ"),
        ("flat cover", "cover_factor", "cover_factor"),
        ("flat cover", "static_head_mpa", "static_head"),
    ],
)
def test_rule_5_12_a_blank_datum_gives_no_figure_and_a_gap_that_names_it(
    shape: str, blank: str, named: str
) -> None:
    every = {"axis_ratio": 2.0, "crown_radius_mm": 1000.0, "knuckle_radius_mm": 100.0, "half_apex_angle_deg": 20.0,
             "cover_factor": 0.3}  # fmt: skip
    if shape == "hemispherical head":
        every["crown_radius_mm"] = math.nan
    if shape == "flat cover":
        every["gasket_diameter_mm"] = (
            200.0  # 200·√(0.3·1/100) = 10.95 mm: the wall of 14 is enough at no head
        )
    view = view_with(shape=shape, **(every | {blank: math.nan}))
    part = part_of(view)
    assert (part.required_thickness_mm, part.mawp_today_mpa, part.projected_mawp_mpa) == (None, None, None)
    place = part.locations[0]
    assert (place.remaining_life_years, place.retirement_on, place.projected_thickness_mm) == (
        None,
        None,
        None,
    )
    assert view.standing == "no verdict"
    gaps = [gap for gap in view.gaps if gap.code == "missing datum"]
    assert [gap.found for gap in gaps] == [f"{named} is blank"]
    assert "shell" in gaps[0].where


def test_rule_5_12_a_wall_below_required_even_at_no_head_is_below_required() -> None:
    # 1000·√(0.3·1/100) = 54.8 mm at no head; whatever the head, 14 mm is too little
    view = view_with(shape="flat cover", cover_factor=0.3, static_head_mpa=math.nan)
    assert part_of(view).required_thickness_mm is None
    assert view.standing == "below required"


def test_rule_5_12_a_head_of_nought_must_be_written_and_then_counts() -> None:
    view = view_with(static_head_mpa=0.0)
    assert part_of(view).required_thickness_mm == pytest.approx(outside_hoop(1.0), rel=1e-12)
    assert "missing datum" not in codes(view.gaps)


@pytest.mark.parametrize(
    ("column", "gap"),
    [
        ("structural_minimum_mm", "structural minimum blank"),
        ("required_thickness_axial_mm", "axial-load minimum blank"),
    ],
)
def test_rule_5_13_a_blank_minimum_counts_as_none_with_a_gap(column: str, gap: str) -> None:
    view = view_with(**{column: math.nan})
    assert part_of(view).required_thickness_mm == pytest.approx(outside_hoop(1.0), rel=1e-12)
    assert gap in codes(view.gaps)
    assert gap not in codes(view_with(**{column: 0.0}).gaps)


def test_rule_5_14_without_its_external_minimum_the_internal_figures_still_stand() -> None:
    view = view_with(vessel={"external_design_pressure_mpa": 0.1})
    part = part_of(view)
    assert part.required_thickness_mm == pytest.approx(outside_hoop(1.0), rel=1e-12)
    assert part.projected_mawp_mpa == 1.0
    assert view.standing == "no verdict"


def test_rule_5_15_shape_other_needs_the_thickness_given() -> None:
    other = {
        "shape": "other",
        "inside_diameter_mm": None,
        "allowable_stress_mpa": None,
        "joint_efficiency": None,
    }
    part = shell_with(**other, required_thickness_given_mm=8.0)
    assert (part.required_thickness_mm, part.required_by) == (8.0, "given")
    view = view_with(**other)
    assert (part_of(view).required_thickness_mm, view.standing) == (None, "no verdict")
    assert "no given thickness" in codes(view.gaps)
