"""Preferred values: the series of IEC 60063 and the usual rated voltages of electrolytics."""

import math
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, positive, refuse

SERIES = {
    "E3": (10, 22, 47),
    "E6": (10, 15, 22, 33, 47, 68),
    "E12": (10, 12, 15, 18, 22, 27, 33, 39, 47, 56, 68, 82),
    "E24": (
        *(10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30),
        *(33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91),
    ),
}
"""Two-digit values of one decade by series (IEC 60063)."""

RATED_VOLTAGES = (6.3, 10.0, 16.0, 25.0, 35.0, 40.0, 50.0, 63.0, 80.0, 100.0, 160.0)
"""Rated voltages of aluminium electrolytics, V (memory)."""

SAME = 1e-9
"""Relative distance below which a value counts as the preferred one (rounding of floats)."""


def _next_one(value: float, series: str, direction: str) -> float:
    if math.isnan(value):
        return value
    decade = math.floor(math.log10(value)) - 1
    near = [float(f"{digits}e{decade + step}") for step in (-1, 0, 1) for digits in SERIES[series]]
    if direction == "up":
        return min(candidate for candidate in near if candidate >= value * (1 - SAME))
    return max(candidate for candidate in near if candidate <= value * (1 + SAME))


def next_preferred(value: ArrayLike, series: str = "E6", direction: Literal["up", "down"] = "up") -> Array:
    """Return the preferred value at or next to `value`.

    Parameters
    ----------
    value : array_like
        Any unit, > 0; nan gives nan.
    series : str
        A key of `SERIES`.
    direction : str
        "up" or "down".

    Raises
    ------
    ValueError
        If a value is not greater than zero or infinite, or a word is unknown.

    References
    ----------
    IEC 60063, Preferred number series for resistors and capacitors.
    """
    positive(value=value)
    refuse("value", value, np.isinf(array(value)), "finite")
    if series not in SERIES:
        raise ValueError(f"series must be one of {', '.join(SERIES)}, got {series}")
    if direction not in ("up", "down"):
        raise ValueError(f"direction must be up or down, got {direction}")
    given = array(value)
    found = [_next_one(float(one), series, direction) for one in given.flat]
    return np.array(found, dtype=float).reshape(given.shape)[()]


def next_rated_voltage(voltage: ArrayLike) -> Array:
    """Return the lowest rated voltage, V, that is not below `voltage`.

    Parameters
    ----------
    voltage : array_like
        V, > 0, at most the highest of `RATED_VOLTAGES`; nan gives nan.

    Raises
    ------
    ValueError
        If a voltage is outside that range.

    References
    ----------
    Ratings printed on aluminium electrolytics (memory).
    """
    positive(voltage=voltage)
    given = array(voltage)
    highest = RATED_VOLTAGES[-1]
    refuse("voltage", voltage, given > highest, f"at most {highest:g}")
    ratings = np.array((*RATED_VOLTAGES, np.nan))
    return ratings[np.searchsorted(ratings[:-1], given)]
