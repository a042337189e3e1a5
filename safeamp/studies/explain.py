"""How the numbers of a report come about, line by line, for those findings that somebody asks for."""

from __future__ import annotations

from collections.abc import Iterable

from safeamp.amplifier import Sheet
from safeamp.answers import Report, Working
from safeamp.checks import CHECKS
from safeamp.checks.working.book import working_of
from safeamp.limits import Limits, nearest


def explained(
    sheet: Sheet, limits: Limits, report: Report, ids: Iterable[str] | None = None
) -> dict[str, Working]:
    """Return the calculation of the nominal value of some findings of a report, or of all.

    Parameters
    ----------
    sheet : Sheet
        As read.
    limits : Limits
        What the report was judged by.
    report : Report
        The findings there are.
    ids : iterable of str, optional
        Which of them; all when left out.

    Raises
    ------
    KeyError
        If there is no such finding, or none for this amplifier; the text says why.
    """
    there = [finding.id for finding in report.findings]
    wanted = there if ids is None else list(dict.fromkeys(ids))
    for identity in wanted:
        if identity not in there:
            raise KeyError(_absent(identity, report))
    values = {finding.id: finding.nominal for finding in report.findings}
    found = {identity: working_of(identity, sheet.amplifier, limits, values[identity]) for identity in wanted}
    return {identity: working for identity, working in found.items() if working is not None}


def _absent(identity: str, report: Report) -> str:
    """Return why a finding cannot be explained."""
    if identity not in CHECKS:
        return f"{identity} is not a finding{nearest(identity, CHECKS)}"
    reasons = {one.id: one.because for one in report.not_applicable}
    if identity in reasons:
        return f"{identity} does not apply: {reasons[identity]}"
    if identity in report.still_to_read:
        return f"{identity} is still to be read at the bench"
    return f"{identity} is not judged: what it would need is not in the sheet"
