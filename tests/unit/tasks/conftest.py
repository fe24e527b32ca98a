"""Databases with the small works in them, and short ways to load more."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date
from pathlib import Path
from typing import Any

import pytest
from small_works import write, write_register, write_surveys

from fleet.store import Engine, facts, journal, models
from fleet.tasks.register import RegisterLoaded, load_register
from fleet.tasks.surveys import SurveysLoaded, load_surveys

TODAY = date(2026, 12, 1)

Load = Callable[..., RegisterLoaded]
Survey = Callable[..., SurveysLoaded]
Rows = Callable[..., list[dict[str, Any]]]


@pytest.fixture
def load(engine: Engine, tmp_path: Path) -> Load:
    """Load register text; the name of the file is the word before the colon."""

    def _load(*texts: str, names: tuple[str, ...] = (), **how: Any) -> RegisterLoaded:
        files = [
            write(tmp_path, names[number] if names else f"register-{number}.csv", text)
            for number, text in enumerate(texts)
        ]
        return load_register(engine, files, **{"by": "A. Keel", "today": TODAY, **how})

    return _load


@pytest.fixture
def survey(engine: Engine, tmp_path: Path) -> Survey:
    """Load the text of one survey."""

    def _survey(text: str, name: str = "survey.csv", **how: Any) -> SurveysLoaded:
        path = write(tmp_path, name, text)
        return load_surveys(engine, [path], **{"by": "B. Stern", "today": TODAY, **how})

    return _survey


@pytest.fixture
def works(engine: Engine, tmp_path: Path) -> Engine:
    """Give a database with the register of the small works."""
    loaded = load_register(engine, write_register(tmp_path), by="A. Keel", today=TODAY)
    assert loaded.refused is None
    return engine


@pytest.fixture
def surveyed(works: Engine, tmp_path: Path) -> Engine:
    """Give a database with register and surveys of the small works."""
    loaded = load_surveys(works, write_surveys(tmp_path), by="B. Stern", today=TODAY)
    assert loaded.refused is None
    return works


@pytest.fixture
def rows(engine: Engine) -> Rows:
    """Read the rows in force of a table as dictionaries."""

    def _rows(model: type[models.Base], as_of: date | None = None) -> list[dict[str, Any]]:
        with engine.connect() as conn:
            columns = facts.columns(conn, model, known=journal.head(conn).no, as_of=as_of)
        return [dict(zip(columns, values, strict=True)) for values in zip(*columns.values(), strict=True)]

    return _rows


@pytest.fixture
def entries(engine: Engine) -> Callable[[], int]:
    """Count the journal entries."""

    def _entries() -> int:
        with engine.connect() as conn:
            assert journal.verify(conn) == []
            return journal.head(conn).no

    return _entries
