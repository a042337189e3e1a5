"""The heat of a level is computed once for all checks, and never for another amplifier or unread."""

import numpy as np

from safeamp.amplifier import with_values
from safeamp.checks import thermal
from safeamp.checks.trace import Trace, watched
from tests.scenarios.sheets import sheet


def test_the_same_level_of_the_same_amplifier_is_computed_once():
    amplifier = with_values(sheet("split_rail").amplifier, {"stage.idle": np.array([0.014, 0.02])})
    first = thermal.at_level(amplifier, thermal.ONE_THIRD)
    assert thermal.at_level(amplifier, thermal.ONE_THIRD) is first
    assert thermal.at_level(amplifier, thermal.ONE_EIGHTH) is not first
    assert thermal.at_level(amplifier, thermal.ONE_THIRD, 45.0) is not first
    assert thermal.at_level(amplifier, thermal.ONE_THIRD, load=(8.0, 0.0)) is not first


def test_another_amplifier_has_its_own():
    amplifier = sheet("split_rail").amplifier
    before = float(thermal.at_level(amplifier, thermal.ONE_THIRD).stage_power)
    hotter = with_values(amplifier, {"supply.full_load.0": 33.0})
    assert float(thermal.at_level(hotter, thermal.ONE_THIRD).stage_power) > before * 1.01


def test_what_is_read_is_noted_although_the_heat_is_known():
    amplifier = sheet("split_rail").amplifier
    thermal.at_level(amplifier, thermal.ONE_THIRD)
    for _ in range(2):
        trace = Trace()
        thermal.at_level(watched(amplifier, trace), thermal.ONE_THIRD)
        assert {"supply.full_load", "stage.idle", "stage.emitter_resistor"} <= set(trace.reads)
