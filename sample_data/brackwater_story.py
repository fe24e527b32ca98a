"""The invented works: who surveyed what when, what went wrong on the way, and what was decided.

``SURVEYS`` says how each file was handed in, ``SPOILT`` what is wrong in it on purpose, ``EVENTS`` the dated facts
that stand in no sheet, ``TROUBLES`` each planted trouble by name with its place and what the tool should say.
"""
# ruff: noqa: E501  one part or one trouble stands on one line of its table, however long

from __future__ import annotations

from dataclasses import dataclass
from datetime import date

from brackwater_vessels import VESSELS, Vessel


@dataclass(frozen=True)
class Survey:
    """One file of readings, as a technician handed it in."""

    start: date
    plant: str
    technician: str
    kind: str = "csv"  # csv, csv with a byte-order mark, or xlsx
    unit: str = "mm"
    decimals: int = 2
    columns: tuple[str, ...] = ("technician",)
    title: str = ""
    only: tuple[str, str] | None = None  # vessel and part
    name: str = ""

    @property
    def file(self) -> str:
        """The file's name: the day on which it was handed in, and the plant."""
        suffix = "xlsx" if self.kind == "xlsx" else "csv"
        day = date.fromordinal(self.start.toordinal() + (1 if self.only else 10))
        return f"{day.isoformat()}_{self.name or self.plant}.{suffix}"


def _s(start: str, plant: str, technician: str, kind: str = "csv", unit: str = "mm", decimals: int = 2,
       columns: str = "technician", **more: str) -> Survey:  # fmt: skip
    only = None
    if more.get("only"):
        vessel, part = more["only"].split("/")
        only = (vessel, part)
    return Survey(
        date.fromisoformat(start), plant, technician, kind, unit, decimals, tuple(columns.split()),
        more.get("title", ""), only, more.get("name", ""),
    )  # fmt: skip


ALDOUS, TVEIT, NAIDOO, PEREIRA, HOLM = "M. Aldous", "R. Tveit", "S. Naidoo", "L. Pereira", "K. Holm"
CLAD = "technician instrument includes_lining"
HOT = "technician wall_temperature temperature_corrected"

SURVEYS: tuple[Survey, ...] = (
    _s("2011-06-06", "nitrate", ALDOUS, unit="in", decimals=3),
    _s("2011-10-03", "ammonia", ALDOUS, "xlsx", columns="technician includes_lining"),
    _s("2012-05-07", "urea", TVEIT, unit="inch", decimals=3, columns="technician note"),
    _s("2012-09-10", "utilities", TVEIT, "xlsx", columns=HOT, title="Thickness survey, utilities, autumn 2012"),
    _s("2013-04-08", "storage", ALDOUS, unit="thou", decimals=0),
    _s("2013-06-03", "nitrate", ALDOUS, columns="technician instrument average"),
    _s("2013-09-02", "ammonia", NAIDOO, "xlsx", columns=CLAD),
    _s("2014-06-02", "urea", TVEIT, "bom", columns="technician instrument"),
    _s("2015-04-13", "utilities", NAIDOO, columns=HOT + " instrument"),
    _s("2015-10-12", "nitrate", NAIDOO, "xlsx", columns="technician average method"),
    _s("2016-05-09", "ammonia", NAIDOO, columns=CLAD + " average"),
    _s("2016-09-12", "urea", PEREIRA, "xlsx", columns="technician instrument note"),
    _s("2016-10-10", "storage", PEREIRA, "xlsx", columns="technician method through_coating"),
    _s("2017-09-11", "utilities", PEREIRA, columns=HOT),
    _s("2018-03-05", "nitrate", PEREIRA, columns="technician instrument"),
    _s("2018-10-01", "ammonia", PEREIRA, "xlsx", columns=CLAD + " result note"),
    _s("2019-03-11", "urea", HOLM, columns="technician instrument average"),
    _s("2020-02-03", "utilities", HOLM, "xlsx", columns=HOT, title="Boiler house and air station, thickness, February 2020"),
    _s("2020-05-04", "storage", HOLM, columns="technician through_coating"),
    _s("2020-10-08", "nitrate", HOLM, "xlsx", columns="technician instrument note", only="T-303/course 2", name="T-303_new_course"),
    _s("2020-10-12", "nitrate", HOLM, columns="technician instrument"),
    _s("2021-04-05", "ammonia", HOLM, columns=CLAD),
    _s("2021-10-04", "urea", NAIDOO, "xlsx", columns="technician instrument average"),
    _s("2023-02-06", "utilities", NAIDOO, columns=HOT),
    _s("2023-03-06", "nitrate", PEREIRA, "xlsx", columns="technician instrument method average"),
    _s("2023-09-11", "ammonia", PEREIRA, "xlsx", columns=CLAD + " method"),
    _s("2023-10-09", "storage", PEREIRA, columns="technician through_coating average"),
    _s("2024-04-08", "urea", NAIDOO, "bom", columns="technician instrument"),
    _s("2025-10-06", "ammonia", HOLM, "xlsx", columns=CLAD + " average method"),
    _s("2025-10-27", "ammonia", NAIDOO, columns="technician instrument method note", only="D-112/course 2", name="D-112_recheck"),
    _s("2026-02-02", "utilities", HOLM, "xlsx", columns=HOT + " instrument", title="Utilities, February 2026 (hot, on the run)"),
    _s("2026-05-11", "urea", PEREIRA, "xlsx", columns="technician instrument average result note"),
    _s("2026-06-08", "nitrate", NAIDOO, columns="technician instrument average"),
    _s("2026-09-07", "storage", HOLM, columns="technician instrument result note"),
)  # fmt: skip

# (start of the survey, vessel, part, index of the location) -> what is wrong there
SPOILT: dict[tuple[str, str, str, int], tuple[str, float, str]] = {
    ("2025-10-06", "D-123", "course 1", 0): ("shift", -0.80, ""),
    ("2025-10-06", "D-126", "drain N6", 0): ("times", 2.0, ""),
    ("2021-10-04", "D-205", "north head", 1): ("shift", 1.50, ""),
    ("2012-05-07", "D-216", "course 2", 2): ("in mm", 0.0, ""),
    ("2018-10-01", "D-126", "course 1", 5): ("no echo", 0.0, "scale, could not be brushed off"),
    ("2026-05-11", "D-205", "course 2", 6): ("no access", 0.0, "scaffold taken down before we came"),
    ("2026-09-07", "D-511", "course 1", 3): ("no echo", 0.0, "tried two probes, nothing comes back"),
}
SWAPPED = ("2018-03-05", "T-304", "course 3", 0, 4)
HOT_TWICE = ("2026-02-02", "D-402", 240.0)
THICKER = {
    ("T-304", "course 3", 4): 2.4
}  # how much thicker than the worst location, where it is not left to chance
LOCAL = ("D-311", "course 1", 0)
WITHDRAWN = ("T-151", "course 3", 5, date(2019, 6, 1))
NEVER = {("D-125", "south head", i) for i in range(4)} | {("D-313", "top head", 4)}
FIRST_READ = {("D-205", "south head", 4): date(2026, 5, 1)}  # marked later than the others of its part
NOMINAL_BASELINE = ("D-313", "top head", 1)
BLANKS: dict[tuple[str, str], tuple[str, ...]] = {  # cells of the parts sheet that nobody filled in
    ("D-128", "top head"): ("allowable_stress",),
    ("D-511", "west head"): ("lining",),
    ("D-511", "course 1"): ("structural_minimum", "loss_side"),
    ("R-413", "top head"): ("joint_efficiency",),
}


def location(tag: str, part: str, index: int) -> str:
    """Give the number painted beside a location: two digits, counted through the vessel."""
    before = 0
    for piece in vessel(tag).parts:
        if piece.name == part:
            return f"{before + index + 1:02d}"
        before += piece.count
    raise KeyError(tag, part)


def vessel(tag: str) -> Vessel:
    """Give a vessel by its tag."""
    return next(v for v in VESSELS if v.tag == tag)


ENGINEER, SECOND = "E. Brandvold", "A. Osei"

EVENTS: dict[str, list[dict[str, object]]] = {
    "restart": [
        {
            "entered_on": date(2019, 6, 4), "vessel": "D-216", "part": "course 1",
            "locations": [location("D-216", "course 1", i) for i in range(8)], "whole_part": True,
            "kind": "new service", "what": "changed service", "happened_on": date(2019, 6, 3),
            "reason": "condensate of the second evaporator led into the drum above course 1",
        },
        {
            "entered_on": date(2020, 10, 8), "vessel": "T-303", "part": "course 2",
            "locations": [location("T-303", "course 2", i) for i in range(8)], "whole_part": True,
            "kind": "new metal", "what": "replaced", "happened_on": date(2020, 10, 8),
            "reason": "course 2 renewed in the autumn shutdown of 2020",
        },
    ],
    "dated_state": [
        {
            "entered_on": date(2016, 11, 2), "vessel": "D-215", "state": "idle protected",
            "from_on": date(2016, 11, 1), "reason": "second urea line stopped; drum dried and under nitrogen",
        },
        {
            "entered_on": date(2019, 5, 21), "vessel": "D-128", "state": "retired",
            "from_on": date(2019, 5, 20), "reason": "cut out and scrapped; duty taken over by D-125",
        },
        {
            "entered_on": date(2019, 6, 1), "vessel": "T-151", "part": "course 3",
            "location": location("T-151", "course 3", 5), "state": "withdrawn", "from_on": date(2019, 6, 1),
            "reason": "covered by the new platform bracket; location beside it kept",
        },
        {
            "entered_on": date(2020, 11, 3), "vessel": "D-215", "state": "in service",
            "from_on": date(2020, 11, 1), "reason": "second urea line started again",
        },
        {
            "entered_on": date(2022, 2, 2), "vessel": "R-413", "state": "out of service",
            "from_on": date(2022, 2, 1), "reason": "blinded and vented; the engine it served was sold",
        },
        {
            "entered_on": date(2024, 3, 4), "vessel": "D-511", "state": "idle",
            "from_on": date(2024, 3, 1), "reason": "no ships since March 2024; drum left under ammonia vapour",
        },
    ],
    "decision": [
        {
            "entered_on": date(2012, 6, 18), "vessel": "D-206", "kind": "re-rating", "decided_on": date(2012, 6, 14),
            "effective_on": date(2012, 6, 18), "pressure": "1.9 MPa", "rests_on": "survey of May 2012",
            "reason": "wall found below what the nameplate pressure needs",
            "decided_by": ENGINEER, "second_by": SECOND,
        },
        {
            "entered_on": date(2023, 8, 22), "vessel": "T-152", "kind": "on-stream acceptance",
            "decided_on": date(2023, 8, 21), "effective_on": date(2023, 8, 21), "review_on": date(2031, 8, 21),
            "rests_on": "surveys of 2011 to 2021: rate under 0.125 mm/year, life over ten years",
            "reason": "packing cannot be drawn without cutting the shell; no cracking, no strip lining",
            "decided_by": ENGINEER, "second_by": SECOND,
        },
        {
            "entered_on": date(2026, 8, 19), "vessel": "D-205", "part": "course 1", "kind": "chosen rate",
            "decided_on": date(2026, 8, 18), "effective_on": date(2026, 8, 18), "review_on": date(2028, 6, 30),
            "rate": "0.16 mm/year", "rests_on": "readings of 2021-10, 2024-04 and 2026-05",
            "reason": "warmer ammonia is expected from 2027 on; above the measured rate on purpose",
            "decided_by": ENGINEER, "second_by": SECOND,
        },
        {
            "entered_on": date(2026, 9, 16), "vessel": "R-411", "kind": "deferral", "decided_on": date(2026, 9, 15),
            "effective_on": date(2026, 9, 15), "until_on": date(2027, 3, 31),
            "rests_on": "survey of February 2026; internal look of 2016-11-08 was clean",
            "reason": "moved into the air compressor shutdown of spring 2027",
            "decided_by": ENGINEER, "second_by": SECOND,
        },
    ],
}  # fmt: skip
"""Keys are the columns of the store; ``pressure`` and ``rate`` are text with a unit; ``entered_on`` sets the order."""


@dataclass(frozen=True)
class Trouble:
    """One planted trouble: name, place, and what the tool should say."""

    name: str
    vessel: str
    says: str
    part: str = ""
    index: int | None = None
    file: str = ""
    code: str = ""  # a standing, flag, doubt or gap in the words of the tool

    @property
    def location(self) -> str:
        """The number of the location, '' where the trouble is not at one."""
        return location(self.vessel, self.part, self.index) if self.index is not None else ""


def _file(start: str, plant: str, name: str = "") -> str:
    for survey in SURVEYS:
        if survey.start.isoformat() == start and survey.plant == plant and survey.name == name:
            return "surveys/" + survey.file
    raise KeyError(start, plant)


HARMLESS = {
    "clad vessel", "vacuum vessel with its external minimum", "on-stream inspection accepted in place of internal",
    "idle and protected for four years",
}  # fmt: skip
"""Named because the tool must get them right, not because anything is wrong with the vessel."""

REGISTER, EVENT_FILE = "brackwater_register.xlsx", "events.toml"

TROUBLES: tuple[Trouble, ...] = (
    Trouble("wall below required", "D-203", "told first when the file of May 2026 is loaded; standing `below required`, overdue, repair is the way out; the relief device stands above what the wall carries", "course 1", 0, _file("2026-05-11", "urea"), "below required"),
    Trouble("wall at required within the reading error", "D-313", "the wall is above required by less than 1.645 × 0.25 mm: `at required`", "course 1", 0, _file("2026-06-08", "nitrate"), "at required"),
    Trouble("used up by its rate", "D-214", "left out of the survey of 2026; measured above required in 2024, by its rate below it today: `used up by its rate`, overdue", "course 1", 0, _file("2024-04-08", "urea"), "used up by its rate"),
    Trouble("rating short with all three ways out", "D-112", "on the short-life plateau: the inspection is due after two years, but twice the loss leaves too little wall at the planned survey; date, pressure and repair are printed", "course 2", 0, _file("2025-10-06", "ammonia"), "rating short"),
    Trouble("re-check within ninety days", "D-112", "eight locations read again three weeks later: one observation with the first reading, the least of the two governs", "course 2", None, _file("2025-10-27", "ammonia", "D-112_recheck")),
    Trouble("relief device set above what the wall carries today", "D-206", "re-rated to 1.9 MPa in 2012 after the survey of May, the valve still stands at the nameplate's 2.4 MPa: `set above what the wall carries today`", "course 1", 0, REGISTER, "set above what the wall carries today"),
    Trouble("rate doubled after a change of service", "D-216", "restart of 2019-06-03: the old rate of about 0.11 mm/year ends there, the new one of about 0.25 mm/year plans", "course 1", 0, EVENT_FILE),
    Trouble("held by half life", "D-216", "no planned survey, so the half-life date is the carry-to date: `held by half life` instead of a margin", "course 1", 0, REGISTER, "held by half life"),
    Trouble("no planned survey", "D-216", "gap `no planned survey`; D-126 has none either", "", None, REGISTER, "no planned survey"),
    Trouble("suspected unit slip", "D-216", "one reading written in mm under a heading in inches: doubt, queried, does not count", "course 2", 2, _file("2012-05-07", "urea"), "suspected unit slip"),
    Trouble("two locations swapped", "T-304", "readings of two locations changed places in 2018: gain at one, large loss at the other; the low one governs until it is voided", "course 3", 0, _file("2018-03-05", "nitrate"), "apparent gain"),
    Trouble("wind and weight not assessed", "T-304", "taller than five diameters and required_thickness_axial blank", "", None, REGISTER, "wind and weight not assessed"),
    Trouble("doubled echo on a thin wall", "D-126", "a wall of about 2.4 mm reads about 4.8: loads as a doubt, queried, does not count", "drain N6", 0, _file("2025-10-06", "ammonia"), "thickness far above nominal"),
    Trouble("overdue", "D-126", "last internal look 2015-06-18, ten years are over: flag `overdue`", "", None, REGISTER, "overdue"),
    Trouble("hot survey corrected twice", "D-402", "gauge and clerk both took 4 % off for 240 °C: every location about 1 mm low; told as `shared shift`, and until the survey is voided or repeated its rate stands: `running out`", "course 1", 0, _file("2026-02-02", "utilities"), "shared shift"),
    Trouble("apparent gain", "D-205", "1.5 mm too thick in 2021: doubt when loaded, the earlier lesser wall is used; the fall back in 2024 is a large loss", "north head", 1, _file("2021-10-04", "urea"), "apparent gain"),
    Trouble("course replaced mid-history", "T-303", "restart of 2020-10-08: the history of course 2 begins with the baseline of the day after", "course 2", 0, _file("2020-10-08", "nitrate", "T-303_new_course")),
    Trouble("head never measured", "D-125", "four locations marked, none ever read: `no verdict`", "south head", None, REGISTER, "part never measured"),
    Trouble("no relief device on the register", "D-125", "gap `no relief device`", "", None, REGISTER, "no relief device"),
    Trouble("pressure and life governed by different locations", "T-151", "course 4 is thin and hardly thins: it governs the pressure; course 1 is thick and thins fast: it governs the life", "course 1", 0, _file("2025-10-06", "ammonia"), "running out"),
    Trouble("withdrawn location", "T-151", "withdrawn in 2019 and not counted since", "course 3", 5, EVENT_FILE, "withdrawn"),
    Trouble("clad vessel", "F-141", "readings include 3 mm of cladding that does not count: it is taken off before anything is compared", "course 1", 0, _file("2025-10-06", "ammonia")),
    Trouble("derated years ago", "D-205", "current MAWP 1.6 MPa from 2016-04-01, nameplate 2.1 MPa: never printed above the nameplate, held at 1.6", "", None, REGISTER),
    Trouble("chosen rate", "D-205", "0.16 mm/year chosen in August 2026 for course 1, with two names", "course 1", None, EVENT_FILE),
    Trouble("idle and protected for four years", "D-215", "2016-11-01 to 2020-11-01 are left out of every count of years", "", None, EVENT_FILE),
    Trouble("structural minimum governs", "D-422", "6 mm by structure, under 3 mm by pressure: no lower pressure helps, so that way out is absent", "course 1", 0, REGISTER, "rating short"),
    Trouble("survey planned after the due date", "D-422", "next survey planned after half life", "", None, REGISTER, "planned after due"),
    Trouble("vacuum vessel with its external minimum", "H-221S", "11 mm by external pressure governs the courses", "course 1", None, REGISTER),
    Trouble("vacuum vessel without its external minimum", "T-222", "external pressure recorded, minimum blank: `no verdict`", "", None, REGISTER, "vacuum not assessed"),
    Trouble("local thin area with a scan", "D-311", "a location marked `local`; the grid lies in scans/", "course 1", 0, "scans/D-311_course_1.csv", "running out"),
    Trouble("one low last reading", "D-123", "one reading 0.8 mm low in 2025: the short-term rate governs by less than its error, flag `re-gauge`", "course 1", 0, _file("2025-10-06", "ammonia"), "re-gauge"),
    Trouble("on-stream inspection accepted in place of internal", "T-152", "the on-stream inspection of 2023-09-19 counts while the acceptance of 2023-08-21 stands; without it the vessel were overdue", "", None, EVENT_FILE),
    Trouble("deferral in force", "R-411", "due 2026-11-08, deferred before that day to 2027-03-31: not overdue", "", None, EVENT_FILE),
    Trouble("retired vessel", "D-128", "block `retired`", "", None, EVENT_FILE, "retired"),
    Trouble("out of service", "R-413", "block `out of service`", "", None, EVENT_FILE, "out of service"),
    Trouble("idle now", "D-511", "idle and not protected since 2024-03-01: counts as service, block `idle`", "", None, EVENT_FILE, "idle"),
    Trouble("no echo at the last visit", "D-511", "no thickness, which may itself be a thin wall: `no verdict`", "course 1", 3, _file("2026-09-07", "storage"), "no echo at last visit"),
    Trouble("location never measured", "D-313", "one of five marked spots of the head was never read: gap, beside parts that were measured", "top head", 4, REGISTER, "location never measured"),
    Trouble("location measured once", "D-205", "marked in 2026 and read once: its rate rests on nominal thickness", "south head", 4, _file("2026-05-11", "urea"), "location measured once"),
    Trouble("baseline equal to nominal", "D-313", "copied from the drawing, not measured: taken as nominal, with a doubt", "top head", 1, REGISTER, "baseline equals nominal"),
    Trouble("old receiver with thin papers", "R-413", "nameplate, edition and one joint efficiency blank: design pressure stands for the nameplate, gap `missing datum`", "top head", None, REGISTER, "missing datum"),
    Trouble("blank cells that count as none", "D-511", "lining, structural minimum and loss side blank: each a gap", "course 1", None, REGISTER, "structural minimum blank"),
    Trouble("sheet in inches", "D-313", "the first nitrate survey is in inches", "", None, _file("2011-06-06", "nitrate")),
    Trouble("sheet in thousandths of an inch", "B-501", "the first storage survey is in thou", "", None, _file("2013-04-08", "storage")),
    Trouble("title and blank rows above the table", "D-401", "found by its header row", "", None, _file("2012-09-10", "utilities")),
)  # fmt: skip

LOADING_DOUBTS: tuple[tuple[str, str, int, str], ...] = (
    (REGISTER, "nameplate blank", 1, "R-413"),
    (_file("2012-05-07", "urea"), "suspected unit slip", 1, "D-216, written in mm under inches"),
    (_file("2012-05-07", "urea"), "thickness far above nominal", 1, "the same reading"),
    (_file("2018-03-05", "nitrate"), "apparent gain", 1, "T-304, one of the two swapped locations"),
    (_file("2018-03-05", "nitrate"), "large loss", 1, "T-304, the other"),
    (_file("2020-10-12", "nitrate"), "apparent gain", 1, "T-304, back in its place"),
    (_file("2020-10-12", "nitrate"), "large loss", 1, "T-304, back in its place"),
    (_file("2021-10-04", "urea"), "apparent gain", 1, "D-205"),
    (_file("2024-04-08", "urea"), "large loss", 1, "D-205, back from the gain"),
    (_file("2025-10-06", "ammonia"), "thickness far above nominal", 1, "D-126, the doubled echo"),
    (
        _file("2026-02-02", "utilities"),
        "large loss",
        17,
        "D-402, corrected twice; the other nine fell by less than the error explains",
    ),
)
"""The doubts with which the files load, one line a file and code; no file of the demo has a fault."""

README_HEAD = """# Brackwater Works

An invented coastal fertiliser works: thirty-odd pressure vessels, surveyed from 2011 to 2026, appraised on 2026-12-01.
Every name, number and person is made up. Nothing here may be used to judge a real vessel. fleet computes and
records; it does not decide. A licensed engineer and the authorised inspector do, under the local code and law.

| file | what it is |
|---|---|
| `brackwater_register.xlsx` | sheets vessels, parts, locations, inspections, relief; load it first |
| `surveys/` | the readings, as technicians handed them in; the date in a file's name is the day it arrived |
| `events.toml` | dated facts that stand in no sheet: restarts, states, decisions; `entered_on` sets the order |
| `scans/` | a grid of thicknesses over the local thin area of D-311 |
| `refused/` | a sheet that must be refused, with a reading below required that must be told first all the same |
| `expected.toml` | for tests: counts, and per vessel the standing, block, flags and troubles |
| `make_brackwater.py` | writes all of this (and this page) from `brackwater_vessels.py` and `brackwater_story.py`; `--check` reckons every vessel a second way |

Order of loading: the register; then surveys and events by day, an event before a file of the same day.
Design codes and stresses: every vessel by `asme8-1` except R-412 (`membrane`); each part names the edition its
allowable stress comes from. The wall of a vessel with an old nameplate is rated with the old, lesser stress.
"""
