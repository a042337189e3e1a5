from dataclasses import replace

import pytest

from safeamp.answers import Report
from safeamp.findings import Step, Verdict
from tests.report.hand_made import DEVICES, OFFSET, SAFE_AREA, caution, report_of


def test_the_first_step_that_is_not_cleared_is_found_in_the_order_of_the_job() -> None:
    blocked = report_of(DEVICES, OFFSET, SAFE_AREA).first_blocked
    assert blocked is not None
    assert blocked.step is Step.BIAS


def test_a_caution_holds_nothing_back() -> None:
    assert report_of(caution(DEVICES)).first_blocked is None


@pytest.mark.parametrize(
    ("findings", "status"),
    [((DEVICES,), 0), ((caution(DEVICES),), 3), ((DEVICES, OFFSET), 4), ((OFFSET, SAFE_AREA), 5), ((), 4)],
)
def test_exit_status(findings: tuple, status: int) -> None:
    assert report_of(*findings).exit_status == status


def test_the_exit_status_speaks_for_the_steps_asked_for() -> None:
    report = report_of(DEVICES, OFFSET, SAFE_AREA, up_to=Step.FIRST_POWER_UP)
    assert report.exit_status == 0
    assert report.first_blocked is None
    assert report_of(DEVICES, OFFSET, SAFE_AREA, up_to=Step.BIAS).exit_status == 4


def test_the_demo_always_ends_well() -> None:
    assert report_of(SAFE_AREA, demo=True).exit_status == 0


@pytest.mark.parametrize("verdict", [Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED])
def test_a_verdict_better_than_a_step_is_refused(verdict: Verdict) -> None:
    with pytest.raises(ValueError, match=f"the verdict {verdict.word} is better .* stands on, stop"):
        report_of(DEVICES, SAFE_AREA, verdict=verdict)


def test_a_verdict_better_than_a_finding_is_refused_even_if_its_step_was_lost() -> None:
    good = report_of(DEVICES)
    with pytest.raises(ValueError, match="the verdict go is better than what it stands on, stop"):
        replace(good, findings=(replace(SAFE_AREA, step=Step.COLD_CHECKS),))


@pytest.mark.parametrize("verdict", [Verdict.GO, Verdict.CAUTION])
def test_nothing_judged_clears_nothing(verdict: Verdict) -> None:
    with pytest.raises(ValueError, match="stands on, unverified"):
        Report(title="t", scope="s", verdict=verdict, steps=(), findings=())
