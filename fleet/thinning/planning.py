"""The planning rate: which rate life, interval and projection use, and why."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from fleet.thinning.formulas import noticeable_change, rate_difference_error
from fleet.thinning.histories import History

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]
Texts = NDArray[np.object_]

BASES = ("none", "chosen", "long-term", "short-term", "expected", "from nominal", "before restart", "floor")
"""Every basis of a planning rate; the arrays hold the index."""
NONE, CHOSEN, LONG, SHORT, EXPECTED, NOMINAL, BEFORE, FLOOR = range(len(BASES))


@dataclass(frozen=True)
class Chosen:
    """Rates chosen by the engineer, one row per location; NaN where none was. All arrays of shape (n,).

    Parameters
    ----------
    rate : ndarray
        The chosen rate [mm/year].
    decided_day, review_day : ndarray
        Day of the choice, and the day on which it must be looked at again [day].
    two_names : ndarray
        Whether a second engineer signed it [-].
    """

    rate: Floats
    decided_day: Floats
    review_day: Floats
    two_names: Bools


@dataclass(frozen=True)
class Planning:
    """The planning rate of every location. All arrays of shape (n,).

    Parameters
    ----------
    rate : ndarray
        Planning rate, NaN where none can be had [mm/year].
    basis : ndarray
        Index into `BASES` [-].
    short_counts : ndarray
        Whether the short-term rate counts [-].
    chosen_lapsed, chosen_alone : ndarray
        Whether a chosen rate lapsed, or lacks its second name [-].
    loss_unseen : ndarray
        Whether the measured loss is below what the readings can show [-].
    """

    rate: Floats
    basis: Ints
    short_counts: Bools
    chosen_lapsed: Bools
    chosen_alone: Bools
    loss_unseen: Bools


def short_term_counts(now: History) -> Bools:
    """Say where the short-term rate counts.

    Parameters
    ----------
    now : History
        The history [-].

    Returns
    -------
    ndarray of bool
        True where the last span is a year or more, or its loss exceeds ``3·√(s_1² + s_2²)``; shape (n,) [-].
    """
    noticeable = np.asarray(noticeable_change(s_1=now.previous_error_mm, s_2=now.last_error_mm))
    seen = ~np.isnan(now.short_rate)
    return seen & ((now.short_years >= 1.0) | (now.short_loss_mm > noticeable))


def planning(
    now: History, *, restarted: Bools, old_rate: Floats, expected: Floats, floor: Floats, as_of_day: float,
    chosen: Chosen | None = None, leave_out_short: Bools | None = None, begun_day: Floats | None = None,
) -> Planning:  # fmt: skip
    """Choose the planning rate of every location.

    Parameters
    ----------
    now : History
        The present history [-].
    restarted : ndarray
        Whether a restart began it; shape (n,) [-].
    old_rate : ndarray
        Planning rate of the history before, NaN where none; shape (n,) [mm/year].
    expected : ndarray
        Expected rate of the part, NaN where blank; shape (n,) [mm/year].
    floor : ndarray
        The owner's floor; shape (n,) [mm/year].
    as_of_day : float
        The as-of date [day].
    chosen : Chosen, optional
        Rates chosen by the engineer [-].
    leave_out_short : ndarray, optional
        Where the short-term rate is left out, to ask what the long-term rate would say; shape (n,) [-].
    begun_day : ndarray, optional
        Day of the restart that began the history, NaN where none: an earlier choice lapses; shape (n,) [day].

    Returns
    -------
    Planning

    Notes
    -----
    One chosen by the engineer; else the greater of the measured two; else the expected rate; else nominal to last
    observation; else none. Until two observations lie after a restart: the greatest of the rate before it, the expected
    one and what the readings show. Never below the floor, nor below the expected rate unless the measured span was long
    enough that the expected loss would have exceeded the least measurable.
    """
    counts = short_term_counts(now)
    short = np.where(counts, now.short_rate, np.nan)
    if leave_out_short is not None:
        short = np.where(leave_out_short, np.nan, short)
    measured = np.fmax(now.long_rate, short)
    by_short = short > np.where(np.isnan(now.long_rate), -1.0, now.long_rate)
    long_basis = np.where(now.long_from_nominal, NOMINAL, LONG)
    rate = measured
    basis = np.where(by_short, SHORT, long_basis)
    rate, basis = _else(rate, basis, expected, EXPECTED)
    rate, basis = _else(rate, basis, now.nominal_rate, NOMINAL)

    young = restarted & (now.after < 2)
    shown = np.where(np.isnan(measured), now.nominal_rate, measured)
    shown_basis = np.where(np.isnan(measured), NOMINAL, np.where(by_short, SHORT, long_basis))
    for candidate, name in ((expected, EXPECTED), (old_rate, BEFORE)):
        above = candidate > np.where(np.isnan(shown), -1.0, shown)
        shown, shown_basis = np.where(above, candidate, shown), np.where(above, name, shown_basis)
    rate, basis = np.where(young, shown, rate), np.where(young, shown_basis, basis)

    # an expected rate is left behind only by a span over which its loss would have shown
    long_enough = expected > np.where(np.isnan(now.least_measurable), np.inf, now.least_measurable)
    low = (rate < expected) & ~long_enough
    rate, basis = np.where(low, expected, rate), np.where(low, EXPECTED, basis)

    lapsed = alone = np.zeros(len(rate), dtype=np.bool_)
    if chosen is not None:
        given = ~np.isnan(chosen.rate)
        lapsed = given & ((now.last_day > chosen.decided_day) | (chosen.review_day <= as_of_day))
        if begun_day is not None:
            lapsed |= given & (begun_day > chosen.decided_day)
        bar = np.fmax(np.fmax(measured, expected), np.where(young, rate, np.nan))
        alone = given & ~lapsed & (chosen.rate < bar) & ~chosen.two_names
        stands = given & ~lapsed & ~(alone & ~(chosen.rate > np.where(np.isnan(rate), -1.0, rate)))
        rate, basis = np.where(stands, chosen.rate, rate), np.where(stands, CHOSEN, basis)

    under = rate < floor
    rate, basis = np.where(under, floor, rate), np.where(under, FLOOR, basis)
    basis = np.where(np.isnan(rate), NONE, basis).astype(np.int64)
    return Planning(rate, basis, counts, lapsed, alone, now.long_rate < now.least_measurable)


def _else(rate: Floats, basis: Ints, other: Floats, name: int) -> tuple[Floats, Ints]:
    """Fill in another rate where there is none yet."""
    fill = np.isnan(rate) & ~np.isnan(other)
    return np.where(fill, other, rate), np.where(fill, name, basis)


@dataclass(frozen=True)
class SharedShift:
    """What most locations of a part did together since the survey before; one row per part.

    Parameters
    ----------
    shared : ndarray
        Whether most locations of the part shifted together by more than their error; shape (p,) [-].
    mean, error : ndarray
        Mean of short-term less long-term rate, and its standard error; shape (p,) [mm/year].
    """

    shared: Bools
    mean: Floats
    error: Floats


def difference_errors(now: History) -> Floats:
    """Give the standard error of short-term less long-term rate.

    Parameters
    ----------
    now : History
        The history [-].

    Returns
    -------
    ndarray
        Standard error, NaN where the two rates are one; shape (n,) [mm/year].
    """
    apart = (now.short_years > 0) & (now.long_years > now.short_years)
    d, D = np.where(apart, now.short_years, 1.0), np.where(apart, now.long_years, 2.0)
    return np.where(apart, np.asarray(rate_difference_error(s=now.last_error_mm, d=d, D=D)), np.nan)


def shared_shift(now: History, part: Ints, parts: int, live: Bools) -> SharedShift:
    """Test on the mean of a part whether most of its locations shifted together.

    Parameters
    ----------
    now : History
        The history [-].
    part : ndarray
        Index of the part of each location; shape (n,) [-].
    parts : int
        Number of parts [count].
    live : ndarray
        Locations in use; shape (n,) [-].

    Returns
    -------
    SharedShift
        Shared where three or more locations can tell, more than half of them moved the same way, and the mean of the
        differences, gains counted as they were read, exceeds three of its standard errors.
    """
    error = difference_errors(now)
    can = ~np.isnan(error) & live
    years = np.where(can, now.short_years, 1.0)
    difference = np.where(can, -now.change_mm / years - now.long_rate, 0.0)
    number = np.bincount(part, can.astype(np.float64), parts)
    divisor = np.maximum(number, 1.0)
    mean = np.bincount(part, difference, parts) / divisor
    mean_error = np.sqrt(np.bincount(part, np.where(can, error, 0.0) ** 2, parts)) / divisor
    above = np.bincount(part, (can & (difference > 0)).astype(np.float64), parts)
    below = np.bincount(part, (can & (difference < 0)).astype(np.float64), parts)
    most = np.where(mean > 0, above, below) > number / 2
    shared = (number >= 3) & most & (np.abs(mean) > 3 * mean_error)
    return SharedShift(shared, mean, mean_error)


def short_term_in_doubt(now: History, plan: Planning, shift: SharedShift, part: Ints) -> Bools:
    """Say where the short-term rate governs by less than its error can tell.

    Parameters
    ----------
    now : History
        The history [-].
    plan : Planning
        The planning rates [-].
    shift : SharedShift
        Parts whose locations shifted together: there the shift is taken as real [-].
    part : ndarray
        Index of the part of each location; shape (n,) [-].

    Returns
    -------
    ndarray of bool
        True where short-term less long-term is under three standard errors; shape (n,) [-].
    """
    error = difference_errors(now)
    within = (now.short_rate - now.long_rate) < 3 * error
    return np.asarray(
        (plan.basis == SHORT) & within & ~(shift.shared & (shift.mean > 0))[part], dtype=np.bool_
    )


def merged(earlier: History, later: History, where: Bools) -> History:
    """Take a later history where there is one.

    Parameters
    ----------
    earlier, later : History
        Two histories of the same locations [-].
    where : ndarray
        Where the later one holds; shape (n,) [-].

    Returns
    -------
    History
    """
    fields = {
        name: np.where(where, getattr(later, name), getattr(earlier, name))
        for name in earlier.__dataclass_fields__
    }
    return replace(earlier, **fields)
