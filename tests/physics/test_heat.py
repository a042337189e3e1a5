"""Heat: published chains, derated powers, Foster networks."""

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from safeamp.physics import heat
from tests.published_cases import given, number, printed


def chain(name):
    """Junction, case and sink of a published chain: junction to case, case to sink, sink to air."""
    values = given(name)
    inner, middle, outer = values["resistances"]
    power = values["power"]
    sink = heat.sink_temperature(air=values["air"], stage_power=power, shared_by=1, sink_to_air=outer)
    case = heat.case_temperature(sink=sink, device_power=power, case_to_sink=middle)
    return heat.junction_temperature(case=case, device_power=power, junction_to_case=inner), case, sink


@pytest.mark.parametrize("name", ["heat-1", "heat-2"])
def test_published_chain(name):
    junction, case, sink = chain(name)
    assert junction == printed(name, "junction")
    assert case == printed(name, "case")
    assert sink == printed(name, "sink")


def test_published_heatsink():
    needed = heat.sink_to_air_needed(**given("heat-3"))
    assert needed == printed("heat-3", "to_air")


def test_heatsink_needed_closes_the_chain():
    # Derived: a heatsink of the needed resistance brings the junction to exactly where it was asked for.
    needed = heat.sink_to_air_needed(junction=130, air=45, power=12, junction_to_case=1.4, case_to_sink=0.6)
    sink = heat.sink_temperature(air=45, stage_power=12, shared_by=1, sink_to_air=needed)
    case = heat.case_temperature(sink=sink, device_power=12, case_to_sink=0.6)
    assert heat.junction_temperature(case=case, device_power=12, junction_to_case=1.4) == pytest.approx(130)


def test_no_heatsink_is_enough_where_the_rest_of_the_chain_takes_all():
    # Derived: 20 W through 3 K/W is 60 K, 10 K more than the span: 50/20 - 3 = -0.5 K/W.
    needed = heat.sink_to_air_needed(junction=90, air=40, power=20, junction_to_case=2, case_to_sink=1)
    assert needed == pytest.approx(-0.5)


@pytest.mark.parametrize("name", ["heat-4", "heat-6"])
def test_published_allowed_power(name):
    values = given(name)
    power = heat.allowed_power(
        junction_limit=values["junction"], air=values["air"], resistance=sum(values["resistances"])
    )
    assert power == printed(name, "power")


def test_published_resistance_from_the_rating():
    values = given("heat-5")
    inner = heat.printed_junction_to_case(power=values["power"], junction_limit=values["junction"])
    assert inner == printed("heat-5", "junction_to_case")
    usable = heat.allowed_power(
        junction_limit=values["junction"],
        air=values["air"],
        resistance=inner + values["case_to_sink"] + values["to_air"],
    )
    assert usable == printed("heat-5", "usable_power")


def test_published_rating_of_a_115_w_type():
    values = given("soa-1")
    found = heat.printed_junction_to_case(**values)
    assert found == printed("soa-1", "junction_to_case")
    assert 1 / found == printed("soa-1", "derating")


@pytest.mark.parametrize("name", ["soa-3", "soa-4"])
def test_published_derated_power(name):
    values = given(name)
    found = heat.derated_power(
        power=values["power"], derating=values["derating"], case_temperature=values["case"]
    )
    assert found == printed(name, "usable_power")


@pytest.mark.parametrize(
    ("case", "watts"), [(0, 100), (24, 100), (25, 100), (26, 99), (124, 1), (125, 0), (200, 0)]
)
def test_printed_power_holds_to_its_temperature_and_ends_at_the_limit(case, watts):
    # Derived: 100 W at 25 degC falling by 1 W/K is zero at 125 degC.
    assert heat.derated_power(power=100, derating=1, case_temperature=case) == pytest.approx(watts)


def test_refuses_a_limit_at_the_rating_temperature():
    with pytest.raises(
        ValueError, match=r"^junction_limit_above_power_at must be greater than zero, got 0\.0$"
    ):
        heat.printed_junction_to_case(power=100, junction_limit=25)


def test_two_stages_and_other_heat_share_one_heatsink():
    # Derived: (2 x 30 W + 5 W) x 0.4 K/W = 26 K above 30 degC.
    assert heat.sink_temperature(
        air=30, stage_power=30, shared_by=2, sink_to_air=0.4, other_heat=5
    ) == pytest.approx(56)


@pytest.mark.parametrize(
    ("conducting", "imbalance", "watts"),
    [(1, 0.0, 20), (2, 0.0, 10), (2, 0.5, 15), (4, 1.0, 10), (1, 0.1, 22)],
)
def test_hottest_device(conducting, imbalance, watts):
    # Derived: 40 W on 2n devices, times one plus the imbalance.
    assert heat.hottest_device_power(
        stage_power=40, conducting=conducting, imbalance=imbalance
    ) == pytest.approx(watts)


@pytest.mark.parametrize(("watts", "junction"), [(0, 40), (0.5, 71.25), (1, 102.5)])
def test_free_air(watts, junction):
    # Derived: 62.5 K/W above 40 degC.
    assert heat.free_air_junction(air=40, device_power=watts, junction_to_ambient=62.5) == pytest.approx(
        junction
    )


def foster():
    values = given("heat-10")
    return {"resistances": values["foster_resistance"], "time_constants": values["foster_time"]}


def test_published_foster_network():
    network = foster()
    assert heat.foster_impedance(**network, time=1e-3) == printed("heat-10", "at_1ms")
    assert heat.foster_impedance(**network, time=10e-3) == printed("heat-10", "at_10ms")
    assert heat.foster_impedance(**network, time=1e4) == printed("heat-10", "sum")


def test_foster_times_last_and_cases_first():
    network = {"resistances": [[1.0, 2.0], [3.0, 4.0]], "time_constants": [1e-3, 1e-2]}
    found = heat.foster_impedance(**network, time=[0.0, 1e-3, 1e9])
    assert found.shape == (2, 3)
    np.testing.assert_allclose(found[:, 0], 0)
    np.testing.assert_allclose(found[:, 2], [3, 7])
    # Derived: 1 - 1/e of the quick part, 1 - exp(-0.1) of the slow one.
    np.testing.assert_allclose(found[:, 1], np.array([[1, 2], [3, 4]]) @ [1 - np.exp(-1), 1 - np.exp(-0.1)])
    np.testing.assert_allclose(heat.foster_impedance(**network, time=1e9), [3, 7])


def test_foster_refuses_times_before_the_pulse():
    with pytest.raises(ValueError, match=r"^time must be zero or more, got -0\.001$"):
        heat.foster_impedance(**foster(), time=-1e-3)
    with pytest.raises(ValueError, match=r"^time_constants must be greater than zero, got 0\.0$"):
        heat.foster_impedance(resistances=[1.0], time_constants=[0.0], time=1.0)


def test_published_normalized_response():
    assert heat.transient_rise(**given("heat-11")) == printed("heat-11", "rise")
    assert number("88 degC") == pytest.approx(0.22 * 2 * 200)


def test_refuses_a_normalized_response_above_one():
    with pytest.raises(ValueError, match="one_minus_normalized must be zero or more"):
        heat.transient_rise(normalized=1.01, peak_power=1, resistance=1)


def test_periodic_rise_of_constant_heat_is_steady():
    # Derived: constant heat is its own mean, 10 W through 1.5 K/W.
    found = heat.periodic_rise(
        resistances=[1.0, 0.5], time_constants=[0.1, 1e-3], power=[10.0] * 8, period=0.05
    )
    np.testing.assert_allclose(found, 15.0)


def test_mean_of_the_periodic_rise_is_the_mean_heat_for_slow_networks():
    # Derived: a time constant of many periods leaves the mean power only: 25 W through 1 K/W.
    found = heat.periodic_rise(resistances=[1.0], time_constants=[100.0], power=[100.0, 0, 0, 0], period=0.05)
    np.testing.assert_allclose(found, 25.0, rtol=1e-3)


def test_periodic_rise_follows_the_heat_for_quick_networks():
    # Derived: a time constant far below a part settles within it.
    found = heat.periodic_rise(
        resistances=[2.0], time_constants=[1e-5], power=[100.0, 0, 40.0, 0], period=0.04
    )
    np.testing.assert_allclose(found, [200, 0, 80, 0], atol=1e-9)


def test_periodic_rise_of_a_pulse_agrees_with_its_closed_form():
    # Derived: on for a share d of the period, the peak is P R (1 - exp(-dT/tau)) / (1 - exp(-T/tau)).
    found = heat.periodic_rise(
        resistances=[[1.0]], time_constants=[[0.02]], power=[[80.0, 80.0, 0.0, 0.0]], period=[0.05]
    )
    peak = 80 * (1 - np.exp(-0.5 * 0.05 / 0.02)) / (1 - np.exp(-0.05 / 0.02))
    assert found.shape == (1, 4)
    assert np.max(found) == pytest.approx(peak)


def test_periodic_rise_agrees_with_an_integrated_network():
    network = {"resistances": np.array([0.4, 0.8]), "time_constants": np.array([4e-3, 30e-3])}
    phase = (np.arange(200) + 0.5) / 200 * 2 * np.pi
    found = heat.periodic_rise(**network, power=100 * np.maximum(np.sin(phase), 0), period=0.05)

    def slope(time, rise):
        power = 100 * max(np.sin(2 * np.pi * time / 0.05), 0)
        return (network["resistances"] * power - rise) / network["time_constants"]

    run = solve_ivp(slope, (0, 0.5), [0, 0], max_step=2e-4, rtol=1e-8, dense_output=True)
    times = 0.45 + 0.05 * np.arange(1, 201) / 200
    np.testing.assert_allclose(found, np.sum(run.sol(times), axis=0), rtol=2e-3)


@pytest.mark.parametrize("name", ["time_constants", "period"])
def test_periodic_rise_refuses(name):
    settings = {"resistances": [1.0], "time_constants": [1.0], "power": [1.0, 2.0], "period": 1.0}
    with pytest.raises(ValueError, match=rf"^{name} must be greater than zero, got 0\.0$"):
        heat.periodic_rise(**{**settings, name: np.zeros(np.shape(settings[name]))})
    with pytest.raises(ValueError, match=r"^power must be zero or more, got -2\.0$"):
        heat.periodic_rise(**{**settings, "power": [1.0, -2.0]})
