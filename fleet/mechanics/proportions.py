"""Proportions of new heads and covers: what leaves the figure standing and raises a doubt."""

from __future__ import annotations

import numpy as np

from fleet.formula import Floats
from fleet.mechanics.figures import Texts
from fleet.mechanics.geometry import Geometry
from fleet.mechanics.heads import grown_crown
from fleet.mechanics.torispherical import torispherical_pressure

UNCHECKED = "head proportions not checked"
BOLTS = "cover bolts not assessed"
THIN = "thin torispherical head"

_LEAST_FIRST = ("crown proportions", "knuckle proportions", THIN)
_LIMITS = sorted(
    (limit for limit in torispherical_pressure.limits if limit.kind == "proportion"),
    key=lambda limit: _LEAST_FIRST.index(limit.then),
)
_TEXT = "U32"


def proportion_doubts(g: Geometry, wall_mm: Floats) -> Texts:
    """Give the code of the doubt that the proportions of a head or cover raise.

    Parameters
    ----------
    g : Geometry
        The rows [-].
    wall_mm : array of float
        Wall considered [mm].

    Returns
    -------
    array of str
        '' or a code of `fleet.words`: of several the one that matters most to strength.

    Notes
    -----
    Thinness is judged on the wall considered and the crown grown to it; knuckle and crown are judged as new,
    on the nominal wall where it is known. A bolted cover is known by its gasket diameter.
    """
    rows = g.of_shape("torispherical head") & (g.design_code == "asme8-1")
    new_wall = np.where(np.isnan(g.nominal_thickness_mm), wall_mm, g.nominal_thickness_mm)
    outside = np.where(
        np.isnan(g.outside_diameter_mm), g.inside_diameter_mm + 2 * new_wall, g.outside_diameter_mm
    )
    as_new = {"r": g.knuckle_radius_mm, "L": g.crown_radius_mm, "Do": outside, "t": new_wall}
    now = {**as_new, "L": grown_crown(g, wall_mm), "t": wall_mm}
    result = np.full(len(g), "", dtype=_TEXT)
    unknown = np.isnan(outside) | np.isnan(g.knuckle_radius_mm) | np.isnan(g.crown_radius_mm)
    result[rows & unknown] = UNCHECKED
    for limit in _LIMITS:
        result[rows & limit.broken(now if limit.then == THIN else as_new)] = limit.then
    bolted = g.of_shape("flat cover") & ~np.isnan(g.gasket_diameter_mm) & (g.design_code == "asme8-1")
    result[bolted] = BOLTS
    return result
