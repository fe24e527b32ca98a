"""Register tables in: vessels, parts, locations, inspections and relief devices, which may refer to each other."""

from __future__ import annotations

import datetime as dt
from collections.abc import Collection, Sequence
from dataclasses import dataclass, field
from pathlib import Path

from fleet.intake import tables, taking
from fleet.intake.block import Block
from fleet.intake.check_items import Checks
from fleet.intake.known import KnownRegister
from fleet.intake.results import Intake
from fleet.intake.taking import FileTaken

Key = tuple[str, ...]


@dataclass
class Load:
    """All rows of one load, by what they name.

    Parameters
    ----------
    known : KnownRegister
        The register on record [-].
    rows : dict
        Table, then key, to the rows that name it: file, block, row [count].
    """

    known: KnownRegister
    rows: dict[str, dict[Key, list[tuple[int, Block, int]]]] = field(default_factory=dict)

    def on_record(self, key: Key) -> bool:
        """Tell whether a vessel or part is on record.

        Parameters
        ----------
        key : tuple of str
            Vessel, or vessel and part [text].

        Returns
        -------
        bool
            Whether it is [-].
        """
        if len(key) == 1:
            return key[0] in self.known.vessels
        return (key[0], key[1]) in self.known.parts

    def in_load(self, key: Key) -> list[tuple[int, Block, int]]:
        """Give the rows of the load that name a vessel or part.

        Parameters
        ----------
        key : tuple of str
            Vessel, or vessel and part [text].

        Returns
        -------
        list
            File, block and row of each [count].
        """
        return self.rows.get("vessels" if len(key) == 1 else "parts", {}).get(key, [])


def read_register(
    paths: Sequence[str | Path],
    *,
    known: KnownRegister,
    today: dt.date,
    rule_sets: Collection[str],
    design_codes: Collection[str],
    park: bool = False,
) -> Intake:
    """Read the files of one load of the register.

    Parameters
    ----------
    paths : sequence of str or Path
        The files; rows may refer to rows of another file or sheet of the load, in any order [text].
    known : KnownRegister
        The register on record [-].
    today : date
        No past event may be dated later [date].
    rule_sets, design_codes : collection of str
        The in-service rule sets and pressure codes that are installed [text].
    park : bool
        Whether faulty rows wait instead of refusing their file [-].

    Returns
    -------
    Intake
        Rows, faults and doubts. A refused file gives no rows, and neither does a file whose rows hang on it [-].

    Raises
    ------
    Refused
        Where a file cannot be opened at all.
    """
    files = [taking.take_in(path, tables.REGISTER_TABLES, known.files) for path in paths]
    load = Load(known)
    for number, file in enumerate(files):
        for block in file.blocks:
            _index(load, number, block)
    _find_duplicates(load)
    checks = Checks(known, today, rule_sets, design_codes, _shapes(load), _in_service(load), _nominals(load))
    for file in files:
        for block in file.blocks:
            checks.check(block)
            _find_parents(load, block)
    refused = _settle(load, files, park=park)
    rows = taking.sort_rows(files, refused, park=park)
    return Intake(
        tables=tuple(rows.tables),
        faults=tuple(fault for file in files for fault in taking.all_faults(file)),
        doubts=tuple(doubt for file in files for doubt in taking.all_doubts(file)),
        files=tuple(file.about(refused=number in refused) for number, file in enumerate(files)),
        parked=tuple(rows.parked),
    )


# -----------------------------------------------------------------------------------------------------------
# What the load itself says
# -----------------------------------------------------------------------------------------------------------
def _keys(block: Block, names: Sequence[str]) -> list[Key]:
    """Give the key of each row; empty where a part of it cannot be read."""
    columns = [
        [str(day) if day else "" for day in block.date(name)]
        if tables.column(block.table, name).kind == "date"
        else block.text(name)
        for name in names
    ]
    return [key if all(key) else () for key in zip(*columns, strict=True)]


def _index(load: Load, file: int, block: Block) -> None:
    by_key = load.rows.setdefault(block.table, {})
    for row, key in enumerate(_keys(block, tables.NAMED_BY[block.table])):
        if key:
            by_key.setdefault(key, []).append((file, block, row))


def _find_duplicates(load: Load) -> None:
    for table, by_key in load.rows.items():
        for key, rows in by_key.items():
            for number, (_, block, row) in enumerate(rows if len(rows) > 1 else ()):
                _, other, other_row = rows[0 if number else 1]
                found = f"{' / '.join(key)} stands also in {other.where(other_row)}"
                block.fault("duplicate row", row, tables.NAMED_BY[table][-1], found)


def _shapes(load: Load) -> dict[Key, str]:
    shapes: dict[Key, str] = {key: part.shape for key, part in load.known.parts.items() if part.shape}
    for key, rows in load.rows.get("parts", {}).items():
        _, block, row = rows[0]
        shapes[key] = block.text("shape")[row] or shapes.get(key, "")
    return shapes


def _in_service(load: Load) -> dict[str, dt.date]:
    days = {tag: one.in_service_on for tag, one in load.known.vessels.items() if one.in_service_on}
    for key, rows in load.rows.get("vessels", {}).items():
        _, block, row = rows[0]
        day = block.date("in_service_on")[row]
        if day is not None:
            days[key[0]] = day
    return days


def _nominals(load: Load) -> dict[Key, tuple[float, float]]:
    """Nominal wall and lining of every part, as the load says or else as is on record."""
    from fleet.intake.doubt_numbers import lining_of

    found: dict[Key, tuple[float, float]] = {
        key: (part.nominal_thickness_mm, lining_of(part)) for key, part in load.known.parts.items()
    }
    for key, rows in load.rows.get("parts", {}).items():
        _, block, row = rows[0]
        lining = float(block.number("lining_thickness")[row])
        is_lined = block.text("lining")[row] not in {"", "none"} and lining > 0
        found[key] = float(block.number("nominal_thickness")[row]), lining if is_lined else 0.0
    return found


# -----------------------------------------------------------------------------------------------------------
# What refers to what
# -----------------------------------------------------------------------------------------------------------
def _parent_names(table: str) -> tuple[str, ...]:
    return {"vessels": (), "locations": ("vessel", "part")}.get(table, ("vessel",))


def _find_parents(load: Load, block: Block) -> None:
    names = _parent_names(block.table)
    searches = 0
    for row, key in enumerate(zip(*(block.text(name) for name in names), strict=True)) if names else ():
        for depth in range(1, len(names) + 1):
            parent = key[:depth]
            if not all(parent):
                break
            if load.on_record(parent) or load.in_load(parent):
                continue
            searches += 1
            name = names[depth - 1]
            of = f" of vessel '{key[0]}'" if depth == 2 else ""
            near = _nearest(load, parent) if searches <= 20 else None
            remedy = f"did you mean '{near}'? Otherwise load the {name} too" if near else None
            block.fault(f"unknown {name}", row, name, f"{name} '{parent[-1]}'{of}", remedy)
            break


def _nearest(load: Load, parent: Key) -> str | None:
    if len(parent) == 1:
        candidates = [*load.known.vessels, *(key[0] for key in load.rows.get("vessels", {}))]
    else:
        keys: list[Key] = [*load.known.parts, *load.rows.get("parts", {})]
        candidates = [key[1] for key in keys if key[0] == parent[0]]
    return tables.nearest(parent[-1], candidates)


def _settle(load: Load, files: list[FileTaken], *, park: bool) -> set[int]:
    """Refuse files, and hold back what hangs on a row that does not load, until nothing changes any more."""
    refused = {number for number, file in enumerate(files) if not file.loaded_as and not file.is_sound()}
    while True:
        changed = False
        for number, file in enumerate(files):
            if number in refused or file.loaded_as:
                continue
            for block in file.blocks:
                changed |= _hold_back(load, block, refused)
            if not park and any(block.row_faults for block in file.blocks):
                refused.add(number)
                changed = True
        if not changed:
            return refused


def _hold_back(load: Load, block: Block, refused: set[int]) -> bool:
    changed = False
    names = _parent_names(block.table)
    keys = list(zip(*(block.text(name) for name in names), strict=True)) if names else []
    for row, key in enumerate(keys):
        if row in block.row_faults:
            continue
        for depth in range(1, len(names) + 1):
            rows = [] if load.on_record(key[:depth]) else load.in_load(key[:depth])
            if rows and all(file in refused or row_ in one.row_faults for file, one, row_ in rows):
                _, parent, parent_row = rows[0]
                name = names[depth - 1]
                found = f"{name} '{key[depth - 1]}' stands only in {parent.where(parent_row)}, which does not load"
                block.fault(f"unknown {name}", row, name, found, "mend that row and load both again")
                changed = True
                break
    return changed
