"""Histories: what a restart begins, the wall used, and the rates each history shows.

A location has one history more than it has restarts; the last is the present one. New metal starts from the baseline
measured then, else from nominal at the restart's date; a new service starts from the last observation before it,
dated the day of the change.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fleet.thinning.clock import DAYS_PER_YEAR, ServiceClock
from fleet.thinning.fit import straight_lines
from fleet.thinning.formulas import least_measurable_rate, loss_rate
from fleet.thinning.observations import Observations

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]


@dataclass(frozen=True)
class Starts:
    """What is known of every location before a reading is looked at.

    Parameters
    ----------
    vessel : ndarray
        Index of the vessel; shape (n,) [-].
    nominal_mm : ndarray
        Nominal wall in strength, NaN where unknown; shape (n,) [mm].
    nominal_day : ndarray
        Day on which the wall is taken to have been nominal; shape (n,) [day].
    """

    vessel: Ints
    nominal_mm: Floats
    nominal_day: Floats


@dataclass(frozen=True)
class Beginning:
    """How the history of one rank begins at every location.

    Parameters
    ----------
    exists : ndarray
        Whether the location has a history of this rank; shape (n,) [-].
    new_metal, new_service : ndarray
        What began it; both False for the first history; shape (n,) [-].
    day : ndarray
        Day of the restart, NaN for the first history; shape (n,) [day].
    """

    exists: Bools
    new_metal: Bools
    new_service: Bools
    day: Floats


@dataclass(frozen=True)
class History:
    """One history of every location; NaN where there is none or a figure cannot be had. All arrays of shape (n,).

    Parameters
    ----------
    observations : ndarray
        Observations of this history, a carried one included [count].
    after : ndarray
        Observations measured after the restart, or all where there was none [count].
    last_day : ndarray
        Day of the last observation [day].
    last_mm, last_error_mm : ndarray
        Wall of the last observation and its reading error [mm].
    last_reading : ndarray
        Row of its reading, -1 where none [-].
    wall_used_mm : ndarray
        Least of the last observation and every earlier one [mm].
    long_rate, short_rate : ndarray
        Long-term and short-term rate [mm/year].
    long_from_nominal : ndarray
        Whether the long-term rate starts from nominal at a restart [-].
    short_loss_mm : ndarray
        Loss over the last span [mm].
    previous_error_mm : ndarray
        Reading error of the observation before last [mm].
    long_years, short_years : ndarray
        Their spans that count [year].
    nominal_rate : ndarray
        Rate from nominal to the last observation [mm/year].
    least_measurable : ndarray
        Smallest rate that first and last observation can show [mm/year].
    gain_mm : ndarray
        How much the last observation reads above the wall used before it [mm].
    change_mm : ndarray
        How much it reads above the observation before it; negative for a loss [mm].
    fitted_rate, fitted_error : ndarray
        Slope of the straight line through the observations and its standard error [mm/year].
    """

    observations: Ints
    after: Ints
    last_day: Floats
    last_mm: Floats
    last_error_mm: Floats
    last_reading: Ints
    wall_used_mm: Floats
    long_rate: Floats
    short_rate: Floats
    long_from_nominal: Bools
    short_loss_mm: Floats
    previous_error_mm: Floats
    long_years: Floats
    short_years: Floats
    nominal_rate: Floats
    least_measurable: Floats
    gain_mm: Floats
    change_mm: Floats
    fitted_rate: Floats
    fitted_error: Floats


def _pick(values: Floats, index: Ints, valid: Bools) -> Floats:
    """Take values by index where valid, NaN elsewhere."""
    out = np.full(len(index), np.nan)
    out[valid] = values[index[valid]]
    return out


def _least(values: Floats, start: Ints, stop: Ints) -> Floats:
    """Give the least of each run of values, NaN for an empty run."""
    out = np.full(len(start), np.nan)
    full = np.flatnonzero(stop > start)
    if len(full):
        edges = np.column_stack((start[full], stop[full])).ravel()
        out[full] = np.minimum.reduceat(np.append(values, np.inf), edges)[::2]
    return out


def _rate(first: Floats, last: Floats, years: Floats, valid: Bools) -> Floats:
    """Give a loss rate that is never negative; NaN where not valid or over no time."""
    good = valid & (years > 0)
    span = np.where(good, years, 1.0)
    rate = np.maximum(np.asarray(loss_rate(t_1=first, t_2=last, Y=span)), 0.0)
    return np.where(good, rate, np.nan)


def history(
    seen: Observations,
    rank: int,
    begin: Beginning,
    starts: Starts,
    before: History | None,
    metal_day: Floats,
    window_days: Floats,
    clock: ServiceClock,
) -> History:
    """Work out the history of one rank at every location.

    Parameters
    ----------
    seen : Observations
        All observations [-].
    rank : int
        0 for the first history, 1 after the first restart, and so on [-].
    begin : Beginning
        How this history begins [-].
    starts : Starts
        Nominal wall and its day [-].
    before : History or None
        The history of the rank before [-].
    metal_day : ndarray
        Day on which the present metal was nominal; shape (n,) [day].
    window_days : ndarray
        Days within which a reading counts as measured at the restart; shape (n,) [day].
    clock : ServiceClock
        Days that count [-].

    Returns
    -------
    History
    """
    n = len(starts.vessel)
    key = seen.location * np.int64(1 << 20) + seen.span
    ours = np.arange(n, dtype=np.int64) * np.int64(1 << 20) + rank
    start = np.searchsorted(key, ours, side="left")
    stop = np.where(begin.exists, np.searchsorted(key, ours, side="right"), start)
    number = stop - start
    some, several = number > 0, number > 1
    last, first, previous = stop - 1, start, stop - 2

    none = np.full(n, np.nan)
    carried = begin.new_service & ~np.isnan(before.wall_used_mm) if before else np.zeros(n, dtype=np.bool_)
    carried_mm = np.where(carried, before.wall_used_mm, np.nan) if before else none
    carried_last = np.where(carried, before.last_mm, np.nan) if before else none
    carried_error = np.where(carried, before.last_error_mm, np.nan) if before else none

    first_day = _pick(seen.day, first, some)
    last_day = _pick(seen.day, last, some)
    last_mm = _pick(seen.wall_mm, last, some)
    last_error = _pick(seen.error_mm, last, some)
    used = np.fmin(_least(seen.wall_mm, start, stop), carried_mm)
    used_before = np.fmin(_least(seen.wall_mm, start, np.maximum(stop - 1, start)), carried_mm)
    previous_day = np.where(several, _pick(seen.day, previous, several), np.where(carried, begin.day, np.nan))
    previous_mm = np.where(several, _pick(seen.wall_mm, previous, several), carried_last)
    previous_error = np.where(several, _pick(seen.error_mm, previous, several), carried_error)

    short_start = np.where(carried & ~several, carried_last, used_before)

    measured_then = some & (first_day - begin.day <= window_days)
    # what opens the history is not an observation after the restart
    opened = (begin.new_metal & measured_then) | (begin.new_service & some & (first_day <= begin.day))
    nominal_start = begin.new_metal & ~measured_then & ~np.isnan(starts.nominal_mm)
    begin_day = np.where(carried | nominal_start, begin.day, first_day)
    begin_mm = np.where(
        carried, carried_last, np.where(nominal_start, starts.nominal_mm, _pick(seen.wall_mm, first, some))
    )
    begin_error = np.where(carried, carried_error, _pick(seen.error_mm, first, some))
    two = several | (carried & some)
    long_years = np.where(two, clock.years_between(starts.vessel, begin_day, last_day), np.nan)
    short_years = np.where(two, clock.years_between(starts.vessel, previous_day, last_day), np.nan)
    nominal_years = clock.years_between(starts.vessel, metal_day, last_day)
    long_rate = _rate(begin_mm, used, long_years, two)
    # two readings are needed to measure: where the long-term rate starts from nominal, the measured span counts
    measured_years = np.where(
        nominal_start, clock.years_between(starts.vessel, first_day, last_day), long_years
    )
    measurable = two & (measured_years > 0)
    least = np.asarray(
        least_measurable_rate(s_1=begin_error, s_2=last_error, Y=np.where(measurable, measured_years, 1.0))
    )
    fit = straight_lines(seen.location, clock.service_day(starts.vessel[seen.location], seen.day), seen.wall_mm,
                         seen.span == rank, n)  # fmt: skip
    # a new service that nobody has read since keeps the day of its last reading: no loss is forgiven
    kept = carried & ~some
    if before is not None:
        last_day = np.where(kept, before.last_day, last_day)
        last_mm = np.where(kept, before.last_mm, last_mm)
        last_error = np.where(kept, before.last_error_mm, last_error)
    return History(
        observations=number + carried,
        after=number - opened,
        last_day=last_day,
        last_mm=last_mm,
        last_error_mm=last_error,
        last_reading=np.where(
            some, seen.reading[np.maximum(last, 0)] if len(seen.reading) else -1,
            np.where(kept, before.last_reading, -1) if before is not None else -1,
        ),
        wall_used_mm=used,
        long_rate=long_rate,
        short_rate=_rate(short_start, used, short_years, two),
        long_from_nominal=nominal_start & two,
        short_loss_mm=np.where(two, np.maximum(short_start - used, 0.0), np.nan),
        previous_error_mm=previous_error,
        long_years=long_years,
        short_years=short_years,
        nominal_rate=_rate(starts.nominal_mm, used, nominal_years, some),
        least_measurable=np.where(measurable, least, np.nan),
        gain_mm=np.where(two, last_mm - used_before, np.nan),
        change_mm=np.where(two, last_mm - previous_mm, np.nan),
        fitted_rate=np.where(several, -fit.slope * DAYS_PER_YEAR, np.nan),
        fitted_error=np.where(several, fit.slope_error * DAYS_PER_YEAR, np.nan),
    )  # fmt: skip
