"""Limits of formulas: conditions in the small language, so that the printed condition is the checked one."""

from __future__ import annotations

import ast
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from fleet.formula.language import FUNCTIONS, Num, Status, comparison, evaluated, names_in
from fleet.formula.writing import Dialect, typographic


@dataclass(frozen=True)
class Limit:
    """A condition under which a formula holds; made by `domain` or `proportion`.

    Parameters
    ----------
    kind : {'domain', 'proportion'}
        Whether the figure is withheld beyond it or stands with a doubt [text].
    text : str
        The condition, in the small language [text].
    then : str
        What takes over beyond a domain limit; the code of the doubt beyond a proportion [text].
    status : str
        How well the limit is known: confirmed, secondary, from memory, ours [text].
    tree : ast.Compare
        The condition as it is worked out [-].
    """

    kind: Literal["domain", "proportion"]
    text: str
    then: str
    status: Status
    tree: ast.Compare

    @property
    def names(self) -> tuple[str, ...]:
        """The quantities it speaks of."""
        return names_in(self.tree)

    @property
    def printed(self) -> str:
        """The condition in print, such as ``t ≤ R / 2``."""
        return Dialect(False, {name: typographic(name) for name in self.names}).expression(self.tree)[0]

    def broken(self, values: Mapping[str, Num]) -> NDArray[np.bool_]:
        """Say where the condition fails; a missing or unknown (NaN) quantity never breaks it.

        Parameters
        ----------
        values : mapping
            A number or array for every quantity it speaks of, and others [-].

        Returns
        -------
        array of bool
        """
        if any(name not in values for name in self.names):
            return np.zeros(1, dtype=np.bool_)
        arrays = {name: np.atleast_1d(np.asarray(values[name], dtype=np.float64)) for name in self.names}
        with np.errstate(all="ignore"):
            holds = np.asarray(evaluated(self.tree, arrays), dtype=np.bool_)
        unknown = np.zeros(1, dtype=np.bool_)
        for each in arrays.values():
            unknown = unknown | np.isnan(each)
        return np.logical_not(np.logical_or(holds, unknown))


def _limit(kind: Literal["domain", "proportion"], text: str, then: str, status: Status) -> Limit:
    node = ast.parse(text, mode="eval").body
    names = {each.id for each in ast.walk(node) if isinstance(each, ast.Name)} - set(FUNCTIONS)
    return Limit(kind, text, then, status, comparison(node, f"limit '{text}'", names, FUNCTIONS))


def domain(text: str, *, instead: str, status: Status = "confirmed") -> Limit:
    """Make a limit beyond which another form takes over or the figure is withheld.

    Parameters
    ----------
    text : str
        The condition, such as ``t <= R / 2`` [text].
    instead : str
        What takes over: a formula's name or what an engineer must do [text].
    status : str
        How well the limit is known [text].

    Returns
    -------
    Limit

    Raises
    ------
    OurFault
        If the text is not one comparison of the small language.

    Examples
    --------
    >>> domain("t <= R / 2", instead="the thick form").printed
    't ≤ R / 2'
    """
    return _limit("domain", text, instead, status)


def proportion(text: str, *, doubt: str, status: Status = "confirmed") -> Limit:
    """Make a limit of new construction, which leaves the figure and adds a doubt.

    Parameters
    ----------
    text : str
        The condition, such as ``r >= 3 * t`` [text].
    doubt : str
        The code of the doubt in `fleet.words` [text].
    status : str
        How well the limit is known [text].

    Returns
    -------
    Limit

    Raises
    ------
    OurFault
        If the text is not one comparison of the small language.
    """
    return _limit("proportion", text, doubt, status)
