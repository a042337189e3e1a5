"""Standing DC at the loudspeaker: coil current, heat, cone displacement, detector."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive


def coil_current(*, voltage: ArrayLike, dc_resistance: ArrayLike) -> Array:
    """Return the direct current, A, of a voice coil.

    Parameters
    ----------
    voltage, dc_resistance : array_like
        V (either sign) and ohm (> 0); they broadcast.

    Raises
    ------
    ValueError
        If the resistance is not greater than zero.

    References
    ----------
    Ohm's law; R. Elliott, Project 33 text.
    """
    positive(dc_resistance=dc_resistance)
    return array(voltage) / array(dc_resistance)


def coil_power(*, voltage: ArrayLike, dc_resistance: ArrayLike) -> Array:
    """Return the heat, W, of a voice coil at a direct voltage.

    Parameters
    ----------
    voltage, dc_resistance : array_like
        V (either sign) and ohm (> 0).

    Raises
    ------
    ValueError
        If the resistance is not greater than zero.

    References
    ----------
    Joule's law.
    """
    positive(dc_resistance=dc_resistance)
    return array(voltage) ** 2 / array(dc_resistance)


def cone_displacement(
    *, voltage: ArrayLike, dc_resistance: ArrayLike, force_factor: ArrayLike, compliance: ArrayLike
) -> Array:
    """Return the standing displacement of the cone, m, with the sign of the voltage.

    Parameters
    ----------
    voltage, dc_resistance : array_like
        V (either sign) and ohm (> 0).
    force_factor, compliance : array_like
        N/A (> 0) and m/N (> 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: force Bl I against the stiffness 1/C_ms.
    """
    positive(force_factor=force_factor, compliance=compliance)
    current = coil_current(voltage=voltage, dc_resistance=dc_resistance)
    return array(force_factor) * current * array(compliance)


def allowed_dc(
    *,
    linear_excursion: ArrayLike,
    force_factor: ArrayLike,
    compliance: ArrayLike,
    dc_resistance: ArrayLike,
    share: ArrayLike,
) -> Array:
    """Return the direct voltage, V, that takes `share` of the linear excursion.

    Parameters
    ----------
    linear_excursion, force_factor, compliance, dc_resistance : array_like
        m, N/A, m/N, ohm, all > 0.
    share : array_like
        Ratio, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    A worked budget in a discussion of DC offset, its own formula.
    """
    positive(linear_excursion=linear_excursion, share=share)
    each_volt = cone_displacement(
        voltage=1.0, dc_resistance=dc_resistance, force_factor=force_factor, compliance=compliance
    )
    return array(share) * array(linear_excursion) / each_volt


def detector_threshold(*, time_constant: ArrayLike, step: ArrayLike, trip_after: ArrayLike) -> Array:
    """Return the threshold, V, that an RC detector reaches `trip_after` seconds after a step of DC.

    Parameters
    ----------
    time_constant, step, trip_after : array_like
        s (> 0), V, s (>= 0).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Law t = -tau ln(1 - Vt/V) of a published detector, solved for the threshold.
    """
    positive(time_constant=time_constant)
    non_negative(trip_after=trip_after)
    return -array(step) * np.expm1(-array(trip_after) / array(time_constant))


def detector_delay(*, time_constant: ArrayLike, step: ArrayLike, threshold: ArrayLike) -> Array:
    """Return the time, s, until an RC detector trips on a step of DC; inf if it never does.

    Parameters
    ----------
    time_constant, step, threshold : array_like
        s (> 0), V (> 0), V (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Law t = -tau ln(1 - Vt/V) of a published detector.
    """
    positive(time_constant=time_constant, step=step, threshold=threshold)
    ratio = array(threshold) / array(step)
    never = ratio >= 1
    return array(time_constant) * np.where(never, np.inf, -np.log1p(-np.where(never, 0.0, ratio)))
