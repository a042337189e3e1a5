"""Steady heat from the junction to the air, and heating in pulses."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive


def sink_temperature(
    *,
    air: ArrayLike,
    stage_power: ArrayLike,
    shared_by: ArrayLike,
    sink_to_air: ArrayLike,
    other_heat: ArrayLike = 0.0,
) -> Array:
    """Return the heatsink temperature that all stages on it reach.

    Parameters
    ----------
    air : array_like
        Air at the heatsink, degC.
    stage_power : array_like
        Heat of all devices of one stage, W, >= 0.
    shared_by : array_like
        Stages on the whole heatsink, > 0.
    sink_to_air : array_like
        K/W, >= 0.
    other_heat : array_like
        Further heat on the same heatsink, W, >= 0.

    Returns
    -------
    numpy.ndarray
        degC; all inputs broadcast.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    H. Biagi, Heat Sinking: TO-3 Thermal Model, AB-038 / SBOA021.
    """
    positive(shared_by=shared_by)
    non_negative(stage_power=stage_power, sink_to_air=sink_to_air, other_heat=other_heat)
    heat = array(shared_by) * array(stage_power) + array(other_heat)
    return array(air) + heat * array(sink_to_air)


def case_temperature(*, sink: ArrayLike, device_power: ArrayLike, case_to_sink: ArrayLike) -> Array:
    """Return the case temperature, degC, of a device of `device_power` W on a heatsink at `sink` degC.

    Parameters
    ----------
    sink, device_power, case_to_sink : array_like
        degC, W (>= 0), K/W (>= 0); they broadcast.

    Raises
    ------
    ValueError
        If a power or resistance is negative.

    References
    ----------
    H. Biagi, Heat Sinking: TO-3 Thermal Model, AB-038 / SBOA021.
    """
    non_negative(device_power=device_power, case_to_sink=case_to_sink)
    return array(sink) + array(device_power) * array(case_to_sink)


def junction_temperature(*, case: ArrayLike, device_power: ArrayLike, junction_to_case: ArrayLike) -> Array:
    """Return the junction temperature, degC, of a device of `device_power` W with its case at `case` degC.

    Parameters
    ----------
    case, device_power, junction_to_case : array_like
        degC, W (>= 0), K/W (>= 0); they broadcast.

    Raises
    ------
    ValueError
        If a power or resistance is negative.

    References
    ----------
    H. Biagi, Heat Sinking: TO-3 Thermal Model, AB-038 / SBOA021.
    """
    non_negative(device_power=device_power, junction_to_case=junction_to_case)
    return array(case) + array(device_power) * array(junction_to_case)


def free_air_junction(*, air: ArrayLike, device_power: ArrayLike, junction_to_ambient: ArrayLike) -> Array:
    """Return the junction temperature, degC, of a device that stands in free air without a heatsink.

    Parameters
    ----------
    air, device_power, junction_to_ambient : array_like
        degC, W (>= 0), K/W (>= 0); they broadcast.

    Raises
    ------
    ValueError
        If a power or resistance is negative.

    References
    ----------
    Common practice, no source: one resistance from junction to air in series with nothing.
    """
    non_negative(device_power=device_power, junction_to_ambient=junction_to_ambient)
    return array(air) + array(device_power) * array(junction_to_ambient)


def hottest_device_power(*, stage_power: ArrayLike, conducting: ArrayLike, imbalance: ArrayLike) -> Array:
    """Return the heat, W, of the worst of the `2 * conducting` devices of a stage.

    Parameters
    ----------
    stage_power : array_like
        Heat of all devices, W, >= 0.
    conducting : array_like
        Devices in parallel on each side, >= 1.
    imbalance : array_like
        Excess of the worst device over the mean, ratio, >= 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: both sides share the heat of a symmetrical stage equally.
    """
    positive(conducting=conducting)
    non_negative(stage_power=stage_power, imbalance=imbalance)
    return (1 + array(imbalance)) * array(stage_power) / (2 * array(conducting))


def allowed_power(*, junction_limit: ArrayLike, air: ArrayLike, resistance: ArrayLike) -> Array:
    """Return the heat, W, that brings the junction to its limit.

    Parameters
    ----------
    junction_limit, air : array_like
        degC.
    resistance : array_like
        All resistances from junction to air added, K/W, > 0.

    Returns
    -------
    numpy.ndarray
        W; zero or less means that no heat is allowed in this air.

    Raises
    ------
    ValueError
        If `resistance` is not greater than zero.

    References
    ----------
    A. S. Sedra, K. C. Smith, Microelectronic Circuits, Oxford University Press, Ex. 14.5.
    """
    positive(resistance=resistance)
    return (array(junction_limit) - array(air)) / array(resistance)


def sink_to_air_needed(
    *,
    junction: ArrayLike,
    air: ArrayLike,
    power: ArrayLike,
    junction_to_case: ArrayLike,
    case_to_sink: ArrayLike,
) -> Array:
    """Return the largest heatsink resistance, K/W, that keeps the junction at `junction` degC.

    Parameters
    ----------
    junction, air : array_like
        degC.
    power : array_like
        Heat of the one device on the heatsink, W, > 0.
    junction_to_case, case_to_sink : array_like
        K/W, >= 0.

    Returns
    -------
    numpy.ndarray
        K/W; zero or less means that no heatsink is large enough.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Power amplifier data sheet SBOS070, Heat sinking, p. 11.
    """
    positive(power=power)
    non_negative(junction_to_case=junction_to_case, case_to_sink=case_to_sink)
    whole = (array(junction) - array(air)) / array(power)
    return whole - array(junction_to_case) - array(case_to_sink)


def printed_junction_to_case(
    *, power: ArrayLike, junction_limit: ArrayLike, power_at: ArrayLike = 25.0
) -> Array:
    """Return the junction-to-case resistance, K/W, that printed power and junction limit imply.

    Parameters
    ----------
    power : array_like
        Printed power, W, > 0, with the case at `power_at` degC.
    junction_limit, power_at : array_like
        degC, the limit above `power_at`.

    Raises
    ------
    ValueError
        If `power` or the span of temperatures is not greater than zero.

    References
    ----------
    D. Neamen, Electronic Circuit Analysis and Design, McGraw-Hill, Ex. 8.3.
    """
    span = array(junction_limit) - array(power_at)
    positive(power=power, junction_limit_above_power_at=span)
    return span / array(power)


def derated_power(
    *, power: ArrayLike, derating: ArrayLike, case_temperature: ArrayLike, power_at: ArrayLike = 25.0
) -> Array:
    """Return the power, W, that a sheet allows at a case temperature.

    The printed power holds up to `power_at`; from there it falls by `derating` to zero at the junction limit.

    Parameters
    ----------
    power, derating : array_like
        W (> 0) and W/K (> 0).
    case_temperature, power_at : array_like
        degC.

    Raises
    ------
    ValueError
        If power or derating is not greater than zero.

    References
    ----------
    R. Boylestad, L. Nashelsky, Electronic Devices and Circuit Theory, Pearson, Ex. 12.17.
    """
    positive(power=power, derating=derating)
    above = array(case_temperature) - array(power_at)
    above = np.maximum(above, 0 * above)
    left = array(power) - array(derating) * above
    return np.maximum(left, 0 * left)


def foster_impedance(*, resistances: ArrayLike, time_constants: ArrayLike, time: ArrayLike) -> Array:
    """Return the transient thermal impedance, K/W, of a Foster network after a step of power.

    Parameters
    ----------
    resistances, time_constants : array_like
        K/W (>= 0) and s (> 0), pairs along the last axis, cases before it.
    time : array_like
        s, >= 0; a number, or times along the last axis.

    Returns
    -------
    numpy.ndarray
        Cases first, times last; no time axis for a single time.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: step response of first-order sections in series, sum of R (1 - exp(-t/tau)).
    """
    non_negative(resistances=resistances, time=time)
    positive(time_constants=time_constants)
    pairs, constants, when = array(resistances), array(time_constants), array(time)
    if when.ndim:
        pairs, constants, when = pairs[..., None, :], constants[..., None, :], when[..., None]
    impedance: Array = np.sum(pairs * -np.expm1(-when / constants), axis=-1)
    return impedance


def transient_rise(*, normalized: ArrayLike, peak_power: ArrayLike, resistance: ArrayLike) -> Array:
    """Return the junction rise, K, of a pulse from the normalized thermal response of a sheet.

    Parameters
    ----------
    normalized : array_like
        Response at the duration of the pulse, ratio, 0..1.
    peak_power, resistance : array_like
        W (>= 0) and steady K/W (>= 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Use of thermal response data (method of AN-569), Motorola data book.
    """
    non_negative(
        normalized=normalized,
        peak_power=peak_power,
        resistance=resistance,
        one_minus_normalized=1 - array(normalized),
    )
    return array(normalized) * array(peak_power) * array(resistance)


def periodic_rise(
    *, resistances: ArrayLike, time_constants: ArrayLike, power: ArrayLike, period: ArrayLike
) -> Array:
    """Return the settled junction rise, K, over one period of a repeating dissipation.

    Parameters
    ----------
    resistances, time_constants : array_like
        Foster pairs, K/W (>= 0) and s (> 0), pairs along the last axis, cases before it.
    power : array_like
        W (>= 0), constant within each of the equal parts of the period along the last axis, cases before it.
    period : array_like
        s, > 0, one a case.

    Returns
    -------
    numpy.ndarray
        K at the end of each part, cases first, parts last.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: a first-order section driven by steps, its state equal at both ends of the period.
    """
    positive(time_constants=time_constants, period=period)
    non_negative(resistances=resistances, power=power)
    heat = array(power)
    parts = heat.shape[-1]
    keep = np.exp(-array(period)[..., None] / (parts * array(time_constants)))

    def pass_through(state: Array) -> list[Array]:
        states = []
        for part in range(parts):
            state = keep * state + (1 - keep) * heat[..., part, None]
            states.append(state)
        return states

    # From rest one period ends at E; the settled period starts where it ends: S = E + keep**parts * S.
    from_rest = pass_through(np.zeros(()))[-1]
    settled = pass_through(from_rest / (1 - keep**parts))
    return np.stack([np.sum(array(resistances) * state, axis=-1) for state in settled], axis=-1)
