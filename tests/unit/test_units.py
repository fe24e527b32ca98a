"""Units at the rim: exact factors, accepted and refused spellings, safe-side rounding, what people see.

Factors are those of the international yard and pound (0.9144 m and 0.45359237 kg, exact by agreement of 1959) and of
standard gravity (9.80665 m/s², 3rd CGPM 1901); NIST Special Publication 811, appendix B.8, lists the products.
From memory; the fractions below are built from these three numbers alone.
"""

from __future__ import annotations

import math
import subprocess
import sys
from fractions import Fraction

import numpy as np
import pytest

from fleet import errors, units

INCH = Fraction(9144, 10000) / 36 * 1000  # mm
POUND_FORCE = Fraction(45359237, 10**8) * Fraction(980665, 10**5)  # N
PSI = POUND_FORCE / INCH**2  # N/mm2
FACTORS = {
    "length": {
        "mm": 1, "cm": 10, "m": 1000, "µm": Fraction(1, 1000), "um": Fraction(1, 1000), "in": INCH, "inch": INCH,
        '"': INCH, "thou": INCH / 1000, "mil": INCH / 1000, "mils": INCH / 1000,
    },
    "pressure": {
        "MPa": 1, "kPa": Fraction(1, 1000), "bar": Fraction(1, 10), "barg": Fraction(1, 10),
        "bar(g)": Fraction(1, 10), "psi": PSI, "psig": PSI, "ksi": 1000 * PSI, "N/mm2": 1, "N/mm²": 1,
        "kgf/cm2": Fraction("0.0980665"), "kg/cm2": Fraction("0.0980665"),
    },
    "temperature": {
        "degC": 1, "°C": 1, "C": 1, "K": 1, "degF": Fraction(5, 9), "°F": Fraction(5, 9), "F": Fraction(5, 9),
    },
    "rate": {
        "mm/year": 1, "mm/yr": 1, "mm/a": 1, "in/year": INCH, "in/yr": INCH, "thou/year": INCH / 1000,
        "mil/year": INCH / 1000, "mpy": INCH / 1000,
    },
    "angle": {"deg": 1, "°": 1},
}  # fmt: skip


def test_every_accepted_spelling_has_its_exact_factor() -> None:
    assert {
        quantity: {spelling: units.parse_unit(spelling, quantity).factor for spelling in spellings}
        for quantity, spellings in units.SPELLINGS.items()
    } == FACTORS


@pytest.mark.parametrize(
    ("written", "unit", "kept"),
    [(32, "°F", 0.0), (212, "F", 100.0), (-40, "degF", -40.0), (0, "K", -273.15), (70, "C", 70.0)],
)
def test_temperatures_are_shifted(written: float, unit: str, kept: float) -> None:
    understood = units.parse_unit(unit, "temperature")
    assert units.to_internal(float(written), understood) == kept
    assert units.from_internal(kept, understood) == written


def test_values_as_written_become_the_nearest_number_to_the_exact_result() -> None:
    inch = units.parse_unit("in", "length")
    for thousandths in range(1, 2000):
        written = thousandths / 1000
        exact = float(Fraction(thousandths, 1000) * Fraction(254, 10))
        assert units.to_internal(written, inch) == exact
        assert units.from_internal(exact, inch) == written
    assert 0.7 * 25.4 != 17.78 == units.to_internal(0.7, inch)


def test_arrays_convert_as_single_values_do_and_keep_their_shape_and_gaps() -> None:
    inch = units.parse_unit("in", "length")
    values = np.array([[0.7, math.nan], [0.5, 0.7]])
    converted = units.to_internal(values, inch)
    assert converted.shape == (2, 2)
    assert converted[0, 0] == converted[1, 1] == units.to_internal(0.7, inch)
    assert math.isnan(converted[0, 1])
    assert np.array_equal(units.from_internal(converted, inch), values, equal_nan=True)
    millimetre = units.parse_unit("mm", "length")
    assert units.to_internal(values, millimetre) is not values


def test_both_micro_signs_and_the_raised_two_are_understood() -> None:
    assert units.parse_unit("\u00b5m", "length").factor == units.parse_unit("\u03bcm", "length").factor
    assert units.parse_unit(" N/mm\u00b2 ", "pressure").is_internal


@pytest.mark.parametrize(
    ("text", "quantity", "near"),
    [("PSI", "pressure", "psi"), ("MM", "length", "mm"), ("inches", "length", "inch"), ("mpa", "pressure", "MPa"),
     ("mm/y", "rate", "mm/yr"), ("degrees", "angle", "deg"), ("Bar(g)", "pressure", "bar(g)")],
)  # fmt: skip
def test_an_unknown_unit_names_the_nearest(text: str, quantity: str, near: str) -> None:
    found = units.find_unit(text, quantity)
    assert isinstance(found, units.UnitFault)
    assert found.code == "unknown unit"
    assert found.remedy.startswith(f"use '{near}'; accepted: ")


@pytest.mark.parametrize("text", ["mm", "F", "psi"])
def test_a_unit_of_another_quantity_is_unknown(text: str) -> None:
    quantity = "pressure" if text == "mm" else "length"
    with pytest.raises(errors.UsageProblem, match="unknown unit"):
        units.parse_unit(text, quantity)


@pytest.mark.parametrize(
    ("text", "sum_to_do", "gauge"),
    [
        ("psia", "14.696 psi", "psig"),
        ("bara", "1.01325 bar", "barg"),
        ("bar(a)", "1.01325 bar", "barg"),
        ("psi abs", "14.696 psi", "psig"),
        ("kPa(abs)", "101.325 kPa", "kPa"),
        ("MPaa", "0.101325 MPa", "MPa"),
    ],
)
def test_absolute_pressures_are_refused_with_the_sum_to_do(text: str, sum_to_do: str, gauge: str) -> None:
    found = units.find_unit(text, "pressure")
    assert isinstance(found, units.UnitFault)
    assert found.code == "absolute pressure"
    assert sum_to_do in found.remedy
    assert found.remedy.endswith(gauge)


def test_no_unit_is_a_fault_of_its_own() -> None:
    found = units.find_unit("  ", "length")
    assert isinstance(found, units.UnitFault)
    assert found.code == "missing unit"


@pytest.mark.parametrize(
    ("text", "quantity", "value"),
    [("0.2 mm/year", "rate", 0.2), ("8mpy", "rate", 0.2032), ('0.5"', "length", 12.7), ("-40 °F", "temperature", -40),
     ("1e3 kPa", "pressure", 1.0), ("30°", "angle", 30.0)],
)  # fmt: skip
def test_quantities_as_text(text: str, quantity: str, value: float) -> None:
    given = units.parse_quantity(text, quantity)
    assert (given.value, given.written) == (value, text)


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("12.7", "missing unit"),
        ("mm", "no number at the start"),
        ("12,7 mm", "the number is not plain"),
        ("1.2.3 mm", "the number is not plain"),
        ("12.7 furlong", "unknown unit"),
        ("1e999 mm", "no number at the start"),
        ("1e308 m", "too large"),
        ("nan mm", "no number at the start"),
    ],
)
def test_quantities_that_are_none(text: str, said: str) -> None:
    with pytest.raises(errors.UsageProblem, match=said):
        units.parse_quantity(text, "length")


def test_whole_psi_survive_the_way_through_mpa() -> None:
    psi = units.parse_unit("psi", "pressure")
    kept = [units.to_internal(float(number), psi) for number in range(1, 3001)]
    assert [units.US.text("pressure", value, "down") for value in kept] == [
        f"{n} psi" for n in range(1, 3001)
    ]
    assert [units.US.text("pressure", value, "up") for value in kept] == [f"{n} psi" for n in range(1, 3001)]


def test_without_the_nudge_some_plain_products_would_print_one_lower() -> None:
    factor = 0.006894757293168361
    plain = [number * factor / factor for number in range(1, 1001)]
    assert any(math.floor(value) < number for number, value in enumerate(plain, 1))
    assert [units.round_down(value, 0) for value in plain] == list(range(1, 1001))


@pytest.mark.parametrize(
    ("value", "decimals", "down", "up"),
    [
        (0.29, 2, 0.29, 0.29),
        (1.005, 2, 1.0, 1.01),
        (-1.5, 0, -2.0, -1.0),
        (12.3456, 3, 12.345, 12.346),
        (0.0, 2, 0.0, 0.0),
        (1234.0, -2, 1200.0, 1300.0),
        (10.0 * (1 + 0.9e-9), 2, 10.0, 10.0),
        (10.0 * (1 + 1.1e-9), 2, 10.0, 10.01),
    ],
)
def test_rounding_to_the_safe_side(value: float, decimals: int, down: float, up: float) -> None:
    assert units.round_down(value, decimals) == down
    assert units.round_up(value, decimals) == up
    assert units.round_down(np.array([value]), decimals).tolist() == [down]


def test_rounding_lets_gaps_through_and_makes_no_negative_zero() -> None:
    assert math.isnan(units.round_down(math.nan, 2))
    assert math.copysign(1.0, units.round_up(-0.001, 2)) == 1.0


def test_what_people_see() -> None:
    assert units.SI.text("length", 12.3456, "down") == "12.34 mm"
    assert units.US.text("length", 12.7, "down") == "0.500 in"
    assert units.US.text("rate", 0.254, "up") == "10.0 mil/year"
    assert units.US.text("temperature", 100.0) == "212 °F"
    assert units.US.text("years", 7.99, "down") == "7.9 years"
    assert units.SI.text("pressure", 1.7236893, "down", with_unit=False) == "1.723"
    assert units.US.text("pressure", 1.7236893, "down", 1) == "249.9 psi"
    assert units.SI.text("rate", math.nan) == "–"
    assert units.SI.number("angle", 22.45) == 22.4
    assert math.isinf(units.SI.number("years", math.inf))
    assert units.display("si").unit("pressure") == "MPa"


def test_only_si_and_us_are_known() -> None:
    with pytest.raises(errors.UsageProblem, match="'metric'"):
        units.display("metric")


def test_units_that_need_no_conversion_import_no_pint() -> None:
    code = (
        "import sys; from fleet import units; units.SI.text('pressure', 1.5); "
        "units.parse_unit('barg', 'pressure') if 'bar' in sys.argv else None; print('pint' in sys.modules)"
    )
    assert [
        subprocess.run([sys.executable, "-c", code, *more], capture_output=True, text=True, check=True).stdout
        for more in ([], ["bar"])
    ] == ["False\n", "True\n"]
