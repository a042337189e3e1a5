"""Loudspeaker: power words, crest factors, copper, and the heat of a DC fault."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive
from safeamp.physics.coil_heating import (
    copper_ratio,
    fault_coil_temperature,
    settled_coil_temperature,
    time_to_temperature,
)

__all__ = [
    "CREST_FACTORS",
    "POWER_WORDS",
    "copper_ratio",
    "crest_decibels",
    "dc_fault_current",
    "dc_fault_power",
    "fault_coil_temperature",
    "minimum_allowed_impedance",
    "noise_voltage",
    "power_change",
    "programme_power",
    "rated_noise_power",
    "settled_coil_temperature",
    "time_to_temperature",
]

POWER_WORDS = {"rated noise": 1.0, "programme": 0.5, "peak": 0.25}
"""Rated noise power over the power that stands beside each word (common practice, no source; 6 dB crest)."""

CREST_FACTORS = {
    "square": 1.0,
    "sine": float(np.sqrt(2.0)),
    "half-wave": 2.0,
    "triangle": float(np.sqrt(3.0)),
}
"""Peak over rms by waveform (derived; crest-factor table, encyclopedia article)."""


def rated_noise_power(*, power: ArrayLike, word: str) -> Array:
    """Return the rated noise power, W, behind a power with its word.

    Parameters
    ----------
    power : array_like
        W, >= 0.
    word : str
        A key of `POWER_WORDS`.

    Raises
    ------
    ValueError
        If the power is negative or the word unknown.

    References
    ----------
    Common practice, no source: programme is twice, peak four times the rated noise power.
    """
    non_negative(power=power)
    if word not in POWER_WORDS:
        raise ValueError(f"word must be one of {', '.join(POWER_WORDS)}, got {word}")
    return array(power) * POWER_WORDS[word]


def noise_voltage(*, power: ArrayLike, impedance: ArrayLike) -> Array:
    """Return the rms voltage, V, of a power into a rated impedance.

    Parameters
    ----------
    power, impedance : array_like
        W (>= 0) and ohm (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    G. Martin, series no. 97, after IEC 268-5.
    """
    non_negative(power=power)
    positive(impedance=impedance)
    return np.sqrt(array(power) * array(impedance))


def programme_power(*, power: ArrayLike, crest_factor: ArrayLike) -> Array:
    """Return the power, W, of a programme whose peaks reach those of a sine.

    Parameters
    ----------
    power : array_like
        W of the sine, >= 0.
    crest_factor : array_like
        Peak over rms of the programme, > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: the peak power of a sine is twice its power, that of a programme its crest factor squared.
    """
    non_negative(power=power)
    positive(crest_factor=crest_factor)
    return 2 * array(power) / array(crest_factor) ** 2


def crest_decibels(*, crest_factor: ArrayLike) -> Array:
    """Return a crest factor, ratio > 0, in decibels.

    Parameters
    ----------
    crest_factor : array_like
        Peak over rms, > 0.

    Raises
    ------
    ValueError
        If the ratio is not greater than zero.

    References
    ----------
    Crest-factor table, encyclopedia article.
    """
    positive(crest_factor=crest_factor)
    return 20 * np.log10(array(crest_factor))


def power_change(*, resistance_ratio: ArrayLike) -> Array:
    """Return the change of power, dB, at constant voltage when a resistance rises by a ratio.

    Parameters
    ----------
    resistance_ratio : array_like
        Hot over cold resistance, > 0.

    Raises
    ------
    ValueError
        If the ratio is not greater than zero.

    References
    ----------
    Derived: P = V^2/R.
    """
    positive(resistance_ratio=resistance_ratio)
    return -10 * np.log10(array(resistance_ratio))


def minimum_allowed_impedance(*, nominal: ArrayLike, share: ArrayLike = 0.8) -> Array:
    """Return the lowest impedance, ohm, that a loudspeaker of this nominal impedance may have.

    Parameters
    ----------
    nominal, share : array_like
        ohm (> 0) and ratio (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    80 % rule of IEC 60268-3 and 60268-5.
    """
    positive(nominal=nominal, share=share)
    return array(share) * array(nominal)


def dc_fault_current(*, voltage: ArrayLike, dc_resistance: ArrayLike) -> Array:
    """Return the current, A, of a cold voice coil across a rail.

    Parameters
    ----------
    voltage, dc_resistance : array_like
        V (>= 0; bridged: the sum of both rails) and ohm (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    R. Elliott, Project 33 text.
    """
    non_negative(voltage=voltage)
    positive(dc_resistance=dc_resistance)
    return array(voltage) / array(dc_resistance)


def dc_fault_power(*, voltage: ArrayLike, dc_resistance: ArrayLike) -> Array:
    """Return the heat, W, of a cold voice coil across a rail.

    Parameters
    ----------
    voltage, dc_resistance : array_like
        V (>= 0; bridged: the sum of both rails) and ohm (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Joule's law; it falls as the coil heats (`fault_coil_temperature`).
    """
    return array(voltage) * dc_fault_current(voltage=voltage, dc_resistance=dc_resistance)
