"""A calculation as lines of text: in symbols, with the numbers put in, and what comes out."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator, Mapping
from typing import Any, Final

from safeamp.answers import Line, Working
from safeamp.quantities import show
from safeamp.report.layout import clean, paragraph

#: Significant digits of every number, so that the next line can be redone from the printed ones.
DIGITS: Final = 6
NO_WORKINGS: Final[Mapping[str, Working]] = {}
HOW: Final = (
    "Numbers are in V, A, W, ohm, F, Hz, s, K/W, m, kg and N/A; temperatures in degC, angles in deg "
    "(sin and tan of degrees); ^ is a power, ln the natural logarithm, pi 3.14159."
)
_SYMBOL = re.compile(r"[A-Za-z][A-Za-z0-9_]*")


def number(value: float | None) -> str:
    """Return a number in the unit of its kind as a calculator takes it."""
    if value is None or math.isnan(value):
        return "?"
    if math.isinf(value):
        return "unbounded"
    text = f"{value:.{DIGITS}g}"
    if "e" in text:
        mantissa, exponent = text.split("e")
        text = f"{mantissa}e{int(exponent)}"
    return "0" if text == "-0" else text


def put_in(line: Line) -> str:
    """Return the formula of a line with the numbers in place of its symbols."""
    values = dict(line.terms)

    def replaced(found: re.Match[str]) -> str:
        if found[0] not in values:
            return found[0]
        text = number(values[found[0]])
        return f"({text})" if text.startswith("-") else text

    return _SYMBOL.sub(replaced, line.formula)


def result(line: Line) -> str:
    """Return what comes out, with its unit, and as people read it where that differs."""
    if line.value is None or math.isnan(line.value):
        return "not known"
    unit = "" if line.kind.unit == "1" else f" {line.kind.unit}"
    plain = f"{number(line.value)}{unit}"
    shown = show(line.value, line.kind)
    other = _unit_of(shown) not in (line.kind.unit, "", _unit_of(plain), "°C") and math.isfinite(line.value)
    return f"{plain} ({shown})" if other else plain


def _unit_of(text: str) -> str:
    return text.partition(" ")[2]


def line_texts(line: Line) -> Iterator[str]:
    """Yield one line of a calculation: in symbols, with numbers, and its result."""
    if not line.formula:
        origin = f" ({line.origin})" if line.origin else ""
        yield f"{line.symbol} = {result(line)}: {line.words}{origin}"
        return
    yield f"{line.symbol} = {line.formula}: {line.words}"
    if _SYMBOL.fullmatch(line.formula) is None:
        yield f"  = {put_in(line)}"
    yield f"  = {result(line)}"


def line_mapping(line: Line) -> dict[str, Any]:
    """Return one line as a dict for JSON: the same numbers, the value in full."""
    known = line.value is not None and math.isfinite(line.value)
    return {
        "symbol": line.symbol,
        "words": line.words,
        "origin": line.origin,
        "formula": line.formula,
        "put_in": put_in(line) if line.formula else "",
        "value": line.value if known else None,
        "unit": line.kind.unit,
    }


def working_texts(working: Working) -> list[str]:
    """Return a calculation as lines of text, none of them with a mark that ends a block of Markdown."""
    return [_harmless(text) for line in working.lines for text in line_texts(line)]


def _harmless(text: str) -> str:
    lead = text[: len(text) - len(text.lstrip())]
    return lead + clean(text).replace("`", "'")


def wrapped(working: Working, width: int, indent: str) -> list[str]:
    """Return a calculation as lines no longer than a width."""
    lines = []
    for text in working_texts(working):
        lead = indent + text[: len(text) - len(text.lstrip())]
        lines += paragraph(text, width, lead, lead + "    ")
    return lines
