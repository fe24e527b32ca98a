"""The words of fleet: standings, flags, faults, doubts and gaps, each written once.

A *fault* is bad data that refuses a file. A *doubt* is doubtful data that loads and stays visible until cleared.
A *gap* is something that should have been measured or recorded and was not. All three are values in a list, never
exceptions: `Notice` with code, where, found and remedy.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

CAUTION = (
    "fleet computes and records; it does not decide. A licensed engineer and the authorised inspector do, "
    "under the local code and law."
)

# --------------------------------------------------------------------------------------------------------------------
# Standings, worst first, and flags
# --------------------------------------------------------------------------------------------------------------------
BELOW_REQUIRED = "below required"
AT_REQUIRED = "at required"
USED_UP = "used up by its rate"
RATING_SHORT = "rating short"
NO_VERDICT = "no verdict"
RUNNING_OUT = "running out"
RATING_HELD = "rating held"

STANDINGS: tuple[str, ...] = (
    BELOW_REQUIRED,
    AT_REQUIRED,
    USED_UP,
    RATING_SHORT,
    NO_VERDICT,
    RUNNING_OUT,
    RATING_HELD,
)
"""Every standing of a vessel, worst first."""

STANDING_MEANING: dict[str, str] = {
    BELOW_REQUIRED: "the least measured wall is below the required thickness",
    AT_REQUIRED: "the wall is above the required thickness by less than the reading error can tell",
    USED_UP: "measured above the required thickness, by its rate below it on the as-of date",
    RATING_SHORT: "on the carry-to date the wall is below required or cannot carry the current MAWP",
    NO_VERDICT: "something needed for a verdict was never measured or recorded",
    RUNNING_OUT: "the rating holds, but the wall is used up within the planning horizon",
    RATING_HELD: "the current MAWP is carried to the carry-to date",
}
"""What each standing says [text]."""

OVERDUE = "overdue"
SURVEY_WITHIN_YEAR = "survey within the year"
RE_GAUGE = "re-gauge"
IDLE = "idle"
OUT_OF_SERVICE = "out of service"
FLAGS: tuple[str, ...] = (OVERDUE, SURVEY_WITHIN_YEAR, RE_GAUGE, IDLE, OUT_OF_SERVICE)
"""Every flag that may stand beside a standing."""

RETIRED = "retired"
BLOCKS: tuple[str, ...] = (*STANDINGS, RE_GAUGE, IDLE, OUT_OF_SERVICE, RETIRED)
"""The blocks of the yearly list in the order in which they are printed; every vessel is in exactly one."""

RELIEF_ABOVE_NOW = "set above what the wall carries today"
RESET_BY = "reset by"
HELD_BY_HALF_LIFE = "held by half life"

# --------------------------------------------------------------------------------------------------------------------
# Faults, doubts, gaps
# --------------------------------------------------------------------------------------------------------------------
Kind = Literal["fault", "doubt", "gap"]


@dataclass(frozen=True)
class Word:
    """One code of the catalogue.

    Parameters
    ----------
    code : str
        The stable code, in plain words [text].
    kind : {'fault', 'doubt', 'gap'}
        What it does: refuse a file, stay visible, or name something missing [text].
    meaning : str
        One sentence for the reader [text].
    remedy : str
        What to do about it [text].
    """

    code: str
    kind: Kind
    meaning: str
    remedy: str


@dataclass(frozen=True)
class Notice:
    """One fault, doubt or gap, as found.

    Parameters
    ----------
    code : str
        A code of the catalogue [text].
    where : str
        File, sheet and cell, or vessel, part and location [text].
    found : str
        What was found there [text].
    remedy : str
        What to do [text].
    """

    code: str
    where: str
    found: str
    remedy: str

    def as_dict(self) -> dict[str, str]:
        """Give the four fields in the order of the ``--json`` contract."""
        return {"code": self.code, "where": self.where, "found": self.found, "remedy": self.remedy}

    @property
    def kind(self) -> Kind:
        """Fault, doubt or gap."""
        return CATALOGUE[self.code].kind


def _words(kind: Kind, *rows: tuple[str, str, str]) -> dict[str, Word]:
    return {code: Word(code, kind, meaning, remedy) for code, meaning, remedy in rows}


FAULTS = _words(
    "fault",
    ("not a workbook", "the file cannot be read as a workbook or as text", "save it as .xlsx or .csv and load that"),
    ("empty file", "the file holds no table", "check that the right file was sent"),
    ("no table found", "no sheet has a header row that names a known table", "name the sheet after its table, or give it the headings of the table"),
    ("missing column", "a column that names the row is absent", "add the column"),
    ("missing unit", "a physical column has no unit in brackets", "write the unit in the header, for instance 'thickness [mm]'"),
    ("unknown unit", "the unit in brackets is not known for this quantity", "use one of the accepted units"),
    ("absolute pressure", "psia and bara are absolute pressures; all pressures here are gauge", "subtract the atmosphere (14.696 psi, 1.01325 bar) and write psig or barg"),
    ("unknown column", "the header is not a column of this table", "rename or delete the column"),
    ("column twice", "two headers name the same column", "keep one of the two"),
    ("merged header", "header cells are merged", "unmerge them and give every column its own heading"),
    ("missing value", "a cell that names the row is blank", "fill it in"),
    ("unreadable number", "the cell is not a number", "write a plain number"),
    ("text in a number column", "the cell holds words where a number belongs", "write the number alone and move the words to 'note'"),
    ("number out of range", "the number cannot be true for this column", "check the cell"),
    ("negative or zero thickness", "a thickness must be above zero; a failed reading is a result, not a number", "leave the thickness blank and say why under 'result'"),
    ("unreadable date", "the cell is not an ISO date", "write dates as 2026-12-01"),
    ("date in the future", "the date lies after today", "check the date"),
    ("date before in-service", "the date lies before the vessel went into service", "check the date, or record it as the location's baseline"),
    ("unknown choice", "the cell is not one of the words this column takes", "use one of the listed words"),
    ("unknown vessel", "no vessel of that tag is on the register", "correct the tag, or load the vessel first"),
    ("unknown part", "the vessel has no part of that name", "correct the name, or load the part first"),
    ("unknown location", "the part has no location of that name", "correct the name, or load the location first"),
    ("duplicate reading", "the same location has two readings on one day in this file or on record", "keep the lower one, or correct the date; a reading on record is not replaced by loading it again"),
    ("duplicate row", "the same row name stands twice in this file", "keep one of the two"),
    ("error cell", "the cell holds a spreadsheet error", "mend the formula and save the file"),
    ("formula without value", "the cell holds a formula whose result was not saved", "open the file in a spreadsheet program, recalculate and save"),
    ("thickness and no reading", "the row gives a thickness and says that none was read", "keep one of the two"),
    ("thickness or result missing", "the row gives neither a thickness nor a result", "write the thickness, or say why there is none under 'result'"),
    ("name turned into a date", "the cell that names something holds a date or a time", "format the column as text and type the name again"),
    ("average below thickness", "the average is below the least thickness", "check the two columns"),
    ("unknown rule set", "no in-service rule set of that name is installed", "use one of the installed rule sets"),
    ("unknown design code", "no pressure code of that name is known", "use asme8-1 or membrane"),
    ("differs from the record", "the value differs from what is on record as a dated fact", "use the command that records the change"),
)  # fmt: skip

DOUBTS = _words(
    "doubt",
    # of a file
    ("thickness far above nominal", "the reading is more than 1.25 times nominal wall and lining", "re-take it with an A-scan; a doubled echo reads twice the wall"),
    ("suspected unit slip", "the value would fit if it were written in the other unit", "check the unit of the column with the technician"),
    ("apparent gain", "the wall reads thicker than before by more than the reading error explains", "re-take it; metal does not grow"),
    ("large loss", "the loss since the last reading is above five times the history and above the reading error", "re-take it, then look for a change of service"),
    ("does not apply", "the column does not apply to this shape", "leave the cell blank"),
    ("nameplate blank", "nameplate_mawp is blank; the design pressure is taken for it", "read the nameplate and load the value"),
    ("written as text", "the number is stored as text", "store it as a number; it was understood"),
    ("already loaded", "this file was loaded before; nothing was changed", "nothing, or send the corrected file"),
    ("already on record", "the row says what is on record already", "nothing"),
    ("sheet not taken", "the sheet holds no table that this command takes", "load it with the command that takes it; notes may stay where they are"),
    ("baseline incomplete", "a baseline needs its thickness and its date, and one of the two is blank", "load both; until then there is no baseline"),
    # of an appraisal
    ("queried low reading governs", "a queried reading lower than its history expects goes on governing", "re-take it; void it only with evidence"),
    ("rate without queried readings", "the planning rate is greater without the queried readings and is taken without them", "re-take the queried readings or clear them"),
    ("queried high reading left out", "a queried reading higher than its history expects does not count", "re-take it or clear it"),
    ("baseline equals nominal", "the baseline equals nominal to the last digit and is taken as nominal", "measure the wall; plate is seldom delivered at nominal"),
    ("chosen rate lapsed", "the chosen planning rate has lapsed; the measured rates govern", "choose again on the new readings"),
    ("chosen rate needs a second name", "the chosen rate is below the measured or expected rate and only one name stands under it", "have a second engineer sign it"),
    ("short-term rate not counted", "the last span is under a year and its loss is within the reading error", "nothing; the next survey will tell"),
    ("loss below what readings can show", "the measured loss is smaller than the reading error can show over this span", "plan by the life at the least measurable rate, or wait for a longer span"),
    ("shared shift", "most locations of this part shifted together since the survey before", "check calibration and temperature of the survey; then look for a change of service"),
    ("planned after due", "the planned survey lies after the due date", "bring the survey forward or record a deferral"),
    ("deferral beyond terms", "the deferral asks for more than the rule set's terms allow; the terms are used", "apply for a full deferral under the local rules"),
    ("deferral not in force", "the deferral was recorded after the due date or a second time; it moves nothing", "inspect, or record a full deferral under the local rules"),
    ("wind and weight not assessed", "the vessel is taller than five diameters and no axial-load minimum is recorded", "have the wall for wind and weight calculated and load required_thickness_axial"),
    ("knuckle proportions", "the knuckle is tighter than new construction allows", "check the head drawing"),
    ("crown proportions", "the crown radius exceeds the outside diameter", "check the head drawing"),
    ("thin torispherical head", "the head is thinner than 0.002 of its crown radius; the formula may overstate it", "have the head calculated by the thin-head rules"),
    ("head proportions not checked", "a diameter, crown or knuckle radius is missing to judge the proportions of the head", "load inside_diameter, crown_radius and knuckle_radius"),
    ("cover bolts not assessed", "the cover is bolted through a gasket; the moment of its bolts is not in the figure", "have the cover calculated with its bolt load"),
    ("value taken off the record", "a blank cell took a value off the record", "load the value again if it still holds; leave the column out to keep it"),
    ("diameters disagree", "inside diameter, outside diameter and nominal wall contradict each other; the worse is used", "correct the one that is wrong"),
    ("edition unknown", "code_edition gives no year; the lesser of the two thick-wall forms is used", "load code_edition"),
    ("lining not said to count", "lining_counts_in_strength is blank; taken as no", "load lining_counts_in_strength"),
)  # fmt: skip

GAPS = _words(
    "gap",
    ("vacuum not assessed", "an external pressure is recorded and the part has no external-pressure minimum", "have it calculated and load required_thickness_external"),
    ("part without location", "the part has no location", "lay out locations and load them"),
    ("part never measured", "no location of the part has ever given a thickness", "measure it"),
    ("location never measured", "the location has never given a thickness", "measure it"),
    ("location measured once", "the location has one observation only", "measure it again"),
    ("no echo at last visit", "the last visit gave no echo; it may itself be a badly thinned wall", "go back with another probe or method before trusting the part"),
    ("part not read at last visit", "no location of the part gave a thickness at the last visit", "go back and read it"),
    ("location not read at last visit", "the location gave no thickness at the last visit; its earlier wall is carried on", "read it at the next visit"),
    ("missing datum", "a figure needs this value and it is blank", "load the value"),
    ("no formula", "no formula is known for this shape under this code", "load required_thickness_given under shape 'other', or choose another code"),
    ("outside formula limits", "the wall or pressure is outside the limits of every form of the formula", "have the part calculated by an engineer"),
    ("no given thickness", "shape 'other' needs required_thickness_given", "load required_thickness_given"),
    ("other part below given thickness", "the wall is below the given required thickness; the pressure it carries is not known", "have the part calculated"),
    ("loss side blank", "loss_side is blank; the wall is taken to thin from inside", "load loss_side"),
    ("lining blank", "lining is blank; taken as none", "load lining"),
    ("lining not told", "the part is lined and the reading does not say whether it includes the lining", "say so under includes_lining"),
    ("lining thickness blank", "the reading includes a lining whose thickness is not recorded", "load lining_thickness"),
    ("external pressure blank", "external_design_pressure is blank; taken as none", "load external_design_pressure; write 0 where there is none"),
    ("structural minimum blank", "structural_minimum is blank; taken as none", "load structural_minimum; write 0 where there is none"),
    ("axial-load minimum blank", "required_thickness_axial is blank; taken as none", "load required_thickness_axial; write 0 where there is none"),
    ("no rate", "no rate can be had: one reading, no nominal, no expected rate", "measure again, or load nominal_thickness or expected_rate"),
    ("rate from nominal", "the rate rests on nominal thickness, not on a first reading", "measure again; plate is seldom delivered at nominal"),
    ("due date not known", "a measured location has no life for want of a datum, so the due dates are not known", "load what the other gaps name"),
    ("no inspection on record", "no counting internal or on-stream inspection is recorded; counted from in-service", "record the inspection"),
    ("no external on record", "no external inspection is recorded; counted from in-service", "record the inspection"),
    ("no planned survey", "next_survey_on is blank", "load the date of the next survey that is certain to be made"),
    ("no relief device", "no relief device is linked to the vessel", "load its relief devices"),
    ("inspection extent blank", "an inspection says no extent, so it does not count for a due date", "load the row again with 'full' under extent, or the parts looked at"),
    ("state without date", "the state has no date; it counts from the day of its load", "record the state with its date"),
    ("withdrawn", "the part or location was withdrawn and is not counted", "nothing, if the reason on record still stands"),
    ("parked row", "a row of a loaded file was left waiting", "correct the row and load it"),
    ("no part", "the vessel has no part on the register", "load its parts"),
)  # fmt: skip

CATALOGUE: dict[str, Word] = {**FAULTS, **DOUBTS, **GAPS}
"""Every fault, doubt and gap by its code."""


def notice(code: str, where: str, found: str, remedy: str | None = None) -> Notice:
    """Build a notice with the catalogue's remedy.

    Parameters
    ----------
    code : str
        A code of the catalogue [text].
    where, found : str
        The place and what was found there [text].
    remedy : str, optional
        What to do, where the catalogue's words can be made more exact [text].

    Returns
    -------
    Notice

    Examples
    --------
    >>> notice("missing unit", "north.csv:E1", "'thickness'").remedy
    "write the unit in the header, for instance 'thickness [mm]'"
    """
    return Notice(code, where, found, remedy if remedy is not None else CATALOGUE[code].remedy)
