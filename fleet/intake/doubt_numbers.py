"""Doubts about thicknesses that can be read: far above nominal, another unit, a gain, a large loss."""

from __future__ import annotations

import bisect
import datetime as dt
import math

import numpy as np

from fleet.intake import compare
from fleet.intake.block import Block, Keys
from fleet.intake.known import History, KnownLocation, KnownPart, KnownRegister, LocationKey, Recorded


def day_of(recorded: Recorded) -> dt.date:
    """Give the day of a reading on record, to search by.

    Parameters
    ----------
    recorded : Recorded
        The reading [-].

    Returns
    -------
    date
        Its day [date].

    Examples
    --------
    >>> day_of(Recorded(dt.date(2026, 12, 1), 12.7))
    datetime.date(2026, 12, 1)
    """
    return recorded.taken_on


def in_mm(thickness: float) -> str:
    """Write a thickness for a message.

    Parameters
    ----------
    thickness : float
        The thickness [mm].

    Returns
    -------
    str
        At most three decimals, and the unit [text].

    Examples
    --------
    >>> in_mm(12.7)
    '12.7 mm'
    """
    return f"{thickness:.3f}".rstrip("0").rstrip(".") + " mm"


def doubt_numbers(blocks: list[Block], keys: list[Keys], known: KnownRegister, history: History) -> None:
    """Note every doubt about thicknesses that can be read.

    Parameters
    ----------
    blocks : list of Block
        The tables of readings of one file [-].
    keys : list of Keys
        Location and day of their rows [-].
    known : KnownRegister
        The register on record [-].
    history : History
        The readings on record [-].
    """
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
    for one in reversed(recorded[: bisect.bisect_left(recorded, before, key=day_of)]):
        if one.standing == "accepted" and not math.isnan(one.thickness_mm):
            return one.thickness_mm
    return math.nan


def _doubt_against_nominal(block: Block, of_block: Keys, known: KnownRegister, history: History) -> None:
    heading = block.layout.headings.get("thickness")
    if heading is None or heading.unit is None:
        return
    thickness = block.number("thickness")
    rows = [
        row
        for row, location in enumerate(of_block.locations)
        if location is not None
        and location[:2] in known.parts
        and row not in block.left_out
        and not math.isnan(thickness[row])
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
        said = f"{written} is {thickness / reference:.3g} times {against}, {in_mm(reference)}"
        if found.slip[at]:
            unit, would_be = found.slip_unit[at], float(found.would_be_mm[at])
            number = written.rsplit(" ", 1)[0]
            slip = f"{said}; written as {number} {unit} it would be {in_mm(would_be)}"
            block.doubt("suspected unit slip", row, name, slip)
            if thickness > reference:
                block.query[row] = f"suspected unit slip: {slip}"
        if found.far_above[at]:
            block.doubt("thickness far above nominal", row, name, said)
            block.query.setdefault(row, f"thickness far above nominal: {said}")


def _doubt_against_history(
    blocks: list[Block], keys: list[Keys], known: KnownRegister, history: History
) -> None:
    """Lay the readings on record and the good rows of the file in one line of time, and compare them."""
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
        said = (
            f"{written} is {in_mm(wall - last)} above {in_mm(last)} of {since}; the reading error explains "
        )
        block.doubt("apparent gain", row, "thickness", said + in_mm(explained))
        return
    rate = float(found.rate_mm_per_year[index])
    said = f"{written} is {in_mm(last - wall)} below {in_mm(last)} of {since}; the history before gives {rate:.3g}"
    block.doubt(
        "large loss", row, "thickness", f"{said} mm/year, the reading error explains {in_mm(explained)}"
    )
