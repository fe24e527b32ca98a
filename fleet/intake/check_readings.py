"""Thickness surveys in: every fault and doubt about readings, and the thin ones first."""

from __future__ import annotations

import bisect
import datetime as dt
import math
from collections.abc import Iterable
from pathlib import Path

import numpy as np

from fleet.intake import tables, taking
from fleet.intake.block import Block, Keys, read_keys
from fleet.intake.doubt_numbers import day_of, doubt_numbers, in_mm
from fleet.intake.known import History, KnownRegister, LocationKey, Recorded
from fleet.intake.results import SurveyIntake
from fleet.intake.thin import thin_readings

_NEAR_MISSES = 20  # a nearest name is looked for that often; the search is slow on large registers


def read_survey(
    path: str | Path, *, known: KnownRegister, history: History, today: dt.date, park: bool = False
) -> SurveyIntake:
    """Read one survey file.

    Parameters
    ----------
    path : str or Path
        The file: CSV, or a workbook of which every sheet of readings is read [text].
    known : KnownRegister
        The register on record [-].
    history : History
        The readings on record [-].
    today : date
        No reading may be dated later [date].
    park : bool
        Whether faulty rows wait instead of refusing the file; a fault of the header refuses it even so [-].

    Returns
    -------
    SurveyIntake
        Rows, faults, doubts and thin readings; a refused file gives no rows [-].

    Raises
    ------
    Refused
        Where the file cannot be opened at all.
    """
    file = taking.take_in(path, ("readings",), known.files)
    thin = tuple(entry for block in file.blocks for entry in thin_readings(block, known))
    names = _Names(known)
    for block in file.blocks:
        names.check(block)
        _check_dates(block, known, today)
        _check_results(block)
    keys = [read_keys(block) for block in file.blocks]
    _find_duplicates(file.blocks, keys)
    _compare_with_record(file.blocks, keys, history)
    doubt_numbers(file.blocks, keys, known, history)
    has_faulty_rows = any(block.row_faults for block in file.blocks)
    is_refused = not file.loaded_as and (not file.is_sound() or (has_faulty_rows and not park))
    rows = taking.sort_rows([file], {0} if is_refused else (), park=park)
    return SurveyIntake(
        tables=tuple(rows.tables),
        faults=tuple(taking.all_faults(file)),
        doubts=tuple(taking.all_doubts(file)),
        files=(file.about(refused=is_refused),),
        parked=tuple(rows.parked),
        thin=thin,
    )


# -----------------------------------------------------------------------------------------------------------
# Faults of single rows
# -----------------------------------------------------------------------------------------------------------
class _Names:
    """Look up vessel, part and location of every row; each name that is not known is looked for once."""

    def __init__(self, known: KnownRegister) -> None:
        self.known = known
        self.answers: dict[tuple[str, ...], tuple[str, str, str, str | None] | None] = {}
        self.searches = 0

    def check(self, block: Block) -> None:
        names = ("vessel", "part", "location")
        columns = [block.text(name) for name in names]
        for row, key in enumerate(zip(*columns, strict=True)):
            given = key[: key.index("")] if "" in key else key  # what can be read, from the vessel on
            if given not in self.answers:
                self.answers[given] = self._look_up(given)
            answer = self.answers[given]
            if answer is not None:
                code, name, found, remedy = answer
                block.fault(code, row, name, found, remedy)

    def _look_up(self, key: tuple[str, ...]) -> tuple[str, str, str, str | None] | None:
        known = self.known
        match key:
            case ():
                return None
            case (vessel, *_) if vessel not in known.vessels:
                return self._unknown("vessel", vessel, "", known.vessels)
            case (vessel, part, *_) if (vessel, part) not in known.parts:
                parts = (p for v, p in known.parts if v == vessel)
                return self._unknown("part", part, f" of vessel '{vessel}'", parts)
            case (vessel, part, location) if (vessel, part, location) not in known.locations:
                locations = (one for v, p, one in known.locations if (v, p) == (vessel, part))
                return self._unknown("location", location, f" of '{vessel}', part '{part}'", locations)
        return None

    def _unknown(
        self, name: str, word: str, of: str, candidates: Iterable[str]
    ) -> tuple[str, str, str, str | None]:
        self.searches += 1
        near = tables.nearest(word, candidates) if self.searches <= _NEAR_MISSES else None
        code = f"unknown {name}"
        remedy = f"did you mean '{near}'? Otherwise load the {name} first" if near else None
        return code, name, f"{name} '{word}'{of}", remedy


def _check_dates(block: Block, known: KnownRegister, today: dt.date) -> None:
    vessels = block.text("vessel")
    for row, day in enumerate(block.date("taken_on")):
        if day is None:
            continue
        vessel = known.vessels.get(vessels[row])
        if day > today:
            block.fault("date in the future", row, "taken_on", f"{day} is after {today}")
        elif vessel is not None and vessel.in_service_on is not None and day < vessel.in_service_on:
            found = f"{day}; '{vessels[row]}' went into service on {vessel.in_service_on}"
            block.fault("date before in-service", row, "taken_on", found)


def _check_results(block: Block) -> None:
    thickness, average = block.number("thickness"), block.number("average")
    results = block.added["result"] = list(block.text("result"))
    has_thickness, has_average = ~np.isnan(thickness), ~np.isnan(average)
    for row, result in enumerate(results):
        if block.was_unread("thickness", row) or block.was_unread("result", row):
            continue
        if result in {"", "read"}:
            results[row] = "read"
            if not has_thickness[row]:
                said = "result 'read' and no thickness" if result else "neither thickness nor result"
                block.fault("thickness or result missing", row, "thickness", said)
            elif has_average[row] and average[row] < thickness[row]:
                found = (
                    f"average {block.written('average', row)}, thickness {block.written('thickness', row)}"
                )
                block.fault("average below thickness", row, "average", found)
        elif has_thickness[row] or has_average[row]:
            name = "thickness" if has_thickness[row] else "average"
            found = f"{name} {block.written(name, row)} and result '{result}'"
            block.fault("thickness and no reading", row, name, found)


# -----------------------------------------------------------------------------------------------------------
# Duplicates
# -----------------------------------------------------------------------------------------------------------
def _find_duplicates(blocks: list[Block], keys: list[Keys]) -> None:
    seen: dict[tuple[LocationKey, dt.date], list[tuple[int, int]]] = {}
    for number, of_block in enumerate(keys):
        for row, (location, day) in enumerate(zip(of_block.locations, of_block.days, strict=True)):
            if location is not None and day is not None:
                seen.setdefault((location, day), []).append((number, row))
    for (location, day), rows in seen.items():
        for number, row in rows if len(rows) > 1 else ():
            other_number, other_row = rows[0] if (number, row) != rows[0] else rows[1]
            other = blocks[other_number].where(other_row)
            found = f"{' / '.join(location)} on {day} stands also in {other}"
            blocks[number].fault("duplicate reading", row, "location", found)


def _compare_with_record(blocks: list[Block], keys: list[Keys], history: History) -> None:
    for block, of_block in zip(blocks, keys, strict=True):
        thickness = block.number("thickness").tolist()
        for row, (location, day) in enumerate(zip(of_block.locations, of_block.days, strict=True)):
            if location is None or day is None or location not in history.readings:
                continue
            if block.was_unread("thickness", row) or row in block.row_faults:
                continue
            recorded = history.readings[location]
            at = bisect.bisect_left(recorded, day, key=day_of)
            same_day = []
            while at < len(recorded) and recorded[at].taken_on == day:
                same_day.append(recorded[at])
                at += 1
            if same_day:
                _on_record(block, row, thickness[row], same_day)


def _on_record(block: Block, row: int, thickness: float, same_day: list[Recorded]) -> None:
    for one in same_day:
        if _same(one.thickness_mm, thickness):
            found = f"{_said(thickness)} of {one.taken_on} is on record ({one.standing})"
            block.doubt("already on record", row, "thickness", found)
            block.left_out.add(row)
            return
    standing = [one for one in same_day if one.standing != "voided"]
    if standing:
        found = f"{_said(thickness)}; on record for {standing[0].taken_on}: {_said(standing[0].thickness_mm)}"
        block.fault("duplicate reading", row, "thickness", found)


def _same(one: float, other: float) -> bool:
    return (math.isnan(one) and math.isnan(other)) or math.isclose(one, other, rel_tol=1e-9)


def _said(thickness: float) -> str:
    return "no thickness" if math.isnan(thickness) else in_mm(thickness)
