"""Temperatures: heatsink, junction, reading against sum, metal within reach."""

from __future__ import annotations

import numpy as np

from safeamp.checks import cycle, operating, thermal
from safeamp.checks.heat import LEVELS
from safeamp.checks.working.chain import air_of, end_of, junction, name_of, sink, stage_heat
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import many
from safeamp.checks.working.register import working
from safeamp.quantities import TEMPERATURE, TEMPERATURE_DIFFERENCE, Number

SIDES = ("upper", "lower")
RIPPLE = "by the periodic answer of the Foster pairs to the dissipation of a cycle of the lowest note"


def _hotter_sink(paper: Paper, fraction: float, value: Number, symbol: str) -> str:
    sinks = [sink(paper, stage_heat(paper, level)) for level in (None, fraction)]
    return paper.put(symbol, "the hotter of both", many(sinks, "max"), value, TEMPERATURE)


@working("heat.heatsink")
def write_heatsink(paper: Paper, value: Number) -> None:
    """The hotter of no signal and one third of clipping power."""
    _hotter_sink(paper, thermal.ONE_THIRD, value, "T_sink")


@working("heat.junction")
def write_junction(paper: Paper, value: Number) -> None:
    """The hottest junction over both sides, the hotter of no signal and one third of clipping power."""
    sides = SIDES if end_of(paper, "upper") else SIDES[:1]
    parts = [symbol for side in sides for symbol in _side(paper, side)]
    limits = [
        paper.given(
            f"T_limit{end_of(paper, side)}", f"device.{name_of(paper, side)}.junction_limit", TEMPERATURE
        )
        for side in sides
    ]
    if len(limits) > 1:
        worse = max(zip(sides, limits, strict=True), key=lambda one: _above(paper, *one))[0]
        parts = [one for one in parts if one.endswith(worse)]
    paper.put(
        "T_j", "hottest junction, of the device nearer to its limit", many(parts, "max"), value, TEMPERATURE
    )


def _above(paper: Paper, side: str, limit: str) -> float:
    """Return how far the hottest junction of a side lies above its limit."""
    names = [name for name in ("T_j_quiet", "T_peak", "T_j_third") if paper.has(f"{name}_{side}")]
    return max(paper.value(f"{name}_{side}") for name in names) - paper.value(limit)


def _side(paper: Paper, side: str) -> list[str]:
    amplifier, end = paper.amplifier, end_of(paper, side)
    quiet = junction(paper, stage_heat(paper, None), side)
    heat = stage_heat(paper, thermal.ONE_THIRD)
    loud = junction(paper, heat, side)
    if operating.device_of(amplifier, side).transient is None:
        return [quiet, loud]
    hot = thermal.temperatures(amplifier, heat[2], side)
    lifted = cycle.peak_over_mean(amplifier, side, thermal.ONE_THIRD, hot)
    name = paper.found(
        f"dT_peak{end}",
        "junction at its peak within a cycle above its mean",
        lifted,
        TEMPERATURE_DIFFERENCE,
        RIPPLE,
    )
    peak = np.asarray(hot.junction) + lifted
    return [quiet, paper.put(f"T_peak{end}", "junction at its peak", f"{loud} + {name}", peak, TEMPERATURE)]


@working("heat.reading")
def write_reading(paper: Paper, value: Number) -> None:
    """Read rise over computed rise."""
    paper.given("T_read", "readings.heatsink_temperature", TEMPERATURE, "heatsink, read")
    paper.given("T_beside", "readings.heatsink_air", TEMPERATURE, "air beside it")
    table = paper.amplifier.readings
    level = table.heatsink_level
    if level is None or table.heatsink_air is None:
        paper.taken(
            "T_sink", "heatsink, computed", None, TEMPERATURE, "level or air of the reading is not given"
        )
        return
    fraction = LEVELS.get(level)
    computed = sink(paper, stage_heat(paper, fraction), "T_beside")
    rise = f"({computed} - T_beside)"
    paper.put("r", "read rise over computed rise", f"(T_read - T_beside) / {rise}", value)


@working("touch.temperature")
def write_touch(paper: Paper, value: Number) -> None:
    """Heatsink less air, in a room of 25 degC."""
    room = paper.limits["touch.temperature"].extra["room"]
    paper.taken("T_room", "room in which it is touched", room, TEMPERATURE, "limit of touch.temperature")
    air = air_of(paper)
    if thermal.stands_free(paper.amplifier):
        sides = SIDES if end_of(paper, "upper") else SIDES[:1]
        hot = [
            junction(paper, stage_heat(paper, level), side)
            for level in (None, thermal.ONE_EIGHTH)
            for side in sides
        ]
        hottest = many(hot, "max")
    else:
        most = np.asarray(value) + paper.value(air) - room
        hottest = _hotter_sink(paper, thermal.ONE_EIGHTH, most, "T_sink")
    paper.put("T_touch", "metal within reach", f"{hottest} - {air} + T_room", value, TEMPERATURE)
