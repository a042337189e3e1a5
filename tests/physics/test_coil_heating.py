"""Voice coil on a rail: two heat stages against an independent integrator."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp
from scipy.linalg import expm

from safeamp.physics import loudspeaker
from safeamp.physics.coil_heating import _Coil

COIL = {
    "voltage": 35.0,
    "dc_resistance": 6.0,
    "coil_to_magnet": 2.0,
    "coil_time_constant": 4.0,
    "magnet_to_air": 1.5,
    "magnet_time_constant": 900.0,
    "start": 25.0,
    "air": 25.0,
}
STEADY = ("voltage", "dc_resistance", "coil_to_magnet", "magnet_to_air", "air")


def integrated(coil, until, limit=np.inf):
    """Coil temperature at `until`, and the time at which it crossed the limit, by scipy's LSODA."""
    coil_capacity = coil["coil_time_constant"] / coil["coil_to_magnet"]
    magnet_capacity = coil["magnet_time_constant"] / coil["magnet_to_air"]

    def slope(_, temperatures):
        voice, magnet = temperatures
        resistance = coil["dc_resistance"] * (1 + 0.00393 * (voice - 20))
        across = (voice - magnet) / coil["coil_to_magnet"]
        return [
            (coil["voltage"] ** 2 / resistance - across) / coil_capacity,
            (across - (magnet - coil["air"]) / coil["magnet_to_air"]) / magnet_capacity,
        ]

    def crossing(_, temperatures):
        return temperatures[0] - limit

    crossing.terminal = True
    run = solve_ivp(
        slope,
        (0, until),
        [coil["start"]] * 2,
        "LSODA",
        events=crossing,
        rtol=1e-8,
        atol=1e-8,
        first_step=1e-6,
    )
    return run.y[0, -1], run.t_events[0][0] if run.t_events[0].size else np.inf


@pytest.mark.parametrize("volts", [2, 8, 15, 20, 25, 35, 60, 120, 400])
@pytest.mark.parametrize("limit", [60.0, 180.0, 300.0])
def test_time_to_the_limit_agrees_with_an_integrator(volts, limit):
    coil = {**COIL, "voltage": float(volts)}
    _, wanted = integrated(coil, 60000, limit)
    found = loudspeaker.time_to_temperature(**coil, limit=limit)
    assert found == pytest.approx(wanted, rel=0.005)


@pytest.mark.parametrize("time", [0.0, 0.01, 0.5, 4.0, 60.0, 900.0, 20000.0])
@pytest.mark.parametrize("volts", [0, 8, 35, 120])
def test_temperature_agrees_with_an_integrator(time, volts):
    coil = {**COIL, "voltage": float(volts), "start": 40.0}
    wanted, _ = integrated(coil, time) if time else (40.0, None)
    found = loudspeaker.fault_coil_temperature(**coil, time=time)
    assert found - 25 == pytest.approx(wanted - 25, rel=0.005, abs=0.01)


@settings(deadline=None, max_examples=40)
@given(
    volts=st.floats(3, 100),
    ohms=st.floats(2, 12),
    inner=st.floats(0.5, 8),
    fast=st.floats(0.5, 30),
    outer=st.floats(0.2, 5),
    slow=st.floats(60, 5000),
    start=st.floats(15, 120),
    limit=st.floats(125, 280),
)
def test_random_coils_agree_with_an_integrator(volts, ohms, inner, fast, outer, slow, start, limit):
    coil = {
        "voltage": volts,
        "dc_resistance": ohms,
        "coil_to_magnet": inner,
        "coil_time_constant": fast,
        "magnet_to_air": outer,
        "magnet_time_constant": slow,
        "start": start,
        "air": 25.0,
    }
    _, wanted = integrated(coil, 40 * (slow + (1 + outer / inner) * fast), limit)
    found = loudspeaker.time_to_temperature(**coil, limit=limit)
    if np.isinf(wanted) or np.isinf(found):
        # A coil that ends within a hair of its limit may fall on either side of it.
        end = loudspeaker.settled_coil_temperature(**{name: coil[name] for name in STEADY})
        assert found == wanted or end == pytest.approx(limit, abs=0.01)
        return
    # Near the end temperature the time hangs on a hundredth of a kelvin: compare the temperature there.
    near, _ = integrated(coil, found)
    assert found == pytest.approx(wanted, rel=0.005) or near == pytest.approx(limit, abs=0.2)


def test_the_end_temperature_closes_the_balance():
    steady = {name: COIL[name] for name in STEADY}
    end = loudspeaker.settled_coil_temperature(**steady)
    # Derived: V^2/R(T) through both resistances is the rise.
    power = 35**2 / (6 * (1 + 0.00393 * (end - 20)))
    assert end - 25 == pytest.approx(power * 3.5)
    assert loudspeaker.fault_coil_temperature(**COIL, time=1e5) == pytest.approx(end, abs=1e-3)


def test_a_limit_at_the_end_temperature():
    end = loudspeaker.settled_coil_temperature(**{name: COIL[name] for name in STEADY})
    assert loudspeaker.time_to_temperature(**COIL, limit=end + 1e-3) == np.inf
    assert loudspeaker.time_to_temperature(**COIL, limit=end - 1e-3) < np.inf


def test_a_coil_at_its_limit_has_no_time():
    assert list(loudspeaker.time_to_temperature(**COIL, limit=[24.9, 25.0])) == [0, 0]
    assert 0 < loudspeaker.time_to_temperature(**COIL, limit=25.001) < 0.001


def test_without_voltage_never():
    assert loudspeaker.time_to_temperature(**{**COIL, "voltage": 0.0}, limit=180) == np.inf


def test_a_hot_start_can_cross_and_cool_again():
    # The coil flares above 80 degC on a hot magnet although it settles below it.
    coil = {**COIL, "voltage": 6.0, "start": 75.0}
    assert loudspeaker.settled_coil_temperature(**{name: coil[name] for name in STEADY}) < 80
    _, wanted = integrated(coil, 1000, 80.0)
    assert wanted < np.inf
    assert loudspeaker.time_to_temperature(**coil, limit=80.0) == pytest.approx(wanted, rel=0.005)


def test_the_reading_temperature_of_the_resistance_counts():
    # Derived: 6 ohm read at 25 degC is 6/(1 + 0.00393 x 5) ohm at 20 degC.
    at_25 = loudspeaker.time_to_temperature(**COIL, limit=180, resistance_at=25)
    cold = {**COIL, "dc_resistance": 6 / (1 + 0.00393 * 5)}
    assert at_25 == pytest.approx(loudspeaker.time_to_temperature(**cold, limit=180))
    assert at_25 < loudspeaker.time_to_temperature(**COIL, limit=180)


@settings(deadline=None, max_examples=25)
@given(volts=st.floats(10, 100), more=st.floats(1.001, 1.5))
def test_more_volts_are_never_slower(volts, more):
    coil = {**COIL, "voltage": np.array([volts, volts * more])}
    slow, quick = loudspeaker.time_to_temperature(**coil, limit=180)
    assert quick <= slow


@pytest.mark.parametrize("scale", [0.5, 2.0, 10.0])
def test_scaling_stands_in_for_dimensions(scale):
    # Volts times s and ohms times s squared leave the heat; all times times s leave the temperatures.
    electric = {**COIL, "voltage": 35 * scale, "dc_resistance": 6 * scale**2}
    plain = loudspeaker.time_to_temperature(**COIL, limit=180)
    assert loudspeaker.time_to_temperature(**electric, limit=180) == pytest.approx(plain)
    slower = {**COIL, "coil_time_constant": 4 * scale, "magnet_time_constant": 900 * scale}
    assert loudspeaker.time_to_temperature(**slower, limit=180) == pytest.approx(plain * scale)


@pytest.mark.parametrize(("fast", "slow"), [(4.0, 4.0), (10.0, 2.0), (4.0, 12.0)])
def test_stages_of_like_time_constants(fast, slow):
    coil = {**COIL, "coil_time_constant": fast, "magnet_time_constant": slow, "magnet_to_air": 4.0}
    for limit in (100.0, 250.0, 380.0):
        _, wanted = integrated(coil, 2000, limit)
        assert wanted < np.inf
        assert loudspeaker.time_to_temperature(**coil, limit=limit) == pytest.approx(wanted, rel=0.005)
    for time in (1.0, 5.0, 30.0):
        wanted, _ = integrated(coil, time)
        found = loudspeaker.fault_coil_temperature(**coil, time=time)
        assert found - 25 == pytest.approx(wanted - 25, rel=0.002)


@pytest.mark.parametrize("time", [1e-3, 1.0, 5.0, 50.0])
def test_one_step_of_any_length_is_exact_while_the_heat_is_constant(time):
    # Derived: without a resistance rise the network is linear, x' = J x + f, solved by the exponential of J.
    fast, slow, inner, outer, watts = 4.0, 6.0, 2.0, 3.0, 50.0
    coil = _Coil(*(np.array(x) for x in (watts, 0.0, inner, fast, outer, slow)))
    ratio = outer / inner
    jacobian = np.array([[-1 / fast, 1 / fast], [ratio / slow, -(1 + ratio) / slow]])
    settled = np.array([watts * (inner + outer), watts * outer])
    start = np.array([30.0, 10.0])
    wanted = settled + expm(jacobian * time) @ (start - settled)
    assert list(coil.advance(*start, time)) == pytest.approx(list(wanted), rel=1e-9)
