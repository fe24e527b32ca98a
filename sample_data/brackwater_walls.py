"""The invented works: the true wall of every location on every day, and what the technicians read of it.

Every random number hangs on the names of vessel, location and survey: a change at one vessel moves no other.
"""

from __future__ import annotations

import zlib
from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date, timedelta
from functools import cache
from typing import Any

import numpy as np
from brackwater_reckoning import required
from brackwater_story import (
    FIRST_READ,
    HOT_TWICE,
    NEVER,
    SPOILT,
    SURVEYS,
    SWAPPED,
    THICKER,
    WITHDRAWN,
    Survey,
    location,
)
from brackwater_vessels import VESSELS, Part, Vessel

YEAR = 365.25
PER_MM = {"mm": 1.0, "in": 1 / 25.4, "inch": 1 / 25.4, "thou": 1000 / 25.4}
Row = dict[str, Any]


def noise(*names: object) -> np.random.Generator:
    """Give the random numbers that belong to a name."""
    return np.random.default_rng(zlib.crc32("|".join(str(n) for n in names).encode()))


@dataclass(frozen=True)
class Point:
    """One location with its true wall."""

    vessel: Vessel
    part: Part
    index: int
    location: str
    end: float  # true wall in strength on the day of its last survey (old metal: the day it was replaced)
    end_on: date
    factor: float

    def wall(self, day: date) -> float:
        """Give the true base metal left on a day."""
        new = self.vessel.new_metal
        if new and new[1] == self.part.name and day >= new[0]:
            return new[2] + 0.12 * self.factor - 0.09 * self.factor * (day - new[0]).days / YEAR
        return self.end + self._loss(day, self.end_on)

    def _loss(self, start: date, end: date) -> float:
        """Give the true loss between two days, in either order."""
        if start > end:
            return -self._loss(end, start)
        days = [start, end]
        change, pause = self.vessel.change, self.vessel.pause
        total = (end - start).days / YEAR * self.part.rate
        if change and change[1] == self.part.name:
            late = max((days[1] - max(change[0], days[0])).days, 0) / YEAR
            total += late * (change[2] - self.part.rate)
        if pause:
            idle = max((min(days[1], pause[1]) - max(pause[0], days[0])).days, 0) / YEAR
            total -= idle * self.part.rate
        return total * self.factor


def visits(vessel: Vessel) -> list[Survey]:
    """List the plant surveys that a vessel took part in."""
    chosen = []
    for survey in SURVEYS:
        if survey.plant != vessel.plant or (survey.only and survey.only[0] != vessel.tag):
            continue
        gone = (vessel.last and survey.start > vessel.last) or survey.start < vessel.in_service
        idle = vessel.pause and vessel.pause[0] <= survey.start < vessel.pause[1]
        if not gone and not idle:
            chosen.append(survey)
    return chosen


def visit_day(vessel: Vessel, survey: Survey) -> date:
    """Give the day of the survey on which this vessel was done."""
    if survey.only:
        return survey.start + timedelta(days=1)
    order = [v.tag for v in VESSELS if v.plant == vessel.plant].index(vessel.tag)
    return survey.start + timedelta(days=order * 9 // 10)


def points(vessel: Vessel) -> list[Point]:
    """Lay out the locations of a vessel with their true walls."""
    return _points(vessel.tag)


@cache
def _points(tag: str) -> list[Point]:
    vessel = next(v for v in VESSELS if v.tag == tag)
    found = []
    plant_visits = [s for s in visits(vessel) if not s.only]
    last = visit_day(vessel, plant_visits[-1])
    for part in vessel.parts:
        end_on = last
        if vessel.new_metal and vessel.new_metal[1] == part.name:
            end_on = vessel.new_metal[0]
        for index in range(part.count):
            rng = noise(vessel.tag, part.name, index)
            factor = 1.0 if index == 0 else float(rng.uniform(0.55, 0.9))
            more = 0.0 if index == 0 else float(rng.uniform(*part.spread))
            more = THICKER.get((vessel.tag, part.name, index), more)
            if part.margin is None:
                age = (end_on - vessel.in_service).days / YEAR
                end = part.nominal - 0.25 + more * 0.6 - part.rate * factor * age
            else:
                end = required(vessel, part) + part.margin + more
            found.append(
                Point(vessel, part, index, location(vessel.tag, part.name, index), end, end_on, factor)
            )
    return found


def read_points(vessel: Vessel, survey: Survey) -> Iterator[Row]:
    """Read every location of a vessel in one survey, with what was spoilt on purpose."""
    day, start = visit_day(vessel, survey), survey.start.isoformat()
    for point in points(vessel):
        part, key = point.part, (vessel.tag, point.part.name, point.index)
        if key in NEVER or day < FIRST_READ.get(key, day) or (survey.only and part.name != survey.only[1]):
            continue
        if (
            not survey.only
            and vessel.new_metal
            and start == "2020-10-12"
            and part.name == vessel.new_metal[1]
        ):
            continue  # read four days before, when the new course was in
        if key == WITHDRAWN[:3] and day > WITHDRAWN[3]:
            continue
        rng = noise(vessel.tag, point.location, start)
        error = part.noise * float(np.clip(rng.normal(), -2, 2))
        lining = part.drawing.get("lining_thickness", 0.0)
        row: Row = {"vessel": vessel.tag, "part": part.name, "location": point.location, "taken_on": day}
        row["thickness"] = point.wall(day) + lining + error
        row["over"] = 0.05 + abs(float(rng.normal(0, 0.12)))
        row["true"] = point
        _spoil(row, start, point)
        yield row


def _spoil(row: Row, start: str, point: Point) -> None:
    if (start, point.vessel.tag) == HOT_TWICE[:2]:
        row["thickness"] *= 1 - 0.01 * (HOT_TWICE[2] - 20) / 55
    how, figure, note = SPOILT.get((start, point.vessel.tag, point.part.name, point.index), ("", 0.0, ""))
    if how == "shift":
        row["thickness"] += figure
    elif how == "times":
        row["thickness"] *= figure
    elif how == "in mm":
        row["as written"] = round(row["thickness"], 1)
    elif how:
        row.update(thickness=None, result=how, note=note)


def survey_rows(survey: Survey) -> list[Row]:
    """Collect the readings of one file, rounded as written, in its unit."""
    rows = []
    for vessel in VESSELS:
        if survey in visits(vessel):
            rows += list(read_points(vessel, survey))
    if survey.start.isoformat() == SWAPPED[0]:
        pair = [r for r in rows if r["vessel"] == SWAPPED[1] and r["part"] == SWAPPED[2]]
        a, b = pair[SWAPPED[3]], pair[SWAPPED[4]]
        a["thickness"], b["thickness"] = b["thickness"], a["thickness"]
    for row in rows:
        _write_down(row, survey)
    return rows


def _write_down(row: Row, survey: Survey) -> None:
    """Round as a technician writes, and fill the columns that the survey has."""
    vessel: Vessel = row["true"].vessel
    hot = {"D-401": 252.0, "D-402": 236.0}.get(vessel.tag)
    if survey.start.isoformat() == HOT_TWICE[0] and vessel.tag == HOT_TWICE[1]:
        hot = HOT_TWICE[2]
    scale = PER_MM[survey.unit]
    if row["thickness"] is not None:
        thick, average = row["thickness"] * scale, (row["thickness"] + row["over"]) * scale
        row["average"] = _round(average, survey.decimals)
        row["thickness"] = row.pop("as written", None) or _round(thick, survey.decimals)
        row.setdefault("result", "read")
    row["technician"] = survey.technician
    row["instrument"] = f"BW-UT-{1 + survey.start.year % 4}"
    row["includes_lining"] = "yes" if row["true"].part.drawing["lining"] != "none" else "no"
    row["wall_temperature"] = hot or 35.0 + 5 * (zlib.crc32(vessel.tag.encode()) % 4)
    row["temperature_corrected"] = "yes" if hot else "no"
    row["method"], row["through_coating"] = "spot", "no"
    if vessel.tag == "T-303" and survey.only:
        row["note"] = "baseline of the new course"
    if vessel.tag == "D-112" and survey.only:
        row["note"], row["method"] = "read again with A-scan", "scan"


def _round(value: float, decimals: int) -> float | int:
    return round(value, decimals) if decimals else round(value)
