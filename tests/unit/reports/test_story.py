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
from fleet.reports.story import story, the_sum
from fleet.words import notice

Maker = Callable[..., VesselView]
SI = Figures(units.SI)


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


def test_a_reset_by_pressure_alone_is_told_as_such_in_the_story(
    make_vessel: Maker, make_appraisal: Callable[..., AppraisalLike]
) -> None:
    relief = (ReliefView("SV-1", 1.6, None, date(2027, 3, 1), "16 bar"),)
    for standing, tail in ((words.BELOW_REQUIRED, ", by pressure alone, for its wall is below what is required."),
                           (words.RATING_SHORT, ".")):  # fmt: skip
        told = [sentence.text for sentence in
                story(make_appraisal((make_vessel("D-1", standing=standing, relief=relief),)), SI)]  # fmt: skip
        assert any(
            text.endswith(f"SV-1 (1.600 MPa, written 16 bar) on D-1 by 2027-03-01{tail}") for text in told
        )


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
