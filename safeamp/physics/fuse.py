"""Fuses of IEC 60127-2, judged by the gates between which they may act."""

from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative


@dataclass(frozen=True)
class Gates:
    """Time gates of one fuse characteristic.

    Parameters
    ----------
    multiples : tuple of float
        Multiples of the rated current, rising.
    fastest, slowest : tuple of float
        Shortest and longest pre-arcing time at each multiple, s; inf where the standard sets none.
    source, evidence : str
        Where the gates were read.

    Raises
    ------
    ValueError
        If the lengths differ, the multiples do not rise, the slowest times rise or a gate is turned around.
    """

    multiples: tuple[float, ...]
    fastest: tuple[float, ...]
    slowest: tuple[float, ...]
    source: str = ""
    evidence: str = ""

    def __post_init__(self) -> None:
        """Refuse a table that could not be looked up safely."""
        if not len(self.multiples) == len(self.fastest) == len(self.slowest) > 0:
            raise ValueError(f"gates must have one time of each kind for each multiple, got {self.multiples}")
        if any(not a < b for a, b in pairwise(self.multiples)):
            raise ValueError(f"multiples must rise, got {self.multiples}")
        if any(not a >= b for a, b in pairwise(self.slowest)):
            raise ValueError(f"slowest must not rise with the current, got {self.slowest}")
        if any(not 0 <= a <= b for a, b in zip(self.fastest, self.slowest, strict=True)):
            raise ValueError(f"fastest must lie from 0 to slowest, got {self.fastest} and {self.slowest}")


GATES = {
    "T": Gates(
        multiples=(1.5, 2.1, 2.75, 4.0, 10.0),
        fastest=(3600.0, 0.0, 0.6, 0.15, 0.02),
        slowest=(np.inf, 120.0, 10.0, 3.0, 0.3),
        source="IEC 60127-2 sheet 3 as printed in two makers' sheets",
        evidence="seen",
    ),
    "F": Gates(
        multiples=(2.1, 2.75, 4.0, 10.0),
        fastest=(0.0, 0.05, 0.01, 0.0),
        slowest=(1800.0, 2.0, 0.3, 0.02),
        source="IEC 60127-2 sheet 2",
        evidence="memory",
    ),
}
"""Gates of glass fuses 5 x 20 mm by letter."""


def slowest_time(*, times_rating: ArrayLike, gates: Gates) -> Array:
    """Return the time, s, after which the fuse has acted for certain.

    Between two gates the longer time of the lower one holds; inf below the first that sets a longest time.

    Parameters
    ----------
    times_rating : array_like
        Current over rated current, ratio, >= 0; nan gives nan.
    gates : Gates
        The characteristic.

    Raises
    ------
    ValueError
        If `times_rating` is negative.

    References
    ----------
    IEC 60127-2; the gates of `gates.source`.
    """
    non_negative(times_rating=times_rating)
    ratio = array(times_rating)
    times = np.array((np.inf, *gates.slowest))
    found = times[np.searchsorted(np.array(gates.multiples), ratio, side="right")]
    return np.where(np.isnan(ratio), np.nan, found)[()]


def fastest_time(*, times_rating: ArrayLike, gates: Gates) -> Array:
    """Return the time, s, before which the fuse does not act.

    A smaller current is never faster, so the longest minimum of all gates from this current up holds. At or
    below its rating a fuse does not act (inf); above the last gate nothing is promised (0).

    Parameters
    ----------
    times_rating : array_like
        Current over rated current, ratio, >= 0; nan gives nan.
    gates : Gates
        The characteristic.

    Raises
    ------
    ValueError
        If `times_rating` is negative.

    References
    ----------
    IEC 60127-2; the gates of `gates.source`.
    """
    non_negative(times_rating=times_rating)
    ratio = array(times_rating)
    times = np.maximum.accumulate(np.array((*gates.fastest, 0.0))[::-1])[::-1]
    found = times[np.searchsorted(np.array(gates.multiples), ratio, side="left")]
    found = np.where(ratio <= 1.0, np.inf, found)
    return np.where(np.isnan(ratio), np.nan, found)[()]
