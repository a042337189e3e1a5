"""Every formula runs once with quantities, so that a wrong power of volts or amperes cannot hide.

The search for the worst point cannot: it takes logarithms and compares with zones. It is scaled instead:
all voltages by one factor and all currents by another must leave a ratio of currents as it was.
The integral of the normal distribution takes plain numbers too, so noise is scaled as well.
"""

from dataclasses import replace

import numpy as np
import pint
import pytest

from safeamp.physics import safe_area, stage
from safeamp.physics.stage import THERMAL_VOLTAGE, Law
from tests.physics.safe_area_cases import DEVICE, random_amplifier

UNIT = pint.UnitRegistry()
V, A, OHM, W = UNIT.volt, UNIT.ampere, UNIT.ohm, UNIT.watt
VOLTS, LOAD, AMPERES, RESISTOR = (
    np.array([20.0, 25.0]) * V,
    np.array([8.0]) * OHM,
    np.array([0.05]) * A,
    0.22 * OHM,
)
VT = THERMAL_VOLTAGE * V
DEVICES = {"emitter_resistor": np.array([0.22]) * OHM, "idle_current": AMPERES, "thermal_voltage": VT}
LAWS = [
    {"law": Law.BIPOLAR},
    {"law": Law.DARLINGTON},
    {"law": Law.MOSFET},
    {"law": Law.MOSFET, "transconductance_parameter": np.array([3.0]) * A / V**2},
]

FORMULAS = [
    (
        stage.clipped_peak,
        {
            "side_voltage": VOLTS,
            "swing_loss": 2 * V,
            "load_magnitude": LOAD,
            "emitter_resistor": RESISTOR,
            "conducting": 2,
        },
        V,
    ),
    (stage.level_peak, {"clipping_peak": VOLTS, "fraction": 0.125}, V),
    (stage.load_power, {"peak": VOLTS, "load_magnitude": LOAD, "phase_angle": 30}, W),
    (
        stage.class_b_heat,
        {"half_supply": 30 * V, "peak": VOLTS, "load_magnitude": LOAD, "phase_angle": 30},
        W,
    ),
    (stage.worst_sine_peak, {"half_supply": VOLTS, "phase_angle": 30, "clipping_peak": VOLTS}, V),
    (stage.worst_resistive_heat, {"half_supply": VOLTS, "load": LOAD}, W),
    (stage.mean_supply_current, {"peak_current": AMPERES}, A),
    (
        stage.no_signal_heat,
        {"half_supply": VOLTS, "idle_current": AMPERES, "emitter_resistor": RESISTOR, "conducting": 2},
        W,
    ),
    (
        stage.worst_device_current,
        {
            "mean": AMPERES,
            "emitter_resistor": DEVICES["emitter_resistor"],
            "pairs": 2,
            "spread": 0.05 * V,
            "thermal_voltage": VT,
        },
        A,
    ),
    (
        safe_area.usable_power,
        {
            "power": np.array([150.0]) * W,
            "power_at": 298 * UNIT.kelvin,
            "junction_limit": 423 * UNIT.kelvin,
            "junction_to_case": 0.8 * UNIT.kelvin / W,
        },
        W,
    ),
    (safe_area.equivalent_resistance, {"load_magnitude": LOAD, "phase_angle": 45}, OHM),
    (
        safe_area.peak_dissipation,
        {"half_supply": VOLTS, "load_magnitude": LOAD, "phase_angle": 45},
        W,
    ),
]


def plain(values):
    return {key: getattr(value, "magnitude", value) for key, value in values.items()}


@pytest.mark.parametrize(("formula", "values", "unit"), FORMULAS, ids=lambda x: getattr(x, "__name__", ""))
def test_dimension_of_a_formula(formula, values, unit):
    assert formula(**values).to(unit).magnitude == pytest.approx(formula(**plain(values)))


@pytest.mark.parametrize("law", LAWS)
def test_dimension_of_the_class_ab_law_and_its_heat(law):
    x = stage.carrying_current(load_current=np.array([-1.0, 0.1, 2.0]) * A, **DEVICES, **law)
    assert np.all(x.to(A).magnitude >= 0)
    means = stage.mean_currents(peak_current=np.array([2.0]) * A, conducting=2, **DEVICES, **law)
    assert means.mean.check("[current]")
    assert means.mean_square.check("[current]**2")
    assert stage.mean_rail_current(peak_current=np.array([2.0]) * A, conducting=2, **DEVICES, **law).check(
        "[current]"
    )
    values = {"half_supply": np.array([30.0]) * V, "peak": VOLTS, "load_magnitude": LOAD, "conducting": 2}
    heat = stage.pair_heat(**values, phase_angle=30, **DEVICES, **law)
    numbers = stage.pair_heat(**plain(values | DEVICES | law), phase_angle=30)
    assert heat.to(W).magnitude == pytest.approx(numbers)


def test_dimension_of_a_load_in_series():
    magnitude, angle = stage.load_combination(impedance=LOAD, phase_angle=30, series_resistor=RESISTOR)
    assert magnitude.check("[resistance]")
    assert angle.to(UNIT.degree).magnitude == pytest.approx(29.23, abs=0.01)


def test_ratio_of_temperatures():
    k = UNIT.kelvin
    left = safe_area.derating(
        case_temperature=np.array([350.0]) * k, power_at=298 * k, junction_limit=423 * k
    )
    assert left.to("").magnitude == pytest.approx(73 / 125)


def test_noise_scales_as_a_power():
    heat = stage.noise_heat(half_supply=30, rms=10, load=8, clipping_peak=25)
    assert stage.noise_heat(half_supply=60, rms=20, load=8, clipping_peak=50) == pytest.approx(4 * heat)
    assert stage.noise_heat(half_supply=30, rms=10, load=16, clipping_peak=25) == pytest.approx(heat / 2)


def scaled(rating, volts, amperes):
    return replace(
        rating,
        current=rating.current * amperes,
        voltage=rating.voltage * volts,
        power=rating.power * volts * amperes,
        junction_to_case=rating.junction_to_case / (volts * amperes),
        points=tuple((v * volts, i * amperes) for v, i in rating.points),
    )


@pytest.mark.parametrize("seed", range(10))
@pytest.mark.parametrize("use", [safe_area.envelope_use, safe_area.angle_use])
def test_use_does_not_change_when_all_volts_and_all_amperes_are_scaled(use, seed):
    a, volts, amperes = random_amplifier(seed), 1.7, 0.6
    more = a | {
        "half_supply": a["half_supply"] * volts,
        "peak": a["peak"] * volts,
        "load_magnitude": a["load_magnitude"] * volts / amperes,
        "emitter_resistor": a["emitter_resistor"] * volts / amperes,
        "idle_current": a["idle_current"] * amperes,
        "thermal_voltage": THERMAL_VOLTAGE * volts,
        "rating": scaled(a["rating"], volts, amperes),
    }
    before, after = use(**a), use(**more)
    assert after.use == pytest.approx(float(before.use), rel=1e-6)
    assert after.voltage == pytest.approx(volts * float(before.voltage), rel=1e-6)
    assert after.current == pytest.approx(amperes * float(before.current), rel=1e-6)


def test_allowed_current_scales():
    volts = np.array([10.0, 50.0, 120.0])
    base = safe_area.allowed_current(voltage=volts, case_temperature=60, rating=DEVICE)
    more = safe_area.allowed_current(
        voltage=1.7 * volts, case_temperature=60, rating=scaled(DEVICE, 1.7, 0.6)
    )
    assert more == pytest.approx(0.6 * base)
