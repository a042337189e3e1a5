"""Where a load takes a device in the plane of voltage and current: for drawing, not for judging."""

from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, within
from safeamp.physics.safe_area.device import device_of
from safeamp.physics.safe_area.use import _refuse_impossible
from safeamp.physics.stage import THERMAL_VOLTAGE, Law


def _path(output_angle: ArrayLike, latest: float, given: dict[str, Any]) -> tuple[Array, Array]:
    """Return the path of a load whose current leads by its angle, but is never further on than `latest` deg."""
    _refuse_impossible(given["half_supply"], given["peak"], given["load_magnitude"], given["phase_angle"])
    within(-90.0, 90.0, output_angle=output_angle)
    device, angle = device_of(**given), array(output_angle)
    turned = np.minimum(latest, angle + np.abs(given["phase_angle"]))
    mean = device.mean_current(np.sin(np.deg2rad(turned)))
    voltage = device.supply - device.swing * np.sin(np.deg2rad(angle)) - mean * device.resistor
    current = device.worst_current(mean)
    return voltage + 0.0 * current, current + 0.0 * voltage


def envelope_path(
    *,
    output_angle: ArrayLike,
    half_supply: float,
    peak: float,
    load_magnitude: float,
    phase_angle: float,
    conducting: float,
    emitter_resistor: float,
    idle_current: float,
    law: Law,
    imbalance: float | None,
    transconductance_parameter: float | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> tuple[Array, Array]:
    """Return voltage (V) and current (A) of the worst device along the envelope of all angles of a load.

    The path that `envelope_use` searches, at the angles given; zero `phase_angle` is a resistor.

    Parameters
    ----------
    output_angle : array_like
        deg, -90 (output at its lowest) to 90 (at its peak on this side).
    half_supply, peak, load_magnitude, phase_angle, conducting, emitter_resistor, idle_current, law, imbalance,
    transconductance_parameter, thermal_voltage
        As in `envelope_use`, one case.

    Returns
    -------
    tuple of numpy.ndarray
        Both of the shape of `output_angle`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Envelope of the ellipses of all angles; derived.
    """
    return _path(
        output_angle,
        90.0,
        {
            "half_supply": half_supply,
            "peak": peak,
            "load_magnitude": load_magnitude,
            "phase_angle": phase_angle,
            "conducting": conducting,
            "emitter_resistor": emitter_resistor,
            "idle_current": idle_current,
            "law": law,
            "imbalance": imbalance,
            "transconductance_parameter": transconductance_parameter,
            "thermal_voltage": thermal_voltage,
        },
    )


def angle_path(
    *,
    output_angle: ArrayLike,
    half_supply: float,
    peak: float,
    load_magnitude: float,
    phase_angle: float,
    conducting: float,
    emitter_resistor: float,
    idle_current: float,
    law: Law,
    imbalance: float | None,
    transconductance_parameter: float | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> tuple[Array, Array]:
    """Return voltage (V) and current (A) of the worst device along the half cycle that `angle_use` searches.

    Parameters and errors as in `envelope_path`; the load has this one angle.

    Returns
    -------
    tuple of numpy.ndarray
        Both of the shape of `output_angle`.

    References
    ----------
    Ellipse of a sine into a complex load; derived.
    """
    return _path(
        output_angle,
        180.0,
        {
            "half_supply": half_supply,
            "peak": peak,
            "load_magnitude": load_magnitude,
            "phase_angle": phase_angle,
            "conducting": conducting,
            "emitter_resistor": emitter_resistor,
            "idle_current": idle_current,
            "law": law,
            "imbalance": imbalance,
            "transconductance_parameter": transconductance_parameter,
            "thermal_voltage": thermal_voltage,
        },
    )
