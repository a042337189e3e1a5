"""Starter sheets: every key of the nouns with its meaning, an invented value and the origin `example`."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from safeamp.amplifier import Key
from safeamp.limits import nearest
from safeamp.quantities import RATIO
from safeamp.report.keys import form_text, tables
from safeamp.report.layout import paragraph
from safeamp.report.starter_values import COMMENTED, DRIVER, EXAMPLES, STARTERS, Starter

_ORIGIN = "example"
_HEAD = (
    (
        "Replace every value by your own and write where it comes from in place of the word example: "
        "measured, marked (printed on part or plate), data sheet, manual, guess. What you do not know, "
        "leave out or put a # before it; never invent it. While a value says example, nothing that reads "
        "it can be go."
    ),
    "safeamp keys says how values are written. Keys marked with a star must be there.",
)


def render_starter(kind: str, *, width: int = 100) -> str:
    """Return a commented starter sheet as TOML text.

    Raises
    ------
    KeyError
        If the kind is not known; the text names the kinds.
    """
    name = "-".join(kind.lower().replace("-", " ").split())
    if name not in STARTERS:
        words = ", ".join(STARTERS)
        raise KeyError(f"{kind} is not a kind of starter{nearest(name, STARTERS)}; the kinds are {words}")
    starter = STARTERS[name]
    values = {**EXAMPLES, "title": starter.title, **starter.values}
    lines = [line for text in _HEAD for line in paragraph(text, width, "# ", "# ")]
    for table, keys in tables().items():
        lines += _table(table, keys, values, starter, width)
    if not _is_comment("stage.drivers", starter):
        lines += [
            "",
            "[device.driver]",
            *(_line(key, DRIVER[key], tables()["device"][key]) for key in DRIVER),
        ]
    return "\n".join(lines) + "\n"


def _table(
    table: str, keys: Mapping[str, Key], values: Mapping[str, Any], starter: Starter, width: int
) -> list[str]:
    prefix = "" if table == "top" else f"{table}."
    commented = {name: _is_comment(prefix + name, starter) for name in keys}
    mark = "# " if all(commented.values()) else ""
    lines = [""] if table == "top" else ["", f"{mark}[{'device.fitted' if table == 'device' else table}]"]
    for name, key in keys.items():
        lines += _comment(name, key, width)
        value = values.get(prefix + name, _fallback(key))
        lines.append(("# " if commented[name] else "") + _line(name, value, key))
    return lines


def _is_comment(path: str, starter: Starter) -> bool:
    paths = {path, path.rpartition(".")[0], path.partition(".")[0]}
    return path not in starter.values and not paths.isdisjoint(COMMENTED | starter.left_out)


def _comment(name: str, key: Key, width: int) -> list[str]:
    star = "* " if key.required else ""
    default = f"; when left out: {key.default}" if key.default else ""
    symbol = f" ({key.symbol})" if key.symbol else ""
    return paragraph(f"{star}{name}{symbol}: {key.help}; {form_text(key)}{default}", width, "# ", "#   ")


def _fallback(key: Key) -> Any:
    if key.flag:
        return True
    if key.whole or key.kinds == (RATIO,):
        return 1
    examples = [kind.example for kind in key.kinds]
    return (key.choices or (key.default,) if not examples else (examples[0],))[0]


def _line(name: str, value: Any, key: Key) -> str:
    quantity = bool(key.kinds) and key.shape in ("one", "list")
    origin = f", {_ORIGIN}" if (quantity or key.special == "fuse") and value != "none" else ""
    return f"{name} = {_toml(value, origin)}"


def _toml(value: Any, origin: str) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, str):
        return f'"{value}{origin}"'
    if isinstance(value, Iterable):
        return f"[{', '.join(_toml(item, origin) for item in value)}]"
    return str(value)
