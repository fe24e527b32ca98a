"""Citations: where the formula behind a figure stands, and how well it is known."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from fleet import formula
from fleet.appraisal.views import PartView, VesselView

GIVEN: dict[str, str] = {
    "structural": "structural_minimum as given on the register",
    "external": "required_thickness_external as given on the register",
    "axial load": "required_thickness_axial as given on the register",
    "given": "required_thickness_given as given on the register",
}
"""What a required thickness rests on where no formula sets it [text]."""


AXIAL = "_axial_"
"""What the register writes into the names of formulas for the axial direction [text]."""


def cited(name: str) -> str:
    """Cite a formula with its status, unless that is `confirmed`.

    Parameters
    ----------
    name : str
        Its name in the register of formulas [text].

    Returns
    -------
    str
        Clause, and in brackets the status if the clause itself was not read.

    Examples
    --------
    >>> cited("nobody")
    'nobody (not in the register of formulas)'
    """
    found = formula.REGISTER.get(name)
    if found is None:
        return f"{name} (not in the register of formulas)"
    return found.clause if found.status == "confirmed" else f"{found.clause} ({found.status})"


def required_rests_on(part: PartView, required_by: str | None) -> str:
    """Say which clause, or which word of the register, sets a required thickness.

    Parameters
    ----------
    part : PartView
        The part [-].
    required_by : str or None
        What sets the thickness: hoop, axial, end, structural, external, axial load, given [text].

    Returns
    -------
    str
        Empty where there is no required thickness.
    """
    if required_by is None:
        return ""
    if required_by in GIVEN:
        return GIVEN[required_by]
    thickness = _giving(part.formulas, "mm")
    of_direction = [name for name in thickness if (AXIAL in name) == (required_by == "axial")]
    return listed(of_direction or thickness or part.formulas)


def pressure_rests_on(part: PartView) -> str:
    """Say which clauses the pressures of a part rest on.

    Parameters
    ----------
    part : PartView
        The part [-].

    Returns
    -------
    str
    """
    return listed(_giving(with_inverses(part.formulas), "MPa") or part.formulas)


def listed(names: Iterable[str]) -> str:
    """Cite several formulas, each clause once.

    Parameters
    ----------
    names : iterable of str
        Names in the register of formulas [text].

    Returns
    -------
    str
    """
    return "; ".join(dict.fromkeys(cited(name) for name in names))


def formulas_of(views: Iterable[VesselView]) -> list[str]:
    """Collect the formulas that the figures of these vessels rest on.

    Parameters
    ----------
    views : iterable of VesselView
        The vessels [-].

    Returns
    -------
    list of str
        Names in the register of formulas, each once, in alphabetical order.
    """
    return sorted({name for view in views for part in view.parts for name in with_inverses(part.formulas)})


def with_inverses(names: Iterable[str]) -> list[str]:
    """Add to each formula for a thickness the one for a pressure that is its inverse, and the other way round.

    Parameters
    ----------
    names : iterable of str
        Names in the register of formulas [text].

    Returns
    -------
    list of str
        The register names the two alike but for the quantity they give.
    """
    found: dict[str, None] = {}
    for name in names:
        found[name] = None
        for one, other in (("_thickness", "_pressure"), ("_pressure", "_thickness")):
            inverse = name.replace(one, other)
            if inverse != name and inverse in formula.REGISTER:
                found[inverse] = None
    return list(found)


def _giving(names: Sequence[str], unit: str) -> list[str]:
    return [name for name in names if name in formula.REGISTER and formula.REGISTER[name].unit == unit]
