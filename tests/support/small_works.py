"""A works of two vessels, as files that a person would load: for tests of tasks and commands."""

from __future__ import annotations

from pathlib import Path

VESSELS = """\
vessel,service,rules,design_code,in_service_on,nameplate_mawp [MPa],external_design_pressure [MPa],next_survey_on
V-101,feed drum,api510,asme8-1,2010-05-01,2.5,0,2027-06-01
V-102,flash drum,api510,asme8-1,2012-03-01,1.0,0,2027-06-01
"""

PARTS = """\
vessel,part,shape,inside_diameter [mm],nominal_thickness [mm],allowable_stress [MPa],joint_efficiency_long,\
joint_efficiency_circ,static_head [MPa],structural_minimum [mm],required_thickness_axial [mm],loss_side,lining,\
alert_thickness [mm]
V-101,shell,cylinder,1000,14,138,1,1,0,0,0,inside,none,10.5
V-102,shell,cylinder,800,10,138,1,1,0,0,0,inside,none,
"""

LOCATIONS = """\
vessel,part,location,position
V-101,shell,1,north
V-101,shell,2,south
V-102,shell,1,north
"""

INSPECTIONS = """\
vessel,kind,done_on,extent,inspector
V-101,internal,2022-04-01,full,R. Salt
V-101,external,2024-04-01,full,R. Salt
V-102,internal,2022-04-01,full,R. Salt
V-102,external,2024-04-01,full,R. Salt
"""

RELIEF = """\
device,vessel,set_pressure [MPa]
PSV-101,V-101,2.5
PSV-102,V-102,1.0
"""

SURVEYS = {
    "2016-05-10_all.csv": """\
vessel,part,location,taken_on,thickness [mm]
V-101,shell,1,2016-05-09,13.4
V-101,shell,2,2016-05-09,13.6
V-102,shell,1,2016-05-09,9.7
""",
    "2021-06-02_all.csv": """\
vessel,part,location,taken_on,thickness [mm]
V-101,shell,1,2021-06-01,12.6
V-101,shell,2,2021-06-01,13.3
V-102,shell,1,2021-06-01,9.5
""",
    "2026-06-04_all.csv": """\
vessel,part,location,taken_on,thickness [in],result
V-101,shell,1,2026-06-03,0.4646,
V-101,shell,2,2026-06-03,0.5118,
V-102,shell,1,2026-06-03,,no access
""",
}


def write_register(folder: Path) -> list[Path]:
    """Write the register as five CSV files."""
    tables = {
        "vessels.csv": VESSELS,
        "parts.csv": PARTS,
        "locations.csv": LOCATIONS,
        "inspections.csv": INSPECTIONS,
        "relief.csv": RELIEF,
    }
    return [write(folder, name, text) for name, text in tables.items()]


def write_surveys(folder: Path) -> list[Path]:
    """Write the three survey files, oldest first."""
    return [write(folder, name, text) for name, text in SURVEYS.items()]


def write(folder: Path, name: str, text: str) -> Path:
    """Write one file."""
    path = folder / name
    path.write_text(text, encoding="utf-8")
    return path
