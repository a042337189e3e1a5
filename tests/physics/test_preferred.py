"""Preferred values and rated voltages."""

from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.physics.preferred import RATED_VOLTAGES, SERIES, next_preferred, next_rated_voltage
from tests.published_cases import case


def test_published_e12():
    assert list(SERIES["E12"]) == case("capacitor-9")["expected"]["values"]


def test_each_series_thins_out_the_next():
    # IEC 60063: E3 is every second value of E6, E6 of E12, E12 of E24.
    for thin, full in (("E3", "E6"), ("E6", "E12"), ("E12", "E24")):
        assert SERIES[thin] == SERIES[full][::2]


@pytest.mark.parametrize(
    ("value", "series", "direction", "found"),
    [
        (995e-6, "E6", "up", 1000e-6),
        (995e-6, "E6", "down", 680e-6),
        (1989e-6, "E6", "up", 2200e-6),
        (2200e-6, "E6", "up", 2200e-6),
        (2200e-6, "E6", "down", 2200e-6),
        (2201e-6, "E6", "up", 3300e-6),
        (2199e-6, "E6", "down", 1500e-6),
        (4.8, "E3", "up", 10.0),
        (0.21, "E12", "up", 0.22),
        (91.5, "E24", "up", 100.0),
        (99.0, "E24", "down", 91.0),
        (6.8, "E6", "up", 6.8),
        (1e-12, "E6", "up", 1e-12),
    ],
)
def test_next_preferred(value, series, direction, found):
    # Exact: the result is the float of its own decimals, not a product that is off in the last place.
    assert next_preferred(value, series, direction) == found


@settings(deadline=None)
@given(value=st.floats(1e-12, 1e9), series=st.sampled_from(sorted(SERIES)))
def test_up_and_down_enclose_the_value_within_one_step(value, series):
    up, down = next_preferred(value, series), next_preferred(value, series, "down")
    assert down <= value * (1 + 1e-9)
    assert up >= value * (1 - 1e-9)
    steps = [*SERIES[series], 10 * SERIES[series][0]]
    widest = max(above / below for below, above in pairwise(steps))
    assert up <= down * widest * (1 + 1e-9)


def test_cases_and_nan():
    found = next_preferred(np.array([[995e-6, np.nan], [1e-3, 3.4e-3]]))
    np.testing.assert_array_equal(found, [[1e-3, np.nan], [1e-3, 4.7e-3]])


def test_refuses():
    with pytest.raises(ValueError, match=r"^value must be greater than zero, got 0\.0$"):
        next_preferred(0.0)
    with pytest.raises(ValueError, match=r"^value must be finite, got inf$"):
        next_preferred([1.0, np.inf])
    with pytest.raises(ValueError, match=r"^series must be one of E3, E6, E12, E24, got E96$"):
        next_preferred(1.0, "E96")
    with pytest.raises(ValueError, match=r"^direction must be up or down, got near$"):
        next_preferred(1.0, "E6", "near")


@pytest.mark.parametrize(
    ("volts", "rated"),
    [(1, 6.3), (6.3, 6.3), (6.31, 10), (35, 35), (35.1, 40), (74.9, 80), (100.1, 160), (160, 160)],
)
def test_next_rated_voltage(volts, rated):
    assert next_rated_voltage(volts) == rated


def test_rated_voltage_of_cases_and_refusals():
    assert sorted(RATED_VOLTAGES) == list(RATED_VOLTAGES)
    np.testing.assert_array_equal(next_rated_voltage([41.0, np.nan]), [50, np.nan])
    with pytest.raises(ValueError, match=r"^voltage must be at most 160, got 160\.1$"):
        next_rated_voltage([50.0, 160.1])
    with pytest.raises(ValueError, match=r"^voltage must be greater than zero, got -1\.0$"):
        next_rated_voltage(-1.0)


def test_e24_follows_its_geometric_series():
    # IEC 60063: 24 values a decade, each within 5 % of a power of the 24th root of ten.
    ideal = 10 * 10 ** (np.arange(24) / 24)
    assert np.max(np.abs(np.array(SERIES["E24"]) / ideal - 1)) < 0.05
    assert list(SERIES["E24"]) == sorted(SERIES["E24"])


def test_rated_voltages_one_by_one():
    just_above = np.array([0.1, *RATED_VOLTAGES[:-1]]) * 1.0001
    wanted = [6.3, 10, 16, 25, 35, 40, 50, 63, 80, 100, 160]
    assert list(next_rated_voltage(just_above)) == wanted
