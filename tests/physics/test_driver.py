"""A driver as a circuit: its parameters both ways, its impedance against a simulation, its travel."""

import numpy as np
import pytest
from hypothesis import given as drawn
from hypothesis import settings
from hypothesis import strategies as st
from scipy import signal

from safeamp.physics import driver as drivers
from safeamp.physics import offset
from safeamp.physics.driver import Driver, Motional
from tests.published_cases import given, printed

#: Published: R_e, f_s, Q_ms, Q_es of one driver.
OF_TEXT = given("loudspeaker-2")
PARAMETERS = {
    "dc_resistance": OF_TEXT["coil"],
    "resonance": OF_TEXT["resonance"],
    "q_mechanical": OF_TEXT["q_mechanical"],
    "q_electrical": OF_TEXT["q_electrical"],
}


def woofer(inductance=0.0):
    """Return a woofer: 6 ohm, 40 Hz, Q 4 and 0.4."""
    parts = drivers.motional_elements(dc_resistance=6.0, resonance=40.0, q_mechanical=4.0, q_electrical=0.4)
    return Driver(6.0, parts, inductance)


def test_published_motional_elements():
    parts = drivers.motional_elements(**PARAMETERS)
    assert parts.resistance == printed("loudspeaker-2", "parallel_resistance")
    assert parts.capacitance == printed("loudspeaker-2", "parallel_capacitance")
    assert parts.inductance == printed("loudspeaker-2", "parallel_inductance")


def test_published_impedance_at_resonance():
    quick = {name: PARAMETERS[name] for name in ("dc_resistance", "q_mechanical", "q_electrical")}
    assert drivers.impedance_at_resonance(**quick) == printed("loudspeaker-2", "impedance_at_resonance")
    whole = Driver(PARAMETERS["dc_resistance"], drivers.motional_elements(**PARAMETERS))
    magnitude, angle = drivers.impedance(driver=whole, frequency=PARAMETERS["resonance"])
    assert magnitude == printed("loudspeaker-2", "impedance_at_resonance")
    assert angle == pytest.approx(0.0, abs=1e-9)


@settings(deadline=None)
@drawn(
    coil=st.floats(2.0, 16.0),
    resonance=st.floats(15.0, 2000.0),
    mechanical=st.floats(0.5, 20.0),
    electrical=st.floats(0.1, 5.0),
    force=st.floats(1.0, 30.0),
)
def test_parameters_come_back_by_every_way(coil, resonance, mechanical, electrical, force):
    parts = drivers.motional_elements(
        dc_resistance=coil, resonance=resonance, q_mechanical=mechanical, q_electrical=electrical
    )
    back = drivers.small_signal_parameters(dc_resistance=coil, motional=parts)
    assert back == pytest.approx((resonance, mechanical, electrical))
    mass, compliance = drivers.mechanics(force_factor=force, motional=parts)
    again = drivers.motional_from_mechanics(
        force_factor=force, moving_mass=mass, compliance=compliance, q_mechanical=mechanical
    )
    assert again.resistance == pytest.approx(parts.resistance)
    assert again.capacitance == pytest.approx(parts.capacitance)
    assert again.inductance == pytest.approx(parts.inductance)
    assert drivers.free_resonance(moving_mass=mass, compliance=compliance) == pytest.approx(resonance)
    q = drivers.electrical_q(dc_resistance=coil, force_factor=force, moving_mass=mass, resonance=resonance)
    assert q == pytest.approx(electrical)


def states(driver, force):
    """Return the driver in time, current as output: states coil current, velocity, travel (inductance > 0).

    Newton: M dv/dt = Bl i - R v - x/C; coil: L di/dt = u - R i - Bl v.
    """
    mass, compliance = drivers.mechanics(force_factor=force, motional=driver.motional)
    friction = force**2 / driver.motional.resistance
    coil = [-driver.dc_resistance / driver.inductance, -force / driver.inductance, 0.0]
    motion = [force / mass, -friction / mass, -1.0 / (mass * compliance)]
    a = np.array([coil, motion, [0.0, 1.0, 0.0]])
    return a, np.array([[1.0 / driver.inductance], [0.0], [0.0]])


@pytest.mark.parametrize("frequency", [15.0, 40.0, 47.0, 200.0, 1000.0])
def test_impedance_and_travel_against_a_simulation_in_time(frequency):
    driver, force = woofer(0.5e-3), 8.0
    a, b = states(driver, force)
    time = np.arange(0.0, 0.6, min(1.0 / frequency / 400.0, 1e-4))
    wave = np.sin(2 * np.pi * frequency * time)
    _, output, _ = signal.lsim((a, b, np.eye(3), np.zeros((3, 1))), wave, time)
    late = time > time[-1] - np.floor(0.2 * frequency) / frequency
    turn = np.exp(-2j * np.pi * frequency * time[late])
    current, _, travel = (2j * np.mean(output[late] * turn[:, None], axis=0)).tolist()
    magnitude, angle = drivers.impedance(driver=driver, frequency=frequency)
    assert 1.0 / abs(current) == pytest.approx(float(magnitude), rel=5e-3)
    assert -np.rad2deg(np.angle(current)) == pytest.approx(float(angle), abs=0.4)
    moved = drivers.excursion(driver=driver, force_factor=force, peak=1.0, frequency=frequency)
    assert abs(travel) == pytest.approx(float(moved), rel=5e-3)


def test_direct_voltage_moves_the_cone_as_the_offset_does():
    values = given("offset-3")
    parts = drivers.motional_from_mechanics(
        force_factor=values["force_factor"], moving_mass=0.03, compliance=1.34e-3, q_mechanical=5.0
    )
    moved = drivers.excursion(
        driver=Driver(values["coil"], parts), force_factor=values["force_factor"], peak=0.325, frequency=0.0
    )
    assert moved == pytest.approx(0.1 * 6.5e-3, rel=2e-3)
    alone = offset.cone_displacement(
        voltage=0.325, dc_resistance=values["coil"], force_factor=values["force_factor"], compliance=1.34e-3
    )
    assert moved == pytest.approx(float(alone))


def test_complex_impedance_is_that_of_a_ladder_of_elements():
    driver, turn = woofer(0.5e-3), 2j * np.pi * 55.0
    branch = 1 / (1 / 60.0 + turn * driver.motional.capacitance + 1 / (turn * driver.motional.inductance))
    found = drivers.complex_impedance(driver=driver, frequency=55.0)
    assert found == pytest.approx(complex(6.0 + turn * 0.5e-3 + branch))


def test_impedance_at_the_ends_of_the_band():
    magnitude, angle = drivers.impedance(driver=woofer(0.5e-3), frequency=[0.0, 1e5])
    assert magnitude[0] == pytest.approx(6.0)
    assert angle[0] == pytest.approx(0.0)
    assert magnitude[1] == pytest.approx(2 * np.pi * 1e5 * 0.5e-3, rel=1e-3)
    assert angle[1] == pytest.approx(90.0, abs=2.0)


@pytest.mark.parametrize("electrical", [0.3, 1.0, 3.0, 12.0])
@pytest.mark.parametrize(("lowest", "highest"), [(20.0, 80.0), (45.0, 80.0), (5.0, 12.0)])
def test_largest_travel_against_a_dense_sweep(electrical, lowest, highest):
    parts = drivers.motional_elements(
        dc_resistance=6.0, resonance=40.0, q_mechanical=6.0, q_electrical=electrical
    )
    driver = Driver(6.0, parts)
    sweep = drivers.excursion(
        driver=driver, force_factor=8.0, peak=20.0, frequency=np.linspace(lowest, highest, 20001)
    )
    found = drivers.largest_excursion(
        driver=driver, force_factor=8.0, peak=20.0, lowest=lowest, highest=highest
    )
    assert float(found) == pytest.approx(float(np.max(sweep)), rel=1e-6)
    assert float(found) >= float(np.max(sweep)) * (1 - 1e-12)


def test_two_in_series_and_two_in_parallel():
    one, frequency = woofer(0.5e-3), np.array([20.0, 40.0, 60.0, 1000.0])
    alone, angle = drivers.impedance(driver=one, frequency=frequency)
    for factor in (2.0, 0.5):
        both, same = drivers.impedance(driver=one.scaled(factor), frequency=frequency)
        assert both == pytest.approx(factor * alone)
        assert same == pytest.approx(angle)


def test_cases_broadcast_against_frequencies():
    parts = drivers.motional_elements(
        dc_resistance=np.array([[4.0], [8.0]]), resonance=40.0, q_mechanical=4.0, q_electrical=0.4
    )
    magnitude, _ = drivers.impedance(
        driver=Driver(np.array([[4.0], [8.0]]), parts), frequency=[10.0, 40.0, 90.0]
    )
    assert magnitude.shape == (2, 3)
    assert magnitude[:, 1] == pytest.approx([44.0, 88.0])


@pytest.mark.parametrize("name", PARAMETERS)
def test_what_no_driver_has_is_refused(name):
    with pytest.raises(ValueError, match=f"{name} must be greater than zero, got 0"):
        drivers.motional_elements(**{**PARAMETERS, name: 0.0})


def test_ranges():
    with pytest.raises(ValueError, match=r"frequency must be zero or more, got -1"):
        drivers.impedance(driver=woofer(), frequency=-1.0)
    with pytest.raises(ValueError, match=r"highest must be at least lowest, got 10"):
        drivers.largest_excursion(driver=woofer(), force_factor=8.0, peak=1.0, lowest=20.0, highest=10.0)
    with pytest.raises(ValueError, match="factor must be greater than zero, got 0"):
        woofer().scaled(0.0)
    with pytest.raises(ValueError, match="motional_capacitance must be greater than zero, got 0"):
        drivers.mechanics(force_factor=8.0, motional=Motional(1.0, 0.0, 1.0))
