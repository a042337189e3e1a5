"""Fins by ruler in place of a thermal resistance: solved at the heat at hand, never better than caution."""

import tomllib

import numpy as np
import pytest

from safeamp.amplifier import with_values
from safeamp.checks import thermal
from safeamp.findings import Verdict
from safeamp.physics import fins
from safeamp.quantities import Origin
from safeamp.reading.limits import load_limits
from safeamp.studies.verdict import verdict
from tests.reading.desk import GONE, SCENARIOS, complaints, load

FINS = {"width": "200 mm", "height": "75 mm", "depth": "40 mm", "thickness": "2 mm", "count": 14}
RULED = {"heatsink.sink_to_air": GONE, "heatsink.fins": FINS}
HEAT = ("heat.heatsink", "heat.junction", "heat.reading", "touch.temperature")


def findings(folder, changes):
    return {item.id: item for item in verdict(load(folder, changes), load_limits()).findings}


def test_heat_is_judged_and_at_best_caution(tmp_path):
    found = findings(tmp_path, RULED)
    assert {found[id].verdict for id in HEAT} == {Verdict.CAUTION}
    for id in HEAT:
        assert "from its fins by ruler, -30/+70 %" in found[id].because[0]
    assert found["bias.runaway"].nominal > 0.0
    assert np.isfinite(found["soa.loudspeaker"].nominal)


def test_the_balance_is_that_of_the_heat_at_hand(tmp_path):
    amplifier = load(tmp_path, {**RULED, "heatsink.shared_by": 2, "heatsink.other_heat": "3 W"}).amplifier
    sheet = fins.Geometry(
        width=0.2, height=0.075, depth=0.04, thickness=0.002, count=14, plate=0.0, emissivity=0.1
    )
    for dissipated in (thermal.no_signal(amplifier), thermal.at_level(amplifier, thermal.ONE_THIRD)):
        stages = 2 * dissipated.stage_power
        rise = thermal.sink_temperature(amplifier, dissipated) - amplifier.heatsink.air
        shed = fins.fins_heat(geometry=sheet, rise=rise, air=amplifier.heatsink.air).total
        assert shed == pytest.approx(stages + 3.0, rel=1e-6)
        # What the bias loop sees is the heatsink at its own heat: a little more K/W than with the other heat on it.
        alone = fins.sink_to_air(geometry=sheet, heat=stages, air=amplifier.heatsink.air)
        assert thermal.sink_to_air(amplifier, dissipated) == pytest.approx(alone, rel=1e-9)
        assert alone > rise / (stages + 3.0)


def test_each_heatsink_carries_its_own_device(tmp_path):
    amplifier = load(tmp_path, {**RULED, "heatsink.each": True}).amplifier
    dissipated = thermal.at_level(amplifier, thermal.ONE_THIRD)
    per_watt = thermal.sink_to_air(amplifier, dissipated)
    rise = thermal.sink_temperature(amplifier, dissipated) - amplifier.heatsink.air
    assert rise == pytest.approx(thermal.hottest_power(amplifier, dissipated) * per_watt, rel=1e-9)


def test_the_spread_of_the_ruler_is_an_assumption_and_a_corner(tmp_path):
    sheet = load(tmp_path, RULED)
    entry = sheet.entries["heatsink.fins_share"]
    assert (entry.low, entry.nominal, entry.high, entry.origin) == (0.7, 1.0, 1.7, Origin.ASSUMED)
    assert [one.value for one in sheet.assumptions if one.key == "heatsink.fins"] == ["-30/+70 %"]
    found = findings(tmp_path, RULED)["heat.heatsink"]
    assert found.worst_case["heatsink.fins_share"] == 1.7
    assert found.worst > found.nominal


def test_no_point_inside_the_tolerances_is_worse_than_the_worst_corner(tmp_path):
    wide = {
        **FINS,
        "width": "200 mm ±5 %",
        "height": "75 mm ±5 %",
        "depth": "40 mm ±5 %",
        "thickness": "2 mm ±20 %",
    }
    sheet = load(tmp_path, {**RULED, "heatsink.fins": wide})
    worst = verdict(sheet, load_limits()).findings
    hottest = next(item.worst for item in worst if item.id == "heat.heatsink")
    spread = [entry for entry in sheet.entries.values() if entry.spread]
    random = np.random.default_rng(1)
    inside = {entry.path: random.uniform(entry.low, entry.high, 2000) for entry in spread}
    inside["mains.present"] = np.full(2000, sheet.amplifier.mains.highest)
    amplifier = with_values(sheet.amplifier, inside)
    found = thermal.sink_temperature(amplifier, thermal.at_level(amplifier, thermal.ONE_THIRD))
    assert found.max() <= hottest + 0.01 * (hottest - 40.0)


def test_a_heatsink_far_too_small_is_stop_without_bound(tmp_path):
    tiny = {"width": "20 mm", "height": "10 mm", "depth": "2 mm", "thickness": "1 mm", "count": 2}
    found = findings(tmp_path, {**RULED, "heatsink.fins": tiny})["heat.heatsink"]
    assert found.verdict is Verdict.STOP
    assert found.unbounded


def test_a_thermal_resistance_rules_when_both_are_given(tmp_path):
    both, alone = load(tmp_path, {"heatsink.fins": FINS}), load(tmp_path, {})
    assert "heatsink.sink_to_air is given, so heatsink.fins is not used" in both.remarks
    assert "heatsink.fins_share" not in both.entries
    dissipated = thermal.no_signal(alone.amplifier)
    assert thermal.sink_temperature(both.amplifier, dissipated) == thermal.sink_temperature(
        alone.amplifier, dissipated
    )


@pytest.mark.parametrize("name", FINS)
def test_a_missing_dimension_is_refused(tmp_path, name):
    short = {key: value for key, value in FINS.items() if key != name}
    assert any(
        f"heatsink.fins.{name}: is missing" in one
        for one in complaints(tmp_path, {**RULED, "heatsink.fins": short})
    )


def test_without_any_heatsink_data_heat_is_unverified(tmp_path):
    gone = {"heatsink.sink_to_air": GONE}
    found = findings(tmp_path, gone)
    assert {found[id].verdict for id in ("heat.heatsink", "heat.junction")} == {Verdict.UNVERIFIED}


@pytest.mark.parametrize(("count", "refused"), [(99, False), (100, True), (101, True)])
def test_fins_that_fill_the_width_are_asked_about(tmp_path, count, refused):
    found = complaints(tmp_path, {**RULED, "heatsink.fins": {**FINS, "count": count}})
    assert any(f"{count} fins of 2 mm fill a width of 200 mm" in one for one in found) is refused


def test_paint_and_plate_are_used_when_given(tmp_path):
    painted = {**FINS, "emissivity": 0.9, "plate": "6 mm"}
    bare, better = findings(tmp_path, RULED), findings(tmp_path, {**RULED, "heatsink.fins": painted})
    assert better["heat.heatsink"].nominal < bare["heat.heatsink"].nominal - 1.0
    sheet = load(tmp_path, {**RULED, "heatsink.fins": painted})
    assert not [one for one in sheet.assumptions if one.key.startswith("heatsink.fins.")]


def test_the_scenario_that_is_changed_has_no_fins_of_its_own():
    assert "fins" not in tomllib.loads((SCENARIOS / "healthy.toml").read_text(encoding="utf-8"))["heatsink"]
