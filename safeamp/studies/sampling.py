"""Random samples inside the tolerances."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Entry

Distribution = Literal["uniform", "normal"]
Rows = npt.NDArray[np.float64]

#: The ends of a tolerance in standard deviations of the normal distribution, which is cut off there.
ENDS = 2.0
DESCRIPTIONS: dict[Distribution, str] = {
    "uniform": "uniform: every value between the ends of its tolerance is equally likely",
    "normal": (
        "normal: most likely at the nominal value, each end of the tolerance at 2 standard deviations of its "
        "own side, nothing beyond"
    ),
}


@dataclass(frozen=True, eq=False)
class Spread:
    """Nominal values and ends of the varied inputs, each of shape (keys,)."""

    nominal: Rows
    low: Rows
    high: Rows

    @classmethod
    def of(cls, entries: tuple[Entry, ...]) -> Spread:
        """Return the spread of some entries."""
        columns = [[entry.nominal, entry.low, entry.high] for entry in entries]
        nominal, low, high = np.array(columns, dtype=float).reshape(-1, 3).T
        return cls(nominal, low, high)

    @property
    def width(self) -> Rows:
        """From end to end."""
        return self.high - self.low


def _uniform(spread: Spread, chances: Rows) -> Rows:
    return spread.low + chances * spread.width


def _normal(spread: Spread, chances: Rows) -> Rows:
    """Return a normal distribution in two halves, so that a lopsided tolerance keeps its nominal value likeliest.

    The halves meet without a step when each holds its share of the width.
    """
    from scipy.special import ndtr, ndtri

    below, above = spread.nominal - spread.low, spread.high - spread.nominal
    share = below / spread.width
    left = chances < share
    with np.errstate(divide="ignore", invalid="ignore"):
        part = np.where(left, 1.0 - chances / share, (chances - share) / (1.0 - share))
    deviations = ndtri(0.5 + part * (ndtr(ENDS) - 0.5))
    moved: Rows = spread.nominal + np.where(left, -below, above) * deviations / ENDS
    return moved


_QUANTILES: dict[Distribution, Callable[[Spread, Rows], Rows]] = {"uniform": _uniform, "normal": _normal}


def _uniform_deviation(spread: Spread) -> Rows:
    deviation: Rows = spread.width / np.sqrt(12.0)
    return deviation


def _normal_deviation(spread: Spread) -> Rows:
    """Return the standard deviations: moments of half a normal distribution cut off at `ENDS`."""
    from scipy.special import ndtr

    top, foot = 1.0 / np.sqrt(2.0 * np.pi), np.exp(-(ENDS**2) / 2.0) / np.sqrt(2.0 * np.pi)
    inside = ndtr(ENDS) - 0.5
    mean, square = (top - foot) / inside, 1.0 - ENDS * foot / inside
    below, above = (spread.nominal - spread.low) / ENDS, (spread.high - spread.nominal) / ENDS
    share = below / (below + above)
    first = mean * ((1.0 - share) * above - share * below)
    second = square * ((1.0 - share) * above**2 + share * below**2)
    deviation: Rows = np.sqrt(second - first**2)
    return deviation


@dataclass(frozen=True, eq=False)
class Sampler:
    """Draws independent values of some entries."""

    entries: tuple[Entry, ...]
    distribution: Distribution
    generator: np.random.Generator
    spread: Spread

    @classmethod
    def of(cls, entries: tuple[Entry, ...], distribution: Distribution, seed: int) -> Sampler:
        """Return a sampler; the same seed draws the same values."""
        return cls(entries, distribution, np.random.default_rng(seed), Spread.of(entries))

    def draw(self, count: int) -> Rows:
        """Return samples of shape (count, keys)."""
        chances = self.generator.random((count, len(self.entries)))
        # Rounding must not carry a value over the end that was read as possible.
        drawn = _QUANTILES[self.distribution](self.spread, chances)
        inside: Rows = np.clip(drawn, self.spread.low, self.spread.high)
        return inside

    @property
    def deviations(self) -> Rows:
        """Standard deviation of each input, known and not estimated from the samples; shape (keys,)."""
        by_name = {"uniform": _uniform_deviation, "normal": _normal_deviation}
        return by_name[self.distribution](self.spread)
