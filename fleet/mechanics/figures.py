"""Figures with the formula that gave each, row by row, and the rules by which one is chosen over another."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fleet.formula import REGISTER, Floats, Formula, Num
from fleet.mechanics import (  # noqa: F401  # importing the families enters them in the register
    cone,
    cover,
    cylinder,
    ellipsoidal,
    membrane_cylinder,
    membrane_sphere,
    sphere,
    thick_axial,
    thick_cylinder,
    thick_sphere,
    torispherical,
)

Texts = NDArray[np.str_]
Codes = NDArray[np.int8]
Rows = NDArray[np.bool_]

NAME = f"U{max(len(name) for name in REGISTER)}"
"""The text type that holds the longest name of the register."""

UNUSABLE = 1
"""Code of a figure withheld because a number it needs cannot be true."""


def _reasons() -> dict[tuple[str, str], int]:
    """Give every domain limit of the register a number, in the order of the register."""
    limits = [each for known in REGISTER.values() for each in known.limits if each.kind == "domain"]
    keys = dict.fromkeys((each.text, each.then) for each in limits)
    return {key: number for number, key in enumerate(keys, start=UNUSABLE + 1)}


_REASON = _reasons()
_TEXT = {UNUSABLE: "a number it needs cannot be true"} | {
    _REASON[limit.text, limit.then]: f"{limit.printed} does not hold; beyond it: {limit.then}"
    for known in REGISTER.values()
    for limit in known.limits
    if limit.kind == "domain"
}


def withheld_because(code: int) -> str:
    """Say in words why a figure was withheld.

    Parameters
    ----------
    code : int
        The row's code in `Rated.domain`, above 0 [-].

    Returns
    -------
    str
        The limit that does not hold and what is to be done beyond it.

    Raises
    ------
    KeyError
        If no figure is withheld under that code.

    Examples
    --------
    >>> withheld_because(1)
    'a number it needs cannot be true'
    """
    return _TEXT[code]


@dataclass(frozen=True)
class Figures:
    """One figure a row.

    Parameters
    ----------
    value : array of float
        The figure; NaN where it cannot be had [-].
    formula : array of str
        The formula that gave it, '' where none did [text].
    withheld : array of int8
        0, or why it was withheld: `withheld_because` [-].
    """

    value: Floats
    formula: Texts
    withheld: Codes


def given(formula: Formula, value: Floats, withheld: Codes | None = None) -> Figures:
    """Put the formula's name beside its values; a withheld or unknown figure has none.

    Parameters
    ----------
    formula : Formula
        The formula that gave the values [-].
    value : array of float
        Its values [-].
    withheld : array of int8, optional
        Codes of the rows to withhold [-].

    Returns
    -------
    Figures
    """
    codes = np.zeros(value.shape, dtype=np.int8) if withheld is None else withheld
    shown = np.where(codes == 0, value, np.nan)
    return Figures(shown, np.where(np.isnan(shown), "", formula.name).astype(NAME), codes)


def worked(formula: Formula, checking: int | None = None, /, **values: Num) -> Figures:
    """Work a formula out and withhold what lies outside its domain limits.

    Parameters
    ----------
    formula : Formula
        The formula [-].
    checking : int, optional
        How many of its limits to check, from the first; all where not said [count].
    **values : float or array
        Its arguments [-].

    Returns
    -------
    Figures
    """
    result = formula.array(**values)
    codes = np.zeros(result.shape, dtype=np.int8)
    for limit in reversed(formula.limits[:checking]):
        if limit.kind == "domain":
            broken = np.broadcast_to(limit.broken({**values, formula.gives: result}), result.shape)
            codes[broken] = _REASON[limit.text, limit.then]
    return given(formula, result, codes)


def chosen(rows: Rows, first: Figures, second: Figures) -> Figures:
    """Take the first where `rows` says so, else the second.

    Parameters
    ----------
    rows : array of bool
        Where the first is taken [-].
    first, second : Figures
        The two to choose from [-].

    Returns
    -------
    Figures
    """
    return Figures(
        np.where(rows, first.value, second.value),
        np.where(rows, first.formula, second.formula),
        np.where(rows, first.withheld, second.withheld),
    )


def masked(figures: Figures, rows: Rows) -> Figures:
    """Withhold the figure of rows with a dimension that cannot be true.

    Parameters
    ----------
    figures : Figures
        The figures [-].
    rows : array of bool
        The rows to withhold [-].

    Returns
    -------
    Figures
    """
    return Figures(
        np.where(rows, np.nan, figures.value),
        np.where(rows, "", figures.formula),
        np.where(rows, np.int8(UNUSABLE), figures.withheld),
    )


def lesser(first: Figures, second: Figures) -> Figures:
    """Take the lesser figure; one that cannot be had counts as the least.

    Parameters
    ----------
    first, second : Figures
        The two to choose from [-].

    Returns
    -------
    Figures
    """
    return chosen(np.isnan(first.value) | (first.value <= second.value), first, second)


def greater(first: Figures, second: Figures) -> Figures:
    """Take the greater figure; one that cannot be had counts as the greatest.

    Parameters
    ----------
    first, second : Figures
        The two to choose from [-].

    Returns
    -------
    Figures
    """
    return chosen(np.isnan(first.value) | (first.value >= second.value), first, second)
