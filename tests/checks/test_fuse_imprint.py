"""What a fuse interrupts and at which voltage: its imprint says so, and less than the plate's is no go."""

import pytest

from safeamp.findings import Verdict
from tests.scenarios.sheets import finding, report

FITTED, PRINTED = "supply.rail_fuse", "supply.rail_fuse_rated"


def judged(fitted, printed):
    return finding(report("healthy", {FITTED: fitted, PRINTED: printed}), "supply.fuse")


@pytest.mark.parametrize(
    ("fitted", "printed", "because"),
    [
        ("T4AL250V", "T4AH250V", "it interrupts less (L) than the one printed (H)"),
        ("T4AE250V", "T4AH250V", "it interrupts less (E) than the one printed (H)"),
        ("T4AL", "T4AE, marked", "it interrupts less (L) than the one printed (E)"),
        ("T4AL125V", "T4AL250V", "it is made for 125 V, the one printed for 250 V"),
        ("T 4 A 125 V", "T4A/250V", "it is made for 125 V, the one printed for 250 V"),
    ],
)
def test_less_than_the_plate_prints_is_a_caution_that_says_so(fitted, printed, because):
    one = judged(fitted, printed)
    assert one.verdict is Verdict.CAUTION
    assert one.because == (f"{because}: at a short it may arc on or burst",)
    assert one.next == "fit the fuse that is printed, never the next size up"


def test_both_are_said_of_a_fuse_that_is_less_in_both():
    one = judged("T4AL125V", "T4AH250V")
    assert one.verdict is Verdict.CAUTION
    assert len(one.because) == 2
    assert one.says == "T 4 A L 125 V fitted, T 4 A H 250 V printed"


@pytest.mark.parametrize(
    ("fitted", "printed"),
    [
        ("T4AH250V", "T4AL250V"),
        ("T4AH250V", "T4AE125V"),
        ("T4AL250V", "T4AL250V"),
        ("T 4 A", "T4AH250V"),  # nothing imprinted on one of both: nothing to compare
        ("T4AL125V", "T 4 A"),
        ("T4AL", "T 4 A 250 V"),
    ],
)
def test_as_much_or_more_is_go_and_so_is_what_nobody_printed(fitted, printed):
    one = judged(fitted, printed)
    assert one.verdict is Verdict.GO
    assert one.because == ()


def test_a_larger_rating_or_another_letter_stays_a_stop():
    assert judged("T5AL125V", "T4AH250V").verdict is Verdict.STOP
    assert judged("F4AL125V", "T4AH250V").verdict is Verdict.STOP
