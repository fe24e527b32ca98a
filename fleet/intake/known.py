"""What is on record already, as plain values that whoever calls intake fills in.

Intake sees no database: the register and the readings on record come to it as these frozen values.
"""

from __future__ import annotations

import datetime as dt
import math
from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Literal, NamedTuple

PartKey = tuple[str, str]
"""Vessel and part."""
LocationKey = tuple[str, str, str]
"""Vessel, part and location."""

Recordings = Mapping[str, Collection[object]]
"""Field to the values that agree with the facts on record; absent or empty where there is no fact yet."""


@dataclass(frozen=True)
class KnownVessel:
    """One vessel on record.

    Parameters
    ----------
    in_service_on : date or None
        The day it went into service [date].
    recorded : mapping
        For `state`, `current_mawp_mpa`, `current_mawp_from`, `current_mawp_basis`: the value in force; for
        `last_internal_on`, `last_external_on`: the days of all inspections of that kind on record. A register
        value that is none of these is the fault `differs from the record` [-].
    """

    in_service_on: dt.date | None = None
    recorded: Recordings = field(default_factory=dict)


@dataclass(frozen=True)
class KnownPart:
    """One part on record; NaN and empty text where a value is missing.

    Parameters
    ----------
    shape : str
        Its shape [text].
    nominal_thickness_mm : float
        Nominal wall of the base metal [mm].
    lining : str
        Its lining, `none` or empty where it has none [text].
    lining_thickness_mm : float
        Thickness of the lining [mm].
    lining_counts_in_strength : str
        `yes`, `no` or empty, which is taken as no [text].
    alert_thickness_mm, required_thickness_mm : float
        Used for readings whose location is not known [mm].
    recorded : mapping
        For `state`: the value in force [-].
    """

    shape: str = ""
    nominal_thickness_mm: float = math.nan
    lining: str = ""
    lining_thickness_mm: float = math.nan
    lining_counts_in_strength: str = ""
    alert_thickness_mm: float = math.nan
    required_thickness_mm: float = math.nan
    recorded: Recordings = field(default_factory=dict)

    @property
    def is_lined(self) -> bool:
        """Whether there is a lining."""
        return self.lining not in {"", "none"}


@dataclass(frozen=True)
class KnownLocation:
    """One location on record; NaN where a value is missing.

    Parameters
    ----------
    alert_thickness_mm : float
        The owner's alert thickness, from the location or else its part [mm].
    required_thickness_mm : float
        Required thickness as last appraised [mm].
    reading_error_mm : float
        Reading error, 1 standard deviation, from the nearest level at which it is set [mm].
    recorded : mapping
        For `state`, `baseline_thickness_mm`, `baseline_on`: the value in force [-].
    """

    alert_thickness_mm: float = math.nan
    required_thickness_mm: float = math.nan
    reading_error_mm: float = 0.25
    recorded: Recordings = field(default_factory=dict)


@dataclass(frozen=True)
class KnownRegister:
    """The register on record.

    Parameters
    ----------
    vessels : mapping
        Tag to `KnownVessel` [-].
    parts : mapping
        (vessel, part) to `KnownPart` [-].
    locations : mapping
        (vessel, part, location) to `KnownLocation` [-].
    inspections : collection
        (vessel, kind, day) of every inspection on record; such a row is not loaded again [-].
    inspections_unsaid : collection
        Those of them whose extent nobody said: a row that says it is loaded beside them [-].
    files : mapping
        SHA-256 of every file that was loaded whole, to what it was loaded as. A file of which rows were
        parked does not belong here: loaded again, its rows on record are passed over and the rest is tried
        anew [text].
    """

    vessels: Mapping[str, KnownVessel] = field(default_factory=dict)
    parts: Mapping[PartKey, KnownPart] = field(default_factory=dict)
    locations: Mapping[LocationKey, KnownLocation] = field(default_factory=dict)
    inspections: Collection[tuple[str, str, dt.date] | None] = frozenset()
    inspections_unsaid: Collection[tuple[str, str, dt.date] | None] = frozenset()
    files: Mapping[str, str] = field(default_factory=dict)


class Recorded(NamedTuple):
    """One reading on record.

    `standing` is `accepted` (counts in the present history), `queried`, `voided`, or `past` (belongs to a
    history that a restart has closed). Only accepted ones are compared with; duplicates are looked for among
    all, among voided ones only to pass over the same row again.
    """

    taken_on: dt.date
    thickness_mm: float
    """NaN where the visit gave no thickness."""
    standing: Literal["accepted", "queried", "voided", "past"] = "accepted"


@dataclass(frozen=True)
class History:
    """The readings on record, of at least the locations that a file names.

    Parameters
    ----------
    readings : mapping
        (vessel, part, location) to its readings, in order of date; baselines are readings like others [-].
    same_observation_days : int
        Readings within so many days of the first make one observation [days].
    """

    readings: Mapping[LocationKey, Sequence[Recorded]] = field(default_factory=dict)
    same_observation_days: int = 90
