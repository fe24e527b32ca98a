"""When the projected MAWP falls to a given pressure: a relief setting, an operating pressure. Rule 12."""

from __future__ import annotations

import numpy as np

from fleet.appraisal.due import rule_values
from fleet.appraisal.groups import least_by
from fleet.appraisal.inputs import Bools, Floats, Ints
from fleet.appraisal.judge import Bench, day_when_down_to
from fleet.mechanics.rating import required_wall


def _pairs(vessel: Ints, vessel_of: Ints, use: Bools, vessels: int) -> tuple[Ints, Ints]:
    """Pair every asked pressure with every usable location of its vessel."""
    order = np.flatnonzero(use)[np.argsort(vessel_of[use], kind="stable")]
    number = np.bincount(vessel_of[use], minlength=vessels)
    start = np.cumsum(number) - number
    asked = np.repeat(np.arange(len(vessel)), number[vessel])
    within = np.arange(len(asked)) - np.repeat(np.cumsum(number[vessel]) - number[vessel], number[vessel])
    return asked, order[np.repeat(start[vessel], number[vessel]) + within]


def falls_to(bench: Bench, rate: Floats, vessel: Ints, pressure_mpa: Floats) -> Floats:
    """Give the day on which the projected MAWP of a vessel falls to a pressure.

    Parameters
    ----------
    bench : Bench
        What is judged [-].
    rate : ndarray
        Planning rate; shape (locations,) [mm/year].
    vessel : ndarray
        Vessel of each question; shape (k,) [-].
    pressure_mpa : ndarray
        The pressure asked about, at the top of the vessel; shape (k,) [MPa].

    Returns
    -------
    ndarray
        Day; the as-of date where the vessel may not carry the pressure whatever its wall; NaN where it cannot be
        had; shape (k,) [day].
    """
    asked, row = _pairs(vessel, bench.vessel_of, bench.trusted, len(bench.inputs.vessels))
    at_part = pressure_mpa[asked] + bench.need.head_mpa[row]
    rated = required_wall(bench.need.geometry.only(row), at_part)
    wall = np.fmax(np.fmax(rated.hoop, rated.axial), rated.end)
    # shape `other` carries the current MAWP down to its given thickness, and no more is known
    given = bench.need.given_shape[row]
    wall = np.where(given, bench.need.geometry.required_given_mm[row], wall)
    beyond_given = given & (pressure_mpa[asked] > bench.need.current_mpa[row])
    factor = rule_values(bench.inputs, "loss_factor")[bench.vessel_of[row]]
    needed = np.full(len(bench.inputs.locations), np.nan)
    day = np.full(len(asked), np.nan)
    # one pass per question of a vessel: few vessels have more than a handful
    turn = np.zeros(len(asked), dtype=np.int64)
    if len(asked):
        order = np.lexsort((asked, row))
        new = np.ones(len(order), dtype=np.bool_)
        new[1:] = row[order][1:] != row[order][:-1]
        begin = np.maximum.accumulate(np.where(new, np.arange(len(order)), 0))
        turn[order] = np.arange(len(order)) - begin
    for k in range(int(turn.max(initial=-1)) + 1):
        now = turn == k
        needed[:] = np.nan
        needed[row[now]] = wall[now]
        loss = np.ones(len(needed))
        loss[row[now]] = factor[now]
        day[now] = day_when_down_to(bench, rate, needed, loss)[row[now]]
    out = least_by(day, asked, len(vessel))
    # a wall that no form of the formula gives is not the lesser wall of the direction that is left
    unknown = np.zeros(len(vessel), dtype=np.bool_)
    unknown[asked[~given & (rated.domain != 0)]] = True
    out = np.where(unknown, np.nan, out)
    over_limit = np.zeros(len(vessel), dtype=np.bool_)
    over = (pressure_mpa[asked] > bench.need.limit_mpa[row]) | beyond_given
    over_limit[asked[over]] = True
    cap = bench.need.cap_mpa
    vessel_cap = np.full(len(bench.inputs.vessels), np.nan)
    vessel_cap[bench.need.vessel] = cap
    return np.where(over_limit | (pressure_mpa > vessel_cap[vessel]), bench.as_of_day, out)
