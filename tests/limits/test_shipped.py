"""Every limit is there, with the level that was agreed, a source and a sentence."""

import pytest

from safeamp.limits import EVIDENCE, NOT_GIVEN, SENSES
from safeamp.reading.data import limits_folder
from safeamp.reading.document import read_document
from safeamp.reading.limits import TABLE_FILES, load_limits

# id: go, stop, sense, unit, not given; the sources stand in the data files.
AGREED = {
    "cold.devices": (1e3, 100, "at least", "ohm", "unverified"),
    "cold.insulation": (1e6, 1e5, "at least", "ohm", "unverified"),
    "supply.fuse": (1, 1, "at most", "1", "unverified"),
    "supply.rail_to_rail": (0.9, 1, "at most", "1", None),
    "supply.reservoir_voltage": (0.9, 1, "at most", "1", "caution"),
    "supply.mains": ((0.9, 1.05), 1.15, "between", "1", "unverified"),
    "touch.rails": (60, None, "at most", "V", None),
    "touch.mains": (2e6, 1e6, "at least", "ohm", "unverified"),
    "supply.transformer": (1, None, "at most", "1", None),
    "touch.mains.earth": (0.1, 0.3, "at most", "ohm", "unverified"),
    "touch.voltage": (71, 120, "at most", "V", None),
    "touch.temperature": (60, None, "at most", "degC", "caution"),
    "capacitor.wear": (0.8, 0.7, "at least", "1", "caution"),
    "capacitor.cutoff": (None, None, "at most", "Hz", None),
    "capacitor.voltage": (0.9, 1, "at most", "1", None),
    "capacitor.ripple": (0.8, None, "at most", "1", "caution"),
    "capacitor.leakage": (1, 3, "at most", "1", "unverified"),
    "power_up.draw": (1, 1, "at most", "1", "unverified"),
    "power_up.rails": (0.05, 0.15, "at most", "1", "unverified"),
    "power_up.output": (0.1, 1, "at most", "V", "unverified"),
    "power_up.output.midpoint": (0.1, 0.2, "at most", "1", "unverified"),
    "bias.idle": (0.026, None, "at most", "V", "unverified"),
    "bias.imbalance": (0.3, 0.5, "at most", "1", "caution"),
    "bias.balance": (0.1, 0.3, "at most", "1", "caution"),
    "bias.drift": (1.3, 2, "at most", "1", "caution"),
    "bias.runaway": (0.5, 1, "at most", "1", "unverified"),
    "bias.runaway.settled": (2, 3, "at most", "1", "unverified"),
    "offset.output": (0.05, 0.1, "at most", "V", "unverified"),
    "offset.drift": (0.02, 0.1, "at most", "V", "caution"),
    "offset.midpoint": (0.05, 0.1, "at most", "1", "unverified"),
    "heat.junction": (None, None, "at most", "degC", "unverified"),
    "heat.heatsink": (70, 100, "at most", "degC", "unverified"),
    "heat.reading": (1.25, 1.5, "at most", "1", "caution"),
    "soa.resistive_load": (0.8, 1, "at most", "1", "unverified"),
    "soa.loudspeaker": (0.8, 1, "at most", "1", "unverified"),
    "stability.output": (0.005, 0.05, "at most", "V", "caution"),
    "loudspeaker.label": ((0.65, 1), None, "between", "1", "caution"),
    "loudspeaker.power": (1, None, "at most", "1", "caution"),
    "loudspeaker.dc_fault": (None, None, "at most", "W", "caution"),
    "loudspeaker.dc_fault.trip_voltage": (3, None, "at most", "V", "caution"),
    "protection.short": (1, None, "at most", "1", "caution"),
}
EXTRA = {
    ("supply.fuse", "caution_above_times_mean_current"): 4,
    ("supply.rail_to_rail", "drivers_not_given_caution_above"): 60,
    ("supply.reservoir_voltage", "stop_at_highest"): 1.1,
    ("capacitor.voltage", "whole_rail_caution_above"): 1,
    ("capacitor.leakage", "leakage_per_charge"): 0.01,
    ("capacitor.leakage", "falling_share_of_midpoint"): 0.1,
    ("capacitor.leakage", "falling_times_usual"): 300.0,
    ("power_up.draw", "dark"): 0,
    ("power_up.draw", "dim"): 1,
    ("power_up.draw", "bright"): 2,
    ("power_up.draw", "rising"): 3,
    ("power_up.draw", "fault_power_caution_above"): 75,
    ("power_up.rails", "nothing_below"): 0.1,
    ("power_up.rails", "contradicts_above"): 1.1,
    ("bias.idle", "class_ab_share_of_peak"): 0.1,
    ("bias.idle", "dead_zone_below"): 0.008,
    ("bias.idle", "go_times_specified"): 1.3,
    ("bias.idle", "stop_times_specified"): 2,
    ("bias.imbalance", "small_reading_below"): 0.003,
    ("bias.balance", "small_reading_below"): 0.003,
    ("bias.drift", "small_reading_below"): 0.003,
    ("bias.runaway", "air_warmer_by"): 20,
    ("offset.output", "switch_off_above"): 1,
    ("heat.reading", "cool_below"): 0.5,
    ("heat.reading", "cool_from_computed"): 5,
    ("heat.reading", "small_rise_below"): 5,
    ("heat.reading", "air_above_stated"): 10,
    ("heat.junction", "span_from"): 25,
    ("heat.junction", "go_share_of_span"): 0.8,
    ("soa.loudspeaker", "as_built_ceiling"): 1.8,
    ("soa.loudspeaker", "as_built_mains_over_rated"): 1.05,
    ("loudspeaker.dc_fault", "contacts_caution_above"): 35,
    ("loudspeaker.dc_fault", "contacts_caution_above_at_highest"): 38.5,
    ("touch.temperature", "guard_above"): 70,
    ("touch.temperature", "room"): 25,
}


@pytest.fixture(scope="module")
def limits():
    return load_limits()


def test_no_limit_is_missing_and_none_is_unknown(limits):
    assert set(limits.entries) == set(AGREED)


@pytest.mark.parametrize("id", AGREED)
def test_levels_are_the_agreed_ones(limits, id):
    limit = limits[id]
    assert (limit.go, limit.stop, limit.sense, limit.kind.unit, limit.not_given) == AGREED[id]
    assert limit.id == id
    assert not limit.overridden


def test_further_numbers_are_the_agreed_ones(limits):
    found = {
        (limit.id, name): value for limit in limits.entries.values() for name, value in limit.extra.items()
    }
    assert found == EXTRA
    assert all(limits[id].extra_kinds[name].name for id, name in EXTRA)


@pytest.mark.parametrize("id", AGREED)
def test_each_limit_has_source_evidence_and_one_sentence(limits, id):
    limit = limits[id]
    assert limit.source
    assert limit.evidence in EVIDENCE
    assert limit.says[0].isupper()
    assert limit.says.endswith(".")
    assert len(limit.says) <= 140
    assert limit.sense in SENSES
    assert limit.not_given in (None, *NOT_GIVEN)


@pytest.mark.parametrize("id", AGREED)
def test_stop_lies_beyond_go(limits, id):
    limit = limits[id]
    if limit.go is None or limit.stop is None:
        return
    if limit.sense == "at least":
        assert limit.stop <= limit.go
    else:
        assert max((limit.go,) if isinstance(limit.go, float) else limit.go) <= limit.stop


def test_states_of_the_limiter_stand_on_their_side_of_the_levels(limits):
    draw = limits["power_up.draw"]
    assert [draw.extra[state] <= draw.go for state in ("dark", "dim")] == [True, True]
    assert [draw.extra[state] > draw.stop for state in ("bright", "rising")] == [True, True]


def test_further_levels_lie_on_their_side(limits):
    assert limits["bias.idle"].extra["dead_zone_below"] < limits["bias.idle"].go
    assert limits["bias.idle"].extra["go_times_specified"] < limits["bias.idle"].extra["stop_times_specified"]
    assert limits["touch.temperature"].extra["guard_above"] > limits["touch.temperature"].go
    assert limits["offset.output"].extra["switch_off_above"] > limits["offset.output"].stop
    assert limits["soa.loudspeaker"].extra["as_built_ceiling"] > limits["soa.loudspeaker"].stop


def test_each_topic_stands_in_the_file_of_its_name():
    for path in limits_folder().glob("*.toml"):
        if path.stem not in TABLE_FILES:
            assert list(read_document(path).data) == [path.stem]
