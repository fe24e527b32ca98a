"""Load thickness readings; what is thin is told first, whatever becomes of the file."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import date, datetime
from pathlib import Path
from typing import Any

from fleet.errors import FileRefused
from fleet.intake.results import Row, SurveyIntake
from fleet.store import Engine, journal, models
from fleet.tasks.files import new_parked, record_files, settled, waiting_on_record
from fleet.tasks.known import OnRecord, fetch_history, fetch_on_record
from fleet.tasks.printing import counted
from fleet.tasks.reader import Reader
from fleet.tasks.register import NOT_KEPT
from fleet.tasks.writing import doubt_row, refuse_if_overtaken
from fleet.words import Notice

Thin = Mapping[str, Any]

_FIELDS = (
    "taken_on",
    "thickness_mm",
    "average_mm",
    "method",
    "wall_temperature_c",
    "temperature_corrected",
    "includes_lining",
    "through_coating",
    "technician",
    "instrument",
    "note",
)


@dataclass(frozen=True)
class FileLoaded:
    """What became of one survey file.

    Parameters
    ----------
    name : str
        The file [text].
    loaded, parked : int
        Rows written, rows that wait [count].
    refused, already_loaded : bool
        Whether faults kept it out; whether it was loaded before [-].
    faults, doubts : tuple of Notice
        All that were found [-].
    entry_no : int or None
        Number of the journal entry; None where nothing was written [count].
    """

    name: str
    loaded: int
    parked: int
    refused: bool
    already_loaded: bool
    faults: tuple[Notice, ...]
    doubts: tuple[Notice, ...]
    entry_no: int | None


@dataclass(frozen=True)
class SurveysLoaded:
    """What a load of surveys did.

    Parameters
    ----------
    files : tuple of FileLoaded
        Each file, in the order given [-].
    thin : tuple of mapping
        Every reading at or below its alert or required thickness [-].
    dry_run : bool
        Whether nothing was to be written [-].
    """

    files: tuple[FileLoaded, ...]
    thin: tuple[Thin, ...]
    dry_run: bool = False

    @property
    def waiting(self) -> tuple[Notice, ...]:
        """The faults of rows that wait."""
        return tuple(one for file in self.files if not file.refused for one in file.faults)

    @property
    def doubts_of_loaded(self) -> tuple[Notice, ...]:
        """The doubts of the files that were let in."""
        return tuple(
            one for file in self.files if not file.refused | file.already_loaded for one in file.doubts
        )

    @property
    def refused(self) -> FileRefused | None:
        """The exception to end with, where a file was kept out."""
        out = [file for file in self.files if file.refused]
        if not out:
            return None
        faults = tuple(one for file in out for one in file.faults)
        return FileRefused(
            ", ".join(file.name for file in out),
            f"{counted(len(faults), 'fault')}; nothing of it was loaded",
            "correct them and load again, or load the good rows with --park-bad-rows",
            faults,
            tuple(one for file in out for one in file.doubts),
        )

    def as_json(self) -> dict[str, Any]:
        """Give the object of the ``--json`` contract."""
        return {
            "loaded": sum(file.loaded for file in self.files),
            "parked": sum(file.parked for file in self.files),
            "faults": [one.as_dict() for file in self.files for one in file.faults],
            "doubts": [one.as_dict() for file in self.files for one in file.doubts],
            "thin": [dict(one) for one in self.thin],
        }

    def text(self) -> str:
        """Say what became of each file, a line each."""
        return "\n".join(_file_line(file, dry_run=self.dry_run) for file in self.files if not file.refused)


def _file_line(file: FileLoaded, *, dry_run: bool) -> str:
    if file.already_loaded:
        return f"{file.name}: loaded before; nothing was changed."
    verb = "would be loaded" if dry_run else "loaded"
    waits = f", {counted(file.parked, 'row')} waiting in 'fleet gaps'" if file.parked else ""
    entry = f" Journal entry {file.entry_no}." if file.entry_no is not None else ""
    return f"{file.name}: {counted(file.loaded, 'reading')} {verb}{waits}.{entry}"


def thin_text(thin: Sequence[Thin], units: str) -> str:
    """Tell every reading at or below its alert or required thickness.

    Parameters
    ----------
    thin : sequence of mapping
        As intake gives them [-].
    units : {'si', 'us'}
        Units of what is printed [text].

    Returns
    -------
    str
        Empty where there is none.
    """
    if not thin:
        return ""
    from fleet.units import display

    shown = display(units)
    lines = [f"Thin: {counted(len(thin), 'reading')} at or below alert or required thickness"]
    for one in thin:
        limits = [
            f"{name} {shown.text('length', one[f'{name}_thickness_mm'], 'up')}"
            for name in ("required", "alert")
            if name in one["which"]
        ]
        place = " / ".join(str(one[name]) for name in ("vessel", "part", "location"))
        wall = shown.text("length", one["wall_mm"], "down")
        lines.append(
            f"  {place}  {one['taken_on'] or 'no date'}  wall {wall}, at or below {' and '.join(limits)}"
        )
        lines.append(f"    {one['where']}")
    return "\n".join(lines)


def load_surveys(
    engine: Engine,
    files: Sequence[Path],
    *,
    by: str,
    today: date,
    park: bool = False,
    dry_run: bool = False,
    at: datetime | None = None,
) -> SurveysLoaded:
    """Load survey files, each as a whole or not at all, each in one journal entry.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    files : sequence of pathlib.Path
        CSV files or workbooks [text].
    by : str
        Who loads them [text].
    today : date
        The day of the load [date].
    park : bool
        Load the good rows and let the others wait [-].
    dry_run : bool
        Check everything and write nothing [-].
    at : datetime, optional
        Moment of the entries; now where absent [date].

    Returns
    -------
    SurveysLoaded
        With `refused` set where faults kept a file out: nothing of it was written then.

    Raises
    ------
    Refused
        If somebody else wrote while a file was being checked.
    """
    done: list[FileLoaded] = []
    thin: list[Thin] = []
    for path in files:
        loaded, low = _load_one(engine, path, by=by, today=today, park=park, dry_run=dry_run, at=at)
        done.append(loaded)
        thin += low
    return SurveysLoaded(tuple(done), tuple(thin), dry_run)


def _load_one(
    engine: Engine,
    path: Path,
    *,
    by: str,
    today: date,
    park: bool,
    dry_run: bool,
    at: datetime | None,
) -> tuple[FileLoaded, tuple[Thin, ...]]:
    from fleet.intake.check_readings import read_survey

    with engine.connect() as conn:
        record = fetch_on_record(Reader.at(conn, as_of=today), required=True)
        history = fetch_history(record)
        waiting = waiting_on_record(record.reader)
    # The connection is closed: nobody has to wait while the file is checked.
    intake = read_survey(path, known=record.register, history=history, today=today, park=park)
    rows = intake.rows("readings")
    parked, ended = new_parked(intake.parked, waiting), settled(waiting, intake)
    number = None
    if not dry_run and not intake.refused and (rows or parked or ended):
        with journal.writer(engine, task="survey load", by=by, why=path.name, at=at) as entry:
            refuse_if_overtaken(entry, record.reader.known)
            keys = record_files(entry, intake, kind="survey", parked=parked, done=ended)
            _write(entry, intake, record, keys.get(intake.files[0].name))
            number = int(entry.no)
    file = intake.files[0]
    loaded = FileLoaded(
        name=file.name,
        loaded=0 if intake.refused else len(rows),
        parked=0 if intake.refused else len(intake.parked),
        refused=intake.refused,
        already_loaded=file.already_loaded,
        faults=intake.faults,
        doubts=intake.doubts,
        entry_no=number,
    )
    return loaded, intake.thin


def _write(entry: journal.Entry, intake: SurveyIntake, record: OnRecord, source: int | None) -> None:
    rows = intake.rows("readings")
    if not rows:
        return
    days = [row.values["taken_on"] for row in rows]
    (survey,) = entry.add(
        models.Survey,
        [
            {
                "name": Path(intake.files[0].name).stem,
                "taken_from_on": min(days),  # type: ignore[type-var]  # a reading without a date is a fault
                "taken_to_on": max(days),  # type: ignore[type-var]  # the same
                "technician": _only(rows, "technician"),
                "instrument": _only(rows, "instrument"),
                "source_file_id": source,
            }
        ],
    )
    locations = [
        record.names.location(*(str(row.values[name]) for name in ("vessel", "part", "location")))
        for row in rows
    ]
    readings = entry.add(
        models.Reading,
        [
            {
                **{name: row.values.get(name) for name in _FIELDS},
                "location_id": location,
                "result": row.values.get("result") or "read",
                "kind": "reading",
                "status": "queried" if row.query else "accepted",
                "status_because": row.because if row.query else None,
                "survey_id": survey,
                "source_row": row.row_no,
                "written": row.written or None,
            }
            for row, location in zip(rows, locations, strict=True)
        ],
    )
    entry.add(
        models.Doubt,
        [
            {**doubt_row(one), **_about(record, location), "reading_id": reading}
            for row, location, reading in zip(rows, locations, readings, strict=True)
            for one in row.doubts
            if one.code not in NOT_KEPT
        ],
    )


def _about(record: OnRecord, location: int) -> dict[str, int | None]:
    part = record.names.tags[location][1]
    vessel = None if part is None else record.names.tags[part][1]
    return {"vessel_id": vessel, "part_id": part, "location_id": location}


def _only(rows: Sequence[Row], name: str) -> str | None:
    """Give the one word that all rows share, if they do."""
    found = {row.values.get(name) for row in rows}
    word = found.pop() if len(found) == 1 else None
    return None if word is None else str(word)
