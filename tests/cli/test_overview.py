"""The command that shows a folder."""

import csv
import io
import json
import shutil
from pathlib import Path

import pytest
from typer.testing import CliRunner

from safeamp.cli.app import app

SCENARIOS = Path(__file__).parents[1] / "scenarios"


def run(*words):
    result = CliRunner().invoke(app, ["overview", *map(str, words)])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    return result


@pytest.fixture
def folder(tmp_path):
    for name in ("healthy", "split_rail"):
        shutil.copy(SCENARIOS / f"{name}.toml", tmp_path)
    (tmp_path / "notes.txt").write_text("no sheet", encoding="utf-8")
    (tmp_path / "folder.toml").mkdir()
    return tmp_path


def broken(folder):
    (folder / "broken.toml").write_text('title = "x"\n[supply]\nno_lod = "34 V"\n', encoding="utf-8")


def test_the_worst_word_is_the_exit_status(folder):
    result = run(folder)
    assert result.exit_code == 3
    assert "2 sheets: 1 caution, 1 go" in result.stdout
    assert "folder.toml" not in result.stdout


def test_a_broken_sheet_is_a_row_and_ends_with_two(folder):
    broken(folder)
    result = run(folder)
    assert result.exit_code == 2
    assert "broken.toml" in result.stdout
    assert "line 3 supply.no_lod: not a known key; did you mean no_load?" in result.stdout
    assert "1 caution, 1 go, 1 not read" in result.stdout


def test_a_stop_ends_with_five_even_beside_a_broken_sheet(folder):
    broken(folder)
    shutil.copy(SCENARIOS / "old_mains.toml", folder)
    assert run(folder).exit_code == 5


def test_every_form_has_every_sheet(folder):
    assert [row[0] for row in csv.reader(io.StringIO(run(folder, "--format", "csv").stdout))][1:] == [
        "healthy.toml",
        "split_rail.toml",
    ]
    sheets = json.loads(run(folder, "--format", "json").stdout)["sheets"]
    assert [row["file"] for row in sheets] == ["healthy.toml", "split_rail.toml"]
    assert "| split\\_rail.toml |" in run(folder, "--format", "markdown").stdout


def test_on_paper(folder):
    assert "On paper: clears no power." in run(folder, "--on-paper").stdout


@pytest.mark.parametrize(
    ("inside", "text"),
    [("notes.txt", "is not a folder"), ("missing", "is not a folder"), ("folder.toml", "holds no sheet")],
)
def test_without_sheets_nothing_is_judged(folder, inside, text):
    result = run(folder / inside)
    assert result.exit_code == 2
    assert text in result.stderr


def test_a_sheet_is_never_written_over(folder):
    before = (folder / "healthy.toml").read_bytes()
    result = run(folder, "--output", folder / "healthy.toml")
    assert (result.exit_code, "is a file that is read" in result.stderr) == (2, True)
    assert (folder / "healthy.toml").read_bytes() == before
    assert run(folder, "--output", folder / "table.md", "--format", "markdown").exit_code == 3
    assert "| file |" in (folder / "table.md").read_text(encoding="utf-8")
