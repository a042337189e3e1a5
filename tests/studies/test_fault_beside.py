"""What stands beside a rail on the coil: its energy, and what the rail fuse sees of it."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, beside, finding, report

ENERGY, CURRENT = "energy into the coil until then, at most", "current of the rail fuse, coil cold"
TIMES, AFTER = (
    "current of the rail fuse over its rating, coil at its limit",
    "the rail fuse acts after at most",
)


def fault(changes=None):
    return finding(report("healthy", changes or {}), "loudspeaker.dc_fault")


def shown(one):
    return {also.at: also.value for also in one.also}


def test_energy_until_the_relay_opens():
    # 22 V on 6.2 ohm for 60 ms.
    assert beside(fault(), ENERGY) == pytest.approx(22.0**2 / 6.2 * 0.06)


def test_the_earlier_of_relay_and_fuse_bounds_the_energy():
    # 22 V on a coil at 200 degC, 6.2*1.707 ohm: 2.08 A, 3.3 times a T 0.63 A: 10 s at most by its gate at 2.75.
    fuse = {"protection.trip_delay": "none", "protection.loudspeaker_fuse": "T 630 mA"}
    assert beside(fault(fuse), ENERGY) == pytest.approx(22.0**2 / 6.2 * 10.0)
    both = {"protection.loudspeaker_fuse": "T 630 mA"}
    assert beside(fault(both), ENERGY) == pytest.approx(22.0**2 / 6.2 * 0.06)
    assert "the relay stops it" in fault(both).says


def test_what_nothing_stops_has_no_energy_to_print():
    nothing = {"protection.trip_delay": "none", "protection.loudspeaker_fuse": "none"}
    assert ENERGY not in shown(fault(nothing))
    assert ENERGY not in shown(fault({"protection.trip_delay": GONE}))


def test_the_rail_fuse_sees_what_the_coil_lets_through():
    one = fault()  # T 2 A
    assert beside(one, CURRENT) == pytest.approx(22.0 / 6.2)
    hot = 1.0 + 0.00393 * 180.0
    assert beside(one, TIMES) == pytest.approx(22.0 / 6.2 / hot / 2.0)
    assert AFTER not in shown(one)  # 1.04 times its rating: it stands that for good


def test_a_small_rail_fuse_acts_by_its_slowest_gate():
    # 2.08 A at the hot coil over 0.5 A is 4.16 times: 3 s by the gate at 4.
    small = {"supply.rail_fuse": "T 500 mA", "supply.rail_fuse_rated": "T 500 mA, marked"}
    assert beside(fault(small), AFTER) == pytest.approx(3.0)


def test_two_loudspeakers_in_parallel_draw_twice_the_current():
    assert beside(fault({"loudspeaker.parallel": 2}), CURRENT) == pytest.approx(2.0 * 22.0 / 6.2)


SERIES = {"stage.series_resistor": "6 ohm, measured", "protection.trip_delay": "none"}


def test_a_series_resistor_slows_the_fuse_and_never_makes_it_a_go():
    # 22 V on 6.2*1.707 ohm hot: 2.08 A, 3.3 times 0.63 A, 10 s; 6 ohm before it leave 1.33 A, 2.1 times: 30 min.
    fuse = {"protection.loudspeaker_fuse": "T 630 mA"}
    alone, behind = fault({"protection.trip_delay": "none", **fuse}), fault({**SERIES, **fuse})
    acts = "protection acts after"
    assert beside(alone, acts) == pytest.approx(10.0)
    assert beside(behind, acts) > 100.0
    assert behind.verdict >= alone.verdict
    hot = 6.2 * (1.0 + 0.00393 * 180.0)
    assert beside(behind, TIMES) == pytest.approx(22.0 / (hot + 6.0) / 2.0)
    assert beside(behind, CURRENT) == pytest.approx(22.0 / (6.2 + 6.0))


@pytest.mark.parametrize("fuse", ["T 500 mA", "F 630 mA"])
def test_a_fuse_that_acts_in_time_alone_is_no_go_behind_a_resistor(fuse):
    known = {"protection.trip_delay": "none", "protection.trip_voltage": "none"}
    known["protection.loudspeaker_fuse"] = fuse
    assert fault(known).verdict is Verdict.GO
    assert fault({**known, "stage.series_resistor": "6 ohm, measured"}).verdict is Verdict.CAUTION


def test_a_series_resistor_stands_before_all_loudspeakers_together():
    two = {**SERIES, "loudspeaker.parallel": 2}
    assert beside(fault(two), CURRENT) == pytest.approx(22.0 / (3.1 + 6.0))


@pytest.mark.parametrize(
    "gone", [{"supply.rail_fuse": "none"}, {"supply.rail_fuse": GONE}, {"loudspeaker.dc_resistance": GONE}]
)
def test_nothing_is_said_of_a_fuse_or_a_coil_that_is_not_given(gone):
    assert CURRENT not in shown(fault(gone))
