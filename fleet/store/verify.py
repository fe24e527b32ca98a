"""Check of the journal: whether the chain is whole, and every row still says what its entry wrote."""

from __future__ import annotations

import hashlib
import json
from collections.abc import Mapping
from dataclasses import dataclass
from itertools import islice
from typing import Any

from sqlalchemy import Boolean, Connection, Table, select

from fleet.store.canonical import entry_hash, line, mark, plain
from fleet.store.engine import hold, raw_rows
from fleet.store.models import FACTS, Journal, JournalHead, table_of
from fleet.store.record import FIRST_PREVIOUS

LEAST_DIGITS = 12
"""How many digits of a printed head are needed to look for it [count]."""

_NAMED = 200  # of one kind and table no more rows than this are named or compared with each other


@dataclass(frozen=True)
class Finding:
    """One thing that is wrong with the record.

    Parameters
    ----------
    what : {'altered', 'dropped', 'swapped', 'added'}
        What was done [text].
    entry : int or None
        Number of the journal entry [count].
    table : str
        The table, `journal` for an entry itself [text].
    row : int or None
        Key of the row, None where it cannot be told [count].
    text : str
        A sentence for the reader [text].
    """

    what: str
    entry: int | None
    table: str
    row: int | None
    text: str


def verify(conn: Connection, *, against: str | None = None) -> list[Finding]:
    """Check the chain of entries and every fact against it.

    Parameters
    ----------
    conn : sqlalchemy.Connection
        An open connection [-].
    against : str, optional
        A head printed earlier, at least its first 12 digits: it must be in the chain [text].

    Returns
    -------
    list of Finding
        Empty when all is as it was written.

    Notes
    -----
    Somebody who alters the record and reckons every digest anew leaves a chain that is whole in itself; only
    a head printed before that, given as `against`, shows it.
    """
    hold(conn)
    chain = [dict(row) for row in conn.execute(select(table_of(Journal)).order_by("no")).mappings()]
    findings = _chain(chain)
    findings += _head(conn, chain)
    if against is not None:
        findings += _against(chain, against)
    return findings + _facts(conn, chain)


def _chain(chain: list[dict[str, Any]]) -> list[Finding]:
    found: list[Finding] = []
    numbers = {row["hash"]: row["no"] for row in chain}
    expected, previous = 1, FIRST_PREVIOUS
    for row in chain:
        no = row["no"]
        found.extend(
            Finding("dropped", missing, "journal", missing, f"entry {missing} is missing")
            for missing in range(expected, no)
        )
        if entry_hash(row) != row["hash"]:
            found.append(_altered_entry(row, numbers))
        elif row["previous_hash"] != previous and no == expected:
            found.append(
                Finding(
                    "altered",
                    no,
                    "journal",
                    no,
                    f"entry {no} does not follow the entry {no - 1} that stands here",
                )
            )
        expected, previous = no + 1, row["hash"]
    return found


def _altered_entry(row: Mapping[str, Any], numbers: Mapping[str, int]) -> Finding:
    """Tell a swapped entry from an altered one: its hash fits under another number."""
    no = row["no"]
    before = 0 if row["previous_hash"] == FIRST_PREVIOUS else numbers.get(row["previous_hash"])
    for was in {no - 1, no + 1} | ({before + 1} if before is not None else set()):
        if was != no and entry_hash({**row, "no": was}) == row["hash"]:
            return Finding("swapped", no, "journal", no, f"entry {no} was written as entry {was}")
    # Swapped among themselves, two entries may each also follow the other: look at every number.
    for was in numbers.values():
        if was != no and entry_hash({**row, "no": was}) == row["hash"]:
            return Finding("swapped", no, "journal", no, f"entry {no} was written as entry {was}")
    return Finding("altered", no, "journal", no, f"entry {no} does not say what it said when it was written")


def _head(conn: Connection, chain: list[dict[str, Any]]) -> list[Finding]:
    heads = conn.execute(select(table_of(JournalHead))).mappings().all()
    last_no, last_hash = (chain[-1]["no"], chain[-1]["hash"]) if chain else (0, FIRST_PREVIOUS)
    if len(heads) != 1:
        return [
            Finding("dropped", None, "journal_head", None, f"the head has {len(heads)} rows instead of one")
        ]
    no, digest = heads[0]["no"], heads[0]["hash"]
    if no > last_no:
        return [
            Finding("dropped", missing, "journal", missing, f"entry {missing} is missing from the end")
            for missing in range(last_no + 1, no + 1)
        ]
    if (no, digest) != (last_no, last_hash):
        return [
            Finding(
                "altered", last_no, "journal_head", 1, f"the head names entry {no}, the last is {last_no}"
            )
        ]
    return []


def _against(chain: list[dict[str, Any]], against: str) -> list[Finding]:
    wanted = against.strip().lower()
    known = [FIRST_PREVIOUS, *(row["hash"] for row in chain)]
    if len(wanted) >= LEAST_DIGITS and any(digest.startswith(wanted) for digest in known):
        return []
    what = "is not in the chain: an entry was dropped or altered since it was printed"
    if len(wanted) < LEAST_DIGITS:
        what = f"is too short to look for; give at least {LEAST_DIGITS} digits"
    return [Finding("dropped", None, "journal", None, f"the head {wanted} {what}")]


class _Ledger:
    """What the entries say they wrote, and what is found."""

    def __init__(self, chain: list[dict[str, Any]]) -> None:
        self.digests: dict[Any, Any] = {row["no"]: hashlib.sha256() for row in chain}
        self.stored = {row["no"]: row["facts_digest"] for row in chain}
        self.wrote: dict[int, dict[str, tuple[int, int]]] = {}
        self.unreadable: set[int] = set()
        for row in chain:
            try:
                ranges = {name: (int(a), int(b)) for name, (a, b) in json.loads(row["wrote"]).items()}
            except (TypeError, ValueError, AttributeError):
                ranges = {}
                self.unreadable.add(row["no"])
            self.wrote[row["no"]] = ranges
        self.findings: list[Finding] = []

    def owner(self, table: str, row_id: int) -> int | None:
        """Tell which entry says that it wrote a row."""
        for no, ranges in self.wrote.items():
            first, last = ranges.get(table, (1, 0))
            if first <= row_id <= last:
                return no
        return None

    def tell(self, what: str, entry: int | None, table: str, row: int | None, words: str) -> None:
        self.findings.append(Finding(what, entry, table, row, words))


def _facts(conn: Connection, chain: list[dict[str, Any]]) -> list[Finding]:
    ledger = _Ledger(chain)
    for model in sorted(FACTS, key=lambda each: table_of(each).name):
        _table(conn, table_of(model), ledger)
    named = {finding.entry for finding in ledger.findings} | ledger.unreadable
    for no, total in ledger.digests.items():
        if total.hexdigest() != ledger.stored[no] and no not in named:
            tables = ", ".join(sorted(ledger.wrote[no])) or "no table"
            ledger.tell(
                "altered", no, tables, None, f"the rows of entry {no} ({tables}) are not what it wrote"
            )
    return ledger.findings


def _table(conn: Connection, table: Table, ledger: _Ledger) -> None:
    name = table.name
    names = [column.name for column in table.columns]
    booleans = frozenset(column.name for column in table.columns if isinstance(column.type, Boolean))
    seen: dict[int, set[int]] = {no: set() for no, ranges in ledger.wrote.items() if name in ranges}
    altered: list[tuple[dict[str, Any], int]] = []
    strangers: dict[Any, list[int]] = {}
    for lot in raw_rows(conn, select(table).order_by(table.c.id)):
        for raw in lot:
            values = plain(dict(zip(names, raw, strict=True)), booleans)
            row_id, entry_no = values["id"], values["entry_no"]
            canonical = line(name, values)
            first, last = ledger.wrote.get(entry_no, {}).get(name, (1, 0))
            if first <= row_id <= last:
                ledger.digests[entry_no].update(canonical)
                seen[entry_no].add(row_id)
                if mark(canonical) != values["mark"]:
                    altered.append((values, entry_no))
            elif (owner := ledger.owner(name, row_id)) is not None:
                seen[owner].add(row_id)
                altered.append((values, owner))
            elif entry_no not in ledger.unreadable:
                strangers.setdefault(entry_no, []).append(row_id)
    _name_altered(name, altered, ledger)
    for entry_no, rows in strangers.items():
        _name_strangers(name, entry_no, rows, ledger)
    for no, rows_seen in seen.items():
        first, last = ledger.wrote[no][name]
        gone = (row for row in range(first, last + 1) if row not in rows_seen)
        for row in islice(gone, _NAMED):
            ledger.tell("dropped", no, name, row, f"{name} row {row} of entry {no} is missing")


def _name_strangers(name: str, entry_no: Any, rows: list[int], ledger: _Ledger) -> None:
    """Name rows that no entry wrote; of an entry that the journal lacks, all of them at once."""
    if entry_no in ledger.stored:
        for row in rows[:_NAMED]:
            ledger.tell("added", entry_no, name, row, f"{name} row {row} was written by no entry")
    else:
        words = f"{len(rows)} rows of {name}, the first {rows[0]}, name entry {entry_no}, which is not there"
        ledger.tell("added", entry_no, name, rows[0], words)


def _name_altered(name: str, altered: list[tuple[dict[str, Any], int]], ledger: _Ledger) -> None:
    """Name altered rows; of few, tell whether one stands in another's place."""
    few = altered if len(altered) <= _NAMED else []
    for values, entry_no in altered:
        row_id = values["id"]
        for other, _ in few:
            moved = mark(line(name, {**values, "id": other["id"], "entry_no": other["entry_no"]}))
            same_entry = mark(line(name, {**values, "id": other["id"]}))
            if other is not values and {moved, same_entry} & {other["mark"], values["mark"]}:
                ledger.tell(
                    "swapped",
                    entry_no,
                    name,
                    row_id,
                    f"{name} row {row_id} of entry {entry_no} was written as row {other['id']}",
                )
                break
        else:
            words = f"{name} row {row_id} of entry {entry_no} does not say what it said when it was written"
            ledger.tell("altered", entry_no, name, row_id, words)
