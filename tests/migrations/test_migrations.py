"""Migrations: from nothing to head, without drift, all or nothing, with the guard at the end. On both engines."""

from __future__ import annotations

import os
import re
import shutil
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest
from sqlalchemy import Engine, inspect, text

from fleet import errors
from fleet.store import facts, guard, journal, migrate
from fleet.store.engine import make_engine
from fleet.store.models import FACTS, Base, Reading, table_of

Fill = Callable[[Engine], dict[str, int]]
CHECKOUT = Path(__file__).parents[2]

FAILING = '''
"""Fail halfway."""
from alembic import op
revision, down_revision, branch_labels, depends_on = "0002", "0001", None, None
def upgrade() -> None:
    op.execute("CREATE TABLE half (x INTEGER)")
    op.execute("ALTER TABLE survey ADD COLUMN half TEXT")
    op.execute("INSERT INTO nowhere VALUES (1)")
'''

REBUILDING = '''
"""Add a column and rebuild a table that others refer to."""
import sqlalchemy as sa
from alembic import op
revision, down_revision, branch_labels, depends_on = "0002", "0001", None, None
def upgrade() -> None:
    op.add_column("survey", sa.Column("weather", sa.Text(), nullable=True))
    with op.batch_alter_table("reading", recreate="auto") as batch:
        batch.create_check_constraint(op.f("ck_reading_not_thick"), "thickness_mm < 1000")
    op.create_table("extra", sa.Column("id", sa.Integer(), primary_key=True), sa.Column("x", sa.Text(), unique=True))
'''

DANGLING = '''
"""Leave a reference that leads nowhere."""
from alembic import op
revision, down_revision, branch_labels, depends_on = "0002", "0001", None, None
def upgrade() -> None:
    op.execute("DROP TRIGGER guard_restart_delete")
    op.execute("DELETE FROM restart")
'''


def _with(folder: Path, planted: str) -> Path:
    """Copy the migrations and plant one more."""
    shutil.copytree(migrate.migrations_folder(), folder, ignore=shutil.ignore_patterns("__pycache__"))
    (folder / "versions" / "0002_planted.py").write_text(planted)
    return folder


def _schema(engine: Engine) -> dict[str, Any]:
    look = inspect(engine)
    return {
        name: sorted(column["name"] for column in look.get_columns(name)) for name in look.get_table_names()
    }


def _checks(engine: Engine) -> dict[str, dict[str, str]]:
    look = inspect(engine)
    return {
        name: {
            str(each["name"]): re.sub(r"\s+", " ", str(each["sqltext"]))
            for each in look.get_check_constraints(name)
        }
        for name in look.get_table_names()
        if name != "alembic_version"
    }


def _plain(found: Any) -> Any:
    """Turn what an inspector tells into texts and lists that can be compared."""
    if isinstance(found, dict):
        return {key: _plain(value) for key, value in found.items()}
    if isinstance(found, list):
        return sorted((_plain(each) for each in found), key=repr)
    return str(found)


def test_an_empty_database_comes_to_head(blank_address: str) -> None:
    engine = make_engine(blank_address)
    assert migrate.current(engine) is None
    assert not migrate.is_current(engine)
    with pytest.raises(errors.DatabaseProblem, match="holds no record of fleet"):
        migrate.require_current(engine)
    migrate.new_database(engine)
    assert migrate.current(engine) == migrate.head()
    assert migrate.is_current(engine)
    migrate.require_current(engine)
    with engine.connect() as conn:
        assert guard.missing(conn) == []
        assert journal.verify(conn) == []


def test_a_database_is_not_made_over_another(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with pytest.raises(errors.Refused, match="it holds something already"):
        migrate.new_database(engine)
    with engine.connect() as conn:
        assert journal.head(conn).no == 3


def test_upgrading_twice_changes_nothing(engine: Engine, fill: Fill) -> None:
    fill(engine)
    migrate.upgrade(engine)
    with engine.connect() as conn:
        assert journal.verify(conn) == []
        assert guard.missing(conn) == []


def test_the_head_read_off_the_files_is_the_head_of_alembic() -> None:
    from alembic.config import Config
    from alembic.script import ScriptDirectory

    config = Config()
    config.set_main_option("script_location", str(migrate.migrations_folder()))
    assert ScriptDirectory.from_config(config).get_current_head() == migrate.head()


def test_the_migrated_schema_is_that_of_the_models(engine: Engine) -> None:
    from alembic.autogenerate import compare_metadata
    from alembic.migration import MigrationContext

    with engine.connect() as conn:
        context = MigrationContext.configure(
            conn, opts={"compare_type": True, "compare_server_default": True}
        )
        assert compare_metadata(context, Base.metadata) == []


def test_every_check_says_what_the_models_say(engine: Engine, blank_address: str) -> None:
    """Alembic compares no checks, so both schemas are made and their texts read back."""
    other = make_engine(blank_address)
    if other.dialect.name != engine.dialect.name:
        pytest.skip("compared on one engine at a time")
    Base.metadata.create_all(other)
    migrated, modelled = _checks(engine), _checks(other)
    assert migrated == modelled
    assert sum(len(checks) for checks in migrated.values()) > 60


def test_the_types_references_and_indexes_are_those_of_the_models(engine: Engine, blank_address: str) -> None:
    other = make_engine(blank_address)
    if other.dialect.name != engine.dialect.name:
        pytest.skip("compared on one engine at a time")
    Base.metadata.create_all(other)
    one, two = inspect(engine), inspect(other)
    for table in Base.metadata.sorted_tables:
        for look in (
            "get_columns",
            "get_foreign_keys",
            "get_indexes",
            "get_unique_constraints",
            "get_pk_constraint",
        ):
            left, right = (getattr(each, look)(table.name) for each in (one, two))
            assert _plain(left) == _plain(right), (table.name, look)


def test_replaced_rows_are_looked_up_by_an_index(engine: Engine) -> None:
    for model in FACTS:
        name = table_of(model).name
        if "replaces_id" in table_of(model).columns:
            indexes = inspect(engine).get_indexes(name)
            assert any(each["column_names"] == ["replaces_id"] and each["unique"] for each in indexes), name


def test_a_failed_migration_leaves_nothing(engine: Engine, fill: Fill, tmp_path: Path) -> None:
    fill(engine)
    before = _schema(engine)
    with pytest.raises(errors.DatabaseProblem, match="lacks a table"):
        migrate.upgrade(engine, folder=_with(tmp_path / "planted", FAILING))
    assert _schema(engine) == before
    assert migrate.current(engine) == "0001"
    with engine.connect() as conn:
        assert guard.missing(conn) == []
        assert journal.verify(conn) == []


def test_a_failed_first_migration_leaves_nothing(blank_address: str, tmp_path: Path) -> None:
    engine = make_engine(blank_address)
    with pytest.raises(errors.DatabaseProblem, match="lacks a table"):
        migrate.upgrade(engine, folder=_with(tmp_path / "planted", FAILING))
    assert _schema(engine) == {}


def test_a_rebuilt_table_keeps_rows_digests_and_guard(blank_address: str, fill: Fill, tmp_path: Path) -> None:
    engine = make_engine(blank_address)
    migrate.new_database(engine)
    ids = fill(engine)
    with engine.connect() as conn:
        before = facts.columns(conn, Reading, known=3)
    planted = _with(tmp_path / "planted", REBUILDING)
    migrate.upgrade(engine, folder=planted)
    assert migrate.current(engine) == migrate.head(planted) == "0002"
    with pytest.raises(errors.DatabaseProblem, match="newer than this version's 0001"):
        migrate.require_current(engine)
    with engine.connect() as conn:
        assert facts.columns(conn, Reading, known=3) == before
        assert journal.verify(conn) == []
        assert guard.missing(conn) == []
    for table in ("reading", "survey", "doubt"):
        with pytest.raises(errors.RecordIsClosed, match="the record is closed"), engine.begin() as conn:
            conn.exec_driver_sql(f"DELETE FROM {table}")
    with engine.begin() as conn:
        conn.exec_driver_sql("INSERT INTO extra (id, x) VALUES (1, 'a')")
    with pytest.raises(errors.RecordIsClosed, match="the record is closed"), engine.begin() as conn:
        conn.exec_driver_sql("UPDATE extra SET x = 'b'")
    row = {
        "location_id": ids["location"],
        "taken_on": before["taken_on"][0],
        "thickness_mm": 12.0,
        "result": "read",
    }
    with journal.writer(engine, task="survey load", by="B. Stern") as entry:
        entry.add(Reading, [{**row, "kind": "reading", "status": "accepted"}])
    with engine.connect() as conn:
        assert journal.verify(conn) == []


def test_a_reference_that_leads_nowhere_stops_a_migration(tmp_path: Path, fill: Fill) -> None:
    """SQLite does not follow references while tables are rebuilt, so they are looked at afterwards."""
    engine = make_engine(tmp_path / "fleet.db", must_exist=False)
    migrate.new_database(engine)
    fill(engine)
    with pytest.raises(errors.DatabaseProblem, match="lead nowhere, the first in restart_location row 1"):
        migrate.upgrade(engine, folder=_with(tmp_path / "planted", DANGLING))
    with engine.connect() as conn:
        assert migrate.current(engine) == "0001"
        assert journal.verify(conn) == []
        assert conn.exec_driver_sql("PRAGMA foreign_keys").scalar_one() == 1


def test_an_older_schema_says_what_to_do(
    engine: Engine, monkeypatch: pytest.MonkeyPatch, tmp_path: Path
) -> None:
    planted = _with(tmp_path / "planted", REBUILDING)
    monkeypatch.setattr(migrate, "migrations_folder", lambda: planted)
    with pytest.raises(
        errors.DatabaseProblem, match=r"its schema is 0001, this version needs 0002; run 'fleet db upg"
    ):
        migrate.require_current(engine)


def test_the_record_is_never_taken_back() -> None:
    for path in (migrate.migrations_folder() / "versions").glob("0*.py"):
        names: dict[str, Any] = {}
        exec(compile(path.read_text(), str(path), "exec"), names)  # noqa: S102  our own file
        with pytest.raises(NotImplementedError, match="restore a backup"):
            names["downgrade"]()


def _alembic(*words: str, database: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "alembic", *words],
        cwd=CHECKOUT,
        env={**os.environ, "FLEET_DB": database},
        capture_output=True,
        text=True,
        check=False,
    )


@pytest.mark.slow
def test_alembic_itself_works_from_the_checkout(blank_address: str) -> None:
    done = _alembic("upgrade", "head", database=blank_address)
    assert done.returncode == 0, done.stderr
    engine = make_engine(blank_address)
    migrate.require_current(engine)
    with engine.connect() as conn:
        assert guard.missing(conn) == []
    done = _alembic("check", database=blank_address)
    assert done.returncode == 0, done.stderr
    assert "No new upgrade operations detected" in done.stdout
    done = _alembic("upgrade", "head", "--sql", database=blank_address)
    assert done.returncode != 0
    assert "run without --sql" in done.stderr


def test_a_revision_that_nobody_knows_is_told_and_left_alone(engine: Engine) -> None:
    with engine.begin() as conn:
        conn.execute(text("UPDATE alembic_version SET version_num = '0000'"))
    with pytest.raises(errors.DatabaseProblem, match="not one that this version can bring up"):
        migrate.upgrade(engine)
    assert migrate.current(engine) == "0000"
