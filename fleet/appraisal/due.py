"""When each vessel is due, and the date to which its wall must carry the pressure: rules 7 and 8."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.appraisal.groups import greatest_by, least_by, place_of_least
from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints, Texts
from fleet.rules import load_rule_set
from fleet.thinning.clock import DAYS_PER_YEAR, ServiceClock, whole_days

PLANNED, DUE, LIST_LIFE, ASKED = "planned survey", "internal due date", "life of the list", "date asked for"
"""What a carry-to date rests on."""


def rule_values(inputs: Inputs, name: str) -> Floats:
    """Give one value of every vessel's rule set.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    name : str
        Name of the value [text].

    Returns
    -------
    ndarray
        Shape (vessels,), in the value's unit.
    """
    out = np.full(len(inputs.vessels), np.nan)
    for rules in set(inputs.vessels.rules.tolist()):
        out[np.asarray(inputs.vessels.rules == rules, dtype=np.bool_)] = load_rule_set(rules)[name]
    return out


@dataclass(frozen=True)
class Looked:
    """When each vessel was last looked at; all arrays of shape (vessels,).

    Parameters
    ----------
    internal_day, external_day : ndarray
        Last counting inspection, or in-service where none is on record [day].
    no_internal, no_external : ndarray
        Whether none is on record [-].
    deferral_day : ndarray
        Day to which the first deferral since the last inspection asks to move the due date, NaN where none [day].
    deferred_on : ndarray
        Day on which it was recorded [day].
    deferrals : ndarray
        Deferrals recorded since the last inspection [count].
    """

    internal_day: Floats
    external_day: Floats
    no_internal: Bools
    no_external: Bools
    deferral_day: Floats
    deferred_on: Floats
    deferrals: Ints


def looked(inputs: Inputs, as_of_day: float) -> Looked:
    """Find the last counting inspections.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    as_of_day : float
        The as-of date [day].

    Returns
    -------
    Looked

    Notes
    -----
    Only a full inspection counts. On-stream counts as internal only while an acceptance with its grounds stands.
    """
    count, done, made = len(inputs.vessels), inputs.inspections, inputs.decisions
    full = np.asarray(done.extent == "full", dtype=np.bool_) & (done.done_day <= as_of_day)
    stands = np.asarray(made.kind == "on-stream acceptance", dtype=np.bool_) & (made.decided_day <= as_of_day)
    stands &= ~(made.until_day < as_of_day) & ~(made.review_day < as_of_day)
    stands &= np.asarray(made.reason != "", dtype=np.bool_)
    accepted = np.zeros(count, dtype=np.bool_)
    accepted[made.vessel[stands]] = True
    onstream = np.asarray(done.kind == "on-stream", dtype=np.bool_) & accepted[done.vessel]
    inside = full & (np.asarray(done.kind == "internal", dtype=np.bool_) | onstream)
    outside = full & np.asarray(done.kind == "external", dtype=np.bool_)
    internal = greatest_by(np.where(inside, done.done_day, np.nan), done.vessel, count)
    external = greatest_by(np.where(outside, done.done_day, np.nan), done.vessel, count)
    begun = inputs.vessels.in_service_day
    internal_day = np.where(np.isnan(internal), begun, internal)

    asks = np.asarray(made.kind == "deferral", dtype=np.bool_) & (made.decided_day <= as_of_day)
    asks &= made.decided_day >= internal_day[made.vessel]
    first = place_of_least(np.where(asks, made.decided_day, np.nan), made.vessel, count)
    has = first >= 0
    until, on = np.full(count, np.nan), np.full(count, np.nan)
    until[has], on[has] = made.until_day[first[has]], made.decided_day[first[has]]
    return Looked(
        internal_day=internal_day,
        external_day=np.where(np.isnan(external), begun, external),
        no_internal=np.isnan(internal),
        no_external=np.isnan(external),
        deferral_day=until,
        deferred_on=on,
        deferrals=np.bincount(made.vessel[asks], minlength=count).astype(np.int64),
    )


@dataclass(frozen=True)
class Dues:
    """Due dates; all arrays of shape (vessels,).

    Parameters
    ----------
    internal_day, external_day : ndarray
        Internal or on-stream, and external due date [day].
    governing : ndarray
        Location whose half life sets the internal due date, -1 where the cap does [-].
    interval_years : ndarray
        The lesser of half life (or short-life rule) and cap, for the location that governs [year].
    deferral_refused, deferral_cut : ndarray
        A deferral that moves nothing, or moves less than it asks [-].
    """

    internal_day: Floats
    external_day: Floats
    governing: Ints
    interval_years: Floats
    deferral_refused: Bools
    deferral_cut: Bools


def dues(
    inputs: Inputs, seen: Looked, clock: ServiceClock, half_life_day: Floats, half_life_exact: Floats,
    interval_years: Floats, vessel_of: Ints,
) -> Dues:  # fmt: skip
    """Work out the due dates by each vessel's rule set.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    seen : Looked
        Last counting inspections [-].
    clock : ServiceClock
        Days that count [-].
    half_life_day : ndarray
        Last observation plus half life or short-life rule, NaN where unknown; shape (locations,) [day].
    half_life_exact : ndarray
        The same before rounding down, for the order of equals; shape (locations,) [day].
    interval_years : ndarray
        Half life or short-life interval; shape (locations,) [year].
    vessel_of : ndarray
        Vessel of each location; shape (locations,) [-].

    Returns
    -------
    Dues
    """
    count = len(inputs.vessels)
    every = np.arange(count, dtype=np.int64)
    cap = rule_values(inputs, "internal_cap_years")
    cap_day = clock.later(every, seen.internal_day, cap)
    row = place_of_least(half_life_exact, vessel_of, count)
    has = row >= 0
    by_life, interval = np.full(count, np.nan), cap.copy()
    by_life[has] = least_by(half_life_day, vessel_of, count)[has]
    interval[has] = np.minimum(interval_years[row[has]], cap[has])
    by_location = by_life <= cap_day
    internal = np.where(by_location, by_life, cap_day)

    most = np.minimum(
        rule_values(inputs, "deferral_fraction") * interval, rule_values(inputs, "deferral_cap_years")
    )
    limit = internal + whole_days(most)
    asked = ~np.isnan(seen.deferral_day) & (seen.deferral_day > internal)
    in_time = seen.deferred_on <= internal
    moved = np.where(asked & in_time, np.minimum(seen.deferral_day, limit), internal)

    external_years = np.minimum(rule_values(inputs, "external_cap_years"), interval)
    return Dues(
        internal_day=moved,
        external_day=clock.later(every, seen.external_day, external_years),
        governing=np.where(by_location, row, -1),
        interval_years=interval,
        deferral_refused=(asked & ~in_time) | (seen.deferrals > 1),
        deferral_cut=asked & in_time & (seen.deferral_day > limit),
    )


@dataclass(frozen=True)
class Carry:
    """To which date the wall must carry the pressure; all arrays of shape (vessels,).

    Parameters
    ----------
    day : ndarray
        Carry-to date [day].
    basis : ndarray of object
        What it rests on [text].
    list_end_day : float
        End of the list [day].
    planned_after_due : ndarray
        Whether the planned survey lies after the due date [-].
    """

    day: Floats
    basis: Texts
    list_end_day: float
    planned_after_due: Bools


def carry_to(inputs: Inputs, due: Dues, as_of_day: float, asked_day: float | None) -> Carry:
    """Settle the carry-to date of every vessel.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    due : Dues
        Due dates [-].
    as_of_day : float
        The as-of date [day].
    asked_day : float or None
        A date that replaces the rule, overdue or not [day].

    Returns
    -------
    Carry

    Notes
    -----
    The planned survey if it is not past; else the internal or on-stream due date. Where that is past: the later of the
    planned survey and the as-of date plus the life of the list.
    """
    planned = inputs.vessels.next_survey_day
    list_end = as_of_day + float(np.floor(inputs.settings.list_life_years * DAYS_PER_YEAR))
    ahead = planned >= as_of_day
    past = due.internal_day < as_of_day
    late = past & ~(ahead & (planned >= list_end))
    day = np.where(past, np.fmax(planned, list_end), np.where(ahead, planned, due.internal_day))
    basis = np.where(late, LIST_LIFE, np.where(ahead, PLANNED, DUE)).astype(object)
    if asked_day is not None:
        day, basis = np.full(len(day), asked_day), np.full(len(day), ASKED, dtype=object)
    return Carry(day, basis, list_end, ahead & (planned > due.internal_day))
