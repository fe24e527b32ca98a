"""The record: tables, engine, journal, facts in force, guard and migrations. No formula stands here."""
