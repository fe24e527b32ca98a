"""Cylinders and nozzle necks under internal pressure: both stresses, on either radius."""

from __future__ import annotations

from fleet.formula import Num, domain
from fleet.mechanics.sources import ALGEBRA, pressure, wall

_HOOP_THIN = (
    domain("t <= R / 2", instead="the thick_cylinder_hoop form of the edition"),
    domain("P <= 0.385 * S * E", instead="the thick_cylinder_hoop form of the edition"),
)
_HOOP_THIN_OUTSIDE = (
    domain("t <= (Ro - t) / 2", instead="the thick_cylinder_hoop form of the edition"),
    domain("P <= 0.385 * S * E", instead="the thick_cylinder_hoop form of the edition"),
)
_AXIAL_THIN = (
    domain("t <= R / 2", instead="the thick_cylinder_axial form"),
    domain("P <= 1.25 * S * E", instead="the thick_cylinder_axial form"),
)
_AXIAL_THIN_OUTSIDE = (
    domain("t <= (Ro - t) / 2", instead="the thick_cylinder_axial form"),
    domain("P <= 1.25 * S * E", instead="the thick_cylinder_axial form"),
)


@wall("UG-27(c)(1)", limits=_HOOP_THIN)
def cylinder_hoop_thickness(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a cylinder from its circumferential stress.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    R : float or array
        Inside radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The circumferential stress, which the long seam carries. Beyond the limits the thick-wall form of
    the edition takes over.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(c)(1); any edition, the form being the same in all that
    were seen reproduced.

    Examples
    --------
    >>> round(float(cylinder_hoop_thickness(P=500.0, S=17500.0, E=1.0, R=30.0)), 3)
    0.872
    """
    return P * R / (S * E - 0.6 * P)


@pressure("UG-27(c)(1)", limits=_HOOP_THIN)
def cylinder_hoop_pressure(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a cylinder from its circumferential stress.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    R : float or array
        Inside radius, corroded [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The circumferential stress, which the long seam carries. Beyond the limits the thick-wall form of
    the edition takes over.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(c)(1); any edition, the form being the same in all that
    were seen reproduced.
    """
    return S * E * t / (R + 0.6 * t)


@wall("Appendix 1-1(a)(1)", limits=_HOOP_THIN_OUTSIDE)
def cylinder_hoop_thickness_outside(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a cylinder from its circumferential stress and outside radius.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    Ro : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The circumferential stress, which the long seam carries. The inside form with R = Ro − t, solved for
    t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-1(a)(1); any edition, the form being the same in all
    that were seen reproduced.
    """
    return P * Ro / (S * E + 0.4 * P)


@pressure("Appendix 1-1(a)(1)", limits=_HOOP_THIN_OUTSIDE)
def cylinder_hoop_pressure_outside(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a cylinder from its circumferential stress and outside radius.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the long seam [-].
    Ro : float or array
        Outside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The circumferential stress, which the long seam carries. The inside form with R = Ro − t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-1(a)(1); any edition, the form being the same in all
    that were seen reproduced.
    """
    return S * E * t / (Ro - 0.4 * t)


@wall("UG-27(c)(2)", limits=_AXIAL_THIN)
def cylinder_axial_thickness(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a cylinder from its longitudinal stress.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    R : float or array
        Inside radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The longitudinal stress, which the girth seam carries. It governs where the girth efficiency is
    below about half of the long-seam efficiency. Pressure only: wind and weight are not in it. Beyond
    the limits the thick-wall form of the edition takes over.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(c)(2); any edition, the form being the same in all that
    were seen reproduced.
    """
    return P * R / (2 * S * E + 0.4 * P)


@pressure("UG-27(c)(2)", limits=_AXIAL_THIN)
def cylinder_axial_pressure(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a cylinder from its longitudinal stress.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    R : float or array
        Inside radius, corroded [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The longitudinal stress, which the girth seam carries. It governs where the girth efficiency is
    below about half of the long-seam efficiency. Pressure only: wind and weight are not in it. Beyond
    the limits the thick-wall form of the edition takes over.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(c)(2); any edition, the form being the same in all that
    were seen reproduced.
    """
    return 2 * S * E * t / (R - 0.4 * t)


@wall("UG-27(c)(2) on the outside radius", source=ALGEBRA, limits=_AXIAL_THIN_OUTSIDE)
def cylinder_axial_thickness_outside(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a cylinder from its longitudinal stress and outside radius.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    Ro : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The longitudinal stress, which the girth seam carries. It governs where the girth efficiency is
    below about half of the long-seam efficiency. Pressure only: wind and weight are not in it. The
    inside form with R = Ro − t, solved for t.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(c)(2) on the outside radius; any edition, the form being
    the same in all that were seen reproduced.
    """
    return P * Ro / (2 * S * E + 1.4 * P)


@pressure("UG-27(c)(2) on the outside radius", source=ALGEBRA, limits=_AXIAL_THIN_OUTSIDE)
def cylinder_axial_pressure_outside(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a cylinder from its longitudinal stress and outside radius.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the girth seam [-].
    Ro : float or array
        Outside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The longitudinal stress, which the girth seam carries. It governs where the girth efficiency is
    below about half of the long-seam efficiency. Pressure only: wind and weight are not in it. The
    inside form with R = Ro − t.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(c)(2) on the outside radius; any edition, the form being
    the same in all that were seen reproduced.
    """
    return 2 * S * E * t / (Ro - 1.4 * t)
