"""Idle current: what the emitter resistor shows, how parallel devices share; thermal feedback by name."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive
from safeamp.physics.feedback import (
    Sensor,
    current_slope_bipolar,
    current_slope_mosfet,
    loop_index,
    seen_resistance,
    sink_resistance,
    untracked,
)
from safeamp.physics.settling import idle_junction, programme_rise, settled_idle
from safeamp.physics.stage.law import THERMAL_VOLTAGE

__all__ = [
    "THERMAL_VOLTAGE",
    "Sensor",
    "control_difference",
    "current_imbalance",
    "current_slope_bipolar",
    "current_slope_mosfet",
    "idle_current",
    "idle_junction",
    "loop_index",
    "oliver_idle",
    "programme_rise",
    "seen_resistance",
    "settled_idle",
    "sink_resistance",
    "untracked",
]


def idle_current(*, drop: ArrayLike, emitter_resistor: ArrayLike) -> Array:
    """Return the idle current, A, from the drop across one emitter resistor.

    Parameters
    ----------
    drop, emitter_resistor : array_like
        V (>= 0) and ohm (> 0); they broadcast.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Ohm's law; a bench measurement printed in a discussion of D. Self's optimum.
    """
    non_negative(drop=drop)
    positive(emitter_resistor=emitter_resistor)
    return array(drop) / array(emitter_resistor)


def oliver_idle(*, emitter_resistor: ArrayLike, drop: ArrayLike = 0.026) -> Array:
    """Return the idle current, A, of least crossover distortion, internal resistances neglected.

    Parameters
    ----------
    emitter_resistor, drop : array_like
        ohm (> 0) and V (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    B. Oliver, HP Journal, Feb 1971 (26 mV rule).
    """
    positive(drop=drop)
    return idle_current(drop=drop, emitter_resistor=emitter_resistor)


def current_imbalance(
    *,
    current: ArrayLike,
    emitter_resistor: ArrayLike,
    spread: ArrayLike = 0.050,
    thermal_voltage: ArrayLike = THERMAL_VOLTAGE,
) -> Array:
    """Return the excess current of the worst of parallel devices over the mean, ratio.

    Parameters
    ----------
    current : array_like
        Mean current of one device, A, >= 0.
    emitter_resistor : array_like
        ohm, >= 0; without a resistor (0) the worst device is taken to carry twice the mean.
    spread, thermal_voltage : array_like
        Spread of the base-emitter voltage in one batch, V (>= 0), and kT/q, V (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Common practice, no source (50 mV within one batch; 100 % without resistors).
    """
    non_negative(current=current, emitter_resistor=emitter_resistor, spread=spread)
    positive(thermal_voltage=thermal_voltage)
    resistor, mean = array(emitter_resistor), array(current)
    shared = array(spread) / (resistor * mean + array(thermal_voltage))
    return np.where(resistor == 0, 1.0 + 0 * shared, shared)


def control_difference(
    *,
    current: ArrayLike,
    mean: ArrayLike,
    emitter_resistor: ArrayLike,
    junctions: ArrayLike = 1.0,
    thermal_voltage: ArrayLike = THERMAL_VOLTAGE,
) -> Array:
    """Return by how many volts less than the mean device one needs at its base to carry its current.

    Parameters
    ----------
    current, mean : array_like
        A of the odd device and of the mean device beside it, > 0.
    emitter_resistor : array_like
        ohm of each device, >= 0.
    junctions : array_like
        Junctions in series, > 0: 1, of a Darlington 2.
    thermal_voltage : array_like
        kT/q, V, > 0.

    Returns
    -------
    numpy.ndarray
        V; positive where the odd device carries more.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: both bases at one voltage, exponential law: n*Vt*ln(I1/I2) + Re*(I1 - I2).
    """
    positive(current=current, mean=mean, junctions=junctions, thermal_voltage=thermal_voltage)
    non_negative(emitter_resistor=emitter_resistor)
    one, other = array(current), array(mean)
    junction = array(junctions) * array(thermal_voltage) * np.log(one / other)
    return junction + array(emitter_resistor) * (one - other)
