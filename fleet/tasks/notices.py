"""The doubts that stand open and the rows that wait, as they are on record."""

from __future__ import annotations

import json
from dataclasses import dataclass
from datetime import date
from typing import Any

from fleet.store import models
from fleet.tasks.names import fetch_names
from fleet.tasks.reader import Reader
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


def recorded_notices(record: Reader, *, reading_days: dict[int, date]) -> list[Recorded]:
    """Fetch the open doubts and the rows that wait.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].
    reading_days : dict of int to date
        The day of every reading in force: a doubt about a later reading is not yet true [date].

    Returns
    -------
    list of Recorded
    """
    columns = record.rows(models.Doubt)
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
        if status == "open" and reading_days.get(columns["reading_id"][row], record.as_of) <= record.as_of
    ]
    return found + waiting_rows(record)


def waiting_rows(record: Reader) -> list[Recorded]:
    """Fetch the rows of loaded files that were left waiting.

    Parameters
    ----------
    record : Reader
        The record at the moment asked about [-].

    Returns
    -------
    list of Recorded
        One gap per row; its entities are None where the row names none that is known.
    """
    columns = record.rows(models.ParkedRow)
    rows = [row for row, status in enumerate(columns["status"]) if status == "waiting"]
    if not rows:
        return []
    names = fetch_names(record)
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
