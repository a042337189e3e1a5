"""Every finding that was promised has a check, a limit and a step; every check that is written is registered."""

import inspect

import pytest

from safeamp.checks import CHECKS, TOPICS
from safeamp.checks.registry import finding
from safeamp.findings import Step
from safeamp.quantities import RATIO
from tests.scenarios.sheets import limits

#: Id -> step, unit of the value, whether it is read at the bench.
PROMISED = {
    "cold.devices": ("cold checks", "ohm", True),
    "cold.insulation": ("cold checks", "ohm", True),
    "supply.fuse": ("cold checks", "1", False),
    "supply.rail_to_rail": ("cold checks", "1", False),
    "supply.reservoir_voltage": ("cold checks", "1", False),
    "supply.mains": ("cold checks", "1", False),
    "touch.rails": ("cold checks", "V", False),
    "capacitor.wear": ("cold checks", "1", False),
    "capacitor.cutoff": ("cold checks", "Hz", False),
    "capacitor.voltage": ("cold checks", "1", False),
    "capacitor.ripple": ("cold checks", "1", False),
    "power_up.draw": ("first power-up", "1", True),
    "power_up.rails": ("first power-up", "1", True),
    "power_up.output": ("first power-up", "V", True),
    "bias.idle": ("bias", "V", True),
    "bias.imbalance": ("bias", "1", True),
    "bias.balance": ("bias", "1", True),
    "bias.drift": ("bias", "1", True),
    "bias.runaway": ("bias", "1", False),
    "offset.output": ("bias", "V", True),
    "offset.drift": ("bias", "V", True),
    "offset.midpoint": ("bias", "1", True),
    "capacitor.leakage": ("bias", "1", True),
    "heat.heatsink": ("soak", "degC", False),
    "heat.junction": ("soak", "degC", False),
    "heat.reading": ("soak", "1", True),
    "soa.resistive_load": ("load test", "1", False),
    "stability.output": ("load test", "V", True),
    "loudspeaker.label": ("loudspeaker", "1", False),
    "soa.loudspeaker": ("loudspeaker", "1", False),
    "loudspeaker.power": ("loudspeaker", "1", False),
    "loudspeaker.dc_fault": ("loudspeaker", "W", False),
    "protection.short": ("hand-over", "1", False),
    "touch.mains": ("hand-over", "ohm", True),
    "touch.voltage": ("hand-over", "V", False),
    "touch.temperature": ("hand-over", "degC", False),
}
#: Findings beyond what was promised.
FURTHER = {"supply.transformer"}
#: Word of a finding whose input is missing; None where its inputs cannot be missing, which means unverified.
NOT_GIVEN = {
    "caution": {
        "supply.reservoir_voltage",
        "capacitor.wear",
        "capacitor.ripple",
        "bias.imbalance",
        "bias.balance",
        "bias.drift",
        "offset.drift",
        "heat.reading",
        "stability.output",
        "loudspeaker.label",
        "loudspeaker.power",
        "loudspeaker.dc_fault",
        "protection.short",
        "touch.temperature",
    },
    None: {
        "supply.rail_to_rail",
        "touch.rails",
        "capacitor.cutoff",
        "capacitor.voltage",
        "touch.voltage",
        "supply.transformer",
    },
}


def test_nothing_promised_is_missing_and_nothing_else_is_there():
    assert set(CHECKS) == set(PROMISED) | FURTHER


@pytest.mark.parametrize("identity", list(PROMISED))
def test_step_unit_and_bench(identity):
    step, unit, at_bench = PROMISED[identity]
    check = CHECKS[identity]
    assert check.id == identity
    assert (check.step.value, check.kind.unit or "1", check.at_bench) == (step, unit, at_bench)


@pytest.mark.parametrize("identity", sorted(CHECKS))
def test_every_finding_has_its_limit(identity):
    limit = limits()[identity]
    assert limit.id == identity
    assert limit.source
    assert limit.says


@pytest.mark.parametrize("identity", sorted(CHECKS))
def test_word_of_what_is_not_given(identity):
    wanted = next((word for word, ids in NOT_GIVEN.items() if identity in ids), "unverified")
    assert limits()[identity].not_given == wanted


def test_every_check_that_is_written_is_registered():
    written = {
        function
        for topic in TOPICS
        for name, function in inspect.getmembers(topic, inspect.isfunction)
        if name.startswith("check_") and function.__module__ == topic.__name__
    }
    assert written == {check.run for check in CHECKS.values()}


def test_every_topic_is_listed():
    modules = {check.run.__module__ for check in CHECKS.values()}
    assert modules == {topic.__name__ for topic in TOPICS if topic.__name__ in modules}
    assert len({topic.__name__ for topic in TOPICS}) == len(TOPICS)


def test_an_id_is_registered_once():
    with pytest.raises(ValueError, match=r"cold\.devices is registered twice"):
        finding("cold.devices", Step.COLD_CHECKS, RATIO)(lambda amplifier, limits: None)


def test_every_check_says_what_it_finds():
    for check in CHECKS.values():
        assert inspect.getdoc(check.run), check.id
