"""The register: what stands in the works. One row per state of a vessel, part, location or relief device.

An entity is the thing itself and has its tag; what is known of it stands in rows with a `valid_from`, of
which the first holds from the beginning.
"""

from __future__ import annotations

import datetime as dt
from typing import ClassVar

from sqlalchemy import CheckConstraint, ForeignKey, Index, text
from sqlalchemy.orm import Mapped, declared_attr, mapped_column

from fleet.store.base import YES_NO, Base, Correctable, Fact, choices, fraction, not_negative, positive

ENTITY_KINDS = ("vessel", "part", "location", "relief device")
SHAPES = (
    "cylinder",
    "sphere",
    "hemispherical head",
    "ellipsoidal head",
    "torispherical head",
    "cone",
    "flat cover",
    "nozzle neck",
    "other",
)
LOSS_SIDES = ("inside", "outside", "both")
LININGS = ("none", "integral clad", "overlay", "strip", "rubber", "glass", "refractory", "paint")
ZONES = ("crown", "knuckle", "seam", "plate")
DAMAGES = ("general", "local", "pitting")


class Entity(Fact, Base):
    """A vessel, part, location or relief device: the thing that facts are about."""

    __tablename__ = "entity"
    ABOUT: ClassVar[tuple[str, ...]] = ("id",)

    kind: Mapped[str]
    parent_id: Mapped[int | None] = mapped_column(ForeignKey("entity.id"))
    tag: Mapped[str]

    __table_args__ = (
        choices("kind", ENTITY_KINDS),
        CheckConstraint("(kind = 'vessel') = (parent_id IS NULL)", name="parent_fits_kind"),
        CheckConstraint("tag <> ''", name="tag_not_blank"),
        Index("uq_entity_parent_id_kind_tag", "parent_id", "kind", "tag", unique=True),
        # Two nulls are never equal, so vessels, which have no parent, need an index of their own.
        Index(
            "uq_entity_vessel_tag",
            "tag",
            unique=True,
            sqlite_where=text("parent_id IS NULL"),
            postgresql_where=text("parent_id IS NULL"),
        ),
    )


class RegisterRow(Correctable):
    """Give a register table its entity and the day from which the row holds."""

    valid_from: Mapped[dt.date] = mapped_column(sort_order=-5)

    @declared_attr
    def entity_id(cls) -> Mapped[int]:  # noqa: N805  SQLAlchemy calls it with the class
        """Name the entity the row describes."""
        return mapped_column(ForeignKey("entity.id"), index=True, sort_order=-6)


class Vessel(RegisterRow, Base):
    """What is known of a vessel from a day on."""

    __tablename__ = "vessel"
    ABOUT: ClassVar[tuple[str, ...]] = ("entity_id",)

    site: Mapped[str | None]
    service: Mapped[str | None]
    rules: Mapped[str]
    design_code: Mapped[str]
    code_edition: Mapped[str | None]
    in_service_on: Mapped[dt.date]
    design_pressure_mpa: Mapped[float | None]
    design_temperature_c: Mapped[float | None]
    nameplate_mawp_mpa: Mapped[float | None]
    external_design_pressure_mpa: Mapped[float | None]
    operating_pressure_mpa: Mapped[float | None]
    next_survey_on: Mapped[dt.date | None]
    assembly: Mapped[str | None]
    unit: Mapped[str | None]
    contents: Mapped[str | None]
    hazard_class: Mapped[str | None]
    year_built: Mapped[int | None]
    manufacturer_serial: Mapped[str | None]
    jurisdiction_number: Mapped[str | None]
    insulated: Mapped[str | None]
    min_design_temperature_c: Mapped[float | None]
    data_report: Mapped[str | None]

    __table_args__ = (
        choices("insulated", YES_NO),
        *not_negative("design_pressure_mpa", "nameplate_mawp_mpa", "external_design_pressure_mpa"),
        CheckConstraint(
            "design_pressure_mpa IS NOT NULL OR nameplate_mawp_mpa IS NOT NULL", name="some_pressure_given"
        ),
    )


class Part(RegisterRow, Base):
    """What is known of a part from a day on."""

    __tablename__ = "part"
    ABOUT: ClassVar[tuple[str, ...]] = ("entity_id", "vessel_id")

    vessel_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    shape: Mapped[str]
    inside_diameter_mm: Mapped[float | None]
    outside_diameter_mm: Mapped[float | None]
    length_mm: Mapped[float | None]
    crown_radius_mm: Mapped[float | None]
    knuckle_radius_mm: Mapped[float | None]
    half_apex_angle_deg: Mapped[float | None]
    axis_ratio: Mapped[float | None]
    cover_factor: Mapped[float | None]
    gasket_diameter_mm: Mapped[float | None]
    nominal_thickness_mm: Mapped[float | None]
    corrosion_allowance_mm: Mapped[float | None]
    material: Mapped[str | None]
    allowable_stress_mpa: Mapped[float | None]
    stress_basis: Mapped[str | None]
    joint_efficiency_long: Mapped[float | None]
    joint_efficiency_circ: Mapped[float | None]
    joint_efficiency: Mapped[float | None]
    static_head_mpa: Mapped[float | None]
    structural_minimum_mm: Mapped[float | None]
    required_thickness_external_mm: Mapped[float | None]
    required_thickness_axial_mm: Mapped[float | None]
    required_thickness_given_mm: Mapped[float | None]
    other_pressure_limit_mpa: Mapped[float | None]
    loss_side: Mapped[str | None]
    lining: Mapped[str | None]
    lining_thickness_mm: Mapped[float | None]
    lining_counts_in_strength: Mapped[str | None]
    expected_rate_mm_per_year: Mapped[float | None]
    alert_thickness_mm: Mapped[float | None]

    __table_args__ = (
        choices("shape", SHAPES),
        choices("loss_side", LOSS_SIDES),
        choices("lining", LININGS),
        choices("lining_counts_in_strength", YES_NO),
        *positive(
            "inside_diameter_mm",
            "outside_diameter_mm",
            "crown_radius_mm",
            "knuckle_radius_mm",
            "half_apex_angle_deg",
            "axis_ratio",
            "cover_factor",
            "gasket_diameter_mm",
            "nominal_thickness_mm",
            "allowable_stress_mpa",
        ),
        *fraction("joint_efficiency_long", "joint_efficiency_circ", "joint_efficiency"),
        *not_negative(
            "length_mm",
            "corrosion_allowance_mm",
            "static_head_mpa",
            "structural_minimum_mm",
            "required_thickness_external_mm",
            "required_thickness_axial_mm",
            "required_thickness_given_mm",
            "other_pressure_limit_mpa",
            "lining_thickness_mm",
            "expected_rate_mm_per_year",
            "alert_thickness_mm",
        ),
    )


class Location(RegisterRow, Base):
    """What is known of a condition monitoring location from a day on."""

    __tablename__ = "location"
    ABOUT: ClassVar[tuple[str, ...]] = ("entity_id", "part_id")

    part_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    position: Mapped[str | None]
    zone: Mapped[str | None]
    seam_distance_mm: Mapped[float | None]
    elevation_mm: Mapped[float | None]
    angle_deg: Mapped[float | None]
    diameter_at_mm: Mapped[float | None]
    loss_side: Mapped[str | None]
    damage: Mapped[str | None]
    alert_thickness_mm: Mapped[float | None]
    reading_error_mm: Mapped[float | None]

    __table_args__ = (
        choices("zone", ZONES),
        choices("loss_side", LOSS_SIDES),
        choices("damage", DAMAGES),
        *positive("diameter_at_mm", "reading_error_mm"),
        *not_negative("seam_distance_mm", "alert_thickness_mm"),
    )


class ReliefDevice(RegisterRow, Base):
    """What is known of a relief device from a day on."""

    __tablename__ = "relief_device"
    ABOUT: ClassVar[tuple[str, ...]] = ("entity_id", "vessel_id")

    vessel_id: Mapped[int] = mapped_column(ForeignKey("entity.id"), index=True)
    set_pressure_mpa: Mapped[float]
    last_test_on: Mapped[dt.date | None]
    next_test_on: Mapped[dt.date | None]

    __table_args__ = (*positive("set_pressure_mpa"),)
