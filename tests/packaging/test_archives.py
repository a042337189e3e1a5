"""What the build puts into wheel and source archive, asked of the build tool without building."""

import tomllib
from pathlib import Path

import pytest
from hatchling.builders.sdist import SdistBuilder
from hatchling.builders.wheel import WheelBuilder

import safeamp
from safeamp import complaints

TREE = Path(__file__).resolve().parents[2]
DATA = sorted(path.relative_to(TREE).as_posix() for path in (TREE / "limits").rglob("*.toml"))
PROJECT = tomllib.loads((TREE / "pyproject.toml").read_text(encoding="utf-8"))


def contents(builder):
    return {file.distribution_path for file in builder(str(TREE)).recurse_included_files()}


@pytest.fixture(scope="module")
def wheel():
    return contents(WheelBuilder)


@pytest.fixture(scope="module")
def source():
    return contents(SdistBuilder)


def test_there_are_data_to_ship():
    assert len(DATA) > 20


def test_wheel_holds_every_data_file_inside_the_package(wheel):
    assert {f"safeamp/_data/{name}" for name in DATA} <= wheel
    assert not [name for name in wheel if name.startswith("limits/")]


def test_wheel_holds_every_module_and_its_companions(wheel):
    modules = {path.relative_to(TREE).as_posix() for path in (TREE / "safeamp").rglob("*.py")}
    assert modules <= wheel
    assert {"safeamp/py.typed", "safeamp/quantities/units.txt"} <= wheel
    assert not [name for name in wheel if name.startswith("tests/")]


def test_source_archive_holds_data_on_top_and_tests(source):
    assert set(DATA) <= source
    assert {"LICENSE", "pyproject.toml", "tests/packaging/test_archives.py", ".ci/run"} <= source


def test_version_comes_from_the_package():
    assert WheelBuilder(str(TREE)).metadata.version == safeamp.__version__


def test_import_floors_name_every_room():
    [floors] = [one for one in PROJECT["tool"]["importlinter"]["contracts"] if one["id"] == "floors"]
    named = {word.strip("()") for layer in floors["layers"] for word in layer.split(" | ")}
    entries = (TREE / "safeamp").iterdir()
    rooms = {path.stem for path in entries if path.suffix == ".py" or (path / "__init__.py").is_file()}
    assert rooms - named <= {"__init__", "__main__", "_version"}
    assert complaints.__name__.partition(".")[2] in named
