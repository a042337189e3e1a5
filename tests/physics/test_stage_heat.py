"""Heat of the class-AB stage against brute force, derived amplifiers and its limits."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.physics import stage
from safeamp.physics.stage import Law
from safeamp.physics.stage.heat import _gauss_legendre

BASE = {
    "half_supply": 34.0,
    "peak": 20.0,
    "load_magnitude": 8.0,
    "phase_angle": 30.0,
    "conducting": 1,
    "emitter_resistor": 0.33,
    "idle_current": 0.042,
    "law": Law.BIPOLAR,
}


def brute_heat(a, points=200_000):
    """Average of v*i over both devices of a full cycle, device by device."""
    t = (np.arange(points) + 0.5) / points * 2 * np.pi
    v, n = a["peak"] * np.sin(t), a["conducting"]
    i = a["peak"] / a["load_magnitude"] * np.sin(t - np.deg2rad(a["phase_angle"])) / n
    law = {key: a[key] for key in ("idle_current", "emitter_resistor", "law")}
    upper = stage.carrying_current(load_current=i, **law)
    lower = stage.carrying_current(load_current=-i, **law)
    drop = a["emitter_resistor"]
    heat = upper * (a["half_supply"] - v - upper * drop) + lower * (a["half_supply"] + v - lower * drop)
    return n * heat.mean()


@pytest.mark.parametrize("seed", range(25))
def test_heat_agrees_with_a_fine_grid_within_a_thousandth(seed):
    random = np.random.default_rng(seed)
    supply = random.uniform(10, 80)
    amplifier = BASE | {
        "half_supply": supply,
        "peak": supply * random.uniform(0.02, 0.95),
        "load_magnitude": random.uniform(2, 16),
        "phase_angle": random.uniform(-80, 80),
        "conducting": int(random.integers(1, 6)),
        "emitter_resistor": random.choice([0, 0.1, 0.22, 0.47, 1]),
        "idle_current": random.choice([0, 1e-4, 5e-3, 0.04, 0.3, 1.5]),
        "law": random.choice(list(Law)),
    }
    assert stage.pair_heat(**amplifier) == pytest.approx(brute_heat(amplifier), rel=1e-3)


def test_class_b_without_idle_and_resistors():
    ideal = BASE | {"idle_current": 0, "emitter_resistor": 0}
    keys = ("half_supply", "peak", "load_magnitude", "phase_angle")
    closed = stage.class_b_heat(**{key: ideal[key] for key in keys})
    assert stage.pair_heat(**ideal) == pytest.approx(closed, rel=1e-6)


def test_no_signal_is_the_limit_of_no_peak():
    keys = ("half_supply", "conducting", "emitter_resistor", "idle_current")
    still = stage.no_signal_heat(**{key: BASE[key] for key in keys})
    assert still == pytest.approx(2 * 0.042 * (34 - 0.042 * 0.33))
    assert stage.pair_heat(**BASE | {"peak": 0}) == pytest.approx(still)


def test_class_a_gives_away_just_what_the_load_takes():
    # small resistors are no help here, so both devices stay on by a large idle current
    a = BASE | {"idle_current": 8, "emitter_resistor": 1.0, "phase_angle": 0, "half_supply": 60}
    heat = stage.pair_heat(**a)
    # x = Iq + i/2: mean x = Iq, mean x**2 = Iq**2 + Ip**2/8, load takes Vp*Ip/2
    assert heat == pytest.approx(2 * (60 * 8 - (64 + 2.5**2 / 8)) - 20 * 2.5 / 2, rel=1e-3)


def test_mean_current_of_a_rail():
    common = {"conducting": 2, "emitter_resistor": 0.22, "law": Law.BIPOLAR}
    class_b = stage.mean_rail_current(peak_current=6, idle_current=0, **common)
    assert class_b == pytest.approx(stage.mean_supply_current(peak_current=6), rel=1e-6)
    assert class_b == pytest.approx(6 / np.pi, rel=1e-6)
    assert stage.mean_rail_current(peak_current=0, idle_current=0.05, **common) == pytest.approx(0.1)
    assert stage.mean_rail_current(peak_current=6, idle_current=0.05, **common) > class_b


def test_devices_in_parallel_share():
    # n devices with n times the resistor each are one device: same currents, same heat
    one = stage.pair_heat(**BASE)
    three = stage.pair_heat(
        **BASE | {"conducting": 3, "idle_current": 0.014, "emitter_resistor": 0.99},
    )
    assert three == pytest.approx(one, rel=1e-9)


def test_noise_against_sampling_of_the_normal_distribution():
    # quantiles of the normal distribution, 400001 of them, cut at the clipping peak
    from scipy.special import ndtri

    g = ndtri((np.arange(400_001) + 0.5) / 400_001) * 12.0
    for clipping in (5.0, 15.0, 28.0):
        v = np.clip(g, -clipping, clipping)
        mean = np.mean(np.abs(v) * 30 - v**2) / 8
        heat = stage.noise_heat(half_supply=30, rms=12, load=8, clipping_peak=clipping)
        assert heat == pytest.approx(mean, rel=1e-4)


def test_noise_limits():
    free = stage.noise_heat(half_supply=30, rms=2, load=8)
    assert stage.noise_heat(half_supply=30, rms=2, load=8, clipping_peak=30) == pytest.approx(free)
    assert stage.noise_heat(half_supply=30, rms=0, load=8, clipping_peak=20) == 0
    # driven far beyond clipping the output is a square wave: Vp*(Vs - Vp)/R
    square = stage.noise_heat(half_supply=30, rms=1e6, load=8, clipping_peak=25)
    assert square == pytest.approx(25 * 5 / 8, rel=1e-4)
    assert np.isnan(stage.noise_heat(half_supply=30, rms=np.nan, load=8, clipping_peak=20))


@given(st.sampled_from(["half_supply", "idle_current", "phase_angle"]), st.floats(1.001, 2))
@settings(deadline=None)
def test_more_supply_idle_or_angle_heats_more(name, factor):
    assert stage.pair_heat(**BASE | {name: BASE[name] * factor}) >= stage.pair_heat(**BASE)


@pytest.mark.parametrize("name", [key for key in BASE if key != "law"])
def test_nan_heats_to_nan(name):
    assert np.isnan(stage.pair_heat(**BASE | {name: np.nan}))


def test_cases_by_the_thousand_equal_one_by_one():
    idle = np.linspace(0, 0.2, 1300)
    heat = stage.pair_heat(**BASE | {"idle_current": idle})
    assert heat.shape == (1300,)
    assert heat[[0, 511, 512, 1299]] == pytest.approx(
        [stage.pair_heat(**BASE | {"idle_current": idle[k]}) for k in (0, 511, 512, 1299)], rel=1e-6
    )
    resistors = stage.pair_heat(**BASE | {"idle_current": 0, "emitter_resistor": np.full(1300, 0.2)})
    assert resistors.shape == (1300,)


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"peak": 35}, "peak must be at most half_supply, got 35"),
        ({"peak": -1}, "peak_current must be zero or more"),
        ({"conducting": 0}, "conducting must be one or more, got 0"),
        ({"half_supply": 0, "peak": 0}, "half_supply must be greater than zero, got 0"),
        ({"phase_angle": 91}, "phase_angle must be between -90 and 90, got 91"),
        ({"emitter_resistor": -0.1}, "emitter_resistor must be zero or more, got -0.1"),
    ],
)
def test_what_cannot_be_is_refused(change, message):
    with pytest.raises(ValueError, match=message):
        stage.pair_heat(**BASE | change)


def test_closed_forms_refuse_too():
    with pytest.raises(ValueError, match="clipping_peak must be at most half_supply, got 31"):
        stage.noise_heat(half_supply=30, rms=1, load=8, clipping_peak=31)
    with pytest.raises(ValueError, match="peak must be at most half_supply, got 31"):
        stage.class_b_heat(half_supply=30, peak=31, load_magnitude=8)
    with pytest.raises(ValueError, match=r"half_supply less the drop .* zero or more, got -2"):
        stage.no_signal_heat(half_supply=10, idle_current=12, emitter_resistor=1, conducting=1)


def test_heat_of_known_currents_is_the_balance_of_powers():
    # 2*n*(Vs*mean - Re*square) - Vp**2/|Z|*cos(phi)/2, by hand: 2*2*(30*0.9 - 0.22*1.7) - 20**2/8*0.5/2 = 94.004 W
    currents = stage.MeanCurrents(mean=0.9, mean_square=1.7)
    known = {"currents": currents, "half_supply": 30, "peak": 20, "load_magnitude": 8, "phase_angle": 60}
    assert stage.heat_of_currents(**known, conducting=2, emitter_resistor=0.22) == pytest.approx(94.004)
    with pytest.raises(ValueError, match="peak must be at most half_supply, got 31"):
        stage.heat_of_currents(**known | {"peak": 31}, conducting=2, emitter_resistor=0.22)


@pytest.mark.parametrize("count", [1, 2, 20])
def test_nodes_of_the_mean_are_those_of_numpy(count):
    nodes, weights = _gauss_legendre(count)
    theirs = np.polynomial.legendre.leggauss(count)
    assert nodes == pytest.approx(theirs[0], abs=1e-14)
    assert weights == pytest.approx(theirs[1], rel=1e-12)
    assert sum(weights) == pytest.approx(2.0, rel=1e-14)
