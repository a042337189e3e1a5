"""What is not read, each with its own sentence of what to write."""

import re
from collections.abc import Callable

from safeamp.quantities.codes import LOOKS_LIKE_CODE, MULTIPLIER
from safeamp.quantities.kinds import KINDS
from safeamp.quantities.nouns import Kind, NotOfKindError
from safeamp.quantities.text import ORIGIN_WORDS, quote, such_as

Reads = Callable[[str, Kind], bool]


def refuse_shape(head: str, kind: Kind, reads: Reads) -> NotOfKindError:
    """Return the refusal of a text that is not of the grammar; a suggestion is made only when it `reads`."""
    if refusal := _shape(head, kind, reads):
        return refusal
    if not re.search(r"[0-9]", head):
        return NotOfKindError(f"{quote(head)} has no number", such_as(kind))
    return NotOfKindError(f"{quote(head)} is not read as {kind.article}", such_as(kind))


def _shape(head: str, kind: Kind, reads: Reads) -> NotOfKindError | None:
    from safeamp.quantities.shapes import SHAPES

    for shape in SHAPES:
        match = re.fullmatch(shape.pattern, head)
        if not match:
            continue
        found = f"{quote(head)} {shape.found}"
        write = shape.write if kind.name == "voltage" else shape.write.replace("rail", "value")
        suggestion = match.expand(shape.rewrite).strip() if shape.rewrite else ""
        if suggestion and reads(suggestion, kind):
            return NotOfKindError(found, f'{write}: "{suggestion}"', hint=True)
        return NotOfKindError(found, write)
    return None


def refuse_unit(unit: str, number: str, head: str, kind: Kind, reads: Reads) -> NotOfKindError:
    """Return the refusal of a unit that is not one of `kind`."""
    if not unit:
        return NotOfKindError(f"{quote(head)} has no unit", such_as(kind))
    return (
        _trap(unit, number, head, kind)
        or _other_kind(unit, head, kind)
        or _no_comma(unit, number, head, kind)
        or _code(head, kind)
        or (_shape(head, kind, reads) if re.search(r"[0-9]", unit) else None)
        or _near(unit, number, kind)
        or NotOfKindError(f"{quote(unit)} is not a unit of {kind.article} here", _list_of_units(kind))
    )


def _list_of_units(kind: Kind) -> str:
    if not kind.spellings:
        return f"{kind.article} is only printed, never read"
    if "" in kind.spellings:
        return f"write a number alone, such as {kind.example}"
    *others, last = kind.spellings
    return f"write {', '.join(others)} or {last}" if others else f"write {last}"


def _trap(unit: str, number: str, head: str, kind: Kind) -> NotOfKindError | None:
    """Return the refusal of a unit that is known to be mistaken for another."""
    name = quote(head)
    if kind.name == "capacitance" and unit.lower() == "mf":
        return NotOfKindError(
            f"{name}: {unit} is printed for microfarad, and also stands for millifarad, 1000 times as much",
            "find out which of the two the part is, and write it in uF",
            hint=True,
        )
    if kind.name == "temperature" and unit in ("C", "c"):
        return NotOfKindError(f"{name}: {unit} alone is not a unit", f'write "{number} degC"', hint=True)
    if kind.name == "temperature" and unit.lower().replace(" ", "") in ("f", "°f", "degf"):
        return NotOfKindError(f"{name}: Fahrenheit is not read", "write the temperature in degC", hint=True)
    if unit in MULTIPLIER.get(kind.name, {}) and unit not in kind.spellings:
        meant = MULTIPLIER[kind.name][unit]
        return NotOfKindError(f"{name}: {unit} alone is not a unit", f'write "{number} {meant}"', hint=True)
    return _mega(unit, name, kind)


def _mega(unit: str, name: str, kind: Kind) -> NotOfKindError | None:
    small, plain = f"m{unit[1:]}", unit[1:]
    if unit[0] == "M" and small in kind.spellings and plain in kind.spellings:
        return NotOfKindError(
            f"{name}: the M of {unit} means mega", f"write {small} or {plain}, whichever it is", hint=True
        )
    return None


def _no_comma(unit: str, number: str, head: str, kind: Kind) -> NotOfKindError | None:
    for word in ORIGIN_WORDS:
        before = unit.removesuffix(word).strip()
        if before != unit and before in kind.spellings:
            return NotOfKindError(
                f"{quote(head)} has no comma before the origin",
                f'write "{f"{number} {before}".strip()}, {word}"',
                hint=True,
            )
    return None


def _code(head: str, kind: Kind) -> NotOfKindError | None:
    code = re.match(LOOKS_LIKE_CODE, head.lstrip("+-"))
    if not code:
        return None
    if not kind.iec60062:
        return NotOfKindError(
            f"{quote(head)} is a component code, which is read for resistances and capacitances only",
            such_as(kind),
        )
    if re.search(f"[{''.join(MULTIPLIER[kind.name])}]", code[1]):
        return NotOfKindError(f"{quote(head)} has more than a code", f'write the code alone: "{code[0]}"')
    return NotOfKindError(f"{quote(head)} is not a code of {kind.article}", such_as(kind))


def _other_kind(unit: str, head: str, kind: Kind) -> NotOfKindError | None:
    names = [other.article for other in KINDS.values() if other != kind and _has_unit(other, unit)]
    if not names:
        return None
    return NotOfKindError(f"{quote(head)} is {' or '.join(names)}", such_as(kind))


def _has_unit(kind: Kind, unit: str) -> bool:
    return unit in kind.spellings or any(unit == symbol for symbol, _, _ in kind.shown)


def _near(unit: str, number: str, kind: Kind) -> NotOfKindError | None:
    """Return the refusal of a unit that differs in blanks, capitals or the sign of the ohm."""
    if (in_letters := unit.replace("Ω", "ohm")) in kind.spellings:
        near = {in_letters: in_letters}
    else:
        near = _near_spellings(unit, kind)
    if not near:
        return None
    write = " or ".join(f'"{number} {spelling}"' for spelling in near.values())
    return NotOfKindError(f"{quote(unit)} is not a unit of {kind.article} here", f"write {write}", hint=True)


def _near_spellings(unit: str, kind: Kind) -> dict[str, str]:
    near: dict[str, str] = {}
    for spelling, meant in kind.spellings.items():
        if _bare(spelling) == _bare(unit):
            near.setdefault(meant, spelling)
    return near


def _bare(unit: str) -> str:
    return unit.replace(" ", "").replace("Ω", "ohm").lower()
