"""A V-I limiter: its line against the safe area of the device, and against what the load asks for."""

from collections.abc import Sequence
from itertools import pairwise

import numpy as np
from numpy.typing import ArrayLike, NDArray

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within
from safeamp.physics.safe_area.boundary import boundary
from safeamp.physics.safe_area.locus import UNKNOWN, Use
from safeamp.physics.safe_area.rating import Rating, spread_out
from safeamp.physics.stage import THERMAL_VOLTAGE, Law, carrying_current

Points = Sequence[tuple[ArrayLike, ArrayLike]]

_STEPS = 512
"""Voltages looked at besides the corners of both lines: between two of them neither line bends."""


def _checked(points: Points) -> list[tuple[Array, Array]]:
    if not points:
        raise ValueError("points must have at least one pair of volts and amperes")
    checked = [(array(volts), array(amperes)) for volts, amperes in points]
    for volts, amperes in checked:
        non_negative(limiter_voltage=volts, limiter_current=amperes)
    for (low, _), (high, _) in pairwise(checked):
        refuse("limiter voltage", high, high <= low, "above the one before it")
    return checked


def limiter_current(*, voltage: ArrayLike, points: Points) -> Array:
    """Return the device current at which a V-I limiter acts.

    Straight lines between the points; before the first and beyond the last the current of that point, so that
    nothing better is supposed than what was measured.

    Parameters
    ----------
    voltage : array_like
        V across the device.
    points : sequence of pairs
        V and A, rising in voltage; each a number or one value a case (then with a last axis of 1).

    Returns
    -------
    numpy.ndarray
        A, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a point is negative, the voltages do not rise, or there is no point.

    References
    ----------
    Derived: linear interpolation; a limiter with resistors gives straight lines.
    """
    checked, volts = _checked(points), array(voltage)
    current = checked[0][1] + 0.0 * volts
    for (low, more), (high, less) in pairwise(checked):
        line = more + (less - more) * (volts - low) / (high - low)
        current = np.where(volts > low, line, current)
    last_volts, last_amperes = checked[-1]
    return np.where(volts > last_volts, last_amperes, current)


def _grid(points: Points, rating: Rating, highest: Array) -> Array:
    """Return the voltages to look at: even steps and the corners of both lines, none above the highest."""
    even = highest[..., None] * np.linspace(1.0 / _STEPS, 1.0, _STEPS)
    corners = [array(volts) for volts, _ in points] + [array(volts) for volts, _ in rating.points]
    corners.append(array(rating.voltage))
    marks = [np.broadcast_to(corner, highest.shape)[..., None] for corner in corners]
    volts: Array = np.minimum(np.concatenate([even, *marks], axis=-1), highest[..., None])
    return volts


def _shapes(points: Points, rating: Rating) -> list[tuple[int, ...]]:
    """Return the cases of everything that describes limiter and device."""
    ratings = (rating.current, rating.power, rating.power_at, rating.junction_limit, rating.junction_to_case)
    pairs = (value for pair in (*points, *rating.points) for value in pair)
    return [np.shape(value) for value in (*ratings, rating.voltage, *pairs)]


def limiter_use(
    *, points: Points, case_temperature: ArrayLike, rating: Rating, highest_voltage: ArrayLike
) -> Use:
    """Return the largest share of the safe area that a limiter lets through, up to a device voltage.

    Parameters
    ----------
    points : sequence of pairs
        V and A of the limiter, rising in voltage.
    case_temperature : array_like
        degC, one a case.
    rating : Rating
        Ratings of the device.
    highest_voltage : array_like
        V, > 0, the largest that the device meets (rail to rail).

    Returns
    -------
    Use
        At most 1 where the limiter's line lies inside the safe area; infinite where it lets current through above
        the voltage rating.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: limiter current over allowed current on a fine grid with the corners of both lines.
    """
    positive(highest_voltage=highest_voltage)
    shape = np.broadcast_shapes(
        np.shape(case_temperature), np.shape(highest_voltage), *_shapes(points, rating)
    )
    highest = np.broadcast_to(array(highest_voltage), shape)
    volts = _grid(points, rating, highest)
    current = limiter_current(
        voltage=volts, points=[(array(v)[..., None], array(i)[..., None]) for v, i in points]
    )
    area = boundary(spread_out(rating), np.broadcast_to(array(case_temperature), shape)[..., None])
    ratio = _ratio(current, area.allowed(volts))
    worst = np.argmax(np.where(np.isnan(ratio), np.inf, ratio), axis=-1)[..., None]
    beyond = (volts > area.last) & (volts <= array(rating.voltage)[..., None])
    return Use(
        use=_at(ratio, worst),
        voltage=_at(volts, worst),
        current=_at(np.broadcast_to(current, volts.shape), worst),
        zone=np.full(shape, UNKNOWN),
        enters_unknown=np.any((current > 0.0) & beyond, axis=-1),
    )


def _ratio(current: Array, allowed: Array) -> Array:
    """Return the share of the allowed current; none where the limiter lets nothing through, nan stays nan."""
    with np.errstate(divide="ignore", invalid="ignore"):
        share = np.where(current > 0.0, current / allowed, 0.0)
    return np.where(np.isnan(allowed), np.nan, share)


def _at(values: Array, place: NDArray[np.intp]) -> Array:
    """Return the value of each case at its worst place."""
    found: Array = np.take_along_axis(values, place, axis=-1)[..., 0]
    return found


def limiter_reach(
    *,
    points: Points,
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
    """Return the largest device current that a load asks for over the current at which the limiter acts.

    Above 1 the limiter cuts into the signal. Any angle within +-`phase_angle` and every amplitude up to `peak` count,
    as for the envelope of the safe area.

    Parameters
    ----------
    points : sequence of pairs
        V and A of the limiter.
    half_supply, peak, load_magnitude, phase_angle, conducting, emitter_resistor, idle_current, law, \
transconductance_parameter, thermal_voltage
        As for `envelope_use`.

    Returns
    -------
    numpy.ndarray
        Ratio, one a case; infinite where the limiter allows nothing and current flows.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: the closed-form envelope on a grid of half degrees.
    """
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    within(-90.0, 90.0, phase_angle=phase_angle)
    turn = np.linspace(-90.0, 90.0, 361)
    swing, resistor = array(peak)[..., None], array(emitter_resistor)[..., None]
    share = np.sin(np.deg2rad(np.minimum(90.0, turn + np.abs(array(phase_angle))[..., None])))
    current = carrying_current(
        load_current=swing / array(load_magnitude)[..., None] / array(conducting)[..., None] * share,
        idle_current=array(idle_current)[..., None],
        emitter_resistor=resistor,
        law=law,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    volts = array(half_supply)[..., None] - swing * np.sin(np.deg2rad(turn)) - current * resistor
    acts = limiter_current(
        voltage=volts, points=[(array(v)[..., None], array(i)[..., None]) for v, i in points]
    )
    with np.errstate(divide="ignore", invalid="ignore"):
        asked = np.where(current > acts * 1e-6, current / acts, 0.0)
    reach: Array = np.max(asked, axis=-1)
    return reach
