"""Numbers in and out, by exact fractions: 0.5 in is 12.7 mm and not a digit beside it."""

from __future__ import annotations

import math
from collections.abc import Callable
from fractions import Fraction
from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from fleet import errors
from fleet.units.spellings import INTERNAL, NUMBER, Given, Unit, UnitFault, find_unit

Num = TypeVar("Num", float, NDArray[np.float64])


def as_written(value: float) -> Fraction:
    """Give the exact decimal that a number prints as.

    Parameters
    ----------
    value : float
        The number [-].

    Returns
    -------
    Fraction
        The shortest decimal that reads back as this number; the value a person meant [-].

    Examples
    --------
    >>> as_written(0.1)
    Fraction(1, 10)
    """
    return Fraction(repr(float(value)))


def to_internal(value: Num, unit: Unit) -> Num:
    """Convert from the unit written to the unit kept, each value rounded once from the exact result.

    Parameters
    ----------
    value : float or ndarray
        In `unit`; NaN stays NaN [-].
    unit : Unit
        The unit written [-].

    Returns
    -------
    float or ndarray
        In the internal unit of the quantity [-].

    Examples
    --------
    >>> from fleet.units import parse_unit
    >>> to_internal(0.7, parse_unit("in", "length"))
    17.78
    >>> to_internal(70.0, parse_unit("degF", "temperature"))
    21.11111111111111
    """
    return _convert(value, unit, _inward)


def from_internal(value: Num, unit: Unit) -> Num:
    """Convert from the unit kept to a unit to print, each value rounded once from the exact result.

    Parameters
    ----------
    value : float or ndarray
        In the internal unit of the quantity; NaN stays NaN [-].
    unit : Unit
        The unit to print [-].

    Returns
    -------
    float or ndarray
        In `unit` [-].

    Examples
    --------
    >>> from fleet.units import parse_unit
    >>> from_internal(12.7, parse_unit("in", "length"))
    0.5
    """
    return _convert(value, unit, _outward)


def _inward(value: float, unit: Unit) -> float:
    return _to_float((as_written(value) + unit.shift) * unit.factor)


def _outward(value: float, unit: Unit) -> float:
    return _to_float(as_written(value) / unit.factor - unit.shift)


def _to_float(value: Fraction) -> float:
    try:
        return float(value)
    except OverflowError:
        return math.inf if value > 0 else -math.inf


def _convert(value: Num, unit: Unit, one: Callable[[float, Unit], float]) -> Num:
    if not isinstance(value, np.ndarray):
        return float(value) if unit.is_internal or not math.isfinite(value) else float(one(value, unit))
    if unit.is_internal:
        return value.astype(np.float64)
    different, places = np.unique(value, return_inverse=True)  # few: readings repeat
    converted = [one(v, unit) if math.isfinite(v) else v for v in different.tolist()]
    return np.array(converted, dtype=np.float64)[places].reshape(value.shape)


def parse_number(text: str) -> float | None:
    """Read a plain number: digits, one decimal point, an optional sign and power of ten.

    Parameters
    ----------
    text : str
        The text; white space around it does not matter [text].

    Returns
    -------
    float or None
        The number; None where it is not one, or is too large to be kept [-].

    Examples
    --------
    >>> parse_number(" 12.70 ")
    12.7
    >>> [parse_number(word) for word in ("12,7", "nan", "1.2.3", "1e999")]
    [None, None, None, None]
    """
    stripped = text.strip()
    if NUMBER.fullmatch(stripped) is None:
        return None
    value = float(stripped)
    return value if math.isfinite(value) else None


def parse_quantity(text: str, quantity: str) -> Given:
    """Read a number with its unit, such as ``0.2 mm/year``.

    Parameters
    ----------
    text : str
        The number and its unit [text].
    quantity : str
        Length, pressure, temperature, rate or angle [text].

    Returns
    -------
    Given
        The value kept, and the value as written [-].

    Raises
    ------
    UsageProblem
        Where there is no number, no unit, or a unit that is not accepted.

    Examples
    --------
    >>> parse_quantity("0.500 in", "length").value
    12.7
    >>> parse_quantity("250psi", "pressure").written
    '250psi'
    """
    stripped = text.strip()
    number = NUMBER.match(stripped)
    if number is None or parse_number(number.group()) is None:
        raise errors.UsageProblem(
            f"'{text}'",
            "no number at the start",
            f"write a number and its unit, for instance '{_example(quantity)}'",
        )
    rest = stripped[number.end() :].strip()
    if rest[:1] in {",", "."}:
        raise errors.UsageProblem(
            f"'{text}'", "the number is not plain", "use a decimal point and no separators"
        )
    unit = find_unit(rest, quantity)
    if isinstance(unit, UnitFault):
        raise errors.UsageProblem(f"'{text}'", f"{unit.code}: {unit.found}", unit.remedy)
    value = to_internal(float(number.group()), unit)
    if not math.isfinite(value):
        raise errors.UsageProblem(f"'{text}'", "the number is too large to be kept", "check the number")
    return Given(value, stripped, unit)


def _example(quantity: str) -> str:
    number = {"length": "12.7", "pressure": "1.5", "temperature": "40", "rate": "0.2", "angle": "30"}[
        quantity
    ]
    return f"{number} {INTERNAL[quantity]}"
