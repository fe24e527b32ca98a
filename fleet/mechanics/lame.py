"""Thick cylinders and spheres by Lamé: stresses at any radius; wall and pressure from the bore."""

from __future__ import annotations

from fleet.formula import Num, domain, power, sqrt, square
from fleet.mechanics.sources import MECHANICS, TEXTBOOK, pressure, stress, wall

_WITHIN_WALL = (
    domain("b > a", instead="nothing: the outside radius must exceed the inside radius", status="ours"),
    domain("x >= a", instead="nothing: there is no wall at that radius", status="ours"),
    domain("x <= b", instead="nothing: there is no wall at that radius", status="ours"),
)
_A_WALL = (
    domain("b > a", instead="nothing: the outside radius must exceed the inside radius", status="ours"),
)
_BOUNDED = (domain("p < sigma", instead="nothing: no wall is thick enough"),)
_BOUNDED_2 = (domain("p < 2 * sigma", instead="nothing: no wall is thick enough"),)


@stress("Lamé", gives="sigma_h", standard=MECHANICS, source=TEXTBOOK, limits=_WITHIN_WALL)
def lame_cylinder_hoop_stress(*, p_i: Num, p_o: Num, a: Num, b: Num, x: Num) -> Num:
    """Give the hoop stress in a thick cylinder.

    Parameters
    ----------
    p_i : float or array
        Internal pressure [MPa].
    p_o : float or array
        External pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].
    x : float or array
        Radius considered [mm].

    Returns
    -------
    float or array
        Hoop stress, tension positive [MPa].

    Notes
    -----
    σ = A + B/x² with A = (p_i·a² − p_o·b²)/(b² − a²) and B = (p_i − p_o)·a²·b²/(b² − a²). The hoop
    stress at the bore exceeds that at the outside by p_i − p_o.

    References
    ----------
    Any textbook of mechanics of materials.

    Examples
    --------
    >>> float(lame_cylinder_hoop_stress(p_i=80.0, p_o=0.0, a=200.0, b=300.0, x=200.0))
    208.0
    """
    return (p_i * square(a) - p_o * square(b)) / (square(b) - square(a)) + (p_i - p_o) * square(a) * square(
        b
    ) / ((square(b) - square(a)) * square(x))


@stress("Lamé", gives="sigma_r", standard=MECHANICS, source=TEXTBOOK, limits=_WITHIN_WALL)
def lame_cylinder_radial_stress(*, p_i: Num, p_o: Num, a: Num, b: Num, x: Num) -> Num:
    """Give the radial stress in a thick cylinder.

    Parameters
    ----------
    p_i : float or array
        Internal pressure [MPa].
    p_o : float or array
        External pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].
    x : float or array
        Radius considered [mm].

    Returns
    -------
    float or array
        Radial stress, tension positive [MPa].

    Notes
    -----
    σ = A − B/x² with A and B of the hoop stress.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return (p_i * square(a) - p_o * square(b)) / (square(b) - square(a)) - (p_i - p_o) * square(a) * square(
        b
    ) / ((square(b) - square(a)) * square(x))


@stress("Lamé", gives="sigma_a", standard=MECHANICS, source=TEXTBOOK, limits=_A_WALL)
def lame_cylinder_axial_stress(*, p_i: Num, p_o: Num, a: Num, b: Num) -> Num:
    """Give the axial stress in a thick closed cylinder.

    Parameters
    ----------
    p_i : float or array
        Internal pressure [MPa].
    p_o : float or array
        External pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Axial stress, tension positive [MPa].

    Notes
    -----
    σ = A of the hoop stress: the force on the closed ends over the metal area.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return (p_i * square(a) - p_o * square(b)) / (square(b) - square(a))


@stress("Lamé", standard=MECHANICS, source=TEXTBOOK, limits=_A_WALL)
def lame_cylinder_bore_stress(*, p: Num, a: Num, b: Num) -> Num:
    """Give the greatest hoop stress of a thick cylinder, at the bore.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Hoop stress at the bore [MPa].

    Notes
    -----
    The hoop stress at x = a without external pressure.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * (square(b) + square(a)) / (square(b) - square(a))


@wall("Lamé", standard=MECHANICS, source=TEXTBOOK, limits=_BOUNDED)
def lame_cylinder_thickness(*, p: Num, sigma: Num, a: Num) -> Num:
    """Give the wall of a thick cylinder from its greatest hoop stress.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    sigma : float or array
        Allowable stress [MPa].
    a : float or array
        Inside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The bore stress set equal to σ and solved for t = b − a.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return a * (sqrt((sigma + p) / (sigma - p)) - 1)


@pressure("Lamé", gives="p", standard=MECHANICS, source=TEXTBOOK)
def lame_cylinder_pressure(*, sigma: Num, a: Num, t: Num) -> Num:
    """Give the pressure of a thick cylinder from its greatest hoop stress.

    Parameters
    ----------
    sigma : float or array
        Allowable stress [MPa].
    a : float or array
        Inside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].

    Notes
    -----
    p = σ·(b² − a²)/(b² + a²) with b = a + t.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return sigma * t * (2 * a + t) / (square(a + t) + square(a))


@stress("Lamé", gives="sigma_h", standard=MECHANICS, source=TEXTBOOK, limits=_WITHIN_WALL)
def lame_sphere_hoop_stress(*, p: Num, a: Num, b: Num, x: Num) -> Num:
    """Give the hoop stress in a thick sphere.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].
    x : float or array
        Radius considered [mm].

    Returns
    -------
    float or array
        Hoop stress, tension positive [MPa].

    Notes
    -----
    σ = p·a³/(b³ − a³)·(1 + b³/(2·x³)).

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * a**3 / (b**3 - a**3) * (1 + b**3 / (2 * x**3))


@stress("Lamé", gives="sigma_r", standard=MECHANICS, source=TEXTBOOK, limits=_WITHIN_WALL)
def lame_sphere_radial_stress(*, p: Num, a: Num, b: Num, x: Num) -> Num:
    """Give the radial stress in a thick sphere.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].
    x : float or array
        Radius considered [mm].

    Returns
    -------
    float or array
        Radial stress, tension positive [MPa].

    Notes
    -----
    σ = p·a³/(b³ − a³)·(1 − b³/x³).

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * a**3 / (b**3 - a**3) * (1 - b**3 / x**3)


@stress("Lamé", standard=MECHANICS, source=TEXTBOOK, limits=_A_WALL)
def lame_sphere_bore_stress(*, p: Num, a: Num, b: Num) -> Num:
    """Give the greatest hoop stress of a thick sphere, at the bore.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    a : float or array
        Inside radius [mm].
    b : float or array
        Outside radius [mm].

    Returns
    -------
    float or array
        Hoop stress at the bore [MPa].

    Notes
    -----
    The hoop stress at x = a.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return p * (b**3 + 2 * a**3) / (2 * (b**3 - a**3))


@wall("Lamé", standard=MECHANICS, source=TEXTBOOK, limits=_BOUNDED_2)
def lame_sphere_thickness(*, p: Num, sigma: Num, a: Num) -> Num:
    """Give the wall of a thick sphere from its greatest hoop stress.

    Parameters
    ----------
    p : float or array
        Internal pressure [MPa].
    sigma : float or array
        Allowable stress [MPa].
    a : float or array
        Inside radius [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The bore stress set equal to σ and solved for t = b − a.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return a * (power(2 * (sigma + p) / (2 * sigma - p), 1 / 3) - 1)


@pressure("Lamé", gives="p", standard=MECHANICS, source=TEXTBOOK)
def lame_sphere_pressure(*, sigma: Num, a: Num, t: Num) -> Num:
    """Give the pressure of a thick sphere from its greatest hoop stress.

    Parameters
    ----------
    sigma : float or array
        Allowable stress [MPa].
    a : float or array
        Inside radius [mm].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].

    Notes
    -----
    p = 2·σ·(b³ − a³)/(b³ + 2·a³) with b = a + t.

    References
    ----------
    Any textbook of mechanics of materials.
    """
    return 2 * sigma * ((a + t) ** 3 - a**3) / ((a + t) ** 3 + 2 * a**3)
