"""Readings into observations, all locations at once; the rules themselves are tested on whole vessels."""

from __future__ import annotations

import itertools

import numpy as np

from fleet.thinning.observations import Measured, Observations, observations


def gather(
    *rows: tuple[int, float, float], locations: int = 1, queried: tuple[int, ...] = ()
) -> Observations:
    count = len(rows)
    return observations(
        Measured(
            location=np.array([row[0] for row in rows], dtype=np.int64),
            day=np.array([row[1] for row in rows], dtype=np.float64),
            wall_mm=np.array([row[2] for row in rows], dtype=np.float64),
            error_mm=np.full(count, 0.25),
            queried=np.array([number in queried for number in range(count)], dtype=np.bool_),
            span=np.zeros(count, dtype=np.int64),
            metal=np.zeros(count, dtype=np.int64),
        ),
        locations,
        np.full(locations, 14.0),
        np.full(locations, 90.0),
    )


def test_rule_1_1_locations_are_walked_side_by_side() -> None:
    found = gather((1, 10, 12.0), (0, 0, 11.0), (1, 50, 11.5), (0, 200, 10.9), (1, 200, 11.4), locations=2)
    assert found.location.tolist() == [0, 0, 1, 1]
    assert found.day.tolist() == [0, 200, 50, 200]
    assert found.wall_mm.tolist() == [11.0, 10.9, 11.5, 11.4]


def test_rule_1_2_the_row_of_the_least_reading_is_kept() -> None:
    assert gather((0, 0, 12.0), (0, 10, 11.7), (0, 20, 11.9)).reading.tolist() == [1]


def test_rule_1_1_the_order_of_the_rows_does_not_matter() -> None:
    rows = ((0, 0.0, 12.0), (0, 30.0, 12.9), (0, 60.0, 11.5), (0, 100.0, 11.6))
    found = {
        tuple(zip(seen.day.tolist(), seen.wall_mm.tolist(), strict=True))
        for seen in (gather(*order) for order in itertools.permutations(rows))
    }
    # 11.5 is 1.4 below the 12.9 before it and stands alone; 11.6 comes within 90 days of it
    assert found == {((0.0, 12.0), (60.0, 11.5))}


def test_rule_1_7_a_reading_left_out_is_told() -> None:
    found = gather((0, 0, 12.0), (0, 200, 13.0), (0, 400, 11.0), queried=(1, 2))
    assert found.counted.tolist() == [True, False, True]


def test_rule_1_7_without_readings_there_is_no_observation() -> None:
    assert gather().day.tolist() == []
