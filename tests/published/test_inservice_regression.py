"""A straight line through printed data.

Source: Berthouex and Brown, Statistics for Environmental Engineers, chapter 34, Table 34.1 (fifteen points), with the
slope and intercept that the book prints.
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from fleet.thinning.fit import straight_lines

Agrees = Callable[[object, str], bool]

X = (0.18, 0.35, 0.055, 0.022, 0.29, 0.15, 0.044, 0.028, 0.044, 0.073, 0.13, 0.088, 0.26, 0.16, 0.1)
Y = (
    26.666,
    50.651,
    9.628,
    4.634,
    40.206,
    21.369,
    5.948,
    4.245,
    4.786,
    11.321,
    18.456,
    12.865,
    35.186,
    24.245,
    14.175,
)


def test_table_34_1(agrees: Agrees) -> None:
    zeros, every = np.zeros(15, dtype=np.int64), np.ones(15, dtype=np.bool_)
    line = straight_lines(zeros, np.array(X), np.array(Y), every, 1)
    assert agrees(line.slope[0], "139.759")
    assert agrees(line.intercept[0], "0.566")
