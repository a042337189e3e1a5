"""Heat of the stage at a level, and the temperatures that follow from it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any
from weakref import WeakKeyDictionary

import numpy as np

from safeamp.amplifier import Amplifier, Device
from safeamp.checks import operating
from safeamp.checks.trace import miss, needed
from safeamp.physics import heat, stage
from safeamp.quantities import Number

ONE_EIGHTH = 1.0 / 8.0
ONE_THIRD = 1.0 / 3.0
FINS = ("width", "height", "depth", "thickness", "count", "plate", "emissivity")


@dataclass(frozen=True, eq=False)
class Dissipation:
    """Heat of all devices of one stage, W, and the mean current of one conducting device, A."""

    stage_power: Number
    mean_current: Number


#: Several checks ask for the heat of the same level of the same cases; it is the dearest number of most of them.
_KNOWN: WeakKeyDictionary[Amplifier, dict[tuple[float, float], Dissipation]] = WeakKeyDictionary()
#: The devices of a level at an angle carry what they carry without it, unless the angle changes the peak current.
_CARRIED: WeakKeyDictionary[Amplifier, list[tuple[Device, Number, stage.MeanCurrents]]] = WeakKeyDictionary()


def no_signal(amplifier: Amplifier) -> Dissipation:
    """Return the heat without signal at the no-load rails."""
    idle = operating.idle_current(amplifier)
    power = stage.no_signal_heat(
        half_supply=operating.half(amplifier, operating.no_load_rail(amplifier)),
        idle_current=idle,
        emitter_resistor=needed(amplifier, "stage.emitter_resistor")[0],
        conducting=operating.conducting(amplifier),
    )
    return Dissipation(power, idle)


def at_level(
    amplifier: Amplifier, fraction: Number, angle: Number = 0.0, load: tuple[Number, Number] | None = None
) -> Dissipation:
    """Return the heat of a sine at a fraction of clipping power into the nominal load at an angle, or into another."""
    plain = load is None and np.ndim(angle) == np.ndim(fraction) == 0
    if not plain or not isinstance(
        amplifier, Amplifier
    ):  # a watched amplifier is read anew: what is read is noted
        return _level(amplifier, fraction, angle, load)
    known = _KNOWN.setdefault(amplifier, {})
    level = (float(fraction), float(angle))
    if level not in known:
        known[level] = _level(amplifier, fraction, angle, load)
    return known[level]


def _level(
    amplifier: Amplifier, fraction: Number, angle: Number, load: tuple[Number, Number] | None
) -> Dissipation:
    magnitude, turned = operating.nominal_load(amplifier, angle) if load is None else load
    peak = stage.level_peak(clipping_peak=operating.clipping_peak(amplifier), fraction=fraction)
    upper, lower = operating.sides(amplifier)
    laws = {operating.law_of(side.device): side.device for side in (upper, lower)}
    found = [_sine(amplifier, device, fraction, peak, magnitude, turned) for device in laws.values()]
    return found[0] if len(found) == 1 else _worse(*found)


def _worse(one: Dissipation, other: Dissipation) -> Dissipation:
    return Dissipation(
        np.maximum(one.stage_power, other.stage_power), np.maximum(one.mean_current, other.mean_current)
    )


def _sine(
    amplifier: Amplifier, device: Device, fraction: Number, peak: Number, magnitude: Number, angle: Number
) -> Dissipation:
    common = {
        "conducting": operating.conducting(amplifier),
        "emitter_resistor": needed(amplifier, "stage.emitter_resistor")[0],
        "idle_current": operating.idle_current(amplifier),
        "law": operating.law_of(device),
        "transconductance_parameter": device.transconductance_parameter,
    }
    currents = _mean_currents(amplifier, device, peak / magnitude, common)
    power = stage.heat_of_currents(
        currents=currents,
        half_supply=operating.level_half_supply(amplifier, fraction),
        peak=peak,
        load_magnitude=magnitude,
        phase_angle=angle,
        conducting=common["conducting"],
        emitter_resistor=common["emitter_resistor"],
    )
    return Dissipation(power, currents.mean)


def _mean_currents(
    amplifier: Amplifier, device: Device, peak_current: Number, common: dict[str, Any]
) -> stage.MeanCurrents:
    if not isinstance(amplifier, Amplifier):
        return stage.mean_currents(peak_current=peak_current, **common)
    known = _CARRIED.setdefault(amplifier, [])
    for one, peak, currents in known:
        if one is device and np.array_equal(peak, peak_current):
            return currents
    known.append((device, peak_current, stage.mean_currents(peak_current=peak_current, **common)))
    return known[-1][2]


@dataclass(frozen=True, eq=False)
class Temperatures:
    """Heatsink (nan in free air), case and junction of the hottest device of a side, degC, and its heat, W."""

    sink: Number
    case: Number
    junction: Number
    device_power: Number


def in_free_air(amplifier: Amplifier, device: Device) -> bool:
    """Whether the device stands in free air: nothing is said of a heatsink and its data allow it."""
    table = amplifier.heatsink
    said = (table.sink_to_air, table.case_to_sink, table.insulator, table.shared_by, table.fins.width)
    return all(value is None for value in said) and device.junction_to_ambient is not None


def stands_free(amplifier: Amplifier) -> bool:
    """Whether both devices stand in free air."""
    return all(in_free_air(amplifier, operating.device_of(amplifier, side)) for side in ("upper", "lower"))


def hottest_power(amplifier: Amplifier, dissipated: Dissipation) -> Number:
    """Return the heat of the hottest device, W."""
    return heat.hottest_device_power(
        stage_power=dissipated.stage_power,
        conducting=operating.conducting(amplifier),
        imbalance=operating.imbalance_at(amplifier, dissipated.mean_current),
    )


def sink_temperature(amplifier: Amplifier, dissipated: Dissipation, air: Number | None = None) -> Number:
    """Return the heatsink temperature, degC, in the air of the sheet or in another."""
    given_air = needed(amplifier, "heatsink.air")[0] if air is None else air
    power, shared = _on_heatsink(amplifier, dissipated)
    (other,) = needed(amplifier, "heatsink.other_heat")
    if by_ruler(amplifier):
        return given_air + _ruled_rise(amplifier, shared * power + other, given_air)
    (resistance,) = needed(amplifier, "heatsink.sink_to_air")
    return heat.sink_temperature(
        air=given_air, stage_power=power, shared_by=shared, sink_to_air=resistance, other_heat=other
    )


def _on_heatsink(amplifier: Amplifier, dissipated: Dissipation) -> tuple[Number, Number]:
    """Return the heat that one piece of heatsink takes, W, and how many times."""
    if amplifier.heatsink.each:
        return hottest_power(amplifier, dissipated), 1.0
    return dissipated.stage_power, needed(amplifier, "heatsink.shared_by")[0]


def by_ruler(amplifier: Amplifier) -> bool:
    """Whether the heatsink is known by its fins alone."""
    return amplifier.heatsink.sink_to_air is None and amplifier.heatsink.fins.width is not None


def _ruled_rise(amplifier: Amplifier, whole: Number, air: Number) -> Number:
    """Return the rise above air, K, at which fins by ruler shed a heat, as far off as such a sum may be."""
    from safeamp.physics import fins  # few sheets have a heatsink by ruler

    paths = [f"heatsink.fins.{name}" for name in FINS]
    geometry = fins.Geometry(**dict(zip(FINS, needed(amplifier, *paths), strict=True)))
    (share,) = needed(amplifier, "heatsink.fins_share")
    return share * fins.sink_rise(geometry=geometry, heat=whole, air=air)


def sink_to_air(amplifier: Amplifier, dissipated: Dissipation) -> Number:
    """Return the thermal resistance of the heatsink, K/W; that of fins by ruler at this heat, without any other."""
    if not by_ruler(amplifier):
        return needed(amplifier, "heatsink.sink_to_air")[0]
    power, shared = _on_heatsink(amplifier, dissipated)
    whole = np.asarray(shared * power)
    some = np.where(whole > 0.0, whole, np.nan)
    return _ruled_rise(amplifier, some, needed(amplifier, "heatsink.air")[0]) / some


def temperatures(amplifier: Amplifier, dissipated: Dissipation, side: str) -> Temperatures:
    """Return the temperatures of the hottest device of a side."""
    device = operating.device_of(amplifier, side)
    power = hottest_power(amplifier, dissipated)
    if in_free_air(amplifier, device):
        return _free_air(amplifier, device, power)
    (case_to_sink,) = needed(amplifier, "heatsink.case_to_sink")
    sink = sink_temperature(amplifier, dissipated)
    case = heat.case_temperature(sink=sink, device_power=power, case_to_sink=case_to_sink)
    to_case = device_value(amplifier, side, "junction_to_case")
    junction = heat.junction_temperature(case=case, device_power=power, junction_to_case=to_case)
    return Temperatures(sink, case, junction, power)


def _free_air(amplifier: Amplifier, device: Device, power: Number) -> Temperatures:
    (air,) = needed(amplifier, "heatsink.air")
    ambient = device.junction_to_ambient if device.junction_to_ambient is not None else np.nan
    junction = heat.free_air_junction(air=air, device_power=power, junction_to_ambient=ambient)
    return Temperatures(np.full_like(np.asarray(power), np.nan), air, junction, power)


def device_value(amplifier: Amplifier, side: str, name: str) -> Number:
    """Return one rating of the device of a side; a missing one is noted under its own key."""
    value: Number | None = getattr(operating.device_of(amplifier, side), name)
    if value is None:
        owner = amplifier.stage.upper if side == "upper" else amplifier.stage.lower
        miss(amplifier, f"device.{owner}.{name}")
        return float("nan")
    return value


def hotter_case(
    amplifier: Amplifier,
    side: str,
    fraction: float,
    angle: Number = 0.0,
    load: tuple[Number, Number] | None = None,
) -> Number:
    """Return the case temperature of a side's hottest device at the hotter of no signal and a level, degC."""
    quiet = temperatures(amplifier, no_signal(amplifier), side)
    loud = temperatures(amplifier, at_level(amplifier, fraction, angle, load), side)
    return np.maximum(quiet.case, loud.case)
