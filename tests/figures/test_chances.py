"""Histograms of the samples with their limits."""

from dataclasses import replace
from types import SimpleNamespace

import numpy as np
import pytest

from safeamp.answers import Chance, FindingChances, Histogram
from safeamp.figures import chances, histograms_of
from safeamp.figures.look import NotDrawnError
from safeamp.figures.look import picture as drawn
from safeamp.findings import Bound, Step, Verdict
from safeamp.quantities import RATIO
from safeamp.studies.tolerance import tolerance
from tests.figures.drawing import labels, line
from tests.scenarios.sheets import limits, report, sheet

LIMIT = Bound(0.8, 1.0, "at most", "this project", "this project")
#: 100 samples in ten bins from 0.7 to 0.9, and one beyond them.
BINS = Histogram(0.7, 0.02, (0, 5, 10, 15, 20, 20, 15, 10, 5, 0), outside=1)


def one(histogram=BINS, *, sampled=True, **changed):
    words = {Verdict.GO: Chance(0.9998, 0.9, 1.0), Verdict.STOP: Chance(0.0002, 0.0, 0.1)}
    given = {"quantiles": {0.05: 0.72, 0.5: 0.8, 0.95: np.inf}, "unknown": 0, **changed}
    return FindingChances(
        id="soa.loudspeaker", step=Step.LOUDSPEAKER, kind=RATIO, words=words, sampled=sampled,
        histogram=histogram, **given,
    )  # fmt: skip


def shown(found=None, bound=LIMIT):
    return drawn("so", "so", lambda plane: chances.draw(plane, found or one(), bound))


def bars(plane):
    [stairs] = plane.patches
    return stairs.get_data()


def test_bars_are_shares_of_all_samples_at_their_values():
    heights, edges, _ = bars(shown().figure.axes[0])
    assert edges == pytest.approx(np.arange(0.72, 0.885, 0.02))
    assert heights == pytest.approx(100 * np.array([5, 10, 15, 20, 20, 15, 10, 5]) / 101)


def test_many_bins_become_few_bars_and_none_is_lost():
    wide = Histogram(0.0, 0.001, tuple(range(1, 1011)))
    heights, edges, _ = bars(shown(one(wide)).figure.axes[0])
    assert len(heights) <= chances.BARS
    assert heights.sum() == pytest.approx(100.0)
    assert edges[0] == 0.0
    assert edges[-1] >= 1.010


def test_limits_and_quantiles_stand_at_their_numbers():
    plane = shown().figure.axes[0]
    assert line(plane, "go up to 80 %").get_xdata()[0] == 0.8
    assert line(plane, "stop above 100 %").get_xdata()[0] == 1.0
    assert line(plane, "50% of the samples up to 80 %").get_xdata()[0] == 0.8
    assert not [label for label in labels(plane) if label.startswith("95%")]  # without bound
    assert plane.get_xlim()[1] > 1.0


def test_a_limit_far_away_is_named_and_not_drawn():
    plane = shown(bound=Bound(71.0, 120.0, "at most", "", "")).figure.axes[0]
    assert "stop above 12000 % (far to the right)" in labels(plane)
    assert plane.get_xlim()[1] < 1.0
    low = shown(bound=Bound((-9.0, 0.85), None, "between", "", "")).figure.axes[0]
    assert labels(low)[:2] == ["go within -900 % (far to the left)", "go within 85 %"]
    assert "stop below 50 %" in labels(shown(bound=Bound(0.9, 0.5, "at least", "", "")).figure.axes[0])
    assert not [label for label in labels(shown(bound=None).figure.axes[0]) if "of the samples" not in label]


def test_a_small_chance_does_not_look_like_none():
    assert shown().says == "Histogram of soa.loudspeaker: go 99.98 %, stop 0.02 %."


@pytest.mark.parametrize("found", [one(None), one(Histogram(0.0, 1.0, (0, 0), outside=5))])
def test_what_does_not_vary_is_not_drawn(found):
    with pytest.raises(NotDrawnError, match="the same value, or none, in every sample"):
        shown(found)


def test_every_finding_that_varies_has_its_picture():
    bounds = {found.id: found.bound for found in report("split_rail").findings if found.bound}
    answer = tolerance(sheet("split_rail"), limits(), samples=500)
    found = histograms_of(answer, bounds, limits())
    names = {picture.name for picture in found.pictures}
    assert {"tolerance-soa-loudspeaker", "tolerance-heat-junction"} <= names
    varying = {
        f"tolerance-{one.id.replace('.', '-').replace('_', '-')}" for one in answer.findings if one.sampled
    }
    assert names | {left.name for left in found.left_out} == varying


#: 1000 samples: half below twice the limit, a tail up to 10000 times it, 30 of them without bound.
TAIL = Histogram(0.0, 1.0, (250, 250, 200, 0, *(100, 100) * 1, *(0,) * 9993, 70), outside=30)


def test_a_long_tail_is_cut_so_that_the_limits_are_seen_and_its_share_is_said():
    plane = shown(one(TAIL, quantiles={0.05: 0.2, 0.5: 2.0, 0.95: 9998.6})).figure.axes[0]
    heights, edges, _ = bars(plane)
    assert heights.sum() == pytest.approx(90.0)
    assert edges[-1] == pytest.approx(chances.REACH * 1.0)
    assert plane.get_xlim()[1] < 1.1 * chances.REACH
    assert line(plane, "stop above 100 %").get_xdata()[0] == 1.0
    assert "95% of the samples up to 999900 % (far to the right)" in labels(plane)
    assert "10.0 % of the samples not drawn: beyond 1000 % or without bound" in labels(plane)


def test_without_a_limit_a_long_tail_is_cut_at_twice_the_median_at_the_least():
    plane = shown(one(TAIL, quantiles={0.05: 0.2, 0.5: 400.0, 0.95: 9998.6})).figure.axes[0]
    assert bars(plane)[1][-1] == pytest.approx(800.0)
    whole = shown(one(TAIL, quantiles={0.05: 0.2, 0.5: 2.0, 0.95: 9998.6}), bound=None).figure.axes[0]
    assert bars(whole)[1][-1] >= 9999.0


def test_what_is_not_drawn_is_said_only_where_there_is_some():
    assert [text for text in labels(shown().figure.axes[0]) if "not drawn" in text] == [
        "1.0 % of the samples not drawn: outside these bars or without bound"
    ]
    whole = Histogram(0.7, 0.02, (0, 5, 10, 15, 20, 20, 15, 10, 5, 0))
    assert not [text for text in labels(shown(one(whole)).figure.axes[0]) if "not drawn" in text]
    blind = labels(shown(one(whole, unknown=100)).figure.axes[0])
    assert "50.0 % of the samples not drawn: without a value" in blind


def test_a_use_is_drawn_in_percent_as_it_is_said():
    figure = shown().figure
    figure.draw_without_rendering()
    assert figure.axes[0].get_xlabel() == "soa.loudspeaker (%)"
    ticks = {tick.get_position()[0]: tick.get_text() for tick in figure.axes[0].get_xticklabels()}
    assert ticks[0.8] == "80"


def test_where_another_number_decides_the_limit_of_the_finding_is_drawn():
    """Idle settles above its limit at the nominal values already, so the finding itself has no levels there."""
    found = replace(one(), id="bias.runaway")
    answer = SimpleNamespace(findings=(found,))
    empty = {"bias.runaway": Bound(None, None, "at most", "", "")}
    [picture] = histograms_of(answer, empty, limits()).pictures
    said = labels(picture.figure.axes[0])
    rule = limits()["bias.runaway"]
    assert said[:2] == [f"go up to {rule.go:g}", f"stop above {rule.stop:g}"]
    assert "the word rests on more than this value" in said
    [own] = histograms_of(answer, {"bias.runaway": LIMIT}, limits()).pictures
    assert "the word rests on more than this value" not in labels(own.figure.axes[0])
    [without] = histograms_of(
        SimpleNamespace(findings=(replace(found, id="loudspeaker.dc_fault"),)), {}, limits()
    ).pictures
    assert not [text for text in labels(without.figure.axes[0]) if text.startswith(("go", "stop"))]
