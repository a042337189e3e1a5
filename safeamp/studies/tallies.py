"""What is kept of many samples: counts, a histogram, sums of products; its size does not grow with their number."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from functools import cached_property

import numpy as np
import numpy.typing as npt

from safeamp import answers
from safeamp.answers import Chance
from safeamp.findings import Verdict

Values = npt.NDArray[np.float64]
Words = npt.NDArray[np.int64]

#: Bins of the histogram; what is outside the range of the first samples, widened, has a bin on each side.
BINS = 2000
#: By so much of their range the first samples' range is widened on each side.
WIDER = 0.25
LEVEL = 0.95
INTERVAL = "Clopper-Pearson, 95 %"


def chance(count: int, samples: int) -> Chance:
    """Return the share of the samples with its exact interval.

    References
    ----------
    C. J. Clopper, E. S. Pearson, Biometrika 26 (1934) 404: bounds from the beta distribution; memory.
    """
    from scipy.special import betaincinv

    tail = (1.0 - LEVEL) / 2.0
    low = 0.0 if count == 0 else float(betaincinv(count, samples - count + 1, tail))
    high = 1.0 if count == samples else float(betaincinv(count + 1, samples - count, 1.0 - tail))
    return Chance(count / samples, low, high)


def certain(word: Verdict) -> dict[Verdict, Chance]:
    """Return the chances of what is the same in every sample."""
    return {one: Chance(*(3 * (float(one is word),))) for one in Verdict}


@dataclass
class WordTally:
    """How often each word was found."""

    counts: Words = field(default_factory=lambda: np.zeros(len(Verdict), dtype=np.int64))

    def add(self, words: Words) -> None:
        """Count the words of some samples."""
        self.counts += np.bincount(words, minlength=len(Verdict))

    @property
    def chances(self) -> dict[Verdict, Chance]:
        """Chance of each word."""
        samples = int(self.counts.sum())
        return {word: chance(int(self.counts[word]), samples) for word in Verdict}

    @property
    def cleared(self) -> Chance:
        """Chance of a word that clears a step."""
        count = sum(int(self.counts[word]) for word in Verdict if word.clears)
        return chance(count, int(self.counts.sum()))


@dataclass
class Histogram:
    """Counts over a fixed range; its first bin holds all below, its last all above and what is without bound."""

    low: float = 0.0
    width: float = 0.0
    counts: Words = field(default_factory=lambda: np.zeros(BINS + 2, dtype=np.int64))
    least: float = np.inf
    most: float = -np.inf

    def add(self, values: Values) -> None:
        """Count values, nan left out; the first ones with a spread set the range."""
        known = values[~np.isnan(values)]
        if not known.size:
            return
        self.least, self.most = min(self.least, float(known.min())), max(self.most, float(known.max()))
        if not self.counts.any():
            self._set_range(known[np.isfinite(known)])
        self.counts += np.bincount(self._bins(known), minlength=BINS + 2)

    def _set_range(self, values: Values) -> None:
        if values.size:
            range_ = float(np.ptp(values))
            self.low = float(values.min()) - WIDER * range_
            self.width = (1.0 + 2.0 * WIDER) * range_ / BINS

    def _bins(self, values: Values) -> Words:
        with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
            place = np.floor((values - self.low) / self.width)
        place = np.where(np.isnan(place), 0.0, place)  # the one value of a range without width
        return np.clip(place + 1.0, 0.0, BINS + 1.0).astype(np.int64)

    @property
    def bins(self) -> answers.Histogram | None:
        """The bins as an answer; None where there is one value or none."""
        if self.width == 0.0:
            return None
        inside = tuple(int(count) for count in self.counts[1:-1])
        return answers.Histogram(self.low, self.width, inside, int(self.counts[0] + self.counts[-1]))

    def quantile(self, share: float) -> float | None:
        """Return the value that this share of the samples does not exceed; None without values.

        Right to `resolution`; inf where that many are without bound.
        """
        total = int(self.counts.sum())
        if total == 0:
            return None
        if self.width == 0.0 and np.isfinite(self.most):
            return self.most
        running = np.cumsum(self.counts)
        bin_ = int(np.searchsorted(running, share * total))
        if bin_ == 0:
            return self.least
        if bin_ > BINS:
            return self.most
        before = float(running[bin_] - self.counts[bin_])
        inside = (share * total - before) / float(self.counts[bin_])
        return min(max(self.low + (bin_ - 1.0 + inside) * self.width, self.least), self.most)


@dataclass(frozen=True, eq=False)
class Batch:
    """Some samples: the inputs in units of their own width about their nominal values, shape (samples, keys)."""

    inputs: Values

    @cached_property
    def sums(self) -> tuple[int, Values, Values]:
        """Number, sums and sums of products of the inputs."""
        return len(self.inputs), self.inputs.sum(axis=0), self.inputs.T @ self.inputs

    def only(self, marks: npt.NDArray[np.bool_]) -> Batch:
        """Return the samples marked."""
        return self if marks.all() else Batch(self.inputs[marks])


class LinearTally:
    """Sums for a straight-line fit of one value to the inputs."""

    def __init__(self, keys: int, nominal: float) -> None:
        self._nominal = nominal if np.isfinite(nominal) else 0.0
        self._count, self._inputs, self._products = 0, np.zeros(keys), np.zeros((keys, keys))
        self._value, self._square, self._mixed = 0.0, 0.0, np.zeros(keys)

    def add(self, batch: Batch, values: Values) -> None:
        """Add the samples with a finite value."""
        finite = np.isfinite(values)
        used, moved = batch.only(finite), values[finite] - self._nominal
        count, inputs, products = used.sums
        self._count += count
        self._inputs = self._inputs + inputs
        self._products = self._products + products
        self._value += float(moved.sum())
        self._square += float(moved @ moved)
        self._mixed = self._mixed + moved @ used.inputs

    def shares(self, columns: Sequence[int], deviations: Values) -> tuple[Values, float] | None:
        """Return the squared standardized regression coefficients of some inputs, and R squared.

        Parameters
        ----------
        columns : sequence of int
            The inputs that the value depends on.
        deviations : numpy.ndarray
            Shape (keys,): standard deviation of each input, in the units of the batch.

        Returns
        -------
        tuple or None
            Shares of the variance, shape (columns,), that add up to R squared: the exact sensitivities of a value
            that is linear in its inputs. None where the value does not vary or the samples are too few.

        References
        ----------
        A. Saltelli et al., Global Sensitivity Analysis: The Primer, Wiley, 2008, ch. 1; memory.
        """
        if self._count <= len(columns) + 1:
            return None
        means, mean = self._inputs / self._count, self._value / self._count
        variance = self._square / self._count - mean**2
        if variance <= 1e-24 * max(self._nominal**2, self._square / self._count):
            return None
        covariance = (self._products / self._count - np.outer(means, means))[np.ix_(columns, columns)]
        mixed = (self._mixed / self._count - means * mean)[list(columns)]
        slopes = np.linalg.lstsq(covariance, mixed, rcond=None)[0]
        explained = min(float(slopes @ mixed) / variance, 1.0)
        parts = (slopes * deviations[list(columns)]) ** 2
        return (explained * parts / parts.sum(), explained) if parts.sum() > 0.0 else None
