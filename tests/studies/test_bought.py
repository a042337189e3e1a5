"""A preferred value is one to buy: it must hold with the tolerance of a new part, whatever was measured of the old."""

import pytest

from tests.studies.solving import solved

FARADS = "output_capacitor.capacitance"


@pytest.mark.parametrize(
    ("target", "exact", "preferred"),
    # into 6.4 ohm; a new electrolytic may have 20 % less: 1554 uF are needed for 20 Hz, 1036 uF for 30 Hz
    [("20 Hz", 1243.4e-6, 2200e-6), ("30 Hz", 828.9e-6, 1500e-6), ("23 Hz", 1081.2e-6, 1500e-6)],
)
def test_the_next_value_on_sale_holds_at_its_low_end(target, exact, preferred):
    found = solved(
        "single_rail", FARADS, "capacitor.cutoff", changes={"output_capacitor.target_cutoff": target}
    )
    low = found.intervals[0].smallest
    assert low.value == pytest.approx(exact, rel=1e-3)
    assert low.preferred == pytest.approx(preferred)


def test_a_value_that_only_a_measured_part_keeps_is_not_advised():
    found = solved(
        "single_rail", FARADS, "capacitor.cutoff",
        changes={"output_capacitor.target_cutoff": "20 Hz", "output_capacitor.marked_capacitance": "1000 uF"},
    )  # fmt: skip
    assert found.intervals[0].smallest.preferred > 1.2 * 1.2434e-3
