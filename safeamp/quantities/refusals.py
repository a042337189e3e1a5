"""Each shape that is not read, with its own sentence of what to write."""

import re
from typing import Final

from safeamp.quantities.codes import LOOKS_LIKE_CODE
from safeamp.quantities.kinds import KINDS
from safeamp.quantities.nouns import Kind, QuantityError
from safeamp.quantities.text import ORIGIN_WORDS, quote, such_as

_NUMBER: Final = r"[0-9]*\.?[0-9]+(?:[eE][+-]?[0-9]+)?"
_MARK: Final = r"[+-]?"

# Tried in this order; the first that matches is the one that is said.
_SHAPES: Final = tuple(
    (re.compile(pattern), found, write)
    for pattern, found, write in (
        (r"(?i)[+-]?(nan|inf|infinity|∞)\b.*|[+-]?∞.*", "is not a number", "leave the key out when it is not known"),
        (r"(~|≈|(?i:ca\b|about|approx)).*", "is only roughly a value", 'write the number with its unit, then ", guess"'),
        (r"(<|>|≤|≥|(?i:max\b|min\b|up to|under|over|less|more)).*", "is a bound, not a value",
         'write what was read, or a range from low to high with two dots'),
        (r".*@.*", "joins a value and its condition with @", "write the value alone; its condition has a key of its own"),
        (rf"{_NUMBER} ?- ?0 ?- ?{_NUMBER}.*", "is a winding with a centre tap", "write one half of it, as one number"),
        (r"(±|\+/-|\+-).*", "gives both signs at once", "write one rail, as one number without a sign"),
        (rf"{_NUMBER}[^0-9]* ?([x×*·]|X) ?{_NUMBER}.*", "is a product", "write one value, as one number"),
        (rf".*[0-9]['’_´`][0-9].*|{_MARK}[0-9]{{1,3}}( [0-9]{{3}})+(?![0-9]).*", "groups the digits of its number",
         "write the digits without gaps"),
        (rf"{_NUMBER}[^0-9]*(\.\.\.+|…|–|—| ?- ?| to ){_NUMBER}.*|{_NUMBER}[^0-9.]+\.\.[ .]*{_NUMBER}.*",
         "looks like a range", "write its ends with two dots between them and the unit once, at the end"),
        (r".*[()\[\]{}].*", "has brackets", "write number and unit without them, the origin after a comma"),
        (r".*[0-9.]\)? ?[*/^+=÷-] ?\(?[0-9.].*|[=].*|.*\*\*.*", "is a calculation", "write its result"),
        (rf"{_MARK}{_NUMBER}[^0-9]*\s{_NUMBER}.*", "holds two numbers", "write one value, as one number"),
        (rf"{_MARK}[0-9]*\.?[0-9]+[eE][+-]?[0-9]{{4,}}.*", "has an exponent beyond all use", "write an ordinary number"),
        (r".*[^\x00-\x7f].*", "has a character that is not read here", "write digits 0 to 9, a point for decimals, and the unit"),
    )
)  # fmt: skip


def refuse_shape(head: str, kind: Kind) -> QuantityError:
    """Return the refusal of a text that is not of the grammar."""
    for pattern, found, write in _SHAPES:
        if pattern.fullmatch(head):
            return QuantityError(f"{quote(head)} {found}", f'{write}, such as "{kind.example}"')
    if not re.search(r"[0-9]", head):
        return QuantityError(f"{quote(head)} has no number", such_as(kind))
    return QuantityError(f"{quote(head)} is not read as {kind.article}", such_as(kind))


def refuse_unit(unit: str, number: str, head: str, kind: Kind) -> QuantityError:
    """Return the refusal of a unit that is not one of `kind`."""
    if not unit:
        return QuantityError(f"{quote(head)} has no unit", such_as(kind))
    return (
        _trap(unit, number, head, kind)
        or _added(unit, number, head, kind)
        or _other_kind(unit, head, kind)
        or _other_case(unit, number, kind)
        or QuantityError(f"{quote(unit)} is not a unit of {kind.article} here", _list_of_units(kind))
    )


def _list_of_units(kind: Kind) -> str:
    if kind.spellings.keys() <= {""}:
        return f"write a number alone, such as {kind.example}" if kind.spellings else "it is only printed, never read"
    *others, last = kind.spellings
    return f"write {', '.join(others)} or {last}" if others else f"write {last}"


def _trap(unit: str, number: str, head: str, kind: Kind) -> QuantityError | None:
    """Return the refusal of a unit that is known to be mistaken for another."""
    if kind.name == "capacitance" and unit in ("mF", "mf", "MF", "Mf"):
        return QuantityError(
            f"{quote(head)}: {unit} is printed for microfarad, and means millifarad, a thousand times as much",
            "find out which, and write it in uF",
        )
    if kind.name == "temperature" and unit in ("C", "c"):
        return QuantityError(f"{quote(head)}: {unit} alone is not a unit of temperature", f'write "{number} degC"')
    if kind.name == "temperature" and unit in ("F", "f", "°F", "degF", "deg F", "° F"):
        return QuantityError(f"{quote(head)}: Fahrenheit is not read", "write the temperature in degC")
    small = f"m{unit[1:]}"
    if unit[0] == "M" and small in kind.spellings and unit[1:] in kind.spellings:
        return QuantityError(
            f"{quote(head)}: the M of {unit} means mega", f"write {small} or {unit[1:]}, whichever it is"
        )
    return None


def _added(unit: str, number: str, head: str, kind: Kind) -> QuantityError | None:
    """Return the refusal of something that stands behind the unit."""
    for word in ORIGIN_WORDS:
        before = unit.removesuffix(word).strip()
        if before != unit and before in kind.spellings:
            return QuantityError(
                f"{quote(head)} has no comma before the origin", f'write "{number} {before}, {word}"'
            )
    if re.search(r" [0-9]", unit):
        return QuantityError(f"{quote(head)} holds two numbers", such_as(kind))
    if re.fullmatch(r"[xX] ?[0-9].*", unit):
        return QuantityError(f"{quote(head)} is a product", such_as(kind))
    if LOOKS_LIKE_CODE.fullmatch(head):
        return QuantityError(
            f"{quote(head)} looks like a code of a resistor or capacitor, not like {kind.article}", such_as(kind)
        )
    return None


def _other_kind(unit: str, head: str, kind: Kind) -> QuantityError | None:
    names = [other.article for other in KINDS.values() if other != kind and _has_unit(other, unit)]
    if not names:
        return None
    return QuantityError(f"{quote(head)} is {' or '.join(names)}", such_as(kind))


def _has_unit(kind: Kind, unit: str) -> bool:
    return unit in kind.spellings or any(unit == symbol for symbol, _, _ in kind.shown)


def _other_case(unit: str, number: str, kind: Kind) -> QuantityError | None:
    near = [spelling for spelling in kind.spellings if spelling.lower() == unit.lower()]
    if not near:
        return None
    return QuantityError(
        f"{quote(unit)} has capital and small letters in another way than the unit",
        "write " + " or ".join(f'"{number} {spelling}"' for spelling in near),
    )
