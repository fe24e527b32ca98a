"""Days that count, reckoned on the fingers."""

from __future__ import annotations

import numpy as np
import pytest

from fleet.thinning.clock import ServiceClock, whole_days

NO = np.array([], dtype=np.int64)
ONE = np.array([0], dtype=np.int64)


def clock(*spans: tuple[int, float, float], as_of: float = 10_000.0) -> ServiceClock:
    return ServiceClock.of(
        np.array([span[0] for span in spans], dtype=np.int64),
        np.array([span[1] for span in spans], dtype=np.float64),
        np.array([span[2] for span in spans], dtype=np.float64),
        as_of,
    )


def day(value: float) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    return np.array([value])


@pytest.mark.parametrize(("years", "days"), [(0.5, 182), (1.0, 365), (4.0, 1461), (10.0, 3652), (0.0, 0)])
def test_rule_0_3_whole_days_are_rounded_down(years: float, days: float) -> None:
    assert whole_days([years]).tolist() == [days]


def test_without_idle_days_both_clocks_agree() -> None:
    assert clock().service_day(ONE, day(500.0)).tolist() == [500.0]
    assert clock().calendar_day(ONE, day(500.0)).tolist() == [500.0]


@pytest.mark.parametrize(
    ("calendar", "service"),
    [
        (99, 99),
        (100, 100),
        (101, 100),
        (150, 100),
        (151, 101),
        (300, 250),
        (301, 250),
        (320, 250),
        (321, 251),
    ],
)
def test_rule_14_1_idle_days_do_not_move_the_service_day(calendar: float, service: float) -> None:
    # idle from day 100 until day 150, and from 300 until 320
    two = clock((0, 100, 150), (0, 300, 320))
    assert two.service_day(ONE, day(calendar)).tolist() == [service]


@pytest.mark.parametrize(("service", "calendar"), [(99, 99), (100, 100), (101, 151), (250, 300), (251, 321)])
def test_rule_14_2_a_service_day_is_reached_on_the_earliest_calendar_day(
    service: float, calendar: float
) -> None:
    two = clock((0, 100, 150), (0, 300, 320))
    assert two.calendar_day(ONE, day(service)).tolist() == [calendar]


def test_rule_14_3_an_open_span_ends_with_the_as_of_date() -> None:
    still = clock((0, 100, float("nan")), as_of=130)
    assert still.service_day(ONE, day(200.0)).tolist() == [170.0]


def test_rule_14_3_a_span_that_begins_after_the_as_of_date_is_left_out() -> None:
    assert clock((0, 100, 150), as_of=100).service_day(ONE, day(200.0)).tolist() == [200.0]


@pytest.mark.parametrize("spans", [((0, 100, 140), (0, 120, 150)), ((0, 100, 150), (0, 110, 120)),
                                   ((0, 120, 150), (0, 100, 120))])  # fmt: skip
def test_rule_14_1_overlapping_and_touching_spans_count_once(
    spans: tuple[tuple[int, float, float], ...],
) -> None:
    assert clock(*spans).service_day(ONE, day(200.0)).tolist() == [150.0]


def test_rule_14_1_every_vessel_has_its_own_clock() -> None:
    two = clock((1, 100, 150), (2, 100, 160))
    vessels = np.array([0, 1, 2, 3], dtype=np.int64)
    assert two.service_day(vessels, np.full(4, 200.0)).tolist() == [200.0, 150.0, 140.0, 200.0]
    assert two.calendar_day(vessels, np.full(4, 200.0)).tolist() == [200.0, 250.0, 260.0, 200.0]


def test_rule_0_5_years_between_are_never_negative() -> None:
    assert clock().years_between(ONE, day(500.0), day(100.0)).tolist() == [0.0]


def test_rule_0_2_years_between_are_days_over_365_and_a_quarter() -> None:
    assert clock().years_between(ONE, day(0.0), day(1461.0)).tolist() == [4.0]
    assert clock((0, 100, 465.25)).years_between(ONE, day(0.0), day(1461.0)).tolist() == [3.0]


def test_what_is_unknown_stays_unknown() -> None:
    for one in (clock(), clock((0, 100, 150))):
        assert np.isnan(one.years_between(ONE, day(float("nan")), day(1.0))).all()
        assert np.isnan(one.later(ONE, day(100.0), day(float("nan")))).all()


def test_rule_14_2_later_counts_service_years_and_gives_a_calendar_day() -> None:
    # one year from day 90: 10 days, then 50 idle, then 355
    assert clock((0, 100, 150)).later(ONE, day(90.0), day(1.0)).tolist() == [90 + 365 + 50]


def test_no_date_lies_beyond_the_calendar() -> None:
    assert clock().later(ONE, day(700_000.0), day(1e6)).tolist() == [3652059.0]
