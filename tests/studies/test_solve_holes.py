"""Every value inside a printed interval holds, and none outside: a dense scan, also where words are no rising row."""

import random
from pathlib import Path

import numpy as np
import pytest

from safeamp.checks import CHECKS
from safeamp.complaints import ReadingError
from safeamp.findings import Verdict
from safeamp.reading import open_sheet
from safeamp.reading.movable import movable, movable_keys
from safeamp.studies.findings import Bench
from safeamp.studies.solve import solve
from safeamp.studies.trials import words
from tests.scenarios.sheets import limits

HEALTHY = sorted((Path(__file__).parents[1] / "amplifiers" / "healthy").glob("*.toml"))
POINTS = 400


def opened(name):
    return open_sheet(next(path for path in HEALTHY if path.stem == name), limits=limits())


def scanned(moved, solution, values):
    """Return whether each value holds."""
    benches = {}
    for value in values:
        try:
            benches[value] = Bench(moved.at(float(value)), limits())
        except ReadingError:
            continue
    held = dict.fromkeys(values, False) | dict.fromkeys(benches, True)
    for id in solution.findings:
        for value, word in zip(benches, words(CHECKS[id], list(benches.values())), strict=True):
            held[value] &= word.verdict is None or word.verdict <= solution.until
    return held


def spread(low, high, count):
    """Return random values in equal steps and in equal ratios, rising."""
    chance = np.random.default_rng(7)
    found = chance.uniform(low, high, count if low <= 0 else count // 2).tolist()
    return sorted(
        found + (np.exp(chance.uniform(*np.log((low, high)), count // 2)).tolist() if low > 0 else [])
    )


def regions(solution):
    """Return the intervals, and what lies between and beyond them past the rounding of their ends."""
    low, high = solution.span
    inside, outside, last = [], [], low
    for one in solution.intervals:
        start = low if one.smallest is None else one.smallest.value
        end = high if one.largest is None else one.largest.value
        inside.append((start, end))
        if one.smallest is not None:
            outside.append((last, one.smallest.beyond))
        last = None if one.largest is None else one.largest.beyond
    return inside, [*outside, *([] if last is None else [(last, high)])]


def check_no_hole(moved, until):
    if moved.whole:
        return
    solution = solve(moved, limits(), until=until)
    if not solution.intervals or not solution.findings:
        return
    inside, outside = regions(solution)
    for ranges, expected in ((inside, True), (outside, False)):
        for low, high in ranges:
            found = scanned(moved, solution, spread(low, high, POINTS // len(ranges)))
            wrong = [value for value, holds in found.items() if holds is not expected]
            assert not wrong, (moved.path, ranges, expected, wrong[:3])


# By hand, one value after the other: soa.resistive_load is unverified from about 23.7 V to 24.2 V, as there a guess
# alone crosses the stop level; above, a stated tolerance crosses it too, which is a caution.
def test_a_hole_where_a_guess_alone_crosses_stop_parts_the_interval():
    moved = movable(opened("20w_single_rail_plastic"), "readings.midpoint")
    first, second = solve(moved, limits(), until=Verdict.CAUTION).intervals
    assert (first.smallest.value, second.largest.value) == pytest.approx((21.6, 26.4))
    assert first.largest.value == pytest.approx(23.6, abs=0.05)
    assert second.smallest.value == pytest.approx(24.27, abs=0.05)
    assert [one.id for one in first.largest.binds] == ["soa.resistive_load"]


def pairs():
    chance, found = random.Random(31), []
    for path in HEALTHY:
        source = open_sheet(path, limits=limits())
        sheet = source.sheet()
        keys = [key for key in movable_keys(sheet) if key in sheet.entries]
        found += [
            (path.stem, key, chance.choice((Verdict.GO, Verdict.CAUTION))) for key in chance.sample(keys, 3)
        ]
    chance.shuffle(found)
    return found


PAIRS = pairs()


@pytest.mark.parametrize(("name", "key", "until"), PAIRS[:4])
def test_a_dense_scan_finds_no_hole_inside_and_nothing_outside(name, key, until):
    check_no_hole(movable(opened(name), key), until)


@pytest.mark.slow
@pytest.mark.parametrize(("name", "key", "until"), PAIRS[4:])
def test_nor_in_any_other_sheet(name, key, until):
    check_no_hole(movable(opened(name), key), until)
