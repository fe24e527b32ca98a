"""Write out one vessel of an appraisal as a `VesselView`."""

from __future__ import annotations

from datetime import date
from typing import TYPE_CHECKING

import numpy as np

from fleet import words
from fleet.appraisal.due import DUE
from fleet.appraisal.inputs import Floats
from fleet.appraisal.judge import HELD, SHORT
from fleet.appraisal.required import NOT_PRESSURE, SETS
from fleet.appraisal.views import LocationView, PartView, Place, ReliefView, VesselView, WaysOut
from fleet.rules import load_rule_set, rule_status
from fleet.thinning.clock import DAYS_PER_YEAR
from fleet.thinning.planning import BASES
from fleet.words import STANDINGS, Notice

if TYPE_CHECKING:
    from fleet.appraisal.appraise import Appraisal


def _number(values: Floats, row: int) -> float | None:
    value = float(values[row])
    return None if np.isnan(value) else value


def _date(values: Floats, row: int) -> date | None:
    value = float(values[row])
    return None if np.isnan(value) else date.fromordinal(int(value))


def _least(values: list[float | None]) -> float | None:
    known = [value for value in values if value is not None]
    return min(known) if known else None


def place(appraisal: Appraisal, row: int) -> Place | None:
    """Name a location by its row.

    Parameters
    ----------
    appraisal : Appraisal
        The appraisal [-].
    row : int
        Index of the location, or -1 [-].

    Returns
    -------
    Place or None
    """
    if row < 0:
        return None
    inputs = appraisal.inputs
    part = int(inputs.locations.part[row])
    return Place(str(inputs.parts.part[part]), str(inputs.locations.location[row]))


def location_view(appraisal: Appraisal, row: int, doubts: tuple[Notice, ...]) -> LocationView:
    """Write out one location.

    Parameters
    ----------
    appraisal : Appraisal
        The appraisal [-].
    row : int
        Index of the location [-].
    doubts : tuple of Notice
        What is doubtful about it [-].

    Returns
    -------
    LocationView
    """
    inputs, found, judged, need = (
        appraisal.inputs,
        appraisal.bench.found,
        appraisal.judged,
        appraisal.bench.need,
    )
    now, plan = found.now, found.plan
    trusted = bool(appraisal.bench.trusted[row])
    needed = _number(need.required_mm, row)
    used = _number(now.wall_used_mm, row)
    over_least = None
    if trusted and used is not None and needed is not None and now.least_measurable[row] > 0:
        over_least = max(used - needed, 0.0) / float(now.least_measurable[row])
    deduct = float(found.deduct_mm[row])
    last = _number(now.last_mm, row)
    return LocationView(
        location=str(inputs.locations.location[row]),
        observations=int(now.observations[row]),
        last_on=_date(now.last_day, row),
        last_thickness_mm=None if last is None else last + deduct,
        wall_used_mm=None if used is None else used + deduct,
        long_term_rate_mm_per_year=_number(now.long_rate, row),
        short_term_rate_mm_per_year=_number(now.short_rate, row),
        planning_rate_mm_per_year=_number(plan.rate, row),
        rate_basis=BASES[int(plan.basis[row])] if used is not None else "none",
        least_measurable_rate_mm_per_year=_number(now.least_measurable, row),
        required_thickness_mm=needed,
        remaining_life_years=_number(judged.life_years, row),
        life_at_least_measurable_rate_years=over_least,
        retirement_on=_date(judged.retirement_day, row),
        half_life_interval_years=_number(judged.interval_years, row),
        projected_thickness_mm=_number(judged.projected_mm, row) if trusted else None,
        mawp_today_mpa=_number(judged.mawp_today_mpa, row),
        projected_mawp_mpa=_number(judged.projected_mpa, row),
        doubts=doubts,
        position=str(inputs.locations.position[row]),
        standing=words.NO_VERDICT if used is None else STANDINGS[int(judged.standing[row])],
        required_by=SETS[int(need.by[row])] if need.by[row] >= 0 else None,
        span_years=_number(now.long_years, row),
        short_span_years=_number(now.short_years, row),
        fitted_rate_mm_per_year=_number(now.fitted_rate, row),
        fitted_rate_error_mm_per_year=_number(now.fitted_error, row),
        reading_error_mm=_number(found.wall_error_mm, row),
        wall_in_strength_mm=used if trusted else None,
        projected_mawp_uncapped_mpa=_number(judged.uncapped_mpa, row),
    )


def part_view(appraisal: Appraisal, part: int, doubts: dict[int, list[Notice]]) -> PartView:
    """Write out one part.

    Parameters
    ----------
    appraisal : Appraisal
        The appraisal [-].
    part : int
        Index of the part [-].
    doubts : dict
        Doubts by location [-].

    Returns
    -------
    PartView
    """
    inputs, need = appraisal.inputs, appraisal.bench.need
    rows = appraisal.children[1][part]
    views = tuple(location_view(appraisal, row, tuple(doubts.get(row, ()))) for row in rows)
    own = len(inputs.locations) + part
    governs = max(rows, key=lambda row: float(np.nan_to_num(need.known_mm[row], nan=-1.0))) if rows else own
    complete = all(bool(need.complete[row]) for row in rows) if rows else bool(need.complete[own])
    names = tuple(
        getattr(rated, f"{way}_formula")
        for rated in (need.rated, need.rated_pressure)
        for way in ("hoop", "axial", "end")
    )
    formulas = sorted({str(array[row]) for array in names for row in [*rows, own] if array[row]})
    return PartView(
        part=str(inputs.parts.part[part]),
        shape=str(inputs.parts.shape[part]),
        required_thickness_mm=_number(need.required_mm, governs) if complete else None,
        required_by=SETS[int(need.by[governs])] if complete and need.by[governs] >= 0 else None,
        mawp_today_mpa=_least([view.mawp_today_mpa for view in views]),
        projected_mawp_mpa=_least([view.projected_mawp_mpa for view in views]),
        projected_mawp_uncapped_mpa=_least([view.projected_mawp_uncapped_mpa for view in views]),
        locations=views,
        measured=bool(appraisal.part_measured[part]),
        formulas=tuple(formulas),
        static_head_mpa=_number(inputs.parts.static_head_mpa, part),
        material=str(inputs.parts.material[part]),
        allowable_stress_mpa=_number(inputs.parts.allowable_stress_mpa, part),
        nominal_thickness_mm=_number(inputs.parts.nominal_thickness_mm, part),
    )


def view_of(appraisal: Appraisal, i: int) -> VesselView:
    """Write out one vessel.

    Parameters
    ----------
    appraisal : Appraisal
        The appraisal [-].
    i : int
        Index of the vessel [-].

    Returns
    -------
    VesselView
    """
    inputs, judged, bench = appraisal.inputs, appraisal.judged, appraisal.bench
    vessels, due, carry = inputs.vessels, judged.due, judged.carry
    notes = appraisal.book.of_vessel(i)
    by_location: dict[int, list[Notice]] = {}
    for row, _quiet, entry in notes:
        if row >= 0 and entry.kind == "doubt":
            by_location.setdefault(row, []).append(entry)
    parts = tuple(part_view(appraisal, part, by_location) for part in appraisal.children[0][i])
    standing = STANDINGS[int(judged.vessel_standing[i])]
    retirement = (
        _date(judged.retirement_day, int(judged.retirement_place[i]))
        if judged.retirement_place[i] >= 0
        else None
    )
    today = _least([part.mawp_today_mpa for part in parts])
    operating = _number(vessels.operating_pressure_mpa, i)
    holds = _least_day(appraisal, judged.holds_day, i)
    in_doubt = [
        row
        for part in appraisal.children[0][i]
        for row in appraisal.children[1][part]
        if bench.found.in_doubt[row]
    ]
    governing = int(due.governing[i])
    life = float(judged.life_years[governing]) if governing >= 0 else float("nan")
    plateau = life < load_rule_set(str(vessels.rules[i]))["short_life_below_years"]
    carry_day = float(carry.day[i])
    soon = carry_day < carry.list_end_day
    re_gauge = bool(appraisal.re_gauge[i])
    deciding = [row for row in in_doubt if judged.standing[row] != HELD] or in_doubt
    return VesselView(
        vessel=str(vessels.tag[i]),
        as_of=appraisal.as_of,
        carry_to_on=_date(carry.day, i),
        carry_to_basis=str(carry.basis[i]),
        rules=str(vessels.rules[i]),
        design_code=str(vessels.design_code[i]),
        current_mawp_mpa=_number(appraisal.pressures.current_mpa, i),
        nameplate_mawp_mpa=_number(appraisal.pressures.nameplate_mpa, i),
        mawp_today_mpa=today,
        projected_mawp_mpa=_least([part.projected_mawp_mpa for part in parts]),
        projected_mawp_uncapped_mpa=_least([part.projected_mawp_uncapped_mpa for part in parts]),
        governing_pressure=place(appraisal, int(judged.pressure_place[i])),
        governing_life=place(appraisal, int(judged.retirement_place[i])),
        governing_due=None if judged.due_uncertain[i] else place(appraisal, governing),
        retirement_on=retirement,
        life_left_years=None
        if retirement is None
        else max((retirement - appraisal.as_of).days, 0) / DAYS_PER_YEAR,
        internal_due_on=_due(appraisal, due.internal_day, i),
        external_due_on=_due(appraisal, due.external_day, i),
        internal_interval_years=None if judged.due_uncertain[i] else _number(due.interval_years, i),
        rating_holds_until=holds,
        standing=standing,
        flags=_flags(appraisal, i, soon, re_gauge),
        parts_measured=sum(part.measured for part in parts),
        parts_total=len(parts),
        relief=_relief(appraisal, i, today),
        doubts=tuple(entry for _, quiet, entry in notes if entry.kind == "doubt" and not quiet),
        gaps=tuple(entry for _, _, entry in notes if entry.kind == "gap"),
        journal_head=appraisal.journal_head,
        parts=parts,
        block=_block(str(vessels.state[i]), re_gauge, standing),
        service=str(vessels.service[i]),
        site=str(vessels.site[i]),
        unit=str(vessels.unit[i]),
        assembly=str(vessels.assembly[i]),
        state=str(vessels.state[i]) or "in service",
        code_edition=str(vessels.code_edition[i]),
        operating_pressure_mpa=operating,
        operating_above_today=operating is not None and today is not None and operating > today,
        operating_until=_date(appraisal.operating_day, i),
        projected_mawp_at_list_end_mpa=_least_of(appraisal, judged.list_end_mpa, i) if soon else None,
        list_end_on=appraisal.list_end_on,
        held_by_half_life=carry.basis[i] == DUE
        and governing >= 0
        and not plateau
        and standing in {words.RATING_HELD, words.RUNNING_OUT},
        clause_interval_years=_number(due.interval_years, i) if plateau else None,
        half_life_on_plateau_years=life / 2 if plateau else None,
        ways_out=None
        if judged.vessel_standing[i] == HELD or str(vessels.state[i]) == words.RETIRED
        else _ways_out(appraisal, i, parts, holds, retirement),
        re_gauge=tuple(found for row in deciding if (found := place(appraisal, row)) is not None)
        if re_gauge
        else (),
        re_gauge_by=_re_gauge_by(appraisal, holds, i) if re_gauge else None,
        last_internal_on=None if bench.seen.no_internal[i] else _date(bench.seen.internal_day, i),
        last_external_on=None if bench.seen.no_external[i] else _date(bench.seen.external_day, i),
        written={
            name: text
            for name in ("nameplate_mawp", "current_mawp", "operating_pressure")
            if (text := str(getattr(vessels, f"{name}_written")[i]))
        },
        rules_status=rule_status(str(vessels.rules[i])),
    )


def _due(appraisal: Appraisal, days: Floats, i: int) -> date | None:
    """Give a due date; None where something is missing that could only bring it forward, unless it is past already."""
    ahead = days[i] >= appraisal.bench.as_of_day
    return None if ahead and appraisal.judged.due_uncertain[i] else _date(days, i)


def _rows(appraisal: Appraisal, i: int) -> list[int]:
    return [row for part in appraisal.children[0][i] for row in appraisal.children[1][part]]


def _least_of(appraisal: Appraisal, values: Floats, i: int) -> float | None:
    return _least([_number(values, row) for row in _rows(appraisal, i)])


def _least_day(appraisal: Appraisal, values: Floats, i: int) -> date | None:
    day = _least_of(appraisal, values, i)
    return None if day is None else date.fromordinal(int(day))


def _flags(appraisal: Appraisal, i: int, soon: bool, re_gauge: bool) -> tuple[str, ...]:
    due, as_of = appraisal.judged.due, appraisal.bench.as_of_day
    state = str(appraisal.inputs.vessels.state[i])
    gone = state == words.RETIRED
    late = bool(due.internal_day[i] < as_of or due.external_day[i] < as_of)
    said = {
        words.OVERDUE: late and not gone,
        words.SURVEY_WITHIN_YEAR: soon and not gone,
        words.RE_GAUGE: re_gauge,
        words.IDLE: state in {"idle", "idle protected"},
        words.OUT_OF_SERVICE: state == words.OUT_OF_SERVICE,
    }
    return tuple(flag for flag in words.FLAGS if said[flag])


def _block(state: str, re_gauge: bool, standing: str) -> str:
    if state == words.RETIRED:
        return words.RETIRED
    if state == words.OUT_OF_SERVICE:
        return words.OUT_OF_SERVICE
    if state in {"idle", "idle protected"}:
        return words.IDLE
    return words.RE_GAUGE if re_gauge else standing


def _relief(appraisal: Appraisal, i: int, today: float | None) -> tuple[ReliefView, ...]:
    table = appraisal.inputs.relief
    rows = np.flatnonzero(table.vessel == i).tolist()
    lowest = min(rows, key=lambda row: float(table.set_pressure_mpa[row])) if rows else -1
    return tuple(
        ReliefView(
            device=str(table.device[row]),
            set_pressure_mpa=float(table.set_pressure_mpa[row]),
            now=words.RELIEF_ABOVE_NOW
            if row == lowest and today is not None and float(table.set_pressure_mpa[row]) > today * (1 + 1e-9)
            else None,
            reset_by_on=_date(appraisal.relief_day, row),
            written=str(table.written[row]),
        )
        for row in rows
    )


def _ways_out(
    appraisal: Appraisal, i: int, parts: tuple[PartView, ...], holds: date | None, retirement: date | None
) -> WaysOut:
    need, judged = appraisal.bench.need, appraisal.judged
    rows = _rows(appraisal, i)
    by_minimum = any(
        judged.projected_mm[row] < need.not_pressure_mm[row]
        or (judged.standing[row] <= SHORT and SETS[int(need.by[row])] in NOT_PRESSURE)
        for row in rows
    )
    walls = appraisal.bench.found.now.wall_used_mm
    unknown = bool(appraisal.bench.withheld[i]) or any(
        np.isnan(judged.projected_mpa[row]) and walls[row] > 0 for row in rows
    )
    reaches = _least([part.projected_mawp_mpa for part in parts])
    return WaysOut(holds, None if by_minimum or unknown or not reaches else reaches, retirement)


def _re_gauge_by(appraisal: Appraisal, holds: date | None, i: int) -> date | None:
    """Give the earlier of the day to which the rating holds and the carry-to date; the as-of date where past."""
    carry = _date(appraisal.judged.carry.day, i)
    days = [day for day in (holds, carry) if day is not None]
    return max(min(days), appraisal.as_of) if days else None
