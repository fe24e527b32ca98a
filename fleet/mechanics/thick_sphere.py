"""Thick spheres and hemispherical heads by edition: what takes over from the thin forms.

The older form is Lamé with the bore stress at S·E; the newer one is logarithmic.
"""

from __future__ import annotations

from fleet.formula import Num, domain, exp, log, power
from fleet.mechanics.sources import MEMORY, NEWER, OLDER, OURS, pressure, wall

_THICK_BOUNDED = (
    domain("P < 2 * S * E", instead="nothing: no wall is thick enough", status="from memory"),
    domain("t >= 0.356 * R", instead="the sphere form"),
)
_THICK = (domain("t >= 0.356 * R", instead="the sphere form"),)
_THICK_BOUNDED_OUTSIDE = (
    domain("P < 2 * S * E", instead="nothing: no wall is thick enough", status="from memory"),
    domain("t >= 0.356 * (Ro - t)", instead="the sphere form"),
)
_THICK_OUTSIDE = (domain("t >= 0.356 * (Ro - t)", instead="the sphere form"),)


@wall("Appendix 1-3", edition=OLDER, status="from memory", source=MEMORY, limits=_THICK_BOUNDED)
def thick_sphere_thickness_older(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a thick sphere or hemispherical head, older editions.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    R : float or array
        Inside radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    With Y = 2·(S·E + P)/(2·S·E − P) = (Ro/R)³: Lamé with the bore stress at S·E. It meets the thin form
    at t = 0.3561·R.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions before 2010 (from memory).
    """
    return R * (power(2 * (S * E + P) / (2 * S * E - P), 1 / 3) - 1)


@pressure("Appendix 1-3", edition=OLDER, status="from memory", source=MEMORY, limits=_THICK)
def thick_sphere_pressure_older(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a thick sphere or hemispherical head, older editions.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
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
    With Y = 2·(S·E + P)/(2·S·E − P) = (Ro/R)³: Lamé with the bore stress at S·E. It meets the thin form
    at t = 0.3561·R.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions before 2010 (from memory).
    """
    return 2 * S * E * (((R + t) / R) ** 3 - 1) / (((R + t) / R) ** 3 + 2)


@wall("Appendix 1-3", edition=OLDER, status="from memory", source=MEMORY, limits=_THICK_BOUNDED_OUTSIDE)
def thick_sphere_thickness_outside_older(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thick sphere or hemispherical head, older editions, on the outside radius.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    Ro : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    With Y = 2·(S·E + P)/(2·S·E − P) = (Ro/R)³: Lamé with the bore stress at S·E. It meets the thin form
    at t = 0.3561·R.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions before 2010 (from memory).
    """
    return Ro * (1 - power((2 * S * E - P) / (2 * (S * E + P)), 1 / 3))


@pressure("Appendix 1-3", edition=OLDER, status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_sphere_pressure_outside_older(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thick sphere or hemispherical head, older editions, on the outside radius.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
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
    With Y = 2·(S·E + P)/(2·S·E − P) = (Ro/R)³: Lamé with the bore stress at S·E. It meets the thin form
    at t = 0.3561·R.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions before 2010 (from memory).
    """
    return 2 * S * E * ((Ro / (Ro - t)) ** 3 - 1) / ((Ro / (Ro - t)) ** 3 + 2)


@wall("Appendix 1-3", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK)
def thick_sphere_thickness_newer(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a thick sphere or hemispherical head, newer editions.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    R : float or array
        Inside radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    t = R·(exp(0.5·P/(S·E)) − 1). It starts below the thin form: at t = 0.356·R it gives 0.609·S·E
    against 0.665·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions of 2010 and later (from memory).
    """
    return R * (exp(0.5 * P / (S * E)) - 1)


@pressure("Appendix 1-3", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK)
def thick_sphere_pressure_newer(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a thick sphere or hemispherical head, newer editions.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
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
    t = R·(exp(0.5·P/(S·E)) − 1). It starts below the thin form: at t = 0.356·R it gives 0.609·S·E
    against 0.665·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions of 2010 and later (from memory).
    """
    return 2 * S * E * log((R + t) / R)


@wall("Appendix 1-3", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_sphere_thickness_outside_newer(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thick sphere or hemispherical head, newer editions, on the outside radius.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    Ro : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    t = R·(exp(0.5·P/(S·E)) − 1). It starts below the thin form: at t = 0.356·R it gives 0.609·S·E
    against 0.665·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions of 2010 and later (from memory).
    """
    return Ro * (1 - exp(-0.5 * P / (S * E)))


@pressure("Appendix 1-3", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_sphere_pressure_outside_newer(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thick sphere or hemispherical head, newer editions, on the outside radius.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
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
    t = R·(exp(0.5·P/(S·E)) − 1). It starts below the thin form: at t = 0.356·R it gives 0.609·S·E
    against 0.665·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-3; editions of 2010 and later (from memory).
    """
    return 2 * S * E * log(Ro / (Ro - t))


@wall("UG-27(d)", status="ours", source=OURS)
def sphere_thin_limit(*, R: Num) -> Num:
    """Give the wall at which the thick form of a sphere takes over.

    Parameters
    ----------
    R : float or array
        Inside radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    Where the older form starts above the thin one (by 0.005 %), a pressure between the two needs this
    wall.

    References
    ----------
    Choice of this project, so that more wall never gives less pressure and the lesser figure is used.
    """
    return 0.356 * R


@wall("UG-27(d)", status="ours", source=OURS)
def sphere_thin_limit_outside(*, Ro: Num) -> Num:
    """Give the wall at which the thick form takes over, from the outside radius.

    Parameters
    ----------
    Ro : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    t = 0.356·R with R = Ro − t.

    References
    ----------
    Choice of this project, so that more wall never gives less pressure and the lesser figure is used.
    """
    return 0.356 / 1.356 * Ro


@pressure("Appendix 1-3", status="ours", source=OURS)
def sphere_step_pressure(*, S: Num, E: Num) -> Num:
    """Give the pressure of a sphere at which the newer thick form starts.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The newer form starts at 0.609·S·E where the thin form ends at 0.665·S·E. A thin wall is therefore
    credited with no more than the start of the thick form.

    References
    ----------
    Choice of this project, so that more wall never gives less pressure and the lesser figure is used.
    """
    return 2 * S * E * log(1.356)
