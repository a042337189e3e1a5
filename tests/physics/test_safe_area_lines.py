"""The few phases looked at find what twenty thousand find, wherever the boundary bends."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.physics.safe_area import angle_use, envelope_use
from safeamp.physics.stage import Law, carrying_current
from tests.physics.safe_area_cases import BASE, DEVICE, allowed, random_amplifier


def dense_use(a, phases=20_001):
    """Largest use along the half cycle from the foot of the load current to its peak, at the largest angle."""
    phase = np.deg2rad(np.linspace(a["phase_angle"] - 90.0, 90.0, phases))
    mean = carrying_current(
        load_current=a["peak"] / a["load_magnitude"] / a["conducting"] * np.sin(phase),
        idle_current=a["idle_current"],
        emitter_resistor=a["emitter_resistor"],
        law=a["law"],
    )
    output = a["peak"] * np.sin(phase - np.deg2rad(a["phase_angle"]))
    voltage = a["half_supply"] - output - mean * a["emitter_resistor"]
    worst = mean * (1.0 + (a["imbalance"] if a["conducting"] > 1 else 0.0))
    worst = np.where(worst > 1e-5 * a["rating"].current, worst, 0.0)
    limit = allowed(voltage, a["case_temperature"], a["rating"])
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.max(np.where(worst == 0, 0.0, worst / limit))


@pytest.mark.parametrize("seed", range(0, 1500, 4))
def test_parabolas_find_the_worst_point(seed):
    a = random_amplifier(seed)
    assert envelope_use(**a).use == pytest.approx(dense_use(a), rel=5e-4)


BENT = {
    "falls less steeply from the second point on": ((40.0, 3.75), (50.0, 1.4), (160.0, 0.9)),
    "starts 4 % under the power line": ((40.0, 3.6), (100.0, 0.75), (160.0, 0.25)),
    "starts a tenth under the power line": ((40.0, 3.4), (100.0, 0.75), (160.0, 0.25)),
    "ends in the middle of the locus": ((40.0, 3.75), (50.0, 1.2)),
    "nearly upright": ((40.0, 3.75), (41.0, 0.5), (160.0, 0.4)),
    "no points": (),
}


@pytest.mark.parametrize("points", BENT.values(), ids=BENT)
@pytest.mark.parametrize("idle", [0.0, 0.04, 0.5, 1.8])
@pytest.mark.parametrize("angle", [0.0, 30.0, 60.0, 90.0])
def test_bends_and_jumps_of_the_boundary_are_looked_at(points, idle, angle):
    a = BASE | {"idle_current": idle, "phase_angle": angle, "imbalance": 0.0}
    a["rating"] = replace(DEVICE, points=points)
    found, wanted = envelope_use(**a).use, dense_use(a, 200_001)
    assert found == pytest.approx(wanted, rel=5e-4)
    assert found > wanted * (1 - 5e-4)


@pytest.mark.parametrize("law", list(Law))
def test_a_single_angle_uses_as_much_as_all_angles_up_to_it(law):
    angles = np.linspace(0.0, 90.0, 7)
    a = BASE | {"law": law, "idle_current": 0.2, "phase_angle": angles}
    smaller = [
        envelope_use(**a | {"phase_angle": angle * share}).use for angle in angles for share in (0.3, 0.8)
    ]
    found = angle_use(**a | {"phase_angle": -angles}).use
    assert found == pytest.approx(envelope_use(**a).use)
    assert np.all(np.repeat(found, 2) >= np.array(smaller) * (1 - 1e-6))


def test_cases_may_differ_in_every_input_or_in_none():
    # whatever has an axis of cases, the answer is that of the cases one by one
    random = np.random.default_rng(11)
    names = [name for name in BASE if name not in ("law", "rating", "imbalance", "conducting", "phase_angle")]
    for name in names:
        values = BASE[name] * random.uniform(0.9, 1.0, 3)
        many = envelope_use(**BASE | {name: values})
        for case, value in enumerate(values):
            assert many.use[case] == pytest.approx(float(envelope_use(**BASE | {name: value}).use), rel=1e-6)
    for place in range(6):
        numbers = [40.0, 3.75, 100.0, 0.75, 160.0, 0.25]
        numbers[place] = np.array([1.0, 0.98]) * numbers[place]
        points = tuple(zip(numbers[::2], numbers[1::2], strict=True))
        found = envelope_use(**BASE | {"rating": replace(DEVICE, points=points)})
        assert found.use.shape == (2,)
