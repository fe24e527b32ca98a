"""Code, print, spreadsheet and symbolic form of every formula say the same.

The printed and the spreadsheet text are read back by a small reader of our own, which knows nothing of how they were
written: in the spreadsheet a leading minus binds before a power and powers run from left to right; in print the dot is
read once as tight as the slash and once tighter, and both readings must agree, because people read it either way.
"""

from __future__ import annotations

import math
import re
from collections.abc import Callable, Iterator, Mapping

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fleet.mechanics  # enters the formulas
import fleet.thinning.formulas  # noqa: F401  # these too
from fleet.formula import REGISTER, Formula, Num, formula, writing

_SHEET_FUNCTIONS: dict[str, Callable[..., float]] = {
    "SQRT": math.sqrt, "EXP": math.exp, "LN": math.log, "COS": math.cos, "SIN": math.sin, "TAN": math.tan,
    "RADIANS": math.radians, "MIN": min, "MAX": max, "ABS": abs, "INT": math.floor,
    "IF": lambda truth, yes, no: yes if truth else no,
}  # fmt: skip
_PRINT_FUNCTIONS: dict[str, Callable[..., float]] = {
    "exp": math.exp, "ln": math.log, "cos": math.cos, "sin": math.sin, "tan": math.tan, "min": min, "max": max,
    "abs": abs, "floor": math.floor,
}  # fmt: skip
_TOKEN = re.compile(
    r"\s*(\d+(?:\.\d+)?(?:E[-+]?\d+)?|[A-Za-zα-ωµ_][A-Za-z0-9_α-ω]*|[<>]=?|[≤≥]|[-+−*/·^()°√²³,])"
)


class Reader:
    """Read an expression by climbing precedence."""

    def __init__(
        self, text: str, values: Mapping[str, float], *, sheet: bool, dot_tighter: bool = False
    ) -> None:
        self.signs: Iterator[str] = iter([*_TOKEN.findall(text), ""])
        self.sign = next(self.signs)
        self.values = values
        self.sheet = sheet
        self.product = 3 if dot_tighter else 2
        self.functions = _SHEET_FUNCTIONS if sheet else _PRINT_FUNCTIONS

    def take(self) -> str:
        taken, self.sign = self.sign, next(self.signs, "")
        return taken

    def whole(self) -> float:
        value = self.climb(0)
        assert self.sign == "", f"'{self.sign}' is left over"
        return value

    def climb(self, least: int) -> float:
        value = self.leading()
        while (level := self.level(self.sign)) > least:
            sign = self.take()
            if sign in "²³":
                value = float(np.power(value, {"²": 2.0, "³": 3.0}[sign]))
            elif sign == "°":
                value = math.radians(value)
            else:
                # powers in print run from right to left; all else, and powers in a sheet, from left to right
                other = self.climb(level - 1 if sign == "^" and not self.sheet else level)
                value = self.worked(sign, value, other)
        return value

    def level(self, sign: str) -> int:
        levels = {"<": 0.5, "≤": 0.5, ">": 0.5, "≥": 0.5, "<=": 0.5, ">=": 0.5, "+": 1, "-": 1, "−": 1, "/": 2, "*": 2,
                  "·": self.product, "^": 5, "²": 6, "³": 6, "°": 6}  # fmt: skip
        return int(2 * levels.get(sign, 0))

    def leading(self) -> float:
        first = self.take()
        if first in {"-", "−"}:
            return -self.climb(2 * 5 if self.sheet else 2 * 1)
        if first == "√":
            return math.sqrt(self.climb(2 * 5))
        if first == "(":
            value = self.climb(0)
            if self.sign == "if":
                value = self.chosen(value)
            assert self.take() == ")"
            return value
        if first in self.functions:
            assert self.take() == "("
            inner = [self.climb(0)]
            while self.sign == ",":
                self.take()
                inner.append(self.climb(0))
            assert self.take() == ")"
            return float(self.functions[first](*inner))
        if first in self.values:
            return self.values[first]
        return float(first)

    def chosen(self, value: float) -> float:
        """Read on from ``value`` in ``(value if condition, else other)``."""
        assert self.take() == "if"
        truth = self.climb(0)
        assert (self.take(), self.take()) == (",", "else")
        other = self.climb(0)
        return value if truth else other

    @staticmethod
    def worked(sign: str, left: float, right: float) -> float:
        if sign == "^":
            return float(np.power(left, right))
        if sign == "/":
            return float(np.divide(left, right))
        if sign in "*·":
            return left * right
        if sign == "+":
            return left + right
        if sign in "-−":
            return left - right
        return float(left < right if "<" in sign or sign == "≤" else left > right)


_GREEK = {"sigma": "σ", "alpha": "α", "gamma": "γ", "rho": "ρ"}


def sample(known: Formula, seed: int) -> dict[str, float]:
    """Draw arguments that lie where the formula is used."""
    draw = np.random.default_rng(seed).uniform
    t = draw(1.0, 60.0)
    ranges = {
        "P": (0.1, 15), "p": (0.1, 15), "p_i": (1, 60), "p_o": (0.1, 1), "S": (60, 250), "sigma": (60, 250),
        "E": (0.5, 1), "R": (150, 3e3), "r": (150, 3e3), "Ro": (400, 3e3), "D": (300, 5e3), "Do": (900, 5e3),
        "L": (300, 3e3), "Lo": (400, 3e3), "M": (1, 1.8), "K": (0.5, 1.8), "q": (1, 3), "alpha": (0.5, 30),
        "C": (0.1, 0.33), "d": (100, 2e3), "a": (100, 200), "b": (300, 400), "x": (200, 300),
    }  # fmt: skip
    return {
        name: t if name == "t" else float(draw(*ranges.get(name, (0.5, 5.0)))) for name in known.arguments
    }


def differences(known: Formula, values: Mapping[str, float]) -> list[str]:
    """Say which of the texts gives another number than the code."""
    want = known(**values)
    cells = {name: f"A{number}" for number, name in enumerate(values, start=1)}
    greek = {name: _GREEK.get(name, name) for name in values}
    texts = {
        "sheet": (known.sheet(cells)[1:], {cells[n]: v for n, v in values.items()}, True, False),
        "sheet with numbers": (known.sheet(values)[1:], {}, True, False),
    }
    for tighter in (False, True):
        named = {greek[n]: v for n, v in values.items()}
        texts[f"print, dot tighter {tighter}"] = (known.printed.split(" = ")[1], named, False, tighter)
        texts[f"numbers, dot tighter {tighter}"] = (
            known.with_numbers(values).split(" = ")[1],
            {},
            False,
            tighter,
        )
    off = []
    for kind, (text, named, sheet, tighter) in texts.items():
        try:
            found = Reader(text, named, sheet=sheet, dot_tighter=tighter).whole()
        except (ValueError, AssertionError) as error:
            off.append(f"{known.name}, {kind}: {text} cannot be read: {error}")
            continue
        if not math.isclose(found, float(want), rel_tol=1e-11, abs_tol=1e-300):
            off.append(f"{known.name}, {kind}: {text} gives {found!r}, the code {want!r}")
    return off


@given(st.integers(0, 2**32 - 1))
@settings(max_examples=15, deadline=None)
def test_what_is_printed_is_what_is_computed(seed: int) -> None:
    for known in REGISTER.values():
        assert differences(known, sample(known, seed)) == []


@formula(
    gives="y", unit="-", clause="-", standard="-", edition="-", status="ours", source="this test", register={}
)
def knotted(*, a: Num, b: Num, c: Num) -> Num:
    """Give every pair of operations in both orders."""
    return (
        a
        - (b - c)
        + a / (b * c) * (b / c) / (a / b)
        - (-a) ** 2
        - -(b**2)
        + (a + b) ** 2 * c / (a - b / c)
        + (a * b) ** 3
    )


@pytest.mark.parametrize(
    ("level", "as_if"),
    [
        ("_SUM", "_PRODUCT"),
        ("_QUOTIENT", "_PRODUCT"),
        ("_POWER", "_PRODUCT"),
        ("_PRODUCT", "_ATOM"),
        ("_NEGATIVE", "_ATOM"),
    ],
)
def test_a_translator_with_one_precedence_wrong_is_caught(
    level: str, as_if: str, monkeypatch: pytest.MonkeyPatch
) -> None:
    values = {"a": 5.0, "b": 3.0, "c": 1.7}
    assert differences(knotted, values) == []
    monkeypatch.setattr(writing, level, getattr(writing, as_if))
    assert differences(knotted, values) != []


@pytest.mark.parametrize("seed", range(5))
def test_the_symbolic_form_gives_the_same_number(seed: int) -> None:
    import sympy

    for known in REGISTER.values():
        values = sample(known, seed)
        put = known.symbolic().subs(
            {sympy.Symbol(n, positive=True): sympy.Float(v, 30) for n, v in values.items()}
        )
        assert float(put) == pytest.approx(float(known(**values)), rel=1e-11)


@given(st.integers(0, 2**32 - 1), st.integers(1, 9), st.booleans())
@settings(max_examples=15, deadline=None)
def test_floats_and_arrays_agree_to_four_units_in_the_last_place(
    seed: int, count: int, strided: bool
) -> None:
    for known in REGISTER.values():
        rows = [sample(known, seed + number) for number in range(count)]
        alone = np.array([float(known(**row)) for row in rows])
        columns: dict[str, Num] = {}
        for name in known.arguments:
            column = np.array([row[name] for row in rows])
            columns[name] = np.repeat(column, 2)[::2] if strided else column
        np.testing.assert_array_max_ulp(known.array(**columns), alone, maxulp=4)


def test_every_limit_names_what_takes_over_and_every_argument_has_its_unit() -> None:
    from fleet.words import DOUBTS

    for known in REGISTER.values():
        assert set(known.units) == set(known.arguments), known.name
        assert known.unit in {"MPa", "mm", "-", "MPa/mm", "mm/year", "year"}, known.name
        for limit in known.limits:
            if limit.kind == "proportion":
                assert limit.then in DOUBTS, known.name
            elif match := re.match(r"the (\w+) form", limit.then):
                assert any(name.startswith(match.group(1)) for name in REGISTER), limit.then
