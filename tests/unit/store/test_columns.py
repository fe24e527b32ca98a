"""The tables keep every column of the files that come in, under the same name and with the same words."""

from __future__ import annotations

from typing import Any

import pytest
from sqlalchemy import CheckConstraint, Date, Double, Integer, Text

from fleet.intake import tables
from fleet.store import models, record, register
from fleet.store.models import Inspection, Location, Part, Reading, ReliefDevice, Vessel, table_of

MODELS: dict[str, Any] = {
    "vessels": Vessel,
    "parts": Part,
    "locations": Location,
    "readings": Reading,
    "inspections": Inspection,
    "relief": ReliefDevice,
}
TAGS = {"vessel", "part", "location", "device"}
BECOME_FACTS = {
    "state",
    "current_mawp_mpa",
    "current_mawp_from",
    "current_mawp_basis",
    "last_internal_on",
    "last_external_on",
    "baseline_thickness_mm",
    "baseline_on",
}
OWN = {"id", "entry_no", "replaces_id", "entity_id", "valid_from", "written", "mark", "withdrawn_because"}
OWN_OF_READINGS = {"kind", "status", "status_because", "survey_id", "source_row"}
NAMED = [(name, column) for name in MODELS for column in tables.TABLES[name]]


def _words(model: Any, column: str) -> set[str] | None:
    """Read the words of a choice out of its check."""
    for check in table_of(model).constraints:
        if isinstance(check, CheckConstraint) and str(check.name).endswith(f"{column}_known"):
            inside = str(check.sqltext).split("(", 1)[1].rsplit(")", 1)[0]
            return {word.strip().strip("'") for word in inside.split(",")}
    return None


@pytest.mark.parametrize(("name", "column"), NAMED, ids=lambda each: str(getattr(each, "name", each)))
def test_every_column_that_comes_in_is_kept(name: str, column: tables.Column) -> None:
    kept = table_of(MODELS[name]).columns
    if column.name in TAGS:
        assert f"{column.name}_id" in kept or "entity_id" in kept or name == "readings"
        return
    if column.field in BECOME_FACTS:
        assert column.field not in kept
        return
    kinds: dict[str, tuple[type[Any], ...]] = {
        "text": (Text,),
        "choice": (Text,),
        "date": (Date,),
        "number": (Double, Integer),
    }
    assert isinstance(kept[column.field].type, kinds[column.kind])
    if column.choices:
        assert _words(MODELS[name], column.field) == set(column.choices)


@pytest.mark.parametrize("name", MODELS)
def test_no_column_is_kept_that_does_not_come_in(name: str) -> None:
    kept = {column.name for column in table_of(MODELS[name]).columns} - OWN
    if name == "readings":
        kept -= OWN_OF_READINGS
    come_in = {column.field for column in tables.TABLES[name]} | {f"{tag}_id" for tag in TAGS}
    assert kept <= come_in


def test_states_of_the_register_are_states_of_the_record() -> None:
    assert {*tables.VESSEL_STATES, *tables.ITEM_STATES} == set(record.STATES)
    assert register.SHAPES == tables.SHAPES


def test_physical_columns_end_in_their_unit() -> None:
    units = ("_mm", "_mpa", "_c", "_mm_per_year", "_deg")
    bare = {
        "axis_ratio",
        "cover_factor",
        "joint_efficiency",
        "joint_efficiency_long",
        "joint_efficiency_circ",
    }
    for model in models.FACTS:
        for column in table_of(model).columns:
            if isinstance(column.type, Double):
                assert column.name.endswith(units) or column.name in bare, column
            if isinstance(column.type, Date):
                assert column.name.endswith("_on") or column.name == "valid_from", column


def test_every_constraint_and_index_has_a_name_that_fits_postgresql() -> None:
    for table in models.Base.metadata.sorted_tables:
        names = [*(each.name for each in table.constraints), *(each.name for each in table.indexes)]
        assert all(isinstance(name, str) and len(name) <= 63 for name in names), table.name
        assert len(set(names)) == len(names)


def test_every_reference_to_a_replaced_row_is_indexed_and_single() -> None:
    for model in models.FACTS:
        table = table_of(model)
        if "replaces_id" in table.columns:
            [index] = [each for each in table.indexes if "replaces_id" in each.columns]
            assert index.unique
