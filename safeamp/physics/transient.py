"""Junction temperature within a cycle: the ripple that a periodic dissipation leaves on the mean."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive
from safeamp.physics._chunks import in_chunks
from safeamp.physics.stage.law import THERMAL_VOLTAGE, Law, device_currents

PHASES = 128
"""Parts of a cycle; the quarters between them hold the same currents, so a quarter is solved for."""


@in_chunks
def cycle_dissipation(
    *,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    phase_angle: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Array:
    """Return the dissipation of the mean device of one side through a cycle of a sine.

    Parameters
    ----------
    half_supply, peak, load_magnitude, phase_angle, conducting, emitter_resistor, idle_current, law, \
transconductance_parameter, thermal_voltage
        As in `pair_heat`.

    Returns
    -------
    numpy.ndarray
        W, cases first, `PHASES` even parts of the cycle last; the first where the load current passes
        through zero towards this side, so that the kinks of class B lie on parts.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: device voltage times device current of the class-AB law.
    """
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    non_negative(peak=peak)
    turn = 2.0 * np.pi * np.arange(PHASES) / PHASES
    swing, resistor = array(peak)[..., None], array(emitter_resistor)[..., None]
    quarter = np.sin(turn[: PHASES // 4 + 1])
    parameter = transconductance_parameter
    larger, smaller = device_currents(
        load_current=swing / array(load_magnitude)[..., None] / array(conducting)[..., None] * quarter,
        idle_current=array(idle_current)[..., None],
        emitter_resistor=resistor,
        law=law,
        transconductance_parameter=None if parameter is None else array(parameter)[..., None],
        thermal_voltage=thermal_voltage,
    )
    current = np.concatenate([_half(larger), _half(smaller)], axis=-1)
    output = swing * np.sin(turn + np.deg2rad(array(phase_angle))[..., None])
    dissipation: Array = (array(half_supply)[..., None] - output - current * resistor) * current
    return dissipation


def _half(quarter: Array) -> Array:
    """Return a half cycle, without its end, from the quarter that it goes up and down."""
    return np.concatenate([quarter, quarter[..., -2:0:-1]], axis=-1)


def peak_ripple(
    *, resistances: ArrayLike, time_constants: ArrayLike, power: ArrayLike, period: ArrayLike
) -> Array:
    """Return how far a settled periodic dissipation lifts the junction above its mean within a cycle.

    The dissipation runs straight from sample to sample; to that each Foster pair answers in closed form, harmonic by
    harmonic of the sampled period.

    Parameters
    ----------
    resistances, time_constants : array_like
        Foster pairs, K/W (>= 0) and s (> 0), shape (pairs,).
    power : array_like
        W at even parts of the period along the last axis, cases before it.
    period : array_like
        s, > 0, a number or one a case.

    Returns
    -------
    numpy.ndarray
        K, >= 0, shape of the cases.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: first-order section driven by a ramp from sample to sample, its state equal at both ends of the period.
    """
    non_negative(resistances=resistances)
    positive(time_constants=time_constants, period=period)
    samples = array(power)
    parts = samples.shape[-1]
    spectrum = np.fft.rfft(samples, axis=-1) * _transfer(
        array(resistances), array(time_constants), array(period)[..., None], parts
    )
    spectrum[..., 0] = 0.0  # the mean is the steady chain's business
    ripple: Array = np.max(np.fft.irfft(spectrum, n=parts, axis=-1), axis=-1)
    return ripple


def _transfer(resistances: Array, constants: Array, period: Array, parts: int) -> Array:
    """Return the sampled response of all pairs together to straight lines between samples, by harmonic.

    Over a step h the state goes s' = a*s + (g - a)*p + (1 - g)*p' with a = exp(-h/tau), g = (1 - a)*tau/h.
    """
    delay = np.exp(-2j * np.pi * np.arange(parts // 2 + 1) / parts)
    whole = 0.0
    for resistance, constant in zip(resistances, constants, strict=True):
        step = period / parts / constant
        keep, mean = np.exp(-step), -np.expm1(-step) / step
        whole = whole + resistance * ((mean - keep) * delay + (1.0 - mean)) / (1.0 - keep * delay)
    return np.asarray(whole)
