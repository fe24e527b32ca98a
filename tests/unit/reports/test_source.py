"""Blocks, their order, and the sum that must equal the register."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date

import pytest

from fleet import words
from fleet.appraisal.views import Place, VesselView
from fleet.errors import OurFault
from fleet.reports.dues import in_due_order, overdue_kinds
from fleet.reports.source import (
    AppraisalLike,
    Snapshot,
    blocks,
    heaviness,
    in_list_order,
    located,
    reconciled,
)

Maker = Callable[..., VesselView]


def test_every_block_is_there_and_every_vessel_in_exactly_one(appraisal: AppraisalLike) -> None:
    sorted_in = blocks(appraisal.views())
    assert tuple(sorted_in) == words.BLOCKS
    listed = [view.vessel for members in sorted_in.values() for view in members]
    assert sorted(listed) == sorted(view.vessel for view in appraisal.views())


def test_within_a_block_the_shortest_holding_comes_first_and_unknown_before_it(make_vessel: Maker) -> None:
    made = [
        make_vessel("late", rating_holds_until=date(2040, 1, 1)),
        make_vessel("soon", rating_holds_until=date(2030, 1, 1)),
        make_vessel("unknown", rating_holds_until=None),
    ]
    assert [view.vessel for view in in_list_order(made)] == ["unknown", "soon", "late"]


def test_within_the_idle_block_the_worst_standing_comes_first(make_vessel: Maker) -> None:
    made = [
        make_vessel("held", block=words.IDLE),
        make_vessel("short", block=words.IDLE, standing=words.RATING_SHORT),
    ]
    assert [view.vessel for view in in_list_order(made)] == ["short", "held"]


def test_a_list_that_does_not_add_up_is_refused(
    make_appraisal: Callable[..., AppraisalLike], make_vessel: Maker
) -> None:
    lost_one = make_appraisal((make_vessel("A"),), claimed=2)
    with pytest.raises(OurFault, match="the blocks hold 1 vessels and the register 2"):
        reconciled(lost_one)


def test_a_vessel_twice_or_in_no_block_is_refused(make_vessel: Maker) -> None:
    with pytest.raises(OurFault, match="twice"):
        blocks([make_vessel("A"), make_vessel("A")])
    with pytest.raises(OurFault, match="block 'somewhere' is not in the catalogue"):
        blocks([make_vessel("A", block="somewhere")])


def test_the_rule_is_never_lighter_for_a_worse_standing() -> None:
    weights = [heaviness(standing) for standing in words.STANDINGS]
    assert weights == sorted(weights, reverse=True)
    assert (weights[0], weights[-1]) == (4, 0)
    with pytest.raises(OurFault, match="'fine' is not in the catalogue"):
        heaviness("fine")


def test_a_place_is_found_or_plainly_not(make_vessel: Maker) -> None:
    view = make_vessel()
    part, place = located(view, Place("top head", "L-02"))
    assert part is not None
    assert place is not None
    assert (part.part, place.location) == ("top head", "L-02")
    assert located(view, Place("sump", "L-02")) == (None, None)
    assert located(view, Place("top head", "nowhere"))[1] is None
    assert located(view, None) == (None, None)


def test_a_snapshot_says_the_same_and_asks_once(appraisal: AppraisalLike) -> None:
    shot = Snapshot(appraisal)
    assert shot.views() is shot.views()
    assert shot.views() == appraisal.views()
    assert (shot.count, shot.as_of, shot.journal_no) == (
        appraisal.count,
        appraisal.as_of,
        appraisal.journal_no,
    )


def test_overdue_comes_first_then_the_nearest_date_and_no_date_last(make_vessel: Maker) -> None:
    made = [
        make_vessel("no date", internal_due_on=None, external_due_on=None),
        make_vessel("far", internal_due_on=date(2033, 1, 1), external_due_on=date(2032, 1, 1)),
        make_vessel("near", internal_due_on=date(2027, 1, 1), external_due_on=date(2032, 1, 1)),
        make_vessel("late", internal_due_on=date(2030, 1, 1), external_due_on=date(2026, 11, 30)),
        make_vessel("gone", block=words.RETIRED, internal_due_on=date(2020, 1, 1)),
    ]
    assert [view.vessel for view in in_due_order(made)] == ["late", "near", "far", "no date"]
    assert [view.vessel for view in in_due_order(made, date(2028, 1, 1))] == ["late", "near", "no date"]


def test_due_on_the_as_of_date_is_not_overdue(make_vessel: Maker) -> None:
    assert overdue_kinds(make_vessel(internal_due_on=date(2026, 12, 1))) == []
    both = make_vessel(internal_due_on=date(2026, 11, 30), external_due_on=date(2020, 1, 1))
    assert overdue_kinds(both) == ["internal", "external"]
