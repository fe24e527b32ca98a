"""Which readings are looked at, and the wall in strength that each shows: less a lining that does not count."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.appraisal.groups import any_by
from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints


@dataclass(frozen=True)
class Strength:
    """Readings taken by the as-of date and not voided, one row each; locations where said.

    Parameters
    ----------
    row : ndarray
        Row in the table of readings; shape (n,) [-].
    location : ndarray
        Index of the location; shape (n,) [-].
    day : ndarray
        Day of the reading; shape (n,) [day].
    wall_mm : ndarray
        Wall in strength, NaN where no thickness was read; shape (n,) [mm].
    deduct_mm : ndarray
        Lining taken off the reading; shape (n,) [mm].
    not_told, unknown : ndarray
        Lined and no word whether the reading includes it; or its thickness is not recorded; shape (n,) [-].
    mixed : ndarray
        Whether the lining counts in strength and the reading says nothing or the contrary of another of its
        location; shape (n,) [-].
    least_mm : ndarray
        The least that the wall in strength can be, where nobody told whether the reading includes a lining; shape (n,)
        [mm].
    is_nominal : ndarray
        Baselines equal to nominal to the last digit; shape (n,) [-].
    nominal_mm : ndarray
        Nominal wall in strength of each location; shape (locations,) [mm].
    """

    row: Ints
    location: Ints
    day: Floats
    wall_mm: Floats
    deduct_mm: Floats
    not_told: Bools
    unknown: Bools
    mixed: Bools
    least_mm: Floats
    is_nominal: Bools
    nominal_mm: Floats


def strength(inputs: Inputs, as_of_day: float) -> Strength:
    """Turn thicknesses as read into walls in strength.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    as_of_day : float
        The as-of date; later readings are left out [day].

    Returns
    -------
    Strength

    Notes
    -----
    A lining that counts in strength is added to nominal; one that does not is taken off a reading that includes it.
    Blank under `lining_counts_in_strength` is taken as no.
    """
    parts, readings = inputs.parts, inputs.readings
    part = inputs.locations.part
    lined = np.asarray((parts.lining != "") & (parts.lining != "none"), dtype=np.bool_)[part]
    counts = np.asarray(parts.lining_counts_in_strength == "yes", dtype=np.bool_)[part]
    lining = parts.lining_thickness_mm[part]
    nominal = parts.nominal_thickness_mm[part] + np.where(lined & counts, lining, 0.0)

    taken = (readings.taken_day <= as_of_day) & np.asarray(readings.status != "voided", dtype=np.bool_)
    row = np.flatnonzero(taken)
    location = readings.location[row]
    includes = readings.includes_lining[row]
    takes_off = lined[location] & ~counts[location] & np.asarray(includes == "yes", dtype=np.bool_)
    deduct = np.where(takes_off, np.nan_to_num(lining[location]), 0.0)
    wall = readings.thickness_mm[row] - deduct
    baseline = np.asarray(readings.kind[row] == "baseline", dtype=np.bool_)
    # the register's baseline has no column for it: it is taken as it stands
    told = ~np.isnan(wall) & ~baseline
    all_with = ~any_by(told & np.asarray(includes != "yes", dtype=np.bool_), location, len(nominal))
    all_without = ~any_by(told & np.asarray(includes != "no", dtype=np.bool_), location, len(nominal))
    untold = lined[location] & ~counts[location] & ~baseline & np.asarray(includes == "", dtype=np.bool_)
    return Strength(
        row=row,
        location=location,
        day=readings.taken_day[row],
        wall_mm=wall,
        deduct_mm=deduct,
        not_told=lined[location] & np.asarray(includes == "", dtype=np.bool_),
        unknown=takes_off & np.isnan(lining[location]),
        mixed=lined[location] & counts[location] & ~baseline & ~(all_with | all_without)[location],
        least_mm=np.where(untold, wall - np.nan_to_num(lining[location], nan=np.inf), wall),
        is_nominal=baseline & (np.abs(wall - nominal[location]) <= 1e-9 * wall),
        nominal_mm=nominal,
    )
