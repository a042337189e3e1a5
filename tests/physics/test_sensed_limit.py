"""A limiter from its resistors, and the voltage that makes one device the odd one out."""

import numpy as np
import pytest

from safeamp.physics.bias import control_difference
from safeamp.physics.limiter import closing_voltage, sensed_limit
from safeamp.physics.safe_area import limiter_current
from tests.published_cases import given, printed

NETWORK = {"to_emitter": 330.0, "to_output": 1000.0, "to_rail": 22e3}


def test_published_dual_slope_follows_from_its_resistors():
    # The sheet's limiter has no resistor to the output: full threshold at 3 A, zero at 60 V by the one to the rail.
    sheet = given("limiter-1")
    resistor = sheet["phi"] / sheet["il"]
    network = {"to_emitter": 1e3, "to_output": np.inf, "to_rail": 1e3 * (sheet["vm"] / sheet["phi"] - 1.0)}
    assert float(closing_voltage(**network)) == pytest.approx(sheet["vm"])
    shorted = sensed_limit(voltage=sheet["vb"], emitter_resistor=resistor, **network)
    assert float(shorted) == printed("limiter-1", "shorted_current")


def test_nodal_equation_holds_at_the_limit():
    for volts in (0.0, 10.0, 40.0):
        x = float(sensed_limit(voltage=volts, emitter_resistor=0.22, **NETWORK))
        base = 0.65
        into = (x * 0.22 - base) / 330.0 + (volts + x * 0.22 - base) / 22e3
        assert into == pytest.approx(base / 1000.0, rel=1e-12)


def test_without_a_resistor_to_the_rail_it_is_flat():
    flat = sensed_limit(voltage=[0.0, 30.0, 90.0], emitter_resistor=0.22, **NETWORK | {"to_rail": np.inf})
    np.testing.assert_allclose(flat, 0.65 * (1330.0 / 1000.0) / 0.22)


def test_two_points_make_the_whole_line_and_none_below_zero():
    top = float(sensed_limit(voltage=0.0, emitter_resistor=0.22, **NETWORK))
    end = float(closing_voltage(**NETWORK))
    volts = np.linspace(0.0, 1.2 * end, 25)
    line = limiter_current(voltage=volts, points=((0.0, top), (end, 0.0)))
    np.testing.assert_allclose(
        sensed_limit(voltage=volts, emitter_resistor=0.22, **NETWORK), line, atol=1e-12 * top
    )


def test_difference_that_the_odd_device_needs():
    # 0.22 ohm, 120 mA beside 100 mA: 25.69 mV * ln 1.2 = 4.68 mV and 4.4 mV in the resistor.
    found = control_difference(current=0.12, mean=0.1, emitter_resistor=0.22)
    assert float(found) == pytest.approx(25.69e-3 * np.log(1.2) + 4.4e-3, rel=1e-3)
    two = control_difference(current=0.12, mean=0.1, emitter_resistor=0.22, junctions=2.0)
    assert float(two - found) == pytest.approx(25.69e-3 * np.log(1.2), rel=1e-3)


def test_both_devices_at_one_base_voltage():
    # Backwards: a device with that much less V_BE carries just that current beside the mean one.
    difference = float(control_difference(current=0.08, mean=0.1, emitter_resistor=0.33))
    assert difference < 0.0
    vt = 1.380649e-23 * 298.15 / 1.602176634e-19
    drop_of_mean = vt * np.log(0.1) + 0.33 * 0.1
    drop_of_odd = vt * np.log(0.08) + 0.33 * 0.08
    assert drop_of_odd - difference == pytest.approx(drop_of_mean, rel=1e-12)
