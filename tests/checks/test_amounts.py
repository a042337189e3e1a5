"""The value of a finding as every report and every figure shows it."""

from dataclasses import replace

import pytest

from safeamp.checks.amounts import amount, percent, shown_kind, value_text
from safeamp.findings import Bound, Finding, Step, Verdict
from safeamp.quantities import PERCENT, RATIO, TEMPERATURE, VOLTAGE
from tests.scenarios.sheets import finding, report

LIMIT = Bound(0.8, 1.0, "at most", "this project", "this project")


def of(id_, nominal, kind=RATIO, **changed):
    return Finding(id_, Step.SOAK, Verdict.GO, kind, "so", nominal, None, bound=LIMIT, **changed)


@pytest.mark.parametrize(
    ("one", "said"),
    [
        (of("soa.loudspeaker", 0.774), "77.4 %"),
        (of("soa.loudspeaker", 1.00004), "100.004 %"),  # not at its limit
        (of("bias.imbalance", 0.0128), "1.28 %"),
        (of("stability.gain_margin", 0.774), "0.774"),
        (of("power_up.output", 0.02), "2 %"),  # of a midpoint
        (of("power_up.output", 0.02, VOLTAGE), "20 mV"),
        (of("heat.junction", 81.2, TEMPERATURE), "81.2 °C"),
        (of("soa.loudspeaker", None, unbounded=True), "without bound"),
        (of("bias.runaway", float("nan")), "not known"),
        (of("offset.dc", None, to_be_read=True), "not read"),
    ],
)
def test_a_value_is_shown_in_the_kind_and_the_digits_it_needs(one, said):
    assert value_text(one) == said


@pytest.mark.parametrize("state", ["dark", "dim", "bright", "rising"])
def test_a_state_is_shown_as_its_word(state):
    judged = finding(report("healthy", {"readings.limiter_state": state}), "power_up.draw")
    assert value_text(judged) == state
    assert value_text(replace(judged, nominal=None)) == "not known"


def test_enough_digits_keep_a_value_apart_from_its_limits():
    assert amount(0.10001, VOLTAGE, [0.1]) == "100.01 mV"
    assert amount(0.1, VOLTAGE, [0.1]) == "100 mV"
    assert amount(0.10001, VOLTAGE) == "100 mV"
    assert shown_kind(of("capacitor.voltage", 0.5)) == PERCENT


@pytest.mark.parametrize(
    ("share", "text"),
    [
        (0.0, "0 %"),
        (1.0, "100 %"),
        (0.331, "33.1 %"),
        (0.00002, "0.002 %"),
        (0.99998, "99.998 %"),
        (0.9999631, "99.9963 %"),
        (0.05, "5.0 %"),
        (1e-7, "0.00001 %"),
    ],
)
def test_percent(share, text):
    assert percent(share) == text
