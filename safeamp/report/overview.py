"""The sheets of a folder as one table: text, CSV, JSON, Markdown."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Sequence
from pathlib import PurePath
from typing import Any

from safeamp._version import __version__
from safeamp.answers import Overview, OverviewRow
from safeamp.findings import Verdict
from safeamp.report.cells import harmless, markdown, table_row
from safeamp.report.layout import clean, paragraph
from safeamp.report.safety import SAFETY

HEADS = ("file", "title", "verdict", "for", "first step not cleared", "decided by")
#: Widest column of names; a longer one is shortened, its start says which it is.
NAME = 24
NOT_READ = "not read"
PAPER = "On paper: clears no power."


def render_overview(overview: Overview, *, width: int = 80) -> str:
    """Return one line a sheet; what decides it, or its first complaint, on lines of their own."""
    names = min(max(len(clean(row.file)) for row in overview.rows), NAME)
    lines = [f"safeamp {__version__}", *([PAPER] if overview.on_paper else []), ""]
    head = f"{'file':<{names}}  {'verdict':<10}  first step not cleared"
    lines += [head, "-" * min(width, len(head))]
    for row in overview.rows:
        lines.append(f"{_short(row.file, names):<{names}}  {_word(row):<10}  {_blocked(row)}".rstrip())
        for text in (row.title, f"for {row.scope}" if row.scope else "", _details(row)):
            lines += paragraph(text, width, "    ") if text else []
    return "\n".join([*lines, "", *paragraph(_counts(overview), width)]) + "\n"


def _short(text: str, width: int) -> str:
    text = clean(text)
    return text if len(text) <= width else f"{text[: width - 1]}…"


def _word(row: OverviewRow) -> str:
    return NOT_READ if row.verdict is None else row.verdict.word


def _blocked(row: OverviewRow) -> str:
    if row.verdict is None:
        return "nothing computed"
    return "none" if row.first_blocked is None else row.first_blocked.value


def _details(row: OverviewRow) -> str:
    if row.complaint is not None:
        return complaint_text(row)
    return f"decided by: {', '.join(row.deciding)}" if row.deciding else ""


def complaint_text(row: OverviewRow) -> str:
    """Return the first complaint with its place, and how many more there are; empty for a sheet that was read."""
    found = row.complaint
    if found is None:
        return ""
    # A device or limits file has complaints of its own.
    file = "" if PurePath(found.path).name == row.file else f"{found.path} "
    line = "" if found.line is None else f"line {found.line} "
    key = f"{found.key}: " if found.key else ""
    more = f" (and {row.problems - 1} more)" if row.problems > 1 else ""
    return f"{file}{line}{key}{found.text}{more}"


def _counts(overview: Overview) -> str:
    words = [_word(row) for row in overview.rows]
    worst_first = (*(verdict.word for verdict in sorted(Verdict, reverse=True)), NOT_READ)
    counted = ", ".join(f"{words.count(word)} {word}" for word in worst_first if word in words)
    return f"{len(words)} sheet{'s' if len(words) > 1 else ''}: {counted}"


def _cells(row: OverviewRow) -> tuple[str, ...]:
    details = complaint_text(row) or ", ".join(row.deciding)
    return (row.file, row.title, _word(row), row.scope or "", _blocked(row), details)


def overview_csv(overview: Overview) -> str:
    """Return the table as CSV (RFC 4180), without what a spreadsheet would compute."""
    text = io.StringIO()
    writer = csv.writer(text, lineterminator="\r\n")
    writer.writerow(HEADS)
    for row in overview.rows:
        writer.writerow([harmless(cell) for cell in _cells(row)])
    return text.getvalue()


def overview_markdown(overview: Overview) -> str:
    """Return the table in Markdown."""
    lines = [
        table_row(HEADS),
        table_row("---" for _ in HEADS),
        *(table_row(map(markdown, _cells(one))) for one in overview.rows),
    ]
    paper = [PAPER, ""] if overview.on_paper else []
    return "\n".join([*paper, *lines, "", _counts(overview)]) + "\n"


def overview_json(overview: Overview) -> str:
    """Return the table as a JSON text that ends with a line feed."""
    whole = {
        "safeamp": __version__,
        "command": "overview",
        "verdict": None if overview.verdict is None else overview.verdict.word,
        "unread": overview.unread,
        "exit_status": overview.exit_status,
        "on_paper": overview.on_paper,
        "sheets": _rows_json(overview.rows),
        "safety": list(SAFETY),
    }
    return json.dumps(whole, indent=2, allow_nan=False) + "\n"


def _rows_json(rows: Sequence[OverviewRow]) -> list[dict[str, Any]]:
    return [
        {
            "file": row.file,
            "title": row.title,
            "scope": row.scope,
            "verdict": None if row.verdict is None else row.verdict.word,
            "first_step_not_cleared": None if row.first_blocked is None else row.first_blocked.value,
            "decided_by": list(row.deciding),
            "complaint": complaint_text(row) or None,
            "problems": row.problems,
        }
        for row in rows
    ]
