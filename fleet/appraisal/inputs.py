"""What an appraisal is made from: the register and the record as arrays.

Every table is a frozen dataclass of arrays of one length; a row of a child table points to its parent by index. Only
what is in force on the as-of date, as known at the journal entry asked for, stands here: choosing it is the task of
whoever builds these tables. Missing numbers and days are NaN, missing words are the empty text. Days are
proleptic-Gregorian ordinals (`datetime.date.toordinal`) as float64.
"""

from __future__ import annotations

import dataclasses
from dataclasses import dataclass
from typing import Any, Self

import numpy as np
from numpy.typing import NDArray

from fleet.errors import OurFault
from fleet.words import Notice

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]
Texts = NDArray[np.object_]

_MAKERS = {"Floats": np.float64, "Ints": np.int64, "Bools": np.bool_, "Texts": np.object_}
_BLANKS: dict[str, Any] = {"Floats": np.nan, "Ints": -1, "Bools": False, "Texts": ""}


class Table:
    """A frozen table of arrays of one length; build it with `of`."""

    @classmethod
    def of(cls, count: int, **columns: Any) -> Self:
        """Build a table, filling absent columns with blanks.

        Parameters
        ----------
        count : int
            Number of rows [count].
        **columns : sequence
            Values by column name; None stands for blank [-].

        Returns
        -------
        Self
            The table; every array has `count` rows.

        Raises
        ------
        OurFault
            If a column is unknown or has another length.
        """
        made: dict[str, Any] = {}
        for field in dataclasses.fields(cls):  # type: ignore[arg-type]  # every subclass is a dataclass
            kind = str(field.type)
            blank = _BLANKS[kind]
            given = columns.pop(field.name, None)
            if given is None:
                made[field.name] = np.full(count, blank, dtype=_MAKERS[kind])
                continue
            if len(given) != count:
                raise OurFault(
                    cls.__name__, f"column {field.name} has {len(given)} rows, not {count}", "report it"
                )
            if isinstance(given, np.ndarray) and given.dtype == _MAKERS[kind] and kind != "Texts":
                made[field.name] = given
            else:
                array: NDArray[Any] = np.empty(count, dtype=_MAKERS[kind])
                array[:] = [blank if value is None else value for value in given]
                made[field.name] = array
        if columns:
            raise OurFault(cls.__name__, f"unknown columns {sorted(columns)}", "report it")
        return cls(**made)

    def __len__(self) -> int:
        first = dataclasses.fields(self)[0]  # type: ignore[arg-type]  # every subclass is a dataclass
        return len(getattr(self, first.name))


@dataclass(frozen=True)
class Vessels(Table):
    """One row per vessel of the register, in the order of the list.

    `*_written` are pressures as somebody wrote them, with their unit.
    """

    tag: Texts
    site: Texts
    service: Texts
    rules: Texts
    design_code: Texts
    code_edition: Texts
    assembly: Texts
    unit: Texts
    contents: Texts
    hazard_class: Texts
    state: Texts
    state_undated: Bools
    in_service_day: Floats
    design_pressure_mpa: Floats
    design_temperature_c: Floats
    nameplate_mawp_mpa: Floats
    current_mawp_mpa: Floats
    current_mawp_basis: Texts
    external_design_pressure_mpa: Floats
    operating_pressure_mpa: Floats
    next_survey_day: Floats
    nameplate_mawp_written: Texts
    current_mawp_written: Texts
    operating_pressure_written: Texts


@dataclass(frozen=True)
class Parts(Table):
    """One row per part; `vessel` is the index of its vessel."""

    vessel: Ints
    part: Texts
    shape: Texts
    state: Texts
    inside_diameter_mm: Floats
    outside_diameter_mm: Floats
    length_mm: Floats
    crown_radius_mm: Floats
    knuckle_radius_mm: Floats
    half_apex_angle_deg: Floats
    axis_ratio: Floats
    cover_factor: Floats
    gasket_diameter_mm: Floats
    nominal_thickness_mm: Floats
    corrosion_allowance_mm: Floats
    material: Texts
    allowable_stress_mpa: Floats
    stress_basis: Texts
    joint_efficiency_long: Floats
    joint_efficiency_circ: Floats
    joint_efficiency: Floats
    static_head_mpa: Floats
    structural_minimum_mm: Floats
    required_thickness_external_mm: Floats
    required_thickness_axial_mm: Floats
    required_thickness_given_mm: Floats
    other_pressure_limit_mpa: Floats
    loss_side: Texts
    lining: Texts
    lining_thickness_mm: Floats
    lining_counts_in_strength: Texts
    expected_rate_mm_per_year: Floats
    alert_thickness_mm: Floats


@dataclass(frozen=True)
class Locations(Table):
    """One row per location; `part` is the index of its part. Settings are resolved to the location."""

    part: Ints
    location: Texts
    position: Texts
    zone: Texts
    state: Texts
    seam_distance_mm: Floats
    diameter_at_mm: Floats
    loss_side: Texts
    damage: Texts
    alert_thickness_mm: Floats
    rate_floor_mm_per_year: Floats
    observation_window_days: Floats


@dataclass(frozen=True)
class Readings(Table):
    """One row per reading in force that was taken by the as-of date; `location` is the index of its location.

    `error_mm` is the reading error resolved to the reading: location, else survey, else part, vessel, database.
    """

    location: Ints
    reading_id: Ints
    taken_day: Floats
    thickness_mm: Floats
    average_mm: Floats
    result: Texts
    kind: Texts
    status: Texts
    includes_lining: Texts
    survey: Texts
    technician: Texts
    error_mm: Floats


@dataclass(frozen=True)
class Restarts(Table):
    """One row per restart and location: what begins a new history there. `kind`: new metal, new service."""

    location: Ints
    kind: Texts
    what: Texts
    happened_day: Floats


@dataclass(frozen=True)
class IdleTimes(Table):
    """One row per span of days in the state `idle protected`; an open span has NaN for its end."""

    vessel: Ints
    from_day: Floats
    to_day: Floats


@dataclass(frozen=True)
class Inspections(Table):
    """One row per inspection done by the as-of date. `kind`: internal, external, on-stream; `extent`: full or parts."""

    vessel: Ints
    kind: Texts
    done_day: Floats
    extent: Texts
    inspector: Texts


@dataclass(frozen=True)
class Decisions(Table):
    """One row per decision in force; `part` and `location` are -1 where it is for the whole vessel or part.

    `kind`: chosen rate, deferral, on-stream acceptance (a re-rating stands in `Vessels.current_mawp_mpa`).
    """

    vessel: Ints
    part: Ints
    location: Ints
    kind: Texts
    decided_day: Floats
    until_day: Floats
    review_day: Floats
    rate_mm_per_year: Floats
    decided_by: Texts
    second_by: Texts
    reason: Texts


@dataclass(frozen=True)
class Relief(Table):
    """One row per relief device linked to a vessel; `written` is the setting as somebody wrote it."""

    vessel: Ints
    device: Texts
    set_pressure_mpa: Floats
    written: Texts


@dataclass(frozen=True)
class Settings:
    """What stands at the level of the database.

    Parameters
    ----------
    list_life_years : float
        Life of the list [year].
    """

    list_life_years: float = 1.0


@dataclass(frozen=True)
class RecordedNotice:
    """A doubt or gap that stands on record for a vessel, for instance from the load of a survey.

    Parameters
    ----------
    vessel : int
        Index of the vessel [-].
    location : int
        Index of the location, or -1 [-].
    notice : Notice
        What was said [-].
    """

    vessel: int
    location: int
    notice: Notice


@dataclass(frozen=True)
class Inputs:
    """Everything an appraisal is made from."""

    vessels: Vessels
    parts: Parts
    locations: Locations
    readings: Readings
    restarts: Restarts
    idle_times: IdleTimes
    inspections: Inspections
    decisions: Decisions
    relief: Relief
    settings: Settings
    recorded: tuple[RecordedNotice, ...] = ()
    journal_head: str = ""
    journal_no: int = 0


DEFAULT_READING_ERROR_MM = 0.25
"""Reading error, one standard deviation, where nothing nearer is set [mm]. Status: ours."""
DEFAULT_WINDOW_DAYS = 90.0
"""Days within which readings make one observation [day]. Status: ours."""
DEFAULT_RATE_FLOOR_MM_PER_YEAR = 0.025
"""Least planning rate [mm/year]: 1 mil/year, common practice, no source."""
