"""Heat and mean currents of a stage that follows the class-AB law."""

from typing import Any, NamedTuple

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within
from safeamp.physics._chunks import chunks_of
from safeamp.physics.stage.law import THERMAL_VOLTAGE, Law, carries_alone, device_currents


def _gauss_legendre(count: int) -> tuple[Array, Array]:
    """Return nodes and weights on -1 to 1, as eigenvalues of the matrix of Golub and Welsch (Math. Comp. 23, 1969).

    numpy has them too, in a package whose import takes a start ten times as long as this.
    """
    k = np.arange(1, count)
    beside = np.diag(k / np.sqrt(4.0 * k**2 - 1.0), 1)
    nodes, vectors = np.linalg.eigh(beside + beside.T)
    return nodes, 2.0 * vectors[0] ** 2


_NODES, _WEIGHTS = _gauss_legendre(20)
_SINES = np.sin((_NODES + 1.0) * np.pi / 4.0)
_SHARES = _WEIGHTS / 2.0
NEGLIGIBLE = 1e-6
"""Relative error of a current below which the current of the partner device is left out."""
CHUNK = 2048
"""Cases at a time: with twenty nodes each, one array takes 330 KiB."""


class MeanCurrents(NamedTuple):
    """Means over one cycle, of each device."""

    mean: Any
    """A."""
    mean_square: Any
    """A2."""


@chunks_of(CHUNK)
def mean_currents(
    *,
    peak_current: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> MeanCurrents:
    """Return mean and mean square of the current of each device over a cycle of a sine.

    Upper and lower device are mirror images and every quarter repeats, so a quarter cycle of both
    holds the whole; Gauss-Legendre nodes on it crowd where the sine passes through zero.

    Parameters
    ----------
    peak_current : array_like
        A of the whole load, >= 0.
    conducting : array_like
        Devices in parallel, >= 1.
    emitter_resistor : array_like
        Ohm of each device, >= 0.
    idle_current : array_like
        A of each device, >= 0.
    law, transconductance_parameter, thermal_voltage
        As in `carrying_current`.

    Returns
    -------
    MeanCurrents
        A and A2, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived; below 0.1 % of a fine grid.
    """
    non_negative(peak_current=peak_current)
    refuse("conducting", conducting, array(conducting) < 1, "one or more")
    each = array(peak_current) / array(conducting)
    alone = carries_alone(
        load_current=np.min(each) * _SINES,
        idle_current=idle_current,
        emitter_resistor=emitter_resistor,
        law=law,
        error=NEGLIGIBLE,
        thermal_voltage=thermal_voltage,
    )
    shared = int(np.sum(~alone))
    # From there on the mean of a power of the load current is that power of its peak times a mean of sines.
    mean = each * np.sum((_SINES * _SHARES)[shared:])
    square = each**2 * np.sum((_SINES**2 * _SHARES)[shared:])
    given = (each, emitter_resistor, idle_current, transconductance_parameter)
    axes = max(np.ndim(value) for value in given if value is not None)
    # The nodes stand on the first axis, so that the inner loops run over the cases and not over twenty nodes.
    sines, shares = (one[:shared].reshape(-1, *(1,) * axes) for one in (_SINES, _SHARES))
    larger, smaller = device_currents(
        load_current=each * sines,
        idle_current=array(idle_current),
        emitter_resistor=array(emitter_resistor),
        law=law,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    mean = mean + np.sum((larger + smaller) * shares, axis=0)
    square = square + np.sum((larger**2 + smaller**2) * shares, axis=0)
    return MeanCurrents(mean / 2.0, square / 2.0)


def mean_rail_current(
    *,
    peak_current: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Array:
    """Return the mean current of each rail, class B to class A.

    Parameters and errors as in `mean_currents`.

    Returns
    -------
    numpy.ndarray
        A, broadcast shape of the inputs.

    References
    ----------
    Derived, as `mean_currents`.
    """
    currents = mean_currents(
        peak_current=peak_current,
        conducting=conducting,
        emitter_resistor=emitter_resistor,
        idle_current=idle_current,
        law=law,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    rail: Array = array(conducting) * currents.mean
    return rail


@chunks_of(CHUNK)
def pair_heat(
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
    """Return the heat of all devices of a stage, both sides, for a sine.

    What the rails give, less what the load and the emitter resistors take.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    peak : array_like
        V, peak of the output, 0 to `half_supply`.
    load_magnitude : array_like
        Ohm, > 0.
    phase_angle : array_like
        deg, -90 to 90.
    conducting, emitter_resistor, idle_current, law, transconductance_parameter, thermal_voltage
        As in `mean_currents`.

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
    Balance of powers; derived. Without idle current and resistors it is class B of R. Boylestad,
    L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, ch. 12.
    """
    positive(load_magnitude=load_magnitude)
    currents = mean_currents(
        peak_current=array(peak) / array(load_magnitude),
        conducting=conducting,
        emitter_resistor=emitter_resistor,
        idle_current=idle_current,
        law=law,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    return heat_of_currents(
        currents=currents,
        half_supply=half_supply,
        peak=peak,
        load_magnitude=load_magnitude,
        phase_angle=phase_angle,
        conducting=conducting,
        emitter_resistor=emitter_resistor,
    )


def heat_of_currents(
    *,
    currents: MeanCurrents,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    phase_angle: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
) -> Array:
    """Return the heat of all devices of a stage, as `pair_heat`, where the mean currents are known already.

    Parameters
    ----------
    currents : MeanCurrents
        As `mean_currents` returns them for the peak current of this load.
    half_supply, peak, load_magnitude, phase_angle, conducting, emitter_resistor
        As in `pair_heat`.

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
    Balance of powers; derived.
    """
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    refuse("peak", peak, array(peak) > array(half_supply), "at most half_supply")
    within(-90.0, 90.0, phase_angle=phase_angle)
    each = array(half_supply) * currents.mean - array(emitter_resistor) * currents.mean_square
    cosine = np.cos(np.deg2rad(array(phase_angle)))
    load = array(peak) * array(peak) / array(load_magnitude) * cosine / 2.0
    heat: Array = 2.0 * array(conducting) * each - load
    return heat


def no_signal_heat(
    *, half_supply: ArrayLike, idle_current: ArrayLike, emitter_resistor: ArrayLike, conducting: ArrayLike
) -> Array:
    """Return the heat of all devices of a stage without signal.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    idle_current : array_like
        A of each device, >= 0.
    emitter_resistor : array_like
        Ohm of each device, >= 0.
    conducting : array_like
        Devices in parallel, >= 1.

    Returns
    -------
    numpy.ndarray
        W, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range, or the resistors alone would drop the half supply.

    References
    ----------
    Ohm's law; derived.
    """
    positive(half_supply=half_supply)
    non_negative(idle_current=idle_current, emitter_resistor=emitter_resistor)
    refuse("conducting", conducting, array(conducting) < 1, "one or more")
    current = array(idle_current)
    left = array(half_supply) - current * array(emitter_resistor)
    refuse("half_supply less the drop in the emitter resistor", left, left < 0, "zero or more")
    heat: Array = 2.0 * array(conducting) * current * left
    return heat
