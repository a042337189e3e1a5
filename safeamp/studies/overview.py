"""All sheets of a folder at a glance."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from pathlib import Path

from safeamp.amplifier import Sheet
from safeamp.answers import Overview, OverviewRow, Report
from safeamp.complaints import ReadingError
from safeamp.findings import Verdict
from safeamp.limits import Limits
from safeamp.studies.verdict import verdict


def overview(
    paths: Sequence[Path],
    read: Callable[[Path], Sheet],
    limits: Limits,
    *,
    on_paper: bool = False,
) -> Overview:
    """Judge every sheet; one that cannot be read becomes a row with its first complaint.

    Parameters
    ----------
    paths : sequence of Path
        The sheets, in the order of the rows.
    read : callable
        How one of them is read; raises ReadingError where it cannot be.
    limits : Limits
        What the findings are judged by.
    on_paper : bool
        Judge only what is computed.
    """
    return Overview(tuple(_rows(paths, read, limits, on_paper=on_paper)), on_paper)


def _rows(
    paths: Sequence[Path], read: Callable[[Path], Sheet], limits: Limits, *, on_paper: bool
) -> Iterator[OverviewRow]:
    for path in paths:
        try:
            sheet = read(path)
        except ReadingError as trouble:
            first = trouble.complaints[0]
            yield OverviewRow(file=path.name, complaint=first, problems=len(trouble.complaints))
        else:
            yield _row(path.name, verdict(sheet, limits, on_paper=on_paper))


def _row(file: str, report: Report) -> OverviewRow:
    blocked = report.first_blocked
    return OverviewRow(
        file=file,
        title=report.title,
        scope=report.scope,
        verdict=report.verdict,
        first_blocked=None if blocked is None else blocked.step,
        deciding=tuple(
            finding.id
            for finding in report.findings
            if finding.verdict is report.verdict and finding.verdict is not Verdict.GO
        ),
    )
