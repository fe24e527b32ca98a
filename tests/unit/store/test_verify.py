"""Check of the journal: whatever is altered, dropped, swapped or added is found and named. On both engines."""

from __future__ import annotations

import contextlib
from collections.abc import Callable, Iterator
from typing import Any

import pytest
from sqlalchemy import Boolean, Connection, Date, Double, Engine, Integer, inspect, text

from fleet.store import journal
from fleet.store.canonical import entry_hash, line, mark
from fleet.store.journal import Finding
from fleet.store.models import FACTS, Journal, table_of

Fill = Callable[[Engine], dict[str, int]]


@contextlib.contextmanager
def _stripped(engine: Engine) -> Iterator[Connection]:
    """Do what the owner of the database could do: switch off guard and references."""
    with engine.connect() as conn:
        if engine.dialect.name == "sqlite":
            raw: Any = conn.connection.driver_connection
            raw.execute("PRAGMA foreign_keys = OFF")
            raw.execute("PRAGMA ignore_check_constraints = ON")
            raw.execute("BEGIN")  # one wait for the disk, not one for each trigger
            names = raw.execute("SELECT name FROM sqlite_master WHERE type = 'trigger'").fetchall()
            for (name,) in names:
                raw.execute(f"DROP TRIGGER {name}")
            raw.execute("COMMIT")
        else:
            conn.exec_driver_sql("SET session_replication_role = replica")  # neither guard nor references
        yield conn


def _unguarded(engine: Engine, *statements: str) -> None:
    with _stripped(engine) as conn:
        for statement in statements:
            conn.exec_driver_sql(statement)
        conn.commit()


def _found(engine: Engine, against: str | None = None) -> list[Finding]:
    with engine.connect() as conn:
        return journal.verify(conn, against=against)


def _named(engine: Engine) -> list[tuple[str, int | None, str, int | None]]:
    return [(each.what, each.entry, each.table, each.row) for each in _found(engine)]


def _other(column: Any) -> str:
    if isinstance(column.type, Double):
        return f'coalesce("{column.name}", 1) * 1.0000000000000003 + 1e-15'
    if isinstance(column.type, Boolean):
        return f'NOT "{column.name}"'
    if isinstance(column.type, Integer):
        return f'coalesce("{column.name}", 0) + 1'
    if isinstance(column.type, Date):
        return "'1999-12-31'"
    return f"coalesce(\"{column.name}\", '') || ' '"


@pytest.mark.parametrize("model", FACTS, ids=lambda model: str(model.__tablename__))
def test_any_altered_field_of_any_fact_is_found(engine: Engine, fill: Fill, model: Any) -> None:
    fill(engine)
    table = table_of(model)
    first = f"FROM {table.name} ORDER BY id"
    with _stripped(engine) as conn:  # nothing is committed
        if engine.dialect.name == "postgresql":
            for check in inspect(conn).get_check_constraints(table.name):
                conn.exec_driver_sql(f"ALTER TABLE {table.name} DROP CONSTRAINT {check['name']}")
        row_id, entry_no = conn.exec_driver_sql(f"SELECT id, entry_no {first}").first() or (0, 0)
        for column in table.columns:
            if column.name == "id":
                continue
            kept = conn.begin_nested()
            conn.exec_driver_sql(
                f'UPDATE {table.name} SET "{column.name}" = {_other(column)} WHERE id = {row_id}'
            )
            found = [(each.what, each.entry, each.table, each.row) for each in journal.verify(conn)]
            assert found == [("altered", entry_no, table.name, row_id)], column.name
            kept.rollback()
            assert journal.verify(conn) == [], column.name


@pytest.mark.parametrize("column", table_of(Journal).columns, ids=lambda column: str(column.name))
def test_any_altered_field_of_any_entry_is_found(engine: Engine, fill: Fill, column: Any) -> None:
    fill(engine)
    _unguarded(engine, f'UPDATE journal SET "{column.name}" = {_other(column)} WHERE no = 3')
    entry = 4 if column.name == "no" else 3
    found = _named(engine)
    assert found[0][0] in {"altered", "swapped", "dropped"}
    assert any(each[1] == entry and each[2] == "journal" for each in found)


@pytest.mark.parametrize("no", [1, 2, 3])
@pytest.mark.parametrize("name", ["by", "facts_digest", "previous_hash", "hash"])
def test_every_entry_is_looked_at(engine: Engine, fill: Fill, no: int, name: str) -> None:
    fill(engine)
    _unguarded(engine, f"UPDATE journal SET \"{name}\" = 'someone else' WHERE no = {no}")
    assert ("altered", no, "journal", no) in _named(engine)


def test_a_blanked_field_is_found(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    _unguarded(engine, f"UPDATE reading SET written = NULL WHERE id = {ids['reading']}")
    assert _named(engine) == [("altered", 2, "reading", ids["reading"])]


def test_an_altered_row_with_a_new_mark_is_found_in_its_entry(engine: Engine, fill: Fill) -> None:
    fill(engine)
    _unguarded(engine, "UPDATE setting SET value = '0.01 mm'")
    with engine.connect() as conn:
        row = conn.execute(table_of(_model("setting")).select()).mappings().one()
    _unguarded(engine, f"UPDATE setting SET mark = '{mark(line('setting', dict(row)))}'")
    [found] = _found(engine)
    assert (found.what, found.entry, found.row) == ("altered", 1, None)
    assert "setting" in found.table


@pytest.mark.parametrize("model", FACTS, ids=lambda model: str(model.__tablename__))
def test_a_dropped_row_of_any_table_is_found(engine: Engine, fill: Fill, model: Any) -> None:
    fill(engine)
    table = table_of(model).name
    with engine.connect() as conn:
        statement = f"SELECT id, entry_no FROM {table} ORDER BY id DESC"
        row_id, entry_no = conn.exec_driver_sql(statement).first() or (0, 0)
    _unguarded(engine, f"DELETE FROM {table} WHERE id = {row_id}")
    assert _named(engine) == [("dropped", entry_no, table, row_id)]


def test_a_row_dropped_from_the_middle_is_found(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    _unguarded(engine, f"DELETE FROM reading WHERE id = {ids['reading 2']}")
    assert _named(engine) == [("dropped", 2, "reading", ids["reading 2"])]


def test_an_added_row_is_found(engine: Engine, fill: Fill) -> None:
    fill(engine)
    columns = "(id, entry_no, key, value, from_on, mark)"
    for entry_no, key in ((1, 7), (3, 8), (99, 9)):
        _unguarded(
            engine, f"INSERT INTO setting {columns} VALUES ({key}, {entry_no}, 'k', 'v', '2020-01-01', 'm')"
        )
    assert _named(engine) == [
        ("added", 1, "setting", 7),
        ("added", 3, "setting", 8),
        ("added", 99, "setting", 9),
    ]


def test_a_row_given_to_another_entry_is_found(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    _unguarded(engine, f"UPDATE reading SET entry_no = 3 WHERE id = {ids['reading']}")
    assert _named(engine) == [("altered", 2, "reading", ids["reading"])]


def test_swapped_rows_are_found(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    a, b = ids["reading"], ids["reading 3"]
    _unguarded(
        engine,
        f"UPDATE reading SET id = 900 WHERE id = {a}",
        f"UPDATE reading SET id = {a} WHERE id = {b}",
        f"UPDATE reading SET id = {b} WHERE id = 900",
    )
    assert _named(engine) == [("swapped", 2, "reading", a), ("swapped", 2, "reading", b)]


def test_rows_that_swapped_all_but_key_and_mark_are_found(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    a, b = ids["reading"], ids["reading 3"]
    fields = ("location_id", "thickness_mm", "written")
    with engine.connect() as conn:
        rows: dict[int, tuple[Any, ...]] = {}
        for key in (a, b):
            statement = f"SELECT {', '.join(fields)} FROM reading WHERE id = {key}"
            rows[key] = tuple(conn.exec_driver_sql(statement).one())
    for key, other in ((a, b), (b, a)):
        location, wall, written = rows[other]
        sets = f"location_id = {location}, thickness_mm = {wall}, written = '{written}'"
        _unguarded(engine, f"UPDATE reading SET {sets} WHERE id = {key}")
    assert _named(engine) == [("swapped", 2, "reading", a), ("swapped", 2, "reading", b)]


def test_swapped_entries_are_found(engine: Engine, fill: Fill) -> None:
    fill(engine)
    _unguarded(
        engine,
        "UPDATE journal SET no = 900 WHERE no = 2",
        "UPDATE journal SET no = 2 WHERE no = 3",
        "UPDATE journal SET no = 3 WHERE no = 900",
    )
    found = _named(engine)
    assert ("swapped", 2, "journal", 2) in found
    assert ("swapped", 3, "journal", 3) in found


@pytest.mark.parametrize("no", [1, 2])
def test_an_entry_dropped_from_the_chain_is_found(engine: Engine, fill: Fill, no: int) -> None:
    fill(engine)
    _unguarded(engine, f"DELETE FROM journal WHERE no = {no}")
    assert ("dropped", no, "journal", no) in _named(engine)


def test_the_last_entry_dropped_is_found_by_the_head(engine: Engine, fill: Fill) -> None:
    fill(engine)
    _unguarded(engine, "DELETE FROM journal WHERE no = 3")
    assert ("dropped", 3, "journal", 3) in _named(engine)


def test_the_last_entry_dropped_with_all_its_traces_is_found_by_a_printed_head(
    engine: Engine, fill: Fill
) -> None:
    fill(engine)
    with engine.connect() as conn:
        printed = journal.head(conn).hash
        before = journal.entries(conn)[1]
    facts = [table_of(model).name for model in FACTS]
    _unguarded(
        engine,
        *(f"DELETE FROM {table} WHERE entry_no = 3" for table in facts),
        "DELETE FROM journal WHERE no = 3",
        f"UPDATE journal_head SET no = 2, hash = '{before['hash']}'",
    )
    assert _found(engine) == []
    [found] = _found(engine, printed)
    assert (found.what, found.table) == ("dropped", "journal")
    assert printed in found.text
    assert _found(engine, before["hash"]) == []


def test_a_printed_head_is_found_in_the_chain_also_in_part(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with engine.connect() as conn:
        heads = [row["hash"] for row in journal.entries(conn)]
    for head in heads:
        assert _found(engine, head) == []
        assert _found(engine, head[:12].upper()) == []
    [found] = _found(engine, heads[0][:11])
    assert "too short" in found.text
    assert len(_found(engine, "f" * 64)) == 1


def test_a_chain_made_anew_is_found_by_a_printed_head(engine: Engine, fill: Fill) -> None:
    """Somebody who alters an entry and reckons every later hash anew leaves a whole chain."""
    fill(engine)
    with engine.connect() as conn:
        printed = journal.head(conn).hash
        rows = [dict(row) for row in conn.execute(table_of(Journal).select().order_by("no")).mappings()]
    rows[0]["by"] = "N. Obody"
    statements = ["UPDATE journal SET hash = 'x' || no, previous_hash = 'y' || no"]
    previous = rows[0]["previous_hash"]
    for row in rows:
        row["previous_hash"] = previous
        previous = row["hash"] = entry_hash(row)
        statements.append(
            f"UPDATE journal SET by = '{row['by']}', previous_hash = '{row['previous_hash']}', "
            f"hash = '{row['hash']}' WHERE no = {row['no']}"
        )
    _unguarded(engine, *statements, f"UPDATE journal_head SET hash = '{previous}'")
    assert _found(engine) == []
    assert len(_found(engine, printed)) == 1


def test_an_entry_with_a_new_hash_of_its_own_is_not_followed_by_the_next(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with engine.connect() as conn:
        [row] = (
            dict(each) for each in conn.execute(table_of(Journal).select().where(text("no = 1"))).mappings()
        )
    digest = entry_hash({**row, "by": "N. Obody"})
    _unguarded(engine, f"UPDATE journal SET by = 'N. Obody', hash = '{digest}' WHERE no = 1")
    assert _named(engine) == [("altered", 2, "journal", 2)]


def test_a_head_that_points_elsewhere_is_found(engine: Engine, fill: Fill) -> None:
    fill(engine)
    _unguarded(engine, "UPDATE journal_head SET hash = 'x'")
    assert _named(engine) == [("altered", 3, "journal_head", 1)]
    _unguarded(engine, "DELETE FROM journal_head")
    assert _named(engine) == [("dropped", None, "journal_head", None)]


def test_a_broken_list_of_what_an_entry_wrote_is_found(engine: Engine, fill: Fill) -> None:
    fill(engine)
    for broken in ("no json", "[]", '{"reading": 7}', '{"reading": [1, 999999999999]}'):
        _unguarded(engine, f"UPDATE journal SET wrote = '{broken}' WHERE no = 2")
        found = _named(engine)
        assert found[0] == ("altered", 2, "journal", 2)
        assert len(found) < 500


def test_odd_types_of_sqlite_do_not_stop_the_check(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    if engine.dialect.name != "sqlite":
        pytest.skip("PostgreSQL keeps the types of its columns")
    _unguarded(
        engine,
        f"UPDATE reading SET thickness_mm = 'thin', taken_on = 'once', note = x'00ff' WHERE id = {ids['reading']}",
        "UPDATE journal SET why = x'00ff' WHERE no = 1",
    )
    assert _named(engine) == [("altered", 1, "journal", 1), ("altered", 2, "reading", ids["reading"])]


def _model(name: str) -> Any:
    return next(model for model in FACTS if table_of(model).name == name)
