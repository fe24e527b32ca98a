"""Terminal text: 100 columns, caution first, standings in words with the weight of a rule beside them."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date

import pytest

import fleet.mechanics.rating  # noqa: F401 the register of formulas is filled by its import
from fleet import units, words
from fleet.appraisal.views import Place, VesselView, WaysOut
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


def _page(view: VesselView, display: units.Display = units.SI) -> str:
    """Give a vessel in one line of text, so that no line break stands in the way."""
    return " ".join(text.show(view, display).replace("│", " ").split())


def test_of_a_vessel_without_verdict_nothing_is_said_to_hold(make_vessel: Maker) -> None:
    ways = WaysOut(date(2067, 7, 27), None, date(2109, 5, 15))
    page = text.show(make_vessel(standing=words.NO_VERDICT, parts_total=3, ways_out=ways))
    said = " ".join(page.split())
    for claim in ("Look again by", "current MAWP holds", "No lower pressure", "Repair or renew by"):
        assert claim not in said
    assert "Life and dates   measured parts only: 2 of 3" in page
    assert "Pressure   measured parts only: 2 of 3" in page
    assert "Measure or record first what is missing (see the gaps); until then there is no verdict." in said
    assert (
        "Known parts only, 2 of 3: the wall suffices for the current MAWP to 2067-07-27; "
        "repair or renewal by 2109-05-15." in said
    )
    assert "what is known suffices until 2035-02-02 for the current MAWP; of the rest it says nothing" in said


def test_where_something_else_denies_the_verdict_it_is_left_out_by_name(make_vessel: Maker) -> None:
    ways = WaysOut(date(2067, 7, 27), 1.6, date(2109, 5, 15))
    page = text.show(make_vessel(standing=words.NO_VERDICT, ways_out=ways))
    assert "Life and dates   without what was not assessed" in page
    assert "The figures below leave out what was not assessed." in page
    assert "Without what was not assessed: the wall suffices for the current MAWP to 2067-07-27" in page


def test_a_worse_standing_of_known_parts_keeps_its_ways_out_and_says_whose_they_are(
    make_vessel: Maker,
) -> None:
    ways = WaysOut(date(2026, 5, 1), 1.4, date(2026, 8, 1))
    said = _page(make_vessel(standing=words.RATING_SHORT, parts_total=3, ways_out=ways))
    assert (
        "Known parts only, 2 of 3: with twice the loss the current MAWP has not held since 2026-05-01; "
        "re-rate to 1.400 MPa: the wall carries that to 2028-06-01; repair or renewal due since 2026-08-01."
    ) in said


def test_the_list_of_the_terminal_marks_figures_of_known_parts(appraisal: AppraisalLike) -> None:
    page = text.the_list(appraisal)
    assert "no verdict: 1   pressures, life and dates of what is known only" in page
    row = page[page.index(" F-007") :].partition("\n\n")[0]
    assert "measured" in row


def test_show_says_where_the_loss_cannot_be_seen(
    make_vessel: Maker, make_part: Callable[..., object], make_location: Callable[..., object]
) -> None:
    unseen = (notice("loss below what readings can show", "-", "-"),)

    def at(name: str, life: float | None) -> object:
        return make_location(name, doubts=unseen, life_at_least_measurable_rate_years=life)

    part = make_part("sump", at("L-1", 30.19), at("L-2", 12.39), at("L-3", None), make_location("L-4"))
    said = _page(make_vessel(parts=(part, make_part("head", at("L-5", None)), make_part("neck"))))
    assert (
        "Loss below what the readings can show: L-1, L-2, L-3. At the least measurable rate the shortest life "
        "there is 12.3 years from the last observation (L-2); for L-3 it cannot be had."
    ) in said
    assert "can show: L-5. The life at the least measurable rate cannot be had." in said
    assert said.count("Loss below what the readings can show") == 2


def test_show_says_how_much_lining_does_not_count(
    make_vessel: Maker, make_part: Callable[..., object], make_location: Callable[..., object]
) -> None:
    clad = [make_location(name, wall_used_mm=14.239, wall_in_strength_mm=11.239) for name in ("L-1", "L-2")]
    said = _page(make_vessel(parts=(make_part("clad", *clad), make_part("mixed", clad[0], make_location()))))
    assert "The wall in strength is the wall used less 3.00 mm of lining that does not count." in said
    assert "At L-1 the wall in strength is the wall used less 3.00 mm of lining that does not count." in said
    assert "of lining" not in _page(make_vessel())
    in_inches = _page(make_vessel(parts=(make_part("clad", *clad),)), units.US)
    assert "less 0.119 in of lining" in in_inches


def test_show_cites_the_formula_of_the_pressure_where_it_is_another(
    make_vessel: Maker, make_part: Callable[..., object]
) -> None:
    sphere = ("thick_sphere_thickness_newer", "thick_sphere_pressure_newer")
    same = _page(make_vessel(parts=(make_part(formulas=sphere),)))
    assert "(from memory); MAWP today" in same
    assert "projected 1.599 MPa, by" not in same
    minimum = make_part(formulas=sphere, required_by="structural")
    said = _page(make_vessel(parts=(minimum,)))
    assert "set by structural, structural_minimum as given on the register; MAWP today" in said
    assert "projected 1.599 MPa, by" in said
    assert "(from memory)" in said
    unknown = make_part(
        formulas=sphere, required_by="structural", mawp_today_mpa=None, projected_mawp_mpa=None
    )
    assert "projected –, by" not in _page(make_vessel(parts=(unknown,)))


def test_show_prints_given_pressures_as_written(make_vessel: Maker) -> None:
    view = make_vessel(written={"nameplate_mawp": "232 psi", "current_mawp": "1.6 MPa"})
    assert "nameplate MAWP [MPa] 1.600 (written 232 psi) current MAWP [MPa] 1.600 MAWP today" in _page(view)
    assert "current MAWP [psi] 232 (written 1.6 MPa)" in _page(view, units.US)
    assert "written 232 psi" not in _page(view, units.US)


def test_show_of_a_retired_vessel_opens_with_the_word_and_has_no_way_out(make_vessel: Maker) -> None:
    ways = WaysOut(date(2026, 5, 1), 1.4, date(2026, 8, 1))
    page = text.show(make_vessel(standing=words.RATING_SHORT, block=words.RETIRED, ways_out=ways))
    answer = page.partition("local code and law.")[2].split()
    assert answer[0] == "retired:"
    assert "  ││ By its last figures rating short: " in page
    assert "Ways out" not in page
    assert "Beside it" not in page


def test_show_says_at_once_where_no_life_is_left(make_vessel: Maker) -> None:
    gone = make_vessel(
        standing=words.BELOW_REQUIRED,
        clause_interval_years=0.0,
        half_life_on_plateau_years=0.0,
        internal_interval_years=0.0,
        governing_due=Place("shell course 1", "L-01"),
    )
    said = _page(gone)
    assert "No life is left; the wall is to be looked at at once." in said
    assert "0.0 years;" not in said


def test_due_says_how_it_is_ordered(appraisal: AppraisalLike) -> None:
    assert (
        "Overdue first, then by the earlier of the two dates; what has neither date stands last."
        in text.due(appraisal)
    )


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
