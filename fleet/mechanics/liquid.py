"""The pressure of a column of liquid: from the top of the vessel to a part and back."""

from __future__ import annotations

from fleet.formula import Num, maximum
from fleet.mechanics.sources import figure, pressure


@figure("UG-98", gives="gamma", unit="MPa/mm")
def liquid_gradient(*, G: Num) -> Num:
    """Give the pressure that a liquid gains per length of depth.

    Parameters
    ----------
    G : float or array
        Specific gravity of the content [-].

    Returns
    -------
    float or array
        Pressure per depth [MPa/mm].

    Notes
    -----
    Water gains 9.807 kPa for every metre.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-98; any edition, the form being the same in all that were seen
    reproduced.

    Examples
    --------
    >>> round(float(liquid_gradient(G=1.0)) * 1e6, 3)  # kPa per metre
    9.807
    """
    return 9.807e-6 * G


@figure("UG-98", gives="P_head", unit="MPa")
def static_head(*, gamma: Num, z_top: Num, z_low: Num) -> Num:
    """Give the static head at the lowest point of a part.

    Parameters
    ----------
    gamma : float or array
        Pressure gained per length of depth [MPa/mm].
    z_top : float or array
        Elevation of the top of the liquid [mm].
    z_low : float or array
        Elevation of the lowest point of the part [mm].

    Returns
    -------
    float or array
        Static head [MPa].

    Notes
    -----
    The head above the lowest point of the part; never below 0.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-98; any edition, the form being the same in all that were seen
    reproduced.
    """
    return gamma * maximum(z_top - z_low, 0)


@pressure("UG-98")
def part_pressure(*, P_top: Num, P_head: Num) -> Num:
    """Give the pressure at a part from the pressure at the top.

    Parameters
    ----------
    P_top : float or array
        Pressure at the top of the vessel [MPa].
    P_head : float or array
        Static head at the part [MPa].

    Returns
    -------
    float or array
        Pressure at the part [MPa].

    Notes
    -----
    P = P_top + P_head.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-98; any edition, the form being the same in all that were seen
    reproduced.

    Examples
    --------
    >>> part_pressure(P_top=235.0, P_head=43.25)
    278.25
    """
    return P_top + P_head


@figure("UG-98", gives="P_top", unit="MPa")
def top_pressure(*, P_part: Num, P_head: Num) -> Num:
    """Give the pressure at the top of the vessel from the pressure of a part.

    Parameters
    ----------
    P_part : float or array
        Pressure at the part [MPa].
    P_head : float or array
        Static head at the part [MPa].

    Returns
    -------
    float or array
        Pressure at the top [MPa].

    Notes
    -----
    P_top = P_part − P_head; the least over all parts is that of the vessel.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-98; any edition, the form being the same in all that were seen
    reproduced.
    """
    return P_part - P_head
