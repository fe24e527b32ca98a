"""Register files: references within a load, doubts about columns, and what differs from the record."""

from __future__ import annotations

import datetime as dt
from collections.abc import Callable
from pathlib import Path

import openpyxl
import pytest

from fleet.intake.check_register import read_register
from fleet.intake.known import KnownLocation, KnownRegister, KnownVessel
from fleet.intake.results import Intake

TODAY = dt.date(2025, 1, 1)
VESSELS = "vessel,rules,design_code,in_service_on,nameplate_mawp [psi],last_internal_on,state\n"
PARTS = "vessel,part,shape,inside_diameter [in],nominal_thickness [in],outside_diameter [in]\n"
LOCATIONS = "vessel,part,location,baseline_thickness [in],baseline_on,zone\n"
GOOD = {
    "vessels.csv": VESSELS + "V-1,api510,asme8-1,2012-03-01,250,2020-05-05,in service\n",
    "parts.csv": PARTS + "V-1,shell,cylinder,60,0.5,\n",
    "locations.csv": LOCATIONS + "V-1,shell,1,0.505,2011-12-01,plate\n",
}

Load = Callable[..., Intake]


@pytest.fixture
def register(tmp_path: Path) -> Load:
    def load(texts: dict[str, str], *, known: KnownRegister | None = None, park: bool = False) -> Intake:
        for name, text in texts.items():
            (tmp_path / name).write_text(text, encoding="utf-8")
        return read_register(
            [tmp_path / name for name in texts],
            known=known or KnownRegister(),
            today=TODAY,
            rule_sets={"api510"},
            design_codes={"asme8-1", "membrane"},
            park=park,
        )

    return load


def fault_list(intake: Intake) -> list[tuple[str, str]]:
    return [(one.code, one.where) for one in intake.faults]


def doubt_list(intake: Intake) -> list[tuple[str, str]]:
    return [(one.code, one.where) for one in intake.doubts]


def test_rows_of_one_load_may_refer_to_each_other_in_any_order(register: Load) -> None:
    intake = register(dict(reversed(GOOD.items())))
    assert (fault_list(intake), doubt_list(intake)) == ([], [])
    (vessel,), (part,), (location,) = map(intake.rows, ("vessels", "parts", "locations"))
    assert vessel.values["nameplate_mawp_mpa"] == pytest.approx(1.723689, abs=5e-7)
    assert vessel.written == {"nameplate_mawp": "250 psi"}
    assert vessel.values["last_internal_on"] == dt.date(2020, 5, 5)
    assert (part.values["inside_diameter_mm"], part.values["nominal_thickness_mm"]) == (1524.0, 12.7)
    assert part.values["outside_diameter_mm"] is None
    assert location.values["baseline_on"] == dt.date(2011, 12, 1)


def test_several_tables_in_one_workbook_known_by_name_or_header(tmp_path: Path) -> None:
    book = openpyxl.Workbook()
    book.remove(book["Sheet"])
    for title, text in (
        ("vessels", GOOD["vessels.csv"]),
        ("Tabelle2", GOOD["parts.csv"]),
        ("Relief", "device,vessel,set_pressure [barg]\nPSV-1,V-1,17\n"),
        ("Looks", "vessel,kind,done_on,extent\nV-1,internal,2020-05-05,full\n"),
        ("notes", "please mind the gap\n"),
    ):
        sheet = book.create_sheet(title)
        for line in text.splitlines():
            sheet.append([cell or None for cell in line.split(",")])
    book.save(tmp_path / "register.xlsx")
    intake = read_register(
        [tmp_path / "register.xlsx"],
        known=KnownRegister(),
        today=TODAY,
        rule_sets={"api510"},
        design_codes={"asme8-1"},
    )
    assert intake.faults == ()
    assert [typed.table for typed in intake.tables] == ["vessels", "parts", "relief", "inspections"]
    assert intake.rows("relief")[0].values["set_pressure_mpa"] == 1.7
    assert {(one.code, one.where) for one in intake.doubts if one.code != "written as text"} == {
        ("sheet not taken", "register.xlsx, sheet notes")
    }


def test_a_refused_file_takes_the_files_that_hang_on_it_along(register: Load) -> None:
    intake = register(GOOD | {"vessels.csv": GOOD["vessels.csv"].replace("api510", "api5l0")})
    assert fault_list(intake) == [
        ("unknown rule set", "vessels.csv, cell B2"),
        ("unknown vessel", "parts.csv, cell A2"),
        ("unknown vessel", "locations.csv, cell A2"),
    ]
    assert "which does not load" in intake.faults[1].found
    assert all(file.refused for file in intake.files)
    assert not any(typed.rows for typed in intake.tables)


def test_files_that_do_not_hang_on_the_refused_one_load(register: Load) -> None:
    other = {
        "more.csv": VESSELS + "V-2,api510,asme8-1,2012-03-01,250,,\nV-2,api510,asme8-1,2012-03-01,260,,\n"
    }
    intake = register(GOOD | other)
    assert fault_list(intake) == [
        ("duplicate row", "more.csv, cell A2"),
        ("duplicate row", "more.csv, cell A3"),
    ]
    assert [file.refused for file in intake.files] == [False, False, False, True]
    assert len(intake.rows("locations")) == 1


def test_parking_holds_back_the_rows_that_hang_on_a_parked_row(register: Load) -> None:
    texts = {
        "vessels.csv": GOOD["vessels.csv"] + "V-2,api510,asme9,2012-03-01,250,,\n",
        "parts.csv": GOOD["parts.csv"] + "V-2,shell,cylinder,60,0.5,\n",
        "locations.csv": GOOD["locations.csv"] + "V-2,shell,1,,,\n",
    }
    intake = register(texts, park=True)
    assert [row.where for row in intake.parked] == [
        "vessels.csv, row 3",
        "parts.csv, row 3",
        "locations.csv, row 3",
    ]
    assert [len(intake.rows(table)) for table in ("vessels", "parts", "locations")] == [1, 1, 1]
    assert not intake.refused


def test_unknown_names_in_the_register(register: Load) -> None:
    texts = GOOD | {
        "parts.csv": GOOD["parts.csv"] + "V-11,shell,cylinder,60,0.5,\n",
        "locations.csv": GOOD["locations.csv"] + "V-1,shel,1,,,\nV-9,shell,1,,,\n",
    }
    assert fault_list(register(texts)) == [
        ("unknown vessel", "parts.csv, cell A3"),
        ("unknown part", "locations.csv, cell B2"),  # held back: its part stands in a file that is refused
        ("unknown part", "locations.csv, cell B3"),
        ("unknown vessel", "locations.csv, cell A4"),
    ]


def test_blank_columns_are_never_faults(register: Load) -> None:
    intake = register(
        {
            "v.csv": "vessel,rules,design_code,in_service_on,design_pressure [MPa]\nV-1,api510,membrane,2012-03-01,0\n",
            "p.csv": "vessel,part,shape\nV-1,shell,cylinder\n",
        }
    )
    assert (fault_list(intake), doubt_list(intake)) == ([], [("nameplate blank", "v.csv, row 2")])


def test_neither_nameplate_nor_design_pressure(register: Load) -> None:
    head = "vessel,rules,design_code,in_service_on,nameplate_mawp [MPa]\n"
    assert fault_list(register({"v.csv": head + "V-1,api510,membrane,2012-03-01,\n"})) == [
        ("missing value", "v.csv, cell E2")
    ]


@pytest.mark.parametrize(
    ("column", "cell", "code"),
    [
        ("joint_efficiency_long", "0", "number out of range"),
        ("joint_efficiency_long", "1", ""),
        ("joint_efficiency_long", "1.01", "number out of range"),
        ("static_head [kPa]", "0", ""),
        ("static_head [kPa]", "-1", "number out of range"),
        ("nominal_thickness [mm]", "0", "negative or zero thickness"),
        ("required_thickness_axial [mm]", "0", ""),
        ("expected_rate [mpy]", "-2", "number out of range"),
        ("inside_diameter [m]", "0", "number out of range"),
        ("inside_diameter [m]", "1e306", "number out of range"),
        ("allowable_stress [ksi]", "0", "number out of range"),
    ],
)
def test_numbers_that_cannot_be_true(register: Load, column: str, cell: str, code: str) -> None:
    texts = GOOD | {"parts.csv": f"vessel,part,shape,{column}\nV-1,shell,cylinder,{cell}\n"}
    assert [fault for fault, where in fault_list(register(texts)) if where == "parts.csv, cell D2"] == (
        [code] if code else []
    )


def test_walls_and_diameters_that_cross(register: Load) -> None:
    crossed = register(GOOD | {"parts.csv": PARTS + "V-1,shell,cylinder,60,0.5,60\n"})
    assert fault_list(crossed)[0] == ("number out of range", "parts.csv, cell F2")
    solid = register(GOOD | {"parts.csv": PARTS + "V-1,shell,cylinder,,30,60\n"})
    assert fault_list(solid)[0] == ("number out of range", "parts.csv, cell E2")


def test_columns_of_another_shape_are_doubts(register: Load) -> None:
    parts = "vessel,part,shape,crown_radius [mm],joint_efficiency,joint_efficiency_long,diameter\n"
    intake = register(
        GOOD | {"parts.csv": parts.replace(",diameter", "") + "V-1,shell,cylinder,800,0.85,0.85\n"}
    )
    assert doubt_list(intake) == [
        ("does not apply", "parts.csv, cell D2"),
        ("does not apply", "parts.csv, cell E2"),
    ]
    assert intake.rows("parts")[0].doubts[1].found == "joint_efficiency 0.85 on shape 'cylinder'"
    places = "vessel,part,location,zone,diameter_at [mm]\nV-1,shell,1,knuckle,700\n"
    assert doubt_list(register(GOOD | {"locations.csv": places})) == [
        ("does not apply", "locations.csv, cell D2"),
        ("does not apply", "locations.csv, cell E2"),
    ]


def test_baseline_before_in_service_is_allowed_and_its_number_is_doubted_like_a_reading(
    register: Load,
) -> None:
    intake = register(GOOD | {"locations.csv": LOCATIONS + "V-1,shell,1,12.7,2011-12-01,\n"})
    assert doubt_list(intake) == [
        ("suspected unit slip", "locations.csv, cell D2"),
        ("thickness far above nominal", "locations.csv, cell D2"),
    ]
    assert intake.rows("locations")[0].query
    assert fault_list(intake) == []


@pytest.mark.parametrize(("cells", "where"), [("0.5,", "E2"), (",2011-12-01", "D2")])
def test_half_a_baseline(register: Load, cells: str, where: str) -> None:
    intake = register(GOOD | {"locations.csv": LOCATIONS + f"V-1,shell,1,{cells},\n"})
    assert doubt_list(intake) == [("baseline incomplete", f"locations.csv, cell {where}")]


def test_dates_of_a_vessel(register: Load) -> None:
    text = (
        VESSELS
        + "V-1,api510,membrane,2025-01-02,250,2011-05-05,\nV-2,api510,membrane,2012-03-01,250,2011-05-05,\n"
    )
    assert fault_list(register({"v.csv": text})) == [
        ("date in the future", "v.csv, cell D2"),
        ("date before in-service", "v.csv, cell F2"),
        ("date before in-service", "v.csv, cell F3"),
    ]


def test_values_that_differ_from_the_facts_name_the_command(register: Load) -> None:
    known = KnownRegister(
        vessels={
            "V-1": KnownVessel(
                dt.date(2012, 3, 1),
                {
                    "state": ("idle",),
                    "last_internal_on": (dt.date(2020, 5, 5), dt.date(2024, 5, 5)),
                    "current_mawp_mpa": (),
                },
            )
        },
        locations={
            ("V-1", "shell", "1"): KnownLocation(
                recorded={"baseline_thickness_mm": (12.827,), "baseline_on": (dt.date(2011, 12, 1),)}
            )
        },
    )
    intake = register(GOOD, known=known)
    assert fault_list(intake) == [("differs from the record", "vessels.csv, cell G2")]
    assert intake.faults[0].found == "state 'in service'; on record: idle"
    assert "'fleet state set'" in intake.faults[0].remedy
    agrees = register({"vessels.csv": GOOD["vessels.csv"].replace("in service\n", "idle\n")}, known=known)
    assert fault_list(agrees) == []


def test_inspections(register: Load) -> None:
    head = "vessel,kind,done_on,extent\n"
    rows = (
        "V-1,internal,2020-05-05,full\nV-1,external,2021-05-05,shell\nV-1,on-stream,2022-05-05,parts named\n"
        "V-1,internal,2011-05-05,\nV-1,internal,2023-05-05,shell; north head\nV-1,outside,2023-05-05,\n"
    )
    known = KnownRegister(inspections={("V-1", "internal", dt.date(2020, 5, 5))})
    intake = register(GOOD | {"i.csv": head + rows}, known=known)
    assert fault_list(intake) == [
        ("date before in-service", "i.csv, cell C5"),
        ("unknown part", "i.csv, cell D6"),
        ("unknown choice", "i.csv, cell B7"),
    ]
    assert doubt_list(intake) == [("already on record", "i.csv, cell C2")]
    good = register(GOOD | {"i.csv": head + "\n".join(rows.splitlines()[:3])}, known=known)
    assert [row.values["kind"] for row in good.rows("inspections")] == ["external", "on-stream"]


def test_a_file_loaded_before_gives_nothing_and_the_others_load(register: Load) -> None:
    first = register(GOOD)
    known = KnownRegister(
        vessels={"V-1": KnownVessel(dt.date(2012, 3, 1))}, files={first.files[0].sha256: "vessels.csv"}
    )
    again = register(GOOD, known=known)
    assert doubt_list(again) == [("already loaded", "vessels.csv")]
    assert [len(again.rows(table)) for table in ("vessels", "parts", "locations")] == [0, 1, 1]
    assert [file.already_loaded for file in again.files] == [True, False, False]


def test_installed_sets_are_listed(register: Load) -> None:
    intake = register({"v.csv": VESSELS + "V-1,api51O,asme8,2012-03-01,250,,\n"})
    assert [one.remedy for one in intake.faults] == [
        "did you mean 'api510'? installed: api510",
        "did you mean 'asme8-1'? installed: asme8-1, membrane",
    ]


def test_year_built_is_a_whole_year_not_after_this_one(register: Load) -> None:
    head = "vessel,rules,design_code,in_service_on,nameplate_mawp [MPa],year_built\n"
    rows = [
        f"V-{n},api510,membrane,2012-03-01,1.7,{year}" for n, year in enumerate(("2026", "2011.5", "2011"), 1)
    ]
    intake = register({"v.csv": head + "\n".join(rows)}, park=True)
    assert fault_list(intake) == [
        ("number out of range", "v.csv, cell F2"),
        ("number out of range", "v.csv, cell F3"),
    ]
    (row,) = intake.rows("vessels")
    assert row.values["year_built"] == 2011
    assert isinstance(row.values["year_built"], int)
