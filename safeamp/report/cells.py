"""Texts of a user in a cell of a table or a line of Markdown: printed as they stand, never obeyed."""

from __future__ import annotations

from collections.abc import Iterable

from safeamp.report.layout import clean

_LED = ("=", "+", "-", "@")


def harmless(cell: str) -> str:
    """Return a cell of CSV that no spreadsheet takes for a formula."""
    text = clean(cell)
    return f"'{text}" if text.startswith(_LED) else text


def markdown(text: str) -> str:
    """Return a text that Markdown prints as it stands, on one line."""
    text = clean(text)
    for sign in "\\`*_[]<>|&~":
        text = text.replace(sign, f"\\{sign}")
    return f"\\{text}" if text.startswith(("#", "+", "-", "=")) else text


def table_row(cells: Iterable[str]) -> str:
    """Return one line of a table in Markdown, of cells that are Markdown already."""
    return f"| {' | '.join(cells)} |"
