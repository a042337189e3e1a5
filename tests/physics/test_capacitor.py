"""Output capacitor: filter, leakage, charging."""

import numpy as np
import pytest
from hypothesis import given as drawn
from hypothesis import settings
from hypothesis import strategies as st
from scipy.integrate import quad

from safeamp.physics import capacitor, zobel
from tests.published_cases import given, printed

FARADS = st.floats(1e-6, 1e-2)
OHMS = st.floats(1.0, 1e3)


def test_published_gain():
    values = given("capacitor-1")
    found = capacitor.gain(
        frequency=values["frequency"], capacitance=values["capacitance"], load_resistance=values["load"]
    )
    assert printed("capacitor-1", "gain") == list(found)


@pytest.mark.parametrize("name", ["capacitor-2", "capacitor-3"])
def test_published_cutoff(name):
    values = given(name)
    found = capacitor.cutoff_frequency(capacitance=values["capacitance"], load_resistance=values["load"])
    assert found == printed(name, "cutoff")


def test_capacitance_for_20_hz():
    values = given("capacitor-4")
    found = capacitor.capacitance_for_cutoff(cutoff=values["cutoff"], load_resistance=values["load"])
    assert printed("capacitor-4", "capacitance") == list(found)


def test_2200_uf_into_8_ohm_is_not_20_hz():
    found = capacitor.cutoff_frequency(capacitance=2200e-6, load_resistance=8)
    assert found == pytest.approx(9.04, abs=0.005)


@settings(deadline=None)
@drawn(capacitance=FARADS, load=OHMS)
def test_cutoff_is_where_the_gain_is_3_db_down_and_turns_back(capacitance, load):
    cutoff = capacitor.cutoff_frequency(capacitance=capacitance, load_resistance=load)
    gain = capacitor.gain(frequency=cutoff, capacitance=capacitance, load_resistance=load)
    assert gain == pytest.approx(2**-0.5)
    assert capacitor.capacitance_for_cutoff(cutoff=cutoff, load_resistance=load) == pytest.approx(capacitance)


def test_gain_ends_at_nothing_and_at_one():
    ends = capacitor.gain(frequency=[0.0, 1e9], capacitance=1e-3, load_resistance=8)
    assert list(ends) == pytest.approx([0, 1])


def test_published_charging():
    values = given("capacitor-5")
    circuit = {name: values[name] for name in ("supply", "resistor", "capacitance", "time")}
    circuit["resistance"] = circuit.pop("resistor")
    assert printed("capacitor-5", "voltage") == list(capacitor.charging_voltage(**circuit))
    assert printed("capacitor-5", "current") == list(capacitor.charging_current(**circuit))


@settings(deadline=None)
@drawn(capacitance=FARADS, resistance=OHMS, time=st.floats(0, 10))
def test_charging_obeys_kirchhoff(capacitance, resistance, time):
    circuit = {"supply": 30.0, "resistance": resistance, "capacitance": capacitance, "time": time}
    drop = resistance * capacitor.charging_current(**circuit)
    assert drop + capacitor.charging_voltage(**circuit) == pytest.approx(30)


def test_published_ripple():
    values = given("capacitor-6")
    found = capacitor.load_current(power=values["output"], load_resistance=values["load"])
    assert capacitor.ripple_rms(load_rms=found) == printed("capacitor-6", "ripple_rms")
    assert found * np.sqrt(2) == printed("capacitor-6", "peak")


@pytest.mark.parametrize(
    ("power", "load", "amperes"), [(0, 8, 0), (2, 8, 0.5), (18, 8, 1.5), (36, 4, 3), (50, 8, 2.5)]
)
def test_load_current(power, load, amperes):
    # Derived: P = I^2 R.
    assert capacitor.load_current(power=power, load_resistance=load) == pytest.approx(amperes)


@pytest.mark.parametrize(
    ("drop", "resistor", "amperes"), [(1, 1e3, 1e-3), (0, 100, 0), (-0.5, 1e3, -5e-4), (2, 1e4, 2e-4)]
)
def test_leakage_current(drop, resistor, amperes):
    assert capacitor.leakage_current(drop=drop, resistor=resistor) == pytest.approx(amperes)


def test_leakage_refuses_a_resistor_that_shows_anything():
    with pytest.raises(ValueError, match=r"^resistor must be at most 10000\.0, got 10001\.0$"):
        capacitor.leakage_current(drop=20, resistor=[1e3, 10001.0])


@pytest.mark.parametrize(
    ("microfarads", "volts", "microamperes"),
    [(2200, 63, 1386), (1000, 50, 500), (100, 10, 10), (4700, 35, 1645)],
)
def test_leakage_limit(microfarads, volts, microamperes):
    # Derived: 0.01 x uF x V in uA, by hand.
    found = capacitor.leakage_limit(capacitance=microfarads * 1e-6, rated_voltage=volts)
    assert found == pytest.approx(microamperes * 1e-6)


def test_a_step_reaches_the_load_whole():
    circuit = {"capacitance": 2.2e-3, "load_resistance": 8, "midpoint": 30}
    assert capacitor.turn_on_peak(**circuit, rise_time=0) == 30
    # Derived: half of C V^2 goes into the load, 2200 uF x 900 V^2 / 2.
    assert capacitor.turn_on_energy(**circuit, rise_time=0) == pytest.approx(0.99)
    assert capacitor.step_energy(capacitance=2.2e-3, step=30) == pytest.approx(0.99)
    assert capacitor.step_energy(capacitance=2.2e-3, step=-30) == pytest.approx(0.99)


def test_a_slow_rise_drives_a_steady_current():
    # Derived: I = C dV/dt = 2200 uF x 30 V / 10 s = 6.6 mA, 52.8 mV across 8 ohm.
    peak = capacitor.turn_on_peak(capacitance=2.2e-3, load_resistance=8, midpoint=30, rise_time=10)
    assert peak == pytest.approx(52.8e-3)


def test_a_rise_of_one_time_constant():
    # Derived: V (1 - 1/e).
    peak = capacitor.turn_on_peak(capacitance=1e-3, load_resistance=10, midpoint=20, rise_time=1e-2)
    assert peak == pytest.approx(20 * (1 - np.exp(-1)))


@settings(deadline=None, max_examples=30)
@drawn(ratio=st.floats(1e-4, 30))
def test_turn_on_energy_is_the_integral_of_load_power(ratio):
    # Derived: with RC = 1 s and R = 1 ohm the load sees (1 - exp(-t))/T during the rise, then decays.
    ramp, _ = quad(lambda t: (-np.expm1(-t) / ratio) ** 2, 0, ratio)
    tail = (-np.expm1(-ratio) / ratio) ** 2 / 2
    found = capacitor.turn_on_energy(capacitance=1, load_resistance=1, midpoint=1, rise_time=ratio)
    assert found == pytest.approx(ramp + tail, rel=1e-6)


@settings(deadline=None)
@drawn(short=st.floats(0, 10), more=st.floats(0.001, 10))
def test_a_faster_rise_is_never_kinder(short, more):
    circuit = {"capacitance": 2.2e-3, "load_resistance": 8, "midpoint": 30}
    quick, slow = short, short + more
    for formula in (capacitor.turn_on_peak, capacitor.turn_on_energy):
        assert formula(**circuit, rise_time=quick) >= formula(**circuit, rise_time=slow)


def test_settling_time():
    # Derived: five time constants of 2200 uF and 1 kohm; 0.7 % are left.
    wait = capacitor.settling_time(capacitance=2.2e-3, resistance=1e3)
    assert wait == pytest.approx(11)
    left = 1 - capacitor.charging_voltage(supply=1, resistance=1e3, capacitance=2.2e-3, time=wait)
    assert left == pytest.approx(0.0067, abs=5e-5)


def test_published_zobel_dissipation():
    # 50 W into 8 ohm is 20 V; the network is 10 ohm + 100 nF.
    found = zobel.dissipation(voltage_rms=np.sqrt(50 * 8), resistance=10, capacitance=100e-9, frequency=20e3)
    assert found == printed("bench-3", "dissipation")


def test_zobel_ends():
    network = {"voltage_rms": 20.0, "resistance": 10.0, "capacitance": 100e-9}
    # Derived: far above 1/(2 pi R C) the resistor takes V^2/R = 40 W, at that corner half of it.
    corner = 1 / (2 * np.pi * 10 * 100e-9)
    found = zobel.dissipation(**network, frequency=[1e12, corner, 1e-3])
    assert list(found) == pytest.approx([40, 20, 0], abs=1e-9)


@settings(deadline=None)
@drawn(frequency=st.floats(10, 1e6), more=st.floats(1.01, 10))
def test_oscillation_at_a_higher_frequency_is_hotter(frequency, more):
    network = {"voltage_rms": 20.0, "resistance": 10.0, "capacitance": 100e-9}
    assert zobel.dissipation(**network, frequency=frequency * more) > zobel.dissipation(
        **network, frequency=frequency
    )


@pytest.mark.parametrize("ratio", [1e-6, 5e-4, 0.00099, 0.00101])
def test_turn_on_energy_of_short_rises(ratio):
    # Derived: (x - 1 + exp(-x))/x^2 = 1/2 - x/6 + x^2/24 - x^3/120 + x^4/720 ...
    series = 0.5 - ratio / 6 + ratio**2 / 24 - ratio**3 / 120 + ratio**4 / 720
    found = capacitor.turn_on_energy(capacitance=1, load_resistance=1, midpoint=1, rise_time=ratio)
    assert found == pytest.approx(series, rel=1e-9)
