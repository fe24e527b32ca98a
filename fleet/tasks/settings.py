"""The settings in force: which keys there are, and which value is the nearest at each place."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from fleet.appraisal.inputs import Floats
from fleet.errors import Refused
from fleet.store import models
from fleet.tasks.reader import Reader

KEYS: dict[str, tuple[str, bool]] = {
    "reading_error_mm": ("error of one reading, one standard deviation [mm]", False),
    "rate_floor_mm_per_year": ("least planning rate [mm/year]", True),
    "observation_window_days": ("days within which readings make one observation [day]", False),
    "list_life_years": ("how long a yearly list must hold [year]", False),
}
"""Every setting: what it is, and whether it may be zero."""

OF_THE_DATABASE_ONLY = frozenset({"list_life_years"})
"""Settings that stand for the whole list, never for one vessel."""


def checked_value(key: str, value: float) -> float:
    """Check that a setting may take a value.

    Parameters
    ----------
    key : str
        Name of the setting [text].
    value : float
        The value, in the unit that the key names [-].

    Returns
    -------
    float

    Raises
    ------
    Refused
        If the key is unknown or the value is not a number above zero (or zero, where zero may be chosen).

    Examples
    --------
    >>> checked_value("rate_floor_mm_per_year", 0.0)
    0.0
    """
    if key not in KEYS:
        raise Refused(
            f"setting {key!r}", "no setting of that name is known", f"use one of: {', '.join(KEYS)}"
        )
    meaning, may_be_zero = KEYS[key]
    if not math.isfinite(value) or not (value > 0 or (may_be_zero and value == 0)):
        least = "zero or above" if may_be_zero else "above zero"
        raise Refused(f"setting {key!r}", f"{value!r} cannot be its value", f"give {meaning}, {least}")
    return value


@dataclass(frozen=True)
class Levels:
    """The settings in force on a day, by key and by the entity they were set for (None: the database)."""

    values: dict[tuple[str, int | None], float]

    def of_database(self, key: str, default: float) -> float:
        """Give the value that stands for the whole database.

        Parameters
        ----------
        key : str
            Name of the setting [text].
        default : float
            What stands where nothing was set [-].

        Returns
        -------
        float

        Examples
        --------
        >>> Levels({("list_life_years", None): 2.0}).of_database("list_life_years", 1.0)
        2.0
        """
        return self.values.get((key, None), default)

    def given(self, key: str, entities: Sequence[int]) -> Floats:
        """Give the value set for each entity itself, NaN where none was.

        Parameters
        ----------
        key : str
            Name of the setting [text].
        entities : sequence of int
            Entities of the store [count].

        Returns
        -------
        Floats
        """
        if not any(named == key for named, _ in self.values):
            return np.full(len(entities), np.nan)
        return np.array([self.values.get((key, entity), np.nan) for entity in entities], dtype=np.float64)

    def nearest(self, key: str, chain: Sequence[Sequence[int]], default: float) -> Floats:
        """Give the nearest value at each place.

        Parameters
        ----------
        key : str
            Name of the setting [text].
        chain : sequence of sequence of int
            The entities of every place, one sequence per level, nearest first [count].
        default : float
            What stands where nothing was set, not even for the database [-].

        Returns
        -------
        Floats

        Examples
        --------
        >>> levels = Levels({("reading_error_mm", 7): 0.1, ("reading_error_mm", None): 0.3})
        >>> levels.nearest("reading_error_mm", [[5, 6], [7, 8]], 0.25).tolist()
        [0.1, 0.3]
        """
        found = np.full(len(chain[0]), self.of_database(key, default))
        for entities in reversed(chain):
            own = self.given(key, entities)
            found = np.where(np.isnan(own), found, own)
        return found


def in_force(record: Reader) -> Levels:
    """Fetch the settings in force.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].

    Returns
    -------
    Levels
    """
    columns = record.rows(models.Setting)
    order = sorted(
        (row for row, day in enumerate(columns["from_on"]) if day <= record.as_of),
        key=lambda row: (columns["from_on"][row], columns["entry_no"][row], columns["id"][row]),
    )
    return Levels(
        {(columns["key"][row], columns["subject_id"][row]): float(columns["value"][row]) for row in order}
    )
