"""Rounding of computed figures for print: once, in the unit printed, to the safe side, after a nudge of 1e-9."""

from __future__ import annotations

import json
import math

import numpy as np
import pytest
from handsums import steady

from fleet.reports.figures import Figures
from fleet.rounding import round_down, round_up
from fleet.units import SI, US

PSI = 0.006894757293168361  # MPa, from the pound of 0.45359237 kg, 9.80665 m/s² and the inch of 25.4 mm


def test_rule_15_1_required_thickness_rate_and_static_head_go_up() -> None:
    figures = Figures(SI)
    assert str(figures.needed(5.1195219)) == "5.12"
    assert str(figures.needed(5.1101)) == "5.12"
    assert float(str(figures.rate(0.1001))) > 0.1001
    assert float(str(figures.asked(0.10001))) > 0.10001


def test_rule_15_2_projected_wall_mawp_and_life_go_down() -> None:
    figures = Figures(SI)
    assert str(figures.wall(9.7599)) == "9.75"
    assert float(str(figures.carries(1.23499))) == 1.234
    assert float(str(figures.years(7.9999))) < 7.9999


@pytest.mark.parametrize(("display", "unit"), [(SI, "MPa"), (US, "psi")])
def test_rule_15_1_rounding_is_done_in_the_unit_printed(display: object, unit: str) -> None:
    figures = Figures(display)  # type: ignore[arg-type]  # both are displays
    printed = float(str(figures.carries(1.0005)))
    exact = 1.0005 if unit == "MPa" else 1.0005 / PSI
    step = 10.0 ** -len(str(figures.carries(1.0005)).partition(".")[2])
    assert 0 <= exact - printed < step * (1 + 1e-6)


def test_rule_15_3_a_whole_number_of_psi_comes_back_as_itself() -> None:
    figures = Figures(US)
    for psi in range(1, 1001):
        assert float(str(figures.carries(psi * PSI))) == psi
        assert float(str(figures.asked(psi * PSI))) == psi


def test_rule_15_3_the_nudge_is_a_billionth_of_the_value_and_no_more() -> None:
    assert round_down(500.0 * (1 - 0.9e-9), 0) == 500.0
    assert round_down(500.0 * (1 - 1.1e-9), 0) == 499.0
    assert round_up(500.0 * (1 + 0.9e-9), 0) == 500.0
    assert round_up(500.0 * (1 + 1.1e-9), 0) == 501.0


def test_rule_15_3_what_cannot_be_had_stays_so() -> None:
    assert math.isnan(round_down(float("nan"), 2))
    assert np.isnan(round_up(np.array([np.nan, 1.001]), 2)).tolist() == [True, False]


def test_rule_15_3_a_negative_margin_goes_down_too() -> None:
    assert round_down(-0.121, 2) == -0.13
    assert round_up(-0.129, 2) == -0.12


def test_rule_15_4_json_carries_figures_unrounded() -> None:
    document = json.loads(json.dumps(steady(12.0, 0.1).view().as_json(), allow_nan=False))
    place = document["parts"][0]["locations"][0]
    assert place["remaining_life_years"] == pytest.approx(20.0, rel=1e-13)
    assert place["projected_thickness_mm"] != round(place["projected_thickness_mm"], 6)
