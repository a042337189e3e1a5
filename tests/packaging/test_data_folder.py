"""The data are found in an installed package and in a source tree, and their absence is told."""

from pathlib import Path

import pytest

from safeamp.complaints import ReadingError
from safeamp.reading.data import device_folder, limits_folder


def folder(path):
    path.mkdir(parents=True)
    return path


def test_installed_package_holds_its_own_data(tmp_path):
    shipped = folder(tmp_path / "safeamp" / "_data" / "limits")
    assert limits_folder(tmp_path / "safeamp") == shipped


def test_source_tree_holds_the_data_beside_pyproject(tmp_path):
    package = folder(tmp_path / "safeamp")
    (tmp_path / "pyproject.toml").touch()
    beside = folder(tmp_path / "limits")
    assert limits_folder(package) == beside


def test_the_package_comes_before_the_source_tree(tmp_path):
    (tmp_path / "pyproject.toml").touch()
    folder(tmp_path / "limits")
    shipped = folder(tmp_path / "safeamp" / "_data" / "limits")
    assert limits_folder(tmp_path / "safeamp") == shipped


@pytest.mark.parametrize("stray", [False, True])
def test_missing_data_are_told(tmp_path, stray):
    package = folder(tmp_path / "safeamp")
    if stray:  # beside an installed package a folder of that name belongs to somebody else
        folder(tmp_path / "limits")
    with pytest.raises(ReadingError, match="limits that belong to the program are missing; install it again"):
        limits_folder(package)


def test_this_tree_has_its_data():
    assert (limits_folder() / "offset.toml").is_file()
    assert list(Path(device_folder()).glob("*.toml"))
