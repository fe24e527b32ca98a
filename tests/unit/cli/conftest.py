"""Run the command line in this process, as the installed command does."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from commands import Ended

from fleet.cli.main import run
from fleet.tasks.database import new_database


@pytest.fixture
def fleet(capsys: pytest.CaptureFixture[str]) -> Callable[..., Ended]:
    """Run a command; anything but a clean end is an error of the test."""

    def _fleet(*words: object) -> Ended:
        capsys.readouterr()
        with pytest.raises(SystemExit) as ended:
            run([str(word) for word in words])
        printed = capsys.readouterr()
        return Ended(ended.value.code or 0, printed.out, printed.err)

    return _fleet


@pytest.fixture
def empty(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """Give an empty database, named by FLEET_DB."""
    path = tmp_path / "fleet.db"
    new_database(path)
    monkeypatch.setenv("FLEET_DB", str(path))
    return path
