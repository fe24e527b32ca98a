"""What the rules of an appraisal leave to the reader, and slips that were made once."""

from __future__ import annotations

import math
from datetime import date
from typing import Any

import numpy as np
import pytest
from invented import Fleet, codes, location_of, one_cylinder, ordinal, part_of

from fleet.appraisal.groups import any_by, greatest_by, least_by, place_of_least
from fleet.appraisal.inputs import (
    DEFAULT_RATE_FLOOR_MM_PER_YEAR,
    DEFAULT_READING_ERROR_MM,
    DEFAULT_WINDOW_DAYS,
    Settings,
)
from fleet.rules import load_rule_set
from fleet.thinning.clock import DAYS_PER_YEAR


def test_new_metal_elsewhere_does_not_hide_a_visit_to_a_location_that_stands_before_it() -> None:
    fleet = one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.8))
    fleet.read(0, ("2024-01-01", None), result="no echo")
    fleet.location(0, "L2")
    fleet.read(1, ("2012-01-01", 13.0), ("2024-01-01", 12.9))
    fleet.restart(1, "new metal", "2011-06-01")
    view = fleet.view()
    assert "no echo at last visit" in codes(view.gaps)
    assert view.standing == "no verdict"


def test_a_location_never_read_is_a_gap_and_leaves_its_part_to_the_others() -> None:
    fleet = one_cylinder(("2010-01-01", 13.0), ("2025-01-01", 12.9), next_survey_day=ordinal("2028-01-01"))
    fleet.location(0, "L2")
    view = fleet.view()
    assert view.standing == "rating held"
    assert "location never measured" in codes(view.gaps)
    assert location_of(view, name="L2").standing == "no verdict"


def test_the_timetable_stands_on_the_anniversaries_of_the_as_of_date() -> None:
    table = one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.0)).appraise("2024-02-29").timetable(4)
    assert table.years == (date(2025, 2, 28), date(2026, 2, 28), date(2027, 2, 28), date(2028, 2, 29))
    assert table.mawp_mpa.shape == (1, 4)
    assert (np.diff(table.mawp_mpa) <= 0).all()


def test_an_unknown_edition_is_doubted_only_where_a_thick_form_serves() -> None:
    thin = one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.0), code_edition="")
    assert "edition unknown" not in codes(thin.view().doubts)
    # 60 MPa on 100 mm: 0.385·S·E = 38.5 MPa is passed
    thick = Fleet()
    thick.vessel(code_edition="", nameplate_mawp_mpa=60.0, design_pressure_mpa=60.0)
    thick.part(inside_diameter_mm=100.0, nominal_thickness_mm=60.0)
    thick.location()
    thick.read(0, ("2010-01-01", 60.0), ("2020-01-01", 59.0))
    assert "edition unknown" in codes(thick.view().doubts)


def test_only_the_points_that_decide_are_named_for_re_gauging() -> None:
    # both locations lost 0.5 mm in the last two years after 0.4 in eight; only the first is near its required wall
    fleet = Fleet()
    fleet.vessel(nameplate_mawp_mpa=2.2, design_pressure_mpa=2.2)
    fleet.part(nominal_thickness_mm=14.0)
    fleet.location(0, "near")
    fleet.read(0, ("2015-01-01", 14.0), ("2023-01-01", 13.6), ("2025-01-01", 13.1))
    fleet.part(0, "head", shape="sphere")
    fleet.location(1, "far")
    fleet.read(1, ("2015-01-01", 14.0), ("2023-01-01", 13.6), ("2025-01-01", 13.1))
    view = fleet.view()
    assert "re-gauge" in view.flags
    assert [str(place) for place in view.re_gauge] == ["shell / near"]
    assert view.re_gauge_by is not None


def test_a_rate_chosen_before_a_restart_counts_among_the_old_ones() -> None:
    fleet = one_cylinder(("2010-01-01", 14.0), ("2018-01-01", 13.6))
    fleet.decide(0, "chosen rate", "2018-06-01", rate_mm_per_year=0.4, review_day=math.inf, second_by="B")
    fleet.restart(0, "new service", "2019-01-01")
    fleet.read(0, ("2023-01-01", 13.5))
    place = location_of(fleet.view())
    assert place.rate_basis == "before restart"
    assert place.planning_rate_mm_per_year == pytest.approx(0.4)


def test_a_given_limit_below_the_current_mawp_is_rating_short_and_never_held() -> None:
    fleet = Fleet()
    fleet.vessel()
    fleet.part(other_pressure_limit_mpa=0.8)
    fleet.location()
    fleet.read(0, ("2015-01-01", 13.0), ("2025-01-01", 12.0))
    view = fleet.view()
    assert view.standing == "rating short"
    assert view.mawp_today_mpa == pytest.approx(0.8)
    assert view.rating_holds_until == date(2025, 1, 1)  # the last observation: no wall makes it hold


def test_pressures_are_carried_as_somebody_wrote_them() -> None:
    fleet = one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.0), nameplate_mawp_written="145 psi")
    fleet.relief_devices.append(
        {"vessel": 0, "device": "PSV-1", "set_pressure_mpa": 0.9, "written": "130 psi"}
    )
    view = fleet.view()
    assert view.written == {"nameplate_mawp": "145 psi"}
    assert view.relief[0].written == "130 psi"


def test_the_pressure_formula_stands_beside_the_thickness_formula() -> None:
    part = part_of(one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.0)).view())
    assert any(name.endswith("thickness_outside") for name in part.formulas)
    assert any("pressure" in name for name in part.formulas)


def test_groups_without_rows_have_nothing() -> None:
    values, group = np.array([2.0, np.nan, 5.0]), np.array([0, 0, 2])
    assert np.array_equal(least_by(values, group, 4), [2.0, np.nan, 5.0, np.nan], equal_nan=True)
    assert np.array_equal(greatest_by(values, group, 4), [2.0, np.nan, 5.0, np.nan], equal_nan=True)
    assert place_of_least(values, group, 4).tolist() == [0, -1, 2, -1]
    assert any_by(np.array([True, False, True]), group, 4).tolist() == [True, False, True, False]


BLANKS = ("allowable_stress_mpa", "inside_diameter_mm", "nominal_thickness_mm", "joint_efficiency_long",
          "joint_efficiency_circ", "static_head_mpa")  # fmt: skip


@pytest.mark.parametrize("blank", BLANKS)
def test_no_blank_datum_moves_a_due_date_later(blank: str) -> None:
    """The whole vessel is due by its half life; with a datum missing the date is unknown, or past all the same."""

    def fleet(**changes: Any) -> Fleet:
        made = Fleet()
        made.vessel(inspected="2022-01-01", nameplate_mawp_mpa=1.8, design_pressure_mpa=1.8)
        made.part(**changes)
        made.location()
        made.read(0, ("2016-01-01", 13.0), ("2021-01-01", 11.5), ("2025-01-01", 9.9))
        return made

    whole, lacking = fleet().view(), fleet(**{blank: math.nan}).view()
    # 1.8·514/(100 + 0.4·1.8) = 9.186; (9.9 − 9.186)/0.4 = 1.785 years, under four: the full life
    assert whole.internal_due_on == date(2026, 10, 15)
    for before, after in (
        (whole.internal_due_on, lacking.internal_due_on),
        (whole.external_due_on, lacking.external_due_on),
    ):
        assert after is None or (before is not None and after <= before)
    assert lacking.internal_interval_years is None
    assert "due date not known" in codes(lacking.gaps)


def test_a_due_date_that_is_past_at_the_latest_is_told_and_overdue_all_the_same() -> None:
    fleet = one_cylinder(("2010-01-01", 13.0), ("2015-01-01", 12.9), inspected="2010-01-01")
    fleet.parts[0]["allowable_stress_mpa"] = math.nan
    view = fleet.view()
    assert view.internal_due_on == date(2020, 1, 1)
    assert "overdue" in view.flags


def test_of_two_diameters_that_disagree_the_worse_counts_and_is_doubted() -> None:
    def view(**changes: Any) -> tuple[float | None, list[str]]:
        fleet = Fleet()
        fleet.vessel()
        fleet.part(**changes)
        fleet.location()
        fleet.read(0, ("2015-01-01", 13.0), ("2025-01-01", 12.9))
        seen = fleet.view()
        return part_of(seen).required_thickness_mm, codes(seen.doubts)

    agreeing, quiet = view(inside_diameter_mm=1500.0, outside_diameter_mm=1528.0)
    lower, said = view(inside_diameter_mm=1500.0, outside_diameter_mm=1510.0)
    higher, said_too = view(inside_diameter_mm=1500.0, outside_diameter_mm=1600.0)
    assert "diameters disagree" not in quiet
    assert "diameters disagree" in said
    assert "diameters disagree" in said_too
    assert lower == pytest.approx(agreeing)
    assert agreeing is not None
    assert higher is not None
    assert higher > agreeing


def test_a_planned_survey_that_is_past_is_as_good_as_none() -> None:
    fleet = one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.9), next_survey_day=ordinal("2020-01-01"))
    assert [gap.found for gap in fleet.view().gaps if gap.code == "no planned survey"] == [
        "next_survey_on 2020-01-01 is past"
    ]


def clad(*readings: tuple[str, float, str], counts: str = "no") -> Fleet:
    fleet = Fleet()
    fleet.vessel()
    fleet.part(lining="overlay", lining_thickness_mm=3.0, lining_counts_in_strength=counts)
    fleet.location()
    for day, thickness, includes in readings:
        fleet.read(0, (day, thickness), includes_lining=includes)
    return fleet


def test_an_earlier_reading_that_might_be_the_least_needs_its_word_on_the_lining() -> None:
    # 13.0 may be 10.0 of metal and 3.0 of overlay, below the 12.5 that the last reading leaves
    view = clad(("2010-01-01", 13.0, ""), ("2020-01-01", 15.5, "yes")).view()
    assert view.standing == "no verdict"
    assert "lining not told" in codes(view.gaps)


def test_readings_that_disagree_about_a_lining_that_counts_give_no_verdict() -> None:
    mixed = clad(("2010-01-01", 14.0, "no"), ("2020-01-01", 14.5, "yes"), counts="yes").view()
    assert mixed.standing == "no verdict"
    agreed = clad(("2010-01-01", 17.0, "yes"), ("2020-01-01", 16.8, "yes"), counts="yes").view()
    assert agreed.standing != "no verdict"


def test_a_wall_outside_every_form_today_is_no_verdict_with_a_gap() -> None:
    # membrane, 500 mm inside radius when new: r/t falls to 10 at t = 46.7 of an outside radius of 514
    fleet = Fleet()
    fleet.vessel(design_code="membrane", nameplate_mawp_mpa=2.0, next_survey_day=ordinal("2034-01-01"))
    fleet.part()
    fleet.location()
    fleet.read(0, ("2015-01-01", 47.5), ("2025-12-01", 47.0))
    view = fleet.view()
    assert view.mawp_today_mpa is None
    assert view.standing == "no verdict"
    assert "outside formula limits" in codes(view.gaps)


def test_a_lapsed_nearer_choice_hides_no_wider_one_that_stands() -> None:
    fleet = one_cylinder(("2015-01-01", 13.0), ("2024-01-01", 12.5))
    fleet.decide(0, "chosen rate", "2025-01-01", rate_mm_per_year=0.3, review_day=ordinal("2030-01-01"))
    fleet.decide(0, "chosen rate", "2025-02-01", part=0, location=0, rate_mm_per_year=0.1, second_by="B",
                 review_day=ordinal("2025-06-01"))  # fmt: skip
    place = location_of(fleet.view())
    assert (place.rate_basis, place.planning_rate_mm_per_year) == ("chosen", 0.3)


def test_no_pressure_is_promised_where_there_is_no_verdict() -> None:
    fleet = one_cylinder(("2015-01-01", 13.0), ("2024-01-01", 12.5))
    fleet.read(0, ("2025-01-01", None), result="no echo")
    ways = fleet.view().ways_out
    assert ways is not None
    assert ways.pressure_that_reaches_mpa is None


def test_a_baseline_at_nominal_is_no_visit() -> None:
    fleet = one_cylinder(("2010-01-01", 13.0), ("2020-01-01", 12.8), next_survey_day=ordinal("2028-01-01"))
    fleet.location(0, "L2")
    fleet.read(1, ("2022-01-01", 14.0), kind="baseline")
    view = fleet.view()
    assert "part not read at last visit" not in codes(view.gaps)
    assert view.standing == "rating held"


def test_no_date_of_a_withheld_formula_stands_for_the_whole_part() -> None:
    # membrane, D 1000, t 100: at 10 MPa the hoop wall is outside the thin form; the axial wall alone says nothing
    fleet = Fleet()
    fleet.vessel(design_code="membrane", nameplate_mawp_mpa=12.0)
    fleet.vessels[0]["current_mawp_mpa"] = 5.0
    fleet.part(nominal_thickness_mm=100.0)
    fleet.location()
    fleet.read(0, ("2015-01-01", 30.0), ("2025-12-01", 29.0))
    fleet.relieve(0, 10.5)
    assert fleet.view().relief[0].reset_by_on is None


def test_an_inspection_without_extent_does_not_count_and_says_so() -> None:
    fleet = one_cylinder(("2015-01-01", 13.0), ("2024-01-01", 12.9), inspected="2018-01-01")
    fleet.inspect(0, "internal", "2023-01-01", extent="")
    view = fleet.view()
    assert view.internal_due_on == date(2028, 1, 1)
    assert "inspection extent blank" in codes(view.gaps)


def test_the_choices_of_the_project_stand_once() -> None:
    choices = load_rule_set("choices")
    assert choices["days_per_year"] == DAYS_PER_YEAR
    assert choices["reading_error_mm"] == DEFAULT_READING_ERROR_MM
    assert choices["observation_window_days"] == DEFAULT_WINDOW_DAYS
    assert choices["rate_floor_mm_per_year"] == DEFAULT_RATE_FLOOR_MM_PER_YEAR
    assert choices["list_life_years"] == Settings().list_life_years
