"""The tables that come in as files: every column once, with its kind, unit, choices, bounds and shapes.

Intake, store and the headings of the survey sheet all read these lists. A field is the column's name with the
unit it is kept in: `thickness` is kept as `thickness_mm`.
"""

from __future__ import annotations

import difflib
from collections.abc import Iterable
from dataclasses import dataclass
from typing import Literal, NamedTuple

Kind = Literal["text", "number", "date", "choice"]
Quantity = Literal["length", "pressure", "temperature", "rate", "angle"]

SUFFIX: dict[str, str] = {
    "length": "_mm",
    "pressure": "_mpa",
    "temperature": "_c",
    "rate": "_mm_per_year",
    "angle": "_deg",
}
"""What the field of each quantity ends in [text]."""

SHAPES: tuple[str, ...] = (
    "cylinder",
    "sphere",
    "hemispherical head",
    "ellipsoidal head",
    "torispherical head",
    "cone",
    "flat cover",
    "nozzle neck",
    "other",
)
"""Every shape a part can have."""

SEAMED = ("cylinder", "cone", "nozzle neck")
"""Shapes with a long seam and a girth seam."""
ONE_EFFICIENCY = ("sphere", "hemispherical head", "ellipsoidal head", "torispherical head", "flat cover")
"""Shapes with one joint efficiency."""
HEADS = ("hemispherical head", "ellipsoidal head", "torispherical head")
"""Shapes that have a crown and a knuckle or a rim."""

VESSEL_STATES = ("in service", "idle protected", "idle", "out of service", "retired")
ITEM_STATES = ("in service", "withdrawn")
LOSS_SIDES = ("inside", "outside", "both")
LININGS = ("none", "integral clad", "overlay", "strip", "rubber", "glass", "refractory", "paint")
YES_NO = ("yes", "no")
RESULTS = ("read", "no echo", "no access", "lamination")


class Bounds(NamedTuple):
    """The range in which a number can be true, in the unit it is kept in; None where there is no end."""

    low: float | None = None
    low_open: bool = False
    high: float | None = None
    high_open: bool = False

    def text(self) -> str:
        """Say the range in words.

        Returns
        -------
        str
            The range; empty where there is no end [text].
        """
        parts = []
        if self.low is not None:
            parts.append(f"{'above' if self.low_open else 'at least'} {self.low:g}")
        if self.high is not None:
            parts.append(f"{'below' if self.high_open else 'at most'} {self.high:g}")
        return " and ".join(parts)


ANY = Bounds()
POSITIVE = Bounds(0.0, True)
NOT_NEGATIVE = Bounds(0.0)
FRACTION = Bounds(0.0, True, 1.0)
ACUTE = Bounds(0.0, True, 90.0, True)
TURN = Bounds(-360.0, False, 360.0)
WARM = Bounds(-273.15)
YEAR_NUMBER = Bounds(1800.0, False, 2200.0)


@dataclass(frozen=True)
class Column:
    """One column of one table.

    Parameters
    ----------
    name : str
        The heading without its unit [text].
    kind : {'text', 'number', 'date', 'choice'}
        What its cells hold [text].
    quantity : str or None
        The physical quantity of a number with a unit: length, pressure, temperature, rate, angle [text].
    field : str
        The name it is kept under, ending in the unit it is kept in [text].
    choices : tuple of str
        The words a choice takes [text].
    required : bool
        Whether the column names the row: absent or blank, the file or row is refused [-].
    shapes : tuple of str or None
        The shapes it applies to; None for all [text].
    bounds : Bounds
        The range of a number, in the unit it is kept in [-].
    """

    name: str
    kind: Kind
    quantity: Quantity | None
    field: str
    choices: tuple[str, ...] = ()
    required: bool = False
    shapes: tuple[str, ...] | None = None
    bounds: Bounds = ANY

    def heading(self, unit: str = "") -> str:
        """Give the heading as it is written in a file.

        Parameters
        ----------
        unit : str
            The spelling of the unit; ignored for a column without one [text].

        Returns
        -------
        str
            The heading [text].

        Examples
        --------
        >>> column("readings", "thickness").heading("in")
        'thickness [in]'
        >>> column("readings", "note").heading()
        'note'
        """
        return f"{self.name} [{unit}]" if self.quantity is not None else self.name


def _text(*names: str, required: bool = False) -> tuple[Column, ...]:
    return tuple(Column(name, "text", None, name, required=required) for name in names)


def _date(*names: str, required: bool = False) -> tuple[Column, ...]:
    return tuple(Column(name, "date", None, name, required=required) for name in names)


def _choice(name: str, choices: tuple[str, ...], *, required: bool = False) -> tuple[Column, ...]:
    return (Column(name, "choice", None, name, choices, required),)


def _number(
    *names: str,
    quantity: Quantity | None = None,
    bounds: Bounds = ANY,
    shapes: tuple[str, ...] | None = None,
    required: bool = False,
) -> tuple[Column, ...]:
    suffix = SUFFIX[quantity] if quantity is not None else ""
    return tuple(
        Column(
            name,
            "number",
            quantity,
            name + suffix,
            required=required,
            shapes=shapes,
            bounds=bounds,
        )
        for name in names
    )


def _length(
    *names: str, bounds: Bounds = POSITIVE, shapes: tuple[str, ...] | None = None
) -> tuple[Column, ...]:
    return _number(*names, quantity="length", bounds=bounds, shapes=shapes)


def _pressure(*names: str, bounds: Bounds = NOT_NEGATIVE, required: bool = False) -> tuple[Column, ...]:
    return _number(*names, quantity="pressure", bounds=bounds, required=required)


_VESSELS = (
    *_text("vessel", required=True),
    *_text("site", "service"),
    *_text("rules", "design_code", required=True),
    *_text("code_edition"),
    *_date("in_service_on", required=True),
    *_choice("state", VESSEL_STATES),
    *_pressure("design_pressure"),
    *_number("design_temperature", quantity="temperature", bounds=WARM),
    *_pressure("nameplate_mawp", "current_mawp"),
    *_date("current_mawp_from"),
    *_text("current_mawp_basis"),
    *_pressure("external_design_pressure"),
    *_pressure("operating_pressure", bounds=ANY),
    *_date("next_survey_on", "last_internal_on", "last_external_on"),
    *_text("assembly", "unit", "contents", "hazard_class"),
    *_number("year_built", bounds=YEAR_NUMBER),
    *_text("manufacturer_serial", "jurisdiction_number"),
    *_choice("insulated", YES_NO),
    *_number("min_design_temperature", quantity="temperature", bounds=WARM),
    *_text("data_report"),
)

_PARTS = (
    *_text("vessel", "part", required=True),
    *_choice("shape", SHAPES, required=True),
    *_length("inside_diameter", "outside_diameter"),
    *_length("length", bounds=NOT_NEGATIVE),
    *_length("crown_radius", shapes=("torispherical head", "hemispherical head")),
    *_length("knuckle_radius", shapes=("torispherical head",)),
    *_number("half_apex_angle", quantity="angle", bounds=ACUTE, shapes=("cone",)),
    *_number("axis_ratio", bounds=POSITIVE, shapes=("ellipsoidal head",)),
    *_number("cover_factor", bounds=POSITIVE, shapes=("flat cover",)),
    *_length("gasket_diameter", shapes=("flat cover",)),
    *_length("nominal_thickness"),
    *_length("corrosion_allowance", bounds=NOT_NEGATIVE),
    *_text("material"),
    *_number("allowable_stress", quantity="pressure", bounds=POSITIVE),
    *_text("stress_basis"),
    *_number("joint_efficiency_long", "joint_efficiency_circ", bounds=FRACTION, shapes=SEAMED),
    *_number("joint_efficiency", bounds=FRACTION, shapes=ONE_EFFICIENCY),
    *_pressure("static_head"),
    *_length(
        "structural_minimum",
        "required_thickness_external",
        "required_thickness_axial",
        bounds=NOT_NEGATIVE,
    ),
    *_length("required_thickness_given", bounds=NOT_NEGATIVE, shapes=("other",)),
    *_pressure("other_pressure_limit"),
    *_choice("loss_side", LOSS_SIDES),
    *_choice("lining", LININGS),
    *_length("lining_thickness", bounds=NOT_NEGATIVE),
    *_choice("lining_counts_in_strength", YES_NO),
    *_number("expected_rate", quantity="rate", bounds=NOT_NEGATIVE),
    *_length("alert_thickness", bounds=NOT_NEGATIVE),
    *_choice("state", ITEM_STATES),
)

_LOCATIONS = (
    *_text("vessel", "part", "location", required=True),
    *_text("position"),
    *_choice("zone", ("crown", "knuckle", "seam", "plate")),
    *_length("seam_distance", bounds=NOT_NEGATIVE),
    *_length("elevation", bounds=ANY),
    *_number("angle", quantity="angle", bounds=TURN),
    *_length("diameter_at", shapes=("cone",)),
    *_choice("loss_side", LOSS_SIDES),
    *_choice("damage", ("general", "local", "pitting")),
    *_length("baseline_thickness"),
    *_date("baseline_on"),
    *_length("alert_thickness", bounds=NOT_NEGATIVE),
    *_length("reading_error"),
    *_choice("state", ITEM_STATES),
)

_READINGS = (
    *_text("vessel", "part", "location", required=True),
    *_date("taken_on", required=True),
    *_length("thickness", "average"),
    *_choice("result", RESULTS),
    *_choice("method", ("spot", "scan", "profile", "radiography")),
    *_number("wall_temperature", quantity="temperature", bounds=WARM),
    *_choice("temperature_corrected", YES_NO),
    *_choice("includes_lining", YES_NO),
    *_choice("through_coating", YES_NO),
    *_text("technician", "instrument", "note"),
)

_INSPECTIONS = (
    *_text("vessel", required=True),
    *_choice("kind", ("internal", "external", "on-stream"), required=True),
    *_date("done_on", required=True),
    *_text("extent", "inspector", "report"),
)

_RELIEF = (
    *_text("device", "vessel", required=True),
    *_pressure("set_pressure", bounds=POSITIVE, required=True),
    *_date("last_test_on", "next_test_on"),
)

TABLES: dict[str, tuple[Column, ...]] = {
    "vessels": _VESSELS,
    "parts": _PARTS,
    "locations": _LOCATIONS,
    "readings": _READINGS,
    "inspections": _INSPECTIONS,
    "relief": _RELIEF,
}
"""Every table by name, with its columns in the order in which they are written."""

ONE_OF: dict[str, tuple[str, ...]] = {
    "vessels": ("nameplate_mawp", "design_pressure"),
    "readings": ("thickness", "result"),
}
"""Columns of which a table, and each row of it, needs at least one."""

NAMED_BY: dict[str, tuple[str, ...]] = {
    "vessels": ("vessel",),
    "parts": ("vessel", "part"),
    "locations": ("vessel", "part", "location"),
    "readings": ("vessel", "part", "location", "taken_on"),
    "inspections": ("vessel", "kind", "done_on"),
    "relief": ("vessel", "device"),
}
"""The columns that together name one row of a table."""

REGISTER_TABLES = ("vessels", "parts", "locations", "inspections", "relief")
"""The tables that make up the register, those that others refer to first."""

THICKNESSES = frozenset({"thickness", "average", "nominal_thickness", "baseline_thickness"})
"""Columns that hold a wall: zero or less is a fault of its own name."""


def column(table: str, name: str) -> Column:
    """Find one column.

    Parameters
    ----------
    table : str
        The table [text].
    name : str
        The column [text].

    Returns
    -------
    Column
        The column [-].

    Raises
    ------
    KeyError
        Where there is no such table or column.

    Examples
    --------
    >>> column("parts", "expected_rate").field
    'expected_rate_mm_per_year'
    """
    for candidate in TABLES[table]:
        if candidate.name == name:
            return candidate
    raise KeyError(name)


def fields(table: str) -> tuple[str, ...]:
    """Name the fields of a table in order.

    Parameters
    ----------
    table : str
        The table [text].

    Returns
    -------
    tuple of str
        The fields [text].

    Examples
    --------
    >>> fields("relief")
    ('device', 'vessel', 'set_pressure_mpa', 'last_test_on', 'next_test_on')
    """
    return tuple(column.field for column in TABLES[table])


def nearest(word: str, known: Iterable[str]) -> str | None:
    """Find the known word that is spelled most like the given one.

    Parameters
    ----------
    word : str
        What was written [text].
    known : iterable of str
        What could have been meant [text].

    Returns
    -------
    str or None
        The nearest, or None where nothing is near [text].

    Examples
    --------
    >>> nearest("thicknes", ["location", "thickness"])
    'thickness'
    >>> nearest("weather", ["location", "thickness"]) is None
    True
    """
    folded = {one.casefold(): one for one in known}
    found = difflib.get_close_matches(word.casefold(), list(folded), n=1, cutoff=0.6)
    return folded[found[0]] if found else None
