"""The soak of a heatsink: where a warm-up ends, how well its readings tell that, and when they will.

Constant heat into one heat capacity and one resistance to constant air: Newton's law of cooling, which settles by one
exponential. For a given time constant the other two unknowns follow in closed form (variable projection), so that only
the time constant is searched for, over all of its range: no start value, no local minimum.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, positive
from safeamp.physics._profile import Profile
from safeamp.physics._student import two_sided

LEVEL = 0.95
"""Of the interval."""
SURE = 0.9973
"""Three standard errors: from there on a rise, a fall or an acceleration is none of the reading error's doing."""
FURTHEST, MOST = 20.0, 2000
"""So many lengths of a log, and so many readings, are looked ahead for the time at which its end is known."""


class SoakFit(NamedTuple):
    """What a log tells: temperatures in degC, time in s.

    Parameters
    ----------
    end, low, high : float
        Best end value and its interval; nan where nothing rises, inf where nothing bounds it.
    start : float
        Of the best curve, at the first reading.
    time_constant : float
        s; inf where a straight line is best, nan where it is too short for readings so far apart.
    scatter : float
        Of the readings around the best curve, K; nan for three, through which some curve always goes.
    error : float
        What counted as the standard error of a reading, K: the larger of what was said and the scatter.
    trend : int
        1 rising, -1 falling, 0 neither beyond the reading error.
    accelerating : bool
        The readings rise faster and faster, beyond the reading error.
    lagging : bool
        The later half rises more steeply than the best curve, beyond the reading error that was said: something with a
        longer time constant, such as the air of a cabinet, still warms, and the end lies higher than the curve says.
    """

    end: float
    low: float
    high: float
    start: float
    time_constant: float
    scatter: float
    error: float
    trend: int
    accelerating: bool
    lagging: bool


def settling_temperature(
    *, time: ArrayLike, start: ArrayLike, end: ArrayLike, time_constant: ArrayLike
) -> Array:
    """Return the temperature of a heatsink on its way from start to end.

    Parameters
    ----------
    time : array_like
        Since the start, s.
    start, end : array_like
        degC.
    time_constant : array_like
        Thermal resistance to air times heat capacity, s, > 0.

    Returns
    -------
    numpy.ndarray
        degC; all inputs broadcast.

    Raises
    ------
    ValueError
        If the time constant is not greater than zero.

    References
    ----------
    Derived: Newton's law of cooling, C dT/dt = P - (T - air)/R, gives end - (end - start) exp(-t/RC).
    """
    positive(time_constant=time_constant)
    return array(end) - (array(end) - array(start)) * np.exp(-array(time) / array(time_constant))


def soak_resistance(*, sink: ArrayLike, air: ArrayLike, power: ArrayLike) -> Array:
    """Return the thermal resistance from heatsink to air, K/W, of a heatsink that has settled.

    Parameters
    ----------
    sink, air, power : array_like
        degC, degC, W (> 0); they broadcast.

    Raises
    ------
    ValueError
        If the power is not greater than zero.

    References
    ----------
    Derived: the definition of a thermal resistance, rise over heat.
    """
    positive(power=power)
    return (array(sink) - array(air)) / array(power)


def soak_fit(*, time: ArrayLike, sink: ArrayLike, reading_error: float) -> SoakFit:
    """Return the exponential that fits readings best, with the interval of its end value.

    The interval holds every end value for which some time constant fits no worse than the best curve by more than the
    reading error explains. It is not symmetrical: where a straight line still fits, it has no upper end.

    Parameters
    ----------
    time, sink : array_like
        s (rising) and degC, three readings or more, each of shape (readings,).
    reading_error : float
        Standard error of one reading, K, > 0. Where the readings scatter more than that around the best curve, it is
        not believed: their scatter takes its place, with Student's factor for its degrees of freedom.

    Returns
    -------
    SoakFit

    Raises
    ------
    ValueError
        If there are fewer than three readings, their times do not rise, or the error is not greater than zero.

    References
    ----------
    Derived: profile of the sum of squares; its threshold by chi-square of one degree of freedom, or by Student's t
    (memory).
    """
    profile = _profile(time, sink, reading_error)
    error = _Error(profile, reading_error)
    trend, accelerating = _trend(profile, error), _accelerating(profile, error)
    found, unknown = profile.settling, trend <= 0 or accelerating
    low, high = (np.nan, np.nan) if unknown else profile.interval(error.allowed(LEVEL) ** 2)
    return SoakFit(
        end=np.nan if unknown else found.end,
        low=low,
        high=high,
        start=found.start,
        time_constant=np.nan if unknown else found.time_constant,
        scatter=error.scatter,
        error=error.used,
        trend=trend,
        accelerating=accelerating,
        lagging=not unknown and _lagging(profile, reading_error),
    )


def time_needed(*, time: ArrayLike, sink: ArrayLike, reading_error: float, within: float) -> float:
    """Return the smallest further time after which both halves of the interval of the end value are within a span, s.

    Further readings are taken to lie on the best curve, as far apart as the median of those so far.

    Parameters
    ----------
    time, sink, reading_error
        As in `soak_fit`.
    within : float
        K, > 0.

    Returns
    -------
    float
        0 where they are already; inf where that cannot be foreseen: nothing rises, a straight line fits best, or not
        within `FURTHEST` lengths of the log or `MOST` readings.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: a further reading on the best curve leaves it the best and its sum of squares as it was, and adds to that
    of every other; so the interval only shrinks, and the first count that is enough is found by halving.
    """
    positive(within=within)
    profile = _profile(time, sink, reading_error)
    error = _Error(profile, reading_error)
    if _trend(profile, error) <= 0 or _accelerating(profile, error) or not np.isfinite(profile.settling.end):
        return float("inf")
    allowed = error.allowed(LEVEL) ** 2
    step = float(np.median(np.diff(profile.time)))
    most = min(int(np.ceil(FURTHEST * profile.length / step)), MOST)

    def enough(count: int) -> bool:
        return profile.continued(count, step).within(allowed, within)

    if enough(0):
        return 0.0
    few, many = 0, 1
    while not enough(many):
        few, many = many, 2 * many
        if few >= most:
            return float("inf")
    while many - few > 1:
        middle = (few + many) // 2
        few, many = (few, middle) if enough(middle) else (middle, many)
    return many * step


def _profile(time: ArrayLike, sink: ArrayLike, reading_error: float) -> Profile:
    positive(reading_error=reading_error)
    times, temperatures = array(time), array(sink)
    if times.ndim != 1 or times.shape != temperatures.shape or times.size < 3:
        raise ValueError(f"time and sink must be three readings or more, got {times.size}")
    if not (np.all(np.isfinite(temperatures)) and np.all(np.diff(times) > 0.0)):
        raise ValueError("time must rise from reading to reading, and every reading must be a number")
    return Profile(times, temperatures)


def _trend(profile: Profile, error: _Error) -> int:
    """Return whether the best curve rises or falls over the log, by three standard errors of that or more."""
    best = profile.best
    return int(np.sign(best.rise)) if abs(best.rise) > two_sided(SURE) * error.used * best.rise_error else 0


def _accelerating(profile: Profile, error: _Error) -> bool:
    """Whether no curve that settles fits nearly as well as one that grows faster and faster."""
    worse = profile.settling.squares - profile.best.squares
    return _trend(profile, error) > 0 and worse > error.allowed(SURE) ** 2


def _lagging(profile: Profile, said: float) -> bool:
    """Whether what the best curve leaves of the later half rises, by three errors of that: the scatter hides it."""
    half = slice(-max(3, (profile.x.size + 1) // 2), None)
    left, apart = profile.left_by_settling()[half], profile.x[half] - profile.x[half].mean()
    return bool(np.sum(apart * left) > two_sided(SURE) * said * np.sqrt(np.sum(apart * apart)))


class _Error:
    """The standard error of a reading: the one that was said, or the scatter where that is larger."""

    def __init__(self, profile: Profile, said: float) -> None:
        self.freedom = profile.time.size - 3
        self.scatter = float(np.sqrt(profile.best.squares / self.freedom)) if self.freedom else float("nan")
        self.used = self.scatter if self.scatter > said else said

    def allowed(self, level: float) -> float:
        """Return the standard error times the factor of a two-sided level, K."""
        return self.used * two_sided(level, self.freedom if self.used == self.scatter else None)
