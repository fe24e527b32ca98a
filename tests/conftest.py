"""Databases for the tests: SQLite always, PostgreSQL where FLEET_TEST_POSTGRES gives the address of a server."""

from __future__ import annotations

import datetime as dt
import os
import resource
import shutil
import subprocess
import sys
import uuid
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from pathlib import Path

import pytest
from sqlalchemy import Engine, create_engine, text
from sqlalchemy.engine import make_url
from sqlalchemy.pool import NullPool

from fleet.store import guard, migrate, models
from fleet.store.engine import make_engine
from fleet.store.journal import writer
from fleet.store.record import FIRST_PREVIOUS

POSTGRES = os.environ.get("FLEET_TEST_POSTGRES")
ENGINES = ["sqlite", pytest.param("postgres", marks=pytest.mark.postgres)]


def _admin(statement: str) -> None:
    assert POSTGRES is not None
    url = make_url(POSTGRES).set(drivername="postgresql+psycopg")
    with create_engine(url, poolclass=NullPool, isolation_level="AUTOCOMMIT").connect() as conn:
        conn.execute(text(statement))


def _postgres() -> Iterator[str]:
    if POSTGRES is None:
        pytest.skip("PostgreSQL: FLEET_TEST_POSTGRES gives no address")
    name = f"fleet_{uuid.uuid4().hex[:12]}"
    _admin(f"CREATE DATABASE {name}")
    yield make_url(POSTGRES).set(database=name).render_as_string(hide_password=False)
    _admin(f"DROP DATABASE {name} WITH (FORCE)")


@pytest.fixture(scope="session")
def sqlite_template(tmp_path_factory: pytest.TempPathFactory) -> Path:
    path = tmp_path_factory.mktemp("template") / "fleet.db"
    migrate.new_database(make_engine(path, must_exist=False))
    return path


@pytest.fixture(scope="session")
def postgres_shared() -> Iterator[str]:
    """Give one PostgreSQL database for all tests: making one for each would take most of their time."""
    for address in _postgres():
        migrate.new_database(make_engine(address))
        yield address


def _emptied(address: str) -> str:
    """Empty the shared database and see that no test left it without its guard."""
    engine = make_engine(address)
    with engine.begin() as conn:
        conn.exec_driver_sql("SET LOCAL session_replication_role = replica")
        for table in models.Base.metadata.sorted_tables:
            conn.exec_driver_sql(f"DELETE FROM {table.name}")
        conn.exec_driver_sql(f"INSERT INTO journal_head (id, no, hash) VALUES (1, 0, '{FIRST_PREVIOUS}')")
        assert guard.missing(conn) == []
    return address


@pytest.fixture(params=ENGINES)
def blank_address(request: pytest.FixtureRequest, tmp_path: Path) -> Iterator[str]:
    """Give the address of a database with nothing in it."""
    if request.param == "sqlite":
        (tmp_path / "blank.db").touch()
        yield str(tmp_path / "blank.db")
    else:
        yield from _postgres()


@pytest.fixture(params=ENGINES)
def address(request: pytest.FixtureRequest, tmp_path: Path) -> Iterator[str]:
    """Give the address of a database with the newest schema and no facts."""
    if request.param == "sqlite":
        template: Path = request.getfixturevalue("sqlite_template")
        yield str(shutil.copy(template, tmp_path / "fleet.db"))
    else:
        yield _emptied(request.getfixturevalue("postgres_shared"))


@pytest.fixture
def engine(address: str) -> Engine:
    """Give an engine on a database with the newest schema and no facts."""
    return make_engine(address)


@dataclass(frozen=True)
class DemoRun:
    """What `fleet demo FOLDER` said, and the time of one processor that it took."""

    folder: Path
    stdout: str
    stderr: str
    cpu_seconds: float


@pytest.fixture(scope="session")
def fleet_command() -> str:
    """Give the installed command, the one that stands beside the running Python."""
    found = Path(sys.executable).with_name("fleet")
    assert found.exists(), "fleet is not installed beside this Python"
    return str(found)


@pytest.fixture(scope="session")
def demo_run(tmp_path_factory: pytest.TempPathFactory, fleet_command: str) -> DemoRun:
    """Build the demo once for all tests; they may read its folder and must not write to it."""
    folder = tmp_path_factory.mktemp("works") / "brackwater"
    before = resource.getrusage(resource.RUSAGE_CHILDREN)
    done = subprocess.run([fleet_command, "demo", folder], capture_output=True, text=True, check=False)
    after = resource.getrusage(resource.RUSAGE_CHILDREN)
    assert done.returncode == 0, done.stderr
    used = after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime
    return DemoRun(folder, done.stdout, done.stderr, used)


@pytest.fixture(scope="session")
def brackwater(demo_run: DemoRun) -> Path:
    """Give the folder of the demo."""
    return demo_run.folder


@pytest.fixture
def fill() -> Callable[[Engine], dict[str, int]]:
    """Give a function that writes at least one row into every table, in three entries."""
    return _fill


def _fill(engine: Engine) -> dict[str, int]:
    day = dt.date(2001, 5, 1)
    ids: dict[str, int] = {}
    with writer(engine, task="register load", by="A. Keel", role="engineer", why="first load") as entry:
        add = entry.add
        [ids["vessel"]] = add(models.Entity, [{"kind": "vessel", "tag": "D-101"}])
        [ids["part"]] = add(models.Entity, [{"kind": "part", "parent_id": ids["vessel"], "tag": "shell"}])
        ids["location"], ids["other"] = add(
            models.Entity, [{"kind": "location", "parent_id": ids["part"], "tag": tag} for tag in ("1", "2")]
        )
        [ids["relief"]] = add(
            models.Entity, [{"kind": "relief device", "parent_id": ids["vessel"], "tag": "PSV-1"}]
        )
        vessel = {
            "rules": "api510",
            "design_code": "asme8-1",
            "in_service_on": day,
            "design_pressure_mpa": 1.0,
        }
        of_vessel = {"vessel_id": ids["vessel"]}
        since = {"valid_from": day}
        add(models.Vessel, [{"entity_id": ids["vessel"], **since, **vessel, "service": "Ammoniak, größer"}])
        add(models.Part, [{"entity_id": ids["part"], **since, **of_vessel, "shape": "cylinder"}])
        add(
            models.Location,
            [{"entity_id": ids[name], **since, "part_id": ids["part"]} for name in ("location", "other")],
        )
        add(
            models.ReliefDevice, [{"entity_id": ids["relief"], **since, **of_vessel, "set_pressure_mpa": 1.1}]
        )
        add(models.DatedState, [{"subject_id": ids["vessel"], "state": "in service", "from_on": day}])
        add(models.Inspection, [{**of_vessel, "kind": "internal", "done_on": day, "extent": "full"}])
        add(models.Setting, [{"key": "reading error", "value": "0.25 mm", "from_on": day}])
    with writer(engine, task="survey load", by="B. Stern") as entry:
        add = entry.add
        file = {
            "name": "north.csv",
            "sha256": "ab" * 32,
            "kind": "readings",
            "rows_loaded": 3,
            "rows_parked": 1,
        }
        [ids["file"]] = add(models.SourceFile, [file])
        parked = {"source_file_id": ids["file"], "row_no": 7, "content": {"location": "9"}, "faults": []}
        add(models.ParkedRow, [parked])
        [ids["survey"]] = add(models.Survey, [{"name": "north 2026", "source_file_id": ids["file"]}])
        reading = {"taken_on": dt.date(2026, 3, 4), "result": "read", "kind": "reading", "status": "accepted"}
        walls = ((ids["location"], 12.7), (ids["location"], 0.1 + 0.2), (ids["other"], 11.9))
        ids["reading"], ids["reading 2"], ids["reading 3"] = add(
            models.Reading,
            [
                {**reading, "location_id": at, "thickness_mm": wall, "written": {"thickness": f"{wall} mm"}}
                for at, wall in walls
            ],
        )
        notice = {
            "code": "apparent gain",
            "where_text": "north.csv:E3",
            "found": "0.6 mm",
            "remedy": "re-take it",
        }
        add(models.Doubt, [{**notice, "reading_id": ids["reading"], "status": "open"}])
    with writer(engine, task="decide", by="A. Keel", role="engineer", why="new course") as entry:
        add = entry.add
        event = {"kind": "new metal", "what": "replaced", "happened_on": dt.date(2026, 4, 1)}
        [ids["restart"]] = add(
            models.Restart, [{**of_vessel, "part_id": ids["part"], **event, "whole_part": False}]
        )
        add(models.RestartLocation, [{"restart_id": ids["restart"], "location_id": ids["location"]}])
        decision = {"kind": "re-rating", "decided_on": dt.date(2026, 4, 2), "pressure_mpa": 0.9}
        add(models.Decision, [{**of_vessel, **decision}])
        saved = {"name": "2026", "as_of_on": dt.date(2026, 5, 1), "known_no": 2, "program_version": "0.1.0"}
        add(models.SavedAppraisal, [{**saved, "journal_hash": "0" * 64, "document": "{}"}])
    return ids
