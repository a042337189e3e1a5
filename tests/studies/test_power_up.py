"""The card for the first power-up: numbers behind the limiter, over every corner and every assumption."""

import numpy as np
import pytest

from safeamp.answers import PowerUp
from safeamp.findings import Verdict
from safeamp.physics import lamp
from safeamp.physics import power_up as physics
from safeamp.report.power_up import render_power_up
from safeamp.studies import corners
from safeamp.studies.power_up import power_up
from safeamp.studies.power_up.limiters import look, looks
from safeamp.studies.power_up.states import (
    ACROSS,
    CURRENT_DRAWN,
    EACH,
    HEAT,
    LOOK,
    LOWEST,
    ONE_DEVICE,
    ONE_RAIL,
    OUTPUT,
    RUNAWAY,
    SET,
    SHORTED,
)
from tests.scenarios.sheets import GONE, limits, sheet

LAMP = {"rated_power": 60.0, "rated_voltage": 230.0}
#: 34 V rails at 230 V, 14 mV across 0.33 ohm: 42.4 mA, and 2.885 W a channel at idle.
PLAIN = {"readings.limiter": "60 W lamp", "mains.highest": "230 V"}
#: Tolerances all over, for the corners.
WIDE = {
    "mains.actual": "228..232 V, measured",
    "supply.no_load": "34 V ±5 %, measured",
    "stage.idle": "14 mV ±30 %, measured",
    "stage.emitter_resistor": "0.33 ohm ±10 %",
    "readings.limiter": "60 W lamp",
}


def card(name="split_rail", changes=None):
    return power_up(sheet(name, changes), limits())


def state(found, name):
    return next(one for one in found.states if one.name == name)


def extent(found, name, what):
    return state(found, name).reading(what).extent


def assumed(name):
    return limits().default(f"power_up.{name}")


def test_nominal_idle_behind_a_resistor_follows_ohm():
    # Derived, steady current: R S/V with S = 1.2 (2 x 68 V x 14 mV/0.33 ohm + 5 W).
    found = card(changes={**PLAIN, "readings.limiter": "470 ohm"})
    apparent = 1.2 * (2 * 68 * 0.014 / 0.33 + 5)
    assert extent(found, SET, ACROSS).nominal == pytest.approx(470 * apparent / 230, rel=1e-9)
    assert extent(found, LOWEST, ACROSS).nominal == pytest.approx(470 * 1.2 * 5 / 230, rel=1e-9)


def test_ends_of_a_healthy_idle_are_those_of_the_assumptions():
    # Derived: least 1 W and one channel, idle with the rails; most 1.4 (2 channels + 12 W), idle steady.
    found = card(changes={**PLAIN, "readings.limiter": "470 ohm"})
    each = 68 * 0.014 / 0.33
    least, most = each + 1, 1.4 * (2 * each + 12)
    divided = 230**2 / least
    assert extent(found, SET, ACROSS).low == pytest.approx(230 * 470 / (470 + divided), rel=1e-9)
    assert extent(found, SET, ACROSS).high == pytest.approx(470 * most / 230, rel=1e-9)


def test_the_most_heat_is_0365_of_the_lamp_through_the_whole_chain():
    found = card(changes=PLAIN)
    assert extent(found, RUNAWAY, HEAT).high == pytest.approx(0.365 * 60, rel=1e-3)
    higher = card(changes={**PLAIN, "mains.highest": "253 V"})
    assert extent(higher, RUNAWAY, HEAT).high == pytest.approx(0.365 * 60 * 1.1**1.55, rel=1e-3)


@pytest.mark.parametrize("name", [SHORTED, ONE_RAIL, SET, LOWEST, RUNAWAY])
def test_no_state_is_said_to_take_more_or_less_than_the_limiter_lets_through(name):
    found = card(changes=PLAIN)
    assert extent(found, name, HEAT).high <= physics.most_through_lamp(mains=230, **LAMP) * (1 + 1e-12)
    assert extent(found, name, HEAT).low < extent(found, name, HEAT).high


def test_a_shorted_stage_is_windings_and_emitter_resistors():
    # Derived: 3 V sag at a mean of Vp/(pi 8 ohm) a channel; two channels, 1/1.4 of nothing else, 0.66 ohm left.
    found = card(changes=PLAIN)
    peak = (31 - 2.2) * 8 / 8.33
    windings = 2 * 3 / (2 * peak / (np.pi * 8))
    seen = (windings + 0.66) * (230 / 68) ** 2
    left = lamp.voltage_behind_lamp(mains=230, resistance=seen, **LAMP, cold_ratio=12.5)
    assert extent(found, SHORTED, ACROSS).nominal == pytest.approx(230 - left, rel=1e-9)
    rail = 34 * left / 230 * 0.66 / (windings + 0.66)
    assert extent(found, SHORTED, EACH).nominal == pytest.approx(rail, rel=1e-9)


def test_one_shorted_rail_leaves_the_other_some_volts():
    found = state(card(changes=PLAIN), ONE_RAIL)
    peak = (31 - 2.2) * 8 / 8.33
    seen = 3 / (2 * peak / (np.pi * 8)) * (230 / 34) ** 2
    left = lamp.voltage_behind_lamp(mains=230, resistance=seen, **LAMP, cold_ratio=12.5)
    assert found.reading("shorted rail").extent.high == 0.0
    assert found.reading("other rail").extent.nominal == pytest.approx(34 * left / 230, rel=1e-9)


def test_a_device_that_conducts_fully_leaves_the_lamp_as_it_is_in_a_healthy_one():
    found = card(changes=PLAIN)
    assert extent(found, ONE_DEVICE, ACROSS) == extent(found, LOWEST, ACROSS)
    assert extent(found, ONE_DEVICE, OUTPUT) == extent(found, LOWEST, EACH)
    assert "bright" not in state(found, ONE_DEVICE).reading(LOOK).says


def test_no_point_inside_tolerances_and_assumptions_lies_outside_of_what_is_expected():
    found, random = card(changes=WIDE), np.random.default_rng(7)

    def some(low, high):
        return random.uniform(low, high, 4000)

    mains = some(228, 253)
    rail = some(34 * 0.95, 34 * 1.05) * mains / 230
    idle = some(14e-3 * 0.7, 14e-3 * 1.3) / some(0.33 * 0.9, 0.33 * 1.1)
    draws = {
        name: some(assumed(name).low, assumed(name).high) for name in ("other_draw", "channels", "apparent")
    }
    apparent = draws["apparent"] * (draws["channels"] * 2 * rail * idle + draws["other_draw"])
    left = physics.idle_behind_lamp(
        mains=mains,
        apparent_power=apparent,
        exponent=some(1, 2),
        **LAMP,
        cold_ratio=some(10, 15),
    )
    current = lamp.lamp_current(voltage=mains - left, **LAMP, cold_ratio=12.5)
    for what, values in ((ACROSS, mains - left), (EACH, rail * left / mains), (HEAT, current * left)):
        reached = extent(found, SET, what)
        assert reached.low * 0.99 <= np.min(values), what
        assert np.max(values) <= reached.high * 1.001, what
        assert np.ptp(values) > 0.3 * (reached.high - reached.low), what


@pytest.mark.parametrize("name", [SHORTED, ONE_RAIL, SET, LOWEST])
def test_where_there_are_too_many_tolerances_for_all_corners_the_ends_are_still_found(name, monkeypatch):
    changes = {**WIDE, "supply.full_load": "31 V ±3 %, measured", "stage.swing_loss": "1..3 V"}
    whole = state(card(changes=changes), name)
    monkeypatch.setattr(corners, "COMPLETE", 1)
    found = state(card(changes=changes), name)
    assert found.readings == whole.readings
    assert found.reading(ACROSS).extent.low < found.reading(ACROSS).extent.nominal


def test_a_larger_lamp_keeps_more_rails_and_lets_more_heat_through():
    lamps = [one for one in card(changes=PLAIN).limiter.choices if one.looks]
    assert [one.text for one in lamps] == ["25 W lamp", "40 W lamp", "60 W lamp", "100 W lamp"]
    assert np.all(np.diff([one.rails_left.nominal for one in lamps]) > 0)
    assert np.all(np.diff([one.rails_left.low for one in lamps]) > 0)
    assert np.all(np.diff([one.most_heat for one in lamps]) > 0)


def test_the_smallest_lamp_that_leaves_enough_is_recommended_with_its_reason():
    found = card(changes={"readings.limiter": GONE})
    assert found.limiter.recommended
    assert "readings.limiter names none" in found.limiter.why[0]
    [best] = [one for one in found.limiter.choices if one.recommended]
    smaller = found.limiter.choices[: found.limiter.choices.index(best)]
    assert best.text == found.limiter.text
    assert best.rails_left.nominal >= 0.8
    assert "bright" not in best.looks_at_lowest
    assert all(one.rails_left.nominal < 0.8 or "bright" in one.looks_at_lowest for one in smaller)


def test_a_lamp_that_may_be_bright_behind_a_healthy_one_is_not_recommended():
    found = card("15w_single_rail_to3", {"readings.limiter": GONE})
    small, next_one, *_ = found.limiter.choices
    assert small.rails_left.nominal >= 0.8
    assert "bright" in small.looks_at_lowest
    assert found.limiter.text == next_one.text


def test_the_resistor_beside_the_lamps_keeps_the_same_share():
    resistor = card(changes=PLAIN).limiter.choices[-1]
    assert resistor.looks == ""
    assert 0.8 <= resistor.rails_left.nominal < 0.8 + 0.2 * (1 - 1 / 1.55)


def test_a_stage_that_no_lamp_can_feed_is_begun_with_at_its_lowest():
    found = card("class_a", {"mains.highest": "230 V"})
    assert "no usual lamp" in " ".join(found.limiter.why)
    assert any("cannot tell a healthy idle from a shorted stage" in one for one in found.remarks)
    assert not any("across the limiter once" in one.when for one in found.switch_off)


def test_a_lamp_that_is_small_for_the_idle_is_said_to_be():
    assert "it is small for this idle current" in " ".join(
        card(changes={"readings.limiter": "15 W lamp"}).limiter.why
    )
    assert "it is small" not in " ".join(card(changes={"readings.limiter": "100 W lamp"}).limiter.why)


def test_what_a_resistor_must_stand_in_a_short_is_said():
    # Derived: 230^2/470 = 113 W.
    found = card(changes={**PLAIN, "readings.limiter": "470 ohm"})
    assert "into a short the resistor itself gets 113 W" in " ".join(found.limiter.why)


@pytest.mark.parametrize(
    ("share", "word"),
    [
        (0.0, "dark"),
        (0.0199, "dark"),
        (0.02, "dark"),
        (0.0201, "dim"),
        (0.15, "dim"),
        (0.1501, "bright"),
        (1.0, "bright"),
    ],
)
def test_how_a_lamp_looks_at_each_level(share, word):
    assert look(share, limits()) == word


def test_how_a_lamp_looks_between_two_levels():
    assert looks(0.01, 0.1, limits()) == "dark to dim"
    assert looks(0.5, 0.9, limits()) == "bright"


def test_without_an_idle_current_only_what_needs_it_is_unverified():
    found = card(changes={**PLAIN, "stage.idle": GONE})
    assert state(found, SET).needs == ("stage.idle_specified",)
    assert state(found, SET).readings == ()
    assert extent(found, LOWEST, ACROSS).high > 0
    assert found.missing == ("stage.idle_specified",)


def test_before_it_is_set_the_idle_that_the_maker_prescribes_counts():
    set_ = card(changes=PLAIN)
    found = card(changes={**PLAIN, "stage.idle": GONE, "stage.idle_specified": "14 mV, manual"})
    assert extent(found, SET, ACROSS) == extent(set_, SET, ACROSS)


def test_without_the_mains_nothing_is_known_and_no_step_is_given():
    gone = {"mains.actual": GONE, "mains.highest": GONE, "readings.limiter": GONE, "supply.at_mains": GONE}
    found = card(changes=gone)
    assert found.limiter.kind == ""
    assert "mains.actual" in found.missing
    assert all(one.unverified for one in found.states)
    assert found.verdict is Verdict.UNVERIFIED
    assert found.steps == found.afterwards == ()


def test_without_reservoirs_the_flash_has_no_seconds():
    text = " ".join(
        card(changes={**PLAIN, "supply.reservoir": GONE, "supply.reservoir_rated_voltage": GONE}).steps
    )
    assert "how long is unverified: supply.reservoir is not known" in text


def test_the_flash_is_that_of_all_reservoirs():
    # Derived: two of 6800 uF in series at 68 V, one or two channels, (68/230)^2 of it for the mains.
    one = 3400e-6 * (68 / 230) ** 2
    low, high = (physics.flash_time(mains=230, capacitance=count * one, **LAMP) for count in (1, 2))
    text = " ".join(card(changes=PLAIN).steps)
    assert f"for about {low * 1000:.3g} ms to {high:.3g} s" in text


def test_large_reservoirs_make_one_wait_longer():
    text = " ".join(
        card(changes={**PLAIN, "supply.reservoir": "100000 uF", "readings.limiter": "25 W lamp"}).steps
    )
    assert "After 5 s" not in text
    assert "After 5 s" in " ".join(card(changes=PLAIN).steps)


def test_both_sides_of_a_bridge_draw_idle():
    plain, bridged = card(changes=PLAIN), card(changes={**PLAIN, "stage.bridged": True})
    assert extent(bridged, SET, CURRENT_DRAWN).nominal == pytest.approx(
        extent(plain, SET, CURRENT_DRAWN).nominal + 1.2 * 2 * 68 * 0.014 / 0.33 / 230, rel=1e-6
    )


def test_a_single_rail_stands_at_half_and_has_no_other_rail():
    found = card("30w_single_rail_to3")
    assert not any(one.name == ONE_RAIL for one in found.states)
    rails, output = extent(found, LOWEST, EACH), extent(found, LOWEST, OUTPUT)
    assert output.low == pytest.approx(rails.low / 2 * 0.9)
    assert output.high == pytest.approx(rails.high / 2 * 1.1)
    assert not any(one.id == "power_up.rails" for one in found.switch_off)
    assert any(one.id == "power_up.output.midpoint" for one in found.switch_off)


def test_a_bench_supply_is_limited_to_twice_what_a_healthy_idle_draws():
    # Derived: most 68 V x 42.4 mA + 6 W is 131 mA, twice that 261 mA, next of E12 270 mA; 68 V x 0.27 A is 18.4 W.
    found = card(changes={**PLAIN, "readings.limiter": "bench"})
    assert "current limit to 270 mA" in " ".join(found.steps)
    assert extent(found, SHORTED, HEAT).high == pytest.approx(68 * 0.27)
    assert extent(found, SET, "from each rail").high == pytest.approx(0.014 / 0.33 + 6 / 68)


def test_a_lamp_is_no_limiter_for_a_regulated_supply():
    found = card(changes={"supply.source": "regulated", "readings.limiter": "60 W lamp"})
    assert found.limiter.kind == ""
    assert all(one.unverified and not one.needs for one in found.states)
    assert "is not computed" in found.states[0].because[0]
    assert found.steps == ()
    bench = card(changes={"supply.source": "regulated", "readings.limiter": GONE})
    assert bench.limiter.kind == "bench"
    assert bench.limiter.recommended


def test_an_example_is_never_expected_of_an_amplifier():
    found = card(changes={**PLAIN, "supply.no_load": "34 V, example"})
    assert all(one.unverified for one in found.states)
    assert "supply.no_load" in found.states[0].because[0]
    assert found.steps == ()


def test_a_card_that_tells_to_switch_on_against_its_cold_checks_cannot_be_made():
    good = card(changes=PLAIN)
    assert good.steps
    parts = {name: getattr(good, name) for name in good.__dataclass_fields__}
    with pytest.raises(ValueError, match="no step may follow cold checks that are stop"):
        PowerUp(**{**parts, "verdict": Verdict.STOP})


def test_what_was_assumed_is_listed_with_its_source():
    keys = {one.key: one for one in card(changes=PLAIN).assumptions}
    assert "from 1 W to 12 W" in keys["power_up.other_draw"].value
    assert "common practice, no source" in keys["power_up.other_draw"].why
    assert "mains.highest" not in keys
    assert "mains.nominal" in {one.key for one in card(changes={"mains.nominal": GONE}).assumptions}


def test_what_cannot_be_computed_is_unverified_and_says_why():
    found = card(changes={**PLAIN, "stage.swing_loss": "32 V"})
    assert state(found, SHORTED).readings == ()
    assert "cannot be computed" in state(found, SHORTED).because[0]
    assert extent(found, SET, ACROSS).high > 0
    assert not any("across the limiter once" in one.when for one in found.switch_off)


def test_a_bench_supply_is_limited_by_the_lowest_idle_where_none_is_known():
    # Derived: 6 W at 68 V is 88 mA, twice that 176 mA, next of E12 180 mA.
    found = card(changes={**PLAIN, "readings.limiter": "bench", "stage.idle": GONE})
    assert "current limit to 180 mA" in " ".join(found.steps)
    assert extent(found, SHORTED, HEAT).high == pytest.approx(68 * 0.18)


def test_without_a_limiter_to_reckon_with_the_head_gives_no_step():
    found = card(changes={"supply.source": "regulated", "readings.limiter": "60 W lamp"})
    text = " ".join(render_power_up(found).split())
    assert found.verdict.clears
    assert "for the cold checks, but no step: no limiter can be reckoned with." in text
    assert "may be applied" not in text
    assert "Switch on" not in text
