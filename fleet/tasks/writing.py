"""Write a checked load of the register: entities, their rows, the facts of starting values, doubts, files."""

from __future__ import annotations

from collections import Counter
from dataclasses import dataclass
from datetime import datetime
from typing import Any

from fleet.errors import Refused
from fleet.intake.results import Intake, ParkedRow
from fleet.store import Engine, journal, models
from fleet.tasks.changes import KINDS, Change, Compared, Path
from fleet.tasks.files import Waiting, record_files
from fleet.tasks.known import OnRecord
from fleet.tasks.names import Names
from fleet.tasks.starting import Starting
from fleet.words import Notice


@dataclass(frozen=True)
class Plan:
    """All that one load is going to write.

    Parameters
    ----------
    intake : Intake
        The files as they were read [-].
    compared : Compared
        Their rows, compared with the record [-].
    starting : Starting
        The facts of their starting values [-].
    parked : list of ParkedRow
        Rows that wait and are not on record [-].
    done : list of dict
        Rows that waited and are settled [-].
    doubts : list of (tuple of str, Notice)
        What is to be doubted, by the path of what it is about [-].
    cleared : list of dict
        Doubts on record that the new rows have settled [-].
    """

    intake: Intake
    compared: Compared
    starting: Starting
    parked: list[ParkedRow]
    done: list[Waiting]
    doubts: list[tuple[Path, Notice]]
    cleared: list[dict[str, Any]]

    @property
    def empty(self) -> bool:
        """Whether there is nothing to write."""
        facts_made = self.starting or self.intake.rows("inspections")
        return not (self.compared.changes or facts_made or self.parked or self.done)

    @property
    def counts(self) -> dict[str, int]:
        """Rows to be written by table, in words for people."""
        counts = Counter(change.table for change in self.compared.changes)
        counts["inspections"] = len(self.intake.rows("inspections")) + len(self.starting.inspections)
        counts["starting values"] = (
            len(self.starting.states) + len(self.starting.decisions) + len(self.starting.baselines)
        )
        order = (*KINDS, "inspections", "starting values")
        return {table: counts[table] for table in order if counts[table]}


def write_plan(engine: Engine, plan: Plan, record: OnRecord, *, by: str, at: datetime | None) -> int:
    """Write a load of the register in one journal entry.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    plan : Plan
        What is to be written [-].
    record : OnRecord
        What the load was compared with [-].
    by : str
        Who loads it [text].
    at : datetime or None
        Moment of the entry; now where None [date].

    Returns
    -------
    int
        Number of the journal entry.

    Raises
    ------
    Refused
        If somebody else wrote while the files were being checked.
    """
    with journal.writer(engine, task="register load", by=by, at=at) as entry:
        refuse_if_overtaken(entry, record.reader.known)
        ids = _Ids(record.names)
        for table, kind in KINDS.items():
            changes = [change for change in plan.compared.changes if change.table == table]
            _add_entities(entry, ids, kind.entity, changes)
            parent = kind.parent
            entry.add(
                kind.model,
                [
                    {
                        **change.values,
                        "entity_id": ids.of(kind.entity, change.path),
                        **({} if parent is None else {parent: ids.parent(change.path)}),
                    }
                    for change in changes
                ],
            )
        _add_facts(entry, ids, plan)
        record_files(entry, plan.intake, kind="register", parked=plan.parked, done=plan.done)
        return int(entry.no)


def refuse_if_overtaken(entry: journal.Entry, known: int) -> None:
    """Refuse to write on what was read before somebody else wrote.

    Parameters
    ----------
    entry : journal.Entry
        The journal entry, under its lock [-].
    known : int
        Number of the last entry that was read [count].

    Raises
    ------
    Refused
        If another entry came in between.
    """
    if entry.no != known + 1:
        raise Refused(
            f"journal entry {entry.no}",
            "somebody else wrote to the record while the file was being checked",
            "run the command again; nothing was recorded",
        )


class _Ids:
    """The entities on record and those that this entry makes."""

    def __init__(self, names: Names) -> None:
        self._names = names
        self._made: dict[tuple[str, Path], int] = {}

    def made(self, kind: str, path: Path, entity: int) -> None:
        """Remember an entity that this entry made."""
        self._made[kind, path] = entity

    def of(self, kind: str, path: Path) -> int:
        """Give the entity of a path."""
        if (kind, path) in self._made:
            return self._made[kind, path]
        return self._names.by_key[kind, self.parent(path), path[-1]]

    def parent(self, path: Path) -> int | None:
        """Give the entity that a path hangs on."""
        return None if len(path) == 1 else self.of(("vessel", "part")[len(path) - 2], path[:-1])

    def about(self, path: Path) -> dict[str, int]:
        """Give the columns that say what a doubt is about."""
        kinds = ("vessel", "part", "location")
        return {
            f"{kind}_id": self.of(kind, path[: depth + 1]) for depth, kind in enumerate(kinds[: len(path)])
        }


def _add_entities(entry: journal.Entry, ids: _Ids, kind: str, changes: list[Change]) -> None:
    new = [change.path for change in changes if change.new]
    rows = [{"kind": kind, "parent_id": ids.parent(path), "tag": path[-1]} for path in new]
    for path, entity in zip(new, entry.add(models.Entity, rows), strict=True):
        ids.made(kind, path, entity)


def _add_facts(entry: journal.Entry, ids: _Ids, plan: Plan) -> None:
    starting = plan.starting
    inspections = [{"vessel_id": ids.of("vessel", path), **fact} for path, fact in starting.inspections]
    inspections += [
        {
            "vessel_id": ids.of("vessel", (str(row.values["vessel"]),)),
            **{name: row.values.get(name) for name in ("kind", "done_on", "extent", "inspector", "report")},
        }
        for row in plan.intake.rows("inspections")
    ]
    entry.add(models.Inspection, inspections)
    entry.add(
        models.Decision, [{"vessel_id": ids.of("vessel", path), **fact} for path, fact in starting.decisions]
    )
    kinds = ("vessel", "part", "location")
    entry.add(
        models.DatedState,
        [{"subject_id": ids.of(kinds[len(path) - 1], path), **fact} for path, fact in starting.states],
    )
    readings = entry.add(
        models.Reading,
        [{"location_id": ids.of("location", path), **fact} for path, fact in starting.baselines],
    )
    of_reading = dict(zip((path for path, _ in starting.baselines), readings, strict=True))
    doubts = [
        {**doubt_row(one), **ids.about(path), "reading_id": _reading_of(of_reading, path, one)}
        for path, one in plan.doubts
    ]
    entry.add(models.Doubt, [*doubts, *plan.cleared])


def _reading_of(readings: dict[Path, int], path: Path, one: Notice) -> int | None:
    """Tie a doubt about a wall to the baseline it is about."""
    about_wall = one.code in {"thickness far above nominal", "suspected unit slip", "baseline equals nominal"}
    return readings.get(path) if about_wall else None


def doubt_row(one: Notice) -> dict[str, str]:
    """Give the columns of an open doubt.

    Parameters
    ----------
    one : Notice
        The doubt [-].

    Returns
    -------
    dict of str to str
    """
    return {
        "code": one.code,
        "where_text": one.where,
        "found": one.found,
        "remedy": one.remedy,
        "status": "open",
    }
