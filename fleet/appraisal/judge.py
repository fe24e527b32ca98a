"""Everything that rests on the planning rate: life, dates, projection, MAWP, standing. Rules 6 to 13."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.appraisal.due import Carry, Dues, Looked, carry_to, dues, rule_values
from fleet.appraisal.groups import any_by, place_of_least
from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints
from fleet.appraisal.measured import Thinned, lining_uncertain
from fleet.appraisal.required import Needs
from fleet.rules import load_rule_set
from fleet.thinning.clock import DAYS_PER_YEAR, ServiceClock, whole_days
from fleet.thinning.formulas import AT_REQUIRED_ERRORS, life_interval, projected_wall, remaining_life
from fleet.thinning.planning import Planning

BELOW, AT, USED, SHORT, NONE, RUNNING, HELD = range(7)
"""Standings by their place in `fleet.words.STANDINGS`."""
TOLERANCE = 1e-6
"""Relative tolerance of `rating short`. Status: ours."""


@dataclass(frozen=True)
class Bench:
    """What every judgement works on, whatever the planning rate.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    found : Thinned
        What the readings say [-].
    need : Needs
        What every location and part needs [-].
    seen : Looked
        Last counting inspections [-].
    clock : ServiceClock
        Days that count [-].
    withheld : ndarray
        Vessels that get no verdict for something that was never measured or recorded; shape (vessels,) [-].
    as_of_day : float
        The as-of date [day].
    asked_day : float or None
        A carry-to date that was asked for [day].
    """

    inputs: Inputs
    found: Thinned
    need: Needs
    seen: Looked
    clock: ServiceClock
    withheld: Bools
    as_of_day: float
    asked_day: float | None

    @property
    def vessel_of(self) -> Ints:
        """The vessel of each location."""
        return self.inputs.parts.vessel[self.inputs.locations.part]

    @property
    def trusted(self) -> Bools:
        """Locations in use whose required thickness and wall in strength are both known."""
        n = len(self.inputs.locations)
        return self.found.live & self.need.complete[:n] & ~lining_uncertain(self.found)

    def rows(self, wall_mm: Floats) -> Floats:
        """Stretch walls of locations to rows of locations and parts.

        Parameters
        ----------
        wall_mm : ndarray
            Wall of each location; shape (locations,) [mm].

        Returns
        -------
        ndarray
            The same, then NaN for every part; shape (locations + parts,) [mm].
        """
        return np.concatenate((wall_mm, np.full(len(self.inputs.parts), np.nan)))


@dataclass(frozen=True)
class Judged:
    """One judgement. Arrays of shape (locations,) first, then of shape (vessels,).

    Parameters
    ----------
    life_years, interval_years : ndarray
        Remaining life; half life or short-life interval [year].
    retirement_day, half_life_day, holds_day : ndarray
        Retirement date; date of half life; date to which the wall holds at the rule set's loss factor [day].
    projected_mm, today_mm : ndarray
        Wall projected to the carry-to date, and the wall on the as-of date [mm].
    mawp_today_mpa, projected_mpa, uncapped_mpa : ndarray
        MAWP of the location today, on the carry-to date, and the latter uncapped; only where trusted [MPa].
    list_end_mpa : ndarray
        Projected MAWP at the end of the list [MPa].
    standing : ndarray
        Place in `STANDINGS` of the location [-].
    due : Dues
        Due dates [-].
    carry : Carry
        Carry-to dates [-].
    vessel_standing : ndarray
        Place in `STANDINGS` of the vessel [-].
    due_uncertain : ndarray
        Vessels with a measured location whose life cannot be had: the due dates are only the latest possible [-].
    retirement_place, pressure_place : ndarray
        Location that governs life, and pressure; -1 where none [-].
    """

    life_years: Floats
    interval_years: Floats
    retirement_day: Floats
    half_life_day: Floats
    holds_day: Floats
    projected_mm: Floats
    today_mm: Floats
    mawp_today_mpa: Floats
    projected_mpa: Floats
    uncapped_mpa: Floats
    list_end_mpa: Floats
    standing: Ints
    due: Dues
    carry: Carry
    vessel_standing: Ints
    due_uncertain: Bools
    retirement_place: Ints
    pressure_place: Ints


def wall_on(bench: Bench, rate: Floats, day: Floats, factor: Floats | float) -> Floats:
    """Give the wall of every location on a day.

    Parameters
    ----------
    bench : Bench
        What is judged [-].
    rate : ndarray
        Planning rate; shape (locations,) [mm/year].
    day : ndarray
        The day; shape (locations,) [day].
    factor : ndarray or float
        Loss factor [-].

    Returns
    -------
    ndarray
        Wall in strength; shape (locations,) [mm].
    """
    years = bench.clock.years_between(bench.vessel_of, bench.found.now.last_day, day)
    return np.asarray(projected_wall(t=bench.found.now.wall_used_mm, n=factor, C=rate, Y=years))


def day_when_down_to(bench: Bench, rate: Floats, wall_mm: Floats, factor: Floats | float) -> Floats:
    """Give the last whole day on which the wall of every location still is at or above a wall.

    Parameters
    ----------
    bench : Bench
        What is judged [-].
    rate : ndarray
        Planning rate; shape (locations,) [mm/year].
    wall_mm : ndarray
        The wall; shape (locations,) [mm].
    factor : ndarray or float
        Loss factor [-].

    Returns
    -------
    ndarray
        Day, not before the last observation; NaN where unknown or never; shape (locations,) [day].
    """
    years = _life(bench.found.now.wall_used_mm, wall_mm, factor * rate)
    return bench.clock.later(bench.vessel_of, bench.found.now.last_day, years)


def _life(wall: Floats, needed: Floats, rate: Floats) -> Floats:
    """Remaining life; NaN, not infinite, where nothing is lost."""
    moving = rate > 0
    life = np.asarray(remaining_life(t=wall, t_r=needed, C=np.where(moving, rate, 1.0)))
    life = np.where(np.isnan(wall) | np.isnan(needed), np.nan, life)
    return np.where(moving | (wall <= needed), life, np.nan)


def judge(bench: Bench, plan: Planning) -> Judged:
    """Judge every vessel by a set of planning rates.

    Parameters
    ----------
    bench : Bench
        What is judged [-].
    plan : Planning
        The planning rates [-].

    Returns
    -------
    Judged
    """
    inputs, found, need, clock = bench.inputs, bench.found, bench.need, bench.clock
    count, vessels = len(inputs.locations), len(inputs.vessels)
    vessel_of, last, wall = bench.vessel_of, found.now.last_day, found.now.wall_used_mm
    rate = plan.rate
    rules = {name: rule_values(inputs, name)[vessel_of] for name in
             ("half_life_fraction", "short_life_below_years", "short_life_interval_years", "loss_factor")}  # fmt: skip
    factor = rules["loss_factor"]
    trusted = bench.trusted
    required = np.where(trusted, need.required_mm[:count], np.nan)
    life = _life(wall, required, rate)
    # what is known of a location that lacks something brings its date forward all the same; it is not shown
    known_life = _life(wall, np.where(found.live, need.known_mm[:count], np.nan), rate)
    interval = np.asarray(
        life_interval(RL=known_life, f=rules["half_life_fraction"], a=rules["short_life_below_years"],
                      b=rules["short_life_interval_years"])
    )  # fmt: skip
    half_life_day = clock.later(vessel_of, last, interval)
    half_life_exact = clock.service_day(vessel_of, last) + interval * DAYS_PER_YEAR
    due = dues(inputs, bench.seen, clock, half_life_day, half_life_exact, interval, vessel_of)
    carry = carry_to(inputs, due, bench.as_of_day, bench.asked_day)

    as_of = np.full(count, bench.as_of_day)
    today = wall_on(bench, rate, as_of, 1.0)
    projected = wall_on(bench, rate, carry.day[vessel_of], factor)
    at_list_end = wall_on(bench, rate, np.full(count, carry.list_end_day), factor)
    today_mpa, _ = need.carries(bench.rows(today))
    capped, uncapped = need.carries(bench.rows(projected))
    list_end_mpa, _ = need.carries(bench.rows(at_list_end))

    retirement = clock.later(vessel_of, last, life)
    exact = clock.service_day(vessel_of, last) + life * DAYS_PER_YEAR
    retirement_place = place_of_least(exact, vessel_of, vessels)
    cap_years = load_rule_set("choices")["running_out_cap_years"]
    horizon = bench.as_of_day + whole_days(np.minimum(2 * due.interval_years, cap_years))
    standing = _standings(
        bench, today, projected, today_mpa[:count], capped[:count], retirement, horizon[vessel_of]
    )
    worst = np.full(vessels, HELD, dtype=np.int64)
    np.minimum.at(worst, vessel_of[found.live], standing[found.live])
    worst = np.where(bench.withheld, np.minimum(worst, NONE), worst)

    lacks = found.live & ~np.isnan(wall) & (~trusted | np.isnan(rate))
    shown = np.where(trusted, uncapped[:count], np.nan)
    # a given limit below the current MAWP: no wall makes the rating hold
    limited = trusted & (need.limit_mpa[:count] < need.current_mpa[:count] * (1 - TOLERANCE))
    return Judged(
        life_years=life,
        interval_years=np.where(trusted, interval, np.nan),
        retirement_day=retirement,
        half_life_day=half_life_day,
        holds_day=np.where(limited, last, day_when_down_to(bench, rate, required, factor)),
        projected_mm=projected,
        today_mm=today,
        mawp_today_mpa=np.where(trusted, today_mpa[:count], np.nan),
        projected_mpa=np.where(trusted, capped[:count], np.nan),
        uncapped_mpa=shown,
        list_end_mpa=np.where(trusted, list_end_mpa[:count], np.nan),
        standing=standing,
        due=due,
        carry=carry,
        vessel_standing=worst,
        due_uncertain=any_by(lacks, vessel_of, vessels),
        retirement_place=retirement_place,
        pressure_place=place_of_least(shown, vessel_of, vessels),
    )


def _standings(
    bench: Bench,
    today: Floats,
    projected: Floats,
    today_mpa: Floats,
    mawp: Floats,
    retirement: Floats,
    horizon: Floats,
) -> Ints:
    """Give the standing of every location from what is known of it, worst first."""
    count = len(today)
    need, now = bench.need, bench.found.now
    known, current = need.known_mm[:count], need.current_mpa[:count]
    wall = now.wall_used_mm
    below = wall < known
    at = wall - known < AT_REQUIRED_ERRORS * bench.found.wall_error_mm
    used = today < known
    short = (projected < known * (1 - TOLERANCE)) | (mawp < current * (1 - TOLERANCE))
    # a location never read is a gap; its part is judged by its others, or not at all where none was read
    unknown = ~np.isnan(wall) & (~bench.trusted | np.isnan(today_mpa) | np.isnan(mawp))
    running = retirement <= horizon
    return np.select(
        [below, at, used, short, unknown, running], [BELOW, AT, USED, SHORT, NONE, RUNNING], HELD
    ).astype(np.int64)


def withheld(inputs: Inputs, found: Thinned) -> tuple[Bools, Bools, Bools, Bools]:
    """Say which vessels get no verdict, and which of their parts are why.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    found : Thinned
        What the readings say [-].

    Returns
    -------
    tuple of ndarray of bool
        Vessels without verdict; parts measured; parts whose vacuum was not assessed; vessels without any part.
    """
    vessels, parts = len(inputs.vessels), len(inputs.parts)
    part = inputs.locations.part
    measured_location = found.live & ~np.isnan(found.now.wall_used_mm)
    measured = any_by(measured_location, part, parts)
    external = inputs.vessels.external_design_pressure_mpa[inputs.parts.vessel]
    vacuum = (external > 0) & np.isnan(inputs.parts.required_thickness_external_mm) & found.live_part
    silent = any_by(found.visits.no_echo & found.live, part, parts) | found.visits.part_not_read
    no_rate = any_by(measured_location & np.isnan(found.plan.rate), part, parts)
    bad = found.live_part & (~measured | silent | vacuum | no_rate)
    out = any_by(bad, inputs.parts.vessel, vessels)
    partless = ~any_by(found.live_part, inputs.parts.vessel, vessels)
    return out | partless, measured & found.live_part, vacuum, partless
