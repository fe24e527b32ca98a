"""Straight lines, many at once, on points that can be checked by eye."""

from __future__ import annotations

import math

import numpy as np
import pytest

from fleet.thinning.fit import Lines, straight_lines


def fit(
    group: list[int], x: list[float], y: list[float], groups: int, use: list[bool] | None = None
) -> Lines:
    taking = np.array(use if use is not None else [True] * len(x), dtype=np.bool_)
    return straight_lines(np.array(group, dtype=np.int64), np.array(x), np.array(y), taking, groups)


def test_two_lines_at_once() -> None:
    found = fit([0, 1, 0, 1], [0.0, 1.0, 2.0, 3.0], [10.0, 5.0, 9.0, 9.0], 2)
    assert found.slope.tolist() == [-0.5, 2.0]
    assert found.intercept.tolist() == [10.0, 3.0]


def test_the_error_of_the_slope_by_hand() -> None:
    # (0, 0), (1, 1), (2, 0): slope 0, mean 1/3; residuals -1/3, 2/3, -1/3: s² = 6/9 / 1, Sxx = 2
    found = fit([0, 0, 0], [0.0, 1.0, 2.0], [0.0, 1.0, 0.0], 1)
    assert found.slope[0] == pytest.approx(0.0, abs=1e-15)
    assert found.residual[0] == pytest.approx(math.sqrt(2 / 3))
    assert found.slope_error[0] == pytest.approx(math.sqrt(2 / 3 / 2))
    assert found.intercept_error[0] == pytest.approx(math.sqrt(2 / 3) * math.sqrt(1 / 3 + 1 / 2))


def test_two_points_have_a_slope_and_no_error() -> None:
    found = fit([0, 0], [0.0, 2.0], [3.0, 1.0], 1)
    assert found.slope.tolist() == [-1.0]
    assert np.isnan(found.slope_error).all()


@pytest.mark.parametrize("x", [[1.0], [1.0, 1.0], []])
def test_points_at_one_x_have_no_slope(x: list[float]) -> None:
    assert np.isnan(fit([0] * len(x), x, [2.0] * len(x), 1).slope).all()


def test_a_point_left_out_has_no_say() -> None:
    found = fit([0, 0, 0], [0.0, 1.0, 2.0], [10.0, 99.0, 8.0], 1, use=[True, False, True])
    assert found.slope.tolist() == [-1.0]
