"""Current limiters that sense the drop in the emitter resistor and the device voltage."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse


def sense_resistor(*, limit_current: ArrayLike, threshold: ArrayLike = 0.65) -> Array:
    """Return the emitter resistor, ohm, at which limiting starts at `limit_current`.

    Parameters
    ----------
    limit_current, threshold : array_like
        A (> 0) and V (> 0) of the sensing junction.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    LM391 application hints, p. 9, National Semiconductor.
    """
    positive(limit_current=limit_current, threshold=threshold)
    return array(threshold) / array(limit_current)


def shorted_current(*, limit_current: ArrayLike, half_supply: ArrayLike, slope_voltage: ArrayLike) -> Array:
    """Return the peak current, A, into a short-circuited output.

    Parameters
    ----------
    limit_current, half_supply : array_like
        A (> 0) and V (> 0).
    slope_voltage : array_like
        Device voltage at which the limit reaches zero, V, not below `half_supply`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    LM391 application hints, p. 9, National Semiconductor.
    """
    positive(limit_current=limit_current, half_supply=half_supply, slope_voltage=slope_voltage)
    low = array(slope_voltage) < array(half_supply)
    refuse("slope_voltage", slope_voltage, low, f"at least the half supply of {array(half_supply)}")
    return array(limit_current) * (1 - array(half_supply) / array(slope_voltage))


def shorted_power(*, shorted_current: ArrayLike, half_supply: ArrayLike) -> Array:
    """Return the heat of one device, W, into a short; each side conducts half of the time.

    Parameters
    ----------
    shorted_current, half_supply : array_like
        A (> 0) and V (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    LM391 application hints, p. 9, National Semiconductor.
    """
    positive(shorted_current=shorted_current, half_supply=half_supply)
    return array(shorted_current) * array(half_supply) / 2


def sensed_limit(
    *,
    voltage: ArrayLike,
    emitter_resistor: ArrayLike,
    to_emitter: ArrayLike,
    to_output: ArrayLike,
    to_rail: ArrayLike,
    threshold: ArrayLike = 0.65,
) -> Array:
    """Return the device current, A, at which the transistor that senses it through a divider starts to conduct.

    A straight line over the device voltage: of one slope without a resistor to the rail (inf), flat then.

    Parameters
    ----------
    voltage : array_like
        V across the device, >= 0, the drop in the emitter resistor left aside.
    emitter_resistor : array_like
        ohm, > 0, from the device's emitter to the output.
    to_emitter, to_output, to_rail : array_like
        ohm, > 0, from the sensing base to the device's emitter, to the output and to the rail; inf where not fitted.
    threshold : array_like
        V (> 0) of the sensing junction.

    Returns
    -------
    numpy.ndarray
        A; zero from the voltage on at which the resistor to the rail alone turns the sensing transistor on.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: currents into the sensing base, its own neglected, sum to zero at the threshold.
    """
    non_negative(voltage=voltage)
    positive(emitter_resistor=emitter_resistor, to_emitter=to_emitter, to_output=to_output)
    positive(to_rail=to_rail, threshold=threshold)
    upper = 1 / array(to_emitter) + 1 / array(to_rail)
    left = array(threshold) * (upper + 1 / array(to_output)) - array(voltage) / array(to_rail)
    current = left / (array(emitter_resistor) * upper)
    return np.maximum(current, 0 * current)


def closing_voltage(
    *, to_emitter: ArrayLike, to_output: ArrayLike, to_rail: ArrayLike, threshold: ArrayLike = 0.65
) -> Array:
    """Return the device voltage, V, from which on `sensed_limit` lets no current through.

    With the current at no voltage it makes the two points of the limiter's line.

    Parameters
    ----------
    to_emitter, to_output, to_rail, threshold : array_like
        As for `sensed_limit`.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: zero of `sensed_limit`.
    """
    positive(to_emitter=to_emitter, to_output=to_output, to_rail=to_rail, threshold=threshold)
    rail = array(to_rail)
    return array(threshold) * (1 + rail / array(to_emitter) + rail / array(to_output))
