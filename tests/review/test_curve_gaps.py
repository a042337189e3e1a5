"""A curve clears what it was measured for: notes that nobody measured are not known."""

import pytest

from safeamp.amplifier import Curve
from safeamp.findings import Verdict
from tests.checks.loads import judged
from tests.scenarios.sheets import finding


def word(folder, *notes, **changes):
    """Return the word on a scenario with a flat curve of 12 ohm at these notes, Hz."""
    count = len(notes)
    curve = Curve(tuple(map(float, notes)), (12.0,) * count, (0.0,) * count, "gaps.csv")
    found = finding(judged(folder, curve, "healthy", changes), "soa.loudspeaker")
    return found.verdict, " ".join(found.because)


@pytest.mark.parametrize(
    ("notes", "says"),
    [
        ((20, 200, 2000), ""),
        ((25, 200, 1000), ""),
        ((25.5, 200, 1000), "begins at 25.5 Hz, loudspeaker.lowest_note is 20 Hz"),
        ((20, 200, 990), "ends at 990 Hz"),
        ((20, 201, 2000), "no point between 20 Hz and 201 Hz"),
        ((20, 20000), "no point between 20 Hz and 20 kHz"),
    ],
)
def test_a_curve_with_a_gap_clears_nothing(tmp_path, notes, says):
    verdict, because = word(tmp_path, *notes)
    assert verdict is (Verdict.UNVERIFIED if says else Verdict.GO)
    assert says in because


def test_the_lowest_note_that_is_played_settles_where_a_curve_must_begin(tmp_path):
    above = {"loudspeaker.lowest_note": "60 Hz"}
    assert word(tmp_path, 60, 600, 6000, **above) == (Verdict.GO, "")
    assert word(tmp_path, 60, 600, 6000)[0] is Verdict.UNVERIFIED


def test_a_point_beyond_the_safe_area_stays_a_stop(tmp_path):
    curve = Curve((300.0, 600.0), (3.2, 3.2), (80.0, 80.0), "low.csv")
    assert finding(judged(tmp_path, curve, "split_rail"), "soa.loudspeaker").verdict is Verdict.STOP
