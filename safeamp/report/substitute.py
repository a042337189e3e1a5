"""Another device against the fitted one as text, JSON and CSV."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Iterator
from typing import Any

from safeamp._version import __version__
from safeamp.answers import AtWork, Compared, LoadLine, Pair, Range, Ratings, Substitute
from safeamp.answers.substitute import share
from safeamp.findings import Finding
from safeamp.quantities import CURRENT, PERCENT, POWER, TEMPERATURE, VOLTAGE, Kind, show
from safeamp.report.amounts import number_text
from safeamp.report.json_ import plain
from safeamp.report.layout import Ink, block, paragraph, points
from safeamp.report.safety import SAFETY

#: Rows of the table of one load line, at most.
ROWS = 16
_STEPS = (1, 2, 5, 10, 20, 50, 100, 200, 500)
_NAMES = ("voltage", "current", "power", "junction_limit")
_KINDS = (VOLTAGE, CURRENT, POWER, TEMPERATURE)


def render_substitute(answer: Substitute, *, width: int = 80, colour: bool = False) -> str:
    """Return the comparison as text, no line longer than the width."""
    lines = [*_head(answer, width, Ink(colour=colour))]
    for sides, pair in _pairs(answer):
        lines += block(f"Ratings, {sides}", _ratings(pair, width))
    for line in answer.lines:
        lines += block(f"{line.side.capitalize()} device into {line.load}", _line(line, width))
    compared = [text for one in answer.findings for text in _compared(one, width)]
    lines += block("Findings that read these data, fitted device first", compared)
    lines += block("Not computable from these data", points(answer.doubts, width))
    lines += block("Remarks", points(answer.remarks, width))
    lines += block("Safety", points(SAFETY, width))
    return "\n".join(lines) + "\n"


def _head(answer: Substitute, width: int, ink: Ink) -> Iterator[str]:
    yield f"safeamp {__version__}"
    yield from paragraph(answer.title, width)
    if answer.source:
        yield from paragraph(f"sheet {answer.source}, SHA-256 {answer.digest[:16]}", width)
    yield ""
    word = answer.verdict.word.upper()
    lines = paragraph(f"{word} for {answer.scope}", width, "", "  ")
    lines[0] = ink.verdict(word, answer.verdict) + lines[0][len(word) :]
    yield from lines
    deciding = [one.id for one in answer.findings if one.other.verdict is answer.verdict]
    if deciding:
        yield from paragraph(f"decided by: {', '.join(deciding)}", width, "  ", "    ")
    for word_, text in answer.because:
        yield from paragraph(f"{word_.word}: {text}", width, "  ", "    ")


def _pairs(answer: Substitute) -> Iterator[tuple[str, Pair]]:
    """Yield each pair of devices once, with its sides."""
    first = answer.pairs[0]
    if len(answer.pairs) > 1 and all(
        (one.fitted, one.other) == (first.fitted, first.other) for one in answer.pairs
    ):
        yield "both sides", first
        return
    for pair in answer.pairs:
        yield f"{pair.side} side", pair


def _ratings(pair: Pair, width: int) -> list[str]:
    lines = [
        _row("", pair.fitted.name[:24], pair.other.name[:24]),
        _row("kind", pair.fitted.kind, pair.other.kind),
    ]
    for name, kind in zip(_NAMES, _KINDS, strict=True):
        shown = [show(getattr(one, name), kind) for one in (pair.fitted, pair.other)]
        lines.append(_row(name.replace("_", " "), *shown))
    if pair.larger:
        lines += paragraph(
            "No rating of the other device is smaller; what it allows stands below.", width, "  "
        )
    return lines


def _row(label: str, fitted: str, other: str) -> str:
    return f"  {label:<16} {fitted:>24} {other:>24}".rstrip()


def _line(line: LoadLine, width: int) -> list[str]:
    lines = paragraph(f"fitted: {_work_text(line.fitted)}", width, "  ", "    ")
    lines += paragraph(f"other: {_work_text(line.other)}", width, "  ", "    ")
    lines += paragraph(_weaker_text(line), width, "  ", "    ")
    return [*lines, "", *_table(line)]


def _work_text(device: AtWork) -> str:
    warm = f"case {show(device.case, TEMPERATURE)}, junction {show(device.junction, TEMPERATURE)}"
    place = f"at {show(device.voltage, VOLTAGE)} and {show(device.current, CURRENT)}"
    beyond = ", enters what its data do not cover" if device.enters_unknown else ""
    return f"uses {show(device.use, PERCENT)} {place}; {warm}{beyond}"


def _weaker_text(line: LoadLine) -> str:
    if not line.weaker:
        return "the other device allows no less current at any voltage"
    text = f"the other device allows less current from {_ranges(line.weaker)}"
    if not line.weaker_in_use:
        return f"{text}, where this load line does not go"
    return f"{text}; this load line goes there from {_ranges(line.weaker_in_use)}"


def _ranges(ranges: tuple[Range, ...]) -> str:
    return " and from ".join(f"{show(one.low, VOLTAGE)} to {show(one.high, VOLTAGE)}" for one in ranges)


def _table(line: LoadLine) -> Iterator[str]:
    """Yield the load line in round steps of voltage; the whole of it is in the other formats."""
    step = next((one for one in _STEPS if len(line.voltages) / one <= ROWS), _STEPS[-1])
    yield f"  {'V':>5} | {'asked':>8} {'fitted allows':>13} {'use':>8} | {'asked':>8} {'other allows':>12} {'use':>8}"
    for place, volts in enumerate(line.voltages):
        if round(volts) % step == 0:
            less = "<" if line.other.allowed[place] < line.fitted.allowed[place] else ""
            fitted, other = _cells(line.fitted, place), _cells(line.other, place)
            yield (
                f"  {volts:>5.0f} | {fitted[0]:>8} {fitted[1]:>13} {fitted[2]:>8} "
                f"| {other[0]:>8} {other[1]:>12} {other[2]:>8} {less}".rstrip()
            )
    yield "  asked and allowed of one device; < marks where the other device allows less"


def _cells(device: AtWork, place: int) -> tuple[str, str, str]:
    asked, allowed = device.asked[place], device.allowed[place]
    used = share(asked, allowed)
    return (
        "-" if used is None else show(asked, CURRENT),
        show(allowed, CURRENT),
        "-" if used is None else show(used, PERCENT),
    )


def _compared(one: Compared, width: int) -> list[str]:
    return paragraph(f"{one.id}: {_word(one.fitted)} -> {_word(one.other)}", width, "  ", "    ")


def _word(finding: Finding | None) -> str:
    return "does not apply" if finding is None else f"{finding.verdict.word}, {number_text(finding)}"


def substitute_json(answer: Substitute) -> str:
    """Return the comparison as JSON text that ends with a line feed; never nan or infinity."""
    return json.dumps(substitute_mapping(answer), indent=2, allow_nan=False) + "\n"


def substitute_mapping(answer: Substitute) -> dict[str, Any]:
    """Return the comparison as nested dicts and lists; an unknown number or one without bound is None."""
    return {
        "safeamp": __version__,
        "command": "substitute",
        "title": answer.title,
        "scope": answer.scope,
        "verdict": answer.verdict.word,
        "because": [{"verdict": word.word, "says": text} for word, text in answer.because],
        "devices": [_pair(pair) for pair in answer.pairs],
        "load_lines": [_line_mapping(line) for line in answer.lines],
        "findings": [_compared_mapping(one) for one in answer.findings],
        "rows": [{name: _cell(value) for name, value in row.items()} for row in answer.rows()],
        "not_computable": list(answer.doubts),
        "remarks": list(answer.remarks),
        "safety": list(SAFETY),
        "sheet": {"source": answer.source, "sha256": answer.digest},
    }


def _cell(value: object) -> str | bool | float | None:
    return plain(value)


def _pair(pair: Pair) -> dict[str, Any]:
    fitted, other = (_rated(one) for one in (pair.fitted, pair.other))
    return {"side": pair.side, "fitted": fitted, "other": other, "no_rating_smaller": pair.larger}


def _rated(one: Ratings) -> dict[str, Any]:
    return {"name": one.name, "kind": one.kind, **{name: plain(getattr(one, name)) for name in _NAMES}}


def _line_mapping(line: LoadLine) -> dict[str, Any]:
    return {
        "side": line.side,
        "load": line.load,
        "step": line.step,
        "fitted": _work(line.fitted),
        "other": _work(line.other),
        "other_weaker": [{"from": one.low, "to": one.high, "unit": "V"} for one in line.weaker],
        "other_weaker_in_use": [{"from": one.low, "to": one.high, "unit": "V"} for one in line.weaker_in_use],
    }


def _work(device: AtWork) -> dict[str, Any]:
    units: dict[str, Kind] = {
        "use": PERCENT,
        "voltage": VOLTAGE,
        "current": CURRENT,
        "case": TEMPERATURE,
        "junction": TEMPERATURE,
    }
    found = {name: {"value": plain(getattr(device, name)), "unit": kind.unit} for name, kind in units.items()}
    return {**found, "enters_unknown": device.enters_unknown}


def _compared_mapping(one: Compared) -> dict[str, Any]:
    return {"id": one.id, "fitted": _judged(one.fitted), "other": _judged(one.other)}


def _judged(finding: Finding | None) -> dict[str, Any] | None:
    if finding is None:
        return None
    return {
        "verdict": finding.verdict.word,
        "nominal": plain(finding.nominal),
        "worst": plain(finding.worst),
        "unit": finding.kind.unit,
    }


def substitute_csv(answer: Substitute) -> str:
    """Return one line a volt of every load line, comma separated, with a head line; what is not known is empty."""
    text = io.StringIO()
    rows = [{name: _cell(value) for name, value in row.items()} for row in answer.rows()]
    writer = csv.DictWriter(text, list(rows[0]) if rows else [], lineterminator="\n")
    writer.writeheader()
    writer.writerows(rows)
    return text.getvalue()
