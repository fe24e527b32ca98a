"""Heads, cones and covers of Section VIII Division 1 with the geometry that the loss has left."""

from __future__ import annotations

import numpy as np

from fleet.formula import Floats
from fleet.mechanics import cone, cover, ellipsoidal, torispherical
from fleet.mechanics.figures import Figures, Rows, chosen, given, masked, worked
from fleet.mechanics.geometry import Geometry

_NEWTON_STEPS = 60


def _first(*values: Floats) -> Floats:
    """Give the first that is given, row by row."""
    result = values[0]
    for value in values[1:]:
        result = np.where(np.isnan(result), value, result)
    return result


def _kept(g: Geometry, t: Floats) -> Rows:
    """Where the outside stays: loss from inside, and the wall not above nominal."""
    return ~g.outside_loss & ~(t > g.nominal_thickness_mm)


def _needs_nominal(g: Geometry, figures: Figures) -> Figures:
    """Withhold nothing, but give no figure where the growth of the geometry is not known."""
    lost = ~g.outside_loss & np.isnan(g.nominal_thickness_mm)
    nothing = np.full(len(g), np.nan)
    return chosen(lost, given(ellipsoidal.ellipsoidal_pressure, nothing), figures)


def ellipsoidal_figures(g: Geometry, quantity: Floats, *, wall: bool) -> Figures:
    """Rate ellipsoidal heads.

    Parameters
    ----------
    g : Geometry
        Rows of that shape [-].
    quantity : array of float
        Wall [mm]; where `wall` is asked for, pressure at the point considered [MPa].
    wall : bool
        Whether the wall is asked for, not the pressure [-].

    Returns
    -------
    Figures
        Pressure [MPa] or wall [mm].

    Notes
    -----
    With loss from inside the skirt's outside diameter stays, so the outside form serves up to nominal;
    above nominal nothing grows. The axis ratio is that of the new head.
    """
    nominal = g.nominal_thickness_mm
    inside = _first(g.inside_diameter_mm, g.outside_diameter_mm - 2 * nominal)
    outside = inside + 2 * nominal
    factor = worked(ellipsoidal.ellipsoidal_factor, q=g.axis_ratio)
    common = {"S": g.allowable_stress_mpa, "E": g.efficiency_hoop, "K": factor.value}
    if wall:
        out = worked(ellipsoidal.ellipsoidal_thickness_outside, **common, Do=outside, P=quantity)
        new = worked(ellipsoidal.ellipsoidal_thickness, **common, D=inside, P=quantity)
        kept = _kept(g, out.value)
    else:
        out = worked(ellipsoidal.ellipsoidal_pressure_outside, **common, Do=outside, t=quantity)
        new = worked(ellipsoidal.ellipsoidal_pressure, **common, D=inside, t=quantity)
        kept = _kept(g, quantity)
    figures = _needs_nominal(g, chosen(kept, out, new))
    impossible = ~(inside > 0) & ~np.isnan(inside)
    figures = chosen(factor.withheld > 0, factor, figures)
    return masked(figures, impossible)


def _torispherical_wall(g: Geometry, p: Floats) -> Floats:
    """Wall with the crown radius grown to that very wall, by Newton from below.

    With L = C − t, C = crown radius + nominal, the excess t·(2·S·E − 0.2·P) − P·L·M(L) is concave and rises
    with t; from t = 0 Newton's steps rise to its root and never pass it.
    """
    stress = 2 * g.allowable_stress_mpa * g.efficiency_hoop - 0.2 * p
    sum_of_both = g.crown_radius_mm + g.nominal_thickness_mm
    t = np.zeros_like(p)
    with np.errstate(all="ignore"):
        for _ in range(_NEWTON_STEPS):
            crown = sum_of_both - t
            root = np.sqrt(crown / g.knuckle_radius_mm)
            excess = t * stress - p * crown * (3 + root) / 4
            step = -excess / (stress + p * (3 + 1.5 * root) / 4)
            t = t + step
            if not np.any(np.abs(step) > 1e-15 * np.abs(t)):
                break
    return t


def torispherical_figures(g: Geometry, quantity: Floats, *, wall: bool) -> Figures:
    """Rate torispherical heads.

    Parameters
    ----------
    g : Geometry
        Rows of that shape [-].
    quantity : array of float
        Wall [mm]; where `wall` is asked for, pressure at the point considered [MPa].
    wall : bool
        Whether the wall is asked for, not the pressure [-].

    Returns
    -------
    Figures
        Pressure [MPa] or wall [mm].

    Notes
    -----
    With loss from inside the crown radius grows by the loss; M follows from the grown crown radius and the
    new knuckle radius. The required wall is the one at which the grown geometry gives that very wall.
    """
    grown = grown_crown(g, quantity)
    if wall:
        new = worked(torispherical.torispherical_thickness, **_tori(g, g.crown_radius_mm), P=quantity)
        solved = _torispherical_wall(g, quantity)
        grown = g.crown_radius_mm + np.maximum(g.nominal_thickness_mm - solved, 0)
        rated = worked(torispherical.torispherical_thickness, **_tori(g, grown), P=quantity)
        figures = chosen(_kept(g, solved), rated, new)
    else:
        figures = worked(torispherical.torispherical_pressure, **_tori(g, grown), t=quantity)
    figures = _needs_nominal(g, figures)
    factor = worked(torispherical.torispherical_factor, L=g.crown_radius_mm, r=g.knuckle_radius_mm)
    return chosen(factor.withheld > 0, factor, figures)


def grown_crown(g: Geometry, t: Floats) -> Floats:
    """Give the crown radius that the loss down to a wall has left.

    Parameters
    ----------
    g : Geometry
        Rows of torispherical heads [-].
    t : array of float
        Wall [mm].

    Returns
    -------
    array of float
        Crown radius [mm]; as new with loss from outside.
    """
    loss = np.maximum(g.nominal_thickness_mm - t, 0)
    return g.crown_radius_mm + np.where(g.outside_loss, 0.0, loss)


def _tori(g: Geometry, crown: Floats) -> dict[str, Floats]:
    factor = torispherical.torispherical_factor.array(L=crown, r=g.knuckle_radius_mm)
    return {"S": g.allowable_stress_mpa, "E": g.efficiency_hoop, "L": crown, "M": factor}


def cone_figures(g: Geometry, quantity: Floats, *, wall: bool) -> tuple[Figures, Figures]:
    """Rate cones in both directions.

    Parameters
    ----------
    g : Geometry
        Rows of that shape; the diameter is the one at the place considered [-].
    quantity : array of float
        Wall [mm]; where `wall` is asked for, pressure at the point considered [MPa].
    wall : bool
        Whether the wall is asked for, not the pressure [-].

    Returns
    -------
    tuple of Figures
        Hoop and axial: pressure [MPa] or wall [mm].

    Notes
    -----
    With loss from inside the diameter grows by 2·loss/cos α, so the outside diameter across the axis stays.
    """
    across = 2 * g.nominal_thickness_mm / np.cos(np.radians(g.half_apex_angle_deg))
    inside = _first(g.inside_diameter_mm, g.outside_diameter_mm - across)
    forms = {
        "hoop": (cone.cone_hoop_thickness, cone.cone_hoop_pressure,
                 cone.cone_hoop_thickness_outside, cone.cone_hoop_pressure_outside),
        "axial": (cone.cone_axial_thickness, cone.cone_axial_pressure,
                  cone.cone_axial_thickness_outside, cone.cone_axial_pressure_outside),
    }  # fmt: skip
    rated = []
    for direction, (thickness, pressure, thickness_outside, pressure_outside) in forms.items():
        efficiency = g.efficiency_hoop if direction == "hoop" else g.efficiency_axial
        common = {"S": g.allowable_stress_mpa, "E": efficiency, "alpha": g.half_apex_angle_deg}
        if wall:
            out = worked(thickness_outside, **common, Do=inside + across, P=quantity)
            new = worked(thickness, **common, D=inside, P=quantity)
            kept = _kept(g, thickness_outside.array(**common, Do=inside + across, P=quantity))
        else:
            out = worked(pressure_outside, **common, Do=inside + across, t=quantity)
            new = worked(pressure, **common, D=inside, t=quantity)
            kept = _kept(g, quantity)
        figures = _needs_nominal(g, chosen(kept, out, new))
        rated.append(masked(figures, ~(inside > 0) & ~np.isnan(inside)))
    return rated[0], rated[1]


def cover_figures(g: Geometry, quantity: Floats, *, wall: bool) -> Figures:
    """Rate flat covers.

    Parameters
    ----------
    g : Geometry
        Rows of that shape [-].
    quantity : array of float
        Thickness [mm]; where `wall` is asked for, pressure at the point considered [MPa].
    wall : bool
        Whether the thickness is asked for, not the pressure [-].

    Returns
    -------
    Figures
        Pressure [MPa] or thickness [mm].
    """
    diameter = _first(g.gasket_diameter_mm, g.inside_diameter_mm)
    common = {"S": g.allowable_stress_mpa, "E": g.efficiency_hoop, "C": g.cover_factor, "d": diameter}
    if wall:
        return worked(cover.flat_cover_thickness, **common, P=quantity)
    return worked(cover.flat_cover_pressure, **common, t=quantity)
