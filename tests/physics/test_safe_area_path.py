"""The path of a load through the plane of voltage and current: by hand at three angles, and as the search sees it."""

import numpy as np
import pytest

from safeamp.physics.safe_area import Rating, angle_path, angle_use, envelope_path, envelope_use
from safeamp.physics.stage import Law

#: 30 V, 24 V peak into 8 ohm: 3 A at most, in one device without idle current.
STAGE = {
    "half_supply": 30.0,
    "peak": 24.0,
    "load_magnitude": 8.0,
    "conducting": 1.0,
    "emitter_resistor": 0.0,
    "idle_current": 0.0,
    "law": Law.BIPOLAR,
    "imbalance": 0.0,
}
RATING = Rating(
    current=10.0, power=100.0, power_at=25.0, junction_limit=150.0, junction_to_case=None, voltage=160.0
)


def test_a_resistor_runs_along_its_load_line():
    """Derived: at the output voltage v the device has 30 - v across it and v/8 through it."""
    voltage, current = envelope_path(output_angle=np.array([0.0, 30.0, 90.0]), phase_angle=0.0, **STAGE)
    np.testing.assert_allclose(voltage, [30.0, 18.0, 6.0], rtol=1e-12)
    np.testing.assert_allclose(current, [0.0, 1.5, 3.0], atol=1e-12)


def test_an_angle_lets_the_peak_current_flow_before_the_peak_voltage():
    """Derived: within 45 deg the current 3 A sin(min(90, t + 45)) is whole from t = 45 deg on."""
    voltage, current = envelope_path(
        output_angle=np.array([-45.0, 0.0, 45.0, 90.0]), phase_angle=-45.0, **STAGE
    )
    root = np.sqrt(0.5)
    np.testing.assert_allclose(voltage, [30 + 24 * root, 30.0, 30 - 24 * root, 6.0], rtol=1e-12)
    np.testing.assert_allclose(current, [0.0, 3 * root, 3.0, 3.0], atol=1e-12)


def test_the_worst_point_of_the_search_lies_on_the_path():
    given = {**STAGE, "emitter_resistor": 0.22, "idle_current": 0.05}
    worst = envelope_use(phase_angle=45.0, case_temperature=70.0, rating=RATING, **given)
    voltage, current = envelope_path(output_angle=np.linspace(-90.0, 90.0, 7201), phase_angle=45.0, **given)
    assert np.interp(worst.voltage, voltage[::-1], current[::-1]) == pytest.approx(worst.current, rel=1e-4)


def test_one_angle_lets_the_current_fall_again_before_the_voltage_peak():
    """Derived: at 60 deg the current 3 A sin(t + 60) is whole at t = 30 deg and half at the peak of the voltage."""
    voltage, current = angle_path(output_angle=np.array([-60.0, 30.0, 90.0]), phase_angle=60.0, **STAGE)
    np.testing.assert_allclose(voltage, [30 + 24 * np.sqrt(0.75), 18.0, 6.0], rtol=1e-12)
    np.testing.assert_allclose(current, [0.0, 3.0, 1.5], atol=1e-12)


def test_the_worst_point_of_one_angle_lies_on_its_path():
    given = {**STAGE, "emitter_resistor": 0.22, "idle_current": 0.05}
    worst = angle_use(phase_angle=60.0, case_temperature=70.0, rating=RATING, **given)
    voltage, current = angle_path(output_angle=np.linspace(-90.0, 90.0, 7201), phase_angle=60.0, **given)
    assert np.interp(worst.voltage, voltage[::-1], current[::-1]) == pytest.approx(worst.current, rel=1e-4)


@pytest.mark.parametrize("angle", [-90.001, 90.001])
def test_an_angle_outside_the_half_cycle_is_refused(angle):
    with pytest.raises(ValueError, match=r"output_angle must be"):
        envelope_path(output_angle=angle, phase_angle=0.0, **STAGE)
