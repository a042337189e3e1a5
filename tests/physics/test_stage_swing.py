"""Swing, level and load."""

import numpy as np
import pytest

from safeamp.physics import stage


def peak(**changes):
    given = {
        "side_voltage": 31.0,
        "swing_loss": 2.2,
        "load_magnitude": 8.0,
        "emitter_resistor": 0.33,
        "conducting": 1,
    }
    return stage.clipped_peak(**given | changes)


def test_resistor_and_load_divide_the_swing():
    assert peak() == pytest.approx(28.8 * 8 / 8.33)
    assert stage.load_power(peak=peak(), load_magnitude=8) == pytest.approx(47.8, abs=0.05)
    assert peak(emitter_resistor=0) == pytest.approx(28.8)
    assert peak(conducting=3) == pytest.approx(28.8 * 8 / 8.11)
    assert peak(load_magnitude=[8, 4]) == pytest.approx([27.659, 26.605], abs=1e-3)


def test_single_rail_takes_the_smaller_side():
    # 58 V rail, midpoint 30.4 V of 64 V scaled to 27.55 V; losses 3 V up, 2 V down; 0.47 ohm, 8 ohm
    middle = 30.4 * 58 / 64
    sides = peak(side_voltage=[58 - middle, middle], swing_loss=[3, 2], emitter_resistor=0.47)
    assert sides.min() ** 2 / 16 == pytest.approx(36.4, abs=0.05)


@pytest.mark.parametrize("loss", [31.0, 32.0])
def test_no_swing_left_is_refused(loss):
    with pytest.raises(ValueError, match=f"side_voltage less swing_loss must be .*, got {31 - loss}"):
        peak(swing_loss=loss)


def test_just_some_swing_is_left():
    assert peak(swing_loss=30.999) == pytest.approx(0.001 * 8 / 8.33)
    assert np.isnan(peak(swing_loss=np.nan))


@pytest.mark.parametrize("name", ["side_voltage", "load_magnitude"])
def test_zero_is_refused(name):
    with pytest.raises(ValueError, match=f"{name} must be greater than zero, got 0"):
        peak(**{name: 0})


def test_series_parts_belong_to_the_load():
    magnitude, angle = stage.load_combination(impedance=8, phase_angle=45, series_resistor=0.5)
    z = 8 * np.exp(1j * np.pi / 4) + 0.5
    assert (magnitude, angle) == (pytest.approx(abs(z)), pytest.approx(np.angle(z, deg=True)))
    # 1000 uF at 20 Hz in series with 8 ohm: 11.3 ohm at -45 deg
    reactance = -1 / (2 * np.pi * 20 * 1000e-6)
    magnitude, angle = stage.load_combination(impedance=8, phase_angle=0, series_reactance=reactance)
    assert (magnitude, angle) == (pytest.approx(11.3, abs=0.05), pytest.approx(-45.0, abs=0.5))
    with pytest.raises(ValueError, match=r"series_resistor must be zero or more, got -0.1"):
        stage.load_combination(impedance=8, phase_angle=0, series_resistor=-0.1)


def test_level_goes_with_the_root_of_the_power():
    levels = stage.level_peak(clipping_peak=20, fraction=[0, 1 / 8, 1 / 3, 1])
    power = stage.load_power(peak=levels, load_magnitude=8)
    assert power == pytest.approx([0, 25 / 8, 25 / 3, 25])
    assert stage.load_power(peak=20, load_magnitude=8, phase_angle=60) == pytest.approx(12.5)
    for fraction in (-0.001, 1.001):
        with pytest.raises(ValueError, match=f"fraction must be between 0 and 1, got {fraction}"):
            stage.level_peak(clipping_peak=20, fraction=fraction)


def test_worst_level_of_a_sine_becomes_full_swing():
    # 2/(pi*cos(angle)) reaches 1 at 50.46 deg
    below, above = (
        stage.worst_sine_peak(half_supply=10, phase_angle=a, clipping_peak=10) for a in (50.40, 50.52)
    )
    assert below < 10 == above
    assert stage.worst_sine_peak(half_supply=10, phase_angle=90, clipping_peak=9) == 9
