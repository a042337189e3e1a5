"""Lines of a given width, with colour only where it is asked for."""

from __future__ import annotations

import re
import textwrap
import unicodedata
from collections.abc import Iterable

from safeamp.findings import Verdict

#: A blank between number and unit; "110" at the end of one line and "%" on the next is misread.
_BEFORE_UNIT = re.compile(
    r"(?<=\d) (?=(?:%|°C|K|K/W|m?V|[mµ]?A|[mk]?W|[mkM]?ohm|k?Hz|[µnp]F|deg|m?s|min)(?!\w))"
)
_HELD = "\u00a0"
_COLOURS = {Verdict.GO: "32", Verdict.CAUTION: "33", Verdict.UNVERIFIED: "35", Verdict.STOP: "1;31"}


def clean(text: str) -> str:
    """Return a text on one line without control characters: a title must not steer the terminal."""
    if text.isprintable():
        return " ".join(text.split())
    kept = (" " if unicodedata.category(letter) in ("Cc", "Cf", "Zl", "Zp") else letter for letter in text)
    return " ".join("".join(kept).split())


def held(text: str) -> str:
    """Return a text whose numbers stay on one line with their units."""
    return _BEFORE_UNIT.sub(_HELD, text)


def paragraph(text: str, width: int, first: str = "", rest: str | None = None) -> list[str]:
    """Return lines no longer than the width; the first starts with `first`, the others with `rest`."""
    lines = textwrap.wrap(
        held(clean(text)),
        width,
        initial_indent=first,
        subsequent_indent=" " * len(first) if rest is None else rest,
        break_on_hyphens=False,
    )
    return [line.replace(_HELD, " ") for line in lines]


def points(texts: Iterable[str], width: int, indent: str = "  ") -> list[str]:
    """Return a list of paragraphs, each behind a dash."""
    return [line for text in texts for line in paragraph(text, width, f"{indent}- ")]


def block(head: str, lines: list[str]) -> list[str]:
    """Return a head with its lines and a blank line before, nothing without lines."""
    return ["", head, *lines] if lines else []


class Ink:
    """Marks words of a verdict; without colour it leaves every text as it is."""

    def __init__(self, *, colour: bool) -> None:
        self._colour = colour

    def verdict(self, text: str, verdict: Verdict | None) -> str:
        """Return a text in the colour of its verdict."""
        return self._mark(text, "" if verdict is None else _COLOURS[verdict])

    def strong(self, text: str) -> str:
        """Return a text that stands out."""
        return self._mark(text, "1")

    def _mark(self, text: str, code: str) -> str:
        return f"\x1b[{code}m{text}\x1b[0m" if self._colour and code else text
