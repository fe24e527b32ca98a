"""First tables: the journal, the register, readings, events and decisions.

Revision 0001, after nothing.
"""

from __future__ import annotations

import sqlalchemy as sa
from alembic import op

revision = "0001"
down_revision = None
branch_labels = None
depends_on = None


def upgrade() -> None:
    _journal()
    _register()
    _readings()
    _events()
    op.execute(f"INSERT INTO journal_head (id, no, hash) VALUES (1, 0, '{'0' * 64}')")  # noqa: S608  no input


def downgrade() -> None:
    raise NotImplementedError("the record is never taken back: restore a backup")


def _journal() -> None:
    """The journal, and its head of one row."""
    op.create_table(
        "journal",
        sa.Column("no", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("at", sa.Text(), nullable=False),
        sa.Column("by", sa.Text(), nullable=False),
        sa.Column("role", sa.Text(), nullable=True),
        sa.Column("why", sa.Text(), nullable=True),
        sa.Column("task", sa.Text(), nullable=False),
        sa.Column("program_version", sa.Text(), nullable=False),
        sa.Column("wrote", sa.Text(), nullable=False),
        sa.Column("facts_digest", sa.Text(), nullable=False),
        sa.Column("previous_hash", sa.Text(), nullable=False),
        sa.Column("hash", sa.Text(), nullable=False),
        sa.CheckConstraint("no > 0", name=op.f("ck_journal_no_positive")),
        sa.PrimaryKeyConstraint("no", name=op.f("pk_journal")),
        sa.UniqueConstraint("hash", name=op.f("uq_journal_hash")),
        sa.UniqueConstraint("previous_hash", name=op.f("uq_journal_previous_hash")),
    )
    op.create_table(
        "journal_head",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("no", sa.Integer(), nullable=False),
        sa.Column("hash", sa.Text(), nullable=False),
        sa.CheckConstraint("id = 1", name=op.f("ck_journal_head_one_row")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_journal_head")),
    )


def _register() -> None:
    """Things, and what is known of them from a day on."""
    op.create_table(
        "entity",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("kind", sa.Text(), nullable=False),
        sa.Column("parent_id", sa.Integer(), nullable=True),
        sa.Column("tag", sa.Text(), nullable=False),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint(
            "(kind = 'vessel') = (parent_id IS NULL)", name=op.f("ck_entity_parent_fits_kind")
        ),
        sa.CheckConstraint(
            "kind IN ('vessel', 'part', 'location', 'relief device')", name=op.f("ck_entity_kind_known")
        ),
        sa.CheckConstraint("tag <> ''", name=op.f("ck_entity_tag_not_blank")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_entity_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["parent_id"], ["entity.id"], name=op.f("fk_entity_parent_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_entity")),
    )
    op.create_index("uq_entity_parent_id_kind_tag", "entity", ["parent_id", "kind", "tag"], unique=True)
    op.create_index(
        "uq_entity_vessel_tag",
        "entity",
        ["tag"],
        unique=True,
        sqlite_where=sa.text("parent_id IS NULL"),
        postgresql_where=sa.text("parent_id IS NULL"),
    )
    op.create_table(
        "vessel",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("entity_id", sa.Integer(), nullable=False),
        sa.Column("valid_from", sa.Date(), nullable=False),
        sa.Column("site", sa.Text(), nullable=True),
        sa.Column("service", sa.Text(), nullable=True),
        sa.Column("rules", sa.Text(), nullable=False),
        sa.Column("design_code", sa.Text(), nullable=False),
        sa.Column("code_edition", sa.Text(), nullable=True),
        sa.Column("in_service_on", sa.Date(), nullable=False),
        sa.Column("design_pressure_mpa", sa.Double(), nullable=True),
        sa.Column("design_temperature_c", sa.Double(), nullable=True),
        sa.Column("nameplate_mawp_mpa", sa.Double(), nullable=True),
        sa.Column("external_design_pressure_mpa", sa.Double(), nullable=True),
        sa.Column("operating_pressure_mpa", sa.Double(), nullable=True),
        sa.Column("next_survey_on", sa.Date(), nullable=True),
        sa.Column("assembly", sa.Text(), nullable=True),
        sa.Column("unit", sa.Text(), nullable=True),
        sa.Column("contents", sa.Text(), nullable=True),
        sa.Column("hazard_class", sa.Text(), nullable=True),
        sa.Column("year_built", sa.Integer(), nullable=True),
        sa.Column("manufacturer_serial", sa.Text(), nullable=True),
        sa.Column("jurisdiction_number", sa.Text(), nullable=True),
        sa.Column("insulated", sa.Text(), nullable=True),
        sa.Column("min_design_temperature_c", sa.Double(), nullable=True),
        sa.Column("data_report", sa.Text(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("insulated IN ('yes', 'no')", name=op.f("ck_vessel_insulated_known")),
        sa.CheckConstraint(
            "design_pressure_mpa >= 0", name=op.f("ck_vessel_design_pressure_mpa_not_negative")
        ),
        sa.CheckConstraint(
            "design_pressure_mpa IS NOT NULL OR nameplate_mawp_mpa IS NOT NULL",
            name=op.f("ck_vessel_some_pressure_given"),
        ),
        sa.CheckConstraint(
            "external_design_pressure_mpa >= 0",
            name=op.f("ck_vessel_external_design_pressure_mpa_not_negative"),
        ),
        sa.CheckConstraint("nameplate_mawp_mpa >= 0", name=op.f("ck_vessel_nameplate_mawp_mpa_not_negative")),
        sa.ForeignKeyConstraint(["entity_id"], ["entity.id"], name=op.f("fk_vessel_entity_id_entity")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_vessel_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["replaces_id"], ["vessel.id"], name=op.f("fk_vessel_replaces_id_vessel")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_vessel")),
    )
    op.create_index(op.f("ix_vessel_entity_id"), "vessel", ["entity_id"], unique=False)
    op.create_index(op.f("ix_vessel_replaces_id"), "vessel", ["replaces_id"], unique=True)
    op.create_table(
        "part",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("entity_id", sa.Integer(), nullable=False),
        sa.Column("valid_from", sa.Date(), nullable=False),
        sa.Column("vessel_id", sa.Integer(), nullable=False),
        sa.Column("shape", sa.Text(), nullable=False),
        sa.Column("inside_diameter_mm", sa.Double(), nullable=True),
        sa.Column("outside_diameter_mm", sa.Double(), nullable=True),
        sa.Column("length_mm", sa.Double(), nullable=True),
        sa.Column("crown_radius_mm", sa.Double(), nullable=True),
        sa.Column("knuckle_radius_mm", sa.Double(), nullable=True),
        sa.Column("half_apex_angle_deg", sa.Double(), nullable=True),
        sa.Column("axis_ratio", sa.Double(), nullable=True),
        sa.Column("cover_factor", sa.Double(), nullable=True),
        sa.Column("gasket_diameter_mm", sa.Double(), nullable=True),
        sa.Column("nominal_thickness_mm", sa.Double(), nullable=True),
        sa.Column("corrosion_allowance_mm", sa.Double(), nullable=True),
        sa.Column("material", sa.Text(), nullable=True),
        sa.Column("allowable_stress_mpa", sa.Double(), nullable=True),
        sa.Column("stress_basis", sa.Text(), nullable=True),
        sa.Column("joint_efficiency_long", sa.Double(), nullable=True),
        sa.Column("joint_efficiency_circ", sa.Double(), nullable=True),
        sa.Column("joint_efficiency", sa.Double(), nullable=True),
        sa.Column("static_head_mpa", sa.Double(), nullable=True),
        sa.Column("structural_minimum_mm", sa.Double(), nullable=True),
        sa.Column("required_thickness_external_mm", sa.Double(), nullable=True),
        sa.Column("required_thickness_axial_mm", sa.Double(), nullable=True),
        sa.Column("required_thickness_given_mm", sa.Double(), nullable=True),
        sa.Column("other_pressure_limit_mpa", sa.Double(), nullable=True),
        sa.Column("loss_side", sa.Text(), nullable=True),
        sa.Column("lining", sa.Text(), nullable=True),
        sa.Column("lining_thickness_mm", sa.Double(), nullable=True),
        sa.Column("lining_counts_in_strength", sa.Text(), nullable=True),
        sa.Column("expected_rate_mm_per_year", sa.Double(), nullable=True),
        sa.Column("alert_thickness_mm", sa.Double(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint(
            "lining IN ('none', 'integral clad', 'overlay', 'strip', 'rubber', 'glass', 'refractory', "
            "'paint')",
            name=op.f("ck_part_lining_known"),
        ),
        sa.CheckConstraint(
            "lining_counts_in_strength IN ('yes', 'no')", name=op.f("ck_part_lining_counts_in_strength_known")
        ),
        sa.CheckConstraint(
            "loss_side IN ('inside', 'outside', 'both')", name=op.f("ck_part_loss_side_known")
        ),
        sa.CheckConstraint(
            "shape IN ("
            "'cylinder', 'sphere', 'hemispherical head', 'ellipsoidal head', "
            "'torispherical head', 'cone', 'flat cover', 'nozzle neck', 'other')",
            name=op.f("ck_part_shape_known"),
        ),
        sa.CheckConstraint("alert_thickness_mm >= 0", name=op.f("ck_part_alert_thickness_mm_not_negative")),
        sa.CheckConstraint("allowable_stress_mpa > 0", name=op.f("ck_part_allowable_stress_mpa_positive")),
        sa.CheckConstraint("axis_ratio > 0", name=op.f("ck_part_axis_ratio_positive")),
        sa.CheckConstraint(
            "corrosion_allowance_mm >= 0", name=op.f("ck_part_corrosion_allowance_mm_not_negative")
        ),
        sa.CheckConstraint("cover_factor > 0", name=op.f("ck_part_cover_factor_positive")),
        sa.CheckConstraint("crown_radius_mm > 0", name=op.f("ck_part_crown_radius_mm_positive")),
        sa.CheckConstraint(
            "expected_rate_mm_per_year >= 0", name=op.f("ck_part_expected_rate_mm_per_year_not_negative")
        ),
        sa.CheckConstraint("gasket_diameter_mm > 0", name=op.f("ck_part_gasket_diameter_mm_positive")),
        sa.CheckConstraint("half_apex_angle_deg > 0", name=op.f("ck_part_half_apex_angle_deg_positive")),
        sa.CheckConstraint("inside_diameter_mm > 0", name=op.f("ck_part_inside_diameter_mm_positive")),
        sa.CheckConstraint(
            "joint_efficiency > 0 AND joint_efficiency <= 1", name=op.f("ck_part_joint_efficiency_fraction")
        ),
        sa.CheckConstraint(
            "joint_efficiency_circ > 0 AND joint_efficiency_circ <= 1",
            name=op.f("ck_part_joint_efficiency_circ_fraction"),
        ),
        sa.CheckConstraint(
            "joint_efficiency_long > 0 AND joint_efficiency_long <= 1",
            name=op.f("ck_part_joint_efficiency_long_fraction"),
        ),
        sa.CheckConstraint("knuckle_radius_mm > 0", name=op.f("ck_part_knuckle_radius_mm_positive")),
        sa.CheckConstraint("length_mm >= 0", name=op.f("ck_part_length_mm_not_negative")),
        sa.CheckConstraint("lining_thickness_mm >= 0", name=op.f("ck_part_lining_thickness_mm_not_negative")),
        sa.CheckConstraint("nominal_thickness_mm > 0", name=op.f("ck_part_nominal_thickness_mm_positive")),
        sa.CheckConstraint(
            "other_pressure_limit_mpa >= 0", name=op.f("ck_part_other_pressure_limit_mpa_not_negative")
        ),
        sa.CheckConstraint("outside_diameter_mm > 0", name=op.f("ck_part_outside_diameter_mm_positive")),
        sa.CheckConstraint(
            "required_thickness_axial_mm >= 0", name=op.f("ck_part_required_thickness_axial_mm_not_negative")
        ),
        sa.CheckConstraint(
            "required_thickness_external_mm >= 0",
            name=op.f("ck_part_required_thickness_external_mm_not_negative"),
        ),
        sa.CheckConstraint(
            "required_thickness_given_mm >= 0", name=op.f("ck_part_required_thickness_given_mm_not_negative")
        ),
        sa.CheckConstraint("static_head_mpa >= 0", name=op.f("ck_part_static_head_mpa_not_negative")),
        sa.CheckConstraint(
            "structural_minimum_mm >= 0", name=op.f("ck_part_structural_minimum_mm_not_negative")
        ),
        sa.ForeignKeyConstraint(["entity_id"], ["entity.id"], name=op.f("fk_part_entity_id_entity")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_part_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["replaces_id"], ["part.id"], name=op.f("fk_part_replaces_id_part")),
        sa.ForeignKeyConstraint(["vessel_id"], ["entity.id"], name=op.f("fk_part_vessel_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_part")),
    )
    op.create_index(op.f("ix_part_entity_id"), "part", ["entity_id"], unique=False)
    op.create_index(op.f("ix_part_replaces_id"), "part", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_part_vessel_id"), "part", ["vessel_id"], unique=False)
    op.create_table(
        "location",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("entity_id", sa.Integer(), nullable=False),
        sa.Column("valid_from", sa.Date(), nullable=False),
        sa.Column("part_id", sa.Integer(), nullable=False),
        sa.Column("position", sa.Text(), nullable=True),
        sa.Column("zone", sa.Text(), nullable=True),
        sa.Column("seam_distance_mm", sa.Double(), nullable=True),
        sa.Column("elevation_mm", sa.Double(), nullable=True),
        sa.Column("angle_deg", sa.Double(), nullable=True),
        sa.Column("diameter_at_mm", sa.Double(), nullable=True),
        sa.Column("loss_side", sa.Text(), nullable=True),
        sa.Column("damage", sa.Text(), nullable=True),
        sa.Column("alert_thickness_mm", sa.Double(), nullable=True),
        sa.Column("reading_error_mm", sa.Double(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint(
            "damage IN ('general', 'local', 'pitting')", name=op.f("ck_location_damage_known")
        ),
        sa.CheckConstraint(
            "loss_side IN ('inside', 'outside', 'both')", name=op.f("ck_location_loss_side_known")
        ),
        sa.CheckConstraint(
            "zone IN ('crown', 'knuckle', 'seam', 'plate')", name=op.f("ck_location_zone_known")
        ),
        sa.CheckConstraint(
            "alert_thickness_mm >= 0", name=op.f("ck_location_alert_thickness_mm_not_negative")
        ),
        sa.CheckConstraint("diameter_at_mm > 0", name=op.f("ck_location_diameter_at_mm_positive")),
        sa.CheckConstraint("reading_error_mm > 0", name=op.f("ck_location_reading_error_mm_positive")),
        sa.CheckConstraint("seam_distance_mm >= 0", name=op.f("ck_location_seam_distance_mm_not_negative")),
        sa.ForeignKeyConstraint(["entity_id"], ["entity.id"], name=op.f("fk_location_entity_id_entity")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_location_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["part_id"], ["entity.id"], name=op.f("fk_location_part_id_entity")),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["location.id"], name=op.f("fk_location_replaces_id_location")
        ),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_location")),
    )
    op.create_index(op.f("ix_location_entity_id"), "location", ["entity_id"], unique=False)
    op.create_index(op.f("ix_location_part_id"), "location", ["part_id"], unique=False)
    op.create_index(op.f("ix_location_replaces_id"), "location", ["replaces_id"], unique=True)
    op.create_table(
        "relief_device",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("entity_id", sa.Integer(), nullable=False),
        sa.Column("valid_from", sa.Date(), nullable=False),
        sa.Column("vessel_id", sa.Integer(), nullable=False),
        sa.Column("set_pressure_mpa", sa.Double(), nullable=False),
        sa.Column("last_test_on", sa.Date(), nullable=True),
        sa.Column("next_test_on", sa.Date(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("set_pressure_mpa > 0", name=op.f("ck_relief_device_set_pressure_mpa_positive")),
        sa.ForeignKeyConstraint(["entity_id"], ["entity.id"], name=op.f("fk_relief_device_entity_id_entity")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_relief_device_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["relief_device.id"], name=op.f("fk_relief_device_replaces_id_relief_device")
        ),
        sa.ForeignKeyConstraint(["vessel_id"], ["entity.id"], name=op.f("fk_relief_device_vessel_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_relief_device")),
    )
    op.create_index(op.f("ix_relief_device_entity_id"), "relief_device", ["entity_id"], unique=False)
    op.create_index(op.f("ix_relief_device_replaces_id"), "relief_device", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_relief_device_vessel_id"), "relief_device", ["vessel_id"], unique=False)


def _readings() -> None:
    """Files, surveys, readings, and what is doubtful about them."""
    op.create_table(
        "source_file",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("name", sa.Text(), nullable=False),
        sa.Column("sha256", sa.Text(), nullable=False),
        sa.Column("kind", sa.Text(), nullable=False),
        sa.Column("rows_loaded", sa.Integer(), nullable=False),
        sa.Column("rows_parked", sa.Integer(), nullable=False),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("rows_loaded >= 0", name=op.f("ck_source_file_rows_loaded_not_negative")),
        sa.CheckConstraint("rows_parked >= 0", name=op.f("ck_source_file_rows_parked_not_negative")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_source_file_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["source_file.id"], name=op.f("fk_source_file_replaces_id_source_file")
        ),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_source_file")),
    )
    op.create_index(op.f("ix_source_file_replaces_id"), "source_file", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_source_file_sha256"), "source_file", ["sha256"], unique=False)
    op.create_table(
        "parked_row",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("source_file_id", sa.Integer(), nullable=False),
        sa.Column("sheet", sa.Text(), nullable=True),
        sa.Column("row_no", sa.Integer(), nullable=False),
        sa.Column("content", sa.Text(), nullable=False),
        sa.Column("faults", sa.Text(), nullable=False),
        sa.Column("status", sa.Text(), nullable=False),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("status IN ('waiting', 'settled')", name=op.f("ck_parked_row_status_known")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_parked_row_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["parked_row.id"], name=op.f("fk_parked_row_replaces_id_parked_row")
        ),
        sa.ForeignKeyConstraint(
            ["source_file_id"], ["source_file.id"], name=op.f("fk_parked_row_source_file_id_source_file")
        ),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_parked_row")),
    )
    op.create_index(op.f("ix_parked_row_replaces_id"), "parked_row", ["replaces_id"], unique=True)
    op.create_table(
        "survey",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("name", sa.Text(), nullable=False),
        sa.Column("taken_from_on", sa.Date(), nullable=True),
        sa.Column("taken_to_on", sa.Date(), nullable=True),
        sa.Column("technician", sa.Text(), nullable=True),
        sa.Column("instrument", sa.Text(), nullable=True),
        sa.Column("calibration", sa.Text(), nullable=True),
        sa.Column("scope", sa.Text(), nullable=True),
        sa.Column("reading_error_mm", sa.Double(), nullable=True),
        sa.Column("source_file_id", sa.Integer(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("reading_error_mm > 0", name=op.f("ck_survey_reading_error_mm_positive")),
        sa.CheckConstraint("taken_from_on <= taken_to_on", name=op.f("ck_survey_taken_in_order")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_survey_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["replaces_id"], ["survey.id"], name=op.f("fk_survey_replaces_id_survey")),
        sa.ForeignKeyConstraint(
            ["source_file_id"], ["source_file.id"], name=op.f("fk_survey_source_file_id_source_file")
        ),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_survey")),
    )
    op.create_index(op.f("ix_survey_replaces_id"), "survey", ["replaces_id"], unique=True)
    op.create_table(
        "reading",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("location_id", sa.Integer(), nullable=False),
        sa.Column("taken_on", sa.Date(), nullable=False),
        sa.Column("thickness_mm", sa.Double(), nullable=True),
        sa.Column("average_mm", sa.Double(), nullable=True),
        sa.Column("result", sa.Text(), nullable=False),
        sa.Column("method", sa.Text(), nullable=True),
        sa.Column("wall_temperature_c", sa.Double(), nullable=True),
        sa.Column("temperature_corrected", sa.Text(), nullable=True),
        sa.Column("includes_lining", sa.Text(), nullable=True),
        sa.Column("through_coating", sa.Text(), nullable=True),
        sa.Column("technician", sa.Text(), nullable=True),
        sa.Column("instrument", sa.Text(), nullable=True),
        sa.Column("note", sa.Text(), nullable=True),
        sa.Column("kind", sa.Text(), nullable=False),
        sa.Column("status", sa.Text(), nullable=False),
        sa.Column("status_because", sa.Text(), nullable=True),
        sa.Column("survey_id", sa.Integer(), nullable=True),
        sa.Column("source_row", sa.Integer(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint(
            "(result = 'read') = (thickness_mm IS NOT NULL)", name=op.f("ck_reading_thickness_fits_result")
        ),
        sa.CheckConstraint("includes_lining IN ('yes', 'no')", name=op.f("ck_reading_includes_lining_known")),
        sa.CheckConstraint("kind IN ('reading', 'baseline')", name=op.f("ck_reading_kind_known")),
        sa.CheckConstraint(
            "method IN ('spot', 'scan', 'profile', 'radiography')", name=op.f("ck_reading_method_known")
        ),
        sa.CheckConstraint(
            "result IN ('read', 'no echo', 'no access', 'lamination')", name=op.f("ck_reading_result_known")
        ),
        sa.CheckConstraint(
            "status = 'accepted' OR status_because IS NOT NULL", name=op.f("ck_reading_status_has_reason")
        ),
        sa.CheckConstraint(
            "status IN ('accepted', 'queried', 'voided')", name=op.f("ck_reading_status_known")
        ),
        sa.CheckConstraint(
            "temperature_corrected IN ('yes', 'no')", name=op.f("ck_reading_temperature_corrected_known")
        ),
        sa.CheckConstraint("through_coating IN ('yes', 'no')", name=op.f("ck_reading_through_coating_known")),
        sa.CheckConstraint("average_mm > 0", name=op.f("ck_reading_average_mm_positive")),
        sa.CheckConstraint("thickness_mm > 0", name=op.f("ck_reading_thickness_mm_positive")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_reading_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["location_id"], ["entity.id"], name=op.f("fk_reading_location_id_entity")),
        sa.ForeignKeyConstraint(["replaces_id"], ["reading.id"], name=op.f("fk_reading_replaces_id_reading")),
        sa.ForeignKeyConstraint(["survey_id"], ["survey.id"], name=op.f("fk_reading_survey_id_survey")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_reading")),
    )
    op.create_index(op.f("ix_reading_location_id"), "reading", ["location_id"], unique=False)
    op.create_index(op.f("ix_reading_replaces_id"), "reading", ["replaces_id"], unique=True)
    op.create_table(
        "doubt",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("code", sa.Text(), nullable=False),
        sa.Column("where_text", sa.Text(), nullable=False),
        sa.Column("found", sa.Text(), nullable=False),
        sa.Column("remedy", sa.Text(), nullable=False),
        sa.Column("vessel_id", sa.Integer(), nullable=True),
        sa.Column("part_id", sa.Integer(), nullable=True),
        sa.Column("location_id", sa.Integer(), nullable=True),
        sa.Column("reading_id", sa.Integer(), nullable=True),
        sa.Column("status", sa.Text(), nullable=False),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("status IN ('open', 'cleared')", name=op.f("ck_doubt_status_known")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_doubt_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["location_id"], ["entity.id"], name=op.f("fk_doubt_location_id_entity")),
        sa.ForeignKeyConstraint(["part_id"], ["entity.id"], name=op.f("fk_doubt_part_id_entity")),
        sa.ForeignKeyConstraint(["reading_id"], ["reading.id"], name=op.f("fk_doubt_reading_id_reading")),
        sa.ForeignKeyConstraint(["replaces_id"], ["doubt.id"], name=op.f("fk_doubt_replaces_id_doubt")),
        sa.ForeignKeyConstraint(["vessel_id"], ["entity.id"], name=op.f("fk_doubt_vessel_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_doubt")),
    )
    op.create_index(op.f("ix_doubt_location_id"), "doubt", ["location_id"], unique=False)
    op.create_index(op.f("ix_doubt_part_id"), "doubt", ["part_id"], unique=False)
    op.create_index(op.f("ix_doubt_reading_id"), "doubt", ["reading_id"], unique=False)
    op.create_index(op.f("ix_doubt_replaces_id"), "doubt", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_doubt_vessel_id"), "doubt", ["vessel_id"], unique=False)


def _events() -> None:
    """What happened, what was decided, what was set, what was saved."""
    op.create_table(
        "inspection",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("vessel_id", sa.Integer(), nullable=False),
        sa.Column("kind", sa.Text(), nullable=False),
        sa.Column("done_on", sa.Date(), nullable=False),
        sa.Column("extent", sa.Text(), nullable=True),
        sa.Column("inspector", sa.Text(), nullable=True),
        sa.Column("report", sa.Text(), nullable=True),
        sa.Column("withdrawn_because", sa.Text(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint(
            "kind IN ('internal', 'external', 'on-stream')", name=op.f("ck_inspection_kind_known")
        ),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_inspection_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["inspection.id"], name=op.f("fk_inspection_replaces_id_inspection")
        ),
        sa.ForeignKeyConstraint(["vessel_id"], ["entity.id"], name=op.f("fk_inspection_vessel_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_inspection")),
    )
    op.create_index(op.f("ix_inspection_replaces_id"), "inspection", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_inspection_vessel_id"), "inspection", ["vessel_id"], unique=False)
    op.create_table(
        "restart",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("vessel_id", sa.Integer(), nullable=False),
        sa.Column("part_id", sa.Integer(), nullable=True),
        sa.Column("kind", sa.Text(), nullable=False),
        sa.Column("what", sa.Text(), nullable=False),
        sa.Column("happened_on", sa.Date(), nullable=False),
        sa.Column("reason", sa.Text(), nullable=True),
        sa.Column("whole_part", sa.Boolean(), nullable=False),
        sa.Column("withdrawn_because", sa.Text(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("kind IN ('new metal', 'new service')", name=op.f("ck_restart_kind_known")),
        sa.CheckConstraint(
            "what IN ('replaced', 'overlaid', 're-lined', 'changed service')",
            name=op.f("ck_restart_what_known"),
        ),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_restart_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["part_id"], ["entity.id"], name=op.f("fk_restart_part_id_entity")),
        sa.ForeignKeyConstraint(["replaces_id"], ["restart.id"], name=op.f("fk_restart_replaces_id_restart")),
        sa.ForeignKeyConstraint(["vessel_id"], ["entity.id"], name=op.f("fk_restart_vessel_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_restart")),
    )
    op.create_index(op.f("ix_restart_part_id"), "restart", ["part_id"], unique=False)
    op.create_index(op.f("ix_restart_replaces_id"), "restart", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_restart_vessel_id"), "restart", ["vessel_id"], unique=False)
    op.create_table(
        "restart_location",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("restart_id", sa.Integer(), nullable=False),
        sa.Column("location_id", sa.Integer(), nullable=False),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_restart_location_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["location_id"], ["entity.id"], name=op.f("fk_restart_location_location_id_entity")
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"],
            ["restart_location.id"],
            name=op.f("fk_restart_location_replaces_id_restart_location"),
        ),
        sa.ForeignKeyConstraint(
            ["restart_id"], ["restart.id"], name=op.f("fk_restart_location_restart_id_restart")
        ),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_restart_location")),
    )
    op.create_index(
        op.f("ix_restart_location_location_id"), "restart_location", ["location_id"], unique=False
    )
    op.create_index(op.f("ix_restart_location_replaces_id"), "restart_location", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_restart_location_restart_id"), "restart_location", ["restart_id"], unique=False)
    op.create_table(
        "dated_state",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("subject_id", sa.Integer(), nullable=False),
        sa.Column("state", sa.Text(), nullable=False),
        sa.Column("from_on", sa.Date(), nullable=False),
        sa.Column("date_known", sa.Text(), nullable=True),
        sa.Column("reason", sa.Text(), nullable=True),
        sa.Column("withdrawn_because", sa.Text(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint("date_known IN ('yes', 'no')", name=op.f("ck_dated_state_date_known_known")),
        sa.CheckConstraint(
            "state IN ('in service', 'idle protected', 'idle', 'out of service', 'retired', 'withdrawn')",
            name=op.f("ck_dated_state_state_known"),
        ),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_dated_state_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["dated_state.id"], name=op.f("fk_dated_state_replaces_id_dated_state")
        ),
        sa.ForeignKeyConstraint(["subject_id"], ["entity.id"], name=op.f("fk_dated_state_subject_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_dated_state")),
    )
    op.create_index(op.f("ix_dated_state_replaces_id"), "dated_state", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_dated_state_subject_id"), "dated_state", ["subject_id"], unique=False)
    op.create_table(
        "decision",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("vessel_id", sa.Integer(), nullable=False),
        sa.Column("part_id", sa.Integer(), nullable=True),
        sa.Column("location_id", sa.Integer(), nullable=True),
        sa.Column("kind", sa.Text(), nullable=False),
        sa.Column("decided_on", sa.Date(), nullable=False),
        sa.Column("effective_on", sa.Date(), nullable=True),
        sa.Column("review_on", sa.Date(), nullable=True),
        sa.Column("until_on", sa.Date(), nullable=True),
        sa.Column("pressure_mpa", sa.Double(), nullable=True),
        sa.Column("rate_mm_per_year", sa.Double(), nullable=True),
        sa.Column("rests_on", sa.Text(), nullable=True),
        sa.Column("reason", sa.Text(), nullable=True),
        sa.Column("decided_by", sa.Text(), nullable=True),
        sa.Column("second_by", sa.Text(), nullable=True),
        sa.Column("withdrawn_because", sa.Text(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.CheckConstraint(
            "kind <> 'chosen rate' OR rate_mm_per_year IS NOT NULL",
            name=op.f("ck_decision_chosen_rate_has_rate"),
        ),
        sa.CheckConstraint(
            "kind <> 're-rating' OR pressure_mpa IS NOT NULL", name=op.f("ck_decision_re_rating_has_pressure")
        ),
        sa.CheckConstraint(
            "kind IN ('re-rating', 'chosen rate', 'deferral', 'on-stream acceptance', 'other')",
            name=op.f("ck_decision_kind_known"),
        ),
        sa.CheckConstraint("pressure_mpa >= 0", name=op.f("ck_decision_pressure_mpa_not_negative")),
        sa.CheckConstraint("rate_mm_per_year >= 0", name=op.f("ck_decision_rate_mm_per_year_not_negative")),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_decision_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["location_id"], ["entity.id"], name=op.f("fk_decision_location_id_entity")),
        sa.ForeignKeyConstraint(["part_id"], ["entity.id"], name=op.f("fk_decision_part_id_entity")),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["decision.id"], name=op.f("fk_decision_replaces_id_decision")
        ),
        sa.ForeignKeyConstraint(["vessel_id"], ["entity.id"], name=op.f("fk_decision_vessel_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_decision")),
    )
    op.create_index(op.f("ix_decision_location_id"), "decision", ["location_id"], unique=False)
    op.create_index(op.f("ix_decision_part_id"), "decision", ["part_id"], unique=False)
    op.create_index(op.f("ix_decision_replaces_id"), "decision", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_decision_vessel_id"), "decision", ["vessel_id"], unique=False)
    op.create_table(
        "setting",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("key", sa.Text(), nullable=False),
        sa.Column("value", sa.Text(), nullable=False),
        sa.Column("subject_id", sa.Integer(), nullable=True),
        sa.Column("from_on", sa.Date(), nullable=False),
        sa.Column("withdrawn_because", sa.Text(), nullable=True),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_setting_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(["replaces_id"], ["setting.id"], name=op.f("fk_setting_replaces_id_setting")),
        sa.ForeignKeyConstraint(["subject_id"], ["entity.id"], name=op.f("fk_setting_subject_id_entity")),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_setting")),
    )
    op.create_index(op.f("ix_setting_replaces_id"), "setting", ["replaces_id"], unique=True)
    op.create_index(op.f("ix_setting_subject_id"), "setting", ["subject_id"], unique=False)
    op.create_table(
        "appraisal",
        sa.Column("id", sa.Integer(), autoincrement=False, nullable=False),
        sa.Column("entry_no", sa.Integer(), nullable=False),
        sa.Column("replaces_id", sa.Integer(), nullable=True),
        sa.Column("name", sa.Text(), nullable=False),
        sa.Column("as_of_on", sa.Date(), nullable=False),
        sa.Column("known_no", sa.Integer(), nullable=False),
        sa.Column("carry_to_on", sa.Date(), nullable=True),
        sa.Column("program_version", sa.Text(), nullable=False),
        sa.Column("journal_hash", sa.Text(), nullable=False),
        sa.Column("document", sa.Text(), nullable=False),
        sa.Column("written", sa.Text(), nullable=True),
        sa.Column("mark", sa.Text(), nullable=False),
        sa.ForeignKeyConstraint(
            ["entry_no"],
            ["journal.no"],
            name=op.f("fk_appraisal_entry_no_journal"),
            initially="DEFERRED",
            deferrable=True,
        ),
        sa.ForeignKeyConstraint(
            ["replaces_id"], ["appraisal.id"], name=op.f("fk_appraisal_replaces_id_appraisal")
        ),
        sa.PrimaryKeyConstraint("id", name=op.f("pk_appraisal")),
        sa.UniqueConstraint("name", name=op.f("uq_appraisal_name")),
    )
    op.create_index(op.f("ix_appraisal_replaces_id"), "appraisal", ["replaces_id"], unique=True)
