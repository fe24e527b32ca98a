"""Who changed what, and whether the record is whole."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from typing import Any

from fleet.errors import CheckFailed
from fleet.store import Connection, Engine, facts, guard, journal, models
from fleet.store import engine as engines
from fleet.tasks.names import fetch_names
from fleet.tasks.printing import counted
from fleet.tasks.reader import Reader


def journal_entries(engine: Engine, tag: str | None = None) -> list[dict[str, Any]]:
    """Give the entries of the journal in order.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    tag : str, optional
        Only the entries that wrote about this vessel, its parts, locations or devices [text].

    Returns
    -------
    list of dict
        Number, moment, who, task, why, program version, rows written by table, hash.

    Raises
    ------
    UnknownTag
        If there is no vessel of that tag.
    """
    with engine.connect() as conn:
        numbers = None if tag is None else sorted(_entries_about(conn, tag))
        return [
            {
                "no": one["no"],
                "at": one["at"],
                "by": one["by"],
                "role": one["role"],
                "task": one["task"],
                "why": one["why"],
                "program_version": one["program_version"],
                "wrote": {table: last - first + 1 for table, (first, last) in one["wrote"].items()},
                "hash": one["hash"],
            }
            for one in journal.entries(conn, numbers=numbers)
        ]


def _entries_about(conn: Connection, tag: str) -> set[int]:
    names = fetch_names(Reader.at(conn, as_of=date.max))
    vessel = names.vessel(tag)
    entities = {vessel}
    grown = True
    while grown:
        below = {entity for entity, (_, parent, _) in names.tags.items() if parent in entities} - entities
        grown = bool(below)
        entities |= below
    return {
        row["entry_no"]
        for model in models.FACTS
        if model.ABOUT
        for entity in entities
        for row in facts.history(conn, model, entity)
    }


def journal_text(entries: list[dict[str, Any]]) -> str:
    """Set out journal entries for reading.

    Parameters
    ----------
    entries : list of dict
        As `journal_entries` gives them [-].

    Returns
    -------
    str

    Examples
    --------
    >>> entry = {"no": 1, "at": "2026-12-01T08:00:00.000000+00:00", "by": "M. Okafor", "role": None}
    >>> entry |= {"task": "register load", "why": None, "wrote": {"vessel": 2}, "hash": "5f3c"}
    >>> print(journal_text([entry]))
    1  2026-12-01 08:00:00 UTC  M. Okafor  register load
       wrote 2 vessel
       hash 5f3c
    """
    if not entries:
        return "The journal holds no such entry."
    width = len(str(entries[-1]["no"]))
    lines: list[str] = []
    for one in entries:
        who = one["by"] if not one["role"] else f"{one['by']} ({one['role']})"
        moment = one["at"][:19].replace("T", " ")
        wrote = ", ".join(f"{count} {table.replace('_', ' ')}" for table, count in one["wrote"].items())
        lines.append(f"{one['no']:>{width}}  {moment} UTC  {who}  {one['task']}")
        if one["why"]:
            lines.append(f"{'':{width}}  {one['why']}")
        lines += [f"{'':{width}}  wrote {wrote}", f"{'':{width}}  hash {one['hash']}"]
    return "\n".join(lines)


@dataclass(frozen=True)
class Verified:
    """What a check of the journal found.

    Parameters
    ----------
    place : str
        The database [text].
    no : int
        Number of the last entry [count].
    hash : str
        Its hash [text].
    findings : tuple of Finding
        What is wrong with the record [-].
    guard_missing : tuple of str
        Triggers of the guard that are not there [text].
    """

    place: str
    no: int
    hash: str
    findings: tuple[journal.Finding, ...]
    guard_missing: tuple[str, ...]

    @property
    def whole(self) -> bool:
        """Whether nothing was found."""
        return not self.findings and not self.guard_missing

    @property
    def failed(self) -> CheckFailed | None:
        """The exception to end with, where something was found."""
        if self.whole:
            return None
        count = len(self.findings) + len(self.guard_missing)
        return CheckFailed(
            self.place,
            f"the check of the journal found {counted(count, 'thing')}",
            "keep the file as it is and compare it with the last backup",
        )

    def as_json(self) -> dict[str, Any]:
        """Give the document for ``--json``."""
        return {
            "whole": self.whole,
            "entries": self.no,
            "journal_head": self.hash,
            "findings": [
                {
                    "what": one.what,
                    "entry": one.entry,
                    "table": one.table,
                    "row": one.row,
                    "found": one.text,
                }
                for one in self.findings
            ],
            "guard_missing": list(self.guard_missing),
        }

    def text(self) -> str:
        """Set it out for reading."""
        head = f"entry {self.no}, head {self.hash}"
        if self.whole:
            return f"{self.place}: the journal is whole: {head}"
        lines = [f"{self.place}: the journal is not whole: {head}"]
        lines += [f"  {one.text}" for one in self.findings]
        lines += [f"  the guard lacks {one}" for one in self.guard_missing]
        return "\n".join(lines)


def verify_journal(engine: Engine, *, against: str | None = None) -> Verified:
    """Check that no entry and no fact was altered, dropped, swapped or added.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    against : str, optional
        A head printed earlier: it must be in the chain [text].

    Returns
    -------
    Verified
    """
    with engine.connect() as conn:
        head = journal.head(conn)
        findings = tuple(journal.verify(conn, against=against))
        return Verified(engines.place(engine), head.no, head.hash, findings, tuple(guard.missing(conn)))
