"""Use of the safe area where pulse curves or a V-I limiter are known: what the plain envelope knows nothing of."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within
from safeamp.physics._chunks import in_chunks
from safeamp.physics.safe_area.boundary import Boundary, boundary
from safeamp.physics.safe_area.locus import Use, _counted, _ratio, _zone
from safeamp.physics.safe_area.pulse import Points, Pulse, pulsed
from safeamp.physics.safe_area.rating import Rating
from safeamp.physics.safe_area.vi_limiter import limiter_current
from safeamp.physics.stage import THERMAL_VOLTAGE, Law, carrying_current, worst_device_current

#: deg; the limiter bends the locus and each curve the boundary, so the first look is a close one.
_PHASES = np.linspace(-90.0, 90.0, 97)
_STEPS = np.arange(-4, 5) / 4.0
_ROUNDS = 4


@dataclass(frozen=True, eq=False)
class _Stage:
    """One side of a stage into a load of any angle up to one; numbers or arrays of cases."""

    half_supply: Array
    swing: Array
    each: Array
    angle: Array
    pairs: ArrayLike
    resistor: Array
    idle: ArrayLike
    law: Law
    imbalance: ArrayLike | None
    limiter: Points
    parameter: ArrayLike | None
    thermal_voltage: float

    def at(self, phase: Array) -> tuple[Array, Array]:
        """Return the device voltage and the current of the worst device at phases in deg, first axis."""
        mean = carrying_current(
            load_current=self.each * np.sin(np.deg2rad(np.minimum(90.0, phase + self.angle))),
            idle_current=self.idle,
            emitter_resistor=self.resistor,
            law=self.law,
            transconductance_parameter=self.parameter,
            thermal_voltage=self.thermal_voltage,
        )
        left = self.half_supply - self.swing * np.sin(np.deg2rad(phase))
        if self.limiter:
            acts = limiter_current(voltage=left - mean * self.resistor, points=self.limiter)
            mean = np.minimum(mean, acts)
        return left - mean * self.resistor, self.worst(mean)

    def worst(self, mean: ArrayLike) -> Array:
        """Return the current of the worst of parallel devices."""
        return worst_device_current(
            mean=mean,
            emitter_resistor=self.resistor,
            pairs=self.pairs,
            imbalance=self.imbalance,
            thermal_voltage=self.thermal_voltage,
        )


@in_chunks
def cut_use(
    *,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    phase_angle: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    imbalance: ArrayLike | None,
    case_temperature: ArrayLike,
    rating: Rating,
    pulse: Pulse | None = None,
    limiter: Points = (),
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Use:
    """Return the use of the safe area, as `envelope_use`, with pulse curves and the locus cut at a V-I limiter.

    A device carries more than its idle current for half a cycle at most: only what exceeds the idle current is
    compared with the pulse curve, the idle current with the DC curve, and the smaller of this sum and of the use by
    the DC curve alone counts, for either is sound by itself. The pulse curve is interpolated in the logarithms of time
    and current; a duration beyond the longest curve has the DC curve, for an interpolation towards DC would flatter.
    The limiter holds the mean device at its line; the worst of parallel devices exceeds that as it does any current.

    Parameters
    ----------
    half_supply, peak, load_magnitude, phase_angle, conducting, emitter_resistor, idle_current, law, imbalance, \
case_temperature, rating, transconductance_parameter, thermal_voltage
        As in `envelope_use`.
    pulse : Pulse, optional
        Half a cycle of the lowest note, the mean junction temperature and the curves.
    limiter : tuple of pairs, optional
        V across the device and A of each device at which the limiter acts, rising in voltage.

    Returns
    -------
    Use
        One value a case; nan where an input is nan.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Envelope of the ellipses of all angles; superposition of a steady and a pulsed heat; derived.
    """
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    non_negative(peak=peak)
    refuse("peak", peak, array(peak) > array(half_supply), "at most half_supply")
    within(-90.0, 90.0, phase_angle=phase_angle)
    stage = _Stage(
        half_supply=array(half_supply),
        swing=array(peak),
        each=array(peak) / array(load_magnitude) / array(conducting),
        angle=np.abs(array(phase_angle)),
        pairs=conducting,
        resistor=array(emitter_resistor),
        idle=idle_current,
        law=law,
        imbalance=imbalance,
        limiter=limiter,
        parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    area = boundary(rating, array(case_temperature))
    if pulse is not None:
        area = pulsed(area, pulse, stage.worst(idle_current))
    return _worst(stage.at, area)


def _worst(locus: Callable[[Array], tuple[Array, Array]], area: Boundary) -> Use:
    """Return the worst point of a locus, phases on the first axis, and whether it enters the unknown."""
    ndim = np.ndim(_ratio(*locus(np.asarray(0.0)), area))
    phases = _PHASES.reshape(-1, *(1,) * ndim)
    voltage, current = locus(phases)
    worst = _climb(phases, _ratio(voltage, current, area), lambda phase: _ratio(*locus(phase), area))
    reach: Array = np.asarray(-np.inf)
    if not np.all(voltage <= np.fmin(area.last, area.rating.voltage)):
        far = _climb(phases, _reach(voltage, current, area), lambda phase: _reach(*locus(phase), area))
        reach = _reach(*locus(far), area)
        worst = np.where(reach > area.rating.voltage, far, worst)
    voltage, current = locus(worst)
    enters = (reach > area.last) & (area.last < area.rating.voltage)
    found = (_ratio(voltage, current, area), voltage, current, _zone(voltage, area), enters)
    return Use(*np.broadcast_arrays(*found))


def _reach(voltage: Array, current: Array, area: Boundary) -> Array:
    """Return the device voltage where current flows, minus infinity elsewhere."""
    return np.where(_counted(current, area) == 0, -np.inf, voltage)


def _climb(phases: Array, coarse: Array, score: Callable[[Array], Array]) -> Array:
    """Return the phase of the highest score, refined around the best of the first look; nan scores win."""
    best, step = _best(phases, coarse), _PHASES[1] - _PHASES[0]
    steps = _STEPS.reshape(phases[: len(_STEPS)].shape)
    for _ in range(_ROUNDS):
        trial = np.clip(best + step * steps, -90.0, 90.0)
        best = _best(trial, score(trial))
        step = step / 4.0
    return best


def _best(phases: Array, scores: Array) -> Array:
    place = np.argmax(scores, axis=0)[None]
    found: Array = np.take_along_axis(np.broadcast_to(phases, np.shape(scores)), place, axis=0)[0]
    return found
