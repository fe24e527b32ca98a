"""The files of a load and the rows of them that wait, as both kinds of load record them."""

from __future__ import annotations

import json
from collections.abc import Iterable, Sequence
from typing import Any

from fleet.intake.results import Intake, ParkedRow, Row
from fleet.intake.tables import NAMED_BY
from fleet.store import journal, models
from fleet.tasks.reader import Reader

Waiting = dict[str, Any]


def waiting_on_record(record: Reader) -> list[Waiting]:
    """Fetch the rows that wait.

    Parameters
    ----------
    record : Reader
        The record at the moment of the load [-].

    Returns
    -------
    list of dict
        Key, file name, sheet, row, content and faults of each.
    """
    columns = record.rows(models.ParkedRow)
    if not columns["id"]:
        return []
    files = record.rows(models.SourceFile)
    name = dict(zip(files["id"], files["name"], strict=True))
    return [
        {
            "id": columns["id"][row],
            "source_file_id": columns["source_file_id"][row],
            "file": name[columns["source_file_id"][row]],
            "sheet": columns["sheet"][row] or "",
            "row_no": columns["row_no"][row],
            "content": json.loads(columns["content"][row]),
            "faults": json.loads(columns["faults"][row]),
        }
        for row, status in enumerate(columns["status"])
        if status == "waiting"
    ]


def new_parked(parked: Sequence[ParkedRow], waiting: Iterable[Waiting]) -> list[ParkedRow]:
    """Leave out the rows that wait already, cell for cell.

    Parameters
    ----------
    parked : sequence of ParkedRow
        The rows of this load that wait [-].
    waiting : iterable of dict
        As `waiting_on_record` gives them [-].

    Returns
    -------
    list of ParkedRow
    """
    known = {
        (one["file"], one["sheet"], one["row_no"], json.dumps(one["content"]["cells"], sort_keys=True))
        for one in waiting
    }
    return [
        one
        for one in parked
        if (one.file, one.sheet, one.row_no, json.dumps(one.content, sort_keys=True)) not in known
    ]


def settled(waiting: Sequence[Waiting], intake: Intake) -> list[Waiting]:
    """Find the waiting rows that this load brings in good order.

    A row is settled by one of the same name, or by the same row of the same file with one name corrected.

    Parameters
    ----------
    waiting : sequence of dict
        As `waiting_on_record` gives them [-].
    intake : Intake
        The load [-].

    Returns
    -------
    list of dict
    """
    if not waiting:
        return []
    good = [(typed.table, typed.file, typed.sheet, row) for typed in intake.tables for row in typed.rows]
    return [one for one in waiting if any(_settles(one, *candidate) for candidate in good)]


def _settles(waiting: Waiting, table: str, file: str, sheet: str, row: Row) -> bool:
    if waiting["content"]["table"] != table:
        return False
    names = NAMED_BY[table]
    cells = waiting["content"]["cells"]
    alike = sum(str(cells.get(name) or "") == str(row.values[name]) for name in names)
    same_row = (waiting["file"], waiting["sheet"], waiting["row_no"]) == (file, sheet, row.row_no)
    return alike == len(names) or (same_row and alike >= len(names) - 1)


def record_files(
    entry: journal.Entry, intake: Intake, *, kind: str, parked: Sequence[ParkedRow], done: Sequence[Waiting]
) -> dict[str, int]:
    """Record the files of a load, the rows of them that wait, and the waiting rows that are settled.

    Parameters
    ----------
    entry : journal.Entry
        The journal entry [-].
    intake : Intake
        The load [-].
    kind : {'register', 'survey'}
        What was loaded [text].
    parked : sequence of ParkedRow
        Rows that wait and are not on record [-].
    done : sequence of dict
        Rows that waited and are settled [-].

    Returns
    -------
    dict of str to int
        Name of each file to its key.
    """
    fresh = [file for file in intake.files if not file.already_loaded and not file.refused]
    rows = [
        {
            "name": file.name,
            "sha256": file.sha256,
            "kind": kind,
            "rows_loaded": sum(len(typed.rows) for typed in intake.tables if typed.file == file.name),
            "rows_parked": sum(one.file == file.name for one in intake.parked),
        }
        for file in fresh
    ]
    keys = dict(zip((file.name for file in fresh), entry.add(models.SourceFile, rows), strict=True))
    waits = [
        {
            "source_file_id": keys[one.file],
            "sheet": one.sheet or None,
            "row_no": one.row_no,
            "content": {"table": one.table, "where": one.where, "cells": one.content},
            "faults": [fault.as_dict() for fault in one.faults],
            "status": "waiting",
        }
        for one in parked
    ]
    ends = [
        {
            "source_file_id": one["source_file_id"],
            "sheet": one["sheet"] or None,
            "row_no": one["row_no"],
            "content": one["content"],
            "faults": one["faults"],
            "status": "settled",
            "replaces_id": one["id"],
        }
        for one in done
    ]
    entry.add(models.ParkedRow, [*waits, *ends])
    return keys
