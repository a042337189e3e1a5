"""The command that says how likely each verdict is."""

import csv
import io
import json
from pathlib import Path

import pytest

from tests.cli.test_commands import HEALTHY, run
from tests.cli.test_processes import imported_by

BENCH = Path(__file__).parents[1] / "bench" / "twelve.toml"


def chances(*words):
    return json.loads(run("tolerance", BENCH, "--samples", 500, "--format", "json", *words).stdout)


def test_the_text_says_how_it_was_drawn_and_that_it_clears_nothing():
    result = run("tolerance", BENCH, "--samples", 500, "--seed", 7)
    assert result.exit_code == 0
    text = " ".join(result.stdout.split())
    assert "500 samples inside the tolerances, seed 7; uniform:" in text
    assert "A chance clears nothing" in text
    assert "Clopper-Pearson, 95 %" in text
    assert "Measure next - " in text
    assert "mains, from today's reading up to the highest: 230 V to 253 V" in text
    assert max(map(len, result.stdout.splitlines())) <= 80


def test_seed_and_distribution_reach_the_samples():
    one = chances("--seed", 3)
    assert chances("--seed", 3) == one
    assert one["seed"] == 3
    assert chances("--seed", 4)["findings"] != one["findings"]
    normal = chances("--seed", 3, "--distribution", "normal")
    assert normal["distribution"].startswith("normal: ")
    assert "2 standard deviations" in normal["distribution"]
    assert normal["findings"] != one["findings"]


def test_json_and_csv_hold_the_same_chances(tmp_path):
    found = chances()
    assert found["clears"] is False
    output = tmp_path / "chances.csv"
    assert run("tolerance", BENCH, "--samples", 500, "--format", "csv", "--output", output).stdout == ""
    rows = list(csv.DictReader(io.StringIO(output.read_text(encoding="utf-8"))))
    assert [row["id"] for row in rows] == [one["id"] for one in found["findings"]]
    for row, one in zip(rows, found["findings"], strict=True):
        assert float(row["stop"]) == one["words"]["stop"]["share"]
        assert row["unit"] == one["unit"]


@pytest.mark.parametrize(
    ("words", "message"),
    [
        (("--samples", 99), "Invalid value for '--samples'"),
        (("--seed", -1), "Invalid value for '--seed'"),
        (("--distribution", "gaussian"), "Invalid value for '--distribution'"),
        (("--output", BENCH), "is a file that is read"),
    ],
)
def test_wrong_options_end_with_two(words, message):
    result = run("tolerance", BENCH, *words)
    assert result.exit_code == 2
    assert message in " ".join(result.stderr.replace("│", " ").split())
    assert result.stdout == ""


def test_more_samples_than_a_machine_holds_are_refused_in_one_line():
    result = run("tolerance", BENCH, "--samples", 10_000_001)
    assert result.exit_code == 2
    assert result.stderr == "safeamp: --samples 10000001: at most 10000000\n"
    assert result.stdout == ""


def test_what_to_measure_next_is_one_line():
    text = run("tolerance", BENCH, "--samples", 500).stdout
    first = chances()["measure_next"][0]["key"]
    [line] = [line for line in text.splitlines() if line.startswith("measure next: ")]
    assert line == f"measure next: {first.removesuffix('.0')}"


def test_a_broken_sheet_is_complained_of(tmp_path):
    broken = tmp_path / "broken.toml"
    broken.write_text(HEALTHY.read_text(encoding="utf-8").replace('"22 V', '"22', 1), encoding="utf-8")
    result = run("tolerance", broken)
    assert result.exit_code == 2
    assert "broken.toml: 1 problem" in result.stderr
    assert "Traceback" not in result.stderr


def test_chances_import_neither_tables_nor_figures():
    found = imported_by("tolerance", BENCH, "--samples", 100)
    assert found.isdisjoint({"pandas", "matplotlib", "rich", "scipy.stats"})


def test_help_of_the_command_imports_no_numbers():
    assert imported_by("tolerance", "--help").isdisjoint({"numpy", "scipy", "pandas", "rich"})
