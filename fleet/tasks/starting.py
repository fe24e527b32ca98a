"""The starting values of a register: they become, at first load, the facts they stand for."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from datetime import date
from typing import Any

from fleet.intake.known import KnownRegister
from fleet.intake.results import Row
from fleet.tasks.changes import Path
from fleet.words import Notice, notice

IN_SERVICE = "in service"
STARTING_BASIS = "starting value of the register"
"""Why a fact stands that came with the first load of the register [text]."""


@dataclass
class Starting:
    """The facts that the starting values of one load stand for, by the path of what they are about.

    Parameters
    ----------
    states, decisions, inspections, baselines : list
        Rows of the store without the entity they are about [-].
    notices : list
        What the reader must know about them [-].
    """

    states: list[tuple[Path, dict[str, Any]]] = field(default_factory=list)
    decisions: list[tuple[Path, dict[str, Any]]] = field(default_factory=list)
    inspections: list[tuple[Path, dict[str, Any]]] = field(default_factory=list)
    baselines: list[tuple[Path, dict[str, Any]]] = field(default_factory=list)
    notices: list[tuple[Path, Notice]] = field(default_factory=list)

    def __bool__(self) -> bool:
        return bool(self.states or self.decisions or self.inspections or self.baselines)


def starting_values(
    rows: Iterable[tuple[str, Path, bool, Row]],
    inspections: Iterable[Row],
    *,
    known: KnownRegister,
    by: str,
    today: date,
) -> Starting:
    """Turn starting values into facts.

    A value that agrees with the facts on record writes nothing; one that differs was refused before.

    Parameters
    ----------
    rows : iterable of (str, tuple of str, bool, Row)
        Every row of the load: table, path, whether its entity is new, the row [-].
    inspections : iterable of Row
        The inspections of the same load, so that none is written twice [-].
    known : KnownRegister
        What is on record [-].
    by : str
        Who loads it [text].
    today : date
        The day of the load: from it counts a state without a date [date].

    Returns
    -------
    Starting
    """
    told = {(row.values["vessel"], row.values["kind"], row.values["done_on"]) for row in inspections}
    made = Starting()
    for table, path, new, row in rows:
        if new and row.values.get("state") not in {None, IN_SERVICE}:
            made.states.append((path, _state(row, today)))
        if table == "vessels":
            _of_vessel(made, path, row, new=new, known=known, told=told, by=by)
        elif table == "locations":
            _of_location(made, path, row, known=known)
    return made


def _state(row: Row, today: date) -> dict[str, Any]:
    return {"state": row.values["state"], "from_on": today, "date_known": "no", "reason": STARTING_BASIS}


def _of_vessel(
    made: Starting,
    path: Path,
    row: Row,
    *,
    new: bool,
    known: KnownRegister,
    told: set[tuple[Any, Any, Any]],
    by: str,
) -> None:
    values = row.values
    if new and values.get("current_mawp_mpa") is not None:
        began = values.get("current_mawp_from")
        made.decisions.append(
            (
                path,
                {
                    "kind": "re-rating",
                    "decided_on": began or values["in_service_on"],
                    "effective_on": began or values["in_service_on"],
                    "pressure_mpa": values["current_mawp_mpa"],
                    "reason": values.get("current_mawp_basis") or STARTING_BASIS,
                    "decided_by": by,
                    "written": _written(row, "current_mawp", "pressure"),
                },
            )
        )
        if began is None and values["current_mawp_mpa"] != values.get("nameplate_mawp_mpa"):
            found = "current_mawp_from is blank; the current MAWP is taken to hold since in-service"
            made.notices.append((path, notice("missing datum", f"{row.where}, current_mawp_from", found)))
    on_record = known.vessels[path[0]].recorded if path[0] in known.vessels else {}
    for column, kind in (("last_internal_on", "internal"), ("last_external_on", "external")):
        day = values.get(column)
        if day is None or on_record.get(column) or (path[0], kind, day) in told:
            continue
        fact = {"kind": kind, "done_on": day, "extent": "full", "report": STARTING_BASIS}
        made.inspections.append((path, fact))


def _of_location(made: Starting, path: Path, row: Row, *, known: KnownRegister) -> None:
    thickness, day = row.values.get("baseline_thickness_mm"), row.values.get("baseline_on")
    key = (path[0], path[1], path[2])
    on_record = known.locations[key].recorded if key in known.locations else {}
    if thickness is None or day is None or on_record.get("baseline_thickness_mm"):
        return  # until both are loaded there is no baseline
    made.baselines.append(
        (
            path,
            {
                "taken_on": day,
                "thickness_mm": thickness,
                "result": "read",
                "kind": "baseline",
                "status": "queried" if row.query else "accepted",
                "status_because": row.because or None,
                "written": _written(row, "baseline_thickness", "thickness"),
            },
        )
    )


def _written(row: Row, column: str, kept_as: str) -> Mapping[str, str] | None:
    return {kept_as: row.written[column]} if column in row.written else None
