"""From readings to histories and planning rates: rules 1 to 4 of an appraisal, for all locations at once."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.appraisal.groups import any_by, greatest_by
from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints
from fleet.appraisal.rates import Ground, rates
from fleet.appraisal.restarts import RestartIndex
from fleet.appraisal.strength import strength
from fleet.appraisal.visits import Visits, visits
from fleet.thinning.clock import ServiceClock
from fleet.thinning.histories import History, Starts
from fleet.thinning.observations import Measured
from fleet.thinning.planning import Chosen, Planning, SharedShift


@dataclass(frozen=True)
class Thinned:
    """What the readings say of every location. Arrays of shape (locations,) unless said.

    Parameters
    ----------
    live : ndarray
        Locations in use [-].
    live_part : ndarray
        Parts that are on their vessel; shape (parts,) [-].
    now : History
        The present history; its walls are walls in strength [-].
    plan, plan_long : Planning
        The planning rate, and what it would be were the doubtful short-term rates left out [-].
    in_doubt : ndarray
        Where the short-term rate governs within its error [-].
    shift : SharedShift
        Parts whose locations shifted together; shape (parts,) [-].
    visits : Visits
        Last visits [-].
    deduct_mm : ndarray
        Lining that the last reading includes and that does not count in strength [mm].
    lining_not_told, lining_unknown : ndarray
        Lined and no word whether the last reading includes it; or its thickness is not recorded [-].
    queried_low, queried_high : ndarray
        Whether a queried reading governs or was left out [-].
    without_queried : ndarray
        Where the rate is taken without the queried readings, because it is the greater so [-].
    wall_error_mm : ndarray
        Reading error of the wall used [mm].
    baseline_is_nominal : ndarray
        Whether a baseline equal to nominal was taken as nominal [-].
    """

    live: Bools
    live_part: Bools
    now: History
    plan: Planning
    plan_long: Planning
    in_doubt: Bools
    shift: SharedShift
    visits: Visits
    deduct_mm: Floats
    lining_not_told: Bools
    lining_unknown: Bools
    queried_low: Bools
    queried_high: Bools
    without_queried: Bools
    wall_error_mm: Floats
    baseline_is_nominal: Bools


def thinned(inputs: Inputs, clock: ServiceClock, as_of_day: float) -> Thinned:
    """Work out histories and planning rates.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    clock : ServiceClock
        Days that count [-].
    as_of_day : float
        The as-of date [day].

    Returns
    -------
    Thinned
    """
    place, parts = inputs.locations, inputs.parts
    count, part = len(place), place.part
    live_part = np.asarray(parts.state != "withdrawn", dtype=np.bool_)
    live = np.asarray(place.state != "withdrawn", dtype=np.bool_) & live_part[part]
    read = strength(inputs, as_of_day)
    index = RestartIndex.of(inputs, as_of_day)
    span, metal = index.before(read.location, read.day)
    usable = np.flatnonzero(~np.isnan(read.wall_mm) & ~read.is_nominal)
    at = read.location[usable]
    queried = np.asarray(inputs.readings.status[read.row[usable]] == "queried", dtype=np.bool_)
    vessel = parts.vessel[part]
    first_metal = read.is_nominal & (metal == 0)
    baseline_day = greatest_by(np.where(first_metal, read.day, np.nan), read.location, count)
    starts = Starts(vessel, read.nominal_mm, np.fmax(inputs.vessels.in_service_day[vessel], baseline_day))
    found = rates(
        Measured(
            at, read.day[usable], read.wall_mm[usable], inputs.readings.error_mm[read.row[usable]], queried,
            span[usable], metal[usable],
        ),
        Ground(
            part=part,
            parts=len(parts),
            live=live,
            starts=starts,
            index=index,
            clock=clock,
            window_days=place.observation_window_days,
            expected=parts.expected_rate_mm_per_year[part],
            floor=place.rate_floor_mm_per_year,
            chosen=_chosen(inputs, as_of_day),
            as_of_day=as_of_day,
        ),
    )  # fmt: skip
    seen, now = found.seen, found.now
    gave_wall = np.zeros(len(read.row), dtype=np.bool_)
    gave_wall[usable] = seen.counted
    present = span[usable] == index.number[at]
    metal_now = index.new_metal()
    same_metal = metal[usable] == metal_now[at]
    rests = seen.counted & same_metal & (read.least_mm[usable] <= now.wall_used_mm[at])
    last = (
        np.where(now.last_reading >= 0, usable[np.maximum(now.last_reading, 0)], -1)
        if len(usable)
        else now.last_reading
    )
    return Thinned(
        live=live,
        live_part=live_part,
        now=now,
        plan=found.plan,
        plan_long=found.plan_long,
        in_doubt=found.in_doubt,
        shift=found.shift,
        without_queried=found.without_queried,
        wall_error_mm=found.wall_error_mm,
        visits=visits(inputs, read, gave_wall, index, live),
        deduct_mm=_at_last(read.deduct_mm, last),
        lining_not_told=(_at_last(read.not_told.astype(np.float64), last) > 0)
        | any_by(rests & read.not_told[usable], at, count)
        | any_by(seen.counted & same_metal & read.mixed[usable], at, count),
        lining_unknown=(_at_last(read.unknown.astype(np.float64), last) > 0)
        | any_by(rests & read.unknown[usable], at, count),
        queried_low=any_by(queried & seen.counted & same_metal, at, count),
        queried_high=any_by(queried & ~seen.counted & present, at, count),
        baseline_is_nominal=any_by(read.is_nominal, read.location, count),
    )


def _at_last(values: Floats, last: Ints) -> Floats:
    """Give the value at the last observation's reading, 0 where there is none."""
    out = np.zeros(len(last))
    has = last >= 0
    out[has] = values[last[has]]
    return out


def _chosen(inputs: Inputs, as_of_day: float) -> Chosen:
    """Spread the chosen rates over their locations: the nearest wins, of equals the latest."""
    count, made = len(inputs.locations), inputs.decisions
    rate, decided = np.full(count, np.nan), np.full(count, np.nan)
    review, two = np.full(count, np.nan), np.zeros(count, dtype=np.bool_)
    rows = np.flatnonzero(
        np.asarray(made.kind == "chosen rate", dtype=np.bool_) & (made.decided_day <= as_of_day)
    )
    nearness = (made.part[rows] >= 0).astype(np.int64) + (made.location[rows] >= 0)
    vessel_of = inputs.parts.vessel[inputs.locations.part]
    in_time = ~(made.review_day[rows] <= as_of_day)  # one whose review is past hides none that stands
    for row in rows[np.lexsort((made.decided_day[rows], nearness, in_time))].tolist():
        if made.location[row] >= 0:
            here = np.array([made.location[row]])
        elif made.part[row] >= 0:
            here = np.flatnonzero(inputs.locations.part == made.part[row])
        else:
            here = np.flatnonzero(vessel_of == made.vessel[row])
        rate[here], decided[here] = made.rate_mm_per_year[row], made.decided_day[row]
        review[here], two[here] = made.review_day[row], bool(made.second_by[row])
    return Chosen(rate, decided, review, two)


def lining_uncertain(found: Thinned) -> Bools:
    """Say where the wall in strength is not known because of a lining.

    Parameters
    ----------
    found : Thinned
        What the readings say [-].

    Returns
    -------
    ndarray of bool
        Shape (locations,) [-].
    """
    return found.lining_not_told | found.lining_unknown
