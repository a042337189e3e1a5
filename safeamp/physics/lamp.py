"""Series lamp for the first power-up."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, within

EXPONENT = 0.55
"""Current of a filament goes with this power of its voltage (common practice, no source)."""


def hot_resistance(*, rated_power: ArrayLike, rated_voltage: ArrayLike) -> Array:
    """Return the resistance, ohm, of a lamp at its rated voltage.

    Parameters
    ----------
    rated_power, rated_voltage : array_like
        W (> 0) and V (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Incandescent-lamp encyclopedia article.
    """
    positive(rated_power=rated_power, rated_voltage=rated_voltage)
    return array(rated_voltage) ** 2 / array(rated_power)


def lamp_resistance(
    *, voltage: ArrayLike, rated_power: ArrayLike, rated_voltage: ArrayLike, cold_ratio: ArrayLike = 15.0
) -> Array:
    """Return the resistance, ohm, of a filament at a voltage across it.

    Parameters
    ----------
    voltage : array_like
        V, >= 0.
    rated_power, rated_voltage : array_like
        W (> 0) and V (> 0).
    cold_ratio : array_like
        Hot over cold resistance, 10..15.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    R_hot (V/V_rated)^0.45, not below the cold filament (incandescent-lamp encyclopedia article).
    """
    non_negative(voltage=voltage)
    within(10.0, 15.0, cold_ratio=cold_ratio)
    hot = hot_resistance(rated_power=rated_power, rated_voltage=rated_voltage)
    share = (array(voltage) / array(rated_voltage)) ** (1 - EXPONENT)
    return hot * np.maximum(share, 1 / array(cold_ratio))


def lamp_current(
    *, voltage: ArrayLike, rated_power: ArrayLike, rated_voltage: ArrayLike, cold_ratio: ArrayLike = 15.0
) -> Array:
    """Return the settled current, A, of a filament at a voltage across it.

    Parameters
    ----------
    voltage, rated_power, rated_voltage, cold_ratio : array_like
        As for `lamp_resistance`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    I_rated (V/V_rated)^0.55, common practice, no source.
    """
    return array(voltage) / lamp_resistance(
        voltage=voltage, rated_power=rated_power, rated_voltage=rated_voltage, cold_ratio=cold_ratio
    )


def power_share(
    *, voltage: ArrayLike, rated_power: ArrayLike, rated_voltage: ArrayLike, cold_ratio: ArrayLike = 15.0
) -> Array:
    """Return the power of a lamp over its rated power, by which it looks dark, dim or bright.

    Parameters
    ----------
    voltage, rated_power, rated_voltage, cold_ratio : array_like
        As for `lamp_resistance`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: (V/V_rated)^1.55 while the filament glows.
    """
    current = lamp_current(
        voltage=voltage, rated_power=rated_power, rated_voltage=rated_voltage, cold_ratio=cold_ratio
    )
    return array(voltage) * current / array(rated_power)


def worst_fault_power(*, rated_power: ArrayLike) -> Array:
    """Return the most heat, W, that a resistive fault can draw through the lamp on its rated voltage.

    Parameters
    ----------
    rated_power : array_like
        W, > 0.

    Raises
    ------
    ValueError
        If the power is not greater than zero.

    References
    ----------
    Derived: with share s of the voltage on the lamp the fault takes (1 - s) s^0.55, at most 0.365.
    """
    positive(rated_power=rated_power)
    share = EXPONENT / (1 + EXPONENT)
    most: float = (1 - share) * share**EXPONENT
    return array(rated_power) * most


def voltage_behind_lamp(
    *,
    mains: ArrayLike,
    resistance: ArrayLike,
    rated_power: ArrayLike,
    rated_voltage: ArrayLike,
    cold_ratio: ArrayLike = 15.0,
) -> Array:
    """Return the voltage, V, that a lamp in series leaves to a load that draws like a resistance.

    Parameters
    ----------
    mains, resistance : array_like
        V (> 0), and the load seen from the mains, ohm (>= 0; 0 is a short).
    rated_power, rated_voltage, cold_ratio : array_like
        As for `lamp_resistance`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: by bisection; the lamp current rises with its share of the voltage, the load current falls.
    """
    positive(mains=mains)
    non_negative(resistance=resistance)
    whole, load = array(mains), array(resistance)
    low, high = np.zeros(np.shape(whole * load)), np.ones(np.shape(whole * load))
    for _ in range(52):
        share = (low + high) / 2
        current = lamp_current(
            voltage=share * whole, rated_power=rated_power, rated_voltage=rated_voltage, cold_ratio=cold_ratio
        )
        more = current * load > (1 - share) * whole
        low, high = np.where(more, low, share), np.where(more, share, high)
    left = whole * (1 - (low + high) / 2)
    return np.where(np.isnan(current * load), np.nan, left)[()]
