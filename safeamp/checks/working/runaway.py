"""The thermal loop of the idle current: its index, and where it settles, proved by putting it in."""

from __future__ import annotations

from safeamp.checks import operating, thermal
from safeamp.checks import runaway as checks
from safeamp.checks.working.chain import end_of, name_of, thermal_voltage
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import many, no_load, resistors
from safeamp.checks.working.register import working
from safeamp.checks.working.settled import settles
from safeamp.checks.working.warmth import half_of, idle
from safeamp.physics import feedback
from safeamp.quantities import (
    RATIO,
    TEMPERATURE_COEFFICIENT,
    THERMAL_RESISTANCE,
    TRANSCONDUCTANCE_PARAMETER,
    VOLTAGE,
    Number,
)


@working("bias.runaway")
def write_runaway(paper: Paper, value: Number) -> None:
    """The loop index of each side; settled currents where they are judged."""
    current = idle(paper)
    loops = checks._loops(paper.amplifier)
    sides = ("upper", "lower") if len(loops) > 1 else ("upper",)
    indices = []
    for side, loop in zip(sides, loops, strict=True):
        indices.append(_index(paper, side, loop, current))
        if not any(thermal.in_free_air(paper.amplifier, one.device) for one in loops) and not checks._lacks(
            loop
        ):
            settles(paper, side, loop, current)
    paper.put("i", "loop index: from 1 on the set point itself runs away", many(indices, "max"), value)


def _index(paper: Paper, side: str, loop: checks._Loop, current: str) -> str:
    """Write down the loop index of one side."""
    amplifier, end = paper.amplifier, end_of(paper, side)
    rail = no_load(paper)
    half = half_of(paper, rail, "V_half", "half the supply without load", loop.volts)
    resistors(paper)
    seen = _seen(paper, side, loop)
    drift = _drift(paper, side, loop)
    slope = _slope(paper, side, loop, (current, drift))
    idle_amperes = operating.idle_current(amplifier)
    index = checks._index_or_nan(amplifier, loop, idle_amperes)
    return paper.put(f"i{end or '_side'}", "loop index", f"{half} * {seen} * {slope}", index)


def _seen(paper: Paper, side: str, loop: checks._Loop) -> str:
    """Write down the thermal resistance whose rise the bias generator does not follow."""
    amplifier, end = paper.amplifier, end_of(paper, side)
    device = f"device.{name_of(paper, side)}"
    sensor, tracking = checks._sensor(amplifier)
    of_sink, of_case = feedback.untracked(sensor=sensor, tracking=tracking)
    value = loop.junction_to_case + of_case * loop.case_to_sink + of_sink * loop.sink_resistance
    words = "resistance whose rise the bias generator does not follow"
    if thermal.in_free_air(amplifier, loop.device):
        ambient = paper.given(f"R_ja{end}", f"{device}.junction_to_ambient", THERMAL_RESISTANCE)
        return paper.put(f"R_seen{end}", words, ambient, value, THERMAL_RESISTANCE)
    inner = paper.given(f"R_jc{end}", f"{device}.junction_to_case", THERMAL_RESISTANCE, "junction to case")
    paper.given("R_cs", "heatsink.case_to_sink", THERMAL_RESISTANCE, "case to heatsink")
    _heatsink(paper, loop)
    _followed(paper, sensor, tracking)
    formula = f"{inner} + c * R_cs + s * R_hs"
    return paper.put(f"R_seen{end}", words, formula, value, THERMAL_RESISTANCE)


def _heatsink(paper: Paper, loop: checks._Loop) -> None:
    """Write down the rise of the heatsink for each watt of one device, all drifting together."""
    amplifier, words = (
        paper.amplifier,
        "rise of the heatsink for each watt of one device, all drifting together",
    )
    if thermal.by_ruler(amplifier):
        resistance = thermal.sink_to_air(amplifier, thermal.no_signal(amplifier))
        how = "by the balance of fins by ruler at the heat without signal"
        paper.found("R_sa", "heatsink to air", resistance, THERMAL_RESISTANCE, how)
    else:
        paper.given("R_sa", "heatsink.sink_to_air", THERMAL_RESISTANCE, "heatsink to air")
    if amplifier.heatsink.each:
        paper.put("R_hs", words, "R_sa", loop.sink_resistance, THERMAL_RESISTANCE)
        return
    paper.given("n_shared", "heatsink.shared_by", RATIO, "stages on the whole heatsink")
    paper.put("R_hs", words, "2 * n * n_shared * R_sa", loop.sink_resistance, THERMAL_RESISTANCE)


def _followed(paper: Paper, sensor: str, tracking: Number) -> None:
    """Write down which share of the rises the bias generator does not follow."""
    of_sink, of_case = feedback.untracked(sensor=sensor, tracking=tracking)
    if sensor == "none":
        for symbol, what in (("s", "heatsink"), ("c", "case above it")):
            paper.taken(
                symbol, f"share of the rise of the {what} that is not followed", 1.0, RATIO, "no sensor"
            )
        return
    paper.given("k_track", "stage.bias_tracking", RATIO, "share of the rise that the bias generator follows")
    paper.put("s", f"not followed of the heatsink's rise (sensor: {sensor})", "1 - k_track", of_sink)
    formula = "1 - k_track" if sensor == "device" else ""
    words = "not followed of the rise from heatsink to case"
    if formula:
        paper.put("c", words, formula, of_case)
    else:
        paper.taken("c", words, 1.0, RATIO, "the sensor does not feel it")


def _drift(paper: Paper, side: str, loop: checks._Loop) -> str:
    """Write down by how much the control voltage falls with each kelvin."""
    end = end_of(paper, side)
    words = "fall of the control voltage with temperature"
    if loop.device.temperature_coefficient is not None:
        path = f"device.{name_of(paper, side)}.temperature_coefficient"
        given = paper.given(f"TC{end}", path, TEMPERATURE_COEFFICIENT)
        return paper.put(f"D{end}", words, f"-{given}", loop.drift, TEMPERATURE_COEFFICIENT)
    known = checks.DRIFT.get(str(loop.device.kind))
    why = "not given" if known is None else f"usual for a {loop.device.kind}"
    return paper.taken(f"D{end}", words, known, TEMPERATURE_COEFFICIENT, why)


def _slope(paper: Paper, side: str, loop: checks._Loop, at: tuple[str, str]) -> str:
    """Write down by how much the current rises with each kelvin."""
    (current, drift), end = at, end_of(paper, side)
    value = None
    if not checks._lacks(loop):
        value = checks._slope(paper.amplifier, loop, operating.idle_current(paper.amplifier))
    words = "rise of the idle current with each kelvin, A/K"
    if "mosfet" in str(loop.device.kind):
        path = f"device.{name_of(paper, side)}.transconductance_parameter"
        paper.given(f"K{end}", path, TRANSCONDUCTANCE_PARAMETER)
        root = f"sqrt(2 * K{end} * {current})"
        return paper.put(f"g{end}", words, f"{drift} * {root} / (1 + {root} * R_e)", value)
    control = junctions(paper, loop)
    return paper.put(f"g{end}", words, f"{drift} / (R_e + {control} / {current})", value)


def junctions(paper: Paper, loop: checks._Loop) -> str:
    """Write down kT/q of the junctions of one device."""
    one = thermal_voltage(paper)
    if loop.device.kind != "darlington":
        return one
    return paper.put("V_T2", "of two junctions", f"2 * {one}", checks._thermal_voltage(loop), VOLTAGE)
