"""What the decorator accepts and refuses, how formulas are written, and how limits speak."""

from __future__ import annotations

import math
import re
from collections.abc import Callable

import numpy as np
import pytest

from fleet.errors import OurFault, OutsideLimits
from fleet.formula import (
    REGISTER,
    Formula,
    Num,
    absolute,
    domain,
    exp,
    floor,
    formula,
    log,
    maximum,
    minimum,
    power,
    proportion,
    radians,
    sqrt,
    square,
    tan,
    where,
)
from fleet.formula.limits import Limit


def entered(
    *limits: Limit, gives: str = "y", register: dict[str, Formula] | None = None
) -> Callable[..., Formula]:
    own: dict[str, Formula] = {} if register is None else register
    return formula(
        gives=gives, unit="MPa", clause="clause 1", standard="a standard", edition="any", status="ours",
        source="this test", limits=limits, register=own,
    )  # fmt: skip


@entered(
    domain("t <= R / 2", instead="the thick form"),
    proportion("r >= 3 * t", doubt="knuckle proportions"),
    gives="P",
)
def hoop(*, S: Num, E: Num, R: Num, t: Num) -> Num:
    """Give a pressure.

    Parameters
    ----------
    S : float or array
        Stress [MPa].
    E : float or array
        Efficiency [-].
    R, t : float or array
        Radius and wall [mm].

    Returns
    -------
    float or array
        Pressure [MPa].
    """
    return S * E * t / (R + 0.6 * t)


def test_it_is_called_on_floats_and_on_arrays() -> None:
    one = hoop(S=138.0, E=0.85, R=600.0, t=12.0)
    many = hoop(S=138.0, E=0.85, R=600.0, t=np.array([12.0, 24.0]))
    assert isinstance(one, float)
    assert one == pytest.approx(138 * 0.85 * 12 / (600 + 0.6 * 12), rel=1e-15)
    assert isinstance(many, np.ndarray)
    assert many[0] == one


def test_it_carries_what_was_said_of_it() -> None:
    assert (hoop.name, hoop.gives, hoop.unit, hoop.clause) == ("hoop", "P", "MPa", "clause 1")
    assert (hoop.standard, hoop.edition, hoop.status, hoop.source) == (
        "a standard",
        "any",
        "ours",
        "this test",
    )
    assert hoop.doc.startswith("Give a pressure.")
    assert hoop.units == {"S": "MPa", "E": "-", "R": "mm", "t": "mm"}
    assert hoop.__doc__ is not None


def test_it_is_written_for_a_reader() -> None:
    assert hoop.printed == "P = S·E·t / (R + 0.6·t)"
    assert (
        hoop.with_numbers({"S": 138.0, "E": 0.85, "R": 600, "t": "12.00"})
        == "P = 138·0.85·12.00 / (600 + 0.6·12.00)"
    )


def test_it_is_written_for_a_spreadsheet() -> None:
    assert hoop.sheet({"S": "B4", "E": "B5", "R": "B6", "t": "B7"}) == "=B4*B5*B7 / (B6 + 0.6*B7)"
    assert (
        hoop.sheet({"S": "B4", "E": "B5", "R": "'a b'!B6", "t": "B7+1"})
        == "=B4*B5*(B7+1) / ('a b'!B6 + 0.6*(B7+1))"
    )


def test_a_missing_value_is_our_fault() -> None:
    with pytest.raises(OurFault, match="hoop: no value for R, t"):
        hoop.sheet({"S": "B4", "E": "B5"})


def test_it_is_written_as_symbols() -> None:
    import sympy

    S, E, R, t = sympy.symbols("S E R t", positive=True)
    assert sympy.simplify(hoop.symbolic() - S * E * t / (R + sympy.Rational(3, 5) * t)) == 0


@entered()
def minus_power(*, a: Num, b: Num) -> Num:
    """Give a trap of the spreadsheet: there the minus binds before the power."""
    return -(a**2) - (-a) ** 3 - b / (a * b) * (a - (b - 1)) - a / (b / a)


def test_minus_and_power_are_bracketed_for_the_spreadsheet() -> None:
    assert (
        minus_power.sheet({"a": "A1", "b": "A2"})
        == "=-(A1^2) - (-A1)^3 - (A2 / (A1*A2))*(A1 - (A2 - 1)) - A1 / (A2 / A1)"
    )
    assert minus_power.printed == "y = −a² − (−a)³ − (b / (a·b))·(a − (b − 1)) − a / (b / a)"
    assert minus_power.sheet({"a": -2.0, "b": "A2"}).startswith("=-((-2)^2)")


@entered()
def every_function(*, x: Num, alpha: Num, sigma_h: Num) -> Num:
    """Use every function once."""
    return (
        where(x < 1, sqrt(x), exp(-x))
        + minimum(x, maximum(alpha, 1))
        + np.tan(radians(alpha))
        + log(square(x) + 1)
        + power(sigma_h, 1 / 3)
        + floor(x)
        + absolute(x - 2)
    )


def test_every_function_has_its_words() -> None:
    assert every_function.sheet({"x": "A1", "alpha": "A2", "sigma_h": "A3"}) == (
        "=IF(A1 < 1,SQRT(A1),EXP(-A1)) + MIN(A1,MAX(A2,1)) + TAN(RADIANS(A2)) + LN(A1^2 + 1) + A3^(1 / 3)"
        " + INT(A1) + ABS(A1 - 2)"
    )
    assert every_function.printed == (
        "y = (√x if x < 1, else exp(−x)) + min(x, max(α, 1)) + tan(α°) + ln(x² + 1) + σ_h^(1 / 3) + floor(x)"
        " + abs(x − 2)"
    )
    value = every_function(x=0.25, alpha=45.0, sigma_h=8.0)
    assert value == pytest.approx(0.5 + 0.25 + 1 + math.log(1.0625) + 2 + 0 + 1.75, rel=1e-14)
    import sympy

    x, alpha, sigma = (sympy.Symbol(name, positive=True) for name in ("x", "alpha", "sigma_h"))
    put = every_function.symbolic().subs({x: sympy.Rational(1, 4), alpha: 45, sigma: 8})
    assert float(put) == pytest.approx(float(value), rel=1e-14)


def test_another_function_of_the_same_name_is_refused() -> None:
    namespace: dict[str, object] = {}
    source = "def sqrt(x):\n    return x\n"
    exec(compile(source, "<elsewhere>", "exec"), namespace)  # noqa: S102  # a stand-in with a known name
    assert namespace["sqrt"] is not np.sqrt
    with pytest.raises(OurFault, match=re.escape("'math.sqrt(x)' is not part of a formula")):

        @entered()
        def root(*, x: float) -> Num:
            """Call another square root."""
            return math.sqrt(x)


def test_what_is_not_one_expression_is_refused() -> None:
    with pytest.raises(OurFault, match="more than a docstring and one return"):

        @entered()
        def two_steps(*, x: Num) -> Num:
            """Take two steps."""
            twice = 2 * x
            return twice + 1

    with pytest.raises(OurFault, match="more than a docstring and one return"):

        @entered()
        def no_words(*, x: Num) -> Num:
            return 2 * x


def test_arguments_must_be_keywords_that_are_used() -> None:
    with pytest.raises(OurFault, match="not keyword-only without defaults"):

        @entered()
        def positional(x: Num) -> Num:
            """Take x by place."""
            return 2 * x

    with pytest.raises(OurFault, match="not keyword-only without defaults"):

        @entered()
        def defaulted(*, x: Num = 1.0) -> Num:
            """Have a default."""
            return 2 * x

    with pytest.raises(OurFault, match="z does not occur"):

        @entered()
        def unused(*, x: Num, z: Num) -> Num:
            """Leave z out."""
            return 2 * x

    with pytest.raises(OurFault, match="log is the name of a function"):

        @entered()
        def shadow(*, log: Num) -> Num:
            """Hide a function."""
            return 2 * log


OUTSIDE = 2.0


def test_what_is_not_of_the_language_is_refused() -> None:
    with pytest.raises(OurFault, match="'OUTSIDE' is not part of a formula"):

        @entered()
        def constant(*, x: Num) -> Num:
            """Use a name from outside."""
            return OUTSIDE * x

    with pytest.raises(OurFault, match=re.escape("the power 'x ** 1.5'")):

        @entered()
        def odd_power(*, x: Num) -> Num:
            """Raise to a broken power."""
            return x**1.5

    with pytest.raises(OurFault, match=re.escape("'x // 2' is not part of a formula")):

        @entered()
        def whole(*, x: Num) -> Num:
            """Divide to a whole number."""
            return x // 2

    with pytest.raises(OurFault, match="'True' is not part of a formula"):

        @entered()
        def truth(*, x: Num) -> Num:
            """Add a truth."""
            return x + True

    with pytest.raises(OurFault, match="is not one comparison"):

        @entered()
        def chained(*, x: Num) -> Num:
            """Chain comparisons."""
            return where(0 < x < 1, x, 1)

    with pytest.raises(OurFault, match="is not part of a formula"):

        @entered()
        def two_arguments(*, x: Num) -> Num:
            """Give a function too many arguments."""
            return tan(x, x)  # type: ignore[call-arg]  # refused for that very reason


def test_a_name_is_entered_once() -> None:
    own: dict[str, Formula] = {}

    @entered(register=own)
    def twice(*, x: Num) -> Num:
        """Double."""
        return 2 * x

    assert list(own) == ["twice"]
    with pytest.raises(OurFault, match="the name is in the register already"):
        entered(register=own)(twice.function)
    with pytest.raises(OurFault, match="is not a function"):
        entered(register=own)(np.sqrt)


def test_domain_limits_come_first() -> None:
    with pytest.raises(OurFault, match="a domain limit follows a proportion"):
        entered(proportion("x > 0", doubt="d"), domain("x < 1", instead="i"))(hoop.function)


def test_a_limit_is_one_comparison() -> None:
    with pytest.raises(OurFault, match=re.escape("limit 't + 1': 't + 1' is not one comparison")):
        domain("t + 1", instead="nothing")
    with pytest.raises(OurFault, match="is not one comparison"):
        domain("1 <= t <= 3", instead="nothing")


def test_limits_give_codes() -> None:
    codes = hoop.limit_codes(
        S=138.0, E=1.0, R=100.0, t=np.array([50.0, 50.1, np.nan, 40.0]), r=np.array([150.0, 1.0, 1.0, 119.0])
    )
    assert codes.dtype == np.int8
    assert codes.tolist() == [0, 1, 0, 2]
    assert hoop.limits[0].printed == "t ≤ R / 2"


def test_a_quantity_not_given_breaks_no_limit_but_is_not_checked() -> None:
    assert hoop.limit_codes(S=138.0, E=1.0, R=100.0, t=40.0).tolist() == [0]
    with pytest.raises(OutsideLimits, match="r not given as a number"):
        hoop.checked(S=138.0, E=1.0, R=100.0, t=40.0)
    with pytest.raises(OutsideLimits, match="E, r not given as a number"):
        hoop.checked(S=138.0, E=np.nan, R=100.0, t=40.0)


def test_checked_refuses_outside_its_limits() -> None:
    assert hoop.checked(S=138.0, E=1.0, R=100.0, t=40.0, r=120.0) == hoop(S=138.0, E=1.0, R=100.0, t=40.0)
    with pytest.raises(
        OutsideLimits, match=re.escape("hoop (clause 1): t ≤ R / 2 does not hold; beyond it: the thick form")
    ):
        hoop.checked(S=138.0, E=1.0, R=100.0, t=np.array([40.0, 51.0]), r=300.0)
    with pytest.raises(OutsideLimits, match="r ≥ 3·t does not hold; beyond it: knuckle proportions"):
        hoop.checked(S=138.0, E=1.0, R=100.0, t=40.0, r=119.0)


def test_a_limit_may_speak_of_the_result() -> None:
    @entered(domain("t <= R / 2", instead="the thick form"), gives="t")
    def wall(*, P: Num, R: Num) -> Num:
        """Give a wall."""
        return P * R

    assert wall.limit_codes(P=np.array([0.5, 0.6]), R=10.0).tolist() == [0, 1]


def test_no_value_ever_raises_or_warns() -> None:
    nasty = np.array([np.nan, np.inf, -np.inf, 0.0, -1.0, 1e308])
    for known in REGISTER.values():
        for at in range(len(known.arguments)):
            values: dict[str, Num] = dict.fromkeys(known.arguments, 1.0)
            values[known.arguments[at]] = nasty
            result = known.array(**values)
            assert result.shape == nasty.shape
            assert known.limit_codes(**values).shape == nasty.shape
            assert np.isnan(result[0])


def test_a_missing_argument_is_told() -> None:
    with pytest.raises(TypeError, match="missing 1 required keyword-only argument: 't'"):
        hoop(S=1.0, E=1.0, R=1.0)


def test_source_that_cannot_be_read_is_refused() -> None:
    namespace: dict[str, object] = {"Num": Num}
    text = "def orphan(*, x):\n    '''Have no file.'''\n    return 2 * x\n"
    exec(compile(text, "<nowhere>", "exec"), namespace)  # noqa: S102  # a function without a file
    with pytest.raises(OurFault, match="its source cannot be read"):
        entered()(namespace["orphan"])
