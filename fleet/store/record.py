"""The record: the journal, and what was measured, looked at, changed, decided, set and doubted."""

from __future__ import annotations

import datetime as dt
from typing import ClassVar

from sqlalchemy import CheckConstraint, ForeignKey
from sqlalchemy.orm import Mapped, mapped_column

from fleet.store.base import YES_NO, Base, Correctable, Retractable, choices, not_negative, positive

RESULTS = ("read", "no echo", "no access", "lamination")
METHODS = ("spot", "scan", "profile", "radiography")
READING_KINDS = ("reading", "baseline")
READING_STATUSES = ("accepted", "queried", "voided")
INSPECTION_KINDS = ("internal", "external", "on-stream")
RESTART_KINDS = ("new metal", "new service")
RESTART_WHATS = ("replaced", "overlaid", "re-lined", "changed service")
STATES = ("in service", "idle protected", "idle", "out of service", "retired", "withdrawn")
DECISION_KINDS = ("re-rating", "chosen rate", "deferral", "on-stream acceptance", "other")
DOUBT_STATUSES = ("open", "cleared")
PARKED_STATUSES = ("waiting", "settled")
FIRST_PREVIOUS = "0" * 64
"""The previous hash of entry 1 and the hash of an empty journal [text]."""


class Journal(Base):
    """One entry of the journal: one transaction, with who, why and the digest of all it wrote."""

    __tablename__ = "journal"

    no: Mapped[int] = mapped_column(primary_key=True, autoincrement=False)
    at: Mapped[str]
    by: Mapped[str]
    role: Mapped[str | None]
    why: Mapped[str | None]
    task: Mapped[str]
    program_version: Mapped[str]
    wrote: Mapped[str]
    facts_digest: Mapped[str]
    previous_hash: Mapped[str] = mapped_column(unique=True)
    hash: Mapped[str] = mapped_column(unique=True)

    __table_args__ = (CheckConstraint("no > 0", name="no_positive"),)


class JournalHead(Base):
    """The last entry's number and hash: one row, the only one that is ever updated."""

    __tablename__ = "journal_head"

    id: Mapped[int] = mapped_column(primary_key=True, autoincrement=False)
    no: Mapped[int]
    hash: Mapped[str]

    __table_args__ = (CheckConstraint("id = 1", name="one_row"),)


class SourceFile(Correctable, Base):
    """A file that was loaded, known by the digest of its bytes."""

    __tablename__ = "source_file"

    name: Mapped[str]
    sha256: Mapped[str] = mapped_column(index=True)
    kind: Mapped[str]
    rows_loaded: Mapped[int]
    rows_parked: Mapped[int]

    __table_args__ = (*not_negative("rows_loaded", "rows_parked"),)


class ParkedRow(Correctable, Base):
    """A row of a loaded file that waits to be corrected."""

    __tablename__ = "parked_row"

    source_file_id: Mapped[int] = mapped_column(ForeignKey("source_file.id"))
    sheet: Mapped[str | None]
    row_no: Mapped[int]
    content: Mapped[str] = mapped_column(info={"json": True})
    faults: Mapped[str] = mapped_column(info={"json": True})
    status: Mapped[str] = mapped_column(default="waiting")

    __table_args__ = (choices("status", PARKED_STATUSES),)


class Survey(Correctable, Base):
    """One outing of thickness readings."""

    __tablename__ = "survey"

    name: Mapped[str]
    taken_from_on: Mapped[dt.date | None]
    taken_to_on: Mapped[dt.date | None]
    technician: Mapped[str | None]
    instrument: Mapped[str | None]
    calibration: Mapped[str | None]
    scope: Mapped[str | None]
    reading_error_mm: Mapped[float | None]
    source_file_id: Mapped[int | None] = mapped_column(ForeignKey("source_file.id"))

    __table_args__ = (
        *positive("reading_error_mm"),
        CheckConstraint("taken_from_on <= taken_to_on", name="taken_in_order"),
    )


class Reading(Correctable, Base):
    """One dated thickness at one location, or the reason why there is none."""

    __tablename__ = "reading"
    ABOUT: ClassVar[tuple[str, ...]] = ("location_id",)

    location_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    taken_on: Mapped[dt.date]
    thickness_mm: Mapped[float | None]
    average_mm: Mapped[float | None]
    result: Mapped[str]
    method: Mapped[str | None]
    wall_temperature_c: Mapped[float | None]
    temperature_corrected: Mapped[str | None]
    includes_lining: Mapped[str | None]
    through_coating: Mapped[str | None]
    technician: Mapped[str | None]
    instrument: Mapped[str | None]
    note: Mapped[str | None]
    kind: Mapped[str]
    status: Mapped[str]
    status_because: Mapped[str | None]
    survey_id: Mapped[int | None] = mapped_column(ForeignKey("survey.id"))
    source_row: Mapped[int | None]

    __table_args__ = (
        *positive("thickness_mm", "average_mm"),
        choices("result", RESULTS),
        CheckConstraint("(result = 'read') = (thickness_mm IS NOT NULL)", name="thickness_fits_result"),
        choices("method", METHODS),
        choices("temperature_corrected", YES_NO),
        choices("includes_lining", YES_NO),
        choices("through_coating", YES_NO),
        choices("kind", READING_KINDS),
        choices("status", READING_STATUSES),
        CheckConstraint("status = 'accepted' OR status_because IS NOT NULL", name="status_has_reason"),
    )


class Inspection(Retractable, Base):
    """A dated look at a vessel that counts for a due date."""

    __tablename__ = "inspection"
    ABOUT: ClassVar[tuple[str, ...]] = ("vessel_id",)

    vessel_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    kind: Mapped[str]
    done_on: Mapped[dt.date]
    extent: Mapped[str | None]
    inspector: Mapped[str | None]
    report: Mapped[str | None]

    __table_args__ = (choices("kind", INSPECTION_KINDS),)


class Restart(Retractable, Base):
    """What begins a new history: new metal or a new service."""

    __tablename__ = "restart"
    ABOUT: ClassVar[tuple[str, ...]] = ("vessel_id", "part_id")

    vessel_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    part_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    kind: Mapped[str]
    what: Mapped[str]
    happened_on: Mapped[dt.date]
    reason: Mapped[str | None]
    whole_part: Mapped[bool]

    __table_args__ = (choices("kind", RESTART_KINDS), choices("what", RESTART_WHATS))


class RestartLocation(Correctable, Base):
    """A location at which a restart begins a new history."""

    __tablename__ = "restart_location"
    ABOUT: ClassVar[tuple[str, ...]] = ("location_id",)

    restart_id: Mapped[int] = mapped_column(ForeignKey("restart.id"), index=True)
    location_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)


class DatedState(Retractable, Base):
    """The state of a vessel, part or location from a day on."""

    __tablename__ = "dated_state"
    ABOUT: ClassVar[tuple[str, ...]] = ("subject_id",)

    subject_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    state: Mapped[str]
    from_on: Mapped[dt.date]
    date_known: Mapped[str | None]
    reason: Mapped[str | None]

    __table_args__ = (choices("state", STATES), choices("date_known", YES_NO))


class Decision(Retractable, Base):
    """What the engineer chose for a vessel."""

    __tablename__ = "decision"
    ABOUT: ClassVar[tuple[str, ...]] = ("vessel_id", "part_id", "location_id")

    vessel_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    part_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    location_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    kind: Mapped[str]
    decided_on: Mapped[dt.date]
    effective_on: Mapped[dt.date | None]
    review_on: Mapped[dt.date | None]
    until_on: Mapped[dt.date | None]
    pressure_mpa: Mapped[float | None]
    rate_mm_per_year: Mapped[float | None]
    rests_on: Mapped[str | None]
    reason: Mapped[str | None]
    decided_by: Mapped[str | None]
    second_by: Mapped[str | None]

    __table_args__ = (
        choices("kind", DECISION_KINDS),
        *not_negative("pressure_mpa", "rate_mm_per_year"),
        CheckConstraint("kind <> 're-rating' OR pressure_mpa IS NOT NULL", name="re_rating_has_pressure"),
        CheckConstraint("kind <> 'chosen rate' OR rate_mm_per_year IS NOT NULL", name="chosen_rate_has_rate"),
    )


class Setting(Retractable, Base):
    """A choice of the owner that changes figures, for the database or for one entity."""

    __tablename__ = "setting"
    ABOUT: ClassVar[tuple[str, ...]] = ("subject_id",)

    key: Mapped[str]
    value: Mapped[str]
    subject_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    from_on: Mapped[dt.date]


class Doubt(Correctable, Base):
    """Doubtful data that was loaded and stays visible until cleared."""

    __tablename__ = "doubt"
    ABOUT: ClassVar[tuple[str, ...]] = ("vessel_id", "part_id", "location_id")

    code: Mapped[str]
    where_text: Mapped[str]
    found: Mapped[str]
    remedy: Mapped[str]
    vessel_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    part_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    location_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"), index=True)
    reading_id: Mapped[int | None] = mapped_column(ForeignKey("reading.id"), index=True)
    status: Mapped[str]

    __table_args__ = (choices("status", DOUBT_STATUSES),)


class SavedAppraisal(Correctable, Base):
    """An appraisal saved under a name; it never changes."""

    __tablename__ = "appraisal"

    name: Mapped[str] = mapped_column(unique=True)
    as_of_on: Mapped[dt.date]
    known_no: Mapped[int]
    carry_to_on: Mapped[dt.date | None]
    program_version: Mapped[str]
    journal_hash: Mapped[str]
    document: Mapped[str]
