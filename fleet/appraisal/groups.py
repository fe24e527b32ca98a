"""Least, greatest and first by group: from locations to parts, from parts to vessels."""

from __future__ import annotations

import numpy as np

from fleet.appraisal.inputs import Bools, Floats, Ints


def least_by(values: Floats, group: Ints, groups: int) -> Floats:
    """Give the least value of each group, NaN where it has none.

    Parameters
    ----------
    values : ndarray
        Values, NaN is passed over; shape (n,) [-].
    group : ndarray
        Group of each value; shape (n,) [-].
    groups : int
        Number of groups [count].

    Returns
    -------
    ndarray
        Shape (groups,) [-].

    Examples
    --------
    >>> least_by(np.array([3.0, 1.0, np.nan]), np.array([0, 0, 1]), 3).tolist()
    [1.0, nan, nan]
    """
    out = np.full(groups, np.inf)
    known = ~np.isnan(values)
    np.minimum.at(out, group[known], values[known])
    return np.where(np.isinf(out), np.nan, out)


def greatest_by(values: Floats, group: Ints, groups: int) -> Floats:
    """Give the greatest value of each group, NaN where it has none.

    Parameters
    ----------
    values, group, groups
        As in `least_by` [-].

    Returns
    -------
    ndarray
        Shape (groups,) [-].
    """
    return -least_by(-values, group, groups)


def place_of_least(values: Floats, group: Ints, groups: int) -> Ints:
    """Give the first row that holds the least value of each group, -1 where it has none.

    Parameters
    ----------
    values, group, groups
        As in `least_by` [-].

    Returns
    -------
    ndarray of int
        Shape (groups,) [-].

    Examples
    --------
    >>> place_of_least(np.array([3.0, 1.0, 1.0]), np.array([0, 0, 0]), 2).tolist()
    [1, -1]
    """
    least = least_by(values, group, groups)
    rows = np.flatnonzero(values == least[group])[::-1]
    out = np.full(groups, -1, dtype=np.int64)
    out[group[rows]] = rows
    return out


def any_by(flags: Bools, group: Ints, groups: int) -> Bools:
    """Say of each group whether any of its rows is flagged.

    Parameters
    ----------
    flags : ndarray
        Flags; shape (n,) [-].
    group : ndarray
        Group of each row; shape (n,) [-].
    groups : int
        Number of groups [count].

    Returns
    -------
    ndarray of bool
        Shape (groups,) [-].
    """
    out = np.zeros(groups, dtype=np.bool_)
    out[group[flags]] = True
    return out
