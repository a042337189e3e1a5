"""Codes printed on resistors and capacitors: 4R7, 4k7, 2u2, 100n, with a tolerance letter after them.

References
----------
IEC 60062, Marking codes for resistors and capacitors.
"""

import re
from decimal import Decimal
from typing import Final

from safeamp.quantities.nouns import Kind

LETTER_PERCENT: Final = {
    "F": Decimal(1),
    "G": Decimal(2),
    "J": Decimal(5),
    "K": Decimal(10),
    "M": Decimal(20),
}
"""Tolerance letter -> percent."""

MULTIPLIER: Final = {
    "resistance": {"R": "ohm", "k": "kohm", "K": "kohm", "M": "Mohm"},
    "capacitance": {"u": "uF", "µ": "uF", "n": "nF", "p": "pF"},
}
"""Kind -> letter of the code -> spelling of the unit it stands for."""
_CODE: Final = r"([0-9]{0,6})([RkKMunpµ])([0-9]{0,4})(?: ?([FGJKM]))?(?= ?±| ?[+-]|$)"
LOOKS_LIKE_CODE: Final = (
    r"([0-9]{1,6}[RrkKMmunpµVv][0-9]{1,4}|R[0-9]{1,4}|[0-9]{1,6}[kKMunpµR])[FGJKM]?(?= |$)"
)
"""Pattern of what a user may have meant as a code."""


def match_code(text: str, kind: Kind) -> tuple[Decimal, str, Decimal | None, int] | None:
    """Return number, spelling of its unit, percent of the letter, and length of a code, if one leads `text`.

    Parameters
    ----------
    text : str
        Cleaned text.
    kind : Kind
        Codes are read for resistance and capacitance only.
    """
    found = re.match(_CODE, text) if kind.iec60062 else None
    if not found:
        return None
    whole, multiplier, part, letter = found.groups()
    spelling = MULTIPLIER[kind.name].get(multiplier)
    if spelling is None or not whole + part:
        return None
    if not part and f"{multiplier}{letter or ''}" in kind.spellings:
        return None  # "100nF" is a number with its unit
    percent = LETTER_PERCENT[letter] if letter else None
    return Decimal(f"{whole or 0}.{part or 0}"), spelling, percent, found.end()
