"""Idle current from readings, and how parallel devices share it."""

import numpy as np
import pytest

from safeamp.physics import bias
from tests.published_cases import given, printed


def test_published_optimum():
    found = bias.oliver_idle(emitter_resistor=given("bias-1")["resistor"])
    assert printed("bias-1", "idle_optimum") == list(found)


def test_published_readings():
    values = given("bias-2")
    found = bias.idle_current(drop=values["drop"], emitter_resistor=values["resistor"])
    assert printed("bias-2", "idle") == list(found)


@pytest.mark.parametrize(
    ("current", "resistor", "share"),
    [
        (1.0, 0.22, 0.050 / 0.245693),  # Derived: Vt = 25.693 mV at 25 degC, so 50 mV over 220 + 25.693 mV.
        (0.1, 0.22, 0.050 / 0.047693),
        (5.0, 0.1, 0.050 / 0.525693),
        (0.0, 0.22, 0.050 / 0.025693),
        (1.0, 0.0, 1.0),  # Without a resistor the worst device is taken to carry twice the mean.
        (0.0, 0.0, 1.0),
    ],
)
def test_imbalance(current, resistor, share):
    found = bias.current_imbalance(current=current, emitter_resistor=resistor)
    assert found == pytest.approx(share, rel=1e-4)


def test_imbalance_is_the_linear_law_of_resistor_and_junction():
    # Derived: dI = 50 mV / (Re + Vt/I), as a share of I.
    mean, resistor, voltage = 0.7, 0.33, 0.0257
    found = bias.current_imbalance(current=mean, emitter_resistor=resistor, thermal_voltage=voltage)
    assert found * mean == pytest.approx(0.050 / (resistor + voltage / mean))


def test_imbalance_falls_with_current_and_resistor():
    currents = bias.current_imbalance(current=np.array([0.1, 1, 10]), emitter_resistor=0.22)
    resistors = bias.current_imbalance(current=1, emitter_resistor=np.array([0.1, 0.22, 0.47]))
    assert np.all(np.diff(currents) < 0)
    assert np.all(np.diff(resistors) < 0)
