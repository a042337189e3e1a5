"""The shared look: scales with plain numbers, labels kept apart, nothing read as a formula."""

from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.figures.look import apart, logarithmic, picture, rendered

PLACES = st.lists(st.floats(-1e3, 1e3), min_size=1, max_size=8)


def test_a_logarithmic_axis_has_plain_numbers():
    def draw(axes):
        logarithmic(axes, "x", 0.04, 250.0)
        return "so"

    shown = picture("so", "so", draw).figure
    shown.draw_without_rendering()
    ticks = [label.get_text() for label in shown.axes[0].get_xticklabels()]
    assert ticks == ["0.05", "0.1", "0.2", "0.5", "1", "2", "5", "10", "20", "50", "100", "200"]
    assert shown.axes[0].get_xlim() == (0.04, 250.0)


def test_a_dollar_sign_is_a_dollar_sign():
    shown = picture("so", r"5 $ or $\frac{1}{0}", lambda axes: "so").figure
    assert r">5 $ or $\frac{1}{0}</text>" in rendered(shown).decode()


def test_both_formats_start_as_they_should():
    shown = picture("so", "so", lambda axes: "so").figure
    assert rendered(shown).startswith(b"<?xml")
    assert rendered(shown, "png").startswith(b"\x89PNG")


@pytest.mark.parametrize(
    ("places", "expected"),
    [([0.0, 5.0], [0.0, 5.0]), ([0.0, 0.0], [-0.5, 0.5]), ([3.0, 1.0, 1.0], [3.0, 0.5, 1.5]),
     ([0.0, 0.5, 1.0], [-0.5, 0.5, 1.5])],
)  # fmt: skip
def test_places_are_moved_as_little_as_needed(places, expected):
    assert apart(places, 1.0) == pytest.approx(expected)


@settings(deadline=None)
@given(PLACES)
def test_places_keep_their_order_and_their_distance(places):
    found = sorted(zip(places, apart(places, 1.0), strict=True), key=lambda pair: pair[1])
    assert all(after[1] - before[1] >= 1.0 - 1e-9 for before, after in pairwise(found))
    assert [place for place, _ in found] == sorted(places)
