"""The appraisal: arrays of register and record in, an `Appraisal` out."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from functools import cached_property

import numpy as np

from fleet.appraisal.due import looked, rule_values
from fleet.appraisal.findings import write_findings
from fleet.appraisal.groups import any_by, least_by
from fleet.appraisal.inputs import Bools, Floats, Inputs, Ints
from fleet.appraisal.judge import HELD, Bench, Judged, judge, wall_on, withheld
from fleet.appraisal.measured import thinned
from fleet.appraisal.notes import NoteBook
from fleet.appraisal.relief import falls_to
from fleet.appraisal.required import Pressures, needs, vessel_pressures
from fleet.appraisal.viewing import view_of
from fleet.appraisal.views import VesselView
from fleet.thinning.clock import ServiceClock


@dataclass(frozen=True)
class Timetable:
    """The MAWP of every vessel, year by year.

    Parameters
    ----------
    years : tuple of date
        The days for which it stands [date].
    mawp_mpa : ndarray
        Projected MAWP, capped, NaN where it cannot be had; shape (vessels, years) [MPa].
    current_mawp_mpa : ndarray
        Current MAWP; shape (vessels,) [MPa].
    """

    years: tuple[date, ...]
    mawp_mpa: Floats
    current_mawp_mpa: Floats


@dataclass(frozen=True)
class Appraisal:
    """One dated evaluation of the fleet.

    Parameters
    ----------
    as_of : date
        The as-of date [date].
    inputs : Inputs
        What it was made from [-].
    bench : Bench
        What was judged [-].
    judged : Judged
        The judgement [-].
    pressures : Pressures
        Nameplate, current MAWP, cap [MPa].
    book : NoteBook
        Doubts and gaps [-].
    part_measured : ndarray
        Parts with a wall on record; shape (parts,) [-].
    re_gauge : ndarray
        Vessels in the state of re-gauge; shape (vessels,) [-].
    relief_day, operating_day : ndarray
        Day on which the projected MAWP falls to each relief setting [day], and to each vessel's operating pressure
        [day].
    """

    as_of: date
    inputs: Inputs
    bench: Bench
    judged: Judged
    pressures: Pressures
    book: NoteBook
    part_measured: Bools
    re_gauge: Bools
    relief_day: Floats
    operating_day: Floats

    @property
    def count(self) -> int:
        """Number of vessels."""
        return len(self.inputs.vessels)

    @property
    def journal_head(self) -> str:
        """Head of the journal at which the record was read."""
        return self.inputs.journal_head

    @property
    def journal_no(self) -> int:
        """Number of the journal entry up to which the record was read."""
        return self.inputs.journal_no

    @property
    def list_end_on(self) -> date:
        """Day on which the life of the list ends."""
        return date.fromordinal(int(self.judged.carry.list_end_day))

    @cached_property
    def children(self) -> tuple[list[list[int]], list[list[int]]]:
        """Rows of the parts of every vessel, and of the locations of every part, those in use."""
        inputs, found = self.inputs, self.bench.found
        return (
            _rows_by(inputs.parts.vessel, found.live_part, self.count),
            _rows_by(inputs.locations.part, found.live, len(inputs.parts)),
        )

    def vessel(self, i: int) -> VesselView:
        """Give the one view of a vessel.

        Parameters
        ----------
        i : int
            Index of the vessel [-].

        Returns
        -------
        VesselView
        """
        return view_of(self, i)

    def views(self) -> tuple[VesselView, ...]:
        """Give the view of every vessel, in the order of the register.

        Returns
        -------
        tuple of VesselView
        """
        return self._views

    @cached_property
    def _views(self) -> tuple[VesselView, ...]:
        return tuple(self.vessel(i) for i in range(self.count))

    def timetable(self, years: int = 10) -> Timetable:
        """Give the MAWP of every vessel for the coming years.

        Parameters
        ----------
        years : int
            How many years [count].

        Returns
        -------
        Timetable
            For the anniversaries of the as-of date, with the loss factor of the rule set.
        """
        bench = self.bench
        dates = tuple(_anniversary(self.as_of, k) for k in range(1, years + 1))
        locations = len(self.inputs.locations)
        factor = rule_values(self.inputs, "loss_factor")[bench.vessel_of]
        columns = []
        for day in dates:
            wall = wall_on(bench, bench.found.plan.rate, np.full(locations, float(day.toordinal())), factor)
            capped, _ = bench.need.carries(bench.rows(wall))
            shown = np.where(bench.trusted, capped[:locations], np.nan)
            columns.append(least_by(shown, bench.vessel_of, self.count))
        return Timetable(dates, np.column_stack(columns), self.pressures.current_mpa)


def _anniversary(day: date, years: int) -> date:
    """Give the same day some years later; 28 February for a leap day where there is none."""
    try:
        return day.replace(year=day.year + years)
    except ValueError:
        return day.replace(year=day.year + years, day=28)


def _rows_by(group: Ints, use: Bools, groups: int) -> list[list[int]]:
    rows = np.flatnonzero(use)
    order = rows[np.argsort(group[rows], kind="stable")]
    edges = np.searchsorted(group[order], np.arange(groups + 1), side="left")
    return [order[edges[g] : edges[g + 1]].tolist() for g in range(groups)]


def appraise(inputs: Inputs, *, as_of: date, carry_to: date | None = None) -> Appraisal:
    """Appraise every vessel.

    Parameters
    ----------
    inputs : Inputs
        Register and record, in force on the as-of date [-].
    as_of : date
        The as-of date: only what is true by then counts [date].
    carry_to : date, optional
        A carry-to date that replaces the rule for every vessel [date].

    Returns
    -------
    Appraisal
    """
    as_of_day = float(as_of.toordinal())
    vessels = inputs.vessels
    idle = inputs.idle_times
    clock = ServiceClock.of(idle.vessel, idle.from_day, idle.to_day, as_of_day)
    found = thinned(inputs, clock, as_of_day)
    pressures = vessel_pressures(inputs)
    without, measured, vacuum, partless = withheld(inputs, found)
    bench = Bench(
        inputs=inputs,
        found=found,
        need=needs(inputs, pressures),
        seen=looked(inputs, as_of_day),
        clock=clock,
        withheld=without,
        as_of_day=as_of_day,
        asked_day=None if carry_to is None else float(carry_to.toordinal()),
    )
    judged = judge(bench, found.plan)
    by_long = judge(bench, found.plan_long) if found.in_doubt.any() else judged
    doubtful = any_by(found.in_doubt, bench.vessel_of, len(vessels))
    re_gauge = doubtful & (judged.vessel_standing != HELD) & (by_long.vessel_standing == HELD)
    book = NoteBook(inputs)
    write_findings(book, bench, judged, measured, vacuum, partless)
    every = np.arange(len(vessels), dtype=np.int64)
    rate = found.plan.rate
    return Appraisal(
        as_of=as_of,
        inputs=inputs,
        bench=bench,
        judged=judged,
        pressures=pressures,
        book=book,
        part_measured=measured,
        re_gauge=re_gauge,
        relief_day=falls_to(bench, rate, inputs.relief.vessel, inputs.relief.set_pressure_mpa),
        operating_day=falls_to(bench, rate, every, vessels.operating_pressure_mpa),
    )
