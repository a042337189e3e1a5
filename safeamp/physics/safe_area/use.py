"""How much of its safe area a device uses into a load."""

from collections.abc import Callable

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within
from safeamp.physics._chunks import in_chunks
from safeamp.physics.safe_area.boundary import boundary
from safeamp.physics.safe_area.locus import Locus, Use, worst_use
from safeamp.physics.safe_area.rating import Rating, spread_out
from safeamp.physics.stage import THERMAL_VOLTAGE, Law, carrying_current, worst_device_current


def _device(
    *,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    imbalance: ArrayLike | None,
    transconductance_parameter: ArrayLike | None,
    thermal_voltage: float,
) -> Callable[[Array, Array], tuple[Array, Array]]:
    """Return the function that turns sine and current share (-1 to 1) into voltage and current."""
    supply, swing, resistor, idle, pairs = (
        array(value)[..., None] for value in (half_supply, peak, emitter_resistor, idle_current, conducting)
    )
    each = swing / array(load_magnitude)[..., None] / pairs
    uneven = None if imbalance is None else array(imbalance)[..., None]
    parameter = None
    if transconductance_parameter is not None:
        parameter = array(transconductance_parameter)[..., None]

    def device(sine: Array, share: Array) -> tuple[Array, Array]:
        mean = carrying_current(
            load_current=each * share,
            idle_current=idle,
            emitter_resistor=resistor,
            law=law,
            transconductance_parameter=parameter,
            thermal_voltage=thermal_voltage,
        )
        worst = worst_device_current(
            mean=mean,
            emitter_resistor=resistor,
            pairs=pairs,
            imbalance=uneven,
            thermal_voltage=thermal_voltage,
        )
        return supply - swing * sine - mean * resistor, worst

    return device


def _refuse_impossible(
    half_supply: ArrayLike, peak: ArrayLike, load_magnitude: ArrayLike, phase_angle: ArrayLike
) -> None:
    """Raise ValueError for what no stage can do."""
    positive(half_supply=half_supply, load_magnitude=load_magnitude)
    non_negative(peak=peak)
    refuse("peak", peak, array(peak) > array(half_supply), "at most half_supply")
    within(-90.0, 90.0, phase_angle=phase_angle)


def _search(locus: Locus, case_temperature: ArrayLike, rating: Rating, low: float, high: float) -> Use:
    """Return the worst point of a locus against a rating, with the phase on a last axis."""
    cases = array(case_temperature)[..., None]
    return worst_use(locus=locus, boundary=boundary(spread_out(rating), cases), low=low, high=high)


@in_chunks
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
    device = _device(
        half_supply=half_supply,
        peak=peak,
        load_magnitude=load_magnitude,
        conducting=conducting,
        emitter_resistor=emitter_resistor,
        idle_current=idle_current,
        law=law,
        imbalance=imbalance,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    angle = np.abs(array(phase_angle))[..., None]

    def locus(t: Array) -> tuple[Array, Array]:
        return device(np.sin(np.deg2rad(t)), np.sin(np.deg2rad(np.minimum(90.0, t + angle))))

    return _search(locus, case_temperature, rating, -90.0, 90.0)


@in_chunks
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

    The ellipse of the largest amplitude encloses those of the smaller ones, and both signs of the
    angle run through the same points. Every output voltage comes twice in a cycle; the half cycle
    searched holds the larger current of the two.

    Parameters and errors as in `envelope_use`.

    Returns
    -------
    Use
        One value a case; nan where an input is nan.

    References
    ----------
    Ellipse of a sine into a complex load; derived.
    """
    _refuse_impossible(half_supply, peak, load_magnitude, phase_angle)
    device = _device(
        half_supply=half_supply,
        peak=peak,
        load_magnitude=load_magnitude,
        conducting=conducting,
        emitter_resistor=emitter_resistor,
        idle_current=idle_current,
        law=law,
        imbalance=imbalance,
        transconductance_parameter=transconductance_parameter,
        thermal_voltage=thermal_voltage,
    )
    angle = np.abs(array(phase_angle))[..., None]

    def locus(t: Array) -> tuple[Array, Array]:
        return device(np.sin(np.deg2rad(t)), np.sin(np.deg2rad(t + angle)))

    return _search(locus, case_temperature, rating, -90.0, 90.0)
