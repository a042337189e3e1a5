"""A report as text for a terminal: the verdict first, the first step not cleared last."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from safeamp.answers import Report, Working
from safeamp.report.finding_text import finding_lines
from safeamp.report.layout import Ink, block, paragraph, points
from safeamp.report.page import Note, Page, Section, StepLine, blocking, page_of
from safeamp.report.working import HOW, NO_WORKINGS, wrapped

#: Findings named in the head; the others stand below.
MANY = 6


def render(
    report: Report,
    *,
    width: int = 80,
    colour: bool = False,
    workings: Mapping[str, Working] = NO_WORKINGS,
) -> str:
    """Return the report as text.

    Parameters
    ----------
    width : int
        Columns; no line is longer. At least 80.
    colour : bool
        Whether verdicts are coloured; nothing is said by colour alone.
    workings : mapping of str to Working
        Id of a finding -> its calculation, for those that are explained.

    Raises
    ------
    ValueError
        If the width is below 80.
    """
    if width < 80:
        raise ValueError(f"a report needs 80 columns, not {width}")
    ink, page = Ink(colour=colour), page_of(report)
    lines = [*_head(page, width, ink)]
    lines += block("Steps, in their order", [_step_line(step, ink) for step in page.steps])
    for section in page.sections:
        lines += _findings(section, width, ink)
    lines += _workings(page, workings, width)
    notes = [*page.notes, Note("Safety", page.safety), *([page.way_on] if page.way_on else [])]
    lines += [line for note in notes for line in block(note.head, points(note.texts, width))]
    lines += ["", *_last(report, page, width)]
    return "\n".join(lines) + "\n"


def _head(page: Page, width: int, ink: Ink) -> Iterator[str]:
    yield f"safeamp {page.version}"
    if page.demo:
        yield from paragraph(page.demo, width)
    yield from paragraph(page.title, width)
    if page.source:
        yield from paragraph(f"sheet {page.source}, SHA-256 {page.digest[:16]}", width)
    yield ""
    word = page.verdict.word.upper()
    lines = paragraph(f"{word} for {page.scope}", width, "", "  ")
    lines[0] = ink.verdict(word, page.verdict) + lines[0][len(word) :]
    yield from lines
    if page.decided:
        more = f" and {len(page.decided) - MANY} more" if len(page.decided) > MANY else ""
        yield from paragraph(f"decided by: {', '.join(page.decided[:MANY])}{more}", width, "  ", "    ")


def _step_line(step: StepLine, ink: Ink) -> str:
    if step.verdict is None:
        return f"  {'-':<12} {step.name}: {step.note}"
    if not step.reached:
        return f"  {'not reached':<12} {step.name} ({step.note})"
    note = f": {step.note}" if step.note else ""
    return "  " + ink.verdict(f"{step.verdict.word:<12}", step.verdict) + f" for {step.name}{note}"


def _findings(section: Section, width: int, ink: Ink) -> list[str]:
    lines = [line for entry in section.entries for line in finding_lines(entry.finding, width, ink)]
    return block(ink.strong(section.head), lines)


def _workings(page: Page, workings: Mapping[str, Working], width: int) -> Iterator[str]:
    """Yield each calculation that was asked for, and the limit that its value is held against."""
    for entry in page.entries:
        working = workings.get(entry.finding.id)
        if working is not None:
            held = [entry.limit, entry.source] if entry.limit else [entry.source or "no limit"]
            lines = [*paragraph(HOW, width, "  "), "", *wrapped(working, width, "  ")]
            lines += ["", *paragraph(f"held against: {'; '.join(held)}", width, "  ", "    ")]
            yield from block(f"How {entry.finding.id} comes about", lines)


def _as_many(ids: list[str], room: int) -> str:
    for count in range(len(ids), 0, -1):
        text = ", ".join(ids[:count]) + (f" +{len(ids) - count}" if count < len(ids) else "")
        if len(text) <= room:
            return text
    return "see above"


def _last(report: Report, page: Page, width: int) -> list[str]:
    ids = [item.id for item in blocking(report)]
    if not ids:
        return paragraph(page.last, width)
    # one line, whatever its length: people look at the last line alone
    head = page.last.removesuffix(", ".join(ids))
    return [head + _as_many(ids, width - len(head))]
