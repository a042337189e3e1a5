"""Many sheets in one pass against each sheet judged alone."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.checks import CHECKS
from safeamp.complaints import ReadingError
from safeamp.findings import Finding, Measure, Verdict
from safeamp.studies import trials
from safeamp.studies.findings import Bench, find
from tests.scenarios.sheets import limits
from tests.studies.solving import number

# Keys of each sort: a list, a count, a reading, one that others follow, a temperature, one without spread.
KEYS = [
    ("split_rail", "supply.no_load"),
    ("split_rail", "stage.pairs"),
    ("split_rail", "mains.actual"),
    ("split_rail", "readings.offset_warm"),
    ("single_rail", "heatsink.air"),
    ("single_rail", "output_capacitor.rated_voltage"),
    ("mosfet_substitute", "stage.idle"),
    ("healthy", "readings.earth_resistance"),
]
#: How far a value is moved either way where the reader asks about less than four times.
REACH = {"mains.actual": 1.2}


def benches(name, key):
    moved, found = number(name, key), []
    reach = REACH.get(key, 4.0)
    low, high = moved.now / reach, moved.now * reach
    values = range(1, 8) if moved.whole else np.geomspace(low, high, 14)
    for value in values:
        try:
            found.append(Bench(moved.at(float(value)), limits()))
        except ReadingError:
            continue
    assert len(found) > 4
    return found


@pytest.mark.parametrize(("name", "key"), KEYS)
def test_the_word_is_that_of_each_sheet_alone(name, key):
    sheets = benches(name, key)
    for check in CHECKS.values():
        together = [word.verdict for word in trials.words(check, sheets)]
        alone = [find(check, bench) for bench in sheets]
        assert together == [one.verdict if isinstance(one, Finding) else None for one in alone], check.id


def test_blocks_and_strides_change_no_word(monkeypatch):
    sheets = benches("split_rail", "supply.no_load")
    check = CHECKS["soa.loudspeaker"]
    before = trials.words(check, sheets)
    monkeypatch.setattr(trials, "ROWS", 40)
    monkeypatch.setattr(trials, "STRIDE", 1)
    after = trials.words(check, sheets)
    assert [word.verdict for word in before] == [word.verdict for word in after]
    assert [word.excess for word in before] == pytest.approx([word.excess for word in after])


def test_no_sheets_have_no_words():
    assert trials.words(CHECKS["soa.loudspeaker"], []) == []


# What a case of one sheet cannot be computed from must not speak for the others.
@pytest.mark.parametrize(
    ("name", "key", "id"),
    [
        ("split_rail", "supply.no_load", "soa.resistive_load"),
        # Unverified by its corners alone: its nominal values are go.
        ("single_rail", "output_capacitor.rated_voltage", "soa.resistive_load"),
    ],
)
def test_one_sheet_that_fails_leaves_the_others_their_word(monkeypatch, name, key, id):
    sheets = benches(name, key)
    check = CHECKS[id]
    alone = [find(check, bench).verdict for bench in sheets]
    once = [True]
    real = trials.again

    def failing(check, measure, amplifier, bench):
        found = real(check, measure, amplifier, bench)
        if once and once.pop():
            return Measure(np.nan, "cannot be computed", word=Verdict.UNVERIFIED)
        return found

    monkeypatch.setattr(trials, "again", failing)
    assert [word.verdict for word in trials.words(check, sheets)] == alone
    assert not once


def limit(sense, go, stop):
    return replace(limits()["soa.loudspeaker"], sense=sense, go=go, stop=stop)


# Derived: (value - level)/level, the larger of go at the nominal (row 0) and stop at any row.
@pytest.mark.parametrize(
    ("sense", "go", "stop", "value", "until", "expected"),
    [
        ("at most", 0.8, 1.0, [0.6, 0.9], Verdict.GO, -0.1),
        ("at most", 0.8, 1.0, [0.84, 0.9], Verdict.GO, 0.05),
        ("at most", 0.8, 1.0, [0.6, 1.2], Verdict.GO, 0.2),
        ("at most", 0.8, 1.0, [0.84, 0.9], Verdict.CAUTION, -0.1),
        ("at least", 10.0, 5.0, [8.0, 7.0], Verdict.GO, 0.2),
        ("at least", 10.0, 5.0, [20.0, 4.0], Verdict.GO, 0.2),
        ("between", (0.9, 1.1), None, [0.81], Verdict.GO, 0.1),
        ("between", (0.9, 1.1), None, [1.21], Verdict.GO, 0.1),
        ("at most", 0.8, 1.0, [0.6, np.nan], Verdict.GO, np.inf),
    ],
)
def test_how_far_beyond_its_levels(sense, go, stop, value, until, expected):
    measure = Measure(np.array(value), "", go=go, stop=stop, without_stop=stop is None)
    found = trials.excess(measure, limit(sense, go, stop), len(value), until)
    assert found == pytest.approx(expected)


def test_a_word_of_structure_is_beyond_all_levels():
    assert (
        trials.excess(Measure(0.0, "", word=Verdict.CAUTION), limit("at most", 1.0, 2.0), 1, Verdict.GO)
        == np.inf
    )
