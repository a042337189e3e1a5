"""Dual-slope current limiter that senses the emitter resistor and the device voltage."""

from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, positive, refuse


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
