"""The small language of formulas: its functions, what an expression may hold, how it is worked out."""

from __future__ import annotations

import ast
import operator
from collections.abc import Callable, Iterable, Mapping
from typing import Any, Literal, cast

import numpy as np
from numpy.typing import NDArray

from fleet.errors import OurFault

Floats = NDArray[np.float64]
Num = float | Floats
Condition = bool | NDArray[np.bool_]
Status = Literal["confirmed", "secondary", "from memory", "ours"]

_One = Callable[[Num], Num]
_Two = Callable[[Num, Num], Num]
# The NumPy functions themselves, told to the type checker as taking floats and arrays alike.
sqrt, square, exp, log = (cast("_One", f) for f in (np.sqrt, np.square, np.exp, np.log))
cos, sin, tan, radians = (cast("_One", f) for f in (np.cos, np.sin, np.tan, np.radians))
floor, absolute = (cast("_One", f) for f in (np.floor, np.absolute))
minimum, maximum, power = (cast("_Two", f) for f in (np.minimum, np.maximum, np.power))
where = cast("Callable[[Condition, Num, Num], Num]", np.where)

FUNCTIONS: dict[str, Any] = {
    "sqrt": sqrt, "square": square, "exp": exp, "log": log, "cos": cos, "sin": sin, "tan": tan,
    "radians": radians, "floor": floor, "absolute": absolute, "minimum": minimum, "maximum": maximum,
    "power": power, "where": where,
}  # fmt: skip
"""Every function an expression may use, by the name under which it is translated."""

_ARITY = {"minimum": 2, "maximum": 2, "power": 2, "where": 3}
OPERATORS: dict[type[ast.AST], Callable[[Any, Any], Any]] = {
    ast.Add: operator.add, ast.Sub: operator.sub, ast.Mult: operator.mul, ast.Div: operator.truediv,
    ast.Pow: operator.pow, ast.Lt: operator.lt, ast.LtE: operator.le, ast.Gt: operator.gt,
    ast.GtE: operator.ge,
}  # fmt: skip


def _function_name(node: ast.expr, names: Mapping[str, Any]) -> str:
    """Name in `FUNCTIONS` of the very object that `node` calls in its module, or '' if it is another."""
    found: Any = None
    if isinstance(node, ast.Name):
        found = names.get(node.id)
    elif (
        isinstance(node, ast.Attribute)
        and isinstance(node.value, ast.Name)
        and names.get(node.value.id) is np
    ):
        found = getattr(np, node.attr, None)
    return next((name for name, known in FUNCTIONS.items() if known is found), "")


def normal(node: ast.expr, place: str, arguments: Iterable[str], names: Mapping[str, Any]) -> ast.expr:
    """Copy an expression with every call by its plain name; refuse what the small language does not have.

    Parameters
    ----------
    node : ast.expr
        The expression as written [-].
    place : str
        What to name in a refusal [text].
    arguments : iterable of str
        The names it may use [text].
    names : mapping
        What the names of its module stand for [-].

    Returns
    -------
    ast.expr

    Raises
    ------
    OurFault
        If it holds anything else.
    """
    if isinstance(node, ast.Constant) and type(node.value) in {int, float} and "inf" not in repr(node.value):
        return node
    if isinstance(node, ast.Name) and node.id in arguments:
        return node
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub):
        return ast.UnaryOp(node.op, normal(node.operand, place, arguments, names))
    if isinstance(node, ast.BinOp) and type(node.op) in OPERATORS:
        whole = isinstance(node.right, ast.Constant) and node.right.value in {2, 3}
        if isinstance(node.op, ast.Pow) and not whole:
            raise OurFault(
                place, f"the power '{ast.unparse(node)}'", "use ** with 2 or 3 only, else power(x, y)"
            )
        left, right = (normal(side, place, arguments, names) for side in (node.left, node.right))
        return ast.BinOp(left, node.op, right)
    if isinstance(node, ast.Call) and not node.keywords:
        name = _function_name(node.func, names)
        if name and len(node.args) == _ARITY.get(name, 1):
            first, *rest = node.args
            start = (
                comparison(first, place, arguments, names)
                if name == "where"
                else normal(first, place, arguments, names)
            )
            others = [normal(each, place, arguments, names) for each in rest]
            return ast.Call(ast.Name(name), [start, *others], [])
    allowed = "use only the arguments, numbers, + - * / and " + ", ".join(FUNCTIONS)
    raise OurFault(place, f"'{ast.unparse(node)}' is not part of a formula", allowed)


def comparison(node: ast.expr, place: str, arguments: Iterable[str], names: Mapping[str, Any]) -> ast.Compare:
    """Copy one comparison of two expressions.

    Parameters
    ----------
    node : ast.expr
        The comparison as written [-].
    place : str
        What to name in a refusal [text].
    arguments : iterable of str
        The names it may use [text].
    names : mapping
        What the names of its module stand for [-].

    Returns
    -------
    ast.Compare

    Raises
    ------
    OurFault
        If it is anything else.
    """
    if not (isinstance(node, ast.Compare) and len(node.ops) == 1 and type(node.ops[0]) in OPERATORS):
        raise OurFault(place, f"'{ast.unparse(node)}' is not one comparison", "write one of < <= > >=")
    sides = [normal(side, place, arguments, names) for side in (node.left, node.comparators[0])]
    return ast.Compare(sides[0], node.ops, [sides[1]])


def names_in(node: ast.expr) -> tuple[str, ...]:
    """Give the quantities of an expression in order of first appearance.

    Parameters
    ----------
    node : ast.expr
        An expression of the small language [-].

    Returns
    -------
    tuple of str
    """
    found = [each.id for each in ast.walk(node) if isinstance(each, ast.Name)]
    return tuple(dict.fromkeys(name for name in found if name not in FUNCTIONS))


def evaluated(node: ast.expr, values: Mapping[str, Any]) -> Any:  # number, array or truth
    """Work an expression of the small language out.

    Parameters
    ----------
    node : ast.expr
        An expression of the small language [-].
    values : mapping
        A number or array for every quantity in it [-].

    Returns
    -------
    float, bool or array
    """
    if isinstance(node, ast.Constant):
        return node.value
    if isinstance(node, ast.Name):
        return values[node.id]
    if isinstance(node, ast.UnaryOp):
        return -evaluated(node.operand, values)
    if isinstance(node, ast.BinOp):
        return OPERATORS[type(node.op)](evaluated(node.left, values), evaluated(node.right, values))
    if isinstance(node, ast.Compare):
        left, right = evaluated(node.left, values), evaluated(node.comparators[0], values)
        return OPERATORS[type(node.ops[0])](left, right)
    call = cast("ast.Call", node)
    return FUNCTIONS[cast("ast.Name", call.func).id](*(evaluated(each, values) for each in call.args))
