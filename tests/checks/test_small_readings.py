"""Readings so small that the meter's own error rules: a ratio of them stops no healthy amplifier."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import finding, report

UPPER, LOWER = "readings.idle_upper", "readings.idle_lower"
COLD, WARM = "readings.idle_cold", "stage.idle"


@pytest.mark.parametrize(
    ("upper", "lower", "word"),
    [
        ("0.4 mV, measured", "0.7 mV, measured", Verdict.CAUTION),
        ("1.9 mV, measured", "2.9 mV, measured", Verdict.CAUTION),
        ("2.0 mV, measured", "3.1 mV, measured", Verdict.STOP),  # one side can be read
        ("2.8 mV, measured", "2.9 mV, measured", Verdict.GO),
    ],
)
def test_two_sides_that_hardly_conduct_are_at_most_a_caution_apart(upper, lower, word):
    changes = {UPPER: [upper], LOWER: [lower]}
    assert finding(report("healthy", changes), "bias.balance").verdict is word


@pytest.mark.parametrize(
    ("cold", "warm", "word"),
    [
        ("1 mV, measured", "2.9 mV, measured", Verdict.CAUTION),
        ("1 mV, measured", "3.1 mV, measured", Verdict.STOP),  # it can be read, and it has trebled
        ("0.1 mV, measured", "14 mV, measured", Verdict.STOP),
        ("2 mV, measured", "2.4 mV, measured", Verdict.GO),
    ],
)
def test_an_idle_current_that_stays_small_has_not_run_away(cold, warm, word):
    changes = {COLD: cold, WARM: warm, UPPER: [warm], LOWER: [warm]}
    assert finding(report("healthy", changes), "bias.drift").verdict is word


@pytest.mark.parametrize(
    ("read", "level", "word"),
    [
        ("39.9 degC, measured", "idle", Verdict.CAUTION),
        ("40.1 degC, measured", "idle", Verdict.STOP),
        ("60 degC, measured", "one third", Verdict.STOP),
    ],
)
def test_a_heatsink_hardly_warmer_than_its_air_is_at_most_a_caution(read, level, word):
    changes = {"readings.heatsink_level": level, "readings.heatsink_temperature": read}
    found = finding(
        report("healthy", {**changes, "readings.heatsink_air": "35 degC, measured"}), "heat.reading"
    )
    assert found.verdict is word


HOT = {"readings.heatsink_level": "one third"}


@pytest.mark.parametrize(
    ("read", "beside", "word"),
    [
        ("44 degC, measured", "35 degC, measured", Verdict.GO),
        (
            "72 degC, measured",
            "63 degC, measured",
            Verdict.UNVERIFIED,
        ),  # and the air is not that of the sheet
        ("54 degC, measured", "45 degC, measured", Verdict.GO),
        ("55 degC, measured", "46 degC, measured", Verdict.UNVERIFIED),
        ("105 degC, measured", "88 degC, measured", Verdict.STOP),
    ],
)
def test_a_rise_as_computed_excuses_neither_a_hot_heatsink_nor_another_air(read, beside, word):
    changes = {**HOT, "readings.heatsink_temperature": read, "readings.heatsink_air": beside}
    found = finding(report("healthy", {**changes, "heatsink.air": "35 degC, measured"}), "heat.reading")
    assert found.verdict is word
    said = any("heatsink.air" in one for one in found.because)
    assert said is (word is not Verdict.GO)


@pytest.mark.parametrize(
    ("sink", "air", "word"), [(69, 60, Verdict.GO), (71, 62, Verdict.CAUTION), (101, 90, Verdict.STOP)]
)
def test_a_read_heatsink_is_held_against_the_limit_of_a_heatsink(sink, air, word):
    beside = f"{air} degC, measured"
    changes = {
        **HOT, "readings.heatsink_temperature": f"{sink} degC, measured", "readings.heatsink_air": beside,
        "heatsink.air": beside,
    }  # fmt: skip
    assert finding(report("healthy", changes), "heat.reading").verdict is word
