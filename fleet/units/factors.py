"""Exact factors of units: the only module that knows pint, imported at the first conversion."""

from __future__ import annotations

import functools
from fractions import Fraction
from typing import Any

_PINT_INTERNAL = {
    "length": "millimeter",
    "pressure": "megapascal",
    "temperature": "degree_Celsius",
    "rate": "millimeter / year",
    "angle": "degree",
}


@functools.cache
def _registry() -> Any:
    import pint

    return pint.UnitRegistry(non_int_type=Fraction)


@functools.cache
def exact(pint_name: str, quantity: str) -> tuple[Fraction, Fraction]:
    """Give factor and shift of a pint unit, by converting 0 and 1 of it in exact fractions.

    Parameters
    ----------
    pint_name : str
        The unit as pint names it [text].
    quantity : str
        What it measures: length, pressure, temperature, rate, angle [text].

    Returns
    -------
    tuple of Fraction
        Internal value = factor · (value + shift).
    """
    internal = _PINT_INTERNAL[quantity]
    if pint_name == internal:
        return Fraction(1), Fraction(0)
    registry = _registry()
    zero, one = (Fraction(registry.Quantity(Fraction(n), pint_name).to(internal).magnitude) for n in (0, 1))
    return one - zero, zero / (one - zero)
