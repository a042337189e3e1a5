"""Other loads on the split rail, the size of an output capacitor, and a pure class-A stage."""

import numpy as np
import pytest

from safeamp.checks import operating, thermal
from safeamp.findings import Verdict
from safeamp.physics import capacitor, preferred, safe_area, stage
from safeamp.physics.safe_area import Rating
from tests.scenarios.sheets import beside, expected, finding, report, sheet

TOLERANCE = 0.02


def use_into(amplifier, ohms, degrees):
    """Return the use into a load, the case as hot as one eighth of power into 8 ohm at 45 deg leaves it."""
    device = amplifier.device["fitted"]
    side = operating.sides(amplifier)[0]
    found = safe_area.envelope_use(
        half_supply=side.burst,
        peak=operating.peak_into(amplifier, side.burst, side.loss, ohms),
        load_magnitude=ohms,
        phase_angle=degrees,
        conducting=operating.conducting(amplifier),
        emitter_resistor=amplifier.stage.emitter_resistor,
        idle_current=operating.idle_current(amplifier),
        law=operating.law_of(device),
        imbalance=0.0,
        case_temperature=thermal.hotter_case(amplifier, "upper", thermal.ONE_EIGHTH, 45.0),
        rating=Rating(
            current=device.current,
            power=device.power,
            power_at=device.power_at,
            junction_limit=device.junction_limit,
            junction_to_case=device.junction_to_case,
            voltage=device.voltage,
            points=device.safe_area,
        ),
    )
    return float(found.use)


@pytest.mark.parametrize(("load", "wanted"), list(expected("split_rail")["other_loads"].items()))
def test_other_loads_of_the_split_rail(load, wanted):
    ohms, _, degrees, _ = load.split()
    found = use_into(sheet("split_rail").amplifier, float(ohms), float(degrees))
    assert found == pytest.approx(wanted, rel=TOLERANCE)


def test_sixty_degrees_are_shown_beside_the_use():
    wanted = expected("split_rail")["other_loads"]["8 ohm 60 deg"]
    found = beside(finding(report("split_rail"), "soa.loudspeaker"), "60 deg")
    assert found == pytest.approx(wanted, rel=TOLERANCE)


def test_a_lighter_resistor_says_nothing_of_a_loudspeaker():
    answer = report(
        "split_rail", {"loudspeaker.nominal_impedance": "4 ohm", "loudspeaker.minimum_impedance": "3.2 ohm"}
    )
    assert finding(answer, "soa.resistive_load").nominal < 1.0
    assert finding(answer, "soa.loudspeaker").verdict is Verdict.STOP


SIZES = {
    "exact_20Hz_8ohm_uF": (8.0, 1.0),
    "exact_20Hz_6ohm4_minus20_uF": (6.4, 0.8),
    "exact_20Hz_4ohm_minus20_uF": (4.0, 0.8),
}


@pytest.mark.parametrize(("name", "given"), list(SIZES.items()))
def test_size_of_an_output_capacitor(name, given):
    ohms, low_end = given
    exact = capacitor.capacitance_for_cutoff(cutoff=20.0, load_resistance=ohms) / low_end
    assert 1e6 * float(exact) == pytest.approx(expected("single_rail")["sizing"][name], rel=TOLERANCE)


def test_the_report_offers_the_value_to_buy():
    wanted = expected("single_rail")["sizing"]
    cutoff = finding(report("single_rail"), "capacitor.cutoff")
    exact = beside(cutoff, "capacitance for the target, at -20 %")
    assert 1e6 * exact == pytest.approx(wanted["exact_20Hz_6ohm4_minus20_uF"], rel=TOLERANCE)
    assert beside(cutoff, "next preferred value") == pytest.approx(2200e-6)
    voltage = finding(report("single_rail"), "capacitor.voltage")
    assert beside(voltage, "rated voltage that stands the whole rail") == wanted["rating_at_least_V"]


def test_the_value_to_buy_keeps_the_bass_at_its_low_end():
    answer = report("single_rail", {"output_capacitor.capacitance": "2200 uF -20/+20 %, measured"})
    found = finding(answer, "capacitor.cutoff").worst
    assert found == pytest.approx(
        expected("single_rail")["sizing"]["cutoff_2200uF_minus20_6ohm4_Hz"], rel=TOLERANCE
    )


def test_cutoff_of_the_old_capacitor_into_eight_ohm():
    found = capacitor.cutoff_frequency(capacitance=680e-6, load_resistance=8.0)
    assert float(found) == pytest.approx(expected("single_rail")["nominal"]["cutoff_680uF_8ohm_Hz"], rel=0.02)


def test_load_at_the_cutoff_is_turned_by_half_a_right_angle():
    wanted = expected("single_rail")["sizing"]["load_at_20Hz_1000uF"]
    reactance = -1.0 / (2.0 * np.pi * 20.0 * 1000e-6)
    ohms, degrees = stage.load_combination(impedance=8.0, phase_angle=0.0, series_reactance=reactance)
    assert float(ohms) == pytest.approx(wanted["ohm"], rel=TOLERANCE)
    assert float(degrees) == pytest.approx(wanted["deg"], rel=TOLERANCE)


def test_rated_voltage_is_the_next_one_up():
    assert float(preferred.next_rated_voltage(70.4)) == 80.0


def test_class_a_is_hottest_without_signal():
    # 2·1.6 A·(24 V − 1.6 A·0.47 ohm) = 74.4 W without signal; 30 degC + 0.8 K/W · 74.4 W = 89.5 degC
    heat = finding(report("class_a"), "heat.heatsink")
    quiet = beside(heat, "heat of the stage without signal")
    assert quiet == pytest.approx(2 * 1.6 * (24.0 - 1.6 * 0.47))
    assert quiet > beside(heat, "heat of the stage at one third of clipping power")
    assert heat.nominal == pytest.approx(30.0 + 0.8 * quiet)
    assert heat.nominal == pytest.approx(89.5, abs=0.05)


def test_class_a_never_lets_go():
    # peak current (22.5 − 2)/(8 + 0.47) = 2.42 A stays below twice the idle: both devices always conduct
    amplifier = sheet("class_a").amplifier
    peak = operating.clipping_peak(amplifier) / 8.0
    assert float(peak) < 2 * 1.6
    larger, smaller = stage.device_currents(
        load_current=peak, idle_current=1.6, emitter_resistor=0.47, law=stage.Law.BIPOLAR
    )
    assert smaller > 0.1
    assert larger - smaller == pytest.approx(float(peak))


def test_class_a_leaves_its_safe_area_into_a_loudspeaker():
    one = finding(report("class_a"), "soa.loudspeaker")
    assert one.nominal == pytest.approx(1.30, rel=0.01)
    assert one.verdict is Verdict.STOP
