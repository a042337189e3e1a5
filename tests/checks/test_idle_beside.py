"""What stands beside the idle current: the optimum and the dead zone of junctions, which no other stage has."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, finding, report

OPTIMUM = "Oliver's optimum for this resistor"


def idle(name, changes=None):
    return finding(report(name, changes), "bias.idle")


def shown(one):
    return {also.at: also.value for also in one.also}


def test_the_optimum_of_a_bipolar_pair_is_the_thermal_voltage_over_the_resistor():
    # kT/q at 25 degC is 25.7 mV; over 0.33 ohm that is 78 mA
    found = shown(idle("split_rail"))[OPTIMUM]
    assert found == pytest.approx(1.380649e-23 * 298.15 / 1.602176634e-19 / 0.33, rel=0.02)


@pytest.mark.parametrize("name", ["mosfet_substitute", "100w_lateral_mosfet", "class_a"])
def test_a_stage_without_a_crossover_of_junctions_has_no_such_optimum(name):
    assert OPTIMUM not in shown(idle(name))


@pytest.mark.parametrize(("reading", "dead"), [("7.99 mV", True), ("8 mV", False), ("8.01 mV", False)])
def test_a_bipolar_stage_below_eight_millivolts_has_a_dead_zone(reading, dead):
    read = {"readings": {"idle_upper": [reading], "idle_lower": [reading]}, "stage.idle": GONE}
    one = idle("split_rail", read)
    assert ("dead zone" in one.says) is dead
    assert one.verdict is Verdict.GO


def test_a_mosfet_is_not_said_to_have_a_dead_zone():
    read = {"readings": {"idle_upper": ["5 mV"], "idle_lower": ["5 mV"]}}
    one = idle("mosfet_substitute", read)
    assert "dead zone" not in one.says
    assert one.verdict is Verdict.CAUTION


@pytest.mark.parametrize(
    ("stated", "word"),
    [("14 mV, measured", Verdict.GO), ("32 mV, measured", Verdict.STOP), ("32 mV", Verdict.GO)],
)
def test_of_readings_and_a_measured_idle_current_the_larger_is_judged(stated, word):
    """Heat and safe area take the larger; what nobody measured is judged by the readings."""
    read = {"readings.idle_upper": ["15 mV, measured"], "readings.idle_lower": ["15 mV, measured"]}
    one = idle("healthy", read | {"stage.idle": stated, "stage.idle_specified": "15 mV, manual"})
    assert one.verdict is word
    assert one.nominal == pytest.approx(0.032 if word is Verdict.STOP else 0.015)


def test_an_idle_current_that_was_set_cold_is_no_warm_reading():
    read = {"readings.idle_upper": ["13 mV, measured"], "readings.idle_lower": ["13 mV, measured"]}
    changes = read | {"stage.idle": "25 mV, measured", "readings.idle_cold": "12.5 mV, measured"}
    warm = finding(report("healthy", changes), "bias.drift")
    assert warm.nominal == pytest.approx(2.0)
    cold = finding(report("healthy", changes | {"stage.idle_at": "cold"}), "bias.drift")
    assert cold.nominal == pytest.approx(13.0 / 12.5)
