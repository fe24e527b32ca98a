"""The register's shapes as arrays: what a row gives, what its shape needs, what is missing or untrue."""

from __future__ import annotations

from dataclasses import dataclass, fields

import numpy as np
from numpy.typing import NDArray

from fleet.formula import Floats
from fleet.mechanics.figures import Codes, Rows, Texts

CYLINDRICAL = ("cylinder", "nozzle neck")
ROUND = (*CYLINDRICAL, "sphere", "hemispherical head")
SEAMED = (*CYLINDRICAL, "cone")
ASME = (*ROUND, "cone", "ellipsoidal head", "torispherical head", "flat cover")
SHAPES_OF = {"asme8-1": ASME, "membrane": ROUND}
"""The shapes each pressure code has formulas for."""


@dataclass(frozen=True)
class Geometry:
    """What the register gives of N parts or locations; NaN and '' where it gives nothing.

    Parameters
    ----------
    design_code : array of str
        ``asme8-1`` or ``membrane`` [text].
    edition_year : array of float
        Year of the edition of construction [year].
    shape : array of str
        A shape of the register [text].
    loss_side : array of str
        ``inside``, ``outside``, ``both`` or '' (taken as inside) [text].
    inside_diameter_mm, outside_diameter_mm : array of float
        Diameters as new; for a cone the one at the location, across the axis [mm].
    crown_radius_mm, knuckle_radius_mm : array of float
        Inside radii of a dished head as new [mm].
    half_apex_angle_deg : array of float
        Half apex angle of a cone [deg].
    axis_ratio : array of float
        D/2h of an ellipsoidal head as new [-].
    cover_factor : array of float
        Factor C of a flat cover [-].
    gasket_diameter_mm : array of float
        Diameter of a flat cover through its gasket [mm].
    nominal_thickness_mm : array of float
        Nominal wall of the base metal [mm].
    allowable_stress_mpa : array of float
        Allowable stress at the design temperature [MPa].
    efficiency_hoop : array of float
        Efficiency of the long seam; of a sphere, head or cover its joint efficiency [-].
    efficiency_axial : array of float
        Efficiency of the girth seam [-].
    required_given_mm : array of float
        Required thickness given for shape ``other`` [mm].
    """

    design_code: Texts
    edition_year: Floats
    shape: Texts
    loss_side: Texts
    inside_diameter_mm: Floats
    outside_diameter_mm: Floats
    crown_radius_mm: Floats
    knuckle_radius_mm: Floats
    half_apex_angle_deg: Floats
    axis_ratio: Floats
    cover_factor: Floats
    gasket_diameter_mm: Floats
    nominal_thickness_mm: Floats
    allowable_stress_mpa: Floats
    efficiency_hoop: Floats
    efficiency_axial: Floats
    required_given_mm: Floats

    def __post_init__(self) -> None:
        for field in fields(self):
            kind = np.str_ if field.name in {"design_code", "shape", "loss_side"} else np.float64
            object.__setattr__(
                self, field.name, np.atleast_1d(np.asarray(getattr(self, field.name), dtype=kind))
            )

    @classmethod
    def build(cls, count: int, **given: object) -> Geometry:
        """Build rows from what is given; the rest is blank.

        Parameters
        ----------
        count : int
            How many rows [count].
        **given : float, str or array
            Fields by name, one value for all rows or one a row [-].

        Returns
        -------
        Geometry

        Examples
        --------
        >>> rows = Geometry.build(2, design_code="asme8-1", shape="sphere", inside_diameter_mm=[9e3, 1e4])
        >>> rows.shape.tolist(), rows.axis_ratio.tolist()
        (['sphere', 'sphere'], [nan, nan])
        """
        blank: dict[str, object] = {field.name: np.nan for field in fields(cls)}
        blank |= {"design_code": "", "shape": "", "loss_side": ""} | given
        return cls(**{name: np.broadcast_to(np.asarray(value), (count,)) for name, value in blank.items()})

    def __len__(self) -> int:
        return len(self.shape)

    def only(self, rows: Rows | NDArray[np.int64]) -> Geometry:
        """Give some of the rows.

        Parameters
        ----------
        rows : array of bool or int
            Which rows, by mask or by number [-].

        Returns
        -------
        Geometry
        """
        return Geometry(**{field.name: getattr(self, field.name)[rows] for field in fields(self)})

    @property
    def outside_loss(self) -> Rows:
        """Where the wall thins from outside only, so that the inside stays."""
        return np.asarray(self.loss_side == "outside", dtype=np.bool_)

    def of_shape(self, *shapes: str) -> Rows:
        """Where the shape is one of these.

        Parameters
        ----------
        *shapes : str
            Shapes of the register [text].

        Returns
        -------
        array of bool
        """
        return np.isin(self.shape, shapes)


# What each shape needs for its figures, by field; where two will do, the first that is given counts.
_DIAMETER = ("inside_diameter_mm", "outside_diameter_mm")
_ALWAYS = ("allowable_stress_mpa", "efficiency_hoop")
_NEEDS: dict[str, tuple[tuple[str, ...], ...]] = {
    "cylinder": (_DIAMETER, ("efficiency_axial",)),
    "nozzle neck": (_DIAMETER, ("efficiency_axial",)),
    "sphere": (_DIAMETER,),
    "hemispherical head": (("crown_radius_mm", *_DIAMETER),),
    "ellipsoidal head": (_DIAMETER, ("axis_ratio",)),
    "torispherical head": (("crown_radius_mm",), ("knuckle_radius_mm",)),
    "cone": (_DIAMETER, ("half_apex_angle_deg",), ("efficiency_axial",)),
    "flat cover": (("gasket_diameter_mm", "inside_diameter_mm"), ("cover_factor",)),
}
_COLUMN = {
    "inside_diameter_mm": "inside_diameter",
    "crown_radius_mm": "crown_radius",
    "knuckle_radius_mm": "knuckle_radius",
    "half_apex_angle_deg": "half_apex_angle",
    "axis_ratio": "axis_ratio",
    "cover_factor": "cover_factor",
    "gasket_diameter_mm": "gasket_diameter",
    "allowable_stress_mpa": "allowable_stress",
    "efficiency_axial": "joint_efficiency_circ",
}


def _unusable(g: Geometry, name: str) -> Rows:
    """Where a number is given that cannot be true."""
    value: Floats = getattr(g, name)
    if name == "half_apex_angle_deg":
        wrong = ~((value >= 0) & (value < 90))
    elif name.startswith("efficiency"):
        wrong = ~((value > 0) & (value <= 1))
    else:
        wrong = ~((value > 0) & (value < np.inf))
    return wrong & ~np.isnan(value)


def needs_nominal(g: Geometry) -> Rows:
    """Say where the growth of the geometry, or a diameter, follows from the nominal wall.

    Parameters
    ----------
    g : Geometry
        The rows [-].

    Returns
    -------
    array of bool
    """
    inside, outside = ~np.isnan(g.inside_diameter_mm), ~np.isnan(g.outside_diameter_mm)
    crown = ~np.isnan(g.crown_radius_mm) & g.of_shape("hemispherical head")
    straight = g.of_shape(*CYLINDRICAL, "sphere")
    grows = (
        g.of_shape("hemispherical head", "ellipsoidal head", "torispherical head", "cone") & ~g.outside_loss
    )
    from_inside = straight & ~g.outside_loss & ~outside
    from_outside = g.of_shape(*ROUND, "ellipsoidal head", "cone") & outside & ~inside & ~crown
    from_outside &= ~(straight & ~g.outside_loss)
    return grows | from_inside | from_outside


def unsupported(g: Geometry) -> Rows:
    """Say where there is no formula for the shape under the row's code.

    Parameters
    ----------
    g : Geometry
        The rows [-].

    Returns
    -------
    array of bool
        True also for a code that is not known; shape ``other`` has no formula and is reported so.
    """
    known = np.zeros(len(g), dtype=np.bool_)
    for code, shapes in SHAPES_OF.items():
        known |= (g.design_code == code) & g.of_shape(*shapes)
    return ~known


def missing_inputs(g: Geometry) -> dict[str, Rows]:
    """Say what each row needs and does not give, by register column.

    Parameters
    ----------
    g : Geometry
        The rows [-].

    Returns
    -------
    dict of str to array of bool
        Register column to rows; columns that no row lacks are left out. Shape ``other`` needs
        ``required_thickness_given``; rows without a formula need nothing.
    """
    found: dict[str, Rows] = {}

    def note(column: str, rows: Rows) -> None:
        if rows.any():
            found[column] = found.get(column, np.zeros(len(g), dtype=np.bool_)) | rows

    served = ~unsupported(g)
    note("allowable_stress", served & np.isnan(g.allowable_stress_mpa))
    no_efficiency = served & np.isnan(g.efficiency_hoop)
    note("joint_efficiency_long", no_efficiency & g.of_shape(*SEAMED))
    note("joint_efficiency", no_efficiency & ~g.of_shape(*SEAMED))
    for shape, needs in _NEEDS.items():
        rows = served & g.of_shape(shape)
        for names in needs:
            lacking = np.all([np.isnan(getattr(g, name)) for name in names], axis=0)
            column = "inside_diameter" if "inside_diameter_mm" in names else _COLUMN[names[0]]
            note(column, rows & lacking)
    note("nominal_thickness", served & needs_nominal(g) & np.isnan(g.nominal_thickness_mm))
    note("required_thickness_given", g.of_shape("other") & np.isnan(g.required_given_mm))
    return found


def untrue(g: Geometry) -> Codes:
    """Say where a number that the shape uses cannot be true: zero, negative, infinite, an efficiency above 1.

    Parameters
    ----------
    g : Geometry
        The rows [-].

    Returns
    -------
    array of int8
        1 there, else 0.
    """
    wrong = _unusable(g, "nominal_thickness_mm")
    for name in _ALWAYS:
        wrong |= _unusable(g, name)
    for shape, needs in _NEEDS.items():
        rows = g.of_shape(shape)
        for name in {name for names in needs for name in names}:
            wrong |= rows & _unusable(g, name)
    return (wrong & ~unsupported(g)).astype(np.int8)
