"""First power-up: the amplifier seen from the mains, and the limiter in series with it.

The transformer is an ideal one with the resistance of its windings behind it, the rectifier loses nothing. Limiter and
amplifier share the mains as if both drew in step, so that no current is reckoned too small.
"""

from collections.abc import Callable

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, within
from safeamp.physics.lamp import EXPONENT, lamp_current, worst_fault_power

_HALVINGS = 52


def winding_resistance(*, no_load: ArrayLike, full_load: ArrayLike, mean_current: ArrayLike) -> Array:
    """Return the resistance, ohm, of windings and rectifier behind a rail, from how far it sags.

    Parameters
    ----------
    no_load, full_load : array_like
        V, > 0. A rail that does not sag has none.
    mean_current : array_like
        Direct current of the rail at `full_load`, A, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Ohm's law; the sag goes with the mean current.
    """
    positive(no_load=no_load, full_load=full_load, mean_current=mean_current)
    sag = array(no_load) - array(full_load)
    return np.where(sag < 0, 0.0 * sag, sag) / array(mean_current)


def seen_from_mains(*, resistance: ArrayLike, mains: ArrayLike, no_load: ArrayLike) -> Array:
    """Return what a resistance across a rail is for the mains, ohm.

    Parameters
    ----------
    resistance : array_like
        Across the rail or the rails together, ohm, >= 0.
    mains, no_load : array_like
        Mains and the volts that it makes there without load, V, > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: ideal transformer and rectifier keep the power; a resistance goes with the square of the ratio.
    """
    non_negative(resistance=resistance)
    positive(mains=mains, no_load=no_load)
    return array(resistance) * (array(mains) / array(no_load)) ** 2


def idle_mains_current(
    *, voltage: ArrayLike, mains: ArrayLike, apparent_power: ArrayLike, exponent: ArrayLike
) -> Array:
    """Return the current, A, that a healthy amplifier draws at less than the whole mains.

    Parameters
    ----------
    voltage : array_like
        Left to the amplifier, V, >= 0.
    mains, apparent_power : array_like
        The whole mains, V (> 0), and what the amplifier draws from it, W (>= 0).
    exponent : array_like
        Of the power over the voltage, >= 1: 1 where the idle current stays, 2 where it goes with the rails.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    This project: S (V/V_mains)^n / V.
    """
    non_negative(voltage=voltage, apparent_power=apparent_power)
    positive(mains=mains)
    within(1.0, np.inf, exponent=exponent)
    whole = array(mains)
    return array(apparent_power) / whole * (array(voltage) / whole) ** (array(exponent) - 1)


def idle_behind_lamp(
    *,
    mains: ArrayLike,
    apparent_power: ArrayLike,
    exponent: ArrayLike,
    rated_power: ArrayLike,
    rated_voltage: ArrayLike,
    cold_ratio: ArrayLike = 15.0,
) -> Array:
    """Return the voltage, V, that a lamp in series leaves to a healthy amplifier at idle; 0 where it cannot feed it.

    Parameters
    ----------
    mains, apparent_power, exponent : array_like
        As for `idle_mains_current`.
    rated_power, rated_voltage : array_like
        Of the lamp, W and V, > 0.
    cold_ratio : array_like
        Hot over cold resistance of the lamp, 10..15.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: by bisection; the lamp current rises with its share of the voltage, that of the amplifier does not.
    """
    positive(mains=mains)

    def limiter(voltage: Array) -> Array:
        return lamp_current(
            voltage=voltage, rated_power=rated_power, rated_voltage=rated_voltage, cold_ratio=cold_ratio
        )

    return _idle_behind(limiter, mains, apparent_power, exponent)


def idle_behind_resistor(
    *, mains: ArrayLike, apparent_power: ArrayLike, exponent: ArrayLike, resistance: ArrayLike
) -> Array:
    """Return the voltage, V, that a resistor in series leaves to a healthy amplifier at idle.

    Parameters
    ----------
    mains, apparent_power, exponent : array_like
        As for `idle_mains_current`.
    resistance : array_like
        Of the resistor, ohm, > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: by bisection, as for a lamp.
    """
    positive(mains=mains, resistance=resistance)
    return _idle_behind(lambda voltage: voltage / array(resistance), mains, apparent_power, exponent)


def _idle_behind(
    limiter: Callable[[Array], Array], mains: ArrayLike, apparent_power: ArrayLike, exponent: ArrayLike
) -> Array:
    whole = array(mains)

    def excess(share: Array) -> Array:
        drawn = idle_mains_current(
            voltage=(1 - share) * whole, mains=whole, apparent_power=apparent_power, exponent=exponent
        )
        return limiter(share * whole) - drawn

    unknown = np.isnan(excess(np.asarray(0.5)))
    low, high = np.zeros(unknown.shape), np.ones(unknown.shape)
    for _ in range(_HALVINGS):
        share = (low + high) / 2
        more = excess(share) > 0
        low, high = np.where(more, low, share), np.where(more, share, high)
    # The last interval touches the end where the limiter cannot feed the amplifier at all.
    left = np.where(high == 1.0, 0.0, whole * (1 - (low + high) / 2))
    return np.where(unknown, np.nan, left)[()]


def most_through_lamp(*, mains: ArrayLike, rated_power: ArrayLike, rated_voltage: ArrayLike) -> Array:
    """Return the most heat, W, that any resistive fault can draw through a lamp at a mains.

    Parameters
    ----------
    mains, rated_power, rated_voltage : array_like
        V, W and V, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: current goes with V^0.55 and power with V^1.55, so that of `worst_fault_power` does.
    """
    positive(mains=mains, rated_voltage=rated_voltage)
    most = worst_fault_power(rated_power=rated_power)
    return most * (array(mains) / array(rated_voltage)) ** (1 + EXPONENT)


def most_through_resistor(*, mains: ArrayLike, resistance: ArrayLike) -> Array:
    """Return the most heat, W, that any resistive fault can draw through a resistor.

    Parameters
    ----------
    mains, resistance : array_like
        V and ohm, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: a load of the same resistance takes the most, V^2/(4 R).
    """
    positive(mains=mains, resistance=resistance)
    return array(mains) ** 2 / (4 * array(resistance))


def flash_time(
    *, mains: ArrayLike, capacitance: ArrayLike, rated_power: ArrayLike, rated_voltage: ArrayLike
) -> Array:
    """Return how long, s, a lamp glows while the reservoirs charge.

    Parameters
    ----------
    mains : array_like
        V, > 0.
    capacitance : array_like
        What the reservoirs are for the mains, F, >= 0.
    rated_power, rated_voltage : array_like
        Of the lamp, W and V, > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: C dv/dt = -I_rated (v/V_rated)^0.55 from v = mains to nothing, the first surge neglected.
    """
    positive(mains=mains, rated_power=rated_power, rated_voltage=rated_voltage)
    non_negative(capacitance=capacitance)
    ohms = array(rated_voltage) ** 2 / array(rated_power)
    share = array(mains) / array(rated_voltage)
    return array(capacitance) * ohms * share ** (1 - EXPONENT) / (1 - EXPONENT)
