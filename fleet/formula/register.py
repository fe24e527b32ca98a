"""The formula itself, the decorator that makes one, and the register of them all."""

from __future__ import annotations

import ast
import inspect
import linecache
import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import lru_cache
from types import FunctionType
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fleet.errors import OurFault, OutsideLimits
from fleet.formula.language import FUNCTIONS, Floats, Num, Status, names_in, normal
from fleet.formula.limits import Limit
from fleet.formula.writing import Dialect, number, symbolic, typographic


@dataclass(frozen=True, eq=False)
class Formula:
    """One formula of the register; made by the `formula` decorator, called with keywords.

    Parameters
    ----------
    function : function
        The typed function as written [-].
    tree : ast.expr
        Its expression [-].
    arguments : tuple of str
        Its arguments in order [text].
    gives, unit : str
        Symbol and unit of the result [text].
    clause, standard, edition : str
        Where it stands [text].
    status : str
        How well it is known: confirmed, secondary, from memory, ours [text].
    source : str
        What was read [text].
    limits : tuple of Limit
        Domain limits first, then proportions [-].

    Notes
    -----
    A call never raises on values: NaN goes in and comes out, and so does what overflows. All arithmetic is
    done on arrays of at least one dimension, so a float gives the last digit that an array gives for it.
    """

    function: FunctionType
    tree: ast.expr
    arguments: tuple[str, ...]
    gives: str
    unit: str
    clause: str
    standard: str
    edition: str
    status: Status
    source: str
    limits: tuple[Limit, ...] = ()

    def __post_init__(self) -> None:
        # what `inspect`, `help` and doctest look for in a function
        for name in ("__module__", "__name__", "__qualname__", "__doc__"):
            object.__setattr__(self, name, getattr(self.function, name))
        object.__setattr__(self, "__wrapped__", self.function)

    @property
    def name(self) -> str:
        """The name under which the register keeps it."""
        return self.function.__name__

    @property
    def doc(self) -> str:
        """The docstring, without its indentation."""
        return inspect.getdoc(self.function) or ""

    @property
    def units(self) -> dict[str, str]:
        """The unit of every argument, read from the docstring."""
        found: dict[str, str] = {}
        section = re.search(
            r"^Parameters\n-+\n(.*?)(?=^\S[^\n]*\n-+\n|\Z)", self.doc + "\n", re.MULTILINE | re.DOTALL
        )
        entries = re.split(r"^(?=\S)", section.group(1) if section else "", flags=re.MULTILINE)
        for entry in filter(None, entries):
            names, brackets = entry.split(" : ")[0], re.findall(r"\[([^\]]+)\]", entry)
            found |= {each.strip(): brackets[-1] for each in names.split(",") if brackets}
        return found

    def __call__(self, **values: Num) -> Num:
        """Work the formula out: a float from floats, else an array."""
        result = self.array(**values)
        return float(result[0]) if all(np.ndim(each) == 0 for each in values.values()) else result

    def array(self, **values: Num) -> Floats:
        """Work the formula out on arrays; the result has at least one dimension.

        Parameters
        ----------
        **values : float or array
            Every argument by name, in the units of the docstring [-].

        Returns
        -------
        ndarray
            The result in `unit`.

        Raises
        ------
        TypeError
            If an argument is missing or unknown.
        """
        arrays = {
            name: np.ascontiguousarray(np.atleast_1d(np.asarray(each, dtype=np.float64)))
            for name, each in values.items()
        }
        with np.errstate(all="ignore"):
            result = np.asarray(self.function(**arrays), dtype=np.float64)
        unknown = np.zeros(1, dtype=np.bool_)
        for each in arrays.values():
            unknown = unknown | np.isnan(each)
        return np.where(unknown, np.nan, result) if unknown.any() else result

    def _known(self, values: Mapping[str, Num]) -> dict[str, Num]:
        """Give the values, and the result too where a limit speaks of it."""
        known = dict(values)
        if self.gives not in known and any(self.gives in limit.names for limit in self.limits):
            known[self.gives] = self.array(**{name: values[name] for name in self.arguments})
        return known

    def limit_codes(self, **values: Num) -> NDArray[np.int8]:
        """Say which limit is broken, row by row.

        Parameters
        ----------
        **values : float or array
            The arguments, and further quantities that a limit speaks of where they are known [-].

        Returns
        -------
        ndarray of int8
            0 inside, k for the k-th limit; the first that is broken, domain limits coming first. Where a
            quantity is NaN or not given its limit is not broken: the figure is NaN, or the caller's to check.
        """
        known = self._known(values)
        shape = np.broadcast_shapes((1,), *(np.shape(each) for each in known.values()))
        codes = np.zeros(shape, dtype=np.int8)
        for place, limit in reversed(list(enumerate(self.limits, start=1))):
            codes[np.broadcast_to(limit.broken(known), shape)] = place
        return codes

    def checked(self, **values: Num) -> Num:
        """Work the formula out and refuse outside its limits.

        Parameters
        ----------
        **values : float or array
            The arguments and every further quantity that a limit speaks of [-].

        Returns
        -------
        float or ndarray
            The result in `unit`.

        Raises
        ------
        OutsideLimits
            If a limit is broken, or cannot be checked because a quantity is not given or not a number.
        """
        place = f"{self.name} ({self.clause})"
        known = self._known(values)
        wanted = dict.fromkeys(name for limit in self.limits for name in limit.names)
        unknown = [name for name in (*self.arguments, *wanted) if np.any(np.isnan(known.get(name, np.nan)))]
        if unknown:
            raise OutsideLimits(place, f"{', '.join(unknown)} not given as a number", "give every quantity")
        codes = self.limit_codes(**known)
        if codes.any():
            limit = self.limits[int(codes[codes > 0][0]) - 1]
            raise OutsideLimits(place, f"{limit.printed} does not hold", f"beyond it: {limit.then}")
        return self(**{name: values[name] for name in self.arguments})

    @property
    def printed(self) -> str:
        """The formula in print, such as ``P = S·E·t / (R + 0.6·t)``."""
        names = {name: typographic(name) for name in self.arguments}
        return f"{typographic(self.gives)} = {self._written(False, names)}"

    def with_numbers(self, values: Mapping[str, float | str]) -> str:
        """Write the formula with numbers in place of its symbols.

        Parameters
        ----------
        values : mapping of str to float or str
            A number, or a number already written, for every argument [-].

        Returns
        -------
        str
            Such as ``P = 138·0.85·12 / (600 + 0.6·12)``.

        Raises
        ------
        OurFault
            If a value is missing.
        """
        return f"{typographic(self.gives)} = {self._written(False, self._texts(values))}"

    def sheet(self, cells: Mapping[str, float | str]) -> str:
        """Write the formula as a live spreadsheet formula.

        Parameters
        ----------
        cells : mapping of str to str or float
            The cell, or a number, that holds each argument [-].

        Returns
        -------
        str
            Such as ``=B2*B3*B5 / (B4 + 0.6*B5)``.

        Raises
        ------
        OurFault
            If a cell is missing.
        """
        return "=" + self._written(True, self._texts(cells))

    def symbolic(self) -> Any:  # a sympy expression; sympy carries no types
        """Give the expression as a sympy expression of positive symbols, its numbers exact.

        Returns
        -------
        sympy.Expr
        """
        return symbolic(self.tree)

    def _texts(self, values: Mapping[str, float | str]) -> dict[str, str]:
        missing = [name for name in self.arguments if name not in values]
        if missing:
            raise OurFault(self.name, f"no value for {', '.join(missing)}", "give every argument")
        return {n: v if isinstance(v := values[n], str) else number(v) for n in self.arguments}

    def _written(self, sheet: bool, values: Mapping[str, str]) -> str:
        return Dialect(sheet, values).expression(self.tree)[0]


REGISTER: dict[str, Formula] = {}
"""Every formula of the program by name, entered when its module is imported."""


@lru_cache(maxsize=64)
def _definitions(filename: str) -> dict[int, ast.FunctionDef]:
    """Every decorated function of a file by the line of its first decorator."""
    tree = ast.parse("".join(linecache.getlines(filename)))
    found = [each for each in ast.walk(tree) if isinstance(each, ast.FunctionDef) and each.decorator_list]
    return {each.decorator_list[0].lineno: each for each in found}


def _expression(function: FunctionType) -> tuple[ast.expr, tuple[str, ...]]:
    """Check the shape of a function and give its expression and arguments."""
    place = f"formula {function.__name__}"
    code = function.__code__
    definition = _definitions(code.co_filename).get(code.co_firstlineno)
    if definition is None or definition.name != function.__name__:
        raise OurFault(place, "its source cannot be read", "install fleet with its .py files")
    spec = definition.args
    arguments = tuple(each.arg for each in spec.kwonlyargs)
    if not arguments or spec.args or spec.posonlyargs or spec.vararg or spec.kwarg or any(spec.kw_defaults):
        raise OurFault(place, "its arguments are not keyword-only without defaults", "write (*, S: Num, ...)")
    match definition.body:
        case [ast.Expr(value=ast.Constant(value=str())), ast.Return(value=ast.expr() as found)]:
            tree = normal(found, place, arguments, function.__globals__)
        case _:
            raise OurFault(
                place, "its body is more than a docstring and one return", "keep to one expression"
            )
    taken = [each for each in arguments if each in FUNCTIONS]
    if taken:
        raise OurFault(place, f"{', '.join(taken)} is the name of a function", "rename the argument")
    unused = [each for each in arguments if each not in names_in(tree)]
    if unused:
        raise OurFault(place, f"{', '.join(unused)} does not occur in the expression", "drop the argument")
    return tree, arguments


def formula(
    *,
    gives: str,
    unit: str,
    clause: str,
    standard: str,
    edition: str,
    status: Status,
    source: str,
    limits: tuple[Limit, ...] = (),
    register: dict[str, Formula] = REGISTER,
) -> Callable[[Callable[..., Num]], Formula]:
    """Enter a function in the register as a formula.

    Parameters
    ----------
    gives, unit : str
        Symbol and unit of the result [text].
    clause, standard, edition : str
        Where it stands [text].
    status : str
        How well it is known: confirmed, secondary, from memory, ours [text].
    source : str
        What was read [text].
    limits : tuple of Limit
        Domain limits first, then proportions [-].
    register : dict
        The register it is entered in [-].

    Returns
    -------
    callable
        The decorator, which gives a `Formula`.

    Raises
    ------
    OurFault
        At import, if the function is anything but a docstring and one expression of the small language, if its
        name is taken, or if a domain limit follows a proportion.

    Examples
    --------
    >>> from fleet.formula import domain
    >>> @formula(gives="p", unit="MPa", clause="-", standard="mechanics", edition="-",
    ...          status="confirmed", source="any textbook", register={},
    ...          limits=(domain("r >= 10 * t", instead="thick form"),))
    ... def thin_pressure(*, sigma: Num, r: Num, t: Num) -> Num:
    ...     '''Give the pressure.'''
    ...     return sigma * t / r
    >>> thin_pressure.printed, thin_pressure.sheet({"sigma": "A1", "r": "A2", "t": "A3"})
    ('p = σ·t / r', '=A1*A3 / A2')
    >>> thin_pressure(sigma=100.0, r=500.0, t=10.0)
    2.0
    """

    def entered(function: Callable[..., Num]) -> Formula:
        if not isinstance(function, FunctionType):
            raise OurFault("formula", f"{function!r} is not a function", "decorate a plain function")
        place = f"formula {function.__name__}"
        tree, arguments = _expression(function)
        kinds = [each.kind for each in limits]
        if kinds != sorted(kinds):
            raise OurFault(place, "a domain limit follows a proportion", "put the domain limits first")
        if function.__name__ in register:
            raise OurFault(place, "the name is in the register already", "choose another name")
        made = Formula(
            function, tree, arguments, gives, unit, clause, standard, edition, status, source, limits
        )
        register[made.name] = made
        return made

    return entered
