"""The first look at a user's text: length, characters, the comma before the origin."""

import re
import unicodedata
from typing import Final

from safeamp.quantities.nouns import Kind, Origin, QuantityError

LONGEST: Final = 80
"""Longest text that is looked at, in characters."""

# Same meaning, other code point. Whole-text NFKC is not safe here: it turns "10²" into "102".
_SAME: Final = str.maketrans(
    {
        "\u2212": "-",  # minus sign
        "\u2126": "\u03a9",  # ohm sign -> Greek omega
        "\u03bc": "\u00b5",  # Greek mu -> micro sign
        "\u2103": "°C",
        **dict.fromkeys("\t\u00a0\u2007\u2009\u202f", " "),
    }
)

ORIGIN_WORDS: Final = {
    "measured": Origin.MEASURED,
    "marked": Origin.MARKED,
    "data sheet": Origin.DATA_SHEET,
    "datasheet": Origin.DATA_SHEET,
    "manual": Origin.MANUAL,
    "guess": Origin.GUESS,
    "example": Origin.EXAMPLE,
}
"""The origins that a user may write."""

_COMMA: Final = re.compile(r"(?<=[0-9]) ?, ?(?=[0-9])")
_LIST_OF_ORIGINS: Final = "measured, marked, data sheet, manual, guess, example"


def quote(text: str) -> str:
    """Return `text` in quotation marks, shortened, with unprintable characters spelt out."""
    shown = "".join(c if c.isprintable() else f"\\u{ord(c):04x}" for c in text[:LONGEST])
    return f'"{shown[:40]}…"' if len(shown) > 40 else f'"{shown}"'


def such_as(kind: Kind) -> str:
    """Return what to write, with an example of the kind."""
    return f'write {kind.article}, such as "{kind.example}"'


def clean(text: str, kind: Kind) -> str:
    """Return `text` with one code point per meaning and single blanks.

    Raises
    ------
    QuantityError
        If it is empty, too long, or holds control or invisible characters.
    """
    if len(text) > LONGEST:
        raise QuantityError(f"{quote(text)} is longer than {LONGEST} characters", such_as(kind))
    mapped = text.translate(_SAME)
    for character in mapped:
        if character != " " and unicodedata.category(character)[0] in "CZ":
            name = f"U+{ord(character):04X}"
            raise QuantityError(
                f"{quote(text)} has an invisible character ({name})", f"type it anew: {such_as(kind)}"
            )
    cleaned = " ".join(mapped.split())
    if not cleaned:
        raise QuantityError(f"{quote(text)} is empty", such_as(kind))
    return cleaned


def split_origin(text: str) -> tuple[str, Origin]:
    """Return the text before the origin, and the origin (stated when there is none).

    Raises
    ------
    QuantityError
        If a comma stands in a number, or the word after it is no origin.
    """
    if _COMMA.search(text):
        raise _comma_in_number(text)
    head, comma_found, word = (part.strip() for part in text.partition(","))
    if not comma_found:
        return head, Origin.STATED
    if word in ORIGIN_WORDS:
        return head, ORIGIN_WORDS[word]
    raise _unknown_origin(text, word)


def _comma_in_number(text: str) -> QuantityError:
    found = f"{quote(text)} has a comma"
    commas = len(_COMMA.findall(text))
    if commas > 1 or "." in text or "'" in text:
        return QuantityError(found, "write decimals after a point and thousands without a mark")
    point = _COMMA.sub(".", text)
    if re.search(r"(?<![0-9])[1-9][0-9]{0,2} ?, ?[0-9]{3}(?![0-9])", text):
        # "1,500" is 1.5 in one country and 1500 in the next: both are said.
        return QuantityError(
            found, f'write "{point}" if it marks decimals, "{_COMMA.sub("", text)}" if it marks thousands'
        )
    return QuantityError(found, f'write decimals after a point: "{point}"')


def _unknown_origin(text: str, word: str) -> QuantityError:
    if word == Origin.STATED.value:
        return QuantityError(
            f'{quote(text)} ends with "stated", which is never written',
            "leave the word and its comma out when no origin is known",
        )
    if word == Origin.ASSUMED.value:
        return QuantityError(
            f'{quote(text)} ends with "assumed", which only the program fills in',
            'write "guess" for your own',
        )
    if not word:
        return QuantityError(
            f"{quote(text)} ends with a comma",
            f"write an origin after it ({_LIST_OF_ORIGINS}) or leave it out",
        )
    if re.search(r"±|\+/-|%|[0-9]\.\.[0-9]", word):
        return QuantityError(f"{quote(text)} has its tolerance after the comma", "write it before the comma")
    return QuantityError(f"{quote(word)} is not an origin", f"write one of {_LIST_OF_ORIGINS}")
