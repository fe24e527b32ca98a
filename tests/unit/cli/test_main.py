"""The first screen, the help, the exit codes, and that stdout holds exactly what was promised."""

from __future__ import annotations

import json
import subprocess
import sys
from collections.abc import Callable, Iterator
from datetime import UTC, date, datetime
from pathlib import Path
from typing import Any

import pytest
import typer
from commands import Ended
from small_works import SURVEYS, write, write_register

from fleet import __version__, errors
from fleet.cli import main, options
from fleet.tasks import appraisals
from fleet.words import CAUTION

Run = Callable[..., Ended]


def commands() -> Iterator[tuple[str, ...]]:
    """Name every command of the command line."""
    for command in main.app.registered_commands:
        yield (str(command.name),)
    for group in main.app.registered_groups:
        assert group.typer_instance is not None
        name = str(group.typer_instance.info.name)
        for command in group.typer_instance.registered_commands:
            yield name, str(command.name)


@pytest.mark.parametrize("words", [(), ("--help",)], ids=["alone", "help"])
def test_the_first_screen_carries_the_caution(fleet: Run, words: tuple[str, ...]) -> None:
    ended = fleet(*words)
    assert ended.code == 0
    assert " ".join(CAUTION.split()) in " ".join(ended.out.split())


def test_the_version_is_told(fleet: Run) -> None:
    assert fleet("--version").out == f"{__version__}\n"


@pytest.mark.parametrize("words", [*commands()], ids=" ".join)
def test_every_command_has_help_with_an_example_of_itself(fleet: Run, words: tuple[str, ...]) -> None:
    ended = fleet(*words, "--help")
    assert ended.code == 0
    assert f"Example:  fleet {' '.join(words)}" in ended.out


@pytest.mark.parametrize("group", ["register", "survey", "db", "journal", "rules"])
def test_every_group_has_help_with_an_example(fleet: Run, group: str) -> None:
    assert f"Example:  fleet {group} " in fleet(group, "--help").out


def test_every_figure_has_the_options_of_its_contract(fleet: Run) -> None:
    for command in ("show", "appraise", "due", "gaps", "derating"):
        told = fleet(command, "--help").out
        for option in ("--db", "--json", "--as-of", "--known-at"):
            assert option in told, (command, option)
        assert "--units" in told, command
        assert ("--carry-to" in told) is (command in {"show", "appraise"})


@pytest.mark.parametrize(
    ("problem", "code"),
    [
        (errors.Refused("a", "b", "c"), 1),
        (errors.UnknownTag("a", "b", "c"), 1),
        (errors.FileRefused("a", "b", "c"), 1),
        (errors.CheckFailed("a", "b", "c"), 1),
        (errors.UsageProblem("a", "b", "c"), 2),
        (errors.DatabaseProblem("a", "b", "c"), 3),
        (errors.RecordIsClosed("a", "b", "c"), 3),
        (errors.OurFault("a", "b", "c"), 70),
        (OSError(28, "No space left on device", "list.xlsx"), 1),
        (ZeroDivisionError("division by zero"), 70),
        (ValueError(), 70),
    ],
    ids=lambda value: type(value).__name__,
)
@pytest.mark.parametrize("as_json", [False, True], ids=["text", "json"])
def test_every_error_ends_in_three_parts_and_its_code(
    fleet: Run,
    empty: Path,
    monkeypatch: pytest.MonkeyPatch,
    problem: Exception,
    code: int,
    as_json: bool,
) -> None:
    def fail(*_: Any, **__: Any) -> None:
        raise problem

    monkeypatch.setattr(appraisals, "show_vessel", fail)
    ended = fleet("show", "V-1", *(["--json"] if as_json else []))
    assert ended.code == code
    first, second, third = ended.err.splitlines()[:3]
    assert first.startswith("fleet: ")
    assert second.startswith("  found: ")
    assert third.startswith("  to do: ")
    assert "Traceback" not in ended.err
    if as_json:
        assert set(json.loads(ended.out)["error"]) == {"error", "where", "found", "remedy"}
    else:
        assert ended.out == ""


def test_a_traceback_is_shown_only_to_who_asks(
    fleet: Run, empty: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def fail(*_: Any, **__: Any) -> None:
        raise ZeroDivisionError("division by zero")

    monkeypatch.setattr(appraisals, "show_vessel", fail)
    monkeypatch.setenv("FLEET_DEBUG", "1")
    with pytest.raises(ZeroDivisionError, match="division by zero"):
        main.run(["show", "V-1"])


def test_a_reader_that_leaves_early_hears_nothing_more() -> None:
    code = "import sys, fleet.cli.main as m; m.run(['rules', 'show', 'api510'])"
    with subprocess.Popen(
        [sys.executable, "-c", code], stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True
    ) as running:
        assert running.stdout is not None
        assert running.stderr is not None
        running.stdout.close()
        assert running.stderr.read() == ""


@pytest.mark.parametrize(
    "words",
    [
        ("shew",),
        ("show",),
        ("show", "V-1", "--as-of", "tomorrow"),
        ("show", "V-1", "--as-of", "20261201"),
        ("show", "V-1", "--as-of", "2026-13-01"),
        ("show", "V-1", "--known-at", "yesterday"),
        ("show", "V-1", "--known-at", "0001-01-01T00:00:00+14:00"),
        ("show", "V-1", "--units", "metric"),
        ("due", "--until", "soon"),
        ("register", "load"),
        ("derating",),
        ("appraise", "V-1", "--save", "x"),
        ("show", "V-1", "--as-of", "2026-12-01", "--carry-to", "2026-11-01"),
    ],
    ids=" ".join,
)
def test_words_that_are_off_end_with_2(fleet: Run, empty: Path, words: tuple[str, ...]) -> None:
    ended = fleet(*words)
    assert ended.code == 2
    assert ended.out == ""
    assert ended.err


def test_a_missing_database_ends_with_3_and_says_what_to_do(fleet: Run, tmp_path: Path) -> None:
    ended = fleet("show", "V-1", "--db", tmp_path / "none.db")
    assert ended.code == 3
    assert "fleet new" in ended.err


def test_the_option_goes_before_the_environment(fleet: Run, empty: Path, tmp_path: Path) -> None:
    assert fleet("gaps").code == 0
    assert fleet("gaps", "--db", tmp_path / "none.db").code == 3


def test_text_goes_to_stdout_and_with_json_the_caution_to_stderr(fleet: Run, empty: Path) -> None:
    assert CAUTION not in fleet("appraise").err
    ended = fleet("appraise", "--json")
    assert CAUTION in ended.err
    assert json.loads(ended.out)["vessels"] == []


def test_a_document_never_holds_what_is_no_number(
    fleet: Run, empty: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    class View:
        def as_json(self) -> dict[str, float]:
            return {"mawp_today_mpa": float("nan")}

    monkeypatch.setattr(appraisals, "show_vessel", lambda *_, **__: View())
    ended = fleet("show", "V-1", "--json")
    assert ended.code == 70
    assert list(json.loads(ended.out)) == ["error"]


def test_thin_readings_are_the_first_words_and_the_refusal_comes_after(
    fleet: Run, empty: Path, tmp_path: Path
) -> None:
    assert fleet("register", "load", *write_register(tmp_path), "--by", "A. Keel").code == 0
    bad = write(
        tmp_path,
        "bad.csv",
        "vessel,part,location,taken_on,thickness [mm]\nV-101,shell,1,2026-06-03,9\nV-101,shell,7,2026-06-03,9\n",
    )
    ended = fleet("survey", "load", bad, "--by", "B. Stern")
    assert ended.code == 1
    assert ended.out.startswith("Thin: 2 readings at or below")
    assert "unknown location" in ended.err
    assert "unknown location" not in ended.out
    told = fleet("survey", "load", bad, "--json")
    assert told.code == 1
    document = json.loads(told.out)
    assert list(document) == ["loaded", "parked", "faults", "doubts", "thin"]
    assert (document["loaded"], len(document["thin"])) == (0, 2)
    parked = fleet("survey", "load", bad, "--park-bad-rows")
    assert parked.code == 0
    assert parked.out.startswith("Thin: 2 readings")
    assert "Left waiting (1)" in parked.out


def test_a_refused_register_prints_its_faults_in_the_document(
    fleet: Run, empty: Path, tmp_path: Path
) -> None:
    bad = write(
        tmp_path, "bad.csv", "vessel,rules,design_code,in_service_on\nV-1,api510,asme8-1,2005-01-01\n"
    )
    ended = fleet("register", "load", bad, "--json")
    assert ended.code == 1
    document = json.loads(ended.out)
    assert document["loaded"] == 0
    assert document["faults"][0]["code"] == "missing column"
    assert "missing column" in ended.err


def test_a_file_that_is_not_there_is_refused(fleet: Run, empty: Path, tmp_path: Path) -> None:
    for command in (("register", "load"), ("survey", "load")):
        ended = fleet(*command, tmp_path / "none.csv", "--json")
        assert ended.code == 1, ended
        assert "none.csv" in ended.err
        json.loads(ended.out)


def test_dry_run_and_loading_say_what_they_do(fleet: Run, empty: Path, tmp_path: Path) -> None:
    files = write_register(tmp_path)
    assert fleet("register", "load", *files, "--dry-run").out.startswith("Would be written: 2 vessels")
    assert fleet("register", "load", *files).out.startswith("Written: 2 vessels")
    again = fleet("register", "load", *files)
    assert again.code == 0
    assert again.out.startswith("vessels.csv was loaded before; nothing of it was changed.")
    name, text = next(iter(SURVEYS.items()))
    path = write(tmp_path, name, text)
    assert fleet("survey", "load", path).out.startswith(f"{name}: 3 readings loaded. Journal entry 2.")
    assert fleet("survey", "load", path).out == f"{name}: loaded before; nothing was changed.\n"


def test_the_journal_and_the_rules_are_shown(fleet: Run, empty: Path, tmp_path: Path) -> None:
    fleet("register", "load", *write_register(tmp_path), "--by", "A. Keel")
    assert "A. Keel  register load" in fleet("journal", "show", "V-101").out
    (entry,) = json.loads(fleet("journal", "show", "--json").out)
    assert entry["wrote"]["vessel"] == 2
    whole = json.loads(fleet("journal", "verify", "--head", entry["hash"], "--json").out)
    assert (whole["whole"], whole["journal_head"]) == (True, entry["hash"])
    assert fleet("journal", "verify", "--head", "0123456789abcdef").code == 1
    assert "clause 7.3.3; secondary" in fleet("rules", "show", "api510").out
    assert json.loads(fleet("rules", "show", "--json").out)[0]["name"] == "api510"
    assert fleet("rules", "show", "api999").code == 1


def test_save_keeps_an_appraisal_and_its_name_is_taken(fleet: Run, empty: Path, tmp_path: Path) -> None:
    fleet("register", "load", *write_register(tmp_path))
    saved = fleet("appraise", "--save", "list 2026", "--json", "--as-of", "2026-12-01")
    assert saved.code == 0
    assert "journal entry 2" in saved.err
    assert len(json.loads(saved.out)["vessels"]) == 2
    assert fleet("appraise", "--save", "list 2026").code == 1


def test_the_year_list_is_written_only_where_a_file_is_named(fleet: Run, empty: Path, tmp_path: Path) -> None:
    fleet("register", "load", *write_register(tmp_path))
    book = tmp_path / "list.xlsx"
    assert str(book) in fleet("derating", "-o", book).out
    assert book.is_file()
    listed = json.loads(fleet("derating", "--json").out)
    assert [row["vessel"] for row in listed] == ["V-101", "V-102"]
    assert fleet("derating", "-o", tmp_path / "no" / "list.xlsx").code == 1


def test_upgrade_finds_nothing_to_do(fleet: Run, empty: Path) -> None:
    assert "nothing to do" in fleet("db", "upgrade").out
    assert fleet("new").code == 1


@pytest.mark.parametrize(
    ("text", "moment"),
    [
        ("2026-12-01", datetime(2026, 12, 1, 23, 59, 59, 999999, tzinfo=UTC)),
        ("2026-12-01T08:30", datetime(2026, 12, 1, 8, 30, tzinfo=UTC)),
        ("2026-12-01 08:30:00-05:00", datetime(2026, 12, 1, 13, 30, tzinfo=UTC)),
    ],
)
def test_a_moment_is_read_in_utc(text: str, moment: datetime) -> None:
    assert options.read_moment(text) == moment


def test_a_day_has_one_form(fleet: Run) -> None:
    assert options.read_day(" 2024-02-29 ") == date(2024, 2, 29)
    for odd in ("2023-02-29", "2024-2-9", "2024-W01-1", "20240229", ""):
        with pytest.raises(typer.BadParameter, match="is not a date"):
            options.read_day(odd)


def test_nobody_is_named_when_the_machine_knows_none(monkeypatch: pytest.MonkeyPatch) -> None:
    def none() -> str:
        raise KeyError("no such user")

    monkeypatch.setattr("getpass.getuser", none)
    with pytest.raises(errors.UsageProblem, match="no name was given"):
        options.name_of("  ")
    assert options.name_of("A. Keel") == "A. Keel"


LOADED = """
import sys
from fleet.cli.main import run
try:
    run(sys.argv[1:])
except SystemExit:
    pass
print("\\n".join(sorted({name.partition(".")[0] for name in sys.modules})), file=sys.stderr)
"""
HEAVY = {"pandas", "openpyxl", "scipy", "matplotlib", "pint", "alembic", "sympy", "python_calamine"}


def loaded(*words: object) -> set[str]:
    done = subprocess.run(
        [sys.executable, "-c", LOADED, *map(str, words)], capture_output=True, text=True, check=True
    )
    return set(done.stderr.split("\n"))


def test_help_leaves_out_everything_heavy() -> None:
    assert not loaded("--help") & (HEAVY | {"numpy", "sqlalchemy", "rich"})
    assert not loaded("show", "--help") & (HEAVY | {"numpy", "sqlalchemy", "rich"})


@pytest.mark.parametrize("form", [[], ["--json"]], ids=["text", "json"])
def test_show_leaves_out_what_it_does_not_need(
    fleet: Run, empty: Path, tmp_path: Path, form: list[str]
) -> None:
    fleet("register", "load", *write_register(tmp_path))
    here = loaded("show", "V-101", "--db", empty, *form)
    assert "sqlalchemy" in here, "the command ran"
    assert not here & HEAVY
