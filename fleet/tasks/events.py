"""Record what happens to a vessel and what is decided about it: restarts, states, decisions, settings.

Each function is one journal entry. Later facts never change earlier ones; what is in force on a day is chosen
when an appraisal is assembled.
"""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from datetime import date, datetime
from typing import Any

from fleet.errors import Refused
from fleet.intake.tables import ITEM_STATES, VESSEL_STATES
from fleet.store import Engine, journal, models
from fleet.store.record import DECISION_KINDS, RESTART_KINDS, RESTART_WHATS
from fleet.tasks.names import Names, fetch_names
from fleet.tasks.reader import Reader
from fleet.tasks.settings import OF_THE_DATABASE_ONLY, checked_value

_NEEDED: dict[str, tuple[str, ...]] = {
    "re-rating": ("pressure_mpa",),
    "chosen rate": ("rate_mm_per_year", "rests_on", "review_on"),
    "deferral": ("until_on",),
    "on-stream acceptance": (),
    "other": (),
}
"""What a decision of each kind must say beyond its date, its reason and who decided."""


def add_restart(
    engine: Engine,
    *,
    vessel: str,
    part: str,
    kind: str,
    what: str,
    happened_on: date,
    reason: str,
    by: str,
    locations: Sequence[str] = (),
    whole_part: bool = False,
    baselines_mm: Mapping[str, float] | None = None,
    at: datetime | None = None,
) -> int:
    """Record what begins a new history at named locations.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    vessel, part : str
        Where it happened [text].
    kind : {'new metal', 'new service'}
        What begins [text].
    what : {'replaced', 'overlaid', 're-lined', 'changed service'}
        What was done [text].
    happened_on : date
        The day it was done [date].
    reason, by : str
        Why, and who records it [text].
    locations : sequence of str
        The locations on the part [text].
    whole_part : bool
        Whether the whole part is meant, with locations laid out later [-].
    baselines_mm : mapping of str to float, optional
        Wall measured then, by location [mm].
    at : datetime, optional
        Moment of the entry; now where absent [date].

    Returns
    -------
    int
        Number of the journal entry.

    Raises
    ------
    UnknownTag
        If the vessel, part or a location is not on the register.
    Refused
        If a word is not one of those above, no location is named, or a baseline is not above zero.
    """
    where = f"restart at vessel {vessel}, part {part}"
    _one_of(where, "kind", kind, RESTART_KINDS)
    _one_of(where, "what", what, RESTART_WHATS)
    names = _names(engine)
    part_id = names.part(vessel, part)
    baselines = dict(baselines_mm or {})
    if not locations and not whole_part:
        raise Refused(
            where, "no location is named", "name the locations, or say that the whole part is meant"
        )
    for location, thickness in baselines.items():
        if not thickness > 0 or not math.isfinite(thickness):
            raise Refused(
                where, f"the baseline of {location} is {thickness!r} mm", "give a thickness above zero"
            )
    named = {location: names.location(vessel, part, location) for location in (*locations, *baselines)}
    with journal.writer(engine, task="restart add", by=by, why=reason, at=at) as entry:
        row = {
            "vessel_id": names.vessel(vessel),
            "part_id": part_id,
            "kind": kind,
            "what": what,
            "happened_on": happened_on,
            "reason": reason,
            "whole_part": whole_part,
        }
        (restart,) = entry.add(models.Restart, [row])
        entry.add(
            models.RestartLocation,
            [
                {"restart_id": restart, "location_id": named[location]}
                for location in dict.fromkeys(locations)
            ],
        )
        entry.add(
            models.Reading,
            [
                {
                    "location_id": named[location],
                    "taken_on": happened_on,
                    "thickness_mm": thickness,
                    "result": "read",
                    "kind": "baseline",
                    "status": "accepted",
                }
                for location, thickness in baselines.items()
            ],
        )
        return int(entry.no)


def set_state(
    engine: Engine,
    *,
    vessel: str,
    state: str,
    from_on: date,
    reason: str,
    by: str,
    part: str | None = None,
    location: str | None = None,
    at: datetime | None = None,
) -> int:
    """Record the state of a vessel, part or location from a day on.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    vessel : str
        Tag of the vessel [text].
    state : str
        The state: of a vessel one of the register's words, else in service or withdrawn [text].
    from_on : date
        The day from which it holds [date].
    reason, by : str
        Why, and who records it [text].
    part, location : str, optional
        The part or location, where it is not the vessel itself [text].
    at : datetime, optional
        Moment of the entry; now where absent [date].

    Returns
    -------
    int
        Number of the journal entry.

    Raises
    ------
    UnknownTag
        If the vessel, part or location is not on the register.
    Refused
        If the state is none of the words for it.
    """
    subject = _subject(_names(engine), vessel, part, location)
    where = f"state of {_said(vessel, part, location)}"
    _one_of(where, "state", state, VESSEL_STATES if part is None else ITEM_STATES)
    row = {
        "subject_id": subject,
        "state": state,
        "from_on": from_on,
        "date_known": "yes",
        "reason": reason,
    }
    return _record(engine, models.DatedState, row, task="state set", by=by, why=reason, at=at)


def add_decision(
    engine: Engine,
    *,
    vessel: str,
    kind: str,
    decided_on: date,
    decided_by: str,
    reason: str,
    by: str,
    part: str | None = None,
    location: str | None = None,
    effective_on: date | None = None,
    review_on: date | None = None,
    until_on: date | None = None,
    pressure_mpa: float | None = None,
    rate_mm_per_year: float | None = None,
    rests_on: str | None = None,
    second_by: str | None = None,
    written: Mapping[str, str] | None = None,
    at: datetime | None = None,
) -> int:
    """Record what the engineer decided.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    vessel : str
        Tag of the vessel [text].
    kind : {'re-rating', 'chosen rate', 'deferral', 'on-stream acceptance', 'other'}
        What was decided [text].
    decided_on : date
        The day of the decision [date].
    decided_by, reason, by : str
        Who decided, why, and who records it [text].
    part, location : str, optional
        What it is about, where it is not the whole vessel [text].
    effective_on, review_on, until_on : date, optional
        From when it holds, when it must be looked at again, to when a due date is moved [date].
    pressure_mpa : float, optional
        The new current MAWP of a re-rating [MPa].
    rate_mm_per_year : float, optional
        The chosen planning rate [mm/year].
    rests_on, second_by : str, optional
        The readings a chosen rate rests on; the second engineer [text].
    written : mapping of str to str, optional
        The physical values as they were written, by column [text].
    at : datetime, optional
        Moment of the entry; now where absent [date].

    Returns
    -------
    int
        Number of the journal entry.

    Raises
    ------
    UnknownTag
        If the vessel, part or location is not on the register.
    Refused
        If the kind is unknown, something it needs is missing, or a figure cannot be true.
    """
    where = f"{kind} of {_said(vessel, part, location)}"
    _one_of(where, "kind", kind, DECISION_KINDS)
    names = _names(engine)
    _subject(names, vessel, part, location)
    row: dict[str, Any] = {
        "vessel_id": names.vessel(vessel),
        "part_id": None if part is None else names.part(vessel, part),
        "location_id": None if part is None or location is None else names.location(vessel, part, location),
        "kind": kind,
        "decided_on": decided_on,
        "effective_on": effective_on,
        "review_on": review_on,
        "until_on": until_on,
        "pressure_mpa": pressure_mpa,
        "rate_mm_per_year": rate_mm_per_year,
        "rests_on": rests_on,
        "reason": reason,
        "decided_by": decided_by,
        "second_by": second_by,
        "written": dict(written) if written else None,
    }
    for needed in (*_NEEDED[kind], "reason", "decided_by"):
        if row[needed] is None or row[needed] == "":
            raise Refused(where, f"{needed} is missing", f"a {kind} must say its {needed}")
    if pressure_mpa is not None and (not pressure_mpa > 0 or not math.isfinite(pressure_mpa)):
        raise Refused(where, f"the pressure is {pressure_mpa!r} MPa", "give a pressure above zero")
    if rate_mm_per_year is not None and (not rate_mm_per_year >= 0 or not math.isfinite(rate_mm_per_year)):
        raise Refused(where, f"the rate is {rate_mm_per_year!r} mm/year", "give a rate of zero or above")
    return _record(engine, models.Decision, row, task="decide", by=by, why=reason, at=at)


def set_setting(
    engine: Engine,
    *,
    key: str,
    value: float,
    from_on: date,
    by: str,
    reason: str | None = None,
    vessel: str | None = None,
    part: str | None = None,
    location: str | None = None,
    at: datetime | None = None,
) -> int:
    """Record a setting from a day on.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    key : str
        Name of the setting; physical ones end in their unit [text].
    value : float
        Its value in that unit [-].
    from_on : date
        The day from which it holds [date].
    by : str
        Who records it [text].
    reason : str, optional
        Why [text].
    vessel, part, location : str, optional
        What it is for; the whole database where absent [text].
    at : datetime, optional
        Moment of the entry; now where absent [date].

    Returns
    -------
    int
        Number of the journal entry.

    Raises
    ------
    UnknownTag
        If the vessel, part or location is not on the register.
    Refused
        If the key is unknown, the value cannot be true, or the setting is one of the whole list.
    """
    checked_value(key, value)
    if vessel is not None and key in OF_THE_DATABASE_ONLY:
        raise Refused(
            f"setting {key!r}", f"it was to be set for vessel {vessel}", "set it for the whole list"
        )
    subject = None if vessel is None else _subject(_names(engine), vessel, part, location)
    row = {"key": key, "value": repr(float(value)), "subject_id": subject, "from_on": from_on}
    return _record(engine, models.Setting, row, task="setting set", by=by, why=reason, at=at)


def _record(
    engine: Engine,
    model: type[models.Base],
    row: Mapping[str, object],
    *,
    task: str,
    by: str,
    why: str | None,
    at: datetime | None,
) -> int:
    with journal.writer(engine, task=task, by=by, why=why, at=at) as entry:
        entry.add(model, [row])
        return int(entry.no)


def _names(engine: Engine) -> Names:
    with engine.connect() as conn:
        return fetch_names(Reader.at(conn, as_of=date.max))


def _subject(names: Names, vessel: str, part: str | None, location: str | None) -> int:
    if part is None:
        if location is not None:
            raise Refused(f"location {location!r}", "its part is not named", "name the part too")
        return names.vessel(vessel)
    return names.part(vessel, part) if location is None else names.location(vessel, part, location)


def _said(vessel: str, part: str | None, location: str | None) -> str:
    words = [f"vessel {vessel}"]
    words += [f"part {part}"] if part is not None else []
    words += [f"location {location}"] if location is not None else []
    return ", ".join(words)


def _one_of(where: str, name: str, word: str, known: Sequence[str]) -> None:
    if word not in known:
        raise Refused(where, f"{name} is {word!r}", f"use one of: {', '.join(known)}")
