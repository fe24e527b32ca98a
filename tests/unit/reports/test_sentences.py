"""What is said of one vessel: relief, operating pressure, interval; nothing half known told as the whole."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date

import pytest

from fleet import units, words
from fleet.appraisal.views import LocationView, PartView, Place, ReliefView, VesselView
from fleet.reports.figures import Figures
from fleet.reports.known import NOT_ASSESSED, known_only, measured_words, speaks_for
from fleet.reports.sentences import (
    NO_LIFE_LEFT,
    cap_sentence,
    interval_words,
    operating_sentence,
    plateau_sentence,
    quiet_relief,
    relief_sentences,
)
from fleet.words import notice

Maker = Callable[..., VesselView]
SI, US = Figures(units.SI), Figures(units.US)


def test_relief_is_told_now_before_later_and_in_the_units_of_the_reader(make_vessel: Maker) -> None:
    view = make_vessel(
        mawp_today_mpa=1.5,
        relief=(
            ReliefView("B", 1.4, None, date(2029, 5, 1)),
            ReliefView("A", 1.6, words.RELIEF_ABOVE_NOW, None),
            ReliefView("C", 1.0, None, None),
        ),
    )
    assert [sentence.text for sentence in relief_sentences(view, US)] == [
        "A (233 psi) is set above what the wall carries today, 217 psi.",
        "B (204 psi) is to be reset by 2029-05-01.",
    ]
    assert quiet_relief(view, US) == ["C (146 psi) is set no higher than what the wall carries today."]


def test_a_setting_is_never_said_to_be_carried_where_the_wall_is_not_known(make_vessel: Maker) -> None:
    relief = (ReliefView("c-1", 1.0, None, None),)
    assert quiet_relief(make_vessel(mawp_today_mpa=None, relief=relief), SI) == [
        "c-1 (1.000 MPa) cannot be held against the wall: what that carries is not known."
    ]
    assert quiet_relief(make_vessel(mawp_today_mpa=0.9, relief=relief), SI) == [
        "c-1 (1.000 MPa) is set higher than 0.900 MPa, which the wall carries today."
    ]


@pytest.mark.parametrize(
    ("written", "si", "us"),
    [
        ("261 psi", "A (1.800 MPa, written 261 psi)", "A (261 psi)"),
        ("261 psig", "A (1.800 MPa, written 261 psig)", "A (261 psi)"),
        ("17.995 bar(g)", "A (1.800 MPa, written 17.995 bar(g))", "A (261 psi, written 17.995 bar(g))"),
        ("1.7995 MPa", "A (1.800 MPa)", "A (261 psi, written 1.7995 MPa)"),
        ("", "A (1.800 MPa)", "A (261 psi)"),
    ],
)
def test_a_setting_in_another_unit_is_printed_as_written(
    make_vessel: Maker, written: str, si: str, us: str
) -> None:
    view = make_vessel(relief=(ReliefView("A", 1.7995, None, date(2030, 1, 1), written),))
    for figures, expected in ((SI, si), (US, us)):
        [sentence] = relief_sentences(view, figures)
        assert sentence.text == f"{expected} is to be reset by 2030-01-01."


def test_operating_pressure_likewise(make_vessel: Maker) -> None:
    above = make_vessel(
        operating_above_today=True, mawp_today_mpa=1.2, written={"operating_pressure": "13.5 bar"}
    )
    assert operating_sentence(above, SI) == (
        "It operates at 1.350 MPa (written 13.5 bar), above what the wall carries today, 1.200 MPa."
    )
    until = make_vessel(operating_until=date(2031, 2, 3))
    assert (
        operating_sentence(until, SI)
        == "The wall carries its operating pressure of 1.350 MPa until 2031-02-03."
    )
    assert operating_sentence(make_vessel(operating_pressure_mpa=None), SI) == ""


@pytest.mark.parametrize("standing", [words.BELOW_REQUIRED, words.USED_UP])
def test_a_wall_below_required_is_said_beside_every_pressure_that_it_carries(
    make_vessel: Maker, standing: str
) -> None:
    view = make_vessel(
        standing=standing,
        operating_until=date(2029, 7, 1),
        relief=(ReliefView("sv-1", 1.5, None, date(2028, 1, 1)), ReliefView("sv-2", 1.4, None, None)),
    )
    said = [
        operating_sentence(view, SI),
        *(sentence.text for sentence in relief_sentences(view, SI)),
        *quiet_relief(view, SI),
    ]
    assert said == [
        (
            "By pressure alone, the wall carries its operating pressure of 1.350 MPa until 2029-07-01; "
            "the wall is below what is required."
        ),
        "By pressure alone, sv-1 (1.500 MPa) is to be reset by 2028-01-01; the wall is below what is required.",
        (
            "By pressure alone, sv-2 (1.400 MPa) is set no higher than what the wall carries today; "
            "the wall is below what is required."
        ),
    ]


def test_a_minimum_that_comes_before_the_pressure_is_said(
    make_vessel: Maker, make_part: Callable[..., PartView], make_location: Callable[..., LocationView]
) -> None:
    part = make_part("shell course 1", make_location("L-01", required_by="structural"))
    view = make_vessel(parts=(part,), parts_total=1, operating_until=date(2050, 1, 1))
    assert operating_sentence(view, SI) == (
        "By pressure alone, the wall carries its operating pressure of 1.350 MPa until 2050-01-01; "
        "a minimum that is no matter of pressure is reached on 2045-03-02."
    )
    sooner = make_vessel(parts=(part,), parts_total=1, operating_until=date(2040, 1, 1))
    assert operating_sentence(sooner, SI).startswith("The wall carries")


def test_of_known_parts_only_nothing_is_said_without_saying_so(make_vessel: Maker) -> None:
    half = make_vessel(
        parts_total=6,
        operating_until=date(2031, 2, 3),
        relief=(ReliefView("sv-1", 1.5, None, date(2028, 1, 1)),),
    )
    assert operating_sentence(half, SI).startswith(
        f"Known parts only, {half.parts_known} of 6: the wall carries"
    )
    assert relief_sentences(half, SI)[0].text.startswith(
        f"Known parts only, {half.parts_known} of 6: sv-1 (1.5"
    )
    both = make_vessel(standing=words.USED_UP, parts_total=6, operating_until=date(2031, 2, 3))
    assert operating_sentence(both, SI).startswith(
        f"By pressure alone, known parts only, {both.parts_known} of 6: the wall"
    )


def test_measured_parts_only_is_said_when_a_part_is_missing(make_vessel: Maker) -> None:
    vessel = make_vessel(parts_total=6)
    assert vessel.parts_known < 6
    assert measured_words(vessel) == speaks_for(vessel) == f"measured parts only: {vessel.parts_known} of 6"
    whole = make_vessel(parts_total=vessel.parts_known)
    assert measured_words(whole) == f"{vessel.parts_known} of {vessel.parts_known}"
    assert (speaks_for(whole), known_only(whole)) == ("", "")


def test_where_all_parts_are_measured_the_figures_leave_out_what_was_not_assessed(make_vessel: Maker) -> None:
    total = make_vessel().parts_known
    denied = make_vessel(standing=words.NO_VERDICT, parts_total=total)
    assert speaks_for(denied) == known_only(denied) == NOT_ASSESSED
    worse = make_vessel(
        standing=words.RATING_SHORT, parts_total=total, gaps=(notice("vacuum not assessed", "-", "-"),)
    )
    assert speaks_for(worse) == NOT_ASSESSED
    assert not speaks_for(make_vessel(parts_total=total, gaps=(notice("no planned survey", "-", "-"),)))


def test_on_the_plateau_both_intervals_are_told(make_vessel: Maker) -> None:
    view = make_vessel(clause_interval_years=2.0, half_life_on_plateau_years=1.58)
    assert plateau_sentence(view, SI) == (
        "The clause allows an interval of 2.0 years; with twice the loss the rating holds only to half life, 1.5 years."
    )
    assert plateau_sentence(make_vessel(), SI) == ""


def test_where_no_life_is_left_no_interval_is_allowed(make_vessel: Maker) -> None:
    place = Place("shell course 1", "L-01")
    view = make_vessel(
        clause_interval_years=0.0,
        half_life_on_plateau_years=0.0,
        internal_interval_years=0.0,
        governing_due=place,
    )
    assert plateau_sentence(view, SI) == NO_LIFE_LEFT
    assert interval_words(view, SI) == "no interval is left at shell course 1 / L-01"


def test_the_interval_stands_beside_the_date_from_which_it_counts(
    make_vessel: Maker, make_part: Callable[..., PartView], make_location: Callable[..., LocationView]
) -> None:
    by_place = make_vessel(
        governing_due=Place("shell course 1", "L-01"),
        internal_interval_years=3.72,
        internal_due_on=date(2029, 2, 27),
    )
    assert interval_words(by_place, SI) == "3.7 years from the last reading at shell course 1 / L-01"
    plain = make_vessel()
    assert interval_words(plain, SI) == "the cap of the rule set, counted from the last look: 10.0 years"
    assert cap_sentence(plain, SI) == ""
    first = make_vessel(internal_interval_years=3.72)
    assert cap_sentence(first, SI) == interval_words(first, SI)
    assert interval_words(first, SI) == (
        "the cap of the rule set, counted from the last look, comes first; "
        "half life allows 3.7 years from the last reading"
    )
    short = make_part("shell course 1", make_location(remaining_life_years=3.0, half_life_interval_years=2.0))
    by_rule = make_vessel(internal_interval_years=2.0, parts=(short,))
    assert "the short-life rule allows 2.0 years from the last reading" in interval_words(by_rule, SI)
    assert interval_words(make_vessel(internal_due_on=None), SI) == ""


def test_a_due_date_that_was_moved_is_not_explained_by_the_interval_alone(
    make_vessel: Maker, make_part: Callable[..., PartView], make_location: Callable[..., LocationView]
) -> None:
    cap = "the cap of the rule set, counted from"
    moves = "(a deferral or idle time on record moves it)"
    moved = make_vessel(internal_due_on=date(2030, 9, 1))
    assert interval_words(moved, SI) == f"{cap} the last look: 10.0 years {moves}"
    assert interval_words(make_vessel(last_internal_on=None), SI) == f"{cap} in-service: 10.0 years"
    unshown = (make_part("sump", make_location(half_life_interval_years=None)),)
    doubtful = make_vessel(internal_due_on=date(2030, 9, 1), parts=unshown)
    assert interval_words(doubtful, SI) == f"{cap} the last look {moves}"
