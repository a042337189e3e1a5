"""The job sheet: one page for the customer, and the full record for the drawer."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from safeamp._version import __version__
from safeamp.amplifier import Sheet, written_key
from safeamp.answers import Report, Working
from safeamp.complaints import Complaint
from safeamp.quantities import Origin
from safeamp.report.cells import markdown
from safeamp.report.html import Drawing, filled
from safeamp.report.jobsheet_page import FAILED, JobPage, job_page
from safeamp.report.layout import block, paragraph, points
from safeamp.report.markdown import as_markdown
from safeamp.report.page import Note, page_of
from safeamp.report.text import render

RECORD = "Record for the drawer"
BLANKS = ("What was wrong", "Date, name")
_LINE = "_" * 40
#: Heads under which many short things stand.
RUN_ON = frozenset(
    {
        FAILED,
        "What it may drive",
        "On which mains",
        "In which position",
        "What is fitted",
        "What was measured",
        "What was not tested",
    }
)


def examples_left(sheet: Sheet) -> tuple[Complaint, ...]:
    """Return a complaint for each value that is still an example: a job sheet tells of an amplifier that exists."""
    lines = {path: entry.line for path, entry in sheet.entries.items()}
    found: dict[str, int | None] = {}
    for path, origin in sheet.amplifier.origins.items():
        if origin is Origin.EXAMPLE and not _follows(sheet, path):
            key = written_key(path)
            found[key] = found.get(key) or lines.get(path) or lines.get(f"{path}.0")
    said = "is still an example; write your own value and where it comes from"
    return tuple(Complaint(sheet.source, line, key, said) for key, line in found.items())


def _follows(sheet: Sheet, path: str) -> bool:
    """Tell a value that the file does not hold: it follows from an example that is complained of itself."""
    from_file = any(entry.line is not None for entry in sheet.entries.values())
    entry = sheet.entries.get(path)
    return from_file and entry is not None and entry.line is None


def jobsheet_text(sheet: Sheet, report: Report, *, width: int = 80) -> str:
    """Return the job sheet as text: the page, a form feed, the record."""
    page = job_page(sheet, report)
    lines = ["JOB SHEET", *paragraph(page.title, width), "", *paragraph(_head(page), width, "", "  ")]
    for note in page.notes:
        lines += _short(note, width) if note.head in RUN_ON else block(note.head, points(note.texts, width))
    lines += ["", *(f"{name}: {_LINE}" for name in BLANKS), *paragraph(_origin(report), width)]
    record = [RECORD, "", *render(report, width=width).splitlines(), "", *_record(report, width)]
    return "\n".join(lines) + "\n\f\n" + "\n".join(record) + "\n"


def _short(note: Note, width: int) -> list[str]:
    """Return short things as one paragraph: the page is to stay one page."""
    sentences = all(text.endswith(".") for text in note.texts)
    return block(
        note.head, paragraph(" ".join(note.texts) if sentences else f"{'; '.join(note.texts)}.", width, "  ")
    )


def _head(page: JobPage) -> str:
    return f"{page.verdict.word.upper()}. {page.standing}"


def _origin(report: Report) -> str:
    return f"From {report.source}, SHA-256 {report.digest}, by safeamp {__version__}."


def _record(report: Report, width: int) -> Iterator[str]:
    """Yield values with their origins and limits with their sources, which a plain report leaves out."""
    page = page_of(report)
    read = (f"{one.key} = {one.value} ({one.origin})" for one in page.inputs)
    held = (
        f"{one.finding.id}: {one.limit or 'by a word'}; {one.source}" for one in page.entries if one.source
    )
    ways = (f"{one.finding.id}: {one.finding.method}" for one in page.entries if one.finding.method)
    yield from block("Values that were read, and where they come from", points(read, width))
    yield from block("Limits, and where they come from", points(held, width))
    yield from block("Methods", points(ways, width))


def jobsheet_markdown(sheet: Sheet, report: Report, workings: Mapping[str, Working]) -> str:
    """Return the job sheet in Markdown: the page, a rule, the record with every calculation."""
    page = job_page(sheet, report)
    lines = ["# Job sheet", "", markdown(page.title), "", f"**{markdown(_head(page))}**"]
    for note in page.notes:
        lines += ["", f"## {note.head}", "", *(f"- {markdown(text)}" for text in note.texts)]
    blanks = (f"{name}: {markdown(_LINE)}" for name in BLANKS)
    lines += ["", "  \n".join(blanks), "", markdown(_origin(report)), "", "---", "", f"# {RECORD}", ""]
    record = as_markdown(report, workings).replace("\n#", "\n##")
    return "\n".join(lines) + f"\n#{record}"


def jobsheet_html(
    sheet: Sheet,
    report: Report,
    workings: Mapping[str, Working],
    drawings: Sequence[Drawing] = (),
    left_out: Sequence[str] = (),
) -> str:
    """Return the job sheet as one HTML file: the page alone on the first sheet of paper, then the record."""
    return filled(
        "jobsheet.html.j2",
        report,
        workings,
        drawings,
        left_out,
        job=job_page(sheet, report),
        blanks=BLANKS,
        record=RECORD,
    )
