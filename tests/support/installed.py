"""Run the installed command as a person does, in a process of its own."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

COMMAND = Path(sys.executable).with_name("fleet")


def fleet(
    *words: object, db: Path | None = None, here: Path | None = None
) -> subprocess.CompletedProcess[str]:
    """Run ``fleet`` and give back what it printed and how it ended."""
    outside = {name: value for name, value in os.environ.items() if not name.startswith("FLEET_")}
    environment = {**outside, "PYTHONUTF8": "1"} | ({"FLEET_DB": str(db)} if db is not None else {})
    return subprocess.run(
        [str(COMMAND), *map(str, words)],
        capture_output=True,
        text=True,
        encoding="utf-8",
        check=False,
        env=environment,
        cwd=here,
    )


def document(*words: object, db: Path | None = None, code: int = 0) -> Any:
    """Run ``fleet ... --json``: stdout is exactly one document, and it holds only numbers that are numbers."""
    done = fleet(*words, "--json", db=db)
    assert done.returncode == code, done.stderr

    def refuse(constant: str) -> None:
        raise AssertionError(f"{constant} in the document")

    return json.loads(done.stdout, parse_constant=refuse)
