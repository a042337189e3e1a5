"""Worst-case corners: every end of every tolerance that a finding reads, in one vectorised pass."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier, Entry, with_values
from safeamp.quantities import Origin

#: Up to so many toleranced inputs the corners are complete.
COMPLETE = 12
ESTIMATED = (Origin.GUESS, Origin.ASSUMED)

Rows = npt.NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Design:
    """Cases over the toleranced inputs.

    `rows` has shape (cases, keys): row 0 nominal, then each key alone at each of its ends (`alone` of them), then
    the corners. `guessed` marks the rows in which a guessed or assumed value is moved.
    """

    entries: tuple[Entry, ...]
    rows: Rows
    alone: int
    guessed: npt.NDArray[np.bool_]
    complete: bool = True

    @property
    def paths(self) -> tuple[str, ...]:
        """Key paths of the columns."""
        return tuple(entry.path for entry in self.entries)

    def applied_to(self, amplifier: Amplifier) -> Amplifier:
        """Return the amplifier with the cases in place of the nominal values."""
        columns = {path: np.ascontiguousarray(self.rows[:, place]) for place, path in enumerate(self.paths)}
        return with_values(amplifier, columns)

    def moved(self, case: int) -> dict[str, float]:
        """Return the values of a case that are not nominal, by key path."""
        return {
            entry.path: float(value)
            for entry, value in zip(self.entries, self.rows[case], strict=True)
            if value != entry.nominal
        }


def is_estimated(entry: Entry) -> bool:
    """Whether the value is a guess or an assumption."""
    return entry.origin in ESTIMATED


def ends(entry: Entry) -> tuple[float, ...]:
    """Return the levels of a value in the corners: its ends, and what may be worst between them."""
    return tuple(dict.fromkeys((entry.low, *entry.middle, entry.high)))


def _nominal(entries: Sequence[Entry]) -> Rows:
    return np.array([[entry.nominal for entry in entries]], dtype=float)


def _alone(entries: Sequence[Entry]) -> Rows:
    rows = []
    for place, entry in enumerate(entries):
        for level in ends(entry):
            row = _nominal(entries)[0]
            row[place] = level
            rows.append(row)
    return np.array(rows, dtype=float).reshape(len(rows), len(entries))


def factorial(entries: Sequence[Entry], levels: Iterable[tuple[float, ...]]) -> Rows:
    """Return every combination of the levels, one row a case."""
    grids = np.meshgrid(*[np.asarray(level, dtype=float) for level in levels], indexing="ij")
    return np.stack([grid.ravel() for grid in grids], axis=-1) if entries else np.empty((1, 0))


def _pinned(entries: Sequence[Entry]) -> Rows:
    """Return the corners with guesses and assumptions at their nominal values."""
    return factorial(entries, _held(entries, [ends(entry) for entry in entries]))


def _held(entries: Sequence[Entry], levels: Sequence[tuple[float, ...]]) -> list[tuple[float, ...]]:
    """Return the levels with guesses and assumptions held at their nominal values."""
    return [
        (entry.nominal,) if is_estimated(entry) else level
        for entry, level in zip(entries, levels, strict=True)
    ]


def _assemble(entries: Sequence[Entry], corners: Sequence[Rows], *, complete: bool) -> Design:
    alone = _alone(entries)
    rows = np.concatenate([_nominal(entries), alone, *corners])
    estimated = np.array([is_estimated(entry) for entry in entries], dtype=bool)
    nominal = _nominal(entries)
    guessed = np.any((rows != nominal) & estimated, axis=1)
    return Design(tuple(entries), rows, len(alone), guessed, complete)


def complete_design(entries: Sequence[Entry]) -> Design:
    """Return nominal, each key alone, and all corners (those with guesses pinned first)."""
    full = factorial(entries, [ends(entry) for entry in entries])
    pinned = [_pinned(entries)] if any(is_estimated(entry) for entry in entries) else []
    return _assemble(entries, [*pinned, full], complete=True)


def screening_design(entries: Sequence[Entry]) -> Design:
    """Return nominal and each key alone: the first look when there are too many keys for all corners."""
    return _assemble(entries, [], complete=False)


def searched_design(screen: Design, badness: npt.NDArray[np.float64]) -> Design:
    """Return corners complete over the keys that matter most, the others at their own worse end.

    Parameters
    ----------
    screen : Design
        Each key alone.
    badness : numpy.ndarray
        Shape (cases of `screen`,): larger is worse.

    Returns
    -------
    Design
        Where a result is monotone in each key, the worst corner is among its rows: every key stands at its worse end
        there. The keys of the largest effect are free besides, so that the worst of them together is found.
    """
    entries = screen.entries
    worse, effect = _worse_ends(screen, badness)
    free = set(np.argsort(-effect, kind="stable")[:COMPLETE].tolist())
    levels = [ends(entry) if place in free else (worse[place],) for place, entry in enumerate(entries)]
    found = [factorial(entries, levels)]
    if any(is_estimated(entry) for entry in entries):
        found.insert(0, factorial(entries, _held(entries, levels)))
    return _assemble(entries, found, complete=False)


def _worse_ends(
    screen: Design, badness: npt.NDArray[np.float64]
) -> tuple[list[float], npt.NDArray[np.float64]]:
    """Return for each key the end that is worse alone, and by how much its ends differ."""
    worse, effect = [], []
    row = 1
    for entry in screen.entries:
        levels = ends(entry)
        found = badness[row : row + len(levels)]
        worse.append(levels[int(np.argmax(found))])
        effect.append(float(np.ptp(np.append(found, badness[0]))) if np.all(np.isfinite(found)) else np.inf)
        row += len(levels)
    return worse, np.array(effect)


def read_by(entries: Iterable[Entry], reads: Iterable[str]) -> tuple[Entry, ...]:
    """Return the entries with a spread whose value, or whose list, was read."""
    seen = set(reads)
    return tuple(
        entry for entry in entries if entry.spread and (entry.path in seen or _list_of(entry.path) in seen)
    )


def _list_of(path: str) -> str:
    head, _, tail = path.rpartition(".")
    return head if tail.isdigit() else path
