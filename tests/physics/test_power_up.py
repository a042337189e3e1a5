"""Limiter and amplifier together at the first power-up: closed forms, energy, and the rule of 0.365."""

import numpy as np
import pytest
from scipy.integrate import solve_ivp
from scipy.optimize import brentq

from safeamp.physics import lamp, power_up
from tests.published_cases import given, printed

LAMP = {"rated_power": 60.0, "rated_voltage": 230.0}
IDLE = {"mains": 230.0, "apparent_power": 20.0}


def test_published_lamp_carries_its_rated_power_into_a_short():
    values = given("lamp-1")
    rated = {"rated_power": values["lamp"], "rated_voltage": values["mains"]}
    left = lamp.voltage_behind_lamp(mains=values["mains"], resistance=0.0, **rated)
    current = lamp.lamp_current(voltage=values["mains"] - left, **rated)
    assert values["mains"] / current == printed("lamp-1", "hot")
    assert lamp.power_share(voltage=values["mains"] - left, **rated) == pytest.approx(1.0)


@pytest.mark.parametrize(("share", "power"), [(1.0, 1.0), (0.5, 0.341510), (0.1, 0.028184)])
def test_power_share(share, power):
    # Derived: s^1.55.
    assert lamp.power_share(voltage=230 * share, **LAMP) == pytest.approx(power, rel=1e-5)


@pytest.mark.parametrize(
    ("no_load", "full_load", "amperes", "ohms"), [(34, 31, 1.0, 3), (60, 56, 2, 2), (34, 34, 1, 0)]
)
def test_winding_resistance(no_load, full_load, amperes, ohms):
    found = power_up.winding_resistance(no_load=no_load, full_load=full_load, mean_current=amperes)
    assert found == pytest.approx(ohms)


def test_a_rail_that_rises_under_load_has_no_resistance_below_zero():
    assert power_up.winding_resistance(no_load=34, full_load=[33, 35], mean_current=1).tolist() == [1, 0]


def test_a_fault_seen_from_the_mains_takes_the_same_power():
    # Derived: 68 V across 6.8 ohm is 680 W; so is 230 V across what the mains sees.
    ohms = power_up.seen_from_mains(resistance=6.8, mains=230, no_load=68)
    assert 230**2 / ohms == pytest.approx(680)


def test_behind_a_resistor_a_steady_current_drops_ohm_s_law():
    # Derived, n = 1: V - R S/V_mains = 230 - 680 x 20/230.
    found = power_up.idle_behind_resistor(**IDLE, exponent=1, resistance=680)
    assert found == pytest.approx(230 - 680 * 20 / 230, rel=1e-12)


def test_behind_a_resistor_a_resistance_divides():
    # Derived, n = 2: the amplifier is 230^2/20 ohm.
    found = power_up.idle_behind_resistor(**IDLE, exponent=2, resistance=680)
    assert found == pytest.approx(230 * 2645 / (2645 + 680), rel=1e-12)


def test_behind_a_resistor_a_square_law_is_a_quadratic():
    # Derived, n = 3: v + k v^2 = V with k = R S/V^3.
    k = 680 * 20 / 230**3
    found = power_up.idle_behind_resistor(**IDLE, exponent=3, resistance=680)
    assert found == pytest.approx((np.sqrt(1 + 4 * k * 230) - 1) / (2 * k), rel=1e-12)


@pytest.mark.parametrize("exponent", [1.0, 1.3, 2.0])
@pytest.mark.parametrize("power", [0.5, 5.0, 20.0, 45.0])
def test_lamp_and_amplifier_share_mains_current_and_power(power, exponent):
    draw = {"mains": 230.0, "apparent_power": power, "exponent": exponent}
    left = power_up.idle_behind_lamp(**draw, **LAMP)
    current = lamp.lamp_current(voltage=230 - left, **LAMP)
    assert current == pytest.approx(power_up.idle_mains_current(voltage=left, **draw), rel=1e-9)
    lamp_power = 60 * lamp.power_share(voltage=230 - left, **LAMP)
    assert lamp_power + power * (left / 230) ** exponent == pytest.approx(230 * current, rel=1e-9)


def test_the_voltage_behind_a_lamp_is_the_root_that_another_search_finds():
    def excess(left):
        return 60 / 230 * ((230 - left) / 230) ** 0.55 - 20 / 230 * (left / 230) ** 0.5

    found = power_up.idle_behind_lamp(**IDLE, exponent=1.5, **LAMP)
    assert found == pytest.approx(brentq(excess, 1, 229, xtol=1e-12), rel=1e-9)


def test_a_lamp_that_cannot_feed_the_idle_leaves_nothing():
    # Derived: 80 W at 230 V want more than the 0.26 A that 60 W pass with all of the mains across them.
    assert power_up.idle_behind_lamp(mains=230, apparent_power=80, exponent=1, **LAMP) == 0.0
    assert power_up.idle_behind_resistor(mains=230, apparent_power=80, exponent=1, resistance=680) == 0.0


def test_what_draws_nothing_has_the_whole_mains():
    assert power_up.idle_behind_lamp(mains=230, apparent_power=0, exponent=1, **LAMP) == pytest.approx(230)


@pytest.mark.parametrize("exponent", [0.99, -1.0])
def test_an_idle_that_rises_as_the_rails_fall_is_refused(exponent):
    with pytest.raises(ValueError, match=rf"^exponent must be between 1 and inf, got {exponent}$"):
        power_up.idle_mains_current(**IDLE, voltage=200, exponent=exponent)


@pytest.mark.parametrize("watts", [25.0, 40.0, 60.0, 100.0])
def test_no_resistive_fault_gets_more_than_0365_of_the_lamp(watts):
    # Derived: the maximum over s of (1 - s) s^0.55 is 0.365.
    rated = {"rated_power": watts, "rated_voltage": 230.0}
    ohms = np.geomspace(1, 1e6, 4001)
    left = lamp.voltage_behind_lamp(mains=230, resistance=ohms, **rated)
    most = power_up.most_through_lamp(mains=230, **rated)
    assert most == pytest.approx(0.365 * watts, rel=2e-3)
    assert np.max(left**2 / ohms) == pytest.approx(most, rel=1e-4)
    assert np.all(left**2 / ohms <= most * (1 + 1e-12))


def test_more_mains_lets_more_through_by_its_power_155():
    ohms = np.geomspace(10, 1e5, 20001)
    left = lamp.voltage_behind_lamp(mains=253, resistance=ohms, **LAMP)
    found = power_up.most_through_lamp(mains=253, **LAMP)
    assert found == pytest.approx(60 * 0.365 * 1.1**1.55, rel=1e-3)
    assert np.max(left**2 / ohms) == pytest.approx(found, rel=1e-5)


def test_most_through_a_resistor_is_the_maximum_over_all_faults():
    ohms = np.geomspace(10, 1e5, 20001)
    taken = (230 * ohms / (ohms + 680)) ** 2 / ohms
    found = power_up.most_through_resistor(mains=230, resistance=680)
    assert np.max(taken) == pytest.approx(found, rel=1e-6)


def test_the_flash_ends_when_the_reservoirs_are_charged():
    def fall(_, volts):
        return -60 / 230 * np.maximum(volts, 0) ** 0.55 / 230**0.55 / 3e-4

    ended = solve_ivp(fall, (0, 10), [253.0], events=lambda _, v: v[0] - 1e-6, rtol=1e-9, atol=1e-9)
    found = power_up.flash_time(mains=253, capacitance=3e-4, **LAMP)
    assert found == pytest.approx(ended.t_events[0][0], rel=1e-3)


LAMPS = np.array([25.0, 40.0, 60.0, 100.0])


def test_a_larger_lamp_leaves_more_rails_and_lets_more_fault_heat_through():
    rails = power_up.idle_behind_lamp(**IDLE, exponent=1, rated_power=LAMPS, rated_voltage=230)
    heat = power_up.most_through_lamp(mains=230, rated_power=LAMPS, rated_voltage=230)
    assert np.all(np.diff(rails) > 0)
    assert np.all(np.diff(heat) > 0)


@pytest.mark.parametrize("exponent", [1.0, 2.0])
def test_more_draw_leaves_less_and_more_mains_leaves_more(exponent):
    powers = np.linspace(1, 50, 50)
    left = power_up.idle_behind_lamp(mains=230, apparent_power=powers, exponent=exponent, **LAMP)
    assert np.all(np.diff(left) < 0)
    assert power_up.idle_behind_lamp(mains=253, apparent_power=20, exponent=exponent, **LAMP) > left[19]


def test_cases_broadcast_over_two_axes():
    found = power_up.idle_behind_lamp(
        mains=np.array([[230.0], [253.0]]), apparent_power=[5.0, 10.0, 20.0], exponent=1, **LAMP
    )
    assert found.shape == (2, 3)
    assert found[1, 2] == power_up.idle_behind_lamp(mains=253, apparent_power=20, exponent=1, **LAMP)
