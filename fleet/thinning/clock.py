"""Days that count: the service clock of every vessel.

Recorded days in the state `idle protected` are left out of every count of years, and dates move by them. Days after
the as-of date all count. A vessel's *service day* is its calendar day less the idle days before it; on a vessel
without idle days the two are the same.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike, NDArray

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]

DAYS_PER_YEAR = 365.25
"""Days in a year, for every span and every date. Status: ours."""
_LAST_DAY = 3652059.0  # 9999-12-31: no date lies beyond what a calendar can write
_STRIDE = 1.0e7  # wider than any day number, so that the vessels' spans follow one another on one axis


def whole_days(years: ArrayLike) -> Floats:
    """Turn years into whole days, rounded down.

    Parameters
    ----------
    years : array_like
        Spans, NaN where unknown; shape (n,) [year].

    Returns
    -------
    ndarray
        Whole days; shape (n,) [day].

    Examples
    --------
    >>> whole_days([1.0, 2.0, 4.0]).tolist()
    [365.0, 730.0, 1461.0]
    """
    return np.asarray(np.floor(np.asarray(years, dtype=np.float64) * DAYS_PER_YEAR))


@dataclass(frozen=True)
class ServiceClock:
    """Turn calendar days into service days and back, vessel by vessel.

    Parameters
    ----------
    start, stop : ndarray
        Merged idle spans on one axis, `vessel * 1e7 + day`; shape (m,) [day].
    idle_before : ndarray
        Idle days of the same vessel before each span; shape (m,) [day].
    """

    start: Floats
    stop: Floats
    idle_before: Floats

    @classmethod
    def of(cls, vessel: Ints, from_day: Floats, to_day: Floats, as_of_day: float) -> ServiceClock:
        """Build the clock from idle spans.

        Parameters
        ----------
        vessel : ndarray
            Index of the vessel of each span; shape (k,) [-].
        from_day, to_day : ndarray
            First idle day and first day that counts again, NaN for still idle; shape (k,) [day].
        as_of_day : float
            The as-of date: no later day is left out [day].

        Returns
        -------
        ServiceClock
        """
        stop = np.minimum(np.where(np.isnan(to_day), as_of_day, to_day), as_of_day)
        keep = stop > from_day
        vessels, starts, stops = vessel[keep], from_day[keep], stop[keep]
        order = np.lexsort((starts, vessels))
        merged: list[list[float]] = []
        for owner, begin, end in zip(
            vessels[order].tolist(), starts[order].tolist(), stops[order].tolist(), strict=True
        ):
            if merged and merged[-1][0] == owner and begin <= merged[-1][2]:
                merged[-1][2] = max(merged[-1][2], end)
            else:
                merged.append([owner, begin, end])
        spans = np.array(merged, dtype=np.float64).reshape(-1, 3)
        lengths = spans[:, 2] - spans[:, 1]
        total_before = np.cumsum(lengths) - lengths
        first_of_vessel = np.searchsorted(spans[:, 0], spans[:, 0], side="left")
        before = total_before - total_before[first_of_vessel] if len(spans) else total_before
        axis = spans[:, 0] * _STRIDE
        return cls(axis + spans[:, 1], axis + spans[:, 2], before)

    def service_day(self, vessel: Ints, day: Floats) -> Floats:
        """Give the service day of a calendar day.

        Parameters
        ----------
        vessel : ndarray
            Index of the vessel; shape (n,) [-].
        day : ndarray
            Calendar day, NaN where unknown; shape (n,) [day].

        Returns
        -------
        ndarray
            Service day; shape (n,) [day].
        """
        if not len(self.start):
            return day
        at = vessel * _STRIDE + day
        k = np.searchsorted(self.start, np.where(np.isnan(at), -1.0, at), side="right") - 1
        mine = (k >= 0) & (np.floor(self.start[np.maximum(k, 0)] / _STRIDE) == vessel)
        k = np.maximum(k, 0)
        idle = self.idle_before[k] + np.minimum(at, self.stop[k]) - self.start[k]
        return np.where(mine, day - idle, day)

    def calendar_day(self, vessel: Ints, service_day: Floats) -> Floats:
        """Give the earliest calendar day on which a service day is reached.

        Parameters
        ----------
        vessel : ndarray
            Index of the vessel; shape (n,) [-].
        service_day : ndarray
            Service day, NaN where unknown; shape (n,) [day].

        Returns
        -------
        ndarray
            Calendar day, not beyond the year 9999; shape (n,) [day].
        """
        if not len(self.start):
            return np.minimum(service_day, _LAST_DAY)
        starts_in_service = self.start - self.idle_before
        at = vessel * _STRIDE + service_day
        k = np.searchsorted(starts_in_service, np.where(np.isnan(at), -1.0, at), side="left") - 1
        mine = (k >= 0) & (np.floor(self.start[np.maximum(k, 0)] / _STRIDE) == vessel)
        k = np.maximum(k, 0)
        moved = service_day + self.idle_before[k] + (self.stop[k] - self.start[k])
        return np.minimum(np.where(mine, moved, service_day), _LAST_DAY)

    def years_between(self, vessel: Ints, first: Floats, last: Floats) -> Floats:
        """Count the years that matter between two calendar days, never negative.

        Parameters
        ----------
        vessel : ndarray
            Index of the vessel; shape (n,) [-].
        first, last : ndarray
            Calendar days; shape (n,) [day].

        Returns
        -------
        ndarray
            Years; shape (n,) [year].
        """
        days = self.service_day(vessel, last) - self.service_day(vessel, first)
        return np.asarray(np.maximum(days, 0.0) / DAYS_PER_YEAR)

    def later(self, vessel: Ints, day: Floats, years: Floats) -> Floats:
        """Give the calendar day that lies so many counting years after a day, whole days, rounded down.

        Parameters
        ----------
        vessel : ndarray
            Index of the vessel; shape (n,) [-].
        day : ndarray
            Calendar day from which is counted; shape (n,) [day].
        years : ndarray
            Years that count; shape (n,) [year].

        Returns
        -------
        ndarray
            Calendar day; shape (n,) [day].
        """
        return self.calendar_day(vessel, self.service_day(vessel, day) + whole_days(years))
