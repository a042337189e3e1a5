"""Numbers become words by one rule, at every boundary, from both sides, with everything that can be missing."""

import numpy as np
import pytest

from safeamp.checks.judging import badness, bounds_of, judge, missing_word, nominal_bound
from safeamp.findings import AsBuilt, Measure, Remark, Verdict
from safeamp.limits import Limit
from safeamp.quantities import RATIO

GO, CAUTION, UNVERIFIED, STOP = Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED, Verdict.STOP
NAN, INF = np.nan, np.inf


def limit(sense, go, stop, not_given="unverified"):
    return Limit(
        id="some.thing",
        go=go,
        stop=stop,
        sense=sense,
        kind=RATIO,
        not_given=not_given,
        source="derived",
        evidence="derived",
        says="",
    )


AT_MOST = limit("at most", 0.8, 1.0)
AT_LEAST = limit("at least", 10.0, 5.0)
BETWEEN = limit("between", (0.9, 1.05), 1.15)


def word(value, bounds=AT_MOST, guessed=None, words=(), **more):
    count = np.size(value)
    moved = np.zeros(count, dtype=bool) if guessed is None else np.asarray(guessed)
    return judge(Measure(value, "", **more), bounds, moved, words)


@pytest.mark.parametrize(
    ("value", "wanted"),
    [
        (-INF, GO),
        (0.0, GO),
        (0.799, GO),
        (0.8, GO),
        (0.8 * (1 + 1e-10), GO),  # rounding is not a finding
        (0.8 * (1 + 1e-8), CAUTION),
        (0.9, CAUTION),
        (1.0, CAUTION),
        (1.0 + 1e-10, CAUTION),
        (1.0 + 1e-8, STOP),
        (1e9, STOP),
        (INF, STOP),
        (NAN, UNVERIFIED),
    ],
)
def test_at_most(value, wanted):
    assert word(value).verdict is wanted


@pytest.mark.parametrize(
    ("value", "wanted"),
    [
        (INF, GO),
        (10.001, GO),
        (10.0, GO),
        (10.0 * (1 - 1e-10), GO),
        (10.0 * (1 - 1e-8), CAUTION),
        (7.0, CAUTION),
        (5.0, CAUTION),
        (5.0 * (1 - 1e-10), CAUTION),
        (5.0 * (1 - 1e-8), STOP),
        (0.0, STOP),
        (-INF, STOP),
        (NAN, UNVERIFIED),
    ],
)
def test_at_least(value, wanted):
    assert word(value, AT_LEAST).verdict is wanted


@pytest.mark.parametrize(
    ("value", "wanted"),
    [
        (0.5, CAUTION),  # no lower stop
        (0.9 * (1 - 1e-8), CAUTION),
        (0.9, GO),
        (1.0, GO),
        (1.05, GO),
        (1.05 * (1 + 1e-8), CAUTION),
        (1.15, CAUTION),
        (1.15 * (1 + 1e-8), STOP),
        (INF, STOP),
        (NAN, UNVERIFIED),
    ],
)
def test_between(value, wanted):
    assert word(value, BETWEEN).verdict is wanted


@pytest.mark.parametrize(
    ("bounds", "value", "wanted"),
    [
        (limit("at most", None, 1.0), 0.0, CAUTION),  # no go level: nothing is go by its number
        (limit("at most", None, 1.0), 1.1, STOP),
        (limit("at most", 0.8, None), 0.5, GO),
        (limit("at most", 0.8, None), 1e9, CAUTION),  # no stop level: no number is a stop
        (limit("at most", 0.8, None), INF, STOP),  # but what has no bound is
        (limit("at least", 10.0, None), 0.0, CAUTION),
        (limit("at most", None, None), 0.0, CAUTION),
    ],
)
def test_absent_levels(bounds, value, wanted):
    assert word(value, bounds).verdict is wanted


def test_bounds_of_the_measure_outrank_those_of_the_limit():
    assert word(5.0, go=6.0, stop=7.0).verdict is GO
    assert word(0.5, go=0.3).verdict is CAUTION
    assert word(0.5, stop=0.4).verdict is STOP
    assert word(9.0, without_stop=True).verdict is CAUTION
    assert word(0.1, stop=-INF).verdict is STOP
    assert word(0.1, go=-INF, without_stop=True).verdict is CAUTION
    assert word(1e9, go=INF, without_stop=True).verdict is GO


def test_a_level_that_is_no_number_is_unverified():
    assert word(0.1, stop=NAN).verdict is UNVERIFIED
    assert word(0.1, go=NAN).verdict is UNVERIFIED
    assert word([0.1, 0.2], stop=np.array([1.0, NAN])).verdict is UNVERIFIED


def test_bounds_may_move_with_the_cases():
    # beyond stop only where the second case's own stop is
    assert word([0.5, 0.5], stop=np.array([1.0, 0.4])).verdict is CAUTION
    assert word([0.5, 0.5], stop=np.array([1.0, 0.6])).verdict is GO


def test_a_corner_that_stated_values_reach_is_caution():
    found = word([0.5, 1.1])
    assert found.verdict is CAUTION
    assert found.worst == 1
    assert "at a corner of the tolerances or at the highest mains" in found.because[0]


@pytest.mark.parametrize(
    ("corner", "wanted"), [(1.0, GO), (1.0 + 1e-10, GO), (1.0 + 1e-8, CAUTION), (INF, CAUTION)]
)
def test_a_corner_counts_from_the_stop_level_on(corner, wanted):
    assert word([0.5, corner]).verdict is wanted


@pytest.mark.parametrize(("corner", "wanted"), [(1.0, GO), (1.0 + 1e-8, UNVERIFIED)])
def test_a_corner_that_only_a_guess_reaches_is_unverified(corner, wanted):
    found = word([0.5, corner], guessed=[False, True], words=("heatsink.air",))
    assert found.verdict is wanted
    if wanted is UNVERIFIED:
        assert "if heatsink.air is at the other end of its range: measure it" in found.because[0]


def test_a_guess_excuses_no_corner_that_is_reached_without_it():
    assert word([0.5, 1.1, 1.2], guessed=[False, False, True]).verdict is CAUTION


def test_a_guess_excuses_no_nominal_stop():
    assert word([1.1, 1.2], guessed=[False, True]).verdict is STOP


def test_a_number_that_is_unknown_at_a_corner_is_unverified():
    assert word([0.5, NAN]).verdict is UNVERIFIED
    assert word([0.9, NAN]).verdict is UNVERIFIED
    assert word([1.1, NAN]).verdict is STOP
    assert word([NAN, 0.5]).verdict is UNVERIFIED
    assert word([0.5, NAN]).because == ("a corner of the tolerances could not be computed",)
    assert word([NAN, 0.5]).because == ("the value could not be computed",)


@pytest.mark.parametrize(
    ("value", "unknown", "wanted"),
    [
        ([0.5, 0.6], [False, False], GO),
        ([0.5, 0.6], [True, False], UNVERIFIED),
        ([0.5, 0.6], [False, True], UNVERIFIED),
        ([1.2, 0.6], [True, True], STOP),
    ],
)
def test_a_locus_in_the_dark_is_unverified_or_stop(value, unknown, wanted):
    assert word(value, unknown=np.array(unknown)).verdict is wanted


def test_go_everywhere_is_asked_only_where_the_measure_says_so():
    assert word([0.5, 0.9]).verdict is GO
    assert word([0.5, 0.9], everywhere=True).verdict is CAUTION
    assert word([0.5, 0.7], everywhere=True).verdict is GO


@pytest.mark.parametrize("given", list(Verdict))
def test_a_word_from_structure_stands_whatever_the_number(given):
    assert word(0.1, word=given).verdict is given
    assert word(NAN, word=given).verdict is given


@pytest.mark.parametrize("at_best", list(Verdict))
@pytest.mark.parametrize("value", [0.5, 0.9, NAN, 1.1])
def test_a_remark_only_makes_it_worse(at_best, value):
    found = word(value, remarks=(Remark(at_best, "because of this"),))
    assert found.verdict is max(word(value).verdict, at_best)
    assert "because of this" in found.because


BUILT = AsBuilt(holds=True, ceiling=1.8)
NOT_BUILT = AsBuilt(holds=False, ceiling=1.8, missing=("stage.rated_load", "mains.rated"))


@pytest.mark.parametrize(
    ("value", "wanted"),
    [
        (0.5, GO),
        (0.9, CAUTION),
        (1.0 + 1e-8, CAUTION),
        (1.28, CAUTION),
        (1.8 * (1 - 1e-8), CAUTION),
        (1.8, CAUTION),
        (1.8 * (1 + 1e-8), STOP),
        (INF, STOP),
        (NAN, UNVERIFIED),
    ],
)
def test_as_built_excuses_up_to_its_ceiling(value, wanted):
    assert word(value, as_built=BUILT).verdict is wanted


def test_what_is_not_as_built_names_the_missing_key():
    found = word(1.28, as_built=NOT_BUILT)
    assert found.verdict is STOP
    assert "stage.rated_load, mains.rated" in found.because[0]
    assert word(0.5, as_built=NOT_BUILT).verdict is GO


def test_as_built_never_excuses_the_dark():
    assert word(1.28, as_built=BUILT, unknown=np.array([True])).verdict is UNVERIFIED
    assert word([1.28, NAN], as_built=BUILT).verdict is UNVERIFIED
    assert word([0.5, 1.28], as_built=BUILT, unknown=np.array([False, True])).verdict is UNVERIFIED


def test_as_built_takes_a_corner_for_caution_even_when_a_guess_reaches_it():
    assert word([0.5, 1.1], guessed=[False, True], as_built=BUILT).verdict is CAUTION
    assert word([0.5, 1.1], guessed=[False, True], as_built=NOT_BUILT).verdict is UNVERIFIED


def test_as_built_says_so_above_its_ceiling():
    assert "above 1.8 even the maker's own rating" in word(2.0, as_built=BUILT).because[0]


def test_unbounded_is_said_where_more_is_worse():
    assert word(INF).unbounded
    assert not word(INF, AT_LEAST).unbounded
    assert not word(5.0).unbounded


@pytest.mark.parametrize(
    ("value", "not_given", "more", "wanted"),
    [
        (NAN, "unverified", {}, UNVERIFIED),
        (NAN, "caution", {}, CAUTION),
        (NAN, None, {}, UNVERIFIED),
        (0.1, "caution", {}, CAUTION),  # never go while something is missing
        (1.1, "caution", {}, STOP),  # what is known may already be a stop
        (1.0, "caution", {}, CAUTION),
        (NAN, "caution", {"remarks": (Remark(UNVERIFIED, ""),)}, UNVERIFIED),
        (NAN, "unverified", {"remarks": (Remark(STOP, ""),)}, STOP),
        (1.1, "caution", {"without_stop": True}, CAUTION),
        (1.1, "unverified", {"word": UNVERIFIED}, UNVERIFIED),
    ],
)
def test_what_lacks_an_input(value, not_given, more, wanted):
    assert missing_word(Measure(value, "", **more), limit("at most", 0.8, 1.0, not_given)) is wanted


@pytest.mark.parametrize(
    ("values", "bounds", "worst"),
    [
        ([0.1, 0.9, 0.5], AT_MOST, 1),
        ([11.0, 4.0, 6.0], AT_LEAST, 1),
        ([1.0, 0.2, 1.1], BETWEEN, 1),
        ([1.0, 0.89, 1.3], BETWEEN, 2),
        ([0.1, NAN, 0.9], AT_MOST, 1),
    ],
)
def test_the_worst_case_is_the_one_shown(values, bounds, worst):
    measure = Measure(np.array(values), "")
    assert int(np.argmax(badness(measure.value, bounds_of(measure, bounds, 3)))) == worst
    assert word(values, bounds).worst == worst


@pytest.mark.parametrize(
    ("values", "bounds", "worst"),
    [
        ([0.5, 0.5 * (1 + 1e-12)], AT_MOST, 0),
        ([0.5, 0.5 * (1 + 0.9e-9)], AT_MOST, 0),
        ([0.5, 0.5 * (1 + 1.1e-9)], AT_MOST, 1),
        ([20.0, 20.0 * (1 - 1e-12)], AT_LEAST, 0),
        ([20.0, 20.0 * (1 - 1.1e-9)], AT_LEAST, 1),
        ([INF, INF], AT_LEAST, 0),
        ([INF, 20.0], AT_LEAST, 1),
        ([0.5, NAN], AT_MOST, 1),
        ([0.5, INF], AT_MOST, 1),
    ],
)
def test_rounding_makes_no_worst_case(values, bounds, worst):
    assert word(values, bounds).worst == worst


@pytest.mark.parametrize(
    ("sense", "values", "go", "stop", "worst"),
    [
        (
            "at most",
            [0.9, 0.1, 0.2],
            0.8,
            [1.0, -INF, -INF],
            2,
        ),  # a stop whatever the value, the larger of the two
        ("at most", [0.9, 0.1, 0.2], [0.8, -INF, -INF], None, 2),  # never go, likewise
        ("at most", [0.3, 0.2, 0.1], [0.8, -INF, 0.8], [1.0, 1.0, -INF], 2),  # a stop is worse than never go
        ("at least", [50e6, 20e6, 40e6], [2e6, INF, INF], [1e6, INF, INF], 1),
        ("at most", [0.28, 0.35, 0.31], [-INF] * 3, [-INF] * 3, 1),
    ],
)
def test_levels_that_no_value_keeps_come_first(sense, values, go, stop, worst):
    measure = Measure(np.array(values), "", go=np.array(go), stop=None if stop is None else np.array(stop))
    bounds = bounds_of(measure, limit(sense, None, None), 3)
    assert int(np.argmax(badness(measure.value, bounds))) == worst


def test_nominal_bound_is_finite_or_nothing():
    assert nominal_bound(np.array([0.8, 0.9])) == 0.8
    assert nominal_bound(0.8) == 0.8
    assert nominal_bound(INF) is None
    assert nominal_bound(NAN) is None
    assert nominal_bound(None) is None
