"""The search over trial values, against functions whose ends are known."""

from itertools import pairwise
from types import SimpleNamespace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.complaints import Complaint, ReadingError
from safeamp.findings import Verdict
from safeamp.quantities import ANGLE, RATIO, RESISTANCE, TEMPERATURE, VOLTAGE
from safeamp.studies import search
from safeamp.studies.search import (
    Field,
    Trial,
    between,
    first_values,
    look_closer,
    look_everywhere,
    sharpen,
)
from safeamp.studies.trials import Word


def key(span, *, kind=VOLTAGE, now=None, whole=False, at=lambda value: value):
    return SimpleNamespace(path="x", kind=kind, now=now, whole=whole, span=span, at=at, written=str)


def searched(monkeypatch, excess, moved):
    """Return a field over a finding that holds where a function of the value is not above zero."""

    def words(check, benches, *, until):
        found = [excess(bench.sheet) for bench in benches]
        return [Word(Verdict.STOP if far > 0 else Verdict.GO, far) for far in found]

    monkeypatch.setattr(search, "words", words)
    field = Field(moved, None, Verdict.GO, [SimpleNamespace(id="one")])
    field.look(first_values(moved))
    look_closer(field)
    sharpen(field)
    return field


# Neither rises nor falls towards the hole: only the word says that it is there.
@pytest.mark.parametrize("hole", [(50.0, 50.3), (20.0, 20.3), (59.0, 59.31)])
def test_a_hole_that_no_excess_points_to_is_found(monkeypatch, hole):
    low, high = hole
    field = searched(
        monkeypatch, lambda value: 1.0 if low < value < high or value > 61.0 else -1.0, key((1.0, 300.0))
    )
    look_everywhere(field)
    assert [end for end, _ in ends(field)][:2] == pytest.approx([low, high], rel=1e-5)


# A window of values that hold is found as well where nothing points to it.
def test_a_window_that_no_excess_points_to_is_found(monkeypatch):
    field = searched(
        monkeypatch, lambda value: -1.0 if 30.0 < value < 40.0 or value < 2.0 else 1.0, key((1.0, 300.0))
    )
    look_everywhere(field)
    assert [end for end, _ in ends(field)] == pytest.approx([2.0, 30.0, 40.0], rel=1e-5)


# Between go and caution lies unverified, as narrow as it may be: where the word turns it is looked until it is met.
def test_a_narrow_hole_where_the_word_turns_is_found(monkeypatch):
    def words(check, benches, *, until):
        return [
            Word(
                Verdict.GO
                if bench.sheet < 50.0
                else Verdict.UNVERIFIED
                if bench.sheet < 50.001
                else Verdict.CAUTION,
                -1.0,
            )
            for bench in benches
        ]

    monkeypatch.setattr(search, "words", words)
    field = Field(key((1.0, 300.0)), None, Verdict.CAUTION, [SimpleNamespace(id="one")])
    field.look(first_values(field.key))
    look_everywhere(field)
    assert ends(field) == [(pytest.approx(50.0, rel=1e-5),) * 2, (pytest.approx(50.001, rel=1e-5),) * 2]


def ends(field):
    """Return the values between which holding changes."""
    return [
        (one.value, other.value) for one, other in pairwise(field.ordered) if one.holds is not other.holds
    ]


def test_one_end_is_found_closely(monkeypatch):
    [(low, high)] = ends(searched(monkeypatch, lambda value: value / 36.3 - 1, key((1.0, 300.0))))
    assert low <= 36.3 < high
    assert high - low <= 1e-6 * high


# Derived: between the steps of 48 values over 1 to 300 V (a ratio of 1.13) a window of 1 % hides.
def test_a_narrow_window_is_found(monkeypatch):
    def excess(value):
        return max(value / 50.5 - 1, 1 - value / 50.0)

    [(_, low), (high, _)] = ends(searched(monkeypatch, excess, key((1.0, 300.0))))
    assert low == pytest.approx(50.0, rel=1e-5)
    assert high == pytest.approx(50.5, rel=1e-5)


def test_a_narrow_gap_is_found(monkeypatch):
    def excess(value):
        return min(1 - value / 50.5, value / 50.0 - 1)

    [(low, _), (_, high)] = ends(searched(monkeypatch, excess, key((1.0, 300.0))))
    assert (low, high) == pytest.approx((50.0, 50.5), rel=1e-5)


def test_several_intervals_are_found(monkeypatch):
    field = searched(monkeypatch, lambda value: -np.cos(value / 20), key((1.0, 150.0)))
    found = [low for low, _ in ends(field)]
    assert found == pytest.approx([np.pi * 10, np.pi * 30], rel=1e-5)


def test_an_end_at_zero_and_below_is_found(monkeypatch):
    [(low, high)] = ends(searched(monkeypatch, lambda value: value + 0.02, key((-1000.0, 1000.0))))
    assert low == pytest.approx(-0.02, rel=1e-5)
    assert high == pytest.approx(-0.02, rel=1e-5)
    [(low, high)] = ends(searched(monkeypatch, lambda value: value, key((-1000.0, 1000.0))))
    assert low == 0.0 < high


# No ratio leads to zero: between it and the smallest voltage believed, 1 uV, nothing is halved without end.
@pytest.mark.parametrize("span", [(0.0, 1000.0), (-1000.0, 1000.0)])
def test_a_zero_that_fails_is_not_closed_in_on(monkeypatch, span):
    field = searched(monkeypatch, lambda value: 1.0 if value <= 0.0 else -1.0, key(span))
    assert ends(field) == [(0.0, pytest.approx(1e-6))]


def test_whole_numbers_are_all_tried_and_nothing_between(monkeypatch):
    field = searched(monkeypatch, lambda value: 2.5 - value, key((1, 50), kind=RATIO, whole=True))
    assert [trial.value for trial in field.ordered] == list(range(1, 51))
    assert ends(field) == [(2.0, 3.0)]


def test_what_the_sheet_refuses_is_an_end_too(monkeypatch):
    complaint = Complaint("x.toml", 3, "supply.no_load", "is above")

    def at(value):
        if value > 40.0:
            raise ReadingError((complaint,))
        return value

    field = searched(monkeypatch, lambda value: -1.0, key((1.0, 300.0), at=at))
    [(low, high)] = ends(field)
    assert low <= 40.0 < high
    refused = field.trials[high]
    assert (refused.refused, refused.holds, refused.excess) == ("supply.no_load: is above", False, np.inf)


@pytest.mark.parametrize(
    ("moved", "low", "high", "count"),
    [
        (key((1.0, 300.0), now=34.0), 1.0, 300.0, 49),
        (key((0.0, 1e12), kind=RESISTANCE), 0.0, 1e12, 49),
        (key((-60.0, 500.0), kind=TEMPERATURE), -60.0, 500.0, 48),
        (key((0.0, 90.0), kind=ANGLE), 0.0, 90.0, 48),
        (key((-5.0, 5.0)), -5.0, 5.0, 97),
        (key((1, 16), kind=RATIO, whole=True), 1.0, 16.0, 16),
    ],
)
def test_the_first_look_covers_the_believable_range(moved, low, high, count):
    values = first_values(moved)
    assert values == sorted(set(values))
    assert (values[0], values[-1], len(values)) == (low, high, count)
    assert moved.now is None or moved.now in values


def test_a_temperature_is_looked_at_in_equal_steps():
    values = first_values(key((-60.0, 500.0), kind=TEMPERATURE))
    assert np.diff(values) == pytest.approx(np.full(47, 560 / 47))


@settings(deadline=None)
@given(low=st.floats(-1e6, 1e6), width=st.floats(1e-9, 1e6))
def test_values_between_lie_between_and_rise(low, width):
    values = between(low, low + width)
    assert values == sorted(values)
    assert all(low < value < low + width for value in values)


def test_a_trial_that_applies_nowhere_holds():
    trial = Trial(1.0, object(), words={"one": Word(None, -np.inf), "two": Word(Verdict.GO, -0.2)})
    assert (trial.holds, trial.failing, trial.excess) == (True, (), -0.2)


@pytest.mark.parametrize(("until", "holds"), [(Verdict.GO, False), (Verdict.CAUTION, True)])
def test_caution_holds_only_where_it_will_do(until, holds):
    assert Trial(1.0, object(), words={"one": Word(Verdict.CAUTION, 0.1)}, until=until).holds is holds
