"""The JSON Schema of a result, from the nouns that a result is made of."""

from __future__ import annotations

from typing import Any, Final

from safeamp.findings import Sense, Step, Verdict
from safeamp.limits import EVIDENCE, SENSES
from safeamp.quantities import KINDS, Origin

DRAFT: Final = "https://json-schema.org/draft/2020-12/schema"
TEXT: Final = {"type": "string"}
TEXTS: Final = {"type": "array", "items": TEXT}
FLAG: Final = {"type": "boolean"}
NUMBER: Final = {"type": ["number", "null"]}
WORD: Final = {"enum": [verdict.word for verdict in Verdict]}
STEP: Final = {"enum": [step.value for step in Step]}
UNIT: Final = {"enum": sorted({kind.unit for kind in KINDS.values()} | {""})}
ZONES: Final = ("current", "power", "second breakdown", "voltage", "unknown")


def _object(properties: dict[str, Any], *, optional: tuple[str, ...] = ()) -> dict[str, Any]:
    return {
        "type": "object",
        "properties": properties,
        "required": [name for name in properties if name not in optional],
        "additionalProperties": False,
    }


def _list(items: dict[str, Any]) -> dict[str, Any]:
    return {"type": "array", "items": items}


def _by_key(value: dict[str, Any]) -> dict[str, Any]:
    return {"type": "object", "additionalProperties": value}


def _value() -> dict[str, Any]:
    unbounded = {"const": True, "description": "the value has no bound; nominal is null"}
    return _object(
        {"nominal": NUMBER, "worst": NUMBER, "unit": UNIT, "unbounded": unbounded}, optional=("unbounded",)
    )


def _limit() -> dict[str, Any]:
    senses: tuple[Sense, ...] = SENSES
    between = {"type": "array", "items": {"type": "number"}, "minItems": 2, "maxItems": 2}
    return {
        "anyOf": [
            {"type": "null"},
            _object(
                {
                    "go": {"anyOf": [NUMBER, between]},
                    "stop": NUMBER,
                    "sense": {"enum": list(senses)},
                    "unit": UNIT,
                    "source": TEXT,
                    "evidence": {"enum": [*EVIDENCE, Origin.STATED.value]},
                    "overridden": FLAG,
                }
            ),
        ]
    }


def _finding() -> dict[str, Any]:
    given = {"key": TEXT, "value": {"type": ["number", "string", "boolean", "null"]}, "unit": UNIT}
    return _object(
        {
            "id": {"type": "string", "pattern": r"^[a-z_]+\.[a-z_]+$"},
            "step": STEP,
            "verdict": WORD,
            "says": TEXT,
            "value": _value(),
            "also": _list(_object({"at": TEXT, "value": NUMBER, "unit": UNIT})),
            "limit": _limit(),
            "worst_case": _by_key(NUMBER),
            "at": {
                **_by_key({"type": ["number", "string", "null"]}),
                "properties": {"zone": {"enum": list(ZONES)}},
            },
            "inputs": _list(_object({**given, "origin": {"enum": [one.value for one in Origin]}})),
            "needs": TEXTS,
            "next": TEXT,
            "method": TEXT,
            "because": TEXTS,
            "overturned_by": TEXT,
            "explanation": TEXT,
            "to_be_read": FLAG,
            "working": _list(_working_line()),
        },
        optional=("working",),
    )


def _working_line() -> dict[str, Any]:
    words = dict.fromkeys(("symbol", "words", "origin", "formula", "put_in"), TEXT)
    return _object({**words, "value": NUMBER, "unit": UNIT})


def result_schema() -> dict[str, Any]:
    """Return the JSON Schema of what a check prints as JSON."""
    schema = _object(
        {
            "safeamp": {**TEXT, "description": "version of the program"},
            "title": TEXT,
            "scope": {**TEXT, "description": "for what the verdict holds"},
            "verdict": WORD,
            "steps": _list(
                _object({"step": STEP, "verdict": {"enum": [*WORD["enum"], None]}, "reached": FLAG})
            ),
            "findings": _list(_finding()),
            "not_applicable": _list(_object({"id": TEXT, "because": TEXT})),
            "assumptions": _list(_object({"key": TEXT, "value": TEXT, "why": TEXT})),
            "safety": TEXTS,
            "remarks": TEXTS,
            "unassessed": _by_key(TEXTS),
            "overridden": TEXTS,
            "still_to_read": TEXTS,
            "on_paper": FLAG,
            "up_to": {"enum": [*STEP["enum"], None]},
            "demo": FLAG,
            "sheet": _object({"source": TEXT, "sha256": TEXT}),
        }
    )
    return {"$schema": DRAFT, "title": "What safeamp finds of one sheet", **schema}
