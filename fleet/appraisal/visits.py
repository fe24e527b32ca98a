"""Visits: when a location and a part were last gone to, and whether the visit gave a thickness."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.appraisal.groups import greatest_by
from fleet.appraisal.inputs import Bools, Floats, Inputs
from fleet.appraisal.restarts import RestartIndex
from fleet.appraisal.strength import Strength


@dataclass(frozen=True)
class Visits:
    """Last visits with the present metal.

    Parameters
    ----------
    no_echo : ndarray
        Whether a visit to the location gave no echo and none since gave a thickness; shape (locations,) [-].
    not_read : ndarray
        Whether the location was passed over at its part's last visit; shape (locations,) [-].
    last_day : ndarray
        Last visit to the location; shape (locations,) [day].
    part_last_day : ndarray
        Last visit to the part; shape (parts,) [day].
    part_not_read : ndarray
        Whether no location of the part gave a thickness at its last visit; shape (parts,) [-].
    """

    no_echo: Bools
    not_read: Bools
    last_day: Floats
    part_last_day: Floats
    part_not_read: Bools


def visits(inputs: Inputs, read: Strength, gave_wall: Bools, index: RestartIndex, live: Bools) -> Visits:
    """Find the last visits.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    read : Strength
        The readings looked at [-].
    gave_wall : ndarray
        Which of them gave a thickness that counts; shape (n,) [-].
    index : RestartIndex
        The restarts: visits to metal that is gone do not count [-].
    live : ndarray
        Locations in use; shape (locations,) [-].

    Returns
    -------
    Visits
        Everything within the observation window of the last visit is one visit.
    """
    count, part = len(inputs.locations), inputs.locations.part
    _, metal = index.before(read.location, read.day)
    metal_now = index.new_metal()
    # a baseline that is nominal to the last digit is no visit
    present = (metal == metal_now[read.location]) & ~read.is_nominal
    seen, day = read.location[present], read.day[present]
    last = greatest_by(day, seen, count)
    last_read = greatest_by(np.where(gave_wall[present], day, np.nan), seen, count)
    silent = np.asarray(inputs.readings.result[read.row[present]] == "no echo", dtype=np.bool_)
    silent_day = greatest_by(np.where(silent, day, np.nan), seen, count)
    no_echo = ~np.isnan(silent_day) & ~(last_read >= silent_day)

    used = np.where(live, last, np.nan)
    used_read = np.where(live, last_read, np.nan)
    parts = len(inputs.parts)
    part_last = greatest_by(used, part, parts)
    part_read = greatest_by(used_read, part, parts)
    window = greatest_by(np.where(live, inputs.locations.observation_window_days, np.nan), part, parts)
    within = inputs.locations.observation_window_days
    return Visits(
        no_echo=no_echo,
        not_read=live & ~np.isnan(last_read) & (last_read < part_last[part] - within),
        last_day=last,
        part_last_day=part_last,
        part_not_read=~np.isnan(part_last) & ~(part_read >= part_last - window),
    )
