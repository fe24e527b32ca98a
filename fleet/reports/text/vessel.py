"""One vessel as a letter: the answer first, then the figures and what they rest on."""

from __future__ import annotations

from fleet import units, words
from fleet.appraisal.views import Place, VesselView, WaysOut
from fleet.reports.figures import NONE, Figures
from fleet.reports.known import NOT_ASSESSED, capital, known_only, speaks_for
from fleet.reports.reason import why
from fleet.reports.sentences import (
    interval_words,
    operating_sentence,
    plateau_sentence,
    quiet_relief,
    relief_sentences,
)
from fleet.reports.text.layout import Head, marked, paragraph, table, title
from fleet.reports.text.parts import notice_lines, parts_and_locations


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
    partly = speaks_for(view)
    lines = [
        *title(f"{view.vessel}   {view.service}".rstrip(), f"as of {view.as_of.isoformat()}"),
        *paragraph(words.CAUTION),
        "",
        *_answer(view, figures),
        "",
        *_headed("Pressure", _pressures(view, figures), partly),
        *_headed("Life and dates", _dates(view, figures), partly),
        *_headed("Relief and operation", _relief(view, figures)),
        *_headed("Ways out", _ways_out(view, figures)),
        *_headed("Gauge again", _re_gauge(view)),
        *parts_and_locations(view, figures),
        *_headed("Doubts", notice_lines(view.doubts, figures)),
        *_headed("Gaps", notice_lines(view.gaps, figures)),
        f"Journal head {view.journal_head}",
    ]
    return "\n".join(lines) + "\n"


def _answer(view: VesselView, figures: Figures) -> list[str]:
    if view.block == words.RETIRED:
        lines = paragraph(f"{words.RETIRED}: kept on the register so that the list adds up.", indent=5)
        lines += marked(view.standing, f"By its last figures {view.standing}: {why(view, figures)}")
    else:
        lines = marked(view.standing, f"{view.standing}: {why(view, figures)}")
    beside = list(view.flags)
    if view.block not in {view.standing, words.RETIRED, *view.flags}:
        beside.append(view.block)
    if beside:
        lines += paragraph(f"Beside it: {', '.join(beside)}.", indent=5)
    partly = speaks_for(view)
    if partly:
        said = (
            "The figures below leave out what was not assessed" if partly == NOT_ASSESSED else capital(partly)
        )
        lines += paragraph(f"{said}.", indent=5)
    return lines


def _headed(heading: str, lines: list[str], partly: str = "") -> list[str]:
    """Set lines beneath their heading; beside it stands for what they speak, where that is not the whole vessel."""
    return [f"{heading}   {partly}".rstrip(), *lines, ""] if lines else []


def _pressures(view: VesselView, figures: Figures) -> list[str]:
    unit = figures.unit("pressure")
    rows = [
        [
            f"nameplate MAWP [{unit}]",
            str(figures.carries(view.nameplate_mawp_mpa)),
            _written(view, "nameplate_mawp", figures),
        ],
        [
            f"current MAWP [{unit}]",
            str(figures.carries(view.current_mawp_mpa)),
            _written(view, "current_mawp", figures),
        ],
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


def _written(view: VesselView, column: str, figures: Figures) -> str:
    written = figures.as_written(view.written.get(column, ""), "pressure")
    return f"({written})" if written else ""


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
    if speaks_for(view):
        rows[-1] = [
            "what is known suffices until",
            rows[-1][1],
            "for the current MAWP; of the rest it says nothing",
        ]
    lines = table([Head(""), Head("", right=True), Head("", wraps=True)], rows)[1:]
    plateau = plateau_sentence(view, figures)
    said = [plateau] if plateau else []
    said.append(f"Rates, life, intervals and twice the loss by {view.rules} (known as: {view.rules_status}).")
    return lines + [line for text in said for line in paragraph(text, indent=5)]


def _due_by(view: VesselView, figures: Figures) -> str:
    return ", ".join(text for text in (_last(view.last_internal_on), interval_words(view, figures)) if text)


def _relief(view: VesselView, figures: Figures) -> list[str]:
    said = [sentence.text for sentence in relief_sentences(view, figures)]
    said += quiet_relief(view, figures)
    if not view.relief:
        said.append("No relief device is linked to this vessel.")
    operating = operating_sentence(view, figures)
    said += [operating] if operating else []
    return [line for text in said for line in paragraph(text, indent=5)]


def _ways_out(view: VesselView, figures: Figures) -> list[str]:
    ways = view.ways_out
    if ways is None or view.block == words.RETIRED:
        return []
    said = _of_known_parts(view, ways, figures) if known_only(view) else _of_all_parts(view, ways, figures)
    return [line for text in said for line in paragraph(text, indent=5)]


def _of_all_parts(view: VesselView, ways: WaysOut, figures: Figures) -> list[str]:
    said = []
    until, renew = ways.rating_holds_until, ways.renew_by
    if until is not None and until < view.as_of:
        said.append(f"With twice the loss the current MAWP has not held since {until}.")
    elif until is not None:
        said.append(f"Look again by {until}: to that day the current MAWP holds.")
    lower = _lower_pressure(view, ways, figures)
    said += [f"{capital(lower)}."] if lower else []
    if renew is not None and renew < view.as_of:
        said.append(f"Repair or renewal has been due since {renew}.")
    elif renew is not None:
        said.append(f"Repair or renew by {renew}.")
    return said


def _of_known_parts(view: VesselView, ways: WaysOut, figures: Figures) -> list[str]:
    """Say what is known, and claim nothing of the rest: least of all that the rating holds."""
    said, told = [], []
    until, renew = ways.rating_holds_until, ways.renew_by
    if view.standing == words.NO_VERDICT:
        said.append("Measure or record first what is missing (see the gaps); until then there is no verdict.")
    if until is not None:
        past = f"with twice the loss the current MAWP has not held since {until}"
        told.append(past if until < view.as_of else f"the wall suffices for the current MAWP to {until}")
    lower = _lower_pressure(view, ways, figures)
    if lower and not (view.standing == words.NO_VERDICT and ways.pressure_that_reaches_mpa is None):
        told.append(lower)
    if renew is not None:
        told.append(f"repair or renewal {'due since' if renew < view.as_of else 'by'} {renew}")
    return [*said, f"{capital(known_only(view))}: {'; '.join(told)}."] if told else said


def _lower_pressure(view: VesselView, ways: WaysOut, figures: Figures) -> str:
    """Say which lower pressure reaches the carry-to date; empty where none is needed."""
    reaches, current = ways.pressure_that_reaches_mpa, view.current_mawp_mpa
    if reaches is None or view.carry_to_on is None:
        return "no lower pressure reaches the carry-to date, or none can be had"
    if current is not None and reaches >= current:
        return ""
    pressure = figures.with_unit(figures.carries(reaches), "pressure")
    return f"re-rate to {pressure}: the wall carries that to {view.carry_to_on}"


def _re_gauge(view: VesselView) -> list[str]:
    if not view.re_gauge:
        return []
    by = f" by {view.re_gauge_by.isoformat()}" if view.re_gauge_by else ""
    places = "; ".join(str(place) for place in view.re_gauge)
    return paragraph(f"{places}{by}.", indent=5)


def _day(day: object) -> str:
    return NONE if day is None else str(day)


def _by(place: Place | None) -> str:
    return "" if place is None else f"governed by {place}"


def _last(day: object) -> str:
    return "none on record" if day is None else f"last on {day}"
