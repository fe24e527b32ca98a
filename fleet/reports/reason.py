"""Why a vessel has its standing, in one sentence with its figures in the units of the reader."""

from __future__ import annotations

from collections.abc import Callable

from fleet import words
from fleet.appraisal.views import LocationView, Place, VesselView
from fleet.reports.figures import Figures
from fleet.reports.known import DENYING
from fleet.reports.source import located


def why(view: VesselView, figures: Figures) -> str:
    """Say why a vessel has its standing.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    str
        The sentence of the appraisal where it has one; else one made from the figures of the view.
    """
    return view.sentence or _SAYS[view.standing](view, figures)


def telling_place(view: VesselView) -> Place | None:
    """Find the place that has the vessel's own standing, the one that governs life first.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    Place or None
    """
    _, governs = located(view, view.governing_life)
    if governs is not None and governs.standing == view.standing:
        return view.governing_life
    return next(
        (
            Place(part.part, place.location)
            for part in view.parts
            for place in part.locations
            if place.standing == view.standing
        ),
        view.governing_life,
    )


def _told(view: VesselView) -> tuple[str, LocationView | None]:
    place = telling_place(view)
    return ("the wall" if place is None else f"the wall at {place}"), located(view, place)[1]


def _wall_and_need(place: LocationView, figures: Figures) -> tuple[str, str]:
    wall = place.wall_used_mm if place.wall_in_strength_mm is None else place.wall_in_strength_mm
    return (
        figures.with_unit(figures.wall(wall), "length"),
        figures.with_unit(figures.needed(place.required_thickness_mm), "length"),
    )


def _below(view: VesselView, figures: Figures) -> str:
    said, place = _told(view)
    if place is None:
        return f"{said} is below the required thickness."
    wall, need = _wall_and_need(place, figures)
    return f"{said} is {wall} and {need} are required{_set_by(place)}."


def _at(view: VesselView, figures: Figures) -> str:
    said, place = _told(view)
    if place is None:
        return f"{said} is above the required thickness by less than the reading error can tell."
    wall, need = _wall_and_need(place, figures)
    return f"{said} is {wall}; that is above the required {need} by less than the reading error can tell."


def _used_up(view: VesselView, figures: Figures) -> str:
    said, place = _told(view)
    if place is None or place.retirement_on is None:
        return f"{said} has by its rate fallen below the required thickness."
    wall, need = _wall_and_need(place, figures)
    rate = figures.with_unit(figures.rate(place.planning_rate_mm_per_year), "rate")
    return (
        f"{said} was {wall} on {place.last_on}; at {rate} it came down to the required {need} "
        f"on {place.retirement_on}."
    )


def _short(view: VesselView, figures: Figures) -> str:
    day = "the carry-to date" if view.carry_to_on is None else view.carry_to_on.isoformat()
    then, current = view.projected_mawp_mpa, view.current_mawp_mpa
    if then is not None and current is not None and then < current:
        where = "" if view.governing_pressure is None else f" at {view.governing_pressure}"
        carried, asked = (figures.with_unit(figures.carries(value), "pressure") for value in (then, current))
        return f"on {day} the wall{where} carries {carried}; the current MAWP is {asked}."
    said, place = _told(view)
    if place is None:
        return f"on {day} {said} is below the required thickness."
    projected = figures.with_unit(figures.wall(place.projected_thickness_mm), "length")
    return f"on {day} {said} is {projected} and {_wall_and_need(place, figures)[1]} are required{_set_by(place)}."


def _no_verdict(view: VesselView, _figures: Figures) -> str:
    denying: dict[str, list[str]] = {}
    for notice in view.gaps:
        if notice.code in DENYING:
            denying.setdefault(notice.code, []).append(notice.where.removeprefix(f"{view.vessel} / "))
    if not denying:
        return f"{words.STANDING_MEANING[words.NO_VERDICT]}; see the gaps."
    told = [f"{code} ({', '.join(dict.fromkeys(places))})" for code, places in denying.items()]
    return f"{'; '.join(told)}."


def _running_out(view: VesselView, _figures: Figures) -> str:
    where = "" if view.governing_life is None else f" at {view.governing_life}"
    until = "" if view.retirement_on is None else f" on {view.retirement_on.isoformat()}"
    return f"the current MAWP is carried to {_carry_to(view)}; the wall{where} is used up{until}."


def _held(view: VesselView, figures: Figures) -> str:
    current = figures.with_unit(figures.carries(view.current_mawp_mpa), "pressure")
    half = f", {words.HELD_BY_HALF_LIFE}" if view.held_by_half_life else ""
    return f"the current MAWP of {current} is carried to {_carry_to(view)}{half}."


def _carry_to(view: VesselView) -> str:
    return "the carry-to date" if view.carry_to_on is None else view.carry_to_on.isoformat()


def _set_by(place: LocationView) -> str:
    return f", set by {place.required_by}" if place.required_by else ""


_SAYS: dict[str, Callable[[VesselView, Figures], str]] = {
    words.BELOW_REQUIRED: _below,
    words.AT_REQUIRED: _at,
    words.USED_UP: _used_up,
    words.RATING_SHORT: _short,
    words.NO_VERDICT: _no_verdict,
    words.RUNNING_OUT: _running_out,
    words.RATING_HELD: _held,
}
