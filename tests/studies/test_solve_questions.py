"""Questions about one key that have no answer, and what is not taken for one."""

import pytest

from safeamp.studies.solve import QuestionError
from tests.studies.solving import number, solved


def test_a_finding_that_applies_at_no_value_is_refused():
    with pytest.raises(QuestionError, match=r"^capacitor\.cutoff does not apply: stage\.coupling is"):
        solved("healthy", "supply.no_load", "capacitor.cutoff")


def test_a_finding_that_does_not_read_the_key_is_refused():
    with pytest.raises(QuestionError, match=r"^touch\.mains does not read supply\.no_load$"):
        solved("healthy", "supply.no_load", "supply.reservoir_voltage", "touch.mains")


# One pair shares with no other: the finding applies from two on.
def test_a_finding_that_applies_at_some_values_is_answered():
    assert solved("split_rail", "stage.pairs", "bias.imbalance").intervals


def test_a_finding_that_reads_what_the_sheet_fills_in_after_the_key_is_answered():
    assert solved("healthy", "device.fitted.power", "soa.loudspeaker").intervals


# Derived: 150 W follow from the junction, so that of 49 values over four decades few are left; 150 W itself is one.
def test_what_ties_a_key_to_others_is_said_where_no_value_will_do():
    solution = solved("split_rail", "device.fitted.power")
    assert (solution.outcome, solution.tried) == ("none", 49)
    assert 40 <= solution.refused <= 48
    assert solution.refusal.startswith("device.fitted.power: ")
    assert "but junction_limit and junction_to_case mean 150 W" in solution.refusal


FINS = {
    "heatsink.fins.width": "200 mm",
    "heatsink.fins.height": "75 mm",
    "heatsink.fins.depth": "40 mm",
    "heatsink.fins.thickness": "2 mm",
    "heatsink.fins.count": 14,
}


def test_a_key_that_cannot_stand_alone_asks_for_the_others():
    with pytest.raises(
        QuestionError, match=r"^heatsink\.fins\.width alone is refused: write heatsink\.fins\.height, "
    ):
        solved("healthy", "heatsink.fins.width")


# The thickness of a plate that nobody wrote counts as 0 m, which nobody can write.
def test_what_stands_for_a_key_that_nobody_wrote_is_not_said_to_be_in_the_sheet():
    plate = solved("healthy", "heatsink.fins.plate", changes=FINS)
    assert (plate.now, plate.written) == (None, False)
    width = solved("healthy", "heatsink.fins.width", changes=FINS)
    assert (width.now, width.written) == (pytest.approx(0.2), True)
    assumed = number("split_rail", "stage.bias_tracking")
    assert (assumed.now, assumed.in_sheet) == (pytest.approx(0.8), False)


def test_an_item_of_a_list_is_solved_for_alone():
    item = solved(
        "split_rail",
        "supply.no_load.1",
        "supply.reservoir_voltage",
        changes={"supply.no_load": ["30 V", "34 V"], "supply.full_load": "25 V"},
    )
    [interval] = item.intervals
    # Derived: two rails may lie 15 % of the mean apart, on one side and on the other: 30 * (2 -+ 0.15)/(2 +- 0.15).
    assert interval.smallest.value == pytest.approx(30 * 1.85 / 2.15, rel=1e-3)
    assert interval.largest.value == pytest.approx(30 * 2.15 / 1.85, rel=1e-3)
    assert interval.largest.written == '["30 V", "34.86 V"]'
    assert item.items == 1
