"""Output capacitor: cutoff, ripple, leakage, and charging at turn-on."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse


def cutoff_frequency(*, capacitance: ArrayLike, load_resistance: ArrayLike) -> Array:
    """Return the -3 dB frequency, Hz, of a series capacitor into a resistance.

    Parameters
    ----------
    capacitance, load_resistance : array_like
        F (> 0) and ohm (> 0); they broadcast.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    T. Kuphaldt, Lessons In Electric Circuits, vol. II, Filters.
    """
    positive(capacitance=capacitance, load_resistance=load_resistance)
    return 1 / (2 * np.pi * array(load_resistance) * array(capacitance))


def capacitance_for_cutoff(*, cutoff: ArrayLike, load_resistance: ArrayLike) -> Array:
    """Return the capacitance, F, whose -3 dB frequency into a resistance is `cutoff` Hz.

    Parameters
    ----------
    cutoff, load_resistance : array_like
        Hz (> 0) and ohm (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    T. Kuphaldt, Lessons In Electric Circuits, vol. II, Filters; solved for the capacitance.
    """
    positive(cutoff=cutoff, load_resistance=load_resistance)
    return 1 / (2 * np.pi * array(load_resistance) * array(cutoff))


def gain(*, frequency: ArrayLike, capacitance: ArrayLike, load_resistance: ArrayLike) -> Array:
    """Return load volts over stage volts at `frequency`, ratio 0..1.

    Parameters
    ----------
    frequency, capacitance, load_resistance : array_like
        Hz (>= 0), F (> 0), ohm (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    T. Kuphaldt, Lessons In Electric Circuits, vol. II, Filters, capacitive high-pass listing.
    """
    non_negative(frequency=frequency)
    corner = cutoff_frequency(capacitance=capacitance, load_resistance=load_resistance)
    ratio = array(frequency) / corner
    return ratio / np.sqrt(1 + ratio**2)


def load_current(*, power: ArrayLike, load_resistance: ArrayLike) -> Array:
    """Return the rms load current, A, at an output power.

    Parameters
    ----------
    power, load_resistance : array_like
        W (>= 0) and ohm (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    R. Elliott, Class-A amplifiers: a brief explanation.
    """
    non_negative(power=power)
    positive(load_resistance=load_resistance)
    return np.sqrt(array(power) / array(load_resistance))


def ripple_rms(*, load_rms: ArrayLike) -> Array:
    """Return the ripple current, A rms, of an output capacitor: all of the load current flows through it.

    Parameters
    ----------
    load_rms : array_like
        A, >= 0.

    Raises
    ------
    ValueError
        If the current is negative.

    References
    ----------
    Derived: capacitor and load are one series branch.
    """
    non_negative(load_rms=load_rms)
    return array(load_rms)


def leakage_current(*, drop: ArrayLike, resistor: ArrayLike, largest_resistor: ArrayLike = 10e3) -> Array:
    """Return the leakage current, A, from the drop across a known resistor.

    Parameters
    ----------
    drop : array_like
        V, either sign.
    resistor : array_like
        ohm, > 0 and at most `largest_resistor`: a larger one shows tens of volts for microamperes.
    largest_resistor : array_like, optional
        ohm.

    Raises
    ------
    ValueError
        If the resistor is outside its range.

    References
    ----------
    Ohm's law; the largest resistor is common practice, no source.
    """
    positive(resistor=resistor)
    above = array(resistor) > array(largest_resistor)
    refuse("resistor", resistor, above, f"at most {array(largest_resistor)}")
    return array(drop) / array(resistor)


def leakage_limit(*, capacitance: ArrayLike, rated_voltage: ArrayLike, rate: ArrayLike = 0.01) -> Array:
    """Return the leakage current, A, that a sound electrolytic stays below: 0.01 uA for each uF and volt.

    Parameters
    ----------
    capacitance, rated_voltage : array_like
        F (> 0) and V (> 0).
    rate : array_like
        1/s, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Common practice, no source (0.01 C V of general-purpose types).
    """
    positive(capacitance=capacitance, rated_voltage=rated_voltage, rate=rate)
    return array(rate) * array(capacitance) * array(rated_voltage)


def charging_voltage(
    *, supply: ArrayLike, resistance: ArrayLike, capacitance: ArrayLike, time: ArrayLike
) -> Array:
    """Return the voltage, V, of an empty capacitor `time` after a supply charges it through a resistance.

    Parameters
    ----------
    supply, resistance, capacitance, time : array_like
        V, ohm (> 0), F (> 0), s (>= 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    T. Kuphaldt, Lessons In Electric Circuits, vol. I, RC and L/R time constants.
    """
    positive(resistance=resistance, capacitance=capacitance)
    non_negative(time=time)
    return -array(supply) * np.expm1(-array(time) / (array(resistance) * array(capacitance)))


def charging_current(
    *, supply: ArrayLike, resistance: ArrayLike, capacitance: ArrayLike, time: ArrayLike
) -> Array:
    """Return the current, A, into an empty capacitor `time` after a supply charges it through a resistance.

    Parameters
    ----------
    supply, resistance, capacitance, time : array_like
        V, ohm (> 0), F (> 0), s (>= 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    T. Kuphaldt, Lessons In Electric Circuits, vol. I, RC and L/R time constants.
    """
    positive(resistance=resistance, capacitance=capacitance)
    non_negative(time=time)
    ohms = array(resistance)
    return array(supply) / ohms * np.exp(-array(time) / (ohms * array(capacitance)))


def _rise_over_time_constant(
    capacitance: ArrayLike, load_resistance: ArrayLike, rise_time: ArrayLike
) -> Array:
    positive(capacitance=capacitance, load_resistance=load_resistance)
    non_negative(rise_time=rise_time)
    return array(rise_time) / (array(capacitance) * array(load_resistance))


def turn_on_peak(
    *, capacitance: ArrayLike, load_resistance: ArrayLike, midpoint: ArrayLike, rise_time: ArrayLike
) -> Array:
    """Return the peak voltage, V, across the load while the midpoint rises in a straight line.

    Parameters
    ----------
    capacitance, load_resistance : array_like
        F (> 0) and ohm (> 0).
    midpoint, rise_time : array_like
        Final voltage, V, and time to reach it, s (>= 0; 0 is a step).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: ramp response of a first-order high-pass, V RC/T (1 - exp(-T/RC)).
    """
    ratio = _rise_over_time_constant(capacitance, load_resistance, rise_time)
    step = ratio == 0
    safe = np.where(step, 1 + 0 * ratio, ratio)
    return array(midpoint) * np.where(step, 1 + 0 * ratio, -np.expm1(-safe) / safe)


def turn_on_energy(
    *, capacitance: ArrayLike, load_resistance: ArrayLike, midpoint: ArrayLike, rise_time: ArrayLike
) -> Array:
    """Return the energy, J, that the load takes while the capacitor charges through it.

    Parameters
    ----------
    capacitance, load_resistance, midpoint, rise_time : array_like
        As for `turn_on_peak`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: with x = T/RC, C V^2 (x - 1 + exp(-x)) / x^2; half of C V^2 for a step.
    """
    ratio = _rise_over_time_constant(capacitance, load_resistance, rise_time)
    short = ratio < 1e-3
    safe = np.where(short, 1 + 0 * ratio, ratio)
    share = np.where(short, 0.5 - ratio / 6 + ratio**2 / 24, (safe + np.expm1(-safe)) / safe**2)
    return array(capacitance) * array(midpoint) ** 2 * share


def step_energy(*, capacitance: ArrayLike, step: ArrayLike) -> Array:
    """Return the energy, J, that the load takes when the midpoint jumps by `step` volts.

    Parameters
    ----------
    capacitance, step : array_like
        F (> 0) and V (either sign).

    Raises
    ------
    ValueError
        If the capacitance is not greater than zero.

    References
    ----------
    Derived: charge C dV at the mean voltage dV/2.
    """
    positive(capacitance=capacitance)
    return array(capacitance) * array(step) ** 2 / 2


def settling_time(*, capacitance: ArrayLike, resistance: ArrayLike, time_constants: ArrayLike = 5) -> Array:
    """Return the time, s, until a capacitor has charged or discharged through a resistance.

    Parameters
    ----------
    capacitance, resistance : array_like
        F (> 0) and ohm (> 0).
    time_constants : array_like
        Time constants to wait, > 0; after five 0.7 % are left.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    T. Kuphaldt, Lessons In Electric Circuits, vol. I; five time constants: common practice, no source.
    """
    positive(capacitance=capacitance, resistance=resistance, time_constants=time_constants)
    return array(time_constants) * array(resistance) * array(capacitance)
