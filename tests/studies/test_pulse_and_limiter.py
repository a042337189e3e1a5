"""Pulse curves and a measured V-I limiter on the sheet; one device open; unequal devices; bridges."""

import numpy as np
import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, beside, finding, report

PULSE = [
    ["10 ms", ["40 V", "9 A"], ["100 V", "2.4 A"], ["160 V", "0.9 A"]],
    ["100 ms", ["40 V", "5 A"], ["100 V", "1.2 A"]],
]
CURVES = {"device.fitted.pulse": PULSE}
BY_DC, UNLIMITED, ONE_OPEN = (
    "by the DC curve alone",
    "without the V-I limiter",
    "with one device of each side open",
)


def soa(changes=None, name="split_rail", identity="soa.loudspeaker"):
    return finding(report(name, changes or {}), identity)


def shown(one):
    return {also.at: also.value for also in one.also}


def limiter(top, end="60 V", origin="measured"):
    said = f", {origin}" if origin else ""
    return {"protection.vi_limiter": [[f"0 V{said}", f"{top} A{said}"], [f"{end}{said}", f"0.2 A{said}"]]}


def test_pulse_curves_make_the_value_and_the_dc_curve_stands_beside_it():
    plain, one = soa(), soa(CURVES)
    assert one.nominal < plain.nominal
    assert beside(one, BY_DC) == pytest.approx(plain.nominal)
    assert one.worst < plain.worst
    assert "pulse curves for half a cycle of the lowest note" in one.method
    assert BY_DC not in shown(plain)


@pytest.mark.parametrize("identity", ["soa.loudspeaker", "soa.resistive_load"])
def test_a_curve_shorter_than_half_a_cycle_changes_nothing(identity):
    # 20 Hz: 25 ms; the curve at 10 ms alone says nothing of that.
    one = soa({"device.fitted.pulse": PULSE[:1]}, identity=identity)
    assert one.nominal == pytest.approx(soa(identity=identity).nominal, rel=1e-6)
    assert one.verdict is soa(identity=identity).verdict


def test_the_lowest_note_sets_the_duration_and_lower_never_uses_less():
    uses = [soa({**CURVES, "loudspeaker.lowest_note": f"{note} Hz"}).nominal for note in (200, 50, 20, 6, 5)]
    assert uses == sorted(uses)
    assert uses[0] == pytest.approx(
        soa({**CURVES, "loudspeaker.lowest_note": "50 Hz"}).nominal
    )  # 10 ms: nothing better is known of shorter pulses
    assert uses[2] == soa(CURVES).nominal  # 20 Hz is assumed
    assert uses[-1] < soa().nominal * (1.0 + 1e-6)  # 100 ms, the end of the longest curve


def test_a_hotter_junction_uses_more_of_the_pulse_curve():
    cool, warm = soa(CURVES), soa({**CURVES, "heatsink.air": "55 degC ±5 K, measured"})
    assert warm.nominal > cool.nominal


def test_without_idle_a_pulse_clears_nothing():
    gone = {"stage.idle": GONE, "readings.idle_upper": GONE, "readings.idle_lower": GONE}
    assert soa({**CURVES, **gone}).verdict >= Verdict.UNVERIFIED


def test_a_class_a_stage_has_no_use_for_pulse_curves_without_signal():
    plain, one = soa(name="class_a"), soa(CURVES, name="class_a")
    assert one.nominal <= plain.nominal
    assert beside(one, BY_DC) == pytest.approx(plain.nominal)
    # Its idle current alone, no signal: the DC curve, whatever a pulse may be.
    idle_share = 1.6 / 1.9
    assert one.nominal >= idle_share * plain.nominal * 0.8


def test_curves_that_contradict_the_dc_curve_are_not_believed():
    one = soa({"device.fitted.pulse": [["100 ms", ["40 V", "3.5 A"], ["100 V", "1.2 A"]]]})
    assert one.verdict is Verdict.UNVERIFIED
    assert (
        "device.fitted.pulse: the curve at 100 ms lies under the DC curve at 40 V: read both again"
        in one.because
    )


def test_a_pulse_never_exceeds_what_its_thermal_resistance_allows():
    # 0.8 K/W of 0.833 are there after 25 ms: the pulse curves then allow next to nothing more than the power line.
    slow = [["0.8 K/W", "2 ms"], ["0.0333 K/W", "1 s"]]
    free, held = soa(CURVES), soa({**CURVES, "device.fitted.transient": slow})
    assert free.nominal < held.nominal <= soa().nominal * (1.0 + 1e-6)


def test_without_a_dc_curve_pulse_curves_settle_nothing():
    one = soa({**CURVES, "device.fitted.safe_area": GONE})
    assert one.verdict >= Verdict.UNVERIFIED
    assert "device.fitted.safe_area" in one.needs


def test_a_measured_limiter_cuts_the_locus_and_is_said_to_cut_into_music():
    plain, one = soa(), soa(limiter(3))
    assert one.nominal < plain.nominal
    assert beside(one, UNLIMITED) == pytest.approx(plain.nominal)
    assert one.verdict is Verdict.CAUTION
    assert any("the V-I limiter acts into this load and cuts into music" in text for text in one.because)
    assert "cut at the V-I limiter" in one.method


@pytest.mark.parametrize("origin", ["", "manual", "data sheet"])
def test_a_limiter_that_nobody_measured_cuts_nothing(origin):
    one = soa(limiter(3, origin=origin))
    assert one.nominal == soa().nominal
    assert UNLIMITED not in shown(one)
    assert not any("limiter" in text for text in one.because)


def test_a_limiter_that_does_not_act_changes_nothing():
    one = soa(limiter(30, end="90 V"))
    assert one.nominal == pytest.approx(soa().nominal, rel=1e-6)
    assert one.verdict is soa().verdict
    assert not any("cuts into music" in text for text in one.because)


def test_a_looser_limiter_never_uses_less():
    uses = [soa(limiter(top)).nominal for top in (1, 2, 3, 5, 8)]
    assert uses == sorted(uses)
    assert uses[0] < 0.5 * uses[-1]


WEAK_BEYOND = {"device.fitted.safe_area": [["40 V", "3.75 A"], ["100 V", "0.02 A"], ["160 V", "0.01 A"]]}


def test_a_limiter_whose_line_leaves_the_safe_area_clears_nothing_once_it_acts():
    one = soa({**WEAK_BEYOND, **limiter(3), "stage.original_devices": False})
    assert one.nominal < 1.0 < beside(one, UNLIMITED)
    assert one.verdict is Verdict.UNVERIFIED
    assert any(
        "lets through more than the safe area allows elsewhere on its line" in text for text in one.because
    )
    assert not any("elsewhere on its line" in text for text in soa(limiter(3)).because)


def test_a_limiter_does_not_excuse_what_is_beyond_the_safe_area():
    one = soa({**WEAK_BEYOND, **limiter(6), "stage.original_devices": False})
    assert one.verdict is Verdict.STOP
    assert one.nominal > 1.0


def test_one_open_device_is_the_amplifier_with_one_less():
    two = {"stage.pairs": 2, "readings.idle_upper": GONE, "readings.idle_lower": GONE}
    one = soa(two)
    alone = soa({**two, "stage.pairs_conducting": 1})
    assert beside(one, ONE_OPEN) == pytest.approx(alone.nominal)
    assert alone.nominal > 1.5 * one.nominal
    assert ONE_OPEN not in shown(soa())
    # With the curves the open device is judged by them, too.
    assert beside(soa({**two, **CURVES}), ONE_OPEN) == pytest.approx(
        soa({**two, **CURVES, "stage.pairs_conducting": 1}).nominal
    )


WEAK = {
    "kind": "bipolar", "voltage": "160 V", "current": "12 A", "power": "90 W", "junction_limit": "150 degC",
    "junction_to_case": "1.389 K/W", "safe_area": [["40 V", "2.25 A"], ["100 V", "0.45 A"], ["160 V", "0.15 A"]],
}  # fmt: skip


@pytest.mark.parametrize("side", ["upper", "lower"])
def test_the_weaker_of_unequal_devices_counts_whichever_side_it_is_on(side):
    both = soa({"stage.upper": "weak", "stage.lower": "weak", "device.weak": WEAK})
    one = soa({f"stage.{side}": "weak", "device.weak": WEAK})
    assert one.nominal == pytest.approx(both.nominal)
    assert one.says.startswith(f"{side} device")
    hot = [
        finding(report("split_rail", change), "heat.junction").nominal
        for change in ({}, {f"stage.{side}": "weak", "device.weak": WEAK})
    ]
    assert hot[1] > hot[0]


def test_pulse_curves_of_one_side_help_that_side_alone():
    strong = WEAK | {"power": "150 W", "junction_to_case": "0.8333 K/W", "pulse": PULSE}
    strong["safe_area"] = [["40 V", "3.75 A"], ["100 V", "0.75 A"], ["160 V", "0.25 A"]]
    one = soa({"stage.lower": "other", "device.other": strong})
    assert one.nominal == pytest.approx(soa().nominal)
    assert one.says.startswith("upper device")


def test_a_bridge_says_that_no_terminal_may_touch_chassis():
    bridged = soa({"stage.bridged": True}, name="healthy")
    said = "bridged: neither loudspeaker terminal may touch chassis or 0 V"
    assert said in bridged.because
    assert said not in soa(name="healthy").because


def test_the_worst_corner_is_never_passed_by_a_random_case():
    changes = {**CURVES, "loudspeaker.lowest_note": "20 Hz ±20 %"}
    one = soa(changes)
    rng = np.random.default_rng(4)
    for _ in range(6):
        note, air = rng.uniform(16.0, 24.0), rng.uniform(25.0, 45.0)
        inside = {
            **CURVES,
            "loudspeaker.lowest_note": f"{note:.3f} Hz",
            "heatsink.air": f"{air:.2f} degC ±1 K, measured",
        }
        assert soa(inside).nominal <= one.worst
