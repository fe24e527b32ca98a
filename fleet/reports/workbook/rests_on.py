"""Sheet `What each figure rests on`: a row per location, and one for every part without any."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING

from fleet.appraisal.views import LocationView, PartView, VesselView
from fleet.reports import cite
from fleet.reports.figures import NONE, Figures
from fleet.reports.source import AppraisalLike, in_list_order
from fleet.reports.workbook.page import Column, Page, Stamp, Value

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

TURNS = (("Long-term rate", "rate"), ("Nominal", "length"))
"""Headings, and the quantity whose unit they bear, with which the second and third printed pages begin."""
POSITION, CLAUSE, DOUBTS = "Position", "Required by clause", "Doubts in words"


def draw(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
    """Draw the sheet.

    Parameters
    ----------
    book : Workbook
        The workbook [-].
    appraisal : AppraisalLike
        The appraisal [-].
    figures : Figures
        How figures are printed [-].
    stamp : Stamp
        What stands on every printed page [-].
    """
    page = Page(book, "What each figure rests on", stamp)
    page.title(
        "What each figure rests on",
        "A row per location, vessels in the order of the list. A clause not read itself says so.",
        "Life at the least measurable rate counts from the last observation; it stands beside losses too small to see.",
    )
    page.heads(columns(figures), freeze=3)
    drawn = 0
    for view in in_list_order(appraisal.views()):
        for part in view.parts:
            for place in part.locations or (None,):
                drawn += 1
                page.line(
                    _row(view, part, place, figures), standing=place.standing if place else view.standing
                )
    if not drawn:
        page.none()
    turns = tuple(f"{head} [{figures.unit(kind)}]" for head, kind in TURNS)
    page.finish(breaks_before=turns, elastic=(POSITION, CLAUSE, DOUBTS))


def columns(figures: Figures) -> list[Column]:
    """List the columns with the units of the reader.

    Parameters
    ----------
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    list of Column
    """
    pressure, length, rate = (f"[{figures.unit(quantity)}]" for quantity in ("pressure", "length", "rate"))
    return [
        Column("Vessel", 14),
        Column("Part", 16),
        Column("Location", 14),
        Column("Shape", 19, group="The place"),
        Column(POSITION, 18),
        Column("Standing of the location", 12),
        Column("Times observed", number=True, group="Readings"),
        Column("Over [years]", number=True),
        Column("Last on", 11),
        Column(f"Last wall {length}", number=True),
        Column(f"Wall used {length}", number=True),
        Column(f"Wall in strength {length}", number=True),
        Column(f"Reading error {length}", number=True),
        Column(f"Long-term rate {rate}", number=True, group="Rates"),
        Column(f"Short-term rate {rate}", number=True),
        Column("Short span [years]", number=True),
        Column(f"Fitted rate {rate}", number=True),
        Column(f"Error of fit {rate}", number=True),
        Column(f"Least measurable rate {rate}", number=True),
        Column(f"Planning rate {rate}", number=True),
        Column("Basis", 12),
        Column(f"Required thickness {length}", number=True, group="What it needs"),
        Column("Set by", 11),
        Column(CLAUSE, 26),
        Column(f"Nominal {length}", number=True, group="The part"),
        Column("Material", 16),
        Column(f"Allowable stress {pressure}", number=True),
        Column(f"Static head {pressure}", number=True),
        Column("Retirement", 10, group="How long, how much"),
        Column("Life at least measurable rate [years]", number=True),
        Column("Half-life interval [years]", number=True),
        Column(f"Projected wall {length}", number=True),
        Column(f"MAWP today {pressure}", number=True),
        Column(f"Projected MAWP {pressure}", number=True),
        Column(f"Projected, uncapped {pressure}", number=True),
        Column("Pressure by clause", 44),
        Column(DOUBTS, 30),
    ]


def _row(view: VesselView, part: PartView, place: LocationView | None, figures: Figures) -> list[Value]:
    datum: Sequence[Value] = (
        figures.given(part.nominal_thickness_mm, "length"),
        part.material or NONE,
        figures.given(part.allowable_stress_mpa, "pressure"),
        figures.asked(part.static_head_mpa),
    )
    if place is None:
        needs: Sequence[Value] = (
            figures.needed(part.required_thickness_mm),
            part.required_by or NONE,
            cite.required_rests_on(part, part.required_by),
        )
        nothing = [NONE] * 14
        return [
            *(view.vessel, part.part, "none laid out", part.shape, "", NONE, 0),
            *nothing,
            *needs,
            *datum,
            *([NONE] * 7),
            cite.pressure_rests_on(part),
            "",
        ]
    return [
        *(view.vessel, part.part, place.location, part.shape, place.position, place.standing),
        *_readings(place, figures),
        *_rates(place, figures),
        figures.needed(place.required_thickness_mm),
        place.required_by or NONE,
        cite.required_rests_on(part, place.required_by),
        *datum,
        place.retirement_on or NONE,
        figures.years(place.life_at_least_measurable_rate_years),
        figures.years(place.half_life_interval_years),
        figures.wall(place.projected_thickness_mm),
        figures.carries(place.mawp_today_mpa),
        figures.carries(place.projected_mawp_mpa),
        figures.carries(place.projected_mawp_uncapped_mpa),
        cite.pressure_rests_on(part),
        "; ".join(notice.code for notice in place.doubts),
    ]


def _readings(place: LocationView, figures: Figures) -> Sequence[Value]:
    return (
        place.observations,
        figures.years(place.span_years),
        place.last_on or NONE,
        figures.wall(place.last_thickness_mm),
        figures.wall(place.wall_used_mm),
        figures.wall(place.wall_in_strength_mm),
        figures.needed(place.reading_error_mm),
    )


def _rates(place: LocationView, figures: Figures) -> Sequence[Value]:
    return (
        figures.rate(place.long_term_rate_mm_per_year),
        figures.rate(place.short_term_rate_mm_per_year),
        figures.years(place.short_span_years),
        figures.rate(place.fitted_rate_mm_per_year),
        figures.rate(place.fitted_rate_error_mm_per_year),
        figures.rate(place.least_measurable_rate_mm_per_year),
        figures.rate(place.planning_rate_mm_per_year),
        place.rate_basis,
    )
