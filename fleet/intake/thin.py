"""Tell every reading at or below its alert or required thickness, whatever else is wrong with its file."""

from __future__ import annotations

import datetime as dt
import math
from typing import Any

from fleet.intake.block import Block
from fleet.intake.known import KnownLocation, KnownPart, KnownRegister


def thin_readings(block: Block, known: KnownRegister) -> list[dict[str, Any]]:
    """Find the thin readings of one table of readings.

    Parameters
    ----------
    block : Block
        The table; rows with faults are looked at as well [-].
    known : KnownRegister
        The register on record [-].

    Returns
    -------
    list of dict
        One entry a thin reading, in the order of the file; `wall_mm` is the wall compared [-].

    Notes
    -----
    The wall compared is the lesser of thickness and average, less a lining that does not count in strength,
    unless the reading is said not to include it. A location that is not on record is held against the figures
    of its part, an unknown part against the greatest required thickness of its vessel.
    """
    thickness, average = block.number("thickness"), block.number("average")
    vessels, parts, locations = block.text("vessel"), block.text("part"), block.text("location")
    days, includes = block.date("taken_on"), block.text("includes_lining")
    of_vessel: dict[str, float] = {}
    for (vessel, _), each in known.parts.items():
        if each.required_thickness_mm > of_vessel.get(vessel, 0.0):
            of_vessel[vessel] = each.required_thickness_mm
    found = []
    for row, (thick, mean) in enumerate(zip(thickness.tolist(), average.tolist(), strict=True)):
        if math.isnan(thick):
            continue
        part = known.parts.get((vessels[row], parts[row]))
        location = known.locations.get((vessels[row], parts[row], locations[row]))
        against: KnownLocation | KnownPart | None = location or part
        if against is None:
            alert, required = math.nan, of_vessel.get(vessels[row], math.nan)
        else:
            alert, required = against.alert_thickness_mm, against.required_thickness_mm
        wall = min(thick, mean) if mean > 0 else thick
        wall -= _lining_to_take_off(part, includes[row])
        which = [name for name, limit in (("alert", alert), ("required", required)) if wall <= limit]
        if which:
            day = days[row]
            found.append(
                {
                    "vessel": vessels[row],
                    "part": parts[row],
                    "location": locations[row],
                    "taken_on": day.isoformat() if isinstance(day, dt.date) else None,
                    "thickness_mm": thick,
                    "wall_mm": wall,
                    "alert_thickness_mm": None if math.isnan(alert) else alert,
                    "required_thickness_mm": None if math.isnan(required) else required,
                    "where": block.where(row, "thickness"),
                    "which": " and ".join(which),
                }
            )
    return found


def _lining_to_take_off(part: KnownPart | None, includes: str) -> float:
    if part is None or not part.is_lined or part.lining_counts_in_strength == "yes" or includes == "no":
        return 0.0
    return part.lining_thickness_mm if part.lining_thickness_mm > 0 else 0.0
