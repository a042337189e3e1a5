"""What the mains of today decides: words without it, the supply it belongs to, the rails and peaks read at it."""

import math

import pytest

from safeamp.findings import Verdict
from safeamp.reading.supply_defaults import declared_voltage
from tests.review.planted import SINGLE, SPLIT, found

SCALES = {
    SPLIT: (
        "supply.reservoir_voltage",
        "heat.reading",
        "loudspeaker.power",
        "loudspeaker.dc_fault",
        "touch.temperature",
    ),
    SINGLE: ("capacitor.ripple", "capacitor.voltage"),
}


@pytest.mark.parametrize(("name", "id"), [(name, id) for name, ids in SCALES.items() for id in ids])
@pytest.mark.parametrize("gone", [("mains.actual",), ("mains",)])
def test_all_that_scales_with_an_unknown_mains_is_unverified(name, id, gone):
    assert found(name, without=gone)[id].verdict is Verdict.UNVERIFIED


def test_a_missing_rating_alone_keeps_its_own_word():
    assert found(SPLIT, without=["supply.reservoir_rated_voltage"])["supply.reservoir_voltage"].verdict is (
        Verdict.CAUTION
    )


def test_leakage_does_not_wait_for_the_mains():
    assert found(SINGLE, without=["mains.actual"])["capacitor.leakage"].verdict is Verdict.GO


@pytest.mark.parametrize(
    ("actual", "declared"), [(109.9, 100.0), (110.0, 120.0), (123.5, 127.0), (178.5, 230.0), (250.0, 230.0)]
)
def test_midway_between_two_supplies_the_higher_counts(actual, declared):
    """The one with the higher highest mains: 132 V where 110 V would else be the most."""
    assert declared_voltage(actual) == declared


def test_of_rails_read_at_different_mains_the_lower_mains_counts():
    """33 V today at 230 V and 33 V on the plate's 240 V: at 253 V the first is 36.3 V, and it must not shrink."""
    changes = {
        "supply.no_load": ["33 V, measured", "33 V, manual"],
        "supply.full_load": "29.5 V, measured",
        "mains.rated": "240 V, marked",
        "mains.actual": "230 V, measured",
    }
    rails = found(SPLIT, changes, without=["supply.at_mains"])["touch.rails"]
    assert rails.nominal == pytest.approx(2 * 33.0 * 253.0 / 230.0)


@pytest.mark.parametrize("rated", ["220 V, marked", "250 V, marked"])
def test_a_peak_measured_today_is_the_peak_of_today(rated):
    """With rails of the plate's mains and a peak measured at today's, the output at clipping is what was measured."""
    changes = {"supply.no_load": "35 V, manual", "supply.full_load": "32 V, manual", "mains.rated": rated}
    volts = found(SPLIT, changes, without=["supply.at_mains"])["touch.voltage"].nominal
    assert volts == pytest.approx(25.2 / math.sqrt(2.0), rel=1e-9)


def test_a_peak_of_the_manual_belongs_to_the_mains_of_the_rails():
    """At 234 V every voltage of the plate's 220 V is 234/220 times as high; the loss of the stage stays.

    Loss at 220 V: 32 - 25.2·(1 + 0.22/8) V; peak at 234 V: (32·234/220 - loss)/(1 + 0.22/8).
    """
    changes = {
        "supply.no_load": "35 V, manual",
        "supply.full_load": "32 V, manual",
        "mains.rated": "220 V, marked",
        "stage.clipped_peak": "25.2 V, manual",
    }
    shared = 1.0 + 0.22 / 8.0
    peak = (32.0 * 234.0 / 220.0 - (32.0 - 25.2 * shared)) / shared
    volts = found(SPLIT, changes, without=["supply.at_mains"])["touch.voltage"].nominal
    assert volts == pytest.approx(peak / math.sqrt(2.0), rel=1e-9)


@pytest.mark.parametrize(
    ("key", "ids"),
    [
        ("mains.nominal", ("supply.rail_to_rail", "supply.reservoir_voltage", "touch.rails")),
        ("mains.rated", ("supply.mains", "touch.rails", "heat.heatsink", "soa.loudspeaker")),
    ],
)
def test_what_follows_from_an_example_is_an_example(key, ids):
    """The highest mains follows from the nominal one, the mains of a rail that nobody measured from the plate."""
    changes = {key: "230 V, example", "supply.no_load": "33 V, manual"}
    words = found(SPLIT, changes, without=["supply.at_mains"])
    assert {words[id].verdict for id in ids} == {Verdict.UNVERIFIED}
