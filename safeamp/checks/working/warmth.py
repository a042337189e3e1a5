"""Idle current, heat of the stage at a level, and the temperatures from air to junction."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating, thermal
from safeamp.checks.working.load import load
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import clipping, full_load, many, no_load, resistors
from safeamp.physics import stage
from safeamp.quantities import (
    CURRENT,
    POWER,
    RATIO,
    VOLTAGE,
    Number,
)

#: Name of a level in symbols and words, by its fraction of clipping power.
LEVELS = {
    thermal.ONE_EIGHTH: ("eighth", "one eighth", "1/8"),
    thermal.ONE_THIRD: ("third", "one third", "1/3"),
}
CYCLE = "by averaging the class-AB law over a cycle: no closed formula"


def idle(paper: Paper) -> str:
    """Write down the idle current of each device."""
    amplifier = paper.amplifier
    names = [*_stated_idle(paper), *_read_idle(paper)]
    value = operating.idle_current(amplifier)
    if not names:
        return paper.taken("I_idle", "idle current of each device", None, CURRENT, "stage.idle is not given")
    return paper.put("I_idle", "idle current of each device", many(names, "max"), value, CURRENT)


def _stated_idle(paper: Paper) -> list[str]:
    table = paper.amplifier.stage
    if table.idle is None:
        return []
    if table.idle_unit == "A":
        return [paper.given("I_stated", "stage.idle", CURRENT)]
    paper.given("V_idle", "stage.idle", VOLTAGE)
    resistors(paper)
    current = operating.as_current(paper.amplifier, table.idle, table.idle_unit)
    return [paper.put("I_stated", "idle current by the stated drop", "V_idle / R_e", current, CURRENT)]


def _read_idle(paper: Paper) -> list[str]:
    read = operating.read_idle(paper.amplifier)
    if read is None:
        return []
    mean = mean_reading(paper)
    resistors(paper)
    current = operating.as_current(paper.amplifier, read, "V")
    return [paper.put("I_read", "idle current by the readings", f"{mean} / R_e", current, CURRENT)]


def mean_reading(paper: Paper) -> str:
    """Write down the larger mean of the readings across the resistors of a side, dead devices left out."""
    means = []
    for side in ("upper", "lower"):
        group = getattr(paper.amplifier.readings, f"idle_{side}")
        if group:
            names = readings(paper, side)
            value = sum(group) / operating.carrying(group)
            carry = float(np.asarray(operating.carrying(group)).flat[0])
            formula = f"({' + '.join(names)}) / {carry:g}" if len(names) > 1 else names[0]
            words = f"mean reading of the {side} side, over the devices that carry current"
            means.append(paper.put(f"V_{side}_mean", words, formula, value, VOLTAGE))
    value = operating.read_idle(paper.amplifier)
    return paper.put("V_mean", "larger mean of the two sides", many(means, "max"), value, VOLTAGE)


def readings(paper: Paper, side: str) -> list[str]:
    """Write down the reading across each emitter resistor of a side."""
    group = getattr(paper.amplifier.readings, f"idle_{side}") or ()
    return [
        paper.given(f"V_{side}{place + 1}", f"readings.idle_{side}.{place}", VOLTAGE)
        for place in range(len(group))
    ]


def half_of(paper: Paper, rail: str, symbol: str, words: str, value: Number) -> str:
    """Write down half of a single rail; of a split supply it is the rail."""
    if not operating.is_single(paper.amplifier):
        return rail
    return paper.put(symbol, words, f"{rail} / 2", value, VOLTAGE)


def quiet(paper: Paper) -> str:
    """Write down the heat of the stage without signal."""
    current = idle(paper)
    rail = no_load(paper)
    value = operating.half(paper.amplifier, operating.no_load_rail(paper.amplifier))
    half = half_of(paper, rail, "V_half", "half the supply without load", value)
    resistors(paper)
    heat = thermal.no_signal(paper.amplifier).stage_power
    formula = f"2 * n * {current} * ({half} - {current} * R_e)"
    return paper.put("P_quiet", "heat of all devices of the stage without signal", formula, heat, POWER)


def loud(paper: Paper, fraction: float, angle: float = 0.0, seen: tuple[str, str] | None = None) -> str:
    """Write down the heat of a sine at a fraction of clipping power, into the nominal load or into another."""
    tag, words, _ = LEVELS[fraction]
    end = f"{tag}{'' if angle == 0.0 else f'_{angle:g}'}{'' if seen is None else '_curve'}"
    peak = level_peak(paper, fraction)
    magnitude, turn = load(paper, angle) if seen is None else seen
    half = level_supply(paper, fraction)
    mean, square = mean_currents(paper, fraction, (peak, magnitude), end)
    other = None if seen is None else (paper.value(magnitude), paper.value(turn))
    heat = thermal.at_level(paper.amplifier, fraction, angle, other).stage_power
    drawn = f"2 * n * ({half} * {mean} - R_e * {square})"
    formula = f"{drawn} - {peak}^2 * cos({turn}) / (2 * {magnitude})"
    said = f"heat of all devices at {words} of clipping power: what the rails give less what the load takes"
    return paper.put(f"P_{end}", said, formula, heat, POWER)


def level_peak(paper: Paper, fraction: float) -> str:
    """Write down the peak of the output at a fraction of clipping power."""
    tag, words, share = LEVELS[fraction]
    clip = clipping(paper)
    peak = stage.level_peak(clipping_peak=operating.clipping_peak(paper.amplifier), fraction=fraction)
    return paper.put(
        f"V_{tag}", f"peak at {words} of clipping power", f"{clip} * sqrt({share})", peak, VOLTAGE
    )


def level_supply(paper: Paper, fraction: float) -> str:
    """Write down half the supply while a fraction of clipping power is played."""
    tag, words, share = LEVELS[fraction]
    rail, sagged = no_load(paper), full_load(paper)
    halves = " / 2" if operating.is_single(paper.amplifier) else ""
    formula = f"({rail} - sqrt({share}) * ({rail} - {sagged})){halves}"
    value = operating.level_half_supply(paper.amplifier, fraction)
    return paper.put(
        f"V_half_{tag}", f"half the supply at {words} of clipping power", formula, value, VOLTAGE
    )


def mean_currents(paper: Paper, fraction: float, at: tuple[str, str], end: str) -> tuple[str, str]:
    """Write down mean and mean square of the current of each device over a cycle."""
    amplifier, (peak, magnitude) = paper.amplifier, at
    idle(paper)
    resistors(paper)
    each = paper.value(peak) / paper.value(magnitude) / paper.value("n")
    top = paper.put(
        f"I_peak_{end}", "peak current of each device", f"{peak} / {magnitude} / n", each, CURRENT
    )
    paper.put(
        f"I_class_b_{end}", "mean in pure class B, for comparison", f"{top} / pi", each / np.pi, CURRENT
    )
    side = _hotter_side(paper, fraction)
    found = stage.mean_currents(
        peak_current=paper.value(peak) / paper.value(magnitude),
        conducting=operating.conducting(amplifier),
        emitter_resistor=paper.value("R_e"),
        idle_current=operating.idle_current(amplifier),
        law=operating.law_of(side.device),
        transconductance_parameter=side.device.transconductance_parameter,
    )
    mean = paper.found(f"I_mean_{end}", "mean current of each device", found.mean, CURRENT, CYCLE)
    words = "mean square of that current, A squared"
    return mean, paper.found(f"I_square_{end}", words, found.mean_square, RATIO, CYCLE)


def _hotter_side(paper: Paper, fraction: float) -> operating.Side:
    """Return the side whose law makes more heat; both where the law is one."""
    upper, lower = operating.sides(paper.amplifier)
    if operating.law_of(upper.device) is operating.law_of(lower.device):
        return upper
    return max(upper, lower, key=lambda side: _heat_by(paper, side, fraction))


def _heat_by(paper: Paper, side: operating.Side, fraction: float) -> float:
    amplifier = paper.amplifier
    magnitude, turned = operating.nominal_load(amplifier)
    heat = stage.pair_heat(
        half_supply=operating.level_half_supply(amplifier, fraction),
        peak=stage.level_peak(clipping_peak=operating.clipping_peak(amplifier), fraction=fraction),
        load_magnitude=magnitude,
        phase_angle=turned,
        conducting=operating.conducting(amplifier),
        emitter_resistor=paper.value("R_e"),
        idle_current=operating.idle_current(amplifier),
        law=operating.law_of(side.device),
        transconductance_parameter=side.device.transconductance_parameter,
    )
    return float(np.asarray(heat).flat[0])
