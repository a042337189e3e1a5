"""Rails that no sound supply has: whatever is computed from them is unverified, and a stop stays a stop."""

import pytest

from safeamp.findings import Verdict
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
