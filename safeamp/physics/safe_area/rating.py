"""What a data sheet says of one device, and what temperature leaves of it."""

from collections.abc import Iterator
from dataclasses import dataclass, replace
from itertools import pairwise
from typing import Any

import numpy as np
from numpy.typing import ArrayLike, NDArray

from safeamp.physics._checks import Array, array, positive, refuse

Mask = NDArray[np.bool_]

UNDER = 0.95
"""A first point below this part of the power line says that the sheet starts its curve too late."""


@dataclass(frozen=True, eq=False)
class Rating:
    """Ratings of one device; every value a number or an array of cases."""

    current: Any
    """A, continuous."""
    power: Any
    """W, printed, with the case at `power_at`."""
    power_at: Any
    """degC of the case."""
    junction_limit: Any
    """degC, above `power_at`."""
    junction_to_case: Any
    """K/W, or None when the sheet prints none."""
    voltage: Any
    """V."""
    points: tuple[tuple[Any, Any], ...] = ()
    """V and A of the DC safe area beyond the power line, rising in voltage."""

    def __post_init__(self) -> None:
        """Refuse what no device can have."""
        positive(current=self.current, power=self.power, voltage=self.voltage)
        if self.junction_to_case is not None:
            positive(junction_to_case=self.junction_to_case)
        limit, at = array(self.junction_limit), array(self.power_at)
        refuse("junction_limit", limit, limit <= at, "above power_at")
        for volts, amperes in self.points:
            positive(safe_area_voltage=volts, safe_area_current=amperes)
        for (low, _), (high, _) in pairwise(self.points):
            refuse("safe_area voltage", high, array(high) <= array(low), "above the one before it")


def spread_out(rating: Rating) -> Rating:
    """Return the rating with a last axis for the phase on every value."""
    names = ("current", "power", "power_at", "junction_limit", "voltage")
    values: dict[str, Any] = {name: array(getattr(rating, name))[..., None] for name in names}
    if rating.junction_to_case is not None:
        values["junction_to_case"] = array(rating.junction_to_case)[..., None]
    values["points"] = tuple((array(v)[..., None], array(i)[..., None]) for v, i in rating.points)
    return replace(rating, **values)


def usable_power(
    *,
    power: ArrayLike,
    power_at: ArrayLike,
    junction_limit: ArrayLike,
    junction_to_case: ArrayLike | None,
) -> Array:
    """Return the power that printed rating and thermal resistance both allow at `power_at`.

    Parameters
    ----------
    power : array_like
        W, printed, > 0.
    power_at : array_like
        degC of the case.
    junction_limit : array_like
        degC, above `power_at`.
    junction_to_case : array_like or None
        K/W, > 0; None leaves the printed power.

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
    Sheets contradict themselves, so the smaller counts; common practice, no source.
    """
    positive(power=power)
    limit, at = array(junction_limit), array(power_at)
    refuse("junction_limit", junction_limit, limit <= at, "above power_at")
    if junction_to_case is None:
        return np.broadcast_to(array(power), np.broadcast_shapes(np.shape(power), limit.shape, at.shape))
    positive(junction_to_case=junction_to_case)
    usable: Array = np.minimum(array(power), (limit - at) / array(junction_to_case))
    return usable


def derating(*, case_temperature: ArrayLike, power_at: ArrayLike, junction_limit: ArrayLike) -> Array:
    """Return the part of power and safe area that is left at a case temperature.

    Parameters
    ----------
    case_temperature : array_like
        degC.
    power_at : array_like
        degC up to which the ratings hold in full.
    junction_limit : array_like
        degC at which nothing is left, above `power_at`.

    Returns
    -------
    numpy.ndarray
        0 to 1 by definition, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If `junction_limit` is not above `power_at`.

    References
    ----------
    Linear derating, R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, ch. 12.
    """
    limit, at = array(junction_limit), array(power_at)
    refuse("junction_limit", junction_limit, limit <= at, "above power_at")
    left: Array = np.clip((limit - array(case_temperature)) / (limit - at), 0.0, 1.0)
    return left


def rated_power(rating: Rating) -> Array:
    """Return the usable power of a rating, W."""
    return usable_power(
        power=rating.power,
        power_at=rating.power_at,
        junction_limit=rating.junction_limit,
        junction_to_case=rating.junction_to_case,
    )


def starts_under(rating: Rating) -> Mask:
    """Tell where the first point lies more than 5 % under the power line."""
    volts, amperes = rating.points[0]
    under: Mask = array(volts) * array(amperes) < UNDER * rated_power(rating)
    return under


def _problems(rating: Rating) -> Iterator[tuple[str, Mask]]:
    """Yield what keeps the points from being a curve, with the cases that it concerns."""
    if len(rating.points) == 1:
        says = "the only point of the safe area lies more than 5 % under the power line: add another"
        yield says, starts_under(rating)
    for (_, before), (volts, after) in pairwise(rating.points):
        rising: Mask = array(after) > array(before)
        if np.any(rising):
            nominal = float(np.ravel(volts)[0])
            yield f"the current of the safe area rises towards {nominal:g} V", rising


def unusable(rating: Rating) -> Mask:
    """Tell where the points do not give a curve."""
    marks: Mask = np.asarray(False)
    for _, where in _problems(rating):
        marks = np.logical_or(marks, where)
    return marks


def points_problem(rating: Rating) -> str | None:
    """Return in words why the points do not give a curve, or None when they do.

    Parameters
    ----------
    rating : Rating
        Ratings of the device; without points there is no problem, only a power line.

    Returns
    -------
    str or None
        The first problem of any case.

    References
    ----------
    Derived: two points make a line on log-log paper, one does not.
    """
    return next((says for says, where in _problems(rating) if np.any(where)), None)
