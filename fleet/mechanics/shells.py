"""Cylinders and spheres, whose form changes with the wall: thin, thick by edition, the step between."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fleet.formula import REGISTER, Floats, Formula
from fleet.mechanics.figures import Figures, chosen, given, greater, lesser, worked
from fleet.mechanics.sources import FIRST_NEWER_YEAR

ABOVE_LIMIT = 1 + 1e-12
"""Factor that puts a wall just above the limit of the thin form, so that the thick form answers for it."""


@dataclass(frozen=True)
class Form:
    """The thin form of one direction on one radius, and what takes over from it.

    Parameters
    ----------
    family : str
        What its names in the register start with, such as ``cylinder_hoop`` [text].
    radius : str
        The symbol of the radius that stays [text].
    thick : str
        What the names of the thick form start with; '' where none takes over [text].
    by_edition : bool
        Whether the thick form has an older and a newer shape [-].
    limit : str
        The formula of the wall at which the thick form takes over [text].
    step : str
        The formula of the pressure at which the newer thick form starts below the thin one, or '' [text].
    """

    family: str
    radius: str
    thick: str = ""
    by_edition: bool = False
    limit: str = ""
    step: str = ""

    @property
    def tail(self) -> str:
        """What its names in the register end with."""
        return "_outside" if self.radius == "Ro" else ""

    @property
    def limit_symbol(self) -> str:
        """The symbol of the radius that stays in the thick form and in the limit."""
        return "Ro" if self.radius == "Ro" else "R"

    def thin(self, direction: str) -> Formula:
        """Give the thin form.

        Parameters
        ----------
        direction : str
            ``pressure`` or ``thickness`` [text].

        Returns
        -------
        Formula
        """
        return REGISTER[f"{self.family}_{direction}{self.tail}"]

    def taking_over(self, direction: str, newer: bool) -> Formula:
        """Give the thick form.

        Parameters
        ----------
        direction : str
            ``pressure`` or ``thickness`` [text].
        newer : bool
            Whether it is that of the newer editions [-].

        Returns
        -------
        Formula
        """
        edition = ("_newer" if newer else "_older") if self.by_edition else ""
        return REGISTER[f"{self.thick}_{direction}{self.tail}{edition}"]


CYLINDER_HOOP = {
    "Ro": Form("cylinder_hoop", "Ro", "thick_cylinder_hoop", True, "cylinder_thin_limit_outside"),
    "R": Form("cylinder_hoop", "R", "thick_cylinder_hoop", True, "cylinder_thin_limit"),
}
CYLINDER_AXIAL = {
    "Ro": Form("cylinder_axial", "Ro", "thick_cylinder_axial", False, "cylinder_thin_limit_outside"),
    "R": Form("cylinder_axial", "R", "thick_cylinder_axial", False, "cylinder_thin_limit"),
}
SPHERE = {
    "Ro": Form("sphere", "Ro", "thick_sphere", True, "sphere_thin_limit_outside", "sphere_step_pressure"),
    "R": Form("sphere", "R", "thick_sphere", True, "sphere_thin_limit", "sphere_step_pressure"),
}
HEMISPHERICAL = {
    "Ro": SPHERE["Ro"],
    "R": Form("hemispherical_head", "L", "thick_sphere", True, "sphere_thin_limit", "sphere_step_pressure"),
}
MEMBRANE = {
    name: {radius: Form(f"membrane_{name}", symbol) for radius, symbol in (("Ro", "Ro"), ("R", "r"))}
    for name in ("hoop", "axial", "sphere")
}


def _thin_values(form: Form, s: Floats, e: Floats, radius: Floats) -> dict[str, Floats]:
    return {("S" if form.thick else "sigma"): s, "E": e, form.radius: radius}


def _thick_values(form: Form, s: Floats, e: Floats, radius: Floats) -> dict[str, Floats]:
    return {"S": s, "E": e, form.limit_symbol: radius}


def _pressure(form: Form, s: Floats, e: Floats, radius: Floats, t: Floats, newer: bool) -> Figures:
    """Pressure under one edition: thin up to its wall limit, no more than the thick form starts with."""
    thin = form.thin("pressure")
    values = _thin_values(form, s, e, radius)
    # The limit on the wall decides; the one on the pressure follows from it.
    is_thin = ~thin.limits[0].broken({**values, "t": t})
    thick = form.taking_over("pressure", newer)
    beyond = given(thick, thick.array(**_thick_values(form, s, e, radius), t=t))
    within = given(thin, thin.array(**values, t=t))
    if form.step and newer:
        step = REGISTER[form.step]
        within = lesser(within, given(step, step.array(S=s, E=e)))
    return chosen(is_thin, within, beyond)


def _wall(form: Form, s: Floats, e: Floats, radius: Floats, p: Floats, newer: bool) -> Figures:
    """Wall under one edition: thin while its own result is thin, else thick and above the limit."""
    thin = form.thin("thickness")
    values = _thin_values(form, s, e, radius)
    within = given(thin, thin.array(**values, P=p))
    is_thin = thin.limit_codes(**values, P=p) == 0
    if form.step and newer:
        is_thin &= ~(p > REGISTER[form.step].array(S=s, E=e))
    thick = form.taking_over("thickness", newer)
    # A bound on the pressure withholds the thick form; that it starts at the limit is seen to here.
    bounds = len(thick.limits) - 1
    beyond = worked(thick, bounds, **_thick_values(form, s, e, radius), P=p)
    start = REGISTER[form.limit]
    least = given(start, start.array(**{form.limit_symbol: radius}) * ABOVE_LIMIT)
    return chosen(is_thin, within, chosen(beyond.value < least.value, least, beyond))


def _by_edition(older: Figures, newer: Figures, worse: Figures, year: Floats) -> Figures:
    known = chosen(year >= FIRST_NEWER_YEAR, newer, older)
    return chosen(np.isnan(year), worse, known)


def shell_pressure(form: Form, s: Floats, e: Floats, radius: Floats, t: Floats, year: Floats) -> Figures:
    """Give the pressure of a shell in one direction.

    Parameters
    ----------
    form : Form
        The direction and the radius that stays [-].
    s : array of float
        Allowable stress [MPa].
    e : array of float
        Efficiency [-].
    radius : array of float
        The radius that stays [mm].
    t : array of float
        Wall [mm].
    year : array of float
        Year of the edition; NaN takes the lesser pressure of the two shapes [year].

    Returns
    -------
    Figures
        Pressure at the point considered [MPa].
    """
    if not form.thick:
        values = _thin_values(form, s, e, radius)
        return worked(form.thin("pressure"), None, **values, t=t)
    older = _pressure(form, s, e, radius, t, newer=False)
    if not form.by_edition:
        return older
    newer = _pressure(form, s, e, radius, t, newer=True)
    return _by_edition(older, newer, lesser(older, newer), year)


def shell_wall(form: Form, s: Floats, e: Floats, radius: Floats, p: Floats, year: Floats) -> Figures:
    """Give the wall of a shell in one direction, the radius that stays being kept.

    Parameters
    ----------
    form : Form
        The direction and the radius that stays [-].
    s : array of float
        Allowable stress [MPa].
    e : array of float
        Efficiency [-].
    radius : array of float
        The radius that stays [mm].
    p : array of float
        Pressure at the point considered [MPa].
    year : array of float
        Year of the edition; NaN takes the greater wall of the two shapes [year].

    Returns
    -------
    Figures
        Wall [mm].
    """
    if not form.thick:
        values = _thin_values(form, s, e, radius)
        return worked(form.thin("thickness"), None, **values, p=p)
    older = _wall(form, s, e, radius, p, newer=False)
    if not form.by_edition:
        return older
    newer = _wall(form, s, e, radius, p, newer=True)
    return _by_edition(older, newer, greater(older, newer), year)
