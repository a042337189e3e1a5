"""Points of curves: pairs of quantities, alone or by duration."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise
from typing import Any, TypeGuard

from safeamp.amplifier import Key
from safeamp.quantities import CURRENT, TIME, VOLTAGE, Kind, QuantityError, Reading, read
from safeamp.reading.draft import Draft, weakest

Points = tuple[tuple[float, float], ...]


def read_points(draft: Draft, path: str, key: Key, value: object) -> Points | None:
    """Return pairs in SI units; None after a complaint."""
    example = f'["{key.kinds[0].example}", "{key.kinds[1].example}"]'
    if not _is_list(value) or not value:
        draft.complain(path, QuantityError("this is not a list of points", f"write [{example}, ...]"))
        return None
    readings = [_pair(draft, f"{path}.{place}", key, item) for place, item in enumerate(value)]
    whole = [pair for pair in readings if pair is not None]
    if len(whole) < len(readings):
        return None
    _note_parts(draft, path, [part for pair in whole for part in pair])
    points = tuple((first.nominal, second.nominal) for first, second in whole)
    return points if key.kinds != (VOLTAGE, CURRENT) or _in_order(draft, path, points) else None


def read_curves(draft: Draft, path: str, key: Key, value: object) -> tuple[tuple[float, Points], ...] | None:
    """Return curves by rising duration, each written as ``["10 ms", ["40 V", "5 A"], ["100 V", "1 A"]]``."""
    form = 'write [["10 ms", ["40 V", "5 A"], ["100 V", "1 A"]], ...]'
    if not _is_list(value) or not value:
        draft.complain(path, QuantityError("this is not a list of curves", form))
        return None
    curves = [_curve(draft, f"{path}.{place}", key, item, form) for place, item in enumerate(value)]
    whole = [curve for curve in curves if curve is not None]
    if len(whole) < len(curves):
        return None
    durations = [duration for duration, _ in whole]
    if any(later <= earlier for earlier, later in pairwise(durations)):
        draft.complain(path, QuantityError("the durations do not rise", "write the shortest curve first"))
        return None
    draft.origins[path] = weakest(draft.origins[f"{path}.{place}"] for place in range(len(whole)))
    return tuple(whole)


def _curve(draft: Draft, path: str, key: Key, value: Any, form: str) -> tuple[float, Points] | None:
    if not _is_list(value) or len(value) < 2:
        draft.complain(path, QuantityError("this is not a duration and its points", form))
        return None
    duration = _part(draft, path, key, TIME, value[0])
    below = Key(help=key.help, kinds=(VOLTAGE, CURRENT), shape="points", sign=key.sign)
    points = read_points(draft, path, below, list(value[1:]))
    if duration is None or points is None:
        return None
    draft.origins[path] = weakest((draft.origins[path], duration.origin))
    return duration.nominal, points


def _pair(draft: Draft, path: str, key: Key, value: object) -> tuple[Reading, Reading] | None:
    draft.sit(path)
    kinds = key.kinds
    if not _is_list(value) or len(value) != 2:
        write = f'write two texts, such as ["{kinds[0].example}", "{kinds[1].example}"]'
        draft.complain(path, QuantityError("this is not a point", write))
        return None
    first, second = (_part(draft, path, key, kind, part) for kind, part in zip(kinds, value, strict=True))
    return None if first is None or second is None else (first, second)


def _part(draft: Draft, path: str, key: Key, kind: Kind, value: object) -> Reading | None:
    try:
        # A curve may start at no voltage and end at no current.
        zero = kind in (VOLTAGE, CURRENT)
        believable = (0.0, kind.believable[1]) if zero else None
        reading = read(value, kind, sign=key.sign, believable=believable, allow_si=draft.allow_si)
        if reading.toleranced:
            raise QuantityError(
                f'"{reading.text}" has a tolerance or is a guess, which a point of a curve cannot have',
                "write the value on the safe side",
            )
    except QuantityError as trouble:
        draft.complain(path, trouble)
        return None
    return reading


def _note_parts(draft: Draft, path: str, parts: list[Reading]) -> None:
    """Give the curve the origin of its weakest part, and remember dropped signs."""
    draft.origins[path] = weakest(part.origin for part in parts)
    if any(part.sign_dropped for part in parts):
        draft.dropped.append(path)


def _in_order(draft: Draft, path: str, points: Points) -> bool:
    """Whether voltage rises and current does not, from point to point."""
    good = True
    for place, ((low, more), (high, less)) in enumerate(pairwise(points), 1):
        if high <= low:
            draft.complain(
                f"{path}.{place}",
                QuantityError(
                    f"{high:g} V does not rise above {low:g} V", "write the points in order of rising voltage"
                ),
            )
            good = False
        elif less > more:
            draft.complain(
                f"{path}.{place}",
                QuantityError(
                    f"{less:g} A at {high:g} V is more than {more:g} A at {low:g} V",
                    "read both points again: the current allowed falls as the voltage rises",
                ),
            )
            good = False
    return good


def _is_list(value: object) -> TypeGuard[Sequence[Any]]:
    return isinstance(value, Sequence) and not isinstance(value, str)
