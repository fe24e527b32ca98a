"""Find the header row of a sheet, tell which table it is, and read its headings."""

from __future__ import annotations

import re
from collections.abc import Collection, Sequence
from dataclasses import dataclass, field
from functools import lru_cache

from fleet import words
from fleet.intake import tables
from fleet.intake.cells import Cell, Sheet, clean, is_blank, letters, show
from fleet.intake.tables import Column
from fleet.units import Unit, UnitFault, find_unit
from fleet.words import Notice

_HEADING = re.compile(r"(.*?)\s*\[(.*)\]")
_LOOKED_THROUGH = 200
_NO_UNIT = {"", "-", "–", "1"}


@dataclass(frozen=True)
class Heading:
    """One heading that names a column of the table.

    Parameters
    ----------
    column : Column
        The column [-].
    index : int
        Its place in the row, counted from 0 [count].
    unit : Unit or None
        The unit of its numbers [-].
    readable : bool
        False where a fault of the heading keeps its cells from being read [-].
    text : str
        The heading as written [text].
    """

    column: Column
    index: int
    unit: Unit | None
    readable: bool
    text: str


@dataclass(frozen=True)
class Layout:
    """How the table of one sheet is laid out.

    Parameters
    ----------
    table : str
        The table [text].
    header : int
        The header row, counted from 0 [count].
    headings : dict
        Column name to its heading [-].
    faults : tuple of (int, Notice)
        Faults of the header, each with its column counted from 1 [-].
    """

    table: str
    header: int
    headings: dict[str, Heading]
    faults: tuple[tuple[int, Notice], ...] = ()


@dataclass
class Identified:
    """What a sheet turned out to be.

    Parameters
    ----------
    layout : Layout or None
        Its layout, where it holds a table that is wanted [-].
    other : str
        The table it holds, where that one is not wanted [text].
    """

    layout: Layout | None = None
    other: str = ""


@dataclass
class _Candidate:
    table: str
    header: int = -1
    names: frozenset[str] = field(default_factory=frozenset)
    complete: bool = False

    @property
    def rank(self) -> tuple[bool, int]:
        return self.complete, len(self.names)


@lru_cache(maxsize=4096)
def split_heading(text: str) -> tuple[str, str | None]:
    """Split a heading into the column's name and its unit.

    Parameters
    ----------
    text : str
        The heading [text].

    Returns
    -------
    tuple of str and (str or None)
        The name in small letters, spaces as underscores; and the unit, None without brackets [text].

    Examples
    --------
    >>> split_heading("Thickness [mm]"), split_heading("taken on")
    (('thickness', 'mm'), ('taken_on', None))
    """
    name: str = clean(text)
    unit: str | None = None
    match = _HEADING.fullmatch(name)
    if match:
        name, unit = match.group(1), match.group(2).strip()
    return re.sub(r"[\s-]+", "_", name.casefold()), unit


_ALL_NAMES = frozenset(column.name for columns in tables.TABLES.values() for column in columns)
_NAMES = {table: frozenset(column.name for column in columns) for table, columns in tables.TABLES.items()}
_REQUIRED = {
    table: frozenset(column.name for column in columns if column.required)
    for table, columns in tables.TABLES.items()
}


def known_names(row: Sequence[Cell]) -> int:
    """Count the cells of a row that name a column of any table.

    Parameters
    ----------
    row : sequence of Cell
        The row [-].

    Returns
    -------
    int
        How many [count].

    Examples
    --------
    >>> known_names(["vessel", "part", "thickness [mm]", "weather"])
    3
    """
    return len(_row_names(row) & _ALL_NAMES)


def _row_names(row: Sequence[Cell]) -> frozenset[str]:
    return frozenset(split_heading(cell)[0] for cell in row if isinstance(cell, str) and not is_blank(cell))


def identify(sheet: Sheet, wanted: Collection[str]) -> Identified:
    """Tell which table a sheet holds, and read its header.

    Parameters
    ----------
    sheet : Sheet
        The sheet [-].
    wanted : collection of str
        The tables that are taken in [text].

    Returns
    -------
    Identified
        The layout, or the name of a table that is not wanted, or neither [-].
    """
    rows = [_row_names(row) for row in sheet.rows[:_LOOKED_THROUGH]]
    by_name = split_heading(sheet.place.sheet)[0]
    if by_name in tables.TABLES:
        named = _candidate(by_name, rows)
        if named.names:
            return _identified(sheet, named, wanted)
    candidates = [_candidate(table, rows) for table in tables.TABLES]
    mine = max((one for one in candidates if one.table in wanted), key=lambda one: one.rank)
    others = [one for one in candidates if one.table not in wanted]
    other = max(others, key=lambda one: one.rank, default=_Candidate(""))
    if other.complete and not mine.complete and len(other.names) >= len(mine.names):
        return Identified(other=other.table)
    if mine.complete or len(mine.names) >= 2:
        return _identified(sheet, mine, wanted)
    return Identified()


def _identified(sheet: Sheet, candidate: _Candidate, wanted: Collection[str]) -> Identified:
    if candidate.table not in wanted:
        return Identified(other=candidate.table)
    return Identified(_layout(sheet, candidate.table, candidate.header))


def _candidate(table: str, rows: Sequence[frozenset[str]]) -> _Candidate:
    """Find the first row with every heading that names a row of the table, else the one with most of them."""
    best = _Candidate(table)
    one_of = frozenset(tables.ONE_OF.get(table, ()))
    for number, names in enumerate(rows):
        mine = names & _NAMES[table]
        complete = names >= _REQUIRED[table] and (not one_of or bool(names & one_of))
        if complete or len(mine) > len(best.names):
            best = _Candidate(table, number, mine, complete)
        if complete:
            break
    return best


# -----------------------------------------------------------------------------------------------------------
# The header row
# -----------------------------------------------------------------------------------------------------------
def _layout(sheet: Sheet, table: str, header: int) -> Layout:
    row_no = header + 1
    row = sheet.rows[header]
    headings: dict[str, Heading] = {}
    faults = _merged(sheet, row_no)
    for index, cell in enumerate(row):
        where = sheet.place.cell(row_no, index + 1)
        broken = _broken(sheet, row_no, index + 1, where)
        if broken:
            faults.append((index + 1, broken))
            continue
        if is_blank(cell):
            continue
        heading, fault = _heading(table, cell, index, where)
        if heading is not None and heading.column.name in headings:
            first = headings[heading.column.name]
            found = f"'{show(cell)}' and '{first.text}' in column {letters(first.index + 1)}"
            fault = words.notice("column twice", where, found)
        elif heading is not None:
            headings[heading.column.name] = heading
        if fault is not None:
            faults.append((index + 1, fault))
    faults += _without_heading(sheet, header)
    faults += _missing(sheet, table, header, headings)
    return Layout(table, header, headings, tuple(faults))


def _heading(table: str, cell: Cell, index: int, where: str) -> tuple[Heading | None, Notice | None]:
    text = show(cell)
    name, unit_text = split_heading(text)
    by_name = {column.name: column for column in tables.TABLES[table]}
    # 'thickness (mm)' means the thickness; round brackets are no unit, but the column is not lost
    column = by_name.get(name) or by_name.get(re.sub(r"_*\([^()]*\)$", "", name))
    if column is None:
        return None, _unknown_column(table, name, text, where)
    if column.quantity is None:
        if unit_text is None or unit_text in _NO_UNIT:
            return Heading(column, index, None, True, text), None
        fault = words.notice(
            "unknown unit", where, f"'{text}': the column has no unit", f"write the heading as '{name}'"
        )
        return Heading(column, index, None, False, text), fault
    if unit_text is None:
        example = column.heading(_EXAMPLE_UNITS[column.quantity])
        remedy = f"write the unit in square brackets in the header, for instance '{example}'"
        return Heading(column, index, None, False, text), words.notice(
            "missing unit", where, f"'{text}'", remedy
        )
    unit = find_unit(unit_text, column.quantity)
    if isinstance(unit, UnitFault):
        return Heading(column, index, None, False, text), words.notice(
            unit.code, where, f"'{text}': {unit.found}", unit.remedy
        )
    return Heading(column, index, unit, True, text), None


_EXAMPLE_UNITS = {"length": "mm", "pressure": "MPa", "temperature": "degC", "rate": "mm/year", "angle": "deg"}


def _unknown_column(table: str, name: str, text: str, where: str) -> Notice:
    near = tables.nearest(name, _NAMES[table])
    hint = f"did you mean '{near}'? Otherwise delete the column" if near else None
    return words.notice("unknown column", where, f"'{text}' is not a column of table '{table}'", hint)


def _merged(sheet: Sheet, row_no: int) -> list[tuple[int, Notice]]:
    return [
        (
            first_column,
            words.notice(
                "merged header",
                sheet.place.cell(row_no, first_column),
                f"{letters(first_column)}{first_row}:{letters(last_column)}{last_row} is one merged cell",
            ),
        )
        for first_row, first_column, last_row, last_column in sheet.merged
        if first_row <= row_no <= last_row
    ]


def _broken(sheet: Sheet, row_no: int, column_no: int, where: str) -> Notice | None:
    error = sheet.errors.get((row_no, column_no))
    if error is not None:
        return words.notice("error cell", where, f"{error} in the header")
    if (row_no, column_no) in sheet.unsaved:
        return words.notice("formula without value", where, "a formula in the header")
    return None


def _without_heading(sheet: Sheet, header: int) -> list[tuple[int, Notice]]:
    """Cells below the header in a column that has no heading: they would be lost."""
    row = sheet.rows[header]
    named = {index for index, cell in enumerate(row) if not is_blank(cell)}
    named |= {column_no - 1 for row_no, column_no in (*sheet.errors, *sheet.unsaved) if row_no == header + 1}
    merged = {
        column
        for first_row, first, last_row, last in sheet.merged
        if first_row <= header + 1 <= last_row
        for column in range(first - 1, last)
    }
    found: dict[int, tuple[int, Cell]] = {}
    is_full = set(range(len(row))) <= named
    for number, cells in enumerate(sheet.rows[header + 1 :], header + 2):
        if is_full and len(cells) <= len(row):
            continue
        for index, cell in enumerate(cells):
            if index not in named and index not in found and index not in merged and not is_blank(cell):
                found[index] = (number, cell)
    for row_no, column_no in (*sheet.errors, *sheet.unsaved):
        if row_no > header + 1 and column_no - 1 not in named | merged:
            found.setdefault(column_no - 1, (row_no, "an error or a formula without value"))
    return [
        (
            index + 1,
            words.notice(
                "unknown column",
                sheet.place.cell(header + 1, index + 1),
                f"no heading over '{show(cell)}' in {letters(index + 1)}{row_no}",
                "give the column its heading, or empty it",
            ),
        )
        for index, (row_no, cell) in sorted(found.items())
    ]


def _missing(sheet: Sheet, table: str, header: int, headings: dict[str, Heading]) -> list[tuple[int, Notice]]:
    where = sheet.place.row(header + 1)
    faults = [
        (0, words.notice("missing column", where, f"no column '{column.name}' in table '{table}'"))
        for column in tables.TABLES[table]
        if column.required and column.name not in headings
    ]
    one_of = tables.ONE_OF.get(table, ())
    if one_of and not any(name in headings for name in one_of):
        either = "' nor '".join(one_of)
        found = f"neither '{either}' in table '{table}'"
        faults.append((0, words.notice("missing column", where, found, "add one of the two")))
    return faults
