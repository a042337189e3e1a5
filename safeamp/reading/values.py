"""One key of the sheet: what its noun says of it decides how its value is read."""

from __future__ import annotations

from collections.abc import Mapping
from numbers import Real
from typing import Any

from safeamp.amplifier import Key
from safeamp.limits import nearest, plain
from safeamp.quantities import RATIO, VOLTAGE, Origin, QuantityError, Reading, Sign, read, read_any
from safeamp.reading.draft import Draft, weakest
from safeamp.reading.points import read_curves, read_points
from safeamp.reading.special import FORMS
from safeamp.reading.uncovered import not_covered


def read_key(draft: Draft, path: str, key: Key, value: Any) -> None:
    """Read one written key into the draft; whatever is wrong with it becomes a complaint."""
    draft.sit(path)
    draft.written.add(path)
    try:
        if _is_none(value) and "none" not in key.choices:
            _not_fitted(draft, path, key)
        elif key.kinds:
            _numbers(draft, path, key, value)
        else:
            draft.put(path, *_word(draft, path, key, value))
    except QuantityError as trouble:
        draft.complain(path, trouble)


def _is_none(value: object) -> bool:
    return isinstance(value, str) and value.strip().lower() == "none"


def _not_fitted(draft: Draft, path: str, key: Key) -> None:
    if not key.none:
        raise QuantityError('"none" is meaningless here', f"write {example(key)}, or leave the key out")
    draft.absent.add(path)
    draft.put(path, None)
    if key.none == "zero":
        draft.fill(path, 0.0, key.kinds[0], origin=Origin.STATED, text="none")


def example(key: Key) -> str:
    """Return what could be written for a key, as in the file."""
    if key.flag:
        return "true or false"
    if key.choices:
        return " or ".join(f'"{choice}"' for choice in key.choices)
    if key.special:
        return {"fuse": '"T 2 A"', "limiter": '"60 W lamp"', "file": '"curve.csv"'}[key.special]
    if not key.kinds:
        return "text in quotes"
    return _one(key)


def _one(key: Key) -> str:
    if key.whole:
        return "a whole number such as 1"
    if key.kinds[0] == RATIO:
        return f"a bare number such as {RATIO.example}"
    return " or ".join(f'{kind.article} such as "{kind.example}"' for kind in key.kinds)


def _word(draft: Draft, path: str, key: Key, value: Any) -> tuple[Any, Origin]:
    if key.flag:
        if not isinstance(value, bool):
            raise QuantityError(
                f"{_shown(value)} is neither true nor false", "write true or false, without quotes"
            )
        return value, Origin.STATED
    if key.shape == "list":
        items = [value] if isinstance(value, str) else value
        if not isinstance(items, list | tuple) or not items:
            raise QuantityError(f"{_shown(value)} is not a list of names", 'write ["name", ...] or "none"')
        return tuple(_text(item) for item in items), Origin.STATED
    text = _text(value)
    if key.special:
        return FORMS[key.special](text, draft)
    return (_choice(path, key, text) if key.choices else text), Origin.STATED


def _text(value: object) -> str:
    if not isinstance(value, str) or not value.strip():
        raise QuantityError(f"{_shown(value)} is not a text", "write text in quotes")
    return value


def _choice(path: str, key: Key, text: str) -> str:
    known = {plain(choice): choice for choice in key.choices}
    if plain(text) in known:
        return known[plain(text)]
    reason = not_covered(text) if path == "stage.arrangement" else ""
    if reason:
        raise QuantityError(reason, f"covered are {' and '.join(key.choices)} stages")
    near = nearest(plain(text), known)
    raise QuantityError(f'"{text}" is not known here{near}', f"write {example(key)}")


def _shown(value: object) -> str:
    """Return a value as it stands in the file."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, Mapping):
        return "a table"
    if isinstance(value, list | tuple):
        return "a list"
    return f'"{value}"' if isinstance(value, str) else str(value)


def _numbers(draft: Draft, path: str, key: Key, value: Any) -> None:
    if key.shape == "points":
        draft.values[path] = read_points(draft, path, key, value)
    elif key.shape == "curves":
        draft.values[path] = read_curves(draft, path, key, value)
    elif key.shape == "list":
        _list(draft, path, key, value)
    else:
        reading = _reading(draft, key, value)
        draft.put(path, draft.put_reading(path, reading), reading.origin)
        if len(key.kinds) > 1:
            draft.values[f"{path}_unit"] = reading.kind.unit
        if key.sign is Sign.ANY and reading.kind == VOLTAGE and not _signed(value):
            draft.unsigned.add(path)


def _list(draft: Draft, path: str, key: Key, value: Any) -> None:
    items = value if isinstance(value, list | tuple) else [value]
    if not items:
        raise QuantityError("this list is empty", f"write {_one(key)}")
    numbers: list[float] = []
    for place, item in enumerate(items):
        part = f"{path}.{place}"
        draft.sit(part)
        try:
            numbers.append(draft.put_reading(part, _reading(draft, key, item)))
        except QuantityError as trouble:
            draft.complain(part if len(items) > 1 else path, trouble)
    if len(numbers) == len(items):
        origin = weakest(draft.origins[f"{path}.{place}"] for place in range(len(items)))
        draft.put(path, tuple(numbers), origin)


def _reading(draft: Draft, key: Key, value: Any) -> Reading:
    # The plain default of a key leaves the sign to the kind: a temperature may lie below zero.
    sign = None if key.sign is Sign.POSITIVE else key.sign
    if len(key.kinds) > 1:
        return read_any(value, key.kinds, sign=sign, allow_si=draft.allow_si)
    if key.whole and not _whole(value):
        raise QuantityError(f"{_shown(value)} is not a whole number", "write a bare whole number, such as 1")
    try:
        return read(value, key.kinds[0], sign=sign, believable=key.believable, allow_si=draft.allow_si)
    except QuantityError as trouble:
        if not key.whole:
            raise
        raise whole_number(trouble) from trouble


def whole_number(trouble: QuantityError) -> QuantityError:
    """Return what is wrong with a count, which is read as a ratio, in words of a count."""
    write = trouble.write.replace(f'{RATIO.article}, such as "{RATIO.example}"', "a whole number, such as 1")
    return QuantityError(trouble.found, write.replace(RATIO.article, "a whole number"))


def _whole(value: object) -> bool:
    if isinstance(value, bool) or not isinstance(value, Real):
        return False
    return isinstance(value, int) or float(value).is_integer()


def _signed(value: object) -> bool:
    if isinstance(value, str):
        return value.lstrip()[:1] in ("+", "-", "\u2212")
    return str(getattr(value, "magnitude", value)).startswith("-")
