"""What every table has in common: the naming of constraints, the columns of a fact, the kinds of checks.

A fact row is never changed. Its `entry_no` names the journal entry that wrote it, its `replaces_id` the row
it corrects, its `written` the physical values as somebody wrote them, its `mark` the first digits of the
digest of its own line.
"""

from __future__ import annotations

import datetime as dt
from typing import Any, ClassVar

from sqlalchemy import (
    Boolean,
    CheckConstraint,
    Date,
    Double,
    ForeignKey,
    Integer,
    MetaData,
    Table,
    Text,
)
from sqlalchemy.orm import DeclarativeBase, Mapped, declared_attr, mapped_column

NAMING = {
    "ix": "ix_%(table_name)s_%(column_0_N_name)s",
    "uq": "uq_%(table_name)s_%(column_0_N_name)s",
    "ck": "ck_%(table_name)s_%(constraint_name)s",
    "fk": "fk_%(table_name)s_%(column_0_N_name)s_%(referred_table_name)s",
    "pk": "pk_%(table_name)s",
}
"""How constraints and indexes are named, so that migrations can name them on both engines."""

YES_NO = ("yes", "no")
"""The two words of a column that asks a question [text]."""


class Base(DeclarativeBase):
    """Carry the metadata of all tables."""

    metadata = MetaData(naming_convention=NAMING)
    type_annotation_map: ClassVar[dict[Any, Any]] = {
        str: Text,
        float: Double,
        int: Integer,
        bool: Boolean,
        dt.date: Date,
    }

    ABOUT: ClassVar[tuple[str, ...]] = ()
    """The columns that name the entity a row is about, for `facts.history`."""


class Fact:
    """Give a table the columns that every fact has."""

    id: Mapped[int] = mapped_column(primary_key=True, autoincrement=False, sort_order=-9)
    # The entry is written last, when its digest is known: the reference is checked when the transaction ends.
    entry_no: Mapped[int] = mapped_column(
        ForeignKey("journal.no", deferrable=True, initially="DEFERRED"), sort_order=-8
    )
    mark: Mapped[str] = mapped_column(sort_order=9)


class Correctable(Fact):
    """Give a fact the columns by which it corrects another, and keep what was written."""

    @declared_attr
    def replaces_id(cls) -> Mapped[int | None]:  # noqa: N805  SQLAlchemy calls it with the class
        """Name the row that this one replaces; no two rows replace one."""
        table: str = cls.__tablename__  # type: ignore[attr-defined]  # every model has one
        return mapped_column(ForeignKey(f"{table}.id"), unique=True, index=True, sort_order=-7)

    written: Mapped[str | None] = mapped_column(info={"json": True}, sort_order=8)


class Retractable(Correctable):
    """Give a fact the means to be taken back: a row that replaces it and says why it never held."""

    withdrawn_because: Mapped[str | None] = mapped_column(sort_order=7)


def choices(column: str, allowed: tuple[str, ...]) -> CheckConstraint:
    """Let a column hold only the listed words.

    Parameters
    ----------
    column : str
        Name of the column [text].
    allowed : tuple of str
        The words [text].

    Returns
    -------
    sqlalchemy.CheckConstraint
    """
    words = ", ".join("'" + word.replace("'", "''") + "'" for word in allowed)
    return CheckConstraint(f"{column} IN ({words})", name=f"{column}_known")


def positive(*columns: str) -> tuple[CheckConstraint, ...]:
    """Let columns hold only numbers above zero.

    Parameters
    ----------
    *columns : str
        Names of the columns [text].

    Returns
    -------
    tuple of sqlalchemy.CheckConstraint
    """
    return tuple(CheckConstraint(f"{column} > 0", name=f"{column}_positive") for column in columns)


def not_negative(*columns: str) -> tuple[CheckConstraint, ...]:
    """Let columns hold only zero and numbers above it.

    Parameters
    ----------
    *columns : str
        Names of the columns [text].

    Returns
    -------
    tuple of sqlalchemy.CheckConstraint
    """
    return tuple(CheckConstraint(f"{column} >= 0", name=f"{column}_not_negative") for column in columns)


def fraction(*columns: str) -> tuple[CheckConstraint, ...]:
    """Let columns hold only numbers above zero and up to one.

    Parameters
    ----------
    *columns : str
        Names of the columns [text].

    Returns
    -------
    tuple of sqlalchemy.CheckConstraint
    """
    return tuple(
        CheckConstraint(f"{column} > 0 AND {column} <= 1", name=f"{column}_fraction") for column in columns
    )


def table_of(model: type[Base]) -> Table:
    """Give the Core table of a model.

    Parameters
    ----------
    model : type
        A model class [-].

    Returns
    -------
    sqlalchemy.Table
    """
    table = model.__table__
    if not isinstance(table, Table):
        raise TypeError(f"{model.__name__} is not mapped to a table")
    return table
