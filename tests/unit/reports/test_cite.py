"""Citations carry the status of what was not confirmed."""

from __future__ import annotations

from collections.abc import Callable

import fleet.mechanics.rating  # noqa: F401 the register of formulas is filled by its import
from fleet import formula
from fleet.appraisal.views import PartView
from fleet.reports import cite


def test_every_formula_that_is_not_confirmed_says_so() -> None:
    for name, found in formula.REGISTER.items():
        said = cite.cited(name)
        assert found.clause in said
        assert (f"({found.status})" in said) == (found.status != "confirmed")


def test_a_formula_that_is_not_known_is_not_passed_over() -> None:
    assert cite.cited("no_such_formula") == "no_such_formula (not in the register of formulas)"


def test_required_thickness_cites_the_direction_that_sets_it(make_part: Callable[..., PartView]) -> None:
    shell = make_part(formulas=("cylinder_axial_thickness_outside", "cylinder_hoop_thickness_outside"))
    assert cite.required_rests_on(shell, "hoop") == "Appendix 1-1(a)(1)"
    assert cite.required_rests_on(shell, "axial") == "UG-27(c)(2) on the outside radius"
    assert cite.required_rests_on(shell, "structural") == "structural_minimum as given on the register"
    assert cite.required_rests_on(shell, None) == ""


def test_from_memory_is_said_beside_the_figure(make_part: Callable[..., PartView]) -> None:
    thick = make_part(formulas=("thick_sphere_thickness_newer",), shape="sphere")
    assert cite.required_rests_on(thick, "hoop") == "Appendix 1-3 (from memory)"


def test_the_pressure_form_is_listed_beside_the_thickness_form() -> None:
    assert cite.with_inverses(["sphere_thickness"]) == ["sphere_thickness", "sphere_pressure"]
    assert cite.with_inverses(["torispherical_factor"]) == ["torispherical_factor"]
