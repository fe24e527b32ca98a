"""The house rule of layers: who may import whom, read off the syntax trees."""

from __future__ import annotations

import ast
from collections.abc import Iterator
from pathlib import Path

import pytest

PACKAGE = Path(__file__).parents[1] / "fleet"

BASE = {"errors", "words"}
ALLOWED: dict[str, set[str]] = {
    "__init__": set(),
    "errors": set(),
    "words": set(),
    "rounding": {"errors"},
    "units": BASE | {"rounding"},
    "formula": {"errors"},
    "mechanics": BASE | {"formula"},
    "thinning": BASE | {"formula"},
    "fitness": BASE | {"formula"},
    "rules": BASE,
    "appraisal": BASE | {"formula", "mechanics", "thinning", "fitness", "rules"},
    "intake": BASE | {"units", "rounding"},
    "store": BASE,
    "reports": BASE | {"appraisal", "formula", "units", "rounding"},
    "tasks": BASE | {"appraisal", "formula", "intake", "reports", "rounding", "rules", "store", "units"},
    "cli": BASE | {"tasks", "reports"},
}
"""What each package may import of ours, besides itself."""

ONLY_IN: dict[str, set[str]] = {
    "pint": {"units"},
    "sqlalchemy": {"store"},
    "alembic": {"store"},
    "psycopg": {"store"},
    "typer": {"cli"},
    "openpyxl": {"reports", "intake"},
    "python_calamine": {"intake"},
    "pandas": {"intake", "reports", "tasks"},
}
"""Libraries that only some packages may import."""

LATE = {"pandas", "openpyxl", "scipy", "matplotlib", "pint", "alembic", "sympy", "python_calamine"}
"""Libraries that are imported inside the function that needs them."""

PURE = {"formula", "mechanics", "thinning", "fitness", "rules", "appraisal"}
CLOCKS = {"now", "today", "utcnow", "time"}


def modules() -> list[Path]:
    return sorted(
        path for path in PACKAGE.rglob("*.py") if not {"migrations", "sample_data"} & set(path.parts)
    )


def layer_of(path: Path) -> str:
    first = path.relative_to(PACKAGE).parts[0]
    return first.removesuffix(".py")


def imports(tree: ast.AST) -> Iterator[str]:
    for node in ast.walk(tree):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, "imports are written out in full"
            assert node.module is not None
            yield node.module
            yield from (f"{node.module}.{alias.name}" for alias in node.names)


def top_imports(tree: ast.Module) -> Iterator[str]:
    for node in tree.body:
        if isinstance(node, ast.Import | ast.ImportFrom):
            yield from imports(node)


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(PACKAGE)))
def test_a_module_imports_only_what_its_layer_may(path: Path) -> None:
    layer = layer_of(path)
    tree = ast.parse(path.read_text(encoding="utf-8"))
    for name in imports(tree):
        parts = name.split(".")
        if parts[0] == "fleet":
            target = parts[1] if len(parts) > 1 else "__init__"
            known = target in ALLOWED
            allowed = target in ALLOWED[layer] | {layer, "__init__"} or not known
            assert allowed, f"{layer} may not import fleet.{target}"
        elif parts[0] in ONLY_IN:
            assert layer in ONLY_IN[parts[0]], f"only {ONLY_IN[parts[0]]} may import {parts[0]}"


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(PACKAGE)))
def test_slow_libraries_are_imported_where_they_are_needed(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    late = {name.split(".")[0] for name in top_imports(tree)} & LATE
    assert not late, f"import {late} inside the function"


@pytest.mark.parametrize(
    "path", [path for path in modules() if layer_of(path) == "cli"], ids=lambda path: path.name
)
def test_the_command_line_imports_only_typer_errors_and_words_at_the_top(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    ours = {name for name in top_imports(tree) if name.startswith("fleet")}
    heavy = {name for name in ours if name.split(".")[1:2] not in ([], ["errors"], ["words"], ["cli"])}
    heavy -= {"fleet.__version__"}
    assert not heavy


@pytest.mark.parametrize(
    "path",
    [path for path in modules() if layer_of(path) in PURE],
    ids=lambda path: str(path.relative_to(PACKAGE)),
)
def test_the_pure_packages_read_no_clock(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    asked = [
        node.func.attr
        for node in ast.walk(tree)
        if isinstance(node, ast.Call) and isinstance(node.func, ast.Attribute) and node.func.attr in CLOCKS
    ]
    assert not asked


def test_nothing_imports_the_command_line() -> None:
    for path in modules():
        if layer_of(path) != "cli":
            names = set(imports(ast.parse(path.read_text(encoding="utf-8"))))
            assert not {name for name in names if name.startswith("fleet.cli")}, path


def test_every_layer_of_the_package_is_named_here() -> None:
    there = {layer_of(path) for path in modules()}
    assert there <= set(ALLOWED)


def test_the_top_level_holds_nothing_else() -> None:
    root = PACKAGE.parent
    allowed = {"fleet", "migrations", "tests", "sample_data", "README.md", "DEVELOPERS.md", "CHANGELOG.md", "LICENSE",
               "pyproject.toml", "dist", "build", "brackwater"}  # fmt: skip
    found = {path.name for path in root.iterdir() if not path.name.startswith(".")}
    assert found <= allowed
