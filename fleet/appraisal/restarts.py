"""Restarts, and the chain of histories that they cut the readings of a location into."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints
from fleet.thinning.clock import ServiceClock
from fleet.thinning.histories import Beginning, History, Starts, history
from fleet.thinning.observations import Observations
from fleet.thinning.planning import merged, planning

_STRIDE = 1.0e7  # wider than any day number: location and day on one axis


@dataclass(frozen=True)
class RestartIndex:
    """Restarts by the as-of date, sorted by location and day.

    Parameters
    ----------
    axis : ndarray
        ``location * 1e7 + day``; shape (k,) [-].
    day : ndarray
        Day of the restart; shape (k,) [day].
    metal : ndarray
        Whether it brought new metal; shape (k,) [-].
    first : ndarray
        First restart of each location; shape (locations,) [-].
    number : ndarray
        Restarts of each location; shape (locations,) [count].
    """

    axis: Floats
    day: Floats
    metal: Bools
    first: Ints
    number: Ints

    @classmethod
    def of(cls, inputs: Inputs, as_of_day: float) -> RestartIndex:
        """Build the index.

        Parameters
        ----------
        inputs : Inputs
            Register and record [-].
        as_of_day : float
            The as-of date [day].

        Returns
        -------
        RestartIndex
        """
        restarts, count = inputs.restarts, len(inputs.locations)
        keep = np.flatnonzero(restarts.happened_day <= as_of_day)
        axis = restarts.location[keep] * _STRIDE + restarts.happened_day[keep]
        order = np.argsort(axis, kind="stable")
        keep, axis = keep[order], axis[order]
        location = restarts.location[keep]
        first = np.searchsorted(location, np.arange(count), side="left")
        number = np.searchsorted(location, np.arange(count), side="right") - first
        metal = np.asarray(restarts.kind[keep] == "new metal", dtype=np.bool_)
        return cls(axis, restarts.happened_day[keep], metal, first, number)

    def before(self, location: Ints, day: Floats) -> tuple[Ints, Ints]:
        """Count restarts, and those with new metal, at a location on or before a day.

        Parameters
        ----------
        location : ndarray
            Index of the location; shape (n,) [-].
        day : ndarray
            Day; shape (n,) [day].

        Returns
        -------
        tuple of ndarray
            Both of shape (n,) [count].
        """
        until = np.searchsorted(self.axis, location * _STRIDE + day, side="right")
        total = np.concatenate(([0], np.cumsum(self.metal))).astype(np.int64)
        first = self.first[location]
        return until - first, total[until] - total[first]

    def new_metal(self) -> Ints:
        """Count the restarts with new metal of every location.

        Returns
        -------
        ndarray
            Shape (locations,) [count].
        """
        total = np.concatenate(([0], np.cumsum(self.metal))).astype(np.int64)
        return np.asarray(total[self.first + self.number] - total[self.first], dtype=np.int64)

    def last_day(self) -> Floats:
        """Give the day of the last restart of every location.

        Returns
        -------
        ndarray
            NaN where there was none; shape (locations,) [day].
        """
        out = np.full(len(self.first), np.nan)
        has = self.number > 0
        out[has] = self.day[(self.first + self.number - 1)[has]]
        return out

    def begin(self, rank: int) -> Beginning:
        """Say how the histories of one rank begin.

        Parameters
        ----------
        rank : int
            0 for the first history [-].

        Returns
        -------
        Beginning
        """
        count = len(self.first)
        exists = self.number >= rank
        if rank == 0:
            no = np.zeros(count, dtype=np.bool_)
            return Beginning(exists, no, no, np.full(count, np.nan))
        metal, day = np.zeros(count, dtype=np.bool_), np.full(count, np.nan)
        row = (self.first + rank - 1)[exists]
        metal[exists], day[exists] = self.metal[row], self.day[row]
        return Beginning(exists, metal, exists & ~metal, day)


def present_histories(
    seen: Observations, index: RestartIndex, starts: Starts, window_days: Floats, clock: ServiceClock,
    expected: Floats, floor: Floats, as_of_day: float,
) -> tuple[History, Floats]:  # fmt: skip
    """Work through the histories of every location, restart by restart.

    Parameters
    ----------
    seen : Observations
        All observations [-].
    index : RestartIndex
        The restarts [-].
    starts : Starts
        Nominal wall and its day; shape (locations,) [-].
    window_days : ndarray
        Observation window; shape (locations,) [day].
    clock : ServiceClock
        Days that count [-].
    expected, floor : ndarray
        Expected rate and the owner's floor; shape (locations,) [mm/year].
    as_of_day : float
        The as-of date [day].

    Returns
    -------
    tuple of History and ndarray
        The present history, and the planning rate of the history before it, NaN where there was no restart
        [mm/year].
    """
    count = len(starts.vessel)
    metal_day = starts.nominal_day
    old_rate = np.full(count, np.nan)
    rate_here = np.full(count, np.nan)
    now: History | None = None
    for rank in range(int(index.number.max(initial=0)) + 1):
        begin = index.begin(rank)
        metal_day = np.where(begin.new_metal, begin.day, metal_day)
        next_one = history(seen, rank, begin, starts, now, metal_day, window_days, clock)
        old_rate = np.where(begin.exists & (rank > 0), rate_here, old_rate)
        plan = planning(
            next_one, restarted=begin.exists & (rank > 0), old_rate=old_rate, expected=expected, floor=floor,
            as_of_day=as_of_day,
        )  # fmt: skip
        rate_here = np.where(begin.exists, plan.rate, rate_here)
        now = next_one if now is None else merged(now, next_one, begin.exists)
    assert now is not None  # noqa: S101  # rank 0 is always there
    return now, old_rate
