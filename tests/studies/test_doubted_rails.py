"""Rails that no sound supply has: whatever is computed from them is unverified, and a stop stays a stop."""

import pytest

from safeamp.findings import Step, Verdict
from tests.scenarios.sheets import finding, report

UNVERIFIED, STOP = Verdict.UNVERIFIED, Verdict.STOP
SAG = "of its rail without load"


def held(answer, words):
    """Return the ids of the findings that say some words."""
    return {one.id for one in answer.findings if any(words in text for text in one.because)}


@pytest.mark.parametrize("volts", ["6 V", "12 V", "13.1 V"])
def test_a_rail_that_falls_by_nearly_half_lets_nothing_computed_from_it_pass(volts):
    # 0.6 of 22 V is 13.2 V: so deep a fall makes power, heat and stress look small.
    answer = report("healthy", {"supply.full_load": f"{volts}, measured"})
    found = held(answer, SAG)
    assert {"heat.junction", "heat.heatsink", "soa.resistive_load", "soa.loudspeaker"} <= found
    assert {"loudspeaker.power", "bias.runaway", "touch.voltage", "touch.temperature"} <= found
    for one in answer.findings:
        assert one.id not in found or one.verdict >= UNVERIFIED, one.id
    assert answer.verdict >= UNVERIFIED


def test_a_finding_that_never_reads_the_loaded_rail_keeps_its_word():
    answer = report("healthy", {"supply.full_load": "6 V, measured"})
    found = held(answer, SAG)
    for one in report("healthy").findings:
        if one.id not in found:
            assert finding(answer, one.id).verdict is one.verdict, one.id
    assert {"cold.devices", "supply.rail_to_rail", "power_up.rails", "offset.output"}.isdisjoint(found)


def test_a_rail_at_the_edge_is_believed():
    assert held(report("healthy", {"supply.full_load": "13.2 V, measured"}), SAG) == set()


def test_each_loaded_rail_is_held_against_its_own():
    rails = {"supply.no_load": ["22 V, measured", "21 V, measured"]}
    sound = {"supply.full_load": ["13.4 V, measured", "12.7 V, measured"]}
    assert held(report("healthy", rails | sound), SAG) == set()
    deep = {"supply.full_load": ["13.4 V, measured", "12.5 V, measured"]}
    assert held(report("healthy", rails | deep), SAG)


def test_a_supply_that_holds_its_rails_is_not_held_against_a_loaded_one():
    change = {"supply.source": "regulated", "supply.full_load": "6 V, measured"}
    assert held(report("healthy", change), SAG) == set()


LOADED = {"supply.full_load": "17 V, measured"}
APART = "apart: beyond the stop level of power_up.rails"


def test_rails_further_apart_than_power_up_allows_let_nothing_computed_from_them_pass():
    # 22 and 18.9 V differ by 3.1 V, 15.2 % of their mean; a broken rectifier reads so and is no stop of its own.
    answer = report("healthy", {"supply.no_load": ["22 V, measured", "18.9 V, measured"], **LOADED})
    found = held(answer, APART)
    assert {"supply.rail_to_rail", "supply.reservoir_voltage", "touch.rails"} <= found
    assert {"heat.junction", "soa.resistive_load", "soa.loudspeaker", "loudspeaker.dc_fault"} <= found
    for one in answer.findings:
        assert one.id not in found or one.verdict >= UNVERIFIED, one.id
    assert next(step for step in answer.steps if not step.verdict.clears).step is Step.COLD_CHECKS


def test_loaded_rails_further_apart_are_doubted_alone():
    answer = report("healthy", {"supply.full_load": ["20 V, measured", "17.1 V, measured"]})
    found = held(answer, APART)
    assert {"heat.junction", "soa.loudspeaker"} <= found
    assert "supply.rail_to_rail" not in found
    sound = {one.id: one.verdict for one in report("healthy").findings}
    for one in answer.findings:
        assert one.verdict is (UNVERIFIED if one.id in found else sound[one.id]), one.id


@pytest.mark.parametrize("key", ["supply.no_load", "supply.full_load"])
def test_rails_at_the_level_are_believed(key):
    # 20 V and 17.213 V: 2.787 V of 18.607 V is 14.98 %.
    change = {key: ["20 V, measured", "17.213 V, measured"]}
    assert held(report("healthy", LOADED | change), APART) == set()


def test_what_stops_by_its_number_is_stopped_all_the_same():
    change = {"supply.no_load": ["40 V, measured", "22 V, measured"]}
    answer = report("healthy", change)
    assert finding(answer, "supply.reservoir_voltage").verdict is STOP
    assert "supply.reservoir_voltage" in held(answer, APART)
