"""Put the sheets together and write the file: first beside its place, then renamed; always the same bytes."""

from __future__ import annotations

import os
import re
import tempfile
import zipfile
from collections.abc import Mapping, Sequence
from contextlib import suppress
from datetime import datetime
from io import BytesIO
from pathlib import Path
from typing import TYPE_CHECKING

from fleet import __version__, units
from fleet.errors import Refused
from fleet.reports.figures import Figures
from fleet.reports.source import AppraisalLike, Grounds, RuleValueLike, Snapshot, reconciled
from fleet.reports.workbook import how_to_read, ink, rests_on, shortlists, the_list, the_year, timetable
from fleet.reports.workbook.page import Stamp

if TYPE_CHECKING:
    from openpyxl.workbook import Workbook

ZIP_TIME = (1980, 1, 1, 0, 0, 0)
"""The time that every member of the file bears: the earliest that the format knows."""


def write_derating(
    appraisal: AppraisalLike,
    path: Path | str,
    *,
    units: str = "si",
    settings: Sequence[tuple[str, str]] = (),
    rules: Mapping[str, Sequence[RuleValueLike]] | None = None,
    program_version: str = __version__,
) -> Path:
    """Write the yearly list as a workbook.

    Parameters
    ----------
    appraisal : AppraisalLike
        The appraisal [-].
    path : Path or str
        Where the file goes; one that is there is replaced [text].
    units : {'si', 'us'}
        What people see [text].
    settings : sequence of (str, str)
        Each setting in force with its value as printed [text].
    rules : mapping of str to sequence of RuleValueLike
        The values of each rule set in use, under its title and edition [-].
    program_version : str
        Version of the program [text].

    Returns
    -------
    Path
        The file written.

    Raises
    ------
    Refused
        If the folder is not there, the name is no workbook's, or the file is locked or cannot be written.
    UsageProblem
        If the units are neither.
    OurFault
        If the blocks do not add up to the register.
    """
    target = Path(path)
    _check_place(target)
    content = workbook_bytes(
        appraisal, units=units, settings=settings, rules=rules, program_version=program_version
    )
    _write_beside(target, content)
    return target


def workbook_bytes(
    appraisal: AppraisalLike,
    *,
    units: str = "si",
    settings: Sequence[tuple[str, str]] = (),
    rules: Mapping[str, Sequence[RuleValueLike]] | None = None,
    program_version: str = __version__,
) -> bytes:
    """Draw the workbook and give its bytes, the same every time for the same record.

    Parameters
    ----------
    appraisal, units, settings, rules, program_version
        As for `write_derating` [-].

    Returns
    -------
    bytes
    """
    appraisal = Snapshot(appraisal)
    figures = Figures(_display(units))
    stamp = Stamp(
        f"as of {appraisal.as_of.isoformat()}",
        f"{appraisal.journal_no} {appraisal.journal_head}",
    )
    book = _book(appraisal, figures, stamp, Grounds(settings, rules, program_version))
    stream = BytesIO()
    book.save(stream)
    return _steady(stream.getvalue(), _midnight(appraisal))


def _display(name: str) -> units.Display:
    return units.display(name)


def _book(appraisal: AppraisalLike, figures: Figures, stamp: Stamp, grounds: Grounds) -> Workbook:
    from openpyxl import Workbook

    reconciled(appraisal)  # refuse to draw a list that does not add up
    book = Workbook()
    book.remove(book.worksheets[0])
    ink.lay_out_styles(book)
    the_year.draw(book, appraisal, figures, stamp)
    the_list.draw(book, appraisal, figures, stamp, grounds)
    timetable.draw(book, appraisal, figures, stamp)
    shortlists.draw_running_out(book, appraisal, figures, stamp)
    shortlists.draw_re_gauge(book, appraisal, figures, stamp)
    rests_on.draw(book, appraisal, figures, stamp)
    shortlists.draw_doubts(book, appraisal, figures, stamp)
    shortlists.draw_gaps(book, appraisal, figures, stamp)
    how_to_read.draw(book, appraisal, figures, stamp, grounds)
    book.properties.title = f"Yearly list, {stamp.as_of}"
    book.properties.creator = "fleet"
    book.properties.created = _midnight(appraisal)
    return book


def _midnight(appraisal: AppraisalLike) -> datetime:
    day = appraisal.as_of
    return datetime(day.year, day.month, day.day)  # noqa: DTZ001 the format keeps times without a zone


def _steady(content: bytes, at: datetime) -> bytes:
    """Take out what differs from save to save: the time of saving and the times of the members."""
    saved_at = re.compile(rb"(<dcterms:modified[^>]*>)[^<]*(</dcterms:modified>)")
    stream = BytesIO()
    with zipfile.ZipFile(BytesIO(content)) as before, zipfile.ZipFile(stream, "w") as after:
        for name in before.namelist():
            data = before.read(name)
            if name == "docProps/core.xml":
                data = saved_at.sub(rb"\g<1>" + f"{at:%Y-%m-%dT%H:%M:%SZ}".encode() + rb"\g<2>", data)
            member = zipfile.ZipInfo(name, ZIP_TIME)
            member.compress_type = zipfile.ZIP_DEFLATED
            member.create_system = 0  # else the file would differ between systems
            after.writestr(member, data)
    return stream.getvalue()


def _check_place(target: Path) -> None:
    if target.suffix.lower() != ".xlsx":
        raise Refused(
            str(target), "the name does not end in .xlsx", "give the workbook a name such as list.xlsx"
        )
    if not target.parent.is_dir():
        raise Refused(
            str(target), f"there is no folder {target.parent}", "make the folder, or name another place"
        )
    if target.is_dir():
        raise Refused(str(target), "a folder bears that name", "choose another name")


def _write_beside(target: Path, content: bytes) -> None:
    """Write to a file of another name in the same folder, then rename: one sees the old file or the new."""
    beside: Path | None = None
    try:
        handle, name = tempfile.mkstemp(prefix=f".{target.stem}-", suffix=".part", dir=target.parent)
        beside = Path(name)
        with os.fdopen(handle, "wb") as stream:
            stream.write(content)
            stream.flush()
            os.fsync(stream.fileno())
        beside.chmod(0o644)
        beside.replace(target)
    except OSError as problem:
        if beside is not None:
            with suppress(OSError):
                beside.unlink(missing_ok=True)
        what = f"the file cannot be written: {problem.strerror or problem}"
        remedy = "close it where it is open, or choose a place that may be written to"
        raise Refused(str(target), what, remedy) from problem
