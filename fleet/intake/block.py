"""The table of one sheet, parsed: its columns, and the notices of its rows."""

from __future__ import annotations

import datetime as dt
import math
from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from fleet import words
from fleet.intake.cells import Cell, Place, is_blank, show
from fleet.intake.headings import Layout
from fleet.intake.known import LocationKey
from fleet.intake.results import ParkedRow, Row, Value
from fleet.intake.tables import Column
from fleet.words import Notice

Floats = NDArray[np.float64]

_MAY_HIDE_A_COLUMN = frozenset({"unknown column", "merged header", "error cell", "formula without value"})


@dataclass
class Block:
    """The table of one sheet, parsed.

    Parameters
    ----------
    table : str
        The table [text].
    place : Place
        File and sheet [text].
    layout : Layout
        Its header [-].
    row_nos : list of int
        Row number of each row that is not blank, counted from 1 [count].
    raw : dict
        Column name to its cells as they stand [-].
    texts : dict
        Column name to texts and choices; empty text where blank or unreadable [text].
    dates : dict
        Column name to dates; None where blank or unreadable [date].
    numbers : dict
        Column name to numbers in the unit they are kept in; NaN where blank or unreadable [-].
    unread : dict
        Column name to the rows whose cell holds something that could not be read [count].
    row_faults, row_doubts : dict
        Row, counted from 0, to its notices, each with its column [-].
    table_faults, table_doubts : list
        Notices of the sheet as a whole, each with its column [-].
    query : dict
        Row to the reason for which it is to be queried [text].
    left_out : set
        Rows that say what is on record already [count].
    added : dict
        Field to texts filled in by a check, in place of those read [text].
    """

    table: str
    place: Place
    layout: Layout
    row_nos: list[int]
    raw: dict[str, list[Cell]] = field(default_factory=dict)
    texts: dict[str, list[str]] = field(default_factory=dict)
    dates: dict[str, list[dt.date | None]] = field(default_factory=dict)
    numbers: dict[str, Floats] = field(default_factory=dict)
    unread: dict[str, set[int]] = field(default_factory=dict)
    row_faults: dict[int, list[tuple[int, Notice]]] = field(default_factory=dict)
    row_doubts: dict[int, list[tuple[int, Notice]]] = field(default_factory=dict)
    table_faults: list[tuple[int, Notice]] = field(default_factory=list)
    table_doubts: list[tuple[int, Notice]] = field(default_factory=list)
    query: dict[int, str] = field(default_factory=dict)
    left_out: set[int] = field(default_factory=set)
    added: dict[str, list[str]] = field(default_factory=dict)

    def __len__(self) -> int:
        return len(self.row_nos)

    def column_no(self, name: str) -> int:
        """Give the number of a column, counted from 1; 0 where the file has none.

        Parameters
        ----------
        name : str
            The column [text].

        Returns
        -------
        int
            The column, counted from 1 [count].
        """
        heading = self.layout.headings.get(name)
        return heading.index + 1 if heading is not None else 0

    def where(self, row: int, name: str = "") -> str:
        """Name the place of a row, or of one cell of it.

        Parameters
        ----------
        row : int
            The row, counted from 0 [count].
        name : str
            The column; without one, or where the file lacks it, the row is named [text].

        Returns
        -------
        str
            The place, as in messages [text].
        """
        number = self.column_no(name)
        row_no = self.row_nos[row]
        return self.place.cell(row_no, number) if number else self.place.row(row_no)

    def fault(self, code: str, row: int, name: str, found: str, remedy: str | None = None) -> None:
        """Note a fault of one row.

        Parameters
        ----------
        code : str
            Its code [text].
        row : int
            The row, counted from 0 [count].
        name : str
            The column [text].
        found : str
            What was found [text].
        remedy : str, optional
            What to do, where the catalogue can be made more exact [text].
        """
        notice = words.notice(code, self.where(row, name), found, remedy)
        self.row_faults.setdefault(row, []).append((self.column_no(name), notice))

    def doubt(self, code: str, row: int, name: str, found: str, remedy: str | None = None) -> None:
        """Note a doubt about one row; parameters as for `fault`.

        Parameters
        ----------
        code : str
            Its code [text].
        row : int
            The row, counted from 0 [count].
        name : str
            The column [text].
        found : str
            What was found [text].
        remedy : str, optional
            What to do [text].
        """
        notice = words.notice(code, self.where(row, name), found, remedy)
        self.row_doubts.setdefault(row, []).append((self.column_no(name), notice))

    def text(self, name: str) -> list[str]:
        """Give the texts of a column, empty where the file lacks it.

        Parameters
        ----------
        name : str
            The column [text].

        Returns
        -------
        list of str
            One text a row [text].
        """
        return self.texts.get(name) or [""] * len(self)

    def date(self, name: str) -> list[dt.date | None]:
        """Give the dates of a column, None where the file lacks it.

        Parameters
        ----------
        name : str
            The column [text].

        Returns
        -------
        list
            One date or None a row [date].
        """
        return self.dates.get(name) or [None] * len(self)

    def number(self, name: str) -> Floats:
        """Give the numbers of a column, NaN where the file lacks it.

        Parameters
        ----------
        name : str
            The column [text].

        Returns
        -------
        ndarray
            One number a row, in the unit kept [-].
        """
        found = self.numbers.get(name)
        return found if found is not None else np.full(len(self), np.nan)

    def was_unread(self, name: str, row: int) -> bool:
        """Tell whether something stands in a cell, or under a faulty heading, that could not be read.

        Parameters
        ----------
        name : str
            The column [text].
        row : int
            The row, counted from 0 [count].

        Returns
        -------
        bool
            Whether it could not be read [-].
        """
        heading = self.layout.headings.get(name)
        if heading is None:  # it may be the column whose heading could not be understood
            return any(notice.code in _MAY_HIDE_A_COLUMN for _, notice in self.layout.faults)
        return not heading.readable or row in self.unread.get(name, ())

    def written(self, name: str, row: int) -> str:
        """Give number and unit of a cell as written; empty where it is blank or has no unit.

        Parameters
        ----------
        name : str
            The column [text].
        row : int
            The row, counted from 0 [count].

        Returns
        -------
        str
            The value as written [text].
        """
        heading = self.layout.headings.get(name)
        if heading is None or heading.unit is None or math.isnan(self.numbers[name][row]):
            return ""
        return f"{show(self.raw[name][row])} {heading.unit.spelling}"

    def faults(self) -> list[Notice]:
        """Give every fault, in the order of the sheet.

        Returns
        -------
        list of Notice
            The faults [-].
        """
        return _in_order(self.table_faults, self.row_faults)

    def doubts(self) -> list[Notice]:
        """Give every doubt, in the order of the sheet.

        Returns
        -------
        list of Notice
            The doubts [-].
        """
        return _in_order(self.table_doubts, self.row_doubts)

    def typed_rows(self, which: Sequence[int]) -> list[Row]:
        """Build the typed rows.

        Parameters
        ----------
        which : sequence of int
            The rows, counted from 0 [count].

        Returns
        -------
        list of Row
            The rows, in the order asked for [-].
        """
        columns = [heading.column for heading in self.layout.headings.values() if heading.readable]
        fields = [column.field for column in columns if column.field not in self.added]
        values = [self._values(column) for column in columns if column.field not in self.added]
        fields += list(self.added)
        values += [[text or None for text in texts] for texts in self.added.values()]
        written = self._written_columns()
        rows = []
        for row in which:
            doubts = tuple(notice for _, notice in self.row_doubts.get(row, ()))
            as_written = {name: texts[row] for name, texts in written if texts[row]}
            because = self.query.get(row, "")
            rows.append(
                Row(
                    {name: cells[row] for name, cells in zip(fields, values, strict=True)},
                    as_written,
                    self.row_nos[row],
                    self.place.row(self.row_nos[row]),
                    doubts,
                    bool(because),
                    because,
                )
            )
        return rows

    def _written_columns(self) -> list[tuple[str, list[str]]]:
        columns = []
        for name, heading in self.layout.headings.items():
            if heading.unit is None:
                continue
            given = (~np.isnan(self.numbers[name])).tolist()
            seen: dict[Cell, str] = {}
            texts = []
            for cell, is_given in zip(self.raw[name], given, strict=True):
                if is_given and cell not in seen:
                    seen[cell] = f"{show(cell)} {heading.unit.spelling}"
                texts.append(seen[cell] if is_given else "")
            columns.append((name, texts))
        return columns

    def _values(self, column: Column) -> list[Value]:
        if column.kind == "number":
            numbers = self.numbers[column.name].tolist()
            if column.name == "year_built":
                return [None if math.isnan(number) else int(number) for number in numbers]
            return [None if math.isnan(number) else number for number in numbers]
        if column.kind == "date":
            return list(self.dates[column.name])
        return [text or None for text in self.texts[column.name]]

    def parked_row(self, row: int) -> ParkedRow:
        """Build what waits of a faulty row.

        Parameters
        ----------
        row : int
            The row, counted from 0 [count].

        Returns
        -------
        ParkedRow
            Its content and its faults [-].
        """
        content = {
            heading.text: show(self.raw[name][row])
            for name, heading in self.layout.headings.items()
            if not is_blank(self.raw[name][row])
        }
        faults = tuple(notice for _, notice in self.row_faults.get(row, ()))
        number = self.row_nos[row]
        return ParkedRow(
            self.table, self.place.file, self.place.sheet, number, self.place.row(number), content, faults
        )


@dataclass(frozen=True)
class Keys:
    """Location and day of each row of a table of readings.

    Parameters
    ----------
    locations : list
        Vessel, part and location; None where one of them cannot be read [text].
    days : list
        The day; None where it cannot be read [date].
    """

    locations: list[LocationKey | None]
    days: list[dt.date | None]


def read_keys(block: Block) -> Keys:
    """Read location and day of each row.

    Parameters
    ----------
    block : Block
        A table of readings [-].

    Returns
    -------
    Keys
        Its keys [-].
    """
    columns = zip(block.text("vessel"), block.text("part"), block.text("location"), strict=True)
    locations: list[LocationKey | None] = [key if all(key) else None for key in columns]
    return Keys(locations, block.date("taken_on"))


def _in_order(
    of_table: list[tuple[int, Notice]], of_rows: dict[int, list[tuple[int, Notice]]]
) -> list[Notice]:
    ordered = [notice for _, notice in sorted(of_table, key=lambda pair: pair[0])]
    for row in sorted(of_rows):
        ordered += [notice for _, notice in sorted(of_rows[row], key=lambda pair: pair[0])]
    return ordered
