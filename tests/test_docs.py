"""The house rule of documents: README commands run, every command explains itself, every numbered rule has a test."""

from __future__ import annotations

import re
import shlex
import shutil
import subprocess
import sys
from pathlib import Path

import pytest
from typer.main import get_command

from fleet import words
from fleet.cli.main import app

ROOT = Path(__file__).parents[1]
README = (ROOT / "README.md").read_text(encoding="utf-8")
DEVELOPERS = (ROOT / "DEVELOPERS.md").read_text(encoding="utf-8")
FLEET = Path(sys.executable).with_name("fleet")


def fenced(text: str) -> list[str]:
    """Every line inside a fence of shell commands."""
    blocks = re.findall(r"^```sh\n(.*?)^```", text, re.MULTILINE | re.DOTALL)
    return [line for block in blocks for line in block.splitlines() if line.strip()]


def rules_told() -> set[str]:
    return set(re.findall(r"^- \*\*(\d+\.\d+)\*\*", DEVELOPERS, re.MULTILINE))


def rules_tested() -> set[str]:
    names = {
        name
        for path in (ROOT / "tests").rglob("test_*.py")
        for name in re.findall(r"^def (test_rule_\w+)", path.read_text(encoding="utf-8"), re.MULTILINE)
    }
    return {f"{int(first)}.{int(second)}" for name in names
            for first, second in re.findall(r"^test_rule_(\d+)_(\d+)_", name)}  # fmt: skip


def commands() -> list[tuple[str, ...]]:
    """Every command of the program, as the words that call it."""
    found: list[tuple[str, ...]] = []

    def walk(command: object, path: tuple[str, ...]) -> None:
        inner = getattr(command, "commands", None)
        if inner is None:
            found.append(path)
            return
        for name, each in inner.items():
            walk(each, (*path, name))

    walk(get_command(app), ())
    return sorted(found)


def test_the_set_up_lines_of_the_readme_stand_first_and_make_their_own_environment() -> None:
    demo, check = fenced(README)[:2]
    assert demo.startswith("python3 -m venv .venv && ")
    assert demo.endswith("fleet demo")
    assert check.startswith("python3 -m venv .venv && ")
    assert "pytest" in check
    with_both = [line for line in README.splitlines() if "fleet demo" in line and "pip" in line]
    assert with_both == [demo]


def test_the_day_of_the_readme_runs_as_printed(tmp_path: Path) -> None:
    shutil.copy(ROOT / "sample_data" / "brackwater_register.xlsx", tmp_path)
    shutil.copytree(ROOT / "sample_data" / "surveys", tmp_path / "surveys")
    day = [line for line in fenced(README) if line.startswith("fleet ")]
    assert len(day) > 10
    for line in day:
        done = subprocess.run([str(FLEET), *shlex.split(line)[1:]], cwd=tmp_path, capture_output=True, text=True,
                              check=False)  # fmt: skip
        assert done.returncode == 0, f"{line}\n{done.stdout}\n{done.stderr}"


def test_the_page_shown_in_the_readme_is_the_page_of_the_demo(brackwater: Path) -> None:
    (page,) = re.findall(r"^```text\n(.*?)^```", README, re.MULTILINE | re.DOTALL)
    tag = page.split()[0]
    shown = subprocess.run([str(FLEET), "show", tag, "--db", str(brackwater / "fleet.db"), "--as-of", "2026-12-01"],
                           capture_output=True, text=True, check=True).stdout  # fmt: skip
    told = [line for line in page.splitlines() if line.strip()]
    assert [line for line in told if line not in shown.splitlines()] == []


def test_the_first_screens_carry_the_caution() -> None:
    assert words.CAUTION.split(". ")[0] in " ".join(README.split())
    shown = subprocess.run([str(FLEET)], capture_output=True, text=True, check=False)
    assert "licensed engineer" in " ".join((shown.stdout + shown.stderr).split())


@pytest.mark.parametrize("command", commands(), ids=" ".join)
def test_every_command_has_help_with_an_example(command: tuple[str, ...]) -> None:
    shown = subprocess.run(
        [str(FLEET), *command, "--help"], capture_output=True, text=True, check=True
    ).stdout
    assert f"Example:  fleet {' '.join(command)}" in shown


def test_every_numbered_rule_has_a_test() -> None:
    told = rules_told()
    assert len(told) > 60
    assert told - rules_tested() == set()


def test_every_tested_rule_is_numbered() -> None:
    assert rules_tested() - rules_told() == set()


def test_every_code_of_a_file_stands_in_the_table() -> None:
    told = set(re.findall(r"^\| ([a-z][a-z -]+?) \| (?:fault|doubt) \|", DEVELOPERS, re.MULTILINE))
    assert set(words.FAULTS) - told - NOT_OF_A_FILE == set()
    assert told - set(words.CATALOGUE) == set()


NOT_OF_A_FILE: set[str] = set()
