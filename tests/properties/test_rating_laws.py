"""Laws of the rating that hold for any numbers, for every shape, code and edition, across the changes of form."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from fleet.formula import REGISTER
from fleet.mechanics.rating import Geometry, Rated, allowable_pressure, directions, required_wall

DIMENSIONS: dict[str, dict[str, float]] = {
    "cylinder": {"inside_diameter_mm": 1.0},
    "nozzle neck": {"outside_diameter_mm": 1.4},
    "sphere": {"inside_diameter_mm": 1.0},
    "hemispherical head": {"crown_radius_mm": 0.5},
    "ellipsoidal head": {"inside_diameter_mm": 1.0, "axis_ratio": 1.9},
    "torispherical head": {"inside_diameter_mm": 1.0, "crown_radius_mm": 0.9, "knuckle_radius_mm": 0.1},
    "cone": {"inside_diameter_mm": 1.0, "half_apex_angle_deg": 25.0},
    "flat cover": {"inside_diameter_mm": 1.0, "cover_factor": 0.25},
}
CASES = [("asme8-1", shape) for shape in DIMENSIONS] + [
    ("membrane", shape) for shape in ("cylinder", "nozzle neck", "sphere", "hemispherical head")
]
SIDES = ("inside", "outside", "both", "")
YEARS = (1995.0, 2015.0, np.nan)
FREE = {"axis_ratio", "half_apex_angle_deg", "cover_factor"}

sizes = st.floats(100.0, 6000.0)
nominals = st.floats(0.004, 0.19)  # of the diameter: from thin to well beyond the limits of the thin forms
efficiencies = st.floats(0.35, 1.0)
stresses = st.floats(40.0, 260.0)
pairs = st.tuples(efficiencies, efficiencies)


def rows(
    code: str,
    shape: str,
    size: float,
    nominal: float,
    s: float,
    e: tuple[float, float],
    count: int,
    **more: Any,
) -> Geometry:
    dims = {name: value if name in FREE else value * size for name, value in DIMENSIONS[shape].items()}
    return Geometry.build(
        count, design_code=code, shape=shape, nominal_thickness_mm=nominal * size, allowable_stress_mpa=s,
        efficiency_hoop=e[0], efficiency_axial=e[1], **dims, **more,
    )  # fmt: skip


def figures(g: Geometry, rated: Rated) -> list[NDArray[np.float64]]:
    found = [getattr(rated, name) for name, exists in directions(g).items() if exists.all()]
    assert found
    return found


KINDS = [(side, year) for side in SIDES for year in YEARS]
SIDE_OF = np.repeat([side for side, _ in KINDS], 120)
YEAR_OF = np.repeat([year for _, year in KINDS], 120)


def by_kind(values: NDArray[np.float64]) -> list[NDArray[np.float64]]:
    """Take the figures apart again, one run of 120 for every side and edition."""
    return list(values.reshape(len(KINDS), 120))


@pytest.mark.parametrize(("code", "shape"), CASES)
@given(size=sizes, nominal=nominals, s=stresses, e=pairs, top=st.floats(0.01, 0.34))
@settings(max_examples=12, deadline=None)
def test_more_wall_never_lowers_the_pressure(
    code: str, shape: str, size: float, nominal: float, s: float, e: tuple[float, float], top: float
) -> None:
    wall = np.tile(np.linspace(-0.01, top, 120) * size, len(KINDS))
    g = rows(code, shape, size, nominal, s, e, len(wall), loss_side=SIDE_OF, edition_year=YEAR_OF)
    for figure in figures(g, allowable_pressure(g, wall)):
        for kind, pressure in zip(KINDS, by_kind(figure), strict=True):
            known = pressure[~np.isnan(pressure)]
            assert len(known) > 0
            assert np.all(np.diff(known) >= -1e-12 * known[1:]), kind
            # What is withheld lies beyond what is known, never in between.
            assert not np.isnan(pressure[: len(known)]).any(), kind


@pytest.mark.parametrize(("code", "shape"), CASES)
@given(size=sizes, nominal=nominals, s=stresses, e=pairs, least=st.floats(1e-4, 0.2))
@settings(max_examples=12, deadline=None)
def test_the_required_wall_holds_the_pressure(
    code: str, shape: str, size: float, nominal: float, s: float, e: tuple[float, float], least: float
) -> None:
    # up to 1.2 times the stress: across the thin and thick forms of every edition
    pressure = np.tile(np.linspace(least, 1.2, 120) * s * e[0], len(KINDS))
    g = rows(code, shape, size, nominal, s, e, len(pressure), loss_side=SIDE_OF, edition_year=YEAR_OF)
    for number, wall in enumerate(figures(g, required_wall(g, pressure))):
        for kind, run in zip(KINDS, by_kind(wall), strict=True):
            assert np.all(np.diff(run[~np.isnan(run)]) >= 0), kind
        known = ~np.isnan(wall)
        back = figures(g, allowable_pressure(g, wall))[number]
        assert not np.isnan(back[known]).any()
        excess = back[known] / pressure[known] - 1
        assert np.all(excess >= -1e-9)
        # A wall that carries more is one at which the thick form starts, and no lesser wall would do.
        step = excess > 1e-9
        if step.any():
            assert code == "asme8-1"
            assert shape in {"cylinder", "nozzle neck", "sphere", "hemispherical head"}
            below = figures(g, allowable_pressure(g, wall * (1 - 1e-9)))[number]
            assert np.all(below[known][step] < pressure[known][step])


@pytest.mark.parametrize(("code", "shape"), CASES)
@given(
    size=sizes,
    nominal=nominals,
    s=stresses,
    e=pairs,
    part=st.floats(0.1, 1.0),
)
@settings(max_examples=10, deadline=None)
def test_loss_from_inside_is_never_better_than_loss_from_outside(
    code: str, shape: str, size: float, nominal: float, s: float, e: tuple[float, float], part: float
) -> None:
    wall = np.full(1, part * nominal * size)
    inside, outside = (
        figures(g, allowable_pressure(g, wall))
        for g in (
            rows(code, shape, size, nominal, s, e, 1, loss_side=side, edition_year=2001.0)
            for side in ("both", "outside")
        )
    )
    for worse, better in zip(inside, outside, strict=True):
        assert np.isnan(worse[0]) or np.isnan(better[0]) or worse[0] <= better[0] * (1 + 1e-12)


@pytest.mark.parametrize(("code", "shape"), [case for case in CASES if case[1] != "flat cover"])
@given(size=sizes, nominal=st.floats(0.004, 0.1), s=stresses, e=pairs)
@settings(max_examples=10, deadline=None)
def test_without_loss_inside_and_outside_dimensions_give_the_same(
    code: str, shape: str, size: float, nominal: float, s: float, e: tuple[float, float]
) -> None:
    wall = np.full(1, nominal * size)
    dims = DIMENSIONS[shape]
    if "inside_diameter_mm" not in dims or shape == "torispherical head":
        return
    slope = np.cos(np.radians(dims.get("half_apex_angle_deg", 0.0)))
    for side in ("inside", "outside"):
        on_inside = rows(code, shape, size, nominal, s, e, 1, loss_side=side, edition_year=2001.0)
        by_outside = Geometry(
            **{
                **vars(on_inside),
                "inside_diameter_mm": np.array([np.nan]),
                "outside_diameter_mm": on_inside.inside_diameter_mm + 2 * wall / slope,
            }
        )
        for one, other in zip(
            figures(on_inside, allowable_pressure(on_inside, wall)),
            figures(by_outside, allowable_pressure(by_outside, wall)),
            strict=True,
        ):
            np.testing.assert_allclose(one, other, rtol=1e-12)


@given(s=stresses, e=pairs, part=st.floats(0.05, 1.1))
@settings(max_examples=20, deadline=None)
def test_an_unknown_edition_never_gives_more_than_a_known_one(
    s: float, e: tuple[float, float], part: float
) -> None:
    for shape in ("cylinder", "sphere", "hemispherical head"):
        older, newer, unknown = (
            rows("asme8-1", shape, 1000.0, 0.2, s, e, 1, loss_side="outside", edition_year=year)
            for year in YEARS
        )
        wall = np.array([part * 500])
        figure = [figures(g, allowable_pressure(g, wall))[0][0] for g in (older, newer, unknown)]
        assert figure[2] == min(figure[:2])
        need = np.array([part * s * e[0]])
        walls = [figures(g, required_wall(g, need))[0][0] for g in (older, newer, unknown)]
        assert np.isnan(walls[2]) if np.isnan(walls[:2]).any() else walls[2] == max(walls[:2])


def test_the_order_of_the_rows_does_not_matter() -> None:
    kinds = [(code, shape, side, year) for code, shape in CASES for side in SIDES for year in YEARS]
    singles = [
        rows(code, shape, 900.0, 0.02, 120.0, (0.85, 0.7), 1, loss_side=side, edition_year=year)
        for code, shape, side, year in kinds
    ]
    order = np.random.default_rng(7).permutation(len(kinds))
    together = Geometry(
        **{name: np.concatenate([vars(singles[at])[name] for at in order]) for name in vars(singles[0])}
    )
    wall = np.linspace(5.0, 25.0, len(kinds))
    for solve, quantity in ((allowable_pressure, wall), (required_wall, wall / 10)):
        whole = solve(together, quantity)
        for place, at in enumerate(order):
            alone = solve(singles[at], quantity[place : place + 1])
            for name in vars(whole):
                np.testing.assert_array_equal(getattr(whole, name)[place], getattr(alone, name)[0])


PAIRS = sorted(
    (name, name.replace("_thickness", "_pressure"))
    for name in REGISTER
    if "_thickness" in name and "membrane" not in name
)


@pytest.mark.parametrize(("wall", "pressure"), PAIRS)
@given(x=st.floats(0.005, 0.3), s=stresses, e=efficiencies)
@settings(max_examples=15, deadline=None)
def test_every_wall_form_undoes_its_pressure_form(
    wall: str, pressure: str, x: float, s: float, e: float
) -> None:
    values = {
        "S": s, "E": e, "sigma": s, "R": 700.0, "Ro": 700.0, "L": 700.0, "Lo": 700.0, "D": 1400.0, "Do": 1400.0,
        "M": 1.6, "K": 1.2, "alpha": 20.0, "C": 0.2, "d": 600.0, "a": 700.0,
    }  # fmt: skip
    of_wall, of_pressure = REGISTER[wall], REGISTER[pressure]
    t = x * 700.0
    p = of_pressure(**{name: t if name == "t" else values[name] for name in of_pressure.arguments})
    symbol = of_pressure.gives
    back = of_wall(**{name: p if name == symbol else values[name] for name in of_wall.arguments})
    assert float(back) == pytest.approx(t, rel=1e-12)
