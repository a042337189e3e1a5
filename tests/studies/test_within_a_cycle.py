"""The junction within a cycle, one device of each side open, heat over the level: numbers beside and in findings."""

import numpy as np
import pytest

from safeamp.checks import levels, thermal
from safeamp.findings import Verdict
from safeamp.physics import stage
from safeamp.physics.transient import cycle_dissipation, peak_ripple
from tests.scenarios.sheets import GONE, beside, finding, report, sheet

PAIRS = [["0.05 K/W", "0.1 ms"], ["0.2 K/W", "1.5 ms"], ["0.35 K/W", "12 ms"], ["0.23 K/W", "90 ms"]]
TRANSIENT = {"device.fitted.transient": PAIRS}
TWO = {"stage.pairs": 2, "readings.idle_upper": ["14 mV", "16 mV"], "readings.idle_lower": ["15 mV", "14 mV"]}


def junction(changes=None, name="healthy"):
    return finding(report(name, changes or {}), "heat.junction")


def shown(one):
    return {also.at: also.value for also in one.also}


def test_the_peak_is_the_value_and_the_mean_stands_beside_it():
    plain, one = junction(), junction(TRANSIENT)
    assert beside(one, "mean over a cycle") == pytest.approx(plain.nominal)
    assert "mean over a cycle" not in shown(plain)
    # 22 V rails sagging to 22 - 2*sqrt(1/3), a third of 18.68 W into 8 ohm: a peak of 9.98 V.
    half = 22.0 - 2.0 * np.sqrt(1.0 / 3.0)
    peak = np.sqrt(2.0 * 8.0 * beside(finding(report("healthy"), "heat.heatsink"), POWER) / 3.0)
    power = cycle_dissipation(
        half_supply=half, peak=peak, load_magnitude=8.0, phase_angle=0.0, conducting=1.0, emitter_resistor=0.33,
        idle_current=14e-3 / 0.33, law=stage.Law.BIPOLAR,
    )  # fmt: skip
    pairs = np.array([[0.05, 1e-4], [0.2, 1.5e-3], [0.35, 12e-3], [0.23, 90e-3]])
    ripple = peak_ripple(resistances=pairs[:, 0], time_constants=pairs[:, 1], power=power, period=0.05)
    assert one.nominal - plain.nominal == pytest.approx(float(ripple), rel=2e-3)
    assert one.worst > one.nominal
    assert one.says == "junction peaks at 54.2 °C, allowed 150 °C, in every cycle of 20 Hz"


POWER = "power at clipping into the nominal impedance"


def test_a_lower_note_never_cools_the_peak():
    peaks = [
        junction({**TRANSIENT, "loudspeaker.lowest_note": f"{note} Hz"}).nominal for note in (200, 80, 20, 10)
    ]
    assert peaks == sorted(peaks)
    assert peaks[-1] > peaks[0] + 1.0


def test_a_peak_beyond_the_limit_is_a_stop_where_the_mean_is_not():
    hot = {"heatsink.sink_to_air": "10.5 K/W, measured"}  # 147.9 degC in the mean, 151.5 degC at the peak
    assert junction(hot).verdict is not Verdict.STOP
    assert junction({**hot, **TRANSIENT}).verdict is Verdict.STOP


def test_pairs_that_contradict_the_thermal_resistance_are_not_believed():
    short = junction({"device.fitted.transient": PAIRS[:3]})  # 0.6 of 0.833 K/W
    assert short.verdict is Verdict.UNVERIFIED
    assert (
        "the pairs of device.fitted.transient add up to 0.6 K/W, junction_to_case is 0.833 K/W: read both again"
        in short.because
    )
    most, least = [["0.957 K/W", "9 ms"]], [["0.709 K/W", "9 ms"]]  # at 15 % of 0.8333 K/W, just inside
    assert junction({"device.fitted.transient": most}).verdict is Verdict.GO
    assert junction({"device.fitted.transient": least}).verdict is Verdict.GO
    for beyond in ("0.959 K/W", "0.708 K/W"):
        assert junction({"device.fitted.transient": [[beyond, "9 ms"]]}).verdict is Verdict.UNVERIFIED


def test_transient_without_a_lowest_note_is_that_of_20_hertz():
    assert junction(TRANSIENT).nominal == junction({**TRANSIENT, "loudspeaker.lowest_note": "20 Hz"}).nominal


def test_a_sheet_without_idle_stays_unverified_with_transient():
    gone = {"stage.idle": GONE, "readings.idle_upper": GONE, "readings.idle_lower": GONE}
    assert junction({**TRANSIENT, **gone}).verdict is Verdict.UNVERIFIED


def test_each_side_has_its_own_device():
    other = {
        "kind": "bipolar", "voltage": "160 V", "current": "12 A", "power": "150 W", "junction_limit": "150 degC",
        "junction_to_case": "0.8333 K/W", "safe_area": [["40 V", "3.75 A"], ["100 V", "0.75 A"], ["160 V", "0.25 A"]],
        "transient": PAIRS,
    }  # fmt: skip
    one = junction({"stage.lower": "other", "device.other": other})
    assert one.nominal == pytest.approx(junction(TRANSIENT).nominal)  # the upper side has its mean alone
    assert "peaks" in one.says


def test_one_open_device_of_two_is_the_amplifier_with_one_less():
    one = junction(TWO)
    alone = junction({**TWO, "stage.pairs_conducting": 1})
    assert beside(one, "with one device of each side open") == pytest.approx(alone.nominal)
    assert alone.nominal > one.nominal
    assert "with one device of each side open" not in shown(junction())
    assert "with one device of each side open" not in shown(alone)


@pytest.mark.parametrize("identity", ["soa.resistive_load", "soa.loudspeaker"])
def test_one_open_device_of_two_leaves_more_of_the_safe_area_to_its_neighbour(identity):
    one = finding(report("healthy", TWO), identity)
    alone = finding(report("healthy", {**TWO, "stage.pairs_conducting": 1}), identity)
    assert beside(one, "with one device of each side open") == pytest.approx(alone.nominal)
    assert alone.nominal > one.nominal
    assert "with one device of each side open" not in shown(alone)


def test_a_bridge_says_what_each_side_gives():
    one = finding(report("healthy", {"stage.bridged": True, "heatsink.shared_by": 2}), "heat.heatsink")
    assert beside(one, POWER) == pytest.approx(2.0 * beside(one, "of that each side of the bridge"))
    assert "of that each side of the bridge" not in shown(finding(report("healthy"), "heat.heatsink"))


WORST, WORST_HEAT = (
    "worst level of a sine, share of clipping power",
    "heat of the stage at the worst level of a sine",
)


@pytest.mark.parametrize("name", ["healthy", "split_rail", "old_mains", "single_rail"])
def test_no_level_of_a_sine_heats_more_than_the_worst(name):
    one, amplifier = finding(report(name), "heat.heatsink"), sheet(name).amplifier
    levels_seen = np.linspace(1e-4, 1.0, 5001)
    dense = thermal.at_level(amplifier, levels_seen).stage_power
    assert beside(one, WORST_HEAT) == pytest.approx(np.max(dense), rel=1e-6)
    assert beside(one, WORST) == pytest.approx(levels_seen[np.argmax(dense)], abs=3e-4)
    third = beside(one, "heat of the stage at one third of clipping power")
    assert beside(one, WORST_HEAT) >= third * (1.0 - 1e-6)
    assert beside(one, "heatsink at the worst level of a sine") >= one.nominal - 1e-6


def test_worst_level_of_class_b_is_the_closed_form():
    # Stiff rails, next to no idle current and resistor: 2 Vs/pi over a clipping peak of Vs - 2 V, squared.
    stiff = {
        "supply.full_load": "22 V, measured", "stage.idle": "0.01 mV, measured", "readings.idle_upper": GONE,
        "readings.idle_lower": GONE, "stage.emitter_resistor": "0R01",
    }  # fmt: skip
    one = finding(report("healthy", stiff), "heat.heatsink")
    assert beside(one, WORST) == pytest.approx((2.0 * 22.0 / np.pi / 20.0) ** 2, rel=0.01)
    assert beside(one, WORST_HEAT) == pytest.approx(2.0 * 22.0**2 / np.pi**2 / 8.0, rel=0.01)


def test_a_class_a_stage_is_hottest_without_signal_and_has_no_worst_sine():
    one, amplifier = finding(report("class_a"), "heat.heatsink"), sheet("class_a").amplifier
    quiet = beside(one, "heat of the stage without signal")
    assert levels.worst_level(amplifier) == 0.0
    assert np.all(thermal.at_level(amplifier, np.linspace(1e-4, 1.0, 501)).stage_power < quiet)
    assert beside(one, "most heat of the stage, without signal: any sine heats less") == quiet
    assert not {WORST, WORST_HEAT} & set(shown(one))
    assert "heat of programme like noise at one eighth of clipping power, class B" in shown(one)


def test_programme_at_one_eighth_heats_as_noise_does():
    amplifier = sheet("healthy").amplifier
    # Without clipping: sqrt(2/pi)*s*Vs/R - s^2/R, s = Vp*sqrt(1/16); a crest of 12 dB clips next to nothing.
    peak, half = 17.29, 22.0 - 2.0 * np.sqrt(1.0 / 8.0)
    rms = peak / 4.0
    assert levels.programme_heat(amplifier, 1.0 / 8.0) == pytest.approx(
        np.sqrt(2.0 / np.pi) * rms * half / 8.0 - rms**2 / 8.0, rel=2e-3
    )


def test_heat_beside_the_heatsink_needs_the_idle_current():
    gone = {"stage.idle": GONE, "readings.idle_upper": GONE, "readings.idle_lower": GONE}
    assert WORST not in shown(finding(report("healthy", gone), "heat.heatsink"))


ODD = "base-emitter voltage by which the odd device differs"


def test_the_odd_device_is_said_in_volts():
    one = finding(report("healthy", TWO), "bias.imbalance")
    # Upper 14 and 16 mV across 0.33 ohm: 1 mV in the resistor and 25.7 mV*ln(16/15), or ln(14/15) on the other side.
    wanted = 25.69e-3 * np.log(14.0 / 15.0) - 1e-3
    assert beside(one, ODD) == pytest.approx(wanted, rel=1e-3)


def test_a_darlington_has_two_junctions_and_a_mosfet_is_left_out():
    two = finding(report("healthy", {**TWO, "device.fitted.kind": "darlington"}), "bias.imbalance")
    assert beside(two, ODD) == pytest.approx(2.0 * 25.69e-3 * np.log(14.0 / 15.0) - 1e-3, rel=1e-3)
    other = finding(report("healthy", {**TWO, "device.fitted.kind": "lateral mosfet"}), "bias.imbalance")
    assert ODD not in shown(other)


def test_a_device_that_carries_nothing_has_no_such_voltage():
    dead = {**TWO, "readings.idle_upper": ["0 mV", "30 mV"], "readings.idle_lower": ["0 mV", "30 mV"]}
    assert ODD not in shown(finding(report("healthy", dead), "bias.imbalance"))


def test_an_oscillation_at_clipping_heats_the_network_without_its_capacitor():
    network = {"stage.zobel_resistor": "10 ohm", "stage.zobel_capacitor": "100 nF"}
    one = finding(report("healthy", network), "stability.output")
    assert beside(one, "the same when it oscillates at clipping, at most") == pytest.approx(
        17.287**2 / 2.0 / 10.0, rel=1e-3
    )
    assert not shown(finding(report("healthy"), "stability.output"))
