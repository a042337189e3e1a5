"""Mains, rails, ripple, transformer; the dual-slope limiter."""

import numpy as np
import pytest

from safeamp.physics import limiter, supply
from tests.published_cases import given, number, printed


def test_published_mains_band():
    low, high = supply.mains_band(nominal=given("supply-1")["mains"])
    assert low == printed("supply-1", "low")
    assert high == printed("supply-1", "high")


def test_mains_band_of_cases_and_refusal():
    low, high = supply.mains_band(nominal=[100, 120, np.nan])
    np.testing.assert_allclose(low, [90, 108, np.nan])
    np.testing.assert_allclose(high, [110, 132, np.nan])
    with pytest.raises(ValueError, match=r"^nominal must be greater than zero, got 0\.0$"):
        supply.mains_band(nominal=0.0)


def test_published_high_line():
    values = given("supply-2")
    no_load = values["rail"] * (1 + values["regulation"])
    found = supply.scaled(reading=no_load, mains=1 + values["high_line"], at_mains=1)
    assert found == printed("supply-2", "off_load_high")
    assert supply.regulation(no_load=no_load, full_load=values["rail"]) == pytest.approx(values["regulation"])


@pytest.mark.parametrize(
    ("mains", "volts"), [(230, 35), (253, 38.5), (207, 31.5), (115, 17.5), (240, 36.5217)]
)
def test_scaled(mains, volts):
    # Derived: proportion to 35 V at 230 V.
    assert supply.scaled(reading=35, mains=mains, at_mains=230) == pytest.approx(volts, rel=1e-5)


def test_published_ripple():
    values = given("supply-3")
    whole = supply.ripple_peak_to_peak(
        **{name: values[name] for name in ("current", "capacitance", "frequency")}
    )
    rms = supply.ripple_rms(peak_to_peak=whole)
    assert rms == printed("supply-3", "ripple_rms")
    mean = values["peak"] - whole / 2
    assert mean == printed("supply-3", "dc")
    assert rms / mean == printed("supply-3", "ripple")


@pytest.mark.parametrize(
    ("current", "microfarads", "hertz", "volts"),
    [(1, 10000, 50, 1), (1, 10000, 60, 5 / 6), (0, 4700, 50, 0), (2.5, 5000, 50, 5), (1, 1000, 100, 5)],
)
def test_ripple(current, microfarads, hertz, volts):
    # Derived: I/(2 f C).
    found = supply.ripple_peak_to_peak(current=current, capacitance=microfarads * 1e-6, frequency=hertz)
    assert found == pytest.approx(volts)


def test_ripple_rms_is_that_of_a_saw_tooth():
    # Derived: rms of a straight line from -1 to 1, taken point by point.
    line = np.linspace(-1, 1, 200001)
    assert supply.ripple_rms(peak_to_peak=2.0) == pytest.approx(np.sqrt(np.mean(line**2)), rel=1e-4)


def test_published_regulation_is_to_the_loaded_voltage():
    found = supply.regulation(**given("supply-4"))
    assert found == printed("supply-4", "regulation")
    assert found != pytest.approx(4 / 60, rel=1e-3)


@pytest.mark.parametrize(
    ("fraction", "volts"), [(0, 35), (1, 30), (0.25, 32.5), (0.125, 33.2322), (1 / 3, 32.1132)]
)
def test_level_rail(fraction, volts):
    # Derived: 35 - sqrt(f) x 5.
    assert supply.level_rail(no_load=35, full_load=30, fraction=fraction) == pytest.approx(volts, abs=1e-4)


@pytest.mark.parametrize("fraction", [-0.001, 1.001])
def test_level_rail_refuses_levels_beyond_clipping(fraction):
    with pytest.raises(ValueError, match=rf"^fraction must be between 0 and 1, got {fraction}$"):
        supply.level_rail(no_load=35, full_load=30, fraction=fraction)


def test_secondary_current():
    # Common practice: 1.6 to 1.8 times the direct current; the larger unless told.
    assert supply.secondary_current(mean_current=2) == pytest.approx(3.6)
    assert supply.secondary_current(mean_current=2, form_factor=1.6) == pytest.approx(3.2)
    with pytest.raises(ValueError, match=r"^form_factor must be between 1 and inf, got 0\.99$"):
        supply.secondary_current(mean_current=2, form_factor=0.99)


@pytest.mark.parametrize(
    ("watts", "amperes", "apparent"), [(100, 1.5, 144.2), (0, 0, 0), (50, 1, 72.8), (200, 3, 288.4)]
)
def test_transformer(watts, amperes, apparent):
    # Derived: 1.4 (W + 2 V x I).
    assert supply.transformer_va(power=watts, mean_current=amperes) == pytest.approx(apparent)


@pytest.mark.parametrize(
    ("actual", "rated", "frequency", "rated_frequency", "ratio"),
    [
        (230, 230, 50, 50, 1),
        (240, 220, 50, 50, 12 / 11),
        (230, 220, 50, 60, 1.25454545),
        (120, 120, 60, 50, 5 / 6),
        (117, 100, 50, 50, 1.17),
    ],
)
def test_volts_per_hertz(actual, rated, frequency, rated_frequency, ratio):
    found = supply.volts_per_hertz(
        actual=actual, rated=rated, frequency=frequency, rated_frequency=rated_frequency
    )
    assert found == pytest.approx(ratio)


def test_published_limiter():
    values = given("limiter-1")
    resistor = limiter.sense_resistor(limit_current=values["il"], threshold=values["phi"])
    assert resistor == printed("limiter-1", "emitter_resistor")
    current = limiter.shorted_current(
        limit_current=values["il"], half_supply=values["vb"], slope_voltage=values["vm"]
    )
    assert current == printed("limiter-1", "shorted_current")
    assert limiter.shorted_power(shorted_current=current, half_supply=values["vb"]) == printed(
        "limiter-1", "shorted_power"
    )
    assert number("1.8 A") < current


def test_limiter_ends():
    # Derived: at the slope voltage nothing is left; a slope far away leaves the limit.
    found = limiter.shorted_current(limit_current=3, half_supply=30, slope_voltage=[30, 60, 3e9])
    assert list(found) == pytest.approx([0, 1.5, 3])
    with pytest.raises(
        ValueError, match=r"^slope_voltage must be at least the half supply of 30\.0, got 29\.9$"
    ):
        limiter.shorted_current(limit_current=3, half_supply=30, slope_voltage=29.9)


@pytest.mark.parametrize(("limit", "ohms"), [(1, 0.65), (3, 0.216667), (6.5, 0.1), (10, 0.065)])
def test_sense_resistor(limit, ohms):
    # Derived: 0.65 V over the limit.
    assert limiter.sense_resistor(limit_current=limit) == pytest.approx(ohms, rel=1e-5)
