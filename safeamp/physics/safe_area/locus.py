"""What is said of the worst point of a load's locus: use, place, zone."""

from dataclasses import dataclass
from typing import Any

import numpy as np

from safeamp.physics._checks import Array
from safeamp.physics.safe_area.boundary import LEAST_VOLTAGE, Boundary

ZONES = ("current", "power", "second breakdown", "voltage", "unknown")
CURRENT, POWER, SECOND_BREAKDOWN, VOLTAGE, UNKNOWN = range(5)
_NO_CURRENT = 1e-5  # of the current rating: the order of leakage


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


def _zone(voltage: Array, boundary: Boundary) -> Array:
    """Return the index of what rules at a device voltage."""
    positive = np.maximum(voltage, LEAST_VOLTAGE)
    power, second = boundary.power_line(positive), boundary.second_breakdown(positive)
    zone = np.where(power < boundary.rating.current, POWER, CURRENT)
    zone = np.where(second < np.minimum(power, boundary.rating.current), SECOND_BREAKDOWN, zone)
    zone = np.where(voltage > boundary.last, UNKNOWN, zone)
    return np.where(voltage > boundary.rating.voltage, VOLTAGE, zone)
