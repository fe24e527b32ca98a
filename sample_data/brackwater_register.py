"""The invented works: the rows of the register, one function a sheet."""

from __future__ import annotations

from datetime import date, timedelta

import numpy as np
from brackwater_story import BLANKS, LOCAL, NOMINAL_BASELINE
from brackwater_vessels import AS_OF, TURNAROUNDS, VESSELS
from brackwater_walls import Row, noise, points

PSI = 145.0377377
UNITS = {
    "design_pressure": "MPa", "nameplate_mawp": "MPa", "current_mawp": "MPa",
    "external_design_pressure": "MPa",
    "operating_pressure": "bar", "design_temperature": "degC", "min_design_temperature": "degC",
    "inside_diameter": "mm", "outside_diameter": "mm", "length": "mm", "crown_radius": "mm",
    "knuckle_radius": "mm",
    "half_apex_angle": "deg", "gasket_diameter": "mm", "nominal_thickness": "mm", "corrosion_allowance": "mm",
    "allowable_stress": "MPa", "static_head": "kPa", "structural_minimum": "mm",
    "required_thickness_external": "mm",
    "required_thickness_axial": "mm", "required_thickness_given": "mm", "other_pressure_limit": "MPa",
    "lining_thickness": "mm", "expected_rate": "mm/year", "alert_thickness": "mm", "seam_distance": "mm",
    "elevation": "mm", "angle": "deg", "diameter_at": "mm", "baseline_thickness": "mm", "reading_error": "mm",
    "set_pressure": "psi", "thickness": "mm", "average": "mm", "wall_temperature": "degC",
}  # fmt: skip
VESSEL_COLUMNS = [
    "vessel",
    "site",
    "service",
    "rules",
    "design_code",
    "code_edition",
    "in_service_on",
    "design_pressure",
    "design_temperature",
    "nameplate_mawp",
    "current_mawp",
    "current_mawp_from",
    "current_mawp_basis",
    "external_design_pressure",
    "operating_pressure",
    "next_survey_on",
    "last_internal_on",
    "last_external_on",
    "assembly",
    "unit",
    "contents",
    "hazard_class",
    "year_built",
    "manufacturer_serial",
    "jurisdiction_number",
    "insulated",
    "min_design_temperature",
    "data_report",
]
PART_COLUMNS = [
    "vessel",
    "part",
    "shape",
    "inside_diameter",
    "outside_diameter",
    "length",
    "crown_radius",
    "knuckle_radius",
    "half_apex_angle",
    "axis_ratio",
    "cover_factor",
    "gasket_diameter",
    "nominal_thickness",
    "corrosion_allowance",
    "material",
    "allowable_stress",
    "stress_basis",
    "joint_efficiency_long",
    "joint_efficiency_circ",
    "joint_efficiency",
    "static_head",
    "structural_minimum",
    "required_thickness_external",
    "required_thickness_axial",
    "required_thickness_given",
    "other_pressure_limit",
    "loss_side",
    "lining",
    "lining_thickness",
    "lining_counts_in_strength",
    "expected_rate",
    "alert_thickness",
]
LOCATION_COLUMNS = [
    "vessel",
    "part",
    "location",
    "position",
    "zone",
    "elevation",
    "angle",
    "diameter_at",
    "damage",
    "baseline_thickness",
    "baseline_on",
    "reading_error",
]
INSPECTION_COLUMNS = ["vessel", "kind", "done_on", "extent", "inspector", "report"]
RELIEF_COLUMNS = ["device", "vessel", "set_pressure", "last_test_on", "next_test_on"]


def vessel_rows() -> list[Row]:
    """Build the vessels sheet."""
    rows = []
    for number, v in enumerate(VESSELS, start=1):
        row: Row = {
            "vessel": v.tag, "site": "Brackwater Works", "unit": v.plant,
            "service": v.service, "contents": v.contents,
            "rules": "api510", "design_code": v.code, "code_edition": v.edition,
            "in_service_on": v.in_service,
            "design_pressure": v.mawp, "design_temperature": v.temperature, "nameplate_mawp": v.mawp,
            "external_design_pressure": 0, "operating_pressure": round((v.current or v.mawp) * 8.5, 1),
            "next_survey_on": v.next_survey,
            "hazard_class": "toxic" if "ammonia" in v.contents else "pressure",
            "year_built": v.in_service.year - 1, "manufacturer_serial": f"KV {7000 + 37 * number}",
            "jurisdiction_number": f"BR{1200 + number}", "insulated": "yes" if v.temperature > 100 else "no",
            "min_design_temperature": -33 if "ammonia" in v.contents else -10,
            "data_report": f"BW-DR-{number:03d}",
        }  # fmt: skip
        rows.append(row | v.columns)
    return rows


def part_rows() -> list[Row]:
    """Build the parts sheet."""
    rows = []
    for v in VESSELS:
        grade, stress, basis = v.material
        for part in v.parts:
            row: Row = {"vessel": v.tag, "part": part.name, "shape": part.shape, "material": grade}
            if part.shape != "other":
                row |= {"allowable_stress": stress, "stress_basis": basis}
            row |= {"nominal_thickness": part.nominal, "corrosion_allowance": 3 if part.nominal > 11 else 1.5}
            if v.tag == "H-221S":
                row["expected_rate"] = 0.05
            blank = BLANKS.get((v.tag, part.name), ())
            rows.append({k: x for k, x in (row | part.drawing).items() if k not in blank})
    return rows


def location_rows() -> list[Row]:
    """Build the locations sheet."""
    sides = ("north", "east", "south", "west")
    rows = []
    for v in VESSELS:
        up = 0
        for part in v.parts:
            height = part.drawing.get("length") or 400
            for point in (p for p in points(v) if p.part is part):
                share = (point.index + 0.5) / part.count
                row: Row = {
                    "vessel": v.tag,
                    "part": part.name,
                    "location": point.location,
                    "damage": "general",
                }
                row["angle"] = (90 * point.index) % 360
                row["position"] = f"{sides[point.index % 4]} side"
                row["zone"] = "plate"
                if "head" in part.name or "cap" in part.name:
                    row["zone"] = "crown" if point.index % 2 == 0 else "knuckle"
                    row["zone"] = "plate" if part.shape in {"sphere", "hemispherical head"} else row["zone"]
                if v.tag.startswith("T-") or v.plant == "storage":
                    row["elevation"] = round(up + share * height)
                if part.shape == "cone":
                    alpha = np.radians(part.drawing["half_apex_angle"])
                    fall = 2 * np.tan(alpha) * height * (1 - share)
                    row["diameter_at"] = round(float(part.drawing["inside_diameter"] - fall))
                if (v.tag, part.name, point.index) == LOCAL:
                    row |= {"damage": "local", "position": "under the acid sparger, about 200 mm wide"}
                if part.shape == "nozzle neck":
                    row["reading_error"] = 0.15
                if (v.tag, part.name, point.index) == NOMINAL_BASELINE:
                    row |= {"baseline_thickness": part.nominal, "baseline_on": v.in_service}
                if v.tag in {"D-112", "R-412"}:
                    rng = noise(v.tag, point.location, "baseline")
                    measured = point.wall(v.in_service) + part.noise * float(rng.normal())
                    row |= {"baseline_thickness": round(measured, 2), "baseline_on": v.in_service}
                rows.append(row)
            up += height
    return rows


def inspection_rows() -> list[Row]:
    """Build the inspections sheet."""
    rows = []
    for v in VESSELS:
        inside, outside = TURNAROUNDS[v.plant]
        dated = [("internal", d) for d in v.internals or tuple(date.fromisoformat(t) for t in inside)]
        dated += [("external", date.fromisoformat(t)) for t in outside] + [
            ("external", d) for d in v.externals
        ]
        if v.tag == "T-152":
            dated.append(("on-stream", date(2023, 9, 19)))
        if v.tag == "D-126":
            dated = [("external", date(2019, 6, 20)), ("internal", date(2005, 6, 14))]
        for kind, day in sorted(set(dated), key=lambda pair: pair[1]):
            starting = v.columns.get(f"last_{kind}_on") if kind != "on-stream" else None
            if v.in_service <= day <= (v.last if v.last and v.block == "retired" else AS_OF) and not (
                starting and day >= starting
            ):
                report = f"BW-IR-{day:%y%m%d}-{v.tag}"
                who = "O. Lindqvist" if day.year < 2019 else "F. Mbeki"
                rows.append(
                    {
                        "vessel": v.tag,
                        "kind": kind,
                        "done_on": day,
                        "extent": "full",
                        "inspector": who,
                        "report": report,
                    }
                )
    return rows


def relief_rows() -> list[Row]:
    """Build the relief sheet; set pressures in psi, as the valve workshop stamps them."""
    rows = []
    for v in VESSELS:
        setting = v.relief or v.current or v.mawp
        if v.tag == "D-125":
            continue
        for number in range(v.valves):
            tested = {"storage": date(2025, 5, 15)}.get(v.plant, date(2024, 11, 20) + timedelta(days=number))
            rows.append({
                "device": f"SV-{v.tag[2:]}{'AB'[number]}", "vessel": v.tag,
                "set_pressure": int(setting * PSI),
                "last_test_on": tested, "next_test_on": tested.replace(year=tested.year + 4),
            })  # fmt: skip
    return rows
