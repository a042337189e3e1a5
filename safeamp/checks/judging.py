"""The one place where numbers become words: nan first, then stop, then the corners."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from safeamp.findings import AsBuilt, Measure, Sense, Verdict
from safeamp.limits import Limit
from safeamp.quantities import Number

Cases = npt.NDArray[np.float64]
Marks = npt.NDArray[np.bool_]

#: A value this close to a level, relative to it, counts as at the level: rounding is not a finding.
CLOSE = 1e-9


@dataclass(frozen=True, eq=False)
class Judgement:
    """A word, why it is not a better one, and the case that is worst."""

    verdict: Verdict
    because: tuple[str, ...]
    worst: int
    unbounded: bool


@dataclass(frozen=True, eq=False)
class Bounds:
    """Go and stop of a measure over its cases; an absent level is nan."""

    low: Cases
    go: Cases
    stop: Cases
    sense: Sense


def _spread(value: object, count: int) -> Cases:
    filled = np.nan if value is None else value
    return np.broadcast_to(np.asarray(filled, dtype=float), (count,))


def bounds_of(measure: Measure, limit: Limit, count: int) -> Bounds:
    """Return the bounds of a measure: its own where it has some, else those of its limit."""
    go = limit.go if measure.go is None else measure.go
    stop = None if measure.without_stop else (limit.stop if measure.stop is None else measure.stop)
    low = go[0] if isinstance(go, tuple) else None
    high = go[1] if isinstance(go, tuple) else go
    upper = stop[1] if isinstance(stop, tuple) else stop
    return Bounds(_spread(low, count), _spread(high, count), _spread(upper, count), limit.sense)


def _beyond(value: Cases, level: Cases, sense: Sense) -> Marks:
    """Return where a value lies beyond a level; nowhere where there is no level."""
    slack = np.where(np.isfinite(level), CLOSE * np.abs(level), 0.0)
    with np.errstate(invalid="ignore"):
        marks: Marks = value < level - slack if sense == "at least" else value > level + slack
    return marks


def _outside_go(value: Cases, bounds: Bounds) -> Marks:
    """Return where a value is not within the go level; where there is none, nothing is."""
    outside = _beyond(value, bounds.go, bounds.sense) | np.isnan(bounds.go)
    if bounds.sense == "between":
        outside |= _beyond(value, bounds.low, "at least")
    return outside


def badness(value: Cases, bounds: Bounds) -> Cases:
    """Return how bad each case is: larger is worse, nan worst of all."""
    level = np.where(np.isfinite(bounds.stop), bounds.stop, bounds.go)
    reference = np.where(np.isfinite(level), level, 0.0)
    bad = reference - value if bounds.sense == "at least" else value - reference
    if bounds.sense == "between":
        bad = np.maximum(bad, np.where(np.isfinite(bounds.low), bounds.low - value, -np.inf))
    bad = bad + _tier(bounds) * _span(bad)
    return np.where(np.isnan(bad), np.inf, bad)


def _tier(bounds: Bounds) -> Cases:
    """Return 2 where every value is a stop, 1 where no value can be go, else 0."""
    never_go, stop = _never(bounds.go, bounds.sense), _never(bounds.stop, bounds.sense)
    return np.where(stop, 2.0, np.where(never_go, 1.0, 0.0))


def _span(bad: Cases) -> float:
    """Return more than the distance between any two cases, and no more than that: rounding must not hide the worse."""
    finite = np.abs(bad[np.isfinite(bad)])
    return 2.0 * float(np.max(finite, initial=0.0)) + 1.0


def _worst(bad: Cases, value: Cases) -> int:
    """Return the worst case; a corner that differs from the nominal by rounding alone is none."""
    worst = int(np.argmax(bad))
    slack = CLOSE * abs(value[0]) if np.isfinite(value[0]) else 0.0
    return 0 if bad[worst] <= bad[0] + slack else worst


def _never(level: Cases, sense: Sense) -> Marks:
    """Return where a level is set so that no value can keep it."""
    marks: Marks = np.isposinf(level) if sense == "at least" else np.isneginf(level)
    return marks


def judge(measure: Measure, limit: Limit, guessed: Marks, words: tuple[str, ...] = ()) -> Judgement:
    """Return the word of a measure.

    Parameters
    ----------
    measure : Measure
        Values over the cases, index 0 nominal.
    limit : Limit
        The limit of its id.
    guessed : numpy.ndarray
        Shape (cases,): True where a guessed or assumed value is moved away from its nominal.
    words : tuple of str
        What moves in those cases, for the text.

    Returns
    -------
    Judgement
        stop when the nominal is beyond stop; go when it is within go and no case is beyond stop; unverified when
        only cases with a moved guess are beyond; caution between. Remarks can only make it worse.
    """
    value = _spread(measure.value, len(guessed))
    bounds = bounds_of(measure, limit, len(guessed))
    worst = _worst(badness(value, bounds), value)
    unbounded = bool(np.isinf(value[0])) and bounds.sense != "at least"
    verdict, because = _word(measure, value, bounds, guessed, words)
    for remark in measure.remarks:
        because = (*because, remark.because)
        verdict = max(verdict, remark.at_best)
    return Judgement(verdict, because, worst, unbounded)


def _word(
    measure: Measure, value: Cases, bounds: Bounds, guessed: Marks, words: tuple[str, ...]
) -> tuple[Verdict, tuple[str, ...]]:
    if measure.word is not None:
        return measure.word, ()
    if np.isnan(value[0]) or _level_is_unknown(measure):
        return Verdict.UNVERIFIED, ("the value could not be computed",)
    beyond = _beyond(value, bounds.stop, bounds.sense)
    if _stopped(value, bounds)[0]:
        verdict, because = _as_built(measure.as_built, value[0])
    else:
        verdict, because = _from_corners(measure, value, bounds, beyond, guessed, words)
    if verdict.clears and (np.any(np.isnan(value)) or _enters_unknown(measure)):
        return Verdict.UNVERIFIED, (_unknown_text(measure),)
    return verdict, because


def each_word(measure: Measure, limit: Limit, count: int) -> npt.NDArray[np.int64]:
    """Return the word of each case as if it were the only one: by its own value, nothing moved.

    Parameters
    ----------
    measure : Measure
        Values over the cases.
    limit : Limit
        The limit of its id.
    count : int
        Number of cases.

    Returns
    -------
    numpy.ndarray
        Shape (count,): words as integers of `Verdict`, remarks included.
    """
    value, bounds = _spread(measure.value, count), bounds_of(measure, limit, count)
    words = np.where(_outside_go(value, bounds), int(Verdict.CAUTION), int(Verdict.GO))
    words = np.where(_stopped(value, bounds), _without_excuse(measure.as_built, value), words)
    unknown = np.isnan(value) if measure.unknown is None else np.isnan(value) | (measure.unknown != 0)
    words = np.where((words <= Verdict.CAUTION) & unknown, int(Verdict.UNVERIFIED), words)
    if measure.word is not None:
        words = np.full(count, int(measure.word))
    return np.maximum(words, max((int(one.at_best) for one in measure.remarks), default=0))


def _stopped(value: Cases, bounds: Bounds) -> Marks:
    unbounded: Marks = np.isposinf(value) & (bounds.sense != "at least")
    return unbounded | _beyond(value, bounds.stop, bounds.sense)


def _without_excuse(as_built: AsBuilt | None, value: Cases) -> npt.NDArray[np.int64]:
    """Return the words of cases beyond stop: caution where the maker's own ratings cover them."""
    ceiling = as_built.ceiling if as_built is not None and as_built.holds else np.nan
    return np.where(value <= ceiling * (1.0 + CLOSE), int(Verdict.CAUTION), int(Verdict.STOP))


def _level_is_unknown(measure: Measure) -> bool:
    """Whether a level of the measure's own is no number: a level that is absent is None, never nan."""
    return any(bool(np.any(np.isnan(level))) for level in (measure.go, measure.stop) if level is not None)


def _enters_unknown(measure: Measure) -> bool:
    return measure.unknown is not None and bool(np.any(measure.unknown))


def _unknown_text(measure: Measure) -> str:
    if _enters_unknown(measure):
        return "the load enters a part of the safe area of which the data sheet says nothing"
    return "a corner of the tolerances could not be computed"


def _as_built(as_built: AsBuilt | None, nominal: float) -> tuple[Verdict, tuple[str, ...]]:
    if as_built is None:
        return Verdict.STOP, ()
    if as_built.holds and nominal <= as_built.ceiling * (1.0 + CLOSE):
        because = (
            "as built by its maker for this load: no loud sustained bass, no lower impedance, no higher mains"
        )
        return Verdict.CAUTION, (because,)
    if as_built.holds:
        return Verdict.STOP, (f"above {as_built.ceiling:g} even the maker's own rating does not excuse it",)
    missing = ", ".join(as_built.missing)
    return Verdict.STOP, (f"not excused as built by its maker: {missing}",)


def _from_corners(
    measure: Measure, value: Cases, bounds: Bounds, beyond: Marks, guessed: Marks, words: tuple[str, ...]
) -> tuple[Verdict, tuple[str, ...]]:
    excused = _without_excuse(measure.as_built, value) < Verdict.STOP
    if np.any(beyond & ~guessed) or (np.any(beyond) and np.all(excused[beyond])):
        return Verdict.CAUTION, (f"beyond the stop level at {measure.corner}",)
    if np.any(beyond):
        moved = ", ".join(words) or "a guess"
        return Verdict.UNVERIFIED, (
            f"beyond the stop level if {moved} is at the other end of its range: measure it",
        )
    outside = _outside_go(value, bounds)
    if bool(outside[0]):
        return Verdict.CAUTION, ()
    if measure.everywhere and np.any(outside):
        return Verdict.CAUTION, (f"not so at {measure.corner}",)
    return Verdict.GO, ()


def missing_word(measure: Measure, limit: Limit) -> Verdict:
    """Return the word of a finding whose input is missing: what is there may already be a stop."""
    value = _spread(measure.value, 1)
    bounds = bounds_of(measure, limit, 1)
    if measure.word is None and bool(_beyond(value, bounds.stop, bounds.sense)[0]):
        return Verdict.STOP
    word = Verdict.UNVERIFIED if limit.not_given is None else Verdict.from_word(limit.not_given)
    return max(word, *(remark.at_best for remark in measure.remarks), Verdict.CAUTION)


def nominal_bound(value: Number | None) -> float | None:
    """Return a finite nominal level, None where there is none."""
    if value is None:
        return None
    first = float(np.asarray(value, dtype=float).flat[0])
    return first if np.isfinite(first) else None
