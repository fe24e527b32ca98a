"""Histories and planning rates of all locations, with the queried readings and without them."""

from __future__ import annotations

import dataclasses
from dataclasses import dataclass

import numpy as np

from fleet.appraisal.groups import greatest_by
from fleet.appraisal.inputs import Bools, Floats, Ints
from fleet.appraisal.restarts import RestartIndex, present_histories
from fleet.thinning.clock import ServiceClock
from fleet.thinning.histories import History, Starts
from fleet.thinning.observations import Measured, Observations, observations
from fleet.thinning.planning import Chosen, Planning, SharedShift, planning, shared_shift, short_term_in_doubt

_OF_THE_RATE = (
    "after",
    "long_rate",
    "short_rate",
    "long_from_nominal",
    "short_loss_mm",
    "previous_error_mm",
    "long_years",
    "short_years",
    "nominal_rate",
    "least_measurable",
    "change_mm",
    "fitted_rate",
    "fitted_error",
)


@dataclass(frozen=True)
class Ground:
    """What stands beside the readings; arrays of shape (locations,).

    Parameters
    ----------
    part : ndarray
        Part of each location [-].
    parts : int
        Number of parts [count].
    live : ndarray
        Locations in use [-].
    starts : Starts
        Nominal wall and its day [-].
    index : RestartIndex
        Restarts [-].
    clock : ServiceClock
        Days that count [-].
    window_days : ndarray
        Observation window [day].
    expected, floor : ndarray
        Expected rate and the owner's floor [mm/year].
    chosen : Chosen
        Rates chosen by the engineer [-].
    as_of_day : float
        The as-of date [day].
    """

    part: Ints
    parts: int
    live: Bools
    starts: Starts
    index: RestartIndex
    clock: ServiceClock
    window_days: Floats
    expected: Floats
    floor: Floats
    chosen: Chosen
    as_of_day: float


@dataclass(frozen=True)
class Rates:
    """Histories and planning rates; arrays of shape (locations,).

    Parameters
    ----------
    seen : Observations
        Observations, the queried readings that govern among them [-].
    now : History
        Present history [-].
    plan, plan_long : Planning
        Planning rates, and what they would be were the doubtful short-term rates left out [-].
    in_doubt : ndarray
        Where the short-term rate governs within its error [-].
    shift : SharedShift
        Parts whose locations shifted together; shape (parts,) [-].
    without_queried : ndarray
        Where the rate is taken without the queried readings, because it is the greater so [-].
    wall_error_mm : ndarray
        Reading error of the wall used: the greatest of the readings it rests on and the last [mm].
    """

    seen: Observations
    now: History
    plan: Planning
    plan_long: Planning
    in_doubt: Bools
    shift: SharedShift
    without_queried: Bools
    wall_error_mm: Floats


def rates(measured: Measured, ground: Ground) -> Rates:
    """Work out histories and planning rates.

    Parameters
    ----------
    measured : Measured
        Readings that gave a thickness [-].
    ground : Ground
        What stands beside them [-].

    Returns
    -------
    Rates
        A queried reading may lower a wall, never a rate: where the planning rate is greater without the queried
        readings, that one is taken.
    """
    seen, now, old = _walk(measured, ground)
    plan = _plan(now, old, ground)
    without = np.zeros(len(ground.live), dtype=np.bool_)
    if measured.queried.any():
        _, firm, firm_old = _walk(measured.only(~measured.queried), ground)
        without = _plan(firm, firm_old, ground).rate > plan.rate
        now = dataclasses.replace(
            now, **{name: np.where(without, getattr(firm, name), getattr(now, name)) for name in _OF_THE_RATE}
        )
        old = np.where(without, firm_old, old)
        plan = _plan(now, old, ground)
    shift = shared_shift(now, ground.part, ground.parts, ground.live)
    in_doubt = short_term_in_doubt(now, plan, shift, ground.part)
    return Rates(
        seen=seen,
        now=now,
        plan=plan,
        plan_long=_plan(now, old, ground, leave_out_short=in_doubt),
        in_doubt=in_doubt & ground.live,
        shift=shift,
        without_queried=without,
        wall_error_mm=_wall_error(measured, seen, now, ground.index),
    )


def _wall_error(measured: Measured, seen: Observations, now: History, index: RestartIndex) -> Floats:
    """Give the reading error of the wall used."""
    same_metal = measured.metal[seen.reading] == index.new_metal()[seen.location]
    rests = same_metal & (seen.wall_mm <= now.wall_used_mm[seen.location])
    of_wall = greatest_by(np.where(rests, seen.error_mm, np.nan), seen.location, len(now.last_error_mm))
    return np.fmax(of_wall, now.last_error_mm)


def _walk(measured: Measured, ground: Ground) -> tuple[Observations, History, Floats]:
    """Give the observations, the present histories, and the rates before them."""
    count = len(ground.live)
    seen = observations(measured, count, ground.starts.nominal_mm, ground.window_days)
    now, old = present_histories(
        seen, ground.index, ground.starts, ground.window_days, ground.clock, ground.expected, ground.floor,
        ground.as_of_day,
    )  # fmt: skip
    # a rate that the engineer had chosen before the restart counts among the old ones
    before = ground.index.last_day() > ground.chosen.decided_day
    return seen, now, np.where(before, np.fmax(old, ground.chosen.rate), old)


def _plan(now: History, old: Floats, ground: Ground, leave_out_short: Bools | None = None) -> Planning:
    return planning(
        now, restarted=ground.index.number > 0, old_rate=old, expected=ground.expected, floor=ground.floor,
        as_of_day=ground.as_of_day, chosen=ground.chosen, leave_out_short=leave_out_short,
        begun_day=ground.index.last_day(),
    )  # fmt: skip
