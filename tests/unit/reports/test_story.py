"""The year's story: counts and figures in sentences, and the sum."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date

import pytest

from fleet import units, words
from fleet.appraisal.views import PartView, Place, ReliefView, VesselView
from fleet.reports.figures import Figures
from fleet.reports.reason import telling_place, why
from fleet.reports.source import AppraisalLike, blocks
from fleet.reports.story import (
    measured_words,
    operating_sentence,
    plateau_sentence,
    relief_sentences,
    story,
    the_sum,
)
from fleet.words import notice

Maker = Callable[..., VesselView]
SI, US = Figures(units.SI), Figures(units.US)


def test_the_sum_reconciles_list_and_register(appraisal: AppraisalLike) -> None:
    assert the_sum(blocks(appraisal.views())) == (
        "The register holds 12 vessels: 1 below required + 1 at required + 1 used up by its rate + 1 rating short "
        "+ 1 no verdict + 1 running out + 3 rating held + 1 re-gauge + 1 idle + 1 retired = 12."
    )


def test_the_story_tells_each_trouble_with_its_figures(appraisal: AppraisalLike) -> None:
    told = [sentence.text for sentence in story(appraisal, SI)]
    assert told[0] == (
        "On 2026-12-01 the register holds 12 vessels. Of the 11 not retired, 5 carry the current MAWP to the day "
        "on which each is next looked at."
    )
    for sentence in (
        "On D-101, PSV-101A (1.600 MPa) is set above what the wall carries today, 1.512 MPa.",
        "1 vessel falls short of the rating by the carry-to date: E-310 from 1.600 to 1.423 MPa by 2028-06-01.",
        "1 vessel is overdue: E-310.",
        "1 vessel is idle: K-5.",
        "1 vessel is retired: X-900.",
        "1 doubt and 2 gaps stand open; none of them improves a figure. Each is listed with what to do about it.",
        "No vessel stands in the block out of service.",
    ):
        assert sentence in told
    assert any("PSV-310 (1.600 MPa) on E-310 by 2027-09-14" in sentence for sentence in told)


def test_only_relief_above_today_gets_the_ochre_bar(appraisal: AppraisalLike) -> None:
    marked = [sentence.text for sentence in story(appraisal, SI) if sentence.relief_above_today]
    assert len(marked) == 1
    assert words.RELIEF_ABOVE_NOW in marked[0]


def test_the_story_names_six_tags_and_counts_the_rest(
    make_vessel: Maker, make_appraisal: Callable[..., AppraisalLike]
) -> None:
    many = tuple(make_vessel(f"V-{number}", block=words.IDLE) for number in range(9))
    told = [sentence.text for sentence in story(make_appraisal(many), SI)]
    assert "9 vessels are idle: V-0, V-1, V-2, V-3, V-4, V-5 and 3 more." in told


def test_an_empty_register_has_a_story_too(make_appraisal: Callable[..., AppraisalLike]) -> None:
    assert any(sentence.text == "The register holds no vessel." for sentence in story(make_appraisal(()), SI))


def test_a_rating_short_by_its_wall_is_not_told_as_a_drop_of_pressure(
    make_vessel: Maker, make_appraisal: Callable[..., AppraisalLike]
) -> None:
    by_wall = make_vessel("D-422", standing=words.RATING_SHORT)
    told = [sentence.text for sentence in story(make_appraisal((by_wall,)), SI)]
    assert (
        "1 vessel falls short of the rating by the carry-to date: D-422, whose wall is below the required "
        "thickness on 2028-06-01." in told
    )


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


def test_operating_pressure_likewise(make_vessel: Maker) -> None:
    above = make_vessel(operating_above_today=True, mawp_today_mpa=1.2)
    assert operating_sentence(above, SI) == (
        "It operates at 1.350 MPa, above what the wall carries today, 1.200 MPa."
    )
    until = make_vessel(operating_until=date(2031, 2, 3))
    assert (
        operating_sentence(until, SI)
        == "The wall carries its operating pressure of 1.350 MPa until 2031-02-03."
    )
    assert operating_sentence(make_vessel(operating_pressure_mpa=None), SI) == ""


def test_on_the_plateau_both_intervals_are_told(make_vessel: Maker) -> None:
    view = make_vessel(clause_interval_years=2.0, half_life_on_plateau_years=1.58)
    assert plateau_sentence(view, SI) == (
        "The clause allows an interval of 2.0 years; with twice the loss the rating holds only to half life, 1.5 years."
    )
    assert plateau_sentence(make_vessel(), SI) == ""
    assert plateau_sentence(make_vessel(clause_interval_years=0.0, half_life_on_plateau_years=0.0), SI) == ""


def test_measured_parts_only_is_said_when_a_part_is_missing(make_vessel: Maker) -> None:
    vessel = make_vessel(parts_total=6)
    assert vessel.parts_known < 6
    assert measured_words(vessel) == f"measured parts only: {vessel.parts_known} of 6"
    whole = make_vessel(parts_total=vessel.parts_known)
    assert measured_words(whole) == f"{vessel.parts_known} of {vessel.parts_known}"


@pytest.mark.parametrize(
    ("standing", "expected"),
    [
        (
            words.BELOW_REQUIRED,
            "the wall at shell course 1 / L-01 is 11.23 mm and 10.13 mm are required, set by hoop.",
        ),
        (
            words.AT_REQUIRED,
            (
                "the wall at shell course 1 / L-01 is 11.23 mm; that is above the required 10.13 mm by less than the "
                "reading error can tell."
            ),
        ),
        (
            words.USED_UP,
            (
                "the wall at shell course 1 / L-01 was 11.23 mm on 2025-06-10; at 0.151 mm/year it came down to the "
                "required 10.13 mm on 2032-11-18."
            ),
        ),
        (
            words.RATING_SHORT,
            "on 2028-06-01 the wall at shell course 1 / L-01 is 10.34 mm and 10.13 mm are required, set by hoop.",
        ),
        (
            words.RUNNING_OUT,
            "the current MAWP is carried to 2028-06-01; the wall at shell course 1 / L-01 is used up on 2045-03-02.",
        ),
        (words.RATING_HELD, "the current MAWP of 1.600 MPa is carried to 2028-06-01."),
        (words.NO_VERDICT, "something needed for a verdict was never measured or recorded; see the gaps."),
    ],
)
def test_why_says_the_figures_of_the_standing(make_vessel: Maker, standing: str, expected: str) -> None:
    assert why(make_vessel(standing=standing, sentence=""), SI) == expected


def test_why_of_a_lost_rating_gives_both_pressures(make_vessel: Maker) -> None:
    view = make_vessel(standing=words.RATING_SHORT, projected_mawp_mpa=1.4239, sentence="")
    assert why(view, SI) == (
        "on 2028-06-01 the wall at shell course 1 / L-01 carries 1.423 MPa; the current MAWP is 1.600 MPa."
    )


def test_why_of_no_verdict_names_the_gaps_that_deny_it_and_their_places(make_vessel: Maker) -> None:
    view = make_vessel(
        "F-7",
        standing=words.NO_VERDICT,
        sentence="",
        gaps=(
            notice("vacuum not assessed", "F-7 / cone", "-"),
            notice("no planned survey", "F-7", "-"),
            notice("vacuum not assessed", "F-7 / course 1", "-"),
            notice("part never measured", "F-7 / top head", "-"),
        ),
    )
    assert why(view, SI) == "vacuum not assessed (cone, course 1); part never measured (top head)."


def test_the_place_told_is_one_that_has_the_standing_of_the_vessel(
    make_vessel: Maker, make_part: Callable[..., PartView], make_location: Callable[..., object]
) -> None:
    worn = make_location("L-09", standing=words.BELOW_REQUIRED)
    view = make_vessel(standing=words.BELOW_REQUIRED, parts=(make_part(), make_part("sump", worn)))
    assert telling_place(view) == Place("sump", "L-09")
