"""The command that holds another device against the fitted one."""

import csv
import io
import json
from pathlib import Path

import pytest

from tests.cli.test_commands import HEALTHY, run
from tests.cli.test_processes import imported_by

SPLIT_RAIL = Path(__file__).parents[1] / "scenarios" / "split_rail.toml"
WEAK = """
[device.weak]
kind = "bipolar"
voltage = "170 V, data sheet"
current = "16 A, data sheet"
power = "160 W, data sheet"
junction_limit = "150 degC, data sheet"
junction_to_case = "0.78 K/W, data sheet"
safe_area = [["25 V", "6.4 A"], ["50 V", "0.9 A"], ["170 V", "0.05 A"]]
"""


@pytest.fixture
def sheet(tmp_path):
    path = tmp_path / "amp.toml"
    path.write_text(SPLIT_RAIL.read_text(encoding="utf-8") + WEAK, encoding="utf-8")
    return path


def test_the_exit_status_is_that_of_check(sheet):
    result = run("substitute", sheet, "weak", "--format", "json")
    found = json.loads(result.stdout)
    assert found["verdict"] == "stop"
    assert result.exit_code == 5
    stop = [one for one in found["findings"] if one["other"]["verdict"] == "stop"]
    assert {one["id"] for one in stop} >= {"soa.loudspeaker"}
    changed = sheet.with_name("changed.toml")
    written = sheet.read_text(encoding="utf-8").replace('er = "fitted"', 'er = "weak"')
    changed.write_text(written, encoding="utf-8")
    checked = json.loads(run("check", changed, "--format", "json").stdout)
    words = {one["id"]: one["verdict"] for one in checked["findings"]}
    assert all(words[one["id"]] == one["other"]["verdict"] for one in found["findings"])


def test_the_text_says_where_it_is_weaker_what_for_and_what_is_not_computed(sheet):
    result = run("substitute", sheet, "weak")
    text = " ".join(result.stdout.split())
    assert "STOP for voltage, temperature and safe area of the output devices on these load lines" in text
    assert (
        "although none of its ratings is smaller, it allows less current than the fitted device from 2"
        in text
    )
    for doubt in ("speed:", "gain:", "genuineness:", "polarity"):
        assert f"- {doubt}" in text
    assert "equivalent" not in text.lower()
    assert "is not used" not in text
    assert max(map(len, result.stdout.splitlines())) <= 80
    assert result.stdout.count("Ratings, both sides") == 1


def test_one_side_stands_alone(sheet):
    text = run("substitute", sheet, "weak", "--side", "lower").stdout
    assert "Ratings, lower side" in text
    assert "Lower device into 8 ohm at up to 45 deg" in text
    assert "Upper device" not in text


def test_csv_holds_every_volt_of_every_load_line(sheet, tmp_path):
    output = tmp_path / "lines.csv"
    assert run("substitute", sheet, "weak", "--format", "csv", "--output", output).stdout == ""
    rows = list(csv.DictReader(io.StringIO(output.read_text(encoding="utf-8"))))
    assert len(rows) == 2 * 170
    assert rows[29]["voltage"] == "30.0"
    assert rows[29]["other allows less"] == "True"
    assert rows[169]["other asked"] == ""


def test_a_generic_device_is_never_go():
    result = run("substitute", HEALTHY, "to3-npn-140v-150w")
    assert result.exit_code in (4, 5)


@pytest.mark.parametrize(
    ("words", "message"),
    [
        (("fitted",), "safeamp: fitted is what is fitted; name another device"),
        (("weka",), '"weka" is not a known device; did you mean weak?'),
        (("weak", "--side", "left"), "Invalid value for '--side'"),
    ],
)
def test_wrong_words_end_with_two(sheet, words, message):
    result = run("substitute", sheet, *words)
    assert result.exit_code == 2
    assert message in " ".join(result.stderr.split())
    assert "Traceback" not in result.stderr


def test_an_unknown_device_is_a_wrong_word_and_no_problem_of_the_sheet(sheet):
    result = run("substitute", sheet, "weka")
    assert result.stderr.startswith('safeamp: "weka" is not a known device')
    assert "line " not in result.stderr


def test_what_is_wrong_in_the_sheet_stands_on_its_line(tmp_path):
    broken = tmp_path / "amp.toml"
    broken.write_text(HEALTHY.read_text(encoding="utf-8").replace("no_load", "noload"), encoding="utf-8")
    result = run("substitute", broken, "to3-npn-140v-150w")
    assert result.exit_code == 2
    assert result.stderr.startswith(f"{broken}: ")


def test_the_folder_of_devices_is_searched(tmp_path):
    (tmp_path / "mine.toml").write_text(WEAK, encoding="utf-8")
    result = run("substitute", SPLIT_RAIL, "weak", "--device-folder", tmp_path)
    assert result.exit_code == 5


def test_nothing_heavy_is_imported(sheet):
    found = imported_by("substitute", sheet, "weak")
    assert found.isdisjoint(
        {"pandas", "matplotlib", "rich", "scipy.special", "scipy.stats", "scipy.optimize"}
    )
