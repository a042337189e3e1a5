"""Chances over random samples as text, JSON and CSV."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from safeamp._version import __version__
from safeamp.amplifier import Entry, written_key
from safeamp.answers import Chance, FindingChances, StepChances, Tolerance
from safeamp.checks.amounts import percent, shown_kind
from safeamp.findings import Verdict
from safeamp.quantities import TEMPERATURE, TEMPERATURE_DIFFERENCE, show
from safeamp.report.json_ import plain
from safeamp.report.layout import block, paragraph, points
from safeamp.report.safety import SAFETY

WARNING = (
    'A chance clears nothing: whether the next step may be taken says "safeamp check", at the worst corner.'
)
MAINS = "mains, from today's reading up to the highest"
#: Smaller parts of the variance are not worth a line.
LEAST_SHARE = 0.01
_WORST_FIRST = sorted(Verdict, reverse=True)


def chance_text(chance: Chance) -> str:
    """Return a chance with its interval, which is left out where all samples must agree."""
    if chance.low == chance.high:
        return percent(chance.share)
    if chance.share == 0.0:
        return f"0 % (at most {percent(chance.high)})"
    if chance.share == 1.0:
        return f"100 % (at least {percent(chance.low)})"
    return f"{percent(chance.share)} ({percent(chance.low)} to {percent(chance.high)})"


def _words_text(words: Mapping[Verdict, Chance]) -> str:
    """Return the chances of the words found, and of stop in any case."""
    said = [word for word in _WORST_FIRST if words[word].share > 0.0 or word is Verdict.STOP]
    return ", ".join(f"{word.word} {chance_text(words[word])}" for word in said)


def key_text(path: str) -> str:
    """Return a key path as people know it; a further value of a list with its number."""
    if path == "mains.present":
        return "mains"
    place = path.rpartition(".")[2]
    return written_key(path) + (f" ({int(place) + 1})" if place.isdigit() and place != "0" else "")


def render_tolerance(answer: Tolerance, *, width: int = 80) -> str:
    """Return the answer as text, no line longer than the width."""
    open_ = [one for one in answer.findings if _is_open(one.words)]
    lines = [
        *_head(answer, width),
        *block("Steps, in their order", list(_steps(answer, width))),
        *block(
            "Findings that differ between the samples",
            [line for one in open_ for line in _finding(one, width)],
        ),
        *block("Findings with the same word in every sample", list(_same(answer, width))),
        *block("Varied at random, each on its own", points(map(_varied_text, answer.varied), width)),
        *block("Safety", points(SAFETY, width)),
        *block("Measure next", list(_next(answer, width))),
    ]
    return "\n".join(lines) + "\n"


def _is_open(words: Mapping[Verdict, Chance]) -> bool:
    return any(0.0 < chance.share < 1.0 for chance in words.values())


def _head(answer: Tolerance, width: int) -> Iterator[str]:
    yield f"safeamp {__version__}"
    yield from paragraph(answer.title, width)
    if answer.source:
        yield from paragraph(f"sheet {answer.source}, SHA-256 {answer.digest[:16]}", width)
    yield ""
    drawn = f"{answer.samples} samples inside the tolerances, seed {answer.seed}; {answer.distribution}"
    yield from paragraph(drawn, width)
    yield from paragraph(f"In brackets: {answer.interval}, of what more samples would show.", width)
    yield from paragraph(WARNING, width)


def _steps(answer: Tolerance, width: int) -> Iterator[str]:
    for stage in answer.steps:
        yield from paragraph(f"{stage.step.value}: {_step_text(stage)}", width, "  ", "    ")
    if answer.every_step is not None:
        yield from paragraph(f"all steps: {_step_text(answer.every_step)}", width, "  ", "    ")


def _step_text(stage: StepChances) -> str:
    if not stage.sampled:
        word = next(word for word, chance in stage.words.items() if chance.share == 1.0)
        return f"{word.word} in every sample"
    return f"cleared {chance_text(stage.cleared)}; {_words_text(stage.words)}"


def _finding(finding: FindingChances, width: int) -> Iterator[str]:
    yield from paragraph(f"{finding.id}: {_words_text(finding.words)}", width, "  ", "    ")
    for text in (_quantiles_text(finding), _shares_text(finding), _unknown_text(finding)):
        if text:
            yield from paragraph(text, width, "      ", "        ")


def _quantiles_text(finding: FindingChances) -> str:
    kind = shown_kind(finding)
    values = [
        f"{percent(share).replace('.0', '')} at or below {show(value, kind, 4)}"
        for share, value in finding.quantiles.items()
    ]
    if not values or finding.resolution is None:
        return ""
    difference = TEMPERATURE_DIFFERENCE if kind == TEMPERATURE else kind
    return f"{', '.join(values)}; right to {show(finding.resolution, difference, 1)}"


def _shares_text(finding: FindingChances) -> str:
    if finding.linear is None:
        return ""
    parts = [
        f"{key_text(path)} {percent(share)}" for path, share in finding.shares.items() if share >= LEAST_SHARE
    ]
    return f"moved by {', '.join(parts)}; a straight line explains {percent(finding.linear)}"


def _unknown_text(finding: FindingChances) -> str:
    return f"{finding.unknown} samples without a value, unverified" if finding.unknown else ""


def _same(answer: Tolerance, width: int) -> Iterator[str]:
    for word in _WORST_FIRST:
        ids = [one.id for one in answer.findings if one.words[word].share == 1.0]
        if ids:
            yield from paragraph(f"{word.word}: {', '.join(ids)}", width, "  ", "    ")


def _varied_text(entry: Entry) -> str:
    low, high = show(entry.low, entry.kind, 4), show(entry.high, entry.kind, 4)
    name = MAINS if entry.path == "mains.present" else f"{key_text(entry.path)}, {entry.origin.value}"
    return f"{name}: {low} to {high}"


def _next(answer: Tolerance, width: int) -> Iterator[str]:
    parts = [(path, share) for path, share in answer.measure_next if share >= LEAST_SHARE]
    if not parts:
        yield from paragraph("No reading of what varies here changes whether a step is cleared.", width, "  ")
        return
    yield from points((f"{key_text(path)}: {percent(share)}" for path, share in parts), width)
    yield from paragraph(
        f"Method: {answer.method}; each finding weighted by p(1 - p), p the chance that it clears its step.",
        width,
        "  ",
    )
    yield from ("", f"measure next: {key_text(parts[0][0])}")


def tolerance_json(answer: Tolerance) -> str:
    """Return the answer as JSON text that ends with a line feed; never nan or infinity."""
    return json.dumps(tolerance_mapping(answer), indent=2, allow_nan=False) + "\n"


def tolerance_mapping(answer: Tolerance) -> dict[str, Any]:
    """Return the answer as nested dicts and lists; an unknown number or one without bound is None."""
    return {
        "safeamp": __version__,
        "command": "tolerance",
        "title": answer.title,
        "samples": answer.samples,
        "seed": answer.seed,
        "distribution": answer.distribution,
        "interval": answer.interval,
        "method": answer.method,
        "varied": [_varied(entry) for entry in answer.varied],
        "steps": [_step(stage) for stage in answer.steps],
        "all_steps": None if answer.every_step is None else _step(answer.every_step),
        "findings": [_finding_mapping(finding) for finding in answer.findings],
        "measure_next": [{"key": path, "weight": weight} for path, weight in answer.measure_next],
        "clears": False,
        "safety": [WARNING, *SAFETY],
        "sheet": {"source": answer.source, "sha256": answer.digest},
    }


def _varied(entry: Entry) -> dict[str, Any]:
    return {
        "key": entry.path,
        "nominal": entry.nominal,
        "low": entry.low,
        "high": entry.high,
        "unit": entry.kind.unit,
        "origin": entry.origin.value,
    }


def _chances(words: Mapping[Verdict, Chance]) -> dict[str, Any]:
    return {word.word: _chance(chance) for word, chance in words.items()}


def _chance(chance: Chance) -> dict[str, float]:
    return {"share": chance.share, "low": chance.low, "high": chance.high}


def _step(stage: StepChances) -> dict[str, Any]:
    return {
        "step": stage.step.value,
        "sampled": stage.sampled,
        "words": _chances(stage.words),
        "cleared": _chance(stage.cleared),
    }


def _finding_mapping(finding: FindingChances) -> dict[str, Any]:
    return {
        "id": finding.id,
        "step": finding.step.value,
        "sampled": finding.sampled,
        "words": _chances(finding.words),
        "unit": finding.kind.unit,
        "quantiles": [{"share": share, "value": plain(value)} for share, value in finding.quantiles.items()],
        "resolution": finding.resolution,
        "unknown": finding.unknown,
        "shares": dict(finding.shares),
        "linear": finding.linear,
    }


def tolerance_csv(answer: Tolerance) -> str:
    """Return one line a finding, comma separated, with a head line; what is not known is left empty."""
    rows = answer.rows()
    names = list(dict.fromkeys(name for row in rows for name in row))
    text = io.StringIO()
    writer = csv.DictWriter(text, names, lineterminator="\n")
    writer.writeheader()
    writer.writerows(_cells(rows))
    return text.getvalue()


def _cells(rows: Iterable[Mapping[str, Any]]) -> Iterator[dict[str, Any]]:
    for row in rows:
        yield {
            name: value if isinstance(value, str | bool | int) else plain(value)
            for name, value in row.items()
        }
