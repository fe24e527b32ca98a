"""Sheet `Timetable`: the pressure that each wall carries, year by year, a stair where it falls short."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from fleet import words
from fleet.appraisal.views import VesselView
from fleet.reports.figures import Figures
from fleet.reports.source import AppraisalLike, TimetableLike
from fleet.reports.workbook import ink
from fleet.reports.workbook.page import Column, Page, Stamp

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

TOLERANCE = 1e-6
"""Relative tolerance within which a pressure still holds, as for the standing [-]."""
MONTHS = ("January", "February", "March", "April", "May", "June", "July", "August", "September", "October",
          "November", "December")  # fmt: skip
"""Names of the months, whatever language the machine speaks [text]."""
LEAD = 3
"""Columns before the first year [count]."""


@dataclass(frozen=True)
class Row:
    """One vessel of the timetable.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    carried_mpa : ndarray
        What its wall carries on each date [MPa].
    first_short : int or None
        Number of the first date on which the current MAWP does not hold, or as many as there are dates if it
        always does; None where nobody can say [count].
    by_wall : bool
        Whether the wall falls below a minimum before the pressure it carries falls short [-].
    """

    view: VesselView
    carried_mpa: NDArray[np.float64]
    first_short: int | None
    by_wall: bool = False

    def says(self, years: Sequence[date]) -> str:
        """Say the first year short in words.

        Parameters
        ----------
        years : sequence of date
            The dates of the timetable [date].

        Returns
        -------
        str
        """
        if self.view.block == words.RETIRED:
            return words.RETIRED
        if self.first_short is None:
            return words.NO_VERDICT if self.view.standing == words.NO_VERDICT else "no figure"
        if self.first_short == len(years):
            return "holds"
        return f"{year_heads(years)[self.first_short]}{', by its wall' if self.by_wall else ''}"


def rows(views: Sequence[VesselView], table: TimetableLike) -> list[Row]:
    """Put the vessels in the order in which each first drops below its current MAWP.

    Parameters
    ----------
    views : sequence of VesselView
        The vessels, in the order of the register [-].
    table : TimetableLike
        What they carry [-].

    Returns
    -------
    list of Row
        Those that drop in the same year by how far they have dropped; those of which nobody can say after them,
        and retired ones, of which nobody asks, last.
    """
    years = tuple(table.years)
    made = []
    for number, view in enumerate(views):
        carried = np.asarray(table.mawp_mpa[number], dtype=np.float64)
        current = float(table.current_mawp_mpa[number])
        made.append((_row(view, carried, current, years), current))

    def order(pair: tuple[Row, float]) -> tuple[int, int, float]:
        row, current = pair
        if row.first_short is None:
            return 2 if row.view.block == words.RETIRED else 1, 0, 0.0
        at = min(row.first_short, len(row.carried_mpa) - 1)
        return 0, row.first_short, float(row.carried_mpa[at]) / current

    return [row for row, _ in sorted(made, key=order)]


def _row(view: VesselView, carried: NDArray[np.float64], current: float, years: Sequence[date]) -> Row:
    """Find the first date that falls short by its pressure or by its wall; what is not known is not held."""
    by_pressure = _first_short(carried, current)
    if by_pressure is None or view.standing == words.NO_VERDICT or view.block == words.RETIRED:
        return Row(view, carried, None)
    until = view.rating_holds_until
    by_wall = next((k for k, day in enumerate(years) if until is not None and day > until), len(years))
    if view.standing == words.BELOW_REQUIRED:
        by_wall = 0
    return Row(view, carried, min(by_pressure, by_wall), by_wall < by_pressure)


def _first_short(carried: NDArray[np.float64], current: float) -> int | None:
    """Find the first date that falls short; a figure missing before it leaves that unknown."""
    if not current > 0:
        return None
    for number, pressure in enumerate(carried):
        if np.isnan(pressure):
            return None
        if not pressure >= current * (1 - TOLERANCE):
            return number
    return len(carried)


def draw(book: Workbook, appraisal: AppraisalLike, figures: Figures, stamp: Stamp) -> None:
    """Draw the sheet.

    Parameters
    ----------
    book : Workbook
        The workbook [-].
    appraisal : AppraisalLike
        The appraisal [-].
    figures : Figures
        How figures are printed [-].
    stamp : Stamp
        What stands on every printed page [-].
    """
    table = appraisal.timetable()
    years = tuple(table.years)
    made = rows(appraisal.views(), table)
    page = Page(book, "Timetable", stamp)
    unit = figures.unit("pressure")
    page.title(
        "Timetable",
        f"What each wall carries {_on(years)} [{unit}], capped as on the list.",
        "Left of and below the heavy stair the current MAWP holds; right of and above it, it does not.",
        "By its wall: a minimum that is no matter of pressure is reached first. No verdict: measured parts only. "
        "Retired vessels stand last, outside the stair.",
    )
    page.heads(
        [
            Column("Vessel", 16),
            Column("First year short", 18),
            Column(f"Current MAWP [{unit}]", number=True, least=8),
            *(Column(f"{head} [{unit}]", number=True, least=8) for head in year_heads(years)),
        ]
    )
    first = page.row
    for row in made:
        carried = [figures.carries(float(pressure)) for pressure in row.carried_mpa]
        current = figures.carries(row.view.current_mawp_mpa)
        page.line([row.view.vessel, row.says(years), current, *carried], standing=row.view.standing)
    page.finish()
    _draw_stair(page, first, made, len(years))
    _say_it(page, made, years)


def year_heads(years: Sequence[date]) -> list[str]:
    """Head the columns by their year, or by the whole day where the year does not tell it.

    Parameters
    ----------
    years : sequence of date
        The dates of the timetable [date].

    Returns
    -------
    list of str

    Examples
    --------
    >>> year_heads([date(2026, 12, 1), date(2027, 12, 1)])
    ['2026', '2027']
    >>> year_heads([date(2027, 2, 28), date(2028, 2, 29)])
    ['2027-02-28', '2028-02-29']
    """
    return [str(day.year) if _same_day(years) else day.isoformat() for day in years]


def _same_day(years: Sequence[date]) -> bool:
    """Tell whether the dates are the same day of different years."""
    days = {(day.month, day.day) for day in years}
    return len(days) <= 1 and len({day.year for day in years}) == len(years)


def _on(years: Sequence[date]) -> str:
    """Say on which days the columns stand."""
    if not years or not _same_day(years):
        return "on the day that heads each column"
    return f"on {years[0].day} {MONTHS[years[0].month - 1]} of each year"


def _draw_stair(page: Page, first: int, made: Sequence[Row], count: int) -> None:
    above: int | None = None
    for number, row in enumerate(made):
        here = row.first_short
        if here is None:
            break
        for year in range(count + 1):
            left = year == here
            top = above is not None and above <= year < here
            if left or top:
                cell = page.sheet.cell(first + number, page.FIRST + LEAD + year)
                cell.border = ink.stair(left=left, top=top, inside=year < count)
        above = here


def _say_it(page: Page, made: Sequence[Row], years: Sequence[date]) -> None:
    """Say beneath the stair, in words, what it shows."""
    page.row += 1
    page.put(page.row, page.FIRST, "The same in words", "block")
    page.row += 1
    for number, day in enumerate(years):
        short = [row.view.vessel for row in made if row.first_short == number]
        _said(page, f"First short on {day.isoformat()}", short, len(years))
    _said(
        page, f"Hold to {years[-1].isoformat()}" if years else "Hold", _holding(made, len(years)), len(years)
    )
    unsaid = [row.view for row in made if row.first_short is None]
    for head, retired in (("No figure or no verdict", False), ("Retired", True)):
        tags = [view.vessel for view in unsaid if (view.block == words.RETIRED) == retired]
        _said(page, head, tags, len(years))
    page.put(page.row, page.FIRST, f"{len(made)} vessels in all. {words.CAUTION}", "note")


def _holding(made: Sequence[Row], count: int) -> list[str]:
    return [row.view.vessel for row in made if row.first_short == count]


def _said(page: Page, head: str, tags: Sequence[str], years: int) -> None:
    text = f"{head}: {', '.join(tags) if tags else 'none'}"
    page.sentence(text, "line", columns=LEAD + years, letters=20 + 8 * years, height=12)
