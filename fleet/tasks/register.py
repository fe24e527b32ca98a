"""Load the register: what is new and what differs is written, what is on record already is not."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from datetime import date, datetime
from pathlib import Path as FilePath
from typing import Any

from fleet.errors import FileRefused
from fleet.intake.results import Intake
from fleet.rules import DESIGN_CODES, rule_set_names
from fleet.store import Engine, models
from fleet.tasks.changes import KINDS, Change, Compared, Path, compare, register_rows
from fleet.tasks.files import Waiting, new_parked, settled, waiting_on_record
from fleet.tasks.known import OnRecord, fetch_on_record
from fleet.tasks.printing import counted
from fleet.tasks.reader import Reader
from fleet.tasks.starting import starting_values
from fleet.tasks.writing import Plan, write_plan
from fleet.words import Notice

NOT_KEPT = frozenset({"already loaded", "already on record"})
"""Doubts that are told once and not kept: they say that nothing was done [text]."""


_ONE_OF = {
    **{table: kind.entity for table, kind in KINDS.items()},
    "inspections": "inspection",
    "starting values": "starting value",
}
"""The word for one row of each table [text]."""


@dataclass(frozen=True)
class RegisterLoaded:
    """What a load of the register did.

    Parameters
    ----------
    wrote : dict of str to int
        Rows written, by table [count].
    unchanged : int
        Rows that say what is on record already [count].
    parked : int
        Rows that wait [count].
    faults, doubts : tuple of Notice
        All that were found [-].
    refused : FileRefused or None
        Why nothing was loaded [-].
    dry_run : bool
        Whether nothing was to be written [-].
    entry_no : int or None
        Number of the journal entry; None where nothing was written [count].
    already_loaded : tuple of str
        Files that were loaded before [text].
    """

    wrote: dict[str, int] = field(default_factory=dict)
    unchanged: int = 0
    parked: int = 0
    faults: tuple[Notice, ...] = ()
    doubts: tuple[Notice, ...] = ()
    refused: FileRefused | None = None
    dry_run: bool = False
    entry_no: int | None = None
    already_loaded: tuple[str, ...] = ()

    @property
    def loaded(self) -> int:
        """Rows written."""
        return sum(self.wrote.values())

    @property
    def waiting(self) -> tuple[Notice, ...]:
        """The faults of rows that wait; those of a refused file stand in its refusal."""
        return self.faults if self.refused is None else ()

    @property
    def doubts_of_loaded(self) -> tuple[Notice, ...]:
        """The doubts, unless a refusal tells them."""
        told = () if self.refused is not None else self.doubts
        return tuple(one for one in told if one.code != "already loaded")

    def as_json(self) -> dict[str, Any]:
        """Give the document for ``--json``."""
        return {
            "loaded": self.loaded,
            "unchanged": self.unchanged,
            "parked": self.parked,
            "faults": [one.as_dict() for one in self.faults],
            "doubts": [one.as_dict() for one in self.doubts],
        }

    def sentence(self) -> str:
        """Say in a line or two what was done."""
        said = [f"{name} was loaded before; nothing of it was changed." for name in self.already_loaded]
        rows = ", ".join(counted(count, _ONE_OF.get(table, table)) for table, count in self.wrote.items())
        verb = "Would be written" if self.dry_run else "Written"
        more = [f"{verb}: {rows}"] if rows else []
        more += [f"On record already: {counted(self.unchanged, 'row')}"] if self.unchanged else []
        more += [f"Waiting in 'fleet gaps': {counted(self.parked, 'row')}"] if self.parked else []
        said += [". ".join([*more, ""]).strip()] if more else []
        said += [f"Journal entry {self.entry_no}."] if self.entry_no is not None else []
        return " ".join(said)


def load_register(
    engine: Engine,
    files: Sequence[FilePath],
    *,
    by: str,
    today: date,
    from_on: date | None = None,
    dry_run: bool = False,
    park: bool = False,
    at: datetime | None = None,
) -> RegisterLoaded:
    """Load vessels, parts, locations, relief devices and inspections.

    The files of one load are checked together, for their rows may refer to one another. Each is loaded as a whole
    or not at all; what is loaded is one journal entry.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    files : sequence of pathlib.Path
        CSV files or workbooks [text].
    by : str
        Who loads them [text].
    today : date
        The day of the load [date].
    from_on : date, optional
        The day of the change that the rows tell of; without it they correct what is on record [date].
    dry_run : bool
        Check everything and write nothing [-].
    park : bool
        Load the good rows and let the others wait [-].
    at : datetime, optional
        Moment of the entry; now where absent [date].

    Returns
    -------
    RegisterLoaded
        With `refused` set where faults keep a file out: nothing of it was written then.

    Raises
    ------
    Refused
        If a file cannot be opened at all, or somebody else wrote while the files were being checked.
    """
    from fleet.intake.check_register import read_register

    with engine.connect() as conn:
        record = fetch_on_record(Reader.at(conn, as_of=today))
        in_force = register_rows(record.reader, from_on)
        waiting = waiting_on_record(record.reader)
        record.reader.rows(models.Doubt)
    # The connection is closed: nobody has to wait while the files are checked.
    intake = read_register(
        files,
        # a change from a day is another matter than what the same file said before
        known=record.register if from_on is None else replace(record.register, files={}),
        today=today,
        rule_sets=rule_set_names(),
        design_codes=tuple(DESIGN_CODES),
        park=park,
    )
    before = tuple(file.name for file in intake.files if file.already_loaded)
    compared = compare(intake, in_force, names=record.names, from_on=from_on)
    plan = _plan(intake, record, compared, waiting, by=by, today=today)
    number = None if dry_run or plan.empty else write_plan(engine, plan, record, by=by, at=at)
    return RegisterLoaded(
        wrote=plan.counts,
        unchanged=plan.compared.unchanged,
        parked=len(intake.parked),
        faults=intake.faults,
        doubts=(*intake.doubts, *(one for _, one in compared.taken_off)),
        refused=_refusal(intake) if intake.refused else None,
        dry_run=dry_run,
        entry_no=number,
        already_loaded=before,
    )


def _refusal(intake: Intake) -> FileRefused:
    names = ", ".join(file.name for file in intake.files if file.refused)
    count = len(intake.faults)
    return FileRefused(
        names,
        f"{counted(count, 'fault')}; nothing of it was loaded",
        "correct them and load again, or load the good rows with --park-bad-rows",
        intake.faults,
        intake.doubts,
    )


def _plan(
    intake: Intake, record: OnRecord, compared: Compared, waiting: list[Waiting], *, by: str, today: date
) -> Plan:
    starting = starting_values(
        compared.rows, intake.rows("inspections"), known=record.register, by=by, today=today
    )
    told = [(_about(change), one) for change in compared.changes for one in change.row.doubts]
    told += [((str(row.values["vessel"]),), one) for row in intake.rows("inspections") for one in row.doubts]
    told = [(path, one) for path, one in told if one.code not in NOT_KEPT]
    told += compared.taken_off
    doubts, cleared = _doubts(record, compared, told)
    return Plan(
        intake,
        compared,
        starting,
        new_parked(intake.parked, waiting),
        settled(waiting, intake),
        [*doubts, *starting.notices],
        cleared,
    )


def _about(change: Change) -> Path:
    """Say what a doubt of a row is about; one of a relief device is about its vessel."""
    return change.path[:1] if change.table == "relief" else change.path


def _doubts(
    record: OnRecord, compared: Compared, told: list[tuple[Path, Notice]]
) -> tuple[list[tuple[Path, Notice]], list[dict[str, Any]]]:
    """Find the doubts to be added, and those on record that the new rows have settled."""
    columns = record.reader.rows(models.Doubt)
    changed = {change.path for change in compared.changes if not change.new and change.table != "relief"}
    again = {(path, one.code, one.found) for path, one in told}
    standing: set[tuple[Path, str, str]] = set()
    cleared: list[dict[str, Any]] = []
    for row in range(len(columns["id"])):
        values = {name: column[row] for name, column in columns.items()}
        about = values["location_id"] or values["part_id"] or values["vessel_id"]
        if values["status"] != "open" or values["reading_id"] is not None or about is None:
            continue
        key = (record.names.path(about), values["code"], values["found"])
        if key in again:
            standing.add(key)
        elif key[0] in changed and values["code"] != "missing datum":
            kept = {name: value for name, value in values.items() if name not in {"id", "entry_no", "mark"}}
            cleared.append({**kept, "status": "cleared", "replaces_id": values["id"]})
    added = [(path, one) for path, one in told if (path, one.code, one.found) not in standing]
    return added, cleared
