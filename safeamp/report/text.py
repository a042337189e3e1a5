"""A report as text for a terminal: the verdict first, the first step not cleared last."""

from __future__ import annotations

from collections.abc import Iterator

from safeamp._version import __version__
from safeamp.answers import Report, StepVerdict
from safeamp.findings import Finding, Step, Verdict
from safeamp.report.finding_text import finding_lines, way_out
from safeamp.report.layout import Ink, block, clean, paragraph, points
from safeamp.report.safety import SAFETY

PAPER = "on paper: clears no power"
#: Findings named in the head; the others stand below.
MANY = 6


def render(report: Report, *, width: int = 80, colour: bool = False) -> str:
    """Return the report as text.

    Parameters
    ----------
    width : int
        Columns; no line is longer. At least 80.
    colour : bool
        Whether verdicts are coloured; nothing is said by colour alone.

    Raises
    ------
    ValueError
        If the width is below 80.
    """
    if width < 80:
        raise ValueError(f"a report needs 80 columns, not {width}")
    ink = Ink(colour=colour)
    lines = [*_head(report, width, ink), *block("Steps, in their order", _steps(report, ink))]
    for entry in report.steps:
        lines += _step_findings(report, entry, width, ink)
    lines += [*_notes(report, width), *block("Safety", points(SAFETY, width)), *_way_on(report, width)]
    lines += ["", *_last(report, width)]
    return "\n".join(lines) + "\n"


def what_for(report: Report) -> str:
    """Return what the verdict holds for; the scope alone only when every step was asked for."""
    text = f"{report.scope} (an invented amplifier)" if report.demo else report.scope
    if report.up_to is not None and report.up_to is not Step.HAND_OVER:
        text = f"the steps up to {report.up_to.value} and nothing after it ({text})"
    return f"{text}; {PAPER}" if report.on_paper and PAPER not in text else text


def _head(report: Report, width: int, ink: Ink) -> Iterator[str]:
    yield f"safeamp {__version__}"
    if report.demo:
        yield from paragraph("Demonstration: this amplifier is invented; its readings clear nothing.", width)
    yield from paragraph(report.title, width)
    if report.source:
        yield from paragraph(f"sheet {report.source}, SHA-256 {report.digest[:16]}", width)
    yield ""
    word = report.verdict.word.upper()
    lines = paragraph(f"{word} for {what_for(report)}", width, "", "  ")
    lines[0] = ink.verdict(word, report.verdict) + lines[0][len(word) :]
    yield from lines
    deciding = [item.id for item in _asked(report) if item.verdict is report.verdict]
    if deciding and report.verdict is not Verdict.GO:
        more = f" and {len(deciding) - MANY} more" if len(deciding) > MANY else ""
        yield from paragraph(f"decided by: {', '.join(deciding[:MANY])}{more}", width, "  ", "    ")


def _asked(report: Report) -> list[Finding]:
    steps = {entry.step for entry in report.asked}
    return [finding for finding in report.findings if finding.step in steps]


def _steps(report: Report, ink: Ink) -> list[str]:
    return [_step_line(entry, report, ink) for entry in report.steps]


def _step_line(entry: StepVerdict, report: Report, ink: Ink) -> str:
    name = entry.step.value
    if entry.verdict is None:
        return f"  {'-':<12} {name}: nothing to judge"
    if not entry.reached:
        return f"  {'not reached':<12} {name} (its findings alone: {entry.verdict.word})"
    note = ": the first step not cleared" if entry == report.first_blocked else ""
    return "  " + ink.verdict(f"{entry.verdict.word:<12}", entry.verdict) + f" for {name}{note}"


def _step_findings(report: Report, entry: StepVerdict, width: int, ink: Ink) -> list[str]:
    found = [finding for finding in report.findings if finding.step is entry.step]
    lines = [line for finding in found for line in finding_lines(finding, width, ink)]
    mark = "" if entry.reached else " (not reached)"
    return block(ink.strong(entry.step.value.capitalize() + mark), lines)


def _notes(report: Report, width: int) -> Iterator[str]:
    inapplicable = (f"{entry.id}: {entry.because}" for entry in report.not_applicable)
    assumed = (f"{entry.key} = {entry.value}: {entry.why}" for entry in report.assumptions)
    unassessed = (
        f"{key} is not assessed" + (f", which leaves unverified: {', '.join(ids)}" if ids else "")
        for key, ids in report.unassessed.items()
    )
    yield from block("Still to be read at the bench", points(report.still_to_read, width))
    yield from block("Does not apply", points(inapplicable, width))
    yield from block("Assumed, because the sheet does not say", points(assumed, width))
    yield from block("Remarks", points((*report.remarks, *unassessed), width))
    yield from block("Limits changed by your own file", points(report.overridden, width))


def _blocking(report: Report) -> list[Finding]:
    first = report.first_blocked
    if first is None:
        return []
    found = [item for item in report.findings if item.step is first.step and not item.verdict.clears]
    return sorted(found, key=lambda item: -item.verdict)


def _way_on(report: Report, width: int) -> list[str]:
    first = report.first_blocked
    if first is None:
        held = [item for item in _asked(report) if item.verdict is Verdict.CAUTION]
        texts = (f"{item.id}: {'; '.join(item.because) or item.says}" for item in held)
        return block("Cleared only with these cautions", points(texts, width))
    texts = (f"{item.id} ({item.verdict.word}): {way_out(item)}" for item in _blocking(report))
    return block(f"What clears the step {first.step.value}", points(texts, width))


def _as_many(ids: list[str], room: int) -> str:
    for count in range(len(ids), 0, -1):
        text = ", ".join(ids[:count]) + (f" +{len(ids) - count}" if count < len(ids) else "")
        if len(text) <= room:
            return text
    return "see above"


def _last(report: Report, width: int) -> list[str]:
    first = report.first_blocked
    if first is not None and first.verdict is not None:
        head = f"First step not cleared: {first.step.value} ({first.verdict.word}); to clear: "
        return [head + _as_many([item.id for item in _blocking(report)], width - len(head))]
    if not report.verdict.clears:
        return paragraph(f"Nothing is cleared: {report.verdict.word} for {what_for(report)}", width)
    if report.on_paper:
        return paragraph(f"On paper no step is held up, which clears no power: {what_for(report)}", width)
    with_care = " with the cautions above" if report.verdict is Verdict.CAUTION else ""
    return paragraph(f"All steps cleared{with_care} for: {clean(what_for(report))}", width)
