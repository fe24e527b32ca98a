"""What is said of one vessel in sentences: relief, operating pressure, and how its interval comes about."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date

from fleet import words
from fleet.appraisal.views import LocationView, Place, ReliefView, VesselView
from fleet.reports.figures import Figures
from fleet.reports.known import capital, known_only
from fleet.reports.source import located

BELOW = frozenset((words.BELOW_REQUIRED, words.USED_UP))
"""Standings at which the wall is below what is required already on the as-of date [text]."""
NOT_PRESSURE = frozenset(("structural", "external", "axial load"))
"""What sets a required thickness that no lower pressure makes smaller [text]."""
NO_LIFE_LEFT = "No life is left; the wall is to be looked at at once."
"""What is said instead of an interval of nothing [text]."""
MOVED = "a deferral or idle time on record moves it"
CLOSE = 1e-9
"""Relative difference within which two figures of the view are the same one [-]."""


@dataclass(frozen=True)
class Sentence:
    """One sentence of a report.

    Parameters
    ----------
    text : str
        The sentence [text].
    relief_above_today : bool
        Whether it says that a relief device is set above what the wall carries today [-].
    """

    text: str
    relief_above_today: bool = False


def relief_sentences(view: VesselView, figures: Figures) -> tuple[Sentence, ...]:
    """Say of each relief device of a vessel how it stands to the wall, now and later.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    tuple of Sentence
        First what is set above what the wall carries today, then what must be reset by a date.
    """
    said = [
        Sentence(
            f"{device_words(device, figures)} is {device.now}, {_carries(view, figures)}.",
            relief_above_today=True,
        )
        for device in view.relief
        if device.now
    ]
    for device in view.relief:
        day = device.reset_by_on
        if day is not None and not device.now:
            body = f"{device_words(device, figures)} is to be {words.RESET_BY} {day.isoformat()}"
            said.append(Sentence(_qualified(view, body, day)))
    return tuple(said)


def quiet_relief(view: VesselView, figures: Figures) -> list[str]:
    """Say of each relief device of which `relief_sentences` says nothing why that is so.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    list of str
        What the wall carries is never taken for enough where it is not known.
    """
    said = []
    for device in view.relief:
        if device.now or device.reset_by_on:
            continue
        told, today = device_words(device, figures), view.mawp_today_mpa
        if today is not None and device.set_pressure_mpa <= today * (1 + CLOSE):
            said.append(_qualified(view, f"{told} is set no higher than what the wall carries today"))
        elif today is None:
            said.append(f"{told} cannot be held against the wall: what that carries is not known.")
        else:
            said.append(f"{told} is set higher than {_carries(view, figures)}, which the wall carries today.")
    return said


def operating_sentence(view: VesselView, figures: Figures) -> str:
    """Say how the operating pressure stands to the wall.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    str
        Empty where there is nothing to say.
    """
    if view.operating_pressure_mpa is None:
        return ""
    pressure = figures.with_unit(figures.asked(view.operating_pressure_mpa), "pressure")
    written = figures.as_written(view.written.get("operating_pressure", ""), "pressure")
    pressure += f" ({written})" if written else ""
    if view.operating_above_today:
        return f"It operates at {pressure}, above what the wall carries today, {_carries(view, figures)}."
    day = view.operating_until
    if day is None:
        return ""
    return _qualified(view, f"the wall carries its operating pressure of {pressure} until {day}", day)


def plateau_sentence(view: VesselView, figures: Figures) -> str:
    """Say, on the short-life plateau, what the clause allows and how far the rating holds.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    str
        Empty where the short-life rule does not govern.
    """
    if view.clause_interval_years is None or view.half_life_on_plateau_years is None:
        return ""
    if not view.clause_interval_years > 0:
        return NO_LIFE_LEFT
    allowed, half = figures.years(view.clause_interval_years), figures.years(view.half_life_on_plateau_years)
    return (
        f"The clause allows an interval of {figures.with_unit(allowed, 'years')}; "
        f"with twice the loss the rating holds only to half life, {figures.with_unit(half, 'years')}."
    )


def cap_sentence(view: VesselView, figures: Figures) -> str:
    """Say that the cap comes first, where the interval printed beside the due date is not the one it counts by.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    str
        Empty where a location governs the due date, or where the interval is the cap itself.
    """
    if view.internal_due_on is None or view.governing_due is not None:
        return ""
    place = _setting_interval(view)
    if place is None:
        return ""
    years = figures.with_unit(figures.years(view.internal_interval_years), "years")
    return f"{_cap(view)}, comes first; {_rule(place)} allows {years} from the last reading"


def interval_words(view: VesselView, figures: Figures) -> str:
    """Say how the internal or on-stream due date comes about.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    str
        The interval stands only beside the date from which it counts; empty where nothing is due.
    """
    if view.internal_due_on is None:
        return ""
    return (
        _by_cap(view, figures) if view.governing_due is None else _by_place(view, view.governing_due, figures)
    )


def device_words(device: ReliefView, figures: Figures) -> str:
    """Name a relief device with its setting, and the setting as written where its unit is another.

    Parameters
    ----------
    device : ReliefView
        The device [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    str
    """
    pressure = figures.with_unit(figures.asked(device.set_pressure_mpa), "pressure")
    written = figures.as_written(device.written, "pressure")
    return f"{device.device} ({pressure}, {written})" if written else f"{device.device} ({pressure})"


def _qualified(view: VesselView, body: str, day: date | None = None) -> str:
    """Say a sentence about pressure with what takes away from it; the body begins with a tag or in lower case."""
    lead, tail = [], ""
    if view.standing in BELOW:
        lead, tail = ["by pressure alone"], "; the wall is below what is required"
    elif day is not None and _minimum_first(view, day):
        lead = ["by pressure alone"]
        tail = f"; a minimum that is no matter of pressure is reached on {view.retirement_on}"
    known = known_only(view)
    lead += [known] if known else []
    if not lead:
        return f"{capital(body) if body.startswith('the ') else body}."
    return f"{capital(', '.join(lead))}{':' if known else ','} {body}{tail}."


def _minimum_first(view: VesselView, day: date) -> bool:
    """Tell whether the wall is down to a minimum that is no matter of pressure before a day."""
    _, place = located(view, view.governing_life)
    by_minimum = place is not None and place.required_by in NOT_PRESSURE
    return by_minimum and view.retirement_on is not None and view.retirement_on < day


def _carries(view: VesselView, figures: Figures) -> str:
    if view.mawp_today_mpa is None:
        return "which is not known"
    return figures.with_unit(figures.carries(view.mawp_today_mpa), "pressure")


def _by_place(view: VesselView, governs: Place, figures: Figures) -> str:
    interval = view.internal_interval_years
    if interval is None:
        return f"governed by {governs}"
    if not interval > 0:
        return f"no interval is left at {governs}"
    _, place = located(view, governs)
    years = figures.with_unit(figures.years(interval), "years")
    return f"{years} from the last reading at {governs}{_moved(view, place.last_on if place else None)}"


def _by_cap(view: VesselView, figures: Figures) -> str:
    comes_first = cap_sentence(view, figures)
    if comes_first:
        return comes_first
    moved, interval = _moved(view, view.last_internal_on), view.internal_interval_years
    unsure = (moved or view.last_internal_on is None) and _unshown(view)
    if interval is None or unsure:
        return f"{_cap(view)}{moved}"
    return f"{_cap(view)}: {figures.with_unit(figures.years(interval), 'years')}{moved}"


def _unshown(view: VesselView) -> bool:
    """Tell whether a measured location shows no interval of its own: the one of the vessel may then not be the cap."""
    return any(
        place.observations and place.half_life_interval_years is None
        for part in view.parts
        for place in part.locations
    )


def _cap(view: VesselView) -> str:
    since = "from in-service" if view.last_internal_on is None else "from the last look"
    return f"the cap of the rule set, counted {since}"


def _setting_interval(view: VesselView) -> LocationView | None:
    """Find the location whose own interval is the one of the vessel; none where that is the cap."""
    interval = view.internal_interval_years
    if interval is None:
        return None
    return next(
        (
            place
            for part in view.parts
            for place in part.locations
            if place.half_life_interval_years is not None
            and abs(place.half_life_interval_years - interval) <= CLOSE * max(interval, 1.0)
        ),
        None,
    )


def _rule(place: LocationView) -> str:
    """Name the rule by which a location has its interval."""
    life, interval = place.remaining_life_years, place.half_life_interval_years
    if life is None or interval is None or abs(interval - life / 2) <= CLOSE * max(life, 1.0):
        return "half life"
    return "the short-life rule"


def _moved(view: VesselView, counted_from: date | None) -> str:
    """Say that a due date does not lie where its interval puts it, by more than a day of rounding."""
    interval = view.internal_interval_years
    if counted_from is None or interval is None or view.internal_due_on is None:
        return ""
    days = (view.internal_due_on - counted_from).days
    return f" ({MOVED})" if abs(days - interval * 365.25) > 2 else ""
