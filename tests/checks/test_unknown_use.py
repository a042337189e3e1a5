"""What cannot be computed is said to be so, and never looks like a number or a fault that was found."""

import pytest

from tests.scenarios.sheets import GONE, finding, report


@pytest.mark.parametrize("identity", ["soa.resistive_load", "soa.loudspeaker"])
def test_use_without_heatsink_data(identity):
    found = finding(report("healthy", {"heatsink.sink_to_air": GONE}), identity)
    assert found.verdict.word == "unverified"
    assert "cannot be computed" in found.says
    assert "current flows" not in found.says
    assert "heatsink.sink_to_air" in found.needs
