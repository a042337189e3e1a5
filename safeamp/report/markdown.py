"""A report in Markdown."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from safeamp.answers import Report, Working
from safeamp.report.cells import markdown, table_row
from safeamp.report.page import Entry, Page, StepLine, page_of
from safeamp.report.working import HOW, NO_WORKINGS, working_texts


def as_markdown(report: Report, workings: Mapping[str, Working] = NO_WORKINGS) -> str:
    """Return the report in Markdown; texts of the sheet stand in it as they are, never as markup.

    Parameters
    ----------
    workings : mapping of str to Working
        Id of a finding -> its calculation, for those that are explained.
    """
    page = page_of(report)
    lines = [*_head(page), "", "## Steps, in their order", "", *_steps(page.steps)]
    for section in page.sections:
        lines += ["", f"## {markdown(section.head)}"]
        for entry in section.entries:
            lines += ["", *_finding(entry, workings.get(entry.finding.id))]
    notes = [(note.head, note.texts) for note in (*page.notes, page.own_words) if note is not None]
    notes += [("Safety", page.safety)]
    notes += [(page.way_on.head, page.way_on.texts)] if page.way_on else []
    for head, texts in notes:
        lines += ["", f"## {markdown(head)}", "", *(f"- {markdown(text)}" for text in texts)]
    return "\n".join([*lines, "", f"**{markdown(page.last)}**"]) + "\n"


def _head(page: Page) -> Iterator[str]:
    yield f"# {page.verdict.word.upper()} for {markdown(page.scope)}"
    yield ""
    if page.demo:
        yield f"{markdown(page.demo)}\n"
    yield f"- {markdown(page.title)}"
    if page.source:
        yield f"- sheet {markdown(page.source)}, SHA-256 {page.digest}"
    yield f"- safeamp {page.version}"
    if page.decided:
        yield f"- decided by: {markdown(', '.join(page.decided))}"


def _steps(steps: tuple[StepLine, ...]) -> Iterator[str]:
    yield table_row(("step", "verdict", "note"))
    yield table_row(("---", "---", "---"))
    for step in steps:
        word = "-" if step.verdict is None else step.verdict.word
        yield table_row(
            (step.name, word if step.reached or step.verdict is None else "not reached", step.note)
        )


def _finding(entry: Entry, working: Working | None) -> Iterator[str]:
    finding = entry.finding
    limit = f" ({entry.limit})" if entry.limit else ""
    yield f"### {finding.verdict.word}: {markdown(finding.id)}"
    yield ""
    yield markdown(f"{entry.number}{limit}")
    yield ""
    for label, text in _said(entry):
        yield f"- {label}: {markdown(text)}"
    if entry.inputs:
        yield "- from:"
        yield from (f"    - {markdown(f'{one.key} = {one.value} ({one.origin})')}" for one in entry.inputs)
    if working is not None:
        yield from (
            "",
            f"How it comes about, line by line. {HOW}",
            "",
            "```text",
            *working_texts(working),
            "```",
        )


def _said(entry: Entry) -> Iterator[tuple[str, str]]:
    finding = entry.finding
    if finding.says and finding.says != entry.number:
        yield "says", finding.says
    yield from entry.details
    for label, text in (
        ("method", finding.method),
        ("why this limit", finding.explanation),
        ("limit from", entry.source),
    ):
        if text:
            yield label, text
