"""Canonical lines: one text for one row, whatever the engine."""

from __future__ import annotations

import datetime as dt
import hashlib

import pytest
from sqlalchemy import Column, Integer, LargeBinary, MetaData, Table

from fleet import errors
from fleet.store import canonical
from fleet.store.models import Base, Reading, table_of


def test_a_line_is_what_the_documentation_says() -> None:
    row = {
        "thickness_mm": 0.1 + 0.2,
        "taken_on": dt.date(2026, 12, 1),
        "note": 'ü "x"',
        "id": 3,
        "mark": "no",
    }
    expected = b'["reading","id",3,"note","\\u00fc \\"x\\"","taken_on","2026-12-01",'
    expected += b'"thickness_mm",0.30000000000000004]\n'
    assert canonical.line("reading", row) == expected
    assert canonical.mark(expected) == hashlib.sha256(expected).hexdigest()[:16]


def test_blank_columns_leave_no_trace() -> None:
    """So a column that a later migration adds does not change the digests of what was written before."""
    row = {"id": 3, "thickness_mm": 12.7}
    assert canonical.line("reading", row) == canonical.line("reading", {**row, "new_column": None})


def test_the_order_of_columns_does_not_matter() -> None:
    assert canonical.line("x", {"a": 1, "b": 2}) == canonical.line("x", {"b": 2, "a": 1})


def test_different_rows_have_different_lines() -> None:
    rows: list[dict[str, object]] = [
        {"a": 1},
        {"a": 1.0},
        {"a": "1"},
        {"a": True},
        {"b": 1},
        {"a": None},
        {"a": ""},
        {"a": "1", "b": "2"},
    ]
    lines = {canonical.line("x", row) for row in rows}
    assert len(lines) == len(rows)
    assert canonical.line("x", {"a": 1}) != canonical.line("y", {"a": 1})


def test_what_sqlite_keeps_as_a_number_is_a_truth_again() -> None:
    assert canonical.plain({"a": 1, "b": 1, "c": None, "d": 7}, frozenset({"a", "c", "d"})) == {
        "a": True,
        "b": 1,
        "c": None,
        "d": 7,
    }


def test_no_negative_zero_is_digested() -> None:
    plan = canonical.Plan(table_of(Reading))
    row = {"location_id": 1, "taken_on": dt.date(2020, 1, 1), "wall_temperature_c": -0.0}
    rest = {"result": "no echo", "kind": "reading", "status": "accepted"}
    values = plan.checked({**row, **rest}, row_id=1, entry_no=1)
    assert repr(values["wall_temperature_c"]) == "0.0"


def test_every_column_of_every_table_can_be_read() -> None:
    for table in Base.metadata.sorted_tables:
        if "entry_no" in table.columns:
            canonical.Plan(table)


def test_a_type_without_a_canonical_form_is_told() -> None:
    table = Table("x", MetaData(), Column("id", Integer), Column("photo", LargeBinary))
    with pytest.raises(errors.OurFault, match="has no canonical form"):
        canonical.Plan(table)
