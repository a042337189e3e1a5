"""The boundary of the safe area as a current over voltage."""

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import pairwise
from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array
from safeamp.physics.safe_area.rating import Rating, derating, rated_power, starts_under, unusable

LEAST_VOLTAGE = 1e-9
"""V; at and below zero volts across the device only the current limit rules."""


@dataclass(frozen=True, eq=False)
class Boundary:
    """A rating at one case temperature, made ready for many voltages."""

    rating: Rating
    derating: Any
    power: Any
    lines: tuple[tuple[Any, Any, Any], ...]
    """From which voltage on, slope and intercept of each line between points, in logarithms."""
    last: Any
    """V up to which the points say something; nan without points."""

    def second_breakdown(self, voltage: Array) -> Array:
        """Return the derated current of the points, A; infinite where they say nothing."""
        if not self.lines:
            return np.full(np.shape(voltage), np.inf)
        logarithm = np.log(voltage)
        line: Any = np.inf
        for start, slope, intercept in self.lines:
            line = np.where(voltage > start, intercept + slope * logarithm, line)
        line = np.where(voltage > self.last, np.inf, line + 0.0 * self.last)
        with np.errstate(invalid="ignore"):
            return np.where(np.isposinf(line), np.inf, self.derating * np.exp(line))

    def bends(self) -> Iterator[Array]:
        """Yield the voltages at which the allowed current jumps, or may fall less steeply than before."""
        if not self.lines:
            return
        volts = [array(voltage) for voltage, _ in self.rating.points]
        if np.any(volts[0] * array(self.rating.points[0][1]) < self.power):
            yield volts[0]
        for at, (before, after) in zip(volts[1:], pairwise(self.lines), strict=False):
            if np.any(after[1] > before[1]):
                yield at
        yield volts[-1]

    def power_line(self, voltage: Array) -> Array:
        """Return the derated current of the power line, A."""
        line: Array = self.derating * self.power / voltage
        return line

    def allowed(self, voltage: Array) -> Array:
        """Return the allowed current, A."""
        positive = np.maximum(voltage, LEAST_VOLTAGE)
        allowed = np.minimum(self.power_line(positive), self.rating.current)
        if self.lines:
            allowed = np.minimum(allowed, self.second_breakdown(positive))
        known = np.where(voltage <= self.rating.voltage, allowed, 0.0)
        return np.where(np.isnan(voltage + self.rating.voltage), np.nan, known)

    def share(self, voltage: Array, current: Array) -> Array:
        """Return the current over the allowed current; none uses nothing, even where none is allowed."""
        return over(current, self.allowed(voltage))


def over(current: Array, allowed: Array) -> Array:
    """Return current over allowed current: infinite where current flows and none is allowed."""
    with np.errstate(divide="ignore", invalid="ignore"):
        ratio = current / allowed
    return np.where((current == 0) & (allowed == 0), 0.0, ratio)


def _lines(rating: Rating) -> tuple[tuple[Array, Array, Array], ...]:
    """Return the lines between the points, the first one from zero volts on where it is continued."""
    lines = []
    for (low, more), (high, less) in pairwise(rating.points):
        slope = np.log(array(less) / array(more)) / np.log(array(high) / array(low))
        lines.append((array(low), slope, np.log(array(more)) - slope * np.log(array(low))))
    if not lines:
        return ()
    start, slope, intercept = lines[0]
    just_below = np.nextafter(start, 0.0)  # the first point itself belongs to its line
    lines[0] = (np.where(starts_under(rating), 0.0, just_below), slope, intercept)
    return tuple(lines)


def boundary(rating: Rating, case_temperature: ArrayLike) -> Boundary:
    """Return the boundary of a rating at a case temperature in degC."""
    last: Array = np.asarray(np.nan)
    if rating.points:
        last = np.where(unusable(rating), 0.0, array(rating.points[-1][0]))
        last = last + 0.0 * sum(array(v) * array(i) for v, i in rating.points)  # one nan spoils the curve
    return Boundary(
        rating=rating,
        derating=derating(
            case_temperature=case_temperature,
            power_at=rating.power_at,
            junction_limit=rating.junction_limit,
        ),
        power=rated_power(rating),
        lines=_lines(rating),
        last=last,
    )


def allowed_current(*, voltage: ArrayLike, case_temperature: ArrayLike, rating: Rating) -> Array:
    """Return the current that the DC safe area allows at a device voltage.

    Smallest of current limit, derated power line and derated lines between the points on log-log
    paper. Below the first point the power line rules, unless that point lies more than 5 % under it:
    then the first line is continued. Beyond the last point the power line stands although nothing is
    known there. Zero above the voltage rating.

    Parameters
    ----------
    voltage : array_like
        V across the device.
    case_temperature : array_like
        degC.
    rating : Rating
        Ratings of the device; its arrays broadcast against the others.

    Returns
    -------
    numpy.ndarray
        A, broadcast shape of the inputs; nan where an input is nan.

    Raises
    ------
    ValueError
        If a rating is impossible.

    References
    ----------
    Derating of the second-breakdown part with the power is conservative; common practice, no source.
    """
    allowed: Array = boundary(rating, case_temperature).allowed(array(voltage))
    return allowed
