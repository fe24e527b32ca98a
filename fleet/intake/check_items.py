"""Faults and doubts of single rows of the register."""

from __future__ import annotations

import datetime as dt
import math
from collections.abc import Collection, Mapping
from dataclasses import dataclass

import numpy as np

from fleet.intake import compare, tables
from fleet.intake.block import Block
from fleet.intake.cells import show
from fleet.intake.doubt_numbers import note_against_nominal
from fleet.intake.known import KnownRegister, Recordings
from fleet.units import INTERNAL

_PAST_DATES: dict[str, tuple[str, ...]] = {
    "vessels": ("in_service_on", "current_mawp_from", "last_internal_on", "last_external_on"),
    "locations": ("baseline_on",),
    "inspections": ("done_on",),
    "relief": ("last_test_on",),
}
"""Dates of events: none can lie in the future."""

_DATES_IN_SERVICE: dict[str, tuple[str, ...]] = {
    "vessels": ("current_mawp_from", "last_internal_on", "last_external_on"),
    "inspections": ("done_on",),
}
"""Dates of what is done to a vessel in service; a baseline may be older, and a relief device too."""

_COMMAND_FOR = {
    "state": "fleet state set",
    "current_mawp_mpa": "fleet decide",
    "current_mawp_from": "fleet decide",
    "current_mawp_basis": "fleet decide",
    "last_internal_on": "fleet inspection add",
    "last_external_on": "fleet inspection add",
    "baseline_thickness_mm": "fleet reading correct",
    "baseline_on": "fleet reading correct",
}
"""Fields that became dated facts at first load, and the command that records a change of each."""


@dataclass(frozen=True)
class Checks:
    """Check the rows of register tables one by one.

    Parameters
    ----------
    known : KnownRegister
        The register on record [-].
    today : date
        No past event may be dated later [date].
    rule_sets, design_codes : collection of str
        What is installed [text].
    shapes : mapping
        (vessel, part) to its shape, as the load says or else as is on record [text].
    in_service : mapping
        Vessel to the day it went into service, from the load or the record [date].
    nominals : mapping
        (vessel, part) to nominal wall and lining [mm].
    """

    known: KnownRegister
    today: dt.date
    rule_sets: Collection[str]
    design_codes: Collection[str]
    shapes: Mapping[tuple[str, ...], str]
    in_service: Mapping[str, dt.date]
    nominals: Mapping[tuple[str, ...], tuple[float, float]]

    def check(self, block: Block) -> None:
        """Note every fault and doubt of the rows of one table.

        Parameters
        ----------
        block : Block
            The table [-].
        """
        self._dates(block)
        self._differs(block)
        match block.table:
            case "vessels":
                self._vessels(block)
            case "parts":
                self._shape_columns(block)
                self._walls(block)
            case "locations":
                self._shape_columns(block)
                self._zones(block)
                self._baselines(block)
            case "inspections":
                self._inspections(block)

    # ------------------------------------------------------------------------------------------------------
    def _dates(self, block: Block) -> None:
        vessels = block.text("vessel")
        for name in _PAST_DATES.get(block.table, ()):
            for row, day in enumerate(block.date(name)):
                if day is not None and day > self.today:
                    block.fault("date in the future", row, name, f"{name} {day} is after {self.today}")
        for name in _DATES_IN_SERVICE.get(block.table, ()):
            for row, day in enumerate(block.date(name)):
                start = self.in_service.get(vessels[row])
                if day is not None and start is not None and day < start:
                    found = f"{name} {day}; '{vessels[row]}' went into service on {start}"
                    block.fault("date before in-service", row, name, found, "check the two dates")

    def _vessels(self, block: Block) -> None:
        rules, codes = block.text("rules"), block.text("design_code")
        nameplate, design = block.number("nameplate_mawp"), block.number("design_pressure")
        built = block.number("year_built")
        for row in range(len(block)):
            if rules[row] and rules[row] not in self.rule_sets:
                self._not_installed(block, row, "rules", rules[row], "unknown rule set", self.rule_sets)
            if codes[row] and codes[row] not in self.design_codes:
                self._not_installed(
                    block, row, "design_code", codes[row], "unknown design code", self.design_codes
                )
            if built[row] > self.today.year:
                found = f"year_built {built[row]:.0f} is after {self.today.year}"
                block.fault("number out of range", row, "year_built", found)
            if math.isnan(nameplate[row]) and not block.was_unread("nameplate_mawp", row):
                if not math.isnan(design[row]):
                    found = f"design_pressure {block.written('design_pressure', row)} is taken"
                    block.doubt("nameplate blank", row, "nameplate_mawp", found)
                elif not block.was_unread("design_pressure", row):
                    found = "neither nameplate_mawp nor design_pressure"
                    block.fault("missing value", row, "nameplate_mawp", found, "fill in one of the two")

    def _not_installed(
        self, block: Block, row: int, name: str, word: str, code: str, installed: Collection[str]
    ) -> None:
        near = tables.nearest(word, installed)
        hint = f"did you mean '{near}'? " if near else ""
        remedy = f"{hint}installed: {', '.join(sorted(installed)) or 'none'}"
        block.fault(code, row, name, f"'{word}' under '{name}'", remedy)

    def _shape_columns(self, block: Block) -> None:
        keys = list(zip(block.text("vessel"), block.text("part"), strict=True))
        own = block.text("shape") if block.table == "parts" else None
        for name, heading in block.layout.headings.items():
            applies = heading.column.shapes
            if applies is None or not heading.readable:
                continue
            numbers = block.number(name)
            for row in np.flatnonzero(~np.isnan(numbers)).tolist():
                shape = own[row] if own is not None else self.shapes.get(keys[row], "")
                if shape and shape not in applies:
                    found = (
                        f"{name} {block.written(name, row) or show(block.raw[name][row])} on shape '{shape}'"
                    )
                    block.doubt("does not apply", row, name, found)

    def _walls(self, block: Block) -> None:
        inside, outside = block.number("inside_diameter"), block.number("outside_diameter")
        nominal = block.number("nominal_thickness")
        with np.errstate(invalid="ignore"):
            crossed, solid = outside <= inside, 2 * nominal >= outside
        for row in np.flatnonzero(crossed).tolist():
            said = f"{block.written('outside_diameter', row)}, inside {block.written('inside_diameter', row)}"
            block.fault("number out of range", row, "outside_diameter", f"outside diameter {said}")
        for row in np.flatnonzero(solid).tolist():
            said = f"{block.written('nominal_thickness', row)} in {block.written('outside_diameter', row)}"
            found = f"twice the nominal thickness fills the outside diameter: {said}"
            block.fault("number out of range", row, "nominal_thickness", found)

    def _zones(self, block: Block) -> None:
        keys = zip(block.text("vessel"), block.text("part"), strict=True)
        for row, (key, zone) in enumerate(zip(keys, block.text("zone"), strict=True)):
            shape = self.shapes.get(key, "")
            if zone in {"crown", "knuckle"} and shape and shape not in tables.HEADS:
                block.doubt("does not apply", row, "zone", f"zone '{zone}' on shape '{shape}'")

    def _baselines(self, block: Block) -> None:
        walls, days = block.number("baseline_thickness"), block.date("baseline_on")
        unread = [
            block.was_unread("baseline_thickness", row) or block.was_unread("baseline_on", row)
            for row in range(len(block))
        ]
        for row, (wall, day) in enumerate(zip(walls.tolist(), days, strict=True)):
            if not unread[row] and math.isnan(wall) != (day is None):
                lacking = "baseline_thickness" if math.isnan(wall) else "baseline_on"
                block.doubt("baseline incomplete", row, lacking, f"{lacking} is blank")
        heading = block.layout.headings.get("baseline_thickness")
        if heading is None or heading.unit is None:
            return
        keys = list(zip(block.text("vessel"), block.text("part"), strict=True))
        rows = [row for row in np.flatnonzero(~np.isnan(walls)).tolist() if keys[row] in self.nominals]
        pairs = np.array([self.nominals[keys[row]] for row in rows], dtype=np.float64).reshape(-1, 2)
        none = np.full(len(rows), np.nan)
        spellings = [heading.unit.spelling] * len(rows)
        found = compare.against_nominal(walls[rows], pairs[:, 0], pairs[:, 1], none, spellings)
        note_against_nominal(block, "baseline_thickness", rows, found, pairs.sum(axis=1), none)

    def _inspections(self, block: Block) -> None:
        vessels, kinds, days = block.text("vessel"), block.text("kind"), block.date("done_on")
        extents = block.text("extent")
        parts: dict[str, set[str]] = {}
        for vessel, part in self.shapes.keys() | self.known.parts.keys():
            parts.setdefault(vessel, set()).add(part)
        for row, day in enumerate(days):
            same = None if day is None else (vessels[row], kinds[row], day)
            says_more = same in self.known.inspections_unsaid and extents[row] != ""
            if same in self.known.inspections and not says_more:
                found = f"{kinds[row]} inspection of '{vessels[row]}' on {day}"
                block.doubt("already on record", row, "done_on", found)
                block.left_out.add(row)
            extent, mine = extents[row], parts.get(vessels[row], set())
            if extent in {"", "full", "parts named"} or extent in mine:
                continue
            unknown = [name for name in map(str.strip, extent.split(";")) if name not in mine]
            if unknown:
                found = f"extent names '{unknown[0]}', which is no part of '{vessels[row]}'"
                near = tables.nearest(unknown[0], {*mine, "full"})
                hint = f"did you mean '{near}'? " if near else ""
                remedy = f"{hint}write 'full', or names of parts with semicolons between them"
                block.fault("unknown part", row, "extent", found, remedy)

    def _differs(self, block: Block) -> None:
        columns = [
            heading.column
            for heading in block.layout.headings.values()
            if heading.readable and heading.column.field in _COMMAND_FOR
        ]
        if block.table not in {"vessels", "parts", "locations"} or not columns:
            return
        names = tables.NAMED_BY[block.table]
        for row, key in enumerate(zip(*(block.text(name) for name in names), strict=True)):
            recorded = self._recorded(key)
            for column in columns if recorded else ():
                agree = recorded.get(column.field, ())
                value: object
                if column.kind == "number":
                    value = float(block.number(column.name)[row])
                    given = not math.isnan(value)
                else:
                    value = (block.date if column.kind == "date" else block.text)(column.name)[row]
                    given = bool(value)
                if given and agree and not any(_agrees(value, one) for one in agree):
                    unit = f" {INTERNAL[column.quantity]}" if column.quantity is not None else ""
                    listed = ", ".join(_say(one) + unit for one in agree)
                    said = (
                        block.written(column.name, row) if unit else f"'{show(block.raw[column.name][row])}'"
                    )
                    found = f"{column.name} {said}; on record: {listed}"
                    remedy = f"record the change with '{_COMMAND_FOR[column.field]}', or leave the cell blank"
                    block.fault("differs from the record", row, column.name, found, remedy)

    def _recorded(self, key: tuple[str, ...]) -> Recordings:
        match key:
            case (vessel,) if vessel in self.known.vessels:
                return self.known.vessels[vessel].recorded
            case (vessel, part) if (vessel, part) in self.known.parts:
                return self.known.parts[vessel, part].recorded
            case (vessel, part, location) if (vessel, part, location) in self.known.locations:
                return self.known.locations[vessel, part, location].recorded
        return {}


def _agrees(value: object, recorded: object) -> bool:
    if isinstance(value, float) and isinstance(recorded, float | int):
        return math.isclose(value, recorded, rel_tol=1e-9)
    return value == recorded


def _say(value: object) -> str:
    return f"{value:.6g}" if isinstance(value, float) else str(value)
