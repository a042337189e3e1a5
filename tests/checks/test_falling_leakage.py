"""Leakage that falls is no stop, but a flood that falls is no go either: it is read again when it has fallen."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, finding, report

ID = "capacitor.leakage"
SINGLE = "30w_single_rail_to3"  # 29.3 V at the midpoint, 3200 µF for 63 V: 2.016 mA is usual
FLOOD = "it falls, and still"


def leaking(drop, trend="falling", resistor="100 ohm", **changes):
    keys = {"drop": drop, "trend": trend, "resistor": resistor}
    written = {f"readings.capacitor_leakage_{name}": value for name, value in keys.items()}
    return finding(report(SINGLE, written | changes), ID)


def test_while_falling_a_tenth_of_the_midpoint_is_the_most():
    # Before the ceiling 40 times the usual leakage was a caution for ever, and so was any other.
    below, above = leaking("2.92 V, measured"), leaking("2.94 V, measured")
    assert below.verdict is Verdict.CAUTION
    assert not any(FLOOD in text for text in below.because)
    assert above.verdict is Verdict.UNVERIFIED
    assert above.because == (
        "it falls, and still takes 2.94 V of the 29.3 V at the midpoint: wait until it has fallen, and read again",
    )


def test_through_a_small_resistor_the_usual_leakage_counts():
    # 300 times 2.016 mA are 605 mA: 605 mV across 1 ohm, no tenth of the midpoint.
    assert leaking("604 mV, measured", resistor="1 ohm").verdict is Verdict.CAUTION
    flood = leaking("606 mV, measured", resistor="1 ohm")
    assert flood.verdict is Verdict.UNVERIFIED
    assert flood.because == (
        "it falls, and still is 301 times what is usual: wait until it has fallen, and read again",
    )


def test_a_midpoint_that_nobody_read_is_half_the_rail():
    # Half of 58 V is 29 V.
    gone = {"readings.midpoint": GONE}
    assert leaking("2.89 V, measured", **gone).verdict is Verdict.CAUTION
    assert leaking("2.91 V, measured", **gone).verdict is Verdict.UNVERIFIED


@pytest.mark.parametrize("trend", ["rising", "steady"])
def test_what_does_not_fall_is_a_stop_as_before(trend):
    assert leaking("2.94 V, measured", trend).verdict is Verdict.STOP
