"""Straight lines through observations, by least squares, many at once."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]


@dataclass(frozen=True)
class Lines:
    """Least-squares lines, one per group; NaN where a figure cannot be had.

    Parameters
    ----------
    slope, slope_error : ndarray
        Slope and its standard error; shape (g,) [y per x].
    intercept, intercept_error : ndarray
        Value at x = 0 and its standard error; shape (g,) [y].
    residual : ndarray
        Standard deviation of the residuals, from n - 2 degrees of freedom; shape (g,) [y].
    """

    slope: Floats
    slope_error: Floats
    intercept: Floats
    intercept_error: Floats
    residual: Floats


def straight_lines(group: Ints, x: Floats, y: Floats, use: Bools, groups: int) -> Lines:
    """Fit a straight line to each group of points.

    Parameters
    ----------
    group : ndarray
        Group of each point; shape (n,) [-].
    x, y : ndarray
        The points; shape (n,) [-].
    use : ndarray
        Which points take part; shape (n,) [-].
    groups : int
        Number of groups [count].

    Returns
    -------
    Lines
        Slopes need two points at different x, errors three points.

    Notes
    -----
    ``b = Sxy / Sxx`` about the group means; ``s² = (Syy - b·Sxy) / (n - 2)`` from the residuals themselves;
    ``se(b) = s / √Sxx``.

    References
    ----------
    Any textbook of regression; checked against NIST StRD, data set Norris.

    Examples
    --------
    >>> line = straight_lines(np.zeros(3, dtype=np.int64), np.array([0.0, 1.0, 2.0]), np.array([10.0, 9.5, 9.0]),
    ...                       np.ones(3, dtype=np.bool_), 1)
    >>> float(line.slope[0]), float(line.intercept[0])
    (-0.5, 10.0)
    """
    g, px, py = group[use], x[use], y[use]
    number = np.bincount(g, minlength=groups).astype(np.float64)
    with np.errstate(invalid="ignore", divide="ignore"):
        mean_x = np.bincount(g, px, groups) / number
        mean_y = np.bincount(g, py, groups) / number
        dx, dy = px - mean_x[g], py - mean_y[g]
        sxx = np.bincount(g, dx * dx, groups)
        good = (number > 1) & (sxx > 0)
        slope = np.where(good, np.bincount(g, dx * dy, groups) / sxx, np.nan)
        left = dy - slope[g] * dx
        freedom = np.where(good & (number > 2), number - 2, np.nan)
        residual = np.sqrt(np.bincount(g, left * left, groups) / freedom)
        slope_error = residual / np.sqrt(sxx)
        intercept = mean_y - slope * mean_x
        intercept_error = residual * np.sqrt(1 / number + mean_x * mean_x / sxx)
    return Lines(slope, slope_error, intercept, intercept_error, residual)
