"""Torispherical heads, pressure on the concave side: crown radius, knuckle radius, factor M."""

from __future__ import annotations

from fleet.formula import Num, domain, proportion, sqrt
from fleet.mechanics.sources import figure, pressure, wall

_RADII = (domain("r <= L", instead="nothing: the knuckle is wider than the crown", status="ours"),)
_HEAD = (
    domain(
        "P <= 0.665 * S * E",
        instead="a calculation by an engineer: the head is as thick as a thick sphere",
        status="ours",
    ),
    proportion("r >= 0.06 * Do", doubt="knuckle proportions"),
    proportion("r >= 3 * t", doubt="knuckle proportions"),
    proportion("L <= Do", doubt="crown proportions", status="from memory"),
    proportion("t >= 0.002 * L", doubt="thin torispherical head", status="from memory"),
)
_HEAD_OUTSIDE = (
    domain(
        "P <= 0.665 * S * E",
        instead="a calculation by an engineer: the head is as thick as a thick sphere",
        status="ours",
    ),
    proportion("r >= 0.06 * Do", doubt="knuckle proportions"),
    proportion("r >= 3 * t", doubt="knuckle proportions"),
    proportion("Lo - t <= Do", doubt="crown proportions", status="from memory"),
    proportion("t >= 0.002 * (Lo - t)", doubt="thin torispherical head", status="from memory"),
)
_SIX_PERCENT = (domain("L <= 50 / 3 * r", instead="torispherical_thickness with its factor"),)


@figure("Appendix 1-4(d)", gives="M", unit="-", limits=_RADII)
def torispherical_factor(*, L: Num, r: Num) -> Num:
    """Give the factor M of a torispherical head from its two radii.

    Parameters
    ----------
    L : float or array
        Inside crown radius, corroded [mm].
    r : float or array
        Inside knuckle radius [mm].

    Returns
    -------
    float or array
        Factor M [-].

    Notes
    -----
    M = (3 + √(L/r))/4: 1.77 for a knuckle of 6 % of the crown radius, 1 for a hemisphere.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(d); any edition, the form being the same in all that
    were seen reproduced.

    Examples
    --------
    >>> round(float(torispherical_factor(L=420.0, r=25.2)), 4)
    1.7706
    """
    return (3 + sqrt(L / r)) / 4


@wall("Appendix 1-4(d)", limits=_HEAD)
def torispherical_thickness(*, P: Num, S: Num, E: Num, L: Num, M: Num) -> Num:
    """Give the wall of a torispherical head.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    L : float or array
        Inside crown radius, corroded [mm].
    M : float or array
        Factor of the torispherical head [-].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    Proportions of new construction leave the figure and add a doubt. A head thinner than 0.002·L may
    fail in the knuckle below this pressure: finite elements bear it out.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(d); any edition, the form being the same in all that
    were seen reproduced.
    """
    return P * L * M / (2 * S * E - 0.2 * P)


@pressure("Appendix 1-4(d)", limits=_HEAD)
def torispherical_pressure(*, S: Num, E: Num, L: Num, M: Num, t: Num) -> Num:
    """Give the pressure of a torispherical head.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    L : float or array
        Inside crown radius, corroded [mm].
    M : float or array
        Factor of the torispherical head [-].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    Proportions of new construction leave the figure and add a doubt. A head thinner than 0.002·L may
    fail in the knuckle below this pressure: finite elements bear it out.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(d); any edition, the form being the same in all that
    were seen reproduced.
    """
    return 2 * S * E * t / (L * M + 0.2 * t)


@wall("Appendix 1-4(d)", limits=_HEAD_OUTSIDE)
def torispherical_thickness_outside(*, P: Num, S: Num, E: Num, Lo: Num, M: Num) -> Num:
    """Give the wall of a torispherical head from its outside crown radius.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    Lo : float or array
        Outside crown radius [mm].
    M : float or array
        Factor of the torispherical head [-].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    The inside form with L = Lo − t at the same M, solved for t.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(d); any edition, the form being the same in all that
    were seen reproduced.
    """
    return P * Lo * M / (2 * S * E + P * (M - 0.2))


@pressure("Appendix 1-4(d)", limits=_HEAD_OUTSIDE)
def torispherical_pressure_outside(*, S: Num, E: Num, Lo: Num, M: Num, t: Num) -> Num:
    """Give the pressure of a torispherical head from its outside crown radius.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    Lo : float or array
        Outside crown radius [mm].
    M : float or array
        Factor of the torispherical head [-].
    t : float or array
        Wall [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    The inside form with L = Lo − t at the same M.

    References
    ----------
    ASME BPVC Section VIII Division 1, Appendix 1-4(d); any edition, the form being the same in all that
    were seen reproduced.
    """
    return 2 * S * E * t / (M * Lo - t * (M - 0.2))


@wall("UG-32, torispherical heads", limits=_SIX_PERCENT)
def six_percent_torispherical_thickness(*, P: Num, S: Num, E: Num, L: Num) -> Num:
    """Give the wall of a torispherical head with a 6 % knuckle.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
    L : float or array
        Inside crown radius, corroded [mm].

    Returns
    -------
    float or array
        Wall [mm].

    Notes
    -----
    Exact for L/r = 16 2/3, where M = 1.771; safe for a wider knuckle, not allowed for a tighter one.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, torispherical heads; any edition, the form being the same
    in all that were seen reproduced.

    Examples
    --------
    >>> round(float(six_percent_torispherical_thickness(P=235.0, S=20000.0, E=1.0, L=72.0)), 4)
    0.7496
    """
    return 0.885 * P * L / (S * E - 0.1 * P)


@pressure("UG-32, torispherical heads", limits=_SIX_PERCENT)
def six_percent_torispherical_pressure(*, S: Num, E: Num, L: Num, t: Num) -> Num:
    """Give the pressure of a torispherical head with a 6 % knuckle.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Efficiency of the seams within the head [-].
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
    Exact for L/r = 16 2/3, where M = 1.771; safe for a wider knuckle, not allowed for a tighter one.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-32, torispherical heads; any edition, the form being the same
    in all that were seen reproduced.
    """
    return S * E * t / (0.885 * L + 0.1 * t)
