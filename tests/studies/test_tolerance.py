"""Chances over random samples: against closed forms, at their boundaries, in bounded memory."""

import tracemalloc

import numpy as np
import pytest
import scipy.stats
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.checks.judging import each_word, judge
from safeamp.findings import AsBuilt, Measure, Remark, Step, Verdict
from safeamp.studies import tolerance as study
from safeamp.studies.findings import again
from safeamp.studies.tallies import BINS, Batch, Histogram, LinearTally, chance
from safeamp.studies.tolerance import tolerance
from safeamp.studies.verdict import verdict
from tests.checks.test_judging import AT_LEAST, AT_MOST, BETWEEN
from tests.scenarios.sheets import limits, sheet

GO, CAUTION, UNVERIFIED, STOP = Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED, Verdict.STOP
TEN = {
    "supply.no_load": "34 V ±2 %, measured",
    "supply.full_load": "31 V ±2 %, measured",
    "stage.emitter_resistor": "0.33 ohm ±5 %, marked",
    "stage.idle": "14 mV ±10 %, measured",
    "stage.swing_loss": "2.2 V ±20 %, measured",
    "heatsink.case_to_sink": "0.45 K/W ±20 %, measured",
    "loudspeaker.nominal_impedance": "8 ohm ±5 %, marked",
    "loudspeaker.minimum_impedance": "6.4 ohm ±5 %, measured",
}  # besides heatsink.sink_to_air and heatsink.air, which the sheet itself gives a tolerance
RAIL = {"supply.no_load": TEN["supply.no_load"]}


def one_of(answer, identity):
    return next(one for one in answer.findings if one.id == identity)


@pytest.fixture(scope="module")
def ten():
    return tolerance(sheet("split_rail", TEN), limits(), samples=5000)


def test_a_hundred_thousand_samples_of_every_finding_with_ten_inputs_need_little_memory():
    read, peaks = sheet("split_rail", TEN), []
    tolerance(read, limits(), samples=100)  # what is imported and cached once is not counted
    for samples in (20_000, 100_000):
        tracemalloc.start()
        answer = tolerance(read, limits(), samples=samples)
        peaks.append(tracemalloc.get_traced_memory()[1])
        tracemalloc.stop()
    assert {entry.path.removesuffix(".0") for entry in answer.varied} >= {*TEN, "heatsink.air"}
    assert sum(one.sampled for one in answer.findings) >= 12
    assert max(peaks) <= 16 * 2**20
    assert peaks[1] - peaks[0] < 80_000 * 8  # not even one number of each further sample is kept


@pytest.mark.parametrize("share", [0.05, 0.5, 0.95])
@pytest.mark.parametrize(
    ("distribution", "law"),
    [
        # rails at the highest mains: 2 * 1.1 * no_load, no_load from 33.32 V to 34.68 V
        ("uniform", scipy.stats.uniform(33.32, 1.36)),
        ("normal", scipy.stats.truncnorm(-2, 2, 34.0, 0.34)),
    ],
)
def test_quantiles_of_a_multiple_of_one_input(distribution, law, share):
    answer = tolerance(sheet("split_rail", RAIL), limits(), samples=40_000, distribution=distribution)
    found = one_of(answer, "touch.rails")
    # four standard errors of a sample quantile: sqrt(p (1 - p) / n) / density
    error = 4 * np.sqrt(share * (1 - share) / 40_000) / law.pdf(law.ppf(share))
    assert found.quantiles[share] == pytest.approx(2.2 * law.ppf(share), abs=2.2 * error + found.resolution)
    assert 0 < found.resolution < 0.003


def test_quantiles_of_a_sum_of_two_inputs():
    # 1.1 * (a + b), each 1.2 V wide: a triangle
    rails = {"supply.no_load": ["33.4..34.6 V", "34.4..35.6 V"]}
    answer = tolerance(sheet("split_rail", rails), limits(), samples=40_000)
    law = scipy.stats.triang(0.5, 1.1 * 67.8, 1.1 * 2.4)
    found = one_of(answer, "touch.rails")
    for share, value in found.quantiles.items():
        error = 4 * np.sqrt(share * (1 - share) / 40_000) / law.pdf(law.ppf(share))
        assert value == pytest.approx(law.ppf(share), abs=error + found.resolution)


@pytest.mark.parametrize("distribution", ["uniform", "normal"])
def test_the_ranking_of_a_linear_finding_is_exact(distribution):
    # touch.rails = 1.1 * (a + b): each variance goes as its own width squared, 1.36 and 2 V
    rails = {"supply.no_load": ["34 V ±2 %", "35 V ±1 V"]}
    answer = tolerance(sheet("split_rail", rails), limits(), samples=1000, distribution=distribution)
    found = one_of(answer, "touch.rails")
    both = 1.36**2 + 2.0**2
    assert list(found.shares) == ["supply.no_load.1", "supply.no_load.0"]
    assert found.shares["supply.no_load.1"] == pytest.approx(4.0 / both, rel=1e-9)
    assert found.shares["supply.no_load.0"] == pytest.approx(1.36**2 / both, rel=1e-9)
    assert found.linear == pytest.approx(1.0, abs=1e-9)


def test_a_lopsided_normal_tolerance_keeps_its_nominal_value_likeliest():
    given_ = {"heatsink.sink_to_air": "1 K/W -20/+60 %, measured"}
    (entry,) = [e for e in sheet("split_rail", given_).entries.values() if e.path == "heatsink.sink_to_air"]
    sampler = study.Sampler.of((entry,), "normal", 3)
    drawn = sampler.draw(200_000)[:, 0]
    assert drawn.min() >= 0.8
    assert drawn.max() <= 1.6
    assert np.mean(drawn < 1.0) == pytest.approx(0.25, abs=0.005)  # 0.2 of the width of 0.8 lie below
    assert drawn.std() == pytest.approx(float(sampler.deviations[0]), rel=0.01)
    for start in (0.8, 1.0):  # half a normal distribution on each side, cut at 2 sigma
        low, high, sigma = (0.8, 1.0, 0.1) if start == 0.8 else (1.0, 1.6, 0.3)
        side = drawn[(drawn > low) & (drawn < high)]
        law = scipy.stats.truncnorm(-2, 0, 1.0, sigma) if low < 1 else scipy.stats.truncnorm(0, 2, 1.0, sigma)
        assert scipy.stats.kstest(side, law.cdf).pvalue > 1e-3


def test_uniform_samples_fill_the_tolerance():
    (entry,) = [e for e in sheet("split_rail", RAIL).entries.values() if e.path == "supply.no_load.0"]
    sampler = study.Sampler.of((entry,), "uniform", 3)
    drawn = sampler.draw(50_000)[:, 0]
    assert scipy.stats.kstest(drawn, scipy.stats.uniform(33.32, 1.36).cdf).pvalue > 1e-3
    assert drawn.std() == pytest.approx(float(sampler.deviations[0]), rel=0.01)


def test_the_chance_of_stop_is_that_of_the_value_beyond_the_stop_level():
    # 2.2 * no_load over 75.3984 V is above 1 where no_load is above 34.272 V: 0.3 of the width
    changes = RAIL | {
        "device.fitted.voltage": "75.3984 V, data sheet",
        "device.fitted.safe_area": [["40 V", "3.75 A"], ["70 V", "1.5 A"]],
    }
    answer = tolerance(sheet("split_rail", changes), limits(), samples=20_000)
    stop = one_of(answer, "supply.rail_to_rail").words[STOP]
    assert stop.share == pytest.approx(0.3, abs=4 * np.sqrt(0.21 / 20_000))
    assert stop.low < stop.share < stop.high
    cold = next(stage for stage in answer.steps if stage.step is Step.COLD_CHECKS)
    assert cold.cleared.share == pytest.approx(1 - stop.share)
    assert answer.measure_next[0][0] == "supply.no_load.0"


def test_the_same_seed_gives_the_same_answer(ten):
    read = sheet("split_rail", TEN)
    assert tolerance(read, limits(), samples=5000, seed=1) == ten
    other = tolerance(read, limits(), samples=5000, seed=2)
    assert one_of(other, "soa.loudspeaker").quantiles != one_of(ten, "soa.loudspeaker").quantiles


def test_chances_of_every_finding_and_step_are_complete(ten):
    for one in (*ten.findings, *ten.steps, ten.every_step):
        assert sum(chance_.share for chance_ in one.words.values()) == pytest.approx(1.0)
        assert all(chance_.low <= chance_.share <= chance_.high for chance_ in one.words.values())
    for one in ten.findings:
        stage = next(stage for stage in ten.steps if stage.step is one.step)
        clears = sum(chance_.share for word, chance_ in one.words.items() if word.clears)
        assert ten.every_step.cleared.share <= stage.cleared.share <= clears + 1e-12
    assert sum(weight for _, weight in ten.measure_next) == pytest.approx(1.0)
    assert "mains.present" not in dict(ten.measure_next)
    assert "mains.present" in one_of(ten, "soa.loudspeaker").shares


def test_a_finding_that_lacks_its_input_says_the_same_in_every_sample():
    answer = tolerance(sheet("split_rail", {"stage.idle": "30 mV, guess"}), limits(), samples=200)
    found = one_of(answer, "heat.reading")
    assert not found.sampled
    assert found.words[CAUTION].share == found.words[CAUTION].low == 1.0
    assert not found.quantiles


def test_example_values_leave_nothing_to_chance():
    answer = tolerance(sheet("split_rail", {"supply.no_load": "34 V ±2 %, example"}), limits(), samples=200)
    assert one_of(answer, "supply.rail_to_rail").words[UNVERIFIED].share == 1.0
    assert answer.every_step.cleared.share == 0.0


def test_where_nothing_varies_every_chance_is_certain():
    read = sheet("split_rail", {"supply.source": "regulated"})
    still = type(read)(**{**vars(read), "entries": {}})
    answer = tolerance(still, limits(), samples=200)
    assert not answer.varied
    assert not answer.measure_next
    assert all(one.words[word].share in (0.0, 1.0) for one in answer.findings for word in Verdict)
    assert not answer.every_step.sampled


def test_one_sample_that_cannot_be_computed_hides_no_other(monkeypatch):
    def with_trouble(check, measure, amplifier, bench):
        rails = np.asarray(amplifier.supply.no_load[0])
        if check.id == "touch.rails" and np.any(rails > 34.4):
            return Measure(np.nan, "cannot be computed", word=UNVERIFIED)
        return again(check, measure, amplifier, bench)

    monkeypatch.setattr(study, "again", with_trouble)
    read = sheet("split_rail", RAIL)
    answer = tolerance(read, limits(), samples=300)
    rails = study.Sampler.of(answer.varied, "uniform", 1).draw(300)
    place = [entry.path for entry in answer.varied].index("supply.no_load.0")
    found = one_of(answer, "touch.rails")
    assert found.unknown == np.sum(rails[:, place] > 34.4) > 10
    assert found.words[UNVERIFIED].share == found.unknown / 300
    assert found.quantiles[0.95] <= 2.2 * 34.4


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"samples": 99}, "samples must be at least 100, got 99"),
        ({"seed": -1}, "seed must be zero or more, got -1"),
        ({"distribution": "gaussian"}, "distribution must be uniform or normal, got gaussian"),
    ],
)
def test_what_cannot_be_drawn_is_refused(change, message):
    with pytest.raises(ValueError, match=message):
        tolerance(sheet("split_rail"), limits(), **change)


def test_progress_counts_every_sample(monkeypatch):
    monkeypatch.setattr(study, "BATCH", 64)
    done = []
    tolerance(sheet("split_rail", RAIL), limits(), samples=150, progress=done.append)
    assert done == [64, 64, 22]


def test_the_frame_has_one_row_a_finding(ten):
    frame = ten.frame()
    assert list(frame.index) == [one.id for one in ten.findings]
    row = frame.loc["soa.loudspeaker"]
    assert row["stop"] == one_of(ten, "soa.loudspeaker").words[STOP].share
    assert row["quantile 0.5"] == one_of(ten, "soa.loudspeaker").quantiles[0.5]
    assert row["share heatsink.air"] > 0.0


VALUES = st.floats(-2.0, 20.0) | st.sampled_from([np.nan, np.inf, -np.inf, 0.8, 1.0, 1.05, 1.15, 5.0, 10.0])


@given(
    st.lists(VALUES, min_size=1, max_size=6),
    st.sampled_from([AT_MOST, AT_LEAST, BETWEEN]),
    st.sampled_from([None, AsBuilt(True, 1.8), AsBuilt(False, 1.8, ("stage.rated_load",))]),
    st.sampled_from([(), (Remark(CAUTION, "so"),), (Remark(UNVERIFIED, "so"), Remark(GO, "so"))]),
    st.sampled_from([None, CAUTION, STOP]),
    st.data(),
)
@settings(deadline=None, max_examples=300)
def test_the_word_of_a_sample_is_the_word_of_an_amplifier_without_tolerances(
    values, limit, built, remarks, word, data
):
    unknown = data.draw(st.none() | st.lists(st.booleans(), min_size=len(values), max_size=len(values)))
    go = data.draw(st.sampled_from([None, 0.5]))
    go = None if limit is BETWEEN else go
    more = {"as_built": built, "remarks": remarks, "word": word, "go": go}
    marks = None if unknown is None else np.array(unknown)
    found = each_word(Measure(np.array(values), "", unknown=marks, **more), limit, len(values))
    for case, value in enumerate(values):
        alone = Measure(value, "", unknown=None if marks is None else marks[case : case + 1], **more)
        assert Verdict(found[case]) is judge(alone, limit, np.array([False])).verdict


@pytest.mark.parametrize(("count", "samples"), [(0, 100), (1, 100), (50, 100), (100, 100), (3, 100_000)])
def test_intervals_are_exact(count, samples):
    found = chance(count, samples)
    wanted = scipy.stats.binomtest(count, samples).proportion_ci(0.95, "exact")
    assert (found.low, found.high) == pytest.approx((wanted.low, wanted.high), rel=1e-9)


def test_a_histogram_keeps_what_is_constant_unknown_without_bound_or_far_out():
    constant, mixed, empty = Histogram(), Histogram(), Histogram()
    constant.add(np.full(10, 3.5))
    assert [constant.quantile(share) for share in (0.05, 0.5, 0.95)] == [3.5] * 3
    empty.add(np.full(5, np.nan))
    assert empty.quantile(0.5) is None
    mixed.add(np.concatenate([np.linspace(0.0, 1.0, 80), np.full(20, np.inf)]))
    assert mixed.quantile(0.4) == pytest.approx(0.5, abs=0.02)
    assert mixed.quantile(0.95) == np.inf
    mixed.add(np.full(900, -7.0))  # far below the range of the first values
    assert mixed.quantile(0.5) == -7.0
    assert mixed.counts.size == BINS + 2


def test_a_straight_line_through_what_is_finite():
    random = np.random.default_rng(5)
    inputs = random.uniform(-0.5, 0.5, (500, 3))
    values = 7.0 + 3.0 * inputs[:, 0] - 4.0 * inputs[:, 2]
    values[::7] = np.nan
    tally = LinearTally(3, 7.0)
    tally.add(Batch(inputs[:250]), values[:250])
    tally.add(Batch(inputs[250:]), values[250:])
    shares, linear = tally.shares((0, 1, 2), np.full(3, 1 / np.sqrt(12)))
    assert shares == pytest.approx([9 / 25, 0.0, 16 / 25], abs=1e-9)
    assert linear == pytest.approx(1.0)
    flat = LinearTally(3, 7.0)
    flat.add(Batch(inputs), np.full(500, 7.0))
    assert flat.shares((0, 1, 2), np.ones(3)) is None
    few = LinearTally(3, 7.0)
    few.add(Batch(inputs[1:5]), values[1:5])
    assert few.shares((0, 1, 2), np.ones(3)) is None


def test_a_curved_value_says_that_no_line_explains_it():
    inputs = np.random.default_rng(6).uniform(-0.5, 0.5, (4000, 2))
    tally = LinearTally(2, 0.0)
    tally.add(Batch(inputs), inputs[:, 0] ** 2)
    assert tally.shares((0, 1), np.ones(2))[1] < 0.02


def test_no_sample_is_worse_than_the_worst_corner():
    read = sheet("split_rail", TEN)
    corner = {one.id: one for one in verdict(read, limits()).findings}
    compared = 0
    for one in tolerance(read, limits(), samples=2000).findings:
        judged = corner[one.id]
        if one.quantiles and judged.bound.sense == "at most" and judged.worst is not None:
            assert one.quantiles[0.95] <= judged.worst * (1 + 1e-9) + one.resolution
            compared += 1
    assert compared >= 8


def test_the_bins_hold_every_sample_and_agree_with_the_quantiles():
    answer = tolerance(sheet("split_rail"), limits(), samples=2000)
    one = one_of(answer, "soa.loudspeaker")
    bins = one.histogram
    assert sum(bins.counts) + bins.outside == 2000 - one.unknown
    below = sum(bins.counts[: int((one.quantiles[0.5] - bins.low) / bins.width) + 1])
    assert below == pytest.approx(1000, abs=20)
    assert next(found for found in answer.findings if not found.sampled).histogram is None
