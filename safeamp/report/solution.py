"""The answer to "at which value of this key?" as text and as JSON."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import Any

from safeamp._version import __version__
from safeamp.amplifier import written_key
from safeamp.answers import Edge, Forbidding, Interval, Solution
from safeamp.findings import Finding, Verdict
from safeamp.quantities import show
from safeamp.report.amounts import place_text
from safeamp.report.json_ import plain
from safeamp.report.layout import block, paragraph, points
from safeamp.report.safety import SAFETY

#: A value is printed with all the digits that it was judged with.
DIGITS = 9
CLEARS_NOTHING = "This clears no step: write the value into the sheet and check it."


def render_solution(solution: Solution, *, width: int = 80) -> str:
    """Return the answer as text: what will do first, then what ends it, at the end what was asked."""
    lines = [f"safeamp {__version__}", *paragraph(solution.title, width)]
    if solution.source:
        lines += paragraph(f"sheet {solution.source}, SHA-256 {solution.digest[:16]}", width)
    lines += ["", *_answer(solution, width)]
    if solution.otherwise is not None:
        head = "Without these findings, and so clearing nothing of them:"
        lines += ["", *paragraph(head, width), *_answer(solution.otherwise, width)]
    return "\n".join([*lines, "", *paragraph(CLEARS_NOTHING, width)]) + "\n"


def _answer(solution: Solution, width: int) -> Iterator[str]:
    yield from paragraph(f"{solution.key}: {_says(solution)}{_now(solution)}", width)
    if solution.outcome == "unread":
        return
    if solution.items > 1:
        text = f"all {solution.items} items move together, in proportion: the largest is told; one alone: "
        yield from paragraph(f"{text}{solution.key}.0 to .{solution.items - 1}", width, "  ", "    ")
    for interval in solution.intervals:
        for side, edge in (("below", interval.smallest), ("above", interval.largest)):
            if edge is not None:
                yield from _edge(solution, edge, side, width)
    yield from points((_forbids(solution, item) for item in solution.forbidden), width)
    if solution.forbidden and solution.until is Verdict.GO and _only_cautions(solution):
        yield from paragraph("--until caution asks for what clears with care.", width, "  ")
    yield from block("Asked for", _asked(solution, width))


def _only_cautions(solution: Solution) -> bool:
    return all(item.finding.verdict is Verdict.CAUTION for item in solution.forbidden)


def _says(solution: Solution) -> str:
    if solution.outcome == "unread":
        return "no finding reads it, so no value of it changes a verdict"
    if solution.outcome == "none":
        return "no value will do"
    texts = [_interval(solution, interval) for interval in solution.intervals]
    return f"{', or '.join(texts)}"


def _interval(solution: Solution, interval: Interval) -> str:
    low, high = (None if edge is None else _number(solution, edge.value) for edge in _ends(interval))
    if low is not None and high is not None:
        return f"only {low}" if low == high else f"from {low} to {high}"
    if high is not None:
        return f"at most {high}"
    if low is not None:
        return f"at least {low}"
    return f"any value from {_number(solution, solution.span[0])} to {_number(solution, solution.span[1])}"


def _ends(interval: Interval) -> tuple[Edge | None, Edge | None]:
    return interval.smallest, interval.largest


def _now(solution: Solution) -> str:
    if solution.now is None:
        return " (not in the sheet)"
    has = "the sheet has" if solution.written else "not in the sheet, which takes"
    text = f" ({has} {_number(solution, solution.now)}"
    if solution.outcome == "unread":
        return f"{text})"
    return f"{text}, which {'holds' if solution.now_holds else 'does not hold'})"


def _number(solution: Solution, value: float) -> str:
    return show(value, solution.kind, DIGITS)


def _edge(solution: Solution, edge: Edge, side: str, width: int) -> Iterator[str]:
    value = _number(solution, edge.value)
    for text in _reasons(edge):
        yield from paragraph(f"{side} {value}: {text}", width, "  ", "    ")
    if edge.preferred is not None:
        text = f"next preferred value: {_number(solution, edge.preferred)} ({edge.series}), judged in full"
        yield from paragraph(text, width, "  ", "    ")
    elif edge.series:
        yield from paragraph(f"no preferred value ({edge.series}) lies inside", width, "  ", "    ")
    if edge.beyond == 0.0 and edge.value:
        text = f"between 0 and {value} nothing was tried: no smaller value is told from zero"
        yield from paragraph(text, width, "  ", "    ")
    text = f"in the sheet: {_name(solution.key)} = {edge.written}"
    yield from paragraph(f"{text}; the whole sheet is then {edge.verdict.word}", width, "  ", "    ")


def _name(path: str) -> str:
    """Return the name that stands in the sheet; an item is written with its list."""
    head, _, tail = path.rpartition(".")
    return _name(head) if tail.isdigit() else tail


def _reasons(edge: Edge) -> list[str]:
    if edge.refused:
        return [f"the sheet is refused: {edge.refused}"]
    return [f"{finding.id} becomes {finding.verdict.word}{_why(finding)}" for finding in edge.binds]


def _why(finding: Finding) -> str:
    corner = place_text(finding)
    where = f", worst case at {corner}" if corner else ""
    because = "; ".join(finding.because)
    return f"{where}{f' ({because})' if because else ''}"


def _forbids(solution: Solution, item: Forbidding) -> str:
    finding = item.finding
    if item.holds is not None:
        low, high = (_number(solution, value) for value in item.holds)
        return f"{finding.id} holds for some values from {low} to {high} only, and then others do not"
    keys = ", ".join(dict.fromkeys(written_key(key) for key in finding.needs))
    settle = f"; to settle it, give {keys}" if keys else ""
    because = "; ".join(finding.because) or finding.says
    at = f"at {_number(solution, item.at)} {finding.verdict.word}: {because}"
    return f"{finding.id} is never {solution.until.word}; {at}{settle}"


def _asked(solution: Solution, width: int) -> list[str]:
    low, high = (_number(solution, value) for value in solution.span)
    word = "go" if solution.until is Verdict.GO else f"{solution.until.word} or better"
    paper = "; on paper, without what is read at the bench" if solution.on_paper else ""
    asked = f"{word}, at the worst corner too, of {', '.join(solution.findings)}{paper}"
    return points((asked, f"{solution.tried} values tried from {low} to {high}{_refused(solution)}"), width)


def _refused(solution: Solution) -> str:
    """Say how many values the sheet refused, and why most of them where no value will do."""
    if not solution.refused:
        return ""
    reason = f", most often: {solution.refusal}" if solution.outcome == "none" else ""
    return f"; {solution.refused} of them the sheet cannot have{reason}"


def solution_json(solution: Solution) -> str:
    """Return the answer as a JSON text that ends with a line feed; never nan or infinity."""
    whole = {"safeamp": __version__, "command": "solve", **_mapping(solution), "safety": list(SAFETY)}
    return json.dumps(whole, indent=2, allow_nan=False) + "\n"


def _mapping(solution: Solution) -> dict[str, Any]:
    return {
        "title": solution.title,
        "key": solution.key,
        "unit": solution.kind.unit,
        "outcome": solution.outcome,
        "results": _results(solution),
        "now": plain(solution.now),
        "now_holds": solution.now_holds,
        "written": solution.written,
        "items": solution.items,
        "until": solution.until.word,
        "findings": list(solution.findings),
        "intervals": [
            {"smallest": _edge_json(one.smallest), "largest": _edge_json(one.largest)}
            for one in solution.intervals
        ],
        "forbidden_by": [_forbidding_json(item) for item in solution.forbidden],
        "otherwise": None if solution.otherwise is None else _mapping(solution.otherwise),
        "span": list(solution.span),
        "tried": solution.tried,
        "refused": {"count": solution.refused, "most_often": solution.refusal},
        "on_paper": solution.on_paper,
        "sheet": {"source": solution.source, "sha256": solution.digest},
    }


def _results(solution: Solution) -> dict[str, Any]:
    """Return the ends as the quick commands print theirs; only one interval has such names."""
    if len(solution.intervals) != 1:
        return {}
    one, found = solution.intervals[0], {}
    for name, edge in (("smallest", one.smallest), ("largest", one.largest)):
        if edge is not None:
            found[name] = edge.value
            if edge.preferred is not None:
                found[f"{name}_preferred"] = edge.preferred
    return {name: {"value": value, "unit": solution.kind.unit} for name, value in found.items()}


def _edge_json(edge: Edge | None) -> dict[str, Any] | None:
    if edge is None:
        return None
    return {
        "value": edge.value,
        "written": edge.written,
        "preferred": edge.preferred,
        "series": edge.series,
        "verdict": edge.verdict.word,
        "beyond": edge.beyond,
        "refused": edge.refused,
        "binds": [_finding_json(finding) for finding in edge.binds],
    }


def _finding_json(finding: Finding) -> dict[str, Any]:
    return {
        "id": finding.id,
        "verdict": finding.verdict.word,
        "because": list(finding.because),
        "worst_case": {key: plain(value) for key, value in finding.worst_case.items()},
        "needs": list(finding.needs),
    }


def _forbidding_json(item: Forbidding) -> dict[str, Any]:
    return {
        **_finding_json(item.finding),
        "at": item.at,
        "holds": None if item.holds is None else list(item.holds),
    }
