"""Tell intake what is on record: the register with its facts, and the readings of every location."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date
from typing import Literal

import numpy as np

from fleet.appraisal.inputs import DEFAULT_READING_ERROR_MM, DEFAULT_WINDOW_DAYS, Floats, Inputs
from fleet.intake.known import (
    History,
    KnownLocation,
    KnownPart,
    KnownRegister,
    KnownVessel,
    LocationKey,
    PartKey,
    Recorded,
)
from fleet.store import models
from fleet.tasks import settings as levels
from fleet.tasks.assemble import fetch_inputs
from fleet.tasks.columns import by_day
from fleet.tasks.names import Names, fetch_names
from fleet.tasks.reader import Reader
from fleet.tasks.record import re_ratings

Standing = Literal["accepted", "queried", "voided", "past"]


@dataclass(frozen=True)
class OnRecord:
    """Everything that a load is compared with.

    Parameters
    ----------
    reader : Reader
        The record at the moment of the load [-].
    inputs : Inputs
        The register and the record as arrays [-].
    names : Names
        From tags to entities [-].
    register : KnownRegister
        The register as intake wants it [-].
    """

    reader: Reader
    inputs: Inputs
    names: Names
    register: KnownRegister


def fetch_on_record(reader: Reader, *, required: bool = False) -> OnRecord:
    """Fetch what a load is compared with.

    Parameters
    ----------
    reader : Reader
        The record as of the day of the load [-].
    required : bool
        Whether the required thickness of every location is wanted too [-].

    Returns
    -------
    OnRecord
    """
    inputs = fetch_inputs(reader)
    names = fetch_names(reader)
    rows = len(inputs.locations) + len(inputs.parts)
    required_mm = required_thickness(inputs) if required else np.full(rows, np.nan)
    inspections, files = reader.rows(models.Inspection), reader.rows(models.SourceFile)
    tag = {entity: key[2] for entity, key in names.tags.items()}
    done = [
        (tag[vessel], kind, day)
        for vessel, kind, day in zip(
            inspections["vessel_id"], inspections["kind"], inspections["done_on"], strict=True
        )
    ]
    register = KnownRegister(
        vessels=_vessels(inputs, _re_ratings(reader, tag), done),
        parts=_parts(inputs, required_mm),
        locations=_locations(inputs, _baselines(reader, names), _errors(reader, inputs, names), required_mm),
        inspections=frozenset(done),
        inspections_unsaid=frozenset(done)
        - {one for one, extent in zip(done, inspections["extent"], strict=True) if extent},
        files={
            digest: kind
            for digest, kind, parked in zip(files["sha256"], files["kind"], files["rows_parked"], strict=True)
            if parked == 0
        },
    )
    return OnRecord(reader, inputs, names, register)


def required_thickness(inputs: Inputs) -> Floats:
    """Give the required thickness of every location and part, as far as what is on record lets it be known.

    Parameters
    ----------
    inputs : Inputs
        What an appraisal of the day is made from [-].

    Returns
    -------
    Floats
        In the order of the inputs' locations, then of their parts; NaN where nothing of it is known. A reading at
        or below what is known of it is thin, whatever else is missing [mm].
    """
    from fleet.appraisal.required import needs, vessel_pressures

    known: Floats = needs(inputs, vessel_pressures(inputs)).known_mm
    return known


def _number(value: float) -> float | None:
    return None if np.isnan(value) else float(value)


def _day(value: float) -> date | None:
    return None if np.isnan(value) else date.fromordinal(int(value))


def _re_ratings(reader: Reader, tag: dict[int, str]) -> dict[str, tuple[float, date, str]]:
    """Give pressure, day and basis of the re-rating in force of each vessel."""
    decisions = by_day(reader.rows(models.Decision), "decided_on", reader.as_of)
    return {
        tag[decisions["vessel_id"][row]]: (
            decisions["pressure_mpa"][row],
            decisions["effective_on"][row] or decisions["decided_on"][row],
            decisions["reason"][row] or "",
        )
        for row in re_ratings(decisions, reader.as_of)
    }


def _vessels(
    inputs: Inputs,
    rated: dict[str, tuple[float, date, str]],
    done: Iterable[tuple[str, str, date]],
) -> dict[str, KnownVessel]:
    looked: dict[tuple[str, str], set[date]] = defaultdict(set)
    for vessel, kind, day in done:
        looked[vessel, "external" if kind == "external" else "internal"].add(day)
    table = inputs.vessels
    found: dict[str, KnownVessel] = {}
    for row, tag in enumerate(table.tag):
        recorded: dict[str, set[object]] = {
            "state": {table.state[row] or "in service"},
            "last_internal_on": set(looked[tag, "internal"]),
            "last_external_on": set(looked[tag, "external"]),
        }
        if tag in rated:
            pressure, day, basis = rated[tag]
            recorded["current_mawp_mpa"] = {pressure}
            recorded["current_mawp_from"] = {day}
            recorded["current_mawp_basis"] = {basis}
        else:
            # Blank means nameplate, and a blank nameplate design pressure: that is what stands on record.
            nameplate = _number(table.nameplate_mawp_mpa[row])
            stands = nameplate if nameplate is not None else _number(table.design_pressure_mpa[row])
            recorded["current_mawp_mpa"] = {stands}
        found[tag] = KnownVessel(_day(table.in_service_day[row]), recorded)
    return found


def _part_keys(inputs: Inputs) -> list[PartKey]:
    return [
        (inputs.vessels.tag[vessel], part)
        for vessel, part in zip(inputs.parts.vessel, inputs.parts.part, strict=True)
    ]


def location_keys(inputs: Inputs) -> list[LocationKey]:
    """Name every location of an appraisal's inputs.

    Parameters
    ----------
    inputs : Inputs
        The inputs [-].

    Returns
    -------
    list of (str, str, str)
        Vessel, part and location, in the order of the inputs [text].
    """
    parts = _part_keys(inputs)
    return [
        (*parts[part], location)
        for part, location in zip(inputs.locations.part, inputs.locations.location, strict=True)
    ]


def _parts(inputs: Inputs, required: Floats) -> dict[PartKey, KnownPart]:
    table, own = inputs.parts, required[len(inputs.locations) :]
    return {
        key: KnownPart(
            shape=table.shape[row],
            nominal_thickness_mm=float(table.nominal_thickness_mm[row]),
            lining=table.lining[row],
            lining_thickness_mm=float(table.lining_thickness_mm[row]),
            lining_counts_in_strength=table.lining_counts_in_strength[row],
            alert_thickness_mm=float(table.alert_thickness_mm[row]),
            required_thickness_mm=float(own[row]),
            recorded={"state": {table.state[row] or "in service"}},
        )
        for row, key in enumerate(_part_keys(inputs))
    }


def _locations(
    inputs: Inputs,
    baselines: dict[LocationKey, list[tuple[float, date]]],
    errors: Floats,
    required: Floats,
) -> dict[LocationKey, KnownLocation]:
    table = inputs.locations
    of_part = inputs.parts.alert_thickness_mm[table.part]
    alert = np.where(np.isnan(table.alert_thickness_mm), of_part, table.alert_thickness_mm)
    found: dict[LocationKey, KnownLocation] = {}
    for row, key in enumerate(location_keys(inputs)):
        recorded: dict[str, set[object]] = {"state": {table.state[row] or "in service"}}
        if key in baselines:
            recorded["baseline_thickness_mm"] = {thickness for thickness, _ in baselines[key]}
            recorded["baseline_on"] = {day for _, day in baselines[key]}
        found[key] = KnownLocation(float(alert[row]), float(required[row]), float(errors[row]), recorded)
    return found


def _baselines(reader: Reader, names: Names) -> dict[LocationKey, list[tuple[float, date]]]:
    readings = reader.rows(models.Reading)
    found: dict[LocationKey, list[tuple[float, date]]] = defaultdict(list)
    for row, kind in enumerate(readings["kind"]):
        if kind == "baseline" and readings["thickness_mm"][row] is not None:
            vessel, part, location = names.path(readings["location_id"][row])
            found[vessel, part, location].append((readings["thickness_mm"][row], readings["taken_on"][row]))
    return dict(found)


def _errors(reader: Reader, inputs: Inputs, names: Names) -> Floats:
    """Resolve the reading error of each location, for comparing new readings with old ones."""
    in_force = levels.in_force(reader)
    entities = [names.location(*key) for key in location_keys(inputs)]
    parents = [names.tags[entity][1] or 0 for entity in entities]
    vessels = [names.tags[parent][1] or 0 for parent in parents]
    set_for = in_force.nearest("reading_error_mm", (entities, parents, vessels), DEFAULT_READING_ERROR_MM)
    own = in_force.given("reading_error_mm", entities)
    rows = reader.rows(models.Location)
    register = dict(zip(rows["entity_id"], rows["reading_error_mm"], strict=True))
    told = np.array([register.get(entity) for entity in entities], dtype=np.float64)
    resolved: Floats = np.where(np.isnan(own) & ~np.isnan(told), told, set_for)
    return resolved


def fetch_history(record: OnRecord) -> History:
    """Fetch the readings of every location, each with its standing.

    Parameters
    ----------
    record : OnRecord
        The register on record [-].

    Returns
    -------
    History
        By location, in order of date.
    """
    columns = record.reader.rows(models.Reading)
    in_force = levels.in_force(record.reader)
    window = in_force.of_database("observation_window_days", DEFAULT_WINDOW_DAYS)
    fields = (columns[name] for name in ("location_id", "taken_on", "id", "thickness_mm", "status"))
    rows: dict[int, list[tuple[date, int, float, Standing]]] = defaultdict(list)
    for entity, day, number, thickness, status in zip(*fields, strict=True):
        rows[entity].append((day, number, float("nan") if thickness is None else thickness, status))
    restarts = _last_restarts(record)
    found: dict[LocationKey, list[Recorded]] = {}
    for entity, readings in rows.items():
        vessel, part, location = record.names.path(entity)
        readings.sort(key=lambda one: one[:2])
        began, kind = restarts.get((vessel, part, location), (None, ""))
        opens = _opening(readings, began) if kind == "new service" else -1
        found[vessel, part, location] = [
            Recorded(
                day,
                thickness,
                "past" if began and day < began and status == "accepted" and row != opens else status,
            )
            for row, (day, _, thickness, status) in enumerate(readings)
        ]
    return History(found, same_observation_days=int(window))


def _opening(readings: list[tuple[date, int, float, Standing]], began: date | None) -> int:
    """Give the row of the last accepted wall before a change of service: it opens the new history."""
    before = [
        row
        for row, (day, _, thickness, status) in enumerate(readings)
        if began and day < began and status == "accepted" and thickness > 0
    ]
    return before[-1] if before else -1


def _last_restarts(record: OnRecord) -> dict[LocationKey, tuple[date, str]]:
    """Give day and kind of the last restart of every location that had one."""
    table, keys = record.inputs.restarts, location_keys(record.inputs)
    found: dict[LocationKey, tuple[date, str]] = {}
    for row in np.argsort(table.happened_day, kind="stable"):
        found[keys[table.location[row]]] = (date.fromordinal(int(table.happened_day[row])), table.kind[row])
    return found
