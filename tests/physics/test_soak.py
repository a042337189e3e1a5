"""The soak of a heatsink: what a fit returns, how far it is to be believed, and when readings say nothing."""

import numpy as np
import pytest
from scipy import optimize, stats

from safeamp.physics._student import two_sided
from safeamp.physics.soak import settling_temperature, soak_fit, soak_resistance, time_needed

TIME = np.arange(0.0, 61.0, 10.0) * 60.0


def warm(time=TIME, start=24.0, end=62.0, constant=1200.0):
    return settling_temperature(time=time, start=start, end=end, time_constant=constant)


def fit(sink, time=TIME, error=1.0):
    return soak_fit(time=time[: len(sink)], sink=sink, reading_error=error)


def test_the_curve_of_one_heat_capacity_and_one_resistance():
    # Derived: after one time constant 1/e of the way is left, at the start all of it, in the end nothing.
    assert warm(0.0) == 24.0
    assert warm(1200.0) == pytest.approx(62.0 - 38.0 / np.e, rel=1e-12)
    assert warm(1e6) == pytest.approx(62.0, rel=1e-12)
    # The balance of heat holds at any time: C dT/dt = P - (T - air)/R, with R = 1 K/W, C = 1200 J/K, P = 38 W.
    slope = (warm(700.0 + 1e-3) - warm(700.0 - 1e-3)) / 2e-3
    assert 1200.0 * slope == pytest.approx(38.0 - (warm(700.0) - 24.0), rel=1e-6)


def test_a_thermal_resistance_is_rise_over_heat():
    assert soak_resistance(sink=62.0, air=24.0, power=19.0) == 2.0


@pytest.mark.parametrize("end", [30.0, 62.0, 140.0])
@pytest.mark.parametrize("constant", [200.0, 1200.0, 3600.0, 9000.0])
@pytest.mark.parametrize("count", [3, 4, 7])
def test_an_exact_exponential_returns_its_constants(end, constant, count):
    time = np.array([60.0, 500.0, 1100.0, 1900.0, 2700.0, 3500.0, 3660.0])[:count]
    found = fit(warm(time - 60.0, 24.0, end, constant), time, error=1e-3)
    assert found.end == pytest.approx(end, rel=1e-6)
    assert found.time_constant == pytest.approx(constant, rel=1e-6)
    assert found.start == pytest.approx(24.0, rel=1e-6)
    assert found.low < end < found.high
    assert (found.trend, found.accelerating) == (1, False)


def test_three_even_readings_by_the_pocket_calculator():
    # Derived: of even readings a, b, c each way left is the same share of the one before: (ac - b^2)/(a + c - 2b).
    found = fit([25.0, 45.0, 58.0])
    assert found.end == pytest.approx((25.0 * 58.0 - 45.0**2) / (25.0 + 58.0 - 2 * 45.0), rel=1e-9)
    assert found.time_constant == pytest.approx(600.0 / np.log(20.0 / 13.0), rel=1e-9)
    assert np.isnan(found.scatter)


@pytest.mark.parametrize("seed", range(8))
def test_noisy_logs_as_a_fit_of_somebody_else(seed):
    random = np.random.default_rng(seed)
    time = np.sort(random.uniform(0.0, 5000.0, 15))
    sink = warm(time) + random.normal(0.0, 0.4, 15)

    def model(t, start, end, constant):
        return end - (end - start) * np.exp(-(t - time[0]) / constant)

    best, _ = optimize.curve_fit(model, time, sink, p0=(25.0, 60.0, 1000.0), xtol=1e-14, ftol=1e-14)
    found = fit(sink, time, error=0.4)
    assert (found.start, found.end, found.time_constant) == pytest.approx(tuple(best), rel=1e-5)
    assert found.scatter == pytest.approx(np.sqrt(np.sum((sink - model(time, *best)) ** 2) / 12.0), rel=1e-6)


@pytest.mark.parametrize(("seed", "said"), [(0, 0.4), (1, 0.4), (2, 0.01), (3, 0.01)])
def test_the_ends_of_the_interval_are_where_the_squares_say(seed, said):
    """At either end the best curve with that end value is worse by the threshold, found by another search."""
    random = np.random.default_rng(seed)
    sink = warm() + random.normal(0.0, 0.4, TIME.size)
    found = fit(sink, error=said)

    def squares(end):
        def left(given):
            return end - (end - given[0]) * np.exp(-TIME / given[1]) - sink

        return optimize.least_squares(left, (24.0, 1200.0), x_scale=(1.0, 100.0), xtol=1e-14).cost * 2.0

    factor = stats.norm.ppf(0.975) if found.error == said else stats.t.ppf(0.975, TIME.size - 3)
    for end in (found.low, found.high):
        assert squares(end) - squares(found.end) == pytest.approx((factor * found.error) ** 2, rel=1e-4)
    assert found.high - found.end > found.end - found.low  # hotter is less certain than cooler


@pytest.mark.parametrize(
    ("count", "length", "error"), [(7, 3600.0, 1.0), (5, 7200.0, 0.5), (12, 3000.0, 1.0), (30, 3600.0, 2.0)]
)
def test_the_interval_holds_the_truth_as_often_as_it_says(count, length, error):
    random = np.random.default_rng(2024)
    time = np.linspace(0.0, length, count)
    sinks = warm(time) + random.normal(0.0, error, (500, count))
    found = [fit(sink, time, error) for sink in sinks]
    assert np.mean([one.low <= 62.0 <= one.high for one in found]) == pytest.approx(0.95, abs=0.03)


def test_a_straight_line_has_no_upper_end():
    found = fit([25.0, 27.0, 29.0, 31.0])
    assert (found.end, found.high, found.time_constant) == (np.inf, np.inf, np.inf)
    assert 31.0 - 2.0 < found.low < 31.0
    bent = fit([25.0, 27.0, 28.9, 30.7])  # bends by less than the reading error
    assert np.isfinite(bent.end)
    assert bent.high == np.inf
    assert np.isfinite(fit([25.0, 27.0, 28.9, 30.7], error=0.005).high)


@pytest.mark.parametrize(
    ("sink", "accelerating"),
    [
        ([25.0, 27.0, 30.0, 35.0, 43.0], True),
        ([40.0, 42.0, 45.0, 49.0, 54.0, 60.0], True),
        ([25.0, 27.0, 30.0, 33.0, 36.0], False),  # within the reading error
        ([25.0, 27.0, 30.3, 34.9, 40.8], False),  # beyond its 95 %, and that is one straight line in forty
        ([25.0, 35.0, 42.0, 47.0, 50.0], False),
        ([25.0, 27.0, 29.0, 31.0, 33.0], False),
        ([60.0, 58.0, 55.0, 50.0, 42.0], False),  # falls faster and faster
    ],
)
def test_faster_and_faster_beyond_the_reading_error(sink, accelerating):
    found = fit(sink)
    assert found.accelerating is accelerating
    assert np.isnan(found.end) == (accelerating or found.trend < 0)


def test_faster_and_faster_is_seen_earlier_by_a_better_thermometer():
    assert fit([25.0, 26.0, 28.0, 31.0], error=0.3).accelerating
    assert not fit([25.0, 26.0, 28.0, 31.0], error=1.0).accelerating


@pytest.mark.parametrize(
    ("sink", "trend"),
    [([50.0] * 6, 0), ([60.0, 50.0, 45.0, 42.0], -1), ([50.0, 51.0, 50.4, 50.9], 0), ([30.0, 34.9, 39.0], 1)],
)
def test_what_does_not_rise_has_no_end(sink, trend):
    found = fit(sink)
    assert found.trend == trend
    assert np.isnan([found.end, found.low, found.high]).all() == (trend < 1)
    assert (
        trend == 1 or time_needed(time=TIME[: len(sink)], sink=sink, reading_error=1.0, within=5.0) == np.inf
    )


def test_a_step_between_two_readings_has_an_end_and_no_time_constant():
    found = fit([25.0, 60.0, 60.4, 59.6, 60.0])
    assert found.end == pytest.approx(60.0, abs=0.05)
    assert np.isnan(found.time_constant)


def test_something_slower_that_still_warms_is_seen():
    """A heatsink of 5 minutes in air that climbs by 12 K an hour: its curve has settled and the readings have not."""
    climbing = 24.0 + 30.0 * (1.0 - np.exp(-TIME / 300.0)) + 0.2 * TIME / 60.0
    assert fit(climbing).lagging
    assert not fit(climbing - 0.2 * TIME / 60.0).lagging
    assert not fit(2.0 * warm() - climbing).lagging  # less steeply is no lag
    assert not fit(climbing[::3]).lagging  # any three readings lie on some curve


def test_noise_is_rarely_taken_for_something_slower():
    random = np.random.default_rng(7)
    sinks = warm() + random.normal(0.0, 1.0, (200, TIME.size))
    assert np.mean([fit(sink).lagging for sink in sinks]) < 0.01


def test_scatter_beyond_what_was_said_widens_the_interval():
    sink = warm() + 0.8 * np.array([1, -1, 1, -1, 1, -1, 1])
    believed, not_believed = fit(sink, error=1.0), fit(sink, error=0.1)
    assert believed.error == 1.0 > believed.scatter
    assert not_believed.error == not_believed.scatter == believed.scatter
    assert not_believed.high > believed.high  # Student's factor of 4 degrees of freedom is 2.78, not 1.96


@pytest.mark.parametrize("freedom", [1, 2, 3, 4, 5, 10, 31, 100, 999])
@pytest.mark.parametrize("level", [0.6827, 0.95, 0.9973])
def test_factors_of_student(freedom, level):
    # the oldest scipy itself is right to 2e-9 only
    assert two_sided(level, freedom) == pytest.approx(stats.t.ppf(0.5 + level / 2.0, freedom), rel=1e-8)


@pytest.mark.parametrize("freedom", [None, 10**6])
def test_factors_of_a_known_error(freedom):
    assert two_sided(0.95, freedom) == pytest.approx(np.sqrt(stats.chi2.ppf(0.95, 1)), rel=1e-9)


def test_readings_at_the_time_needed_are_enough_and_one_before_is_not():
    few = TIME[:3]
    more = time_needed(time=few, sink=warm(few), reading_error=1.0, within=5.0)
    assert more > 0.0
    assert more % 600.0 == 0.0

    def half(until):
        time = np.arange(0.0, until + 1.0, 600.0)
        found = fit(warm(time), time)
        return max(found.high - found.end, found.end - found.low)

    assert half(1200.0 + more) <= 5.0 < half(1200.0 + more - 600.0)


def test_no_time_is_needed_where_the_end_is_known():
    assert time_needed(time=TIME, sink=warm(), reading_error=1.0, within=5.0) == 0.0
    assert time_needed(time=TIME, sink=warm(), reading_error=1.0, within=2.0) > 0.0


@pytest.mark.parametrize(
    "sink", [[25.0, 27.0, 29.0, 31.0], [25.0, 27.0, 30.0, 35.0], [25.0, 27.0, 29.0, 30.99]]
)
def test_a_time_that_cannot_be_foreseen(sink):
    assert time_needed(time=TIME[:4], sink=sink, reading_error=1.0, within=5.0) == np.inf


def test_a_hotter_place_is_hotter_by_as_much():
    sink = warm() + 0.5 * np.sin(np.arange(TIME.size))
    cool, hot = fit(sink), fit(sink + 31.0)
    for name in ("end", "low", "high", "start"):
        assert getattr(hot, name) - getattr(cool, name) == pytest.approx(31.0, abs=1e-6)
    assert hot.time_constant == pytest.approx(cool.time_constant, rel=1e-6)


@pytest.mark.parametrize(
    ("given", "says"),
    [
        ({"time": [0.0, 1.0], "sink": [20.0, 21.0]}, "three readings or more, got 2"),
        ({"sink": [20.0, 21.0]}, "three readings or more"),
        ({"time": [0.0, 60.0, 60.0]}, "time must rise"),
        ({"time": [0.0, 60.0, 30.0]}, "time must rise"),
        ({"time": [0.0, 60.0, np.nan]}, "time must rise"),
        ({"sink": [20.0, np.nan, 30.0]}, "every reading must be a number"),
        ({"reading_error": 0.0}, "reading_error must be greater than zero"),
    ],
)  # fmt: skip
def test_what_is_no_log_is_refused(given, says):
    whole = {"time": [0.0, 60.0, 120.0], "sink": [20.0, 25.0, 28.0], "reading_error": 1.0} | given
    for function, more in ((soak_fit, {}), (time_needed, {"within": 5.0})):
        with pytest.raises(ValueError, match=says):
            function(**whole, **more)


def test_a_span_of_nothing_is_refused():
    with pytest.raises(ValueError, match="within must be greater than zero"):
        time_needed(time=TIME, sink=warm(), reading_error=1.0, within=0.0)
