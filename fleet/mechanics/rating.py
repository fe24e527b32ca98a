"""What each wall may carry and what wall each pressure needs, for many parts and locations at once.

Rows are taken together by code and shape; radius kept and edition are told apart by mask. No row ever raises:
a figure that cannot be had is NaN, and `missing_inputs`, `unsupported` or `Rated.domain` says why.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from fleet.formula import Floats
from fleet.mechanics import shells
from fleet.mechanics.figures import (
    NAME,
    UNUSABLE,
    Codes,
    Figures,
    Rows,
    Texts,
    chosen,
    masked,
    withheld_because,
)
from fleet.mechanics.geometry import (
    CYLINDRICAL,
    SEAMED,
    Geometry,
    missing_inputs,
    unsupported,
    untrue,
)
from fleet.mechanics.heads import cone_figures, cover_figures, ellipsoidal_figures, torispherical_figures
from fleet.mechanics.proportions import proportion_doubts

__all__ = [
    "Geometry",
    "Rated",
    "allowable_pressure",
    "directions",
    "missing_inputs",
    "required_wall",
    "unsupported",
    "withheld_because",
]

DIRECTIONS = ("hoop", "axial", "end")


@dataclass(frozen=True)
class Rated:
    """Pressures or walls of N rows, each direction with the formula that gave it.

    Parameters
    ----------
    hoop, axial, end : array of float
        The figure by direction; NaN where there is no such direction or no figure can be had [MPa or mm].
    hoop_formula, axial_formula, end_formula : array of str
        Name in the register of the formula that gave the figure, '' if none did [text].
    domain : array of int8
        0, or why a figure of the row was withheld, no other form taking over: `withheld_because` [-].
    proportion : array of str
        '' or the code of the doubt that the proportions raise [text].
    """

    hoop: Floats
    axial: Floats
    end: Floats
    hoop_formula: Texts
    axial_formula: Texts
    end_formula: Texts
    domain: Codes
    proportion: Texts


def directions(g: Geometry) -> dict[str, Rows]:
    """Say which directions of stress each row's shape has.

    Parameters
    ----------
    g : Geometry
        The rows [-].

    Returns
    -------
    dict of str to array of bool
        ``hoop``, ``axial``, ``end``. A part holds what the worst of its directions holds; where one of them
        is NaN, nothing is known of the part.
    """
    served = ~unsupported(g)
    return {
        "hoop": served & g.of_shape(*SEAMED, "sphere"),
        "axial": served & g.of_shape(*SEAMED),
        "end": served & ~g.of_shape(*SEAMED, "sphere"),
    }


def _radius(g: Geometry, inside_stays: bool) -> Floats:
    """Give the radius that stays: of cylinders and spheres, and the crown of hemispherical heads."""
    nominal = g.nominal_thickness_mm
    inside, outside = g.inside_diameter_mm / 2, g.outside_diameter_mm / 2
    hemispherical = g.of_shape("hemispherical head")
    # where both diameters are given and disagree, the larger radius, the lower pressure
    inner = np.fmax(inside, outside - nominal)
    inner = np.where(hemispherical & ~np.isnan(g.crown_radius_mm), g.crown_radius_mm, inner)
    if inside_stays:
        return inner
    outer = np.fmax(outside, inside + nominal)
    return np.where(hemispherical, inner + nominal, outer)


def _shell(g: Geometry, forms: dict[str, shells.Form], e: Floats, quantity: Floats, *, wall: bool) -> Figures:
    """Rate one direction of shells of one code, each row on the radius that stays."""
    solve = shells.shell_wall if wall else shells.shell_pressure
    inner, outer = _radius(g, inside_stays=True), _radius(g, inside_stays=False)
    s, year = g.allowable_stress_mpa, g.edition_year
    on_outer = solve(forms["Ro"], s, e, outer, quantity, year)
    on_inner = solve(forms["R"], s, e, inner, quantity, year)
    at = on_outer.value if wall else quantity
    # The crown of a hemispherical head grows with the loss; above nominal there is none.
    above = g.of_shape("hemispherical head") & (at > g.nominal_thickness_mm)
    figures = chosen(g.outside_loss | above, on_inner, on_outer)
    impossible = ~(inner > 0) & ~np.isnan(inner)
    impossible |= ~g.outside_loss & ~above & ((~(outer > 0) & ~np.isnan(outer)) | (at >= outer))
    return masked(figures, impossible)


def _shells(g: Geometry, quantity: Floats, *, wall: bool) -> dict[str, Figures]:
    """Rate cylinders, nozzle necks, spheres and hemispherical heads; all rows of one shape and code."""
    plain = bool(g.design_code[0] == "membrane")
    shape = str(g.shape[0])
    if shape in CYLINDRICAL:
        hoop = shells.MEMBRANE["hoop"] if plain else shells.CYLINDER_HOOP
        axial = shells.MEMBRANE["axial"] if plain else shells.CYLINDER_AXIAL
        return {
            "hoop": _shell(g, hoop, g.efficiency_hoop, quantity, wall=wall),
            "axial": _shell(g, axial, g.efficiency_axial, quantity, wall=wall),
        }
    sphere = shape == "sphere"
    forms = shells.MEMBRANE["sphere"] if plain else (shells.SPHERE if sphere else shells.HEMISPHERICAL)
    return {"hoop" if sphere else "end": _shell(g, forms, g.efficiency_hoop, quantity, wall=wall)}


def _cones(g: Geometry, quantity: Floats, *, wall: bool) -> dict[str, Figures]:
    hoop, axial = cone_figures(g, quantity, wall=wall)
    return {"hoop": hoop, "axial": axial}


def _group(g: Geometry, quantity: Floats, *, wall: bool) -> dict[str, Figures]:
    """Rate rows of one code and shape."""
    ends: dict[str, Callable[..., Figures]] = {
        "ellipsoidal head": ellipsoidal_figures,
        "torispherical head": torispherical_figures,
        "flat cover": cover_figures,
    }
    shape = str(g.shape[0])
    if shape in ends:
        return {"end": ends[shape](g, quantity, wall=wall)}
    if shape == "cone":
        return _cones(g, quantity, wall=wall)
    return _shells(g, quantity, wall=wall)


def _rated(g: Geometry, quantity: Floats, *, wall: bool) -> Rated:
    """Rate every row, group by group, into arrays of the rows' order."""
    count = len(g)
    figures = {name: np.full(count, np.nan) for name in DIRECTIONS}
    names = {name: np.full(count, "", dtype=NAME) for name in DIRECTIONS}
    domain = np.zeros(count, dtype=np.int8)
    served = ~unsupported(g)
    kinds = sorted(set(zip(g.design_code[served].tolist(), g.shape[served].tolist(), strict=True)))
    for code, shape in kinds:
        rows = (g.design_code == code) & (g.shape == shape)
        for name, found in _group(g.only(rows), quantity[rows], wall=wall).items():
            figures[name][rows] = found.value
            names[name][rows] = found.formula
            domain[rows] = np.where(domain[rows] > 0, domain[rows], found.withheld)
    wrong = (untrue(g) > 0) | (served & np.isinf(quantity))
    domain[wrong] = UNUSABLE
    nothing = ~(quantity > 0) & ~np.isnan(quantity) & ~wrong
    missing = np.zeros(count, dtype=np.bool_)
    for lacking in missing_inputs(g).values():
        missing |= lacking
    for name, exists in directions(g).items():
        figures[name][wrong] = np.nan
        # No wall holds no pressure whatever else is known; no pressure needs no wall only where all is known.
        none = exists & nothing & (domain == 0) & ~(missing & wall)
        figures[name][none] = 0.0
        names[name][np.isnan(figures[name]) | (exists & nothing)] = ""
    return Rated(
        figures["hoop"],
        figures["axial"],
        figures["end"],
        names["hoop"],
        names["axial"],
        names["end"],
        domain,
        proportion_doubts(g, figures["end"] if wall else quantity),
    )


def _quantity(g: Geometry, values: Floats) -> Floats:
    return np.array(np.broadcast_to(np.asarray(values, dtype=np.float64), (len(g),)))


def allowable_pressure(g: Geometry, wall_mm: Floats) -> Rated:
    """Give the pressure that each wall may carry, at the point considered, static head included.

    Parameters
    ----------
    g : Geometry
        The rows [-].
    wall_mm : array of float
        Wall in strength of each row; the geometry is corroded down to it [mm].

    Returns
    -------
    Rated
        Pressures [MPa]; 0 where the wall is 0 or less.

    Notes
    -----
    Loss from inside, from both sides or not told: the outside radius of a shell stays; crown radius and
    diameter of heads and cones grow with the loss. Loss from outside: nothing grows. Where the thick forms of
    two editions differ and the edition is not known, the lesser pressure.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27, UG-32, UG-34, Appendix 1; plain mechanics for ``membrane``. The
    formulas of the register carry clause, edition and status.
    """
    with np.errstate(all="ignore"):
        return _rated(g, _quantity(g, wall_mm), wall=False)


def required_wall(g: Geometry, pressure_mpa: Floats) -> Rated:
    """Give the wall that each pressure needs, the geometry being corroded down to that very wall.

    Parameters
    ----------
    g : Geometry
        The rows [-].
    pressure_mpa : array of float
        Pressure at the point considered, static head included [MPa].

    Returns
    -------
    Rated
        Walls [mm]; 0 where the pressure is 0 or less and nothing is missing.

    Notes
    -----
    `allowable_pressure` of the result gives the pressure back. Where the thick form starts above the thin
    one, a pressure between the two needs the wall at which it starts, and that wall carries more.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27, UG-32, UG-34, Appendix 1; plain mechanics for ``membrane``.
    """
    with np.errstate(all="ignore"):
        return _rated(g, _quantity(g, pressure_mpa), wall=True)
