"""Questions about one key that have no answer, and what is not taken for one."""

import pytest

from safeamp.studies.solve import QuestionError
from tests.studies.solving import solved


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
