"""Compare a wall with its nominal and with its history: the four doubts about a number that can be read."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fleet.units import parse_unit

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]

FAR_ABOVE = 1.25
"""A reading above so many times nominal wall and lining is doubted [-]."""
FAR_BELOW = 0.2
"""Below so many times nominal, the other units are tried [-]."""
LARGE_LOSS = 5.0
"""A loss above so many times what the history gives for the span is doubted [-]."""
EXPLAINED = 3.0 * math.sqrt(2.0)
"""Reading errors, 1 standard deviation each, that the difference of two readings may reach [-]."""
DAYS_PER_YEAR = 365.25

_OTHER_UNITS = ("mm", "in", "mil")


@dataclass(frozen=True)
class AgainstNominal:
    """Readings against nominal wall.

    Parameters
    ----------
    far_above : ndarray of bool
        More than 1.25 times nominal wall and lining [-].
    slip : ndarray of bool
        Far outside, and would fit if it were written in another unit [-].
    slip_unit : list of str
        That unit; empty where there is none [text].
    would_be_mm : ndarray
        What the reading would then be [mm].
    """

    far_above: Bools
    slip: Bools
    slip_unit: list[str]
    would_be_mm: Floats


def against_nominal(
    thickness_mm: Floats,
    nominal_mm: Floats,
    lining_mm: Floats,
    last_mm: Floats,
    written_in: list[str],
) -> AgainstNominal:
    """Find readings far above nominal, and those that would fit in another unit.

    Parameters
    ----------
    thickness_mm : ndarray
        Readings [mm].
    nominal_mm, lining_mm : ndarray
        Nominal wall, NaN where not known; thickness of the lining, 0 where there is none [mm].
    last_mm : ndarray
        Last accepted reading before, NaN where there is none [mm].
    written_in : list of str
        The unit each was written in [text].

    Returns
    -------
    AgainstNominal
        What was found [-].

    Notes
    -----
    Far outside: above 1.25·(nominal + lining) or below 0.2·nominal; without nominal, the same of the last
    reading. The reading would fit in another unit where it then lies between 0.2 times nominal and 1.25 times
    nominal and lining, or between 0.2 and 1.25 times the last reading. Of two units that fit, the one nearer
    to nominal.
    """
    highest = FAR_ABOVE * (nominal_mm + lining_mm)
    with np.errstate(invalid="ignore"):
        far_above = thickness_mm > highest
        from_last = np.isnan(nominal_mm)
        high = np.where(from_last, thickness_mm > FAR_ABOVE * last_mm, far_above)
        low = np.where(from_last, thickness_mm < FAR_BELOW * last_mm, thickness_mm < FAR_BELOW * nominal_mm)
    slip = np.zeros(len(thickness_mm), dtype=np.bool_)
    units = [""] * len(thickness_mm)
    would_be = np.full(len(thickness_mm), np.nan)
    for row in np.flatnonzero(high | low).tolist():
        fits = _fitting(
            float(thickness_mm[row]),
            float(nominal_mm[row]),
            float(highest[row]),
            float(last_mm[row]),
            written_in[row],
        )
        if fits is not None:
            slip[row], units[row], would_be[row] = True, *fits
    return AgainstNominal(far_above, slip, units, would_be)


def _fitting(
    thickness: float, nominal: float, highest: float, last: float, unit: str
) -> tuple[str, float] | None:
    """Name the other unit in which a reading would fit, and what it would be."""
    factor = float(parse_unit(unit, "length").factor)
    best: tuple[float, str, float] | None = None
    for other in _OTHER_UNITS:
        other_factor = float(parse_unit(other, "length").factor)
        if other_factor == factor:
            continue
        would_be = thickness / factor * other_factor
        by_nominal = FAR_BELOW * nominal <= would_be <= highest
        by_last = FAR_BELOW * last <= would_be <= FAR_ABOVE * last
        if by_nominal or by_last:
            distance = abs(math.log(would_be / (last if math.isnan(nominal) else nominal)))
            if best is None or distance < best[0]:
                best = distance, other, would_be
    return best[1:] if best is not None else None


@dataclass(frozen=True)
class AgainstHistory:
    """Readings against the last one before; arrays as long as all readings given.

    Parameters
    ----------
    last_mm : ndarray
        Last reading before, NaN where there is none [mm].
    last_day : ndarray
        Its day [days].
    gain, loss : ndarray of bool
        Thicker than the reading error explains; thinner than history and reading error explain [-].
    rate_mm_per_year : ndarray
        Rate of the history before [mm/year].
    """

    last_mm: Floats
    last_day: Floats
    gain: Bools
    loss: Bools
    rate_mm_per_year: Floats


def against_history(
    place: Ints, day: Floats, thickness_mm: Floats, error_mm: Floats, same_observation_days: float = 90.0
) -> AgainstHistory:
    """Compare each reading with those of the same place on earlier days.

    Parameters
    ----------
    place : ndarray of int
        Number of the location of each reading [count].
    day : ndarray
        Its day; no two readings of a place on one day [days].
    thickness_mm : ndarray
        The reading, accepted or about to be [mm].
    error_mm : ndarray
        Its reading error, 1 standard deviation [mm].
    same_observation_days : float
        Readings within so many days of each other are one observation [days].

    Returns
    -------
    AgainstHistory
        In the order given [-].

    Notes
    -----
    Gain: t − t_last > 3·√2·s. Loss: t_last − t > 3·√2·s and > 5·rate·span, where rate is (t_first − t_last)
    over their span, and not below 0. It needs two earlier observations: first and last reading further apart
    than `same_observation_days`, or by more than 3·√2·s.
    """
    count = len(place)
    order = np.lexsort((day, place))
    p, d, t, explained = place[order], day[order], thickness_mm[order], EXPLAINED * error_mm[order]
    opens = np.ones(count, dtype=np.bool_)
    opens[1:] = p[1:] != p[:-1]
    index = np.arange(count)
    first = np.maximum.accumulate(np.where(opens, index, 0))
    before = np.maximum(index - 1, 0)
    has_last = ~opens
    last, last_day = np.where(has_last, t[before], np.nan), np.where(has_last, d[before], np.nan)
    apart = last_day - d[first]
    two = has_last & (before != first)
    two &= (apart > same_observation_days) | (np.abs(t[first] - last) > explained)
    with np.errstate(invalid="ignore", divide="ignore"):
        rate = np.where(two, np.maximum(t[first] - last, 0.0) / (apart / DAYS_PER_YEAR), np.nan)
        lost = last - t
        gain = -lost > explained
        loss = two & (lost > explained) & (lost > LARGE_LOSS * rate * (d - last_day) / DAYS_PER_YEAR)
    back = np.empty(count, dtype=np.int64)
    back[order] = index
    return AgainstHistory(last[back], last_day[back], gain[back], loss[back], rate[back])
