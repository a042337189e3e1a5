"""A quick answer as text and as JSON."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from safeamp.answers import Amount, QuickAnswer
from safeamp.quantities import show
from safeamp.report.finding_text import finding_lines
from safeamp.report.layout import Ink, block, paragraph, points
from safeamp.report.safety import SAFETY

_COLUMN = 30


def render_quick(answer: QuickAnswer, *, width: int = 80, colour: bool = False) -> str:
    """Return a quick answer as lines no longer than `width`."""
    ink = Ink(colour=colour)
    lines = [answer.title]
    put_in = [(one.option, _put(one.text, one.why)) for one in answer.put_in]
    lines += block("Put in", _pairs(put_in, width))
    lines += block("Results", _pairs([(one.name, _amount(one)) for one in answer.results], width))
    lines += block("Formulas", list(_formulas(answer, width)))
    lines += block("Verdict", list(_verdict(answer, width, ink)))
    lines += block("Caution", points(answer.cautions, width))
    lines += block("Safety", points(SAFETY, width))
    return "\n".join(lines) + "\n"


def _pairs(pairs: list[tuple[str, str]], width: int) -> list[str]:
    lines = []
    for name, text in pairs:
        head = f"  {name.replace('_', ' '):<{_COLUMN}} "
        lines += paragraph(text, width, head, " " * len(head))
    return lines


def _put(text: str, why: str) -> str:
    return f"{text} ({why.rstrip('.')})" if why else text


def _amount(amount: Amount) -> str:
    if isinstance(amount.value, str):
        return amount.value
    if amount.kind is None or amount.value is None:
        return amount.unknown
    text = show(amount.value, amount.kind, 4)
    if amount.low is None or amount.high is None:
        return text
    return f"{text} ({show(amount.low, amount.kind, 4)} to {show(amount.high, amount.kind, 4)})"


def _formulas(answer: QuickAnswer, width: int) -> Iterator[str]:
    for formula in answer.formulas:
        yield from paragraph(formula.words, width, "  ", "    ")
        yield from paragraph(formula.numbers, width, "    ", "      ")


def _verdict(answer: QuickAnswer, width: int, ink: Ink) -> Iterator[str]:
    if answer.verdict is None:
        return
    word = answer.verdict.word.upper()
    lines = paragraph(f"{word} for {answer.holds_for}", width, "  ", "    ")
    yield lines[0].replace(word, ink.verdict(word, answer.verdict), 1)
    yield from lines[1:]
    for finding in answer.judged:
        yield from finding_lines(finding, width, ink)


def quick_json(answer: QuickAnswer) -> str:
    """Return a quick answer as a JSON text that ends with a line feed; never nan or infinity."""
    import json

    return json.dumps(quick_mapping(answer), indent=2, allow_nan=False) + "\n"


def quick_mapping(answer: QuickAnswer) -> dict[str, Any]:
    """Return a quick answer as nested dicts and lists."""
    from safeamp.report.json_ import finding_mapping

    return {
        "command": answer.command,
        "results": {one.name: _result(one) for one in answer.results},
        "verdict": None if answer.verdict is None else answer.verdict.word,
        "holds_for": answer.holds_for,
        "findings": [finding_mapping(one) for one in answer.judged],
        "inputs": [{"option": one.option, "value": one.text, "why": one.why} for one in answer.put_in],
        "formulas": [{"words": one.words, "numbers": one.numbers} for one in answer.formulas],
        "cautions": list(answer.cautions),
        "safety": list(SAFETY),
    }


def _result(amount: Amount) -> dict[str, Any]:
    from safeamp.report.json_ import plain

    value = amount.value if isinstance(amount.value, str) else plain(amount.value)
    found: dict[str, Any] = {"value": value, "unit": None if amount.kind is None else amount.kind.unit}
    if amount.low is not None:
        found |= {"low": plain(amount.low), "high": plain(amount.high)}
    return found
