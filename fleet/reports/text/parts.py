"""Parts and locations of one vessel as plain text: what each table rests on stands above it, what it hides below."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from fleet import words
from fleet.appraisal.views import LocationView, PartView, VesselView
from fleet.reports import cite
from fleet.reports.figures import NONE, Figures
from fleet.reports.text.layout import Head, marked, paragraph, table
from fleet.words import Notice

UNSEEN = "loss below what readings can show"
"""Code of the doubt that a loss is too small for the readings [text]."""
SAME = 1e-9
"""Walls closer than this are the same [mm]."""


def notice_lines(notices: Iterable[Notice], figures: Figures) -> list[str]:
    """Write doubts or gaps, each with its place and what to do.

    Parameters
    ----------
    notices : iterable of Notice
        The doubts or gaps [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    list of str
        Indented lines [text].
    """
    lines: list[str] = []
    for notice in notices:
        said = f"{notice.where}: {notice.code} ({figures.told(notice.found)}). To do: {notice.remedy}."
        lines += paragraph(said, indent=5, hanging=2)
    return lines


def parts_and_locations(view: VesselView, figures: Figures) -> list[str]:
    """Set every part of a vessel with the table of its locations.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    list of str
        Lines, ending in an empty one.
    """
    lines = [f"Parts and locations   thickness [{figures.unit('length')}], rates [{figures.unit('rate')}]"]
    if not view.parts:
        return [*lines, "     No part is on the register.", ""]
    for part in view.parts:
        lines += ["", *paragraph(_part_line(part, figures), indent=5, hanging=2)]
        lines += _locations(part.locations, figures)
    return [*lines, ""]


def _part_line(part: PartView, figures: Figures) -> str:
    required = figures.with_unit(figures.needed(part.required_thickness_mm), "length")
    said = f"{part.part}, {part.shape}: required {required}"
    rests_on = cite.required_rests_on(part, part.required_by)
    said += f" set by {part.required_by}" if part.required_by else ""
    said += f", {rests_on}" if rests_on else ""
    today = figures.with_unit(figures.carries(part.mawp_today_mpa), "pressure")
    then = figures.with_unit(figures.carries(part.projected_mawp_mpa), "pressure")
    said += f"; MAWP today {today}, projected {then}"
    pressure_by = cite.pressure_rests_on(part)
    if part.mawp_today_mpa is not None and pressure_by and pressure_by != rests_on:
        said += f", by {'the lesser of ' if '; ' in pressure_by else ''}{pressure_by.replace('; ', ' and ')}"
    return said if part.measured else f"{said}; never measured"


def _locations(locations: Sequence[LocationView], figures: Figures) -> list[str]:
    if not locations:
        return ["     no location laid out"]
    heads = [
        Head("location", wraps=True),
        Head("obs", right=True),
        Head("last on"),
        Head("wall\nused", right=True),
        Head("long\nterm", right=True),
        Head("short\nterm", right=True),
        Head("plan-\nning", right=True),
        Head("basis", wraps=True),
        Head("re-\nquired", right=True),
        Head("pro-\njected", right=True),
        Head("retires on"),
    ]
    rows = [
        [
            place.location,
            str(place.observations),
            _day(place.last_on),
            str(figures.wall(place.wall_used_mm)),
            str(figures.rate(place.long_term_rate_mm_per_year)),
            str(figures.rate(place.short_term_rate_mm_per_year)),
            str(figures.rate(place.planning_rate_mm_per_year)),
            place.rate_basis,
            str(figures.needed(place.required_thickness_mm)),
            str(figures.wall(place.projected_thickness_mm)),
            _day(place.retirement_on),
        ]
        for place in locations
    ]
    lines = table(heads, rows, gap=1)
    for place in locations:
        if place.standing in words.STANDINGS and place.standing != words.RATING_HELD:
            lines += marked(place.standing, f"{place.location}: {place.standing}")
    beneath = [*_lining(locations, figures), *_unseen(locations, figures)]
    return lines + [line for text in beneath for line in paragraph(text, indent=5)]


def _lining(locations: Sequence[LocationView], figures: Figures) -> list[str]:
    """Say where the wall in strength is less than the wall used printed above, and by how much lining."""
    less: dict[str, list[str]] = {}
    for place in locations:
        used, strength = place.wall_used_mm, place.wall_in_strength_mm
        if used is not None and strength is not None and used - strength > SAME:
            said = figures.with_unit(figures.needed(used - strength), "length")
            less.setdefault(said, []).append(place.location)
    known = sum(place.wall_in_strength_mm is not None for place in locations)
    return [
        f"{'The wall' if len(places) == known else f'At {_joined(places)} the wall'} in strength is the wall used "
        f"less {said} of lining that does not count."
        for said, places in less.items()
    ]


def _unseen(locations: Sequence[LocationView], figures: Figures) -> list[str]:
    """Say where the loss is below what the readings can show, with the shortest life at the rate that they could."""
    hidden = [place for place in locations if any(doubt.code == UNSEEN for doubt in place.doubts)]
    if not hidden:
        return []
    lives = [(place.life_at_least_measurable_rate_years, place.location) for place in hidden]
    known = [(life, name) for life, name in lives if life is not None]
    unknown = [name for life, name in lives if life is None]
    said = f"Loss below what the readings can show: {_joined([place.location for place in hidden])}. "
    if known:
        life, name = min(known)
        years = figures.with_unit(figures.years(life), "years")
        said += f"At the least measurable rate the shortest life there is {years} from the last observation ({name})"
        said += f"; for {_joined(unknown)} it cannot be had." if unknown else "."
    else:
        said += "The life at the least measurable rate cannot be had."
    return [said]


def _joined(names: Sequence[str]) -> str:
    return ", ".join(names)


def _day(day: object) -> str:
    return NONE if day is None else str(day)
