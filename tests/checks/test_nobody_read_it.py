"""A reading that nobody took clears nothing, however far it lies from its limit."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import finding, report


@pytest.mark.parametrize("origin", ["guess", "manual", "data sheet"])
@pytest.mark.parametrize(
    ("key", "value", "identity"),
    [
        ("readings.insulation", "20 Mohm", "cold.insulation"),
        ("readings.device_ohms", "180 kohm", "cold.devices"),
        ("readings.mains_insulation", "50 Mohm", "touch.mains"),
        ("readings.earth_resistance", "0.08 ohm", "touch.mains"),
        ("readings.limiter_output", "8 mV", "power_up.output"),
        ("readings.offset_warm", "6 mV", "offset.output"),
        ("readings.idle_cold", "12.5 mV", "bias.drift"),
    ],
)
def test_a_reading_of_that_origin_is_none(key, value, identity, origin):
    found = finding(report("healthy", {key: f"{value}, {origin}"}), identity)
    assert found.verdict is Verdict.UNVERIFIED
    assert any(f"nobody read it at the bench: {key}" in one for one in found.because)


@pytest.mark.parametrize("origin", ["", ", measured"])
def test_a_reading_without_a_word_counts_as_read(origin):
    assert (
        finding(report("healthy", {"readings.insulation": f"20 Mohm{origin}"}), "cold.insulation").verdict
        is Verdict.GO
    )


def test_an_item_of_a_list_is_a_reading_too():
    guessed = {"readings.idle_upper": ["14 mV, guess"]}
    assert finding(report("healthy", guessed), "bias.balance").verdict is Verdict.UNVERIFIED


def test_what_is_printed_on_the_limiter_need_not_be_read():
    assert (
        finding(report("healthy", {"readings.limiter": "60 W lamp, marked"}), "power_up.draw").verdict
        is Verdict.GO
    )
