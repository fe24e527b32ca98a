"""An invented appraisal of a dozen vessels: every standing, flag, block and way out that a report must print."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field, replace
from datetime import date
from typing import Any

import numpy as np
import pytest
from numpy.typing import NDArray

from fleet import words
from fleet.appraisal.views import LocationView, PartView, Place, ReliefView, VesselView, WaysOut
from fleet.words import notice

AS_OF = date(2026, 12, 1)


@dataclass(frozen=True)
class InventedTimetable:
    years: tuple[date, ...]
    mawp_mpa: NDArray[np.float64]
    current_mawp_mpa: NDArray[np.float64]


@dataclass(frozen=True)
class InventedAppraisal:
    made: tuple[VesselView, ...]
    as_of: date = AS_OF
    journal_head: str = "4f1c" * 16
    journal_no: int = 181
    list_end_on: date = date(2027, 12, 1)
    claimed: int | None = None
    drops: dict[str, float] = field(default_factory=dict)

    @property
    def count(self) -> int:
        return len(self.made) if self.claimed is None else self.claimed

    def views(self) -> tuple[VesselView, ...]:
        return self.made

    def timetable(self, years: int = 10) -> InventedTimetable:
        days = tuple(
            date(self.as_of.year + number, self.as_of.month, self.as_of.day)
            if (self.as_of.month, self.as_of.day) != (2, 29) or (self.as_of.year + number) % 4 == 0
            else date(self.as_of.year + number, 2, 28)
            for number in range(1, years + 1)
        )
        current = np.array([view.current_mawp_mpa or np.nan for view in self.made])
        drops = np.array([self.drops.get(view.vessel, np.nan) for view in self.made])
        today = np.array([view.mawp_today_mpa or np.nan for view in self.made])
        walls = today[:, None] + 0.2 - drops[:, None] * np.arange(years)[None, :]
        return InventedTimetable(days, np.clip(walls, 0, current[:, None]), current)


def location(name: str = "L-01", **changes: Any) -> LocationView:
    plain = LocationView(
        location=name,
        observations=5,
        last_on=date(2025, 6, 10),
        last_thickness_mm=11.239,
        wall_used_mm=11.239,
        long_term_rate_mm_per_year=0.1201,
        short_term_rate_mm_per_year=0.1502,
        planning_rate_mm_per_year=0.1502,
        rate_basis="short-term",
        least_measurable_rate_mm_per_year=0.0911,
        required_thickness_mm=10.121,
        remaining_life_years=7.44,
        life_at_least_measurable_rate_years=12.27,
        retirement_on=date(2032, 11, 18),
        half_life_interval_years=3.72,
        projected_thickness_mm=10.349,
        mawp_today_mpa=1.5999,
        projected_mawp_mpa=1.5999,
        doubts=(),
        position="12 o'clock, near the manway",
        standing=words.RATING_HELD,
        required_by="hoop",
        span_years=14.52,
        short_span_years=3.01,
        fitted_rate_mm_per_year=0.1255,
        fitted_rate_error_mm_per_year=0.0123,
        reading_error_mm=0.25,
        wall_in_strength_mm=11.239,
        projected_mawp_uncapped_mpa=1.6544,
    )
    return replace(plain, **changes)


def part(name: str = "shell course 1", *places: LocationView, **changes: Any) -> PartView:
    plain = PartView(
        part=name,
        shape="cylinder",
        required_thickness_mm=10.121,
        required_by="hoop",
        mawp_today_mpa=1.5999,
        projected_mawp_mpa=1.5999,
        projected_mawp_uncapped_mpa=1.6544,
        locations=places or (location("L-01"), location("L-02", last_thickness_mm=11.801)),
        measured=True,
        formulas=(),
        static_head_mpa=0.012,
        material="SA-516 70",
        allowable_stress_mpa=138.0,
        nominal_thickness_mm=12.7,
    )
    return replace(plain, **changes)


def vessel(tag: str = "D-101", **changes: Any) -> VesselView:
    shell = Place("shell course 1", "L-01")
    plain = VesselView(
        vessel=tag,
        as_of=AS_OF,
        carry_to_on=date(2028, 6, 1),
        carry_to_basis="next survey",
        rules="api510",
        design_code="asme8-1",
        current_mawp_mpa=1.6,
        nameplate_mawp_mpa=1.6,
        mawp_today_mpa=1.6,
        projected_mawp_mpa=1.6,
        projected_mawp_uncapped_mpa=1.6544,
        governing_pressure=shell,
        governing_life=shell,
        governing_due=None,
        retirement_on=date(2045, 3, 2),
        life_left_years=18.25,
        internal_due_on=date(2030, 4, 1),
        external_due_on=date(2028, 4, 1),
        internal_interval_years=10.0,
        rating_holds_until=date(2035, 2, 2),
        standing=words.RATING_HELD,
        flags=(),
        parts_measured=2,
        parts_total=2,
        relief=(ReliefView(f"PSV-{tag}", 1.6, None, None),),
        doubts=(),
        gaps=(),
        journal_head="4f1c" * 16,
        parts=(part(), part("top head", shape="ellipsoidal head", required_by="end")),
        block=words.RATING_HELD,
        service="ammonia knock-out drum",
        site="Brackwater",
        unit="ammonia",
        assembly="",
        state="in service",
        code_edition="1998",
        operating_pressure_mpa=1.35,
        operating_above_today=False,
        operating_until=None,
        projected_mawp_at_list_end_mpa=None,
        list_end_on=date(2027, 12, 1),
        held_by_half_life=False,
        clause_interval_years=None,
        half_life_on_plateau_years=None,
        ways_out=None,
        re_gauge=(),
        re_gauge_by=None,
        last_internal_on=date(2020, 4, 1),
        last_external_on=date(2023, 4, 1),
        sentence="the wall carries the current MAWP to the carry-to date.",
    )
    view = replace(plain, **changes)
    return replace(view, block=changes.get("block", view.standing))


def works() -> InventedAppraisal:
    """Give one vessel per standing, flag and block, and a few more that hold."""
    head = Place("bottom head", "L-09")
    made = (
        vessel("C-201", service="absorber"),
        vessel(
            "D-101",
            standing=words.BELOW_REQUIRED,
            mawp_today_mpa=1.5123,
            projected_mawp_mpa=1.2,
            projected_mawp_uncapped_mpa=1.2,
            life_left_years=0.0,
            retirement_on=date(2025, 6, 10),
            relief=(ReliefView("PSV-101A", 1.6, words.RELIEF_ABOVE_NOW, None),),
            operating_pressure_mpa=1.55,
            operating_above_today=True,
            ways_out=WaysOut(None, 1.2, date(2025, 6, 10)),
            sentence="the wall at shell course 1 / L-01 is 9.80 mm and 10.13 mm are required.",
        ),
        vessel(
            "D-102",
            standing=words.AT_REQUIRED,
            life_left_years=1.24,
            retirement_on=date(2028, 2, 28),
            ways_out=WaysOut(date(2027, 7, 1), None, date(2028, 2, 28)),
            sentence="the wall is 0.20 mm above required, less than the readings can tell.",
        ),
        vessel("D-103", standing=words.USED_UP, life_left_years=0.0, retirement_on=date(2026, 8, 1)),
        vessel(
            "E-310",
            service="ammonia condenser, shell side",
            standing=words.RATING_SHORT,
            projected_mawp_mpa=1.4233,
            projected_mawp_uncapped_mpa=1.4233,
            carry_to_on=date(2028, 6, 1),
            governing_pressure=head,
            parts=(
                part(),
                part("bottom head", location("L-09"), shape="torispherical head", required_by="end"),
            ),
            relief=(ReliefView("PSV-310", 1.6, None, date(2027, 9, 14)),),
            operating_until=date(2029, 1, 1),
            flags=(words.OVERDUE,),
            internal_due_on=date(2026, 9, 1),
            ways_out=WaysOut(date(2027, 9, 14), 1.4233, date(2031, 5, 5)),
            doubts=(notice("apparent gain", "E-310, shell course 1, L-01", "0.60 mm more than in 2021"),),
            sentence="on 2028-06-01 the bottom head carries 1.423 MPa and the current MAWP is 1.600 MPa.",
        ),
        vessel(
            "F-007",
            standing=words.NO_VERDICT,
            mawp_today_mpa=None,
            projected_mawp_mpa=None,
            projected_mawp_uncapped_mpa=None,
            governing_pressure=None,
            governing_life=None,
            retirement_on=None,
            life_left_years=None,
            rating_holds_until=None,
            parts_measured=1,
            parts_total=2,
            parts=(
                part(),
                part(
                    "top head",
                    shape="hemispherical head",
                    locations=(),
                    measured=False,
                    required_thickness_mm=None,
                    required_by=None,
                    mawp_today_mpa=None,
                    projected_mawp_mpa=None,
                ),
            ),
            gaps=(
                notice("part never measured", "F-007, top head", "no thickness on record"),
                notice("no relief device", "F-007", "none linked"),
            ),
            relief=(),
            sentence="the top head was never measured.",
        ),
        vessel(
            "G-012",
            standing=words.RUNNING_OUT,
            life_left_years=6.13,
            retirement_on=date(2033, 1, 18),
            carry_to_on=date(2027, 4, 1),
            flags=(words.SURVEY_WITHIN_YEAR,),
            projected_mawp_at_list_end_mpa=1.58,
            held_by_half_life=True,
            clause_interval_years=3.1,
            half_life_on_plateau_years=1.55,
        ),
        vessel(
            "H-044",
            block=words.RE_GAUGE,
            standing=words.RATING_SHORT,
            flags=(words.RE_GAUGE,),
            re_gauge=(Place("shell course 1", "L-02"),),
            re_gauge_by=date(2027, 6, 1),
        ),
        vessel("K-5", block=words.IDLE, flags=(words.IDLE,), state="idle protected"),
        vessel("V-801", service="air receiver"),
        vessel("V-802", service="air receiver", current_mawp_mpa=1.4, projected_mawp_mpa=1.4),
        vessel(
            "X-900",
            block=words.RETIRED,
            parts=(),
            relief=(),
            internal_due_on=None,
            external_due_on=None,
            state="retired",
        ),
    )
    drops = {"D-101": 0.3, "D-102": 0.11, "D-103": 0.21, "E-310": 0.15, "G-012": 0.05, "H-044": 0.07}
    drops |= {"C-201": 0.01, "K-5": 0.03, "V-801": 0.01, "V-802": 0.02}
    return InventedAppraisal(made, drops=drops)


@pytest.fixture
def make_vessel() -> Callable[..., VesselView]:
    return vessel


@pytest.fixture
def make_part() -> Callable[..., PartView]:
    return part


@pytest.fixture
def make_location() -> Callable[..., LocationView]:
    return location


@pytest.fixture
def make_appraisal() -> Callable[..., InventedAppraisal]:
    return InventedAppraisal


@pytest.fixture(scope="session")
def appraisal() -> InventedAppraisal:
    return works()
