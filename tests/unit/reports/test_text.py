"""Terminal text: 100 columns, caution first, standings in words with the weight of a rule beside them."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date

import pytest

from fleet import units, words
from fleet.appraisal.views import VesselView, WaysOut
from fleet.reports import text
from fleet.reports.source import AppraisalLike
from fleet.reports.text.layout import Head, marked, strokes, table
from fleet.words import notice

Maker = Callable[..., VesselView]


def _all(appraisal: AppraisalLike, display: units.Display) -> dict[str, str]:
    return {
        "appraise": text.appraise(appraisal, display),
        "due": text.due(appraisal),
        "gaps": text.gaps(appraisal),
        "story": text.the_story(appraisal, display),
        **{view.vessel: text.show(view, display) for view in appraisal.views()},
    }


@pytest.mark.parametrize("display", [units.SI, units.US])
def test_every_page_fits_100_columns_and_carries_the_caution(
    appraisal: AppraisalLike, display: units.Display
) -> None:
    for name, page in _all(appraisal, display).items():
        assert max(map(len, page.splitlines())) <= 100, name
        assert words.CAUTION in " ".join(page.split()), name
        assert page.endswith("\n"), name
        assert "nan" not in page.lower().split(), name
        assert "\x1b" not in page, name


def test_appraise_lists_every_vessel_once_and_names_empty_blocks(appraisal: AppraisalLike) -> None:
    page = text.appraise(appraisal)
    for view in appraisal.views():
        assert (
            sum(line.split()[:1] == [view.vessel] or f" {view.vessel} " in line for line in page.splitlines())
            == 1
        )
    assert "out of service: none" in page
    assert "= 12." in page


def test_appraise_of_named_vessels_leaves_the_sum_out(appraisal: AppraisalLike) -> None:
    page = text.appraise(appraisal, views=appraisal.views()[:1])
    assert "C-201" in page
    assert "D-101" not in page
    assert "The register holds" not in page


def test_the_rule_stands_at_the_left_of_every_line_of_its_row(appraisal: AppraisalLike) -> None:
    lines = text.appraise(appraisal).splitlines()
    worst = next(line for line in lines if " D-101 " in line)
    held = next(line for line in lines if " C-201 " in line)
    assert worst.startswith("││││ D-101")
    assert held.startswith("     C-201")
    assert [line[:4] for line in marked(words.NO_VERDICT, "word " * 40)] == ["  ││"] * 3
    assert {len(strokes(standing)) for standing in words.STANDINGS} == {4}


def test_show_reads_from_the_answer_down(appraisal: AppraisalLike) -> None:
    page = text.show(next(view for view in appraisal.views() if view.vessel == "E-310"))
    order = [
        "as of 2026-12-01",
        "fleet computes",
        "││ rating short: on 2028-06-01",
        "Beside it: overdue.",
        "Pressure",
        "projected MAWP [MPa]  1.423  on 2028-06-01 (next survey), governed by bottom head / L-09",
        "Life and dates",
        "PSV-310 (1.600 MPa) is to be reset by 2027-09-14.",
        "Re-rate to 1.423 MPa: the wall carries that to 2028-06-01.",
        "Repair or renew by 2031-05-05.",
        "shell course 1, cylinder",
        "Doubts",
        "apparent gain",
        "Journal head",
    ]
    places = [page.index(piece) for piece in order]
    assert places == sorted(places)


def test_show_says_what_is_missing(appraisal: AppraisalLike) -> None:
    page = text.show(next(view for view in appraisal.views() if view.vessel == "F-007"))
    assert "Measured parts only: 1 of 2." in page
    assert "top head, hemispherical head: required –; MAWP today –, projected –; never measured" in page
    assert "no location laid out" in page
    assert "No relief device is linked to this vessel." in page
    assert "F-007, top head: part never measured (no thickness on record). To do: measure it." in page


def test_show_in_inches_and_psi(appraisal: AppraisalLike) -> None:
    page = text.show(appraisal.views()[0], units.US)
    assert "current MAWP [psi]" in page
    assert "thickness [in], rates [mil/year]" in page
    assert "MPa" not in page


def test_show_names_a_location_whose_own_standing_is_worse(
    make_vessel: Maker, make_part: Callable[..., object], make_location: Callable[..., object]
) -> None:
    view = make_vessel(parts=(make_part("sump", make_location("L-9", standing=words.AT_REQUIRED)),))
    assert " │││ L-9: at required" in text.show(view).splitlines()


def test_ways_out_do_not_re_rate_upwards(make_vessel: Maker) -> None:
    same = make_vessel(standing=words.NO_VERDICT, ways_out=WaysOut(None, 1.6, date(2040, 1, 1)))
    assert "Re-rate" not in text.show(same)
    none = make_vessel(standing=words.RATING_SHORT, ways_out=WaysOut(None, None, None))
    assert "No lower pressure reaches the carry-to date" in text.show(none)


def test_due_adds_up_and_counts_what_it_leaves_out(appraisal: AppraisalLike) -> None:
    page = text.due(appraisal)
    assert "The register holds 12 vessels: 1 overdue + 10 not overdue + 1 retired = 12." in page
    assert page.index("E-310") < page.index("C-201")
    early = text.due(appraisal, date(2026, 12, 31))
    assert "1 overdue + 0 not overdue + 10 due after 2026-12-31 + 1 retired = 12." in early


def test_gaps_counts_and_shows_waiting_rows(appraisal: AppraisalLike) -> None:
    assert "2 gaps on 1 of 12 vessels." in text.gaps(appraisal)
    page = text.gaps(appraisal, [notice("parked row", "north.csv, C7", "no such location")])
    assert "Waiting rows" in page
    assert "2 gaps on 1 of 12 vessels, 1 rows waiting." in page


def test_derating_says_where_and_on_which_head(appraisal: AppraisalLike) -> None:
    page = text.derating(appraisal, "list.xlsx")
    assert "Written to list.xlsx" in page
    assert "(entry 181)" in page


def test_a_table_wraps_words_and_cuts_nothing() -> None:
    long = "word " * 40
    lines = table([Head("tag"), Head("why", wraps=True)], [["V-1", long.strip()]])
    assert max(map(len, lines)) <= 100
    assert " ".join(" ".join(lines).split()).count("word") == 40
    unbroken = table([Head("tag", wraps=True)], [["x" * 120]])
    assert "".join(line.strip() for line in unbroken[1:]) == "x" * 120
