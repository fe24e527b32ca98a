"""Rule 12, relief devices and the operating pressure against the wall.

One cylinder, 12 mm on 2024-01-01, 0.25 mm/year, outside radius 514 mm, S = 100 MPa: on 2026-01-01, 731 days later, the
wall is 11.4997 mm and carries 2.2575 MPa. A pressure P needs P·514 / (100 + 0.4·P) mm.
"""

from __future__ import annotations

import math
from datetime import date
from typing import Any

from handsums import LAST, add_steady, days_after, outside_hoop
from invented import Fleet

from fleet.appraisal.views import VesselView

ABOVE = "set above what the wall carries today"
TODAY = outside_hoop(0.0, 12.0 - 0.25 * 731 / 365.25)


def vessel(*settings: float, **changes: Any) -> VesselView:
    fleet = Fleet()
    row: dict[str, Any] = {"inspected": LAST, "nameplate_mawp_mpa": 9.0, "current_mawp_mpa": 1.0}
    fleet.vessel(**(row | changes))
    add_steady(fleet, 0, "shell", 12.0, 0.25)
    for number, setting in enumerate(settings, start=1):
        fleet.relieve(0, setting, f"PSV-{number}")
    return fleet.view()


def falls_to(pressure: float) -> date:
    """Give the day on which twice the loss has taken the wall down to what the pressure needs."""
    years = (12.0 - outside_hoop(pressure)) / 0.5
    return days_after(LAST, math.floor(years * 365.25))


def test_rule_12_1_now_a_device_set_above_what_the_wall_carries_today() -> None:
    assert abs(TODAY - 2.2575) < 1e-4
    assert vessel(TODAY * 1.001).relief[0].now == ABOVE
    assert vessel(TODAY * 0.999).relief[0].now is None
    assert vessel(TODAY).relief[0].now is None


def test_rule_12_1_two_devices_the_lowest_set_decides() -> None:
    both = vessel(2.5, 2.4).relief
    assert [(device.device, device.now) for device in both] == [("PSV-1", None), ("PSV-2", ABOVE)]
    # the second is set in steps above the first, and the first opens in time
    assert [device.now for device in vessel(2.0, 2.4).relief] == [None, None]


def test_rule_12_1_against_the_capped_figure() -> None:
    assert vessel(1.2, nameplate_mawp_mpa=1.0).relief[0].now == ABOVE


def test_rule_12_1_without_a_wall_nothing_is_said() -> None:
    fleet = Fleet()
    fleet.vessel()
    fleet.location(fleet.part())
    fleet.relieve(0, 1.0)
    device = fleet.view().relief[0]
    assert (device.now, device.reset_by_on) == (None, None)


def test_rule_12_1_a_device_of_another_vessel_is_not_looked_at() -> None:
    fleet = Fleet()
    for number, tag in enumerate(("V-1", "V-2")):
        fleet.vessel(tag, inspected=LAST)
        add_steady(fleet, number, "shell", 12.0, 0.25)
    fleet.relieve(1, 5.0)
    assert fleet.view(vessel=0).relief == ()
    assert fleet.view(vessel=1).relief[0].now == ABOVE


def test_rule_12_2_later_the_date_on_which_the_projected_mawp_falls_to_the_setting() -> None:
    # 1.5·514 / 100.6 = 7.664 mm: (12 - 7.664) / 0.5 = 8.672 years
    devices = vessel(1.5, 1.0).relief
    assert [device.reset_by_on for device in devices] == [falls_to(1.5), falls_to(1.0)]
    assert falls_to(1.5) == days_after(LAST, 3167)


def test_rule_12_2_the_earliest_location_decides() -> None:
    fleet = Fleet()
    fleet.vessel(inspected=LAST, nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0)
    add_steady(fleet, 0, "shell", 12.0, 0.25)
    add_steady(fleet, 0, "head", 20.0, 0.25)
    fleet.relieve(0, 1.5)
    assert fleet.view().relief[0].reset_by_on == falls_to(1.5)


def test_rule_12_2_static_head_is_added_below() -> None:
    fleet = Fleet()
    fleet.vessel(inspected=LAST, nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0)
    add_steady(fleet, 0, "shell", 12.0, 0.25, static_head_mpa=0.1)
    fleet.relieve(0, 1.4)
    assert fleet.view().relief[0].reset_by_on == falls_to(1.5)


def test_rule_12_2_a_setting_the_vessel_may_never_carry_is_due_at_once() -> None:
    assert vessel(9.5).relief[0].reset_by_on == date(2026, 1, 1)


def other_shape() -> Fleet:
    """Give a shell with room to spare and a box whose given thickness of 10 mm lasts to 2028-01-01 at twice the loss.

    At its given thickness the box carries the current 1.0 MPa and no more; below it, nothing is known of it.
    """
    fleet = Fleet()
    fleet.vessel(inspected=LAST, nameplate_mawp_mpa=9.0, current_mawp_mpa=1.0)
    add_steady(fleet, 0, "shell", 12.0, 0.025)
    add_steady(fleet, 0, "box", 12.0, 0.25, shape="other", required_thickness_given_mm=10.0)
    return fleet


def test_rule_12_2_a_setting_above_what_a_given_thickness_carries_is_due_at_once() -> None:
    fleet = other_shape()
    fleet.relieve(0, 1.2)
    view = fleet.view()
    assert view.mawp_today_mpa == 1.0
    assert view.relief[0].now == ABOVE
    assert view.relief[0].reset_by_on == date(2026, 1, 1)


def test_rule_12_2_a_setting_is_known_to_be_carried_only_while_the_given_thickness_lasts() -> None:
    fleet = other_shape()
    fleet.relieve(0, 0.9)
    assert fleet.view().relief[0].reset_by_on == date(2028, 1, 1)


def test_rule_12_3_operating_pressure_likewise() -> None:
    view = vessel(operating_pressure_mpa=1.5)
    assert (view.operating_above_today, view.operating_until) == (False, falls_to(1.5))
    assert vessel(operating_pressure_mpa=2.3).operating_above_today
    blank = vessel(operating_pressure_mpa=None)
    assert (blank.operating_above_today, blank.operating_until) == (False, None)


def test_rule_12_4_no_relief_device_is_a_gap() -> None:
    assert "no relief device" in [gap.code for gap in vessel().gaps]
    assert "no relief device" not in [gap.code for gap in vessel(1.0).gaps]
