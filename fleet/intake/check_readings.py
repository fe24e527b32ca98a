"""Thickness surveys in: every fault and doubt about readings, and the thin ones first."""

from __future__ import annotations

import bisect
import datetime as dt
import math
from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path

import numpy as np

from fleet.intake import compare, tables, taking
from fleet.intake.block import Block
from fleet.intake.known import History, KnownLocation, KnownPart, KnownRegister, LocationKey, Recorded
from fleet.intake.results import SurveyIntake
from fleet.intake.thin import thin_readings

_NEAR_MISSES = 50  # a nearest name is looked for that often; the search is slow on large registers


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
    keys = [_keys(block) for block in file.blocks]
    _find_duplicates(file.blocks, keys)
    _compare_with_record(file.blocks, keys, history)
    _doubt_numbers(file.blocks, keys, known, history)
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
    thickness, average, results = block.number("thickness"), block.number("average"), block.text("result")
    has_thickness, has_average = ~np.isnan(thickness), ~np.isnan(average)
    for row, result in enumerate(results):
        if block.was_unread("thickness", row) or block.was_unread("result", row):
            continue
        if result in {"", "read"}:
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
@dataclass(frozen=True)
class _Keys:
    locations: list[LocationKey | None]
    """The location of each row; None where it cannot be read."""
    days: list[dt.date | None]


def _keys(block: Block) -> _Keys:
    columns = (block.text("vessel"), block.text("part"), block.text("location"))
    locations: list[LocationKey | None] = [key if all(key) else None for key in zip(*columns, strict=True)]
    return _Keys(locations, block.date("taken_on"))


def _find_duplicates(blocks: list[Block], keys: list[_Keys]) -> None:
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


def _compare_with_record(blocks: list[Block], keys: list[_Keys], history: History) -> None:
    for block, of_block in zip(blocks, keys, strict=True):
        thickness = block.number("thickness").tolist()
        for row, (location, day) in enumerate(zip(of_block.locations, of_block.days, strict=True)):
            if location is None or day is None or location not in history.readings:
                continue
            if block.was_unread("thickness", row) or row in block.row_faults:
                continue
            recorded = history.readings[location]
            at = bisect.bisect_left(recorded, day, key=_day)
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


def _day(recorded: Recorded) -> dt.date:
    return recorded.taken_on


def _same(one: float, other: float) -> bool:
    return (math.isnan(one) and math.isnan(other)) or math.isclose(one, other, rel_tol=1e-9)


def _said(thickness: float) -> str:
    return "no thickness" if math.isnan(thickness) else _mm(thickness)


def _mm(thickness: float) -> str:
    return f"{thickness:.3f}".rstrip("0").rstrip(".") + " mm"


# -----------------------------------------------------------------------------------------------------------
# Doubts about numbers
# -----------------------------------------------------------------------------------------------------------
def _doubt_numbers(blocks: list[Block], keys: list[_Keys], known: KnownRegister, history: History) -> None:
    for block, of_block in zip(blocks, keys, strict=True):
        _doubt_against_nominal(block, of_block, known, history)
    _doubt_against_history(blocks, keys, known, history)


def last_accepted(history: History, location: LocationKey, before: dt.date) -> float:
    """Give the last accepted reading on record before a day.

    Parameters
    ----------
    history : History
        The readings on record [-].
    location : tuple of str
        Vessel, part and location [text].
    before : date
        The day [date].

    Returns
    -------
    float
        The reading; NaN where there is none [mm].
    """
    recorded = history.readings.get(location, ())
    for one in reversed(recorded[: bisect.bisect_left(recorded, before, key=_day)]):
        if one.standing == "accepted" and not math.isnan(one.thickness_mm):
            return one.thickness_mm
    return math.nan


def _doubt_against_nominal(block: Block, of_block: _Keys, known: KnownRegister, history: History) -> None:
    heading = block.layout.headings.get("thickness")
    if heading is None or heading.unit is None:
        return
    thickness = block.number("thickness")
    rows = [
        row
        for row, location in enumerate(of_block.locations)
        if location is not None and location[:2] in known.parts and not math.isnan(thickness[row])
    ]
    parts = [known.parts[location[:2]] for row in rows if (location := of_block.locations[row])]
    nominal = np.array([part.nominal_thickness_mm for part in parts], dtype=np.float64)
    lining = np.array([lining_of(part) for part in parts], dtype=np.float64)
    last = np.array(
        [
            last_accepted(history, location, day)
            for row in rows
            if (location := of_block.locations[row])
            for day in (of_block.days[row] or dt.date.max,)
        ],
        dtype=np.float64,
    )
    walls = thickness[rows]
    found = compare.against_nominal(walls, nominal, lining, last, [heading.unit.spelling] * len(rows))
    note_against_nominal(block, "thickness", rows, found, nominal + lining, last)


def lining_of(part: KnownPart) -> float:
    """Give the thickness of lining that a reading may include.

    Parameters
    ----------
    part : KnownPart
        The part [-].

    Returns
    -------
    float
        The thickness; 0 where there is none or it is not known [mm].

    Examples
    --------
    >>> lining_of(KnownPart(lining="overlay", lining_thickness_mm=3.0)), lining_of(KnownPart())
    (3.0, 0.0)
    """
    return part.lining_thickness_mm if part.is_lined and part.lining_thickness_mm > 0 else 0.0


def note_against_nominal(
    block: Block,
    name: str,
    rows: list[int],
    found: compare.AgainstNominal,
    nominal_and_lining: compare.Floats,
    last: compare.Floats,
) -> None:
    """Note the doubts about walls far from nominal, and query the high ones.

    Parameters
    ----------
    block : Block
        The table [-].
    name : str
        The column [text].
    rows : list of int
        The rows that were compared [count].
    found : AgainstNominal
        What was found about them [-].
    nominal_and_lining, last : ndarray
        What they were compared with [mm].
    """
    for at in np.flatnonzero(found.far_above | found.slip).tolist():
        row, reference = rows[at], float(nominal_and_lining[at])
        thickness = float(block.numbers[name][row])
        written = block.written(name, row)
        if math.isnan(reference):
            reference, against = float(last[at]), "the last reading"
        else:
            against = "nominal wall and lining"
        said = f"{written} is {thickness / reference:.3g} times {against}, {_mm(reference)}"
        if found.slip[at]:
            unit, would_be = found.slip_unit[at], float(found.would_be_mm[at])
            number = written.rsplit(" ", 1)[0]
            slip = f"{said}; written as {number} {unit} it would be {_mm(would_be)}"
            block.doubt("suspected unit slip", row, name, slip)
            if thickness > reference:
                block.query[row] = f"suspected unit slip: {slip}"
        if found.far_above[at]:
            block.doubt("thickness far above nominal", row, name, said)
            block.query.setdefault(row, f"thickness far above nominal: {said}")


def _doubt_against_history(
    blocks: list[Block], keys: list[_Keys], known: KnownRegister, history: History
) -> None:
    """Lay the readings on record and the good rows of the file in one line of time, and compare neighbours."""
    places: dict[LocationKey, int] = {}
    rows: list[tuple[int, int]] = []
    place: list[int] = []
    day: list[int] = []
    thickness: list[float] = []
    for number, (block, of_block) in enumerate(zip(blocks, keys, strict=True)):
        walls = block.number("thickness").tolist()
        for row, (location, taken_on) in enumerate(zip(of_block.locations, of_block.days, strict=True)):
            if location is None or taken_on is None or math.isnan(walls[row]):
                continue
            if row in block.row_faults or row in block.query or row in block.left_out:
                continue
            rows.append((number, row))
            place.append(places.setdefault(location, len(places)))
            day.append(taken_on.toordinal())
            thickness.append(walls[row])
    for location, number in places.items():
        for one in history.readings.get(location, ()):
            if one.standing == "accepted" and not math.isnan(one.thickness_mm):
                place.append(number)
                day.append(one.taken_on.toordinal())
                thickness.append(one.thickness_mm)
    if not rows:
        return
    usual = KnownLocation()
    errors = np.array([known.locations.get(key, usual).reading_error_mm for key in places], dtype=np.float64)
    at = np.array(place, dtype=np.int64)
    found = compare.against_history(
        at,
        np.array(day, dtype=np.float64),
        np.array(thickness, dtype=np.float64),
        errors[at],
        history.same_observation_days,
    )
    for index in np.flatnonzero(found.gain[: len(rows)] | found.loss[: len(rows)]).tolist():
        number, row = rows[index]
        _note_against_history(blocks[number], row, found, index, float(errors[at[index]]))


def _note_against_history(
    block: Block, row: int, found: compare.AgainstHistory, index: int, error: float
) -> None:
    written = block.written("thickness", row)
    wall, last = float(block.numbers["thickness"][row]), float(found.last_mm[index])
    since = dt.date.fromordinal(int(found.last_day[index]))
    explained = compare.EXPLAINED * error
    if found.gain[index]:
        said = f"{written} is {_mm(wall - last)} above {_mm(last)} of {since}; the reading error explains "
        block.doubt("apparent gain", row, "thickness", said + _mm(explained))
        return
    rate = float(found.rate_mm_per_year[index])
    said = (
        f"{written} is {_mm(last - wall)} below {_mm(last)} of {since}; the history before gives {rate:.3g}"
    )
    block.doubt(
        "large loss", row, "thickness", f"{said} mm/year, the reading error explains {_mm(explained)}"
    )
