"""The record: tables, engine, journal, facts in force, guard and migrations. No formula stands here."""

from sqlalchemy import Connection, Engine

__all__ = ["Connection", "Engine"]
