"""Only what is true by the as-of date counts, as known at an entry: store in, arrays out."""

from __future__ import annotations

import dataclasses
from collections.abc import Callable
from datetime import UTC, date, datetime, timedelta
from typing import Any

import numpy as np
import pytest

from fleet.appraisal.inputs import Inputs
from fleet.store import Engine, journal, models
from fleet.tasks.assemble import fetch_inputs
from fleet.tasks.events import add_decision, add_restart, set_setting, set_state
from fleet.tasks.reader import Reader
from fleet.tasks.register import RegisterLoaded
from fleet.tasks.surveys import SurveysLoaded

TODAY = date(2026, 12, 1)
Load = Callable[..., RegisterLoaded]
Survey = Callable[..., SurveysLoaded]
Rows = Callable[..., list[dict[str, Any]]]
WHO: dict[str, Any] = {"by": "A. Keel", "reason": "told by operations"}
HEAD = "vessel,part,location,taken_on,thickness [mm]"


def inputs(engine: Engine, as_of: date = TODAY, known: int | None = None, **how: Any) -> Inputs:
    with engine.connect() as conn:
        number = journal.head(conn).no if known is None else known
        return fetch_inputs(Reader(conn, as_of=as_of, known=number), **how)


def test_vessels_are_sorted_by_tag_and_children_point_at_their_parents(load: Load, engine: Engine) -> None:
    head = "vessel,rules,design_code,in_service_on,nameplate_mawp [MPa]"
    load(
        f"{head}\nV-2,api510,asme8-1,2005-01-01,2\nV-1,api510,asme8-1,2004-01-01,1\n",
        "vessel,part,shape\nV-2,shell,cylinder\nV-1,head,sphere\nV-1,belt,sphere\n",
        "vessel,part,location\nV-1,belt,b\nV-2,shell,a\nV-1,head,c\n",
    )
    made = inputs(engine)
    assert made.vessels.tag.tolist() == ["V-1", "V-2"]
    assert made.vessels.nameplate_mawp_mpa.tolist() == [1, 2]
    assert made.vessels.in_service_day[0] == date(2004, 1, 1).toordinal()
    assert made.parts.part.tolist() == ["head", "belt", "shell"]
    assert made.parts.vessel.tolist() == [0, 0, 1]
    assert made.locations.location.tolist() == ["c", "b", "a"]
    assert made.locations.part.tolist() == [0, 1, 2]


def test_a_reading_after_the_as_of_date_does_not_count(surveyed: Engine) -> None:
    assert len(inputs(surveyed, date(2026, 6, 2)).readings) == 6
    assert len(inputs(surveyed, date(2026, 6, 3)).readings) == 9


def test_a_voided_reading_does_not_count_and_a_queried_one_is_marked(
    works: Engine, survey: Survey, rows: Rows
) -> None:
    survey(f"{HEAD}\nV-101,shell,1,2026-06-03,12\nV-101,shell,2,2026-06-03,28\n")
    assert sorted(inputs(works).readings.status.tolist()) == ["accepted", "queried"]
    wrong = next(row for row in rows(models.Reading) if row["status"] == "queried")
    kept = {name: value for name, value in wrong.items() if name not in {"id", "entry_no", "mark"}}
    void = {**kept, "status": "voided", "status_because": "doubled echo", "replaces_id": wrong["id"]}
    with journal.writer(works, task="reading void", by="A. Keel") as entry:
        entry.add(models.Reading, [void])
    assert inputs(works).readings.status.tolist() == ["accepted"]
    assert len(inputs(works, known=2).readings) == 2, "what was known before stays as it was"


def test_the_last_re_rating_effective_by_the_as_of_date_is_the_current_mawp(works: Engine) -> None:
    for day, pressure in (("2024-01-01", 2.0), ("2018-01-01", 2.2), ("2027-06-01", 1.5)):
        add_decision(
            works,
            vessel="V-101",
            kind="re-rating",
            decided_on=date(2017, 1, 1),
            effective_on=date.fromisoformat(day),
            pressure_mpa=pressure,
            decided_by="A. Keel",
            **WHO,
        )
    current = {day: inputs(works, date.fromisoformat(day)).vessels.current_mawp_mpa for day in
               ("2017-12-31", "2018-01-01", "2023-12-31", "2024-01-01")}  # fmt: skip
    assert np.isnan(current["2017-12-31"]).all()
    assert [current[day][0] for day in ("2018-01-01", "2023-12-31", "2024-01-01")] == [2.2, 2.2, 2.0]
    assert len(inputs(works).decisions) == 0


def test_a_re_rating_decided_after_the_as_of_date_does_not_count(works: Engine) -> None:
    add_decision(
        works,
        vessel="V-101",
        kind="re-rating",
        decided_on=date(2020, 1, 1),
        effective_on=date(2018, 1, 1),
        pressure_mpa=2.0,
        decided_by="A. Keel",
        **WHO,
    )
    assert np.isnan(inputs(works, date(2019, 12, 31)).vessels.current_mawp_mpa[0])
    assert inputs(works, date(2020, 1, 1)).vessels.current_mawp_mpa[0] == 2.0


def test_states_begin_on_their_day_and_idle_protected_makes_spans(works: Engine) -> None:
    for state, day in (
        ("idle protected", "2015-01-01"),
        ("idle protected", "2016-01-01"),
        ("in service", "2018-07-01"),
        ("idle protected", "2025-03-01"),
        ("retired", "2028-01-01"),
    ):
        set_state(works, vessel="V-101", state=state, from_on=date.fromisoformat(day), **WHO)
    made = inputs(works)
    assert made.vessels.state.tolist() == ["idle protected", ""]
    assert made.vessels.state_undated.tolist() == [False, False]
    assert made.idle_times.vessel.tolist() == [0, 0]
    assert made.idle_times.from_day.tolist() == [date(2015, 1, 1).toordinal(), date(2025, 3, 1).toordinal()]
    assert made.idle_times.to_day[0] == date(2018, 7, 1).toordinal()
    assert np.isnan(made.idle_times.to_day[1]), "what goes on has no end"
    assert len(inputs(works, date(2014, 12, 31)).idle_times) == 0


def test_a_state_of_the_register_without_a_day_is_marked(load: Load, engine: Engine) -> None:
    head = "vessel,rules,design_code,in_service_on,nameplate_mawp [MPa],state"
    load(f"{head}\nV-1,api510,asme8-1,2005-01-01,2,out of service\n")
    assert inputs(engine).vessels.state_undated.tolist() == [True]
    assert inputs(engine, TODAY - timedelta(days=1)).vessels.state.tolist() == [""]


def test_the_nearest_setting_wins(works: Engine) -> None:
    places: list[tuple[dict[str, Any], float]] = [
        ({}, 0.01),
        ({"vessel": "V-101"}, 0.02),
        ({"vessel": "V-101", "part": "shell"}, 0.03),
        ({"vessel": "V-101", "part": "shell", "location": "2"}, 0.04),
    ]
    expected = [[0.01] * 3, [0.02, 0.02, 0.01], [0.03, 0.03, 0.01], [0.03, 0.04, 0.01]]
    assert inputs(works).locations.rate_floor_mm_per_year.tolist() == [0.025] * 3
    for (place, value), floors in zip(places, expected, strict=True):
        set_setting(
            works, key="rate_floor_mm_per_year", value=value, from_on=date(2020, 1, 1), by="A. Keel", **place
        )
        assert inputs(works).locations.rate_floor_mm_per_year.tolist() == floors
    assert inputs(works, date(2019, 12, 31)).locations.rate_floor_mm_per_year.tolist() == [0.025] * 3


def test_the_reading_error_is_of_the_location_else_the_survey_else_wider(
    load: Load, surveyed: Engine, rows: Rows
) -> None:
    def errors() -> list[float]:
        table = inputs(surveyed).readings
        first = table.taken_day == date(2016, 5, 9).toordinal()
        return [float(value) for value in table.error_mm[first]]

    base: dict[str, Any] = {"key": "reading_error_mm", "from_on": date(2000, 1, 1), "by": "A. Keel"}
    assert errors() == [0.25, 0.25, 0.25]
    set_setting(surveyed, value=0.4, **base)
    set_setting(surveyed, value=0.5, vessel="V-101", part="shell", **base)
    assert errors() == [0.5, 0.5, 0.4]
    oldest = min(rows(models.Survey), key=lambda row: row["taken_from_on"])
    kept = {name: value for name, value in oldest.items() if name not in {"id", "entry_no", "mark"}}
    with journal.writer(surveyed, task="survey", by="A. Keel") as entry:
        corrected = {**kept, "reading_error_mm": 0.1, "replaces_id": oldest["id"]}
        entry.add(models.Survey, [corrected])
    # readings point at the survey as it was first written: its correction is the one in force
    assert errors() == [0.1, 0.1, 0.1]
    load("vessel,part,location,reading_error [mm]\nV-101,shell,1,0.3\n")
    assert errors() == [0.3, 0.1, 0.1]
    set_setting(surveyed, value=0.2, vessel="V-101", part="shell", location="1", **base)
    assert errors() == [0.2, 0.1, 0.1]


def test_a_restart_of_the_whole_part_takes_in_locations_laid_out_later(works: Engine, load: Load) -> None:
    about: dict[str, Any] = {
        "vessel": "V-101",
        "part": "shell",
        "kind": "new metal",
        "what": "replaced",
        **WHO,
    }
    add_restart(works, happened_on=date(2020, 1, 1), locations=["2"], **about)
    add_restart(works, happened_on=date(2022, 1, 1), whole_part=True, **about)
    load("vessel,part,location\nV-101,shell,3\n")
    made = inputs(works)
    named = [
        (made.locations.location[row], day)
        for row, day in zip(made.restarts.location, made.restarts.happened_day, strict=True)
    ]
    early, late = date(2020, 1, 1).toordinal(), date(2022, 1, 1).toordinal()
    assert named == [("2", early), ("1", late), ("2", late), ("3", late)]
    assert len(inputs(works, date(2021, 1, 1)).restarts) == 1


def test_a_corrected_restart_keeps_its_locations_unless_it_names_others(works: Engine, rows: Rows) -> None:
    about: dict[str, Any] = {
        "vessel": "V-101",
        "part": "shell",
        "kind": "new metal",
        "what": "replaced",
        **WHO,
    }
    add_restart(works, happened_on=date(2020, 1, 1), locations=["1"], **about)
    (first,) = rows(models.Restart)
    others = {name: value for name, value in first.items() if name not in {"id", "entry_no", "mark"}}

    def corrected(replaces: int, day: date) -> int:
        with journal.writer(works, task="restart correct", by="A. Keel") as entry:
            (number,) = entry.add(models.Restart, [{**others, "happened_on": day, "replaces_id": replaces}])
        return number

    def named() -> list[tuple[str, float]]:
        made = inputs(works)
        return [
            (made.locations.location[row], day)
            for row, day in zip(made.restarts.location, made.restarts.happened_day, strict=True)
        ]

    second = corrected(first["id"], date(2021, 1, 1))
    third = corrected(second, date(2022, 1, 1))
    assert named() == [("1", date(2022, 1, 1).toordinal())]
    south = next(row["id"] for row in rows(models.Entity) if row["tag"] == "2")
    with journal.writer(works, task="restart correct", by="A. Keel") as entry:
        entry.add(models.RestartLocation, [{"restart_id": third, "location_id": south}])
    assert named() == [("2", date(2022, 1, 1).toordinal())]


def test_inspections_decisions_and_doubts_of_the_future_do_not_count(works: Engine, survey: Survey) -> None:
    add_decision(
        works,
        vessel="V-101",
        part="shell",
        kind="chosen rate",
        decided_on=date(2026, 7, 1),
        rate_mm_per_year=0.2,
        rests_on="2021, 2026",
        review_on=date(2028, 1, 1),
        decided_by="A. Keel",
        **WHO,
    )
    survey(f"{HEAD}\nV-101,shell,1,2026-06-03,28\n")
    then, now = inputs(works, date(2023, 1, 1)), inputs(works)
    assert (len(then.inspections), len(now.inspections)) == (2, 4)
    assert (len(then.decisions), len(now.decisions)) == (0, 1)
    assert now.decisions.part.tolist() == [0]
    assert now.decisions.location.tolist() == [-1]
    assert then.recorded == ()
    assert [(one.vessel, one.location, one.notice.code) for one in now.recorded] == [
        (0, 0, "thickness far above nominal")
    ]


def test_relief_devices_stand_with_their_vessel(works: Engine) -> None:
    relief = inputs(works).relief
    assert [
        *zip(relief.vessel.tolist(), relief.device.tolist(), relief.set_pressure_mpa.tolist(), strict=True)
    ] == [
        (0, "PSV-101", 2.5),
        (1, "PSV-102", 1.0),
    ]


def test_a_waiting_row_stands_at_its_vessel(works: Engine, survey: Survey) -> None:
    survey(f"{HEAD}\nV-102,shell,9,2026-06-03,9\nV-999,shell,1,2026-06-03,9\n", park=True)
    assert [(one.vessel, one.notice.code) for one in inputs(works).recorded] == [(1, "parked row")]


def test_the_head_is_that_of_the_entry_asked_for(surveyed: Engine) -> None:
    with surveyed.connect() as conn:
        hashes = {row["no"]: row["hash"] for row in journal.entries(conn)}
    for number in (1, 2, 4):
        made = inputs(surveyed, known=number)
        assert (made.journal_no, made.journal_head) == (number, hashes[number])
    assert inputs(surveyed, known=0).journal_head == "0" * 64


def test_a_moment_is_turned_into_an_entry_once(works: Engine) -> None:
    later = datetime.now(UTC) + timedelta(hours=1)
    with journal.writer(works, task="state set", by="A. Keel", at=later) as entry:
        entry.add(models.Setting, [{"key": "list_life_years", "value": "2.0", "from_on": date(2020, 1, 1)}])
    with works.connect() as conn:
        assert Reader.at(conn, as_of=TODAY).known == 2
        assert Reader.at(conn, as_of=TODAY, known_at=later - timedelta(minutes=1)).known == 1
        assert Reader.at(conn, as_of=TODAY, known_at=datetime(2000, 1, 1, tzinfo=UTC)).known == 0
    assert inputs(works).settings.list_life_years == 2.0
    assert inputs(works, known=1).settings.list_life_years == 1.0


@pytest.mark.parametrize("tag", ["V-101", "V-102"])
def test_a_vessel_alone_is_as_it_is_among_the_others(surveyed: Engine, tag: str) -> None:
    alone, all_of_them = inputs(surveyed, tags=[tag]), inputs(surveyed)
    row = all_of_them.vessels.tag.tolist().index(tag)
    own = all_of_them.parts.vessel[all_of_them.locations.part[all_of_them.readings.location]] == row
    assert alone.vessels.tag.tolist() == [tag]
    for field in dataclasses.fields(alone.readings):
        if field.name != "location":
            mine = getattr(alone.readings, field.name)
            np.testing.assert_array_equal(mine, getattr(all_of_them.readings, field.name)[own])
