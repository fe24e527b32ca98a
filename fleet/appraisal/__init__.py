"""The appraisal of a fleet: arrays of register and record in, an `Appraisal` out. No database, file or clock."""

from fleet.appraisal.appraise import Appraisal, Timetable, appraise
from fleet.appraisal.inputs import Inputs

__all__ = ["Appraisal", "Inputs", "Timetable", "appraise"]
