"""Facts in force: corrections, changes, and what was known when. On both engines."""

from __future__ import annotations

import datetime as dt
from collections.abc import Callable
from typing import Any

import pytest
from sqlalchemy import Engine

from fleet import errors
from fleet.store import facts, journal
from fleet.store.models import Entity, Inspection, Journal, Reading, Setting, Vessel

Fill = Callable[[Engine], dict[str, int]]


def _vessel(entity_id: int, since: dt.date, service: str, **values: Any) -> dict[str, Any]:
    row = {"entity_id": entity_id, "valid_from": since, "service": service, "rules": "api510"}
    rest = {"design_code": "asme8-1", "in_service_on": dt.date(2001, 5, 1), "design_pressure_mpa": 1.0}
    return {**row, **rest, **values}


def _services(engine: Engine, known: int, as_of: dt.date | None = None) -> list[str]:
    with engine.connect() as conn:
        return facts.columns(conn, Vessel, known=known, as_of=as_of, only=["service"])["service"]


def _write(engine: Engine, model: Any, *rows: dict[str, Any]) -> list[int]:
    with journal.writer(engine, task="x", by="A. Keel") as entry:
        return entry.add(model, rows)


def _day(year: int) -> dt.date:
    return dt.date(year, 1, 1)


def test_values_come_back_in_their_own_types(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    with engine.connect() as conn:
        read = facts.columns(conn, Reading, known=3)
        vessel = facts.columns(conn, Vessel, known=3)
    assert read["id"] == [ids["reading"], ids["reading 2"], ids["reading 3"]]
    assert read["thickness_mm"] == [12.7, 0.1 + 0.2, 11.9]
    assert read["taken_on"] == [dt.date(2026, 3, 4)] * 3
    assert read["written"][0] == '{"thickness": "12.7 mm"}'
    assert read["note"] == [None, None, None]
    assert vessel["service"] == ["Ammoniak, größer"]
    assert set(read) == {column.name for column in Reading.__table__.columns}


def test_a_truth_comes_back_as_a_truth(engine: Engine, fill: Fill) -> None:
    from fleet.store.models import Restart

    fill(engine)
    with engine.connect() as conn:
        assert facts.columns(conn, Restart, known=3)["whole_part"] == [False]


def test_what_was_written_later_is_not_known_earlier(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with engine.connect() as conn:
        assert facts.columns(conn, Entity, known=0)["tag"] == []
        assert facts.columns(conn, Reading, known=1)["id"] == []
        assert len(facts.columns(conn, Reading, known=2)["id"]) == 3
        assert facts.columns(conn, Reading, known=2, only=["thickness_mm"]).keys() == {"thickness_mm"}


def test_a_correction_takes_the_place_of_what_it_corrects(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    row = {"location_id": ids["location"], "taken_on": dt.date(2026, 3, 4), "result": "read"}
    rest = {"kind": "reading", "status": "accepted", "replaces_id": ids["reading"]}
    [second] = _write(engine, Reading, {**row, **rest, "thickness_mm": 12.5})  # entry 4
    [third] = _write(
        engine,
        Reading,
        {
            **row,
            **rest,
            "thickness_mm": 12.5,
            "replaces_id": second,
            "status": "voided",
            "status_because": "echo",
        },
    )  # entry 5
    with engine.connect() as conn:
        kept = [facts.columns(conn, Reading, known=known)["id"] for known in (3, 4, 5)]
    others = [ids["reading 2"], ids["reading 3"]]
    assert kept == [[ids["reading"], *others], [*others, second], [*others, third]]


def test_a_change_holds_from_its_day_and_the_first_row_from_the_beginning(engine: Engine, fill: Fill) -> None:
    vessel = fill(engine)["vessel"]
    _write(engine, Vessel, _vessel(vessel, _day(2010), "naphtha"))  # entry 4
    _write(engine, Vessel, _vessel(vessel, _day(2020), "steam"))  # entry 5
    first = "Ammoniak, größer"
    assert _services(engine, 5, _day(1990)) == [first]
    assert _services(engine, 5, dt.date(2009, 12, 31)) == [first]
    assert _services(engine, 5, _day(2010)) == ["naphtha"]
    assert _services(engine, 5, _day(2030)) == ["steam"]
    assert _services(engine, 5) == ["steam"]
    assert _services(engine, 4, _day(2030)) == ["naphtha"]
    assert _services(engine, 3, _day(2030)) == [first]


def test_a_correction_is_no_change(engine: Engine, fill: Fill) -> None:
    """The correction takes over the day of the row it replaces, and leaves later changes alone."""
    vessel = fill(engine)["vessel"]
    with engine.connect() as conn:
        [first] = facts.columns(conn, Vessel, known=3)["id"]
    _write(engine, Vessel, _vessel(vessel, _day(2010), "naphtha"))  # entry 4
    _write(engine, Vessel, _vessel(vessel, dt.date(2001, 5, 1), "ammonia", replaces_id=first))  # entry 5
    replay = {
        (year, known): _services(engine, known, _day(year)) for year in (2005, 2015) for known in (3, 4, 5)
    }
    assert replay == {
        (2005, 3): ["Ammoniak, größer"],
        (2005, 4): ["Ammoniak, größer"],
        (2005, 5): ["ammonia"],
        (2015, 3): ["Ammoniak, größer"],
        (2015, 4): ["naphtha"],
        (2015, 5): ["naphtha"],
    }


def test_of_two_rows_of_one_day_the_later_holds(engine: Engine, fill: Fill) -> None:
    vessel = fill(engine)["vessel"]
    _write(engine, Vessel, _vessel(vessel, _day(2010), "naphtha"))
    _write(engine, Vessel, _vessel(vessel, _day(2010), "steam"))
    assert _services(engine, 5, _day(2010)) == ["steam"]


def test_every_entity_keeps_exactly_one_row(engine: Engine, fill: Fill) -> None:
    fill(engine)
    with journal.writer(engine, task="register load", by="A. Keel") as entry:
        keys = entry.add(Entity, [{"kind": "vessel", "tag": f"V-{n}"} for n in range(40)])
        rows = [
            _vessel(key, _day(2000 + (7 * n + 3 * change) % 25), f"{n}/{change}")
            for change in range(3)
            for n, key in enumerate(keys)
        ]
        entry.add(Vessel, rows)
    with engine.connect() as conn:
        for as_of in (None, _day(1980), _day(2012), _day(2040)):
            entities = facts.columns(conn, Vessel, known=4, as_of=as_of)["entity_id"]
            assert sorted(entities) == sorted({*keys, 1})


def test_a_fact_can_be_taken_back(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    row = {"vessel_id": ids["vessel"], "kind": "internal", "done_on": dt.date(2001, 5, 1), "replaces_id": 1}
    _write(engine, Inspection, {**row, "withdrawn_because": "entered under the wrong tag"})
    with engine.connect() as conn:
        assert facts.columns(conn, Inspection, known=3)["id"] == [1]
        assert facts.columns(conn, Inspection, known=4)["id"] == []
        assert [each["id"] for each in facts.history(conn, Inspection, ids["vessel"])] == [1, 2]


def test_history_shows_every_row_and_what_replaced_it(engine: Engine, fill: Fill) -> None:
    ids = fill(engine)
    row = {"taken_on": dt.date(2026, 3, 4), "result": "read", "kind": "reading", "status": "accepted"}
    moved = {**row, "location_id": ids["other"], "thickness_mm": 12.7, "replaces_id": ids["reading"]}
    [new] = _write(engine, Reading, moved)
    with engine.connect() as conn:
        here = facts.history(conn, Reading, ids["location"])
        there = facts.history(conn, Reading, ids["other"])
        with pytest.raises(errors.OurFault, match="about no entity"):
            facts.history(conn, Journal, 1)
    assert [(each["id"], each["entry_no"], each["replaced_by"]) for each in here] == [
        (ids["reading"], 2, new),
        (ids["reading 2"], 2, None),
    ]
    assert [each["id"] for each in there] == [ids["reading 3"], new]
    assert here[0]["taken_on"] == dt.date(2026, 3, 4)


def test_settings_of_one_key_all_stand(engine: Engine, fill: Fill) -> None:
    """Which of several settings is nearest is for the reader to judge; none is lost here."""
    ids = fill(engine)
    row = {"key": "reading error", "value": "0.1 mm", "from_on": _day(2020)}
    _write(engine, Setting, {**row, "subject_id": ids["vessel"]}, row)
    with engine.connect() as conn:
        assert facts.columns(conn, Setting, known=4)["value"] == ["0.25 mm", "0.1 mm", "0.1 mm"]
