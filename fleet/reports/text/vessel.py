"""One vessel as a letter: the answer first, then the figures and what they rest on."""

from __future__ import annotations

from collections.abc import Sequence

from fleet import units, words
from fleet.appraisal.views import LocationView, PartView, Place, VesselView
from fleet.reports import cite
from fleet.reports.figures import NONE, Figures
from fleet.reports.reason import why
from fleet.reports.story import measured_words, operating_sentence, plateau_sentence, relief_sentences
from fleet.reports.text.layout import Head, marked, paragraph, table, title
from fleet.words import Notice


def show(view: VesselView, display: units.Display = units.SI) -> str:
    """Write what is known of one vessel.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    display : units.Display
        Units and decimals of the reader [-].

    Returns
    -------
    str
        Lines of 100 columns, ending in a line break.
    """
    figures = Figures(display)
    lines = [
        *title(f"{view.vessel}   {view.service}".rstrip(), f"as of {view.as_of.isoformat()}"),
        *paragraph(words.CAUTION),
        "",
        *_answer(view, figures),
        "",
        *_headed("Pressure", _pressures(view, figures)),
        *_headed("Life and dates", _dates(view, figures)),
        *_headed("Relief and operation", _relief(view, figures)),
        *_headed("Ways out", _ways_out(view, figures)),
        *_headed("Gauge again", _re_gauge(view)),
        *_parts(view, figures),
        *_headed("Doubts", _notices(view.doubts)),
        *_headed("Gaps", _notices(view.gaps)),
        f"Journal head {view.journal_head}",
    ]
    return "\n".join(lines) + "\n"


def _answer(view: VesselView, figures: Figures) -> list[str]:
    lines = marked(view.standing, f"{view.standing}: {why(view, figures)}")
    beside = [f"{flag}" for flag in view.flags]
    if view.block not in {view.standing, *view.flags}:
        beside.append(view.block)
    if beside:
        lines += paragraph(f"Beside it: {', '.join(beside)}.", indent=5)
    measured = measured_words(view)
    if view.parts_known < view.parts_total:
        lines += paragraph(f"{measured[0].upper()}{measured[1:]}.", indent=5)
    return lines


def _headed(heading: str, lines: list[str]) -> list[str]:
    return [heading, *lines, ""] if lines else []


def _pressures(view: VesselView, figures: Figures) -> list[str]:
    unit = figures.unit("pressure")
    rows = [
        [f"nameplate MAWP [{unit}]", str(figures.carries(view.nameplate_mawp_mpa)), ""],
        [f"current MAWP [{unit}]", str(figures.carries(view.current_mawp_mpa)), ""],
        [f"MAWP today [{unit}]", str(figures.carries(view.mawp_today_mpa)), "by the wall on the as-of date"],
        [f"projected MAWP [{unit}]", str(figures.carries(view.projected_mawp_mpa)), _carried(view)],
    ]
    if _differ(view.projected_mawp_uncapped_mpa, view.projected_mawp_mpa):
        uncapped = str(figures.carries(view.projected_mawp_uncapped_mpa))
        rows.append([f"  without its cap [{unit}]", uncapped, "what the wall alone would carry"])
    if view.projected_mawp_at_list_end_mpa is not None:
        at_end = str(figures.carries(view.projected_mawp_at_list_end_mpa))
        rows.append(
            ["  at the end of the list", at_end, f"on {view.list_end_on.isoformat()}; carries no standing"]
        )
    return table([Head(""), Head("", right=True), Head("", wraps=True)], rows)[1:]


def _carried(view: VesselView) -> str:
    if view.carry_to_on is None:
        return "no carry-to date"
    said = f"on {view.carry_to_on.isoformat()}"
    said += f" ({view.carry_to_basis})" if view.carry_to_basis else ""
    said += f", {words.HELD_BY_HALF_LIFE}" if view.held_by_half_life else ""
    return said + (f", governed by {view.governing_pressure}" if view.governing_pressure else "")


def _differ(uncapped: float | None, capped: float | None) -> bool:
    return uncapped is not None and (capped is None or abs(uncapped - capped) > 1e-9 * max(uncapped, capped))


def _dates(view: VesselView, figures: Figures) -> list[str]:
    rows = [
        ["retirement", _day(view.retirement_on), _by(view.governing_life)],
        ["life left [years]", str(figures.years(view.life_left_years)), "from the as-of date"],
        ["internal or on-stream due", _day(view.internal_due_on), _due_by(view, figures)],
        ["external due", _day(view.external_due_on), _last(view.last_external_on)],
        ["current MAWP holds until", _day(view.rating_holds_until), ""],
    ]
    lines = table([Head(""), Head("", right=True), Head("", wraps=True)], rows)[1:]
    plateau = plateau_sentence(view, figures)
    said = [plateau] if plateau else []
    said.append(f"Rates, life, intervals and twice the loss by {view.rules} (known as: {view.rules_status}).")
    return lines + [line for text in said for line in paragraph(text, indent=5)]


def _due_by(view: VesselView, figures: Figures) -> str:
    said = [_last(view.last_internal_on)]
    if view.internal_interval_years is not None:
        said.append(f"interval {figures.with_unit(figures.years(view.internal_interval_years), 'years')}")
    if view.internal_due_on is not None:
        said.append(_by(view.governing_due) if view.governing_due else "the cap of the rule set governs")
    return ", ".join(said)


def _relief(view: VesselView, figures: Figures) -> list[str]:
    said = [sentence.text for sentence in relief_sentences(view, figures)]
    quiet = [device for device in view.relief if not device.now and not device.reset_by_on]
    said += [
        f"{device.device} ({figures.with_unit(figures.asked(device.set_pressure_mpa), 'pressure')}) "
        "is set no higher than what the wall carries."
        for device in quiet
    ]
    if not view.relief:
        said.append("No relief device is linked to this vessel.")
    operating = operating_sentence(view, figures)
    said += [operating] if operating else []
    return [line for text in said for line in paragraph(text, indent=5)]


def _ways_out(view: VesselView, figures: Figures) -> list[str]:
    ways = view.ways_out
    if ways is None:
        return []
    said = []
    until, renew = ways.rating_holds_until, ways.renew_by
    if until is not None and until < view.as_of:
        said.append(f"With twice the loss the current MAWP has not held since {until.isoformat()}.")
    elif until is not None:
        said.append(f"Look again by {until.isoformat()}: to that day the current MAWP holds.")
    reaches, current = ways.pressure_that_reaches_mpa, view.current_mawp_mpa
    if reaches is None or view.carry_to_on is None:
        said.append("No lower pressure reaches the carry-to date, or none can be had.")
    elif current is None or reaches < current:
        pressure = figures.with_unit(figures.carries(reaches), "pressure")
        said.append(f"Re-rate to {pressure}: the wall carries that to {view.carry_to_on.isoformat()}.")
    if renew is not None and renew < view.as_of:
        said.append(f"Repair or renewal has been due since {renew.isoformat()}.")
    elif renew is not None:
        said.append(f"Repair or renew by {renew.isoformat()}.")
    return [line for text in said for line in paragraph(text, indent=5)]


def _re_gauge(view: VesselView) -> list[str]:
    if not view.re_gauge:
        return []
    by = f" by {view.re_gauge_by.isoformat()}" if view.re_gauge_by else ""
    places = "; ".join(str(place) for place in view.re_gauge)
    return paragraph(f"{places}{by}.", indent=5)


def _parts(view: VesselView, figures: Figures) -> list[str]:
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
    return lines


def _notices(notices: Sequence[Notice]) -> list[str]:
    lines: list[str] = []
    for notice in notices:
        said = f"{notice.where}: {notice.code} ({notice.found}). To do: {notice.remedy}."
        lines += paragraph(said, indent=5, hanging=2)
    return lines


def _day(day: object) -> str:
    return NONE if day is None else str(day)


def _by(place: Place | None) -> str:
    return "" if place is None else f"governed by {place}"


def _last(day: object) -> str:
    return "none on record" if day is None else f"last on {day}"
