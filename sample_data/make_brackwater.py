"""Write the files of Brackwater Works: register, surveys, events, scan, expectations and their README.

Run ``python make_brackwater.py [FOLDER]`` (default: this folder) to write them, ``--check`` to reckon every
vessel by ``brackwater_reckoning`` and compare it with what the table intends. Needs numpy and openpyxl.
"""

from __future__ import annotations

import csv
import sys
from datetime import date
from io import StringIO
from pathlib import Path
from typing import Any

import numpy as np
from brackwater_reckoning import Spot, judge, spot
from brackwater_register import (
    INSPECTION_COLUMNS,
    LOCATION_COLUMNS,
    PART_COLUMNS,
    RELIEF_COLUMNS,
    UNITS,
    VESSEL_COLUMNS,
    inspection_rows,
    location_rows,
    part_rows,
    relief_rows,
    vessel_rows,
)  # fmt: skip
from brackwater_story import (
    EVENTS,
    HARMLESS,
    LOADING_DOUBTS,
    README_HEAD,
    REGISTER,
    SPOILT,
    SURVEYS,
    TROUBLES,
    Survey,
    location,
)  # fmt: skip
from brackwater_vessels import AS_OF, VESSELS, Vessel
from brackwater_walls import PER_MM, Point, Row, noise, points, survey_rows
from openpyxl import Workbook
from openpyxl.styles import Font


def headings(columns: list[str] | tuple[str, ...], units: dict[str, str]) -> list[str]:
    """Put the unit behind each physical column."""
    return [f"{c} [{units[c]}]" if c in units else c for c in columns]


def write_survey(folder: Path, survey: Survey) -> int:
    """Write one survey file; give the number of its readings."""
    rows = survey_rows(survey)
    columns = ["vessel", "part", "location", "taken_on", "thickness", *survey.columns]
    units = {**UNITS, "thickness": survey.unit, "average": survey.unit}
    if survey.kind == "xlsx":
        book = Workbook()
        sheet = book.worksheets[0]
        sheet.title = "readings"
        if survey.title:
            sheet.append([survey.title])
            sheet.append(
                [f"Brackwater Works. Read by {survey.technician}. Least of each spot, in {survey.unit}."]
            )
            sheet.append([])
        _fill(sheet, columns, rows, units)
        book.save(folder / survey.file)
    else:
        text = StringIO(newline="")
        writer = csv.writer(text, lineterminator="\n")
        writer.writerow(headings(columns, units))
        for row in rows:
            writer.writerow(["" if (cell := row.get(c)) is None else _text(cell, c, survey) for c in columns])
        encoding = "utf-8-sig" if survey.kind == "bom" else "utf-8"
        (folder / survey.file).write_text(text.getvalue(), encoding=encoding)
    return len(rows)


def _text(cell: object, column: str, survey: Survey) -> str:
    if isinstance(cell, float) and column in {"thickness", "average"} and cell < 100:
        return f"{cell:.{survey.decimals}f}"
    return f"{cell:g}" if isinstance(cell, float) else str(cell)


def _fill(sheet: Any, columns: list[str], rows: list[Row], units: dict[str, str]) -> None:
    sheet.append(headings(columns, units))
    head = sheet.max_row
    for cell in sheet[head]:
        cell.font = Font(bold=True)
    for row in rows:
        sheet.append([row.get(c) for c in columns])
    for number, column in enumerate(columns, start=1):
        letter = sheet.cell(1, number).column_letter
        width = max([len(str(row.get(column) or "")) for row in rows] + [len(column) + 6])
        sheet.column_dimensions[letter].width = min(width + 1, 44)
    for line in sheet.iter_rows(min_row=head + 1):
        for cell in line:
            if isinstance(cell.value, date):
                cell.number_format = "yyyy-mm-dd"
            elif isinstance(cell.value, str):
                cell.number_format = "@"
    sheet.freeze_panes = sheet.cell(head + 1, 1)


def write_register(path: Path) -> None:
    """Write the register workbook, one sheet a table."""
    book = Workbook()
    book.remove(book.worksheets[0])
    for name, columns, rows in (
        ("vessels", VESSEL_COLUMNS, vessel_rows()),
        ("parts", PART_COLUMNS, part_rows()),
        ("locations", LOCATION_COLUMNS, location_rows()),
        ("inspections", INSPECTION_COLUMNS, inspection_rows()),
        ("relief", RELIEF_COLUMNS, relief_rows()),
    ):
        _fill(book.create_sheet(name), columns, rows, UNITS)
    book.save(path)


def toml(value: object) -> str:
    """Write one value as TOML."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, list | tuple):
        return "[" + ", ".join(toml(v) for v in value) + "]"
    if isinstance(value, date | int | float):
        return str(value)
    return '"' + str(value).replace("\\", "\\\\").replace('"', '\\"') + '"'


def tables(name: str, rows: list[Row]) -> str:
    """Write rows as a TOML array of tables."""
    return "".join(f"\n[[{name}]]\n" + "".join(f"{k} = {toml(v)}\n" for k, v in r.items()) for r in rows)


EVENTS_HEAD = """# Dated facts of Brackwater Works that stand in no sheet.
# One list per kind; keys are the columns of the record. entered_on sets the order of loading: an event is
# entered before every survey file whose name carries the same or a later day, after those of earlier days.
# restart.locations lists all locations of the part where whole_part is true.
# pressure and rate are text with a unit.
"""


def write_events(path: Path) -> None:
    """Write the events, each list in the order of entry."""
    parts = [tables(kind, sorted(rows, key=lambda r: str(r["entered_on"]))) for kind, rows in EVENTS.items()]
    path.write_text(EVENTS_HEAD + "".join(parts), encoding="utf-8")


def write_expected(path: Path, readings: dict[str, int]) -> None:
    """Write what the appraisal of the as-of date should say, for tests to compare with."""
    counts = {
        "vessels": len(VESSELS), "parts": sum(len(v.parts) for v in VESSELS),
        "locations": sum(p.count for v in VESSELS for p in v.parts), "inspections": len(inspection_rows()),
        "relief": len(relief_rows()), "survey_files": len(readings), "readings": sum(readings.values()),
        "troubles": len(TROUBLES), "restarts": len(EVENTS["restart"]),
        "dated_states": len(EVENTS["dated_state"]),
        "decisions": len(EVENTS["decision"]),
    }  # fmt: skip
    vessels = []
    for v in VESSELS:
        row: Row = {"tag": v.tag, "block": v.block or v.standing}
        if v.standing:
            row["standing"] = v.standing
        row |= {
            "flags": list(v.flags),
            "trouble_free": set(v.troubles) <= HARMLESS,
            "troubles": list(v.troubles),
        }
        vessels.append(row)
    troubles = []
    for t in TROUBLES:
        row = {
            "name": t.name,
            "vessel": t.vessel,
            "part": t.part,
            "location": t.location,
            "file": t.file,
            "code": t.code,
        }
        troubles.append({k: x for k, x in row.items() if x})
    doubts = [{"file": f, "code": c, "count": n} for f, c, n, _ in LOADING_DOUBTS]
    text = f"# What the appraisal of {AS_OF} should say. No standing: none is asserted.\n"
    text += f"as_of = {AS_OF}\n\n[counts]\n"
    text += "".join(f"{k} = {n}\n" for k, n in counts.items())
    text += "\n[readings_in_file]\n" + "".join(f'"{k}" = {n}\n' for k, n in readings.items())
    path.write_text(
        text + tables("vessel", vessels) + tables("trouble", troubles) + tables("loading_doubt", doubts),
        encoding="utf-8",
    )


def write_scan(path: Path) -> None:
    """Write the grid over the local thin area of D-311: 25 mm squares, one hollow left of the middle."""
    rng = noise("scan")
    across, down = np.arange(0, 425, 25), np.arange(0, 325, 25)
    x, y = np.meshgrid(across - 175.0, down - 150.0)
    rounds = (x / 95) ** 2 + (y / 70) ** 2
    wall = 12.1 - 2.55 * np.exp(-rounds) + rng.normal(0, 0.06, x.shape)
    lines = [",".join(["axial across [mm]", *(str(a) for a in across)])]
    lines += [",".join([str(d), *(f"{w:.2f}" for w in line)]) for d, line in zip(down, wall, strict=True)]
    path.write_text("\n".join(lines) + "\n", encoding="utf-8")


REFUSED = """vessel,part,location,taken_on,thickness [mm],technician
D-203,course 1,{low},2026-11-20,11.92,K. Holm
D-203,course 1,{odd},20/11/2026,13.41,K. Holm
D-203,course 9,77,2026-11-20,14.02,K. Holm
D-203,course 2,{text},2026-11-20,see note,K. Holm
"""


def write_refused(path: Path) -> None:
    """Write a sheet that must be refused, with a low reading that must be told first all the same."""
    low, odd = location("D-203", "course 1", 0), location("D-203", "course 1", 1)
    path.write_text(REFUSED.format(low=low, odd=odd, text=location("D-203", "course 2", 0)), encoding="utf-8")


def write_readme(path: Path, readings: dict[str, int]) -> None:
    """Put the planted troubles and the files into the README between its two marks."""
    lines = [
        "## The planted troubles",
        "",
        "| trouble | vessel | part, location | file | what fleet should say |",
        "|---|---|---|---|---|",
    ]
    for t in TROUBLES:
        place = ", ".join(x for x in (t.part, t.location) if x) or "–"
        lines.append(f"| {t.name} | {t.vessel} | {place} | `{t.file}` | {t.says} |")
    lines += [
        "",
        "## The vessels",
        "",
        "| vessel | service | standing | block | flags |",
        "|---|---|---|---|---|",
    ]
    for v in VESSELS:
        flags = ", ".join(v.flags) or "–"
        lines.append(
            f"| {v.tag} | {v.service} | {v.standing or 'none asserted'} | {v.block or v.standing} | {flags} |"
        )
    lines += [
        "",
        "## The survey files",
        "",
        "| file | readings | wall in | columns beyond the five that every file has |",
        "|---|---|---|---|",
    ]
    lines += [f"| `{s.file}` | {readings[s.file]} | {s.unit} | {', '.join(s.columns)} |" for s in SURVEYS]
    path.write_text(README_HEAD + "\n" + "\n".join(lines) + "\n", encoding="utf-8")


def read_back() -> dict[tuple[str, str], list[tuple[date, float]]]:
    """Gather the walls in strength of each location as the files give them; queried readings stay out."""
    history: dict[tuple[str, str], list[tuple[date, float]]] = {}
    for base in location_rows():
        if base.get("baseline_on"):
            history[base["vessel"], base["location"]] = [(base["baseline_on"], base["baseline_thickness"])]
    for survey in SURVEYS:
        for row in survey_rows(survey):
            point: Point = row["true"]
            where = (survey.start.isoformat(), row["vessel"], row["part"], point.index)
            if row["thickness"] is None or SPOILT.get(where, ("",))[0] in {"times", "in mm"}:
                continue
            wall = row["thickness"] / PER_MM[survey.unit] - point.part.drawing.get("lining_thickness", 0.0)
            history.setdefault((row["vessel"], row["location"]), []).append((row["taken_on"], wall))
    return history


def spots(vessel: Vessel, history: dict[tuple[str, str], list[tuple[date, float]]]) -> list[Spot]:
    """Reckon every measured location of a vessel on its present history."""
    found = []
    for point in points(vessel):
        past = history.get((vessel.tag, point.location), [])
        chosen = 0.16 if (vessel.tag, point.part.name) == ("D-205", "course 1") else 0.0
        for restart in (vessel.new_metal, vessel.change):
            if restart and restart[1] == point.part.name:
                before = [p for p in past if p[0] < restart[0]]
                past = [p for p in past if p[0] >= restart[0]]
                if restart is vessel.change:
                    past = [(restart[0], before[-1][1]), *past]
        if past:
            found.append(spot(vessel, point.part, point.location, past, chosen))
    return found


def check() -> int:
    """Reckon every vessel and compare with the table; give the number of mismatches."""
    history, wrong = read_back(), 0
    for v in VESSELS:
        here = spots(v, history)
        looks = [r["done_on"] for r in inspection_rows() if r["vessel"] == v.tag and r["kind"] != "external"]
        looks += [v.columns["last_internal_on"]] if "last_internal_on" in v.columns else []
        standing, figures = judge(v, here, max(looks, default=v.in_service))
        agrees = v.standing in {standing, "", "no verdict"}
        agrees = agrees and (not v.standing or bool(figures["re-gauge"]) == ("re-gauge" in v.flags))
        late = figures["due"] < AS_OF and v.tag != "R-411"  # R-411 has a deferral in force
        agrees = agrees and (not v.standing or late == ("overdue" in v.flags))
        wrong += not agrees
        worst, tight = min(here, key=lambda s: s.life), min(here, key=lambda s: s.wall / s.need)
        print(
            f"{'  ' if agrees else '!!'} {v.tag:7} {standing:20} wanted {v.standing:20} due {figures['due']} "
            f"retire {figures['retire']} carries today {figures['today']:.3f} of {v.current or v.mawp}; "
            f"life {worst.part.name}/{worst.location} {worst.wall:.2f} over {worst.need:.2f}, "
            f"long {worst.long_rate:.3f} short {worst.short_rate:.3f}: {worst.life:.1f} a; "
            f"least {tight.part.name}/{tight.location} "
            f"{tight.wall:.2f} over {tight.need:.2f}"
        )
    return wrong


def main(arguments: list[str]) -> int:
    """Write the files, or check the table."""
    if "--check" in arguments:
        return check()
    folder = Path(arguments[0]) if arguments else Path(__file__).parent
    for name in ("surveys", "scans", "refused"):
        (folder / name).mkdir(parents=True, exist_ok=True)
    readings = {s.file: write_survey(folder / "surveys", s) for s in SURVEYS}
    write_register(folder / REGISTER)
    write_events(folder / "events.toml")
    write_expected(folder / "expected.toml", readings)
    write_scan(folder / "scans" / "D-311_course_1.csv")
    write_refused(folder / "refused" / "2026-11-20_D-203.csv")
    write_readme(folder / "README.md", readings)
    print(
        f"{len(readings)} survey files, {sum(readings.values())} readings, {len(TROUBLES)} planted troubles"
    )
    return 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
