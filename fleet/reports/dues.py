"""The order in which vessels fall due."""

from __future__ import annotations

from collections.abc import Iterable
from datetime import date

from fleet.appraisal.views import VesselView
from fleet.words import RETIRED

DUE_ORDER = "Overdue first, then by the earlier of the two dates; what has neither date stands last."
"""In which order vessels stand on the list of what is due [text]."""


def overdue_kinds(view: VesselView) -> list[str]:
    """Say which inspections of a vessel were due before the as-of date.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    list of str
        Of `internal` and `external`.
    """
    dates = {"internal": view.internal_due_on, "external": view.external_due_on}
    return [kind for kind, day in dates.items() if day is not None and day < view.as_of]


def next_due_on(view: VesselView) -> date | None:
    """Give the nearest due date of a vessel.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    date or None
    """
    return min((day for day in (view.internal_due_on, view.external_due_on) if day), default=None)


def in_due_order(views: Iterable[VesselView], until: date | None = None) -> list[VesselView]:
    """Put vessels in the order in which they fall due; retired ones are left out.

    Parameters
    ----------
    views : iterable of VesselView
        The vessels [-].
    until : date, optional
        Leave out what falls due after this day; what is overdue or has no date always stays [date].

    Returns
    -------
    list of VesselView
        Overdue first, then by the nearest date; without a date last.
    """
    kept = [
        view
        for view in views
        if view.block != RETIRED
        and (overdue_kinds(view) or not (until and (day := next_due_on(view)) and day > until))
    ]
    return sorted(kept, key=lambda view: (not overdue_kinds(view), next_due_on(view) or date.max))
