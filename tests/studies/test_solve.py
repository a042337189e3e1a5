"""Solving for one key: worked ends, and a solved value fed back into a whole sheet."""

import random
import tomllib

import pytest

from safeamp.checks import CHECKS
from safeamp.complaints import ReadingError
from safeamp.findings import Verdict
from safeamp.studies.edges import Asked, edge_at, next_value
from safeamp.studies.findings import Bench
from safeamp.studies.search import Trial
from safeamp.studies.solve import solve
from tests.scenarios.sheets import NAMES, changed, limits, sheet, tables
from tests.studies.solving import held, number, solved, words, written_numbers


def only(solution):
    [interval] = solution.intervals
    return interval


# Derived: |offset| is go up to 50 mV, and warm minus cold (34 mV) up to 20 mV: 14 to 50 mV.
def test_an_offset_has_two_ends():
    interval = only(solved("split_rail", "readings.offset_warm"))
    assert (interval.smallest.value, interval.largest.value) == pytest.approx((0.014, 0.05), rel=1e-9)
    assert [one.id for one in interval.smallest.binds] == ["offset.drift"]
    assert [one.id for one in interval.largest.binds] == ["offset.output"]
    assert interval.largest.written == '"50 mV, measured"'


# Derived: the rail of 34 V at 230 V is 37.4 V at 253 V; go up to 0.9 of the rated voltage: 41.556 V. Next is 50 V.
def test_the_smallest_rated_voltage_and_the_next_that_is_made():
    interval = only(solved("split_rail", "supply.reservoir_rated_voltage"))
    assert interval.largest is None
    assert interval.smallest.value == pytest.approx(37.4 / 0.9, rel=1e-3)
    assert interval.smallest.value >= 37.4 / 0.9 * (1 - 1e-9)
    assert interval.smallest.preferred == 50.0


# Derived: f = 1/(2*pi*C*R) at most 20 Hz into 6.4 ohm (80 % of 8): C at least 1243 µF; next of E6: 1500 µF.
def test_the_smallest_capacitance_and_the_next_that_is_made():
    solution = solved("single_rail", "output_capacitor.capacitance", "capacitor.cutoff")
    assert (solution.now_holds, solution.outcome) == (False, "bounded")
    edge = only(solution).smallest
    # Rounded to four digits, to the side that holds.
    assert edge.value == pytest.approx(1.244e-3, rel=1e-12)
    assert (edge.preferred, edge.series) == (pytest.approx(2.2e-3), "E6")


def test_a_count_is_a_whole_number():
    interval = only(solved("split_rail", "stage.pairs", "soa.loudspeaker"))
    assert interval.smallest.value == 2.0
    assert interval.smallest.beyond == 1.0
    assert interval.smallest.written == "2"
    assert interval.smallest.binds[0].worst_case


def test_a_list_moves_as_one():
    changes = {"supply.no_load": ["30 V", "34 V"], "supply.full_load": "25 V"}
    solution = solved("split_rail", "supply.no_load", "supply.reservoir_voltage", changes=changes)
    high = only(solution).largest
    assert high.value == pytest.approx(50.0 * 0.9 / 1.1, rel=1e-3)
    first, second = (float(text.split()[0]) for text in tomllib.loads(f"x = {high.written}")["x"])
    assert second == high.value
    assert first / second == pytest.approx(30 / 34, rel=2e-4)
    assert len(f"{first:.15g}") <= len("36.09")


# The other readings of a list are scaled: what stands there to be copied has no more digits than the value itself.
@pytest.mark.parametrize("name", ["60w_two_pairs", "80w_two_pairs_shared_heatsink", "120w_three_pairs"])
def test_what_is_to_be_copied_from_a_list_has_no_noise_and_still_holds(name):
    moved = number(name, "readings.idle_upper")
    interval = only(solve(moved, limits(), findings=["bias.balance"]))
    for edge in (interval.smallest, interval.largest):
        value = tomllib.loads(f"x = {edge.written}")["x"]
        lengths = [len(item.split()[0]) for item in value]
        assert max(lengths) <= max(len("12.34"), lengths[0]), edge.written
        found = words(changed(tables(name), {moved.path: value}))
        assert found["bias.balance"] is Verdict.GO
        assert max(found.values()) is edge.verdict


def test_a_key_that_nothing_reads():
    solution = solved("split_rail", "output_capacitor.esr")
    assert (solution.outcome, solution.findings, solution.intervals) == ("unread", (), ())


def test_any_value_will_do():
    solution = solved("split_rail", "stage.emitter_resistor", "loudspeaker.power", until=Verdict.CAUTION)
    assert solution.outcome == "any"
    assert (only(solution).smallest, only(solution).largest) == (None, None)


def test_a_missing_reading_is_named_and_the_others_are_still_answered():
    solution = solved("split_rail", "stage.idle", "heat.reading", "bias.idle")
    assert (solution.outcome, solution.now_holds) == ("none", False)
    [forbidding] = solution.forbidden
    assert forbidding.finding.id == "heat.reading"
    assert "readings.heatsink_temperature" in forbidding.finding.needs
    assert forbidding.holds is None
    assert solution.otherwise.findings == ("bias.idle",)
    # Derived: the default band of the idle voltage ends at 26 mV (common practice, no source).
    assert only(solution.otherwise).largest.value == pytest.approx(0.026)


def test_an_example_value_elsewhere_forbids_every_value():
    changes = {"supply.reservoir_rated_voltage": "50 V", "supply.no_load": "34 V, example"}
    solution = solved("split_rail", "supply.reservoir_rated_voltage", changes=changes)
    assert solution.outcome == "none"
    assert "example values are still in the sheet: supply.no_load" in solution.forbidden[0].finding.because[0]


# Several pairs share the heat, but how they share it was not read: one pair alone needs no such reading.
def test_findings_that_exclude_each_other_say_where_each_holds():
    solution = solved("split_rail", "stage.pairs", "bias.imbalance", "soa.loudspeaker")
    assert (solution.outcome, solution.otherwise) == ("none", None)
    where = {item.finding.id: item.holds for item in solution.forbidden}
    assert where["bias.imbalance"] == (1.0, 1.0)
    assert where["soa.loudspeaker"][0] == 2.0


def test_on_paper_leaves_out_what_is_read():
    with_readings = solved("split_rail", "supply.no_load").findings
    paper = solved("split_rail", "supply.no_load", on_paper=True)
    assert "bias.idle" in with_readings
    assert "bias.idle" not in paper.findings
    assert paper.on_paper


def test_a_value_that_the_sheet_can_never_have():
    with pytest.raises(ReadingError, match="say the same thing twice"):
        solved("split_rail", "stage.clipped_peak")


def test_an_unknown_finding_and_a_word_that_clears_nothing():
    with pytest.raises(KeyError, match=r"offset\.outptu is not a finding; did you mean offset\.output"):
        solved("split_rail", "readings.offset_warm", "offset.outptu")
    with pytest.raises(ValueError, match="held at go or caution, not at stop"):
        solve(number("split_rail", "supply.no_load"), limits(), until=Verdict.STOP)


def trials(moved, *values):
    return [Trial(value, Bench(moved.at(value), limits())) for value in values]


# Go up to 50 mV: what the trials said wrongly to hold is never handed on.
def test_an_end_is_handed_on_only_when_the_whole_sheet_says_so():
    moved = number("split_rail", "readings.offset_warm")
    asked = Asked(moved, limits(), [CHECKS["offset.output"]], Verdict.GO, on_paper=False)
    assert asked.judged(0.0501) is None
    # Drift is go from 14 to 54 mV, so it would let this pass.
    both = Asked(moved, limits(), [CHECKS["offset.drift"], *asked.checks], Verdict.GO, on_paper=False)
    assert both.judged(0.0501) is None
    assert asked.judged(0.05).verdict is Verdict.CAUTION
    [bad] = trials(moved, 0.08)
    edge = edge_at(asked, trials(moved, 0.07, 0.06, 0.04), [bad])
    assert edge.value == 0.04
    with pytest.raises(RuntimeError, match=r"readings\.offset_warm: values hold among the trials, but not"):
        edge_at(asked, trials(moved, 0.07, 0.06), [bad])


def test_a_value_the_sheet_refuses_is_not_handed_on():
    asked = Asked(number("split_rail", "supply.no_load"), limits(), [], Verdict.GO, on_paper=False)
    assert asked.judged(20.0) is None


@pytest.mark.parametrize(
    ("key", "value", "upward", "expected"),
    [
        ("stage.emitter_resistor", 0.31, True, (0.33, "E24")),
        ("stage.emitter_resistor", 0.31, False, (0.3, "E24")),
        ("supply.reservoir", 5e-3, True, (6.8e-3, "E6")),
        ("supply.reservoir", 5e-3, False, (4.7e-3, "E6")),
        ("supply.reservoir_rated_voltage", 50.0, True, (50.0, "rated voltages of electrolytic capacitors")),
        ("supply.reservoir_rated_voltage", 50.1, True, (63.0, "rated voltages of electrolytic capacitors")),
        ("supply.reservoir_rated_voltage", 49.9, False, (40.0, "rated voltages of electrolytic capacitors")),
        ("supply.reservoir_rated_voltage", 170.0, True, (None, "rated voltages of electrolytic capacitors")),
        ("supply.reservoir_rated_voltage", 4.0, False, (None, "rated voltages of electrolytic capacitors")),
        # What nobody buys by a series: an impedance, a reading, a voltage.
        ("loudspeaker.nominal_impedance", 5.0, True, (None, "")),
        ("readings.earth_resistance", 0.5, True, (None, "")),
        ("supply.no_load", 35.0, True, (None, "")),
    ],
)
def test_preferred_values(key, value, upward, expected):
    found, series = next_value(number("split_rail", key), value, upward=upward)
    assert (found if found is None else pytest.approx(found), series) == expected


def solutions(solution):
    while solution is not None:
        yield solution
        solution = solution.otherwise


def feed_back(name, key):
    """Solve for a key, write each end into the sheet as a user would, and one step beyond."""
    moved = number(name, key)
    try:
        found = solve(moved, limits())
    except ReadingError:
        return
    now = words(sheet(name))
    for solution in solutions(found):
        if solution.findings and solution.now is not None:
            assert held(now, solution) is solution.now_holds, (name, key)
        for interval in solution.intervals:
            for edge in (interval.smallest, interval.largest):
                if edge is not None:
                    check_edge(name, moved, solution, edge)


def check_edge(name, moved, solution, edge):
    where = (name, moved.path, edge)
    value = tomllib.loads(f"x = {edge.written}")["x"]
    found = words(changed(tables(name), {moved.path: value}))
    assert held(found, solution), where
    assert max(found.values()) is edge.verdict, where
    if edge.preferred is not None:
        assert held(words(moved.at(edge.preferred)), solution), where
    if edge.refused:
        with pytest.raises(ReadingError):
            moved.at(edge.beyond)
    else:
        assert not held(words(moved.at(edge.beyond)), solution), where
        assert edge.binds, where


ALL = [(name, key) for name in NAMES for key in written_numbers(name)]
SAMPLE = random.Random(20).sample(ALL, 16)


@pytest.mark.parametrize(("name", "key"), SAMPLE)
def test_a_solved_value_holds_and_one_step_beyond_does_not(name, key):
    feed_back(name, key)


@pytest.mark.slow
@pytest.mark.parametrize(("name", "key"), [pair for pair in ALL if pair not in SAMPLE])
def test_so_does_every_key_that_holds_a_number_in_any_sheet(name, key):
    feed_back(name, key)
