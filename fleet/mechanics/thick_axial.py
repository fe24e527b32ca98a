"""Thick cylinders along the axis: what takes over from the thin form of Section VIII Division 1."""

from __future__ import annotations

from fleet.formula import Num, domain, sqrt, square
from fleet.mechanics.sources import MEMORY, pressure, wall

_THICK = (domain("t >= R / 2", instead="the cylinder_axial form"),)
_THICK_OUTSIDE = (domain("t >= (Ro - t) / 2", instead="the cylinder_axial form"),)


@wall("Appendix 1-2(b)", status="from memory", source=MEMORY, limits=_THICK)
def thick_cylinder_axial_thickness(*, P: Num, S: Num, E: Num, R: Num) -> Num:
    """Give the wall of a thick cylinder along its axis.

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
    With Z = P/(S·E) + 1 = (Ro/R)²: the force on the closed end over the metal area. It meets the thin
    form exactly at t = R/2, P = 1.25·S·E. Taken for every edition.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(b); any edition, the form being the same in all that
    were seen reproduced (from memory).
    """
    return R * (sqrt(P / (S * E) + 1) - 1)


@pressure("Appendix 1-2(b)", status="from memory", source=MEMORY, limits=_THICK)
def thick_cylinder_axial_pressure(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder along its axis.

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
    With Z = P/(S·E) + 1 = (Ro/R)²: the force on the closed end over the metal area. It meets the thin
    form exactly at t = R/2, P = 1.25·S·E. Taken for every edition.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(b); any edition, the form being the same in all that
    were seen reproduced (from memory).
    """
    return S * E * (square((R + t) / R) - 1)


@wall("Appendix 1-2(b)", status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_cylinder_axial_thickness_outside(*, P: Num, S: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thick cylinder along its axis, on the outside radius.

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
    With Z = P/(S·E) + 1 = (Ro/R)²: the force on the closed end over the metal area. It meets the thin
    form exactly at t = R/2, P = 1.25·S·E. Taken for every edition.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(b); any edition, the form being the same in all that
    were seen reproduced (from memory).
    """
    return Ro * (1 - 1 / sqrt(P / (S * E) + 1))


@pressure("Appendix 1-2(b)", status="from memory", source=MEMORY, limits=_THICK_OUTSIDE)
def thick_cylinder_axial_pressure_outside(*, S: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder along its axis, on the outside radius.

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
    With Z = P/(S·E) + 1 = (Ro/R)²: the force on the closed end over the metal area. It meets the thin
    form exactly at t = R/2, P = 1.25·S·E. Taken for every edition.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-2(b); any edition, the form being the same in all that
    were seen reproduced (from memory).
    """
    return S * E * (square(Ro / (Ro - t)) - 1)
