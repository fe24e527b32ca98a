"""The folder of the demo: what it holds, that its record repeats its lists, and that nothing is built over it."""

from __future__ import annotations

from collections import Counter
from pathlib import Path
from typing import Any

from installed import document, fleet
from listed import compare_list

AS_OF = ("--as-of", "2026-12-01")
FILES = {
    "README.md",
    "brackwater_register.xlsx",
    "surveys",
    "derating.xlsx",
    "derating.json",
    "list.txt",
    "due.txt",
    "gaps.txt",
    "thin.txt",
    "fleet.db",
}


def test_the_folder_holds_what_was_promised_and_nothing_else(brackwater: Path, demo_run: Any) -> None:
    assert {path.name for path in brackwater.iterdir()} == FILES
    for name in FILES:
        assert f"  {name} " in demo_run.stdout


def test_things_were_entered_in_the_order_in_which_they_happened(brackwater: Path) -> None:
    entries = document("journal", "show", db=brackwater / "fleet.db")
    tasks = Counter(entry["task"] for entry in entries)
    assert (entries[0]["task"], entries[-1]["task"]) == ("register load", "appraise")
    assert {"register load", "survey load", "restart add", "state set", "decide", "appraise"} == set(tasks)
    files = [entry["why"] for entry in entries if entry["task"] == "survey load"]
    assert files == sorted(files)


def test_the_record_as_it_was_known_then_repeats_the_lists(brackwater: Path, tmp_path: Path) -> None:
    db = brackwater / "fleet.db"
    entries = document("journal", "show", db=db)
    asked = (*AS_OF, "--known-at", next(one["at"] for one in reversed(entries) if one["task"] != "appraise"))
    for command in ("due", "gaps"):
        told = fleet(command, *asked, db=db).stdout
        assert told == (brackwater / f"{command}.txt").read_text(encoding="utf-8")
    assert fleet("appraise", *asked, db=db).stdout == (brackwater / "list.txt").read_text(encoding="utf-8")
    listed = fleet("derating", "-o", tmp_path / "list.xlsx", "--json", *asked, db=db)
    assert listed.stdout == (brackwater / "derating.json").read_text(encoding="utf-8")
    compare_list(tmp_path / "list.xlsx", document("derating", *asked, db=db), count=34)


def test_nothing_is_built_over_an_existing_demo(brackwater: Path) -> None:
    before = (brackwater / "fleet.db").read_bytes()
    again = fleet("demo", brackwater)
    assert again.returncode == 1
    assert "fleet demo FOLDER" in again.stderr
    assert (brackwater / "fleet.db").read_bytes() == before
    assert {path.name for path in brackwater.iterdir()} == FILES
