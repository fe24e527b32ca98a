"""The documents of --json."""

from __future__ import annotations

import json
from collections.abc import Callable
from datetime import date

import pytest

from fleet.appraisal.views import VesselView
from fleet.reports import jsonout
from fleet.reports.source import AppraisalLike
from fleet.words import BLOCKS, notice


def test_appraise_gives_every_vessel_without_its_parts(appraisal: AppraisalLike) -> None:
    document = jsonout.appraise(appraisal)
    assert list(document) == ["as_of", "journal_head", "vessels"]
    assert [each["vessel"] for each in document["vessels"]] == [view.vessel for view in appraisal.views()]
    assert all("parts" not in each for each in document["vessels"])
    one = jsonout.appraise(appraisal, appraisal.views()[:1])
    assert [each["vessel"] for each in one["vessels"]] == ["C-201"]


def test_figures_are_not_rounded(appraisal: AppraisalLike) -> None:
    assert jsonout.appraise(appraisal)["vessels"][0]["projected_mawp_uncapped_mpa"] == 1.6544


def test_due_is_a_list_overdue_first(appraisal: AppraisalLike) -> None:
    made = jsonout.due(appraisal)
    assert made[0]["vessel"] == "E-310"
    assert made[0]["overdue"] == ["internal"]
    assert made[0]["governing_due"] is None
    assert "X-900" not in {each["vessel"] for each in made}
    assert [each["vessel"] for each in jsonout.due(appraisal, date(2027, 1, 1))] == ["E-310"]


def test_gaps_name_their_vessel_and_waiting_rows_have_none(appraisal: AppraisalLike) -> None:
    made = jsonout.gaps(appraisal, [notice("parked row", "north.csv, C7", "no such location")])
    assert [set(each) for each in made] == [{"code", "where", "found", "remedy", "vessel"}] * 3
    assert [each["vessel"] for each in made] == ["F-007", "F-007", None]


def test_derating_is_in_the_order_of_the_list_with_the_block(appraisal: AppraisalLike) -> None:
    made = jsonout.derating(appraisal)
    assert len(made) == appraisal.count
    order = [BLOCKS.index(each["block"]) for each in made]
    assert order == sorted(order)


def test_every_document_is_plain_json(appraisal: AppraisalLike) -> None:
    for document in (
        jsonout.appraise(appraisal),
        jsonout.due(appraisal),
        jsonout.gaps(appraisal),
        jsonout.derating(appraisal),
    ):
        assert json.loads(jsonout.dumps(document)) == document


def test_nan_is_refused(make_vessel: Callable[..., VesselView]) -> None:
    spoilt = make_vessel(mawp_today_mpa=float("nan")).as_json()
    with pytest.raises(ValueError, match="Out of range float values are not JSON compliant"):
        jsonout.dumps(spoilt)
