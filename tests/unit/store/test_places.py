"""Data folders are found in a checkout and in a wheel."""

from __future__ import annotations

from pathlib import Path

import pytest

import fleet
from fleet import errors
from fleet.store.places import data_folder


def test_the_checkout_has_its_folders_beside_the_package() -> None:
    assert (data_folder("migrations") / "env.py").is_file()
    assert data_folder("sample_data").is_dir()


def test_a_wheel_has_them_inside_the_package(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    inside = tmp_path / "fleet" / "migrations"
    inside.mkdir(parents=True)
    (tmp_path / "migrations").mkdir()
    monkeypatch.setattr(fleet, "__file__", str(tmp_path / "fleet" / "__init__.py"))
    assert data_folder("migrations") == inside.resolve()
    with pytest.raises(errors.OurFault, match="the folder 'sample_data' is missing"):
        data_folder("sample_data")
