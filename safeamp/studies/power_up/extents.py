"""How far numbers reach over every corner of the tolerances that they read."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier, Entry, Sheet, written_key
from safeamp.answers.power_up import Extent
from safeamp.checks.trace import Trace, watched
from safeamp.quantities import Number, Origin
from safeamp.studies import corners

Array = npt.NDArray[np.float64]
#: Numbers of an amplifier: arrays whose first axis is the case, whose last one the ends of what is assumed of it.
Compute = Callable[[Amplifier], Mapping[str, Array]]


@dataclass(frozen=True)
class Extents:
    """Extents by name; none, with the keys that are missing or what else is in the way."""

    found: Mapping[str, Extent] = field(default_factory=dict)
    needs: tuple[str, ...] = ()
    because: tuple[str, ...] = ()
    reads: tuple[str, ...] = ()


def column(value: Number) -> Array:
    """Return a value over the cases with an axis for what is assumed of it."""
    return np.asarray(value, dtype=float)[..., np.newaxis]


def extents(sheet: Sheet, compute: Compute) -> Extents:
    """Return how far the numbers reach; index 0 of both axes is the nominal one."""
    trace = Trace()
    try:
        with np.errstate(all="ignore"):
            compute(watched(sheet.amplifier, trace))
            reads = tuple(trace.inputs())
            because = tuple(_invented(sheet, reads))
            if trace.missing or because:
                return Extents(needs=tuple(trace.missing), because=because, reads=reads)
            entries = corners.read_by(sheet.entries.values(), trace.reads)
            found = _over(sheet, entries, compute)
    except (ValueError, ArithmeticError) as problem:
        because = (f"cannot be computed: {problem}",)
        return Extents(needs=tuple(trace.missing), because=because, reads=tuple(trace.inputs()))
    unknown = [name for name, one in found.items() if not np.isfinite([one.low, one.high]).all()]
    because = (f"no number comes out for {', '.join(unknown)}",) if unknown else ()
    return Extents({} if unknown else found, because=because, reads=reads)


def _over(sheet: Sheet, entries: tuple[Entry, ...], compute: Compute) -> dict[str, Extent]:
    if len(entries) > corners.COMPLETE:
        return _searched(sheet, entries, compute)
    design = corners.complete_design(entries)
    values = compute(design.applied_to(sheet.amplifier))
    return {name: _extent(one) for name, one in values.items()}


def _searched(sheet: Sheet, entries: tuple[Entry, ...], compute: Compute) -> dict[str, Extent]:
    """Return the extents by the corners of the keys that matter most to each end, as findings do."""
    screen = corners.screening_design(entries)
    first = compute(screen.applied_to(sheet.amplifier))
    found = {}
    for name, values in first.items():
        count = len(screen.rows)
        whole = np.broadcast_to(values, (count, np.shape(values)[-1]))
        reached = [
            _extent(compute(corners.searched_design(screen, badness).applied_to(sheet.amplifier))[name])
            for badness in (np.max(whole, axis=1), -np.min(whole, axis=1))
        ]
        lows, highs = [one.low for one in reached], [one.high for one in reached]
        found[name] = Extent(reached[0].nominal, min(lows), max(highs))
    return found


def _extent(values: Array) -> Extent:
    return Extent(float(np.ravel(values)[0]), float(np.min(values)), float(np.max(values)))


def _invented(sheet: Sheet, reads: tuple[str, ...]) -> Iterator[str]:
    """Yield that values are examples: nothing is expected of an amplifier that does not exist."""
    origins = sheet.amplifier.origins
    seen = set(reads)
    keys = [
        written_key(path)
        for path, origin in origins.items()
        if origin is Origin.EXAMPLE and (path in seen or path.rpartition(".")[0] in seen)
    ]
    if keys:
        yield f"example values are still in the sheet: {', '.join(dict.fromkeys(keys))}"
