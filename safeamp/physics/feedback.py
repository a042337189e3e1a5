"""Thermal feedback at idle: what each kelvin of the junction does to the current that heats it."""

from enum import StrEnum

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, within
from safeamp.physics.stage.law import THERMAL_VOLTAGE


class Sensor(StrEnum):
    """Where the bias generator feels the temperature."""

    NONE = "none"
    HEATSINK = "heatsink"
    DEVICE = "device"


def sink_resistance(*, sink_to_air: ArrayLike, conducting: ArrayLike, shared_by: ArrayLike) -> Array:
    """Return the heatsink rise per watt of ONE device when all devices on it drift together, K/W.

    Parameters
    ----------
    sink_to_air : array_like
        K/W, >= 0.
    conducting, shared_by : array_like
        Devices in parallel a side, and stages on the heatsink, > 0. One heatsink a device: 1 and 0.5.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: `2 * conducting * shared_by` equal devices heat one resistance.
    """
    non_negative(sink_to_air=sink_to_air)
    positive(conducting=conducting, shared_by=shared_by)
    return 2 * array(conducting) * array(shared_by) * array(sink_to_air)


def untracked(*, sensor: Sensor | str, tracking: ArrayLike) -> tuple[Array, Array]:
    """Return the shares of a heatsink rise and of a case-to-heatsink rise that the bias does not follow.

    Parameters
    ----------
    sensor : Sensor or str
        "none", "heatsink" or "device".
    tracking : array_like
        Share of the rise at the sensor that the bias follows, ratio, 0..2 (above 1: over-compensated).

    Raises
    ------
    ValueError
        If the sensor is unknown or `tracking` is outside 0..2.

    References
    ----------
    Derived: the generator lowers the bias by `tracking` times what its sensor feels.
    """
    within(0.0, 2.0, tracking=tracking)
    left = 1 - array(tracking)
    whole = 1 + 0 * left
    shares = {
        Sensor.NONE: (whole, whole),
        Sensor.HEATSINK: (left, whole),
        Sensor.DEVICE: (left, left),
    }
    return shares[Sensor(sensor)]


def seen_resistance(
    *,
    junction_to_case: ArrayLike,
    case_to_sink: ArrayLike,
    sink_to_air: ArrayLike,
    conducting: ArrayLike,
    shared_by: ArrayLike,
    sensor: Sensor | str,
    tracking: ArrayLike,
) -> Array:
    """Return the thermal resistance that acts on the idle current of each device, K/W.

    Parameters
    ----------
    junction_to_case, case_to_sink, sink_to_air : array_like
        K/W, >= 0. Free air: junction to air in place of the first, zeros for the others.
    conducting, shared_by, sensor, tracking
        As for `sink_resistance` and `untracked`.

    Returns
    -------
    numpy.ndarray
        K/W; below zero when an over-compensated bias cools more than the junction heats.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: the rise of the junction less what the bias generator follows.
    """
    non_negative(junction_to_case=junction_to_case, case_to_sink=case_to_sink)
    sink = sink_resistance(sink_to_air=sink_to_air, conducting=conducting, shared_by=shared_by)
    of_sink, of_case = untracked(sensor=sensor, tracking=tracking)
    return array(junction_to_case) + of_case * array(case_to_sink) + of_sink * sink


def current_slope_bipolar(
    *,
    current: ArrayLike,
    emitter_resistor: ArrayLike,
    drift: ArrayLike = 0.002,
    thermal_voltage: ArrayLike = THERMAL_VOLTAGE,
) -> Array:
    """Return dI/dT, A/K, of a bipolar device at constant bias voltage.

    Parameters
    ----------
    current, emitter_resistor : array_like
        A (> 0) and ohm (>= 0).
    drift : array_like
        Fall of the base-emitter voltage, V/K, positive; 2.0 mV/K, Darlington 4.4 mV/K.
    thermal_voltage : array_like
        kT/q, V, > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: drift / (Re + Vt/I), the loop of bias voltage, junction and resistor.
    """
    positive(current=current, thermal_voltage=thermal_voltage)
    non_negative(emitter_resistor=emitter_resistor)
    return array(drift) / (array(emitter_resistor) + array(thermal_voltage) / array(current))


def current_slope_mosfet(
    *, current: ArrayLike, source_resistor: ArrayLike, transconductance_parameter: ArrayLike, drift: ArrayLike
) -> Array:
    """Return dI/dT, A/K, of a MOSFET at constant bias voltage.

    Parameters
    ----------
    current, source_resistor : array_like
        A (> 0) and ohm (>= 0).
    transconductance_parameter : array_like
        K of I = K/2 overdrive squared, A/V2, > 0.
    drift : array_like
        Fall of the gate voltage at constant current, V/K; negative where the current falls with heat.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: gm = sqrt(2 K I); drift gm / (1 + gm Rs).
    """
    positive(current=current, transconductance_parameter=transconductance_parameter)
    non_negative(source_resistor=source_resistor)
    gm = np.sqrt(2 * array(transconductance_parameter) * array(current))
    return array(drift) * gm / (1 + gm * array(source_resistor))


def loop_index(*, device_voltage: ArrayLike, seen_resistance: ArrayLike, current_slope: ArrayLike) -> Array:
    """Return the gain of the loop heat, junction, current, heat; from 1 on the set point runs away.

    Parameters
    ----------
    device_voltage : array_like
        No-load voltage across each device, V, > 0.
    seen_resistance, current_slope : array_like
        K/W and A/K.

    Raises
    ------
    ValueError
        If the voltage is not greater than zero.

    References
    ----------
    Derived: V * R_th * dI/dT. Below 1 is not enough: solve the loop with `settled_idle`.
    """
    positive(device_voltage=device_voltage)
    return array(device_voltage) * array(seen_resistance) * array(current_slope)
