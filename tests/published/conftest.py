"""The tolerance of every printed figure: half a unit in its last digit, never picked by hand."""

from __future__ import annotations

from collections.abc import Callable
from decimal import Decimal

import pytest


def half_unit(printed: str) -> float:
    """Half a unit in the last printed digit."""
    exponent = Decimal(printed).as_tuple().exponent
    assert isinstance(exponent, int)
    return 0.5 * 10.0**exponent


@pytest.fixture
def agrees() -> Callable[..., bool]:
    """Say whether a figure rounds to what is printed."""

    def check(value: object, printed: str) -> bool:
        return abs(float(value) - float(printed)) <= half_unit(printed) * (1 + 1e-9)  # type: ignore[arg-type]  # a float or an array of one

    return check


@pytest.fixture
def spread() -> Callable[[str], tuple[float, float]]:
    """Give the least and the greatest number that would be printed so; for inputs that were printed rounded."""

    def limits(printed: str) -> tuple[float, float]:
        return float(printed) - half_unit(printed), float(printed) + half_unit(printed)

    return limits
