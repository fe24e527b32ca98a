"""The straight line of `fleet.thinning.fit` against certified values and against exact rationals.

Certified values: NIST Statistical Reference Datasets, linear regression, data set Norris (calibration of ozone
monitors), printed in the data file to 15 digits. The file is read as it comes with SciPy, not retyped.
"""

from __future__ import annotations

import math
from fractions import Fraction
from pathlib import Path

import numpy as np
import pytest
import scipy

from fleet.thinning.fit import Lines, straight_lines

NORRIS = Path(scipy.__file__).parent / "stats" / "tests" / "data" / "nist_linregress" / "Norris.dat"


def fit(x: list[float], y: list[float]) -> Lines:
    zeros = np.zeros(len(x), dtype=np.int64)
    return straight_lines(zeros, np.array(x), np.array(y), np.ones(len(x), dtype=np.bool_), 1)


def norris() -> tuple[list[float], list[float]]:
    if not NORRIS.is_file():
        pytest.skip("this SciPy was installed without its test data")
    rows = [line.split() for line in NORRIS.read_text(encoding="ascii").splitlines()[60:96]]
    return [float(x) for _, x in rows], [float(y) for y, _ in rows]


# 15 digits are printed and double precision carries 15.95: each value is asked for to 12 digits, as many as the
# sums of 36 products leave, and the last printed digit of the residual sum of squares
@pytest.mark.parametrize(
    ("name", "certified"),
    [
        ("slope", 1.00211681802045),
        ("slope_error", 0.429796848199937e-3),
        ("intercept", -0.262323073774029),
        ("intercept_error", 0.232818234301152),
        ("residual", 0.884796396144373),
    ],
)
def test_norris_certified_values(name: str, certified: float) -> None:
    assert float(getattr(fit(*norris()), name)[0]) == pytest.approx(certified, rel=1e-12)


def test_norris_residual_sum_of_squares() -> None:
    assert 34 * float(fit(*norris()).residual[0]) ** 2 == pytest.approx(26.6173985294224, rel=1e-12)


def exact(x: list[Fraction], y: list[Fraction]) -> tuple[Fraction, Fraction, Fraction, Fraction]:
    """Slope, intercept, squared error of the slope and of the intercept, in rationals from the normal equations."""
    n = len(x)
    sx, sy = sum(x, Fraction()), sum(y, Fraction())
    sxx, sxy = (
        sum((a * a for a in x), Fraction()),
        sum((a * b for a, b in zip(x, y, strict=True)), Fraction()),
    )
    bottom = n * sxx - sx * sx
    slope = (n * sxy - sx * sy) / bottom
    intercept = (sy - slope * sx) / n
    left = sum(((b - intercept - slope * a) ** 2 for a, b in zip(x, y, strict=True)), Fraction()) / (n - 2)
    return slope, intercept, left * n / bottom, left * sxx / bottom


@pytest.mark.parametrize("seed", range(20))
def test_exact_rationals_on_day_numbers(seed: int) -> None:
    # service days of this century, walls printed to 0.1 mm: where a careless sum of squares would lose its digits
    draw = np.random.default_rng(seed)
    days = sorted(draw.choice(10_000, int(draw.integers(3, 41)), replace=False).tolist())
    noise = draw.integers(0, 10, len(days)).tolist()
    walls = [
        Fraction(120 - tenths, 10) - Fraction(day, 10_000) for day, tenths in zip(days, noise, strict=True)
    ]
    found = fit([730_000.0 + day for day in days], [float(wall) for wall in walls])
    slope, intercept, slope_error, intercept_error = exact([Fraction(730_000 + day) for day in days], walls)
    assert float(found.slope[0]) == pytest.approx(float(slope), rel=1e-9)
    assert float(found.intercept[0]) == pytest.approx(float(intercept), rel=1e-9)
    assert float(found.slope_error[0]) == pytest.approx(math.sqrt(slope_error), rel=1e-9)
    assert float(found.intercept_error[0]) == pytest.approx(math.sqrt(intercept_error), rel=1e-9)


def test_exact_rationals_on_norris() -> None:
    x, y = norris()
    slope, intercept, slope_error, _ = exact([Fraction(str(a)) for a in x], [Fraction(str(b)) for b in y])
    assert abs(float(slope) - 1.00211681802045) <= 0.5e-14
    assert abs(float(intercept) - -0.262323073774029) <= 0.5e-15
    assert abs(math.sqrt(slope_error) - 0.429796848199937e-3) <= 0.5e-18
    assert float(fit(x, y).slope[0]) == pytest.approx(float(slope), rel=1e-14)
