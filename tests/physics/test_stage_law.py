"""The class-AB law against independent roots, and its limits."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

from safeamp.physics.stage import THERMAL_VOLTAGE, Law, carrying_current, worst_device_current
from safeamp.physics.stage import law as law_module


def exponential_root(load_current, idle, resistor, voltage):
    """Both device equations with the bias voltage held, solved for the smaller current."""
    magnitude = abs(load_current)

    def mismatch(log_smaller):
        smaller = np.exp(log_smaller)
        larger = magnitude + smaller
        sums = resistor * (larger + smaller - 2 * idle)
        return voltage * (np.log(larger / idle) + log_smaller - np.log(idle)) + sums

    if mismatch(-700) >= 0:
        return 0.0 if load_current < 0 else magnitude
    smaller = np.exp(brentq(mismatch, -700, np.log(magnitude + 4 * idle), xtol=1e-9))
    return smaller if load_current < 0 else magnitude + smaller


def square_root(load_current, idle, resistor, parameter):
    """Gate voltages of both devices add up to the bias; a device below threshold carries nothing."""

    def gate(current):
        return np.sqrt(2 * current / parameter) + resistor * current

    def mismatch(x):
        return gate(x) + gate(x - load_current) - 2 * gate(idle)

    if load_current > 0 and mismatch(load_current) >= 0:
        return load_current
    if load_current < 0 and mismatch(0.0) >= 0:
        return 0.0
    return brentq(mismatch, max(load_current, 0), abs(load_current) + 4 * idle, xtol=1e-15)


AMPLIFIERS = st.tuples(
    st.floats(-20, 20), st.floats(1e-3, 3), st.sampled_from([0.0, 0.01, 0.1, 0.22, 0.47, 1.0])
)


@given(AMPLIFIERS, st.sampled_from([Law.BIPOLAR, Law.DARLINGTON]))
@settings(deadline=None)
def test_exponential_law_agrees_with_an_independent_root(amplifier, law):
    current, idle, resistor = amplifier
    x = carrying_current(load_current=current, idle_current=idle, emitter_resistor=resistor, law=law)
    root = exponential_root(current, idle, resistor, law.value * THERMAL_VOLTAGE)
    assert x == pytest.approx(root, rel=1e-3, abs=1e-6 * idle)


@given(AMPLIFIERS, st.floats(0.3, 10))
@settings(deadline=None)
def test_square_law_agrees_with_an_independent_root(amplifier, parameter):
    current, idle, resistor = amplifier
    x = carrying_current(
        load_current=current,
        idle_current=idle,
        emitter_resistor=resistor,
        law=Law.MOSFET,
        transconductance_parameter=parameter,
    )
    assert x == pytest.approx(square_root(current, idle, resistor, parameter), rel=1e-3, abs=1e-6 * idle)


@pytest.mark.parametrize("law", list(Law))
def test_no_idle_current_is_class_b(law):
    x = carrying_current(load_current=[-2, 0, 3], idle_current=0, emitter_resistor=0.22, law=law)
    assert x.tolist() == [0, 0, 3]


@pytest.mark.parametrize("law", list(Law))
def test_no_load_current_leaves_the_idle_current(law):
    x = carrying_current(load_current=0, idle_current=0.05, emitter_resistor=0.22, law=law)
    assert x == pytest.approx(0.05, rel=1e-9)


def test_class_a_shares_the_load_current_equally():
    # both devices far from cut-off behind large resistors: each takes half of the change
    i = np.linspace(-1, 1, 9)
    x = carrying_current(load_current=i, idle_current=2, emitter_resistor=10, law=Law.BIPOLAR)
    assert x == pytest.approx(2 + i / 2, rel=2e-3)


def test_without_resistor_the_product_of_both_currents_stays():
    i = np.array([-3.0, -0.1, 0.0, 0.1, 3.0])
    x = carrying_current(load_current=i, idle_current=0.1, emitter_resistor=0, law=Law.BIPOLAR)
    assert x * (x - i) == pytest.approx(0.01, rel=1e-9)  # x*y = idle**2, also where x is the small one


def test_resistor_towards_zero_is_the_limit():
    near, limit = (
        carrying_current(load_current=[-1, 0.2, 4], idle_current=0.1, emitter_resistor=r, law=Law.BIPOLAR)
        for r in (1e-9, 0)
    )
    assert near == pytest.approx(limit, rel=1e-6)


def test_square_law_without_parameter_is_the_upper_bound():
    # resistors neglected: x = Iq*(1 + i/(4*Iq))**2 up to i = 4*Iq, the load current above
    i = np.linspace(-0.6, 0.6, 25)
    bound = carrying_current(load_current=i, idle_current=0.1, emitter_resistor=0.22, law=Law.MOSFET)
    assert bound == pytest.approx(np.where(np.abs(i) <= 0.4, 0.1 * (1 + i / 0.4) ** 2, np.maximum(i, 0)))
    for parameter in (0.3, 3, 300):
        x = carrying_current(
            load_current=i,
            idle_current=0.1,
            emitter_resistor=0.22,
            law=Law.MOSFET,
            transconductance_parameter=parameter,
        )
        assert np.all(x <= bound * (1 + 1e-9) + 1e-30)


@pytest.mark.parametrize("name", ["load_current", "idle_current", "emitter_resistor"])
@pytest.mark.parametrize("law", list(Law))
def test_nan_stays_nan(name, law):
    values = {"load_current": [-1.0, 0.01, 5.0], "idle_current": 0.05, "emitter_resistor": 0.3} | {
        name: np.nan
    }
    x = carrying_current(**values, law=law, transconductance_parameter=2.0)
    assert np.all(np.isnan(x))


@pytest.mark.parametrize("name", ["idle_current", "emitter_resistor"])
def test_what_cannot_be_is_refused(name):
    values = {"load_current": 1, "idle_current": 0.1, "emitter_resistor": 0.1} | {name: -0.5}
    with pytest.raises(ValueError, match=f"{name} must be zero or more, got -0.5"):
        carrying_current(**values, law=Law.BIPOLAR)
    with pytest.raises(ValueError, match="transconductance_parameter must be greater than zero, got 0"):
        carrying_current(
            load_current=1,
            idle_current=1,
            emitter_resistor=0,
            law=Law.MOSFET,
            transconductance_parameter=0,
        )


@pytest.mark.parametrize("law", list(Law))
def test_far_from_any_amplifier_the_law_still_settles(law):
    i = np.array([0, 1e-9, 1e-3, 1, 1e3])[:, None, None, None]
    idle = np.array([1e-9, 1e-3, 1, 1e3])[:, None, None]
    resistor, parameter = np.array([0, 1e-6, 1, 1e6])[:, None], np.array([1e-6, 1, 1e6])
    x = carrying_current(
        load_current=i,
        idle_current=idle,
        emitter_resistor=resistor,
        law=law,
        transconductance_parameter=parameter,
    )
    assert np.all(np.isfinite(x))
    assert np.all(x >= i * (1 - 1e-9))


@pytest.mark.parametrize("law", list(Law))
def test_what_does_not_settle_is_no_answer(law, monkeypatch):
    monkeypatch.setattr(law_module, "_ROUNDS", 1)
    with pytest.raises(ArithmeticError, match="did not settle"):
        carrying_current(
            load_current=1.0,
            idle_current=1.0,
            emitter_resistor=1.0,
            law=law,
            transconductance_parameter=1.0,
        )


def test_worst_of_parallel_devices():
    def worst(**changes):
        return worst_device_current(**({"mean": 1.0, "emitter_resistor": 0.22, "pairs": 2} | changes))

    # 50 mV over (0.22 ohm + 25.69 mV/1 A) = 0.2035 A more
    assert worst() == pytest.approx(1.2035, abs=1e-4)
    assert worst(emitter_resistor=0) == 2.0
    assert worst(imbalance=0.3) == pytest.approx(1.3)
    assert worst(pairs=1, imbalance=0.3) == 1.0
    assert worst(mean=0.0) == 0.0
    assert np.isnan(worst(imbalance=np.nan))
    with pytest.raises(ValueError, match="pairs must be one or more, got 0"):
        worst(pairs=0)
    with pytest.raises(ValueError, match=r"imbalance must be zero or more, got -0.1"):
        worst(imbalance=-0.1)
