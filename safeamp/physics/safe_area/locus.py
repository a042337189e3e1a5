"""The worst point of a load's locus against a boundary."""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np

from safeamp.physics._checks import Array
from safeamp.physics.safe_area.boundary import LEAST_VOLTAGE, Boundary

ZONES = ("current", "power", "second breakdown", "voltage", "unknown")
CURRENT, POWER, SECOND_BREAKDOWN, VOLTAGE, UNKNOWN = range(5)
_NO_CURRENT = 1e-5  # of the current rating: the order of leakage
_POINTS = 49
_ROUNDS = 3
_STEPS = np.arange(-4, 5) / 4.0

Locus = Callable[[Array], tuple[Array, Array]]
"""Angle in deg (cases, angles) -> device voltage and compared current there."""


@dataclass(frozen=True, eq=False)
class Use:
    """The worst point of a locus; every field has one value a case."""

    use: Any
    """Current over allowed current; infinite where current flows and none is allowed."""
    voltage: Any
    """V across the device at that point."""
    current: Any
    """A of the device at that point."""
    zone: Any
    """Index into ZONES of what rules at that point."""
    enters_unknown: Any
    """Whether current flows beyond the last point of the safe area, below the voltage rating."""


def _counted(current: Array, boundary: Boundary) -> Array:
    """Return the current, zero where it is not more than leakage."""
    return np.where(current <= _NO_CURRENT * boundary.rating.current, 0.0, current)


def _ratio(voltage: Array, current: Array, boundary: Boundary) -> Array:
    """Return the use, leakage left out."""
    return boundary.share(voltage, _counted(current, boundary))


def _reach(voltage: Array, current: Array, boundary: Boundary) -> Array:
    """Return the device voltage where current flows, minus infinity elsewhere."""
    return np.where(_counted(current, boundary) == 0, -np.inf, voltage)


def _climb(score: Callable[[Array], Array], coarse: Array, angles: Array) -> Array:
    """Return the angle (cases, 1) of the highest score, refined around the best of the coarse ones."""
    step = angles[1] - angles[0]
    best: Array = angles[np.argmax(coarse, axis=-1)][..., None]
    for _ in range(_ROUNDS):
        trial = np.clip(best + step * _STEPS, angles[0], angles[-1])
        found = np.argmax(score(trial), axis=-1)[..., None]
        best = np.take_along_axis(trial, found, axis=-1)
        step = step / 4.0
    return best


def _zone(voltage: Array, boundary: Boundary) -> Array:
    """Return the index of what rules at a device voltage."""
    positive = np.maximum(voltage, LEAST_VOLTAGE)
    power, second = boundary.power_line(positive), boundary.second_breakdown(positive)
    zone = np.where(power < boundary.rating.current, POWER, CURRENT)
    zone = np.where(second < np.minimum(power, boundary.rating.current), SECOND_BREAKDOWN, zone)
    zone = np.where(voltage > boundary.last, UNKNOWN, zone)
    return np.where(voltage > boundary.rating.voltage, VOLTAGE, zone)


def worst_use(*, locus: Locus, boundary: Boundary, low: float, high: float) -> Use:
    """Search a locus from `low` to `high` deg for its worst point and for how far it reaches.

    A grid of angles flatters, so the best of it is refined to a hundredth of its step. What reaches
    beyond the voltage rating, however short, is use without bound.
    """
    angles = np.linspace(low, high, _POINTS)
    voltage, current = locus(angles)
    worst = _climb(lambda a: _ratio(*locus(a), boundary), _ratio(voltage, current, boundary), angles)
    reach: Array = np.asarray(-np.inf)
    edge = np.fmin(boundary.last, boundary.rating.voltage)
    if not np.all(voltage <= edge):
        far = _climb(lambda a: _reach(*locus(a), boundary), _reach(voltage, current, boundary), angles)
        reach = _reach(*locus(far), boundary)
        worst = np.where(reach > boundary.rating.voltage, far, worst)
    return _at(worst, reach, locus, boundary)


def _at(angle: Array, reach: Array, locus: Locus, boundary: Boundary) -> Use:
    """Return what holds at the worst angle of a locus that carries current up to the voltage `reach`."""
    voltage, current = locus(angle)
    use = _ratio(voltage, current, boundary)
    enters = (reach > boundary.last) & (boundary.last < boundary.rating.voltage)
    fields = np.broadcast_arrays(use, voltage, current, _zone(voltage, boundary), enters)
    return Use(*(field[..., 0] for field in fields))
