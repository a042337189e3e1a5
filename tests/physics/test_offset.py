"""Standing DC at a loudspeaker."""

import numpy as np
import pytest

from safeamp.physics import offset
from tests.published_cases import given, printed


def test_published_allowed_dc():
    values = given("offset-3")
    driver = {"force_factor": values["force_factor"], "compliance": 1.34e-3, "dc_resistance": values["coil"]}
    found = offset.allowed_dc(linear_excursion=6.5e-3, share=values["share"], **driver)
    assert found == printed("offset-3", "allowed_dc")
    moved = offset.cone_displacement(voltage=found, **driver)
    assert moved == pytest.approx(0.1 * 6.5e-3)


def test_published_fault_current():
    values = given("offset-4")
    found = offset.coil_current(voltage=values["rail"], dc_resistance=values["coil"])
    assert found == printed("offset-4", "current")


def test_published_detector():
    values = given("offset-5")
    found = offset.detector_threshold(**values)
    assert found == printed("offset-5", "threshold")
    back = offset.detector_delay(time_constant=1.0, step=32.0, threshold=found)
    assert back == pytest.approx(values["trip_after"])


@pytest.mark.parametrize(
    ("volts", "amperes", "watts"), [(0, 0, 0), (0.05, 0.01, 5e-4), (-0.05, -0.01, 5e-4), (10, 2, 20)]
)
def test_coil_current_and_heat(volts, amperes, watts):
    # Derived: Ohm and Joule at 5 ohm; the sign of the heat does not follow the voltage.
    assert offset.coil_current(voltage=volts, dc_resistance=5) == pytest.approx(amperes)
    assert offset.coil_power(voltage=volts, dc_resistance=5) == pytest.approx(watts)


@pytest.mark.parametrize(("volts", "millimetres"), [(1, 2), (-1, -2), (0, 0), (0.05, 0.1), (3, 6)])
def test_cone_displacement(volts, millimetres):
    # Derived: 10 N/A x V/5 ohm x 1 mm/N.
    found = offset.cone_displacement(voltage=volts, dc_resistance=5, force_factor=10, compliance=1e-3)
    assert found == pytest.approx(millimetres * 1e-3)


def test_detector_delays():
    # Derived: at 63.2 % one time constant, at half ln 2; at or above the step never.
    thresholds = np.array([32 * (1 - np.exp(-1)), 16, 31.999999, 32, 40])
    found = offset.detector_delay(time_constant=0.5, step=32, threshold=thresholds)
    assert list(found[:2]) == pytest.approx([0.5, 0.5 * np.log(2)])
    assert 5 < found[2] < np.inf
    assert list(found[3:]) == [np.inf, np.inf]


def test_detector_threshold_ends():
    found = offset.detector_threshold(time_constant=1, step=32, trip_after=[0, 1, 1e6])
    assert list(found) == pytest.approx([0, 32 * (1 - np.exp(-1)), 32])
