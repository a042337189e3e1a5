"""The class-AB law: how an upper and a lower device share the current of the load."""

from enum import Enum

import numpy as np
from numpy.typing import ArrayLike, NDArray

from safeamp.physics._checks import Array, array, non_negative, positive, refuse

Mask = NDArray[np.bool_]

THERMAL_VOLTAGE = 1.380649e-23 * 298.15 / 1.602176634e-19
"""V, kT/q at 25 degC (exact constants of the SI, 2019)."""

_SETTLED = 1e-3  # of the logarithm; Newton is quadratic, so what remains is below 1e-6
_ROUNDS = 100
_UNSETTLED = "the currents of the devices did not settle; inputs are far from any amplifier"


class Law(Enum):
    """How the current of one device follows its control voltage."""

    BIPOLAR = 1
    """Exponential, one junction."""
    DARLINGTON = 2
    """Exponential, two junctions in series."""
    MOSFET = 3
    """Square law."""


def _exponential(magnitude: Array, idle: Array, resistor: Array, voltage: Array) -> tuple[Array, Array]:
    """Return the larger and the smaller current of two exponential devices.

    With s the sum and q = ln(xy / idle**2) the law is q + resistor*(s - 2*idle)/voltage = 0 and
    s**2 = magnitude**2 + 4*idle**2*exp(q). The left side is rising and convex in q, so Newton from the
    right of the root never overshoots; s >= magnitude and s >= 2*idle give that start.
    """
    slope = resistor / voltage
    twice = 2.0 * idle
    start = slope * (magnitude - twice)
    q = -(start + abs(start)) / 2.0
    square, fourfold = magnitude**2, twice**2
    for _ in range(_ROUNDS):
        product = fourfold * np.exp(q)
        total = np.sqrt(square + product)
        step = (q + slope * (total - twice)) / (1.0 + slope * product / (2.0 * total))
        q = q - step
        if not np.any(np.abs(step) > _SETTLED):
            break
    else:
        raise ArithmeticError(_UNSETTLED)
    product = fourfold * np.exp(q)
    larger = (np.sqrt(square + product) + magnitude) / 2.0
    return larger, product / (4.0 * larger)


def _square_law(
    magnitude: Array, idle: Array, resistor: Array, parameter: Array | None
) -> tuple[Array, Array]:
    """Return the larger and the smaller current of two square-law devices.

    m is the sum of the roots of both currents while both conduct. `parameter` None stands for source
    resistors that are small against 1/gm, which leaves the most current in the device.
    """
    m = 2.0 * np.sqrt(idle)
    larger_root = magnitude / m
    if parameter is not None:
        m = _sum_of_roots(magnitude, idle, resistor, parameter)
        larger_root = magnitude / m
    both = larger_root < m
    larger = np.where(both, ((m + larger_root) / 2.0) ** 2, magnitude)
    smaller = np.where(both, ((m - larger_root) / 2.0) ** 2, 0.0 * magnitude)
    known = 0.0 * m  # nan where an input was nan, so that the comparison above cannot hide it
    return larger + known**2, smaller + known**2


def _sum_of_roots(magnitude: Array, idle: Array, resistor: Array, parameter: Array) -> Array:
    """Solve c*m + resistor*(m**2 + (magnitude/m)**2)/2 = both control voltages for m, c = sqrt(2/K).

    Rising and convex above sqrt(magnitude), so Newton falls to the root from 2*sqrt(idle). Where one
    device is off there is no root above sqrt(magnitude); m is held there, which says just that.
    """
    c = np.sqrt(2.0 / parameter)
    bias = 2.0 * (c * np.sqrt(idle) + resistor * idle)
    least = np.sqrt(magnitude)
    m = np.maximum(2.0 * np.sqrt(idle), least)
    for _ in range(_ROUNDS):
        other = magnitude / m
        excess = c * m + resistor * (m**2 + other**2) / 2.0 - bias
        step = excess / (c + resistor * (m - other**2 / m))
        reduced = np.maximum(m - step, least)
        settled = not np.any(np.abs(reduced - m) > _SETTLED * m)
        m = reduced
        if settled:
            break
    else:
        raise ArithmeticError(_UNSETTLED)
    return m


def _parameter(given: ArrayLike | None) -> Array | None:
    """Return the transconductance parameter as an array, when there is one."""
    if given is None:
        return None
    positive(transconductance_parameter=given)
    parameter: Array = array(given)
    return parameter


def device_currents(
    *,
    load_current: ArrayLike,
    idle_current: ArrayLike,
    emitter_resistor: ArrayLike,
    law: Law,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> tuple[Array, Array]:
    """Return the larger and the smaller current of an upper and a lower device.

    Parameters and errors as in `carrying_current`, the sign of `load_current` left aside.

    Returns
    -------
    tuple of numpy.ndarray
        A, larger and smaller; their difference is the magnitude of the load current.

    References
    ----------
    Derived, as `carrying_current`.
    """
    non_negative(idle_current=idle_current, emitter_resistor=emitter_resistor)
    magnitude, idle = np.abs(array(load_current)), array(idle_current)
    resistor = array(emitter_resistor)
    with np.errstate(divide="ignore", invalid="ignore"):
        if law is Law.MOSFET:
            larger, smaller = _square_law(magnitude, idle, resistor, _parameter(transconductance_parameter))
        else:
            larger, smaller = _exponential(magnitude, idle, resistor, law.value * thermal_voltage)
    without_idle = idle == 0
    return np.where(without_idle, magnitude, larger), np.where(without_idle, 0.0 * magnitude, smaller)


def carrying_current(
    *,
    load_current: ArrayLike,
    idle_current: ArrayLike,
    emitter_resistor: ArrayLike,
    law: Law,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Array:
    """Return the current of the device that carries the positive half.

    One law from class B (no idle current) to class A. For an exponential device x with partner
    y = x - load_current: n*Vt*ln(x*y/idle**2) + Re*(x + y - 2*idle) = 0, n junctions.

    Parameters
    ----------
    load_current : array_like
        A of the load per device; negative while the partner carries it.
    idle_current : array_like
        A of each device without signal, >= 0; zero is class B.
    emitter_resistor : array_like
        Ohm of each device, emitter or source, >= 0.
    law : Law
        Law of both devices.
    transconductance_parameter : array_like, optional
        A/V2, K of I = K/2 * overdrive**2, > 0; None takes the limit of no source resistor, an upper
        bound of the current for every K. Used for MOSFETs only.
    thermal_voltage : float, optional
        V of one junction.

    Returns
    -------
    numpy.ndarray
        A, broadcast shape of the inputs; nan where an input is nan.

    Raises
    ------
    ValueError
        If a value is outside its range.
    ArithmeticError
        If the solution does not settle.

    References
    ----------
    Shockley's junction law and the square law around the bias loop; derived.
    """
    larger, smaller = device_currents(
        load_current=load_current,
        idle_current=idle_current,
        emitter_resistor=emitter_resistor,
        law=law,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    return np.where(array(load_current) < 0, smaller, larger)


def carries_alone(
    *,
    load_current: ArrayLike,
    idle_current: ArrayLike,
    emitter_resistor: ArrayLike,
    law: Law,
    error: float,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Mask:
    """Tell from which load current of each device on its partner matters less than a relative error, in every case.

    Exponential law: the partner carries less than idle**2/load * exp(-resistor*(load - 2*idle)/voltage).
    Square law: it is off from four times the idle current on. Nothing is said of a value that is nan.

    Parameters
    ----------
    load_current : array_like
        A, one or several, each the least of all cases.
    idle_current, emitter_resistor : array_like
        A and ohm of each device, of every case.
    law : Law
        Law of both devices.
    error : float
        Relative error of the current that is left aside.
    thermal_voltage : float, optional
        V of one junction.

    Returns
    -------
    numpy.ndarray
        Of the shape of `load_current`.

    References
    ----------
    The sum of both currents is at least the load current, put into the law of `carrying_current`; derived.
    """
    least, most = array(load_current), np.max(array(idle_current))
    if law is Law.MOSFET:
        off: Mask = (least >= 4.0 * most) & (least >= 0)
        return off
    drop = least - 2.0 * most
    resistor = np.where(drop > 0, np.min(emitter_resistor), np.max(emitter_resistor))
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        left = (most / least) ** 2 * np.exp(-resistor * drop / (law.value * thermal_voltage))
    small: Mask = ((least > 0) & (left < error)) | ((least >= 0) & (most == 0))
    return small


def worst_device_current(
    *,
    mean: ArrayLike,
    emitter_resistor: ArrayLike,
    pairs: ArrayLike,
    imbalance: ArrayLike | None = None,
    spread: float = 0.050,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Array:
    """Return the current of the worst of parallel devices.

    Without `imbalance` the spread of one batch drives spread/(Re + Vt/mean) more through it; without
    emitter resistor it carries twice the mean. A single device carries the mean.

    Parameters
    ----------
    mean : array_like
        A of the mean device, >= 0.
    emitter_resistor : array_like
        Ohm of each device, >= 0.
    pairs : array_like
        Conducting devices in parallel, >= 1.
    imbalance : array_like, optional
        Ratio by which the worst device exceeds the mean, >= 0.
    spread : float, optional
        V, spread of the control voltage in one batch.
    thermal_voltage : float, optional
        V of one junction.

    Returns
    -------
    numpy.ndarray
        A, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Common practice, no source.
    """
    non_negative(mean=mean, emitter_resistor=emitter_resistor)
    refuse("pairs", pairs, array(pairs) < 1, "one or more")
    current, resistor = array(mean), array(emitter_resistor)
    if imbalance is None:
        more = np.where(resistor == 0, 1.0, spread / (resistor * current + thermal_voltage))
    else:
        non_negative(imbalance=imbalance)
        more = array(imbalance)
    worst: Array = current * (1.0 + np.where(array(pairs) == 1, 0.0 * more, more))
    return worst
