"""Ellipsoidal heads, pressure on the concave side, of any axis ratio from 1 to 3."""

from __future__ import annotations

from fleet.formula import Num, domain, square
from fleet.mechanics.sources import figure, pressure, wall

_AXES = (
    domain("q >= 1", instead="nothing: the axes are swapped", status="from memory"),
    domain("q <= 3", instead="a calculation by an engineer", status="from memory"),
)
_NOT_THICK = (
    domain(
        "P <= 0.665 * S * E",
        instead="a calculation by an engineer: the head is as thick as a thick sphere",
        status="ours",
    ),
)


@figure("Appendix 1-4(c)", gives="K", unit="-", limits=_AXES)
def ellipsoidal_factor(*, q: Num) -> Num:
    """Give the factor K of an ellipsoidal head from its axis ratio.

    Parameters
    ----------
    q : float or array
        Axis ratio D/2h as new [-].

    Returns
    -------
    float or array
        Factor K [-].

    Notes
    -----
    K = (2 + (D/2h)²)/6: 1 for a 2:1 head, 0.5 for a hemisphere. D/2h from 1 to 3.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(c); any edition, the form being the same in all that
    were seen reproduced.

    Examples
    --------
    >>> ellipsoidal_factor(q=2.0)
    1.0
    """
    return (2 + square(q)) / 6


@wall("UG-32 and Appendix 1-4(c)", limits=_NOT_THICK)
def ellipsoidal_thickness(*, P: Num, S: Num, E: Num, D: Num, K: Num) -> Num:
    """Give the wall of an ellipsoidal head.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    D : float or array
        Inside diameter, corroded [mm].
    K : float or array
        Factor of the ellipsoidal head [-].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    D is the inside diameter of the skirt. For a 2:1 head K = 1.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32 and Appendix 1-4(c); any edition, the form being the same
    in all that were seen reproduced.
    """
    return P * D * K / (2 * S * E - 0.2 * P)


@pressure("UG-32 and Appendix 1-4(c)", limits=_NOT_THICK)
def ellipsoidal_pressure(*, S: Num, E: Num, D: Num, K: Num, t: Num) -> Num:
    """Give the pressure of an ellipsoidal head.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    D : float or array
        Inside diameter, corroded [mm].
    K : float or array
        Factor of the ellipsoidal head [-].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    D is the inside diameter of the skirt. For a 2:1 head K = 1.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32 and Appendix 1-4(c); any edition, the form being the same
    in all that were seen reproduced.
    """
    return 2 * S * E * t / (K * D + 0.2 * t)


@wall("Appendix 1-4(c)", limits=_NOT_THICK)
def ellipsoidal_thickness_outside(*, P: Num, S: Num, E: Num, Do: Num, K: Num) -> Num:
    """Give the wall of an ellipsoidal head from its outside diameter.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    Do : float or array
        Outside diameter [mm].
    K : float or array
        Factor of the ellipsoidal head [-].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The inside form with D = Do − 2·t, solved for t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(c); any edition, the form being the same in all that
    were seen reproduced.
    """
    return P * Do * K / (2 * S * E + 2 * P * (K - 0.1))


@pressure("Appendix 1-4(c)", limits=_NOT_THICK)
def ellipsoidal_pressure_outside(*, S: Num, E: Num, Do: Num, K: Num, t: Num) -> Num:
    """Give the pressure of an ellipsoidal head from its outside diameter.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    Do : float or array
        Outside diameter [mm].
    K : float or array
        Factor of the ellipsoidal head [-].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The inside form with D = Do − 2·t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(c); any edition, the form being the same in all that
    were seen reproduced.
    """
    return 2 * S * E * t / (K * Do - 2 * t * (K - 0.1))
