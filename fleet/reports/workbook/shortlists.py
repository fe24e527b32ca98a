"""Sheets `Running out`, `Re-gauge`, `Doubts` and `Gaps`."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date
from typing import TYPE_CHECKING

from fleet import words
from fleet.appraisal.views import VesselView
from fleet.reports.figures import NONE, Figures
from fleet.reports.known import speaks_for
from fleet.reports.reason import why
from fleet.reports.source import AppraisalLike, in_list_order, located
from fleet.reports.workbook.page import Column, Page, Stamp
from fleet.reports.workbook.the_list import SPEAKS_FOR, of_known
from fleet.words import Notice

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

HORIZON_YEARS = 10.0
"""The longest window within which retirement counts as running out [year]. Status: ours."""


def draw_running_out(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
    """Draw the vessels whose retirement lies within the window, soonest first.

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
    length, rate = f"[{figures.unit('length')}]", f"[{figures.unit('rate')}]"
    page = Page(book, "Running out", stamp)
    page.title(
        "Running out",
        "Vessels that retire within twice their internal interval or ten years, the lesser; soonest first.",
        "Life at the least measurable rate counts from the last observation.",
    )
    page.heads(
        [
            Column("Vessel", 16),
            Column("Standing", 14),
            Column("Block", 14),
            Column(SPEAKS_FOR, 13),
            Column("Retirement", 11),
            Column("Life left [years]", number=True),
            Column("Part", 16),
            Column("Location", 14),
            Column("Last on", 11),
            Column(f"Last wall {length}", number=True),
            Column(f"Required thickness {length}", number=True),
            Column(f"Planning rate {rate}", number=True),
            Column("Basis", 12),
            Column("Life at least measurable rate [years]", number=True),
            Column("Current MAWP holds until", 11),
            Column("Why", 44),
        ]
    )
    found = sorted(
        (view for view in appraisal.views() if is_running_out(view)),
        key=lambda view: view.retirement_on or date.min,
    )
    for view in found:
        part, place = located(view, view.governing_life)
        page.line(
            [
                view.vessel,
                view.standing,
                view.block,
                speaks_for(view),
                view.retirement_on or NONE,
                figures.years(view.life_left_years),
                part.part if part else NONE,
                place.location if place else NONE,
                (place.last_on if place else None) or NONE,
                figures.wall(place.last_thickness_mm if place else None),
                figures.needed(place.required_thickness_mm if place else None),
                figures.rate(place.planning_rate_mm_per_year if place else None),
                place.rate_basis if place else NONE,
                figures.years(place.life_at_least_measurable_rate_years if place else None),
                of_known(view, view.rating_holds_until),
                why(view, figures),
            ],
            standing=view.standing,
        )
    if not found:
        page.none()
    page.finish()


def is_running_out(view: VesselView) -> bool:
    """Say whether a vessel belongs on the sheet `Running out`.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    bool
        True for the standing of that name; and for a worse one whose life left lies within the same window.
    """
    if view.block == words.RETIRED or view.standing == words.RATING_HELD:
        return False
    if view.standing == words.RUNNING_OUT:
        return True
    if view.life_left_years is None:
        return False
    interval = view.internal_interval_years
    window = HORIZON_YEARS if interval is None else min(2 * interval, HORIZON_YEARS)
    return view.life_left_years <= window


def draw_re_gauge(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
    """Draw the points that must be gauged again before their rate is believed.

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
    length, rate = f"[{figures.unit('length')}]", f"[{figures.unit('rate')}]"
    page = Page(book, "Re-gauge", stamp)
    page.title(
        "Re-gauge",
        "Points whose short-term rate governs by no more than the reading error may explain.",
        "Gauge them again by the day given. Until then the vessel keeps its standing.",
    )
    page.heads(
        [
            Column("Vessel", 16),
            Column("Part", 18),
            Column("Location", 14),
            Column("Position", 20),
            Column("Gauge by", 11),
            Column("Standing", 14),
            Column("Last on", 11),
            Column(f"Last wall {length}", number=True),
            Column(f"Required thickness {length}", number=True),
            Column(f"Short-term rate {rate}", number=True),
            Column("Over [years]", number=True),
            Column(f"Long-term rate {rate}", number=True),
            Column("Over, long term [years]", number=True),
            Column(f"Least measurable rate {rate}", number=True),
            Column(f"Reading error {length}", number=True),
        ]
    )
    drawn = 0
    for view in appraisal.views():
        for point in view.re_gauge:
            drawn += 1
            _, place = located(view, point)
            page.line(
                [
                    view.vessel,
                    point.part,
                    point.location or NONE,
                    place.position if place else "",
                    view.re_gauge_by or NONE,
                    view.standing,
                    (place.last_on if place else None) or NONE,
                    figures.wall(place.last_thickness_mm if place else None),
                    figures.needed(place.required_thickness_mm if place else None),
                    figures.rate(place.short_term_rate_mm_per_year if place else None),
                    figures.years(place.short_span_years if place else None),
                    figures.rate(place.long_term_rate_mm_per_year if place else None),
                    figures.years(place.span_years if place else None),
                    figures.rate(place.least_measurable_rate_mm_per_year if place else None),
                    figures.needed(place.reading_error_mm if place else None),
                ],
                standing=view.standing,
            )
    if not drawn:
        page.none()
    page.finish()


def draw_doubts(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
    """Draw every doubt that stands open.

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
    note = "Doubtful data that was loaded and stays visible until cleared. Doubt never improves a figure."
    _draw_notices(book, appraisal, figures, stamp, ("Doubts", note), lambda view: view.doubts)


def draw_gaps(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
    """Draw everything that should have been measured or recorded and was not.

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
    note = "What should have been measured or recorded and was not."
    _draw_notices(book, appraisal, figures, stamp, ("Gaps", note), lambda view: view.gaps)


def _draw_notices(
    book: Workbook,
    appraisal: AppraisalLike,
    figures: Figures,
    stamp: Stamp,
    titled: tuple[str, str],
    of: Callable[[VesselView], tuple[Notice, ...]],
) -> None:
    page = Page(book, titled[0], stamp)
    page.title(*titled)
    page.heads(
        [
            Column("Vessel", 16),
            Column("Code", 28),
            Column("Where", 34),
            Column("Found", 44),
            Column("To do", 54),
        ]
    )
    drawn = 0
    for view in in_list_order(appraisal.views()):
        for notice in of(view):
            drawn += 1
            page.line(
                [view.vessel, notice.code, notice.where, figures.told(notice.found), notice.remedy],
                standing=view.standing,
            )
    if not drawn:
        page.none()
    page.finish()
