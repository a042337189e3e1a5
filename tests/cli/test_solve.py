"""The command that solves for one key."""

import json
import subprocess
import sys
from pathlib import Path

import pytest
from typer.testing import CliRunner

from safeamp.cli.app import app

SHEET = Path(__file__).parents[1] / "scenarios" / "split_rail.toml"


def run(*words):
    result = CliRunner().invoke(app, ["solve", str(SHEET), *map(str, words)])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    return result


def test_an_answer_ends_with_zero():
    result = run("supply.reservoir_rated_voltage")
    assert result.exit_code == 0
    assert "supply.reservoir_rated_voltage: at least 41.56 V" in result.stdout
    assert "next preferred value: 50 V" in result.stdout
    assert max(map(len, result.stdout.splitlines())) <= 80


def test_no_value_is_an_answer_too():
    result = run("stage.idle", "--finding", "heat.reading", "--finding", "bias.idle")
    assert result.exit_code == 0
    assert "stage.idle: no value will do" in result.stdout
    assert "heat.reading is never go" in result.stdout


def test_a_key_that_nothing_reads_is_an_answer_too():
    result = run("output_capacitor.esr")
    assert (result.exit_code, "no finding reads it" in result.stdout) == (0, True)


# Derived: a rail is 1.1 times higher at 253 V than at 230 V; stop above 1.1 times the 50 V that are marked: 50 V.
def test_options_reach_the_answer():
    words = ("--finding", "supply.reservoir_voltage", "--until", "caution", "--on-paper", "--format", "json")
    found = json.loads(run("supply.no_load", *words).stdout)
    assert (found["until"], found["on_paper"], found["findings"]) == (
        "caution",
        True,
        ["supply.reservoir_voltage"],
    )
    assert found["results"]["largest"] == {"value": pytest.approx(50.0, rel=1e-3), "unit": "V"}


def test_limits_of_the_user_count(tmp_path):
    own = tmp_path / "own.toml"
    own.write_text('["offset.output"]\ngo = "30 mV"\nsource = "house rule"\n', encoding="utf-8")
    found = json.loads(
        run("readings.offset_warm", "--finding", "offset.output", "--format", "json", "--limits", own).stdout
    )
    # The cold reading of 34 mV is above that already.
    assert found["outcome"] == "none"


@pytest.mark.parametrize(
    ("words", "text"),
    [
        (["supply.no_lod"], "supply.no_lod is not a key of this sheet; did you mean supply.no_load"),
        (["supply.rails"], "supply.rails holds a word, not a number that can be moved"),
        (
            ["supply.no_load", "--finding", "offset.outptu"],
            "--finding offset.outptu is not a finding; did you mean",
        ),
        (
            ["readings.offset_warm", "--on-paper", "--finding", "offset.output"],
            "--finding offset.output is read at the bench, which --on-paper leaves out",
        ),
        (
            ["supply.no_load", "--finding", "capacitor.cutoff"],
            'safeamp: capacitor.cutoff does not apply: stage.coupling is "direct"',
        ),
        (
            ["readings.offset_warm", "--finding", "supply.reservoir_voltage"],
            "safeamp: supply.reservoir_voltage does not read readings.offset_warm\n",
        ),
        (
            ["heatsink.fins.width"],
            "safeamp: heatsink.fins.width alone is refused: write heatsink.fins.height, heatsink.fins.depth, heat",
        ),
        (["stage.clipped_peak"], "clipped_peak and swing_loss say the same thing twice"),
        (["supply.no_load", "--output", SHEET], "is a file that is read"),
    ],
)
def test_a_wrong_question_is_one_clear_line(words, text):
    result = run(*words)
    assert result.exit_code == 2
    assert text in result.stderr
    assert not result.stdout
    assert "Traceback" not in result.stderr


def test_a_sheet_that_cannot_be_read_ends_with_two(tmp_path):
    result = CliRunner().invoke(app, ["solve", str(tmp_path / "none.toml"), "supply.no_load"])
    assert result.exit_code == 2
    assert "cannot be read" in result.stderr


def test_the_answer_goes_whole_into_a_file(tmp_path):
    target = tmp_path / "answer.txt"
    assert run("readings.offset_warm", "--output", target).exit_code == 0
    assert "readings.offset_warm: from 14 mV to 50 mV" in target.read_text(encoding="utf-8")


def test_no_heavy_library_is_imported():
    code = (
        "import sys; from typer.testing import CliRunner; from safeamp.cli.app import app; "
        f"found = CliRunner().invoke(app, ['solve', {str(SHEET)!r}, 'readings.offset_warm']); "
        "print(found.exit_code, sorted({'scipy', 'pandas', 'matplotlib'} & set(sys.modules)))"
    )
    found = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert found.stdout.strip() == "0 []"
