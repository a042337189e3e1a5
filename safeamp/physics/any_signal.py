"""The most that any signal within a bound can do to a loudspeaker: not only a sine, and not only music."""

from __future__ import annotations

from functools import lru_cache

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive
from safeamp.physics._rational import Coefficients, Fractions, fractions
from safeamp.physics.driver import Driver, Motional

S = np.array([1.0, 0.0])
"""The polynomial s."""


def admittance(
    *, driver: Driver, series_resistor: float = 0.0, capacitance: float | None = None
) -> tuple[Coefficients, Coefficients]:
    """Return numerator and denominator in s, highest power first, of the admittance of a driver, A/V.

    Parameters
    ----------
    driver : Driver
        Single numbers.
    series_resistor, capacitance : float
        ohm, >= 0, and F, > 0, in series with it; None without a capacitor.

    Raises
    ------
    ValueError
        If the resistor is below zero or the capacitance not greater than zero.

    References
    ----------
    Derived: one over the sum of the impedances, cleared of fractions.
    """
    non_negative(series_resistor=series_resistor)
    positive(capacitance=1.0 if capacitance is None else capacitance)
    parts = driver.motional
    moving = np.array(
        [float(parts.capacitance), 1.0 / float(parts.resistance), 1.0 / float(parts.inductance)]
    )
    coil = np.array([float(driver.inductance), float(driver.dc_resistance) + float(series_resistor)])
    through = np.polyadd(np.polymul(coil, moving), S).astype(float)
    if capacitance is None:
        return moving, through
    numerator: Coefficients = np.polymul(S, moving)
    denominator = np.polyadd(np.polymul(S, through), moving / float(capacitance)).astype(float)
    return numerator, denominator


def _variation(response: Fractions) -> float:
    """Return the integral of the magnitude of an impulse response, its direct part included.

    Between two zeros of the impulse response the step response runs one way: the sum of these runs is the integral.
    """
    times = response.times()
    impulse = response.impulse(times)
    before, after = impulse[:-1], impulse[1:]
    turns = np.flatnonzero(np.sign(before) * np.sign(after) < 0)
    share = before[turns] / (before[turns] - after[turns])
    zeros = times[turns] + share * (times[turns + 1] - times[turns])
    levels = response.step(np.concatenate([times[:1], zeros, times[-1:]]))
    return abs(response.direct) + float(np.sum(np.abs(np.diff(levels))))


@lru_cache(maxsize=256)
def _norm(
    dc_resistance: float,
    resistance: float,
    capacitance: float,
    inductance: float,
    coil_inductance: float,
    series_resistor: float,
    series_capacitance: float,
) -> float:
    given = (dc_resistance, resistance, capacitance, inductance, coil_inductance, series_resistor)
    if np.any(np.isnan([*given, series_capacitance])):
        return float("nan")
    driver = Driver(dc_resistance, Motional(resistance, capacitance, inductance), coil_inductance)
    in_series = None if np.isinf(series_capacitance) else series_capacitance
    return _variation(
        fractions(*admittance(driver=driver, series_resistor=series_resistor, capacitance=in_series))
    )


def admittance_norm(
    *, driver: Driver, series_resistor: ArrayLike = 0.0, capacitance: ArrayLike = np.inf
) -> Array:
    """Return the largest current of any signal for each volt of its bound, A/V.

    It is the integral of the magnitude of the impulse response of the admittance. Without inductance the response
    has a direct part, 1/R, which counts.

    Parameters
    ----------
    driver : Driver
        Values > 0, the inductance >= 0.
    series_resistor, capacitance : array_like
        ohm (>= 0) and F (> 0) in series with the driver; infinite without a capacitor.

    Returns
    -------
    numpy.ndarray
        A/V, broadcast shape of the inputs; nan where one is nan.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    L1 norm of the impulse response: the induced gain from peak to peak of a linear circuit; derived in the tests.
    """
    parts = driver.motional
    positive(
        dc_resistance=driver.dc_resistance,
        motional_resistance=parts.resistance,
        motional_capacitance=parts.capacitance,
        motional_inductance=parts.inductance,
        capacitance=capacitance,
    )
    non_negative(inductance=driver.inductance, series_resistor=series_resistor)
    values = (driver.dc_resistance, parts.resistance, parts.capacitance, parts.inductance, driver.inductance)
    cases = np.broadcast_arrays(*(array(value) for value in (*values, series_resistor, capacitance)))
    norms = [_norm(*(float(value) for value in case)) for case in zip(*(c.flat for c in cases), strict=True)]
    return np.reshape(np.array(norms, dtype=float), cases[0].shape)


def largest_current(
    *, peak: ArrayLike, driver: Driver, series_resistor: ArrayLike = 0.0, capacitance: ArrayLike = np.inf
) -> Array:
    """Return the largest current, A, that any signal within +-`peak` volts can draw.

    Parameters
    ----------
    peak : array_like
        V, >= 0.
    driver, series_resistor, capacitance
        As for `admittance_norm`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: the bound of the signal times the L1 norm; reached by the signal of the signs of the response, reversed.
    """
    non_negative(peak=peak)
    norm = admittance_norm(driver=driver, series_resistor=series_resistor, capacitance=capacitance)
    return array(peak) * norm
