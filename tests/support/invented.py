"""Build small invented fleets for tests: one call a vessel, everything with a safe default that a test can change."""

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import date
from typing import Any

from fleet.appraisal import Appraisal, appraise
from fleet.appraisal.inputs import (
    Decisions,
    IdleTimes,
    Inputs,
    Inspections,
    Locations,
    Parts,
    Readings,
    RecordedNotice,
    Relief,
    Restarts,
    Settings,
    Vessels,
)
from fleet.appraisal.views import LocationView, PartView, VesselView

AS_OF = date(2026, 1, 1)


def ordinal(text: str | date | None) -> float:
    """Give the day number of an ISO date."""
    if text is None:
        return float("nan")
    day = text if isinstance(text, date) else date.fromisoformat(text)
    return float(day.toordinal())


@dataclass
class Fleet:
    """An invented fleet, built up call by call and turned into `Inputs`."""

    vessels: list[dict[str, Any]] = field(default_factory=list)
    parts: list[dict[str, Any]] = field(default_factory=list)
    locations: list[dict[str, Any]] = field(default_factory=list)
    readings: list[dict[str, Any]] = field(default_factory=list)
    restarts: list[dict[str, Any]] = field(default_factory=list)
    idle: list[dict[str, Any]] = field(default_factory=list)
    inspections: list[dict[str, Any]] = field(default_factory=list)
    decisions: list[dict[str, Any]] = field(default_factory=list)
    relief_devices: list[dict[str, Any]] = field(default_factory=list)
    recorded: list[RecordedNotice] = field(default_factory=list)
    list_life_years: float = 1.0

    def vessel(self, tag: str = "V-1", *, inspected: str | None = "2020-01-01", **changes: Any) -> int:
        """Add a vessel; an internal and an external inspection come with it unless `inspected` is None."""
        row: dict[str, Any] = {
            "tag": tag, "rules": "api510", "design_code": "asme8-1", "code_edition": "2001", "state": "in service",
            "in_service_day": ordinal("2000-01-01"), "nameplate_mawp_mpa": 1.0, "design_pressure_mpa": 1.0,
            "external_design_pressure_mpa": 0.0, "operating_pressure_mpa": 0.7, "state_undated": False,
            "next_survey_day": float("nan"),
        }  # fmt: skip
        row.update(changes)
        self.vessels.append(row)
        here = len(self.vessels) - 1
        if inspected is not None:
            self.inspect(here, "internal", inspected)
            self.inspect(here, "external", inspected)
        return here

    def part(self, vessel: int = 0, name: str = "shell", *, shape: str = "cylinder", **changes: Any) -> int:
        """Add a part: by default a cylinder of 1000 mm inside, 14 mm nominal, S = 100 MPa, E = 1, no head."""
        row: dict[str, Any] = {
            "vessel": vessel, "part": name, "shape": shape, "state": "", "inside_diameter_mm": 1000.0,
            "length_mm": 2000.0, "nominal_thickness_mm": 14.0, "allowable_stress_mpa": 100.0, "static_head_mpa": 0.0,
            "structural_minimum_mm": 0.0, "required_thickness_axial_mm": 0.0, "loss_side": "inside", "lining": "none",
        }  # fmt: skip
        if shape in ("cylinder", "cone", "nozzle neck"):
            row |= {"joint_efficiency_long": 1.0, "joint_efficiency_circ": 1.0}
        else:
            row["joint_efficiency"] = 1.0
        row.update(changes)
        self.parts.append(row)
        return len(self.parts) - 1

    def location(self, part: int = 0, name: str = "L1", **changes: Any) -> int:
        """Add a location."""
        row: dict[str, Any] = {
            "part": part, "location": name, "state": "", "rate_floor_mm_per_year": 0.025,
            "observation_window_days": 90.0,
        }  # fmt: skip
        row.update(changes)
        self.locations.append(row)
        return len(self.locations) - 1

    def read(self, location: int, *taken: tuple[str, float | None], **changes: Any) -> None:
        """Add readings: pairs of date and thickness in mm; None with `result` for a failed one."""
        for day, thickness in taken:
            row: dict[str, Any] = {
                "location": location, "reading_id": len(self.readings) + 1, "taken_day": ordinal(day),
                "thickness_mm": thickness, "result": "read" if thickness is not None else "no access",
                "kind": "reading", "status": "accepted", "error_mm": 0.25,
            }  # fmt: skip
            row.update(changes)
            self.readings.append(row)

    def restart(self, location: int, kind: str, day: str, what: str = "") -> None:
        """Add a restart at a location."""
        self.restarts.append({"location": location, "kind": kind, "what": what, "happened_day": ordinal(day)})

    def inspect(self, vessel: int, kind: str, day: str, extent: str = "full") -> None:
        """Add an inspection."""
        self.inspections.append({"vessel": vessel, "kind": kind, "done_day": ordinal(day), "extent": extent})

    def decide(self, vessel: int, kind: str, day: str, **changes: Any) -> None:
        """Add a decision."""
        row: dict[str, Any] = {
            "vessel": vessel,
            "part": -1,
            "location": -1,
            "kind": kind,
            "decided_day": ordinal(day),
        }
        row.update(changes)
        self.decisions.append(row)

    def relieve(self, vessel: int, set_pressure_mpa: float, device: str = "PSV-1") -> None:
        """Add a relief device."""
        self.relief_devices.append({"vessel": vessel, "device": device, "set_pressure_mpa": set_pressure_mpa})

    def inputs(self) -> Inputs:
        """Turn the lists into arrays."""
        return Inputs(
            vessels=_table(Vessels, self.vessels),
            parts=_table(Parts, self.parts),
            locations=_table(Locations, self.locations),
            readings=_table(Readings, self.readings),
            restarts=_table(Restarts, self.restarts),
            idle_times=_table(IdleTimes, self.idle),
            inspections=_table(Inspections, self.inspections),
            decisions=_table(Decisions, self.decisions),
            relief=_table(Relief, self.relief_devices),
            settings=Settings(list_life_years=self.list_life_years),
            recorded=tuple(self.recorded),
            journal_head="0" * 64,
            journal_no=1,
        )

    def appraise(self, as_of: date | str = AS_OF, carry_to: date | None = None) -> Appraisal:
        """Appraise the fleet."""
        day = as_of if isinstance(as_of, date) else date.fromisoformat(as_of)
        return appraise(self.inputs(), as_of=day, carry_to=carry_to)

    def view(self, as_of: date | str = AS_OF, carry_to: date | None = None, vessel: int = 0) -> VesselView:
        """Appraise the fleet and show one vessel."""
        return self.appraise(as_of, carry_to).vessel(vessel)


def _table(kind: Any, rows: list[dict[str, Any]]) -> Any:
    names = {name for row in rows for name in row}
    return kind.of(len(rows), **{name: [row.get(name) for row in rows] for name in names})


def one_cylinder(*taken: tuple[str, float | None], **vessel: Any) -> Fleet:
    """Give a fleet of one vessel with one shell and one location, read as told."""
    fleet = Fleet()
    fleet.vessel(**vessel)
    fleet.part()
    fleet.location()
    fleet.read(0, *taken)
    return fleet


def part_of(view: VesselView, name: str = "shell") -> PartView:
    """Find a part of a view."""
    return next(part for part in view.parts if part.part == name)


def location_of(view: VesselView, part: str = "shell", name: str = "L1") -> LocationView:
    """Find a location of a view."""
    return next(place for place in part_of(view, part).locations if place.location == name)


def codes(notices: Any) -> list[str]:
    """Give the codes of notices."""
    return [notice.code for notice in notices]
