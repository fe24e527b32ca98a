"""The house rule of docstrings: numpydoc on everything public, names in order, every argument with its unit."""

from __future__ import annotations

import ast
import re
from collections.abc import Iterator
from pathlib import Path

import pytest

PACKAGE = Path(__file__).parents[1] / "fleet"
COMMANDS = "cli"  # the docstring of a command is its help text; test_docs.py reads it


def modules() -> list[Path]:
    return sorted(
        path
        for path in PACKAGE.rglob("*.py")
        if not {"migrations", "sample_data", COMMANDS} & set(path.relative_to(PACKAGE).parts)
    )


def public(tree: ast.Module) -> Iterator[tuple[str, ast.FunctionDef | ast.ClassDef, bool]]:
    for node in tree.body:
        if isinstance(node, ast.FunctionDef) and not node.name.startswith("_"):
            yield node.name, node, False
        elif isinstance(node, ast.ClassDef) and not node.name.startswith("_"):
            yield node.name, node, False
            for inner in node.body:
                if isinstance(inner, ast.FunctionDef) and not inner.name.startswith("_"):
                    yield f"{node.name}.{inner.name}", inner, True


def arguments(node: ast.FunctionDef, method: bool) -> list[str]:
    spec = node.args
    plain = [each.arg for each in (*spec.posonlyargs, *spec.args)]
    static = any(isinstance(d, ast.Name) and d.id == "staticmethod" for d in node.decorator_list)
    if method and not static:
        plain = plain[1:]
    if spec.vararg:
        plain.append(f"*{spec.vararg.arg}")
    plain += [each.arg for each in spec.kwonlyargs]
    if spec.kwarg:
        plain.append(f"**{spec.kwarg.arg}")
    return plain


def is_property(node: ast.FunctionDef) -> bool:
    names = {ast.unparse(decorator).split(".")[-1] for decorator in node.decorator_list}
    return bool(names & {"property", "cached_property", "setter"})


def section(doc: str, name: str) -> str:
    found = re.search(rf"^{name}\n-+\n(.*?)(?=^\S[^\n]*\n-{{3,}}\n|\Z)", doc + "\n", re.MULTILINE | re.DOTALL)
    return found.group(1) if found else ""


def entries(doc: str) -> list[tuple[list[str], str]]:
    """Names and text of every entry under Parameters."""
    out: list[tuple[list[str], str]] = []
    for chunk in filter(str.strip, re.split(r"^(?=\S)", section(doc, "Parameters"), flags=re.MULTILINE)):
        head = chunk.splitlines()[0]
        out.append(([name.strip().replace("\\", "") for name in head.split(" : ")[0].split(",")], chunk))
    return out


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(PACKAGE)))
def test_everything_public_says_what_it_is(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    assert ast.get_docstring(tree), "the module has no docstring"
    silent = [name for name, node, _ in public(tree) if not ast.get_docstring(node)]
    assert not silent


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(PACKAGE)))
def test_every_argument_is_named_in_order_with_its_unit(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    wrong: list[str] = []
    for name, node, method in public(tree):
        if isinstance(node, ast.ClassDef) or is_property(node):
            continue
        wanted = arguments(node, method)
        found = entries(ast.get_docstring(node) or "")
        named = [each for names, _ in found for each in names]
        if wanted != named:
            wrong.append(f"{name}: takes {wanted}, documents {named}")
        wrong += [
            f"{name}: {', '.join(names)} has no unit in brackets" for names, text in found if "[" not in text
        ]
    assert not wrong, "\n".join(wrong)


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(PACKAGE)))
def test_what_is_given_back_is_said(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    silent = [
        name
        for name, node, _ in public(tree)
        if isinstance(node, ast.FunctionDef)
        and not is_property(node)
        and arguments(node, "." in name)
        and node.returns is not None
        and ast.unparse(node.returns) not in {"None", "NoReturn", "Self"}
        and not re.search(r"^(Returns|Yields)\n-+", ast.get_docstring(node) or "", re.MULTILINE)
    ]
    assert not silent
