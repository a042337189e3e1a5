"""What pulse curves add to the DC safe area, for a pulse of half a cycle."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, fields
from itertools import pairwise
from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, positive, refuse
from safeamp.physics.heat import foster_impedance
from safeamp.physics.safe_area.boundary import LEAST_VOLTAGE, Boundary, boundary, over
from safeamp.physics.safe_area.rating import UNDER, Rating, derating

Points = tuple[tuple[float, float], ...]


@dataclass(frozen=True, eq=False)
class Pulse:
    """A repeated pulse and what the data sheet says of it; numbers or arrays of cases, curves plain numbers."""

    duration: Any
    """s, > 0: half a cycle."""
    junction: Any
    """degC from which every pulse starts: the mean junction temperature."""
    curves: tuple[tuple[float, Points], ...]
    """Duration (s) and points (V, A) of each curve, by rising duration and rising voltage."""
    transient: Points = ()
    """Foster pairs (K/W, s) from junction to case; empty when not given."""

    def __post_init__(self) -> None:
        """Refuse curves that cannot be looked up."""
        positive(duration=self.duration)
        if not self.curves:
            raise ValueError("curves must have at least one duration with its points")
        for (shorter, _), (longer, _) in pairwise(self.curves):
            refuse("duration of a curve", longer, array(longer) <= shorter, "above the one before it")
        for length, points in self.curves:
            positive(duration_of_a_curve=length)
            for volts, amperes in points:
                positive(pulse_voltage=volts, pulse_current=amperes)


def _logarithm(voltage: Array, points: Points) -> Array:
    """Return the logarithm of a curve's current; before its first point that point's, nothing beyond the last."""
    volts, amperes = np.log(np.asarray(points, dtype=float)).T
    found: Array = np.interp(np.log(voltage), volts, amperes, right=-np.inf)
    return np.where(np.isnan(voltage), np.nan, found)


def _between(duration: Array, voltage: Array, curves: tuple[tuple[float, Points], ...]) -> Array:
    """Return the logarithm of the current at a duration; minus infinity where no curve says anything."""
    lines = [(length, _logarithm(voltage, points)) for length, points in curves]
    nothing = np.asarray(-np.inf) + 0.0 * duration
    found = np.where(duration <= lines[0][0], lines[0][1], nothing)
    for (shorter, more), (longer, less) in pairwise(lines):
        share = np.log(duration / shorter) / np.log(longer / shorter)
        with np.errstate(invalid="ignore"):
            both = more + share * (less - more)
        known = np.where(np.isneginf(more) | np.isneginf(less), -np.inf, both)
        inside = (duration > shorter) & (duration <= longer)
        found = np.where(inside, np.where(duration == longer, less, known), found)
    return found + 0.0 * voltage


@dataclass(frozen=True, eq=False)
class PulsedBoundary(Boundary):
    """A DC boundary that a current above its steady part may exceed for the length of a pulse."""

    pulse: Pulse
    steady: Any
    """A that flows all the time: the idle current of the device."""

    def pulse_allowed(self, voltage: Array) -> Array:
        """Return the current allowed for the pulse, A: never less than the DC curve allows for good."""
        positive_voltage = np.maximum(voltage, LEAST_VOLTAGE)
        rating, pulse = self.rating, self.pulse
        left = derating(
            case_temperature=pulse.junction, power_at=rating.power_at, junction_limit=rating.junction_limit
        )
        curve = left * np.exp(_between(pulse.duration, positive_voltage, pulse.curves))
        if pulse.transient:
            span = left * (array(rating.junction_limit) - rating.power_at)
            curve = np.minimum(curve, span / (_impedance(pulse) * positive_voltage))
        within = np.where(voltage <= rating.voltage, np.minimum(curve, rating.current), 0.0)
        allowed: Array = np.maximum(within, self.allowed(voltage))
        return allowed

    def share(self, voltage: Array, current: Array) -> Array:
        """Return the use: the steady part against the DC curve, what exceeds it against the pulse curve."""
        for_good = super().share(voltage, current)
        steady = np.minimum(current, self.steady)
        in_pulse = over(current - steady, self.pulse_allowed(voltage))
        return np.minimum(for_good, super().share(voltage, steady) + in_pulse)


def _impedance(pulse: Pulse) -> Array:
    """Return the transient thermal impedance at the end of the pulse, K/W."""
    pairs = np.asarray(pulse.transient, dtype=float)
    return foster_impedance(resistances=pairs[:, 0], time_constants=pairs[:, 1], time=pulse.duration)


def pulsed(area: Boundary, pulse: Pulse, steady: ArrayLike) -> PulsedBoundary:
    """Return a boundary with a pulse and the current that flows all the time, A, added."""
    given = {item.name: getattr(area, item.name) for item in fields(Boundary)}
    return PulsedBoundary(**given, pulse=pulse, steady=steady)


def _contradictions(rating: Rating, curves: tuple[tuple[float, Points], ...]) -> Iterator[str]:
    """Yield where a shorter pulse may be less than a longer one, or a pulse less than a direct current."""
    for (shorter, points), (longer, below) in pairwise(curves):
        low, high = points[0][0], min(points[-1][0], below[-1][0])
        shared = np.array([volts for volts, _ in (*points, *below) if low <= volts <= high])
        if np.any(_logarithm(shared, points) < _logarithm(shared, below) + np.log(UNDER)):
            yield f"the curve at {1e3 * shorter:g} ms lies under the one at {1e3 * longer:g} ms"
    area = boundary(rating, rating.power_at)
    for length, points in curves if rating.points else ():
        for volts, amperes in points:
            known = volts <= np.fmin(area.last, rating.voltage)
            if np.any(known & (amperes < UNDER * area.allowed(array(volts)))):
                yield f"the curve at {1e3 * length:g} ms lies under the DC curve at {volts:g} V"


def curves_problem(*, rating: Rating, curves: tuple[tuple[float, Points], ...]) -> str | None:
    """Return in words why pulse curves contradict each other or the DC curve, or None when they do not.

    Parameters
    ----------
    rating : Rating
        Ratings and DC safe area of the device.
    curves : tuple of pairs
        Duration (s) and points (V, A) of each curve, by rising duration.

    Returns
    -------
    str or None
        The first contradiction; 5 % are left for reading a printed curve.

    References
    ----------
    Derived: a device that stands a pulse stands the same pulse for a shorter time.
    """
    return next(_contradictions(rating, curves), None)
