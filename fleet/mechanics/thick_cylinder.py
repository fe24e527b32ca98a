"""Thick cylinders in hoop by edition: what takes over from the thin form of Section VIII Division 1.

The older form is Lamé with the bore stress at S·E; the newer one is logarithmic.
"""

from __future__ import annotations

from fleet.formula import Num, domain, exp, log, sqrt, square
from fleet.mechanics.sources import MEMORY, NEWER, OLDER, OURS, pressure, wall

_THICK_BOUNDED = (
    domain("P < S * E", instead="nothing: no wall is thick enough"),
    domain("t >= R / 2", instead="the cylinder_hoop form"),
)
_THICK = (domain("t >= R / 2", instead="the cylinder_hoop form"),)
_THICK_BOUNDED_OUTSIDE = (
    domain("P < S * E", instead="nothing: no wall is thick enough"),
    domain("t >= (Ro - t) / 2", instead="the cylinder_hoop form"),
)
_THICK_OUTSIDE = (domain("t >= (Ro - t) / 2", instead="the cylinder_hoop form"),)


@wall("Appendix 1-2(a)", edition=OLDER, limits=_THICK_BOUNDED)
def thick_cylinder_hoop_thickness_older(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a thick cylinder in hoop, older editions.

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
    With Z = (S·E + P)/(S·E − P) = (Ro/R)², t = R·(√Z − 1) and P = S·E·(Z − 1)/(Z + 1): Lamé with the
    bore stress at S·E. It meets the thin form exactly at t = R/2.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions before 2010.
    """
    return R * (sqrt((S * E + P) / (S * E - P)) - 1)


@pressure("Appendix 1-2(a)", edition=OLDER, limits=_THICK)
def thick_cylinder_hoop_pressure_older(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder in hoop, older editions.

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
    With Z = (S·E + P)/(S·E − P) = (Ro/R)², t = R·(√Z − 1) and P = S·E·(Z − 1)/(Z + 1): Lamé with the
    bore stress at S·E. It meets the thin form exactly at t = R/2.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions before 2010.
    """
    return S * E * (square((R + t) / R) - 1) / (square((R + t) / R) + 1)


@wall("Appendix 1-2(a)", edition=OLDER, limits=_THICK_BOUNDED_OUTSIDE)
def thick_cylinder_hoop_thickness_outside_older(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thick cylinder in hoop, older editions, on the outside radius.

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
    With Z = (S·E + P)/(S·E − P) = (Ro/R)², t = R·(√Z − 1) and P = S·E·(Z − 1)/(Z + 1): Lamé with the
    bore stress at S·E. It meets the thin form exactly at t = R/2.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions before 2010.
    """
    return Ro * (1 - sqrt((S * E - P) / (S * E + P)))


@pressure("Appendix 1-2(a)", edition=OLDER, limits=_THICK_OUTSIDE)
def thick_cylinder_hoop_pressure_outside_older(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder in hoop, older editions, on the outside radius.

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
    With Z = (S·E + P)/(S·E − P) = (Ro/R)², t = R·(√Z − 1) and P = S·E·(Z − 1)/(Z + 1): Lamé with the
    bore stress at S·E. It meets the thin form exactly at t = R/2.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions before 2010.
    """
    return S * E * (square(Ro / (Ro - t)) - 1) / (square(Ro / (Ro - t)) + 1)


@wall("Appendix 1-2(a)", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK)
def thick_cylinder_hoop_thickness_newer(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a thick cylinder in hoop, newer editions.

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
    t = R·(exp(P/(S·E)) − 1). It starts above the thin form: at t = R/2 it gives 0.4055·S·E against
    0.3846·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions of 2010 and later (from memory).
    """
    return R * (exp(P / (S * E)) - 1)


@pressure("Appendix 1-2(a)", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK)
def thick_cylinder_hoop_pressure_newer(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder in hoop, newer editions.

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
    t = R·(exp(P/(S·E)) − 1). It starts above the thin form: at t = R/2 it gives 0.4055·S·E against
    0.3846·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions of 2010 and later (from memory).
    """
    return S * E * log((R + t) / R)


@wall("Appendix 1-2(a)", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_cylinder_hoop_thickness_outside_newer(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thick cylinder in hoop, newer editions, on the outside radius.

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
    t = R·(exp(P/(S·E)) − 1). It starts above the thin form: at t = R/2 it gives 0.4055·S·E against
    0.3846·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions of 2010 and later (from memory).
    """
    return Ro * (1 - exp(-P / (S * E)))


@pressure("Appendix 1-2(a)", edition=NEWER, status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_cylinder_hoop_pressure_outside_newer(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder in hoop, newer editions, on the outside radius.

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
    t = R·(exp(P/(S·E)) − 1). It starts above the thin form: at t = R/2 it gives 0.4055·S·E against
    0.3846·S·E.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(a); editions of 2010 and later (from memory).
    """
    return S * E * log(Ro / (Ro - t))


@wall("UG-27(c)", status="ours", source=OURS)
def cylinder_thin_limit(*, R: Num) -> Num:
    """Give the wall at which the thick form of a cylinder takes over.

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
    Where the newer form starts above the thin one, a pressure between the two needs this wall: t = R/2.

    References
    ----------
    Choice of this project, so that more wall never gives less pressure and the lesser figure is used.
    """
    return R / 2


@wall("UG-27(c)", status="ours", source=OURS)
def cylinder_thin_limit_outside(*, Ro: Num) -> Num:
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
    t = R/2 with R = Ro − t.

    References
    ----------
    Choice of this project, so that more wall never gives less pressure and the lesser figure is used.
    """
    return Ro / 3
