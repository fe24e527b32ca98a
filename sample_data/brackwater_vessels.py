"""The invented works: every vessel, part, wall and rate of Brackwater Works, as one table.

Nothing here is taken from a real plant or from a printed example. Lengths are mm, pressures MPa (static head kPa),
temperatures °C, rates mm/year. Allowable stresses are those of the edition named beside them.
"""
# ruff: noqa: E501  one part or one trouble stands on one line of its table, however long

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import date
from typing import Any

NEW = "ASME VIII-1, 1999 addenda or later (margin 3.5 on tensile strength)"
OLD = "ASME VIII-1, before the 1999 addenda (margin 4 on tensile strength)"
AS_OF = date(2026, 12, 1)


@dataclass(frozen=True)
class Part:
    """One part: its drawing, its true rate of loss and how many marked locations it has."""

    name: str
    shape: str
    nominal: float
    rate: float
    count: int
    margin: float | None = None  # wall above required at the worst location at its last survey; None: by age
    noise: float = 0.12
    spread: tuple[float, float] = (0.3, 1.3)  # how much thicker the other locations end than the worst
    drawing: dict[str, Any] = field(default_factory=dict)  # columns of the parts sheet, without their units


@dataclass(frozen=True)
class Vessel:
    """One vessel: its nameplate, its parts and what the appraisal of 2026-12-01 should say of it."""

    tag: str
    plant: str
    service: str
    contents: str
    material: tuple[str, float, str]
    edition: str
    in_service: date
    mawp: float  # nameplate
    temperature: float
    parts: tuple[Part, ...]
    standing: str
    next_survey: date | None
    internals: tuple[date, ...] = ()
    externals: tuple[date, ...] = ()
    current: float | None = None  # the re-rated value in force on AS_OF, None: nameplate
    relief: float | None = None  # MPa; None: the current MAWP
    valves: int = 1
    flags: tuple[str, ...] = ()
    block: str = ""  # '' : as the standing
    troubles: tuple[str, ...] = ()
    columns: dict[str, Any] = field(default_factory=dict)  # more columns of the vessels sheet
    code: str = "asme8-1"
    last: date | None = None  # no survey after this day
    pause: tuple[date, date] | None = None  # idle protected between these days
    change: tuple[date, str, float] | None = None  # day, part, new rate
    new_metal: tuple[date, str, float] | None = None  # day, part, wall as delivered


def _drawing(head: float, more: dict[str, Any], **own: Any) -> dict[str, Any]:
    base = {"static_head": head, "structural_minimum": 0, "loss_side": "inside", "lining": "none"}
    return {**base, **own, **more}


def shell(
    name: str,
    di: float,
    length: float,
    nominal: float,
    rate: float,
    count: int,
    *,
    head: float = 0,
    el: float = 0.85,
    ec: float = 0.85,
    margin: float | None = None,
    noise: float = 0.12,
    **more: Any,
) -> Part:
    """Draw a shell course on its inside diameter."""
    own = {"inside_diameter": di, "length": length, "joint_efficiency_long": el, "joint_efficiency_circ": ec}
    drawing = _drawing(head, more, required_thickness_axial=0, **own)
    return Part(name, "cylinder", nominal, rate, count, margin, noise, drawing=drawing)


def neck(
    name: str,
    do: float,
    nominal: float,
    rate: float,
    count: int,
    *,
    head: float = 0,
    margin: float | None = None,
    noise: float = 0.05,
    **more: Any,
) -> Part:
    """Draw a nozzle neck of seamless pipe on its outside diameter."""
    own = {"outside_diameter": do, "length": 200, "joint_efficiency_long": 1.0, "joint_efficiency_circ": 1.0}
    drawing = _drawing(head, more, required_thickness_axial=0, **own)
    return Part(name, "nozzle neck", nominal, rate, count, margin, noise, (0.05, 0.3), drawing)


def ellipsoidal(
    name: str,
    di: float,
    nominal: float,
    rate: float,
    count: int,
    *,
    head: float = 0,
    e: float = 0.85,
    margin: float | None = None,
    noise: float = 0.12,
    **more: Any,
) -> Part:
    """Draw a 2:1 ellipsoidal head."""
    own = {"inside_diameter": di, "axis_ratio": 2, "joint_efficiency": e}
    drawing = _drawing(head, more, required_thickness_axial=0, **own)
    return Part(name, "ellipsoidal head", nominal, rate, count, margin, noise, drawing=drawing)


def torispherical(
    name: str,
    di: float,
    crown: float,
    knuckle: float,
    nominal: float,
    rate: float,
    count: int,
    *,
    head: float = 0,
    e: float = 1.0,
    margin: float | None = None,
    noise: float = 0.12,
    **more: Any,
) -> Part:
    """Draw a torispherical head with its crown and knuckle radius."""
    own = {"inside_diameter": di, "crown_radius": crown, "knuckle_radius": knuckle, "joint_efficiency": e}
    drawing = _drawing(head, more, required_thickness_axial=0, **own)
    return Part(name, "torispherical head", nominal, rate, count, margin, noise, drawing=drawing)


def hemispherical(
    name: str, di: float, nominal: float, rate: float, count: int, *, e: float = 0.85, **more: Any
) -> Part:
    """Draw a hemispherical head."""
    own = {"inside_diameter": di, "joint_efficiency": e}
    noise = more.pop("noise", 0.12)
    drawing = _drawing(0, more, required_thickness_axial=0, **own)
    return Part(name, "hemispherical head", nominal, rate, count, None, noise, drawing=drawing)


def belt(name: str, di: float, nominal: float, rate: float, count: int, *, head: float) -> Part:
    """Draw a belt or cap of a sphere."""
    own = {"inside_diameter": di, "joint_efficiency": 1.0}
    return Part(
        name, "sphere", nominal, rate, count, drawing=_drawing(head, {}, required_thickness_axial=0, **own)
    )


def cone(
    name: str, di: float, alpha: float, length: float, nominal: float, rate: float, count: int, *, head: float = 0,
    el: float = 0.85, ec: float = 0.85, **more: Any,
) -> Part:  # fmt: skip
    """Draw a cone; the inside diameter is that of the large end."""
    own = {"inside_diameter": di, "length": length, "half_apex_angle": alpha}
    own |= {"joint_efficiency_long": el, "joint_efficiency_circ": ec}
    return Part(
        name, "cone", nominal, rate, count, drawing=_drawing(head, more, required_thickness_axial=0, **own)
    )


def cover(
    name: str, across: float, factor: float, nominal: float, rate: float, count: int, *, bolted: bool = False
) -> Part:
    """Draw a flat cover: welded in on its inside diameter, or bolted on its gasket diameter."""
    own = {"gasket_diameter" if bolted else "inside_diameter": across, "cover_factor": factor}
    drawing = _drawing(0, {}, joint_efficiency=1.0, required_thickness_axial=0, **own)
    return Part(name, "flat cover", nominal, rate, count, drawing=drawing)


def _d(text: str) -> date:
    return date.fromisoformat(text)


P70_NEW, P70_OLD = ("SA-516-70", 137.9, NEW), ("SA-516-70", 120.7, OLD)
P70_HOT = ("SA-516-70", 129.6, NEW + ", value for 343 °C")
P60_NEW, P60_OLD = ("SA-516-60", 117.9, NEW), ("SA-516-60", 103.4, OLD)
P285_OLD = ("SA-285-C", 95.1, OLD)
L304 = ("SA-240-304L", 115.1, NEW + ", upper line")
L304_LOW = ("SA-240-304L", 98.6, NEW + ", lower line")

AMMONIA: tuple[Vessel, ...] = (
    Vessel("D-112", "ammonia", "refrigerant ammonia accumulator", "ammonia", P70_NEW, "2007", _d("2008-03-10"), 1.9, 60,
        (
            ellipsoidal("west head", 2200, 26, 0.12, 5, head=14, margin=4.0),
            shell("course 1", 2200, 2400, 28, 0.28, 6, head=14, margin=3.6, noise=0.08),
            shell("course 2", 2200, 2400, 28, 0.45, 8, head=14, margin=1.45, noise=0.04, alert_thickness=21.0),
            ellipsoidal("east head", 2200, 26, 0.12, 5, head=14, margin=4.1),
            neck("liquid outlet N4", 168.3, 11.0, 0.05, 2, head=14),
        ),
        "rating short", _d("2027-09-20"), (_d("2013-09-10"), _d("2021-04-13"), _d("2025-10-20")), (_d("2025-10-22"),),
        flags=("survey within the year",), troubles=("rating short with all three ways out", "re-check within ninety days")),
    Vessel("D-121", "ammonia", "synthesis gas knock-out drum", "synthesis gas", P70_NEW, "2001", _d("2003-05-20"), 3.0, 90,
        (
            ellipsoidal("bottom head", 1800, 28, 0.05, 4, head=4, e=1.0),
            shell("course 1", 1800, 2000, 28, 0.05, 6, head=4, el=1.0, ec=1.0),
            shell("course 2", 1800, 2000, 28, 0.04, 6, el=1.0, ec=1.0),
            ellipsoidal("top head", 1800, 28, 0.03, 4, e=1.0),
        ),
        "rating held", _d("2028-03-15")),
    Vessel("D-123", "ammonia", "synthesis loop separator", "ammonia and hydrogen", P70_NEW, "2001", _d("2003-05-20"), 8.0, 70,
        (
            hemispherical("bottom head", 1500, 36, 0.05, 4, e=1.0),
            shell("course 1", 1500, 1800, 54, 0.06, 6, head=8, el=1.0, ec=1.0, margin=4.4, noise=0.05),
            shell("course 2", 1500, 1800, 54, 0.05, 6, el=1.0, ec=1.0, margin=5.4, noise=0.06),
            hemispherical("top head", 1500, 36, 0.03, 4, e=1.0),
        ),
        "running out", _d("2028-03-15"), flags=("re-gauge",), block="re-gauge",
        troubles=("one low last reading",)),
    Vessel("D-125", "ammonia", "purge gas drum", "hydrogen and nitrogen", P70_OLD, "1986", _d("1988-09-01"), 1.5, 60,
        (
            ellipsoidal("north head", 1200, 16, 0.04, 4),
            shell("course 1", 1200, 2600, 18, 0.06, 8),
            ellipsoidal("south head", 1200, 16, 0.04, 4),
        ),
        "no verdict", _d("2028-03-15"), troubles=("head never measured", "no relief device on the register")),
    Vessel("D-126", "ammonia", "letdown flash drum", "ammonia", P70_OLD, "1986", _d("1988-09-01"), 1.0, 80,
        (
            ellipsoidal("bottom head", 1600, 15, 0.05, 4, head=9),
            shell("course 1", 1600, 2200, 16, 0.06, 8, head=9),
            ellipsoidal("top head", 1600, 15, 0.03, 4),
            neck("drain N6", 48.3, 2.9, 0.015, 3, head=9, margin=0.92, noise=0.04, structural_minimum=1.5),
        ),
        "rating held", None, flags=("overdue",), troubles=("overdue", "doubled echo on a thin wall"),
        columns={"last_internal_on": _d("2015-06-18"), "last_external_on": _d("2024-11-12")}),
    Vessel("D-128", "ammonia", "former purge separator", "ammonia", P60_OLD, "1974", _d("1976-04-01"), 1.2, 60,
        (
            ellipsoidal("bottom head", 1000, 12, 0.06, 3),
            shell("course 1", 1000, 1800, 10, 0.06, 5, margin=0.9),
            ellipsoidal("top head", 1000, 12, 0.05, 3),
        ),
        "", None, block="retired", troubles=("retired vessel",), last=_d("2018-12-31"), valves=0),
    Vessel("F-141", "ammonia", "converter feed vessel, clad", "synthesis gas", P70_NEW, "2004", _d("2006-08-15"), 6.0, 200,
        (
            ellipsoidal("bottom head", 1400, 38, 0.03, 5, e=1.0, lining="integral clad", lining_thickness=3.0, lining_counts_in_strength="no"),
            shell("course 1", 1400, 2100, 38, 0.03, 6, el=1.0, ec=1.0, lining="integral clad", lining_thickness=3.0, lining_counts_in_strength="no"),
            shell("course 2", 1400, 2100, 38, 0.03, 6, el=1.0, ec=1.0, lining="integral clad", lining_thickness=3.0, lining_counts_in_strength="no"),
            ellipsoidal("top head", 1400, 38, 0.02, 5, e=1.0, lining="integral clad", lining_thickness=3.0, lining_counts_in_strength="no"),
        ),
        "rating held", _d("2028-03-15"), troubles=("clad vessel",)),
    Vessel("T-151", "ammonia", "carbon dioxide absorber", "synthesis gas and potash solution", P70_OLD, "1986", _d("1988-09-01"), 2.8, 110,
        (
            ellipsoidal("bottom head", 3000, 44, 0.08, 5, head=90, e=1.0, margin=4.6),
            shell("course 1", 3000, 4500, 46, 0.36, 8, head=90, el=1.0, ec=1.0, margin=3.4, noise=0.06, required_thickness_axial=24),
            shell("course 2", 3000, 4500, 42, 0.06, 6, head=50, el=1.0, ec=1.0, required_thickness_axial=20, margin=3.6),
            shell("course 3", 3000, 4500, 42, 0.05, 6, head=10, el=1.0, ec=1.0, required_thickness_axial=16, margin=3.8),
            shell("course 4", 3000, 4500, 38, 0.02, 6, el=1.0, ec=1.0, margin=1.2, noise=0.03, required_thickness_axial=12),
            ellipsoidal("top head", 3000, 42, 0.03, 4, e=1.0),
        ),
        "running out", _d("2028-03-15"), troubles=("pressure and life governed by different locations", "withdrawn location")),
    Vessel("T-152", "ammonia", "carbon dioxide stripper", "potash solution", P60_NEW, "2000", _d("2001-11-05"), 0.35, 125,
        (
            ellipsoidal("bottom head", 2400, 14, 0.03, 5, head=40, structural_minimum=6),
            shell("course 1", 2400, 3200, 14, 0.04, 6, head=40, required_thickness_axial=9, structural_minimum=6),
            shell("course 2", 2400, 3200, 14, 0.04, 6, head=8, required_thickness_axial=8, structural_minimum=6),
            shell("course 3", 2400, 3200, 14, 0.03, 6, required_thickness_axial=7, structural_minimum=6),
            shell("course 4", 2400, 3200, 14, 0.03, 6, required_thickness_axial=6, structural_minimum=6),
            ellipsoidal("top head", 2400, 14, 0.02, 5, structural_minimum=6),
        ),
        "rating held", _d("2028-03-15"), troubles=("on-stream inspection accepted in place of internal",),
        internals=(_d("2013-09-12"),), externals=(_d("2024-11-14"),)),
)  # fmt: skip

UREA: tuple[Vessel, ...] = (
    Vessel("D-203", "urea", "carbamate recycle drum", "ammonium carbamate solution", L304, "2004", _d("2006-02-20"), 1.8, 120,
        (
            ellipsoidal("west head", 1400, 18, 0.16, 5, head=11, margin=1.9, noise=0.06),
            shell("course 1", 1400, 1900, 18, 0.25, 8, head=11, margin=-0.45, noise=0.05, alert_thickness=14.0),
            shell("course 2", 1400, 1900, 18, 0.18, 6, head=11, margin=1.6, noise=0.06),
            ellipsoidal("east head", 1400, 18, 0.15, 5, head=11, margin=2.2, noise=0.06),
            neck("inlet N1", 219.1, 8.18, 0.08, 3, head=11),
        ),
        "below required", _d("2027-05-10"), flags=("overdue",), troubles=("wall below required",),
        externals=(_d("2026-05-20"),)),
    Vessel("D-205", "urea", "liquid ammonia receiver", "ammonia", P70_OLD, "1985", _d("1987-06-15"), 2.1, 50,
        (
            ellipsoidal("north head", 2000, 24, 0.07, 5, head=13, margin=4.4),
            shell("course 1", 2000, 2400, 24, 0.10, 7, head=13, margin=3.8, noise=0.05),
            shell("course 2", 2000, 2400, 24, 0.08, 7, head=13, margin=4.4),
            ellipsoidal("south head", 2000, 24, 0.06, 5, head=13, margin=4.7),
        ),
        "rating held", _d("2028-09-12"), current=1.6, troubles=("derated years ago", "chosen rate", "apparent gain", "location measured once"),
        columns={"current_mawp": 1.6, "current_mawp_from": _d("2016-04-01"), "current_mawp_basis": "re-rated to 1.60 MPa on calculation BW-C-0416 after the survey of 2014"}),
    Vessel("D-206", "urea", "recycle ammonia drum", "ammonia", P70_OLD, "1985", _d("1987-06-15"), 2.4, 50,
        (
            ellipsoidal("north head", 1800, 24, 0.06, 5, head=12, margin=3.6, noise=0.08),
            shell("course 1", 1800, 2200, 24, 0.05, 7, head=12, margin=2.2, noise=0.05),
            shell("course 2", 1800, 2200, 24, 0.05, 7, head=12, margin=2.6, noise=0.05),
            ellipsoidal("south head", 1800, 24, 0.06, 5, head=12, margin=3.4, noise=0.08),
        ),
        "rating held", _d("2028-09-12"), current=1.9, relief=2.4, troubles=("relief device set above what the wall carries today",)),
    Vessel("D-214", "urea", "off-gas scrubber bottom drum", "carbamate condensate", L304, "2004", _d("2005-04-11"), 1.2, 110,
        (
            ellipsoidal("bottom head", 1200, 14, 0.18, 4, head=7, margin=2.6, noise=0.06),
            shell("course 1", 1200, 1800, 14, 0.33, 7, head=7, margin=0.66, noise=0.02),
            ellipsoidal("top head", 1200, 14, 0.12, 4, margin=3.0, noise=0.08),
        ),
        "used up by its rate", _d("2027-05-10"), flags=("overdue",),
        troubles=("used up by its rate",), last=_d("2024-12-31")),
    Vessel("D-215", "urea", "solution storage drum", "urea solution", P60_NEW, "2001", _d("2003-03-17"), 0.9, 105,
        (
            ellipsoidal("bottom head", 1600, 16, 0.15, 4, head=17, margin=4.2, noise=0.08),
            shell("course 1", 1600, 2200, 16, 0.20, 7, head=17, margin=3.6, noise=0.06),
            shell("course 2", 1600, 2200, 16, 0.16, 6, margin=4.2, noise=0.06),
            ellipsoidal("top head", 1600, 16, 0.08, 4, margin=4.4, noise=0.08),
        ),
        "rating held", _d("2028-09-12"), internals=(_d("2011-08-09"), _d("2020-11-04")), troubles=("idle and protected for four years",),
        pause=(_d("2016-11-01"), _d("2020-11-01"))),
    Vessel("D-216", "urea", "process condensate drum", "process condensate", P60_NEW, "2001", _d("2003-03-17"), 1.1, 120,
        (
            ellipsoidal("bottom head", 1500, 16, 0.06, 4, head=9, margin=5.0, noise=0.08),
            shell("course 1", 1500, 2000, 16, 0.11, 8, head=9, margin=2.2, noise=0.03),
            shell("course 2", 1500, 2000, 16, 0.05, 6, margin=5.0, noise=0.08),
            ellipsoidal("top head", 1500, 16, 0.04, 4, margin=5.4, noise=0.08),
            cover("manway cover", 540, 0.3, 34, 0.02, 2, bolted=True),
        ),
        "running out", None, internals=(_d("2014-06-11"), _d("2023-05-09")), change=(_d("2019-06-03"), "course 1", 0.25),
        troubles=("rate doubled after a change of service", "held by half life", "no planned survey", "suspected unit slip")),
    Vessel("H-211S", "urea", "ammonia preheater, shell chamber", "low-pressure steam", P60_NEW, "2001", _d("2003-03-17"), 1.0, 185,
        (
            shell("shell", 1000, 4200, 12, 0.03, 8),
            ellipsoidal("rear head", 1000, 12, 0.02, 4),
            neck("steam inlet N2", 168.3, 11.0, 0.03, 3),
        ),
        "rating held", _d("2028-09-12"), columns={"assembly": "H-211"}),
    Vessel("H-211T", "urea", "ammonia preheater, tube chamber", "ammonia", P70_NEW, "2001", _d("2003-03-17"), 3.0, 120,
        (
            shell("channel", 1000, 900, 20, 0.03, 6, el=1.0, ec=1.0),
            cover("channel end plate", 1000, 0.3, 92, 0.03, 4),
            Part("tubesheet", "other", 84, 0.02, 2, drawing={"required_thickness_given": 72.0, "structural_minimum": 0, "required_thickness_axial": 0, "loss_side": "inside", "lining": "none", "static_head": 0, "other_pressure_limit": 3.4}),
        ),
        "rating held", _d("2028-09-12"), columns={"assembly": "H-211"}),
    Vessel("H-221S", "urea", "vacuum condenser, shell chamber", "water vapour and ammonia", P60_NEW, "2001", _d("2003-03-17"), 0.35, 110,
        (
            ellipsoidal("front head", 2600, 16, 0.03, 4, required_thickness_external=10.5),
            shell("course 1", 2600, 2600, 16, 0.03, 7, required_thickness_external=11.0),
            shell("course 2", 2600, 2600, 16, 0.03, 7, required_thickness_external=11.0),
            ellipsoidal("rear head", 2600, 16, 0.02, 4, required_thickness_external=10.5),
        ),
        "rating held", _d("2028-09-12"), troubles=("vacuum vessel with its external minimum",),
        columns={"external_design_pressure": 0.1013, "assembly": "H-221"}),
    Vessel("T-222", "urea", "vacuum evaporator", "urea melt", L304, "2004", _d("2006-02-20"), 0.35, 140,
        (
            cone("bottom cone", 1800, 25, 1300, 14, 0.03, 5, head=22),
            shell("course 1", 1800, 2000, 14, 0.04, 6, head=12),
            shell("course 2", 1800, 2000, 14, 0.04, 6),
            ellipsoidal("top head", 1800, 14, 0.02, 4),
        ),
        "no verdict", _d("2028-09-12"), troubles=("vacuum vessel without its external minimum",), columns={"external_design_pressure": 0.1013}),
)  # fmt: skip

NITRATE: tuple[Vessel, ...] = (
    Vessel("T-301", "nitrate", "nitrous gas absorber", "nitric acid", L304, "2000", _d("2001-10-22"), 0.9, 70,
        (
            ellipsoidal("bottom head", 3200, 20, 0.03, 5, head=30, e=1.0),
            shell("course 1", 3200, 3000, 20, 0.03, 6, head=30, el=1.0, ec=1.0, required_thickness_axial=15),
            shell("course 2", 3200, 3000, 18, 0.03, 6, el=1.0, ec=1.0, required_thickness_axial=12),
            shell("course 3", 3200, 3000, 18, 0.02, 6, el=1.0, ec=1.0, required_thickness_axial=10),
            shell("course 4", 3200, 3000, 18, 0.02, 6, el=1.0, ec=1.0, required_thickness_axial=8),
            shell("course 5", 3200, 3000, 18, 0.02, 6, el=1.0, ec=1.0, required_thickness_axial=6),
            ellipsoidal("top head", 3200, 18, 0.02, 5, e=1.0),
        ),
        "rating held", _d("2028-06-14")),
    Vessel("T-303", "nitrate", "bleaching column", "nitric acid", L304, "2000", _d("2001-10-22"), 0.8, 80,
        (
            ellipsoidal("bottom head", 2800, 16, 0.03, 5, head=25),
            shell("course 1", 2800, 2800, 16, 0.04, 6, head=25, required_thickness_axial=11, margin=3.4),
            shell("course 2", 2800, 2800, 16, 0.26, 8, required_thickness_axial=9, margin=0.9, noise=0.06),
            shell("course 3", 2800, 2800, 16, 0.03, 6, required_thickness_axial=7, margin=3.6),
            ellipsoidal("top head", 2800, 16, 0.02, 5),
        ),
        "rating held", _d("2028-06-14"), new_metal=(_d("2020-10-08"), "course 2", 16.35), troubles=("course replaced mid-history",)),
    Vessel("T-304", "nitrate", "nitrate dust scrubber", "ammonium nitrate solution", L304_LOW, "2000", _d("2001-10-22"), 0.5, 80,
        (
            cone("bottom cone", 2400, 30, 1500, 16, 0.04, 5, head=38, el=0.7, ec=0.7, required_thickness_axial=None),
            shell("course 1", 2400, 3300, 16, 0.05, 7, head=25, el=0.7, ec=0.7, required_thickness_axial=None),
            shell("course 2", 2400, 3300, 16, 0.04, 7, el=0.7, ec=0.7, required_thickness_axial=None),
            shell("course 3", 2400, 3300, 16, 0.05, 7, el=0.7, ec=0.7, margin=4.3, required_thickness_axial=None),
            shell("course 4", 2400, 3300, 16, 0.03, 6, el=0.7, ec=0.7, required_thickness_axial=None),
            ellipsoidal("top head", 2400, 16, 0.02, 4, e=0.7, required_thickness_axial=None),
        ),
        "rating held", _d("2028-06-14"), troubles=("two locations swapped", "wind and weight not assessed")),
    Vessel("D-311", "nitrate", "neutraliser", "ammonium nitrate solution", L304_LOW, "2004", _d("2006-09-18"), 0.6, 150,
        (
            ellipsoidal("bottom head", 2200, 14, 0.08, 5, head=20, margin=3.4, noise=0.06),
            shell("course 1", 2200, 2200, 14, 0.25, 8, head=20, margin=1.4, noise=0.04),
            shell("course 2", 2200, 2200, 14, 0.08, 7, margin=4.2, noise=0.06),
            ellipsoidal("top head", 2200, 14, 0.05, 4, margin=4.6),
        ),
        "running out", _d("2027-06-16"), flags=("survey within the year",), troubles=("local thin area with a scan",),
        externals=(_d("2026-06-15"),)),
    Vessel("D-313", "nitrate", "nitrate solution flash drum", "ammonium nitrate solution", P285_OLD, "1983", _d("1985-03-04"), 0.7, 110,
        (
            torispherical("bottom head", 1500, 1500, 150, 14, 0.04, 5, head=9, e=0.85, margin=1.2, noise=0.05),
            shell("course 1", 1500, 2400, 12, 0.07, 8, head=9, el=0.7, ec=0.7, margin=0.2, noise=0.03),
            torispherical("top head", 1500, 1500, 150, 14, 0.03, 5, e=0.85, margin=1.6, noise=0.05),
        ),
        "at required", _d("2027-06-16"), flags=("survey within the year",), troubles=("wall at required within the reading error", "location never measured", "baseline equal to nominal"),
        externals=(_d("2026-06-17"),)),
)  # fmt: skip

UTILITIES: tuple[Vessel, ...] = (
    Vessel("D-401", "utilities", "steam drum, boiler 1", "steam and boiler water", P70_HOT, "2001", _d("2002-09-30"), 4.4, 258,
        (
            ellipsoidal("north head", 1500, 34, 0.04, 5, head=5, e=1.0),
            shell("course 1", 1500, 2500, 34, 0.05, 7, head=5, el=1.0, ec=1.0),
            shell("course 2", 1500, 2500, 34, 0.05, 7, head=5, el=1.0, ec=1.0),
            ellipsoidal("south head", 1500, 34, 0.04, 5, head=5, e=1.0),
            neck("downcomer N3", 219.1, 18.26, 0.04, 3, head=5, noise=0.1),
        ),
        "rating held", _d("2028-02-16")),
    Vessel("D-402", "utilities", "steam drum, waste heat boiler", "steam and boiler water", P70_HOT, "2001", _d("2002-09-30"), 3.2, 240,
        (
            ellipsoidal("north head", 1500, 26, 0.04, 5, head=5, e=1.0, noise=0.05),
            shell("course 1", 1500, 2600, 25, 0.05, 8, head=5, el=1.0, ec=1.0, margin=4.5, noise=0.04),
            shell("course 2", 1500, 2600, 25, 0.05, 8, head=5, el=1.0, ec=1.0, margin=4.7, noise=0.04),
            ellipsoidal("south head", 1500, 26, 0.04, 5, head=5, e=1.0, noise=0.05),
        ),
        "running out", _d("2028-02-16"), troubles=("hot survey corrected twice",)),
    Vessel("D-421", "utilities", "deaerator", "boiler feed water", P60_NEW, "2000", _d("2001-05-14"), 0.35, 148,
        (
            ellipsoidal("west head", 2400, 13, 0.04, 5, head=24, structural_minimum=6),
            shell("course 1", 2400, 2800, 13, 0.05, 7, head=24, structural_minimum=6),
            shell("course 2", 2400, 2800, 13, 0.05, 7, head=24, structural_minimum=6),
            ellipsoidal("east head", 2400, 13, 0.04, 5, head=24, structural_minimum=6),
        ),
        "rating held", _d("2028-02-16")),
    Vessel("D-422", "utilities", "condensate flash tank", "steam condensate", P285_OLD, "1990", _d("1992-07-06"), 0.3, 143,
        (
            ellipsoidal("bottom head", 1200, 10, 0.08, 4, head=8, e=0.7, structural_minimum=6, margin=1.9, noise=0.05),
            shell("course 1", 1200, 2200, 10, 0.17, 8, head=8, el=0.7, ec=0.7, structural_minimum=6, margin=0.9, noise=0.02),
            ellipsoidal("top head", 1200, 10, 0.05, 4, e=0.7, structural_minimum=6, margin=2.4, noise=0.05),
        ),
        "rating short", _d("2029-03-14"), troubles=("structural minimum governs", "survey planned after the due date")),
    Vessel("R-411", "utilities", "instrument air receiver", "air", P60_NEW, "2000", _d("2001-05-14"), 1.1, 60,
        (
            torispherical("bottom head", 1800, 1800, 180, 18, 0.04, 4),
            shell("course 1", 1800, 2300, 15, 0.04, 7),
            torispherical("top head", 1800, 1800, 180, 18, 0.03, 4),
        ),
        "rating held", _d("2027-02-17"), (_d("2009-03-03"), _d("2016-11-08")), flags=("survey within the year",), troubles=("deferral in force",)),
    Vessel("R-412", "utilities", "workshop air receiver", "air", P60_NEW, "2010", _d("2014-02-10"), 1.0, 50,
        (
            hemispherical("bottom head", 700, 8, 0.03, 4, e=0.7, noise=0.05),
            shell("course 1", 700, 1400, 9, 0.03, 6, el=0.7, ec=0.7, noise=0.05),
            hemispherical("top head", 700, 8, 0.02, 4, e=0.7, noise=0.05),
        ),
        "rating held", _d("2028-02-16"), code="membrane"),
    Vessel("R-413", "utilities", "starting air receiver", "air", P285_OLD, "1983", _d("1985-11-11"), 1.0, 50,
        (
            torispherical("bottom head", 1100, 1100, 110, 15, 0.05, 3, e=0.85),
            shell("course 1", 1100, 1600, 12, 0.06, 5, margin=2.5, noise=0.06),
            torispherical("top head", 1100, 1100, 110, 15, 0.04, 3, e=0.85),
        ),
        "", _d("2028-02-16"), flags=("out of service",), block="out of service", troubles=("out of service", "old receiver with thin papers"), last=_d("2021-12-31"),
        columns={"nameplate_mawp": None, "code_edition": None}),
)  # fmt: skip

STORAGE: tuple[Vessel, ...] = (
    Vessel("B-501", "storage", "ammonia sphere 1", "ammonia", P70_OLD, "1986", _d("1989-07-10"), 0.55, 40,
        (
            belt("bottom cap", 16500, 28, 0.03, 7, head=102),
            belt("lower belt", 16500, 28, 0.03, 9, head=95),
            belt("equator belt", 16500, 26, 0.02, 9, head=65),
            belt("upper belt", 16500, 25, 0.02, 9, head=30),
            belt("top cap", 16500, 25, 0.02, 6, head=5),
        ),
        "rating held", _d("2028-09-20"), columns={"last_internal_on": _d("2020-05-12"), "last_external_on": _d("2025-05-13")}, valves=2),
    Vessel("B-502", "storage", "ammonia sphere 2", "ammonia", P70_NEW, "2001", _d("2004-06-21"), 0.6, 40,
        (
            belt("bottom cap", 18000, 30, 0.03, 7, head=112),
            belt("lower belt", 18000, 30, 0.03, 9, head=104),
            belt("equator belt", 18000, 28, 0.02, 9, head=72),
            belt("upper belt", 18000, 27, 0.02, 9, head=35),
            belt("top cap", 18000, 27, 0.02, 6, head=5),
        ),
        "rating held", _d("2028-09-20"), columns={"last_internal_on": _d("2020-05-19"), "last_external_on": _d("2025-05-14")}, valves=2),
    Vessel("D-511", "storage", "ship loading vapour drum", "ammonia vapour", P60_OLD, "1986", _d("1989-07-10"), 0.8, 40,
        (
            ellipsoidal("west head", 1300, 12, 0.05, 5),
            shell("course 1", 1300, 2600, 12, 0.06, 8),
            ellipsoidal("east head", 1300, 12, 0.05, 5),
        ),
        "no verdict", _d("2028-09-20"), flags=("idle",), block="idle", troubles=("idle now", "no echo at the last visit", "blank cells that count as none")),
)  # fmt: skip

VESSELS: tuple[Vessel, ...] = AMMONIA + UREA + NITRATE + UTILITIES + STORAGE

TURNAROUNDS = {  # internal looks where a vessel names none of its own; external looks likewise
    "ammonia": (("2013-09-11", "2021-04-14"), ("2016-05-18", "2020-11-10", "2024-11-12")),
    "urea": (("2014-06-12", "2021-10-13"), ("2016-09-21", "2020-09-15", "2024-11-19")),
    "nitrate": (("2013-06-12", "2020-10-14"), ("2015-10-21", "2019-10-16", "2024-10-09")),
    "utilities": (("2012-09-19", "2020-02-12"), ("2015-04-22", "2019-11-13", "2024-10-16")),
    "storage": (("2013-04-17", "2020-05-13"), ("2016-10-19", "2021-10-20", "2025-05-13")),
}
