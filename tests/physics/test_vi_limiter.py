"""A V-I limiter against the safe area and against the load."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.physics.safe_area import Rating, allowed_current, limiter_current, limiter_reach, limiter_use
from safeamp.physics.stage import Law

DEVICE = Rating(
    current=12.0,
    power=150.0,
    power_at=25.0,
    junction_limit=150.0,
    junction_to_case=0.8333,
    voltage=160.0,
    points=((40.0, 3.75), (100.0, 0.75), (160.0, 0.25)),
)
POINTS = ((0.0, 6.0), (50.0, 1.0))


@pytest.mark.parametrize(
    ("volts", "amperes"),
    [
        (0.0, 6.0),
        (10.0, 5.0),
        (25.0, 3.5),
        (49.999, 1.0001),
        (50.0, 1.0),
        (80.0, 1.0),
    ],  # 6 A less 0.1 A a volt
)
def test_line_between_points_and_the_last_point_beyond(volts: float, amperes: float) -> None:
    assert float(limiter_current(voltage=volts, points=POINTS)) == pytest.approx(amperes, rel=1e-9)


def test_before_the_first_point_its_current_holds() -> None:
    assert float(limiter_current(voltage=1.0, points=((5.0, 4.0), (50.0, 1.0)))) == 4.0


def test_use_is_where_the_product_is_largest() -> None:
    # Inside the power region the use is v*(6 - 0.1 v)/(k*150): largest at v = 30 V, 90 W; k = 1 at 25 degC.
    use = limiter_use(points=POINTS, case_temperature=25.0, rating=DEVICE, highest_voltage=44.0)
    assert float(use.use) == pytest.approx(90.0 / 150.0, rel=1e-3)
    assert float(use.voltage) == pytest.approx(30.0, abs=0.2)
    assert float(use.current) == pytest.approx(3.0, abs=0.02)


def test_use_agrees_with_a_dense_grid_over_cases() -> None:
    case, highest = np.array([25.0, 60.0, 110.0]), np.array([44.0, 150.0, 90.0])
    use = limiter_use(points=POINTS, case_temperature=case, rating=DEVICE, highest_voltage=highest)
    for place in range(3):
        volts = np.linspace(0.01, highest[place], 200_001)
        dense = limiter_current(voltage=volts, points=POINTS) / allowed_current(
            voltage=volts, case_temperature=case[place], rating=DEVICE
        )
        assert use.use[place] == pytest.approx(dense.max(), rel=2e-3)


@pytest.mark.parametrize(
    "name", ["current", "power", "power_at", "junction_limit", "junction_to_case", "voltage"]
)
def test_any_rating_alone_may_have_cases(name: str) -> None:
    factors = np.array([1.0, 0.9, 0.95])
    known = {"points": POINTS, "case_temperature": 60.0, "highest_voltage": 44.0}
    rating = replace(DEVICE, **{name: getattr(DEVICE, name) * factors})
    together = limiter_use(**known, rating=rating)
    alone = [limiter_use(**known, rating=replace(rating, **{name: value})) for value in getattr(rating, name)]
    assert together.use == pytest.approx([float(one.use) for one in alone])
    assert together.voltage.shape == together.enters_unknown.shape == (3,)


def test_the_points_of_the_limiter_may_have_cases() -> None:
    points = ((0.0, np.array([6.0, 5.0, 7.0])), (50.0, 1.0))
    use = limiter_use(points=points, case_temperature=25.0, rating=DEVICE, highest_voltage=44.0).use
    for place, amperes in enumerate((6.0, 5.0, 7.0)):
        alone = limiter_use(
            points=((0.0, amperes), (50.0, 1.0)), case_temperature=25.0, rating=DEVICE, highest_voltage=44.0
        )
        assert use[place] == pytest.approx(float(alone.use))


def test_current_above_the_voltage_rating_is_without_bound() -> None:
    use = limiter_use(points=POINTS, case_temperature=40.0, rating=DEVICE, highest_voltage=170.0)
    assert np.isposinf(use.use)


def test_limiter_that_closes_before_the_rating_uses_a_finite_share() -> None:
    use = limiter_use(
        points=((0.0, 6.0), (60.0, 0.0)), case_temperature=40.0, rating=DEVICE, highest_voltage=170.0
    )
    assert float(use.use) < 1.0


def test_current_beyond_the_last_point_is_unknown() -> None:
    short = Rating(
        current=12.0, power=150.0, power_at=25.0, junction_limit=150.0, junction_to_case=0.8333, voltage=160.0,
        points=((40.0, 3.75), (60.0, 1.5)),
    )  # fmt: skip
    inside = limiter_use(points=POINTS, case_temperature=40.0, rating=short, highest_voltage=59.0)
    beyond = limiter_use(points=POINTS, case_temperature=40.0, rating=short, highest_voltage=61.0)
    assert not bool(inside.enters_unknown)
    assert bool(beyond.enters_unknown)


def test_nan_stays_nan() -> None:
    use = limiter_use(points=POINTS, case_temperature=np.nan, rating=DEVICE, highest_voltage=44.0)
    assert np.isnan(use.use)


def _reach(points: tuple[tuple[float, float], ...], angle: float = 0.0) -> float:
    return float(
        limiter_reach(
            points=points, half_supply=22.0, peak=20.0, load_magnitude=8.0, phase_angle=angle, conducting=1.0,
            emitter_resistor=0.33, idle_current=0.0, law=Law.BIPOLAR,
        )
    )  # fmt: skip


def test_reach_of_a_resistor_against_a_flat_limit() -> None:
    assert _reach(((0.0, 5.0),)) == pytest.approx(2.5 / 5.0, rel=1e-6)  # 20 V over 8 ohm against 5 A


def test_reach_of_a_resistor_against_a_slope() -> None:
    # i = s*2.5, v = 22 - s*20 - 0.33 i, limit 4 - 0.1 v: the ratio grows with s and ends at 2.5/(4 - 0.1175).
    assert _reach(((0.0, 4.0), (40.0, 0.0))) == pytest.approx(2.5 / (4.0 - 0.1 * (2.0 - 0.825)), rel=1e-3)


def test_reach_grows_with_the_angle() -> None:
    line = ((0.0, 4.0), (40.0, 0.5))
    found = [_reach(line, angle) for angle in (0.0, 30.0, 45.0, 60.0)]
    assert found == sorted(found)
    assert found[2] > 1.2 * found[0]


@pytest.mark.parametrize(
    ("points", "message"),
    [
        ((), "points must have at least one pair"),
        (((10.0, 1.0), (5.0, 0.5)), "limiter voltage must be above the one before it, got 5.0"),
        (((10.0, -1.0),), "limiter_current must be zero or more, got -1.0"),
    ],
)
def test_refusals(points: tuple[tuple[float, float], ...], message: str) -> None:
    with pytest.raises(ValueError, match=message):
        limiter_current(voltage=10.0, points=points)
