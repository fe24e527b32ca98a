"""Documents for ``--json``: the words of the contract, inside units, no figure rounded."""

from __future__ import annotations

import json
from collections.abc import Iterable, Sequence
from datetime import date
from typing import Any

from fleet.appraisal.views import VesselView
from fleet.reports.dues import in_due_order, overdue_kinds
from fleet.reports.source import AppraisalLike, reconciled
from fleet.words import Notice


def appraise(appraisal: AppraisalLike, views: Sequence[VesselView] | None = None) -> dict[str, Any]:
    """Give the document of ``appraise``.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    views : sequence of VesselView, optional
        The vessels asked for; all of them if none are named [-].

    Returns
    -------
    dict
    """
    return {
        "as_of": appraisal.as_of.isoformat(),
        "journal_head": appraisal.journal_head,
        "vessels": [view.as_json(parts=False) for view in (appraisal.views() if views is None else views)],
    }


def due(appraisal: AppraisalLike, until: date | None = None) -> list[dict[str, Any]]:
    """Give the list of ``due``: overdue first, then by the nearest date; without a date last.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    until : date, optional
        Leave out what falls due after this day [date].

    Returns
    -------
    list of dict
        Retired vessels are left out: nobody inspects them.
    """
    return [
        {
            "vessel": view.vessel,
            "internal_due_on": _iso(view.internal_due_on),
            "external_due_on": _iso(view.external_due_on),
            "internal_interval_years": view.internal_interval_years,
            "governing_due": None if view.governing_due is None else view.governing_due.as_json(),
            "overdue": overdue_kinds(view),
            "standing": view.standing,
            "flags": list(view.flags),
            "last_internal_on": _iso(view.last_internal_on),
            "last_external_on": _iso(view.last_external_on),
        }
        for view in in_due_order(appraisal.views(), until)
    ]


def gaps(appraisal: AppraisalLike, waiting: Iterable[Notice] = ()) -> list[dict[str, Any]]:
    """Give the list of ``gaps``.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    waiting : iterable of Notice
        Gaps that belong to no vessel, such as parked rows; their vessel is null [-].

    Returns
    -------
    list of dict
    """
    of_vessels = [
        {**notice.as_dict(), "vessel": view.vessel} for view in appraisal.views() for notice in view.gaps
    ]
    return [*of_vessels, *({**notice.as_dict(), "vessel": None} for notice in waiting)]


def derating(appraisal: AppraisalLike) -> list[dict[str, Any]]:
    """Give the list of ``derating``, in the order of the list, each vessel with its block.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].

    Returns
    -------
    list of dict

    Raises
    ------
    OurFault
        If the blocks do not add up to the register.
    """
    return [
        {**view.as_json(parts=False), "block": view.block}
        for members in reconciled(appraisal).values()
        for view in members
    ]


def dumps(document: object) -> str:
    """Write one JSON document; NaN is refused, not written.

    Parameters
    ----------
    document : object
        The document [-].

    Returns
    -------
    str

    Raises
    ------
    ValueError
        If a figure is NaN or infinite.

    Examples
    --------
    >>> print(dumps({"projected_mawp_mpa": None}))
    {
      "projected_mawp_mpa": null
    }
    """
    return json.dumps(document, ensure_ascii=False, allow_nan=False, indent=2)


def _iso(day: date | None) -> str | None:
    return None if day is None else day.isoformat()
