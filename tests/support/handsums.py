"""Round numbers for tests reckoned by hand: spans of whole years, a wall that goes steadily, a required wall of 10 mm.

From 2016-01-01 to 2024-01-01 are 2922 days, 8 years of 365.25 days; from 2024-01-01 to 2028-01-01, to 2032-01-01 and to
2040-01-01 are 4, 8 and 16 such years.
"""

from __future__ import annotations

from datetime import date, timedelta
from typing import Any

from invented import Fleet

YEAR = 365.25
FIRST, LAST = "2016-01-01", "2024-01-01"


def days_after(day: str, days: float) -> date:
    """Give the day so many whole days later, rounded down."""
    return date.fromisoformat(day) + timedelta(days=int(days))


def days_between(first: str, last: str) -> int:
    """Count the days between two dates."""
    return (date.fromisoformat(last) - date.fromisoformat(first)).days


def steady(wall: float = 12.0, rate: float = 0.25, required: float = 10.0, **vessel: Any) -> Fleet:
    """Give one vessel with one cylinder and one location.

    Read on 2016-01-01 and on 2024-01-01, so that both rates are `rate`. The structural minimum sets `required`: by
    pressure, 1 MPa on an outside radius of 514 mm, 5.12 mm would do.
    """
    fleet = Fleet()
    fleet.vessel(**({"inspected": LAST} | vessel))
    add_steady(fleet, 0, "shell", wall, rate, structural_minimum_mm=required)
    return fleet


def add_steady(fleet: Fleet, vessel: int, name: str, wall: float, rate: float, **part: Any) -> int:
    """Add a part with one location L1, read on 2016-01-01 and 2024-01-01; give the index of the part."""
    here = fleet.part(vessel, name, **part)
    fleet.read(fleet.location(here), (FIRST, wall + 8 * rate), (LAST, wall))
    return here


def outside_hoop(pressure: float, wall: float | None = None) -> float:
    """Give the hoop wall at a pressure for an outside radius of 514 mm and S = 100 MPa, E = 1.

    With `wall`, give the pressure that wall carries instead: P = S·E·t / (Ro - 0.4·t), so t = P·Ro / (S·E + 0.4·P).
    """
    if wall is not None:
        return 100.0 * wall / (514.0 - 0.4 * wall)
    return pressure * 514.0 / (100.0 + 0.4 * pressure)
