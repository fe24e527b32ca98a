"""Cones without a knuckle, pressure on the concave side: both stresses, at the diameter considered."""

from __future__ import annotations

from fleet.formula import Num, cos, domain, radians
from fleet.mechanics.sources import ALGEBRA, OURS, pressure, wall

_HOOP = (
    domain("alpha <= 30", instead="a cone with a knuckle, or a special analysis"),
    domain(
        "t <= D / (4 * cos(radians(alpha)))",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
    domain(
        "P <= 0.385 * S * E",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
)
_HOOP_OUTSIDE = (
    domain("alpha <= 30", instead="a cone with a knuckle, or a special analysis"),
    domain(
        "t <= (Do - 2 * t / cos(radians(alpha))) / (4 * cos(radians(alpha)))",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
    domain(
        "P <= 0.385 * S * E",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
)
_AXIAL = (
    domain("alpha <= 30", instead="a cone with a knuckle, or a special analysis"),
    domain(
        "t <= D / (4 * cos(radians(alpha)))",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
    domain(
        "P <= 1.25 * S * E",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
)
_AXIAL_OUTSIDE = (
    domain("alpha <= 30", instead="a cone with a knuckle, or a special analysis"),
    domain(
        "t <= (Do - 2 * t / cos(radians(alpha))) / (4 * cos(radians(alpha)))",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
    domain(
        "P <= 1.25 * S * E",
        instead="a calculation by an engineer: the cone is as thick as a thick cylinder",
        status="ours",
    ),
)


@wall("UG-32, conical heads", limits=_HOOP)
def cone_hoop_thickness(*, P: Num, S: Num, E: Num, D: Num, alpha: Num) -> Num:
    """Give the wall of a cone from its circumferential stress.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    D : float or array
        Inside diameter at the place considered, across the axis, corroded [mm].
    alpha : float or array
        Half apex angle [deg].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    D is measured where the wall is: a reading half way up a cone is rated with the diameter there. The
    junction with the shell is not covered.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, conical heads; any edition, the form being the same in all
    that were seen reproduced.
    """
    return P * D / (2 * cos(radians(alpha)) * (S * E - 0.6 * P))


@pressure("UG-32, conical heads", limits=_HOOP)
def cone_hoop_pressure(*, S: Num, E: Num, D: Num, alpha: Num, t: Num) -> Num:
    """Give the pressure of a cone from its circumferential stress.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    D : float or array
        Inside diameter at the place considered, across the axis, corroded [mm].
    alpha : float or array
        Half apex angle [deg].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    D is measured where the wall is: a reading half way up a cone is rated with the diameter there. The
    junction with the shell is not covered.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, conical heads; any edition, the form being the same in all
    that were seen reproduced.
    """
    return 2 * S * E * t * cos(radians(alpha)) / (D + 1.2 * t * cos(radians(alpha)))


@wall("UG-32, conical heads, on the outside diameter", status="ours", source=ALGEBRA, limits=_HOOP_OUTSIDE)
def cone_hoop_thickness_outside(*, P: Num, S: Num, E: Num, Do: Num, alpha: Num) -> Num:
    """Give the wall of a cone from its circumferential stress and outside diameter.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    Do : float or array
        Outside diameter at the place considered, across the axis [mm].
    alpha : float or array
        Half apex angle [deg].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The inside form, solved for t. The outside diameter across the axis is D + 2·t/cos α.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, conical heads, with D = Do − 2·t/cos α.
    """
    return P * Do / (2 * cos(radians(alpha)) * (S * E - 0.6 * P) + 2 * P / cos(radians(alpha)))


@pressure(
    "UG-32, conical heads, on the outside diameter", status="ours", source=ALGEBRA, limits=_HOOP_OUTSIDE
)
def cone_hoop_pressure_outside(*, S: Num, E: Num, Do: Num, alpha: Num, t: Num) -> Num:
    """Give the pressure of a cone from its circumferential stress and outside diameter.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    Do : float or array
        Outside diameter at the place considered, across the axis [mm].
    alpha : float or array
        Half apex angle [deg].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The inside form. The outside diameter across the axis is D + 2·t/cos α.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, conical heads, with D = Do − 2·t/cos α.
    """
    return (
        2
        * S
        * E
        * t
        * cos(radians(alpha))
        / (Do - 2 * t / cos(radians(alpha)) + 1.2 * t * cos(radians(alpha)))
    )


@wall("UG-27(c)(2) on the equivalent cylinder", status="ours", source=OURS, limits=_AXIAL)
def cone_axial_thickness(*, P: Num, S: Num, E: Num, D: Num, alpha: Num) -> Num:
    """Give the wall of a cone from its longitudinal stress.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    D : float or array
        Inside diameter at the place considered, across the axis, corroded [mm].
    alpha : float or array
        Half apex angle [deg].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The cone is taken as a cylinder of radius R = D/(2·cos α), the radius of curvature of its wall, in
    the longitudinal form of UG-27(c)(2). Membrane theory gives the stress along the cone as
    P·D/(4·t·cos α), which is the same as P·R/(2·t).

    References
    ----------
    Choice of this project: UG-27(c)(2) on the equivalent cylinder.
    """
    return P * D / (2 * cos(radians(alpha)) * (2 * S * E + 0.4 * P))


@pressure("UG-27(c)(2) on the equivalent cylinder", status="ours", source=OURS, limits=_AXIAL)
def cone_axial_pressure(*, S: Num, E: Num, D: Num, alpha: Num, t: Num) -> Num:
    """Give the pressure of a cone from its longitudinal stress.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    D : float or array
        Inside diameter at the place considered, across the axis, corroded [mm].
    alpha : float or array
        Half apex angle [deg].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The cone is taken as a cylinder of radius R = D/(2·cos α), the radius of curvature of its wall, in
    the longitudinal form of UG-27(c)(2). Membrane theory gives the stress along the cone as
    P·D/(4·t·cos α), which is the same as P·R/(2·t).

    References
    ----------
    Choice of this project: UG-27(c)(2) on the equivalent cylinder.
    """
    return 4 * S * E * t * cos(radians(alpha)) / (D - 0.8 * t * cos(radians(alpha)))


@wall("UG-27(c)(2) on the equivalent cylinder", status="ours", source=OURS, limits=_AXIAL_OUTSIDE)
def cone_axial_thickness_outside(*, P: Num, S: Num, E: Num, Do: Num, alpha: Num) -> Num:
    """Give the wall of a cone from its longitudinal stress and outside diameter.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    Do : float or array
        Outside diameter at the place considered, across the axis [mm].
    alpha : float or array
        Half apex angle [deg].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The cone is taken as a cylinder of radius R = D/(2·cos α), the radius of curvature of its wall, in
    the longitudinal form of UG-27(c)(2). Membrane theory gives the stress along the cone as
    P·D/(4·t·cos α), which is the same as P·R/(2·t).  The outside diameter across the axis is D +
    2·t/cos α.

    References
    ----------
    Choice of this project: UG-27(c)(2) on the equivalent cylinder.
    """
    return P * Do / (2 * cos(radians(alpha)) * (2 * S * E + 0.4 * P) + 2 * P / cos(radians(alpha)))


@pressure("UG-27(c)(2) on the equivalent cylinder", status="ours", source=OURS, limits=_AXIAL_OUTSIDE)
def cone_axial_pressure_outside(*, S: Num, E: Num, Do: Num, alpha: Num, t: Num) -> Num:
    """Give the pressure of a cone from its longitudinal stress and outside diameter.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    Do : float or array
        Outside diameter at the place considered, across the axis [mm].
    alpha : float or array
        Half apex angle [deg].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The cone is taken as a cylinder of radius R = D/(2·cos α), the radius of curvature of its wall, in
    the longitudinal form of UG-27(c)(2). Membrane theory gives the stress along the cone as
    P·D/(4·t·cos α), which is the same as P·R/(2·t).  The outside diameter across the axis is D +
    2·t/cos α.

    References
    ----------
    Choice of this project: UG-27(c)(2) on the equivalent cylinder.
    """
    return (
        4
        * S
        * E
        * t
        * cos(radians(alpha))
        / (Do - 2 * t / cos(radians(alpha)) - 0.8 * t * cos(radians(alpha)))
    )
