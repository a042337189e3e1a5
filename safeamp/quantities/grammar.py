"""The one grammar of a value: number, unit, tolerance, origin. No arithmetic, ASCII digits only.

Patterns are compiled, and refusals worded, when a text first asks for them.
"""

import re
from decimal import Decimal
from typing import Final, NamedTuple

from safeamp.quantities.codes import match_code
from safeamp.quantities.nouns import Kind, NotOfKindError, Origin, QuantityError
from safeamp.quantities.text import clean, quote, split_origin

_UNSIGNED: Final = r"(?:[0-9]+(?:\.[0-9]+)?|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?"
_NUMBER: Final = rf"[+-]?{_UNSIGNED}"
_UNIT: Final = r"(?:[A-Za-zΩµ°%][A-Za-z0-9Ωµ°%²/ ]*)?"
_TOLERANCE: Final = (
    rf"(?:(?:±|\+/-) ?(?P<both>{_UNSIGNED})"
    rf"|(?P<one>[+-]{_UNSIGNED}) ?/ ?(?P<other>[+-]{_UNSIGNED}))"
    rf" ?(?P<in>{_UNIT})"
)
# A third dot is refused: "0...5 V" would read as up to 0.5 V.
_RANGE: Final = rf"(?P<low>{_NUMBER}) ?\.\.(?! ?\.) ?(?P<high>{_NUMBER}) ?(?P<unit>{_UNIT})"
_VALUE: Final = rf"(?P<number>{_NUMBER}) ?(?P<unit>{_UNIT}?) ?(?P<tolerance>{_TOLERANCE})?"
_AFTER_CODE: Final = rf" ?(?P<tolerance>{_TOLERANCE})?"


class Written(NamedTuple):
    """What stands in a text, in the user's own unit.

    `minus` and `plus` are the tolerance as signed distances in `tolerance_unit` (``%`` or a unit);
    a range has `low` and `high` instead.
    """

    text: str
    number: Decimal
    unit: str
    origin: Origin
    minus: Decimal | None = None
    plus: Decimal | None = None
    tolerance_unit: str = ""
    low: Decimal | None = None
    high: Decimal | None = None


def parse(text: str, kind: Kind) -> Written:
    """Return the parts of `text`; its unit is one of `kind.spellings`.

    Raises
    ------
    QuantityError
        If it is not of the grammar, or the unit is not of the kind.
    """
    cleaned = clean(text, kind)
    head, origin = split_origin(cleaned)
    if code := match_code(head, kind):
        return _code(text, head, code, origin, kind)
    if found := _match_range(head):
        return _range(text, found, origin, kind)
    found = re.fullmatch(_VALUE, head, re.ASCII)
    if not found:
        raise _refused_shape(head, kind)
    unit = _known_unit(found["unit"], found["number"], head, kind)
    minus, plus = _distances(found, head)
    return Written(text, Decimal(found["number"]), unit, origin, minus, plus, (found["in"] or "").strip())


def _match_range(head: str) -> re.Match[str] | None:
    return re.fullmatch(_RANGE, head, re.ASCII) if ".." in head else None


def _refused_shape(head: str, kind: Kind) -> NotOfKindError:
    from safeamp.quantities.refusals import refuse_shape

    return refuse_shape(head, kind, _reads)


def _reads(text: str, kind: Kind) -> bool:
    """Return whether a suggestion would be read."""
    head = text.partition(",")[0]
    found = _match_range(head) or re.fullmatch(_VALUE, head, re.ASCII)
    return found is not None and found["unit"].strip() in kind.spellings


def _known_unit(unit: str, number: str, head: str, kind: Kind) -> str:
    unit = unit.strip()
    if unit not in kind.spellings:
        from safeamp.quantities.refusals import refuse_unit

        raise refuse_unit(unit, number, head, kind, _reads)
    return unit


def _range(text: str, found: re.Match[str], origin: Origin, kind: Kind) -> Written:
    unit = _known_unit(found["unit"], found["high"], found.string, kind)
    low, high = Decimal(found["low"]), Decimal(found["high"])
    if low == high:
        raise QuantityError(f"{quote(found.string)} has two equal ends", "write one number alone")
    if low > high:
        raise QuantityError(
            f"{quote(found.string)} does not rise",
            f'write the smaller end first: "{found["high"]}..{found["low"]} {unit}"',
        )
    return Written(text, (low + high) / 2, unit, origin, low=low, high=high)


def _code(
    text: str, head: str, code: tuple[Decimal, str, Decimal | None, int], origin: Origin, kind: Kind
) -> Written:
    number, unit, percent, length = code
    found = re.fullmatch(_AFTER_CODE, head[length:], re.ASCII)
    if not found:
        raise _refused_shape(head, kind)
    minus, plus = _distances(found, head)
    if percent is None:
        return Written(text, number, unit, origin, minus, plus, (found["in"] or "").strip())
    if minus is not None:
        raise QuantityError(f"{quote(head)} has a tolerance letter and a tolerance", "write one of the two")
    return Written(text, number, unit, origin, -percent, percent, "%")


def _distances(found: re.Match[str], head: str) -> tuple[Decimal | None, Decimal | None]:
    if not found["tolerance"]:
        return None, None
    if found["both"]:
        plus = Decimal(found["both"])
        minus = -plus
    else:
        minus, plus = sorted((Decimal(found["one"]), Decimal(found["other"])))
        if found["one"][0] == found["other"][0]:
            raise QuantityError(f"{quote(head)} has a tolerance to one side twice", 'write it as "-20/+50 %"')
    if minus == plus:
        raise QuantityError(f"{quote(head)} has a tolerance of zero", "leave the tolerance out")
    return minus, plus
