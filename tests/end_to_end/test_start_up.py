"""Starting costs little: the help of fleet takes under twice what a bare typer program takes."""

from __future__ import annotations

import subprocess
import sys
import time
from collections.abc import Sequence
from pathlib import Path

FLEET = str(Path(sys.executable).with_name("fleet"))
BARE = "import typer; app = typer.Typer(); app.command()(lambda name='x': None); app()"


def quickest(command: Sequence[str], runs: int = 7) -> float:
    """Give the least wall time of several runs [s]."""
    times = []
    for _ in range(runs):
        begun = time.perf_counter()
        subprocess.run(command, capture_output=True, check=True)
        times.append(time.perf_counter() - begun)
    return min(times)


def test_help_takes_under_twice_a_bare_typer_program() -> None:
    bare = quickest([sys.executable, "-c", BARE, "--help"])
    ours = quickest([FLEET, "--help"])
    assert ours < 2 * bare, f"{ours:.3f} s against {bare:.3f} s"


def test_words_that_are_off_are_told_in_three_parts_with_exit_code_2() -> None:
    done = subprocess.run([FLEET, "show"], capture_output=True, text=True, check=False)
    assert done.returncode == 2
    assert done.stdout == ""
    assert done.stderr.splitlines() == [
        "fleet: fleet show",
        "  found: Missing argument 'TAG'",
        "  to do: see 'fleet show --help'",
    ]


def test_a_group_named_alone_tells_its_commands() -> None:
    done = subprocess.run([FLEET, "survey"], capture_output=True, text=True, check=False)
    assert done.returncode == 2
    assert "load" in done.stderr
