"""Read the record at one moment: each table once, however many look at it."""

from __future__ import annotations

from datetime import date, datetime
from typing import Any

from fleet.store import Connection, facts, journal, models
from fleet.store.record import FIRST_PREVIOUS

Columns = dict[str, list[Any]]


class Reader:
    """The record as known up to one journal entry, for figures about one day.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection; nothing is written [-].
    as_of : date
        The day the figures are about [date].
    known : int
        Number of the last journal entry that may be read [count].
    """

    def __init__(self, conn: Connection, *, as_of: date, known: int) -> None:
        self.conn = conn
        self.as_of = as_of
        self.known = known
        self._read: dict[type[models.Base], Columns] = {}

    @classmethod
    def at(cls, conn: Connection, *, as_of: date, known_at: datetime | None = None) -> Reader:
        """Make a reader for what was known at a moment.

        Parameters
        ----------
        conn : sqlalchemy.Connection
            An open connection [-].
        as_of : date
            The day the figures are about [date].
        known_at : datetime, optional
            The moment in UTC; everything on record where absent [date].

        Returns
        -------
        Reader
        """
        known = journal.head(conn).no if known_at is None else journal.number_at(conn, known_at)
        return cls(conn, as_of=as_of, known=known)

    def rows(self, model: type[models.Base]) -> Columns:
        """Give the rows in force of a table, column by column; of register tables those of the as-of date.

        Parameters
        ----------
        model : type
            The table [-].

        Returns
        -------
        Columns
            Shared by all who ask: to be read, not changed.
        """
        if model not in self._read:
            self._read[model] = facts.columns(self.conn, model, known=self.known, as_of=self.as_of)
        return self._read[model]

    def successors(self, model: type[models.Base]) -> dict[int, int]:
        """Tell for every replaced row of a table which row stands for it at this moment.

        Parameters
        ----------
        model : type
            The table [-].

        Returns
        -------
        dict of int to int
            Key of the replaced row to the key of the last of its line.
        """
        return facts.successors(self.conn, model, known=self.known)

    def head(self) -> str:
        """Give the hash of the last journal entry that may be read.

        Returns
        -------
        str
            Before the first entry the hash that entry 1 follows.
        """
        if self.known == 0:
            return FIRST_PREVIOUS
        last = journal.head(self.conn)
        if last.no == self.known:
            return last.hash
        (entry,) = journal.entries(self.conn, numbers=[self.known])
        return str(entry["hash"])
