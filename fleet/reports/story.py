"""The year's story: sentences made from the figures, and the sum that reconciles list and register."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date

from fleet import words
from fleet.appraisal.views import VesselView
from fleet.reports.figures import Figures
from fleet.reports.reason import telling_place
from fleet.reports.sentences import BELOW, Sentence, device_words, relief_sentences
from fleet.reports.source import AppraisalLike, reconciled

NAMED = 6
"""How many tags a sentence names before it counts the rest."""


def story(appraisal: AppraisalLike, figures: Figures) -> tuple[Sentence, ...]:
    """Tell the year in sentences, worst news first, and end with the sum.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    figures : Figures
        How figures are printed [-].

    Returns
    -------
    tuple of Sentence
        Only what happened is told; a block without a vessel is named as empty at the end.

    Raises
    ------
    OurFault
        If the blocks do not add up to the register.
    """
    sorted_in = reconciled(appraisal)
    views = [view for members in sorted_in.values() for view in members]
    serving = [view for view in views if view.block != words.RETIRED]
    told = [
        Sentence(_opening(appraisal, serving)),
        *(Sentence(text) for text in _walls(sorted_in)),
        *_relief_above(serving, figures),
        *(Sentence(text) for text in _ratings(sorted_in, figures)),
        *(Sentence(text) for text in _later(appraisal, sorted_in, serving, figures)),
        *(Sentence(text) for text in _aside(sorted_in)),
        Sentence(_open_points(views)),
        Sentence(the_sum(sorted_in)),
    ]
    empty = [block for block, members in sorted_in.items() if not members]
    if empty:
        told.append(Sentence(f"No vessel stands in the block{_s(empty)} {_listed(empty, most=len(empty))}."))
    return tuple(told)


def the_sum(sorted_in: dict[str, list[VesselView]]) -> str:
    """Write the sum by which the blocks add up to the register.

    Parameters
    ----------
    sorted_in : dict of str to list of VesselView
        The blocks of `source.blocks` [-].

    Returns
    -------
    str

    Examples
    --------
    >>> the_sum({"rating held": [], "retired": []})
    'The register holds no vessel.'
    """
    total = sum(len(members) for members in sorted_in.values())
    if not total:
        return "The register holds no vessel."
    terms = " + ".join(f"{len(members)} {block}" for block, members in sorted_in.items() if members)
    return f"The register holds {_count(total)}: {terms} = {total}."


def _opening(appraisal: AppraisalLike, serving: Sequence[VesselView]) -> str:
    held = [view for view in serving if view.standing in {words.RATING_HELD, words.RUNNING_OUT}]
    carried = "carries" if len(held) == 1 else "carry"
    return (
        f"On {appraisal.as_of.isoformat()} the register holds {_count(appraisal.count)}. "
        f"Of the {len(serving)} not retired, {len(held)} {carried} the current MAWP to the day on which each "
        "is next looked at."
    )


def _walls(sorted_in: dict[str, list[VesselView]]) -> list[str]:
    told = []
    for block, tail in (
        (words.BELOW_REQUIRED, "the least measured wall is below the required thickness"),
        (
            words.AT_REQUIRED,
            "the wall is above the required thickness by less than the reading error can tell",
        ),
        (
            words.USED_UP,
            "the wall was measured above the required thickness and by its rate has fallen below it since",
        ),
    ):
        members = sorted_in[block]
        if members:
            told.append(f"{_count(len(members))} {_stands(members)} {block}: {tail} at {_places(members)}.")
    return told


def _relief_above(serving: Sequence[VesselView], figures: Figures) -> list[Sentence]:
    return [
        Sentence(f"On {view.vessel}, {sentence.text}", relief_above_today=True)
        for view in serving
        for sentence in relief_sentences(view, figures)
        if sentence.relief_above_today
    ]


def _ratings(sorted_in: dict[str, list[VesselView]], figures: Figures) -> list[str]:
    told = []
    members = sorted_in[words.RATING_SHORT]
    if members:
        each = [_shortfall(view, figures) for view in members[:NAMED]]
        more = f"; and {len(members) - NAMED} more" if len(members) > NAMED else ""
        fall = "falls" if len(members) == 1 else "fall"
        told.append(
            f"{_count(len(members))} {fall} short of the rating by the carry-to date: {'; '.join(each)}{more}."
        )
    unknown = sorted_in[words.NO_VERDICT]
    if unknown:
        get = "gets" if len(unknown) == 1 else "get"
        told.append(
            f"{_count(len(unknown))} {get} no verdict, because something needed for one was never measured "
            f"or recorded: {_tags(unknown)}."
        )
    return told


def _shortfall(view: VesselView, figures: Figures) -> str:
    now, then, day = view.current_mawp_mpa, view.projected_mawp_mpa, view.carry_to_on
    if day is None:
        return view.vessel
    if now is None or then is None or not then < now:
        return f"{view.vessel}, whose wall is below the required thickness on {day.isoformat()}"
    carried = figures.with_unit(figures.carries(then), "pressure")
    return f"{view.vessel} from {figures.carries(now)} to {carried} by {day.isoformat()}"


def _later(
    appraisal: AppraisalLike,
    sorted_in: dict[str, list[VesselView]],
    serving: Sequence[VesselView],
    figures: Figures,
) -> list[str]:
    told = []
    running = [view for view in sorted_in[words.RUNNING_OUT] if view.retirement_on]
    if running:
        first = min(running, key=lambda view: (view.retirement_on is None, view.retirement_on))
        hold = "holds its rating and is" if len(running) == 1 else "hold their rating and are"
        told.append(
            f"{_count(len(running))} {hold} running out; the first to be retired is {first.vessel}, "
            f"on {first.retirement_on}, at {first.governing_life}: {_tags(running)}."
        )
    soon = [
        (device.reset_by_on, f"{device_words(device, figures)} on {_reset(view, device.reset_by_on)}")
        for view in serving
        for device in view.relief
        if device.reset_by_on and not device.now and device.reset_by_on <= appraisal.list_end_on
    ]
    if soon:
        first_few = [text for _, text in sorted(soon)[:NAMED]]
        more = f"; and {len(soon) - NAMED} more" if len(soon) > NAMED else ""
        are = "is" if len(soon) == 1 else "are"
        told.append(
            f"{len(soon)} relief device{_s(soon)} {are} to be reset before {appraisal.list_end_on.isoformat()}, "
            f"the end of this list: {'; '.join(first_few)}{more}."
        )
    overdue = [view for view in serving if words.OVERDUE in view.flags]
    if overdue:
        told.append(
            f"{_count(len(overdue))} {'is' if len(overdue) == 1 else 'are'} overdue: {_tags(overdue)}."
        )
    return told


def _reset(view: VesselView, day: date) -> str:
    """Say by when a device is to be reset, and that this speaks of pressure alone where the wall is short already."""
    said = f"{view.vessel} by {day.isoformat()}"
    return (
        f"{said}, by pressure alone, for its wall is below what is required"
        if view.standing in BELOW
        else said
    )


def _aside(sorted_in: dict[str, list[VesselView]]) -> list[str]:
    told = []
    again = sorted_in[words.RE_GAUGE]
    if again:
        stand = "stands or falls" if len(again) == 1 else "stand or fall"
        told.append(
            f"{_count(len(again))} {stand} by a short-term rate that the reading error may explain "
            f"and must be gauged again: {_tags(again)}."
        )
    for block in (words.IDLE, words.OUT_OF_SERVICE, words.RETIRED):
        members = sorted_in[block]
        if members:
            told.append(
                f"{_count(len(members))} {'is' if len(members) == 1 else 'are'} {block}: {_tags(members)}."
            )
    return told


def _open_points(views: Sequence[VesselView]) -> str:
    doubts, gaps = sum(len(view.doubts) for view in views), sum(len(view.gaps) for view in views)
    return (
        f"{doubts} doubt{_s(doubts)} and {gaps} gap{_s(gaps)} stand open; none of them improves a figure. "
        "Each is listed with what to do about it."
    )


def _places(members: Sequence[VesselView]) -> str:
    places = [(view.vessel, telling_place(view)) for view in members]
    return _listed([tag if place is None else f"{tag} ({place})" for tag, place in places])


def _tags(members: Sequence[VesselView]) -> str:
    return _listed([view.vessel for view in members])


def _listed(names: Sequence[str], most: int = NAMED) -> str:
    if len(names) > most:
        return f"{', '.join(names[:most])} and {len(names) - most} more"
    return names[0] if len(names) == 1 else f"{', '.join(names[:-1])} and {names[-1]}"


def _count(number: int) -> str:
    return f"{number} vessel{_s(number)}"


def _stands(members: Sequence[VesselView]) -> str:
    return "stands" if len(members) == 1 else "stand"


def _s(counted: int | Sequence[object]) -> str:
    number = counted if isinstance(counted, int) else len(counted)
    return "" if number == 1 else "s"
