"""How an expression is written: for a reader, with numbers put in, or as a live spreadsheet formula."""

from __future__ import annotations

import ast
import re
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any, cast

from fleet.formula.language import OPERATORS

_NEGATIVE, _SUM, _QUOTIENT, _PRODUCT, _POWER, _ATOM = range(6)
_GREEK = {
    "alpha": "α", "beta": "β", "gamma": "γ", "delta": "δ", "theta": "θ", "lambda_": "λ", "mu": "µ", "nu": "ν",
    "rho": "ρ", "sigma": "σ", "phi": "φ",
}  # fmt: skip
_SHEET_WORDS = {
    "log": "LN",
    "minimum": "MIN",
    "maximum": "MAX",
    "where": "IF",
    "floor": "INT",
    "absolute": "ABS",
}
_PRINT_WORDS = {"log": "ln", "minimum": "min", "maximum": "max", "absolute": "abs"}
_WHOLE = re.compile(r"('[^']+'!)?[^\s+*/^()−-]+")  # a name, a number, a cell: needs no brackets
_SIGNS: dict[type[ast.AST], str] = {ast.Lt: "<", ast.LtE: "<=", ast.Gt: ">", ast.GtE: ">="}


def typographic(name: str) -> str:
    """Write a name as an engineer would.

    Parameters
    ----------
    name : str
        A name of Python [text].

    Returns
    -------
    str

    Examples
    --------
    >>> typographic("sigma_h"), typographic("Ro")
    ('σ_h', 'Ro')
    """
    head, _, tail = name.partition("_") if name not in _GREEK else (name, "", "")
    return _GREEK.get(head, head) + (f"_{tail}" if tail else "")


def number(value: float) -> str:
    """Write a number so that reading it back gives the same number.

    Parameters
    ----------
    value : float
        The number [-].

    Returns
    -------
    str

    Examples
    --------
    >>> number(600.0), number(0.1), number(9.807e-6)
    ('600', '0.1', '9.807E-06')
    """
    text = repr(float(value)).removesuffix(".0")
    return text.upper()


@dataclass(frozen=True)
class Dialect:
    """How operators, functions and names are written, for a reader or for a spreadsheet.

    Parameters
    ----------
    sheet : bool
        Whether a spreadsheet reads it [-].
    values : mapping of str to str
        What stands for each name [text].
    """

    sheet: bool
    values: Mapping[str, str]

    def expression(self, node: ast.expr) -> tuple[str, int]:  # noqa: PLR0911  # one for each kind of node
        """Write an expression and say how tightly it binds.

        Parameters
        ----------
        node : ast.expr
            An expression of the small language [-].

        Returns
        -------
        tuple of str and int
        """
        if isinstance(node, ast.Constant):
            return number(cast("float", node.value)), _ATOM
        if isinstance(node, ast.Name):
            text = self.values[node.id]
            return text, (_ATOM if _WHOLE.fullmatch(text) else _NEGATIVE)
        if isinstance(node, ast.UnaryOp) and self.sheet:
            # A spreadsheet reads -a^b as (-a)^b: everything but an atom goes in brackets.
            return f"-{self.inside(node.operand, _ATOM)}", _NEGATIVE
        if isinstance(node, ast.UnaryOp):
            return f"−{self.inside(node.operand, _QUOTIENT)}", _NEGATIVE
        if isinstance(node, ast.BinOp):
            return self.operation(node)
        if isinstance(node, ast.Compare):
            sign = _SIGNS[type(node.ops[0])]
            shown = sign if self.sheet else sign.replace("<=", "≤").replace(">=", "≥")
            return (
                f"{self.inside(node.left, _SUM)} {shown} {self.inside(node.comparators[0], _SUM)}",
                _NEGATIVE,
            )
        return self.call(cast("ast.Call", node))

    def inside(self, node: ast.expr, least: int) -> str:
        """Write an expression, in brackets if it binds less tightly than it must.

        Parameters
        ----------
        node : ast.expr
            An expression of the small language [-].
        least : int
            How tightly it must bind [-].

        Returns
        -------
        str
        """
        text, level = self.expression(node)
        return text if level >= least else f"({text})"

    def operation(self, node: ast.BinOp) -> tuple[str, int]:
        """Write a sum, product, quotient or power with the brackets that both ways of reading need.

        Parameters
        ----------
        node : ast.BinOp
            The operation [-].

        Returns
        -------
        tuple of str and int
        """
        left, right = node.left, node.right
        keep = 1 if self.sheet else 0  # a spreadsheet must add and multiply in our order
        if isinstance(node.op, ast.Add):
            return f"{self.inside(left, _NEGATIVE)} + {self.inside(right, _SUM + keep)}", _SUM
        if isinstance(node.op, ast.Sub):
            sign = "-" if self.sheet else "−"
            return f"{self.inside(left, _NEGATIVE)} {sign} {self.inside(right, _QUOTIENT)}", _SUM
        if isinstance(node.op, ast.Mult):
            dot = "*" if self.sheet else "·"
            return f"{self.inside(left, _PRODUCT)}{dot}{self.inside(right, _PRODUCT + keep)}", _PRODUCT
        if isinstance(node.op, ast.Div):
            return f"{self.inside(left, _PRODUCT)} / {self.inside(right, _POWER)}", _QUOTIENT
        return self.raised(left, right)

    def raised(self, base: ast.expr, exponent: ast.expr) -> tuple[str, int]:
        """Write a power; whole powers stand raised in print.

        Parameters
        ----------
        base, exponent : ast.expr
            Its two sides [-].

        Returns
        -------
        tuple of str and int
        """
        power_text = self.inside(exponent, _ATOM)
        if self.sheet or power_text not in {"2", "3"}:
            return f"{self.inside(base, _ATOM)}^{power_text}", _POWER
        return self.inside(base, _ATOM) + {"2": "²", "3": "³"}[power_text], _POWER

    def call(self, node: ast.Call) -> tuple[str, int]:
        """Write a function.

        Parameters
        ----------
        node : ast.Call
            The call [-].

        Returns
        -------
        tuple of str and int
        """
        name = cast("ast.Name", node.func).id
        if name in {"square", "power"}:
            return self.raised(node.args[0], node.args[1] if name == "power" else ast.Constant(2))
        inner = [self.expression(each)[0] for each in node.args]
        if self.sheet:
            return f"{_SHEET_WORDS.get(name, name.upper())}({','.join(inner)})", _ATOM
        if name == "sqrt":
            return f"√{self.inside(node.args[0], _ATOM)}", _POWER
        if name == "where":
            return f"({inner[1]} if {inner[0]}, else {inner[2]})", _ATOM
        if name == "radians":
            return f"{self.inside(node.args[0], _ATOM)}°", _ATOM
        return f"{_PRINT_WORDS.get(name, name)}({', '.join(inner)})", _ATOM


def symbolic(node: ast.expr) -> Any:  # noqa: PLR0911  # one for each kind of node; a sympy expression; sympy carries no types
    """Build the sympy expression of positive symbols, its numbers exact.

    Parameters
    ----------
    node : ast.expr
        An expression of the small language [-].

    Returns
    -------
    sympy.Expr
    """
    import sympy  # noqa: PLC0415  # a development tool: nothing else of fleet needs it

    if isinstance(node, ast.Constant):
        return sympy.Rational(repr(node.value))
    if isinstance(node, ast.Name):
        return sympy.Symbol(node.id, positive=True)
    if isinstance(node, ast.UnaryOp):
        return -symbolic(node.operand)
    if isinstance(node, ast.BinOp):
        return OPERATORS[type(node.op)](symbolic(node.left), symbolic(node.right))
    if isinstance(node, ast.Compare):
        return OPERATORS[type(node.ops[0])](symbolic(node.left), symbolic(node.comparators[0]))
    call = cast("ast.Call", node)
    name = cast("ast.Name", call.func).id
    words = {"minimum": "Min", "maximum": "Max", "power": "Pow", "absolute": "Abs"}
    arguments = [symbolic(each) for each in call.args]
    if name == "where":
        return sympy.Piecewise((arguments[1], arguments[0]), (arguments[2], True))
    if name == "radians":
        return arguments[0] * sympy.pi / 180
    if name == "square":
        return arguments[0] ** 2
    return getattr(sympy, words.get(name, name))(*arguments)
