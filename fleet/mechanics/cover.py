"""Flat unstayed circular covers without the moment of bolts."""

from __future__ import annotations

from fleet.formula import Num, domain, sqrt, square
from fleet.mechanics.sources import pressure, wall

_FACTOR = (domain("C >= 0.1", instead="the factor of the attachment from Fig. UG-34", status="from memory"),)


@wall("UG-34(c)", limits=_FACTOR)
def flat_cover_thickness(*, P: Num, S: Num, E: Num, C: Num, d: Num) -> Num:
    """Give the thickness of a flat unstayed circular cover.

    Parameters
    ----------
    P : float or array
        Pressure at the point considered, static head included [MPa].
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Joint efficiency of the cover [-].
    C : float or array
        Factor of the attachment [-].
    d : float or array
        Diameter of the cover as the clause measures it [mm].

    Returns
    -------
    float or array
        Thickness [mm].

    Notes
    -----
    Without bolts. A bolted cover also carries the moment of its bolts about the gasket, which is not in
    this form.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-34(c); any edition, the form being the same in all that were
    seen reproduced.
    """
    return d * sqrt(C * P / (S * E))


@pressure("UG-34(c)", limits=_FACTOR)
def flat_cover_pressure(*, S: Num, E: Num, C: Num, d: Num, t: Num) -> Num:
    """Give the pressure of a flat unstayed circular cover.

    Parameters
    ----------
    S : float or array
        Allowable stress at the design temperature [MPa].
    E : float or array
        Joint efficiency of the cover [-].
    C : float or array
        Factor of the attachment [-].
    d : float or array
        Diameter of the cover as the clause measures it [mm].
    t : float or array
        Thickness of the cover [mm].

    Returns
    -------
    float or array
        Pressure at the point considered [MPa].

    Notes
    -----
    Without bolts. A bolted cover also carries the moment of its bolts about the gasket, which is not in
    this form.

    References
    ----------
    ASME BPVC Section VIII Division 1, UG-34(c); any edition, the form being the same in all that were
    seen reproduced.
    """
    return S * E * square(t) / (C * square(d))
