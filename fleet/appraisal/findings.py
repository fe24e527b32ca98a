"""Every doubt and gap that an appraisal says by itself."""

from __future__ import annotations

from datetime import date

import numpy as np

from fleet.appraisal.groups import any_by, greatest_by
from fleet.appraisal.inputs import Bools, Floats, Inputs
from fleet.appraisal.judge import Bench, Judged
from fleet.appraisal.notes import NoteBook
from fleet.rules import load_rule_set
from fleet.thinning.formulas import noticeable_change
from fleet.thinning.planning import NOMINAL


def write_findings(
    book: NoteBook, bench: Bench, judged: Judged, measured: Bools, vacuum: Bools, partless: Bools
) -> None:
    """Note every doubt and gap.

    Parameters
    ----------
    book : NoteBook
        Where they are noted [-].
    bench : Bench
        What was judged [-].
    judged : Judged
        The judgement [-].
    measured, vacuum : ndarray of bool
        Parts measured, and parts whose vacuum was not assessed; shape (parts,) [-].
    partless : ndarray of bool
        Vessels without a part; shape (vessels,) [-].
    """
    _never_measured(book, bench, measured, partless)
    _visits(book, bench)
    _missing(book, bench, judged, vacuum)
    _diameters(book, bench)
    _blank_choices(book, bench)
    _readings(book, bench)
    _rates(book, bench)
    _proportions(book, bench)
    _vessels(book, bench, judged)


def _never_measured(book: NoteBook, bench: Bench, measured: Bools, partless: Bools) -> None:
    inputs, found = bench.inputs, bench.found
    parts = len(inputs.parts)
    with_location = any_by(found.live, inputs.locations.part, parts)
    live = found.live_part
    book.add("no part", "vessel", partless, "no part is on the register")
    book.add("part without location", "part", live & ~with_location, "no location is on the register")
    book.add(
        "part never measured", "part", live & with_location & ~measured, "no location has a wall on record"
    )
    never = found.live & np.isnan(found.now.wall_used_mm) & measured[inputs.locations.part]
    book.add("location never measured", "location", never, "no thickness on record for the present metal")
    once = found.live & (found.now.observations == 1)
    book.add(
        "location measured once",
        "location",
        once,
        lambda row: f"one observation, {_day(found.now.last_day, row)}",
    )


def _visits(book: NoteBook, bench: Bench) -> None:
    found = bench.found
    last, part_last = found.visits.last_day, found.visits.part_last_day
    book.add("no echo at last visit", "location", found.visits.no_echo & found.live,
             lambda row: f"no echo on {_day(last, row)}")  # fmt: skip
    book.add("part not read at last visit", "part", found.visits.part_not_read & found.live_part,
             lambda row: f"no thickness on {_day(part_last, row)}")  # fmt: skip
    passed = found.visits.not_read & ~found.visits.part_not_read[bench.inputs.locations.part]
    book.add("location not read at last visit", "location", passed,
             lambda row: f"last read {_day(found.now.last_day, row)}")  # fmt: skip


def _missing(book: NoteBook, bench: Bench, judged: Judged, vacuum: Bools) -> None:
    inputs, need, found = bench.inputs, bench.need, bench.found
    book.add("vacuum not assessed", "part", vacuum, lambda row: (
        "external design pressure "
        f"{inputs.vessels.external_design_pressure_mpa[inputs.parts.vessel[row]]:.4g} MPa and no minimum"))  # fmt: skip
    for column, rows in need.missing.items():
        code = "no given thickness" if column == "required_thickness_given" else "missing datum"
        book.add(code, "part", _by_part(bench, rows) & found.live_part, f"{column} is blank")
    code_of = inputs.vessels.design_code[inputs.parts.vessel]
    book.add("no formula", "part", _by_part(bench, need.no_formula) & found.live_part,
             lambda row: f"{inputs.parts.shape[row]} under {code_of[row]}")  # fmt: skip
    outside = (need.rated.domain != 0) & ~need.no_formula
    book.add("outside formula limits", "part", _by_part(bench, outside) & found.live_part,
             "the required wall at the current MAWP is outside the limits of every form")  # fmt: skip
    n = len(inputs.locations)
    no_form = (
        bench.trusted
        & ~need.given_shape[:n]
        & ~np.isnan(judged.projected_mm)
        & (np.isnan(judged.projected_mpa) | np.isnan(judged.mawp_today_mpa))
    )
    book.add(
        "outside formula limits",
        "location",
        no_form,
        "the wall of today or the projected wall is outside the limits of every form",
    )
    short = need.given_shape[:n] & (found.now.wall_used_mm < need.known_mm[:n])
    book.add(
        "other part below given thickness",
        "location",
        short & found.live,
        "the wall is below required_thickness_given",
    )
    book.add("lining not told", "location", found.lining_not_told & found.live, "includes_lining is blank")
    book.add(
        "lining thickness blank", "location", found.lining_unknown & found.live, "lining_thickness is blank"
    )


def _diameters(book: NoteBook, bench: Bench) -> None:
    parts = bench.inputs.parts
    apart = parts.outside_diameter_mm - parts.inside_diameter_mm - 2 * parts.nominal_thickness_mm
    straight = np.isin(
        parts.shape, ("cylinder", "nozzle neck", "sphere", "hemispherical head", "ellipsoidal head")
    )
    wrong = (
        bench.found.live_part
        & straight
        & (np.abs(apart) > np.maximum(1.0, 0.001 * parts.outside_diameter_mm))
    )
    book.add("diameters disagree", "part", wrong, lambda row: (
        f"outside less inside diameter and twice nominal leaves {apart[row]:.1f} mm"))  # fmt: skip


def _blank_choices(book: NoteBook, bench: Bench) -> None:
    inputs, live = bench.inputs, bench.found.live_part
    parts = inputs.parts
    book.add("lining blank", "part", live & _blank(parts.lining), "lining is blank, taken as none")
    lined = ~_blank(parts.lining) & np.asarray(parts.lining != "none", dtype=np.bool_)
    book.add("lining not said to count", "part", live & lined & _blank(parts.lining_counts_in_strength),
             "lining_counts_in_strength is blank, taken as no")  # fmt: skip
    own = any_by(_blank(inputs.locations.loss_side), inputs.locations.part, len(parts))
    without = ~any_by(np.ones(len(inputs.locations), dtype=np.bool_), inputs.locations.part, len(parts))
    side = _blank(parts.loss_side) & (own | without) & np.asarray(parts.shape != "other", dtype=np.bool_)
    book.add("loss side blank", "part", live & side, "loss_side is blank, taken as inside")
    book.add("structural minimum blank", "part", live & np.isnan(parts.structural_minimum_mm),
             "structural_minimum is blank, taken as none")  # fmt: skip
    book.add("axial-load minimum blank", "part", live & np.isnan(parts.required_thickness_axial_mm),
             "required_thickness_axial is blank, taken as none")  # fmt: skip
    book.add("external pressure blank", "vessel", np.isnan(inputs.vessels.external_design_pressure_mpa),
             "external_design_pressure is blank, taken as none")  # fmt: skip
    book.add("withdrawn", "part", ~live, "the part was withdrawn")
    gone = ~bench.found.live & live[inputs.locations.part]
    book.add("withdrawn", "location", gone, "the location was withdrawn")


def _readings(book: NoteBook, bench: Bench) -> None:
    found, now = bench.found, bench.found.now
    limit = np.asarray(noticeable_change(s_1=now.previous_error_mm, s_2=now.last_error_mm))
    gain = (now.gain_mm > limit) & found.live
    book.add("apparent gain", "location", gain, lambda row: (
        f"{now.gain_mm[row]:.2f} mm thicker on {_day(now.last_day, row)}; "
        f"{limit[row]:.2f} mm could be error"))  # fmt: skip
    book.add(
        "queried low reading governs", "location", found.queried_low & found.live, "a queried reading governs"
    )
    book.add(
        "rate without queried readings", "location", found.without_queried & found.live,
        "the planning rate is greater without them",
    )  # fmt: skip
    book.add(
        "queried high reading left out",
        "location",
        found.queried_high & found.live,
        "a queried reading does not count",
    )
    book.add("baseline equals nominal", "location", found.baseline_is_nominal & found.live,
             "the baseline is nominal to the last digit")  # fmt: skip


def _rates(book: NoteBook, bench: Bench) -> None:
    found, now, plan = bench.found, bench.found.now, bench.found.plan
    live = found.live & ~np.isnan(now.wall_used_mm)
    book.add("no rate", "location", live & np.isnan(plan.rate), "no rate can be had")
    book.add("rate from nominal", "location", live & (plan.basis == NOMINAL), lambda row: (
        f"{plan.rate[row]:.3f} mm/year from nominal"))  # fmt: skip
    book.add("chosen rate lapsed", "location", live & plan.chosen_lapsed, "the chosen rate no longer holds")
    book.add(
        "chosen rate needs a second name", "location", live & plan.chosen_alone, "one name stands under it"
    )
    short = live & ~np.isnan(now.short_rate) & ~plan.short_counts
    book.add("short-term rate not counted", "location", short, lambda row: (
        f"{now.short_loss_mm[row]:.2f} mm in {now.short_years[row]:.2f} years"), quiet=True)  # fmt: skip
    book.add("loss below what readings can show", "location", live & plan.loss_unseen, lambda row: (
        f"{now.long_rate[row]:.3f} mm/year measured, {now.least_measurable[row]:.3f} mm/year could be shown"),
        quiet=True)  # fmt: skip
    shift = found.shift
    book.add("shared shift", "part", shift.shared & found.live_part, lambda row: (
        f"short-term less long-term rate: mean {shift.mean[row]:.3f}, "
        f"error {shift.error[row]:.3f} mm/year"))  # fmt: skip


def _proportions(book: NoteBook, bench: Bench) -> None:
    rated = bench.need.rated
    for code in sorted({str(text) for text in rated.proportion.tolist() if text}):
        rows = _by_part(bench, np.asarray(rated.proportion == code, dtype=np.bool_))
        book.add(code, "part", rows & bench.found.live_part, "at the required thickness")
    thick = np.zeros(len(bench.need.part), dtype=np.bool_)
    for names in (rated.hoop_formula, rated.axial_formula, rated.end_formula):
        thick |= np.char.startswith(names.astype(np.str_), "thick")
    unknown = thick & np.isnan(bench.need.geometry.edition_year)
    book.add("edition unknown", "part", _by_part(bench, unknown) & bench.found.live_part,
             "code_edition names no year")  # fmt: skip


def _vessels(book: NoteBook, bench: Bench, judged: Judged) -> None:
    inputs, seen, vessels = bench.inputs, bench.seen, bench.inputs.vessels
    kept = np.asarray(vessels.state != "retired", dtype=np.bool_)
    book.add(
        "nameplate blank",
        "vessel",
        np.isnan(vessels.nameplate_mawp_mpa),
        "the design pressure is taken for it",
    )
    book.add("no inspection on record", "vessel", kept & seen.no_internal, "counted from in-service")
    unsaid = np.asarray(inputs.inspections.extent == "", dtype=np.bool_)
    told = np.asarray(inputs.inspections.extent != "", dtype=np.bool_)
    said = set(
        zip(inputs.inspections.vessel[told].tolist(), inputs.inspections.done_day[told].tolist(), strict=True)
    )
    silent = np.zeros(len(vessels), dtype=np.bool_)
    for row in np.flatnonzero(unsaid).tolist():
        key = (int(inputs.inspections.vessel[row]), float(inputs.inspections.done_day[row]))
        silent[key[0]] |= key not in said and key[1] <= bench.as_of_day
    book.add("inspection extent blank", "vessel", kept & silent, "the extent of an inspection is blank")
    book.add("no external on record", "vessel", kept & seen.no_external, "counted from in-service")
    past = kept & (vessels.next_survey_day < bench.as_of_day)
    book.add("no planned survey", "vessel", past, lambda row: (
        f"next_survey_on {_day(vessels.next_survey_day, row)} is past"))  # fmt: skip
    book.add(
        "no planned survey", "vessel", kept & np.isnan(vessels.next_survey_day), "next_survey_on is blank"
    )
    linked = np.zeros(len(vessels), dtype=np.bool_)
    linked[inputs.relief.vessel] = True
    book.add("no relief device", "vessel", kept & ~linked, "no relief device is linked")
    book.add(
        "state without date",
        "vessel",
        vessels.state_undated,
        lambda row: f"state '{vessels.state[row]}' has no date",
    )
    carry, due = judged.carry, judged.due
    book.add("due date not known", "vessel", kept & judged.due_uncertain, lambda row: (
        f"no later than {_day(due.internal_day, row)}; a measured location has no life"))  # fmt: skip
    book.add("planned after due", "vessel", kept & carry.planned_after_due, lambda row: (
        f"planned {_day(vessels.next_survey_day, row)}, due {_day(due.internal_day, row)}"))  # fmt: skip
    book.add("deferral not in force", "vessel", due.deferral_refused, lambda row: (
        f"{int(seen.deferrals[row])} on record since the last inspection"))  # fmt: skip
    book.add("deferral beyond terms", "vessel", due.deferral_cut, lambda row: (
        f"asks for {_day(seen.deferral_day, row)}, the terms give {_day(due.internal_day, row)}"))  # fmt: skip
    tall = _slenderness(inputs, bench.found.live_part)
    ratio = load_rule_set("choices")["tall_ratio"]
    standing = bench.found.live_part & np.isin(inputs.parts.shape, ("cylinder", "cone"))
    untold = any_by(
        standing & np.isnan(inputs.parts.required_thickness_axial_mm), inputs.parts.vessel, len(vessels)
    )
    book.add("wind and weight not assessed", "vessel", (tall > ratio) & untold,
             lambda row: f"{tall[row]:.1f} diameters long")  # fmt: skip


def _slenderness(inputs: Inputs, live: Bools) -> Floats:
    """Give the length of shell courses, cones and heads of each vessel over its greatest diameter."""
    parts, count = inputs.parts, len(inputs.vessels)
    shell = live & np.isin(parts.shape, ("cylinder", "cone"))
    diameter = np.fmax(parts.inside_diameter_mm, parts.outside_diameter_mm)
    crown, knuckle = parts.crown_radius_mm, parts.knuckle_radius_mm
    with np.errstate(invalid="ignore"):
        dish = crown - np.sqrt(np.square(crown - knuckle) - np.square(diameter / 2 - knuckle))
    heads = ("hemispherical head", "ellipsoidal head", "torispherical head")
    depth = np.select(
        [np.asarray(parts.shape == head, dtype=np.bool_) for head in heads],
        [np.fmax(crown, diameter / 2), diameter / (2 * parts.axis_ratio), dish],
        np.where(shell, parts.length_mm, 0.0),
    )
    length = np.bincount(parts.vessel, np.where(live, np.nan_to_num(depth), 0.0), count)
    widest = greatest_by(np.where(shell, diameter, np.nan), parts.vessel, count)
    return np.where(widest > 0, length / np.where(widest > 0, widest, 1.0), np.nan)


def _by_part(bench: Bench, rows: Bools) -> Bools:
    """Say of each part whether any of its rows is flagged; its own row where it has no location in use."""
    n, parts = len(bench.inputs.locations), len(bench.inputs.parts)
    own = any_by(bench.found.live, bench.inputs.locations.part, parts)
    return any_by(rows[:n] & bench.found.live, bench.inputs.locations.part, parts) | (rows[n:] & ~own)


def _blank(texts: object) -> Bools:
    return np.asarray(np.asarray(texts, dtype=object) == "", dtype=np.bool_)


def _day(days: Floats, row: int) -> str:
    day = days[row]
    return "an unknown day" if np.isnan(day) else date.fromordinal(int(day)).isoformat()
