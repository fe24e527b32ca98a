"""Sheet `The list`: every vessel once, in its block; printed over three pages: verdict, dates, wall."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date
from typing import TYPE_CHECKING

from fleet import words
from fleet.appraisal.views import LocationView, PartView, Place, VesselView
from fleet.reports import cite
from fleet.reports.figures import NONE, Figures
from fleet.reports.known import KNOWN_ONLY, capital, known_only, measured_words, speaks_for
from fleet.reports.reason import why
from fleet.reports.sentences import cap_sentence, operating_sentence, plateau_sentence, relief_sentences
from fleet.reports.source import AppraisalLike, Grounds, located, reconciled
from fleet.reports.workbook.page import Column, Page, Stamp, Value

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

WALL = "Governs life"
"""Heading of the column with which the third printed page begins."""
OPERATING = "Operating"
"""Heading, but for its unit, of the column with which the second printed page begins."""
PLACE_LINE = 18
"""Letters of a place that stand on one line [count]."""
SPEAKS_FOR = "Dates speak for"
"""Heading of the column that says where ways out and life are not those of the whole vessel."""
WHY, IN_WORDS, INTERVAL, CLAUSE = (
    "Why", "Relief and operation in words", "Interval in words", "Required by clause",
)  # fmt: skip


def draw(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp, grounds: Grounds) -> None:
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
    grounds : Grounds
        Rules in use, whose status stands beside the dates [-].
    """
    status = rules_status(grounds)
    page = Page(book, "The list", stamp)
    page.title(
        f"The list, {appraisal.as_of.isoformat()}",
        words.CAUTION,
        "One block per standing, worst first. Printed on three pages side by side: verdict, dates, wall.",
        f"{NONE} is a figure that cannot be had; the sheet Gaps says why. A blank does not apply.",
    )
    page.heads(columns(figures), freeze=1)
    for block, members in reconciled(appraisal).items():
        page.block(block_head(block, len(members)), aside=1)
        for view in members:
            page.line(row(view, figures, status), standing=view.standing)
    turns = (f"{OPERATING} pressure [{figures.unit('pressure')}]", WALL)
    page.finish(breaks_before=turns, elastic=(IN_WORDS, INTERVAL, CLAUSE))


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
        Column("Vessel", 16),
        Column("Block", 11, group="The verdict"),
        Column("Standing", 11),
        Column("Flags", 11),
        Column("Service", 16),
        Column(WHY, 30),
        Column(IN_WORDS, 40),
        Column(f"Current MAWP {pressure}", number=True, group="Pressure"),
        Column(f"MAWP today {pressure}", number=True),
        Column(f"Projected MAWP {pressure}", number=True),
        Column(f"Projected, uncapped {pressure}", number=True),
        Column("Carried to", 11),
        Column(f"Margin then {pressure}", 9, number=True),
        Column("Governs pressure", 18),
        Column(f"At list's end {pressure}", number=True),
        Column(f"{OPERATING} pressure {pressure}", number=True, group="Margins"),
        Column(f"Margin today, operating {pressure}", number=True),
        Column(f"Relief, lowest set {pressure}", number=True),
        Column(f"Margin today, relief {pressure}", number=True),
        Column(SPEAKS_FOR, 15, group="Ways out", least=15),
        Column("Current MAWP holds until", 11),
        Column(f"Pressure that reaches {pressure}", number=True),
        Column("Repair or renew by", 11),
        Column("Life left [years]", number=True, group="Dates"),
        Column("Retirement", 11),
        Column("Internal or on-stream due", 11),
        Column("External due", 11),
        Column("Governs due", 18),
        Column("Interval [years]", number=True),
        Column("By the rules", 12),
        Column(INTERVAL, 24),
        Column(WALL, 18, group="The wall at the place that governs life"),
        Column(f"Last wall {length}", number=True),
        Column("Last on", 11),
        Column(f"Planning rate {rate}", number=True),
        Column("Basis", 11),
        Column(f"Long-term rate {rate}", number=True),
        Column(f"Short-term rate {rate}", number=True),
        Column(f"Required thickness {length}", number=True),
        Column("Set by", 11),
        Column(CLAUSE, 18),
        Column("Times observed", number=True, group="What it rests on"),
        Column("Over [years]", number=True),
        Column(f"Reading error {length}", number=True),
        Column("Age [years]", number=True),
        Column("Parts measured", 11),
        Column("Doubts", number=True),
        Column("Gaps", number=True),
    ]


def block_head(block: str, count: int) -> str:
    """Head a block of the list: how many vessels it holds, and what its figures leave out.

    Parameters
    ----------
    block : str
        The block [text].
    count : int
        Vessels in it [count].

    Returns
    -------
    str

    Examples
    --------
    >>> block_head("rating held", 3), block_head("idle", 0)
    ('rating held: 3', 'idle: none')
    """
    if not count:
        return f"{block}: none"
    return f"{block}: {count}; {KNOWN_ONLY}" if block == words.NO_VERDICT else f"{block}: {count}"


def of_known(view: VesselView, day: date | None) -> Value:
    """Give a date, in words where it speaks for known parts only: it must not be read as one of the vessel.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    day : date or None
        The date [date].

    Returns
    -------
    Value
    """
    known = known_only(view)
    if day is None:
        return NONE
    return f"{known}: {day.isoformat()}" if known else day


def rules_status(grounds: Grounds) -> str:
    """Say how well the rules in use are known, where that is less than confirmed.

    Parameters
    ----------
    grounds : Grounds
        The rules in use [-].

    Returns
    -------
    str
        In brackets, to stand behind the name of a rule set; empty where all is confirmed.
    """
    known = {value.status for values in (grounds.rules or {}).values() for value in values}
    unsure = sorted(known - {"confirmed", "ours"})
    return f" ({', '.join(unsure)})" if unsure else ""


def row(view: VesselView, figures: Figures, status: str = "") -> list[Value]:
    """Give the cells of one vessel.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].
    status : str
        How well the rules in use are known, as `rules_status` says it [text].

    Returns
    -------
    list of Value
        One per column.
    """
    part, place = located(view, view.governing_life)
    return [
        *(view.vessel, view.block, view.standing, ", ".join(view.flags), view.service),
        *(why(view, figures), _in_words(view, figures)),
        *_pressures(view, figures),
        *_relief(view, figures),
        *_ways_out(view, figures),
        *_dates(view, figures, status),
        *_wall(view, part, place, figures),
        *_rests_on(view, place, figures),
    ]


def _pressures(view: VesselView, figures: Figures) -> Sequence[Value]:
    at_end = view.projected_mawp_at_list_end_mpa
    return (
        figures.carries(view.current_mawp_mpa),
        figures.carries(view.mawp_today_mpa),
        figures.carries(view.projected_mawp_mpa),
        figures.carries(view.projected_mawp_uncapped_mpa),
        view.carry_to_on or NONE,
        words.HELD_BY_HALF_LIFE
        if view.held_by_half_life
        else figures.carries(_less(view.projected_mawp_mpa, view.current_mawp_mpa)),
        place_words(view.governing_pressure),
        None if at_end is None else figures.carries(at_end),
    )


def _in_words(view: VesselView, figures: Figures) -> str:
    said = [sentence.text for sentence in relief_sentences(view, figures)]
    said.append(operating_sentence(view, figures))
    return " ".join(text for text in said if text)


def _relief(view: VesselView, figures: Figures) -> Sequence[Value]:
    lowest = min((device.set_pressure_mpa for device in view.relief), default=None)
    return (
        figures.asked(view.operating_pressure_mpa),
        figures.carries(_less(view.mawp_today_mpa, view.operating_pressure_mpa)),
        figures.asked(lowest),
        figures.carries(_less(view.mawp_today_mpa, lowest)),
    )


def _ways_out(view: VesselView, figures: Figures) -> Sequence[Value]:
    ways = view.ways_out
    partly = speaks_for(view)
    if ways is None or view.block == words.RETIRED:
        return (partly, None, None, None)
    return (
        partly,
        of_known(view, ways.rating_holds_until),
        figures.carries(ways.pressure_that_reaches_mpa),
        of_known(view, ways.renew_by),
    )


def _wall(
    view: VesselView, part: PartView | None, place: LocationView | None, figures: Figures
) -> Sequence[Value]:
    governs = place_words(view.governing_life)
    if part is None or place is None:
        return (governs, *(NONE for _ in range(9)))
    return (
        governs,
        figures.wall(place.last_thickness_mm),
        place.last_on or NONE,
        figures.rate(place.planning_rate_mm_per_year),
        place.rate_basis,
        figures.rate(place.long_term_rate_mm_per_year),
        figures.rate(place.short_term_rate_mm_per_year),
        figures.needed(place.required_thickness_mm),
        place.required_by or NONE,
        cite.required_rests_on(part, place.required_by),
    )


def _dates(view: VesselView, figures: Figures, status: str) -> Sequence[Value]:
    return (
        figures.years(view.life_left_years),
        view.retirement_on or NONE,
        view.internal_due_on or NONE,
        view.external_due_on or NONE,
        _governs_due(view),
        figures.years(view.internal_interval_years),
        f"{view.rules}{status}",
        plateau_sentence(view, figures) or _cap_first(view, figures),
    )


def _cap_first(view: VesselView, figures: Figures) -> str:
    said = cap_sentence(view, figures)
    return f"{capital(said)}." if said else ""


def _rests_on(view: VesselView, place: LocationView | None, figures: Figures) -> Sequence[Value]:
    counts: tuple[Value, ...] = (measured_words(view), len(view.doubts), len(view.gaps))
    if place is None:
        return (NONE, NONE, NONE, NONE, *counts)
    age = None if place.last_on is None else (view.as_of - place.last_on).days / 365.25
    return (
        place.observations,
        figures.years(place.span_years),
        figures.needed(place.reading_error_mm),
        figures.spent(age),
        *counts,
    )


def place_words(place: Place | None) -> str:
    """Write a place, a long one on two lines, so that a location is never broken at its hyphen.

    Parameters
    ----------
    place : Place or None
        The place [-].

    Returns
    -------
    str

    Examples
    --------
    >>> print(place_words(Place("manway neck N17", "L-07")))
    manway neck N17 /
    L-07
    """
    said = NONE if place is None else str(place)
    return said if len(said) <= PLACE_LINE else said.replace(" / ", " /\n")


def _governs_due(view: VesselView) -> str:
    if view.governing_due is None and view.internal_due_on is not None:
        return "cap of the rule set"
    return place_words(view.governing_due)


def _less(one: float | None, other: float | None) -> float | None:
    return None if one is None or other is None else one - other
