"""Figures as they are printed: each converted and rounded once, to its safe side."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass

from fleet import units
from fleet.units import Side

NONE = "–"
"""What is printed for a figure that cannot be had."""


@dataclass(frozen=True)
class Figure:
    """One figure in the unit printed, rounded.

    Parameters
    ----------
    value : float or None
        The rounded figure; None where it cannot be had [-].
    decimals : int
        Decimals printed [count].

    Examples
    --------
    >>> str(Figure(1.5, 3)), str(Figure(None, 3))
    ('1.500', '–')
    """

    value: float | None
    decimals: int

    def __str__(self) -> str:
        return NONE if self.value is None else f"{self.value:.{self.decimals}f}"


_QUANTITY_OF = {"mm/year": "rate", "mm": "length", "MPa": "pressure"}
_FIGURE = re.compile(r"(?<![\w.])(\d+(?:\.\d+)?) (mm/year|mm|MPa)(?![\w/])")


class Figures:
    """Turn inside figures into printed ones: what the wall gives is rounded down, what is asked of it up.

    Parameters
    ----------
    display : units.Display
        Units and decimals of the reader [-].

    Examples
    --------
    >>> figures = Figures(units.SI)
    >>> str(figures.wall(10.129)), str(figures.needed(10.121)), str(figures.carries(1.2349))
    ('10.12', '10.13', '1.234')
    """

    def __init__(self, display: units.Display) -> None:
        self.display = display

    def told(self, text: str) -> str:
        """Put the reader's unit in brackets behind every figure of a finding.

        Parameters
        ----------
        text : str
            What was found, its figures in mm, MPa and mm/year or as somebody wrote them [text].

        Returns
        -------
        str
            The same text; unchanged where the reader's units are those.

        Examples
        --------
        >>> Figures(units.US).told("0.075 mm/year from nominal")
        '0.075 mm/year (3.0 mil/year) from nominal'
        """

        def with_readers_unit(found: re.Match[str]) -> str:
            quantity = _QUANTITY_OF[found.group(2)]
            return f"{found.group(0)} ({self.display.text(quantity, float(found.group(1)))})"

        return text if self.display is units.SI else _FIGURE.sub(with_readers_unit, text)

    def unit(self, quantity: str) -> str:
        """Give the unit of a quantity as it stands in a heading.

        Parameters
        ----------
        quantity : str
            Length, pressure, rate, temperature or years [text].

        Returns
        -------
        str
        """
        return self.display.unit(quantity)

    def with_unit(self, figure: Figure, quantity: str) -> str:
        """Print a figure with its unit behind it.

        Parameters
        ----------
        figure : Figure
            The figure [-].
        quantity : str
            Its quantity [text].

        Returns
        -------
        str
            A dash alone where there is no figure.
        """
        if figure.value is None:
            return str(figure)
        unit = self.unit(quantity)
        return f"{figure} {'year' if unit == 'years' and figure.value == 1 else unit}"

    def as_written(self, written: str, quantity: str) -> str:
        """Give what a person wrote, to stand in brackets beside a figure in another unit.

        Parameters
        ----------
        written : str
            The number with its unit, as written; empty if that is not known [text].
        quantity : str
            Its quantity [text].

        Returns
        -------
        str
            Empty where nothing was written, or the figure beside it bears the same unit.

        Examples
        --------
        >>> Figures(units.SI).as_written("261 psi", "pressure"), Figures(units.US).as_written("261 psig", "pressure")
        ('written 261 psi', '')
        """
        if not written:
            return ""
        known = units.SPELLINGS[quantity]
        wrote, prints = written.rpartition(" ")[2], self.unit(quantity)
        return "" if known.get(wrote, wrote) == known.get(prints, prints) else f"written {written}"

    def wall(self, value: float | None) -> Figure:
        """Print metal that is there: rounded down.

        Parameters
        ----------
        value : float or None
            The thickness [mm].

        Returns
        -------
        Figure
        """
        return self._figure("length", value, "down")

    def needed(self, value: float | None) -> Figure:
        """Print metal that is required, or an error of reading: rounded up.

        Parameters
        ----------
        value : float or None
            The thickness [mm].

        Returns
        -------
        Figure
        """
        return self._figure("length", value, "up")

    def carries(self, value: float | None) -> Figure:
        """Print a pressure that is carried, or a margin: rounded down.

        Parameters
        ----------
        value : float or None
            The pressure [MPa].

        Returns
        -------
        Figure
        """
        return self._figure("pressure", value, "down")

    def asked(self, value: float | None) -> Figure:
        """Print a pressure that is asked of the wall: rounded up.

        Parameters
        ----------
        value : float or None
            The pressure [MPa].

        Returns
        -------
        Figure
        """
        return self._figure("pressure", value, "up")

    def rate(self, value: float | None) -> Figure:
        """Print a rate of loss: rounded up.

        Parameters
        ----------
        value : float or None
            The rate [mm/year].

        Returns
        -------
        Figure
        """
        return self._figure("rate", value, "up")

    def years(self, value: float | None) -> Figure:
        """Print a span of years that is left: rounded down.

        Parameters
        ----------
        value : float or None
            The span [year].

        Returns
        -------
        Figure
        """
        return self._figure("years", value, "down")

    def spent(self, value: float | None) -> Figure:
        """Print a span of years that is past, such as the age of a reading: rounded up.

        Parameters
        ----------
        value : float or None
            The span [year].

        Returns
        -------
        Figure
        """
        return self._figure("years", value, "up")

    def given(self, value: float | None, quantity: str) -> Figure:
        """Print what a person gave: to the nearest.

        Parameters
        ----------
        value : float or None
            The value, in the inside unit of its quantity [-].
        quantity : str
            Its quantity [text].

        Returns
        -------
        Figure
        """
        return self._figure(quantity, value, "nearest")

    def _figure(self, quantity: str, value: float | None, side: Side) -> Figure:
        decimals = self.display.decimals[quantity]
        if value is None or not math.isfinite(value):
            return Figure(None, decimals)
        return Figure(self.display.number(quantity, value, side), decimals)
