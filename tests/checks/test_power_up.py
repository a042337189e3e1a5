"""First power-up: what was not powered was not tested, and a limiter that limits nothing guards nothing."""

import pytest

from safeamp.findings import Verdict
from tests.amplifiers.sheets import NAMES
from tests.scenarios.sheets import GONE, finding, report

GO, CAUTION, UNVERIFIED, STOP = Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED, Verdict.STOP
SPLIT, SINGLE = "60w_two_pairs", "30w_single_rail_to3"
RAILS, OUTPUT, STATE = "readings.limiter_rails", "readings.limiter_output", "readings.limiter_state"
LIMITER = "readings.limiter"
BOTH = ("power_up.draw", "power_up.rails", "power_up.output")


def words(name, changes, ids=BOTH):
    found = report(name, changes)
    return {one.id: one.verdict for one in found.findings if one.id in ids}


def both(volts):
    return [f"{volts} V, measured", f"{volts} V, measured"]


# Without load the rails read 39.5 V at the mains of today, and 43.45 V at the highest.
@pytest.mark.parametrize(
    ("volts", "word"),
    [(0, UNVERIFIED), (0.4, UNVERIFIED), (3.9, UNVERIFIED), (4.0, GO), (39.5, GO), (47.7, GO)],
)
def test_nothing_is_go_where_hardly_any_rail_came_up(volts, word):
    assert words(SPLIT, {RAILS: both(volts), OUTPUT: "0 V, measured"}) == dict.fromkeys(BOTH, word)


@pytest.mark.parametrize(("volts", "word"), [(0.4, UNVERIFIED), (5.7, UNVERIFIED), (5.9, GO)])
def test_a_single_rail_that_did_not_come_up_was_not_tested_either(volts, word):
    changes = {RAILS: [f"{volts} V, measured"], OUTPUT: f"{volts / 2} V, measured"}
    assert words(SINGLE, changes) == {"power_up.draw": word, "power_up.output": word}


def test_a_midpoint_of_nothing_is_no_stop():
    # A ratio of readings near 0 V is noise: the blown fuse is to be found first.
    changes = {RAILS: ["0.4 V, measured"], OUTPUT: "0 V, measured"}
    assert words(SINGLE, changes)["power_up.output"] is UNVERIFIED
    assert words(SPLIT, {RAILS: ["0.4 V", "0.1 V"]})["power_up.rails"] is UNVERIFIED


def test_what_is_a_stop_stays_one():
    dead = {RAILS: both(2.0), STATE: "bright", OUTPUT: "1.8 V, measured"}
    found = words(SPLIT, dead)
    assert (found["power_up.draw"], found["power_up.output"]) == (STOP, STOP)


def test_it_is_said_what_was_read_and_where_to_look():
    one = finding(report(SPLIT, {RAILS: both(0.4)}), "power_up.draw")
    assert one.because[0] == (
        "hardly any rail: nothing was tested; 400 mV on the limiter where 39.5 V is expected without it: "
        "look for a blown lamp or fuse, a switch that is off, or too small a lamp"
    )


def test_the_rail_expected_is_that_of_todays_mains():
    # Read at 230 V, powered from 190 V: 32.6 V are expected, and 3.4 V are more than a tenth of them.
    low = {"mains.actual": "190 V, measured", "mains.nominal": "230 V", RAILS: both(3.4)}
    assert words(SPLIT, low)["power_up.draw"] is GO
    assert words(SPLIT, low | {RAILS: both(3.2)})["power_up.draw"] is UNVERIFIED


@pytest.mark.parametrize("name", BOTH)
def test_more_than_the_rail_without_load_contradicts_the_sheet(name):
    one = finding(report(SPLIT, {RAILS: both(50)}), name)
    assert one.verdict is UNVERIFIED
    assert one.because == (
        "50 V on the limiter contradicts supply.no_load, at most 43.5 V at the highest mains: read both again",
    )


@pytest.mark.parametrize(("volts", "word"), [(0.4, UNVERIFIED), (50, UNVERIFIED), (18.9, GO)])
def test_a_mains_that_nobody_gave_hides_neither(volts, word):
    unknown = {f"mains.{key}": GONE for key in ("actual", "nominal", "highest")}
    assert words(SPLIT, unknown | {RAILS: both(volts)})["power_up.draw"] is word


@pytest.mark.parametrize("key", [RAILS, LIMITER])
@pytest.mark.parametrize("name", [SPLIT, SINGLE])
def test_what_tells_a_dark_lamp_from_a_blown_one_must_be_there(name, key):
    one = finding(report(name, {key: GONE}), "power_up.draw")
    assert one.verdict is (UNVERIFIED if key == RAILS else CAUTION)
    assert key in one.needs


def test_an_output_without_its_rails_says_nothing():
    one = finding(report(SPLIT, {RAILS: GONE}), "power_up.output")
    assert (one.verdict, one.needs) == (UNVERIFIED, (RAILS,))


# Through a lamp on its rated voltage a fault draws at most 0.365 of its rated power (derived in the physics of lamps).
@pytest.mark.parametrize(
    ("limiter", "word"),
    [
        ("100 W lamp", GO),
        ("200 W lamp", GO),
        ("210 W lamp", CAUTION),
        ("2000 W lamp", CAUTION),
        ("bench", GO),
    ],
)
def test_a_lamp_that_limits_nothing_guards_nothing(limiter, word):
    one = finding(report(SPLIT, {LIMITER: limiter}), "power_up.draw")
    assert one.verdict is word


# Through a resistor in the mains a fault draws at most 230 V squared over four times the resistor.
@pytest.mark.parametrize(
    ("limiter", "word"), [("330 ohm", GO), ("177 ohm", GO), ("176 ohm", CAUTION), ("1 ohm", CAUTION)]
)
def test_a_resistor_that_limits_nothing_guards_nothing(limiter, word):
    assert finding(report(SPLIT, {LIMITER: limiter}), "power_up.draw").verdict is word


def test_the_most_that_a_fault_can_draw_through_a_resistor_is_said():
    one = finding(report(SPLIT, {LIMITER: "22 ohm"}), "power_up.draw")
    assert one.because == (
        "22 ohm lets a fault draw up to 601 W: a resistor of more ohms, or a lamp, limits, this one hardly does",
    )


def test_what_a_resistor_lets_through_at_an_unknown_mains_is_not_known():
    unknown = {f"mains.{key}": GONE for key in ("actual", "nominal", "highest")}
    one = finding(report(SPLIT, unknown | {LIMITER: "330 ohm"}), "power_up.draw")
    assert (one.verdict, one.needs) == (CAUTION, ("mains.nominal",))


@pytest.mark.parametrize(("limiter", "word"), [("5.3 ohm", GO), ("5.1 ohm", CAUTION)])
def test_where_no_mains_sets_the_rails_the_resistor_stands_in_them(limiter, word):
    fixed = {"supply.source": "battery", "supply.full_load": GONE, "supply.at_mains": GONE, "mains": GONE}
    one = finding(report(SPLIT, fixed | {LIMITER: limiter}), "power_up.draw")
    assert one.verdict is word


def test_the_most_that_a_fault_can_draw_is_said():
    one = finding(report(SPLIT, {LIMITER: "2000 W lamp"}), "power_up.draw")
    assert one.because == (
        "2000 W lamp lets a fault draw up to 730 W: a lamp of 60 W to 100 W limits, this one hardly does",
    )


@pytest.mark.parametrize("name", [*NAMES, "split_rail", "healthy"])
def test_a_healthy_amplifier_on_its_limiter_is_go(name):
    assert set(words(name, {}).values()) == {GO}
