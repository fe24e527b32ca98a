"""What intake hands back: typed rows, parked rows, faults, doubts and thin readings."""

from __future__ import annotations

import datetime as dt
from dataclasses import dataclass, field
from typing import Any

from fleet.words import Notice

Value = str | float | int | dt.date | None


@dataclass(frozen=True)
class Row:
    """One good row.

    Parameters
    ----------
    values : dict
        Field to value, for every column the file has; blank is None, dates are dates [-].
    written : dict
        Physical column to the value as written, with its unit [text].
    row_no : int
        The row in the file, counted from 1 [count].
    where : str
        File, sheet and row, as in messages [text].
    doubts : tuple of Notice
        The doubts raised about this row [-].
    query : bool
        Whether the reading (of a location: its baseline) is to be recorded as queried [-].
    because : str
        Why [text].
    """

    values: dict[str, Value]
    written: dict[str, str]
    row_no: int
    where: str
    doubts: tuple[Notice, ...] = ()
    query: bool = False
    because: str = ""


@dataclass(frozen=True)
class Typed:
    """The good rows of one table of one sheet.

    Parameters
    ----------
    table, file, sheet : str
        The table, and where it was read; the sheet is empty for CSV [text].
    rows : tuple of Row
        The rows, in the order of the file [-].
    """

    table: str
    file: str
    sheet: str
    rows: tuple[Row, ...]


@dataclass(frozen=True)
class ParkedRow:
    """One row that waits.

    Parameters
    ----------
    table, file, sheet : str
        The table, and where the row stands [text].
    row_no : int
        The row in the file, counted from 1 [count].
    where : str
        File, sheet and row, as in messages [text].
    content : dict
        Heading, with its unit, to the cell as text [text].
    faults : tuple of Notice
        What keeps it waiting [-].
    """

    table: str
    file: str
    sheet: str
    row_no: int
    where: str
    content: dict[str, str]
    faults: tuple[Notice, ...]


@dataclass(frozen=True)
class FileIn:
    """One file of a load.

    Parameters
    ----------
    name, sha256 : str
        Its name, and the digest of its bytes [text].
    refused : bool
        Whether nothing of it may be loaded [-].
    already_loaded : bool
        Whether this very file was loaded before [-].
    """

    name: str
    sha256: str
    refused: bool
    already_loaded: bool


@dataclass(frozen=True)
class Intake:
    """What a load brought; common to register and surveys.

    Parameters
    ----------
    tables : tuple of Typed
        The rows to be loaded; none of a refused file [-].
    faults, doubts : tuple of Notice
        All of them, in the order of the files [-].
    files : tuple of FileIn
        The files [-].
    parked : tuple of ParkedRow
        Rows that wait; only where parking was asked for [-].
    """

    tables: tuple[Typed, ...]
    faults: tuple[Notice, ...]
    doubts: tuple[Notice, ...]
    files: tuple[FileIn, ...]
    parked: tuple[ParkedRow, ...] = ()

    @property
    def refused(self) -> bool:
        """Whether any file was refused."""
        return any(file.refused for file in self.files)

    @property
    def sha256(self) -> str:
        """The digest of the first file."""
        return self.files[0].sha256

    def rows(self, table: str) -> list[Row]:
        """Give all rows of one table.

        Parameters
        ----------
        table : str
            The table [text].

        Returns
        -------
        list of Row
            Its rows over all files and sheets [-].
        """
        return [row for typed in self.tables if typed.table == table for row in typed.rows]


@dataclass(frozen=True)
class SurveyIntake(Intake):
    """What one survey file brought.

    Parameters
    ----------
    thin : tuple of dict
        Every reading at or below its alert or required thickness, whatever became of the file: `vessel, part,
        location, taken_on, thickness_mm, alert_thickness_mm, required_thickness_mm, where, which`; dates are
        ISO text, missing values None [-].
    """

    thin: tuple[dict[str, Any], ...] = field(default=())
