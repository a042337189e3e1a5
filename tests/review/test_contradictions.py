"""Sheets that contradict themselves are asked about: no verdict follows from them."""

import pytest

from safeamp.complaints import ReadingError
from tests.amplifiers.sheets import report
from tests.review.planted import SINGLE, SPLIT, changed, found

HALF_A_RAIL = {
    "supply.rails": "single",
    "supply.no_load": "66 V, measured",
    "supply.full_load": "59 V, measured",
    "supply.reservoir_rated_voltage": "100 V, marked",
    "readings.limiter_rails": ["26 V"],
    "readings.limiter_output": "13 V, measured",
}
NOTHING_TO_HOLD = {
    "supply.rails": "split",
    "supply.no_load": "29 V, measured",
    "supply.full_load": "25.8 V, measured",
    "readings.limiter_rails": ["12 V", "12 V"],
}


def test_a_single_rail_without_capacitor_and_bridge_puts_half_of_it_on_the_loudspeaker():
    with pytest.raises(ReadingError, match="put half the rail across the loudspeaker"):
        report(changed(SPLIT, HALF_A_RAIL))


def test_the_same_with_a_bridge_is_an_amplifier():
    bridged = {
        "stage.bridged": True,
        "heatsink.shared_by": 2,
        "readings.offset_other_side": "+20 mV, measured",
    }
    assert "offset.output" in found(SPLIT, HALF_A_RAIL | bridged)


def test_an_output_capacitor_between_split_rails_is_asked_about():
    with pytest.raises(ReadingError, match="between split rails it has nothing to hold"):
        report(changed(SINGLE, NOTHING_TO_HOLD))


@pytest.mark.parametrize(("peak", "refused"), [("36.2 V, measured", False), ("36.4 V, measured", True)])
def test_a_peak_above_a_rail_of_33_volts_is_refused(peak, refused):
    """A tenth is left for a rail that was read at lower mains than the peak."""
    tables = changed(SPLIT, {"stage.clipped_peak": peak})
    if not refused:
        assert report(tables).findings
        return
    with pytest.raises(ReadingError, match="leaves nothing of 33 V from rail to midpoint"):
        report(tables)


def test_the_second_output_of_a_stage_that_has_one_is_asked_about():
    """Read as no bridge, each side would be judged on twice the load that it has."""
    with pytest.raises(ReadingError, match="a second output was read"):
        report(changed(SPLIT, {"readings.offset_other_side": "20 mV, measured"}))
