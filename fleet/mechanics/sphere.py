"""Spheres and hemispherical heads under internal pressure, on the inside and the outside radius."""

from __future__ import annotations

from fleet.formula import Num, domain
from fleet.mechanics.sources import pressure, wall

_THIN = (
    domain("t <= 0.356 * R", instead="the thick_sphere form of the edition"),
    domain("P <= 0.665 * S * E", instead="the thick_sphere form of the edition"),
)
_HEAD_THIN = (
    domain("t <= 0.356 * L", instead="the thick_sphere form of the edition"),
    domain("P <= 0.665 * S * E", instead="the thick_sphere form of the edition"),
)
_THIN_OUTSIDE = (
    domain("t <= 0.356 * (Ro - t)", instead="the thick_sphere form of the edition"),
    domain("P <= 0.665 * S * E", instead="the thick_sphere form of the edition"),
)


@wall("UG-27(d)", limits=_THIN)
def sphere_thickness(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a sphere.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the weakest seam [-].
    R : float or array
        Inside radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    t = P·R/(2·S·E − 0.2·P). Beyond the limits the thick-wall form of the edition takes over.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(d); any edition, the form being the same in all that were
    seen reproduced.
    """
    return P * R / (2 * S * E - 0.2 * P)


@pressure("UG-27(d)", limits=_THIN)
def sphere_pressure(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a sphere.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the weakest seam [-].
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
    P = 2·S·E·t/(R + 0.2·t). Beyond the limits the thick-wall form of the edition takes over.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-27(d); any edition, the form being the same in all that were
    seen reproduced.
    """
    return 2 * S * E * t / (R + 0.2 * t)


@wall("UG-32, hemispherical heads", limits=_HEAD_THIN)
def hemispherical_head_thickness(*, P: Num, S: Num, E: Num, L: Num) -> Num:
    """Give the wall of a hemispherical head.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Least efficiency of the seams within the head and of the one that joins it [-].
    L : float or array
        Inside crown radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    t = P·L/(2·S·E − 0.2·P), as for a sphere of the crown radius. The sign of the other form is plus
    0.2·t.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, hemispherical heads; any edition, the form being the same
    in all that were seen reproduced.
    """
    return P * L / (2 * S * E - 0.2 * P)


@pressure("UG-32, hemispherical heads", limits=_HEAD_THIN)
def hemispherical_head_pressure(*, S: Num, E: Num, L: Num, t: Num) -> Num:
    """Give the pressure of a hemispherical head.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Least efficiency of the seams within the head and of the one that joins it [-].
    L : float or array
        Inside crown radius, corroded [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    P = 2·S·E·t/(L + 0.2·t): plus, not minus.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, hemispherical heads; any edition, the form being the same
    in all that were seen reproduced.
    """
    return 2 * S * E * t / (L + 0.2 * t)


@wall("Appendix 1-1(a)(2)", limits=_THIN_OUTSIDE)
def sphere_thickness_outside(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a sphere or hemispherical head from its outside radius.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the weakest seam [-].
    Ro : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The inside form with R = Ro − t, solved for t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-1(a)(2); any edition, the form being the same in all
    that were seen reproduced.
    """
    return P * Ro / (2 * S * E + 0.8 * P)


@pressure("Appendix 1-1(a)(2)", limits=_THIN_OUTSIDE)
def sphere_pressure_outside(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a sphere or hemispherical head from its outside radius.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the weakest seam [-].
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
    The inside form with R = Ro − t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-1(a)(2); any edition, the form being the same in all
    that were seen reproduced.
    """
    return 2 * S * E * t / (Ro - 0.8 * t)
