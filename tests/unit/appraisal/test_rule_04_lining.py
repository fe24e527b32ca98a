"""Rule 4: the wall in strength of a lined part.

Base metal 14 mm nominal, lining 3 mm. The shell needs 514 / 100.4 = 5.1195 mm.
"""

from __future__ import annotations

from typing import Any

import pytest
from invented import Fleet, codes, location_of

NEEDED = 514 / 100.4
READ = (("2020-01-01", 12.8), ("2024-01-01", 12.0))


def clad(includes: str | None, *taken: tuple[str, float | None], **part: Any) -> Fleet:
    """Give a clad shell; `taken` defaults to 0.8 mm lost in 4 years."""
    fleet = Fleet()
    fleet.vessel()
    columns: dict[str, Any] = {
        "lining": "integral clad", "lining_thickness_mm": 3.0, "lining_counts_in_strength": "no"
    }  # fmt: skip
    fleet.part(**(columns | part))
    fleet.location()
    fleet.read(0, *(taken or READ), includes_lining=includes)
    return fleet


def strength_of(fleet: Fleet) -> float | None:
    return location_of(fleet.view()).wall_in_strength_mm


@pytest.mark.parametrize(
    ("includes", "counts", "lining", "wall"),
    [
        ("yes", "no", 3.0, 9.0),  # 12.0 less the lining
        ("yes", "", 3.0, 9.0),  # no word: does not count
        ("yes", "yes", 3.0, 12.0),
        ("no", "no", 3.0, 12.0),
        ("no", "", 3.0, 12.0),
        ("no", "yes", 3.0, 12.0),  # what was not read is not added
        ("no", "no", None, 12.0),
        ("no", "yes", None, 12.0),
        ("yes", "yes", None, 12.0),
        ("yes", "no", None, None),  # the lining cannot be taken off
        ("yes", "", None, None),
        ("", "no", 3.0, None),
        ("", "yes", 3.0, None),
        ("", "", 3.0, None),
        ("", "", None, None),
    ],
)
def test_rule_4_1_clad_wall_in_every_combination(
    includes: str, counts: str, lining: float | None, wall: float | None
) -> None:
    fleet = clad(includes, lining_thickness_mm=lining, lining_counts_in_strength=counts)
    assert strength_of(fleet) == wall
    assert (fleet.view().standing == "no verdict") is (wall is None)


def test_rule_4_1_life_rests_on_the_wall_in_strength() -> None:
    # 9.0 mm of base metal, 0.2 mm/year
    assert location_of(clad("yes").view()).remaining_life_years == pytest.approx((9.0 - NEEDED) / 0.2)


def test_rule_4_1_what_was_read_is_shown_as_read() -> None:
    assert location_of(clad("yes").view()).last_thickness_mm == 12.0


def test_rule_4_1_readings_with_and_without_the_lining_make_one_history() -> None:
    # 12.8 with, 9.0 without: 9.8 to 9.0
    fleet = clad("yes", ("2020-01-01", 12.8))
    fleet.read(0, ("2024-01-01", 9.0), includes_lining="no")
    assert location_of(fleet.view()).long_term_rate_mm_per_year == pytest.approx(0.2)


@pytest.mark.parametrize("lining", ["overlay", "strip", "rubber", "glass", "refractory", "paint"])
def test_rule_4_1_every_lining_that_does_not_count_is_taken_off(lining: str) -> None:
    assert strength_of(clad("yes", lining=lining)) == 9.0


def test_rule_4_2_lined_and_no_word_gives_no_verdict_and_a_gap() -> None:
    view = clad("").view()
    assert view.standing == "no verdict"
    assert "lining not told" in codes(view.gaps)
    place = location_of(view)
    assert (place.remaining_life_years, place.mawp_today_mpa, place.projected_thickness_mm) == (
        None,
        None,
        None,
    )


def test_rule_4_2_a_blank_lining_thickness_is_a_gap_where_it_is_needed() -> None:
    assert "lining thickness blank" in codes(clad("yes", lining_thickness_mm=None).view().gaps)


def test_rule_4_2_no_verdict_also_where_the_wall_used_is_of_an_earlier_reading_without_word() -> None:
    # the least, 9.0, may include 3 mm of lining; the last says 9.5 without it
    fleet = clad("", ("2020-01-01", 9.0))
    fleet.read(0, ("2024-01-01", 9.5), includes_lining="no")
    assert fleet.view().standing == "no verdict"


def test_rule_4_3_nominal_and_diameters_are_those_of_the_base_metal() -> None:
    # outside radius of the base metal 500 + 14: P·Ro / (S·E + 0.4·P)
    assert location_of(clad("yes").view()).required_thickness_mm == pytest.approx(NEEDED)


@pytest.mark.parametrize(("counts", "includes", "nominal"), [("no", "no", 14.0), ("yes", "yes", 17.0)])
def test_rule_4_3_a_lining_that_counts_is_added_to_nominal(
    counts: str, includes: str, nominal: float
) -> None:
    # one reading, 11.6 mm, 24 years after in-service
    view = clad(includes, ("2024-01-01", 11.6), lining_counts_in_strength=counts).view()
    assert location_of(view).planning_rate_mm_per_year == pytest.approx((nominal - 11.6) / 24)


def test_rule_4_3_a_baseline_of_base_metal_and_counting_lining_is_nominal() -> None:
    fleet = clad("yes", ("2024-01-01", 16.0), lining_counts_in_strength="yes")
    fleet.read(0, ("2004-01-01", 17.0), kind="baseline", includes_lining="yes")
    assert "baseline equals nominal" in codes(fleet.view().doubts)


def test_rule_4_4_lining_blank_is_taken_as_none_with_a_gap() -> None:
    fleet = clad("yes", lining="", lining_thickness_mm=None, lining_counts_in_strength="")
    assert strength_of(fleet) == 12.0
    assert "lining blank" in codes(fleet.view().gaps)
    assert "lining blank" not in codes(clad("yes", lining="none").view().gaps)


def test_rule_4_5_external_design_pressure_blank_is_taken_as_none_with_a_gap() -> None:
    fleet = clad("yes")
    assert "external pressure blank" not in codes(fleet.view().gaps)
    standing = fleet.view().standing
    fleet.vessels[0]["external_design_pressure_mpa"] = None
    assert "external pressure blank" in codes(fleet.view().gaps)
    assert fleet.view().standing == standing
