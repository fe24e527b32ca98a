"""What people see: each quantity in the units of a display, rounded once to the safe side."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

from fleet import errors
from fleet.rounding import round_down, round_up
from fleet.units.converting import from_internal
from fleet.units.spellings import parse_unit

Side = Literal["up", "down", "nearest"]


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
