"""Units at the rim: text to mm, MPa, °C, mm/year and degrees, and back; rounding to the safe side.

This is the only module that knows pint. Each accepted spelling is mapped to a pint unit, and pint, run on
exact fractions, gives the exact factor; so 0.5 in is 12.7 mm and not a digit beside it. Pressures are gauge
pressures throughout. Units that need no conversion never import pint.
"""

from __future__ import annotations

import functools
import math
import re
import unicodedata
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from fractions import Fraction
from typing import Any, Literal, TypeVar

import numpy as np
from numpy.typing import NDArray

from fleet import errors
from fleet.rounding import round_down, round_up

Side = Literal["up", "down", "nearest"]
__all__ = [
    "INTERNAL", "SI", "SPELLINGS", "US", "Display", "Given", "Unit", "UnitFault", "as_written", "display",
    "find_unit", "from_internal", "parse_number", "parse_quantity", "parse_unit", "round_down", "round_up",
    "to_internal",
]  # fmt: skip
Num = TypeVar("Num", float, NDArray[np.float64])

INTERNAL: dict[str, str] = {
    "length": "mm",
    "pressure": "MPa",
    "temperature": "°C",
    "rate": "mm/year",
    "angle": "deg",
}
"""The unit in which each quantity is kept [text]."""

_PINT_INTERNAL = {
    "length": "millimeter",
    "pressure": "megapascal",
    "temperature": "degree_Celsius",
    "rate": "millimeter / year",
    "angle": "degree",
}

_MM, _CM, _UM, _IN, _THOU = "millimeter", "centimeter", "micrometer", "inch", "thou"
_BAR, _PSI, _N_MM2, _KGF_CM2 = "bar", "psi", "newton / millimeter ** 2", "force_kilogram / centimeter ** 2"
_DEG_C, _DEG_F = "degree_Celsius", "degree_Fahrenheit"

SPELLINGS: dict[str, dict[str, str]] = {
    "length": {
        "mm": _MM, "cm": _CM, "m": "meter", "µm": _UM, "um": _UM,
        "in": _IN, "inch": _IN, '"': _IN,
        "thou": _THOU, "mil": _THOU, "mils": _THOU,  # pint's own 'mil' is an angle
    },
    "pressure": {
        "MPa": "megapascal", "kPa": "kilopascal", "bar": _BAR, "barg": _BAR, "bar(g)": _BAR,
        "psi": _PSI, "psig": _PSI, "ksi": "ksi",
        "N/mm2": _N_MM2, "N/mm²": _N_MM2, "kgf/cm2": _KGF_CM2, "kg/cm2": _KGF_CM2,
    },
    "temperature": {
        "degC": _DEG_C, "°C": _DEG_C, "C": _DEG_C, "degF": _DEG_F, "°F": _DEG_F, "F": _DEG_F, "K": "kelvin",
    },
    "rate": {
        "mm/year": "millimeter / year", "mm/yr": "millimeter / year", "mm/a": "millimeter / year",
        "in/year": "inch / year", "in/yr": "inch / year",
        "thou/year": "thou / year", "mil/year": "thou / year", "mpy": "thou / year",
    },
    "angle": {"deg": "degree", "°": "degree"},
}  # fmt: skip
"""Every accepted spelling of every quantity, mapped to a pint unit."""

_ATMOSPHERE = {"psi": "14.696 psi", "bar": "1.01325 bar", "kpa": "101.325 kPa", "mpa": "0.101325 MPa"}
_ABSOLUTE = re.compile(r"(psi|bar|kpa|mpa)[ _-]?(?:a|\(a\)|\(abs\)|abs\.?)", re.IGNORECASE)
_NUMBER = re.compile(r"[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?", re.ASCII)


@dataclass(frozen=True)
class Unit:
    """One accepted unit: internal value = (value as written + shift) · factor, exactly.

    Parameters
    ----------
    spelling : str
        As it was written [text].
    quantity : str
        Length, pressure, temperature, rate or angle [text].
    factor : Fraction
        Internal units in one of this unit [-].
    shift : Fraction
        What is added before the factor; nonzero for temperatures only [-].
    """

    spelling: str
    quantity: str
    factor: Fraction
    shift: Fraction = Fraction(0)

    @property
    def is_internal(self) -> bool:
        """Whether a value in this unit needs no conversion."""
        return self.factor == 1 and self.shift == 0


@dataclass(frozen=True)
class UnitFault:
    """Why a unit was not accepted.

    Parameters
    ----------
    code : {'missing unit', 'unknown unit', 'absolute pressure'}
        The code of the catalogue [text].
    found : str
        What was found [text].
    remedy : str
        What to do [text].
    """

    code: str
    found: str
    remedy: str


@dataclass(frozen=True)
class Given:
    """A value that a person gave, kept beside the value as understood.

    Parameters
    ----------
    value : float
        In the internal unit of its quantity: mm, MPa, °C, mm/year, degrees [-].
    written : str
        As written, with its unit [text].
    unit : Unit
        The unit it was written in [-].
    """

    value: float
    written: str
    unit: Unit


@functools.cache
def _registry() -> Any:
    import pint

    return pint.UnitRegistry(non_int_type=Fraction)


@functools.cache
def _exact(pint_name: str, quantity: str) -> tuple[Fraction, Fraction]:
    """Factor and shift of a pint unit, by converting 0 and 1 of it in exact fractions."""
    internal = _PINT_INTERNAL[quantity]
    if pint_name == internal:
        return Fraction(1), Fraction(0)
    registry = _registry()
    zero, one = (Fraction(registry.Quantity(Fraction(n), pint_name).to(internal).magnitude) for n in (0, 1))
    return one - zero, zero / (one - zero)


def _same_letters(text: str) -> str:
    """Make the two micro signs, and 2 and ², the same."""
    return unicodedata.normalize("NFKC", text.strip())


_BY_LETTERS: dict[str, dict[str, str]] = {
    quantity: {_same_letters(spelling): name for spelling, name in spellings.items()}
    for quantity, spellings in SPELLINGS.items()
}


def find_unit(text: str, quantity: str) -> Unit | UnitFault:
    """Find the unit that a spelling stands for, or say why there is none.

    Parameters
    ----------
    text : str
        The spelling [text].
    quantity : str
        Length, pressure, temperature, rate or angle [text].

    Returns
    -------
    Unit or UnitFault
        The unit, or the fault with the nearest accepted spelling [-].

    Examples
    --------
    >>> find_unit("thou", "length").factor
    Fraction(127, 5000)
    >>> find_unit("psia", "pressure").code
    'absolute pressure'
    >>> find_unit("PSI", "pressure").remedy
    "use 'psi'; accepted: MPa, kPa, bar, barg, bar(g), psi, psig, ksi, N/mm2, N/mm², kgf/cm2, kg/cm2"
    """
    letters = _same_letters(text)
    accepted = SPELLINGS[quantity]
    listed = ", ".join(accepted)
    if not letters:
        return UnitFault("missing unit", "no unit", f"write one of: {listed}")
    name = _BY_LETTERS[quantity].get(letters)
    if name is not None:
        return Unit(text.strip(), quantity, *_exact(name, quantity))
    absolute = _ABSOLUTE.fullmatch(letters)
    if quantity == "pressure" and absolute:
        base = absolute.group(1).lower()
        gauge = {"psi": "psig", "bar": "barg", "kpa": "kPa", "mpa": "MPa"}[base]
        return UnitFault(
            "absolute pressure",
            f"'{text.strip()}'",
            f"subtract the atmosphere ({_ATMOSPHERE[base]}) from every value and write {gauge}",
        )
    near = _nearest_spelling(letters, accepted)
    return UnitFault(
        "unknown unit",
        f"'{text.strip()}' is not a unit of {quantity}",
        (f"use '{near}'; " if near else "") + f"accepted: {listed}",
    )


def _nearest_spelling(letters: str, accepted: Mapping[str, str]) -> str | None:
    import difflib

    folded: dict[str, str] = {}
    for spelling in accepted:
        folded.setdefault(spelling.casefold(), spelling)
    near = difflib.get_close_matches(letters.casefold().replace(" ", ""), list(folded), n=1, cutoff=0.5)
    return folded[near[0]] if near else None


def parse_unit(text: str, quantity: str) -> Unit:
    """Find the unit that a spelling stands for.

    Parameters
    ----------
    text : str
        The spelling [text].
    quantity : str
        Length, pressure, temperature, rate or angle [text].

    Returns
    -------
    Unit
        The unit [-].

    Raises
    ------
    UsageProblem
        Where the spelling is not accepted; the remedy names the nearest.

    Examples
    --------
    >>> parse_unit("in", "length").factor
    Fraction(127, 5)
    """
    found = find_unit(text, quantity)
    if isinstance(found, UnitFault):
        raise errors.UsageProblem("unit", f"{found.code}: {found.found}", found.remedy)
    return found


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
    if _NUMBER.fullmatch(stripped) is None:
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
    number = _NUMBER.match(stripped)
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


# -----------------------------------------------------------------------------------------------------------
# What people see
# -----------------------------------------------------------------------------------------------------------
@dataclass(frozen=True)
class Display:
    """The units and decimals that people see.

    Parameters
    ----------
    name : {'si', 'us'}
        The system [text].
    spellings : dict
        Quantity to the spelling of its unit; `years` stands for spans of time [text].
    decimals : dict
        Quantity to decimals printed [count].
    """

    name: str
    spellings: Mapping[str, str]
    decimals: Mapping[str, int]

    def unit(self, quantity: str) -> str:
        """Give the spelling of the unit of a quantity.

        Parameters
        ----------
        quantity : str
            The quantity [text].

        Returns
        -------
        str
            The spelling, as printed [text].
        """
        return self.spellings[quantity]

    def value(self, quantity: str, internal: float) -> float:
        """Convert an internal value to the unit printed, unrounded.

        Parameters
        ----------
        quantity : str
            The quantity [text].
        internal : float
            The value, in the internal unit [-].

        Returns
        -------
        float
            The value in the unit printed [-].
        """
        if quantity == "years":
            return float(internal)
        return from_internal(float(internal), parse_unit(self.spellings[quantity], quantity))

    def number(
        self, quantity: str, internal: float, side: Side = "nearest", decimals: int | None = None
    ) -> float:
        """Convert and round an internal value as it is printed.

        Parameters
        ----------
        quantity : str
            The quantity [text].
        internal : float
            The value, in the internal unit [-].
        side : {'up', 'down', 'nearest'}
            The safe side of this figure; `nearest` for what a person gave [text].
        decimals : int, optional
            Decimals, where the usual number does not serve [count].

        Returns
        -------
        float
            The rounded value in the unit printed [-].
        """
        places = self.decimals[quantity] if decimals is None else decimals
        value = self.value(quantity, internal)
        if side == "up":
            return round_up(value, places)
        if side == "down":
            return round_down(value, places)
        return float(round(value, places)) + 0.0 if math.isfinite(value) else value

    def text(
        self,
        quantity: str,
        internal: float | None,
        side: Side = "nearest",
        decimals: int | None = None,
        *,
        with_unit: bool = True,
    ) -> str:
        """Print an internal value.

        Parameters
        ----------
        quantity : str
            The quantity [text].
        internal : float or None
            The value, in the internal unit; None or NaN prints as a dash [-].
        side : {'up', 'down', 'nearest'}
            The safe side of this figure [text].
        decimals : int, optional
            Decimals, where the usual number does not serve [count].
        with_unit : bool
            Whether the unit is printed behind the number [-].

        Returns
        -------
        str
            The number as printed [text].

        Examples
        --------
        >>> US.text("pressure", 500 * 0.006894757293168361, "down")
        '500 psi'
        >>> SI.text("length", 9.9999, "down")
        '9.99 mm'
        >>> SI.text("length", None)
        '–'
        """
        if internal is None or math.isnan(internal):
            return "–"
        places = self.decimals[quantity] if decimals is None else decimals
        number = f"{self.number(quantity, internal, side, decimals):.{max(places, 0)}f}"
        return f"{number} {self.spellings[quantity]}" if with_unit else number


SI = Display(
    "si",
    {
        "length": "mm",
        "pressure": "MPa",
        "temperature": "°C",
        "rate": "mm/year",
        "angle": "°",
        "years": "years",
    },
    {"length": 2, "pressure": 3, "temperature": 0, "rate": 3, "angle": 1, "years": 1},
)
"""mm, MPa, °C, mm/year."""

US = Display(
    "us",
    {
        "length": "in",
        "pressure": "psi",
        "temperature": "°F",
        "rate": "mil/year",
        "angle": "°",
        "years": "years",
    },
    {"length": 3, "pressure": 0, "temperature": 0, "rate": 1, "angle": 1, "years": 1},
)
"""in, psi, °F, mil/year."""


def display(name: str) -> Display:
    """Find what ``--units`` names.

    Parameters
    ----------
    name : str
        `si` or `us` [text].

    Returns
    -------
    Display
        The units and decimals [-].

    Raises
    ------
    UsageProblem
        Where the name is neither.

    Examples
    --------
    >>> display("us").unit("rate")
    'mil/year'
    """
    for known in (SI, US):
        if known.name == name:
            return known
    raise errors.UsageProblem("--units", f"'{name}'", "use si or us")
