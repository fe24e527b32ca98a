"""What the demo rests on: every formula and rule value with its status, said beside the figure unless confirmed."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import replace
from datetime import date
from io import BytesIO
from pathlib import Path
from typing import Any

import openpyxl
import pytest

from fleet import formula
from fleet.appraisal.views import PartView, VesselView
from fleet.reports import cite, text
from fleet.reports.workbook.package import workbook_bytes
from fleet.rules import load_rule_set
from fleet.rules.loader import RuleValue
from fleet.store.engine import make_engine
from fleet.tasks.appraisals import Appraised, appraise_fleet

STATUSES = {"confirmed", "secondary", "from memory", "ours"}
UNSURE = {"secondary", "from memory"}


@pytest.fixture(scope="module")
def appraised(brackwater: Path) -> Appraised:
    return appraise_fleet(make_engine(brackwater / "fleet.db"), as_of=date(2026, 12, 1))


@pytest.fixture(scope="module")
def views(appraised: Appraised) -> list[VesselView]:
    return list(appraised.appraisal.views())


@pytest.fixture(scope="module")
def book(brackwater: Path) -> Any:
    return openpyxl.load_workbook(brackwater / "derating.xlsx")


def used(views: list[VesselView]) -> list[formula.Formula]:
    return [formula.REGISTER[name] for name in cite.formulas_of(views)]


def rule_values(views: list[VesselView]) -> list[RuleValue]:
    names = ["choices", *sorted({view.rules for view in views})]
    return [value for name in names for value in load_rule_set(name).values.values()]


def lines(sheet: Any) -> Iterator[list[str]]:
    for line in sheet.iter_rows(values_only=True):
        yield [" ".join(str(cell).split()) for cell in line if cell is not None]


def running(page: str) -> str:
    """Give a page of text in one line, without the rule at the left."""
    return " ".join(re.sub(r"[│\s]+", " ", page).split())


def saying(found: formula.Formula) -> str:
    return found.clause if found.status == "confirmed" else f"{found.clause} ({found.status})"


def sets(part: PartView, found: formula.Formula) -> bool:
    """Tell whether a formula gives the required thickness of a part."""
    if found.unit != "mm" or found.name not in part.formulas:
        return False
    return ("_axial_" in found.name) == (part.required_by == "axial") and part.required_by in {
        "hoop", "axial", "end",
    }  # fmt: skip


def test_every_formula_and_rule_has_its_status(views: list[VesselView]) -> None:
    known: dict[str, str] = {f"formula {f.name}, {f.clause}": f.status for f in used(views)}
    known |= {f"limit of {f.name}: {limit.printed}": limit.status for f in used(views) for limit in f.limits}
    known |= {f"rule {v.name}, {v.clause}": v.status for v in rule_values(views)}
    for what, status in known.items():
        print(f"{status:<11}  {what}")  # noqa: T201 the list is worth reading
    assert set(known.values()) <= STATUSES
    assert len(used(views)) >= 15
    assert len(rule_values(views)) >= 15
    assert all(f.source and f.edition and f.standard for f in used(views))
    assert all(v.source and v.clause for v in rule_values(views))


def test_the_workbook_lists_each_formula_limit_and_rule_with_its_status(
    book: Any, views: list[VesselView]
) -> None:
    told = list(lines(book["How to read"]))
    for found in used(views):
        [line] = [line for line in told if line[0] == found.name]
        assert found.printed in line[1]
        assert (found.clause, found.status) == (line[2], line[-1])
        for limit in found.limits:
            assert f"{limit.printed} ({limit.status})" in line[1]
    for value in rule_values(views):
        assert [line for line in told if line[0] == value.meaning and line[-1] == value.status], value.name


def test_the_workbook_says_it_beside_the_figure(book: Any, views: list[VesselView]) -> None:
    told = list(lines(book["What each figure rests on"]))
    heads = next(line for line in told if line[0] == "Vessel")
    rows = list(book["What each figure rests on"].iter_rows(values_only=True))
    top = next(i for i, row in enumerate(rows) if "Vessel" in row[:2])
    columns = {str(head): i for i, head in enumerate(rows[top]) if head}
    assert {"Required by clause", "Pressure by clause"} <= set(heads)
    checked = 0
    by_part = {(view.vessel, part.part): part for view in views for part in view.parts}
    for row in rows[top + 1 :]:
        part = by_part.get((row[columns["Vessel"]], row[columns["Part"]]))
        if part is None:
            continue
        required, pressure = (
            " ".join(str(row[columns[head]]).split()) for head in ("Required by clause", "Pressure by clause")
        )
        for found in (formula.REGISTER[name] for name in part.formulas):
            if sets(part, found) and row[columns["Set by"]] == part.required_by:
                assert saying(found) in required, (row[:4], found.name)
                checked += 1
            if found.unit == "MPa":
                assert saying(found) in pressure, (row[:4], found.name)
                checked += 1
    assert checked > 700


def test_show_says_it_beside_the_figure(views: list[VesselView]) -> None:
    checked = 0
    for view in views:
        page = running(text.show(view))
        for part in view.parts:
            for found in (formula.REGISTER[name] for name in part.formulas):
                if sets(part, found):
                    assert f"set by {part.required_by}, {saying(found)}" in page, (view.vessel, found.name)
                    checked += 1
                elif found.status in UNSURE and found.unit == "MPa" and part.mawp_today_mpa is not None:
                    assert saying(found) in page, (view.vessel, part.part, found.name)
                    checked += 1
    assert checked > 100


def test_show_says_how_well_the_rules_are_known(views: list[VesselView]) -> None:
    for view in views:
        unsure = {v.status for v in load_rule_set(view.rules).values.values()} - {"confirmed", "ours"}
        assert unsure, "no rule of this set is unsure any more: this test proves nothing"
        page = running(text.show(view))
        for status in unsure:
            assert re.search(rf"by {view.rules} \([^)]*{status}[^)]*\)", page), (view.vessel, status)


def test_the_list_says_how_well_the_rules_are_known(book: Any, views: list[VesselView]) -> None:
    unsure = {v.status for v in rule_values(views)} - {"confirmed", "ours"}
    rows = list(book["The list"].iter_rows(values_only=True))
    top = next(i for i, row in enumerate(rows) if "Vessel" in row[:2])
    column = next(i for i, head in enumerate(rows[top]) if head == "By the rules")
    said = {" ".join(str(row[column]).split()) for row in rows[top + 1 :] if row[1] and row[2]}
    assert said == {f"{view.rules} ({', '.join(sorted(unsure))})" for view in views}


def test_a_formula_that_is_only_remembered_would_be_told(
    appraised: Appraised, views: list[VesselView], monkeypatch: pytest.MonkeyPatch
) -> None:
    view = next(view for view in views if view.vessel == "D-203")
    [found] = [f for f in used([view]) if sets(view.parts[1], f)]
    assert "(from memory)" not in running(text.show(view))
    monkeypatch.setitem(formula.REGISTER, found.name, replace(found, status="from memory"))
    assert f"set by hoop, {found.clause} (from memory)" in running(text.show(view))
    book = openpyxl.load_workbook(BytesIO(workbook_bytes(appraised.appraisal)))
    [line] = [line for line in lines(book["How to read"]) if line[0] == found.name]
    assert line[-1] == "from memory"
    for sheet in ("The list", "What each figure rests on"):
        assert any(f"{found.clause} (from memory)" in line for line in lines(book[sheet])), sheet
