"""Temperatures: heatsink, junction, and the reading against the sum."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.checks.registry import finding
from safeamp.checks.trace import miss, needed
from safeamp.checks.words import heat_remarks, idle_remarks, nominal, sharing_remarks, text
from safeamp.findings import Also, Measure, NotApplicable, Step
from safeamp.limits import Limits
from safeamp.quantities import (
    POWER,
    RATIO,
    TEMPERATURE,
    TEMPERATURE_DIFFERENCE,
    THERMAL_RESISTANCE,
    Number,
)

FREE_AIR = "nothing is said of a heatsink and the devices are rated in free air (junction_to_ambient)"
METHOD = "class-AB law, heat of a sine at one third of clipping power and without signal, thermal chain"
NEXT_SOAK = "run it at one third of power into a resistor until it settles; switch off above the stop level"
LEVELS = {"one eighth": thermal.ONE_EIGHTH, "one third": thermal.ONE_THIRD}


def _stage_also(
    amplifier: Amplifier, quiet: thermal.Dissipation, loud: thermal.Dissipation
) -> tuple[Also, ...]:
    return (
        *_ruled_also(amplifier, loud),
        Also("heat of the stage without signal", nominal(quiet.stage_power), POWER),
        Also("heat of the stage at one third of clipping power", nominal(loud.stage_power), POWER),
        Also(
            "power at clipping into the nominal impedance", nominal(operating.output_power(amplifier)), POWER
        ),
    )


def _ruled_also(amplifier: Amplifier, loud: thermal.Dissipation) -> tuple[Also, ...]:
    if not thermal.by_ruler(amplifier):
        return ()
    resistance = nominal(thermal.sink_to_air(amplifier, loud))
    return (Also("heatsink to air by ruler", resistance, THERMAL_RESISTANCE),)


@finding("heat.heatsink", Step.SOAK, TEMPERATURE)
def check_heatsink(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Heatsink temperature, the hotter of no signal and one third of clipping power."""
    if thermal.stands_free(amplifier):
        return NotApplicable(FREE_AIR)
    quiet, loud = thermal.no_signal(amplifier), thermal.at_level(amplifier, thermal.ONE_THIRD)
    cold, hot = thermal.sink_temperature(amplifier, quiet), thermal.sink_temperature(amplifier, loud)
    value = np.maximum(cold, hot)
    return Measure(
        value,
        f"heatsink {text(cold, TEMPERATURE)} without signal, {text(hot, TEMPERATURE)} at one third of clipping power",
        remarks=(*heat_remarks(amplifier), *idle_remarks(amplifier)),
        also=_stage_also(amplifier, quiet, loud),
        next=NEXT_SOAK,
        method=METHOD,
    )


@finding("heat.junction", Step.SOAK, TEMPERATURE)
def check_junction(amplifier: Amplifier, limits: Limits) -> Measure:
    """Hottest junction, the hotter of no signal and one third of clipping power."""
    extra = limits["heat.junction"].extra
    quiet, loud = thermal.no_signal(amplifier), thermal.at_level(amplifier, thermal.ONE_THIRD)
    found = [_junction(amplifier, quiet, loud, side) for side in ("upper", "lower")]
    (hot, limit, case), (other, other_limit, other_case) = found
    margin, other_margin = np.asarray(hot) - limit, np.asarray(other) - other_limit
    worse = np.isnan(margin) | (margin >= other_margin)  # of two sides the unknown one is shown
    value, stop = np.where(worse, hot, other), np.where(worse, limit, other_limit)
    start: float = extra["span_from"]
    share: float = extra["go_share_of_span"]
    return Measure(
        value,
        f"junction {text(value, TEMPERATURE)}, allowed {text(stop, TEMPERATURE)}",
        go=start + share * (np.asarray(stop) - start),
        stop=stop,
        remarks=(
            *heat_remarks(amplifier),
            *idle_remarks(amplifier),
            *sharing_remarks(amplifier, limits),
        ),
        also=(Also("case", nominal(np.maximum(case, other_case)), TEMPERATURE),),
        next="read the heatsink beside the hottest device; case and junction are above it",
        method=METHOD,
    )


def _junction(
    amplifier: Amplifier, quiet: thermal.Dissipation, loud: thermal.Dissipation, side: str
) -> tuple[Number, Number, Number]:
    cold, hot = thermal.temperatures(amplifier, quiet, side), thermal.temperatures(amplifier, loud, side)
    limit = thermal.device_value(amplifier, side, "junction_limit")
    return np.maximum(cold.junction, hot.junction), limit, np.maximum(cold.case, hot.case)


@finding("heat.reading", Step.SOAK, RATIO, at_bench=True)
def check_reading(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Read rise of the heatsink over the computed one."""
    if thermal.stands_free(amplifier):
        return NotApplicable(FREE_AIR)
    read, air = needed(amplifier, "readings.heatsink_temperature", "readings.heatsink_air")
    level = amplifier.readings.heatsink_level
    if level is None:
        miss(amplifier, "readings.heatsink_level")
    dissipated = (
        thermal.at_level(amplifier, LEVELS[level]) if level in LEVELS else thermal.no_signal(amplifier)
    )
    computed = thermal.sink_temperature(amplifier, dissipated, air=air)
    rise, expected = read - air, (computed - air if level in LEVELS or level == "idle" else np.nan)
    return Measure(
        rise / np.where(np.asarray(expected) > 0.0, expected, np.nan),
        f"read {text(rise, TEMPERATURE_DIFFERENCE)} above air, computed {text(expected, TEMPERATURE_DIFFERENCE)}",
        remarks=(*heat_remarks(amplifier), *idle_remarks(amplifier)),
        next="read heatsink and air beside it once both have settled, and say at which level",
        method="read rise over computed rise at the same level",
    )
