"""The boundary itself: ratings, derating, points, each rule at, just below and just above."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.physics.safe_area import (
    ZONES,
    Rating,
    allowed_current,
    derating,
    envelope_use,
    equivalent_resistance,
    peak_dissipation,
    points_problem,
    usable_power,
)
from tests.physics.safe_area_cases import BASE, DEVICE, allowed
from tests.published_cases import given, printed


def current(voltage, rating=DEVICE, case=25.0):
    return allowed_current(voltage=voltage, case_temperature=case, rating=rating)


def test_derating_of_a_registered_type():
    g = given("soa-1")
    first, second = derating(
        case_temperature=np.array([25, 26]), power_at=25, junction_limit=g["junction_limit"]
    )
    slope = g["power"] * (first - second)
    assert slope == printed("soa-1", "derating")
    assert 1 / slope == printed("soa-1", "junction_to_case")


def test_a_sheet_that_contradicts_itself_gives_the_smaller_power():
    g = given("soa-2")
    assert usable_power(**g, power_at=25) == printed("soa-2", "usable_power")
    assert usable_power(**g | {"junction_to_case": 0.5}, power_at=25) == 200  # the trap the other way round
    assert usable_power(**g | {"junction_to_case": None}, power_at=25) == 200


@pytest.mark.parametrize("name", ["soa-3", "soa-4"])
def test_derated_power_of_printed_examples(name):
    g = given(name)
    limit = 25 + g["power"] / g["derating"]  # W and W/K fix where nothing is left
    left = derating(case_temperature=g["case"], power_at=25, junction_limit=limit)
    assert g["power"] * left == printed(name, "usable_power")


def test_constant_power_line():
    device = Rating(
        current=10, power=120, power_at=25, junction_limit=150, junction_to_case=None, voltage=100
    )
    assert current(given("soa-5")["voltage"], device) == printed("soa-5", "current")


def test_derating_ends_at_both_ends():
    k = derating(case_temperature=[-10, 25, 25.1, 149.9, 150, 200], power_at=25, junction_limit=150)
    assert k == pytest.approx([1, 1, 1 - 0.1 / 125, 0.1 / 125, 0, 0])
    assert np.isnan(derating(case_temperature=np.nan, power_at=25, junction_limit=150))


def test_every_zone_of_the_boundary():
    # 12 A up to 12.5 V, 150 W up to 40 V, lines through the points, nothing above 160 V
    volts = [0, 12.5, 20, 40, 63.2456, 100, 160, 160.001]
    between = 3.75 * (63.2456 / 40) ** (np.log(0.75 / 3.75) / np.log(100 / 40))
    assert current(volts) == pytest.approx([12, 12, 7.5, 3.75, between, 0.75, 0.25, 0], rel=1e-4)
    half = current(volts, case=87.5)
    assert half == pytest.approx([12, 6, 3.75, 1.875, between / 2, 0.375, 0.125, 0], rel=1e-4)


@pytest.mark.parametrize("case", [25.0, 70.0, 140.0])
def test_boundary_agrees_with_interpolation_on_logarithms(case):
    volts = np.linspace(0.5, 170, 1000)
    late = replace(DEVICE, points=((60.0, 1.0), (90.0, 0.5), (160.0, 0.2)))
    hollow = replace(DEVICE, points=((40.0, 3.75), (60.0, 1.0), (160.0, 0.9)))
    for rating in (DEVICE, late, hollow, replace(DEVICE, points=())):
        assert current(volts, rating, case) == pytest.approx(allowed(volts, case, rating))


def test_first_point_under_the_power_line_is_continued():
    # the usable power is 150.006 W; 5 % under it is 142.506 W
    for first, continued in ((142.49 / 40, True), (142.52 / 40, False)):
        rating = replace(DEVICE, points=((40.0, first), (80.0, first / 4), (160.0, 0.1)))
        left = current(36, rating)
        line = first * (36 / 40) ** -2
        assert left == pytest.approx(min(line, 150 / 36) if continued else 150 / 36)


def test_first_point_belongs_to_its_line():
    rating = replace(DEVICE, points=((40.0, 3.65), (160.0, 0.25)))
    assert current([39.999, 40, 40.001], rating) == pytest.approx([3.75, 3.65, 3.65], rel=1e-3)


def test_last_point_leaves_the_power_line_as_a_number():
    short = replace(DEVICE, points=DEVICE.points[:2])
    assert current([100, 100.001, 160], short) == pytest.approx([0.75, 1.5, 150 / 160], rel=1e-4)


def test_points_as_arrays_of_cases():
    low, high = np.array([3.0, 3.75]), np.array([0.6, 0.75])
    rating = replace(DEVICE, points=((np.array([40.0, 40.0]), low), (np.array([100.0, 100.0]), high)))
    each = [
        float(current(70.0, replace(DEVICE, points=((40.0, a), (100.0, b)))))
        for a, b in zip(low, high, strict=True)
    ]
    assert current(np.array([70.0, 70.0]), rating) == pytest.approx(each)


def test_points_that_give_no_curve_are_named():
    one = replace(DEVICE, points=((40.0, 142.4 / 40),))
    assert "more than 5 % under the power line" in points_problem(one)
    assert points_problem(replace(DEVICE, points=((40.0, 142.6 / 40),))) is None
    rising = replace(DEVICE, points=((40.0, 3.0), (80.0, 3.1)))
    assert "rises towards 80 V" in points_problem(rising)
    assert bool(envelope_use(**BASE | {"rating": rising}).enters_unknown)
    assert points_problem(DEVICE) is None
    assert points_problem(replace(DEVICE, points=())) is None


@pytest.mark.parametrize(
    ("angle", "zone"),
    [(0.0, "power"), (45.0, "power"), (60.0, "second breakdown"), (90.0, "second breakdown")],
)
def test_zone_at_the_worst_point(angle, zone):
    assert ZONES[int(envelope_use(**BASE | {"phase_angle": angle}).zone)] == zone


def test_zone_current_and_unknown():
    small = replace(DEVICE, current=3.0)
    assert ZONES[int(envelope_use(**BASE | {"phase_angle": 0.0, "rating": small}).zone)] == "current"
    short = replace(DEVICE, points=((40.0, 3.75), (41.0, 3.7)))
    wide = BASE | {"phase_angle": 80.0, "half_supply": 60.0, "peak": 55.0, "rating": short}
    assert ZONES[int(envelope_use(**wide).zone)] == "unknown"


def test_reactive_peak_against_the_cycle():
    # largest (Vs - v)*i over a cycle at full swing, for a load of 8 ohm
    t = np.linspace(-np.pi, np.pi, 100_001)
    for angle in (0, 20, 45, 70, -70):
        p = (1 - np.sin(t)) * np.sin(t + np.deg2rad(angle)) * 30**2 / 8
        peak = peak_dissipation(half_supply=30, load_magnitude=8, phase_angle=angle)
        assert peak == pytest.approx(p.max(), rel=1e-6)
        resistor = equivalent_resistance(load_magnitude=8, phase_angle=angle)
        assert 30**2 / (4 * resistor) == pytest.approx(peak)
    with pytest.raises(ValueError, match=r"phase_angle must be between -90 and 90, got 90\.5"):
        peak_dissipation(half_supply=30, load_magnitude=8, phase_angle=90.5)


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"current": 0}, "current must be greater than zero, got 0"),
        ({"junction_to_case": -1}, "junction_to_case must be greater than zero, got -1"),
        ({"junction_limit": 25}, "junction_limit must be above power_at, got 25"),
        ({"points": ((40, 3), (40, 2))}, "safe_area voltage must be above the one before it, got 40"),
        ({"points": ((40, 0),)}, "safe_area_current must be greater than zero, got 0"),
    ],
)
def test_what_no_device_can_have_is_refused(change, message):
    with pytest.raises(ValueError, match=message):
        replace(DEVICE, **change)
