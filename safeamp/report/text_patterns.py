"""Patterns of the texts that a sheet holds, for editors; what the reader refuses besides, it says itself."""

from __future__ import annotations

import re
from typing import Final

from safeamp.quantities import Kind, Origin

_SIGN: Final = "[+\\-\u2212]"
_UNSIGNED: Final = r"([0-9]+(\.[0-9]+)?|\.[0-9]+)([eE][+-]?[0-9]{1,3})?"
_NUMBER: Final = rf"{_SIGN}?{_UNSIGNED}"
_TOLERANCE: Final = (
    rf"(\s*((±|\+/{_SIGN})\s*{_UNSIGNED}|{_SIGN}{_UNSIGNED}\s*/\s*{_SIGN}{_UNSIGNED})\s*[^,]*)?"
)
_WORDS: Final = "|".join(
    ["datasheet", *(one.value for one in Origin if one not in (Origin.STATED, Origin.ASSUMED))]
)
_ORIGIN: Final = rf"(\s*,\s*({_WORDS}))?"
_CODE: Final = {
    "resistance": r"[0-9]{0,6}[RkKM][0-9]{0,4}(\s?[FGJKM])?",
    "capacitance": "[0-9]{0,6}[unp\u00b5\u03bc][0-9]{0,4}([ ]?[FGJKM])?",
}
#: The same sign under another code point.
_SAME: Final = {"\u03a9": "[\u03a9\u2126]", "\u00b5": "[\u00b5\u03bc]"}

FUSE: Final = r"^[A-Za-z \-]*[0-9.]+\s*m?A.*$"
LIMITER: Final = (
    rf"^\s*([Bb]ench( supply)?|.*[Ll]amp.*|({_NUMBER}\s*(ohm|Ω|R|kohm)|{_CODE['resistance']}){_ORIGIN})\s*$"
)


def text_pattern(kinds: tuple[Kind, ...]) -> str:
    """Return a pattern that every text matches which is read as one of the kinds."""
    return rf"^\s*({'|'.join(_value(kind) for kind in kinds)}){_TOLERANCE}{_ORIGIN}\s*$"


def _value(kind: Kind) -> str:
    units = sorted(kind.spellings, key=len, reverse=True)
    unit = "|".join(_unit(spelling) for spelling in units)
    value = rf"{_NUMBER}(\s*\.\.\s*{_NUMBER})?\s*({unit})"
    return f"{value}|{_CODE[kind.name]}" if kind.iec60062 else value


def _unit(spelling: str) -> str:
    escaped = re.escape(spelling).replace("\\ ", r"\s*").replace("\\-", "-")
    for letter, either in _SAME.items():
        escaped = escaped.replace(letter, either)
    return escaped.replace("°C", "(°C|℃)")
