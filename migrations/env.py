"""How Alembic runs the migrations: one transaction for all of them, the guard put up at its end."""

from __future__ import annotations

import os

from alembic import context
from sqlalchemy import Connection

from fleet.errors import UsageProblem
from fleet.store.engine import WRITES, make_engine
from fleet.store.migrate import finish, prepare
from fleet.store.models import Base


def _run(connection: Connection) -> None:
    context.configure(
        connection=connection,
        target_metadata=Base.metadata,
        render_as_batch=True,
        compare_type=True,
        transactional_ddl=True,  # true of SQLite too, once BEGIN is said explicitly
        transaction_per_migration=False,
    )
    with context.begin_transaction():
        context.run_migrations()
        finish(connection)


if context.is_offline_mode():
    raise UsageProblem("alembic", "the guard needs a database to look at", "run without --sql")

given = context.config.attributes.get("connection")
if given is not None:
    _run(given)
else:
    address = context.get_x_argument(as_dictionary=True).get("db") or os.environ.get("FLEET_DB") or "fleet.db"
    with make_engine(address).connect() as opened:
        prepare(opened)
        _run(opened.execution_options(**{WRITES: True}))
