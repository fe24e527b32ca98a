"""A second, plain reckoning of what each invented vessel comes to; it shares no line with the tool.

``required`` steers the walls when the files are written. ``judge`` follows the rules for standings by the
shortest road (one location after the other, plain floats), so that the numbers of the table can be steered
before, and independently of, the tool that will appraise them. MPa, mm, years of 365.25 days.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from datetime import date, timedelta
from typing import Any

from brackwater_vessels import AS_OF, Part, Vessel

ERROR = 0.25  # mm, one standard deviation of a reading
FLOOR = 0.025  # mm/year
YEAR = 365.25


def required(vessel: Vessel, part: Part, pressure: float | None = None) -> float:
    """Give the least wall of a part at the current MAWP (or another) and its static head."""
    top = pressure if pressure is not None else (vessel.current or vessel.mawp)
    drawing = part.drawing
    P = top + drawing["static_head"] / 1000
    given = [
        drawing.get(name) or 0.0
        for name in ("structural_minimum", "required_thickness_external", "required_thickness_axial")
    ]
    return max(_by_pressure(vessel, part, P), *given)


def _by_pressure(vessel: Vessel, part: Part, P: float) -> float:
    d, S, t_n = part.drawing, vessel.material[1], part.nominal
    if part.shape == "other":
        return float(d["required_thickness_given"])
    if part.shape in {"cylinder", "nozzle neck"}:
        Ro = d["outside_diameter"] / 2 if "outside_diameter" in d else d["inside_diameter"] / 2 + t_n
        SE, SEc = S * d["joint_efficiency_long"], S * d["joint_efficiency_circ"]
        thin, thin_axial = (1.0, 1.0) if vessel.code == "membrane" else (0.4, 1.4)
        return float(max(P * Ro / (SE + thin * P), P * Ro / (2 * SEc + thin_axial * P)))
    if part.shape == "cone":
        return _cone(d, S, t_n, P)
    SE = S * d["joint_efficiency"]
    if part.shape in {"sphere", "hemispherical head"}:
        Ro = d["inside_diameter"] / 2 + t_n
        return float(P * Ro / (2 * SE + (1.0 if vessel.code == "membrane" else 0.8) * P))
    if part.shape != "flat cover":
        return _dished(d, part.shape, t_n, P, SE)
    return float(d.get("gasket_diameter", d.get("inside_diameter")) * math.sqrt(d["cover_factor"] * P / SE))


def _cone(d: dict[str, Any], S: float, t_n: float, P: float) -> float:
    cos, t = math.cos(math.radians(d["half_apex_angle"])), 0.0
    SE, SEc = S * d["joint_efficiency_long"], S * d["joint_efficiency_circ"]
    for _ in range(200):
        D = d["inside_diameter"] + 2 * max(t_n - t, 0) / cos
        t = max(P * D / (2 * cos * (SE - 0.6 * P)), P * D / (2 * cos) / (2 * SEc + 0.4 * P))
    return t


def _dished(d: dict[str, Any], shape: str, t_n: float, P: float, SE: float) -> float:
    t = 0.0
    for _ in range(200):
        loss = max(t_n - t, 0)
        if shape == "ellipsoidal head":
            t = P * (d["inside_diameter"] + 2 * loss) / (2 * SE - 0.2 * P)
        else:
            L = d["crown_radius"] + loss
            t = P * L * (3 + math.sqrt(L / d["knuckle_radius"])) / 4 / (2 * SE - 0.2 * P)
    return t


def carried(vessel: Vessel, part: Part, wall: float) -> float:
    """Give the pressure at the top that a wall of this part carries, by halving."""
    low, high = 0.0, 20.0
    for _ in range(80):
        middle = (low + high) / 2
        low, high = (middle, high) if required(vessel, part, middle) <= wall else (low, middle)
    return low


@dataclass(frozen=True)
class Spot:
    """What one location comes to."""

    part: Part
    location: str
    need: float
    wall: float
    last: date
    long_rate: float
    short_rate: float
    rate: float
    ahead: float  # short-term less long-term rate
    error: float  # its standard error; 0 where there is no short-term rate

    @property
    def life(self) -> float:
        """Years from the last observation to the required thickness."""
        return max(self.wall - self.need, 0) / self.rate


def spot(
    vessel: Vessel, part: Part, location: str, history: list[tuple[date, float]], chosen: float = 0.0
) -> Spot:
    """Reckon one location from its dated walls in strength (present history only, ascending)."""
    merged: list[tuple[date, float]] = []
    opened: date | None = None
    for day, wall in history:
        if opened is not None and (day - opened).days <= 90:
            merged[-1] = min(merged[-1], (day, wall), key=lambda pair: pair[1])
        else:
            opened = day
            merged.append((day, wall))
    used = [(day, min(w for _, w in merged[: i + 1])) for i, (day, _) in enumerate(merged)]
    served = [_served(vessel, used[0][0], day) for day, _ in used]
    long_span = served[-1]
    long_rate = (used[0][1] - used[-1][1]) / long_span if long_span else 0.0
    short_rate, error = long_rate, 0.0
    if len(used) > 2:
        short_span = served[-1] - served[-2]
        short_rate = (used[-2][1] - used[-1][1]) / short_span
        d, D = short_span, long_span
        error = ERROR * math.sqrt(1 / d**2 + 1 / D**2 + (1 / d - 1 / D) ** 2)
    rate = max(chosen or max(long_rate, short_rate), FLOOR)
    need = required(vessel, part)
    ahead = short_rate - long_rate
    return Spot(part, location, need, used[-1][1], used[-1][0], long_rate, short_rate, rate, ahead, error)


def _served(vessel: Vessel, start: date, end: date) -> float:
    days = (end - start).days
    if vessel.pause:
        days -= max((min(end, vessel.pause[1]) - max(start, vessel.pause[0])).days, 0)
    return days / YEAR


def _doubtful(one: Spot, spots: list[Spot]) -> bool:
    """Say whether the short-term rate governs by less than its error, and the part did not shift as a whole."""
    beside = [s for s in spots if s.part is one.part and s.error]
    mean = sum(s.ahead for s in beside) / max(len(beside), 1)
    error = math.sqrt(sum(s.error**2 for s in beside)) / max(len(beside), 1)
    together = len(beside) >= 3 and sum(s.ahead > 0 for s in beside) > len(beside) / 2 and mean > 3 * error
    return 0 < one.ahead < 3 * one.error and not together


def judge(vessel: Vessel, spots: list[Spot], looked_on: date) -> tuple[str, dict[str, Any]]:
    """Give the standing from measured walls alone, and the figures it rests on."""

    def standing(rates: dict[int, float]) -> tuple[str, date, date]:
        lives = {i: max(s.wall - s.need, 0) / rates[i] for i, s in enumerate(spots)}
        retire = min(s.last + timedelta(days=int(lives[i] * YEAR)) for i, s in enumerate(spots))
        half = {i: life / 2 if life >= 4 else min(life, 2.0) for i, life in lives.items()}
        due = min(s.last + timedelta(days=int(min(half[i], 10) * YEAR)) for i, s in enumerate(spots))
        due = min(due, looked_on + timedelta(days=int(10 * YEAR)))
        carry = vessel.next_survey or (due if due >= AS_OF else AS_OF.replace(year=AS_OF.year + 1))
        ahead = {i: (carry - s.last).days / YEAR for i, s in enumerate(spots)}
        projected = {i: s.wall - 2 * rates[i] * ahead[i] for i, s in enumerate(spots)}
        today = {i: s.wall - rates[i] * (AS_OF - s.last).days / YEAR for i, s in enumerate(spots)}
        interval = min(*half.values(), 10)
        horizon = AS_OF + timedelta(days=int(min(2 * interval, 10) * YEAR))
        if any(s.wall < s.need for s in spots):
            return "below required", due, retire
        if any(s.wall < s.need + 1.645 * ERROR for s in spots):
            return "at required", due, retire
        if any(today[i] < s.need for i, s in enumerate(spots)):
            return "used up by its rate", due, retire
        if any(projected[i] < s.need * (1 - 1e-5) for i, s in enumerate(spots)):
            return "rating short", due, retire
        return ("running out" if retire <= horizon else "rating held"), due, retire

    now, due, retire = standing({i: s.rate for i, s in enumerate(spots)})
    by_long, _, _ = standing(
        {i: max(s.long_rate, FLOOR) if _doubtful(s, spots) else s.rate for i, s in enumerate(spots)}
    )
    figures: dict[str, Any] = {
        "due": due, "retire": retire, "re-gauge": now != "rating held" and by_long == "rating held",
        "today": min(carried(vessel, s.part, s.wall - s.rate * (AS_OF - s.last).days / YEAR) for s in spots),
    }  # fmt: skip
    return now, figures
