"""Thermal feedback of the idle current: loop index, and where the idle current settles."""

from __future__ import annotations

from dataclasses import dataclass
from functools import reduce
from typing import Any

import numpy as np

from safeamp.amplifier import Amplifier, Device
from safeamp.checks import operating, thermal
from safeamp.checks.registry import finding
from safeamp.checks.trace import needed
from safeamp.checks.words import idle_remarks, level, nominal
from safeamp.findings import Also, Measure, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import feedback, settling
from safeamp.physics.stage import THERMAL_VOLTAGE
from safeamp.quantities import CURRENT, RATIO, Number

#: Fall of the control voltage with temperature, V/K: one junction, two junctions.
DRIFT = {"bipolar": 0.0020, "darlington": 0.0044}
NEXT = "watch the idle current for 40 minutes with the lid on; if it still rises, switch off"


@dataclass(frozen=True, eq=False)
class _Loop:
    """What closes the loop of one side: resistances (K/W), volts, drift (V/K), device."""

    junction_to_case: Number
    case_to_sink: Number
    sink_resistance: Number
    volts: Number
    drift: Number
    device: Device
    name: str
    limit: Number


def _drift(amplifier: Amplifier, side: str) -> Number:
    device = operating.device_of(amplifier, side)
    if device.temperature_coefficient is not None:
        return -device.temperature_coefficient
    if device.kind in DRIFT:
        return DRIFT[str(device.kind)]
    return thermal.device_value(amplifier, side, "temperature_coefficient")


def _resistances(amplifier: Amplifier, side: str) -> tuple[Number, Number, Number]:
    device = operating.device_of(amplifier, side)
    if thermal.in_free_air(amplifier, device):
        return device.junction_to_ambient, 0.0, 0.0
    (case_to_sink,) = needed(amplifier, "heatsink.case_to_sink")
    sink_to_air = thermal.sink_to_air(amplifier, thermal.no_signal(amplifier))
    each = bool(amplifier.heatsink.each)
    shared = 0.5 if each else needed(amplifier, "heatsink.shared_by")[0]
    sink = feedback.sink_resistance(
        sink_to_air=sink_to_air, conducting=1.0 if each else operating.conducting(amplifier), shared_by=shared
    )
    return thermal.device_value(amplifier, side, "junction_to_case"), case_to_sink, sink


def _loop(amplifier: Amplifier, side: str) -> _Loop:
    device = operating.device_of(amplifier, side)
    if "mosfet" in str(device.kind):
        thermal.device_value(amplifier, side, "transconductance_parameter")
    name = amplifier.stage.upper if side == "upper" else amplifier.stage.lower
    return _Loop(
        *_resistances(amplifier, side),
        volts=operating.half(amplifier, operating.no_load_rail(amplifier)),
        drift=_drift(amplifier, side),
        device=device,
        name=str(name),
        limit=thermal.device_value(amplifier, side, "junction_limit"),
    )


def _sensor(amplifier: Amplifier) -> tuple[str, Number]:
    """Return where the bias generator feels the heat, and the share that it follows."""
    sensor = str(amplifier.stage.bias_sensor)
    if sensor == "none":
        return sensor, 0.0
    return sensor, needed(amplifier, "stage.bias_tracking")[0]


def _index(amplifier: Amplifier, loop: _Loop, idle: Number) -> Number:
    sensor, tracking = _sensor(amplifier)
    of_sink, of_case = feedback.untracked(sensor=sensor, tracking=tracking)
    seen = loop.junction_to_case + of_case * loop.case_to_sink + of_sink * loop.sink_resistance
    return feedback.loop_index(
        device_voltage=loop.volts, seen_resistance=seen, current_slope=_slope(amplifier, loop, idle)
    )


def _slope(amplifier: Amplifier, loop: _Loop, idle: Number) -> Number:
    (resistor,) = needed(amplifier, "stage.emitter_resistor")
    if "mosfet" not in str(loop.device.kind):
        return feedback.current_slope_bipolar(
            current=idle, emitter_resistor=resistor, drift=loop.drift, thermal_voltage=_thermal_voltage(loop)
        )
    return feedback.current_slope_mosfet(
        current=idle,
        source_resistor=resistor,
        transconductance_parameter=np.asarray(loop.device.transconductance_parameter, dtype=float),
        drift=loop.drift,
    )


def _thermal_voltage(loop: _Loop) -> float:
    """Return kT/q of the junctions between the bias terminals of one device, V."""
    return THERMAL_VOLTAGE * (2.0 if loop.device.kind == "darlington" else 1.0)


def _settled(amplifier: Amplifier, loop: _Loop, idle: Number, *, warmer: float, rise: Number) -> Number:
    """Return the settled idle current over the set one, in air warmer by so much, on a heatsink hotter by `rise`."""
    sensor, tracking = _sensor(amplifier)
    air, resistor = needed(amplifier, "heatsink.air", "stage.emitter_resistor")
    mosfet = "mosfet" in str(loop.device.kind)
    found = settling.settled_idle(
        set_current=idle,
        device_voltage=loop.volts,
        junction_to_case=loop.junction_to_case,
        case_to_sink=loop.case_to_sink,
        sink_resistance=loop.sink_resistance,
        sensor=sensor,
        tracking=tracking,
        idle_at="warm" if amplifier.stage.idle_at == "warm" else "cold",
        set_air=air,
        air=air + warmer,
        junction_limit=loop.limit,
        drift=loop.drift,
        emitter_resistor=resistor,
        sink_rise=rise,
        transconductance_parameter=loop.device.transconductance_parameter if mosfet else None,
        thermal_voltage=_thermal_voltage(loop),
    )
    return found / idle


def _rise_at_one_eighth(amplifier: Amplifier, loop: _Loop, idle: Number) -> Number:
    (air,) = needed(amplifier, "heatsink.air")
    sink = thermal.sink_temperature(amplifier, thermal.at_level(amplifier, thermal.ONE_EIGHTH))
    return settling.programme_rise(
        sink=sink, air=air, sink_resistance=loop.sink_resistance, device_voltage=loop.volts, set_current=idle
    )


def _conditions(amplifier: Amplifier, loop: _Loop, idle: Number, warmer: float) -> dict[str, Number]:
    rise = _rise_at_one_eighth(amplifier, loop, idle)
    return {
        "now": _settled(amplifier, loop, idle, warmer=0.0, rise=0.0),
        f"in air {warmer:.0f} K warmer": _settled(amplifier, loop, idle, warmer=warmer, rise=0.0),
        "on a heatsink at one eighth of power": _settled(amplifier, loop, idle, warmer=0.0, rise=rise),
    }


@finding("bias.runaway", Step.BIAS, RATIO)
def check_runaway(amplifier: Amplifier, limits: Limits) -> Measure:
    """Loop index of the thermal feedback, and settled over set idle in three conditions."""
    idle = operating.idle_current(amplifier)
    loops = _loops(amplifier)
    index = reduce(np.maximum, [_index_or_nan(amplifier, loop, idle) for loop in loops])
    if any(thermal.in_free_air(amplifier, loop.device) for loop in loops):
        return _free_air(index)
    ratios = _worst_ratios(amplifier, loops, idle, limits["bias.runaway"].extra["air_warmer_by"])
    settled: Any = reduce(np.maximum, list(ratios.values()))
    bounds, own = limits["bias.runaway.settled"], limits["bias.runaway"]
    return Measure(
        np.where(np.isnan(settled), np.nan, index),
        _says(index, ratios),
        go=np.where(settled > level(bounds, "go"), -np.inf, level(own, "go")),
        stop=np.where(settled > level(bounds, "stop"), -np.inf, level(own, "stop")),
        remarks=(*idle_remarks(amplifier), *_settled_remarks(ratios, level(bounds, "go"))),
        also=_also(ratios, idle),
        next=NEXT,
        method="loop index V R_th dI/dT at the set point; the loop solved to equilibrium in three conditions",
    )


def _free_air(index: Number) -> Measure:
    """Return the index alone: in free air nothing ties the bias generator to the devices, so no rule judges it."""
    return Measure(
        index,
        f"loop index {nominal(index):.2f} in free air; whether the bias generator follows the same air is not known",
        word=Verdict.UNVERIFIED,
        next=NEXT,
        method="loop index V R_th dI/dT at the set point",
    )


def _loops(amplifier: Amplifier) -> list[_Loop]:
    sides = ("upper",) if amplifier.stage.upper == amplifier.stage.lower else ("upper", "lower")
    return [_loop(amplifier, side) for side in sides]


def _lacks(loop: _Loop) -> bool:
    mosfet = "mosfet" in str(loop.device.kind)
    return bool(np.any(np.isnan(loop.drift))) or (mosfet and loop.device.transconductance_parameter is None)


def _index_or_nan(amplifier: Amplifier, loop: _Loop, idle: Number) -> Number:
    return np.nan if _lacks(loop) else _index(amplifier, loop, idle)


def _worst_ratios(amplifier: Amplifier, loops: list[_Loop], idle: Number, warmer: float) -> dict[str, Number]:
    if any(_lacks(loop) for loop in loops):
        return {"now": np.nan}
    found = [_conditions(amplifier, loop, idle, warmer) for loop in loops]
    return {name: reduce(np.maximum, [one[name] for one in found]) for name in found[0]}


def _times(ratio: Number) -> str:
    value = nominal(ratio)
    return "runs away" if np.isinf(value) else f"settles at {value:.2f} times the set current"


def _says(index: Number, ratios: dict[str, Number]) -> str:
    if np.isnan(nominal(index)):
        return "the thermal loop cannot be computed"
    return f"loop index {nominal(index):.2f}; " + "; ".join(
        f"{_times(r)} {name}" for name, r in ratios.items()
    )


def _settled_remarks(ratios: dict[str, Number], go: float) -> tuple[Remark, ...]:
    """Return in words which condition is beyond what is usual; the word itself follows from the bounds."""
    worse = [name for name, ratio in ratios.items() if nominal(ratio) > go]
    return (Remark(Verdict.GO, f"the idle current does not hold {', '.join(worse)}"),) if worse else ()


def _also(ratios: dict[str, Number], idle: Number) -> tuple[Also, ...]:
    found = [Also(f"settled over set idle {name}", nominal(ratio), RATIO) for name, ratio in ratios.items()]
    return (Also("set idle current", nominal(idle), CURRENT), *found)
