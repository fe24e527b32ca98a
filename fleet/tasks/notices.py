"""The doubts that stand open and the rows that wait, as they are on record."""

from __future__ import annotations

import json
from dataclasses import dataclass
from datetime import date
from typing import Any

from sqlalchemy import Connection

from fleet.store import facts, models
from fleet.tasks.names import fetch_names
from fleet.words import Notice, notice


@dataclass(frozen=True)
class Recorded:
    """A notice on record and the entities it is about.

    Parameters
    ----------
    vessel_id, part_id, location_id : int or None
        Entities of the store; None where it is about none [count].
    notice : Notice
        What was said [-].
    """

    vessel_id: int | None
    part_id: int | None
    location_id: int | None
    notice: Notice


def recorded_notices(
    conn: Connection, *, known: int, reading_days: dict[int, date], as_of: date
) -> list[Recorded]:
    """Fetch the open doubts and the rows that wait.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    known : int
        Number of the last journal entry that may be read [count].
    reading_days : dict of int to date
        The day of every reading in force: a doubt about a later reading is not yet true [date].
    as_of : date
        The day the figures are about [date].

    Returns
    -------
    list of Recorded
    """
    columns = facts.columns(conn, models.Doubt, known=known, as_of=None)
    found = [
        Recorded(
            columns["vessel_id"][row],
            columns["part_id"][row],
            columns["location_id"][row],
            Notice(
                columns["code"][row],
                columns["where_text"][row],
                columns["found"][row],
                columns["remedy"][row],
            ),
        )
        for row, status in enumerate(columns["status"])
        if status == "open" and reading_days.get(columns["reading_id"][row], as_of) <= as_of
    ]
    return found + waiting_rows(conn, known=known)


def waiting_rows(conn: Connection, *, known: int) -> list[Recorded]:
    """Fetch the rows of loaded files that were left waiting.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    known : int
        Number of the last journal entry that may be read [count].

    Returns
    -------
    list of Recorded
        One gap per row; its entities are None where the row names none that is known.
    """
    columns = facts.columns(conn, models.ParkedRow, known=known, as_of=None)
    rows = [row for row, status in enumerate(columns["status"]) if status == "waiting"]
    if not rows:
        return []
    names = fetch_names(conn, known=known)
    found: list[Recorded] = []
    for row in rows:
        content: dict[str, Any] = json.loads(columns["content"][row])
        faults: list[dict[str, str]] = json.loads(columns["faults"][row])
        cells = content["cells"]
        vessel, part, location = (str(cells.get(name) or "") for name in ("vessel", "part", "location"))
        said = "; ".join(f"{fault['code']}: {fault['found']}" for fault in faults)
        found.append(
            Recorded(
                names.get(vessel),
                names.get(vessel, part) if part else None,
                names.get(vessel, part, location) if part and location else None,
                notice("parked row", content["where"], said),
            )
        )
    return found
