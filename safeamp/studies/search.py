"""Trial values of one key: which are looked at, which hold, and where holding ends."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from itertools import groupby, pairwise
from typing import Any, Protocol

import numpy as np

from safeamp.amplifier import Entry, Sheet
from safeamp.checks import Check
from safeamp.complaints import ReadingError
from safeamp.findings import Verdict
from safeamp.limits import Limits
from safeamp.quantities import ANGLE, LEVEL, PERCENT, TEMPERATURE, Kind
from safeamp.studies.findings import Bench
from safeamp.studies.trials import Word, words

#: Trial values of the first look, and those between two of them at each later one.
FIRST = 48
BETWEEN = 7
#: How closely an end is found, relative to the value.
CLOSELY = 1e-6
#: A range that starts at zero is looked at from this share of its upper end on, and at zero.
SMALLEST_SHARE = 1e-9
#: Differences of an excess that say nothing.
FLAT = 1e-9
LINEAR = (TEMPERATURE, ANGLE, LEVEL, PERCENT)
#: How often a window or a gap that may lie between two trial values is looked for.
ROUNDS = 3
#: The same where a word that holds turns into another one that does: until the two are close.
TURNS = 8
#: Trial values inside each interval that holds, and in each that does not: in equal steps, and in equal ratios too
#: where it is wide.
INSIDE, OUTSIDE = (200, 100), (100, 50)
#: How far from what the sheet has it is looked closely, relative to it.
AROUND = (1e-4, 1e-3, 3e-3, 0.01, 0.03)


class Movable(Protocol):
    """A key of a sheet whose number can be moved."""

    @property
    def path(self) -> str:
        """The key."""

    @property
    def kind(self) -> Kind:
        """The kind of its number."""

    @property
    def now(self) -> float | None:
        """The number in the sheet."""

    @property
    def entries(self) -> tuple[Entry, ...]:
        """What is moved: several items of a list move together."""

    @property
    def in_sheet(self) -> bool:
        """Whether somebody wrote it."""

    @property
    def whole(self) -> bool:
        """Whether only whole numbers count."""

    @property
    def span(self) -> tuple[float, float]:
        """The believable range."""

    def at(self, value: float) -> Sheet:
        """Return the sheet with another number; ReadingError where it cannot have it."""

    def bought(self, value: float) -> Sheet:
        """Return the sheet with a new part of another value; ReadingError where it cannot have it."""

    def written(self, value: float) -> Any:
        """Return what stands in the sheet for a number."""


@dataclass(frozen=True)
class Trial:
    """One value: what its sheet is, or why there is none, and the words of the findings."""

    value: float
    bench: Bench | None
    trouble: ReadingError | None = None
    words: dict[str, Word] = field(default_factory=dict)
    until: Verdict = Verdict.GO

    @property
    def refused(self) -> str:
        """Why the sheet cannot have this value; empty where it can."""
        if self.trouble is None:
            return ""
        first = self.trouble.complaints[0]
        return f"{first.key}: {first.text}" if first.key else first.text

    @property
    def failing(self) -> tuple[str, ...]:
        """The ids of the findings that do not hold."""
        return tuple(id for id, word in self.words.items() if not holds(word, self.until))

    @property
    def holds(self) -> bool:
        """Whether all findings hold."""
        return self.bench is not None and not self.failing

    @property
    def excess(self) -> float:
        """How far the worst of the findings is beyond its levels; negative within."""
        if self.bench is None:
            return np.inf
        wrong = [self.words[id].excess for id in self.failing]
        return max(wrong or (word.excess for word in self.words.values()), default=-np.inf)


def holds(word: Word, until: Verdict) -> bool:
    """Whether a word is the one asked for or a better one; what does not apply holds."""
    return word.verdict is None or word.verdict <= until


@dataclass
class Field:
    """All trials of one key so far."""

    key: Movable
    limits: Limits
    until: Verdict
    checks: Sequence[Check] = ()
    trials: dict[float, Trial] = field(default_factory=dict)

    @property
    def ordered(self) -> list[Trial]:
        """The trials by rising value."""
        return [self.trials[value] for value in sorted(self.trials)]

    def read(self, values: Iterable[float]) -> list[Trial]:
        """Read the sheet at each new value."""
        new = [self._read(value) for value in dict.fromkeys(map(float, values)) if value not in self.trials]
        self.trials |= {trial.value: trial for trial in new}
        return new

    def judge(self, trials: Iterable[Trial], checks: Sequence[Check] | None = None) -> None:
        """Find the words that trials still lack, all corners of all of them in one pass a finding."""
        read = sorted((trial for trial in trials if trial.bench is not None), key=lambda trial: trial.value)
        for check in self.checks if checks is None else checks:
            new = [trial for trial in read if check.id not in trial.words]
            benches = [trial.bench for trial in new if trial.bench is not None]
            for trial, word in zip(new, words(check, benches, until=self.until), strict=True):
                trial.words[check.id] = word

    def look(self, values: Iterable[float]) -> None:
        """Read and judge the sheet at each new value."""
        self.judge(self.read(values))

    def _read(self, value: float) -> Trial:
        try:
            return Trial(value, Bench(self.key.at(value), self.limits), until=self.until)
        except ReadingError as trouble:
            return Trial(value, None, trouble, until=self.until)


def first_values(key: Movable) -> list[float]:
    """Return the trial values of the first look, over the whole believable range and at what the sheet has."""
    low, high = key.span
    if key.whole:
        return [float(value) for value in range(int(np.ceil(low)), int(high) + 1)]
    now = [] if key.now is None else [key.now]
    if key.kind in LINEAR:
        return sorted({*np.linspace(low, high, FIRST).tolist(), *now})
    least = resolution(key)
    rising = np.geomspace(least, high, FIRST).tolist()
    # The product of logarithms need not end where it should; outside the range the sheet would refuse.
    rising[0], rising[-1] = least, high
    ends = [low] if low <= 0 else []
    falling = [-value for value in rising] + [0.0] if low < 0 else []
    return sorted({*rising, *falling, *ends, *now})


def resolution(key: Movable) -> float:
    """Return the smallest magnitude that is looked at, zero apart."""
    low, high = key.span
    most = max(abs(low), abs(high))
    return low if low > 0 else max(most * SMALLEST_SHARE, min(key.kind.believable[0], most * 0.01))


def between(low: float, high: float, *, count: int = BETWEEN) -> list[float]:
    """Return values inside two others: in equal steps, or in equal ratios where they lie far apart."""
    spaced = np.geomspace if low > 0 and high > 2 * low else np.linspace
    found = spaced(low, high, count + 2)
    return [float(value) for value in found[1:-1] if low < value < high]


def look_closer(field: Field) -> None:
    """Look between trial values where a window or a gap may have been stepped over."""
    if field.key.whole:
        return
    field.look(value for pair in _corner_changes(field.ordered) for value in between(*pair))
    for _ in range(ROUNDS):
        found = list(_hidden(field.ordered))
        values = [value for low, high in found if _apart(low, high) for value in between(low, high)]
        if not values:
            return
        field.look(values)


def _look_at_turns(field: Field) -> None:
    """Look where a word that holds turns into another one that does, until the two are close."""
    for _ in range(TURNS):
        values = [value for pair in _turns(field.ordered) if _wide(pair, 0.0) for value in _inside(pair)]
        if not values:
            return
        field.look(values)


def _corner_changes(trials: list[Trial]) -> Iterable[tuple[float, float]]:
    """Return the neighbours that both hold, between which another case becomes the worst of a finding."""
    for one, other in pairwise(trials):
        if (
            one.holds
            and other.holds
            and any(other.words[id].worst != word.worst for id, word in one.words.items())
        ):
            yield one.value, other.value


def _turns(trials: list[Trial]) -> Iterable[tuple[Trial, Trial]]:
    """Return the neighbours that both hold, by other words: a third word, which does not, may lie between."""
    for one, other in pairwise(trials):
        if (
            one.holds
            and other.holds
            and any(other.words[id].verdict is not word.verdict for id, word in one.words.items())
        ):
            yield one, other


def look_everywhere(field: Field) -> None:
    """Find every hole wider than a two hundredth of its interval: by the word at so many values inside it."""
    if field.key.whole:
        return
    for _ in range(ROUNDS):
        known = len(list(_ends(field.ordered)))
        field.look(_around(field.key))
        for good, run in _runs(field.ordered):
            (_look_inside if good else _look_outside)(field, run)
        _look_at_turns(field)
        sharpen(field)
        if len(list(_ends(field.ordered))) == known:
            return


def _around(key: Movable) -> list[float]:
    low, high = key.span
    near = [key.now * (1.0 + apart * side) for apart in AROUND for side in (-1, 1)] if key.now else []
    return [value for value in near if low <= value <= high]


def _runs(trials: list[Trial]) -> Iterable[tuple[bool, list[Trial]]]:
    """Return the runs of trials that the sheet can have, and whether all of a run hold or none does."""
    for (good, readable), group in groupby(trials, key=lambda trial: (trial.holds, trial.bench is not None)):
        run = list(group)
        if readable and len(run) > 1:
            yield good, run


def _crowded(run: list[Trial], steps: int, ratios: int) -> list[float]:
    low, high = run[0].value, run[-1].value
    even = [float(value) for value in np.linspace(low, high, steps + 2)[1:-1]]
    return even + (between(low, high, count=ratios) if low > 0 and high > 2 * low else [])


def _look_inside(field: Field, run: list[Trial]) -> None:
    field.judge([*run, *field.read(_crowded(run, *INSIDE))])


def _look_outside(field: Field, run: list[Trial]) -> None:
    """Look for values that hold where none does: first by what fails most often, then by the rest where that holds."""
    new = field.read(_crowded(run, *OUTSIDE))
    often = {check.id: sum(check.id in trial.failing for trial in run) for check in field.checks}
    for check in sorted(field.checks, key=lambda check: -often[check.id]):
        field.judge([trial for trial in new if trial.holds], [check])


def _hidden(trials: list[Trial]) -> Iterable[tuple[float, float]]:
    """Return the neighbourhoods of trials that fail less, or hold more narrowly, than those beside them."""
    for before, here, after in zip(trials, trials[1:], trials[2:], strict=False):
        if not before.holds == here.holds == after.holds:
            continue
        beside = (before.excess, after.excess)
        # What rounding alone moves up and down hides nothing.
        flat = FLAT * (1.0 + abs(here.excess))
        least, most = here.excess < min(beside) - flat, here.excess > max(beside) + flat
        if (most if here.holds else least) and np.isfinite(here.excess):
            yield from ((before.value, here.value), (here.value, after.value))


def _apart(low: float, high: float) -> bool:
    return high - low > 1e-3 * max(abs(low), abs(high))


def sharpen(field: Field) -> None:
    """Look between each value that holds and its neighbour that does not, until they are close."""
    if field.key.whole:
        return
    floor = CLOSELY * resolution(field.key)
    while True:
        pairs = list(_ends(field.ordered))
        values = [value for pair in pairs if _wide(pair, floor) for value in _inside(pair)]
        # Only what fails at one end is asked for in between; the others are asked for once the ends are found.
        failing = {id for pair in pairs for trial in pair for id in trial.failing}
        field.judge(field.read(values), [check for check in field.checks if check.id in failing])
        if not values:
            field.judge(trial for pair in pairs for trial in pair)
            if _values(pairs) == _values(_ends(field.ordered)):
                return


def _ends(trials: list[Trial]) -> Iterable[tuple[Trial, Trial]]:
    return ((one, other) for one, other in pairwise(trials) if one.holds is not other.holds)


def _values(pairs: Iterable[tuple[Trial, Trial]]) -> list[tuple[float, float]]:
    return [(one.value, other.value) for one, other in pairs]


def _wide(pair: tuple[Trial, Trial], floor: float) -> bool:
    low, high = pair[0].value, pair[1].value
    if not low or not high:
        # No ratio leads to zero: what is closer to it than the smallest value believed is not told from it.
        return high - low > floor / CLOSELY * (1.0 + CLOSELY)
    return high - low > max(CLOSELY * max(abs(low), abs(high)), floor)


def _inside(pair: tuple[Trial, Trial]) -> list[float]:
    return between(pair[0].value, pair[1].value)
