"""An output capacitor into a driver: cutoff, peak, and the travel of the cone at switch-on."""

import numpy as np
import pytest
from hypothesis import given as drawn
from hypothesis import settings
from hypothesis import strategies as st
from scipy import signal

from safeamp.physics import any_signal, capacitor, coupling
from safeamp.physics import driver as drivers
from safeamp.physics.driver import Driver

SWEEP = np.geomspace(0.5, 5000.0, 40001)


def woofer(inductance=0.0, *, resonance=40.0, q_electrical=0.4, q_mechanical=4.0):
    parts = drivers.motional_elements(
        dc_resistance=6.0, resonance=resonance, q_mechanical=q_mechanical, q_electrical=q_electrical
    )
    return Driver(6.0, parts, inductance)


@settings(deadline=None, max_examples=60)
@drawn(
    resonance=st.floats(20.0, 200.0),
    electrical=st.floats(0.2, 3.0),
    mechanical=st.floats(1.0, 15.0),
    farads=st.floats(200e-6, 5e-3),
    resistor=st.floats(0.0, 1.0),
    henries=st.sampled_from([0.0, 1e-7, 0.2e-3, 2e-3]),
)
def test_cutoff_and_peak_against_a_sweep(resonance, electrical, mechanical, farads, resistor, henries):
    driver = woofer(henries, resonance=resonance, q_electrical=electrical, q_mechanical=mechanical)
    more = {"driver": driver, "capacitance": farads, "series_resistor": resistor}
    level = coupling.response(frequency=SWEEP, **more)
    found = float(coupling.cutoff_frequency(**more))
    below = np.flatnonzero(level < np.sqrt(0.5))
    assert coupling.response(frequency=found, **more) == pytest.approx(np.sqrt(0.5), rel=1e-5)
    assert SWEEP[below[-1]] <= found * (1 + 1e-5)
    assert found <= SWEEP[below[-1] + 1] * (1 + 1e-5)
    low = (resonance / 30.0 <= SWEEP) & (5.0 * resonance >= SWEEP)
    peak, where = coupling.low_peak(**more)
    assert peak >= 20 * np.log10(np.max(level[low])) - 1e-9
    assert coupling.response(frequency=float(where), **more) == pytest.approx(10 ** (float(peak) / 20))


def test_far_above_the_resonance_the_mass_is_a_capacitor_in_series():
    # 20 uF in series with the motional capacitance of 265 uF into 6 ohm: 1426 Hz, far above 40 Hz
    driver = woofer()
    in_series = 1 / (1 / 20e-6 + 1 / driver.motional.capacitance)
    found = coupling.cutoff_frequency(driver=driver, capacitance=20e-6)
    alone = capacitor.cutoff_frequency(capacitance=in_series, load_resistance=6.0)
    assert float(found) == pytest.approx(float(alone), rel=1e-2)


def test_cases_in_one_pass_and_what_is_not_known():
    farads = np.array([680e-6, 1000e-6, np.nan, 2200e-6])
    found = coupling.cutoff_frequency(driver=woofer(), capacitance=farads)
    alone = [float(coupling.cutoff_frequency(driver=woofer(), capacitance=one)) for one in farads[[0, 1, 3]]]
    assert found[[0, 1, 3]] == pytest.approx(alone)
    assert np.isnan(found[2])
    mixed = Driver(6.0, woofer().motional, np.array([0.0, 1e-3]))
    both = coupling.cutoff_frequency(driver=mixed, capacitance=1000e-6)
    each = [coupling.cutoff_frequency(driver=woofer(henries), capacitance=1000e-6) for henries in (0.0, 1e-3)]
    assert both == pytest.approx(np.array(each))


def test_a_larger_capacitor_never_costs_bass():
    found = coupling.cutoff_frequency(driver=woofer(), capacitance=np.geomspace(100e-6, 20e-3, 200))
    assert np.all(np.diff(found) < 0)


def test_no_driver_inside_the_tolerances_costs_more_bass_than_their_corners():
    rng = np.random.default_rng(5)
    spread = np.array([0.1, 0.2, 0.25, 0.25, 0.2])

    def cutoff(given):
        coil, resonance, mechanical, electrical, farads = given.T
        parts = drivers.motional_elements(
            dc_resistance=coil, resonance=resonance, q_mechanical=mechanical, q_electrical=electrical
        )
        return coupling.cutoff_frequency(driver=Driver(coil, parts, 0.4e-3), capacitance=farads)

    for _ in range(40):
        low, high = np.array([3.0, 20.0, 1.0, 0.2, 3e-4]), np.array([8.0, 120.0, 10.0, 2.0, 5e-3])
        middle = low * (high / low) ** rng.uniform(0.0, 1.0, 5)
        ends = np.array(np.meshgrid(*np.stack([middle * (1 - spread), middle * (1 + spread)]).T)).reshape(
            5, -1
        )
        inside = middle * (1.0 + spread * rng.uniform(-1.0, 1.0, (500, 5)))
        assert np.max(cutoff(inside)) <= 1.01 * np.max(cutoff(ends.T))


def travel_in_time(driver, force, farads, midpoint, rise_time, resistor):
    """Return the largest travel by a simulation: states velocity, travel, capacitor; no inductance.

    i = (u - Bl v - q)/(R + r); M dv/dt = Bl i - R v - x/C; dq/dt = i/C_out.
    """
    mass, compliance = drivers.mechanics(force_factor=force, motional=driver.motional)
    friction, total = force**2 / driver.motional.resistance, driver.dc_resistance + resistor
    motion = [-(friction + force**2 / total) / mass, -1 / (mass * compliance), -force / (total * mass)]
    a = np.array([motion, [1.0, 0.0, 0.0], [-force / (total * farads), 0.0, -1 / (total * farads)]])
    b = np.array([[force / (total * mass)], [0.0], [1 / (total * farads)]])
    time = np.linspace(0.0, 0.4 + 2 * rise_time, 40001)
    ramp = midpoint * np.clip(time / rise_time, 0.0, 1.0)
    _, _, states = signal.lsim((a, b, np.eye(3), np.zeros((3, 1))), ramp, time)
    return float(np.max(np.abs(states[:, 1])))


@pytest.mark.parametrize("rise_time", [1e-4, 0.02, 0.3])
def test_travel_at_switch_on_against_a_simulation_in_time(rise_time):
    given = {"force_factor": 8.0, "capacitance": 1000e-6, "midpoint": 30.0, "rise_time": rise_time}
    found = coupling.turn_on_displacement(driver=woofer(), series_resistor=0.2, **given)
    wanted = travel_in_time(woofer(), 8.0, 1000e-6, 30.0, rise_time, 0.2)
    assert found == pytest.approx(wanted, rel=2e-3)


def test_a_step_moves_the_cone_most():
    given = {"driver": woofer(), "force_factor": 8.0, "capacitance": 1000e-6, "midpoint": 30.0}
    moved = [coupling.turn_on_displacement(rise_time=time, **given) for time in (0.0, 0.005, 0.05, 0.5)]
    assert moved == sorted(moved, reverse=True)
    assert moved[0] == pytest.approx(coupling.turn_on_displacement(rise_time=1e-7, **given), rel=1e-3)


def test_admittance_blocks_direct_current():
    top, bottom = any_signal.admittance(driver=woofer(), capacitance=1000e-6)
    assert np.polyval(top, 0.0) / np.polyval(bottom, 0.0) == 0.0


def test_ranges():
    with pytest.raises(ValueError, match="capacitance must be greater than zero, got 0"):
        coupling.cutoff_frequency(driver=woofer(), capacitance=0.0)
    with pytest.raises(ValueError, match="series_resistor must be zero or more, got -1"):
        coupling.low_peak(driver=woofer(), capacitance=1e-3, series_resistor=-1.0)
    with pytest.raises(ValueError, match="frequency must be greater than zero, got 0"):
        coupling.response(driver=woofer(), frequency=0.0, capacitance=1e-3)
    with pytest.raises(ValueError, match=r"rise_time must be zero or more, got -0\.1"):
        coupling.turn_on_displacement(
            driver=woofer(), force_factor=8.0, capacitance=1e-3, midpoint=30.0, rise_time=-0.1
        )
