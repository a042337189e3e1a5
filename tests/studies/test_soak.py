"""What no soak may ever do: crash, clear a hot heatsink, or think better of a hotter one."""

import numpy as np
import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

from safeamp.amplifier import Entry, SoakLog
from safeamp.findings import Verdict
from safeamp.quantities import POWER, TEMPERATURE, TEMPERATURE_DIFFERENCE, Origin
from safeamp.reading.limits import load_limits
from safeamp.report.quick import quick_json, render_quick
from safeamp.studies.quick.desk import Desk
from safeamp.studies.quick.soak import soak_answer

LIMITS = load_limits()
KINDS = {"air": TEMPERATURE, "power": POWER, "reading_error": TEMPERATURE_DIFFERENCE}
DEGREES = st.floats(-20.0, 300.0)


def judged(sink, time=None, airs=None, powers=None, **options):
    """Return the answer about readings, every ten minutes where their times are not given."""
    times = np.arange(len(sink)) * 600.0 if time is None else np.asarray(time)
    log = SoakLog(tuple(times.tolist()), tuple(map(float, sink)), airs, powers, "soak.csv")
    entries = {
        name: Entry(name, value, value, value, Origin.MEASURED, KINDS[name])
        for name, value in options.items()
    }
    return soak_answer(Desk("soak", LIMITS, entries), log)


@st.composite
def logs(draw):
    """Return any log at all: readings of every size, air and heat sometimes."""
    count = draw(st.integers(3, 12))
    steps = draw(st.lists(st.floats(0.5, 5000.0), min_size=count, max_size=count))
    near = draw(st.sampled_from([DEGREES, st.floats(20.0, 110.0), st.floats(60.0, 64.0)]))

    def column(values):
        return tuple(draw(st.lists(values, min_size=count, max_size=count)))

    air = column(st.floats(-20.0, 100.0)) if draw(st.booleans()) else None
    power = column(st.floats(1e-3, 20e3)) if draw(st.booleans()) else None
    return {"sink": column(near), "time": np.cumsum(steps), "airs": air, "powers": power}


@settings(deadline=None, max_examples=150)
@given(logs(), st.sampled_from([0.01, 0.3, 1.0, 20.0]))
@example({"sink": (50.0, 50.0, 50.0)}, 1.0)
@example({"sink": (-20.0, 300.0, -20.0), "time": (0.0, 1e-3, 604800.0)}, 0.01)
@example({"sink": (20.0, 60.0, 60.0), "airs": (-20.0, 100.0, 0.0), "powers": (1e-3, 20e3, 1.0)}, 1.0)
def test_any_log_has_an_answer_and_none_with_a_hot_reading_is_go(log, error):
    found = judged(**log, reading_error=error)
    assert "Verdict" in render_quick(found)
    assert quick_json(found)
    if max(log["sink"]) > 70.0:
        assert found.verdict is not Verdict.GO
    if max(log["sink"]) > 100.0:
        assert found.verdict is Verdict.STOP


@settings(deadline=None, max_examples=80)
@given(logs(), st.floats(0.0, 60.0), st.sampled_from([0.1, 1.0]))
def test_a_log_as_much_hotter_all_along_has_no_better_word(log, more, error):
    hotter = log | {"sink": tuple(one + more for one in log["sink"])}
    assert judged(**hotter, reading_error=error).verdict >= judged(**log, reading_error=error).verdict


def warm(end, count=7, constant=1200.0):
    return end - (end - 24.0) * np.exp(-np.arange(count) * 600.0 / constant)


@pytest.mark.parametrize("error", [0.05, 0.3, 1.0])
def test_a_hotter_end_of_the_same_warm_up_has_no_better_word(error):
    words = [judged(warm(end), reading_error=error).verdict for end in np.arange(40.0, 140.0, 2.5)]
    assert (words[0], words[-1]) == (Verdict.GO, Verdict.STOP)
    # Between caution and stop some ends are unverified where the interval reaches stop: worse than caution, too.
    assert words == sorted(words)


@settings(deadline=None, max_examples=60)
@given(
    end=st.floats(30.0, 140.0),
    constant=st.floats(120.0, 7200.0),
    count=st.integers(3, 15),
    seed=st.integers(0, 2**16),
)
def test_go_is_said_only_of_a_settled_or_a_bounded_warm_up(end, constant, count, seed):
    """Whatever the noise, a go names an upper end within go, and the true end is no stop."""
    sink = warm(end, count, constant) + np.random.default_rng(seed).normal(0.0, 0.3, count)
    found = judged(sink, reading_error=0.3)
    high = {one.name: one.value for one in found.results}["end_temperature_high"]
    if found.verdict is Verdict.GO:
        assert high is not None
        assert high <= 70.0 * (1.0 + 1e-9)
        assert end < 100.0


@pytest.mark.parametrize("seed", range(5))
def test_air_and_heat_change_no_word_of_a_steady_soak(seed):
    sink = warm(55.0) + np.random.default_rng(seed).normal(0.0, 0.3, 7)
    alone = judged(sink)
    both = judged(sink, air=24.0, power=19.0)
    columns = judged(sink, airs=(24.0,) * 7, powers=(19.0,) * 7)
    assert alone.verdict is both.verdict is columns.verdict
    assert alone.judged[0].worst == both.judged[0].worst == columns.judged[0].worst


def test_a_logger_that_reads_every_few_seconds():
    """A thousand readings are fitted as three are."""
    time = np.linspace(0.0, 3600.0, 1000)
    sink = 62.0 - 38.0 * np.exp(-time / 1200.0)
    found = {one.name: one.value for one in judged(sink, time=time).results}
    assert found["end_temperature"] == pytest.approx(62.0, rel=1e-6)
