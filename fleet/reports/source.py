"""What a report is drawn from, and the order and sum in which every list stands."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from typing import Protocol

import numpy as np
from numpy.typing import NDArray

from fleet import words
from fleet.appraisal.views import LocationView, PartView, Place, VesselView
from fleet.errors import OurFault


class TimetableLike(Protocol):
    """The pressures that each vessel carries on ten dates."""

    @property
    def years(self) -> Sequence[date]:
        """The dates, first to last."""

    @property
    def mawp_mpa(self) -> NDArray[np.float64]:
        """One row per vessel, one column per date; NaN where none can be had."""

    @property
    def current_mawp_mpa(self) -> NDArray[np.float64]:
        """The current MAWP of each vessel."""


class AppraisalLike(Protocol):
    """The part of an appraisal that reports read."""

    @property
    def as_of(self) -> date:
        """The day about which the appraisal speaks."""

    @property
    def journal_head(self) -> str:
        """The head of the journal it rests on."""

    @property
    def journal_no(self) -> int:
        """The number of that journal entry."""

    @property
    def count(self) -> int:
        """Vessels on the register."""

    @property
    def list_end_on(self) -> date:
        """The last day of the life of the list."""

    def views(self) -> tuple[VesselView, ...]:
        """Give every vessel, in the order of the register.

        Returns
        -------
        tuple of VesselView
        """

    def timetable(self, years: int = 10) -> TimetableLike:
        """Give the pressures carried over the coming years.

        Parameters
        ----------
        years : int
            How many years [count].

        Returns
        -------
        TimetableLike
        """


class RuleValueLike(Protocol):
    """One value of a rule set, with what it rests on."""

    @property
    def value(self) -> float:
        """The value in its unit."""

    @property
    def unit(self) -> str:
        """Its unit."""

    @property
    def meaning(self) -> str:
        """What it says."""

    @property
    def clause(self) -> str:
        """Where it stands."""

    @property
    def status(self) -> str:
        """How well it is known."""


class Snapshot:
    """An appraisal whose views are made once, for a report that goes through them many times.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    """

    def __init__(self, appraisal: AppraisalLike) -> None:
        self.as_of = appraisal.as_of
        self.journal_head = appraisal.journal_head
        self.journal_no = appraisal.journal_no
        self.count = appraisal.count
        self.list_end_on = appraisal.list_end_on
        self._views = appraisal.views()
        self._appraisal = appraisal

    def views(self) -> tuple[VesselView, ...]:
        """Give every vessel, in the order of the register.

        Returns
        -------
        tuple of VesselView
        """
        return self._views

    def timetable(self, years: int = 10) -> TimetableLike:
        """Give the pressures carried over the coming years.

        Parameters
        ----------
        years : int
            How many years [count].

        Returns
        -------
        TimetableLike
        """
        return self._appraisal.timetable(years)


@dataclass(frozen=True)
class Grounds:
    """What stands behind a list beyond its vessels: printed on the last sheet.

    Parameters
    ----------
    settings : sequence of (str, str)
        Each setting in force with its value as printed [text].
    rules : mapping of str to sequence of RuleValueLike
        The values of each rule set in use, under its title and edition [-].
    program_version : str
        Version of the program [text].

    Examples
    --------
    >>> Grounds(settings=[("reading error", "0.25 mm")], program_version="0.1.0").settings
    [('reading error', '0.25 mm')]
    """

    settings: Sequence[tuple[str, str]] = ()
    rules: Mapping[str, Sequence[RuleValueLike]] | None = None
    program_version: str = ""


def heaviness(standing: str) -> int:
    """Give the strokes of the rule at the left of a line.

    Parameters
    ----------
    standing : str
        A standing of the catalogue [text].

    Returns
    -------
    int
        0 for `rating held` to 4 for the worst [count].

    Raises
    ------
    OurFault
        If there is no such standing.

    Examples
    --------
    >>> [heaviness(standing) for standing in words.STANDINGS]
    [4, 3, 3, 2, 2, 1, 0]
    """
    strokes = dict(zip(words.STANDINGS, (4, 3, 3, 2, 2, 1, 0), strict=True))
    if standing not in strokes:
        raise OurFault("report", f"standing {standing!r} is not in the catalogue", "report it")
    return strokes[standing]


def blocks(views: Iterable[VesselView]) -> dict[str, list[VesselView]]:
    """Sort vessels into the blocks of the list; every block is there, every vessel in exactly one.

    Parameters
    ----------
    views : iterable of VesselView
        The vessels [-].

    Returns
    -------
    dict of str to list of VesselView
        Blocks in the order of print; within a block the worst standing first, then the vessel whose rating
        holds the shortest (unknown counts as shortest), then the order given.

    Raises
    ------
    OurFault
        If a vessel names a block that does not exist, or a tag comes twice.
    """
    sorted_in: dict[str, list[VesselView]] = {block: [] for block in words.BLOCKS}
    seen: set[str] = set()
    for view in views:
        if view.block not in sorted_in:
            raise OurFault(
                f"vessel {view.vessel}", f"block {view.block!r} is not in the catalogue", "report it"
            )
        if view.vessel in seen:
            raise OurFault(f"vessel {view.vessel}", "the vessel comes twice in the appraisal", "report it")
        seen.add(view.vessel)
        sorted_in[view.block].append(view)
    for members in sorted_in.values():
        members.sort(key=_worst_first)
    return sorted_in


def in_list_order(views: Iterable[VesselView]) -> list[VesselView]:
    """Give vessels in the order of the list.

    Parameters
    ----------
    views : iterable of VesselView
        The vessels [-].

    Returns
    -------
    list of VesselView
    """
    return [view for members in blocks(views).values() for view in members]


def reconciled(appraisal: AppraisalLike) -> dict[str, list[VesselView]]:
    """Sort a whole appraisal into blocks and check that they add up to the register.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].

    Returns
    -------
    dict of str to list of VesselView

    Raises
    ------
    OurFault
        If the blocks do not add up to the register.
    """
    made = blocks(appraisal.views())
    total = sum(len(members) for members in made.values())
    if total != appraisal.count:
        what = f"the blocks hold {total} vessels and the register {appraisal.count}"
        raise OurFault("list", what, "report it; do not use the list")
    return made


def located(view: VesselView, place: Place | None) -> tuple[PartView | None, LocationView | None]:
    """Find the part and the location of a place that governs.

    Parameters
    ----------
    view : VesselView
        The vessel [-].
    place : Place or None
        The place [-].

    Returns
    -------
    tuple of PartView or None, LocationView or None
    """
    if place is None:
        return None, None
    part = next((part for part in view.parts if part.part == place.part), None)
    if part is None:
        return None, None
    return part, next((each for each in part.locations if each.location == place.location), None)


def _worst_first(view: VesselView) -> tuple[int, date]:
    return words.STANDINGS.index(view.standing), view.rating_holds_until or date.min
