"""The lists as plain text: the fleet by blocks, what is due, the gaps, the year's story."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from datetime import date

from fleet import units, words
from fleet.appraisal.views import VesselView
from fleet.reports.dues import DUE_ORDER, in_due_order, overdue_kinds
from fleet.reports.figures import NONE, Figures
from fleet.reports.known import KNOWN_ONLY, speaks_for
from fleet.reports.source import AppraisalLike, blocks
from fleet.reports.story import story, the_sum
from fleet.reports.text.layout import Head, paragraph, strokes, table, title
from fleet.reports.text.parts import notice_lines
from fleet.words import Notice


def appraise(
    appraisal: AppraisalLike, display: units.Display = units.SI, views: Sequence[VesselView] | None = None
) -> str:
    """Write the fleet, block by block.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    display : units.Display
        Units and decimals of the reader [-].
    views : sequence of VesselView, optional
        The vessels asked for; all of them if none are named [-].

    Returns
    -------
    str
        Lines of 100 columns, ending in a line break.
    """
    asked = appraisal.views() if views is None else views
    lines = [
        *title("The fleet, appraised", f"as of {appraisal.as_of.isoformat()}"),
        *paragraph(words.CAUTION),
        "",
        *_blocks(asked, Figures(display)),
    ]
    if views is None:
        lines += paragraph(the_sum(blocks(asked)))
    return _page([*lines, f"Journal head {appraisal.journal_head}"])


def the_list(appraisal: AppraisalLike, display: units.Display = units.SI) -> str:
    """Write the blocks of the list alone, without title and caution.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    display : units.Display
        Units and decimals of the reader [-].

    Returns
    -------
    str
    """
    return _page(_blocks(appraisal.views(), Figures(display)))


def the_story(appraisal: AppraisalLike, display: units.Display = units.SI) -> str:
    """Write the year's story.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    display : units.Display
        Units and decimals of the reader [-].

    Returns
    -------
    str
        The caution, then a paragraph per sentence, ending with the sum.
    """
    lines = [
        *title("The year", f"as of {appraisal.as_of.isoformat()}"),
        *paragraph(words.CAUTION),
    ]
    for sentence in story(appraisal, Figures(display)):
        lines += ["", *paragraph(sentence.text)]
    return _page(lines)


def derating(appraisal: AppraisalLike, written_to: str, display: units.Display = units.SI) -> str:
    """Write the summary that stands on the screen once the workbook is written.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    written_to : str
        Where the workbook was written [text].
    display : units.Display
        Units and decimals of the reader [-].

    Returns
    -------
    str
    """
    return (
        the_story(appraisal, display)
        + f"\nWritten to {written_to}\nJournal head {appraisal.journal_head} (entry {appraisal.journal_no})\n"
    )


def due(appraisal: AppraisalLike, until: date | None = None, display: units.Display = units.SI) -> str:
    """Write what is to be inspected when: overdue first, then by the earlier of the two dates.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    until : date, optional
        Leave out what falls due after this day [date].
    display : units.Display
        Units and decimals of the reader [-].

    Returns
    -------
    str
    """
    views, figures = appraisal.views(), Figures(display)
    listed = in_due_order(views, until)
    retired = sum(view.block == words.RETIRED for view in views)
    left_out = len(views) - len(listed) - retired
    heads = [
        Head("vessel"),
        Head("overdue", wraps=True),
        Head("internal or\non-stream due"),
        Head("external\ndue"),
        Head("governed by", wraps=True),
        Head(f"carries then\n[{figures.unit('pressure')}]", right=True),
        Head("standing", wraps=True),
        Head("flags", wraps=True),
    ]
    rows = [
        [
            view.vessel,
            ", ".join(overdue_kinds(view)),
            _day(view.internal_due_on),
            _day(view.external_due_on),
            _governed_by(view),
            str(figures.carries(view.projected_mawp_mpa)),
            view.standing,
            ", ".join(view.flags),
        ]
        for view in listed
    ]
    lines = [*title("What is due", f"as of {appraisal.as_of.isoformat()}"), *paragraph(words.CAUTION), ""]
    lines += [*paragraph(DUE_ORDER), ""]
    lines += table(heads, rows, marks=[view.standing for view in listed]) if rows else ["     none"]
    lines += ["", *paragraph(_due_sum(len(views), listed, left_out, retired, until))]
    return _page([*lines, f"Journal head {appraisal.journal_head}"])


def gaps(appraisal: AppraisalLike, waiting: Iterable[Notice] = (), display: units.Display = units.SI) -> str:
    """Write what was never measured or recorded, vessel by vessel.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    waiting : iterable of Notice
        Gaps that belong to no vessel, such as parked rows [-].
    display : units.Display
        Units and decimals of the reader [-].

    Returns
    -------
    str
    """
    parked, figures = list(waiting), Figures(display)
    views = appraisal.views()
    lines = [
        *title("What was never measured or recorded", f"as of {appraisal.as_of.isoformat()}"),
        *paragraph(words.CAUTION),
        "",
    ]
    for view in views:
        if view.gaps:
            lines += [
                f"{strokes(view.standing)} {view.vessel}   {view.standing}",
                *notice_lines(view.gaps, figures),
                "",
            ]
    if parked:
        lines += ["     Waiting rows", *notice_lines(parked, figures), ""]
    total = sum(len(view.gaps) for view in views)
    with_gaps = sum(bool(view.gaps) for view in views)
    said = f"{total} gaps on {with_gaps} of {len(views)} vessels"
    lines += paragraph(f"{said}, {len(parked)} rows waiting." if parked else f"{said}.")
    return _page([*lines, f"Journal head {appraisal.journal_head}"])


def _blocks(views: Iterable[VesselView], figures: Figures) -> list[str]:
    lines: list[str] = []
    sorted_in = blocks(views)
    every_row = [_row(view, figures) for members in sorted_in.values() for view in members]
    for block, members in sorted_in.items():
        aside = f"   {KNOWN_ONLY}" if members and block == words.NO_VERDICT else ""
        lines.append(f"{block}: {len(members) or 'none'}{aside}")
        if members:
            rows = [_row(view, figures) for view in members]
            marks = [view.standing for view in members]
            lines += [*table(_heads(figures), rows, marks=marks, gap=1, like=every_row), ""]
    return lines if lines[-1:] == [""] else [*lines, ""]


def _heads(figures: Figures) -> list[Head]:
    pressure = figures.unit("pressure")
    return [
        Head("vessel"),
        Head("standing", wraps=True),
        Head(f"current\n[{pressure}]", right=True),
        Head(f"today\n[{pressure}]", right=True),
        Head(f"then\n[{pressure}]", right=True),
        Head("carried to"),
        Head("governed by", wraps=True),
        Head("life\nleft", right=True),
        Head("retires on"),
        Head("flags", wraps=True),
    ]


def _row(view: VesselView, figures: Figures) -> list[str]:
    return [
        view.vessel,
        view.standing,
        str(figures.carries(view.current_mawp_mpa)),
        str(figures.carries(view.mawp_today_mpa)),
        str(figures.carries(view.projected_mawp_mpa)),
        _day(view.carry_to_on),
        "" if view.governing_pressure is None else str(view.governing_pressure),
        str(figures.years(view.life_left_years)),
        _day(view.retirement_on),
        ", ".join((*view.flags, *_partly(view))),
    ]


def _partly(view: VesselView) -> list[str]:
    """Say beside the flags for what the figures of the row speak, where that is not the whole vessel."""
    said = speaks_for(view)
    return [said] if said else []


def _governed_by(view: VesselView) -> str:
    if view.governing_due is not None:
        return str(view.governing_due)
    return NONE if view.internal_due_on is None else "cap of the rule set"


def _due_sum(
    total: int, listed: Sequence[VesselView], left_out: int, retired: int, until: date | None
) -> str:
    late = sum(bool(overdue_kinds(view)) for view in listed)
    said = f"The register holds {total} vessels: {late} overdue + {len(listed) - late} not overdue"
    said += f" + {left_out} due after {until.isoformat()}" if until and left_out else ""
    said += f" + {retired} retired" if retired else ""
    return f"{said} = {total}."


def _day(day: date | None) -> str:
    return NONE if day is None else day.isoformat()


def _page(lines: Sequence[str]) -> str:
    return "\n".join(lines) + "\n"
