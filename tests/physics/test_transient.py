"""The junction within a cycle: against direct convolution, closed forms and the published Foster fit."""

import numpy as np
import pytest

from safeamp.physics.stage import Law, carrying_current, mean_currents, pair_heat
from safeamp.physics.transient import PHASES, cycle_dissipation, peak_ripple
from tests.published_cases import given as published

STAGE = {
    "half_supply": 34.0, "peak": 17.0, "load_magnitude": 8.0, "phase_angle": 0.0, "conducting": 1.0,
    "emitter_resistor": 0.33, "idle_current": 0.0424, "law": Law.BIPOLAR,
}  # fmt: skip
#: K/W and s, shaped like a power transistor's.
PAIRS = ((0.05, 0.1e-3), (0.2, 1.5e-3), (0.35, 12e-3), (0.23, 90e-3))
R, TAU = np.array(PAIRS).T


def convolved(power, period, resistances=R, constants=TAU):
    """Largest junction rise above the mean, marched in constant steps through two cycles.

    From rest the first ends at E; the settled cycle starts where it ends, at E/(1 - what a cycle leaves of a state).
    """
    keep = np.exp(-period / len(power) / constants)
    state, path = np.zeros(len(constants)), []
    for p in power:
        state = keep * state + (1 - keep) * p
    state = state / -np.expm1(-period / constants)
    for p in power:
        state = keep * state + (1 - keep) * p
        path.append(state @ resistances)
    return max(path) - np.mean(power) * resistances.sum()


def fine(given, phases=4096):
    """Dissipation through a cycle on a fine grid, straight from the law."""
    t = 2 * np.pi * np.arange(phases) / phases
    x = carrying_current(
        load_current=given["peak"] / given["load_magnitude"] / given["conducting"] * np.sin(t),
        idle_current=given["idle_current"], emitter_resistor=given["emitter_resistor"], law=given["law"],
    )  # fmt: skip
    v = given["half_supply"] - given["peak"] * np.sin(t + np.deg2rad(given["phase_angle"]))
    return (v - x * given["emitter_resistor"]) * x


@pytest.mark.parametrize("angle", [0.0, 45.0])
@pytest.mark.parametrize("idle", [0.0, 0.0424, 1.2])
@pytest.mark.parametrize("note", [20.0, 1000.0])
def test_agrees_with_direct_convolution(angle, idle, note):
    given = STAGE | {"phase_angle": angle, "idle_current": idle}
    power = cycle_dissipation(**given)
    found = peak_ripple(resistances=R, time_constants=TAU, power=power, period=1 / note)
    # Straight lines over 1/128 of a cycle: (2 pi/128)^2/8 = 0.03 % of the swing of the dissipation, at most.
    assert float(found) == pytest.approx(convolved(fine(given), 1 / note), abs=5e-4 * R.sum() * power.max())


def test_mean_over_the_cycle_is_the_heat_of_one_device():
    for idle in (0.0, 0.0424, 1.2):
        given = STAGE | {"idle_current": idle}
        assert np.mean(cycle_dissipation(**given)) == pytest.approx(pair_heat(**given) / 2.0, rel=3e-3)


def test_first_part_is_where_the_load_current_passes_zero():
    power = cycle_dissipation(**STAGE | {"phase_angle": 30.0})
    # There the device idles and the output stands at peak*sin(30 deg), half its peak.
    assert power[0] == pytest.approx((34.0 - 8.5 - 0.0424 * 0.33) * 0.0424, rel=1e-9)
    assert len(power) == PHASES


def test_one_pair_and_a_sine_in_closed_form():
    # p = 1 + sin: the ripple of a first-order section is R/sqrt(1 + (w tau)^2).
    power = 10.0 * (1.0 + np.sin(2 * np.pi * np.arange(256) / 256))
    for constant in (1e-4, 8e-3, 0.5):
        found = peak_ripple(resistances=[0.8], time_constants=[constant], power=power, period=0.05)
        exact = 8.0 / np.hypot(1.0, 2 * np.pi / 0.05 * constant)
        assert float(found) == pytest.approx(exact, rel=5e-4)


def test_limits_very_slow_and_very_fast():
    power = cycle_dissipation(**STAGE)
    common = {"resistances": [0.5], "power": power, "period": 0.05}
    fast = peak_ripple(time_constants=[1e-7], **common)
    assert float(fast) == pytest.approx(0.5 * (power.max() - power.mean()), rel=1e-3)
    assert float(peak_ripple(time_constants=[1e4], **common)) < 1e-3


def test_published_fit_under_a_square_wave_in_closed_form():
    # On for h, off for h: a section ends its pulse at P/(1 + exp(-h/tau)), that is (P/2)*tanh(h/(2 tau)) over its mean.
    fit = published("heat-10")
    resistances, constants = np.array(fit["foster_resistance"]), np.array(fit["foster_time"])
    power = np.r_[np.full(2000, 50.0), np.zeros(2000)]
    for half in (1e-3, 10e-3, 25e-3):
        found = peak_ripple(resistances=resistances, time_constants=constants, power=power, period=2 * half)
        exact = np.sum(resistances * 25.0 * np.tanh(half / (2.0 * constants)))
        assert float(found) == pytest.approx(exact, rel=2e-3)


def test_lower_notes_never_cool_the_peak():
    power = cycle_dissipation(**STAGE)
    periods = 1.0 / np.array([1000.0, 200.0, 50.0, 20.0, 10.0, 1.0])
    found = peak_ripple(
        resistances=R, time_constants=TAU, power=np.broadcast_to(power, (6, PHASES)), period=periods
    )
    assert np.all(np.diff(found) > 0.0)


def test_cases_agree_with_single_calls_and_nan_stays_in_its_case():
    peaks = np.array([10.0, 17.0, np.nan, 25.0])
    power = cycle_dissipation(**STAGE | {"peak": peaks})
    found = peak_ripple(resistances=R, time_constants=TAU, power=power, period=0.05)
    for place, peak in enumerate(peaks):
        one = peak_ripple(
            resistances=R, time_constants=TAU, power=cycle_dissipation(**STAGE | {"peak": peak}), period=0.05
        )
        assert np.isnan(found[place]) == np.isnan(peak)
        np.testing.assert_allclose(found[place], one)


def test_square_law_has_the_mean_of_its_currents():
    given = STAGE | {"law": Law.MOSFET, "idle_current": 0.1, "emitter_resistor": 0.0}
    currents = mean_currents(
        peak_current=17.0 / 8.0, conducting=1.0, emitter_resistor=0.0, idle_current=0.1, law=Law.MOSFET
    )
    mean_power = 34.0 * currents.mean - 17.0 * 17.0 / 8.0 / 4.0
    assert np.mean(cycle_dissipation(**given)) == pytest.approx(mean_power, rel=3e-3)


@pytest.mark.parametrize(
    ("changed", "message"),
    [
        ({"resistances": [-0.1, 1, 1, 1]}, "resistances must be zero or more, got -0.1"),
        ({"time_constants": [0.0, 1, 1, 1]}, "time_constants must be greater than zero, got 0.0"),
        ({"period": 0.0}, "period must be greater than zero, got 0.0"),
    ],
)
def test_refusals(changed, message):
    given = {"resistances": R, "time_constants": TAU, "power": np.ones(8), "period": 0.05}
    with pytest.raises(ValueError, match=message):
        peak_ripple(**given | changed)
