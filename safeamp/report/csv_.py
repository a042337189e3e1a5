"""A report as CSV: one row a finding, the columns of the JSON, numbers in full beside numbers as shown."""

from __future__ import annotations

import csv
import io
from typing import Any

from safeamp.answers import Report
from safeamp.report.amounts import also_text, at_text, place_text
from safeamp.report.cells import harmless
from safeamp.report.json_ import finding_mapping
from safeamp.report.page import Entry, Page, page_of

#: Whose finding it is, the same on each row: rows of several reports may stand in one table.
ABOUT = ("title", "sheet", "sha256", "version", "scope", "verdict_for_scope")
COLUMNS = (
    "id", "step", "reached", "verdict", "says", "shown", "nominal", "worst", "unit", "unbounded", "also",
    "limit_shown", "limit_go", "limit_stop", "limit_sense", "limit_unit", "limit_source", "limit_evidence",
    "limit_overridden", "worst_case", "at", "inputs", "needs", "next", "method", "because", "overturned_by",
    "explanation", "to_be_read", *ABOUT,
)  # fmt: skip


def as_csv(report: Report) -> str:
    """Return the findings as CSV (RFC 4180), without what a spreadsheet would compute."""
    text = io.StringIO()
    writer = csv.DictWriter(text, COLUMNS, lineterminator="\r\n")
    writer.writeheader()
    reached = {entry.step: entry.reached for entry in report.steps}
    page = page_of(report)
    about = dict(zip(ABOUT, _about(page), strict=True))
    for entry in page.entries:
        cells = {**_row(entry), "reached": reached[entry.finding.step], **about}
        writer.writerow({name: _cell(cell) for name, cell in cells.items()})
    return text.getvalue()


def _about(page: Page) -> tuple[str, ...]:
    return page.title, page.source, page.digest, page.version, page.scope, page.verdict.word


def _row(entry: Entry) -> dict[str, Any]:
    """Return the cells of one finding; what JSON nests is a text, parts divided by semicolons."""
    finding = entry.finding
    found = finding_mapping(finding)
    value, limit = found.pop("value"), found.pop("limit") or {}
    return {
        **found,
        **value,
        "unbounded": value.get("unbounded", False),
        "shown": entry.number,
        "limit_shown": entry.limit,
        **{f"limit_{name}": item for name, item in limit.items()},
        "also": also_text(finding),
        "worst_case": place_text(finding),
        "at": at_text(finding),
        "inputs": [f"{one.key} = {one.value} ({one.origin})" for one in entry.inputs],
    }


def _cell(cell: Any) -> Any:
    """Return a number as it is, several things as one text, a text as no spreadsheet computes it."""
    if cell is None:
        return ""
    if isinstance(cell, bool):
        return "true" if cell else "false"
    if isinstance(cell, (list, tuple)):
        cell = (
            ", ".join(map(str, cell))
            if all(isinstance(one, float) for one in cell)
            else "; ".join(map(str, cell))
        )
    return harmless(cell) if isinstance(cell, str) else cell
