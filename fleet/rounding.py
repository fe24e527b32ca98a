"""Rounding to the safe side, once, in the unit printed."""

from __future__ import annotations

from typing import Any, TypeVar

import numpy as np
from numpy.typing import NDArray

Num = TypeVar("Num", float, NDArray[np.float64])

NUDGE = 1e-9
"""What a value is moved against the rounding before it is rounded, as a part of itself [-]."""


def round_down(value: Num, decimals: int) -> Num:
    """Round down in the unit printed, after a nudge of 1e-9 of the value against it.

    Parameters
    ----------
    value : float or ndarray
        In the unit printed; NaN stays NaN [-].
    decimals : int
        Decimals printed [count].

    Returns
    -------
    float or ndarray
        The rounded value [-].

    Notes
    -----
    floor((v + 1e-9·abs(v)) · 10^decimals) / 10^decimals. Without the nudge 211 of the whole numbers from 1 to
    1000 psi, kept in MPa, would print one lower.

    Examples
    --------
    >>> round_down(499.99999999999994, 0), round_down(0.3459, 3)
    (500.0, 0.345)
    """
    rounded: Num = _rounded(value, decimals, 1.0)
    return rounded


def round_up(value: Num, decimals: int) -> Num:
    """Round up in the unit printed, after a nudge of 1e-9 of the value against it.

    Parameters
    ----------
    value : float or ndarray
        In the unit printed; NaN stays NaN [-].
    decimals : int
        Decimals printed [count].

    Returns
    -------
    float or ndarray
        The rounded value [-].

    Notes
    -----
    ceil((v − 1e-9·abs(v)) · 10^decimals) / 10^decimals.

    Examples
    --------
    >>> round_up(12.700000000000001, 2), round_up(12.7001, 2)
    (12.7, 12.71)
    """
    rounded: Num = _rounded(value, decimals, -1.0)
    return rounded


def _rounded(value: Any, decimals: int, against: float) -> Any:
    scale = 10.0**decimals
    numbers = np.asarray(value, dtype=np.float64)
    nudged = (numbers + against * NUDGE * np.abs(numbers)) * scale
    result = (np.floor(nudged) if against > 0 else np.ceil(nudged)) / scale + 0.0
    return result if isinstance(value, np.ndarray) else float(result)
