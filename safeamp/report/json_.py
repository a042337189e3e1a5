"""A report as JSON: SI numbers, degC and deg, null for what is not known."""

from __future__ import annotations

import json
import math
from collections.abc import Mapping
from typing import Any

from safeamp._version import __version__
from safeamp.answers import Report, StepVerdict, Working
from safeamp.findings import Bound, Finding
from safeamp.report.safety import SAFETY
from safeamp.report.working import NO_WORKINGS, line_mapping


def as_json(report: Report, workings: Mapping[str, Working] = NO_WORKINGS) -> str:
    """Return the report as a JSON text that ends with a line feed; never nan or infinity."""
    return json.dumps(as_mapping(report, workings), indent=2, allow_nan=False) + "\n"


def as_mapping(report: Report, workings: Mapping[str, Working] = NO_WORKINGS) -> dict[str, Any]:
    """Return the report as nested dicts and lists of text, finite numbers, flags and None.

    A finding that is explained has its calculation besides, under "working".
    """
    return {
        "safeamp": __version__,
        "title": report.title,
        "scope": report.scope,
        "verdict": report.verdict.word,
        "steps": [_step(entry) for entry in report.steps],
        "findings": [_explained(finding, workings.get(finding.id)) for finding in report.findings],
        "not_applicable": [{"id": entry.id, "because": entry.because} for entry in report.not_applicable],
        "assumptions": [
            {"key": entry.key, "value": entry.value, "why": entry.why} for entry in report.assumptions
        ],
        "safety": list(SAFETY),
        "remarks": list(report.remarks),
        "unassessed": {key: list(ids) for key, ids in report.unassessed.items()},
        "overridden": list(report.overridden),
        "still_to_read": list(report.still_to_read),
        "on_paper": report.on_paper,
        "up_to": None if report.up_to is None else report.up_to.value,
        "demo": report.demo,
        "sheet": {"source": report.source, "sha256": report.digest},
    }


def _step(entry: StepVerdict) -> dict[str, Any]:
    word = None if entry.verdict is None else entry.verdict.word
    return {"step": entry.step.value, "verdict": word, "reached": entry.reached}


def _explained(finding: Finding, working: Working | None) -> dict[str, Any]:
    found = finding_mapping(finding)
    return found if working is None else {**found, "working": [line_mapping(one) for one in working.lines]}


def finding_mapping(finding: Finding) -> dict[str, Any]:
    """Return one finding as a dict."""
    return {
        "id": finding.id,
        "step": finding.step.value,
        "verdict": finding.verdict.word,
        "says": finding.says,
        "value": _value(finding),
        "also": [
            {"at": item.at, "value": plain(item.value), "unit": item.kind.unit} for item in finding.also
        ],
        "limit": None if finding.bound is None else _limit(finding.bound, finding.kind.unit),
        "worst_case": {key: plain(value) for key, value in finding.worst_case.items()},
        "at": {key: plain(value) for key, value in finding.at.items()},
        "inputs": [
            {"key": item.key, "value": plain(item.value), "unit": item.unit, "origin": item.origin.value}
            for item in finding.inputs
        ],
        "needs": list(finding.needs),
        "next": finding.next,
        "method": finding.method,
        "because": list(finding.because),
        "overturned_by": finding.overturned_by,
        "explanation": finding.explanation,
        "to_be_read": finding.to_be_read,
    }


def _value(finding: Finding) -> dict[str, Any]:
    unbounded = finding.unbounded or any(
        value is not None and math.isinf(value) for value in (finding.nominal, finding.worst)
    )
    value = {
        "nominal": plain(finding.nominal),
        "worst": plain(finding.worst),
        "unit": finding.kind.unit,
    }
    return {**value, "unbounded": True} if unbounded else value


def _limit(bound: Bound, unit: str) -> dict[str, Any]:
    go = [plain(level) for level in bound.go] if isinstance(bound.go, tuple) else plain(bound.go)
    return {
        "go": go,
        "stop": plain(bound.stop),
        "sense": bound.sense,
        "unit": unit,
        "source": bound.source,
        "evidence": bound.evidence,
        "overridden": bound.overridden,
    }


def plain(value: Any) -> str | bool | float | None:
    """Return words and flags as they are, finite numbers as floats, all else as None.

    Raises
    ------
    TypeError
        If the value is neither a text nor a flag nor one number.
    """
    if value is None or isinstance(value, str | bool):
        return value
    number = float(value)
    return number if math.isfinite(number) else None
