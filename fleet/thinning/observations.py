"""From readings to observations: which readings count, and which make one observation together.

Readings of a location are walked in the order of their days, all locations at once: the k-th reading of every location
in the k-th step.
"""

from __future__ import annotations

from dataclasses import dataclass, fields

import numpy as np
from numpy.typing import NDArray

from fleet.thinning.formulas import noticeable_change

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]


@dataclass(frozen=True)
class Measured:
    """Readings that gave a thickness, one row each, in any order.

    Parameters
    ----------
    location : ndarray
        Index of the location; shape (n,) [-].
    day : ndarray
        Day of the reading; shape (n,) [day].
    wall_mm : ndarray
        Wall in strength as read; shape (n,) [mm].
    error_mm : ndarray
        Reading error, one standard deviation; shape (n,) [mm].
    queried : ndarray
        Whether the reading is queried; shape (n,) [-].
    span : ndarray
        Number of restarts at the location on or before its day; shape (n,) [count].
    metal : ndarray
        Number of those that brought new metal; shape (n,) [count].
    """

    location: Ints
    day: Floats
    wall_mm: Floats
    error_mm: Floats
    queried: Bools
    span: Ints
    metal: Ints

    def only(self, rows: Bools) -> Measured:
        """Give some of the readings.

        Parameters
        ----------
        rows : ndarray of bool
            Which; shape (n,) [-].

        Returns
        -------
        Measured
        """
        return Measured(**{field.name: getattr(self, field.name)[rows] for field in fields(self)})


@dataclass(frozen=True)
class Observations:
    """One row per observation, sorted by location and day.

    Parameters
    ----------
    location, span : ndarray
        Location and history it belongs to; shape (m,) [-].
    day : ndarray
        Day on which its least reading was taken; shape (m,) [day].
    wall_mm, error_mm : ndarray
        Its wall and reading error; shape (m,) [mm].
    reading : ndarray
        Row of its least reading in the table of readings; shape (m,) [-].
    counted : ndarray
        Which readings count; shape (n,), in the order of the table of readings [-].
    """

    location: Ints
    span: Ints
    day: Floats
    wall_mm: Floats
    error_mm: Floats
    reading: Ints
    counted: Bools


def observations(measured: Measured, count: int, nominal_mm: Floats, window_days: Floats) -> Observations:
    """Gather readings into observations.

    An observation opens with a reading and takes in all counting readings of the location within the window from
    that reading, unless the loss between them exceeds ``3·√(s_1² + s_2²)``, which keeps them apart. It is the
    least of them, dated the day that reading was taken (of equals, the earliest). A queried reading above what its
    history expects - the least wall counted before it, else nominal - does not count; at or below it, it governs.

    Parameters
    ----------
    measured : Measured
        The readings [-].
    count : int
        Number of locations [count].
    nominal_mm : ndarray
        Nominal wall in strength of each location, NaN where unknown; shape (count,) [mm].
    window_days : ndarray
        The window of each location; shape (count,) [day].

    Returns
    -------
    Observations
    """
    order = np.lexsort((measured.wall_mm, measured.day, measured.location))
    location = measured.location[order]
    counted_sorted, group = _walk(measured, order, count, nominal_mm, window_days)
    rows = np.flatnonzero(counted_sorted)
    # the least reading of each group, of equals the earliest
    pick = np.lexsort((measured.day[order][rows], measured.wall_mm[order][rows], group[rows], location[rows]))
    rows = rows[pick]
    new = np.ones(len(rows), dtype=np.bool_)
    new[1:] = (location[rows][1:] != location[rows][:-1]) | (group[rows][1:] != group[rows][:-1])
    reading = order[rows[new]]
    counted = np.zeros(len(order), dtype=np.bool_)
    counted[order] = counted_sorted
    return Observations(
        measured.location[reading],
        measured.span[reading],
        measured.day[reading],
        measured.wall_mm[reading],
        measured.error_mm[reading],
        reading,
        counted,
    )


def _walk(
    measured: Measured, order: Ints, count: int, nominal_mm: Floats, window_days: Floats
) -> tuple[Bools, Ints]:
    """Say of each reading, in sorted order, whether it counts and to which group of its location it belongs."""
    location = measured.location[order]
    start = np.searchsorted(location, np.arange(count), side="left")
    number = np.searchsorted(location, np.arange(count), side="right") - start
    counted = np.zeros(len(order), dtype=np.bool_)
    group = np.zeros(len(order), dtype=np.int64)
    # what is known of each location so far
    span_now = np.full(count, -1, dtype=np.int64)
    metal_now = np.zeros(count, dtype=np.int64)
    least = np.full(count, np.nan)
    open_day = np.full(count, -np.inf)
    most = np.full(count, np.nan)
    most_error = np.full(count, np.nan)
    groups = np.zeros(count, dtype=np.int64)
    for k in range(int(number.max(initial=0))):
        here = np.flatnonzero(number > k)
        rows = start[here] + k
        row = order[rows]
        wall, error, day = measured.wall_mm[row], measured.error_mm[row], measured.day[row]
        renewed = measured.metal[row] != metal_now[here]
        least[here] = np.where(renewed, np.nan, least[here])
        expected = np.where(np.isnan(least[here]), nominal_mm[here], least[here])
        counts = ~(measured.queried[row] & (wall > expected))
        apart = most[here] - wall > np.asarray(noticeable_change(s_1=most_error[here], s_2=error))
        joins = (measured.span[row] == span_now[here]) & (day - open_day[here] <= window_days[here]) & ~apart
        opens = counts & ~joins
        groups[here] += opens
        counted[rows], group[rows] = counts, groups[here]
        span_now[here] = np.where(opens, measured.span[row], span_now[here])
        metal_now[here] = measured.metal[row]
        open_day[here] = np.where(opens, day, open_day[here])
        higher = opens | (counts & ~(wall <= most[here]))
        most[here] = np.where(higher, wall, most[here])
        most_error[here] = np.where(higher, error, most_error[here])
        least[here] = np.where(counts, np.fmin(least[here], wall), least[here])
    return counted, group
