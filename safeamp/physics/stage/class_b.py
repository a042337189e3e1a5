"""Class B in closed form: the check values beside the class-AB law."""

import math

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within

_erf = np.frompyfunc(math.erf, 1, 1)


def class_b_heat(
    *, half_supply: ArrayLike, peak: ArrayLike, load_magnitude: ArrayLike, phase_angle: ArrayLike = 0.0
) -> Array:
    """Return the heat of both sides for a sine, no idle current, resistors neglected.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    peak : array_like
        V, peak of the output, 0 to `half_supply`.
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
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    non_negative(peak=peak)
    refuse("peak", peak, array(peak) > array(half_supply), "at most half_supply")
    within(-90.0, 90.0, phase_angle=phase_angle)
    peak_current = array(peak) / array(load_magnitude)
    cosine = np.cos(np.deg2rad(array(phase_angle)))
    heat: Array = peak_current * (2.0 * array(half_supply) / np.pi - array(peak) * cosine / 2.0)
    return heat


def worst_sine_peak(*, half_supply: ArrayLike, phase_angle: ArrayLike, clipping_peak: ArrayLike) -> Array:
    """Return the peak of the sine that heats a class-B stage most.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    phase_angle : array_like
        deg, -90 to 90.
    clipping_peak : array_like
        V, > 0; from 50.46 deg on full swing is worst.

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
    Zero of the derivative of `class_b_heat`; derived.
    """
    positive(half_supply=half_supply, clipping_peak=clipping_peak)
    within(-90.0, 90.0, phase_angle=phase_angle)
    cosine = np.cos(np.deg2rad(array(phase_angle)))
    worst: Array = np.minimum(2.0 * array(half_supply) / (np.pi * cosine), array(clipping_peak))
    return worst


def worst_resistive_heat(*, half_supply: ArrayLike, load: ArrayLike) -> Array:
    """Return the heat of both sides at the worst level of a sine into a resistor.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    load : array_like
        Ohm, > 0.

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
    A. S. Sedra, K. C. Smith, Microelectronic Circuits, Oxford University Press, ch. 14.
    """
    positive(half_supply=half_supply, load=load)
    heat: Array = 2.0 * array(half_supply) ** 2 / (np.pi**2 * array(load))
    return heat


def mean_supply_current(*, peak_current: ArrayLike) -> Array:
    """Return the mean current of each rail for a sine in class B.

    Parameters
    ----------
    peak_current : array_like
        A of the load, >= 0.

    Returns
    -------
    numpy.ndarray
        A, same shape.

    Raises
    ------
    ValueError
        If the current is below zero.

    References
    ----------
    R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, ch. 12.
    """
    non_negative(peak_current=peak_current)
    mean: Array = array(peak_current) / np.pi
    return mean


def _noise_means(rms: Array, clipping_peak: Array | None) -> tuple[Array, Array]:
    """Return mean magnitude (V) and mean square (V2) of a Gaussian voltage cut at the clipping peak."""
    if clipping_peak is None:
        return math.sqrt(2.0 / math.pi) * rms, rms**2
    with np.errstate(divide="ignore"):
        a = clipping_peak / rms
    inside = np.asarray(_erf(a / math.sqrt(2.0)), dtype=float)
    bell = math.sqrt(2.0 / math.pi) * np.exp(-(a**2) / 2.0)
    outside = clipping_peak * (1.0 - inside)
    # rms*a is the clipping peak: written so that no signal (a infinite) stays finite
    magnitude = rms * (math.sqrt(2.0 / math.pi) - bell) + outside
    square = rms**2 * inside - rms * clipping_peak * bell + clipping_peak * outside
    return magnitude, square


def noise_heat(
    *, half_supply: ArrayLike, rms: ArrayLike, load: ArrayLike, clipping_peak: ArrayLike | None = None
) -> Array:
    """Return the heat of both sides of a class-B stage for Gaussian programme into a resistor.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    rms : array_like
        V of the programme before it clips, >= 0.
    load : array_like
        Ohm, > 0.
    clipping_peak : array_like, optional
        V at which the output is cut, > 0, at most `half_supply`; None neglects clipping.

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
    Moments of the normal distribution cut on both sides; derived.
    """
    positive(half_supply=half_supply, load=load)
    non_negative(rms=rms)
    supply = array(half_supply)
    if clipping_peak is not None:
        positive(clipping_peak=clipping_peak)
        refuse("clipping_peak", clipping_peak, array(clipping_peak) > supply, "at most half_supply")
    cut = None if clipping_peak is None else array(clipping_peak)
    magnitude, square = _noise_means(array(rms), cut)
    heat: Array = (supply * magnitude - square) / array(load)
    return heat
