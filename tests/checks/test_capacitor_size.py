"""The output capacitor is sized for the low end of its tolerance, in a sheet as in the quick answer."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, finding, report


@pytest.mark.parametrize(
    ("farads", "word"),
    # the -3 dB frequency into 6.4 ohm: 1244 uF make 20 Hz, 1554 uF still make it 20 % low
    [
        ("1500 uF, marked", Verdict.CAUTION),
        ("1560 uF, marked", Verdict.GO),
        ("1250 uF ±0.1 %, measured", Verdict.GO),
    ],
)
def test_a_capacitor_that_misses_the_target_at_its_low_end_is_no_go(farads, word):
    changes = {"output_capacitor.capacitance": farads, "output_capacitor.marked_capacitance": GONE}
    found = finding(
        report("single_rail", changes | {"output_capacitor.target_cutoff": "20 Hz"}), "capacitor.cutoff"
    )
    assert found.verdict is word
