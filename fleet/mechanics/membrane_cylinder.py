"""Thin cylinders by plain mechanics: hoop and longitudinal stress, wall and pressure.

The pressure acts on the inside radius. The forms hold while r/t is 10 or more; beyond, Lamé takes over.
"""

from __future__ import annotations

from fleet.formula import Num, domain
from fleet.mechanics.sources import ALGEBRA, MECHANICS, TEXTBOOK, pressure, stress, wall

_THIN = (domain("r >= 10 * t", instead="the lame_cylinder form"),)
_THIN_OUTSIDE = (domain("Ro - t >= 10 * t", instead="the lame_cylinder form"),)


@stress("membrane", standard=MECHANICS, source=TEXTBOOK, limits=_THIN)
def membrane_hoop_stress(*, p: Num, r: Num, t: Num) -> Num:
    """Give the hoop stress of a thin cylinder.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    r : float or array
        Inside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Stress [MPa].

    Notes
    -----
    σ = p·r / t. Balance of forces on a cut through the wall, the stress taken as the same through it.
    At r/t = 10 the hoop stress of a cylinder is about 5 % below the true stress at the bore; thicker
    walls belong to the Lamé forms.

    References
    ----------
    Any textbook of mechanics of materials.

    Examples
    --------
    >>> float(membrane_hoop_stress(p=0.8, r=1000.0, t=10.0))  # megapascal
    80.0
    """
    return p * r / t


@wall("membrane", standard=MECHANICS, source=TEXTBOOK, limits=_THIN)
def membrane_hoop_thickness(*, p: Num, sigma: Num, E: Num, r: Num) -> Num:
    """Give the wall of a thin cylinder from its hoop stress.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    sigma : float or array
        Allowable stress [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    r : float or array
        Inside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The hoop stress of a thin cylinder, which the long seam carries, set equal to σ·E. Balance of forces
    on a cut through the wall, the stress taken as the same through it. At r/t = 10 the hoop stress of a
    cylinder is about 5 % below the true stress at the bore; thicker walls belong to the Lamé forms.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * r / (sigma * E)


@pressure("membrane", gives="p", standard=MECHANICS, source=TEXTBOOK, limits=_THIN)
def membrane_hoop_pressure(*, sigma: Num, E: Num, r: Num, t: Num) -> Num:
    """Give the pressure of a thin cylinder from its hoop stress.

    Parameters
    ----------
    sigma : float or array
        Allowable stress [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    r : float or array
        Inside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].

    Notes
    -----
    The hoop stress of a thin cylinder, which the long seam carries, set equal to σ·E. Balance of forces
    on a cut through the wall, the stress taken as the same through it. At r/t = 10 the hoop stress of a
    cylinder is about 5 % below the true stress at the bore; thicker walls belong to the Lamé forms.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return sigma * E * t / r


@wall("membrane", standard=MECHANICS, source=ALGEBRA, limits=_THIN_OUTSIDE)
def membrane_hoop_thickness_outside(*, p: Num, sigma: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thin cylinder whose outside radius stays.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    sigma : float or array
        Allowable stress [MPa].
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
    The form on the inside radius with r = Ro − t, solved for t.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * Ro / (sigma * E + p)


@pressure("membrane", gives="p", standard=MECHANICS, source=ALGEBRA, limits=_THIN_OUTSIDE)
def membrane_hoop_pressure_outside(*, sigma: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thin cylinder whose outside radius stays.

    Parameters
    ----------
    sigma : float or array
        Allowable stress [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    Ro : float or array
        Outside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].

    Notes
    -----
    The form on the inside radius with r = Ro − t.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return sigma * E * t / (Ro - t)


@stress("membrane", standard=MECHANICS, source=TEXTBOOK, limits=_THIN)
def membrane_axial_stress(*, p: Num, r: Num, t: Num) -> Num:
    """Give the longitudinal stress of a thin closed cylinder.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    r : float or array
        Inside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Stress [MPa].

    Notes
    -----
    σ = p·r / (2·t). Balance of forces on a cut through the wall, the stress taken as the same through
    it. At r/t = 10 the hoop stress of a cylinder is about 5 % below the true stress at the bore;
    thicker walls belong to the Lamé forms.

    References
    ----------
    Any textbook of mechanics of materials.

    Examples
    --------
    >>> float(membrane_axial_stress(p=0.8, r=1000.0, t=10.0))  # megapascal
    40.0
    """
    return p * r / (2 * t)


@wall("membrane", standard=MECHANICS, source=TEXTBOOK, limits=_THIN)
def membrane_axial_thickness(*, p: Num, sigma: Num, E: Num, r: Num) -> Num:
    """Give the wall of a thin closed cylinder from its longitudinal stress.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    sigma : float or array
        Allowable stress [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    r : float or array
        Inside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The longitudinal stress of a thin closed cylinder, which the girth seam carries, set equal to σ·E.
    Balance of forces on a cut through the wall, the stress taken as the same through it. At r/t = 10
    the hoop stress of a cylinder is about 5 % below the true stress at the bore; thicker walls belong
    to the Lamé forms.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * r / (2 * sigma * E)


@pressure("membrane", gives="p", standard=MECHANICS, source=TEXTBOOK, limits=_THIN)
def membrane_axial_pressure(*, sigma: Num, E: Num, r: Num, t: Num) -> Num:
    """Give the pressure of a thin closed cylinder from its longitudinal stress.

    Parameters
    ----------
    sigma : float or array
        Allowable stress [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    r : float or array
        Inside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].

    Notes
    -----
    The longitudinal stress of a thin closed cylinder, which the girth seam carries, set equal to σ·E.
    Balance of forces on a cut through the wall, the stress taken as the same through it. At r/t = 10
    the hoop stress of a cylinder is about 5 % below the true stress at the bore; thicker walls belong
    to the Lamé forms.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return 2 * sigma * E * t / r


@wall("membrane", standard=MECHANICS, source=ALGEBRA, limits=_THIN_OUTSIDE)
def membrane_axial_thickness_outside(*, p: Num, sigma: Num, E: Num, Ro: Num) -> Num:
    """Give the wall of a thin closed cylinder whose outside radius stays.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    sigma : float or array
        Allowable stress [MPa].
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
    The form on the inside radius with r = Ro − t, solved for t.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * Ro / (2 * sigma * E + p)


@pressure("membrane", gives="p", standard=MECHANICS, source=ALGEBRA, limits=_THIN_OUTSIDE)
def membrane_axial_pressure_outside(*, sigma: Num, E: Num, Ro: Num, t: Num) -> Num:
    """Give the pressure of a thin closed cylinder whose outside radius stays.

    Parameters
    ----------
    sigma : float or array
        Allowable stress [MPa].
    E : float or array
        Efficiency of the seam that this stress crosses [-].
    Ro : float or array
        Outside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].

    Notes
    -----
    The form on the inside radius with r = Ro − t.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return 2 * sigma * E * t / (Ro - t)
