"""The bench mock-up in free air: small into 150 ohm, sick into 8 ohm."""

import numpy as np
import pytest
from scipy import integrate, optimize

from safeamp.checks import operating
from safeamp.findings import Verdict
from safeamp.physics import heat, stage
from tests.scenarios.sheets import beside, expected, finding, report, sheet

TOLERANCE = 0.02
NAME = "bench_mockup"
INTO_8 = {"loudspeaker.nominal_impedance": "8 ohm", "loudspeaker.minimum_impedance": "8 ohm"}
SUPPLY, RESISTOR, IDLE = 6.0, 1.0, 2e-3


def heat_without_idle(peak, ohms):
    """Return the heat of one device for a sine in class B, W."""
    both = stage.pair_heat(
        half_supply=SUPPLY,
        peak=peak,
        load_magnitude=ohms,
        phase_angle=0.0,
        conducting=1.0,
        emitter_resistor=RESISTOR,
        idle_current=0.0,
        law=stage.Law.BIPOLAR,
    )
    return both / 2.0


def worst_heat_each(amplifier):
    """Return the same at the worst level."""
    ohms = float(operating.nominal_load(amplifier)[0])
    levels = np.linspace(0.02, 1.0, 400) * float(operating.clipping_peak(amplifier))
    return float(np.max(heat_without_idle(levels, ohms)))


@pytest.mark.parametrize(("section", "changes"), [("nominal", {}), ("with_8_ohm", INTO_8)])
def test_worst_level_and_its_junction(section, changes):
    amplifier, wanted = sheet(NAME, changes).amplifier, expected(NAME)[section]
    each = worst_heat_each(amplifier)
    assert each == pytest.approx(wanted["dissipation_each_worst_W"], rel=TOLERANCE)
    junction = float(heat.free_air_junction(air=25.0, device_power=each, junction_to_ambient=200.0))
    assert junction - 25.0 == pytest.approx(wanted["junction_worst_degC"] - 25.0, rel=TOLERANCE)


# The expert's 29.5 degC and 10.1 mA leave the idle current aside (class B); 2 mA of it raise the junction to 29.94.
def test_class_b_figures_of_the_expert():
    amplifier, wanted = sheet(NAME).amplifier, expected(NAME)["nominal"]
    peak = operating.clipping_peak(amplifier)
    each = heat_without_idle(stage.level_peak(clipping_peak=peak, fraction=1.0 / 3.0), 150.0)
    rise = wanted["heat.junction_degC"] - 25.0
    assert 200.0 * float(each) == pytest.approx(rise, rel=TOLERANCE)
    mean = stage.mean_supply_current(peak_current=peak / 150.0)
    assert float(mean) == pytest.approx(wanted["mean_supply_A"], rel=TOLERANCE)


def upper_current(load):
    """Return the current of the upper device by a root of Vt·ln(x(x − i)/Iq²) + Re·(2x − i − 2Iq) = 0, A."""
    volts = 1.380649e-23 * 298.15 / 1.602176634e-19

    def law(logarithm):
        y = np.exp(logarithm)  # current of the other device: never below zero
        x = y + abs(load)
        return volts * np.log(x * y / IDLE**2) + RESISTOR * (x + y - 2.0 * IDLE)

    other = np.exp(optimize.brentq(law, -200.0, np.log(IDLE) + 1e-9, xtol=1e-13))
    return other + max(load, 0.0) if load >= 0.0 else other


def test_junction_against_an_independent_integration():
    peak = float(operating.clipping_peak(sheet(NAME).amplifier)) / np.sqrt(3.0)

    def power(angle):
        load = peak / 150.0 * np.sin(angle)
        x = upper_current(load)
        return x * (SUPPLY - peak * np.sin(angle) - RESISTOR * x)

    mean, _ = integrate.quad(power, 0.0, 2.0 * np.pi, epsabs=1e-9, limit=200, points=[np.pi])
    junction = 25.0 + 200.0 * mean / (2.0 * np.pi)
    found = finding(report(NAME), "heat.junction").nominal
    assert found == pytest.approx(29.94, abs=0.005)
    assert found - 25.0 == pytest.approx(junction - 25.0, rel=1e-4)


def test_eight_ohm_on_the_mock_up_is_a_stop():
    wanted = expected(NAME)["with_8_ohm"]
    answer, amplifier = report(NAME, INTO_8), sheet(NAME, INTO_8).amplifier
    peak = float(operating.clipping_peak(amplifier))
    assert answer.verdict is Verdict.STOP
    assert answer.verdict.word == wanted["verdict"]
    assert peak == pytest.approx(wanted["peak_V"], rel=TOLERANCE)
    assert peak / 8.0 == pytest.approx(wanted["peak_current_A"], rel=TOLERANCE)
    assert finding(answer, "soa.resistive_load").nominal == pytest.approx(2.7, rel=0.03)
    cutoff = finding(answer, "capacitor.cutoff")
    assert cutoff.nominal == pytest.approx(wanted["cutoff_Hz"], rel=TOLERANCE)
    exact = 1e6 * beside(cutoff, "capacitance for the target, at -20 %")
    assert exact == pytest.approx(wanted["capacitance_40Hz_minus20_uF"], rel=TOLERANCE)
    assert 0.8 * exact == pytest.approx(wanted["capacitance_40Hz_exact_uF"], rel=TOLERANCE)


def test_a_resistor_of_150_ohm_clears_no_loudspeaker():
    for one in report(NAME).findings:
        if one.step.value == "loudspeaker":
            assert one.verdict >= Verdict.UNVERIFIED
