"""Settled idle: the loop of heat and current solved, against independent solvers and a run in time."""

import numpy as np
import pytest
from hypothesis import given as drawn
from hypothesis import settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp
from scipy.optimize import brentq

from safeamp.physics import bias

MOSFET = {
    "device_voltage": 52.0,
    "junction_to_case": 0.70,
    "case_to_sink": 0.45,
    "sink_resistance": 3.0,
    "sensor": "none",
    "tracking": 0.8,
    "idle_at": "cold",
    "set_air": 30.0,
    "air": 30.0,
    "junction_limit": 150.0,
    "drift": 6.4e-3,
    "emitter_resistor": 0.22,
    "transconductance_parameter": 3.0,
}
BIPOLAR = {
    **MOSFET,
    "drift": 2.0e-3,
    "transconductance_parameter": None,
    "thermal_voltage": 0.0257,
    "sensor": "heatsink",
    "junction_limit": 200.0,
}


def junction(current, **loop):
    names = ("device_voltage", "junction_to_case", "case_to_sink", "sink_resistance", "air")
    return bias.idle_junction(
        current=current, sink_rise=loop.get("sink_rise", 0.0), **{name: loop[name] for name in names}
    )


def excess(current, set_current, loop, sink=None):
    """Control voltage that the heat frees less what the current needs, in V; positive: the current rises."""
    untracked = 1 - loop["tracking"]
    of_sink = 1.0 if loop["sensor"] == "none" else untracked
    of_case = untracked if loop["sensor"] == "device" else 1.0
    heat, reference = loop["device_voltage"] * current, 0.0
    if loop["idle_at"] == "warm":
        reference = loop["device_voltage"] * set_current
    if sink is None:
        sink = loop["air"] + loop.get("sink_rise", 0.0) + loop["sink_resistance"] * heat
    sink_reference = loop["set_air"] + loop["sink_resistance"] * reference
    inner = loop["junction_to_case"] + of_case * loop["case_to_sink"]
    rise = inner * (heat - reference) + of_sink * (sink - sink_reference)
    needed = loop["emitter_resistor"] * (current - set_current)
    if loop["transconductance_parameter"] is None:
        needed = needed + loop["thermal_voltage"] * np.log(current / set_current)
    else:
        stiff = loop["transconductance_parameter"]
        needed = needed + np.sqrt(2 * current / stiff) - np.sqrt(2 * set_current / stiff)
    return loop["drift"] * rise - needed


def searched(set_current, loop, sink=None):
    """The lowest zero of `excess` found on a dense grid; inf if none."""
    currents = set_current * np.geomspace(1e-6, 1e4, 40001)
    freed = excess(currents, set_current, loop, sink)
    if freed[0] <= 0:
        return 0.0
    crossed = np.flatnonzero((freed[:-1] > 0) & (freed[1:] <= 0))
    if not crossed.size:
        return np.inf
    ends = currents[crossed[0]], currents[crossed[0] + 1]
    return brentq(lambda current: excess(current, set_current, loop, sink), *ends, xtol=1e-15)


def expected(set_current, loop):
    held = searched(set_current, loop, sink=loop["air"] + loop.get("sink_rise", 0.0))
    settled = searched(set_current, loop)
    if np.isfinite(settled) and junction(settled, **loop) > loop["junction_limit"]:
        return np.inf
    if np.isfinite(held) and junction(held, **{**loop, "sink_resistance": 0.0}) > loop["junction_limit"]:
        return np.inf
    return max(held, settled)


def test_vertical_mosfets_in_a_flat_bias():
    # 20 mA settles at 44 mA, junction 39 degC; 30 mA, 100 mA, and 20 mA in air 20 K warmer do not settle.
    found = bias.settled_idle(**MOSFET, set_current=np.array([0.020, 0.030, 0.100]))
    assert found[0] == pytest.approx(0.044, abs=0.0005)
    assert junction(found[0], **MOSFET) == pytest.approx(39, abs=0.5)
    assert list(found[1:]) == [np.inf, np.inf]
    assert bias.settled_idle(**{**MOSFET, "air": 50.0}, set_current=0.020) == np.inf


def test_six_millivolts_a_kelvin_on_the_heatsink_tame_them():
    # A generator that falls 6 of the 6.4 mV/K follows 94 % of the heatsink.
    loop = {**MOSFET, "sensor": "heatsink", "tracking": 6 / 6.4}
    now = bias.settled_idle(**loop, set_current=0.100)
    warmer = bias.settled_idle(**{**loop, "air": 50.0}, set_current=0.100)
    assert 0.100 < now < 0.200
    assert now < warmer < 0.300


def test_the_square_law_settles_where_the_hand_says():
    # Derived for 20 mA: 0.0064 V/K x 215.8 K/A x I = sqrt(2I/3) - 0.11547 + 0.22 (I - 0.02); I = 43.6 mA
    # gives 60.22 mV = 170.49 - 115.47 + 5.19 = 60.21 mV.
    assert bias.settled_idle(**MOSFET, set_current=0.020) == pytest.approx(0.0436, abs=5e-5)


def test_no_feedback_leaves_the_set_point():
    for loop in (MOSFET, BIPOLAR):
        found = bias.settled_idle(**{**loop, "drift": 0.0}, set_current=0.05)
        assert found == pytest.approx(0.05)


def test_warm_set_point_stays_in_the_same_air():
    found = bias.settled_idle(**{**BIPOLAR, "idle_at": "warm"}, set_current=[0.02, 0.05, 0.1])
    assert list(found) == pytest.approx([0.02, 0.05, 0.1])


def test_warm_set_point_beyond_index_one_runs_away():
    # The index passes 1 at 124 mA: just below it stays, just above it any disturbance grows.
    found = bias.settled_idle(**{**MOSFET, "idle_at": "warm"}, set_current=[0.120, 0.123, 0.126, 0.150])
    assert list(found[:2]) == pytest.approx([0.120, 0.123])
    assert list(found[2:]) == [np.inf, np.inf]


def test_the_junction_limit_counts():
    at = junction(bias.settled_idle(**MOSFET, set_current=0.02), **MOSFET)
    for limit, runs_away in ((at - 1e-6, True), (at + 1e-6, False)):
        found = bias.settled_idle(**{**MOSFET, "junction_limit": limit}, set_current=0.02)
        assert np.isinf(found) == runs_away


def test_over_compensated_bias_is_hottest_before_the_heatsink_warms():
    loop = {**BIPOLAR, "tracking": 1.6, "idle_at": "warm"}
    cold_start = bias.settled_idle(**loop, set_current=0.1)
    assert cold_start == pytest.approx(searched(0.1, loop, sink=loop["air"]), rel=1e-9)
    assert cold_start > 0.1


def test_reversed_drift_settles_below_the_set_point():
    loop = {**MOSFET, "drift": -3e-3}
    found = bias.settled_idle(**loop, set_current=0.1)
    assert 0 < found < 0.1
    assert found == pytest.approx(expected_reversed(loop), rel=1e-9)


def expected_reversed(loop):
    held = searched(0.1, loop, sink=loop["air"])
    return max(held, searched(0.1, loop))


def test_a_cut_off_mosfet_idles_at_nothing():
    found = bias.settled_idle(**{**MOSFET, "air": -100.0}, set_current=0.02)
    assert found == 0.0


def test_refuses_an_unknown_state_and_says_it():
    with pytest.raises(ValueError, match=r"^idle_at must be cold or warm, got hot$"):
        bias.settled_idle(**{**MOSFET, "idle_at": "hot"}, set_current=0.02)
    with pytest.raises(ValueError, match=r"^transconductance_parameter must be greater than zero, got 0\.0$"):
        bias.settled_idle(**{**MOSFET, "transconductance_parameter": 0.0}, set_current=0.02)


def test_nan_stays_in_its_case():
    found = bias.settled_idle(**{**MOSFET, "air": np.array([30.0, np.nan, 50.0])}, set_current=0.02)
    assert np.isfinite(found[0])
    assert np.isnan(found[1])
    assert np.isinf(found[2])


LOOPS = st.fixed_dictionaries(
    {
        "device_voltage": st.floats(15, 90),
        "junction_to_case": st.floats(0.3, 3),
        "case_to_sink": st.floats(0.1, 2),
        "sink_resistance": st.floats(0.2, 12),
        "sensor": st.sampled_from(["none", "heatsink", "device"]),
        "tracking": st.floats(0, 1.4),
        "idle_at": st.sampled_from(["cold", "warm"]),
        "set_air": st.floats(15, 35),
        "air": st.floats(15, 60),
        "sink_rise": st.floats(0, 40),
        "junction_limit": st.sampled_from([150.0, 200.0]),
        "drift": st.floats(1e-3, 7e-3),
        "emitter_resistor": st.sampled_from([0.0, 0.1, 0.22, 0.47]),
        "transconductance_parameter": st.sampled_from([None, 0.8, 3.0]),
        "thermal_voltage": st.just(0.0257),
    }
)
CURRENTS = st.floats(0.005, 2.0)


@settings(deadline=None, max_examples=150)
@drawn(loop=LOOPS, set_current=CURRENTS)
def test_agrees_with_a_dense_search(loop, set_current):
    found = bias.settled_idle(**loop, set_current=set_current)
    if loop["idle_at"] == "warm" and np.isinf(found):
        return  # An unstable set point is left to its own test.
    # abs: a bipolar device far below its set point, where the grid ends.
    assert found == pytest.approx(expected(set_current, loop), rel=1e-6, abs=2e-6 * set_current)


@settings(deadline=None, max_examples=100)
@drawn(
    loop=LOOPS,
    set_current=CURRENTS,
    more=st.floats(1.001, 1.5),
    name=st.sampled_from(["device_voltage", "junction_to_case", "case_to_sink", "sink_resistance"]),
)
def test_more_heat_never_settles_lower_when_set_cold(loop, set_current, more, name):
    loop = {**loop, "idle_at": "cold", "tracking": min(loop["tracking"], 1.0)}
    loop["air"] = loop["set_air"] + abs(loop["air"] - loop["set_air"])
    worse = {**loop, name: loop[name] * more}
    before = bias.settled_idle(**loop, set_current=set_current)
    assert bias.settled_idle(**worse, set_current=set_current) >= before * (1 - 1e-9)


@settings(deadline=None, max_examples=100)
@drawn(loop=LOOPS, set_current=CURRENTS, more=st.floats(0.01, 30))
def test_warmer_air_or_heatsink_never_settles_lower(loop, set_current, more):
    loop = {**loop, "tracking": min(loop["tracking"], 1.0)}
    before = bias.settled_idle(**loop, set_current=set_current)
    for name in ("air", "sink_rise"):
        worse = bias.settled_idle(**{**loop, name: loop[name] + more}, set_current=set_current)
        assert worse >= before * (1 - 1e-9)


@pytest.mark.parametrize(("scale", "set_current"), [(2.0, 0.02), (0.5, 0.1), (7.0, 0.05)])
def test_scaling_stands_in_for_dimensions(scale, set_current):
    # Amperes times s, with ohm, K and A/V2 of the same unit scaled along, must give amperes times s.
    for loop in ({**BIPOLAR, "sink_resistance": 1.0}, {**MOSFET, "sensor": "device"}):
        scaled = {**loop, "emitter_resistor": loop["emitter_resistor"] / scale}
        for name in ("junction_to_case", "case_to_sink", "sink_resistance"):
            scaled[name] = loop[name] / scale
        if loop["transconductance_parameter"] is not None:
            scaled["transconductance_parameter"] = loop["transconductance_parameter"] * scale
        found = bias.settled_idle(**scaled, set_current=set_current * scale)
        assert found == pytest.approx(scale * bias.settled_idle(**loop, set_current=set_current))


def test_agrees_with_a_run_in_time():
    # The heatsink warms with 600 s, the device follows at once: 20 mA ends at the settled idle, 30 mA leaves.
    def end_of(set_current, air):
        def current(sink):
            loop = {**MOSFET, "air": air}
            return searched(set_current, loop, sink=sink)

        def slope(_, state):
            heat = MOSFET["device_voltage"] * current(state[0])
            return [(air + MOSFET["sink_resistance"] * min(heat, 1e4) - state[0]) / 600]

        def burnt(_, state):
            return state[0] - 150.0

        burnt.terminal = True
        run = solve_ivp(slope, (0, 30000), [air], events=burnt, rtol=1e-5, max_step=2000)
        return np.inf if run.t_events[0].size else current(run.y[0, -1])

    assert end_of(0.020, 30.0) == pytest.approx(bias.settled_idle(**MOSFET, set_current=0.020), rel=1e-3)
    assert end_of(0.030, 30.0) == np.inf


def test_programme_rise():
    # Derived: 3 K/W x 52 V x 50 mA = 7.8 K of idle; the programme holds 60 - 30 - 7.8 = 22.2 K more.
    rise = {"air": 30, "sink_resistance": 3.0, "device_voltage": 52, "set_current": 0.05}
    found = bias.programme_rise(sink=[60, 37.8, 30], **rise)
    assert list(found) == pytest.approx([22.2, 0, 0])


def test_programme_on_the_heatsink_is_the_heatsink_at_its_temperature():
    # Derived: at the set point the heatsink stands at exactly the temperature that was given.
    rise = bias.programme_rise(sink=55, air=30, sink_resistance=3.0, device_voltage=52, set_current=0.02)
    loop = {**MOSFET, "junction_to_case": 0.0, "case_to_sink": 0.0, "sink_rise": rise}
    assert junction(0.02, **loop) == pytest.approx(55)
