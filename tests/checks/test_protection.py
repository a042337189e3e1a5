"""What a V-I limiter lets through, in words that a number cannot give."""

from tests.scenarios.sheets import finding, report

HOT = {
    "protection.vi_limiter": [["0 V", "5 A"], ["50 V", "1 A"]],
    "heatsink.sink_to_air": "20 K/W, measured",
}


def test_where_no_current_is_allowed_no_share_of_it_is_said():
    found = finding(report("split_rail", HOT), "protection.short")
    assert found.unbounded
    assert "lets through current where none is allowed, at" in found.says
    assert "inf" not in found.says
