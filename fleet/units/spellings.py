"""Every accepted spelling of every unit, each mapped to a pint unit, and the finding of one."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction

from fleet import errors
from fleet.units.factors import exact

INTERNAL: dict[str, str] = {
    "length": "mm",
    "pressure": "MPa",
    "temperature": "°C",
    "rate": "mm/year",
    "angle": "deg",
}
"""The unit in which each quantity is kept [text]."""

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
NUMBER = re.compile(r"[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?", re.ASCII)


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
        return Unit(text.strip(), quantity, *exact(name, quantity))
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
