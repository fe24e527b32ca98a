"""The rating of each shape against sums written out by hand, and what it says where it gives no figure."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest

from fleet.formula import REGISTER
from fleet.mechanics.rating import (
    Geometry,
    allowable_pressure,
    directions,
    missing_inputs,
    required_wall,
    unsupported,
    withheld_because,
)
from fleet.words import DOUBTS

S, E, EC = 138.0, 0.85, 0.7


def one(shape: str, **given: Any) -> Geometry:
    known: dict[str, Any] = {
        "design_code": "asme8-1", "edition_year": 2001.0, "allowable_stress_mpa": S, "efficiency_hoop": E,
        "efficiency_axial": EC, "nominal_thickness_mm": 20.0, "loss_side": "inside",
    }  # fmt: skip
    return Geometry.build(1, shape=shape, **(known | given))


def pressure(g: Geometry, wall: float, direction: str) -> float:
    return float(getattr(allowable_pressure(g, np.array([wall])), direction)[0])


def wall_for(g: Geometry, p: float, direction: str) -> float:
    return float(getattr(required_wall(g, np.array([p])), direction)[0])


@pytest.mark.parametrize("side", ["inside", "both", ""])
def test_cylinder_thinned_from_inside_keeps_its_outside_radius(side: str) -> None:
    g = one("cylinder", inside_diameter_mm=1500.0, loss_side=side)
    # R = 770 − 12 = 758
    assert pressure(g, 12.0, "hoop") == pytest.approx(S * E * 12 / (758 + 0.6 * 12), rel=1e-13)
    assert pressure(g, 12.0, "axial") == pytest.approx(2 * S * EC * 12 / (758 - 0.4 * 12), rel=1e-13)
    t = wall_for(g, 2.0, "hoop")
    assert t == pytest.approx(2.0 * (770 - t) / (S * E - 0.6 * 2.0), rel=1e-13)
    rated = required_wall(g, np.array([2.0]))
    assert rated.hoop_formula[0] == "cylinder_hoop_thickness_outside"
    assert rated.axial_formula[0] == "cylinder_axial_thickness_outside"
    assert np.isnan(rated.end[0])
    assert rated.end_formula[0] == ""


def test_cylinder_thinned_from_outside_keeps_its_inside_radius() -> None:
    g = one("cylinder", inside_diameter_mm=1500.0, loss_side="outside")
    assert pressure(g, 12.0, "hoop") == pytest.approx(S * E * 12 / (750 + 0.6 * 12), rel=1e-13)
    assert wall_for(g, 2.0, "hoop") == pytest.approx(2.0 * 750 / (S * E - 0.6 * 2.0), rel=1e-13)
    by_outside = one("cylinder", outside_diameter_mm=1540.0, loss_side="outside")
    assert pressure(by_outside, 12.0, "hoop") == pytest.approx(S * E * 12 / (750 + 0.6 * 12), rel=1e-13)


def test_a_given_outside_diameter_needs_no_nominal_for_loss_from_inside() -> None:
    g = one("nozzle neck", outside_diameter_mm=219.1, nominal_thickness_mm=np.nan)
    assert pressure(g, 6.0, "hoop") == pytest.approx(S * E * 6 / (109.55 - 0.4 * 6), rel=1e-13)
    assert missing_inputs(g) == {}


def test_sphere() -> None:
    g = one("sphere", inside_diameter_mm=9000.0, nominal_thickness_mm=30.0)
    # R = 4530 − 25
    assert pressure(g, 25.0, "hoop") == pytest.approx(2 * S * E * 25 / (4505 + 0.2 * 25), rel=1e-13)
    assert np.isnan(pressure(g, 25.0, "axial"))
    assert not directions(g)["axial"][0]


def test_hemispherical_head_grows_with_the_loss_and_not_above_nominal() -> None:
    g = one("hemispherical head", crown_radius_mm=750.0)
    assert pressure(g, 12.0, "end") == pytest.approx(2 * S * E * 12 / (758 + 0.2 * 12), rel=1e-13)
    assert pressure(g, 22.0, "end") == pytest.approx(2 * S * E * 22 / (750 + 0.2 * 22), rel=1e-13)
    outside = one(
        "hemispherical head", crown_radius_mm=750.0, loss_side="outside", nominal_thickness_mm=np.nan
    )
    assert pressure(outside, 12.0, "end") == pytest.approx(2 * S * E * 12 / (750 + 0.2 * 12), rel=1e-13)
    for dims in ({"inside_diameter_mm": 1500.0}, {"outside_diameter_mm": 1540.0}):
        assert pressure(one("hemispherical head", **dims), 12.0, "end") == pressure(g, 12.0, "end")


def test_ellipsoidal_head_grows_in_diameter_with_the_axis_ratio_as_new() -> None:
    g = one("ellipsoidal head", inside_diameter_mm=1500.0, axis_ratio=1.8)
    k = (2 + 1.8**2) / 6
    grown = 1500 + 2 * 8
    assert pressure(g, 12.0, "end") == pytest.approx(2 * S * E * 12 / (k * grown + 0.2 * 12), rel=1e-13)
    assert pressure(g, 22.0, "end") == pytest.approx(2 * S * E * 22 / (k * 1500 + 0.2 * 22), rel=1e-13)
    t = wall_for(g, 1.5, "end")
    assert t < 20
    assert t == pytest.approx(1.5 * (1500 + 2 * (20 - t)) * k / (2 * S * E - 0.2 * 1.5), rel=1e-13)
    thick = wall_for(g, 4.0, "end")
    assert thick > 20
    assert thick == pytest.approx(4.0 * 1500 * k / (2 * S * E - 0.2 * 4.0), rel=1e-13)


def test_torispherical_head_takes_its_factor_from_the_grown_crown_and_the_new_knuckle() -> None:
    g = one("torispherical head", inside_diameter_mm=1500.0, crown_radius_mm=1500.0, knuckle_radius_mm=150.0)
    crown = 1500.0 + 8.0
    m = (3 + math.sqrt(crown / 150)) / 4
    assert pressure(g, 12.0, "end") == pytest.approx(2 * S * E * 12 / (crown * m + 0.2 * 12), rel=1e-13)
    t = wall_for(g, 1.2, "end")
    crown = 1500 + 20 - t
    m = (3 + math.sqrt(crown / 150)) / 4
    assert t < 20
    assert t == pytest.approx(1.2 * crown * m / (2 * S * E - 0.2 * 1.2), rel=1e-13)


def test_cone_grows_by_twice_the_loss_over_the_cosine() -> None:
    g = one("cone", inside_diameter_mm=1500.0, half_apex_angle_deg=25.0)
    c = math.cos(math.radians(25))
    grown = 1500 + 2 * 8 / c
    assert pressure(g, 12.0, "hoop") == pytest.approx(2 * S * E * 12 * c / (grown + 1.2 * 12 * c), rel=1e-13)
    radius = grown / (2 * c)
    assert pressure(g, 12.0, "axial") == pytest.approx(2 * S * EC * 12 / (radius - 0.4 * 12), rel=1e-13)
    t = wall_for(g, 1.5, "hoop")
    assert t == pytest.approx(1.5 * (1500 + 2 * (20 - t) / c) / (2 * c * (S * E - 0.6 * 1.5)), rel=1e-13)
    outside = one("cone", inside_diameter_mm=1500.0, half_apex_angle_deg=25.0, loss_side="outside")
    assert pressure(outside, 12.0, "hoop") == pytest.approx(
        2 * S * E * 12 * c / (1500 + 1.2 * 12 * c), rel=1e-13
    )


def test_flat_cover_takes_the_gasket_diameter_first() -> None:
    g = one("flat cover", inside_diameter_mm=500.0, gasket_diameter_mm=540.0, cover_factor=0.3)
    assert pressure(g, 30.0, "end") == pytest.approx(S * E * 900 / (0.3 * 540**2), rel=1e-13)
    assert wall_for(g, 1.0, "end") == pytest.approx(540 * math.sqrt(0.3 / (S * E)), rel=1e-13)
    assert allowable_pressure(g, np.array([30.0])).proportion[0] == "cover bolts not assessed"
    plain = one("flat cover", inside_diameter_mm=500.0, cover_factor=0.3)
    assert pressure(plain, 30.0, "end") == pytest.approx(S * E * 900 / (0.3 * 500**2), rel=1e-13)
    assert allowable_pressure(plain, np.array([30.0])).proportion[0] == ""


def test_membrane_is_refused_below_ten_and_names_the_thick_form() -> None:
    g = one("cylinder", design_code="membrane", inside_diameter_mm=1500.0)
    assert pressure(g, 12.0, "hoop") == pytest.approx(S * E * 12 / 758, rel=1e-13)
    assert pressure(g, 12.0, "axial") == pytest.approx(2 * S * EC * 12 / 758, rel=1e-13)
    thick = one("cylinder", design_code="membrane", inside_diameter_mm=150.0)
    for rated in (allowable_pressure(thick, np.array([18.0])), required_wall(thick, np.array([14.0]))):
        assert np.isnan(rated.hoop[0])
        assert "the lame_cylinder form" in withheld_because(int(rated.domain[0]))
        assert rated.hoop_formula[0] == ""


@pytest.mark.parametrize(
    ("year", "name", "factor"),
    [
        (2009.0, "older", (2.25**2 - 1) / (2.25**2 + 1)),
        (2010.0, "newer", math.log(2.25)),
        (np.nan, "older", (2.25**2 - 1) / (2.25**2 + 1)),
    ],
)
def test_thick_cylinder_by_edition(year: float, name: str, factor: float) -> None:
    g = one("cylinder", inside_diameter_mm=80.0, nominal_thickness_mm=50.0, edition_year=year)
    rated = allowable_pressure(g, np.array([50.0]))
    assert rated.hoop_formula[0] == f"thick_cylinder_hoop_pressure_outside_{name}"
    assert rated.hoop[0] == pytest.approx(S * E * factor, rel=1e-13)
    assert rated.axial_formula[0] == "thick_cylinder_axial_pressure_outside"
    assert rated.axial[0] == pytest.approx(S * EC * (2.25**2 - 1), rel=1e-13)
    assert wall_for(g, float(rated.hoop[0]), "hoop") == pytest.approx(50.0, rel=1e-12)


def test_between_the_thin_and_the_newer_thick_cylinder_the_wall_is_that_of_the_limit() -> None:
    g = one("cylinder", inside_diameter_mm=100.0, loss_side="outside", edition_year=2015.0)
    rated = required_wall(g, np.array([0.395 * S * E]))
    assert rated.hoop_formula[0] == "cylinder_thin_limit"
    assert rated.hoop[0] == pytest.approx(25.0, rel=1e-11)
    assert rated.hoop[0] > 25.0
    assert pressure(g, 25.0, "hoop") < 0.395 * S * E < pressure(g, float(rated.hoop[0]), "hoop")


def test_a_thin_sphere_is_credited_with_no_more_than_the_newer_thick_form_starts_with() -> None:
    g = one("sphere", inside_diameter_mm=100.0, loss_side="outside", edition_year=2015.0)
    step = 2 * S * E * math.log(1.356)
    rated = allowable_pressure(g, np.array([17.0]))
    assert rated.hoop[0] == pytest.approx(step, rel=1e-13)
    assert rated.hoop_formula[0] == "sphere_step_pressure"
    assert pressure(g, 17.81, "hoop") > step
    # An unknown edition takes the lesser figure: here the newer form's.
    unknown = one("sphere", inside_diameter_mm=100.0, loss_side="outside", edition_year=np.nan)
    assert pressure(unknown, 17.0, "hoop") == rated.hoop[0]
    older = one("sphere", inside_diameter_mm=100.0, loss_side="outside", edition_year=2001.0)
    assert pressure(older, 17.0, "hoop") == pytest.approx(2 * S * E * 17 / (50 + 0.2 * 17), rel=1e-13)


def test_no_wall_carries_the_stress_itself_by_the_older_form() -> None:
    g = one("cylinder", inside_diameter_mm=100.0, loss_side="outside")
    for p in (S * E, 1.5 * S * E):
        rated = required_wall(g, np.array([p]))
        assert np.isnan(rated.hoop[0])
        assert "no wall is thick enough" in withheld_because(int(rated.domain[0]))


@pytest.mark.parametrize(
    ("given", "because"),
    [
        ({"half_apex_angle_deg": 31.0}, "α ≤ 30 does not hold; beyond it: a cone with a knuckle"),
        ({"half_apex_angle_deg": 90.0}, "a number it needs cannot be true"),
        ({"half_apex_angle_deg": -1.0}, "a number it needs cannot be true"),
    ],
)
def test_a_cone_outside_its_limits_is_withheld(given: dict[str, float], because: str) -> None:
    g = one("cone", inside_diameter_mm=1500.0, **given)
    for rated in (allowable_pressure(g, np.array([12.0])), required_wall(g, np.array([1.0]))):
        assert np.isnan(rated.hoop[0])
        assert np.isnan(rated.axial[0])
        assert withheld_because(int(rated.domain[0])).startswith(because)


@pytest.mark.parametrize(
    ("shape", "given", "because"),
    [
        ("ellipsoidal head", {"inside_diameter_mm": 900.0, "axis_ratio": 3.1}, "q ≤ 3"),
        ("ellipsoidal head", {"inside_diameter_mm": 900.0, "axis_ratio": 0.9}, "q ≥ 1"),
        ("torispherical head", {"crown_radius_mm": 900.0, "knuckle_radius_mm": 901.0}, "r ≤ L"),
        ("flat cover", {"inside_diameter_mm": 900.0, "cover_factor": 0.09}, "C ≥ 0.1"),
    ],
)
def test_heads_outside_their_limits_are_withheld(shape: str, given: dict[str, float], because: str) -> None:
    g = one(shape, **given)
    for rated in (allowable_pressure(g, np.array([12.0])), required_wall(g, np.array([1.0]))):
        assert np.isnan(rated.end[0])
        assert rated.end_formula[0] == ""
        assert withheld_because(int(rated.domain[0])).startswith(because)


@pytest.mark.parametrize(
    ("name", "value"),
    [
        ("allowable_stress_mpa", 0.0), ("allowable_stress_mpa", -1.0), ("allowable_stress_mpa", np.inf),
        ("efficiency_hoop", 1.01), ("efficiency_hoop", 0.0), ("efficiency_axial", 1.2), ("efficiency_axial", -0.1),
        ("inside_diameter_mm", 0.0), ("nominal_thickness_mm", -3.0),
    ],
)  # fmt: skip
def test_a_number_that_cannot_be_true_withholds_every_direction(name: str, value: float) -> None:
    g = one("cylinder", **({"inside_diameter_mm": 1500.0} | {name: value}))
    for rated in (allowable_pressure(g, np.array([12.0])), required_wall(g, np.array([1.0]))):
        assert np.isnan(rated.hoop[0])
        assert np.isnan(rated.axial[0])
        assert rated.domain[0] == 1
        assert withheld_because(1) == "a number it needs cannot be true"
    assert missing_inputs(g) == {}


def test_a_number_the_shape_does_not_use_does_not_matter() -> None:
    g = one("cylinder", inside_diameter_mm=1500.0, cover_factor=-1.0, knuckle_radius_mm=0.0)
    assert pressure(g, 12.0, "hoop") > 0
    sphere = one("sphere", inside_diameter_mm=1500.0, efficiency_axial=np.nan)
    assert pressure(sphere, 12.0, "hoop") > 0


def test_derived_dimensions_that_cannot_be_true_are_withheld() -> None:
    too_thick = one("nozzle neck", outside_diameter_mm=100.0)
    assert allowable_pressure(too_thick, np.array([50.0])).domain[0] == 1
    hollow = one("cylinder", outside_diameter_mm=30.0, loss_side="outside")
    assert np.isnan(pressure(hollow, 12.0, "hoop"))
    assert allowable_pressure(hollow, np.array([12.0])).domain[0] == 1
    for shape, more in (("ellipsoidal head", {"axis_ratio": 2.0}), ("cone", {"half_apex_angle_deg": 20.0})):
        g = one(shape, outside_diameter_mm=30.0, **more)
        assert allowable_pressure(g, np.array([12.0])).domain[0] == 1


def test_no_wall_holds_no_pressure_and_no_pressure_needs_no_wall() -> None:
    g = one("cylinder", inside_diameter_mm=1500.0)
    for quantity in (0.0, -2.0):
        rated = allowable_pressure(g, np.array([quantity]))
        assert (rated.hoop[0], rated.axial[0], rated.hoop_formula[0]) == (0.0, 0.0, "")
        assert np.isnan(rated.end[0])
        needed = required_wall(g, np.array([quantity]))
        assert (needed.hoop[0], needed.axial[0]) == (0.0, 0.0)
    blank = one("cylinder", inside_diameter_mm=1500.0, allowable_stress_mpa=np.nan)
    assert pressure(blank, -1.0, "hoop") == 0.0
    assert np.isnan(wall_for(blank, 0.0, "hoop"))


def test_unknown_and_infinite_walls_give_no_figure() -> None:
    g = one("cylinder", inside_diameter_mm=1500.0)
    assert np.isnan(pressure(g, np.nan, "hoop"))
    assert allowable_pressure(g, np.array([np.nan])).domain[0] == 0
    assert np.isnan(pressure(g, np.inf, "hoop"))
    assert allowable_pressure(g, np.array([np.inf])).domain[0] == 1


@pytest.mark.parametrize(
    ("shape", "given", "blank", "column"),
    [
        ("cylinder", {"inside_diameter_mm": 900.0}, "allowable_stress_mpa", "allowable_stress"),
        ("cylinder", {"inside_diameter_mm": 900.0}, "efficiency_hoop", "joint_efficiency_long"),
        ("cylinder", {"inside_diameter_mm": 900.0}, "efficiency_axial", "joint_efficiency_circ"),
        ("cylinder", {}, "inside_diameter_mm", "inside_diameter"),
        ("cylinder", {"inside_diameter_mm": 900.0}, "nominal_thickness_mm", "nominal_thickness"),
        (
            "nozzle neck",
            {"outside_diameter_mm": 219.1, "loss_side": "outside"},
            "nominal_thickness_mm",
            "nominal_thickness",
        ),
        ("sphere", {"inside_diameter_mm": 900.0}, "efficiency_hoop", "joint_efficiency"),
        ("hemispherical head", {}, "crown_radius_mm", "inside_diameter"),
        ("hemispherical head", {"crown_radius_mm": 900.0}, "nominal_thickness_mm", "nominal_thickness"),
        ("ellipsoidal head", {"inside_diameter_mm": 900.0}, "axis_ratio", "axis_ratio"),
        ("torispherical head", {"knuckle_radius_mm": 90.0}, "crown_radius_mm", "crown_radius"),
        ("torispherical head", {"crown_radius_mm": 900.0}, "knuckle_radius_mm", "knuckle_radius"),
        ("cone", {"inside_diameter_mm": 900.0}, "half_apex_angle_deg", "half_apex_angle"),
        ("cone", {"half_apex_angle_deg": 20.0}, "inside_diameter_mm", "inside_diameter"),
        (
            "cone",
            {"inside_diameter_mm": 900.0, "half_apex_angle_deg": 20.0},
            "efficiency_axial",
            "joint_efficiency_circ",
        ),
        ("flat cover", {"inside_diameter_mm": 900.0}, "cover_factor", "cover_factor"),
        ("flat cover", {"cover_factor": 0.3}, "gasket_diameter_mm", "inside_diameter"),
        ("other", {}, "required_given_mm", "required_thickness_given"),
    ],
)
def test_what_is_missing_is_named_and_gives_no_figure(
    shape: str, given: dict[str, Any], blank: str, column: str
) -> None:
    g = one(shape, **(given | {blank: np.nan}))
    assert {name: rows.tolist() for name, rows in missing_inputs(g).items()} == {column: [True]}
    for rated in (allowable_pressure(g, np.array([12.0])), required_wall(g, np.array([1.0]))):
        figures = [getattr(rated, name)[0] for name, exists in directions(g).items() if exists[0]]
        assert not figures or np.isnan(figures).any()
        assert rated.domain[0] == 0


def test_what_is_not_needed_is_not_missed() -> None:
    assert (
        missing_inputs(
            one("cylinder", inside_diameter_mm=900.0, loss_side="outside", nominal_thickness_mm=np.nan)
        )
        == {}
    )
    assert (
        missing_inputs(
            one("flat cover", gasket_diameter_mm=900.0, cover_factor=0.3, nominal_thickness_mm=np.nan)
        )
        == {}
    )
    assert missing_inputs(one("cone", design_code="membrane")) == {}
    assert (
        missing_inputs(
            one(
                "cone",
                inside_diameter_mm=900.0,
                half_apex_angle_deg=9.0,
                loss_side="outside",
                nominal_thickness_mm=np.nan,
            )
        )
        == {}
    )


def test_shapes_without_a_formula() -> None:
    for code, shape, known in (
        ("asme8-1", "cone", True),
        ("membrane", "cone", False),
        ("membrane", "hemispherical head", True),
        ("asme8-1", "other", False),
        ("membrane", "flat cover", False),
        ("another code", "cylinder", False),
        ("", "sphere", False),
    ):
        g = one(shape, design_code=code, inside_diameter_mm=900.0, required_given_mm=8.0)
        assert unsupported(g)[0] == (not known)
        if not known:
            rated = allowable_pressure(g, np.array([12.0]))
            assert np.isnan([rated.hoop[0], rated.axial[0], rated.end[0]]).all()
            assert rated.domain[0] == 0
            assert not any(rows[0] for rows in directions(g).values())


def test_proportions_of_a_head_leave_the_figure_and_raise_a_doubt() -> None:
    def doubt(wall: float = 12.0, **given: float) -> str:
        dims = {"inside_diameter_mm": 1500.0, "crown_radius_mm": 1500.0, "knuckle_radius_mm": 150.0}
        g = one("torispherical head", **(dims | given))
        rated = allowable_pressure(g, np.array([wall]))
        assert rated.end[0] > 0
        assert required_wall(g, np.array([rated.end[0]])).proportion[0] == rated.proportion[0]
        assert rated.proportion[0] == "" or rated.proportion[0] in DOUBTS
        return str(rated.proportion[0])

    assert doubt() == ""
    assert doubt(knuckle_radius_mm=92.3) == "knuckle proportions"  # 0.06 · 1540 = 92.4
    assert doubt(knuckle_radius_mm=92.5) == ""
    assert doubt(nominal_thickness_mm=50.1) == "knuckle proportions"  # 3 · 50.1 > 150
    assert doubt(crown_radius_mm=1541.0) == "crown proportions"
    assert doubt(wall=3.0) == "thin torispherical head"  # 0.002 · 1517 = 3.03
    assert doubt(wall=3.1) == ""
    assert doubt(inside_diameter_mm=np.nan) == "head proportions not checked"


def test_every_formula_that_is_named_is_in_the_register() -> None:
    g = one("cone", inside_diameter_mm=900.0, half_apex_angle_deg=20.0)
    rated = allowable_pressure(g, np.array([12.0]))
    assert REGISTER[str(rated.hoop_formula[0])].clause == "UG-32, conical heads, on the outside diameter"
    assert REGISTER[str(rated.axial_formula[0])].status == "ours"


def test_a_single_wall_serves_every_row() -> None:
    g = Geometry.build(3, design_code="asme8-1", shape=["sphere", "other", "cone"], allowable_stress_mpa=S)
    assert len(allowable_pressure(g, np.array([10.0])).hoop) == 3
    assert len(allowable_pressure(Geometry.build(0), np.array([])).hoop) == 0
