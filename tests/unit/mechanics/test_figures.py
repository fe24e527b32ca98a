"""Figures carry the formula that gave them, and a missing one is never passed over for a better one."""

from __future__ import annotations

import numpy as np
import pytest

from fleet.formula import REGISTER
from fleet.mechanics.figures import chosen, given, greater, lesser, masked, withheld_because, worked


def test_a_missing_figure_counts_as_the_worst() -> None:
    thin, thick = REGISTER["sphere_pressure"], REGISTER["thick_sphere_pressure_newer"]
    first, second = (
        given(thin, np.array([1.0, np.nan, 3.0, 2.0])),
        given(thick, np.array([2.0, 1.0, np.nan, 2.0])),
    )
    np.testing.assert_array_equal(lesser(first, second).value, [1.0, np.nan, np.nan, 2.0])
    np.testing.assert_array_equal(greater(first, second).value, [2.0, np.nan, np.nan, 2.0])
    assert lesser(first, second).formula.tolist() == ["sphere_pressure", "", "", "sphere_pressure"]


def test_a_withheld_figure_has_neither_number_nor_name() -> None:
    rated = worked(
        REGISTER["cone_hoop_pressure"], S=138.0, E=1.0, D=900.0, alpha=np.array([20.0, 40.0]), t=10.0
    )
    assert rated.formula.tolist() == ["cone_hoop_pressure", ""]
    assert np.isnan(rated.value[1])
    assert withheld_because(int(rated.withheld[1])).startswith("α ≤ 30 does not hold")
    hidden = masked(rated, np.array([True, False]))
    assert hidden.withheld.tolist() == [1, rated.withheld[1]]
    assert hidden.formula.tolist() == ["", ""]


def test_proportions_withhold_nothing() -> None:
    rated = worked(REGISTER["torispherical_pressure"], S=138.0, E=1.0, L=900.0, M=1.5, t=0.5)
    assert rated.withheld.tolist() == [0]
    assert rated.value[0] > 0


def test_only_the_first_limits_are_checked_where_asked() -> None:
    thick = REGISTER["thick_cylinder_hoop_thickness_older"]
    values = {"P": 1.0, "S": 138.0, "E": 1.0, "R": 100.0}
    assert worked(thick, **values).withheld[0] > 0
    assert worked(thick, 1, **values).withheld[0] == 0


def test_choosing_takes_the_whole_figure() -> None:
    first, second = (
        given(REGISTER[name], np.array([1.0])) for name in ("sphere_pressure", "flat_cover_pressure")
    )
    assert chosen(np.array([False]), first, second).formula.tolist() == ["flat_cover_pressure"]


def test_an_unknown_code_is_not_explained_away() -> None:
    with pytest.raises(KeyError, match="120"):
        withheld_because(120)
