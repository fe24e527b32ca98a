"""The guard: no statement changes, removes, pushes out or truncates what is on record. On both engines."""

from __future__ import annotations

from collections.abc import Callable

import pytest
from sqlalchemy import Connection, Engine, inspect

from fleet import errors
from fleet.store import guard, journal
from fleet.store.models import FACTS, Base, Journal, table_of

Fill = Callable[[Engine], dict[str, int]]
CLOSED = [*(table_of(model).name for model in FACTS), table_of(Journal).name]


def _count(conn: Connection, table: str) -> int:
    return int(conn.exec_driver_sql(f"SELECT count(*) FROM {table}").scalar_one())


def _refused(engine: Engine, statement: str) -> None:
    with (
        pytest.raises(errors.RecordIsClosed, match="the record is closed"),
        engine.begin() as conn,
    ):
        conn.exec_driver_sql(statement)


def test_every_table_is_under_the_guard(engine: Engine) -> None:
    tables = set(inspect(engine).get_table_names()) - {"alembic_version"}
    assert tables == {table.name for table in Base.metadata.sorted_tables}
    assert tables == {*CLOSED, "journal_head"}
    with engine.connect() as conn:
        assert guard.missing(conn) == []


@pytest.mark.parametrize("table", CLOSED)
def test_rows_are_neither_changed_nor_removed(engine: Engine, fill: Fill, table: str) -> None:
    fill(engine)
    key = "no" if table == "journal" else "id"
    with engine.connect() as conn:
        before = conn.exec_driver_sql(f"SELECT * FROM {table} ORDER BY {key}").all()
    assert before, "a guard is tried with a row in the table"
    columns = [column["name"] for column in inspect(engine).get_columns(table)]
    for name in (columns[0], columns[2], columns[-1]):
        _refused(engine, f'UPDATE {table} SET "{name}" = "{name}"')
    _refused(engine, f"DELETE FROM {table} WHERE {key} = 1")
    names = ", ".join(f'"{name}"' for name in columns)
    copy = f"({names}) SELECT {names} FROM {table} WHERE {key} = 1"
    if engine.dialect.name == "sqlite":
        _refused(engine, f"INSERT OR REPLACE INTO {table} {copy}")
        _refused(engine, f"REPLACE INTO {table} {copy}")
        _refused(engine, f"UPDATE OR REPLACE {table} SET {key} = {key} + 1")
        _refused(engine, f"INSERT INTO {table} {copy} ON CONFLICT DO UPDATE SET {key} = 99")
    else:
        _refused(engine, f"TRUNCATE {table} CASCADE")
        _refused(engine, f"INSERT INTO {table} {copy} ON CONFLICT ({key}) DO UPDATE SET {key} = 99")
    with engine.connect() as conn:
        assert conn.exec_driver_sql(f"SELECT * FROM {table} ORDER BY {key}").all() == before
        assert journal.verify(conn) == []


def test_a_row_is_not_pushed_out_by_another_key(engine: Engine, fill: Fill) -> None:
    """REPLACE removes whatever row stands in the way of any unique key, not only of the first."""
    ids = fill(engine)
    if engine.dialect.name != "sqlite":
        pytest.skip("PostgreSQL has no REPLACE; its upsert is tried above")
    vessel = (
        "INSERT OR REPLACE INTO entity (id, entry_no, kind, tag, mark) VALUES (99, 1, 'vessel', 'D-101', '')"
    )
    _refused(engine, vessel)
    part = "INSERT OR REPLACE INTO entity (id, entry_no, kind, parent_id, tag, mark) "
    part += "VALUES (99, 1, 'part', {}, 'shell', '')"
    _refused(engine, part.format(ids["vessel"]))
    appraisal = (
        "INSERT OR REPLACE INTO appraisal SELECT 99, entry_no, replaces_id, name, as_of_on, known_no, "
    )
    _refused(
        engine,
        appraisal + "carry_to_on, program_version, journal_hash, document, written, mark FROM appraisal",
    )
    correction = "INSERT{} INTO inspection (id, entry_no, replaces_id, vessel_id, kind, done_on, mark) "
    values = "VALUES ({}, 1, 1, 1, 'internal', '2020-01-01', '')"
    with engine.begin() as conn:
        conn.exec_driver_sql(correction.format("") + values.format(98))
    _refused(engine, correction.format(" OR REPLACE") + values.format(99))
    _refused(
        engine,
        "INSERT OR REPLACE INTO journal SELECT 99, at, by, role, why, task, program_version, wrote, "
        "facts_digest, previous_hash, hash FROM journal WHERE no = 1",
    )
    with engine.connect() as conn:
        assert _count(conn, "inspection") == 2


def test_the_head_only_moves_on_by_one(engine: Engine, fill: Fill) -> None:
    fill(engine)
    for statement in (
        "UPDATE journal_head SET no = 1",
        "UPDATE journal_head SET no = 5",
        "UPDATE journal_head SET hash = 'x'",
        "DELETE FROM journal_head",
    ):
        _refused(engine, statement)
    if engine.dialect.name == "sqlite":
        _refused(engine, "INSERT OR REPLACE INTO journal_head (id, no, hash) VALUES (1, 0, '')")
    else:
        _refused(engine, "TRUNCATE journal_head")
    with (
        pytest.raises(errors.FleetError, match=r"one head|ck_journal_head_one_row"),
        engine.begin() as conn,
    ):
        conn.exec_driver_sql("INSERT INTO journal_head (id, no, hash) VALUES (2, 0, '')")


def test_a_refused_statement_leaves_the_database_usable(engine: Engine, fill: Fill) -> None:
    fill(engine)
    _refused(engine, "DELETE FROM reading")
    with journal.writer(engine, task="x", by="A. Keel") as entry:
        entry.add(*_a_setting())
    with engine.connect() as conn:
        assert journal.head(conn).no == 4


def test_what_is_missing_of_the_guard_is_named(engine: Engine) -> None:
    with engine.begin() as conn:
        if engine.dialect.name == "sqlite":
            conn.exec_driver_sql("DROP TRIGGER guard_reading_update")
            conn.exec_driver_sql("DROP TRIGGER guard_survey_delete")
            conn.exec_driver_sql(
                "CREATE TRIGGER guard_survey_delete BEFORE DELETE ON survey BEGIN SELECT 1; END"
            )
            gone = ["reading: guard_reading_update", "survey: guard_survey_delete"]
        else:
            conn.exec_driver_sql("DROP TRIGGER guard_reading_change ON reading")
            conn.exec_driver_sql("ALTER TABLE survey DISABLE TRIGGER guard_survey_truncate")
            gone = ["reading: guard_reading_change", "survey: guard_survey_truncate"]
    with engine.begin() as conn:
        assert guard.missing(conn) == gone
        guard.install(conn)
    with engine.connect() as conn:
        assert guard.missing(conn) == []


@pytest.mark.postgres
def test_a_hollow_function_is_noticed(engine: Engine) -> None:
    if engine.dialect.name != "postgresql":
        pytest.skip("SQLite's triggers carry their own words")
    with engine.begin() as conn:
        conn.exec_driver_sql(
            "CREATE OR REPLACE FUNCTION fleet_refuse_change() RETURNS trigger LANGUAGE plpgsql AS "
            "$$ BEGIN RETURN NEW; END $$"
        )
    with engine.begin() as conn:
        assert guard.missing(conn) == ["every table: fleet_refuse_change"]
        guard.install(conn)
        assert guard.missing(conn) == []


def _a_setting() -> tuple[type[Base], list[dict[str, object]]]:
    import datetime as dt

    from fleet.store.models import Setting

    return Setting, [{"key": "floor", "value": "0", "from_on": dt.date(2020, 1, 1)}]
