"""What a formula is: one typed expression from which code, print, spreadsheet and symbolic form all follow.

A formula is an ordinary function with keyword-only arguments whose body is a docstring and one ``return``
of an expression over its arguments and the functions below. The `formula` decorator refuses anything else
when the module is imported, and enters the formula in `REGISTER` with clause, edition, status and limits.
Limits are text of the same small language, so that what is printed beside a figure is what was checked.
"""

from fleet.formula.language import (
    Condition,
    Floats,
    Num,
    Status,
    absolute,
    cos,
    exp,
    floor,
    log,
    maximum,
    minimum,
    power,
    radians,
    sin,
    sqrt,
    square,
    tan,
    where,
)
from fleet.formula.limits import Limit, domain, proportion
from fleet.formula.register import REGISTER, Formula, formula

__all__ = [
    "REGISTER",
    "Condition",
    "Floats",
    "Formula",
    "Limit",
    "Num",
    "Status",
    "absolute",
    "cos",
    "domain",
    "exp",
    "floor",
    "formula",
    "log",
    "maximum",
    "minimum",
    "power",
    "proportion",
    "radians",
    "sin",
    "sqrt",
    "square",
    "tan",
    "where",
]
