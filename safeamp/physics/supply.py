"""Mains, rails, ripple and the transformer."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, within


def scaled(*, reading: ArrayLike, mains: ArrayLike, at_mains: ArrayLike) -> Array:
    """Return an unregulated reading taken at `at_mains` as it would be at `mains`.

    Parameters
    ----------
    reading, mains, at_mains : array_like
        V each; the mains > 0. They broadcast.

    Raises
    ------
    ValueError
        If a mains voltage is not greater than zero.

    References
    ----------
    Derived: an unloaded transformer with rectifier is proportional to its mains, diode drops neglected.
    """
    positive(mains=mains, at_mains=at_mains)
    return array(reading) * array(mains) / array(at_mains)


def mains_band(*, nominal: ArrayLike, low: float = 0.9, high: float = 1.1) -> tuple[Array, Array]:
    """Return the lowest and highest voltage, V, of the public supply.

    Parameters
    ----------
    nominal : array_like
        Declared voltage, V, > 0.
    low, high : float
        Ends of the band, ratios.

    Raises
    ------
    ValueError
        If the voltage is not greater than zero.

    References
    ----------
    EN 50160, technical note 7EN72-0197-01.
    """
    positive(nominal=nominal)
    return low * array(nominal), high * array(nominal)


def level_rail(*, no_load: ArrayLike, full_load: ArrayLike, fraction: ArrayLike) -> Array:
    """Return the rail, V, at a fraction of clipping power.

    Parameters
    ----------
    no_load, full_load : array_like
        V, > 0.
    fraction : array_like
        Of clipping power, ratio, 0..1.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: the sag follows the mean rail current, which goes with the square root of power.
    """
    positive(no_load=no_load, full_load=full_load)
    within(0.0, 1.0, fraction=fraction)
    return array(no_load) - np.sqrt(array(fraction)) * (array(no_load) - array(full_load))


def ripple_peak_to_peak(*, current: ArrayLike, capacitance: ArrayLike, frequency: ArrayLike) -> Array:
    """Return the upper bound of the ripple, V peak to peak, of a full-wave reservoir.

    Parameters
    ----------
    current, capacitance, frequency : array_like
        Mean current, A (>= 0), F (> 0), mains frequency, Hz (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, Ex. 15.3 to 15.5.
    """
    non_negative(current=current)
    positive(capacitance=capacitance, frequency=frequency)
    return array(current) / (2 * array(frequency) * array(capacitance))


def ripple_rms(*, peak_to_peak: ArrayLike) -> Array:
    """Return the rms value, V, of a saw-tooth ripple.

    Parameters
    ----------
    peak_to_peak : array_like
        V, >= 0.

    Raises
    ------
    ValueError
        If the ripple is negative.

    References
    ----------
    R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, Ex. 15.3.
    """
    non_negative(peak_to_peak=peak_to_peak)
    return array(peak_to_peak) / (2 * 3**0.5)


def regulation(*, no_load: ArrayLike, full_load: ArrayLike) -> Array:
    """Return the regulation, ratio to the LOADED voltage.

    Parameters
    ----------
    no_load, full_load : array_like
        V, > 0.

    Raises
    ------
    ValueError
        If a voltage is not greater than zero.

    References
    ----------
    R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, Ex. 15.2.
    """
    positive(no_load=no_load, full_load=full_load)
    return (array(no_load) - array(full_load)) / array(full_load)


def secondary_current(*, mean_current: ArrayLike, form_factor: ArrayLike = 1.8) -> Array:
    """Return the rms current, A, of a secondary that feeds a capacitor-input rectifier.

    Parameters
    ----------
    mean_current : array_like
        Direct current, A, >= 0.
    form_factor : array_like
        Rms over mean, >= 1; 1.6 to 1.8.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Common practice, no source.
    """
    non_negative(mean_current=mean_current)
    within(1.0, np.inf, form_factor=form_factor)
    return array(form_factor) * array(mean_current)


def transformer_va(
    *, power: ArrayLike, mean_current: ArrayLike, factor: ArrayLike = 1.4, rectifier_drop: ArrayLike = 2.0
) -> Array:
    """Return the apparent power, VA, that the transformer must carry.

    Parameters
    ----------
    power, mean_current : array_like
        Drawn from the rails, W (>= 0), at a direct current, A (>= 0).
    factor, rectifier_drop : array_like
        Volt-amperes a watt (> 0), and the drop of a bridge, V (>= 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Common practice, no source.
    """
    non_negative(power=power, mean_current=mean_current, rectifier_drop=rectifier_drop)
    positive(factor=factor)
    return array(factor) * (array(power) + array(rectifier_drop) * array(mean_current))


def volts_per_hertz(
    *, actual: ArrayLike, rated: ArrayLike, frequency: ArrayLike, rated_frequency: ArrayLike
) -> Array:
    """Return the flux of the transformer over its rated flux, ratio.

    Parameters
    ----------
    actual, rated : array_like
        Mains voltages, V, > 0.
    frequency, rated_frequency : array_like
        Hz, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: flux is the time integral of the voltage, proportional to V/f.
    """
    positive(actual=actual, rated=rated, frequency=frequency, rated_frequency=rated_frequency)
    return array(actual) / array(rated) * (array(rated_frequency) / array(frequency))
