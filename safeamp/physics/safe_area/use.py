"""How much of its safe area a device uses into a load."""

from collections.abc import Iterable, Iterator
from dataclasses import replace
from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within
from safeamp.physics._chunks import chunks_of
from safeamp.physics.safe_area.boundary import boundary
from safeamp.physics.safe_area.device import Device, device_of
from safeamp.physics.safe_area.lines import worst_along_lines
from safeamp.physics.safe_area.locus import Use
from safeamp.physics.safe_area.rating import Rating
from safeamp.physics.stage import THERMAL_VOLTAGE, Law

CHUNK = 4096
"""Cases at a time: with some twenty phases each, one array takes 700 KiB."""


def _refuse_impossible(
    half_supply: ArrayLike, peak: ArrayLike, load_magnitude: ArrayLike, phase_angle: ArrayLike
) -> None:
    """Raise ValueError for what no stage can do."""
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    non_negative(peak=peak)
    refuse("peak", peak, array(peak) > array(half_supply), "at most half_supply")
    within(-90.0, 90.0, phase_angle=phase_angle)


def _unknown(values: Iterable[Any]) -> Array:
    """Return where a value is nan: no comparison may hide it."""
    unknown: Array = np.isnan(sum(array(value) for value in values if value is not None))
    return unknown


def _rated(rating: Rating) -> Iterator[Any]:
    yield from (rating.current, rating.power, rating.power_at, rating.junction_limit, rating.voltage)
    yield rating.junction_to_case
    for point in rating.points:
        yield from point


def _driven(device: Device) -> Iterator[Any]:
    yield from (device.supply, device.each, device.resistor, device.idle, device.angle)
    yield device.parameter if device.law is Law.MOSFET else None


@chunks_of(CHUNK)
def envelope_use(
    *,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    phase_angle: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    imbalance: ArrayLike | None,
    case_temperature: ArrayLike,
    rating: Rating,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Use:
    """Return the use of the safe area into a load of any angle within +-`phase_angle`.

    At the output voltage peak*sin(t) the largest current of any such angle is
    peak/|Z| * sin(min(90 deg, t + angle)); smaller amplitudes lie inside.

    Parameters
    ----------
    half_supply : array_like
        V of the side of this device, > 0.
    peak : array_like
        V, largest peak of the output, 0 to `half_supply`.
    load_magnitude : array_like
        Ohm, > 0.
    phase_angle : array_like
        deg, -90 to 90; the sign does not matter.
    conducting : array_like
        Devices in parallel, >= 1.
    emitter_resistor : array_like
        Ohm of each device, >= 0.
    idle_current : array_like
        A of each device, >= 0.
    law : Law
        Law of the devices.
    imbalance : array_like or None
        Ratio by which the worst of parallel devices exceeds the mean; None takes the spread of a batch.
    case_temperature : array_like
        degC.
    rating : Rating
        Ratings of one device.
    transconductance_parameter : array_like, optional
        A/V2, for MOSFETs.
    thermal_voltage : float, optional
        V of one junction.

    Returns
    -------
    Use
        One value a case; nan where an input is nan.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Envelope of the ellipses of all angles; derived.
    """
    _refuse_impossible(half_supply, peak, load_magnitude, phase_angle)
    device = device_of(
        half_supply=half_supply,
        peak=peak,
        load_magnitude=load_magnitude,
        phase_angle=phase_angle,
        conducting=conducting,
        emitter_resistor=emitter_resistor,
        idle_current=idle_current,
        law=law,
        imbalance=imbalance,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    found = worst_along_lines(device=device, boundary=boundary(rating, array(case_temperature)))
    unknown = _unknown((*_driven(device), case_temperature, imbalance, *_rated(rating)))
    return replace(found, use=np.where(unknown, np.nan, found.use))


def angle_use(
    *,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    phase_angle: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    imbalance: ArrayLike | None,
    case_temperature: ArrayLike,
    rating: Rating,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: float = THERMAL_VOLTAGE,
) -> Use:
    """Return the use of the safe area into a load of one angle, every amplitude up to `peak`.

    It is that of the envelope. The ellipse of the largest amplitude encloses those of the smaller ones, and both
    signs of an angle run through the same points. Up to the output voltage at which its current peaks, the largest
    angle draws more than any smaller one; beyond, the envelope has that same peak current at less device voltage.

    Parameters and errors as in `envelope_use`.

    Returns
    -------
    Use
        One value a case; nan where an input is nan.

    References
    ----------
    Ellipse of a sine into a complex load; derived.
    """
    return envelope_use(
        half_supply=half_supply,
        peak=peak,
        load_magnitude=load_magnitude,
        phase_angle=phase_angle,
        conducting=conducting,
        emitter_resistor=emitter_resistor,
        idle_current=idle_current,
        law=law,
        imbalance=imbalance,
        case_temperature=case_temperature,
        rating=rating,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
