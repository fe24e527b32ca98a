"""What register and surveys have in common: open files, find their tables, give back what may be loaded."""

from __future__ import annotations

import hashlib
from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path

from fleet import errors, words
from fleet.intake import tables
from fleet.intake.block import Block
from fleet.intake.cells import Book, Sheet, is_blank, show
from fleet.intake.headings import identify
from fleet.intake.parse import parse_block
from fleet.intake.results import FileIn, ParkedRow, Typed
from fleet.intake.sheets import read_file
from fleet.words import Notice


@dataclass
class FileTaken:
    """One file of a load, opened.

    Parameters
    ----------
    name, sha256 : str
        Its name, and the digest of its bytes [text].
    blocks : list of Block
        Its tables [-].
    faults, doubts : list of Notice
        Notices of the file as a whole [-].
    loaded_as : str
        What this very file was loaded as before; empty where it was not [text].
    """

    name: str
    sha256: str
    blocks: list[Block] = field(default_factory=list)
    faults: list[Notice] = field(default_factory=list)
    doubts: list[Notice] = field(default_factory=list)
    loaded_as: str = ""

    def is_sound(self) -> bool:
        """Whether nothing but single rows is faulty.

        Returns
        -------
        bool
            Whether the file as a whole is without fault [-].
        """
        return not self.faults and not any(block.table_faults for block in self.blocks)

    def about(self, *, refused: bool) -> FileIn:
        """Say what became of the file.

        Parameters
        ----------
        refused : bool
            Whether it is refused [-].

        Returns
        -------
        FileIn
            What became of it [-].
        """
        return FileIn(self.name, self.sha256, refused, bool(self.loaded_as))


def take_in(path: str | Path, wanted: Collection[str], loaded: Mapping[str, str] | None = None) -> FileTaken:
    """Open a file and parse the tables that are wanted.

    Parameters
    ----------
    path : str or Path
        The file [text].
    wanted : collection of str
        The tables that are taken in [text].
    loaded : mapping, optional
        SHA-256 of files loaded before to what they were loaded as [text].

    Returns
    -------
    FileTaken
        Its tables, and the faults of the file as a whole [-].

    Raises
    ------
    Refused
        Where the file cannot be opened at all.
    """
    try:
        book = read_file(path)
    except errors.FileRefused as refused:
        digest = hashlib.sha256(Path(path).read_bytes()).hexdigest()
        return FileTaken(Path(path).name, digest, faults=list(refused.faults))
    taken = FileTaken(book.file, book.sha256, loaded_as=(loaded or {}).get(book.sha256, ""))
    passed_over = _find_tables(taken, book, wanted)
    if not taken.blocks and not taken.faults:
        found = "; ".join(notice.found for notice in passed_over)
        listed = ", ".join(wanted)
        taken.faults.append(
            words.notice("no table found", book.file, f"{found or 'no header row'}; wanted: {listed}")
        )
    else:
        taken.doubts.extend(passed_over)
    if taken.blocks and taken.is_sound() and not any(len(block) for block in taken.blocks):
        taken.faults.append(words.notice("empty file", book.file, "headings, and no row below them"))
    return taken


def _find_tables(taken: FileTaken, book: Book, wanted: Collection[str]) -> list[Notice]:
    passed_over = []
    for sheet in book.sheets:
        if not (sheet.errors or sheet.unsaved) and all(is_blank(cell) for row in sheet.rows for cell in row):
            continue
        identified = identify(sheet, wanted)
        if identified.layout is not None:
            taken.blocks.append(parse_block(sheet, identified.layout))
        elif identified.other:
            command = "fleet survey load" if identified.other == "readings" else "fleet register load"
            found = f"a table '{identified.other}'"
            passed_over.append(
                words.notice("sheet not taken", sheet.place.text, found, f"load it with '{command}'")
            )
        elif sheet.place.sheet.strip().casefold() in tables.TABLES:
            found = f"the sheet is named as a table; {_first_words(sheet)}"
            taken.faults.append(words.notice("no table found", sheet.place.text, found))
        else:
            found = f"no headings of a known table; {_first_words(sheet)}"
            passed_over.append(words.notice("sheet not taken", sheet.place.text, found))
    return passed_over


def _first_words(sheet: Sheet) -> str:
    for row_no, row in enumerate(sheet.rows, 1):
        texts = [f"'{show(cell)[:40]}'" for cell in row if not is_blank(cell)]
        if texts:
            return f"row {row_no} begins {', '.join(texts[:5])}"
    return "it holds errors only"


@dataclass
class Sorted:
    """What may be loaded, and what waits.

    Parameters
    ----------
    tables : list of Typed
        Rows to be loaded [-].
    parked : list of ParkedRow
        Rows that wait [-].
    """

    tables: list[Typed] = field(default_factory=list)
    parked: list[ParkedRow] = field(default_factory=list)


def sort_rows(files: Sequence[FileTaken], refused: Collection[int], *, park: bool) -> Sorted:
    """Sort the rows of the files that are not refused into those to be loaded and those that wait.

    Parameters
    ----------
    files : sequence of FileTaken
        The files [-].
    refused : collection of int
        Which of them are refused, counted from 0 [count].
    park : bool
        Whether faulty rows wait instead of refusing their file [-].

    Returns
    -------
    Sorted
        The rows [-].
    """
    result = Sorted()
    for number, file in enumerate(files):
        if number in refused or file.loaded_as:
            continue
        for block in file.blocks:
            left = block.left_out | block.row_faults.keys()
            good = [row for row in range(len(block)) if row not in left]
            place = block.place
            result.tables.append(Typed(block.table, place.file, place.sheet, tuple(block.typed_rows(good))))
            if park:
                result.parked += [block.parked_row(row) for row in sorted(block.row_faults)]
    return result


def all_faults(file: FileTaken) -> list[Notice]:
    """Give every fault of a file.

    Parameters
    ----------
    file : FileTaken
        The file [-].

    Returns
    -------
    list of Notice
        Those of the file, then those of its sheets [-].
    """
    if file.loaded_as:
        return []
    return [*file.faults, *(fault for block in file.blocks for fault in block.faults())]


def all_doubts(file: FileTaken) -> list[Notice]:
    """Give every doubt of a file; of one loaded before, only that.

    Parameters
    ----------
    file : FileTaken
        The file [-].

    Returns
    -------
    list of Notice
        Those of the file, then those of its sheets [-].
    """
    if file.loaded_as:
        return [words.notice("already loaded", file.name, f"the same bytes were loaded as {file.loaded_as}")]
    return [*file.doubts, *(doubt for block in file.blocks for doubt in block.doubts())]
