"""The quick answer about an output capacitor: printed values, sizing, words, refusals."""

import math
import tomllib
from pathlib import Path

import pytest

from tests.cli.quick_line import answer, refusal, run, value
from tests.published_cases import printed

SIZING = tomllib.loads(
    (Path(__file__).parents[1] / "scenarios" / "single_rail.expected.toml").read_text(encoding="utf-8")
)["sizing"]


@pytest.mark.parametrize(
    ("load", "tolerance", "expected"),
    [
        ("8 ohm", "0 %", SIZING["exact_20Hz_8ohm_uF"]),
        ("6.4 ohm", "20 %", SIZING["exact_20Hz_6ohm4_minus20_uF"]),
        ("4 ohm", "20 %", SIZING["exact_20Hz_4ohm_minus20_uF"]),
    ],
)
def test_sizing_of_the_single_rail_amplifier(load, tolerance, expected):
    found = value("capacitor", "capacitance_exact", cutoff="20 Hz", load=load, tolerance=tolerance)
    assert found * 1e6 == pytest.approx(expected, abs=0.5)


def test_the_trap_of_buying_what_the_formula_says():
    found = answer("capacitor", cutoff="20 Hz", load="6.4 ohm", single_rail="64 V")["results"]
    assert found["capacitance_preferred"] == {"value": 2.2e-3, "unit": "F"}
    assert found["cutoff_worst"]["value"] == pytest.approx(SIZING["cutoff_2200uF_minus20_6ohm4_Hz"], abs=0.05)
    assert found["rated_voltage"] == {"value": SIZING["rating_at_least_V"], "unit": "V"}


def test_printed_cutoffs():
    assert value("capacitor", "cutoff", capacitance="7 uF", load="500 ohm") == printed(
        "capacitor-2", "cutoff"
    )
    assert value("capacitor", "cutoff", capacitance="470 uF", load="8 ohm") == printed(
        "capacitor-3", "cutoff"
    )
    exact = [
        value("capacitor", "capacitance_without_tolerance", cutoff="20 Hz", load=load)
        for load in ("8 ohm", "4 ohm")
    ]
    assert exact == printed("capacitor-4", "capacitance")


def test_printed_ripple():
    assert value("capacitor", "ripple", power="8 W", load="8 ohm") == printed("capacitor-6", "ripple_rms")


def test_ripple_at_one_third_is_that_of_a_third_of_the_power():
    found = answer("capacitor", power="36.4 W", load="8 ohm")["results"]
    assert found["ripple"]["value"] == pytest.approx(2.13, abs=0.005)
    assert found["ripple_one_third"]["value"] == pytest.approx(1.23, abs=0.005)


def test_load_is_solved_for_when_it_is_left_out():
    # Derived: 1/(2 pi f C), worst at C less 20 %.
    found = answer("capacitor", cutoff="20 Hz", capacitance="1000 uF")["results"]
    assert found["load"]["value"] == pytest.approx(1 / (2 * math.pi * 20 * 1e-3))
    assert found["load_worst"]["value"] == pytest.approx(1 / (2 * math.pi * 20 * 0.8e-3))


@pytest.mark.parametrize(
    ("capacitance", "word", "status"),
    [
        ("1400 uF, measured", "go", 0),
        ("1200 uF, measured", "caution", 3),
        ("1400 uF", "caution", 3),
        ("1600 uF", "go", 0),
    ],
)
def test_cutoff_is_judged_at_the_low_end_against_the_target(capacitance, word, status):
    # 20 Hz into 6.4 ohm takes 1243 uF: the low end of 1400 uF without a word is 1120 uF.
    found = answer("capacitor", cutoff="20 Hz", load="6.4 ohm", capacitance=capacitance)
    assert (found["verdict"], found["status"]) == (word, status)


def test_nothing_to_judge_is_no_verdict():
    found = answer("capacitor", capacitance="2200 uF", load="8 ohm")
    assert (found["verdict"], found["status"]) == (None, 0)
    assert "Verdict" not in run("capacitor", capacitance="2200 uF", load="8 ohm").stdout


def test_no_rating_stands_every_rail():
    found = answer("capacitor", single_rail="150 V")["results"]
    assert found["rated_voltage"]["value"] is None
    assert value("capacitor", "rated_voltage", single_rail="150 V", highest="1") == 160.0


@pytest.mark.parametrize("tolerance", ["20 %", "±20 %", "-20 %", "+/-20 %", "-20/+50 %"])
def test_the_low_end_of_a_tolerance_may_be_written_in_any_way(tolerance):
    found = value("capacitor", "capacitance_exact", cutoff="20 Hz", load="8 ohm", tolerance=tolerance)
    assert found * 1e6 == pytest.approx(1243.4, abs=0.05)


@pytest.mark.parametrize(
    ("options", "says"),
    [
        (
            {},
            "capacitor: too little is given; add --cutoff and --load, or --capacitance and --load, or --single-rail",
        ),
        ({"load": "8 ohm"}, "too little is given; add --cutoff and --load"),
        ({"cutoff": "20 Hz"}, "too little is given; add --load, or --capacitance"),
        ({"capacitance": "2200 uF"}, "too little is given; add --load, or --cutoff"),
        ({"power": "8 W"}, "too little is given; add --load"),
        (
            {"power": "8 W", "load": "8 ohm", "highest": "1.1"},
            "--highest says nothing alone; add --single-rail",
        ),
        (
            {"capacitance": "2200 uF ±10 %", "load": "8 ohm", "tolerance": "20 %"},
            "the tolerance is given twice; leave out --tolerance",
        ),
        ({"cutoff": "20", "load": "8 ohm"}, "--cutoff: "),
        ({"cutoff": "20 Hz", "load": "4,7 ohm"}, "--load: "),
        ({"cutoff": "20 Hz", "load": "8 mF"}, "--load: "),
    ],
)
def test_capacitor_says_what_to_add(options, says):
    said = refusal("capacitor", **options)
    assert says in said


def test_every_wrong_option_is_named_at_once():
    said = refusal("capacitor", cutoff="20", load="8")
    assert "capacitor: 2 problems" in said
    assert "--cutoff:" in said
    assert "--load:" in said
