"""Read the yearly list back, cell by cell, and hold it against the document of ``fleet derating --json``."""

from __future__ import annotations

from datetime import datetime
from pathlib import Path
from typing import Any

import openpyxl

DOWN = {
    "MAWP today [MPa]": "mawp_today_mpa",
    "Projected MAWP [MPa]": "projected_mawp_mpa",
    "Projected, uncapped [MPa]": "projected_mawp_uncapped_mpa",
}
GIVEN = {"Current MAWP [MPa]": "current_mawp_mpa"}
DAYS = {
    "Carried to": "carry_to_on",
    "Retirement": "retirement_on",
    "Internal or on-stream due": "internal_due_on",
    "External due": "external_due_on",
}
WORDS = {"Standing": "standing", "Block": "block"}


def compare_list(book: Path, listed: list[dict[str, Any]], *, count: int) -> None:
    """Hold every vessel of the sheet `The list` against its object; every vessel is there exactly once."""
    sheet = openpyxl.load_workbook(book)["The list"]
    rows = [list(row) for row in sheet.iter_rows(values_only=True)]
    head = next(row for row in rows if "Vessel" in row and "Standing" in row)
    at = {str(name): number for number, name in enumerate(head) if name}
    objects = {vessel["vessel"]: vessel for vessel in listed}
    lines = [row for row in rows if row[at["Vessel"]] in objects]
    assert sorted(str(row[at["Vessel"]]) for row in lines) == sorted(objects)
    assert len(lines) == len(listed) == count
    for row in lines:
        tag = row[at["Vessel"]]
        _compare({name: row[number] for name, number in at.items()}, objects[tag])


def _compare(cells: dict[str, Any], vessel: dict[str, Any]) -> None:
    tag = vessel["vessel"]
    for name, key in WORDS.items():
        assert cells[name] == vessel[key], (tag, name)
    assert (cells["Flags"] or "") == ", ".join(vessel["flags"]), tag
    for name, key in DAYS.items():
        cell = cells[name]
        day = cell.date().isoformat() if isinstance(cell, datetime) else None
        assert day == vessel[key], (tag, name)
    for name, key in (DOWN | GIVEN).items():
        cell, value = cells[name], vessel[key]
        if value is None:
            assert not isinstance(cell, int | float), (tag, name)
        elif name in DOWN:  # rounded once, to the safe side, in the third decimal
            assert value - 0.001 < cell <= value * (1 + 2e-9), (tag, name)
        else:
            assert abs(cell - value) <= 0.0005, (tag, name)
