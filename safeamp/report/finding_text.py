"""One finding as lines: a good one in short, any other with its reason, its corner and its next reading."""

from __future__ import annotations

from collections.abc import Iterator

from safeamp.amplifier import written_key
from safeamp.findings import Finding, Verdict
from safeamp.report.amounts import (
    also_text,
    at_text,
    limit_text,
    number_text,
    place_text,
    shortfall_text,
)
from safeamp.report.layout import Ink, paragraph

_HANG = " " * 13


def finding_lines(finding: Finding, width: int, ink: Ink) -> list[str]:
    """Return the lines of one finding."""
    limit = limit_text(finding)
    head = f"{finding.id}: {number_text(finding)}" + (f" ({limit})" if limit else "")
    word = f"  {finding.verdict.word:<11}"
    lines = paragraph(head, width, word)
    lines[0] = ink.verdict(word, finding.verdict) + lines[0][len(word) :]
    for text in _shown(finding):
        lines += paragraph(text, width, _HANG, _HANG + "  ")
    return lines


def _shown(finding: Finding) -> Iterator[str]:
    if finding.says and finding.says != number_text(finding):
        yield finding.says
    if finding.verdict is Verdict.GO:
        yield from (f"{label}: {text}" for label, text in _reasons(finding))
    else:
        yield from (f"{label}: {text}" for label, text in details_of(finding))


def _reasons(finding: Finding) -> Iterator[tuple[str, str]]:
    """Return the reasons of a word; what is said beside a go takes nothing from it and is still to be heeded."""
    label = "mind" if finding.verdict is Verdict.GO else "because"
    return ((label, reason) for reason in finding.because)


def details_of(finding: Finding) -> Iterator[tuple[str, str]]:
    """Yield what is to be said of a finding beside its number, each with its label."""
    yield from _reasons(finding)
    for label, text in (
        ("worst case at", place_text(finding)),
        ("there", at_text(finding)),
        ("also", also_text(finding)),
        ("hangs on", _key_or_sentence(finding.overturned_by)),
        ("to settle it, give", ", ".join(written_key(key) for key in finding.needs)),
        ("next", finding.next),
    ):
        if text:
            yield label, text


def _key_or_sentence(text: str) -> str:
    return text if " " in text else written_key(text)


def way_out(finding: Finding) -> str:
    """Return what would clear a finding: how far it is off, its next reading, the keys that settle it."""
    keys = dict.fromkeys(written_key(key) for key in finding.needs)
    missing = ", ".join(key for key in keys if key not in finding.next)
    off = shortfall_text(finding) if finding.verdict is Verdict.STOP else ""
    parts = (off, finding.next.rstrip("."), f"give {missing}" if missing else "")
    reasons = "; ".join(finding.because) or finding.says
    return "; ".join(part for part in parts if part) or f"remove the cause: {reasons}"
