"""What the files and commands promise, through the installed command, against sums done here by hand.

Nothing of fleet is imported: every expected figure follows from the printed formulas, rewritten here as the
pressure that a wall carries, and from the calendar. Required thickness is found by bisection.
"""

from __future__ import annotations

import datetime as dt
import json
import math
import shutil
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

import openpyxl
import pytest
from installed import document, fleet

AS_OF = ("--as-of", "2026-12-01")
FIRST, MIDDLE, LAST = dt.date(2016, 6, 1), dt.date(2021, 6, 1), dt.date(2026, 6, 1)
ASKED, CARRY, LOOKED = dt.date(2026, 12, 1), dt.date(2030, 6, 1), dt.date(2024, 6, 1)
S = 20 * 6.894757293168361  # 20 ksi in MPa
HEAD = 0.05  # 0.5 bar

# --- the register, one vessel for each shape, written by hand ------------------------------------------------------

VESSELS = """vessel,site,service,rules,design_code,code_edition,in_service_on,state,design_pressure [psi],\
design_temperature [degF],nameplate_mawp [MPa],current_mawp [bar],current_mawp_from,current_mawp_basis,\
external_design_pressure [kPa],operating_pressure [kgf/cm2],next_survey_on,last_internal_on,last_external_on,\
assembly,unit,contents,hazard_class,year_built,manufacturer_serial,jurisdiction_number,insulated,\
min_design_temperature [K],data_report
"""
PARTS = """vessel,part,shape,inside_diameter [mm],outside_diameter [in],length [cm],crown_radius [mm],\
knuckle_radius [mm],half_apex_angle [deg],axis_ratio,cover_factor,gasket_diameter [mm],nominal_thickness [mm],\
corrosion_allowance [mm],material,allowable_stress [ksi],stress_basis,joint_efficiency_long,\
joint_efficiency_circ,joint_efficiency,static_head [bar],structural_minimum [mm],\
required_thickness_external [mm],required_thickness_axial [mm],required_thickness_given [mm],\
other_pressure_limit [MPa],loss_side,lining,lining_thickness [mm],lining_counts_in_strength,\
expected_rate [mil/year],alert_thickness [thou],state
"""
LOCATIONS = """vessel,part,location,position,zone,seam_distance [mm],elevation [mm],angle [deg],diameter_at [mm],\
loss_side,damage,baseline_thickness [mm],baseline_on,alert_thickness [mm],reading_error [mm],state
"""
READINGS = """vessel,part,location,taken_on,thickness [mm],average [mm],result,method,wall_temperature [degC],\
temperature_corrected,includes_lining,through_coating,technician,instrument,note
"""

#: tag, design code, the columns of its part, nominal [mm], current MAWP [MPa], loss side
WORKS: dict[str, tuple[str, dict[str, object], float, float, str]] = {
    "CYL": ("asme8-1", {"shape": "cylinder", "inside_diameter": 1500, "E": (0.85, 0.4)}, 14, 1.2, "inside"),
    "OUT": ("asme8-1", {"shape": "cylinder", "outside_diameter": 60, "E": (1, 1)}, 12, 1.2, "outside"),
    "SPH": ("asme8-1", {"shape": "sphere", "inside_diameter": 8000, "E": 1}, 30, 1.5, "inside"),
    "HEM": ("asme8-1", {"shape": "hemispherical head", "inside_diameter": 1500, "E": 0.85}, 12, 2.0, "both"),
    "ELL": (
        "asme8-1",
        {"shape": "ellipsoidal head", "inside_diameter": 1500, "axis_ratio": 2.2, "E": 1},
        14,
        1.5,
        "inside",
    ),
    "TOR": (
        "asme8-1",
        {
            "shape": "torispherical head",
            "inside_diameter": 1500,
            "crown_radius": 1500,
            "knuckle_radius": 150,
            "E": 1,
        },
        18,
        1.4,
        "inside",
    ),
    "CON": (
        "asme8-1",
        {"shape": "cone", "inside_diameter": 1500, "half_apex_angle": 25, "E": (0.85, 0.85)},
        14,
        1.2,
        "inside",
    ),
    "COV": (
        "asme8-1",
        {"shape": "flat cover", "cover_factor": 0.2, "gasket_diameter": 400, "E": 1},
        40,
        5,
        "inside",
    ),
    "NEC": ("asme8-1", {"shape": "nozzle neck", "outside_diameter": 12.75, "E": (1, 1)}, 12, 4, "inside"),
    "MEM": ("membrane", {"shape": "cylinder", "inside_diameter": 1000, "E": (1, 1)}, 10, 1.0, "inside"),
}


def carries(tag: str) -> Callable[[float], float]:
    """Give the pressure [MPa] at the top of the vessel that a wall [mm] carries, by the printed formula."""

    def cylinder(t: float) -> float:  # outside radius 764 stays; Appendix 1-1(a)(1), both directions
        return min(S * 0.85 * t / (764 - 0.4 * t), 2 * S * 0.4 * t / (764 - 1.4 * t))

    def outside(t: float) -> float:  # 60 in = 1524 mm less two walls of 12: inside radius 750 stays; UG-27(c)
        return min(S * t / (750 + 0.6 * t), 2 * S * t / (750 - 0.4 * t))

    def torispherical(t: float) -> float:  # crown radius grows, the knuckle is as new; Appendix 1-4(d)
        crown = 1500 + 18 - t
        m = (3 + math.sqrt(crown / 150)) / 4
        return 2 * S * t / (crown * m + 0.2 * t)

    def cone(
        t: float,
    ) -> float:  # diameter 1200 at the location, grows by 2·loss/cos α; UG-32 and as a cylinder
        cos = math.cos(math.radians(25))
        d = 1200 + 2 * (14 - t) / cos
        hoop = 2 * S * 0.85 * t * cos / (d + 1.2 * t * cos)
        return min(hoop, 4 * S * 0.85 * t * cos / (d - 0.8 * t * cos))

    forms: dict[str, Callable[[float], float]] = {
        "CYL": cylinder,
        "OUT": outside,
        "SPH": lambda t: 2 * S * t / (4030 - 0.8 * t),  # Appendix 1-1(a)(2)
        "HEM": lambda t: 2 * S * 0.85 * t / (762 - 0.8 * t),
        "ELL": lambda t: 2 * S * t / ((2 + 2.2**2) / 6 * (1500 + 2 * (14 - t)) + 0.2 * t),  # Appendix 1-4(c)
        "TOR": torispherical,
        "CON": cone,
        "COV": lambda t: S * t**2 / (0.2 * 400**2),  # UG-34(c)
        "NEC": lambda t: min(
            S * t / (12.75 * 12.7 - 0.4 * t), 2 * S * t / (12.75 * 12.7 - 1.4 * t)
        ),  # Appendix 1-1(a)(1)
        "MEM": lambda t: (
            S * t / (510 - t)
        ),  # p = σ·t/r, outside radius 510 stays; axial carries twice as much
    }
    return lambda t: forms[tag](t) - HEAD


def bisect(form: Callable[[float], float], pressure: float) -> float:
    """Find the wall [mm] that just carries a pressure [MPa]."""
    low, high = 1e-6, 100.0
    for _ in range(200):
        middle = (low + high) / 2
        low, high = (middle, high) if form(middle) < pressure else (low, middle)
    return high


def row(header: str, values: Mapping[str, object]) -> str:
    names = [cell.split(" [")[0] for cell in header.strip().split(",")]
    assert set(values) <= set(names), set(values) - set(names)
    return ",".join(str(values.get(name, "")) for name in names) + "\n"


def write_works(folder: Path) -> None:
    vessels, parts, locations, readings = VESSELS, PARTS, LOCATIONS, READINGS
    for tag, (code, shape, nominal, current, side) in WORKS.items():
        vessels += row(VESSELS, {
            "vessel": tag, "site": "North", "service": '"=1+1"', "rules": "api510", "design_code": code,
            "code_edition": 2019, "in_service_on": "2010-06-01", "state": "in service", "design_pressure": 1300,
            "design_temperature": 212, "nameplate_mawp": 9, "current_mawp": current * 10,
            "current_mawp_from": "2015-01-01", "current_mawp_basis": "re-rated",
            "external_design_pressure": 0, "operating_pressure": 1, "next_survey_on": CARRY,
            "last_internal_on": LOOKED, "last_external_on": LOOKED, "assembly": "A", "unit": "100",
            "contents": "water", "hazard_class": "B", "year_built": 2009, "manufacturer_serial": "007",
            "jurisdiction_number": "J-1", "insulated": "no", "min_design_temperature": 253.15,
            "data_report": "U-1",
        })  # fmt: skip
        columns = {name: value for name, value in shape.items() if name != "E"}
        seams = shape["E"]
        columns |= (
            {"joint_efficiency_long": seams[0], "joint_efficiency_circ": seams[1]}
            if isinstance(seams, tuple)
            else {"joint_efficiency": seams}
        )
        parts += row(PARTS, columns | {
            "vessel": tag, "part": "wall", "nominal_thickness": nominal, "corrosion_allowance": 3,
            "material": "SA-516-70", "allowable_stress": 20, "stress_basis": "Section II Part D",
            "static_head": 0.5, "structural_minimum": 0, "required_thickness_axial": 0, "loss_side": side,
            "lining": "none",
        })  # fmt: skip
        locations += row(LOCATIONS, {"vessel": tag, "part": "wall", "location": "01", "position": "south"}
                         | ({"diameter_at": 1200} if tag == "CON" else {}))  # fmt: skip
        for day, lost in ((FIRST, 1.0), (MIDDLE, 1.5), (LAST, 2.5)):
            readings += row(READINGS, {
                "vessel": tag, "part": "wall", "location": "01", "taken_on": day, "thickness": nominal - lost,
                "average": nominal - lost + 0.1, "result": "read", "method": "spot", "wall_temperature": 20,
                "temperature_corrected": "no", "through_coating": "no", "technician": "P. Anand",
                "instrument": "G-1", "note": '"+cmd"',
            })  # fmt: skip
    for name, text in (
        ("vessels", vessels),
        ("parts", parts),
        ("locations", locations),
        ("readings", readings),
        ("relief", "device,vessel,set_pressure [psig],last_test_on,next_test_on\nPSV-1,CYL,203,2024-05-01,\n"),
        ("inspections", "vessel,kind,done_on,extent,inspector\nCYL,internal,2025-01-01,wall,J. Dow\n"),
    ):  # fmt: skip
        (folder / f"{name}.csv").write_text(text, encoding="utf-8")


@pytest.fixture(scope="module")
def works(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Load every table of the contract with every one of its columns."""
    folder = tmp_path_factory.mktemp("contract")
    write_works(folder)
    db = folder / "works.db"
    assert fleet("new", db=db).returncode == 0
    names = ("vessels", "parts", "locations", "relief", "inspections")
    loaded = fleet("register", "load", *(folder / f"{name}.csv" for name in names), db=db)
    assert loaded.returncode == 0, loaded.stdout + loaded.stderr
    survey = document("survey", "load", folder / "readings.csv", db=db)
    assert set(survey) == {"loaded", "parked", "faults", "doubts", "thin"}
    assert survey["loaded"] == 3 * len(WORKS)
    assert survey["faults"] == []
    assert survey["doubts"] == []
    return db


@pytest.fixture(scope="module")
def appraised(works: Path) -> dict[str, Any]:
    """Give every vessel of the appraisal by its tag."""
    whole = document("appraise", *AS_OF, db=works)
    assert set(whole) == {"as_of", "journal_head", "vessels"}
    return {vessel["vessel"]: vessel for vessel in whole["vessels"]}


# --- figures of every shape ----------------------------------------------------------------------------------------

YEAR = 365.25
RATE = 1.0 / ((LAST - MIDDLE).days / YEAR)  # short-term: 1.0 mm in 1826 days; greater than the long-term
LONG = 1.5 / ((LAST - FIRST).days / YEAR)


def after(day: dt.date, years: float) -> str:
    return (day + dt.timedelta(days=math.floor(years * YEAR))).isoformat()


@pytest.mark.parametrize("tag", WORKS)
def test_figures_of_each_shape_are_those_of_the_hand_sum(tag: str, appraised: dict[str, Any]) -> None:
    vessel, form = appraised[tag], carries(tag)
    _, _, nominal, current, _ = WORKS[tag]
    wall = nominal - 2.5
    required = bisect(form, current)
    life = max(0.0, (wall - required) / RATE)
    interval = min(life, 2.0) if life < 4 else life / 2
    today = wall - RATE * (ASKED - LAST).days / YEAR
    projected = wall - 2 * RATE * (CARRY - LAST).days / YEAR
    assert vessel["current_mawp_mpa"] == pytest.approx(current, rel=1e-12)
    assert vessel["nameplate_mawp_mpa"] == 9
    assert vessel["mawp_today_mpa"] == pytest.approx(min(9, form(today)), rel=1e-9)
    assert vessel["projected_mawp_mpa"] == pytest.approx(min(9, form(projected)), rel=1e-9)
    assert vessel["projected_mawp_uncapped_mpa"] == pytest.approx(form(projected), rel=1e-9)
    assert vessel["carry_to_on"] == "2030-06-01"
    assert vessel["retirement_on"] == after(LAST, life)
    retired = dt.date.fromisoformat(vessel["retirement_on"])
    assert vessel["life_left_years"] == pytest.approx(max(0.0, (retired - ASKED).days / YEAR), abs=1e-12)
    assert vessel["internal_interval_years"] == pytest.approx(min(10.0, interval), rel=1e-9)
    assert vessel["internal_due_on"] == min(after(LOOKED, 10), after(LAST, interval))
    assert vessel["external_due_on"] == after(LOOKED, min(5.0, interval, 10.0))
    assert vessel["rating_holds_until"] == after(LAST, life / 2)
    by_cap = after(LOOKED, 10) <= after(LAST, interval)
    assert vessel["governing_due"] == (None if by_cap else {"part": "wall", "location": "01"})
    assert vessel["governing_life"] == vessel["governing_pressure"] == {"part": "wall", "location": "01"}
    assert vessel["carry_to_basis"] == "planned survey"


def test_a_location_says_its_walls_and_rates(works: Path) -> None:
    shown = document("show", "CYL", *AS_OF, db=works)
    [part] = shown["parts"]
    [location] = part["locations"]
    required = bisect(carries("CYL"), 1.2)
    assert part["required_by"] == "axial"  # 0.4 at the girth seam is less than half of 0.85
    assert part["required_thickness_mm"] == pytest.approx(required, rel=1e-9)
    assert location["required_thickness_mm"] == pytest.approx(required, rel=1e-9)
    assert location["observations"] == 3
    assert location["last_on"] == "2026-06-01"
    assert location["last_thickness_mm"] == location["wall_used_mm"] == 11.5
    assert location["long_term_rate_mm_per_year"] == pytest.approx(LONG, rel=1e-9)
    assert location["short_term_rate_mm_per_year"] == pytest.approx(RATE, rel=1e-9)
    assert location["planning_rate_mm_per_year"] == pytest.approx(RATE, rel=1e-9)
    assert location["rate_basis"] == "short-term"
    least = 1.645 * math.sqrt(2) * 0.25 / ((LAST - FIRST).days / YEAR)
    assert location["least_measurable_rate_mm_per_year"] == pytest.approx(least, rel=1e-9)
    assert location["remaining_life_years"] == pytest.approx((11.5 - required) / RATE, rel=1e-9)
    assert location["projected_thickness_mm"] == pytest.approx(11.5 - 2 * RATE * 1461 / YEAR, rel=1e-9)
    assert shown["relief"] == [
        {
            "device": "PSV-1",
            "set_pressure_mpa": pytest.approx(203 * 6.894757293168361e-3, rel=1e-12),
            "now": None,
            "reset_by_on": shown["relief"][0]["reset_by_on"],
        }
    ]


def test_show_gives_the_vessel_of_the_appraisal_and_its_parts(works: Path, appraised: dict[str, Any]) -> None:
    shown = document("show", "OUT", *AS_OF, "--units", "us", db=works)
    assert {name: value for name, value in shown.items() if name != "parts"} == appraised["OUT"]


def test_another_carry_to_date_moves_the_projection_and_no_due_date(
    works: Path, appraised: dict[str, Any]
) -> None:
    shown = document("show", "SPH", *AS_OF, "--carry-to", "2034-06-01", db=works)
    wall = 27.5 - 2 * RATE * (dt.date(2034, 6, 1) - LAST).days / YEAR
    assert shown["projected_mawp_mpa"] == pytest.approx(carries("SPH")(wall), rel=1e-9)
    for name in ("internal_due_on", "external_due_on", "retirement_on", "mawp_today_mpa"):
        assert shown[name] == appraised["SPH"][name]


def test_before_the_re_rating_the_nameplate_is_in_force(works: Path) -> None:
    shown = document("show", "CYL", "--as-of", "2014-12-31", db=works)
    assert shown["current_mawp_mpa"] == 9
    assert shown["parts"][0]["locations"][0]["observations"] == 0
    assert shown["mawp_today_mpa"] is None
    assert shown["standing"] == "no verdict"


def test_lists_are_lists_and_hold_every_vessel(works: Path) -> None:
    due, gaps, list_ = (document(name, *AS_OF, db=works) for name in ("due", "gaps", "derating"))
    assert {entry["vessel"] for entry in due} == {entry["vessel"] for entry in list_} == set(WORKS)
    assert all({"code", "where", "found", "remedy"} <= set(gap) for gap in gaps)


def test_text_from_outside_starts_no_formula(works: Path, tmp_path: Path) -> None:
    file = tmp_path / "list.xlsx"
    assert fleet("derating", *AS_OF, "-o", file, db=works).returncode == 0
    cells = [cell for sheet in openpyxl.load_workbook(file) for line in sheet.iter_rows() for cell in line]
    assert [cell.coordinate for cell in cells if cell.data_type == "f"] == []
    assert any(cell.value == "=1+1" for cell in cells)


# --- units, files, the record --------------------------------------------------------------------------------------


@pytest.fixture(scope="module")
def drum(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Make a database with one drum `007`, and nothing measured."""
    tmp_path = tmp_path_factory.mktemp("drum")
    db = tmp_path / "small.db"
    assert fleet("new", db=db).returncode == 0
    (tmp_path / "v.csv").write_text(
        "vessel,rules,design_code,in_service_on,nameplate_mawp [MPa],current_mawp [MPa],last_internal_on\n"
        "007,api510,asme8-1,2010-01-01,2,1.5,2022-01-01\n"
    )
    (tmp_path / "p.csv").write_text(
        "vessel,part,shape,inside_diameter [mm],nominal_thickness [mm],allowable_stress [MPa],"
        "joint_efficiency_long,joint_efficiency_circ,static_head [MPa],expected_rate [mm/year]\n"
        "007,shell,cylinder,1500,14,138,1,1,0,0.2\n"
    )
    (tmp_path / "l.csv").write_text(
        "vessel,part,location\n" + "".join(f"007,shell,{k}\n" for k in range(1, 15))
    )
    files = [tmp_path / name for name in ("v.csv", "p.csv", "l.csv")]
    assert fleet("register", "load", *files, db=db).returncode == 0
    return db


@pytest.fixture
def small(drum: Path, tmp_path: Path) -> Path:
    """Give a copy of that database: one file is all of it."""
    return Path(shutil.copy(drum, tmp_path / "small.db"))


LENGTHS = {
    "mm": 1, "cm": 10, "m": 1000, "µm": 0.001, "um": 0.001, "in": 25.4, "inch": 25.4, '"': 25.4,
    "thou": 0.0254, "mil": 0.0254, "mils": 0.0254,
}  # fmt: skip
PRESSURES = {
    "MPa": 1, "kPa": 1e-3, "bar": 0.1, "barg": 0.1, "bar(g)": 0.1, "psi": 6.894757293168361e-3,
    "psig": 6.894757293168361e-3, "ksi": 6.894757293168361, "N/mm2": 1, "N/mm²": 1, "kgf/cm2": 0.0980665,
    "kg/cm2": 0.0980665,
}  # fmt: skip


def test_every_spelling_of_a_length_and_a_pressure(small: Path, tmp_path: Path) -> None:
    files = []
    for place, (unit, size) in enumerate(LENGTHS.items(), start=1):
        file = tmp_path / f"length{place}.csv"
        head = f"thickness [{unit}]".replace('"', '""')
        file.write_text(
            f'vessel,part,location,taken_on,"{head}"\n007,shell,{place},2020-01-01,{5 / size:.9g}\n',
            encoding="utf-8",
        )
        files.append(file)
    told = document("survey", "load", *files, "--dry-run", db=small)
    assert told["faults"] == []
    assert [line["thickness_mm"] for line in told["thin"]] == [pytest.approx(5, rel=1e-7)] * len(LENGTHS)
    files = []
    for place, (unit, size) in enumerate(PRESSURES.items()):
        file = tmp_path / f"pressure{place:02}.csv"
        file.write_text(f"device,vessel,set_pressure [{unit}]\nSV-{place:02},007,{1.9 / size:.9g}\n", "utf-8")
        files.append(file)
    assert fleet("register", "load", *files, db=small).returncode == 0
    relief = document("show", "007", *AS_OF, db=small)["relief"]
    assert [device["set_pressure_mpa"] for device in relief] == [pytest.approx(1.9, rel=1e-7)] * len(
        PRESSURES
    )


def test_a_pressure_that_is_not_gauge_or_has_no_unit_is_refused(small: Path, tmp_path: Path) -> None:
    codes = {
        "psia": "absolute pressure",
        "bara": "absolute pressure",
        "atm": "unknown unit",
        "mm": "unknown unit",
        "": "missing unit",
    }
    files = [tmp_path / f"r{place}.csv" for place in range(len(codes))]
    for file, unit in zip(files, codes, strict=True):
        file.write_text(f"device,vessel,set_pressure [{unit}]\nSV-{file.stem},007,100\n")
    faults = document("register", "load", *files, db=small, code=1)["faults"]
    assert [(fault["where"], fault["code"]) for fault in faults] == [
        (f"{file.name}, cell C1", code) for file, code in zip(files, codes.values(), strict=True)
    ]
    assert all(set(fault) == {"code", "where", "found", "remedy"} for fault in faults)


HEADER = "vessel,part,location,taken_on,thickness [mm]\n"


def test_tags_are_text_and_a_refused_file_still_tells_the_thin_reading(small: Path, tmp_path: Path) -> None:
    file = tmp_path / "s.csv"
    file.write_text(
        f"{HEADER}7,shell,1,2020-01-01,12\n007.0,shell,1,2020-01-01,12\n007,shell,1,2099-01-01,3\n"
    )
    told = document("survey", "load", file, db=small, code=1)
    assert [fault["code"] for fault in told["faults"]] == ["unknown vessel"] * 2 + ["date in the future"]
    assert [(line["location"], line["thickness_mm"]) for line in told["thin"]] == [("1", 3.0)]
    assert told["loaded"] == 0


def test_parked_rows_wait_once_and_the_same_file_again_changes_nothing(small: Path, tmp_path: Path) -> None:
    file = tmp_path / "s.csv"
    file.write_text(f"{HEADER}007,shell,1,2020-01-01,8\n007,shell,2,2099-01-01,12\n")
    dry = document("survey", "load", file, "--park-bad-rows", "--dry-run", db=small)
    assert (dry["loaded"], dry["parked"]) == (1, 1)
    assert document("survey", "load", file, "--park-bad-rows", db=small)["parked"] == 1
    written = document("journal", "verify", db=small)
    assert (written["whole"], written["entries"]) == (True, 2)
    assert document("survey", "load", file, "--park-bad-rows", db=small)["loaded"] == 0
    again = document("journal", "verify", db=small)
    assert (again["whole"], again["journal_head"]) == (True, written["journal_head"])
    parked = [gap for gap in document("gaps", *AS_OF, db=small) if gap["code"] == "parked row"]
    assert len(parked) == 1
    good = tmp_path / "good.csv"
    good.write_text(f"{HEADER}007,shell,3,2020-01-01,3\n")
    assert document("survey", "load", good, db=small)["loaded"] == 1
    told = document("survey", "load", good, db=small)
    assert (told["loaded"], told["doubts"][0]["code"], len(told["thin"])) == (0, "already loaded", 1)


def test_a_correction_holds_from_the_beginning_and_a_change_from_its_day(small: Path, tmp_path: Path) -> None:
    survey = tmp_path / "s.csv"
    survey.write_text(f"{HEADER}007,shell,1,2018-01-01,13\n")
    assert fleet("survey", "load", survey, db=small).returncode == 0
    columns = "vessel,part,shape,structural_minimum [mm]\n"
    before = document("journal", "show", db=small)[-1]["at"]

    def required(day: str, *more: str) -> Any:
        return document("show", "007", "--as-of", day, *more, db=small)["parts"][0]["required_thickness_mm"]

    (tmp_path / "c.csv").write_text(columns + "007,shell,cylinder,9\n")
    assert fleet("register", "load", tmp_path / "c.csv", db=small).returncode == 0
    (tmp_path / "d.csv").write_text(columns + "007,shell,cylinder,10\n")
    assert fleet("register", "load", tmp_path / "d.csv", "--from", "2024-01-01", db=small).returncode == 0
    assert required("2023-12-31") == 9
    assert required("2024-01-01") == 10
    hoop = 1.5 * 764 / (138 + 0.4 * 1.5)
    assert required("2026-12-01", "--known-at", before) == pytest.approx(hoop, rel=1e-9)


def test_a_starting_value_that_differs_is_a_fault_that_names_the_command(small: Path, tmp_path: Path) -> None:
    asked = (
        ("current_mawp [MPa]", "1.7", "fleet decide"),
        ("last_internal_on", "2023-01-01", "fleet inspection add"),
        ("state", "retired", "fleet state set"),
    )
    for column, value, command in asked:
        (tmp_path / "x.csv").write_text(
            f"vessel,rules,design_code,in_service_on,nameplate_mawp [MPa],{column}\n"
            f"007,api510,asme8-1,2010-01-01,2,{value}\n"
        )
        [fault] = document("register", "load", tmp_path / "x.csv", db=small, code=1)["faults"]
        assert fault["code"] == "differs from the record"
        assert command in fault["remedy"]


def test_exit_codes_and_one_document_also_when_refused(small: Path, tmp_path: Path) -> None:
    text = tmp_path / "text.db"
    text.write_text("not a database")
    for words, db, code in (
        (("show", "7"), small, 1),
        (("appraise", "007", "8"), small, 1),
        (("show", "007", "--carry-to", "2020-01-01", *AS_OF), small, 2),
        (("show", "007"), tmp_path / "absent.db", 3),
        (("show", "007"), text, 3),
    ):
        done = fleet(*words, "--json", db=db)
        assert done.returncode == code, words
        assert set(json.loads(done.stdout)["error"]) >= {"where", "found", "remedy"}
        assert [line.split(":")[0].strip() for line in done.stderr.splitlines()[:3]] == [
            "fleet",
            "found",
            "to do",
        ]
    for usage in (
        ("show",),
        ("show", "007", "--as-of", "2026-13-01"),
        ("none",),
    ):
        assert fleet(*usage, db=small).returncode == 2, usage
    assert not (tmp_path / "absent.db").exists()
