"""Relay contacts break the rail of the highest mains, too, and a detector trips at the upper end of its tolerance."""

import pytest

from safeamp.findings import Verdict
from tests.amplifiers.sheets import NAMES
from tests.scenarios.sheets import finding, report

GO, CAUTION = Verdict.GO, Verdict.CAUTION
SHEET = "60w_two_pairs"
RULE = "loudspeaker.dc_fault"


def dc_fault(changes, name=SHEET):
    return finding(report(name, changes), RULE)


def rail(volts, actual="230 V, measured"):
    return {
        "supply.no_load": f"{volts}, measured",
        "supply.full_load": "25 V, measured",
        "mains.actual": actual,
    }


def test_a_low_mains_today_hides_no_arc_at_the_highest():
    # 39.5 V at 230 V are 31.8 V at 185 V today, and 43.5 V at 253 V.
    one = dc_fault({"mains.actual": "185 V, measured"})
    assert one.verdict is CAUTION
    assert "relay contacts on 43.5 V DC at the highest mains: are they rated to break it?" in one.because


@pytest.mark.parametrize(
    ("volts", "word"), [("34.9 V", GO), ("35.1 V", CAUTION), ("34.9 V ±5 %", CAUTION), ("33 V ±5 %", GO)]
)
def test_each_end_of_the_rail_counts(volts, word):
    # At the highest mains, 1.1 times that of the reading, 38.5 V are borne: 34.9 V and 5 % are 40.3 V there.
    assert dc_fault(rail(volts)).verdict is word


@pytest.mark.parametrize(("highest", "word"), [("253 V", GO), ("254 V", CAUTION), ("280 V", CAUTION)])
def test_the_highest_mains_is_that_of_the_sheet(highest, word):
    assert dc_fault(rail("34.9 V") | {"mains.highest": highest}).verdict is word


def test_it_is_said_once():
    one = dc_fault({})
    assert one.because == ("relay contacts on more than 35 V DC: are they rated to break it?",)


@pytest.mark.parametrize(
    ("trip", "word"), [("2.9 V", GO), ("3.1 V", CAUTION), ("2.9 V ±10 %", CAUTION), ("2.5 V ±10 %", GO)]
)
def test_a_detector_that_may_trip_later_is_a_caution(trip, word):
    assert dc_fault(rail("30 V") | {"protection.trip_voltage": trip}).verdict is word


def test_a_fuse_that_acts_in_time_spares_the_contacts():
    quick = {"protection.loudspeaker_fuse": "FF 0.5 A", "mains.actual": "185 V, measured"}
    assert not [said for said in dc_fault(quick).because if "contacts" in said]


@pytest.mark.parametrize("name", [one for one in NAMES if one.startswith(("15w", "20w", "25w", "40w"))])
def test_healthy_amplifiers_of_lower_rails_stay_go(name):
    assert dc_fault({}, name).verdict is GO
