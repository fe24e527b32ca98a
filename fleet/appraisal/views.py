"""The one view of a vessel that every command, list and ``--json`` prints, so that they cannot differ.

Fields carry their unit in the name: mm, MPa, mm/year, years; dates are `datetime.date`; what cannot be had is None.
`VesselView.as_json` gives the object of the ``--json`` contract, key by key.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import date
from typing import Any

from fleet.words import Notice


@dataclass(frozen=True)
class Place:
    """A part and a location, as the place that governs a figure.

    Parameters
    ----------
    part, location : str
        Names on the register; the location is None where the part as such governs [text].
    """

    part: str
    location: str | None

    def as_json(self) -> dict[str, Any]:
        """Give the pair as the contract has it."""
        return {"part": self.part, "location": self.location}

    def __str__(self) -> str:
        return self.part if self.location is None else f"{self.part} / {self.location}"


@dataclass(frozen=True)
class ReliefView:
    """A relief device against the wall."""

    device: str
    set_pressure_mpa: float
    now: str | None
    reset_by_on: date | None
    written: str = ""
    """The setting as somebody wrote it, with its unit."""

    def as_json(self) -> dict[str, Any]:
        """Give the object as the contract has it."""
        return {
            "device": self.device,
            "set_pressure_mpa": self.set_pressure_mpa,
            "now": self.now,
            "reset_by_on": _iso(self.reset_by_on),
        }


@dataclass(frozen=True)
class LocationView:
    """One location: what was measured, how fast it goes, how long it lasts."""

    location: str
    observations: int
    last_on: date | None
    last_thickness_mm: float | None
    wall_used_mm: float | None
    long_term_rate_mm_per_year: float | None
    short_term_rate_mm_per_year: float | None
    planning_rate_mm_per_year: float | None
    rate_basis: str
    least_measurable_rate_mm_per_year: float | None
    required_thickness_mm: float | None
    remaining_life_years: float | None
    life_at_least_measurable_rate_years: float | None
    retirement_on: date | None
    half_life_interval_years: float | None
    projected_thickness_mm: float | None
    mawp_today_mpa: float | None
    projected_mawp_mpa: float | None
    doubts: tuple[Notice, ...]
    # beyond the contract, for the sheets
    position: str
    standing: str
    required_by: str | None
    span_years: float | None
    short_span_years: float | None
    fitted_rate_mm_per_year: float | None
    fitted_rate_error_mm_per_year: float | None
    reading_error_mm: float | None
    wall_in_strength_mm: float | None
    projected_mawp_uncapped_mpa: float | None

    def as_json(self) -> dict[str, Any]:
        """Give the object as the contract has it."""
        return {
            "location": self.location,
            "observations": self.observations,
            "last_on": _iso(self.last_on),
            "last_thickness_mm": self.last_thickness_mm,
            "wall_used_mm": self.wall_used_mm,
            "long_term_rate_mm_per_year": self.long_term_rate_mm_per_year,
            "short_term_rate_mm_per_year": self.short_term_rate_mm_per_year,
            "planning_rate_mm_per_year": self.planning_rate_mm_per_year,
            "rate_basis": self.rate_basis,
            "least_measurable_rate_mm_per_year": self.least_measurable_rate_mm_per_year,
            "required_thickness_mm": self.required_thickness_mm,
            "remaining_life_years": self.remaining_life_years,
            "life_at_least_measurable_rate_years": self.life_at_least_measurable_rate_years,
            "retirement_on": _iso(self.retirement_on),
            "half_life_interval_years": self.half_life_interval_years,
            "projected_thickness_mm": self.projected_thickness_mm,
            "mawp_today_mpa": self.mawp_today_mpa,
            "projected_mawp_mpa": self.projected_mawp_mpa,
            "doubts": [notice.as_dict() for notice in self.doubts],
        }


@dataclass(frozen=True)
class PartView:
    """One part: the wall it needs and the pressure it carries."""

    part: str
    shape: str
    required_thickness_mm: float | None
    required_by: str | None
    mawp_today_mpa: float | None
    projected_mawp_mpa: float | None
    projected_mawp_uncapped_mpa: float | None
    locations: tuple[LocationView, ...]
    # beyond the contract, for the sheets
    measured: bool
    formulas: tuple[str, ...]
    """Names in the formula register of what the figures of this part rest on."""
    static_head_mpa: float | None
    material: str
    allowable_stress_mpa: float | None
    nominal_thickness_mm: float | None

    def as_json(self) -> dict[str, Any]:
        """Give the object as the contract has it."""
        return {
            "part": self.part,
            "shape": self.shape,
            "required_thickness_mm": self.required_thickness_mm,
            "required_by": self.required_by,
            "mawp_today_mpa": self.mawp_today_mpa,
            "projected_mawp_mpa": self.projected_mawp_mpa,
            "projected_mawp_uncapped_mpa": self.projected_mawp_uncapped_mpa,
            "locations": [location.as_json() for location in self.locations],
        }


@dataclass(frozen=True)
class WaysOut:
    """What it takes to keep a vessel that is not held.

    Parameters
    ----------
    rating_holds_until : date or None
        To this day the current MAWP holds, with the loss factor of the rule set [date].
    pressure_that_reaches_mpa : float or None
        The pressure that the wall still carries on the carry-to date; None where a minimum that is no matter of
        pressure governs [MPa].
    renew_by : date or None
        By this day repair or renewal is needed: the retirement date [date].
    """

    rating_holds_until: date | None
    pressure_that_reaches_mpa: float | None
    renew_by: date | None


@dataclass(frozen=True)
class VesselView:
    """One vessel on one as-of date: every figure that any list prints."""

    vessel: str
    as_of: date
    carry_to_on: date | None
    carry_to_basis: str
    rules: str
    design_code: str
    current_mawp_mpa: float | None
    nameplate_mawp_mpa: float | None
    mawp_today_mpa: float | None
    projected_mawp_mpa: float | None
    projected_mawp_uncapped_mpa: float | None
    governing_pressure: Place | None
    governing_life: Place | None
    governing_due: Place | None
    retirement_on: date | None
    life_left_years: float | None
    internal_due_on: date | None
    external_due_on: date | None
    internal_interval_years: float | None
    rating_holds_until: date | None
    standing: str
    flags: tuple[str, ...]
    parts_measured: int
    parts_total: int
    relief: tuple[ReliefView, ...]
    doubts: tuple[Notice, ...]
    gaps: tuple[Notice, ...]
    journal_head: str
    parts: tuple[PartView, ...]
    # beyond the contract, for the sheets
    block: str
    service: str
    site: str
    unit: str
    assembly: str
    state: str
    code_edition: str
    operating_pressure_mpa: float | None
    operating_above_today: bool
    operating_until: date | None
    """The day on which the projected MAWP falls to the operating pressure."""
    projected_mawp_at_list_end_mpa: float | None
    """A figure without a standing, for a vessel whose carry-to date lies within the life of the list."""
    list_end_on: date
    held_by_half_life: bool
    clause_interval_years: float | None
    """On the short-life plateau: the interval that the clause allows; the rating holds to half life only."""
    half_life_on_plateau_years: float | None
    ways_out: WaysOut | None
    re_gauge: tuple[Place, ...]
    re_gauge_by: date | None
    last_internal_on: date | None
    last_external_on: date | None
    written: dict[str, str] = field(default_factory=dict)
    """Pressures as somebody wrote them, by column: nameplate_mawp, current_mawp, operating_pressure."""
    rules_status: str = ""
    """How well the values of its rule set are known, such as `secondary`."""
    sentence: str = field(default="")
    """One sentence that says why the vessel has this standing; where empty, the reports write their own."""

    @property
    def parts_known(self) -> int:
        """Parts measured for which a pressure is known; a list that shows fewer than all says so."""
        return sum(part.measured and part.projected_mawp_mpa is not None for part in self.parts)

    def as_json(self, *, parts: bool = True) -> dict[str, Any]:
        """Give the object of the ``--json`` contract.

        Parameters
        ----------
        parts : bool
            Whether the parts and their locations follow; lists leave them out [-].

        Returns
        -------
        dict
        """
        document: dict[str, Any] = {
            "vessel": self.vessel,
            "as_of": _iso(self.as_of),
            "carry_to_on": _iso(self.carry_to_on),
            "carry_to_basis": self.carry_to_basis,
            "rules": self.rules,
            "design_code": self.design_code,
            "current_mawp_mpa": self.current_mawp_mpa,
            "nameplate_mawp_mpa": self.nameplate_mawp_mpa,
            "mawp_today_mpa": self.mawp_today_mpa,
            "projected_mawp_mpa": self.projected_mawp_mpa,
            "projected_mawp_uncapped_mpa": self.projected_mawp_uncapped_mpa,
            "governing_pressure": _place(self.governing_pressure),
            "governing_life": _place(self.governing_life),
            "governing_due": _place(self.governing_due),
            "retirement_on": _iso(self.retirement_on),
            "life_left_years": self.life_left_years,
            "internal_due_on": _iso(self.internal_due_on),
            "external_due_on": _iso(self.external_due_on),
            "internal_interval_years": self.internal_interval_years,
            "rating_holds_until": _iso(self.rating_holds_until),
            "standing": self.standing,
            "flags": list(self.flags),
            "parts_measured": self.parts_measured,
            "parts_total": self.parts_total,
            "relief": [device.as_json() for device in self.relief],
            "doubts": [notice.as_dict() for notice in self.doubts],
            "gaps": [notice.as_dict() for notice in self.gaps],
            "journal_head": self.journal_head,
        }
        if parts:
            document["parts"] = [part.as_json() for part in self.parts]
        return document


def _iso(day: date | None) -> str | None:
    return None if day is None else day.isoformat()


def _place(place: Place | None) -> dict[str, Any] | None:
    return None if place is None else place.as_json()
