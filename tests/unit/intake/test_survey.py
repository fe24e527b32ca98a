"""Surveys: what loads, what is refused, what is told first."""

from __future__ import annotations

import dataclasses
import datetime as dt
from collections.abc import Callable, Sequence
from pathlib import Path

import pytest

from fleet import errors
from fleet.intake.check_readings import read_survey
from fleet.intake.doubt_numbers import last_accepted
from fleet.intake.known import History, KnownRegister, Recorded
from fleet.intake.results import SurveyIntake

Writer = Callable[[str, Sequence[Sequence[object]]], Path]
TODAY = dt.date(2025, 1, 1)
HEADER = "vessel,part,location,taken_on,thickness [mm],result,average [mm],includes_lining\n"


@pytest.fixture
def survey(tmp_path: Path, known: KnownRegister, history: History) -> Callable[..., SurveyIntake]:
    def load(text: str, *, park: bool = False, history: History = history) -> SurveyIntake:
        path = tmp_path / "s.csv"
        path.write_text(text, encoding="utf-8")
        return read_survey(path, known=known, history=history, today=TODAY, park=park)

    return load


Load = Callable[..., SurveyIntake]


def codes(intake: SurveyIntake) -> list[str]:
    return [one.code for one in intake.faults]


def doubts(intake: SurveyIntake) -> list[str]:
    return [one.code for one in intake.doubts]


def test_all_faults_are_listed_at_once_in_the_order_of_the_file(survey: Load) -> None:
    intake = survey(
        HEADER
        + "D-999,shell,1,2024-06-01,12.1\n"
        + "D-101,shell,1,06/2024,12;1\n"
        + "D-101,,1,2024-06-01,-3\n"
    )
    assert [(one.code, one.where) for one in intake.faults] == [
        ("unknown vessel", "s.csv, cell A2"),
        ("unreadable date", "s.csv, cell D3"),
        ("unreadable number", "s.csv, cell E3"),
        ("missing value", "s.csv, cell B4"),
        ("negative or zero thickness", "s.csv, cell E4"),
    ]
    assert intake.refused
    assert intake.rows("readings") == []


def test_title_and_blank_rows_above_the_header_and_between_rows(survey: Load) -> None:
    intake = survey(
        "North shell survey,June 2024\ntechnician,R. Moor\n\n" + HEADER + "\nD-101,shell,1,2024-06-01,12.1,\n"
    )
    (row,) = intake.rows("readings")
    assert (row.row_no, intake.faults) == (6, ())


def test_tag_that_looks_like_a_number_stays_text(survey: Load, known: KnownRegister) -> None:
    assert survey(HEADER + "007,shell,1,2024-06-01,12.1\n").faults[0].found == "vessel '007'"


def test_number_tags_of_a_workbook_lose_the_decimal_point(
    workbook: Writer, known: KnownRegister, history: History
) -> None:
    path = workbook(
        "readings:a.xlsx",
        [
            ["Survey of June"],
            [],
            ["Vessel", "part", "location", "Taken on", "thickness [in]"],
            ["D-101", "shell", 1, dt.date(2024, 6, 1), 0.48],
        ],
    )
    intake = read_survey(path, known=known, history=history, today=TODAY)
    (row,) = intake.rows("readings")
    assert row.values["location"] == "1"
    assert row.values["thickness_mm"] == 12.192
    assert row.written == {"thickness": "0.48 in"}
    assert row.where == "a.xlsx, sheet readings, row 4"


def test_units_do_not_matter(survey: Load) -> None:
    texts = {"mm": "12.065", "in": "0.475", "mil": "475", "cm": "1.2065", "m": "0.012065", "µm": "12065"}
    seen = {
        survey(HEADER.replace("thickness [mm]", f"thickness [{unit}]") + f"D-101,shell,1,2024-06-01,{text}\n")
        .rows("readings")[0]
        .values["thickness_mm"]
        for unit, text in texts.items()
    }
    assert seen == {12.065}


@pytest.mark.parametrize(
    ("cell", "code", "remedy"),
    [
        ('"12,7"', "unreadable number", "write a decimal point, and no separators: 12.7"),
        ("1.2.3", "unreadable number", "write a plain number"),
        ("<3.0", "unreadable number", "write a plain number"),
        ("n/a", "text in a number column", "write the number alone"),
        ("0.500 in", "text in a number column", "the unit stands once, in the header"),
        ("12.7mm", "text in a number column", "the unit stands once, in the header"),
        ("nan", "text in a number column", "write the number alone"),
        ("inf", "text in a number column", "write the number alone"),
        ("1e999", "text in a number column", ""),
        ("١٢", "unreadable number", "write a plain number"),
    ],
)
def test_numbers_that_are_none(survey: Load, cell: str, code: str, remedy: str) -> None:
    (fault,) = survey(HEADER + f"D-101,shell,1,2024-06-01,{cell}\n").faults
    assert fault.code == code
    assert remedy in fault.remedy


def test_true_and_a_date_are_no_numbers(workbook: Writer, known: KnownRegister, history: History) -> None:
    path = workbook(
        "readings:a.xlsx",
        [
            ["vessel", "part", "location", "taken_on", "thickness [mm]"],
            ["D-101", "shell", 1, dt.date(2024, 6, 1), True],
            ["D-101", "shell", 2, dt.date(2024, 6, 1), dt.date(2024, 6, 1)],
            ["D-101", "shell", 3, 45444, 12.1],
        ],
    )
    intake = read_survey(path, known=known, history=history, today=TODAY)
    assert codes(intake) == ["text in a number column", "unreadable number", "unreadable date"]


def test_yes_and_no_as_true_and_false(workbook: Writer, known: KnownRegister, history: History) -> None:
    path = workbook(
        "readings:a.xlsx",
        [
            [
                "vessel",
                "part",
                "location",
                "taken_on",
                "thickness [mm]",
                "includes_lining",
                "through_coating",
            ],
            ["D-101", "shell", 1, dt.date(2024, 6, 1), 12.1, True, "NO"],
        ],
    )
    (row,) = read_survey(path, known=known, history=history, today=TODAY).rows("readings")
    assert (row.values["includes_lining"], row.values["through_coating"]) == ("yes", "no")


def test_a_misspelt_column_names_the_nearest(survey: Load) -> None:
    intake = survey("vessel,part,location,taken on,thicknes [mm]\nD-101,shell,1,2024-06-01,12.1\n")
    assert [(one.code, one.remedy) for one in intake.faults][1] == (
        "unknown column",
        "did you mean 'thickness'? Otherwise delete the column",
    )


def test_a_unit_in_round_brackets_is_no_unit(survey: Load) -> None:
    (fault,) = survey("vessel,part,location,taken_on,thickness (mm)\nD-101,shell,1,2024-06-01,12.1\n").faults
    assert (fault.code, fault.where) == ("missing unit", "s.csv, cell E1")


def test_a_value_without_heading_is_not_lost(survey: Load) -> None:
    intake = survey(
        "vessel,part,location,taken_on,thickness [mm]\n"
        "D-101,shell,1,2024-06-01,12.1\nD-101,shell,2,2024-06-01,12.1,pitted\n"
    )
    assert [(one.code, one.where) for one in intake.faults] == [("unknown column", "s.csv, cell F1")]
    assert "'pitted' in F3" in intake.faults[0].found


def test_a_result_column_alone_is_enough(survey: Load) -> None:
    intake = survey("vessel,part,location,taken_on,result\nD-101,shell,1,2024-06-01,no access\n")
    assert not intake.faults
    assert survey("vessel,part,location,taken_on,note\nD-101,shell,1,2024-06-01,x\n").faults[0].found == (
        "neither 'thickness' nor 'result' in table 'readings'"
    )


def test_headings_without_rows_are_an_empty_file(survey: Load) -> None:
    assert codes(survey(HEADER)) == ["empty file"]


def test_thin_readings_are_told_whatever_happens_to_the_file(survey: Load) -> None:
    intake = survey(
        HEADER
        + "D-101,shell,1,2024-06-01,8.0\n"  # at its alert thickness
        + "D-101,shell,2,2024-13-01,7.5\n"  # at its required thickness, and no date
        + "D-101,shell,2,2024-06-01,8.001\n"
        + "D-101,head,1,2024-06-01,12.9,read,,yes\n"  # 3 mm of overlay that does not count
        + "D-101,head,1,2024-06-02,12.9,read,,no\n"
    )
    assert intake.refused
    assert [(thin["where"], thin["which"], thin["taken_on"]) for thin in intake.thin] == [
        ("s.csv, cell E2", "alert", "2024-06-01"),
        ("s.csv, cell E3", "alert and required", None),
        ("s.csv, cell E5", "required", "2024-06-01"),
    ]
    assert intake.thin[2]["wall_mm"] == pytest.approx(9.9)
    assert intake.thin[2]["alert_thickness_mm"] is None


def test_a_thin_reading_at_an_unknown_location_is_held_against_its_part(
    tmp_path: Path, known: KnownRegister, history: History
) -> None:
    part = dataclasses.replace(
        known.parts["D-101", "shell"], alert_thickness_mm=8.0, required_thickness_mm=7.0
    )
    known = dataclasses.replace(known, parts={**known.parts, ("D-101", "shell"): part})
    path = tmp_path / "s.csv"
    path.write_text(
        HEADER + "D-101,shell,99,2024-06-01,7.6\nD-999,shell,1,2024-06-01,1.0\n", encoding="utf-8"
    )
    intake = read_survey(path, known=known, history=history, today=TODAY)
    assert codes(intake) == ["unknown location", "unknown vessel"]
    assert [(thin["location"], thin["which"]) for thin in intake.thin] == [("99", "alert")]


def test_thin_readings_of_a_file_loaded_before_are_told_again(
    tmp_path: Path, known: KnownRegister, history: History
) -> None:
    path = tmp_path / "s.csv"
    path.write_text(HEADER + "D-101,shell,1,2024-06-01,7.6,read,7.4\n", encoding="utf-8")
    first = read_survey(path, known=known, history=history, today=TODAY)
    again = dataclasses.replace(known, files={first.sha256: "the survey of June"})
    second = read_survey(path, known=again, history=history, today=TODAY)
    assert (first.thin[0]["wall_mm"], first.thin[0]["which"]) == (7.4, "alert and required")
    assert first.thin == second.thin
    assert doubts(second) == ["already loaded"]


def test_a_low_reading_is_never_a_fault(survey: Load) -> None:
    intake = survey(HEADER + "D-101,shell,2,2024-06-01,3.0\n")
    assert (intake.faults, len(intake.thin), len(intake.rows("readings"))) == ((), 1, 1)


def test_high_doubts_query_the_reading_and_low_ones_do_not(survey: Load) -> None:
    intake = survey(
        HEADER
        + "D-101,shell,1,2024-06-01,24.2\n"  # a doubled echo
        + "D-101,shell,2,2024-06-01,480\n"  # mils
        + "D-101,shell,3,2024-06-01,0.48\n"  # inches
    )
    assert doubts(intake) == [
        "thickness far above nominal",
        "suspected unit slip",
        "thickness far above nominal",
        "suspected unit slip",
    ]
    rows = intake.rows("readings")
    assert [row.query for row in rows] == [True, True, False]
    assert rows[0].because.startswith("thickness far above nominal: 24.2 mm is 1.91 times")
    assert "written as 480 mil it would be 12.192 mm" in rows[1].because
    assert [len(row.doubts) for row in rows] == [1, 2, 1]


def test_a_queried_reading_is_no_yardstick_for_the_next(survey: Load) -> None:
    intake = survey(HEADER + "D-101,shell,1,2023-06-01,24.2\nD-101,shell,1,2024-06-01,12.2\n")
    assert doubts(intake) == ["thickness far above nominal"]


def test_rows_of_the_file_are_history_for_later_rows(survey: Load) -> None:
    intake = survey(
        HEADER
        + "D-101,shell,2,2024-06-01,12.4\nD-101,shell,2,2020-06-01,10.0\nD-101,shell,2,2016-06-01,10.1\n"
    )
    assert [(one.code, one.where) for one in intake.doubts] == [("apparent gain", "s.csv, cell E2")]


def test_only_accepted_readings_are_compared_with(survey: Load) -> None:
    key = ("D-101", "shell", "2")
    of = [Recorded(dt.date(2020, 6, 1), 5.0, standing) for standing in ("queried", "voided", "past")]
    assert doubts(survey(HEADER + "D-101,shell,2,2024-06-01,12.4\n", history=History({key: of}))) == []
    accepted = History({key: (Recorded(dt.date(2020, 6, 1), 5.0),)})
    assert doubts(survey(HEADER + "D-101,shell,2,2024-06-01,12.4\n", history=accepted)) == ["apparent gain"]
    assert last_accepted(accepted, key, dt.date(2020, 6, 2)) == 5.0
    assert last_accepted(accepted, key, dt.date(2020, 6, 1)) != 5.0


def test_duplicates_on_record(survey: Load) -> None:
    day = dt.date(2020, 6, 1)
    key = ("D-101", "shell", "2")

    def load(wall: str, *on_record: Recorded) -> SurveyIntake:
        return survey(HEADER + f"D-101,shell,2,2020-06-01,{wall}\n", history=History({key: on_record}))

    other = load("12.4", Recorded(day, 12.5))
    assert codes(other) == ["duplicate reading"]
    assert other.faults[0].found == "12.4 mm; on record for 2020-06-01: 12.5 mm"
    same = load("12.4", Recorded(day, 12.4, "queried"))
    assert (codes(same), doubts(same), same.rows("readings")) == ([], ["already on record"], [])
    assert doubts(load("12.4", Recorded(day, 12.4, "voided"))) == ["already on record"]
    assert len(load("12.4", Recorded(day, 12.5, "voided")).rows("readings")) == 1
    assert doubts(load(",no echo", Recorded(day, float("nan")))) == ["already on record"]


def test_both_of_two_equal_rows_are_named(survey: Load) -> None:
    intake = survey(HEADER + "D-101,shell,1,2024-06-01,12.1\nD-101,shell,1,2024-06-01,12.1\n", park=True)
    assert [(one.where, one.found.rsplit(" ", 1)[1]) for one in intake.faults] == [
        ("s.csv, cell C2", "3"),
        ("s.csv, cell C3", "2"),
    ]
    assert len(intake.parked) == 2


def test_parking_lets_the_good_rows_go_through(survey: Load) -> None:
    text = HEADER + "D-101,shell,1,2024-06-01,12.1\nD-101,shell,9,2024-06-01,12.1,read\n"
    assert survey(text).rows("readings") == []
    intake = survey(text, park=True)
    assert [row.row_no for row in intake.rows("readings")] == [2]
    (parked,) = intake.parked
    assert (parked.where, parked.table, parked.row_no) == ("s.csv, row 3", "readings", 3)
    assert parked.content == {
        "vessel": "D-101",
        "part": "shell",
        "location": "9",
        "taken_on": "2024-06-01",
        "thickness [mm]": "12.1",
        "result": "read",
    }
    assert [fault.code for fault in parked.faults] == ["unknown location"]
    assert not intake.refused


def test_parking_does_not_help_a_faulty_header(survey: Load) -> None:
    intake = survey("vessel,part,location,taken_on,thickness\nD-101,shell,1,2024-06-01,12.1\n", park=True)
    assert intake.refused
    assert (intake.rows("readings"), intake.parked) == ([], ())


def test_the_same_file_again_changes_nothing_and_says_so(known: KnownRegister, history: History) -> None:
    path = Path(__file__).parent / "files" / "survey-already-loaded.csv"
    again = read_survey(path, known=known, history=history, today=TODAY)
    assert (again.faults, again.rows("readings"), again.refused) == ((), [], False)
    assert again.files[0].already_loaded
    fresh = read_survey(path, known=dataclasses.replace(known, files={}), history=history, today=TODAY)
    assert len(fresh.rows("readings")) == 1
    assert fresh.sha256 == again.sha256


def test_nearest_names(survey: Load) -> None:
    intake = survey(HEADER + "d101,shell,1,2024-06-01,12.1\nD-101,shel,1,2024-06-01,12.1\n")
    assert [one.remedy.split("?")[0] for one in intake.faults] == [
        "did you mean 'D-101'",
        "did you mean 'shell'",
    ]


def test_baseline_may_lie_before_in_service_but_a_reading_may_not(survey: Load) -> None:
    assert codes(survey(HEADER + "D-101,shell,1,2010-04-30,12.1\n")) == ["date before in-service"]
    assert codes(survey(HEADER + "D-101,shell,1,2010-05-01,12.1\n")) == []


def test_today_is_not_in_the_future(survey: Load) -> None:
    assert codes(survey(HEADER + "D-101,shell,1,2025-01-01,12.1\n")) == []
    assert codes(survey(HEADER + "D-101,shell,1,2025-01-02,12.1\n")) == ["date in the future"]


def test_merged_cells_below_the_header_are_named(
    tmp_path: Path, known: KnownRegister, history: History
) -> None:
    import xlsxwriter

    path = tmp_path / "a.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        sheet = book.add_worksheet("readings")
        sheet.write_row(0, 0, ["vessel", "part", "location", "taken_on", "thickness [mm]"])
        for row, location in ((1, "1"), (2, "2")):
            sheet.write_row(row, 1, ["shell", location, "2024-06-01", 12.1])
        sheet.merge_range(1, 0, 2, 0, "D-101")
    (fault,) = read_survey(path, known=known, history=history, today=TODAY).faults
    assert (fault.code, fault.where) == ("missing value", "a.xlsx, sheet readings, cell A3")
    assert "part of a merged one" in fault.found


def test_a_register_table_is_sent_to_its_own_command(survey: Load) -> None:
    intake = survey("vessel,part,location,position,zone\nD-101,shell,1,north,plate\n")
    assert codes(intake) == ["no table found"]
    assert "a table 'locations'" in intake.faults[0].found


def test_a_missing_file_is_refused_by_name(tmp_path: Path, known: KnownRegister, history: History) -> None:
    with pytest.raises(errors.Refused, match=r"nowhere\.csv: cannot be read"):
        read_survey(tmp_path / "nowhere.csv", known=known, history=history, today=TODAY)
