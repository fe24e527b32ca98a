"""For which parts the figures of a vessel speak: a figure of known parts is never told as one of the whole."""

from __future__ import annotations

from fleet import words
from fleet.appraisal.views import VesselView

DENYING = frozenset(
    (
        "vacuum not assessed",
        "part without location",
        "part never measured",
        "no echo at last visit",
        "part not read at last visit",
        "missing datum",
        "no formula",
        "outside formula limits",
        "no given thickness",
        "other part below given thickness",
        "lining not told",
        "lining thickness blank",
        "no rate",
        "no part",
    )
)
"""Codes of gaps that can deny a verdict [text]."""

NOT_ASSESSED = "without what was not assessed"
"""How figures are headed where every part was measured and a verdict is still denied [text]."""

KNOWN_ONLY = "pressures, life and dates of what is known only"
"""What stands beside the heading of the block without verdict [text]."""


def measured_words(view: VesselView) -> str:
    """Say how many parts the figures rest on.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    str
        Headed ``measured parts only`` where some part was never measured, ``known parts only`` where a measured one
        lacks what its figures need.
    """
    count = f"{view.parts_known} of {view.parts_total}"
    if view.parts_known >= view.parts_total:
        return count
    return f"{'known' if view.parts_known < view.parts_measured else 'measured'} parts only: {count}"


def speaks_for(view: VesselView) -> str:
    """Say for what the figures of a vessel speak, where that is less than the whole vessel.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    str
        A heading for the figures; empty where they speak for the whole vessel.
    """
    if view.parts_known < view.parts_total:
        return measured_words(view)
    return NOT_ASSESSED if _denied(view) else ""


def known_only(view: VesselView) -> str:
    """Say the same as `speaks_for` in words that lead a sentence, and end before its colon.

    Parameters
    ----------
    view : VesselView
        The vessel [-].

    Returns
    -------
    str
        Empty where the figures speak for the whole vessel.
    """
    if view.parts_known < view.parts_total:
        return f"known parts only, {view.parts_known} of {view.parts_total}"
    return NOT_ASSESSED if _denied(view) else ""


def capital(text: str) -> str:
    """Begin a sentence of our own words with a capital letter; never used on a tag.

    Parameters
    ----------
    text : str
        The sentence [text].

    Returns
    -------
    str

    Examples
    --------
    >>> capital("known parts only")
    'Known parts only'
    """
    return text[:1].upper() + text[1:]


def _denied(view: VesselView) -> bool:
    """Tell whether something denies a verdict, whatever worse standing the known parts may have."""
    return view.standing == words.NO_VERDICT or any(gap.code in DENYING for gap in view.gaps)
