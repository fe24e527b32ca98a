"""Cells to typed values, a column at a time, with every cell that cannot be read named by its place."""

from __future__ import annotations

import datetime as dt
import re

import numpy as np

from fleet import words
from fleet.intake import tables
from fleet.intake.block import Block, Floats
from fleet.intake.cells import Cell, Sheet, clean, is_blank, show
from fleet.intake.headings import Heading, Layout
from fleet.intake.tables import Column
from fleet.units import INTERNAL, Unit, parse_number, to_internal

_ISO_DATE = re.compile(r"\d{4}-\d{2}-\d{2}", re.ASCII)
_DECIMAL_COMMA = re.compile(r"[+-]?\d+,\d+")
_NAMES_OF_THINGS = frozenset({"vessel", "part", "location", "device"})


def parse_block(sheet: Sheet, layout: Layout) -> Block:
    """Parse the table of a sheet.

    Parameters
    ----------
    sheet : Sheet
        The sheet [-].
    layout : Layout
        Its header [-].

    Returns
    -------
    Block
        Every column typed, with the faults of single cells [-].
    """
    first = layout.header + 1
    broken_rows = {row_no for row_no, _ in (*sheet.errors, *sheet.unsaved)}
    kept = [
        (number, cells)
        for number, cells in enumerate(sheet.rows[first:], first + 1)
        if number in broken_rows or not all(map(is_blank, cells))
    ]
    block = Block(layout.table, sheet.place, layout, [number for number, _ in kept])
    block.table_faults.extend(layout.faults)
    row_of = {number: row for row, number in enumerate(block.row_nos)}
    for name, heading in layout.headings.items():
        at = heading.index
        block.raw[name] = [cells[at] if at < len(cells) else None for _, cells in kept]
        if not heading.readable:
            continue
        broken = _broken_cells(block, sheet, heading, row_of)
        block.unread[name] = broken
        if heading.column.kind == "number":
            _numbers(block, heading, sheet.typed)
        elif heading.column.kind == "date":
            _dates(block, name)
        elif heading.column.kind == "choice":
            _choices(block, heading.column)
        else:
            _texts(block, name)
        if heading.column.required:
            _required(block, name, sheet)
    return block


def _broken_cells(block: Block, sheet: Sheet, heading: Heading, row_of: dict[int, int]) -> set[int]:
    name, column_no = heading.column.name, heading.index + 1
    broken = set()
    for (row_no, at), error in sheet.errors.items():
        if at == column_no and row_no in row_of:
            block.fault("error cell", row_of[row_no], name, f"{error} under '{heading.text}'")
            broken.add(row_of[row_no])
    for row_no, at in sorted(sheet.unsaved):
        if at == column_no and row_no in row_of:
            found = f"a formula without its result under '{heading.text}'"
            block.fault("formula without value", row_of[row_no], name, found)
            broken.add(row_of[row_no])
    return broken


def _required(block: Block, name: str, sheet: Sheet) -> None:
    for row, cell in enumerate(block.raw[name]):
        if is_blank(cell) and row not in block.unread[name]:
            row_no, column_no = block.row_nos[row], block.column_no(name)
            inside = any(r1 <= row_no <= r2 and c1 <= column_no <= c2 for r1, c1, r2, c2 in sheet.merged)
            found = f"'{name}' is blank" + (" (the cell is part of a merged one)" if inside else "")
            block.fault("missing value", row, name, found)
            block.unread[name].add(row)


# -----------------------------------------------------------------------------------------------------------
# Text, choices, dates
# -----------------------------------------------------------------------------------------------------------
def _texts(block: Block, name: str) -> None:
    seen: dict[str, str] = {}
    texts = []
    for row, cell in enumerate(block.raw[name]):
        if isinstance(cell, str):
            if cell not in seen:
                seen[cell] = clean(cell)
            texts.append(seen[cell])
        elif name in _NAMES_OF_THINGS and isinstance(cell, dt.date | dt.time | dt.timedelta):
            found = f"'{name}' holds the date or time {show(cell)}"
            block.fault("name turned into a date", row, name, found)
            block.unread[name].add(row)
            texts.append("")
        else:
            texts.append(show(cell))
    block.texts[name] = texts


def _choices(block: Block, column: Column) -> None:
    choices = {choice.casefold(): choice for choice in column.choices}
    known: dict[str, str] = {"": ""} | {choice: choice for choice in column.choices}
    texts = []
    for row, cell in enumerate(block.raw[column.name]):
        if isinstance(cell, str) and cell in known:
            texts.append(known[cell])
            continue
        if is_blank(cell):
            texts.append("")
            continue
        if isinstance(cell, bool) and column.choices == tables.YES_NO:
            texts.append("yes" if cell else "no")
            continue
        text = show(cell)
        choice = choices.get(text.casefold(), "")
        if not choice:
            near = tables.nearest(text, column.choices)
            remedy = (f"did you mean '{near}'? " if near else "") + f"use one of: {', '.join(column.choices)}"
            block.fault("unknown choice", row, column.name, f"'{text}' under '{column.name}'", remedy)
            block.unread[column.name].add(row)
        texts.append(choice)
    block.texts[column.name] = texts


def _dates(block: Block, name: str) -> None:
    seen: dict[str, dt.date | None] = {}
    dates: list[dt.date | None] = []
    for row, cell in enumerate(block.raw[name]):
        found: dt.date | None = None
        if isinstance(cell, str) and cell:
            if cell not in seen:
                seen[cell] = _iso_date(clean(cell))
            found = seen[cell]
        elif isinstance(cell, dt.datetime):
            found = cell.date()
        elif isinstance(cell, dt.date):
            found = cell
        dates.append(found)
        if found is None and not is_blank(cell):
            said = f"'{show(cell)}'" if isinstance(cell, str) else f"{show(cell)}, which is not a date,"
            block.fault("unreadable date", row, name, f"{said} under '{name}'")
            block.unread[name].add(row)
    block.dates[name] = dates


def _iso_date(text: str) -> dt.date | None:
    if _ISO_DATE.fullmatch(text) is None:
        return None
    try:
        return dt.date.fromisoformat(text)
    except ValueError:
        return None


# -----------------------------------------------------------------------------------------------------------
# Numbers
# -----------------------------------------------------------------------------------------------------------
def _numbers(block: Block, heading: Heading, typed: bool) -> None:
    name = heading.column.name
    numbers = np.full(len(block), np.nan)
    seen: dict[str, float | None] = {}
    as_text = []
    for row, cell in enumerate(block.raw[name]):
        if isinstance(cell, bool):
            _not_a_number(block, row, name, cell)
        elif isinstance(cell, float | int):
            numbers[row] = cell
        elif isinstance(cell, str):
            if is_blank(cell):
                continue
            if cell not in seen:
                seen[cell] = parse_number(clean(cell))
            value = seen[cell]
            if value is None:
                _not_a_number(block, row, name, cell)
            else:
                numbers[row] = value
                as_text.append(row)
        elif cell is not None:
            _not_a_number(block, row, name, cell)
    if typed and as_text:
        _written_as_text(block, name, as_text)
    _keep(block, heading, numbers)


def _keep(block: Block, heading: Heading, numbers: Floats) -> None:
    """Convert to the unit kept; refuse what cannot be true there."""
    column = heading.column
    kept = numbers if heading.unit is None else to_internal(numbers, heading.unit)
    bounds = column.bounds
    given = ~np.isnan(numbers)
    with np.errstate(invalid="ignore"):
        wrong = given & ~np.isfinite(kept)
        if bounds.low is not None:
            wrong |= given & ((kept <= bounds.low) if bounds.low_open else (kept < bounds.low))
        if bounds.high is not None:
            wrong |= given & ((kept >= bounds.high) if bounds.high_open else (kept > bounds.high))
    if column.name == "year_built":
        wrong |= given & (numbers != np.floor(numbers))
    for row in np.flatnonzero(wrong).tolist():
        _out_of_range(block, row, column, heading.unit, float(numbers[row]))
    block.numbers[column.name] = np.where(wrong, np.nan, kept)


def _out_of_range(block: Block, row: int, column: Column, unit: Unit | None, number: float) -> None:
    said = f"{show(number)} {unit.spelling}" if unit is not None else show(number)
    block.unread[column.name].add(row)
    if column.name in tables.THICKNESSES and number <= 0:
        remedy = None if column.name == "thickness" else "leave the cell blank where it is not known"
        block.fault("negative or zero thickness", row, column.name, f"{said} under '{column.name}'", remedy)
        return
    in_unit = f" {INTERNAL[column.quantity]}" if column.quantity is not None else ""
    found = (
        f"{said} under '{column.name}', which must be {column.bounds.text() or 'a finite number'}{in_unit}"
    )
    block.fault("number out of range", row, column.name, found)


def _not_a_number(block: Block, row: int, name: str, cell: Cell) -> None:
    block.unread[name].add(row)
    text = show(cell)
    found = f"'{text}' under '{name}'"
    if isinstance(cell, dt.date | dt.time | dt.timedelta):
        block.fault("unreadable number", row, name, f"a date or time, {text}, under '{name}'")
    elif isinstance(cell, str) and _DECIMAL_COMMA.fullmatch(text):
        remedy = "write a decimal point, and no separators: " + text.replace(",", ".")
        block.fault("unreadable number", row, name, f"{found} has a decimal comma", remedy)
    elif isinstance(cell, bool) or not any(map(str.isdigit, text)):
        block.fault("text in a number column", row, name, found)
    elif re.match(r"[+-]?[\d.]+\s*[A-Za-z\"°µ]", text):
        remedy = "write the number alone; the unit stands once, in the header"
        block.fault("text in a number column", row, name, found, remedy)
    elif any(map(str.isalpha, text)):
        block.fault("text in a number column", row, name, found)
    else:
        block.fault("unreadable number", row, name, found)


def _written_as_text(block: Block, name: str, rows: list[int]) -> None:
    found = f"'{show(block.raw[name][rows[0]])}' under '{name}' is stored as text"
    more = len(rows) - 1
    if more:
        found += f", and {more} more below it"
    notice = words.notice("written as text", block.where(rows[0], name), found)
    block.table_doubts.append((block.column_no(name), notice))
