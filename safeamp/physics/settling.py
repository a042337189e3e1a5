"""The idle current that thermal feedback settles at, or that there is none."""

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive
from safeamp.physics.feedback import Sensor, untracked
from safeamp.physics.stage.law import THERMAL_VOLTAGE


@dataclass(frozen=True, eq=False)
class _Law:
    """Control voltage over current ratio u = I/I0: g(u) + Re*I0*(u - 1) = drift * untracked rise."""

    set_current: Array
    resistor: Array
    drift: Array
    overdrive: Array | None
    thermal_voltage: Array

    def slope(self) -> Array:
        """Return dI/dT at the set point, A/K."""
        control = self.thermal_voltage if self.overdrive is None else self.overdrive / 2
        return self.drift * self.set_current / (control + self.resistor * self.set_current)

    def lowest_ratio(self, rise: Array, rise_per_ampere: Array) -> Array:
        """Solve for the lowest u at which the rise is `rise + rise_per_ampere * I`; inf if there is none."""
        drop = self.resistor * self.set_current
        slope = drop - self.drift * rise_per_ampere * self.set_current
        target = self.drift * rise + drop
        if self.overdrive is None:
            return _logarithmic_root(self.thermal_voltage, slope, target)
        return _square_root(self.overdrive, slope, target + self.overdrive)


def _logarithmic_root(scale: Array, slope: Array, target: Array) -> Array:
    """Return the lowest u > 0 with scale*ln(u) + slope*u = target.

    Newton in ln(u) approaches the lowest root from one side: from below where slope < 0 (the sum is concave
    and still rising there), from above where slope >= 0. A root that only touches the summit counts as none.
    """
    scale, slope, target = np.broadcast_arrays(scale, slope, target)
    summit = np.log(scale / np.where(slope < 0, -slope, scale))
    none = (slope < 0) & (scale * (summit - 1) <= target)
    bounded = (slope > 0) & (target > slope)
    bound = np.where(bounded, np.log(np.where(bounded, target, 1.0) / np.where(bounded, slope, 1.0)), 0.0)
    above = np.minimum(target / scale, np.where(slope > 0, bound, np.inf))
    log_ratio = np.where(none, summit - 1, above)
    for _ in range(100):
        exponential = slope * np.exp(log_ratio)
        step = (scale * log_ratio + exponential - target) / (scale + exponential)
        step = np.where(none, 0.0, step)
        log_ratio = log_ratio - step
        if not np.any(np.abs(step) > 1e-13):
            break
    return np.where(none, np.inf, np.exp(log_ratio))


def _square_root(overdrive: Array, slope: Array, target: Array) -> Array:
    """Return the lowest u >= 0 with overdrive*sqrt(u) + slope*u = target; 0 where the device is cut off."""
    square = overdrive**2 + 4 * slope * target
    off = target <= 0
    none = ~off & (square <= 0)
    root = 2 * target / (overdrive + np.sqrt(np.where(off | none, overdrive**2, square)))
    return np.where(none, np.inf, np.where(off, 0.0, root**2))


def programme_rise(
    *,
    sink: ArrayLike,
    air: ArrayLike,
    sink_resistance: ArrayLike,
    device_voltage: ArrayLike,
    set_current: ArrayLike,
) -> Array:
    """Return by how much a programme holds the heatsink above what the idle alone makes of it, K.

    Parameters
    ----------
    sink, air : array_like
        Heatsink with the programme, and air, degC.
    sink_resistance, device_voltage, set_current : array_like
        Heatsink rise a watt of one device, K/W (>= 0), V (> 0), A (> 0).

    Returns
    -------
    numpy.ndarray
        K, zero where the idle alone makes the heatsink as hot.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: superposition of heats on one resistance.
    """
    non_negative(sink_resistance=sink_resistance)
    positive(device_voltage=device_voltage, set_current=set_current)
    of_idle = array(sink_resistance) * array(device_voltage) * array(set_current)
    rise = array(sink) - array(air) - of_idle
    return np.maximum(rise, 0 * rise)


def idle_junction(
    *,
    current: ArrayLike,
    device_voltage: ArrayLike,
    junction_to_case: ArrayLike,
    case_to_sink: ArrayLike,
    sink_resistance: ArrayLike,
    air: ArrayLike,
    sink_rise: ArrayLike = 0.0,
) -> Array:
    """Return the junction temperature, degC, that an idle current keeps up.

    Parameters
    ----------
    current, device_voltage, junction_to_case, case_to_sink, sink_resistance, air, sink_rise : array_like
        A (>= 0), V (> 0), K/W (>= 0, three times), degC, K; the last as for `settled_idle`.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: the chain of resistances; the drop in the emitter resistor is left with the device.
    """
    non_negative(
        current=current,
        junction_to_case=junction_to_case,
        case_to_sink=case_to_sink,
        sink_resistance=sink_resistance,
    )
    positive(device_voltage=device_voltage)
    chain = array(junction_to_case) + array(case_to_sink) + array(sink_resistance)
    return array(air) + array(sink_rise) + chain * (array(device_voltage) * array(current))


def _is_warm(idle_at: str) -> bool:
    if idle_at not in ("cold", "warm"):
        raise ValueError(f"idle_at must be cold or warm, got {idle_at}")
    return idle_at == "warm"


def _law(
    set_current: ArrayLike,
    resistor: ArrayLike,
    drift: ArrayLike,
    transconductance: ArrayLike | None,
    thermal_voltage: ArrayLike,
) -> _Law:
    positive(set_current=set_current, thermal_voltage=thermal_voltage)
    non_negative(emitter_resistor=resistor)
    overdrive = None
    if transconductance is not None:
        positive(transconductance_parameter=transconductance)
        overdrive = np.sqrt(2 * array(set_current) / array(transconductance))
    return _Law(array(set_current), array(resistor), array(drift), overdrive, array(thermal_voltage))


def _junction(current: Array, *chain: ArrayLike) -> Array:
    names = ("device_voltage", "junction_to_case", "case_to_sink", "sink_resistance", "air", "sink_rise")
    return idle_junction(current=current, **dict(zip(names, chain, strict=True)))


def _rises_per_ampere(
    volts: ArrayLike,
    inner: ArrayLike,
    middle: ArrayLike,
    outer: ArrayLike,
    sensor: Sensor | str,
    tracking: ArrayLike,
) -> tuple[Array, Array, Array]:
    """Return the untracked rise per ampere up to the heatsink, that of the heatsink, and its share."""
    of_sink, of_case = untracked(sensor=sensor, tracking=tracking)
    device = array(volts) * (array(inner) + of_case * array(middle))
    return device, array(volts) * of_sink * array(outer), of_sink


def settled_idle(
    *,
    set_current: ArrayLike,
    device_voltage: ArrayLike,
    junction_to_case: ArrayLike,
    case_to_sink: ArrayLike,
    sink_resistance: ArrayLike,
    sensor: Sensor | str,
    tracking: ArrayLike,
    idle_at: Literal["cold", "warm"],
    set_air: ArrayLike,
    air: ArrayLike,
    junction_limit: ArrayLike,
    drift: ArrayLike,
    emitter_resistor: ArrayLike,
    sink_rise: ArrayLike = 0.0,
    transconductance_parameter: ArrayLike | None = None,
    thermal_voltage: ArrayLike = THERMAL_VOLTAGE,
) -> Array:
    """Return the idle current, A, that each device settles at; inf where it runs away.

    At constant bias voltage a bipolar device follows Vt ln(I/I0) + Re (I - I0) = drift * rise, a MOSFET the
    square law, the rise being that of the junction less what the bias generator follows. The larger of two
    states counts: the heatsink still at `air + sink_rise`, and the heatsink settled.

    Parameters
    ----------
    set_current, device_voltage : array_like
        A (> 0) of one device as set, V (> 0) across it; the drop in the emitter resistor may be left in.
    junction_to_case, case_to_sink, sink_resistance : array_like
        K/W, >= 0; the last from `sink_resistance`.
    sensor, tracking
        As for `untracked`.
    idle_at : str
        "cold": set with the junction at `set_air`; "warm": set at thermal equilibrium in `set_air`.
    set_air, air, junction_limit : array_like
        degC; air when it was set, air now.
    drift : array_like
        Fall of the control voltage at constant current, V/K.
    emitter_resistor : array_like
        Or source resistor, ohm, >= 0.
    sink_rise : array_like
        Heatsink above air by other heat than this idle, K, >= 0 (`programme_rise`, other heat).
    transconductance_parameter : array_like, optional
        K of I = K/2 overdrive squared, A/V2, > 0; makes the device a MOSFET.
    thermal_voltage : array_like
        kT/q, V, > 0.

    Returns
    -------
    numpy.ndarray
        A; inf where no equilibrium lies at or below `junction_limit`, or a warm set point is itself unstable.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: heat V I through the chain of resistances, closed over the law of the device.
    """
    law = _law(set_current, emitter_resistor, drift, transconductance_parameter, thermal_voltage)
    non_negative(sink_rise=sink_rise)
    chain = (device_voltage, junction_to_case, case_to_sink)
    inner, of_heatsink, of_sink = _rises_per_ampere(*chain, sink_resistance, sensor, tracking)
    warm = _is_warm(idle_at)
    rise = of_sink * (array(air) + array(sink_rise) - array(set_air))
    rise = rise - float(warm) * (inner + of_heatsink) * law.set_current
    worst = np.zeros(())
    for per_ampere, resistance in ((inner, 0.0), (inner + of_heatsink, sink_resistance)):
        current = law.set_current * law.lowest_ratio(rise, per_ampere)
        junction = _junction(current, *chain, resistance, air, sink_rise)
        unstable = warm & (per_ampere * law.slope() >= 1)
        lost = (junction > array(junction_limit)) | unstable
        worst = np.maximum(worst, np.where(lost, np.inf, current))
    return np.where(np.isnan(array(junction_limit)), np.nan, worst)[()]
