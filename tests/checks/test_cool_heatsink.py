"""A heatsink that stays cool while the devices work: their heat does not reach it."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import finding, report

LEVEL = "readings.heatsink_level"
READ = "readings.heatsink_temperature"


def _reading(read: str, level: str = "one third"):
    return finding(report("healthy", {LEVEL: level, READ: read}), "heat.reading")


@pytest.mark.parametrize(
    ("read", "word"),
    # computed 9.1 K above 35 degC at one third of power: half of it is 39.56 degC
    [
        ("44 degC, measured", Verdict.GO),
        ("39.7 degC, measured", Verdict.GO),
        ("39.3 degC, measured", Verdict.CAUTION),
    ],
)
def test_less_than_half_the_computed_rise_is_a_caution(read: str, word: Verdict) -> None:
    found = _reading(read)
    assert found.verdict is word
    assert any("does the device touch it" in one for one in found.because) is (word is Verdict.CAUTION)


def test_a_small_computed_rise_proves_nothing() -> None:
    assert _reading("35.1 degC, measured", "idle").verdict is Verdict.GO
