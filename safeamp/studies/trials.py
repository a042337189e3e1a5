"""The same findings of many sheets that differ in one value: all corners of all of them in one pass.

The word of each is the one that the finding gets when its sheet is judged alone.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from itertools import pairwise
from typing import Any

import numpy as np

from safeamp.amplifier import Amplifier, with_values
from safeamp.checks import Check
from safeamp.checks.judging import CLOSE, Bounds, Cases, bounds_of, judge, missing_word
from safeamp.checks.trace import Trace
from safeamp.findings import Finding, Measure, NotApplicable, Verdict
from safeamp.limits import Limit
from safeamp.studies import corners
from safeamp.studies.corners import Design
from safeamp.studies.findings import Bench, again, find, look

#: Rows of one pass: enough to make calls rare, few enough to stay in a few hundred megabytes.
ROWS = 20_000
#: Every how many sheets one is looked at by itself, where they are few; of many, so many at the least.
STRIDE, ALONE = 4, 16
#: What a measure has for each case.
LEVELS = ("value", "go", "stop", "unknown")

Seen = tuple[Measure | NotApplicable | None, Trace]


@dataclass(frozen=True)
class Word:
    """The word of a finding, None where it does not apply, and how far beyond its levels it is.

    `excess` is relative to the level, negative within; infinite where no number says how far. `worst` is the place of
    the worst case, -1 where cases were not judged.
    """

    verdict: Verdict | None
    excess: float = np.inf
    worst: int = -1


@dataclass(frozen=True, eq=False)
class _Look:
    """One sheet as a finding sees it at the nominal values."""

    place: int
    bench: Bench
    measure: Measure
    design: Design


def words(check: Check, benches: Sequence[Bench], *, until: Verdict = Verdict.GO) -> list[Word]:
    """Return the word of one finding for each sheet.

    Parameters
    ----------
    check : Check
        The finding.
    benches : sequence of Bench
        Sheets that differ in the values of numbers only, in the order of the value that is moved.
    until : Verdict
        The word whose levels `Word.excess` is measured from.
    """
    found: dict[int, Word] = {}
    groups: dict[object, list[_Look]] = {}
    for place, (bench, (measure, trace)) in enumerate(zip(benches, _looks(check, benches), strict=True)):
        if not isinstance(measure, Measure):
            found[place] = Word(None, -np.inf)
        elif trace.missing:
            found[place] = Word(missing_word(measure, bench.limits[check.id]))
        else:
            entries = () if measure.word else corners.read_by(bench.sheet.entries.values(), trace.reads)
            if len(entries) > corners.COMPLETE:
                found[place] = _alone(check, bench)
            else:
                one = _Look(place, bench, measure, bench.cases(entries)[0])
                groups.setdefault(_structure(one, trace), []).append(one)
    for group in groups.values():
        for block in _blocks(group):
            found |= _together(check, block, until)
    return [found[place] for place in range(len(benches))]


def _looks(check: Check, benches: Sequence[Bench]) -> list[Seen]:
    """Return what the finding sees at the nominal values of each sheet.

    A few neighbours between two sheets at which everything but numbers is alike are not looked at by themselves:
    their numbers come from the pass over all corners.
    """
    seen: dict[int, Seen] = {}
    stride = max(STRIDE, len(benches) // ALONE)
    for place in {*range(0, len(benches), stride), len(benches) - 1} if benches else ():
        seen[place] = look(check, benches[place])
    for low, high in pairwise(sorted(seen)):
        _fill(check, benches, seen, low, high)
    return [seen[place] for place in range(len(benches))]


def _fill(check: Check, benches: Sequence[Bench], seen: dict[int, Seen], low: int, high: int) -> None:
    if high - low < 2:
        return
    if _alike(seen[low], seen[high]):
        seen |= dict.fromkeys(range(low + 1, high), seen[low])
        return
    middle = (low + high) // 2
    seen[middle] = look(check, benches[middle])
    _fill(check, benches, seen, low, middle)
    _fill(check, benches, seen, middle, high)


def _alike(one: Seen, other: Seen) -> bool:
    """Whether two sheets differ in numbers only, as a finding sees them."""
    return _facts(*one) == _facts(*other)


def _facts(measure: Measure | NotApplicable | None, trace: Trace) -> object:
    read = (tuple(trace.reads), tuple(trace.missing))
    if not isinstance(measure, Measure) or trace.missing or measure.word is not None or measure.remarks:
        # Without a pass over the corners there is nothing that numbers could come from; and the same remark at two
        # sheets, such as rails that lie apart on one side or the other, says nothing of those between.
        return (*read, object())
    flags = (measure.without_stop, measure.everywhere, measure.unknown is None, measure.as_built)
    return (*read, flags, _scalar(measure.go), _scalar(measure.stop))


def _scalar(level: Any) -> object:
    return tuple(level) if isinstance(level, tuple) else np.ndim(level)


def _alone(check: Check, bench: Bench) -> Word:
    finding = find(check, bench)
    return Word(finding.verdict if isinstance(finding, Finding) else None)


def _structure(one: _Look, trace: Trace) -> object:
    """Return what must be the same for sheets to share one pass."""
    amplifier = one.bench.sheet.amplifier
    levels = tuple(len(corners.ends(entry)) for entry in one.design.entries)
    words = (one.measure.word, one.measure.without_stop, one.measure.everywhere)
    return (
        *(tuple(trace.reads), one.design.paths, levels, len(one.design.rows), words),
        *(amplifier.absent, amplifier.readings.unsigned, frozenset(one.bench.sheet.entries)),
    )


def _blocks(group: list[_Look]) -> Iterator[list[_Look]]:
    count = max(1, ROWS // max(1, len(group[0].design.rows)))
    for start in range(0, len(group), count):
        yield group[start : start + count]


def _together(check: Check, block: list[_Look], until: Verdict) -> dict[int, Word]:
    """Judge a block of sheets of one structure in one pass over all their corners."""
    first = block[0]
    over_all = again(check, first.measure, _stacked(block), first.bench)
    failed = over_all.word is not None and first.measure.word is None
    changed = (over_all.without_stop, over_all.everywhere) != (
        first.measure.without_stop,
        first.measure.everywhere,
    )
    if failed or changed or not all(_steady(block, over_all, name) for name in LEVELS):
        # One sheet must not speak for the others.
        return {one.place: _alone(check, one.bench) for one in block}
    return {one.place: _judged(check, one, over_all, place, until) for place, one in enumerate(block)}


def _steady(block: list[_Look], over_all: Measure, name: str) -> bool:
    """Whether a number that is the same in all cases was the same for each sheet."""
    found = getattr(over_all, name)
    if found is None or isinstance(found, tuple) or np.size(found) > 1:
        return True
    return len({repr(getattr(one.measure, name)) for one in block}) == 1


def _stacked(block: list[_Look]) -> Amplifier:
    """Return the first amplifier with the cases of all sheets, one after the other, along the case axis."""
    count = len(block[0].design.rows)
    columns: dict[str, Any] = {
        path: np.repeat([one.bench.sheet.entries[path].nominal for one in block], count)
        for path in _moved(block)
    }
    rows = np.concatenate([one.design.rows for one in block])
    columns |= {
        path: np.ascontiguousarray(rows[:, place]) for place, path in enumerate(block[0].design.paths)
    }
    return with_values(block[0].bench.sheet.amplifier, columns)


def _moved(block: list[_Look]) -> list[str]:
    first, *others = (one.bench.sheet.entries for one in block)
    return [
        path for path, entry in first.items() if any(other[path].nominal != entry.nominal for other in others)
    ]


def _judged(check: Check, one: _Look, over_all: Measure, place: int, until: Verdict) -> Word:
    count = len(one.design.rows)
    own = slice(place * count, (place + 1) * count)
    measure = replace(
        one.measure,
        value=_part(over_all.value, own, one.measure.value),
        go=_part(over_all.go, own, one.measure.go),
        stop=_part(over_all.stop, own, one.measure.stop),
        unknown=_part(over_all.unknown, own, one.measure.unknown),
    )
    limit = one.bench.limits[check.id]
    judged = judge(measure, limit, one.design.guessed)
    return Word(judged.verdict, excess(measure, limit, count, until), judged.worst)


def _part(found: Any, own: slice, nominal: Any) -> Any:
    """Return the cases of one sheet; what does not differ between cases is that of its nominal pass."""
    if found is None or isinstance(found, tuple) or np.size(found) == 1:
        return nominal
    return np.asarray(found)[own]


def excess(measure: Measure, limit: Limit, count: int, until: Verdict) -> float:
    """Return how far a measure is beyond the levels of a word, relative to them; negative within."""
    if measure.word is not None:
        return np.inf
    value = np.broadcast_to(np.asarray(measure.value, dtype=float), (count,))
    bounds = bounds_of(measure, limit, count)
    parts = [_beyond(value, bounds.stop, bounds)]
    if until is Verdict.GO:
        parts.append(_beyond(value[:1], bounds.go[:1], bounds))
        parts.append(_beyond(-value[:1], -bounds.low[:1], bounds))
    known = [part for part in parts if not np.isnan(part)]
    return float(max(known, default=-np.inf)) if not np.any(np.isnan(value)) else np.inf


def _beyond(value: Cases, level: Cases, bounds: Bounds) -> float:
    """Return the largest relative distance beyond a level; nan where there is no level."""
    apart = level - value if bounds.sense == "at least" else value - level
    with np.errstate(invalid="ignore"):
        relative = apart / np.maximum(np.abs(level), CLOSE)
    finite = relative[~np.isnan(relative)]
    return float(np.max(finite)) if finite.size else np.nan
