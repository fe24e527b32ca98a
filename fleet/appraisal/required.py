"""Geometry of every location and part, the thickness it needs, and the pressure a wall carries: rules 4 and 5.

Rows are the locations followed by the parts themselves, so that a part without a location still has its required
thickness.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

import numpy as np

from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints, Texts
from fleet.mechanics.rating import (
    Geometry,
    Rated,
    allowable_pressure,
    missing_inputs,
    required_wall,
    unsupported,
)

SETS: tuple[str, ...] = ("hoop", "axial", "end", "structural", "external", "axial load", "given")
"""What may set a required thickness, in the words of the ``--json`` contract."""
NOT_PRESSURE: tuple[str, ...] = ("structural", "external", "axial load")
"""Those of them that are no matter of internal pressure."""


@dataclass(frozen=True)
class Pressures:
    """Pressures of every vessel, NaN where blank; shape (vessels,).

    Parameters
    ----------
    nameplate_mpa, current_mpa, cap_mpa : ndarray
        Nameplate, or the design pressure where it is blank; what it may carry today; the greater of the two [MPa].
    """

    nameplate_mpa: Floats
    current_mpa: Floats
    cap_mpa: Floats


@dataclass(frozen=True)
class Needs:
    """What every row needs. Rows: locations, then parts; arrays of shape (rows,) unless said.

    Parameters
    ----------
    part, vessel : ndarray
        Part and vessel of the row [-].
    geometry : Geometry
        The rows' geometry [-].
    known_mm : ndarray
        The largest of those that are known [mm].
    required_mm : ndarray
        The required thickness; NaN where something it needs is missing [mm].
    by : ndarray
        Index into `SETS` of what sets it, -1 where nothing is known [-].
    not_pressure_mm : ndarray
        The largest that is no matter of pressure, 0 where none [mm].
    rated, rated_pressure : Rated
        The formulas' own results with limits and formula names: walls at the current MAWP, and pressures at the
        wall required [-].
    missing : dict of str to ndarray
        Rows that need a register column and lack it [-].
    no_formula, complete : ndarray
        No formula for this shape under this code; nothing is missing [-].
    head_mpa, limit_mpa : ndarray
        Static head and given other pressure limit [MPa].
    current_mpa, cap_mpa : ndarray
        Current MAWP and cap of the vessel [MPa].
    given_shape : ndarray
        Rows of the shape `other` [-].
    """

    part: Ints
    vessel: Ints
    geometry: Geometry
    known_mm: Floats
    required_mm: Floats
    by: Ints
    not_pressure_mm: Floats
    rated: Rated
    rated_pressure: Rated
    missing: dict[str, Bools]
    no_formula: Bools
    complete: Bools
    head_mpa: Floats
    limit_mpa: Floats
    current_mpa: Floats
    cap_mpa: Floats
    given_shape: Bools

    def carries(self, wall_mm: Floats) -> tuple[Floats, Floats]:
        """Give the MAWP at the top of the vessel for a wall in every row.

        Parameters
        ----------
        wall_mm : ndarray
            Wall in strength, NaN where unknown; shape (rows,) [mm].

        Returns
        -------
        tuple of ndarray
            MAWP capped by the greater of nameplate and current MAWP, and the uncapped figure; both never below 0
            and never above a given other limit; from the directions that are known; shape (rows,) [MPa].
        """
        rated = allowable_pressure(self.geometry, wall_mm)
        with np.errstate(invalid="ignore"):
            at_part = np.fmin(np.fmin(rated.hoop, rated.axial), rated.end)
            given = np.where(wall_mm >= self.geometry.required_given_mm, self.current_mpa, np.nan)
            top = np.where(self.given_shape, given, at_part - np.nan_to_num(self.head_mpa))
            uncapped = np.where(np.isnan(top), np.nan, np.fmin(np.maximum(top, 0.0), self.limit_mpa))
        return np.minimum(uncapped, self.cap_mpa), uncapped


def vessel_pressures(inputs: Inputs) -> Pressures:
    """Settle nameplate, current MAWP and the cap of every vessel.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].

    Returns
    -------
    Pressures
    """
    vessels = inputs.vessels
    plate = np.where(
        np.isnan(vessels.nameplate_mawp_mpa), vessels.design_pressure_mpa, vessels.nameplate_mawp_mpa
    )
    current = np.where(np.isnan(vessels.current_mawp_mpa), plate, vessels.current_mawp_mpa)
    return Pressures(plate, current, np.fmax(plate, current))


def edition_years(editions: Texts) -> Floats:
    """Read the year out of a code edition, NaN where it gives none.

    Parameters
    ----------
    editions : ndarray of object
        Such as ``1998``, ``1986 with addenda to 1988`` [text].

    Returns
    -------
    ndarray
        The first year named [year].

    Examples
    --------
    >>> edition_years(np.array(["1998 A99", "", "2019"], dtype=object)).tolist()
    [1998.0, nan, 2019.0]
    """
    found = [re.search(r"\b(1[89]\d\d|20\d\d)\b", str(text)) for text in editions]
    return np.array([float(match.group(1)) if match else np.nan for match in found], dtype=np.float64)


def geometry(inputs: Inputs) -> tuple[Geometry, Ints]:
    """Lay out the geometry of locations and parts.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].

    Returns
    -------
    tuple of Geometry and ndarray
        One row per location, then one per part; and the part of each row.
    """
    parts, place, vessels = inputs.parts, inputs.locations, inputs.vessels
    part = np.concatenate((place.part, np.arange(len(parts), dtype=np.int64)))
    vessel = parts.vessel[part]
    blank = np.full(len(parts), "", dtype=object)
    own_side = np.concatenate((place.loss_side, blank))
    side = np.where(own_side != "", own_side, parts.loss_side[part])
    inside, outside = parts.inside_diameter_mm[part], parts.outside_diameter_mm[part]
    at = np.concatenate((place.diameter_at_mm, np.full(len(parts), np.nan)))
    cone_at = np.asarray(parts.shape[part] == "cone", dtype=np.bool_) & ~np.isnan(at)
    by_outside = np.isnan(inside) & ~np.isnan(outside)
    inside = np.where(cone_at & ~by_outside, at, inside)
    outside = np.where(cone_at & by_outside, at, outside)
    shape = parts.shape[part]
    straight = np.isin(shape, ("cylinder", "cone", "nozzle neck"))
    return Geometry(
        design_code=vessels.design_code[vessel].astype(np.str_),
        edition_year=edition_years(vessels.code_edition)[vessel],
        shape=shape.astype(np.str_),
        loss_side=side.astype(np.str_),
        inside_diameter_mm=inside,
        outside_diameter_mm=outside,
        crown_radius_mm=parts.crown_radius_mm[part],
        knuckle_radius_mm=parts.knuckle_radius_mm[part],
        half_apex_angle_deg=parts.half_apex_angle_deg[part],
        axis_ratio=parts.axis_ratio[part],
        cover_factor=parts.cover_factor[part],
        gasket_diameter_mm=parts.gasket_diameter_mm[part],
        nominal_thickness_mm=parts.nominal_thickness_mm[part],
        allowable_stress_mpa=parts.allowable_stress_mpa[part],
        efficiency_hoop=np.where(straight, parts.joint_efficiency_long[part], parts.joint_efficiency[part]),
        efficiency_axial=np.where(straight, parts.joint_efficiency_circ[part], np.nan),
        required_given_mm=parts.required_thickness_given_mm[part],
    ), part


def needs(inputs: Inputs, pressures: Pressures) -> Needs:
    """Work out the required thickness of every location and part at the current MAWP plus static head.

    Parameters
    ----------
    inputs : Inputs
        Register and record [-].
    pressures : Pressures
        Pressures of every vessel [-].

    Returns
    -------
    Needs
    """
    parts = inputs.parts
    shape_of_rows, part = geometry(inputs)
    vessel = parts.vessel[part]
    given_shape = np.asarray(shape_of_rows.shape == "other", dtype=np.bool_)
    head = parts.static_head_mpa[part]
    current = pressures.current_mpa[vessel]
    # with the static head unknown the wall at no head is still a lower bound; it is known, and not shown
    rated = required_wall(shape_of_rows, current + np.nan_to_num(head))
    walls = np.stack(
        (
            rated.hoop,
            rated.axial,
            rated.end,
            parts.structural_minimum_mm[part],
            parts.required_thickness_external_mm[part],
            parts.required_thickness_axial_mm[part],
            np.where(given_shape, parts.required_thickness_given_mm[part], np.nan),
        )
    )
    known_rows = ~np.isnan(walls).all(axis=0)
    ranked = np.where(np.isnan(walls), -np.inf, walls)
    by = np.where(known_rows, np.argmax(ranked, axis=0), -1)
    known = np.where(known_rows, np.max(ranked, axis=0), np.nan)
    missing = dict(missing_inputs(shape_of_rows))
    missing["static_head"] = ~given_shape & np.isnan(head)
    missing["required_thickness_given"] = given_shape & np.isnan(parts.required_thickness_given_mm[part])
    no_formula = unsupported(shape_of_rows) & ~given_shape
    lacks = np.zeros(len(part), dtype=np.bool_)
    for rows in missing.values():
        lacks |= rows
    pressure_known = ~np.isnan(rated.hoop) | ~np.isnan(rated.axial) | ~np.isnan(rated.end)
    complete = (
        ~lacks & ~no_formula & ~np.isnan(current) & (given_shape | (pressure_known & (rated.domain == 0)))
    )
    not_pressure = np.nan_to_num(
        np.max(ranked[[SETS.index(name) for name in NOT_PRESSURE]], axis=0), neginf=0.0
    )
    return Needs(
        part=part,
        vessel=vessel,
        geometry=shape_of_rows,
        known_mm=known,
        required_mm=np.where(complete, known, np.nan),
        by=by,
        not_pressure_mm=not_pressure,
        rated=rated,
        rated_pressure=allowable_pressure(shape_of_rows, np.where(given_shape, np.nan, known)),
        missing=missing,
        no_formula=no_formula,
        complete=complete,
        head_mpa=head,
        limit_mpa=parts.other_pressure_limit_mpa[part],
        current_mpa=current,
        cap_mpa=pressures.cap_mpa[vessel],
        given_shape=given_shape,
    )
