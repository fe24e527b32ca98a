"""Rule 14: days idle and protected are left out of every count of years; all others count.

From one 1 January of 2000, 2004, 2008, … to the next lie 1461 days, 4 years exactly. The shell needs 514 / 100.4 mm.
"""

from __future__ import annotations

from datetime import date, timedelta
from typing import Any

import numpy as np
import pytest
from invented import Fleet, codes, location_of, one_cylinder, ordinal

from fleet.intake.known import KnownRegister
from fleet.intake.results import Row
from fleet.tasks.columns import Tree
from fleet.tasks.record import idle_times
from fleet.tasks.starting import starting_values

NEEDED = 514 / 100.4
LINE = (("2012-01-01", 12.8), ("2020-01-01", 12.0))  # 0.8 mm in 8 calendar years


def idle_at(fleet: Fleet, begin: str, end: str | None) -> Fleet:
    fleet.idle.append({"vessel": 0, "from_day": ordinal(begin), "to_day": ordinal(end)})
    return fleet


def test_rule_14_1_idle_half_the_time_doubles_the_rate() -> None:
    place = location_of(idle_at(one_cylinder(*LINE), "2014-01-01", "2018-01-01").view())
    assert place.span_years == pytest.approx(4.0)
    assert place.long_term_rate_mm_per_year == pytest.approx(0.2)  # 0.8 mm in 4 years of service
    assert place.short_term_rate_mm_per_year == pytest.approx(0.2)
    assert place.least_measurable_rate_mm_per_year == pytest.approx(1.645 * 2**0.5 * 0.25 / 4)


def test_rule_14_1_spans_that_overlap_are_counted_once() -> None:
    fleet = idle_at(idle_at(one_cylinder(*LINE), "2014-01-01", "2017-01-01"), "2016-01-01", "2018-01-01")
    assert location_of(fleet.view()).span_years == pytest.approx(4.0)


def test_rule_14_1_the_idle_time_of_one_vessel_is_not_that_of_another() -> None:
    fleet = idle_at(one_cylinder(*LINE), "2014-01-01", "2018-01-01")
    fleet.vessel("V-2")
    fleet.part(1)
    fleet.location(1)
    fleet.read(1, *LINE)
    assert location_of(fleet.view(vessel=1)).long_term_rate_mm_per_year == pytest.approx(0.1)


def test_rule_14_1_no_metal_is_lost_while_idle_and_protected() -> None:
    # 0.1 mm/year; of the 4 years from 2020 to 2024 two (730 days) were idle
    fleet = idle_at(one_cylinder(*LINE), "2021-01-01", "2023-01-01")
    today = fleet.appraise("2024-01-01").judged.today_mm[0]
    assert today == pytest.approx(12.0 - 0.1 * (1461 - 730) / 365.25)


def test_rule_14_1_the_rate_from_nominal_leaves_them_out() -> None:
    # nominal 14 in 2000, 12.0 in 2020: 2 mm in 20 years less 4
    fleet = idle_at(one_cylinder(("2020-01-01", 12.0)), "2004-01-01", "2008-01-01")
    assert location_of(fleet.view()).planning_rate_mm_per_year == pytest.approx(2.0 / 16)


def test_rule_14_2_the_retirement_date_moves_by_the_idle_days() -> None:
    days = int((12.0 - NEEDED) / 0.1 * 365.25)
    moved = idle_at(one_cylinder(*LINE), "2021-01-01", "2023-01-01").view("2024-01-01")
    assert moved.retirement_on == date(2020, 1, 1) + timedelta(days + 730)
    assert location_of(moved).remaining_life_years == pytest.approx((12.0 - NEEDED) / 0.1)


def test_rule_14_2_the_half_life_date_moves_by_the_idle_days() -> None:
    # 0.6 mm/year: (11.2 - 5.1195) / 0.6 / 2 years = 1850.7 days
    line = (("2016-01-01", 13.6), ("2020-01-01", 11.2))
    assert one_cylinder(*line).view("2024-01-01").internal_due_on == date(2020, 1, 1) + timedelta(1850)
    fleet = idle_at(one_cylinder(*line), "2021-01-01", "2022-01-01")
    assert fleet.view("2024-01-01").internal_due_on == date(2020, 1, 1) + timedelta(1850 + 365)


def test_rule_14_2_the_caps_move_by_the_idle_days() -> None:
    fleet = idle_at(one_cylinder(*LINE), "2021-01-01", "2023-01-01")
    view = fleet.view("2024-01-01")
    assert view.internal_due_on == date(2020, 1, 1) + timedelta(3652 + 730)  # 10 years
    assert view.external_due_on == date(2020, 1, 1) + timedelta(1826 + 730)  # 5 years


def test_rule_14_2_a_date_reached_before_the_idle_time_does_not_move() -> None:
    fleet = idle_at(one_cylinder(*LINE), "2025-06-01", "2025-12-01")
    assert fleet.view("2026-01-01").external_due_on == date(2020, 1, 1) + timedelta(1826)  # 2024-12-31


def test_rule_14_3_days_after_the_as_of_date_all_count() -> None:
    still = idle_at(one_cylinder(*LINE), "2023-01-01", None).view("2024-01-01")
    until = idle_at(one_cylinder(*LINE), "2023-01-01", "2040-01-01").view("2024-01-01")
    assert still.internal_due_on == until.internal_due_on == date(2020, 1, 1) + timedelta(3652 + 365)
    assert still.retirement_on == until.retirement_on


def test_rule_14_4_idle_without_protection_counts_as_service() -> None:
    day = date(2014, 1, 1), date(2018, 1, 1)
    tree = Tree({}, {}, {}, {7: 0}, {}, {}, np.array([]), np.array([]))
    for state, spans in (("idle protected", 1), ("idle", 0), ("out of service", 0)):
        states: dict[str, list[Any]] = {
            "subject_id": [7, 7],
            "from_on": list(day),
            "state": [state, "in service"],
        }
        assert len(idle_times(tree, states)) == spans
    assert location_of(one_cylinder(*LINE, state="idle").view()).long_term_rate_mm_per_year == pytest.approx(
        0.1
    )


def test_rule_14_4_protected_that_turns_into_plain_idle_ends_there() -> None:
    tree = Tree({}, {}, {}, {7: 0}, {}, {}, np.array([]), np.array([]))
    found = idle_times(
        tree,
        {
            "subject_id": [7, 7],
            "from_on": [date(2014, 1, 1), date(2016, 1, 1)],
            "state": ["idle protected", "idle"],
        },
    )
    assert found.to_day.tolist() == [ordinal("2016-01-01")]


def test_rule_14_5_a_state_without_a_date_counts_from_the_day_of_its_load() -> None:
    row = Row({"vessel": "V-1", "state": "idle protected"}, {}, 2, "register.csv, row 2")
    made = starting_values(
        [("vessels", ("V-1",), True, row)], [], known=KnownRegister(), by="A", today=date(2024, 5, 6)
    )
    assert [(fact["state"], fact["from_on"]) for _, fact in made.states] == [
        ("idle protected", date(2024, 5, 6))
    ]


def test_rule_14_5_a_state_without_a_date_is_a_gap() -> None:
    assert "state without date" in codes(one_cylinder(*LINE, state="idle", state_undated=True).view().gaps)
    assert "state without date" not in codes(one_cylinder(*LINE, state="idle").view().gaps)
