"""How far the output swings, and what the load takes from it."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within


def _conducting(conducting: ArrayLike) -> None:
    """Raise ValueError for less than one conducting device."""
    refuse("conducting", conducting, array(conducting) < 1, "one or more")


def clipped_peak(
    *,
    side_voltage: ArrayLike,
    swing_loss: ArrayLike,
    load_magnitude: ArrayLike,
    emitter_resistor: ArrayLike,
    conducting: ArrayLike,
) -> Array:
    """Return the peak output voltage of one side at clipping.

    The load and the emitter resistors in parallel divide what the swing loss leaves of the side.

    Parameters
    ----------
    side_voltage : array_like
        V from rest to the rail of this side, > 0.
    swing_loss : array_like
        V that the stage keeps at clipping, >= 0, below `side_voltage`.
    load_magnitude : array_like
        Ohm, > 0.
    emitter_resistor : array_like
        Ohm of each device, >= 0.
    conducting : array_like
        Devices in parallel, >= 1.

    Returns
    -------
    numpy.ndarray
        V, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range, or the swing loss reaches the side voltage.

    References
    ----------
    Voltage divider; derived.
    """
    positive(side_voltage=side_voltage, load_magnitude=load_magnitude)
    non_negative(swing_loss=swing_loss, emitter_resistor=emitter_resistor)
    _conducting(conducting)
    left = array(side_voltage) - array(swing_loss)
    refuse("side_voltage less swing_loss", left, left <= 0, "greater than zero")
    load = array(load_magnitude)
    peak: Array = left * load / (load + array(emitter_resistor) / array(conducting))
    return peak


def load_combination(
    *,
    impedance: ArrayLike,
    phase_angle: ArrayLike,
    series_resistor: ArrayLike = 0.0,
    series_reactance: ArrayLike = 0.0,
) -> tuple[Array, Array]:
    """Return magnitude and angle of a load with what stands in series with it.

    Parameters
    ----------
    impedance : array_like
        Ohm, magnitude of the load, > 0.
    phase_angle : array_like
        deg, -90 to 90, positive when inductive.
    series_resistor : array_like, optional
        Ohm, >= 0.
    series_reactance : array_like, optional
        Ohm, negative for a capacitor.

    Returns
    -------
    tuple of numpy.ndarray
        Ohm and deg, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Sum of complex impedances; derived.
    """
    positive(impedance=impedance)
    within(-90.0, 90.0, phase_angle=phase_angle)
    non_negative(series_resistor=series_resistor)
    angle = np.deg2rad(array(phase_angle))
    real = array(impedance) * np.cos(angle) + array(series_resistor)
    imaginary = array(impedance) * np.sin(angle) + array(series_reactance)
    return np.hypot(real, imaginary), np.rad2deg(np.arctan2(imaginary, real))


def level_peak(*, clipping_peak: ArrayLike, fraction: ArrayLike) -> Array:
    """Return the peak output voltage at a fraction of the clipping power.

    Parameters
    ----------
    clipping_peak : array_like
        V, > 0.
    fraction : array_like
        Ratio of powers, 0 to 1.

    Returns
    -------
    numpy.ndarray
        V, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Power goes with the square of the voltage; derived.
    """
    positive(clipping_peak=clipping_peak)
    within(0.0, 1.0, fraction=fraction)
    peak: Array = array(clipping_peak) * np.sqrt(array(fraction))
    return peak


def load_power(*, peak: ArrayLike, load_magnitude: ArrayLike, phase_angle: ArrayLike = 0.0) -> Array:
    """Return the mean power of a sine in a load.

    Parameters
    ----------
    peak : array_like
        V, peak of the sine, >= 0.
    load_magnitude : array_like
        Ohm, > 0.
    phase_angle : array_like, optional
        deg, -90 to 90.

    Returns
    -------
    numpy.ndarray
        W, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, ch. 12.
    """
    non_negative(peak=peak)
    positive(load_magnitude=load_magnitude)
    within(-90.0, 90.0, phase_angle=phase_angle)
    cosine = np.cos(np.deg2rad(array(phase_angle)))
    power: Array = array(peak) ** 2 * cosine / (2.0 * array(load_magnitude))
    return power
