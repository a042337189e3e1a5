"""All sheets of a folder at a glance."""

from pathlib import Path

import pytest

from safeamp.answers import Overview, OverviewRow
from safeamp.complaints import Complaint, ReadingError
from safeamp.findings import Step, Verdict
from safeamp.reading import load_sheet
from safeamp.studies.overview import overview
from safeamp.studies.verdict import verdict
from tests.scenarios.sheets import limits

SCENARIOS = Path(__file__).parents[1] / "scenarios"
SHEETS = [SCENARIOS / f"{name}.toml" for name in ("healthy", "old_mains", "split_rail")]
COMPLAINT = Complaint("folder/broken.toml", 3, "supply.no_load", "35 has no unit")


def read(path):
    if path.name == "broken.toml":
        raise ReadingError((COMPLAINT, COMPLAINT))
    return load_sheet(path, limits=limits())


def test_each_row_says_what_the_check_says():
    found = overview(SHEETS, read, limits())
    assert [row.file for row in found.rows] == ["healthy.toml", "old_mains.toml", "split_rail.toml"]
    for path, row in zip(SHEETS, found.rows, strict=True):
        report = verdict(read(path), limits())
        assert (row.title, row.scope, row.verdict) == (report.title, report.scope, report.verdict)
        assert row.first_blocked is (report.first_blocked and report.first_blocked.step)
        deciding = {one.id for one in report.findings if one.verdict is report.verdict}
        assert set(row.deciding) == (set() if report.verdict is Verdict.GO else deciding)


def test_a_broken_sheet_is_a_row_with_its_first_complaint():
    found = overview([Path("folder/broken.toml"), SHEETS[0]], read, limits())
    assert found.rows[0] == OverviewRow(file="broken.toml", complaint=COMPLAINT, problems=2)
    assert found.rows[1].verdict is Verdict.GO


def test_on_paper_is_handed_on():
    found = overview([SHEETS[2]], read, limits(), on_paper=True)
    assert found.on_paper
    assert "on paper: clears no power" in found.rows[0].scope
    assert "bias.drift" not in found.rows[0].deciding


def row(verdict):
    if verdict is None:
        return OverviewRow(file="x.toml", complaint=COMPLAINT, problems=1)
    return OverviewRow(file="x.toml", verdict=verdict, first_blocked=Step.BIAS)


@pytest.mark.parametrize(
    ("verdicts", "status"),
    [
        ([Verdict.GO], 0),
        ([Verdict.GO, Verdict.CAUTION], 3),
        ([Verdict.UNVERIFIED, Verdict.CAUTION], 4),
        ([Verdict.UNVERIFIED, Verdict.STOP, Verdict.GO], 5),
        # What could not be read comes before all but a stop.
        ([None], 2),
        ([None, Verdict.GO], 2),
        ([None, Verdict.UNVERIFIED], 2),
        ([None, Verdict.STOP], 5),
    ],
)
def test_the_exit_status_is_the_worst(verdicts, status):
    assert Overview(tuple(map(row, verdicts))).exit_status == status


def test_no_sheet_is_no_go():
    with pytest.raises(ValueError, match="there is no sheet to judge"):
        Overview(())


@pytest.mark.parametrize("more", [{}, {"verdict": Verdict.GO, "complaint": COMPLAINT}])
def test_a_row_has_a_verdict_or_a_complaint(more):
    with pytest.raises(ValueError, match=r"x\.toml has either a verdict or a complaint"):
        OverviewRow(file="x.toml", **more)
