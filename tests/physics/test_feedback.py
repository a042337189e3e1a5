"""Thermal feedback at idle: index at the set point."""

import numpy as np
import pytest
from scipy.optimize import brentq

from safeamp.physics import bias

CHAIN = {"junction_to_case": 0.70, "case_to_sink": 0.45, "sink_to_air": 1.5, "conducting": 1, "shared_by": 1}
FLAT = {"sensor": "none", "tracking": 0.8}
MOSFET = {"source_resistor": 0.22, "transconductance_parameter": 3.0, "drift": 6.4e-3}


@pytest.mark.parametrize(
    ("sensor", "tracking", "resistance"),
    [
        ("none", 0.0, 0.70 + 0.45 + 3.0),  # Derived: both devices heat the sink, 2 x 1.5 K/W.
        ("none", 1.0, 4.15),
        ("heatsink", 0.8, 0.70 + 0.45 + 0.6),
        ("heatsink", 1.0, 0.70 + 0.45),
        ("heatsink", 0.0, 4.15),
        ("device", 0.8, 0.70 + 0.2 * 3.45),
        ("device", 1.0, 0.70),
        ("device", 1.5, 0.70 - 0.5 * 3.45),
    ],
)
def test_seen_resistance(sensor, tracking, resistance):
    found = bias.seen_resistance(**CHAIN, sensor=sensor, tracking=tracking)
    assert found == pytest.approx(resistance)


@pytest.mark.parametrize(
    ("conducting", "shared_by", "resistance"), [(1, 1, 3), (2, 1, 6), (2, 2, 12), (1, 0.5, 1.5), (4, 2, 24)]
)
def test_sink_resistance(conducting, shared_by, resistance):
    # Derived: 2 n devices on each of the stages heat one 1.5 K/W; one heatsink a device is half a pair.
    found = bias.sink_resistance(sink_to_air=1.5, conducting=conducting, shared_by=shared_by)
    assert found == pytest.approx(resistance)


def test_refuses_unknown_sensors_and_tracking():
    with pytest.raises(ValueError, match="'driver' is not a valid Sensor"):
        bias.untracked(sensor="driver", tracking=0.8)
    for tracking in (-0.01, 2.01):
        with pytest.raises(ValueError, match=f"^tracking must be between 0 and 2, got {tracking}$"):
            bias.untracked(sensor="none", tracking=tracking)


@pytest.mark.parametrize(
    ("milliamperes", "index"), [(20, 0.44), (30, 0.54), (50, 0.68), (100, 0.91), (150, 1.08), (124, 1.0)]
)
def test_index_of_vertical_mosfets_in_a_flat_bias(milliamperes, index):
    # Derived by hand at 100 mA: gm = sqrt(2*3*0.1) = 0.775 S, 0.775/(1 + 0.170) * 6.4 mV/K = 4.236 mA/K,
    # times 52 V and 4.15 K/W is 0.914.
    slope = bias.current_slope_mosfet(current=milliamperes * 1e-3, **MOSFET)
    seen = bias.seen_resistance(**CHAIN, **FLAT)
    found = bias.loop_index(device_voltage=52, seen_resistance=seen, current_slope=slope)
    assert found == pytest.approx(index, abs=0.005)


@pytest.mark.parametrize("amperes", [0.005, 0.02, 0.1, 1.0, 5.0])
def test_bipolar_slope_is_that_of_the_solved_device(amperes):
    # Derived: V = Vt ln(I/Is) + Re I; a drop of 2 mV in the junction voltage is made up by the current.
    def control(current):
        return 0.0257 * np.log(current / amperes) + 0.22 * (current - amperes)

    hotter = brentq(lambda current: control(current) - 2e-6, amperes * 0.9, amperes * 1.1, xtol=1e-15)
    slope = bias.current_slope_bipolar(current=amperes, emitter_resistor=0.22, thermal_voltage=0.0257)
    assert (hotter - amperes) / 1e-3 == pytest.approx(slope, rel=1e-3)


@pytest.mark.parametrize("amperes", [0.005, 0.02, 0.1, 1.0, 5.0])
def test_mosfet_slope_is_that_of_the_solved_device(amperes):
    def control(current):
        return np.sqrt(2 * current / 3) + 0.22 * current

    hotter = brentq(
        lambda current: control(current) - control(amperes) - 6.4e-6, amperes * 0.9, amperes * 1.1, xtol=1e-15
    )
    slope = bias.current_slope_mosfet(current=amperes, **MOSFET)
    assert (hotter - amperes) / 1e-3 == pytest.approx(slope, rel=1e-3)


def test_slope_without_resistor_and_with_reversed_drift():
    # Derived: I d / Vt = 0.1 x 2 mV / 25.7 mV; a device whose current falls with heat has a negative index.
    bare = bias.current_slope_bipolar(current=0.1, emitter_resistor=0, thermal_voltage=0.0257)
    assert bare == pytest.approx(0.1 * 0.002 / 0.0257)
    falling = bias.current_slope_mosfet(**{**MOSFET, "drift": -3e-3}, current=0.1)
    assert bias.loop_index(device_voltage=50, seen_resistance=2, current_slope=falling) < 0
