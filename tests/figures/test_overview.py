"""Bars of how much of each limit is used."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.checks import CHECKS
from safeamp.figures import overview
from safeamp.figures.look import NotDrawnError
from safeamp.figures.look import picture as drawn
from safeamp.figures.overview import Used, used
from safeamp.findings import Bound, Finding, Step, Verdict
from safeamp.quantities import RATIO, RESISTANCE, TEMPERATURE
from safeamp.report.page import page_of
from tests.figures.drawing import axes, gallery, within
from tests.scenarios.sheets import finding as judged_of
from tests.scenarios.sheets import report


def bound(go, stop, sense="at most"):
    return Bound(go, stop, sense, "this project", "this project")


def finding(nominal, limit, *, worst=None, kind=RATIO, verdict=Verdict.GO, unbounded=False):
    return Finding(
        "soa.loudspeaker",
        Step.LOUDSPEAKER,
        verdict,
        kind,
        "so",
        nominal,
        worst,
        unbounded=unbounded,
        bound=limit,
    )


@pytest.mark.parametrize(
    ("one", "expected"),
    [
        (finding(0.6, bound(0.8, 1.0), worst=1.2), Used(0.6, 1.2, 0.8)),
        (finding(30.0, bound(60.0, None), worst=90.0), Used(0.5, 1.5, None)),
        (finding(200.0, bound(1000.0, 100.0, "at least")), Used(0.5, None, 0.1)),
        (finding(0.0, bound(1000.0, 100.0, "at least")), Used(np.inf, None, 0.1)),
        # as rise above 25 °C: 50 of 100 K, go at 75
        (finding(75.0, bound(100.0, 125.0), kind=TEMPERATURE, worst=20.0), Used(0.5, 0.0, 0.75)),
        # from the middle of 0.9 to 1.1, stop 0.2 above it
        (finding(0.95, bound((0.9, 1.1), 1.2, "between")), Used(0.25, None, 0.5)),
        (finding(0.8, bound((0.9, 1.1), None, "between")), Used(2.0, None, None)),
        (finding(None, bound(0.8, 1.0)), Used(None, None, 0.8)),
        (finding(5.0, bound(None, None)), Used()),
        (finding(5.0, None), Used()),
        (finding(None, bound(0.8, 1.0), unbounded=True), Used(np.inf, np.inf, 0.8)),
    ],
)
def test_used_is_the_share_of_the_last_level(one, expected):
    found = used(one)
    for name in ("nominal", "worst", "go"):
        value, wanted = getattr(found, name), getattr(expected, name)
        assert value == (wanted if wanted is None else pytest.approx(wanted)), name


def shown(*findings):
    return drawn("overview", "so", lambda one: overview.draw(one, findings))


def test_a_bar_ends_at_its_share_and_a_longer_one_carries_an_arrow():
    one = shown(finding(0.6, bound(0.8, 1.0), worst=0.9), finding(7.0, bound(0.8, 1.0), verdict=Verdict.STOP))
    plane = one.figure.axes[0]
    assert [bar.get_width() for bar in plane.patches] == pytest.approx([0.6, 1.5])
    assert [list(line.get_xdata()) for line in plane.lines if line.get_marker() == ">"] == [[1.5]]
    texts = [text.get_text() for text in plane.texts]
    assert texts == ["loudspeaker", "soa.loudspeaker", "go", "60 %", "soa.loudspeaker", "stop", "700 %"]
    ticks = next(one for one in plane.collections if one.get_segments())
    assert [segment[0][0] for segment in ticks.get_segments()] == [0.8, 0.8]
    assert [list(line.get_xdata()) for line in plane.lines[:2]] == [[0.6, 0.9], [0.9]]
    assert [line.get_xdata()[0] for line in plane.lines][-1] == 1.0  # the last level
    assert (
        one.says
        == "2 findings by step, 1 stop, 0 unverified, 0 caution, 1 go. Beyond the last level: soa.loudspeaker."
    )


def test_words_differ_by_more_than_colour():
    hatches = {word: fill["hatch"] for word, fill in overview.FILLS.items()}
    assert hatches[Verdict.UNVERIFIED] != hatches[Verdict.STOP] != hatches[Verdict.CAUTION]
    colours = {fill["facecolor"] for fill in overview.FILLS.values()}
    assert len(colours) == len(overview.FILLS)


def test_every_finding_has_its_row_under_its_step():
    plane, found = axes("overview", gallery("split_rail", {})), report("split_rail").findings
    words = [text.get_text() for text in plane.texts if text.get_fontweight() != "bold"]
    assert words[::3] == [one.id for one in found]
    assert words[1::3] == [one.verdict.word for one in found]
    steps = [text.get_text() for text in plane.texts if text.get_fontweight() == "bold"]
    assert steps == list(dict.fromkeys(one.step.value for one in found))


def test_a_value_without_a_limit_is_shown_as_a_word_and_a_number():
    one = replace(finding(5.0, bound(None, None), kind=RESISTANCE), id="cold.devices")
    plane = shown(one).figure.axes[0]
    assert [text.get_text() for text in plane.texts][2:] == ["go", "5 ohm"]
    assert not plane.patches


@pytest.mark.parametrize("state", ["dark", "dim", "bright", "rising"])
def test_a_state_is_a_word_without_a_bar(state):
    judged = judged_of(report("healthy", {"readings.limiter_state": state}), "power_up.draw")
    assert used(judged) == Used()
    plane = shown(judged).figure.axes[0]
    assert [text.get_text() for text in plane.texts][2:] == [judged.verdict.word, state]
    assert not plane.patches


def test_values_are_those_of_the_report():
    found = report("split_rail")
    words = [
        text.get_text()
        for text in axes("overview", gallery("split_rail", {})).texts
        if text.get_fontweight() != "bold"
    ]
    for one, entry, said in zip(found.findings, page_of(found).entries, words[2::3], strict=True):
        assert said in entry.number, one.id


def test_the_margins_have_room_for_every_id_every_step_and_the_longest_numbers():
    longest = [
        replace(
            finding(
                value,
                bound(level, level),
                kind=check.kind,
                verdict=Verdict.UNVERIFIED,
                unbounded=value is None,
            ),
            id=check.id,
            step=check.step,
        )
        for check in CHECKS.values()
        # a value without bound, and one so near its limit that it needs many digits
        for value, level in ((-0.123456, None), (None, None), (-0.12345678, -0.1234567))
    ]
    one = drawn(
        "overview",
        "so",
        lambda plane: overview.draw(plane, longest),
        height=overview.height_of(longest),
        margins=overview.MARGINS,
    )
    within(one)


def test_nothing_judged_is_not_drawn():
    with pytest.raises(NotDrawnError, match="nothing was judged"):
        shown()
