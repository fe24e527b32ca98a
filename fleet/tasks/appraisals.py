"""Appraise the fleet or one vessel from what is on record, and save an appraisal under a name."""

from __future__ import annotations

import json
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date, datetime

import fleet
from fleet.appraisal.appraise import Appraisal, appraise
from fleet.appraisal.views import VesselView
from fleet.errors import Refused, UsageProblem
from fleet.reports.source import Grounds
from fleet.rules import RuleValue, load_rule_set
from fleet.store import Engine, facts, journal, models
from fleet.tasks import settings as levels
from fleet.tasks.assemble import fetch_inputs
from fleet.tasks.names import fetch_names
from fleet.tasks.notices import waiting_rows
from fleet.tasks.reader import Reader
from fleet.words import Notice

SETTING_UNITS = {
    "reading_error_mm": "mm",
    "rate_floor_mm_per_year": "mm/year",
    "observation_window_days": "days",
    "list_life_years": "years",
}
"""What stands behind the figure of a setting in print [text]."""


FIRST_YEAR, LAST_YEAR = 1800, 2200
"""The years about which the record can be asked [year]."""


@dataclass(frozen=True)
class Appraised:
    """An appraisal with what a list prints beside it.

    Parameters
    ----------
    appraisal : Appraisal
        The appraisal [-].
    grounds : Grounds
        Settings, rule sets and program version [-].
    waiting : tuple of Notice
        Rows that wait and belong to no vessel of the register [-].
    carry_to : date or None
        The date asked about, where one was given [date].
    """

    appraisal: Appraisal
    grounds: Grounds
    waiting: tuple[Notice, ...]
    carry_to: date | None


def appraise_fleet(
    engine: Engine,
    *,
    as_of: date,
    known_at: datetime | None = None,
    carry_to: date | None = None,
    tags: Sequence[str] = (),
) -> Appraised:
    """Appraise every vessel of the register, or those named.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    as_of : date
        The day the figures are about [date].
    known_at : datetime, optional
        Use only what was on record by then [date].
    carry_to : date, optional
        Carry the pressure to this date instead of the one the rules give [date].
    tags : sequence of str
        The vessels asked for; all where none is named [text].

    Returns
    -------
    Appraised

    Raises
    ------
    UnknownTag
        If a tag is not on the register; it names the nearest.
    UsageProblem
        If the carry-to date lies before the as-of date, or one of them far outside any works' time.
    """
    for option, day in (("--as-of", as_of), ("--carry-to", carry_to)):
        if day is not None and not FIRST_YEAR <= day.year <= LAST_YEAR:
            raise UsageProblem(
                option, f"{day} is no day of a works", f"give one from {FIRST_YEAR} to {LAST_YEAR}"
            )
    if carry_to is not None and carry_to < as_of:
        raise UsageProblem(
            "--carry-to", f"{carry_to} lies before the as-of date {as_of}", "give a date on or after it"
        )
    with engine.connect() as conn:
        record = Reader.at(conn, as_of=as_of, known_at=known_at)
        if tags:
            names = fetch_names(record)
            for tag in tags:
                names.vessel(tag)
        inputs = fetch_inputs(record, tags=tags or None)
        rule_sets = tuple(sorted({str(name) for name in inputs.vessels.rules}))
        grounds = _grounds(record, rule_sets)
        waiting = tuple(one.notice for one in waiting_rows(record) if one.vessel_id is None)
    return Appraised(appraise(inputs, as_of=as_of, carry_to=carry_to), grounds, waiting, carry_to)


def show_vessel(
    engine: Engine,
    tag: str,
    *,
    as_of: date,
    known_at: datetime | None = None,
    carry_to: date | None = None,
) -> VesselView:
    """Appraise one vessel.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    tag : str
        The vessel [text].
    as_of : date
        The day the figures are about [date].
    known_at : datetime, optional
        Use only what was on record by then [date].
    carry_to : date, optional
        Carry the pressure to this date instead of the one the rules give [date].

    Returns
    -------
    VesselView

    Raises
    ------
    UnknownTag
        If the tag is not on the register; it names the nearest.
    UsageProblem
        If the carry-to date lies before the as-of date.
    """
    return appraise_fleet(
        engine, as_of=as_of, known_at=known_at, carry_to=carry_to, tags=(tag,)
    ).appraisal.vessel(0)


def refuse_saved_name(engine: Engine, name: str) -> None:
    """Refuse a name under which an appraisal was saved before.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    name : str
        The name [text].

    Raises
    ------
    Refused
        If the name is blank or in use.
    """
    where = f"appraisal {name!r}"
    if not name.strip():
        raise Refused("--save", "the name is blank", "give a name, for instance 'list 2026'")
    with engine.connect() as conn:
        known = journal.head(conn).no
        saved = facts.columns(conn, models.SavedAppraisal, known=known, only=("name", "as_of_on"))
    if name in saved["name"]:
        on = saved["as_of_on"][saved["name"].index(name)]
        raise Refused(
            where,
            f"an appraisal as of {on} is saved under that name and never changes",
            "choose another name",
        )


def save_appraisal(engine: Engine, appraised: Appraised, *, name: str, by: str) -> int:
    """Save an appraisal under a name; it never changes.

    Parameters
    ----------
    engine : sqlalchemy.Engine
        The database [-].
    appraised : Appraised
        What to save [-].
    name, by : str
        The name, and who saves it [text].

    Returns
    -------
    int
        Number of the journal entry.

    Raises
    ------
    Refused
        If the name is in use.
    """
    refuse_saved_name(engine, name)
    appraisal = appraised.appraisal
    document = {
        "as_of": appraisal.as_of.isoformat(),
        "journal_head": appraisal.journal_head,
        "vessels": [{**view.as_json(), "block": view.block} for view in appraisal.views()],
    }
    row = {
        "name": name,
        "as_of_on": appraisal.as_of,
        "known_no": appraisal.journal_no,
        "carry_to_on": appraised.carry_to,
        "program_version": fleet.__version__,
        "journal_hash": appraisal.journal_head,
        "document": json.dumps(document, allow_nan=False, ensure_ascii=False),
    }
    with journal.writer(engine, task="appraise", by=by, why=f"saved as {name}") as entry:
        entry.add(models.SavedAppraisal, [row])
        return int(entry.no)


def _grounds(record: Reader, rule_sets: tuple[str, ...]) -> Grounds:
    in_force = levels.in_force(record)
    names = fetch_names(record)
    choices = load_rule_set("choices")
    printed: list[tuple[str, str]] = []
    for key in levels.KEYS:
        unit = SETTING_UNITS[key]
        default = choices.values[key]
        told = in_force.of_database(key, default.value)
        printed.append((key.removesuffix(f"_{unit}").replace("_", " "), f"{told:g} {unit}"))
        for (named, subject), value in sorted(in_force.values.items(), key=str):
            if named == key and subject is not None:
                printed.append((f"{printed[-1][0]}, {' / '.join(names.path(subject))}", f"{value:g} {unit}"))
    rules: dict[str, Sequence[RuleValue]] = {}
    for name in (*rule_sets, "choices"):
        rule_set = load_rule_set(name)
        rules[f"{rule_set.title}, {rule_set.edition}"] = tuple(rule_set.values.values())
    return Grounds(settings=printed, rules=rules, program_version=fleet.__version__)
