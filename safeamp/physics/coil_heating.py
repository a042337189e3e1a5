"""A voice coil at constant voltage: two heat stages, coil and magnet, and the resistance rise of copper."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike, NDArray

from safeamp.physics._checks import Array, array, non_negative, positive

COPPER = 0.00393
"""Temperature coefficient of copper at 20 degC, 1/K."""

STEPS = 160
"""Steps of each run; they grow in proportion to the time that has passed."""

HORIZON = 30.0
"""Slowest time constants after which a coil counts as settled."""


def copper_ratio(
    *,
    rise: ArrayLike,
    start: ArrayLike = 20.0,
    coefficient: ArrayLike = COPPER,
    coefficient_at: ArrayLike = 20.0,
) -> Array:
    """Return the resistance of copper after a rise over its resistance at `start`.

    Parameters
    ----------
    rise, start, coefficient_at : array_like
        K, degC, and the degC at which `coefficient` holds.
    coefficient : array_like
        1/K, > 0.

    Raises
    ------
    ValueError
        If the coefficient, or either resistance by the linear law, is not greater than zero.

    References
    ----------
    Engineering page on enclosures, ohmicaudio; linear law of copper.
    """
    positive(coefficient=coefficient)
    cold = 1 + array(coefficient) * (array(start) - array(coefficient_at))
    hot = cold + array(coefficient) * array(rise)
    positive(resistance_at_start=cold, resistance_after_rise=hot)
    return hot / cold


@dataclass(frozen=True, eq=False)
class _Coil:
    """Fault heating in kelvin above air; all fields broadcast."""

    power: Array  # at the air temperature, W
    slope: Array  # relative resistance rise per kelvin above air, 1/K
    coil: Array  # coil to magnet, K/W
    fast: Array  # coil time constant, s
    magnet: Array  # magnet to air, K/W
    slow: Array  # magnet time constant, s

    def advance(self, coil: Array, magnet: Array, time: Array) -> tuple[Array, Array]:
        """Return coil and magnet rise after `time`, the heat taken linear in the coil rise.

        One exponential Rosenbrock-Euler step: x + time*phi1(time*J)*f, exact while the heat is linear.
        """
        resistance = 1 + self.slope * coil
        heat = self.power / resistance
        falls = heat * self.slope / resistance
        ratio = self.magnet / self.coil
        of_coil = (self.coil * heat - (coil - magnet)) / self.fast
        of_magnet = (ratio * (coil - magnet) - magnet) / self.slow
        j11, j12 = -(1 + self.coil * falls) / self.fast, 1 / self.fast
        j21, j22 = ratio / self.slow, -(1 + ratio) / self.slow
        middle, half = (j11 + j22) / 2, np.sqrt(((j11 - j22) / 2) ** 2 + j12 * j21)
        last = middle - half
        # The slower rate from the product of both: their difference would cancel.
        first = (j11 * j22 - j12 * j21) / last
        one, two = np.expm1(time * first) / first, np.expm1(time * last) / last
        mean, skew = (one * -last + two * first) / (first - last), (one - two) / (first - last)
        return (
            coil + mean * of_coil + skew * (j11 * of_coil + j12 * of_magnet),
            magnet + mean * of_magnet + skew * (j21 * of_coil + j22 * of_magnet),
        )

    def horizon(self) -> Array:
        """Return the time, s, after which nothing changes any more."""
        return HORIZON * (self.slow + (1 + self.magnet / self.coil) * self.fast)

    def quickest(self, span: Array) -> Array:
        """Return a time, s, in which the coil moves by a small part of `span` kelvin."""
        rate = self.coil * self.power / self.fast
        heated = rate > 0
        crossing = np.where(heated, span / np.where(heated, rate, 1.0), self.fast)
        return 0.02 * np.clip(crossing, 1e-6 * self.fast, self.fast)

    def settled(self) -> Array:
        """Return the steady coil rise, K: the root of rise*(1 + slope*rise) = power*resistance."""
        target = self.power * (self.coil + self.magnet)
        rise: Array = 2 * target / (1 + np.sqrt(1 + 4 * self.slope * target))
        return rise


def _coil(
    voltage: ArrayLike,
    dc_resistance: ArrayLike,
    coil_to_magnet: ArrayLike,
    coil_time_constant: ArrayLike,
    magnet_to_air: ArrayLike,
    magnet_time_constant: ArrayLike,
    air: ArrayLike,
    resistance_at: ArrayLike,
) -> _Coil:
    non_negative(voltage=voltage)
    positive(
        dc_resistance=dc_resistance,
        coil_to_magnet=coil_to_magnet,
        coil_time_constant=coil_time_constant,
        magnet_to_air=magnet_to_air,
        magnet_time_constant=magnet_time_constant,
    )
    in_air = copper_ratio(rise=array(air) - array(resistance_at), start=resistance_at)
    slope = COPPER / (1 + COPPER * (array(air) - 20.0))
    fields = (
        array(voltage) ** 2 / (array(dc_resistance) * in_air),
        slope,
        array(coil_to_magnet),
        array(coil_time_constant),
        array(magnet_to_air),
        array(magnet_time_constant),
    )
    return _Coil(*np.broadcast_arrays(*fields))


def settled_coil_temperature(
    *,
    voltage: ArrayLike,
    dc_resistance: ArrayLike,
    coil_to_magnet: ArrayLike,
    magnet_to_air: ArrayLike,
    air: ArrayLike,
    resistance_at: ArrayLike = 20.0,
) -> Array:
    """Return the temperature, degC, that a voice coil reaches in the end at constant voltage.

    Parameters
    ----------
    voltage, dc_resistance, coil_to_magnet, magnet_to_air, air, resistance_at : array_like
        As for `time_to_temperature`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: both resistances carry V^2/R, R rising with the coil; a quadratic equation.
    """
    coil = _coil(voltage, dc_resistance, coil_to_magnet, 1.0, magnet_to_air, 1.0, air, resistance_at)
    return array(air) + coil.settled()


def fault_coil_temperature(
    *,
    voltage: ArrayLike,
    dc_resistance: ArrayLike,
    coil_to_magnet: ArrayLike,
    coil_time_constant: ArrayLike,
    magnet_to_air: ArrayLike,
    magnet_time_constant: ArrayLike,
    start: ArrayLike,
    air: ArrayLike,
    time: ArrayLike,
    resistance_at: ArrayLike = 20.0,
) -> Array:
    """Return the temperature, degC, of a voice coil `time` after a direct voltage comes on.

    Parameters
    ----------
    voltage, dc_resistance, coil_to_magnet, coil_time_constant, magnet_to_air, magnet_time_constant,
    start, air
        As for `time_to_temperature`.
    time, resistance_at : array_like
        s (>= 0); degC at which `dc_resistance` was read.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: exponential Rosenbrock-Euler steps of the two-stage network.
    """
    non_negative(time=time)
    coil = _coil(
        *(voltage, dc_resistance, coil_to_magnet, coil_time_constant, magnet_to_air, magnet_time_constant),
        *(air, resistance_at),
    )
    rise = array(start) - array(air) + 0 * coil.power * array(time)
    magnet, last = rise, array(time) + 0 * rise
    first = np.minimum(coil.quickest(np.full(np.shape(rise), 100.0)), last)
    growth = np.where(last > 0, last / np.where(first > 0, first, 1.0), 1.0) ** (1 / (STEPS - 1))
    passed = np.zeros(np.shape(rise))
    for step in range(STEPS):
        after = first * growth**step
        rise, magnet = coil.advance(rise, magnet, after - passed)
        passed = after
    return array(air) + rise


def time_to_temperature(
    *,
    voltage: ArrayLike,
    dc_resistance: ArrayLike,
    coil_to_magnet: ArrayLike,
    coil_time_constant: ArrayLike,
    magnet_to_air: ArrayLike,
    magnet_time_constant: ArrayLike,
    start: ArrayLike,
    air: ArrayLike,
    limit: ArrayLike,
    resistance_at: ArrayLike = 20.0,
) -> Array:
    """Return the time, s, in which a direct voltage brings a voice coil to `limit`; inf if it never does.

    Parameters
    ----------
    voltage : array_like
        Constant direct voltage, V, >= 0.
    dc_resistance : array_like
        ohm, > 0, read at `resistance_at` degC.
    coil_to_magnet, magnet_to_air : array_like
        K/W, > 0.
    coil_time_constant, magnet_time_constant : array_like
        s, > 0; each resistance times the heat capacity before it.
    start, air, limit : array_like
        degC: coil and magnet at the beginning, air, and the coil limit.
    resistance_at : array_like
        degC.

    Returns
    -------
    numpy.ndarray
        s; zero where the coil starts at or above the limit.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: exponential Rosenbrock-Euler steps of the two-stage network; the crossing by bisection.
    """
    coil = _coil(
        *(voltage, dc_resistance, coil_to_magnet, coil_time_constant, magnet_to_air, magnet_time_constant),
        *(air, resistance_at),
    )
    goal = array(limit) - array(air) + 0 * coil.power
    rise = array(start) - array(air) + 0 * goal
    time, reached = _first_crossing(coil, rise, goal)
    # A coil that settles above the limit but has not crossed yet is within rounding of it: it counts.
    time = np.where(reached | (coil.settled() > goal), time, np.inf)
    time = np.where(rise >= goal, 0.0, time)
    return np.where(np.isnan(goal + rise + coil.horizon()), np.nan, time)[()]


def _first_crossing(coil: _Coil, start: Array, goal: Array) -> tuple[Array, NDArray[np.bool_]]:
    """Return the time at which the coil first reaches `goal`, or the horizon, and whether it did."""
    first = coil.quickest(goal - start)
    growth = (coil.horizon() / first) ** (1 / (STEPS - 1))
    rise, magnet, passed = start, start, np.zeros(np.shape(start))
    before: tuple[Array, ...] = (rise, magnet, passed, first)
    reached = rise >= goal
    for step in range(STEPS):
        length = first * growth**step - passed
        state = (rise, magnet, passed, length)
        before = tuple(np.where(reached, old, new) for old, new in zip(before, state, strict=True))
        rise, magnet = coil.advance(rise, magnet, length)
        reached = reached | (rise >= goal)
        passed = passed + length
        if np.all(reached):
            break
    rise, magnet, passed, length = before
    low, high = np.zeros(np.shape(start)), np.ones(np.shape(start))
    for _ in range(40):
        middle = (low + high) / 2
        over = coil.advance(rise, magnet, middle * length)[0] >= goal
        low, high = np.where(over, low, middle), np.where(over, middle, high)
    return passed + high * length, reached
