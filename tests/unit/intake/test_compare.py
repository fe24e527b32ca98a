"""Readings against nominal and history, by numbers reckoned by hand."""

from __future__ import annotations

import math

import numpy as np
import pytest

from fleet.intake.compare import against_history, against_nominal

NONE = math.nan


def nominal_check(
    thickness: float, unit: str, *, nominal: float = 12.7, lining: float = 0.0, last: float = NONE
) -> tuple[bool, str]:
    found = against_nominal(
        np.array([thickness]), np.array([nominal]), np.array([lining]), np.array([last]), [unit]
    )
    assert bool(found.slip[0]) == bool(found.slip_unit[0])
    return bool(found.far_above[0]), found.slip_unit[0]


def test_far_above_begins_beyond_one_and_a_quarter_nominal_and_lining() -> None:
    assert nominal_check(15.0, "mm", nominal=12.0) == (False, "")
    assert nominal_check(15.001, "mm", nominal=12.0) == (True, "")
    assert nominal_check(18.75, "mm", nominal=12.0, lining=3.0) == (False, "")
    assert nominal_check(18.76, "mm", nominal=12.0, lining=3.0) == (True, "")


@pytest.mark.parametrize(
    ("thickness", "written_in", "meant"),
    [
        (0.5, "mm", "in"),  # half an inch under [mm]
        (500.0, "mm", "mil"),  # 500 mil under [mm]
        (12.7 * 25.4, "in", "mm"),  # 12.7 mm under [in]
        (12.7 * 0.0254, "mil", "mm"),  # 12.7 mm under [mil]
        (500 * 25.4, "in", "mil"),  # 500 mil under [in]
    ],
)
def test_slip_names_the_unit_that_was_meant(thickness: float, written_in: str, meant: str) -> None:
    assert nominal_check(thickness, written_in)[1] == meant


@pytest.mark.parametrize("thickness", [12.7, 3.0, 1.0, 15.8, 25.4])
def test_a_plausible_or_a_doubled_reading_is_no_slip(thickness: float) -> None:
    assert nominal_check(thickness, "mm")[1] == ""


def test_without_nominal_the_last_reading_serves_and_without_either_nothing_is_said() -> None:
    assert nominal_check(0.49, "mm", nominal=NONE, last=12.4) == (False, "in")
    assert nominal_check(0.49, "mm", nominal=NONE) == (False, "")


def history_check(*readings: tuple[float, float], error: float = 0.25) -> tuple[bool, bool]:
    days, walls = (np.array(column, dtype=np.float64) for column in zip(*readings, strict=True))
    found = against_history(np.zeros(len(days), dtype=np.int64), days, walls, np.full(len(days), error))
    return bool(found.gain[-1]), bool(found.loss[-1])


YEAR = 365.25
LIMIT = 3 * math.sqrt(2) * 0.25  # 1.0607 mm


def test_gain_begins_beyond_three_root_two_errors() -> None:
    assert history_check((0, 12.0), (YEAR, 12.0 + LIMIT - 0.001)) == (False, False)
    assert history_check((0, 12.0), (YEAR, 12.0 + LIMIT + 0.001)) == (True, False)


def test_gain_is_against_the_last_reading_not_the_first() -> None:
    assert history_check((0, 14.0), (YEAR, 11.0), (2 * YEAR, 12.5))[0]


def test_large_loss_needs_two_earlier_observations() -> None:
    assert history_check((0, 12.0), (YEAR, 8.0)) == (False, False)
    assert history_check((0, 12.0), (30, 12.0), (YEAR, 8.0)) == (False, False)
    assert history_check((0, 12.0), (91, 12.0), (YEAR, 8.0)) == (False, True)
    # two weeks apart, but further apart than the reading error explains: two observations
    assert history_check((0, 12.0), (14, 10.5), (10 * YEAR, 5.0)) == (False, False)
    assert history_check((0, 12.0), (14, 13.5), (YEAR, 8.0)) == (False, True)


def test_large_loss_begins_beyond_five_times_the_history() -> None:
    # 0.25 mm/year for four years; five times that over the next two years is 2.5 mm
    assert history_check((0, 12.0), (4 * YEAR, 11.0), (6 * YEAR, 8.501)) == (False, False)
    assert history_check((0, 12.0), (4 * YEAR, 11.0), (6 * YEAR, 8.499)) == (False, True)


def test_large_loss_must_exceed_the_reading_error_as_well() -> None:
    assert history_check((0, 12.0), (4 * YEAR, 12.0), (5 * YEAR, 12.0 - LIMIT + 0.001)) == (False, False)
    assert history_check((0, 12.0), (4 * YEAR, 12.0), (5 * YEAR, 12.0 - LIMIT - 0.001)) == (False, True)


def test_places_are_kept_apart_and_order_does_not_matter() -> None:
    place = np.array([1, 0, 1, 0])
    day = np.array([YEAR, YEAR, 0.0, 0.0])
    wall = np.array([12.0, 20.0, 12.1, 14.0])
    found = against_history(place, day, wall, np.full(4, 0.25))
    assert found.gain.tolist() == [False, True, False, False]
    assert found.last_mm[:2].tolist() == [12.1, 14.0]
    assert np.isnan(found.last_mm[2:]).all()
