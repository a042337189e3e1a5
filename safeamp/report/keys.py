"""What can be written in a sheet, key by key, straight from the nouns."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import fields, is_dataclass
from typing import Any, Final

from safeamp.amplifier import TABLES, Key, keys_of
from safeamp.limits import nearest, plain
from safeamp.quantities import KINDS, RATIO, Origin
from safeamp.report.layout import paragraph

TOP: Final[Mapping[str, Key]] = {
    "title": Key(help="which amplifier and which channel", required=True),
    "notes": Key(help="anything to remember"),
    "sheet_version": Key(help="version of these keys, 1", kinds=(RATIO,), whole=True, default="1"),
}
POINTS: Final = {
    "points": "list of pairs",
    "curves": "list of curves, each a duration and its points",
}
SPECIAL: Final = {
    "fuse": "letter and rating of a fuse (FF, F, M, T, TT), or its imprint",
    "limiter": "lamp, resistor or bench supply",
    "file": "name of a file, beside the sheet",
}
WRITTEN_ORIGINS: Final = tuple(
    origin.value for origin in Origin if origin not in (Origin.STATED, Origin.ASSUMED)
)
STARRED: Final = "Keys with a star must be there."
_VALUES: Final = (
    (
        "A value with a unit is a text: number, unit, tolerance if known, origin if known, such as "
        '"35.2 V ±2 %, measured".'
    ),
    (
        "Tolerances: ±10 % or +/-10 %; -20/+50 %; ±2 V; a range 31..35 V, whose middle is the nominal "
        "value. Temperatures take them in K only."
    ),
    (
        "Resistances and capacitances may be codes such as 4R7, 0R33, 4k7, 2u2, 100n, with a tolerance "
        "letter F G J K M behind them."
    ),
    (
        f"Origins: {', '.join(WRITTEN_ORIGINS)}. Without one the value counts as stated. A guess without "
        "tolerance is widened by 25 %, temperatures by 10 K, angles by 15 deg. A value of origin example "
        "leaves every finding that reads it unverified."
    ),
    'Where a part is not fitted, write "none" if its key allows it.',
)


def tables() -> dict[str, Mapping[str, Key]]:
    """Return table -> name -> Key in the order of the sheet; the keys outside any table stand under "top"."""
    found: dict[str, Mapping[str, Key]] = {"top": dict(TOP)}
    for name, noun in TABLES.items():
        found[name] = keys_of(noun)
        found |= {f"{name}.{inner}": keys_of(table) for inner, table in _inner(noun).items()}
    return found


def _inner(noun: Any) -> dict[str, Any]:
    return {item.name: item.default_factory for item in fields(noun) if is_dataclass(item.default_factory)}


def form_text(key: Key) -> str:
    """Return how the value of a key is written, such as "voltage, or a list of them"."""
    if key.flag:
        form = "true or false"
    elif key.choices:
        form = "one of " + ", ".join(f'"{choice}"' for choice in key.choices)
    elif key.special:
        form = SPECIAL[key.special]
    elif key.kinds:
        form = _quantity_form(key)
    else:
        form = "list of names" if key.shape == "list" else "text"
    return form + (', or "none"' if key.none else "")


def _quantity_form(key: Key) -> str:
    if key.whole:
        return "whole number"
    if key.shape in POINTS:
        return f"{POINTS[key.shape]} of {' and '.join(kind.name for kind in key.kinds)}"
    form = " or ".join("number without unit" if kind == RATIO else kind.name for kind in key.kinds)
    return f"{form}, or a list of them" if key.shape == "list" else form


def render_keys(table: str | None = None, *, width: int = 80) -> str:
    """Return the keys of one table, or of all with the units and forms of values.

    Raises
    ------
    KeyError
        If the table is not known; the text names the nearest.
    """
    known = tables()
    if table is None:
        lines = [
            STARRED,
            *_values(width),
            *(line for name in known for line in _table(name, known[name], width)),
        ]
        return "\n".join(lines) + "\n"
    name = {_plain(entry): entry for entry in known}.get(_plain(table))
    if name is None:
        raise KeyError(f"{table} is not a table of the sheet{nearest(table, known)}")
    return "\n".join([STARRED, *_table(name, known[name], width)]) + "\n"


def _plain(table: str) -> str:
    return plain(table.strip("[]").replace("_", " ")).removesuffix(".name")


def _table(name: str, keys: Mapping[str, Key], width: int) -> list[str]:
    title = {"top": "Before any table", "device": "[device.NAME]"}.get(name, f"[{name}]")
    lines = ["", title]
    for key_name, key in keys.items():
        lines += paragraph(
            f"{key_name}{' *' if key.required else ''}: {form_text(key)}", width, "  ", "      "
        )
        for text in _said(key):
            lines += paragraph(text, width, "      ")
    return lines


def _said(key: Key) -> Iterator[str]:
    yield key.help + (f" ({key.symbol})" if key.symbol else "")
    if key.default:
        yield f"when left out: {key.default}" + (f", assumed: {key.why}" if key.why else "")


def _values(width: int) -> Iterator[str]:
    for text in _VALUES:
        yield from paragraph(text, width)
    yield from ("", "Units")
    for kind in KINDS.values():
        units = " ".join(unit for unit in kind.spellings if unit)
        if units:
            yield from paragraph(f"{kind.name}: {units}", width, "  ", "      ")
