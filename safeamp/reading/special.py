"""Keys with a form of their own: a fuse, a limiter, a file beside the sheet."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path
from typing import Any

from safeamp.amplifier import Curve, Fuse, Limiter
from safeamp.quantities import CURRENT, POWER, RESISTANCE, Kind, Origin, QuantityError, Reading, read
from safeamp.reading.draft import Draft

#: Letters of IEC 60127 and the words that the standard gives them.
LETTERS = {
    "ff": "FF", "very quick": "FF", "very quick acting": "FF",
    "f": "F", "quick": "F", "quick acting": "F",
    "m": "M", "medium": "M", "medium time lag": "M",
    "t": "T", "time lag": "T",
    "tt": "TT", "long time lag": "TT",
}  # fmt: skip

_FUSE = (
    r"(?P<letter>[A-Za-z -]*?)\s*(?P<rating>[\d.,]+\s*m?A)\s*"
    r"(?P<capacity>[LHE])?\s*(?:/?\s*(?P<volts>\d{2,3})\s*V)?\s*(?:,(?P<origin>[^,]*))?"
)
_LAMP = r"(?:lamp\s*)?(?P<watts>[^,]*?W)\s*(?:lamp\s*)?(?P<rest>,.*)?"
_FUSE_FORM = 'write letter and rating, such as "T 2 A", or the imprint, such as "T2AL250V"'
_LIMITER_FORM = 'write "60 W lamp", "22 ohm" or "bench"'


def fuse(text: str, _: Draft) -> tuple[Fuse, Origin]:
    """Return a fuse from its letter and rating or its imprint.

    References
    ----------
    IEC 60127-2: letters of the time characteristics and of the breaking capacity; preferred ratings lie within
    0.03 A to 63 A.
    """
    found = re.fullmatch(_FUSE, text.strip())
    if found is None:
        raise QuantityError(f'"{text}" is not read as a fuse', _FUSE_FORM)
    word = " ".join(found["letter"].lower().replace("-", " ").split())
    rating = found["rating"].strip()
    if word not in LETTERS:
        letter = f'"{found["letter"]}" is not a letter' if word else "there is no letter"
        raise QuantityError(
            f'"{text}" is not read as a fuse: {letter} of its time characteristic',
            f'write FF, F, M, T or TT before the rating, such as "T {rating}"',
        )
    origin = f", {found['origin'].strip()}" if found["origin"] else ""
    reading = _read_off(text, rating + origin, CURRENT, (0.03, 63.0))
    volts = float(found["volts"]) if found["volts"] else None
    imprint = (found["capacity"] or "", volts)
    return Fuse(LETTERS[word], reading.nominal, _without_origin(text), *imprint), reading.origin


def _without_origin(text: str) -> str:
    """Return a text without the word behind it that says where it comes from: the report says that beside it."""
    said, _, last = text.rpartition(",")
    origins = {one.value for one in Origin}
    word = " ".join(last.lower().replace("-", " ").split())
    return said.strip() if said and word in origins else text.strip()


def limiter(text: str, _: Draft) -> tuple[Limiter, Origin]:
    """Return what limits the current at the first power-up."""
    plain = text.strip()
    if plain.lower() in ("bench", "bench supply"):
        return Limiter("bench", None, text), Origin.STATED
    lamp = re.fullmatch(_LAMP, plain, re.IGNORECASE)
    if lamp is not None and "lamp" in plain.lower():
        reading = _read_off(text, lamp["watts"] + (lamp["rest"] or ""), POWER, (1.0, 2000.0))
        return Limiter("lamp", reading.nominal, _without_origin(text)), reading.origin
    try:
        reading = _read_off(text, plain, RESISTANCE, (1.0, 100e3))
    except QuantityError as trouble:
        raise QuantityError(trouble.found, _LIMITER_FORM) from trouble
    return Limiter("resistor", reading.nominal, _without_origin(text)), reading.origin


def curve(text: str, draft: Draft) -> tuple[Curve | None, Origin]:
    """Return the curve of a file, relative to the sheet, that must be there."""
    from safeamp.reading.curves import read_curve  # few sheets have one, and every start would wait for it

    try:
        there = (Path(draft.folder) / text).is_file()
    except (OSError, ValueError):
        there = False
    if not text.strip() or not there:
        raise QuantityError(
            f'"{text}" is not a file beside the sheet', "write its name relative to the sheet"
        )
    return read_curve(Path(draft.folder) / text, text, draft), Origin.STATED


def _read_off(text: str, value: str, kind: Kind, believable: tuple[float, float]) -> Reading:
    reading = read(value, kind, believable=believable)
    if reading.toleranced:
        raise QuantityError(f'"{text}" has a tolerance or is a guess', "write what is printed on the part")
    return reading


#: How each special form is read: text -> value and origin.
FORMS: dict[str, Callable[[str, Draft], tuple[Any, Origin]]] = {
    "fuse": fuse,
    "limiter": limiter,
    "file": curve,
}
