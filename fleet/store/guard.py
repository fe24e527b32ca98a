"""The guard: triggers that refuse to change or remove what is on record, in SQLite and PostgreSQL.

They keep out mistakes and careless statements. Who owns the file can drop them; that is what the journal's
digests are for. Migrations call `install` at the end of every run, because rebuilding a table in SQLite drops
its triggers.
"""

from __future__ import annotations

from dataclasses import dataclass

from sqlalchemy import Connection, Inspector, inspect, text

from fleet.store.engine import CLOSED

_FUNCTION = "fleet_refuse_change"
_NOT_FACTS = {"alembic_version", "journal_head"}


@dataclass(frozen=True)
class _Trigger:
    name: str
    table: str
    sql: str


def install(conn: Connection) -> None:
    """Make every trigger of the guard anew, for every table that the database has.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        A connection with a transaction in which schema may be changed [-].
    """
    present = _present(conn)
    if conn.dialect.name == "postgresql":
        conn.exec_driver_sql(_function_sql())
    for trigger in _wanted(conn):
        if trigger.name in present:
            conn.exec_driver_sql(_drop_sql(conn, trigger))
        conn.exec_driver_sql(trigger.sql)


def missing(conn: Connection) -> list[str]:
    """Name the triggers of the guard that are absent, switched off or not as they were made.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].

    Returns
    -------
    list of str
        ``table: trigger`` for each; empty when the guard is whole.
    """
    present = _present(conn)
    gone = [
        f"{trigger.table}: {trigger.name}"
        for trigger in _wanted(conn)
        if present.get(trigger.name) != _remembered(conn, trigger)
    ]
    if conn.dialect.name == "postgresql":
        body = conn.scalar(text("SELECT prosrc FROM pg_proc WHERE proname = :name"), {"name": _FUNCTION})
        if body is None or body.strip() != _FUNCTION_BODY.strip():
            gone.append(f"every table: {_FUNCTION}")
    return gone


def _wanted(conn: Connection) -> list[_Trigger]:
    look = inspect(conn)
    tables = sorted(look.get_table_names())
    facts = [name for name in tables if name not in _NOT_FACTS]
    postgres = conn.dialect.name == "postgresql"
    wanted: list[_Trigger] = []
    for table in facts:
        if postgres:
            wanted += _postgres_fact(table)
        else:
            names = [column["name"] for column in look.get_columns(table)]
            wanted += _sqlite_fact(table, names, _unique_keys(look, table))
    if "journal_head" in tables:
        wanted += _postgres_head() if postgres else _sqlite_head()
    return wanted


def _unique_keys(look: Inspector, table: str) -> list[tuple[list[str], str]]:
    """Give every unique key of a table with its condition, for a row that would push out another."""
    keys = [(list(look.get_pk_constraint(table)["constrained_columns"]), "")]
    keys += [(list(each["column_names"]), "") for each in look.get_unique_constraints(table)]
    for index in look.get_indexes(table):
        if index["unique"]:
            where = index.get("dialect_options", {}).get("sqlite_where")
            names = [name for name in index["column_names"] if name is not None]
            keys.append((names, "" if where is None else str(where)))
    seen: list[tuple[list[str], str]] = []
    for key in sorted(keys):
        if key not in seen:
            seen.append(key)
    return seen


# ----------------------------------------------------------------------------------------------------------
# SQLite
# ----------------------------------------------------------------------------------------------------------
def _sqlite(name: str, table: str, when: str, condition: str, what: str) -> _Trigger:
    full = f"guard_{table}_{name}"
    words = f"{CLOSED}: {what}"
    sql = (
        f'CREATE TRIGGER "{full}" BEFORE {when} ON "{table}"\n'
        + (f"WHEN {condition}\n" if condition else "")
        + f"BEGIN SELECT RAISE(ABORT, '{words}'); END"
    )
    return _Trigger(full, table, sql)


def _sqlite_fact(table: str, columns: list[str], keys: list[tuple[list[str], str]]) -> list[_Trigger]:
    new = ", ".join(f'NEW."{name}" AS "{name}"' for name in columns)
    clashes = []
    for names, where in keys:
        match = " AND ".join(f'"{name}" = NEW."{name}"' for name in names)
        clash = f'EXISTS (SELECT 1 FROM "{table}" WHERE {match})'  # noqa: S608  names of our own schema
        if where:  # a partial index: both rows must be of the part that it covers
            clash = (
                f"EXISTS (SELECT 1 FROM (SELECT {new}) WHERE {where}) AND "  # noqa: S608  the same
                f'EXISTS (SELECT 1 FROM "{table}" WHERE {match} AND {where})'
            )
        clashes.append(f"({clash})")
    return [
        _sqlite("update", table, "UPDATE", "", f"no row of {table} is ever changed"),
        _sqlite("delete", table, "DELETE", "", f"no row of {table} is ever removed"),
        _sqlite("replace", table, "INSERT", "\n  OR ".join(clashes), f"no row of {table} is ever pushed out"),
    ]


def _sqlite_head() -> list[_Trigger]:
    table = "journal_head"
    return [
        _sqlite(
            "update", table, "UPDATE", "NEW.id <> OLD.id OR NEW.no <> OLD.no + 1", "the head only moves on"
        ),
        _sqlite("delete", table, "DELETE", "", "the journal always has a head"),
        _sqlite(
            "replace", table, "INSERT", "EXISTS (SELECT 1 FROM journal_head)", "the journal has one head"
        ),
    ]


# ----------------------------------------------------------------------------------------------------------
# PostgreSQL
# ----------------------------------------------------------------------------------------------------------
_FUNCTION_BODY = f"""
BEGIN
  RAISE EXCEPTION '{CLOSED}: no row of % is ever changed or removed (%)', TG_TABLE_NAME, TG_OP;
END
"""


def _function_sql() -> str:
    return (
        f"CREATE OR REPLACE FUNCTION {_FUNCTION}() RETURNS trigger LANGUAGE plpgsql AS "
        f"$guard${_FUNCTION_BODY}$guard$".replace("%", "%%")
    )


def _postgres(name: str, table: str, when: str, each: str, condition: str = "") -> _Trigger:
    full = f"guard_{table}_{name}"
    sql = (
        f'CREATE TRIGGER "{full}" BEFORE {when} ON "{table}" FOR EACH {each} '
        + (f"WHEN ({condition}) " if condition else "")
        + f"EXECUTE FUNCTION {_FUNCTION}()"
    )
    return _Trigger(full, table, sql)


def _postgres_fact(table: str) -> list[_Trigger]:
    return [
        _postgres("change", table, "UPDATE OR DELETE", "ROW"),
        _postgres("truncate", table, "TRUNCATE", "STATEMENT"),
    ]


def _postgres_head() -> list[_Trigger]:
    table = "journal_head"
    return [
        _postgres("update", table, "UPDATE", "ROW", "NEW.id <> OLD.id OR NEW.no <> OLD.no + 1"),
        _postgres("delete", table, "DELETE", "ROW"),
        _postgres("truncate", table, "TRUNCATE", "STATEMENT"),
    ]


# ----------------------------------------------------------------------------------------------------------
# What the database has
# ----------------------------------------------------------------------------------------------------------
def _present(conn: Connection) -> dict[str, str]:
    """Give the triggers of the guard that the database has, with what tells that they are whole."""
    if conn.dialect.name == "postgresql":
        rows = conn.execute(
            text(
                "SELECT tgname, tgenabled::text, tgtype, tgqual IS NULL, p.proname FROM pg_trigger t "
                "JOIN pg_class c ON c.oid = t.tgrelid JOIN pg_proc p ON p.oid = t.tgfoid "
                "WHERE NOT t.tgisinternal AND c.relnamespace = current_schema()::regnamespace "
                "AND t.tgname LIKE 'guard!_%' ESCAPE '!'"
            )
        )
        return {name: f"{on}{kind}{bare}{function}" for name, on, kind, bare, function in rows}
    rows = conn.execute(
        text("SELECT name, sql FROM sqlite_master WHERE type = 'trigger' AND name LIKE 'guard!_%' ESCAPE '!'")
    )
    return {row.name: row.sql for row in rows}


def _remembered(conn: Connection, trigger: _Trigger) -> str:
    """Give what `_present` says of a trigger that is whole."""
    if conn.dialect.name != "postgresql":
        return trigger.sql
    # Bits of pg_trigger.tgtype: 1 row, 2 before, 8 delete, 16 update, 32 truncate.
    kind = 2 + (1 if "FOR EACH ROW" in trigger.sql else 0)
    head = trigger.sql.split(" ON ", 1)[0]
    kind += sum(bit for word, bit in (("DELETE", 8), ("UPDATE", 16), ("TRUNCATE", 32)) if word in head)
    return f"O{kind}{'WHEN' not in trigger.sql}{_FUNCTION}"


def _drop_sql(conn: Connection, trigger: _Trigger) -> str:
    if conn.dialect.name == "postgresql":
        return f'DROP TRIGGER "{trigger.name}" ON "{trigger.table}"'
    return f'DROP TRIGGER "{trigger.name}"'
