"""JSON Schemas, from the nouns: of the sheet, for editors that complete and check it, and of the result."""

from __future__ import annotations

import json
from collections.abc import Callable, Mapping
from typing import Any, Final

from safeamp.amplifier import Key
from safeamp.limits import nearest
from safeamp.quantities import RATIO
from safeamp.report.keys import form_text, tables
from safeamp.report.result_schema import result_schema
from safeamp.report.text_patterns import FUSE, LIMITER, text_pattern

#: Tables that every sheet has.
REQUIRED: Final = ("supply", "stage", "heatsink", "loudspeaker")
DRAFT: Final = "https://json-schema.org/draft/2020-12/schema"
_FORMS: Final[Mapping[str, dict[str, Any]]] = {
    "fuse": {"type": "string", "pattern": FUSE, "examples": ["T 2 A", "T2AL250V"]},
    "limiter": {"type": "string", "pattern": LIMITER, "examples": ["60 W lamp", "22 ohm", "bench"]},
    "file": {"type": "string", "minLength": 1, "examples": ["curve.csv"]},
}


def sheet_schema() -> dict[str, Any]:
    """Return the JSON Schema of a sheet; keys and tables that are not known fail."""
    found = tables()
    top = found.pop("top")
    schema = {"$schema": DRAFT, "title": "One channel of one amplifier", **_table(top)}
    for path, keys in found.items():
        *outer, name = path.split(".")
        holder = schema
        for part in outer:
            holder = holder["properties"][part]
        holder["properties"][name] = _devices(keys) if path == "device" else _table(keys)
    schema["properties"]["sheet_version"]["enum"] = [1]
    schema["required"] += list(REQUIRED)
    return schema


def _devices(keys: Mapping[str, Key]) -> dict[str, Any]:
    return {
        "type": "object",
        "description": "devices by name, as stage.upper, stage.lower and stage.drivers call them",
        "additionalProperties": _table(keys),
    }


def _table(keys: Mapping[str, Key]) -> dict[str, Any]:
    return {
        "type": "object",
        "properties": {name: _key(key) for name, key in keys.items()},
        "required": [name for name, key in keys.items() if key.required],
        "additionalProperties": False,
    }


def _key(key: Key) -> dict[str, Any]:
    """Return the schema of one key: what it is, how it is written, what may stand there."""
    symbol = f" ({key.symbol})" if key.symbol else ""
    left_out = f"; when left out: {key.default}" if key.default else ""
    found = {"description": f"{key.help}{symbol}; {form_text(key)}{left_out}"}
    forms = [_shaped(key), *([{"const": "none"}] if key.none else [])]
    return {**found, **forms[0]} if len(forms) == 1 else {**found, "anyOf": forms}


def _shaped(key: Key) -> dict[str, Any]:
    if key.shape == "points":
        return _list_of(_pair(key, 0))
    if key.shape == "curves":
        duration = _quantity(Key(help="", kinds=key.kinds[:1]))
        return _list_of({"type": "array", "prefixItems": [duration], "items": _pair(key, 1), "minItems": 2})
    one = _one(key)
    return {"anyOf": [one, _list_of(one)]} if key.shape == "list" else one


def _list_of(items: dict[str, Any]) -> dict[str, Any]:
    return {"type": "array", "items": items, "minItems": 1}


def _pair(key: Key, first: int) -> dict[str, Any]:
    pair = [_quantity(Key(help="", kinds=(kind,))) for kind in key.kinds[first : first + 2]]
    return {"type": "array", "prefixItems": pair, "minItems": 2, "maxItems": 2}


def _one(key: Key) -> dict[str, Any]:
    if key.flag:
        return {"type": "boolean"}
    if key.choices:
        return {"type": "string", "enum": list(key.choices)}
    if key.special:
        return dict(_FORMS[key.special])
    return _quantity(key) if key.kinds else {"type": "string", "minLength": 1}


def _quantity(key: Key) -> dict[str, Any]:
    if key.whole:
        return {"type": "integer", "minimum": 1}
    text = {"type": "string", "pattern": text_pattern(key.kinds)}
    if key.kinds == (RATIO,):
        return {"anyOf": [{"type": "number", "examples": [float(RATIO.example)]}, text]}
    return {**text, "examples": [f"{kind.example}, measured" for kind in key.kinds]}


SCHEMAS: Final[Mapping[str, Callable[[], dict[str, Any]]]] = {
    "sheet": sheet_schema,
    "result": result_schema,
}


def render_schema(what: str) -> str:
    """Return one of the JSON Schemas as text that ends with a line feed.

    Raises
    ------
    KeyError
        If there is no such schema; the text names those there are.
    """
    if what not in SCHEMAS:
        raise KeyError(f"{what} has no schema{nearest(what, SCHEMAS)}; there are {' and '.join(SCHEMAS)}")
    return json.dumps(SCHEMAS[what](), indent=2, ensure_ascii=False) + "\n"
