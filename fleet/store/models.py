"""Every table by name: the register, the journal, the record."""

from __future__ import annotations

from fleet.store.base import Base, table_of
from fleet.store.record import (
    DatedState,
    Decision,
    Doubt,
    Inspection,
    Journal,
    JournalHead,
    ParkedRow,
    Reading,
    Restart,
    RestartLocation,
    SavedAppraisal,
    Setting,
    SourceFile,
    Survey,
)
from fleet.store.register import Entity, Location, Part, ReliefDevice, Vessel

FACTS: tuple[type[Base], ...] = (
    DatedState,
    Decision,
    Doubt,
    Entity,
    Inspection,
    Location,
    ParkedRow,
    Part,
    Reading,
    ReliefDevice,
    Restart,
    RestartLocation,
    SavedAppraisal,
    Setting,
    SourceFile,
    Survey,
    Vessel,
)
"""Every table of facts."""

__all__ = [
    "FACTS",
    "Base",
    "DatedState",
    "Decision",
    "Doubt",
    "Entity",
    "Inspection",
    "Journal",
    "JournalHead",
    "Location",
    "ParkedRow",
    "Part",
    "Reading",
    "ReliefDevice",
    "Restart",
    "RestartLocation",
    "SavedAppraisal",
    "Setting",
    "SourceFile",
    "Survey",
    "Vessel",
    "table_of",
]
