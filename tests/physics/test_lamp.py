"""Series lamp of the first power-up."""

import numpy as np
import pytest
from scipy.optimize import minimize_scalar

from safeamp.physics import lamp
from tests.published_cases import case, given, printed

LAMP = {"rated_power": 60.0, "rated_voltage": 230.0}


def test_published_hot_resistance():
    values = given("lamp-1")
    found = lamp.hot_resistance(rated_power=values["lamp"], rated_voltage=values["mains"])
    assert found == printed("lamp-1", "hot")


@pytest.mark.parametrize("ratio", case("lamp-1")["expected"]["cold_ratio"])
def test_published_cold_filament(ratio):
    found = lamp.lamp_resistance(voltage=[0.0, 0.1], rated_power=100, rated_voltage=120, cold_ratio=ratio)
    assert list(found) == pytest.approx([144 / ratio] * 2)


@pytest.mark.parametrize("ratio", [9.9, 15.1])
def test_refuses_other_cold_ratios(ratio):
    with pytest.raises(ValueError, match=rf"^cold_ratio must be between 10 and 15, got {ratio}$"):
        lamp.lamp_resistance(voltage=1, **LAMP, cold_ratio=ratio)


@pytest.mark.parametrize("share", [1.0, 0.7, 0.5, 0.1, 0.01])
def test_current_goes_with_the_power_055_of_the_voltage(share):
    # Common practice: I = I_rated (V/V_rated)^0.55 as long as the filament glows.
    found = lamp.lamp_current(voltage=230 * share, **LAMP)
    assert found == pytest.approx(60 / 230 * share**0.55)


def test_a_cold_filament_follows_ohm():
    # Derived: below (1/15)^(1/0.45) of the rated voltage the resistance stays at R_hot/15.
    edge = 230 * 15 ** (-1 / 0.45)
    cold = 230**2 / 60 / 15
    found = lamp.lamp_current(voltage=[edge, edge / 2, edge / 10], **LAMP)
    assert list(found) == pytest.approx([edge / cold, edge / 2 / cold, edge / 10 / cold])


def test_worst_fault_of_a_60_w_lamp():
    # 60 W, 230 V: a resistive fault draws 21.9 W at most, and never more than 0.26 A.
    assert lamp.worst_fault_power(rated_power=60) == pytest.approx(21.9, abs=0.05)
    assert lamp.lamp_current(voltage=230, **LAMP) == pytest.approx(0.26, abs=0.005)


def test_worst_fault_is_the_maximum_over_all_resistances():
    def taken(ohms):
        left = lamp.voltage_behind_lamp(mains=230, resistance=ohms, **LAMP)
        return -(left**2) / ohms

    worst = minimize_scalar(taken, bounds=(10, 5000), method="bounded", options={"xatol": 1e-6})
    assert -worst.fun == pytest.approx(lamp.worst_fault_power(rated_power=60), rel=1e-6)


@pytest.mark.parametrize("ohms", [1.0, 50.0, 300.0, 1000.0, 20000.0])
def test_lamp_and_load_carry_one_current(ohms):
    left = lamp.voltage_behind_lamp(mains=230, resistance=ohms, **LAMP)
    assert lamp.lamp_current(voltage=230 - left, **LAMP) == pytest.approx(left / ohms, rel=1e-9)


def test_a_short_leaves_nothing_and_a_light_load_nearly_all():
    left = lamp.voltage_behind_lamp(mains=230, resistance=[0.0, 1e6], **LAMP)
    assert left[0] == pytest.approx(0, abs=1e-9)
    # Derived: 0.23 mA through the cold filament of 58.8 ohm drops 13.5 mV.
    assert 230 - left[1] == pytest.approx(0.0135, abs=5e-5)


def test_more_load_leaves_less_and_a_larger_lamp_more():
    left = lamp.voltage_behind_lamp(mains=230, resistance=np.array([2000.0, 1000.0, 500.0]), **LAMP)
    assert np.all(np.diff(left) < 0)
    larger = lamp.voltage_behind_lamp(mains=230, resistance=500, rated_power=100, rated_voltage=230)
    assert larger > left[2]
