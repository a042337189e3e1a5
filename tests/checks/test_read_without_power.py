"""Readings that need no power: no limiter bears on them, and without mains there are none."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import GONE, finding, report

SHEET = "60w_two_pairs"
GO, CAUTION, UNVERIFIED, STOP = Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED, Verdict.STOP
ON_LIMITER = {"readings.taken_on": "limiter"}
BATTERY = {"supply.source": "battery", "supply.full_load": GONE, "supply.at_mains": GONE, "mains": GONE}
UNREAD = {"readings.mains_insulation": GONE}


def test_insulation_is_read_unpowered_so_the_limiter_does_not_hold_it():
    one = finding(report(SHEET, ON_LIMITER), "touch.mains")
    assert (one.verdict, one.because) == (GO, ())
    assert finding(report(SHEET, ON_LIMITER), "stability.output").verdict is UNVERIFIED


def test_bad_insulation_stays_a_stop_on_the_limiter():
    bad = {"readings.mains_insulation": "0.5 Mohm, measured"}
    assert finding(report(SHEET, ON_LIMITER | bad), "touch.mains").verdict is STOP


@pytest.mark.parametrize("earth", ["none", GONE])
def test_a_battery_brings_no_mains(earth):
    found = report(SHEET, BATTERY | UNREAD | {"readings.earth_resistance": earth})
    assert {one.id: one.because for one in found.not_applicable}["touch.mains"] == (
        'supply.source is "battery": no mains comes near the metal'
    )
    assert "touch.mains" not in {one.id for one in found.findings}


@pytest.mark.parametrize(("ohms", "word"), [("50 Mohm, measured", GO), ("0.5 Mohm, measured", STOP)])
def test_insulation_that_was_read_all_the_same_is_judged(ohms, word):
    changes = BATTERY | {"readings.mains_insulation": ohms, "readings.earth_resistance": "none"}
    assert finding(report(SHEET, changes), "touch.mains").verdict is word


def test_a_bench_supply_stands_on_the_mains():
    changes = BATTERY | UNREAD | {"supply.source": "bench", "readings.earth_resistance": "none"}
    assert finding(report(SHEET, changes), "touch.mains").verdict is UNVERIFIED


def test_nobody_asks_whether_a_resistor_gets_hot_that_is_not_there():
    gone = {"readings.zobel_hot": GONE}
    assert finding(report(SHEET, gone), "stability.output").verdict is CAUTION
    one = finding(report(SHEET, gone | {"stage.zobel_resistor": "none"}), "stability.output")
    assert (one.verdict, one.because, one.needs) == (GO, (), ())


def test_a_resistor_that_got_hot_is_there_whatever_the_sheet_says():
    changes = {"readings.zobel_hot": True, "stage.zobel_resistor": "none"}
    assert finding(report(SHEET, changes), "stability.output").verdict is STOP
