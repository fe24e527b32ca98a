"""The invented Brackwater Works: build its record in the order in which things happened, then appraise it."""

from __future__ import annotations

import json
import shutil
import tempfile
import tomllib
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from datetime import date
from pathlib import Path
from typing import Any

from fleet.errors import Refused
from fleet.store import Engine
from fleet.store.places import data_folder
from fleet.tasks import events
from fleet.tasks.appraisals import Appraised, appraise_fleet, save_appraisal
from fleet.tasks.database import new_database, open_database
from fleet.tasks.register import load_register
from fleet.tasks.surveys import load_surveys, thin_text
from fleet.tasks.yearly import write_yearly_list

AS_OF = date(2026, 12, 1)
"""The day on which the demo is appraised; it never moves [date]."""

BY = "fleet demo"
SAVED_AS = "list 2026"
REGISTER = "brackwater_register.xlsx"
DATABASE = "fleet.db"

FILES: dict[str, str] = {
    "README.md": "the story of the works, trouble by trouble",
    REGISTER: "the register as it was loaded",
    "surveys": "the survey files as technicians handed them in",
    "derating.xlsx": "the yearly list for management",
    "derating.json": "the same as data",
    "list.txt": "every vessel, block by block",
    "due.txt": "what to inspect when",
    "gaps.txt": "what was never measured or recorded",
    "thin.txt": "the thin readings, as each survey told them when it was loaded",
    DATABASE: "the record itself",
}
"""What stands in the folder afterwards, the database last: it is put there when all else is done."""


@dataclass(frozen=True)
class Built:
    """What the demo built.

    Parameters
    ----------
    text : str
        What is printed [text].
    document : dict
        The document of ``--json`` [-].
    """

    text: str
    document: dict[str, Any]


def build_demo(folder: Path, *, units: str, progress: Callable[[str], None]) -> Built:
    """Build the demo in a folder.

    Parameters
    ----------
    folder : pathlib.Path
        Where; it is made where it is not there [text].
    units : {'si', 'us'}
        Units of what is printed [text].
    progress : callable
        Told what is being done [-].

    Returns
    -------
    Built

    Raises
    ------
    Refused
        If the folder holds one of the demo's files already.
    """
    there = [name for name in FILES if (folder / name).exists()]
    if there:
        raise Refused(str(folder), f"it holds {there[-1]} already", "name another folder: fleet demo FOLDER")
    folder.mkdir(parents=True, exist_ok=True)
    with tempfile.TemporaryDirectory(prefix=".building-", dir=folder) as name:
        work = Path(name)
        appraised = _build(work, units=units, progress=progress)
        for file in FILES:
            (work / file).replace(folder / file)
    return Built(_text(appraised, folder, units), _document(appraised, folder))


def _build(work: Path, *, units: str, progress: Callable[[str], None]) -> Appraised:
    source = data_folder("sample_data")
    for name in (REGISTER, "README.md"):
        shutil.copyfile(source / name, work / name)
    shutil.copytree(source / "surveys", work / "surveys")
    new_database(work / DATABASE)
    engine = open_database(work / DATABASE)
    progress("Loading the register ...")
    loaded = load_register(engine, [work / REGISTER], by=BY, today=AS_OF)
    if loaded.refused is not None:
        raise loaded.refused
    steps = list(_history(work, source / "events.toml"))
    progress(f"Loading {len(steps)} surveys and events ...")
    told: list[str] = []
    for _, step in steps:
        told += step(engine, units)
    progress("Appraising, writing the lists ...")
    appraised = appraise_fleet(engine, as_of=AS_OF)
    save_appraisal(engine, appraised, name=SAVED_AS, by=BY)
    _write_lists(appraised, work, units, told)
    return appraised


Step = Callable[[Engine, str], list[str]]


def _history(work: Path, events_file: Path) -> Iterator[tuple[tuple[date, int], Step]]:
    """Give surveys and events in the order in which they were entered, an event before a file of the same day."""
    entered = tomllib.loads(events_file.read_text(encoding="utf-8"))
    steps: list[tuple[tuple[date, int], Step]] = [
        ((event.pop("entered_on"), 0), _event(kind, event))
        for kind, rows in entered.items()
        for event in rows
    ]
    steps += [
        ((date.fromisoformat(path.name[:10]), 1), _survey(path))
        for path in sorted((work / "surveys").iterdir())
    ]
    yield from sorted(steps, key=lambda step: step[0])


def _event(kind: str, event: dict[str, Any]) -> Step:
    from fleet.units import parse_quantity

    def enter(engine: Engine, _: str) -> list[str]:
        if kind == "restart":
            events.add_restart(engine, by=BY, **event)
        elif kind == "dated_state":
            events.set_state(engine, by=BY, **event)
        else:
            written: dict[str, str] = {}
            for given, quantity, field in (
                ("pressure", "pressure", "pressure_mpa"),
                ("rate", "rate", "rate_mm_per_year"),
            ):
                if given in event:
                    written[given] = event.pop(given)
                    event[field] = parse_quantity(written[given], quantity).value
            events.add_decision(engine, by=BY, written=written, **event)
        return []

    return enter


def _survey(path: Path) -> Step:
    def load(engine: Engine, units: str) -> list[str]:
        loaded = load_surveys(engine, [path], by=BY, today=date.fromisoformat(path.name[:10]))
        if loaded.refused is not None:
            raise loaded.refused
        return [f"{path.name}\n{thin_text(loaded.thin, units)}"] if loaded.thin else []

    return load


def _write_lists(appraised: Appraised, work: Path, units: str, told: list[str]) -> None:
    from fleet.reports import jsonout, text
    from fleet.units import display

    appraisal, shown = appraised.appraisal, display(units)
    write_yearly_list(appraised, work / "derating.xlsx", units=units)
    lists = {
        "derating.json": json.dumps(jsonout.derating(appraisal), allow_nan=False, indent=2) + "\n",
        "list.txt": text.appraise(appraisal, shown),
        "due.txt": text.due(appraisal),
        "gaps.txt": text.gaps(appraisal, appraised.waiting),
        "thin.txt": "\n\n".join(told) + "\n",
    }
    for name, content in lists.items():
        (work / name).write_text(content, encoding="utf-8")


def _text(appraised: Appraised, folder: Path, units: str) -> str:
    from fleet.reports import text
    from fleet.units import display

    appraisal, shown = appraised.appraisal, display(units)
    database = folder / DATABASE
    worst = next(view.vessel for view in sorted(appraisal.views(), key=_worst_first))
    files = "\n".join(f"  {name:<{max(map(len, FILES))}}  {what}" for name, what in FILES.items())
    return (
        f"Brackwater Works, an invented works, as of {AS_OF.isoformat()}\n\n"
        f"{text.the_story(appraisal, shown)}\n"
        f"{text.the_list(appraisal, shown)}\n"
        f"In {folder}:\n{files}\n\n"
        f"Journal head {appraisal.journal_head}\n\n"
        f"Next:  fleet show {worst} --db {database} --as-of {AS_OF.isoformat()}"
    )


def _worst_first(view: Any) -> tuple[int, str]:
    from fleet.words import BLOCKS

    return BLOCKS.index(view.block), view.vessel


def _document(appraised: Appraised, folder: Path) -> dict[str, Any]:
    from fleet.reports import jsonout

    return {
        "folder": str(folder),
        "files": list(FILES),
        **jsonout.appraise(appraised.appraisal),
    }
