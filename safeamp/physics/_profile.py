"""The sum of squares of an exponential through readings, over every time constant that they could tell apart."""

from __future__ import annotations

from collections.abc import Callable
from functools import cached_property
from typing import NamedTuple

import numpy as np

from safeamp.physics._checks import Array

#: Length of the log over the time constant; below the slowest a curve is a straight line, to all purposes.
SLOWEST = 1e-3
#: So many time constants between the nearest readings: a faster curve is a step.
STEP = 20.0
#: Steepest growth that is looked at, in time constants over the whole log.
GROWTH = 40.0
_A_DECADE = 25
_ZOOMS, _CLOSER = 9, 17
_NEAR = 4


class Curve(NamedTuple):
    """One curve: its bend, where it starts and ends, degC, its time constant, s, its squares, K2, its rise, K.

    The rise is that over the log; `rise_error` is its standard error for readings of a standard error of one.
    """

    bend: float
    start: float
    end: float
    time_constant: float
    squares: float
    rise: float
    rise_error: float


class _Fits(NamedTuple):
    """Straight lines through the readings over the bent time of each bend."""

    start: Array
    rise: Array
    squares: Array
    end: Array
    rise_variance: Array
    end_variance: Array


class Profile:
    """Readings, and what fits them.

    The bend of a curve is the length of the log over its time constant: positive where it settles, near zero where it
    is a straight line, negative where it grows faster and faster. Over the share u(x) = expm1(-bend x)/expm1(-bend) of
    its rise every curve is a straight line, so the other two unknowns need no search.
    """

    def __init__(self, time: Array, sink: Array) -> None:
        self.time, self.sink = time, sink
        self.length = float(time[-1] - time[0])
        self.x = (time - time[0]) / self.length
        self.middle = float(sink.mean())
        fastest = STEP / float(np.min(np.diff(self.x)))
        self.bends = np.geomspace(SLOWEST, fastest, int(_A_DECADE * np.log10(fastest / SLOWEST)))

    def fits(self, bends: Array) -> _Fits:
        """Return the least squares for each bend in closed form."""
        full = -1.0 / np.expm1(-bends)
        bent = -np.expm1(-bends[:, None] * self.x) * full[:, None]
        mean = bent.mean(axis=1)
        apart = bent - mean[:, None]
        spread = np.sum(apart * apart, axis=1)
        warm = self.sink - self.middle
        rise = apart @ warm / spread
        left = warm - rise[:, None] * apart
        start = self.middle - rise * mean
        return _Fits(
            start,
            rise,
            np.sum(left * left, axis=1),
            start + full * rise,
            1.0 / spread,
            1.0 / self.x.size + (full - mean) ** 2 / spread,
        )

    @cached_property
    def on_grid(self) -> _Fits:
        """The fits of the settling curves."""
        return self.fits(self.bends)

    @cached_property
    def settling(self) -> Curve:
        """The best curve that settles, or the straight line where that is best."""
        return self._best(self.bends, self.on_grid.squares)

    def left_by_settling(self) -> Array:
        """Return what the best settling curve leaves of the readings, K."""
        bend = self.settling.bend
        bent = np.expm1(-bend * self.x) / np.expm1(-bend)
        left: Array = self.sink - self.settling.start - self.settling.rise * bent
        return left

    @cached_property
    def best(self) -> Curve:
        """The best curve of all: one that settles, or one that grows faster and faster."""
        bends = -np.geomspace(SLOWEST, GROWTH, int(_A_DECADE * np.log10(GROWTH / SLOWEST)))
        growing = self._best(bends, self.fits(bends).squares)
        return min(self.settling, growing, key=lambda one: one.squares)

    def _best(self, bends: Array, squares: Array) -> Curve:
        place = int(np.argmin(squares))
        bend = _searched(bends, place, lambda some: -self.fits(some).squares)[0]
        fit = self.fits(np.array([bend]))
        straight, step = bend <= 2.0 * SLOWEST, bend >= self.bends[-1] / 2.0
        rise = float(fit.rise[0])
        return Curve(
            bend,
            float(fit.start[0]),
            float(np.copysign(np.inf, rise)) if straight else float(fit.end[0]),
            np.inf if straight else np.nan if step else self.length / bend,
            float(fit.squares[0]),
            rise,
            float(np.sqrt(fit.rise_variance[0])),
        )

    def interval(self, allowed: float) -> tuple[float, float]:
        """Return the least and largest end value of a settling curve whose squares are worse by at most `allowed`, K2.

        For one bend these are a straight pair around its end; the widest pair over all bends is searched for.
        """
        most = self.settling.squares + allowed
        straight = self.fits(self.bends[:1])
        open_by = most - float(straight.squares[0])
        ends = []
        for side in (-1.0, 1.0):
            if open_by >= 0.0 and side * straight.rise[0] + np.sqrt(open_by * straight.rise_variance[0]) > 0:
                ends.append(side * np.inf)
            else:
                ends.append(side * self._furthest(most, side))
        return ends[0], ends[1]

    def _furthest(self, most: float, side: float) -> float:
        def reach(fit: _Fits) -> Array:
            room = most - fit.squares
            found = side * fit.end + np.sqrt(np.maximum(room, 0.0) * fit.end_variance)
            return np.where(room >= 0.0, found, -np.inf)

        bends = self._around_the_best
        found = reach(self.fits(bends))
        return _searched(bends, int(np.argmax(found)), lambda some: reach(self.fits(some)))[1]

    @cached_property
    def _around_the_best(self) -> Array:
        """The grid, and closer and closer around the best: good thermometers leave a pass narrower than its mesh."""
        near = np.geomspace(1e-12, 1.0, 12 * _NEAR)
        close = self.settling.bend * np.exp(np.concatenate([-near, [0.0], near]))
        found = np.unique(np.concatenate([self.bends, close]))
        inside: Array = found[(found >= self.bends[0]) & (found <= self.bends[-1])]
        return inside

    def within(self, allowed: float, span: float) -> bool:
        """Whether both halves of the interval are within a span."""
        low, high = self.interval(allowed)
        return bool(max(high - self.settling.end, self.settling.end - low) <= span)

    def continued(self, count: int, step: float) -> Profile:
        """Return the readings with further ones on the best settling curve."""
        if count == 0:
            return self
        best = self.settling
        more = self.time[-1] + step * np.arange(1, count + 1)
        left = np.exp(-(more - self.time[0]) / best.time_constant) if best.time_constant > 0.0 else 0.0 * more
        return Profile(
            np.concatenate([self.time, more]),
            np.concatenate([self.sink, best.end - (best.end - best.start) * left]),
        )


def _searched(bends: Array, place: int, height: Callable[[Array], Array]) -> tuple[float, float]:
    """Return where the highest value near a place of the grid stands, and how high it is."""
    low, high = bends[max(place - 1, 0)], bends[min(place + 1, bends.size - 1)]
    at, top = float(bends[place]), -np.inf
    for _ in range(_ZOOMS):
        some = np.linspace(low, high, _CLOSER)
        found = height(some)
        best = int(np.argmax(found))
        if found[best] > top:
            at, top = float(some[best]), float(found[best])
        low, high = some[max(best - 1, 0)], some[min(best + 1, some.size - 1)]
    return at, top
