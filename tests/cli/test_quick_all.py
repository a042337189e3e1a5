"""What holds for every quick answer: text, JSON, status, imports, own limits."""

import pytest

from safeamp.report.safety import SAFETY
from tests.cli.quick_line import answer, run, words
from tests.cli.test_processes import heavy, imported_by

FINS = {"fins": "120x180x24 mm", "thickness": "1 mm", "count": "14"}
LINE = {"load": "8 ohm", "emitter_resistor": "0.22 ohm", "case_temperature": "60 degC", "idle": "50 mA"}

EACH = {
    "capacitor": {"cutoff": "20 Hz", "load": "6.4 ohm", "single_rail": "64 V", "power": "36 W"},
    "soa": {
        "split_rail": "35 V",
        "load": "8 ohm",
        "case_temperature": "60 degC",
        "device": "to3-npn-140v-150w",
    },
    "heatsink": {
        **FINS,
        "air": "35 degC",
        "power": "20 W",
        "case_to_sink": "0.5 K/W",
        "junction_to_case": "1 K/W",
    },
    "offset": {
        "reading": "-32 mV",
        "dc_resistance": "6 ohm",
        "force_factor": "7.5 N/A",
        "compliance": "1.2 mm/N",
    },
    "loudspeaker": {
        "split_rail": "35 V",
        "load": "8 ohm",
        "dc_resistance": "6 ohm",
        "rated_power": "60 W",
        "fuse": "F 2 A",
    },
}


@pytest.mark.parametrize("command", EACH)
def test_text_says_formula_numbers_verdict_and_caution(command):
    result = run(command, **EACH[command])
    heads = ["Put in", "Results", "Formulas", "Verdict", "Caution", "Safety"]
    lines = result.stdout.splitlines()
    assert [line for line in lines if line in heads] == heads
    assert max(map(len, lines)) <= 80
    assert "Mains kills." in result.stdout
    found = answer(command, **EACH[command])
    assert f"  {found['verdict'].upper()} for {found['holds_for'][:20]}" in result.stdout
    assert result.exit_code == found["status"]


@pytest.mark.parametrize("command", EACH)
def test_json_has_results_with_units_verdict_and_safety(command):
    found = answer(command, **EACH[command])
    assert found["command"] == command
    assert all(set(item) >= {"value", "unit"} for item in found["results"].values())
    assert found["verdict"] in ("go", "caution", "unverified", "stop")
    assert found["safety"] == list(SAFETY)
    assert found["formulas"]
    assert found["cautions"]


@pytest.mark.parametrize("command", EACH)
def test_quick_answers_import_nothing_that_they_do_not_use(command):
    assert heavy(imported_by(command, *words(EACH[command]))) == set()


def test_own_limits_rule_and_are_named(tmp_path):
    own = tmp_path / "own.toml"
    own.write_text('[offset.output]\ngo = "20 mV"\nsource = "my own"\n', encoding="utf-8")
    found = answer("offset", reading="30 mV", limits=str(own))
    assert found["verdict"] == "caution"
    assert "changed by your limits file: my own" in " ".join(
        run("offset", reading="30 mV", limits=str(own)).stdout.split()
    )


def test_every_tolerance_is_a_corner():
    wide = {name: f"{text} ±1 %" for name, text in LINE.items() if name != "case_temperature"}
    found = answer(
        "soa", split_rail="20 V ±1 %", case_temperature="60 degC ±2 K", device="to3-npn-140v-150w", **wide
    )
    assert found["results"]["use"]["high"] > found["results"]["use"]["value"]
