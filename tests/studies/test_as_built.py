"""What the maker's own ratings excuse, and each condition under which they do."""

import pytest

from safeamp.amplifier import with_values
from safeamp.checks.as_built import as_built
from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, finding, limits, report, sheet

CAUTION, STOP = Verdict.CAUTION, Verdict.STOP

#: A weaker curve, so that the loudspeaker uses more than all of it; everything else as its maker built it.
BUILT = {
    "device.fitted.safe_area": [["40 V", "2.6 A"], ["100 V", "0.45 A"], ["160 V", "0.1 A"]],
    "stage.rated_load": "8 ohm, marked",
    "stage.original_devices": True,
}


def test_as_built_turns_a_stop_into_caution():
    one = finding(report("split_rail", BUILT), "soa.loudspeaker")
    assert 1.0 < one.nominal < 1.8
    assert one.verdict is CAUTION
    assert one.because[0].startswith("as built by its maker for this load")


@pytest.mark.parametrize(
    ("changes", "key"),
    [
        ({"stage.rated_load": GONE}, "stage.rated_load"),
        ({"stage.rated_load": "8.1 ohm, marked"}, "stage.rated_load"),
        ({"stage.original_devices": GONE}, "stage.original_devices"),
        ({"stage.original_devices": False}, "stage.original_devices"),
        ({"loudspeaker.minimum_impedance": "6.3 ohm, measured"}, "loudspeaker.minimum_impedance"),
        ({"loudspeaker.dc_resistance": GONE}, "loudspeaker.dc_resistance"),
        ({"loudspeaker.dc_resistance": "8.1 ohm, measured"}, "loudspeaker.dc_resistance"),
        ({"mains.rated": GONE, "supply.at_mains": "230 V"}, "mains.rated"),
        ({"mains.rated": "218.9 V, marked"}, "mains.rated"),
    ],
)
def test_each_condition_of_as_built_is_asked_for(changes, key):
    one = finding(report("split_rail", BUILT | changes), "soa.loudspeaker")
    assert one.verdict is STOP
    assert f"not excused as built by its maker: {key}" in one.because[0]


@pytest.mark.parametrize(
    ("values", "failed"),
    [
        ({}, ()),
        ({"mains.rated": 230.0 / 1.05}, ()),
        ({"mains.rated": 230.0 / 1.0501}, ("mains.rated",)),
        ({"stage.rated_load": 4.0}, ()),
        ({"loudspeaker.parallel": 2.0}, ("stage.rated_load", "loudspeaker.minimum_impedance")),
        ({"loudspeaker.minimum_impedance": 0.8 * 8.0}, ()),
        ({"loudspeaker.minimum_impedance": 0.79 * 8.0}, ("loudspeaker.minimum_impedance",)),
        ({"loudspeaker.minimum_impedance": 0.8 * 4.0, "stage.rated_load": 4.0}, ()),
        ({"loudspeaker.dc_resistance": 0.65 * 8.0}, ()),
        ({"loudspeaker.dc_resistance": 8.0}, ()),
        ({"stage.pairs": 2.0, "stage.pairs_conducting": 2.0}, ()),
        ({"stage.pairs": 2.0, "stage.pairs_conducting": 1.0}, ("stage.pairs_conducting",)),
        ({"loudspeaker.impedance_curve": "curve.csv"}, ("loudspeaker.impedance_curve",)),
    ],
)
def test_conditions_at_their_boundaries(values, failed):
    amplifier = with_values(sheet("split_rail", BUILT).amplifier, values)
    found = as_built(amplifier, limits()["soa.loudspeaker"], limits()["loudspeaker.label"])
    assert found.missing == failed
    assert found.holds is (not failed)
    assert found.ceiling == 1.8


def test_as_built_has_a_ceiling():
    weak = {"device.fitted.safe_area": [["40 V", "1.2 A"], ["100 V", "0.2 A"], ["160 V", "0.05 A"]]}
    one = finding(report("split_rail", BUILT | weak), "soa.loudspeaker")
    assert one.nominal > 1.8
    assert one.verdict is STOP


def test_as_built_excuses_no_resistor():
    weak = {"device.fitted.safe_area": [["40 V", "1.2 A"], ["100 V", "0.2 A"], ["160 V", "0.05 A"]]}
    change = BUILT | weak | {"loudspeaker.nominal_impedance": "8 ohm, marked", "stage.rated_load": "4 ohm"}
    one = finding(
        report("split_rail", change | {"supply.no_load": "60 V", "supply.full_load": "55 V"}),
        "soa.resistive_load",
    )
    assert one.nominal > 1.0
    assert one.verdict is STOP
