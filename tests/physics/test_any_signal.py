"""The largest current of any signal: closed forms, random signals, and the signal that reaches it."""

import numpy as np
import pytest
from scipy import signal

from safeamp.physics import any_signal
from safeamp.physics import driver as drivers
from safeamp.physics._rational import fractions
from safeamp.physics.driver import Driver


def woofer(inductance=0.5e-3, *, q_electrical=0.4, q_mechanical=4.0):
    parts = drivers.motional_elements(
        dc_resistance=6.0, resonance=40.0, q_mechanical=q_mechanical, q_electrical=q_electrical
    )
    return Driver(6.0, parts, inductance)


def closed_form(driver, resonance, mechanical, electrical):
    """Return the norm of a driver without inductance.

    Y = 1/R - (1/(R^2 C)) s/(s^2 + c s + w^2) with c = w/Q_ms + w/Q_es. The step response of s/(s^2 + c s + w^2) is a
    decaying sine: it runs to G1, back through zero to -r G1, and so on, r = exp(-c pi/(2 wd)): its variation is
    2 G1/(1 - r). Without oscillation it runs up and down once: 2 G1.
    """
    turn = 2 * np.pi * resonance
    damping = turn / mechanical + turn / electrical
    below = damping**2 / 4 - turn**2
    if below > 0:
        fast, slow = damping / 2 + np.sqrt(below), damping / 2 - np.sqrt(below)
        top = np.log(fast / slow) / (fast - slow)
        variation = 2 * (np.exp(-slow * top) - np.exp(-fast * top)) / (fast - slow)
    else:
        ringing = np.sqrt(-below)
        top = np.arctan2(ringing, damping / 2) / ringing
        first = np.exp(-damping * top / 2) * np.sin(ringing * top) / ringing
        variation = 2 * first / (1 - np.exp(-damping * np.pi / (2 * ringing)))
    return (1 + turn / electrical * variation) / driver.dc_resistance


@pytest.mark.parametrize("electrical", [0.2, 0.4, 0.9, 3.0, 15.0])
@pytest.mark.parametrize("mechanical", [1.5, 4.0, 60.0])
def test_closed_form_without_inductance(electrical, mechanical):
    driver = woofer(0.0, q_electrical=electrical, q_mechanical=mechanical)
    wanted = closed_form(driver, 40.0, mechanical, electrical)
    assert any_signal.admittance_norm(driver=driver) == pytest.approx(wanted, rel=1e-6)


def test_the_direct_part_counts_without_inductance():
    assert any_signal.admittance_norm(driver=woofer(0.0)) > 1.0 / 6.0
    response = fractions(*any_signal.admittance(driver=woofer(0.0)))
    assert response.direct == pytest.approx(1.0 / 6.0)
    tiny = any_signal.admittance_norm(driver=woofer(1e-8))
    assert tiny == pytest.approx(float(any_signal.admittance_norm(driver=woofer(0.0))), rel=1e-3)


def test_a_double_pole_is_no_trap():
    # Q_ts = 1/2 exactly: c = 2 w, both poles at -w; step response t exp(-w t), variation 2/(e w)
    driver = woofer(0.0, q_electrical=1.0, q_mechanical=1.0)
    wanted = (1 + 2 / np.e) / 6.0
    assert any_signal.admittance_norm(driver=driver) == pytest.approx(wanted, rel=1e-5)


CIRCUITS = {
    "plain": {"driver": woofer()},
    "small coil": {"driver": woofer(0.05e-3, q_electrical=1.2)},
    "capacitor": {"driver": woofer(), "capacitance": 1000e-6, "series_resistor": 0.1},
    "no inductance": {"driver": woofer(0.0), "capacitance": 2200e-6},
}


def simulated(circuit, wave, step):
    """Return the current of a wave held between its samples, by the exact discrete circuit."""
    top, bottom = any_signal.admittance(**circuit)
    b, a, _ = signal.cont2discrete((top, bottom), step, method="zoh")
    return signal.lfilter(np.ravel(b), a, wave)


@pytest.mark.parametrize("name", CIRCUITS)
def test_never_below_random_signals_and_reached_by_the_signs_of_the_response(name):
    circuit, step = CIRCUITS[name], 100e-6
    bound = float(any_signal.largest_current(peak=1.0, **circuit))
    rng = np.random.default_rng(7)
    count = int(0.2 / step)
    worst = 0.0
    for cutoff in np.geomspace(50.0, 4000.0, 25):  # 25 bands of 400 signals, each filling the bound
        noise = rng.standard_normal((400, count))
        b, a = signal.butter(2, cutoff * 2 * step)
        waves = signal.lfilter(b, a, noise, axis=-1)
        waves = np.clip(waves / np.std(waves, axis=-1, keepdims=True), -1.0, 1.0)
        worst = max(worst, float(np.max(np.abs(simulated(circuit, waves, step)))))
    impulse = simulated(circuit, np.eye(1, 8 * count)[0], step)
    signs = np.sign(impulse)[::-1]
    reached = float(np.max(np.abs(simulated(circuit, signs, step))))
    assert worst <= bound * (1 + 1e-9)
    assert reached <= bound * (1 + 1e-6)
    assert reached >= 0.95 * bound


def test_more_than_any_sine_draws():
    driver = woofer()
    sweep = drivers.impedance(driver=driver, frequency=np.geomspace(1.0, 20e3, 4000))[0]
    assert any_signal.largest_current(peak=30.0, driver=driver) > 30.0 / np.min(sweep)


def test_series_resistor_and_several_drivers():
    one = any_signal.admittance_norm(driver=woofer())
    assert any_signal.admittance_norm(driver=woofer().scaled(0.5)) == pytest.approx(2.0 * float(one))
    assert any_signal.admittance_norm(driver=woofer(), series_resistor=1.0) < one


def test_cases_and_what_is_not_known():
    driver = Driver(np.array([6.0, 6.0, np.nan]), woofer().motional, np.array([0.0, 0.5e-3, 0.5e-3]))
    found = any_signal.admittance_norm(driver=driver)
    assert found[0] == pytest.approx(float(any_signal.admittance_norm(driver=woofer(0.0))))
    assert found[1] == pytest.approx(float(any_signal.admittance_norm(driver=woofer())))
    assert np.isnan(found[2])


def test_ranges():
    with pytest.raises(ValueError, match="series_resistor must be zero or more, got -1"):
        any_signal.admittance_norm(driver=woofer(), series_resistor=-1.0)
    with pytest.raises(ValueError, match="capacitance must be greater than zero, got 0"):
        any_signal.admittance_norm(driver=woofer(), capacitance=0.0)
    with pytest.raises(ValueError, match="peak must be zero or more, got -2"):
        any_signal.largest_current(peak=-2.0, driver=woofer())
    with pytest.raises(ValueError, match="degree of the numerator"):
        fractions([1.0, 0.0, 0.0], [1.0, 1.0])
    with pytest.raises(ValueError, match="every pole must die away"):
        fractions([1.0], [1.0, -1.0])
