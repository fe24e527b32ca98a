"""Vessels of Brackwater Works worked by exact fractions from the printed digits; nothing of fleet is imported.

Every input is typed again below, with the row of the register workbook and the row of the survey sheet on which it
stands; one test sees that the files still say so. The reckoning is the reader's own and goes step by step: walls and
rates, required wall in each direction, life, dates, walls ahead, pressures, standing. The installed command is then
asked about the same vessels: figures of --json to one part in 10^9, dates to the day, and every figure of the
printed page digit by digit, rounded to the safe side.

D-203 is a drum below required (cylinders, 2:1 heads, a nozzle neck; the first survey in inches), B-501 an ammonia
sphere with static head (the first survey in thou), T-304 a tall scrubber with a cone and two locations swapped in one
survey. R-411 stands beside them for its torispherical heads and for a deferral.

Sources of the formulas
-----------------------
ASME BPVC Section VIII Division 1, UG-27(c) cylinder and UG-27(d) sphere, UG-32 conical heads, Appendix 1-4(c)
ellipsoidal and 1-4(d) torispherical heads, UG-98 MAWP at the top of the vessel. API 510: rates 7.1.1, remaining
life 7.2.1, intervals 6.5.1.1 and 6.4.1, deferral 6.7.1, wall for the MAWP with twice the loss 7.3.3; clause numbers
as secondary material gives them. Corroded geometry: metal is lost from inside, so the outside stays where it was.
1 inch = 25.4 mm and 1 lbf = 0.45359237 kg x 9.80665 m/s2, both by definition.
"""

from __future__ import annotations

import csv
import json
import re
import subprocess
from collections.abc import Callable
from dataclasses import dataclass
from datetime import date, timedelta
from fractions import Fraction as Q
from functools import cache
from math import ceil, floor, isqrt
from pathlib import Path
from typing import Any

import openpyxl
import pytest

WORKS = Path(__file__).parents[2] / "sample_data"
AS_OF = date(2026, 12, 1)
YEAR = Q("365.25")
INCH = Q("25.4")
PSI = Q("0.45359237") * Q("9.80665") / (INCH / 1000) ** 2 / 10**6  # MPa
UNITS = {"mm": Q(1), "inch": INCH, "in": INCH, "thou": INCH / 1000}

# The rule set and the settings, as they are printed
CAP, EXTERNAL_CAP, SHORT_LIFE, SHORT_INTERVAL = Q(10), Q(5), Q(4), Q(2)
LOSS_FACTOR, DEFERRAL_PART, DEFERRAL_CAP = Q(2), Q("0.1"), Q("0.5")
READING_ERROR, FLOOR, LIST_LIFE, LOOK_AHEAD = Q("0.25"), Q("0.025"), Q(1), Q(10)


def root(x: Q) -> Q:
    """Give the square root, low by less than 1e-30: the only figures here that are no fractions."""
    scale = 10**60
    return Q(isqrt(floor(x * scale)), 10**30)


# ----------------------------------------------------------------------------------------------------
# What is printed in the files
# ----------------------------------------------------------------------------------------------------
# Survey file, day of the readings, unit of the thickness column, row of the vessel's first location
SURVEYS: dict[str, list[tuple[str, str, str, int]]] = {
    "D-203": [
        ("2012-05-17_urea.csv", "2012-05-07", "inch", 2),
        ("2014-06-12_urea.csv", "2014-06-02", "mm", 2),
        ("2016-09-22_urea.xlsx", "2016-09-12", "mm", 2),
        ("2019-03-21_urea.csv", "2019-03-11", "mm", 2),
        ("2021-10-14_urea.xlsx", "2021-10-04", "mm", 2),
        ("2024-04-18_urea.csv", "2024-04-08", "mm", 2),
        ("2026-05-21_urea.xlsx", "2026-05-11", "mm", 2),
    ],
    "B-501": [
        ("2013-04-18_storage.csv", "2013-04-08", "thou", 2),
        ("2016-10-20_storage.xlsx", "2016-10-10", "mm", 2),
        ("2020-05-14_storage.csv", "2020-05-04", "mm", 2),
        ("2023-10-19_storage.csv", "2023-10-09", "mm", 2),
        ("2026-09-17_storage.csv", "2026-09-07", "mm", 2),
    ],
    "T-304": [
        ("2011-06-16_nitrate.csv", "2011-06-07", "in", 72),
        ("2013-06-13_nitrate.csv", "2013-06-04", "mm", 72),
        ("2015-10-22_nitrate.xlsx", "2015-10-13", "mm", 72),
        ("2018-03-15_nitrate.csv", "2018-03-06", "mm", 72),
        ("2020-10-22_nitrate.csv", "2020-10-13", "mm", 64),
        ("2023-03-16_nitrate.xlsx", "2023-03-07", "mm", 72),
        ("2026-06-18_nitrate.csv", "2026-06-09", "mm", 72),
    ],
    "R-411": [
        ("2012-09-20_utilities.xlsx", "2012-09-13", "mm", 98),
        ("2015-04-23_utilities.csv", "2015-04-16", "mm", 95),
        ("2017-09-21_utilities.csv", "2017-09-14", "mm", 95),
        ("2020-02-13_utilities.xlsx", "2020-02-06", "mm", 98),
        ("2023-02-16_utilities.csv", "2023-02-09", "mm", 95),
        ("2026-02-12_utilities.xlsx", "2026-02-05", "mm", 98),
    ],
}
# Location, then its thickness in each of those surveys
WALLS = {
    "D-203": """
west head:
  01  0.678 16.87 16.47 16.09 15.78 15.36 14.97
  02  0.663 16.60 16.43 16.24 15.92 15.59 15.43
  03  0.712 17.70 17.45 17.14 16.75 16.43 16.15
  04  0.661 16.64 16.43 16.21 15.96 15.60 15.51
  05  0.705 17.71 17.43 17.08 16.69 16.46 16.1
course 1:
  06  0.641 15.78 15.22 14.44 13.99 13.25 12.8
  07  0.625 15.49 15.14 14.72 14.37 13.88 13.6
  08  0.648 15.99 15.56 15.05 14.48 13.92 13.51
  09  0.618 15.36 15 14.59 14.21 13.84 13.51
  10  0.638 15.83 15.28 14.71 14.13 13.66 13.13
  11  0.614 15.30 14.99 14.61 14.27 13.82 13.55
  12  0.636 15.87 15.39 14.97 14.57 14.09 13.71
  13  0.630 15.56 15.08 14.65 14.06 13.64 13.2
course 2:
  14  0.682 16.97 16.57 16.11 15.58 15.24 14.76
  15  0.688 17.29 16.8 16.56 16.26 16.00 15.74
  16  0.690 17.34 17.07 16.78 16.55 16.19 15.88
  17  0.661 16.46 16.28 15.92 15.71 15.39 15.19
  18  0.689 17.23 16.99 16.72 16.26 15.98 15.82
  19  0.666 16.63 16.29 16.21 15.88 15.59 15.34
east head:
  20  0.683 17.08 16.8 16.38 16.03 15.57 15.35
  21  0.714 17.95 17.64 17.37 17.04 16.74 16.62
  22  0.699 17.47 17.35 17.00 16.75 16.51 16.34
  23  0.699 17.68 17.43 17.12 16.74 16.56 16.35
  24  0.669 16.75 16.69 16.38 16.17 15.93 15.74
inlet N1:
  25  0.290 7.20 7.14 6.89 6.75 6.39 6.29
  26  0.307 7.69 7.62 7.50 7.34 7.32 7.11
  27  0.299 7.48 7.29 7.09 6.99 6.78 6.71
""",
    "B-501": """
bottom cap:
  01  1064 26.86 26.73 26.59 26.68
  02  1097 27.78 27.75 27.85 27.87
  03  1088 27.57 27.23 27.26 27.22
  04  1100 27.91 27.77 27.59 27.82
  05  1088 27.59 27.63 27.68 27.41
  06  1089 27.59 27.31 27.45 27.27
  07  1093 27.63 27.67 27.39 27.37
lower belt:
  08  1063 26.91 26.90 26.62 26.59
  09  1093 27.83 27.88 27.56 27.64
  10  1100 27.72 27.58 27.72 27.63
  11  1086 27.66 27.69 27.47 27.13
  12  1093 27.51 27.36 27.32 27.28
  13  1107 27.76 28.01 27.85 27.87
  14  1084 27.49 27.23 27.19 27.13
  15  1098 27.86 27.62 27.63 27.46
  16  1082 27.3 27.35 26.96 27.27
equator belt:
  17  986 25.1 25.00 25.09 25.01
  18  1010 25.49 25.43 25.27 25.35
  19  1010 25.59 25.58 25.35 25.31
  20  1017 25.61 25.69 25.75 25.54
  21  1002 25.4 25.40 25.26 25.24
  22  1013 25.81 25.54 25.66 25.56
  23  1029 26.03 26.13 26.02 25.88
  24  1031 26.07 26.10 25.89 25.61
  25  1024 25.87 26.04 26.07 25.88
upper belt:
  26  949 24.24 24.17 24.16 24.25
  27  968 24.47 24.40 24.45 24.25
  28  973 24.86 24.77 24.71 24.88
  29  975 24.63 24.79 24.65 24.53
  30  962 24.59 24.42 24.28 24.42
  31  973 25.01 24.95 24.51 24.84
  32  993 25.14 24.79 24.92 24.73
  33  965 24.62 24.59 24.48 24.47
  34  976 24.73 24.65 24.82 24.43
top cap:
  35  950 24.18 24.04 23.96 24.07
  36  982 24.93 24.63 24.77 24.88
  37  978 24.63 24.46 24.66 24.54
  38  984 25.24 24.89 24.81 24.86
  39  986 24.94 24.96 24.96 24.63
  40  973 24.85 24.78 24.49 24.67
""",
    "T-304": """
bottom cone:
  01  0.605 15.42 15.21 15.18 14.96 14.89 14.72
  02  0.629 16.22 16.14 15.95 15.94 15.58 15.68
  03  0.644 16.27 16.03 16.02 15.96 15.66 15.83
  04  0.613 15.83 15.85 15.65 15.45 15.56 15.42
  05  0.620 15.94 15.64 15.55 15.39 15.4 15.37
course 1:
  06  0.607 15.23 15.01 14.90 14.72 14.54 14.43
  07  0.631 16.00 15.92 15.87 15.50 15.6 15.38
  08  0.619 15.53 15.69 15.40 15.43 15.36 15.09
  09  0.629 16.22 15.91 15.81 15.77 15.84 15.34
  10  0.629 15.82 15.55 15.57 15.42 15.43 15.43
  11  0.632 15.99 15.97 15.76 15.66 15.57 15.45
  12  0.615 15.68 15.68 15.57 15.30 15.42 15.32
course 2:
  13  0.604 15.13 15.18 15.12 14.85 14.74 14.81
  14  0.623 15.73 15.75 15.96 15.69 15.34 15.53
  15  0.621 15.85 15.36 15.67 15.51 15.3 15.29
  16  0.629 15.81 16.08 15.88 15.65 15.67 15.72
  17  0.643 16.07 15.86 16.08 15.98 16.01 15.78
  18  0.623 15.82 15.4 15.55 15.41 15.33 15.35
  19  0.617 15.83 15.84 15.66 15.38 15.44 15.20
course 3:
  20  0.543 13.56 13.4 16.04 13.61 13.23 13.16
  21  0.571 14.64 14.43 14.01 14.36 14.21 13.93
  22  0.582 14.71 14.47 14.49 14.26 14.32 14.12
  23  0.559 14.11 13.72 13.88 13.71 13.79 13.33
  24  0.635 16.00 15.78 13.26 15.94 15.58 15.58
  25  0.571 14.55 14.68 14.44 14.34 14.19 13.97
  26  0.568 14.12 14.15 14.06 13.99 13.86 13.70
course 4:
  27  0.606 15.64 15.31 15.21 15.08 14.95 14.92
  28  0.631 15.94 15.72 15.95 15.97 15.64 15.63
  29  0.628 16.12 16.07 15.92 15.95 15.79 15.85
  30  0.615 15.80 15.89 15.64 15.71 15.79 15.57
  31  0.643 16.26 16.34 16.27 15.97 16 15.92
  32  0.638 16.13 16.29 16.16 15.97 16.08 16.03
top head:
  33  0.610 15.51 15.52 15.66 15.37 15.11 15.35
  34  0.631 16.10 15.91 15.83 15.88 16 16.21
  35  0.639 15.98 16.4 16.17 16.16 16.06 15.83
  36  0.643 16.21 15.91 15.85 15.98 15.97 15.93
""",
    "R-411": """
bottom head:
  01  17.32 17.33 16.86 16.93 17.12 16.89
  02  17.82 17.77 17.63 17.42 17.43 17.39
  03  18.01 17.86 17.90 17.54 17.62 17.61
  04  17.89 17.63 17.61 17.56 17.48 17.41
course 1:
  05  14.28 14.26 14.12 14.12 13.93 13.89
  06  14.64 14.46 14.32 14.44 14.29 14.09
  07  15.01 14.89 14.82 14.81 14.65 14.63
  08  14.93 15.01 14.77 14.78 14.67 14.64
  09  14.88 14.38 14.53 14.49 14.35 14.16
  10  14.98 15.13 14.93 15.01 14.77 14.48
  11  14.92 14.67 14.58 14.63 14.53 14.44
top head:
  12  17.65 17.43 17.48 17.21 17.08 16.97
  13  18.2 18.03 18.00 17.82 17.77 17.98
  14  18.17 18.10 17.91 18.11 17.94 17.96
  15  18.11 18.17 18.09 17.99 18.07 17.95
""",
}
# Sheet 'vessels': row, and the cells that are used
VESSELS: dict[str, tuple[int, dict[str, str]]] = {
    "D-203": (
        11,
        {"nameplate_mawp [MPa]": "1.8", "operating_pressure [bar]": "15.3", "next_survey_on": "2027-05-10"},
    ),
    "B-501": (
        33,
        {"nameplate_mawp [MPa]": "0.55", "operating_pressure [bar]": "4.7", "next_survey_on": "2028-09-20"},
    ),
    "T-304": (
        23,
        {"nameplate_mawp [MPa]": "0.5", "operating_pressure [bar]": "4.2", "next_survey_on": "2028-06-14"},
    ),
    "R-411": (
        30,
        {"nameplate_mawp [MPa]": "1.1", "operating_pressure [bar]": "9.4", "next_survey_on": "2027-02-17"},
    ),
}
# Last looks: internal, external, each with its row; in sheet 'inspections', for B-501 in its row of 'vessels'
INSPECTED = {
    "D-203": (("inspections", 47, "2021-10-13"), ("inspections", 49, "2026-05-20")),
    "B-501": (("vessels", 33, "2020-05-12"), ("vessels", 33, "2025-05-13")),
    "T-304": (("inspections", 108, "2020-10-14"), ("inspections", 109, "2024-10-09")),
    "R-411": (("inspections", 144, "2016-11-08"), ("inspections", 146, "2024-10-16")),
}
DEFERRED = {"R-411": "2027-03-31"}  # events.toml, decided 2026-09-15, before the due date
# Sheet 'relief': row, device, set pressure in psi
RELIEF = {
    "D-203": [(9, "SV-203A", "261")],
    "B-501": [(31, "SV-501A", "79"), (32, "SV-501B", "79")],
    "T-304": [(21, "SV-304A", "72")],
    "R-411": [(28, "SV-411A", "159")],
}
# Sheet 'parts': row, part, shape, inside (nozzle neck: outside) diameter, nominal wall, S, E long or of the head,
# E girth ('' where there is none), static head in kPa. Required walls that are given are 0 or blank on all of them.
PARTS = {
    "D-203": """
41 | west head    | ellipsoidal head | 1400  | 18   | 115.1 | 0.85 |      | 11
42 | course 1     | cylinder         | 1400  | 18   | 115.1 | 0.85 | 0.85 | 11
43 | course 2     | cylinder         | 1400  | 18   | 115.1 | 0.85 | 0.85 | 11
44 | east head    | ellipsoidal head | 1400  | 18   | 115.1 | 0.85 |      | 11
45 | inlet N1     | nozzle neck      | 219.1 | 8.18 | 115.1 | 1    | 1    | 11
""",
    "B-501": """
130 | bottom cap   | sphere | 16500 | 28 | 120.7 | 1 | | 102
131 | lower belt   | sphere | 16500 | 28 | 120.7 | 1 | | 95
132 | equator belt | sphere | 16500 | 26 | 120.7 | 1 | | 65
133 | upper belt   | sphere | 16500 | 25 | 120.7 | 1 | | 30
134 | top cap      | sphere | 16500 | 25 | 120.7 | 1 | | 5
""",
    "T-304": """
92 | bottom cone | cone             | 2400 | 16 | 98.6 | 0.7 | 0.7 | 38
93 | course 1    | cylinder         | 2400 | 16 | 98.6 | 0.7 | 0.7 | 25
94 | course 2    | cylinder         | 2400 | 16 | 98.6 | 0.7 | 0.7 | 0
95 | course 3    | cylinder         | 2400 | 16 | 98.6 | 0.7 | 0.7 | 0
96 | course 4    | cylinder         | 2400 | 16 | 98.6 | 0.7 | 0.7 | 0
97 | top head    | ellipsoidal head | 2400 | 16 | 98.6 | 0.7 |     | 0
""",
    "R-411": """
121 | bottom head | torispherical head | 1800 | 18 | 117.9 | 1    |      | 0
122 | course 1    | cylinder           | 1800 | 15 | 117.9 | 0.85 | 0.85 | 0
123 | top head    | torispherical head | 1800 | 18 | 117.9 | 1    |      | 0
""",
}
AXIS_RATIO = Q(2)  # of every ellipsoidal head here
CROWN, KNUCKLE = Q(1800), Q(180)  # of the heads of R-411
HALF_ANGLE = 30  # degrees, of the cone of T-304
# Sheet 'locations': inside diameter of the cone at the location (rows 480 to 484), reading error (rows 229 to 231)
DIAMETER_AT = {"01": "841", "02": "1188", "03": "1534", "04": "1880", "05": "2227"}
OWN_ERROR = {"25": "0.15", "26": "0.15", "27": "0.15"}


# ----------------------------------------------------------------------------------------------------
# Pressure and wall of each shape; loss is inside, so R = Ro - t and D = Do - 2t
# ----------------------------------------------------------------------------------------------------
@dataclass(frozen=True)
class Part:
    tag: str
    row: int
    name: str
    shape: str
    diameter: Q
    nominal: Q
    stress: Q
    seam: Q
    girth: Q | None
    head: Q

    @property
    def outside(self) -> Q:
        return self.diameter if self.shape == "nozzle neck" else self.diameter + 2 * self.nominal


@cache
def parts(tag: str) -> list[Part]:
    found = []
    for line in PARTS[tag].strip().splitlines():
        row, name, shape, d, t, s, seam, girth, head = (cell.strip() for cell in line.split("|"))
        circ = Q(girth) if girth else None
        found.append(Part(tag, int(row), name, shape, Q(d), Q(t), Q(s), Q(seam), circ, Q(head) / 1000))
    return found


def carried(p: Part, t: Q, at: Q | None = None) -> dict[str, Q]:
    """Give the pressure a wall carries in each direction; `at` is the cone's new inside diameter there."""
    SE, Ro = p.stress * p.seam, p.outside / 2
    SEg = p.stress * p.girth if p.girth is not None else Q(0)
    if p.shape in {"cylinder", "nozzle neck"}:  # UG-27(c)(1) and (2) with R = Ro - t
        R = Ro - t
        return {"hoop": SE * t / (R + Q("0.6") * t), "axial": 2 * SEg * t / (R - Q("0.4") * t)}
    if p.shape == "sphere":  # UG-27(d) with R = Ro - t
        return {"hoop": 2 * SE * t / (Ro - t + Q("0.2") * t)}
    if p.shape == "ellipsoidal head":  # Appendix 1-4(c) with D = Do - 2t
        K = (2 + AXIS_RATIO**2) / 6
        return {"end": 2 * SE * t / (K * (p.outside - 2 * t) + Q("0.2") * t)}
    if (
        p.shape == "torispherical head"
    ):  # Appendix 1-4(d), the crown radius grown by the loss, the knuckle new
        L = CROWN + p.nominal - t
        M = (3 + root(L / KNUCKLE)) / 4
        return {"end": 2 * SE * t / (L * M + Q("0.2") * t)}
    assert p.shape == "cone"
    cos = root(Q(3)) / 2
    D = (at if at is not None else p.diameter) + 2 * (p.nominal - t) / cos
    return {  # UG-32 for cones; along the axis UG-27(c)(2) with the cone's radius R = D / (2 cos)
        "hoop": 2 * SE * t * cos / (D + Q("1.2") * t * cos),
        "axial": 2 * SEg * t / (D / (2 * cos) - Q("0.4") * t),
    }


@cache
def required(p: Part, pressure: Q, at: Q | None = None) -> dict[str, Q]:
    """Give the wall each direction needs, head included, the geometry being that of this very wall."""
    P, SE, Ro = pressure + p.head, p.stress * p.seam, p.outside / 2
    SEg = p.stress * p.girth if p.girth is not None else Q(0)
    if p.shape in {
        "cylinder",
        "nozzle neck",
    }:  # t = P (Ro - t) / (SE - 0.6 P), and t = P (Ro - t) / (2 SE + 0.4 P)
        return {"hoop": P * Ro / (SE + Q("0.4") * P), "axial": P * Ro / (2 * SEg + Q("1.4") * P)}
    if p.shape == "sphere":  # t = P (Ro - t) / (2 SE - 0.2 P)
        return {"hoop": P * Ro / (2 * SE + Q("0.8") * P)}
    if p.shape == "ellipsoidal head":  # t = P K (Do - 2t) / (2 SE - 0.2 P)
        K = (2 + AXIS_RATIO**2) / 6
        return {"end": P * K * p.outside / (2 * SE - Q("0.2") * P + 2 * K * P)}
    if p.shape == "cone":  # t = P D / (2 cos (SE - 0.6 P)), D grown by 2 loss / cos
        cos = root(Q(3)) / 2
        Do = (at if at is not None else p.diameter) + 2 * p.nominal / cos
        return {
            "hoop": P * Do / (2 * cos * (SE - Q("0.6") * P) + 2 * P / cos),
            "axial": P * Do / (2 * cos * (2 * SEg + Q("0.4") * P) + 2 * P / cos),
        }
    low, high = Q(0), p.nominal  # the crown of a torispherical head grows under a root: halve the gap
    for _ in range(90):
        middle = (low + high) / 2
        low, high = (middle, high) if carried(p, middle)["end"] < P else (low, middle)
    return {"end": Q(round(high * 10**25), 10**25)}


# ----------------------------------------------------------------------------------------------------
# One location, one vessel
# ----------------------------------------------------------------------------------------------------
@dataclass(frozen=True)
class Spot:
    part: Part
    name: str
    days: list[date]
    walls: list[Q]
    figures: dict[str, Q]
    basis: str
    by: str
    dates: dict[str, date]

    @property
    def place(self) -> dict[str, str]:
        return {"part": self.part.name, "location": self.name}


def later(day: date, years: Q) -> date:
    return day + timedelta(days=floor(max(years, Q(0)) * YEAR))


def span(first: date, last: date) -> Q:
    return (last - first).days / YEAR


@cache
def printed_walls(tag: str) -> dict[tuple[str, str], list[str]]:
    found: dict[tuple[str, str], list[str]] = {}
    part = ""
    for line in WALLS[tag].strip().splitlines():
        if line.endswith(":"):
            part = line[:-1]
        else:
            location, *walls = line.split()
            found[part, location] = walls
    return found


def wall_for(p: Part, pressure: Q, at: Q | None) -> Q:
    return max(required(p, pressure, at).values())


def spot(p: Part, name: str, walls: list[str], current: Q, carry_to: date) -> Spot:
    days = [date.fromisoformat(day) for _, day, _, _ in SURVEYS[p.tag]]
    read = [Q(wall) * UNITS[unit] for wall, (_, _, unit, _) in zip(walls, SURVEYS[p.tag], strict=True)]
    used = [min(read[: i + 1]) for i in range(len(read))]  # metal does not grow
    at = Q(DIAMETER_AT[name]) if p.shape == "cone" else None
    error = Q(OWN_ERROR[name]) if p.tag == "D-203" and name in OWN_ERROR else READING_ERROR
    long_rate = (used[0] - used[-1]) / span(days[0], days[-1])
    short_rate = (used[-2] - used[-1]) / span(days[-2], days[-1])
    least = Q("1.645") * root(Q(2)) * error / span(days[0], days[-1])
    rate = max(long_rate, short_rate, FLOOR)
    basis = "floor" if rate == FLOOR else "long-term" if long_rate >= short_rate else "short-term"
    walls_needed = required(p, current, at)
    by = max(walls_needed, key=lambda direction: walls_needed[direction])
    needed, wall, last = walls_needed[by], used[-1], days[-1]
    life = max(wall - needed, Q(0)) / rate
    ahead = wall - LOSS_FACTOR * rate * span(last, carry_to)
    today = wall - rate * span(last, AS_OF)
    free = {
        when: max(min(carried(p, t, at).values()) - p.head, Q(0))
        for when, t in (("today", today), ("then", ahead))
    }
    figures = {
        "last_thickness_mm": read[-1],
        "wall_used_mm": wall,
        "long_term_rate_mm_per_year": long_rate,
        "short_term_rate_mm_per_year": short_rate,
        "planning_rate_mm_per_year": rate,
        "least_measurable_rate_mm_per_year": least,
        "required_thickness_mm": needed,
        "remaining_life_years": life,
        "life_at_least_measurable_rate_years": max(wall - needed, Q(0)) / least,
        "half_life_interval_years": min(life, SHORT_INTERVAL) if life < SHORT_LIFE else life / 2,
        "projected_thickness_mm": ahead,
        "mawp_today_mpa": min(free["today"], current),  # no vessel here was derated: the nameplate is the cap
        "projected_mawp_mpa": min(free["then"], current),
        "uncapped": free["then"],
        "wall today": today,
        "error": error,
    }

    def holds(pressure: Q) -> date:
        return later(last, (wall - wall_for(p, pressure, at)) / (LOSS_FACTOR * rate))

    dates = {"last_on": last, "retirement_on": later(last, life), "holds": holds(current)}
    dates["due"] = later(last, figures["half_life_interval_years"])
    dates["operating"] = holds(Q(VESSELS[p.tag][1]["operating_pressure [bar]"]) / 10)
    dates |= {device: holds(Q(psi) * PSI) for _, device, psi in RELIEF[p.tag]}
    return Spot(p, name, days, read, figures, basis, by, dates)


@dataclass(frozen=True)
class Vessel:
    tag: str
    current: Q
    spots: list[Spot]
    carry_to: date
    basis: str
    internal_due: date
    external_due: date
    interval: Q
    due_spot: Spot | None

    def least(self, figure: str) -> Spot:
        return min(self.spots, key=lambda s: s.figures[figure])

    def first(self, day: str) -> Spot:
        return min(self.spots, key=lambda s: s.dates[day])

    @property
    def standing(self) -> str:
        f = [s.figures for s in self.spots]
        if any(x["wall_used_mm"] < x["required_thickness_mm"] for x in f):
            return "below required"
        if any(x["wall_used_mm"] < x["required_thickness_mm"] + Q("1.645") * x["error"] for x in f):
            return "at required"
        if any(x["wall today"] < x["required_thickness_mm"] for x in f):
            return "used up by its rate"
        short = any(x["projected_thickness_mm"] < x["required_thickness_mm"] for x in f)
        if short or any(x["projected_mawp_mpa"] < self.current * (1 - Q(1, 10**6)) for x in f):
            return "rating short"
        if self.first("retirement_on").dates["retirement_on"] <= later(
            AS_OF, min(2 * self.interval, LOOK_AHEAD)
        ):
            return "running out"
        return "rating held"

    @property
    def flags(self) -> list[str]:
        overdue = min(self.internal_due, self.external_due) < AS_OF
        soon = AS_OF < self.carry_to < later(AS_OF, LIST_LIFE)
        return ["overdue"] * overdue + ["survey within the year"] * soon


@cache
def vessel(tag: str) -> Vessel:
    cells = VESSELS[tag][1]
    current = Q(cells["nameplate_mawp [MPa]"])
    by_name = {p.name: p for p in parts(tag)}
    all_walls = printed_walls(tag)

    def all_spots(day: date) -> list[Spot]:
        return [spot(by_name[p], name, walls, current, day) for (p, name), walls in all_walls.items()]

    rough = all_spots(AS_OF)  # lives and due dates do not hang on the carry-to date
    internal, external = (date.fromisoformat(day) for _, _, day in INSPECTED[tag])
    first = min(rough, key=lambda s: s.dates["due"])
    by_cap = later(internal, CAP) <= first.dates["due"]
    due = later(internal, CAP) if by_cap else first.dates["due"]
    interval = CAP if by_cap else min(CAP, first.figures["half_life_interval_years"])
    if tag in DEFERRED:
        due = min(date.fromisoformat(DEFERRED[tag]), later(due, min(DEFERRAL_PART * interval, DEFERRAL_CAP)))
    planned = date.fromisoformat(cells["next_survey_on"])
    carry_to, basis = planned, "planned survey"
    if due < AS_OF:
        end = later(AS_OF, LIST_LIFE)
        carry_to, basis = max((planned, "planned survey"), (end, "life of the list"))
    return Vessel(
        tag, current, all_spots(carry_to), carry_to, basis, due,
        later(external, min(EXTERNAL_CAP, interval)), interval, None if by_cap else first,
    )  # fmt: skip


# ----------------------------------------------------------------------------------------------------
# The files still say so
# ----------------------------------------------------------------------------------------------------
def text_of(cell: object) -> str:
    return "" if cell is None else cell.date().isoformat() if hasattr(cell, "date") else str(cell)


@cache
def sheet(file: str, name: str | None = None) -> list[list[str]]:
    path = WORKS / file
    if path.suffix == ".csv":
        with path.open(encoding="utf-8-sig", newline="") as lines:
            return list(csv.reader(lines))
    book = openpyxl.load_workbook(path)
    page = book[name] if name else book.worksheets[0]
    return [[text_of(cell) for cell in line] for line in page.iter_rows(values_only=True)]


def row_of(file: str, number: int, name: str | None = None) -> dict[str, str]:
    lines = sheet(file, name)
    top = next(line for line in lines if line and line[0] in {"vessel", "device"})
    return dict(zip(top, lines[number - 1], strict=False))


REGISTER = "brackwater_register.xlsx"
TAGS = list(SURVEYS)


@pytest.mark.parametrize("tag", TAGS)
def test_the_survey_sheets_say_what_is_typed_here(tag: str) -> None:
    for survey, (file, day, unit, first) in enumerate(SURVEYS[tag]):
        for n, ((part, location), walls) in enumerate(printed_walls(tag).items()):
            row = row_of(f"surveys/{file}", first + n)
            found = (row["vessel"], row["part"], row["location"], row["taken_on"], row[f"thickness [{unit}]"])
            assert found == (tag, part, location, day, walls[survey]), (file, first + n)
    mentioned = {path.name for path in (WORKS / "surveys").iterdir() if tag in mentions(path.name)}
    assert mentioned == {file for file, *_ in SURVEYS[tag]}


@cache
def mentions(file: str) -> set[str]:
    return {line[0] for line in sheet(f"surveys/{file}") if line}


@pytest.mark.parametrize("tag", TAGS)
def test_the_register_says_what_is_typed_here(tag: str) -> None:
    row, cells = VESSELS[tag]
    found = row_of(REGISTER, row, "vessels")
    assert found["vessel"] == tag
    assert found.items() >= cells.items()
    assert [found[name] for name in ("current_mawp [MPa]", "external_design_pressure [MPa]")] == ["", "0"]
    for kind, (page, number, day) in zip(("internal", "external"), INSPECTED[tag], strict=True):
        here = row_of(REGISTER, number, page)
        assert here["vessel"] == tag
        assert day == (here[f"last_{kind}_on"] if page == "vessels" else here["done_on"])
        looks = [r for r in sheet(REGISTER, "inspections") if r[0] == tag and r[1] == kind]
        assert max([r[2] for r in looks] + [found[f"last_{kind}_on"]]) == day
    for number, device, psi in RELIEF[tag]:
        here = row_of(REGISTER, number, "relief")
        assert (here["device"], here["vessel"], here["set_pressure [psi]"]) == (device, tag, psi)
    assert sum(line[1] == tag for line in sheet(REGISTER, "relief")) == len(RELIEF[tag])


@pytest.mark.parametrize("tag", TAGS)
def test_the_parts_and_locations_say_what_is_typed_here(tag: str) -> None:
    assert sum(line[0] == tag for line in sheet(REGISTER, "parts")) == len(parts(tag))
    for p in parts(tag):
        here = row_of(REGISTER, p.row, "parts")
        size = "outside_diameter [mm]" if p.shape == "nozzle neck" else "inside_diameter [mm]"
        seam = "joint_efficiency_long" if p.girth is not None else "joint_efficiency"
        assert (here["vessel"], here["part"], here["shape"]) == (tag, p.name, p.shape)
        assert (Q(here[size]), Q(here["nominal_thickness [mm]"])) == (p.diameter, p.nominal)
        assert (Q(here["allowable_stress [MPa]"]), Q(here[seam])) == (p.stress, p.seam)
        assert here["joint_efficiency_circ"] == (
            "" if p.girth is None else str(float(p.girth)).removesuffix(".0")
        )
        assert Q(here["static_head [kPa]"]) / 1000 == p.head
        given = [
            "structural_minimum [mm]",
            "required_thickness_external [mm]",
            "required_thickness_axial [mm]",
        ]
        given += ["other_pressure_limit [MPa]", "expected_rate [mm/year]", "lining_thickness [mm]"]
        assert {here[name] for name in given} <= {"", "0"}
        assert (here["loss_side"], here["lining"]) == ("inside", "none")
        if p.shape == "ellipsoidal head":
            assert Q(here["axis_ratio"]) == AXIS_RATIO
        if p.shape == "torispherical head":
            assert (Q(here["crown_radius [mm]"]), Q(here["knuckle_radius [mm]"])) == (CROWN, KNUCKLE)
        if p.shape == "cone":
            assert here["half_apex_angle [deg]"] == str(HALF_ANGLE)
    lines = sheet(REGISTER, "locations")
    rows = [dict(zip(lines[0], line, strict=True)) for line in lines if line[0] == tag]
    assert [(r["part"], r["location"]) for r in rows] == list(printed_walls(tag))
    for r in rows:
        assert r["diameter_at [mm]"] == (DIAMETER_AT[r["location"]] if r["part"] == "bottom cone" else "")
        assert r["reading_error [mm]"] == (OWN_ERROR.get(r["location"], "") if tag == "D-203" else "")
        assert r["baseline_thickness [mm]"] == ""


# ----------------------------------------------------------------------------------------------------
# The command says what the fractions say
# ----------------------------------------------------------------------------------------------------
Show = Callable[..., str]


@pytest.fixture(scope="module")
def show(brackwater: Path, fleet_command: str) -> Show:
    @cache
    def told(tag: str, *options: str) -> str:
        command = [fleet_command, "show", tag, "--db", str(brackwater / "fleet.db"), "--as-of", "2026-12-01"]
        return subprocess.run([*command, *options], capture_output=True, text=True, check=True).stdout

    return told


def near(found: object, exact: Q) -> bool:
    assert isinstance(found, int | float)
    return abs(Q(found) - exact) <= abs(exact) / 10**9


@pytest.mark.parametrize("tag", TAGS)
def test_the_figures_of_each_location(show: Show, tag: str) -> None:
    told = {
        (p["part"], s["location"]): s
        for p in json.loads(show(tag, "--json"))["parts"]
        for s in p["locations"]
    }
    v = vessel(tag)
    assert list(told) == [(s.part.name, s.name) for s in v.spots]
    for s in v.spots:
        here = told[s.part.name, s.name]
        where = (tag, s.part.name, s.name)
        for name, exact in s.figures.items():
            if name.endswith(("_mm", "_mpa", "_per_year", "_years")):
                assert near(here[name], exact), (*where, name, here[name], float(exact))
        assert (here["last_on"], here["observations"]) == (s.days[-1].isoformat(), len(s.days)), where
        assert (here["retirement_on"], here["rate_basis"]) == (
            s.dates["retirement_on"].isoformat(),
            s.basis,
        ), where


@pytest.mark.parametrize("tag", TAGS)
def test_the_figures_of_each_part(show: Show, tag: str) -> None:
    told = json.loads(show(tag, "--json"))["parts"]
    v = vessel(tag)
    assert [p["part"] for p in told] == [p.name for p in parts(tag)]
    for here in told:
        spots = [s for s in v.spots if s.part.name == here["part"]]
        most = max(spots, key=lambda s: s.figures["required_thickness_mm"])
        assert near(here["required_thickness_mm"], most.figures["required_thickness_mm"]), here["part"]
        assert (here["shape"], here["required_by"]) == (most.part.shape, most.by)
        for name, figure in (
            ("mawp_today_mpa", "mawp_today_mpa"),
            ("projected_mawp_mpa", "projected_mawp_mpa"),
            ("projected_mawp_uncapped_mpa", "uncapped"),
        ):
            assert near(here[name], min(s.figures[figure] for s in spots)), (here["part"], name)


@pytest.mark.parametrize("tag", TAGS)
def test_the_figures_of_the_vessel(show: Show, tag: str) -> None:
    told, v = json.loads(show(tag, "--json")), vessel(tag)
    retires = v.first("retirement_on")
    for name, exact in {
        "current_mawp_mpa": v.current,
        "nameplate_mawp_mpa": v.current,
        "mawp_today_mpa": v.least("mawp_today_mpa").figures["mawp_today_mpa"],
        "projected_mawp_mpa": v.least("projected_mawp_mpa").figures["projected_mawp_mpa"],
        "projected_mawp_uncapped_mpa": v.least("uncapped").figures["uncapped"],
        "internal_interval_years": v.interval,
        "life_left_years": max(span(AS_OF, retires.dates["retirement_on"]), Q(0)),
    }.items():
        assert near(told[name], exact), (name, told[name], float(exact))
    assert told["governing_pressure"] == v.least("uncapped").place
    assert told["governing_life"] == retires.place
    assert told["governing_due"] == (v.due_spot.place if v.due_spot else None)
    for name, day in {
        "carry_to_on": v.carry_to,
        "retirement_on": retires.dates["retirement_on"],
        "internal_due_on": v.internal_due,
        "external_due_on": v.external_due,
        "rating_holds_until": v.first("holds").dates["holds"],
    }.items():
        assert told[name] == day.isoformat(), name
    assert (told["carry_to_basis"], told["standing"], told["flags"]) == (v.basis, v.standing, v.flags)
    today = v.least("mawp_today_mpa").figures["mawp_today_mpa"]
    for device, (_, name, psi) in zip(told["relief"], RELIEF[tag], strict=True):
        assert device["device"] == name
        assert near(device["set_pressure_mpa"], Q(psi) * PSI)
        assert device["reset_by_on"] == v.first(name).dates[name].isoformat()
        assert (device["now"] == "set above what the wall carries today") == (Q(psi) * PSI > today)


def digits(whole: int, decimals: int) -> str:
    text = str(whole).rjust(decimals + 1, "0")
    return f"{text[:-decimals]}.{text[-decimals:]}"


def down(x: Q, decimals: int) -> str:
    return digits(floor(x * 10**decimals), decimals)


def up(x: Q, decimals: int) -> str:
    return digits(ceil(x * 10**decimals), decimals)


@pytest.mark.parametrize("tag", TAGS)
def test_the_printed_line_of_each_location(show: Show, tag: str) -> None:
    lines = [line.split() for line in show(tag).splitlines()]
    for s in vessel(tag).spots:
        f = s.figures
        meant = [s.name, str(len(s.days)), s.days[-1].isoformat(), down(f["wall_used_mm"], 2)]
        meant += [up(f[f"{n}_rate_mm_per_year"], 3) for n in ("long_term", "short_term", "planning")]
        meant += [s.basis, up(f["required_thickness_mm"], 2), down(f["projected_thickness_mm"], 2)]
        assert [*meant, s.dates["retirement_on"].isoformat()] in lines, (s.part.name, meant)


def after(page: str, label: str) -> str:
    """Give what a line of the page says behind its label, up to the next label."""
    found = re.search(rf"^ +{re.escape(label)} {{2,}}(.+(?:\n {{30,}}.+)*)", page, flags=re.MULTILINE)
    assert found, label
    return " ".join(found[1].split())


@pytest.mark.parametrize("tag", TAGS)
def test_the_printed_figures_of_the_vessel(show: Show, tag: str) -> None:
    page, v = show(tag), vessel(tag)
    running = " ".join(page.split())
    retires, least = v.first("retirement_on"), v.least("uncapped")
    assert after(page, "nameplate MAWP [MPa]").split()[0] == down(v.current, 3)
    assert after(page, "current MAWP [MPa]").split()[0] == down(v.current, 3)
    today = down(v.least("mawp_today_mpa").figures["mawp_today_mpa"], 3)
    assert after(page, "MAWP today [MPa]").split()[0] == today
    then = after(page, "projected MAWP [MPa]")
    assert then.startswith(
        f"{down(v.least('projected_mawp_mpa').figures['projected_mawp_mpa'], 3)} on {v.carry_to}"
    )
    assert f"governed by {least.part.name} / {least.name}" in then
    if least.figures["uncapped"] > v.current:
        assert after(page, "without its cap [MPa]").split()[0] == down(least.figures["uncapped"], 3)
    assert (
        after(page, "retirement")
        == f"{retires.dates['retirement_on']} governed by {retires.part.name} / {retires.name}"
    )
    left = max(span(AS_OF, retires.dates["retirement_on"]), Q(0))
    assert after(page, "life left [years]").split()[0] == down(left, 1)
    internal, external = (day for _, _, day in INSPECTED[tag])
    due = after(page, "internal or on-stream due")
    cap = f"the cap of the rule set, counted from the last look: {down(v.interval, 1)} years"
    moved = " (a deferral or idle time on record moves it)" if tag in DEFERRED else ""
    if v.due_spot is None:
        counted = f"{cap}{moved}"
    elif v.interval > 0:
        counted = (
            f"{down(v.interval, 1)} years from the last reading at {v.due_spot.part.name} / {v.due_spot.name}"
        )
    else:
        counted = f"no interval is left at {v.due_spot.part.name} / {v.due_spot.name}"
    assert due == f"{v.internal_due} last on {internal}, {counted}"
    assert after(page, "external due").startswith(f"{v.external_due} last on {external}")
    for p in parts(tag):
        spots = [s for s in v.spots if s.part == p]
        most = max(spots, key=lambda s: s.figures["required_thickness_mm"])
        needed = up(most.figures["required_thickness_mm"], 2)
        mawp = [down(min(s.figures[f] for s in spots), 3) for f in ("mawp_today_mpa", "projected_mawp_mpa")]
        meant = rf"{p.name}, {p.shape}: required {needed} mm set by {most.by}, [^;]+;"
        assert re.search(rf"{meant} MAWP today {mawp[0]} MPa, projected {mawp[1]} MPa", running), (
            p.name,
            needed,
            mawp,
        )
    holds = v.first("operating").dates["operating"]
    written = VESSELS[tag][1]["operating_pressure [bar]"]
    operating = f"{up(Q(written) / 10, 3)} MPa (written {written} bar)"
    short = "; the wall is below what is required" if v.standing == "below required" else ""
    assert f"carries its operating pressure of {operating} until {holds}{short}." in running


def test_the_vessels_tell_different_stories() -> None:
    told = {tag: (vessel(tag).standing, vessel(tag).flags) for tag in TAGS}
    assert told == {
        "D-203": ("below required", ["overdue"]),
        "B-501": ("rating held", []),
        "T-304": ("rating held", []),
        "R-411": ("rating held", ["survey within the year"]),
    }
    shapes: set[Any] = {p.shape for tag in TAGS for p in parts(tag)}
    assert len(shapes) == 6
