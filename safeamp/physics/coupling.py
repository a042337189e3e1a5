"""An output capacitor into a driver: what becomes of the low notes, and how the cone moves at switch-on."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive
from safeamp.physics._rational import fractions
from safeamp.physics.any_signal import admittance
from safeamp.physics.driver import Driver, complex_impedance, small_signal_parameters

LOWEST, HIGHEST = 1.0 / 30.0, 5.0
"""Of the resonance: where a peak of the low notes is looked for."""
COARSE = 601
ROUNDS = 4


def _checked(driver: Driver, capacitance: ArrayLike, series_resistor: ArrayLike) -> None:
    positive(capacitance=capacitance, dc_resistance=driver.dc_resistance)
    non_negative(series_resistor=series_resistor, inductance=driver.inductance)


def response(
    *, driver: Driver, frequency: ArrayLike, capacitance: ArrayLike, series_resistor: ArrayLike = 0.0
) -> Array:
    """Return the voltage at a driver behind a capacitor, over that which the coil alone takes of middle notes.

    Parameters
    ----------
    driver : Driver
        Its values broadcast against the others.
    frequency, capacitance, series_resistor : array_like
        Hz (> 0), F (> 0), ohm (>= 0: ESR and any resistor in series).

    Returns
    -------
    numpy.ndarray
        Ratio; 1 for middle notes.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: voltage divider of complex impedances; the level of the coil's resistance alone is the reference.
    """
    _checked(driver, capacitance, series_resistor)
    positive(frequency=frequency)
    load = complex_impedance(driver=driver, frequency=frequency)
    before = array(series_resistor) + 1 / (2j * np.pi * array(frequency) * array(capacitance))
    reference = array(driver.dc_resistance) / (array(driver.dc_resistance) + array(series_resistor))
    return np.abs(load / (load + before)) / reference


def _polynomials(driver: Driver, capacitance: Array, resistor: Array) -> tuple[list[Array], list[Array]]:
    """Return numerator and denominator of the response in s, lowest power first."""
    parts = driver.motional
    coil, henries = array(driver.dc_resistance), array(driver.inductance)
    moving = [1 / array(parts.inductance), 1 / array(parts.resistance), array(parts.capacitance)]
    load = [
        coil * moving[0],
        coil * moving[1] + henries * moving[0] + 1,
        coil * moving[2] + henries * moving[1],
        henries * moving[2],
    ]
    shared = [resistor * part for part in moving]
    numerator = [0 * coil, *load]
    denominator = [
        moving[0] / capacitance,
        load[0] + shared[0] + moving[1] / capacitance,
        load[1] + shared[1] + moving[2] / capacitance,
        load[2] + shared[2],
        load[3],
    ]
    return numerator, denominator


def _squared(powers: list[Array], turn: Array) -> list[Array]:
    """Return |polynomial|^2 on the axis in powers of (frequency/turn)^2, lowest first."""
    a0, a1, a2, a3, a4 = (power * turn**place for place, power in enumerate(powers))
    even, odd = (a0, -a2, a4), (a1, -a3)
    return [
        even[0] ** 2,
        2 * even[0] * even[1] + odd[0] ** 2,
        2 * even[0] * even[2] + even[1] ** 2 + 2 * odd[0] * odd[1],
        2 * even[1] * even[2] + odd[1] ** 2,
        even[2] ** 2,
    ]


def cutoff_frequency(*, driver: Driver, capacitance: ArrayLike, series_resistor: ArrayLike = 0.0) -> Array:
    """Return the frequency, Hz, above which a driver behind a capacitor never falls 3 dB below its middle notes.

    Parameters
    ----------
    driver, capacitance, series_resistor
        As for `response`.

    Returns
    -------
    numpy.ndarray
        Hz, broadcast shape of the inputs; nan where one is nan.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: |response|^2 = 1/2 is a polynomial of fourth degree in the square of the frequency; its largest root.
    """
    _checked(driver, capacitance, series_resistor)
    turn = (
        2 * np.pi * small_signal_parameters(dc_resistance=driver.dc_resistance, motional=driver.motional)[0]
    )
    resistor, coil = array(series_resistor), array(driver.dc_resistance)
    upper, lower = _polynomials(driver, array(capacitance), resistor)
    half = (coil / (coil + resistor)) ** 2 / 2
    powers = [n - half * d for n, d in zip(_squared(upper, turn), _squared(lower, turn), strict=True)]
    without = array(driver.inductance) == 0
    *levels, turn, free = np.broadcast_arrays(*powers, turn, without)
    square = 1 / _smallest(np.stack(levels, axis=-1).reshape(-1, 5), free.reshape(-1))
    return turn / (2 * np.pi) * np.sqrt(square.reshape(turn.shape))


def _smallest(powers: Array, falls_short: Array) -> Array:
    """Return the smallest positive root of p0 y^4 + p1 y^3 + ... of each row; a row may lack its last term."""
    known = np.all(np.isfinite(powers), axis=-1)
    companion = np.zeros((len(powers), 4, 4))
    companion[:, 0, :] = np.where(known[:, None], -powers[:, 1:] / powers[:, :1], 0.0)
    companion[:, [1, 2, 3], [0, 1, 2]] = 1.0
    roots = np.linalg.eigvals(companion)
    nearest = np.argmin(np.abs(roots), axis=-1)[:, None]
    none = falls_short[:, None] & (np.arange(4) == nearest)  # the root of the term that is not there
    real = (np.abs(roots.imag) <= 1e-7 * np.abs(roots)) & (roots.real > 0) & ~none
    found: Array = np.min(np.where(real, roots.real, np.inf), axis=-1)
    return np.where(known, found, np.nan)


def low_peak(
    *, driver: Driver, capacitance: ArrayLike, series_resistor: ArrayLike = 0.0
) -> tuple[Array, Array]:
    """Return the highest response of the low notes, dB over the middle notes, and its frequency, Hz.

    Looked for between a thirtieth and five times the resonance.

    Parameters
    ----------
    driver, capacitance, series_resistor
        As for `response`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: `response` on a grid of logarithms, refined around its best.
    """
    center = small_signal_parameters(dc_resistance=driver.dc_resistance, motional=driver.motional)[0]
    parts = [driver.dc_resistance, driver.motional.resistance, driver.motional.capacitance]
    parts += [driver.motional.inductance, driver.inductance, capacitance, series_resistor]
    spread = [array(part)[..., None] for part in parts]
    wide = Driver(spread[0], type(driver.motional)(*spread[1:4]), spread[4])
    place = np.linspace(np.log(LOWEST), np.log(HIGHEST), COARSE)
    step = place[1] - place[0]
    for _ in range(ROUNDS):
        hertz = array(center)[..., None] * np.exp(place)
        level = response(driver=wide, frequency=hertz, capacitance=spread[5], series_resistor=spread[6])
        best = np.argmax(level, axis=-1)[..., None]
        middle = np.take_along_axis(np.broadcast_to(place, level.shape), best, axis=-1)
        place, step = middle + step * np.linspace(-1.0, 1.0, 21), step / 10.0
    top = np.take_along_axis(level, best, axis=-1)[..., 0]
    return 20 * np.log10(top), np.take_along_axis(np.broadcast_to(hertz, level.shape), best, axis=-1)[..., 0]


def turn_on_displacement(
    *,
    driver: Driver,
    force_factor: float,
    capacitance: float,
    midpoint: float,
    rise_time: float,
    series_resistor: float = 0.0,
) -> float:
    """Return the largest travel of the cone, m, while the capacitor charges through the driver.

    Parameters
    ----------
    driver : Driver
        One driver, single numbers.
    force_factor, capacitance : float
        N/A and F, > 0.
    midpoint, rise_time, series_resistor : float
        V at the end, s in which it rises in a straight line (0 is a step), ohm.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: partial fractions of travel over voltage; the response to a ramp that stops.
    """
    _checked(driver, capacitance, series_resistor)
    positive(force_factor=force_factor)
    non_negative(rise_time=rise_time)
    _, through = admittance(driver=driver, series_resistor=series_resistor, capacitance=capacitance)
    travel = fractions(np.array([1.0 / force_factor, 0.0]), through)
    times = travel.times()
    if rise_time == 0:
        return float(np.max(np.abs(midpoint * travel.step(times))))
    times = np.unique(np.concatenate([times, times + rise_time]))
    late = np.maximum(times - rise_time, 0.0)
    moved = (travel.ramp(times) - travel.ramp(late)) * (midpoint / rise_time)
    return float(np.max(np.abs(moved)))
