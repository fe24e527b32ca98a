"""What every fetch has in common: the register by index, columns cut to rows."""

from __future__ import annotations

import json
from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date
from typing import Any

import numpy as np

from fleet.appraisal.inputs import Floats, Ints
from fleet.tasks.reader import Columns

Index = dict[int, int]


@dataclass(frozen=True)
class Tree:
    """The register by index, and from the entities of the store to those indices.

    Parameters
    ----------
    vessels, parts, locations : Columns
        Rows in force, in the order of the appraisal [-].
    vessel, part, location : dict of int to int
        Entity to index [count].
    part_vessel, location_part : Ints
        Index of the parent [count].
    """

    vessels: Columns
    parts: Columns
    locations: Columns
    vessel: Index
    part: Index
    location: Index
    part_vessel: Ints
    location_part: Ints


def pick(columns: Columns, rows: Iterable[int]) -> Columns:
    """Keep some rows, in the order asked for.

    Parameters
    ----------
    columns : Columns
        Values by column name [-].
    rows : iterable of int
        The rows [count].

    Returns
    -------
    Columns

    Examples
    --------
    >>> pick({"id": [7, 8, 9]}, [2, 0])
    {'id': [9, 7]}
    """
    wanted = list(rows)
    return {name: [values[row] for row in wanted] for name, values in columns.items()}


def count(columns: Columns) -> int:
    """Give the number of rows.

    Parameters
    ----------
    columns : Columns
        Values by column name [-].

    Returns
    -------
    int
    """
    return len(columns["id"])


def by_day(columns: Columns, name: str, as_of: date) -> Columns:
    """Keep the rows whose day is not after the as-of date.

    Parameters
    ----------
    columns : Columns
        Values by column name [-].
    name : str
        The column of days [text].
    as_of : date
        The day the figures are about [date].

    Returns
    -------
    Columns
    """
    return pick(columns, [row for row, day in enumerate(columns[name]) if day <= as_of])


def of_index(columns: Columns, name: str, index: Index) -> tuple[Columns, Ints]:
    """Keep the rows whose entity is of this appraisal, and give its index beside them.

    Parameters
    ----------
    columns : Columns
        Values by column name [-].
    name : str
        The column of entities [text].
    index : dict of int to int
        Entity to index [count].

    Returns
    -------
    tuple of Columns and Ints
    """
    rows = [row for row, entity in enumerate(columns[name]) if entity in index]
    kept = pick(columns, rows)
    return kept, np.array([index[entity] for entity in kept[name]], dtype=np.int64)


def days(values: Iterable[date | None]) -> Floats:
    """Turn dates into day ordinals.

    Parameters
    ----------
    values : iterable of date or None
        The dates; None becomes NaN [date].

    Returns
    -------
    Floats

    Examples
    --------
    >>> days([date(1, 1, 2), None]).tolist()
    [2.0, nan]
    """
    return np.array([np.nan if day is None else day.toordinal() for day in values], dtype=np.float64)


def as_written(written: object, column: str) -> str:
    """Give a value as somebody wrote it.

    Parameters
    ----------
    written : object
        What the fact keeps: JSON text, a mapping, or None [-].
    column : str
        Name of the column [text].

    Returns
    -------
    str
        Value and unit as written, empty where nothing was kept.

    Examples
    --------
    >>> as_written('{"set_pressure": "261 psi"}', "set_pressure")
    '261 psi'
    """
    found = json.loads(written) if isinstance(written, str) else written
    return str(found.get(column, "")) if isinstance(found, dict) else ""


def same(columns: Columns, table: type[Any]) -> dict[str, Any]:
    """Give the columns that bear the same name in the store and in a table of the appraisal.

    Parameters
    ----------
    columns : Columns
        Values by column name [-].
    table : type
        The appraisal's table [-].

    Returns
    -------
    dict
    """
    names = table.__dataclass_fields__
    return {name: columns[name] for name in columns if name in names}


def chain(tree: Tree) -> tuple[list[int], list[int], list[int]]:
    """Give location, part and vessel entity of every location: the levels of a setting, nearest first.

    Parameters
    ----------
    tree : Tree
        The register by index [-].

    Returns
    -------
    tuple of list of int
    """
    location = tree.locations["entity_id"]
    part = [tree.parts["entity_id"][row] for row in tree.location_part]
    vessel = [tree.vessels["entity_id"][tree.part_vessel[row]] for row in tree.location_part]
    return location, part, vessel
