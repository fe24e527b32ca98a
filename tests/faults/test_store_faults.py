"""What goes wrong around a database: other writers, a kill, a lock, a full disk, damaged and foreign files."""

from __future__ import annotations

import contextlib
import datetime as dt
import os
import shutil
import signal
import sqlite3
import subprocess
import sys
import tempfile
import time
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import pytest
from sqlalchemy import Engine, event

from fleet import errors
from fleet.store import facts, journal, migrate
from fleet.store.engine import make_engine
from fleet.store.models import Reading, Setting

Fill = Callable[[Engine], dict[str, int]]
SETTING = {"key": "floor", "value": "0.025 mm/year", "from_on": dt.date(2020, 1, 2)}

WRITING = """
import datetime, sys
from fleet.store import journal
from fleet.store.engine import make_engine
from fleet.store.models import Setting
engine = make_engine(sys.argv[1])
row = {"key": "floor", "value": sys.argv[2], "from_on": datetime.date(2020, 1, 2)}
for _ in range(int(sys.argv[3])):
    with journal.writer(engine, task="setting set", by=sys.argv[2]) as entry:
        entry.add(Setting, [row, row])
"""

HANGING = """
import datetime, sys, time
from fleet.store import journal
from fleet.store.engine import make_engine
from fleet.store.models import Setting
engine = make_engine(sys.argv[1])
row = {"key": "floor", "value": "x" * 100, "from_on": datetime.date(2020, 1, 2)}
with journal.writer(engine, task="setting set", by="A. Keel") as entry:
    entry.add(Setting, [row] * 60000)
    print("written", flush=True)
    time.sleep(120)
"""


def _python(script: str, *words: str) -> subprocess.Popen[str]:
    return subprocess.Popen([sys.executable, "-c", script, *words], stdout=subprocess.PIPE, text=True)


@contextlib.contextmanager
def _as_nobody() -> Iterator[None]:
    """Give up the rights of root, who may write everywhere, for a while."""
    if os.geteuid() != 0:
        yield
        return
    os.seteuid(65534)
    try:
        yield
    finally:
        os.seteuid(0)


def _write(engine: Engine) -> None:
    with journal.writer(engine, task="setting set", by="A. Keel") as entry:
        entry.add(Setting, [SETTING])


def _whole(engine: Engine) -> int:
    with engine.connect() as conn:
        assert journal.verify(conn) == []
        return journal.head(conn).no


def test_two_writers_at_once_make_one_chain(address: str, engine: Engine) -> None:
    with (
        _python(WRITING, address, "A. Keel", "10") as one,
        _python(WRITING, address, "B. Stern", "10") as two,
    ):
        assert [each.wait(timeout=120) for each in (one, two)] == [0, 0]
    assert _whole(engine) == 20
    with engine.connect() as conn:
        rows = journal.entries(conn)
        assert len(facts.columns(conn, Setting, known=20)["id"]) == 40
    assert sorted(row["by"] for row in rows) == ["A. Keel"] * 10 + ["B. Stern"] * 10
    assert len({row["previous_hash"] for row in rows}) == 20
    assert [row["at"] for row in rows] == sorted(row["at"] for row in rows)


def test_a_kill_in_the_middle_leaves_no_half_entry(address: str, engine: Engine, fill: Fill) -> None:
    fill(engine)
    with engine.connect() as conn:
        before = len(facts.columns(conn, Setting, known=99)["id"])
    with _python(HANGING, address) as process:
        assert process.stdout is not None
        assert process.stdout.readline() == "written\n"
        process.send_signal(signal.SIGKILL)
        process.wait(timeout=30)
    if engine.dialect.name == "sqlite":
        assert Path(f"{address}-journal").exists(), "the kill came while pages were being written"
    assert _whole(engine) == 3
    _write(engine)
    assert _whole(engine) == 4
    with engine.connect() as conn:
        assert len(facts.columns(conn, Setting, known=99)["id"]) == before + 1


def test_a_locked_database_says_so_after_the_timeout(address: str, engine: Engine) -> None:
    hurried = make_engine(address, timeout_s=0.3)
    with journal.writer(engine, task="setting set", by="A. Keel") as entry:
        entry.add(Setting, [SETTING])
        start = time.monotonic()
        with pytest.raises(errors.DatabaseProblem, match="somebody else is writing") as caught:
            _write(hurried)
        assert 0.2 < time.monotonic() - start < 10
    assert "try again; nothing was recorded" in str(caught.value)
    assert caught.value.exit_code == 3
    assert _whole(engine) == 1
    _write(hurried)
    assert _whole(engine) == 2


def test_a_reader_that_will_not_go_does_not_spoil_the_entry(address: str, engine: Engine) -> None:
    hurried = make_engine(address, timeout_s=0.3)
    if engine.dialect.name != "sqlite":
        pytest.skip("PostgreSQL's readers hold up nobody")
    with engine.connect() as reader:
        assert journal.head(reader).no == 0
        with pytest.raises(errors.DatabaseProblem, match="somebody else is writing"):
            _write(hurried)
    assert _whole(engine) == 0
    _write(hurried)
    assert _whole(engine) == 1


def test_a_lock_that_is_freed_in_time_does_no_harm(address: str, engine: Engine) -> None:
    with _python(WRITING, address, "B. Stern", "3") as process:
        for _ in range(3):
            _write(engine)
        assert process.wait(timeout=60) == 0
    assert _whole(engine) == 6


@pytest.fixture
def file(sqlite_template: Path, tmp_path: Path, fill: Fill) -> Path:
    """Give an SQLite file with facts in it."""
    path = Path(shutil.copy(sqlite_template, tmp_path / "fleet.db"))
    fill(make_engine(path))
    return path


def test_a_file_that_is_no_database_is_left_alone(tmp_path: Path) -> None:
    path = tmp_path / "fleet.db"
    path.write_text("Wall thickness survey, north side\n" * 100)
    before = path.read_bytes()
    engine = make_engine(path)
    for use in (migrate.current, migrate.new_database, migrate.upgrade, _write, _whole):
        with pytest.raises(
            errors.DatabaseProblem, match="the file is not a database of fleet; check the path"
        ):
            use(engine)
    assert path.read_bytes() == before


def test_a_database_of_something_else_is_refused(tmp_path: Path) -> None:
    path = tmp_path / "other.db"
    raw = sqlite3.connect(path)
    raw.execute("CREATE TABLE songs (title)")
    raw.close()
    engine = make_engine(path)
    with pytest.raises(errors.DatabaseProblem, match="it holds no record of fleet"):
        migrate.require_current(engine)
    with pytest.raises(errors.Refused, match="it holds something already"):
        migrate.new_database(engine)
    with pytest.raises(errors.DatabaseProblem, match="lacks a table"):
        _write(engine)


def test_an_empty_file_is_refused_until_it_is_made(tmp_path: Path) -> None:
    path = tmp_path / "fleet.db"
    path.touch()
    with pytest.raises(errors.DatabaseProblem, match="it holds no record of fleet"):
        migrate.require_current(make_engine(path))
    migrate.new_database(make_engine(path))
    assert _whole(make_engine(path)) == 0


@pytest.mark.parametrize("part", [0.02, 0.3, 0.6, 0.95])
def test_a_truncated_file_is_told_and_not_passed_over(file: Path, part: float) -> None:
    size = file.stat().st_size
    os.truncate(file, int(size * part))
    engine = make_engine(file)
    with pytest.raises(errors.DatabaseProblem, match=r"damaged|not a database") as caught:
        _whole(engine)
    assert "backup" in caught.value.remedy or "check the path" in caught.value.remedy


def test_damage_met_while_fetching_is_told_in_the_same_words(file: Path) -> None:
    engine = make_engine(file)
    with journal.writer(engine, task="survey load", by="B. Stern") as entry:
        row = {"location_id": 3, "taken_on": SETTING["from_on"], "thickness_mm": 9.0, "result": "read"}
        entry.add(Reading, [{**row, "kind": "reading", "status": "accepted", "note": "n" * 50}] * 30_000)
    with engine.connect() as conn:
        page = conn.exec_driver_sql("PRAGMA page_size").scalar_one()
    with file.open("r+b") as raw:
        raw.seek(-200 * page, os.SEEK_END)
        raw.write(b"\xff" * 100 * page)
    with (
        pytest.raises(errors.DatabaseProblem, match="damaged; keep the damaged file"),
        engine.connect() as conn,
    ):
        facts.columns(conn, Reading, known=9)


def test_a_full_disk_leaves_the_record_as_it_was(file: Path) -> None:
    """SQLite is told that the file may not grow: it says the same as on a full disk."""
    engine = make_engine(file)
    row = {**SETTING, "value": "x" * 1000}

    @event.listens_for(engine, "connect")
    def _small(raw: Any, _: Any) -> None:
        pages = raw.execute("PRAGMA page_count").fetchone()[0]
        raw.execute(f"PRAGMA max_page_count = {pages + 5}")

    with (
        pytest.raises(errors.DatabaseProblem, match="no room left on its disk; make room") as caught,
        journal.writer(engine, task="setting set", by="A. Keel") as entry,
    ):
        entry.add(Setting, [row] * 500)
    assert caught.value.exit_code == 3
    assert _whole(make_engine(file)) == 3
    _write(engine)
    assert _whole(engine) == 4


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="needs /dev/full")
def test_a_place_that_takes_no_database_is_told() -> None:
    with pytest.raises(errors.DatabaseProblem, match=r".+"):
        migrate.new_database(make_engine("/dev/full"))


def test_a_file_that_may_only_be_read_can_be_read(file: Path) -> None:
    for folder in (file.parent, *file.parent.parents):
        if folder.stat().st_uid == os.getuid() and folder.is_relative_to(tempfile.gettempdir()):
            folder.chmod(folder.stat().st_mode | 0o055)
    file.chmod(0o444)
    file.parent.chmod(0o555)
    try:
        with _as_nobody():
            engine = make_engine(file)
            migrate.require_current(engine)
            assert _whole(engine) == 3
            with pytest.raises(
                errors.DatabaseProblem, match="it may only be read, not written; ask for"
            ) as caught:
                _write(engine)
            assert caught.value.exit_code == 3
    finally:
        file.parent.chmod(0o755)
    assert _whole(make_engine(file)) == 3


def test_a_folder_that_may_not_be_written_takes_no_entry(file: Path) -> None:
    """The file itself may be written, but SQLite needs a journal beside it."""
    for folder in (file.parent, *file.parent.parents):
        if folder.stat().st_uid == os.getuid() and folder.is_relative_to(tempfile.gettempdir()):
            folder.chmod(folder.stat().st_mode | 0o055)
    file.chmod(0o666)
    file.parent.chmod(0o555)
    try:
        with _as_nobody():
            engine = make_engine(file)
            assert _whole(engine) == 3
            with pytest.raises(errors.DatabaseProblem, match=r"only be read|cannot be opened"):
                _write(engine)
    finally:
        file.parent.chmod(0o755)
    assert _whole(make_engine(file)) == 3
