"""Use of the safe area against a dense brute force, and how it answers to worse and to missing input."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.physics.safe_area import ZONES, angle_use, envelope_use
from tests.physics.safe_area_cases import BASE, DEVICE, brute_use, random_amplifier


@pytest.mark.parametrize("seed", range(200))
def test_envelope_agrees_with_every_angle_amplitude_and_phase(seed):
    a = random_amplifier(seed)
    found = envelope_use(**a)
    angles = np.unique([*np.linspace(-a["phase_angle"], a["phase_angle"], 41), a["phase_angle"]])
    use, enters = brute_use(a, angles)
    assert found.use == pytest.approx(use, rel=5e-3)
    assert bool(found.enters_unknown) == enters


@pytest.mark.parametrize("seed", range(60))
def test_one_angle_agrees_with_every_amplitude_and_phase(seed):
    a = random_amplifier(seed)
    use, enters = brute_use(a, [a["phase_angle"]])
    for sign in (1, -1):
        found = angle_use(**a | {"phase_angle": sign * a["phase_angle"]})
        assert found.use == pytest.approx(use, rel=5e-3)
        assert bool(found.enters_unknown) == enters


def test_cases_by_the_thousand_equal_one_by_one():
    peaks = np.linspace(1, 33, 1100)
    power = np.linspace(100, 200, 1100)
    many = envelope_use(**BASE | {"peak": peaks, "rating": replace(DEVICE, power=power)})
    for k in (0, 511, 512, 1099):
        one = envelope_use(**BASE | {"peak": peaks[k], "rating": replace(DEVICE, power=power[k])})
        assert many.use[k] == pytest.approx(float(one.use), rel=1e-5)
        assert many.zone[k] == one.zone
    assert many.use.shape == many.voltage.shape == many.enters_unknown.shape == (1100,)


WORSE = st.sampled_from(
    ["half_supply", "peak", "phase_angle", "idle_current", "imbalance", "case_temperature", "load_magnitude"]
)


@given(st.integers(0, 10_000), WORSE, st.floats(1.0, 1.3))
@settings(deadline=None)
def test_worse_input_never_uses_less(seed, name, factor):
    a = random_amplifier(seed)
    last = max((v for v, _ in a["rating"].points), default=np.inf)
    a["rating"] = replace(a["rating"], voltage=min(last, a["rating"].voltage))  # no jump into the unknown
    if name == "load_magnitude":  # in class A a larger load current leaves less in the tail at high voltage
        a["idle_current"] = min(a["idle_current"], 0.04)
    worse = a[name] / factor if name == "load_magnitude" else a[name] * factor
    worse = min(worse, {"peak": a["half_supply"], "phase_angle": 90}.get(name, np.inf))
    before, after = envelope_use(**a), envelope_use(**a | {name: worse})
    assert after.use >= before.use * (1 - 2e-3)


@given(st.integers(0, 10_000), st.sampled_from(["current", "power", "voltage"]), st.floats(0.5, 1.0))
@settings(deadline=None)
def test_smaller_rating_never_uses_less(seed, name, factor):
    a = random_amplifier(seed)
    a["rating"] = replace(a["rating"], points=())
    weaker = replace(a["rating"], **{name: getattr(a["rating"], name) * factor})
    assert envelope_use(**a | {"rating": weaker}).use >= envelope_use(**a).use * (1 - 2e-3)


@pytest.mark.parametrize(
    "name", [key for key in BASE if key not in ("law", "rating", "imbalance", "conducting")]
)
@pytest.mark.parametrize("use", [envelope_use, angle_use])
def test_nan_uses_nan(name, use):
    assert np.isnan(use(**BASE | {name: np.nan}).use)
    pair = use(**BASE | {name: np.array([BASE[name], np.nan])}).use
    assert np.isnan(pair).tolist() == [False, True]


@pytest.mark.parametrize("peak", [0.0, 30.0])
@pytest.mark.parametrize(
    "name", ["current", "power", "power_at", "junction_limit", "junction_to_case", "voltage"]
)
def test_nan_rating_uses_nan(name, peak):
    a = BASE | {"peak": peak, "idle_current": 0, "rating": replace(DEVICE, **{name: np.nan})}
    assert np.isnan(envelope_use(**a).use)


@pytest.mark.parametrize("peak", [0.0, 10.0, 30.0])
@pytest.mark.parametrize("place", range(6))
def test_nan_in_any_point_uses_nan(place, peak):
    numbers = [40.0, 3.75, 100.0, 0.75, 160.0, 0.25]
    numbers[place] = np.nan
    points = tuple(zip(numbers[::2], numbers[1::2], strict=True))
    assert np.isnan(envelope_use(**BASE | {"peak": peak, "rating": replace(DEVICE, points=points)}).use)


def test_nan_imbalance_and_parameter_use_nan():
    assert np.isnan(envelope_use(**BASE | {"conducting": 2, "imbalance": np.nan}).use)
    assert np.isnan(envelope_use(**BASE | {"law": BASE["law"].MOSFET}, transconductance_parameter=np.nan).use)


def test_nothing_allowed_is_use_without_bound():
    limit = DEVICE.junction_limit
    at, below = (envelope_use(**BASE | {"case_temperature": t}) for t in (limit, limit - 1e-6))
    assert at.use == np.inf
    assert np.isfinite(below.use)
    assert below.use > 1e6
    idle = {"peak": 0, "idle_current": 0}
    assert envelope_use(**BASE | idle | {"case_temperature": limit}).use == 0


def test_leakage_is_no_current():
    # above its voltage rating the device may not carry anything; 1e-5 of 12 A counts as nothing
    low = {"rating": replace(DEVICE, voltage=30.0, points=()), "peak": 0}
    for idle, expected in ((1.2e-4, 0.0), (1.21e-4, np.inf)):
        found = envelope_use(**BASE | low | {"idle_current": idle})
        assert found.use == expected
    assert ZONES[int(found.zone)] == "voltage"


def test_a_sliver_above_the_voltage_rating_is_found():
    # class B at 45 deg carries current from 34 + 30*sin(45 deg) = 55.213 V downwards
    for voltage, expected in ((55.1, True), (55.3, False)):
        rating = replace(DEVICE, voltage=voltage, points=())
        found = envelope_use(**BASE | {"rating": rating, "idle_current": 0})
        assert bool(np.isinf(found.use)) is expected


def test_entering_the_unknown_is_told_apart():
    for last, expected in ((55.1, True), (55.3, False)):
        rating = replace(DEVICE, points=((40.0, 3.75), (last, 2.0)))
        found = envelope_use(**BASE | {"rating": rating, "idle_current": 0})
        assert bool(found.enters_unknown) is expected
        assert np.isfinite(found.use)
    lone = replace(DEVICE, points=((40.0, 1.0),))
    assert bool(envelope_use(**BASE | {"rating": lone}).enters_unknown)
    assert not envelope_use(**BASE | {"rating": replace(DEVICE, points=())}).enters_unknown


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"peak": 34.1}, "peak must be at most half_supply, got 34.1"),
        ({"load_magnitude": 0}, "load_magnitude must be greater than zero, got 0"),
        ({"phase_angle": -91}, "phase_angle must be between -90 and 90, got -91"),
        ({"conducting": 0.5}, "pairs must be one or more, got 0.5"),
        ({"idle_current": -1}, "idle_current must be zero or more, got -1"),
    ],
)
@pytest.mark.parametrize("use", [envelope_use, angle_use])
def test_what_cannot_be_is_refused(use, change, message):
    with pytest.raises(ValueError, match=message):
        use(**BASE | change)
