"""What the wall gives is rounded down, what is asked of it is rounded up, once, in the unit printed."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fleet import units
from fleet.reports.figures import NONE, Figure, Figures

PSI = 0.006894757293168361
amounts = st.floats(min_value=0.0, max_value=500.0)


@pytest.mark.parametrize("display", [units.SI, units.US])
@settings(deadline=None)  # the first conversion imports pint
@given(value=amounts)
def test_no_figure_is_printed_on_its_unsafe_side(display: units.Display, value: float) -> None:
    figures = Figures(display)
    for made, quantity in ((figures.wall(value), "length"), (figures.carries(value), "pressure")):
        assert made.value is not None
        assert made.value <= display.value(quantity, value) * (1 + 2e-9)
    for made, quantity in (
        (figures.needed(value), "length"),
        (figures.asked(value), "pressure"),
        (figures.rate(value), "rate"),
    ):
        assert made.value is not None
        assert made.value >= display.value(quantity, value) * (1 - 2e-9)


def test_whole_psi_kept_in_mpa_print_as_they_were_given() -> None:
    figures = Figures(units.US)
    for psi in range(1, 1001):
        assert figures.carries(psi * PSI).value == psi
        assert figures.asked(psi * PSI).value == psi


def test_a_negative_margin_is_rounded_away_from_zero() -> None:
    assert str(Figures(units.SI).carries(-0.0004)) == "-0.001"


def test_what_cannot_be_had_is_a_dash_and_never_a_number() -> None:
    figures = Figures(units.SI)
    for nothing in (None, float("nan"), float("inf")):
        assert figures.carries(nothing) == Figure(None, 3)
        assert figures.with_unit(figures.carries(nothing), "pressure") == NONE


def test_one_year_is_not_years() -> None:
    figures = Figures(units.SI)
    assert figures.with_unit(figures.years(1.0), "years") == "1.0 year"
    assert figures.with_unit(figures.years(1.96), "years") == "1.9 years"
    assert str(figures.spent(1.91)) == "2.0"


def test_what_was_given_is_printed_to_the_nearest() -> None:
    assert str(Figures(units.SI).given(12.699, "length")) == "12.70"
