"""Temperatures: heatsink, junction, and the reading against the sum."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import cycle, operating, thermal
from safeamp.checks.beside import one_open_also
from safeamp.checks.levels import level_also
from safeamp.checks.registry import finding
from safeamp.checks.trace import miss, needed
from safeamp.checks.words import heat_remarks, idle_remarks, level, nominal, sharing_remarks, text
from safeamp.findings import Also, Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.quantities import (
    FREQUENCY,
    POWER,
    RATIO,
    TEMPERATURE,
    TEMPERATURE_DIFFERENCE,
    THERMAL_RESISTANCE,
    Number,
)

FREE_AIR = "nothing is said of a heatsink and the devices are rated in free air (junction_to_ambient)"
METHOD = "class-AB law, heat of a sine at one third of clipping power and without signal, thermal chain"
PEAK_METHOD = f"{METHOD}; at the lowest note the periodic answer of the Foster pairs on top of the mean"
NEXT_SOAK = "run it at one third of power into a resistor until it settles; switch off above the stop level"
LEVELS = {"one eighth": thermal.ONE_EIGHTH, "one third": thermal.ONE_THIRD}


def _stage_also(
    amplifier: Amplifier, quiet: thermal.Dissipation, loud: thermal.Dissipation
) -> tuple[Also, ...]:
    return (
        *_ruled_also(amplifier, loud),
        Also("heat of the stage without signal", nominal(quiet.stage_power), POWER),
        Also("heat of the stage at one third of clipping power", nominal(loud.stage_power), POWER),
        Also(_clipping_name(amplifier), nominal(operating.output_power(amplifier)), POWER),
        *_bridged_also(amplifier),
    )


def _clipping_name(amplifier: Amplifier) -> str:
    """Return into what the power at clipping goes."""
    beside = "" if amplifier.stage.series_resistor is None else " with the series resistor before it"
    return f"power at clipping into the nominal impedance{beside}"


def _bridged_also(amplifier: Amplifier) -> tuple[Also, ...]:
    """Return what one side of a bridge gives: its devices see half the load, and heat is that of one side."""
    if not amplifier.stage.bridged:
        return ()
    return (Also("of that each side of the bridge", nominal(operating.clipping_power(amplifier)), POWER),)


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
        also=(*_stage_also(amplifier, quiet, loud), *level_also(amplifier)),
        next=NEXT_SOAK,
        method=METHOD,
    )


@dataclass(frozen=True, eq=False)
class _Junction:
    """The hottest junction over sides and levels, degC: at its peak, in the mean; its limit and its case."""

    value: Number
    mean: Number
    limit: Number
    case: Number


@finding("heat.junction", Step.SOAK, TEMPERATURE)
def check_junction(amplifier: Amplifier, limits: Limits) -> Measure:
    """Hottest junction, the hotter of no signal and one third of clipping power; with `transient` at its peak."""
    extra, found = limits["heat.junction"].extra, _hottest(amplifier)
    start: float = extra["span_from"]
    share: float = extra["go_share_of_span"]
    return Measure(
        found.value,
        _junction_text(amplifier, found),
        go=start + share * (np.asarray(found.limit) - start),
        stop=found.limit,
        remarks=(
            *heat_remarks(amplifier),
            *idle_remarks(amplifier),
            *sharing_remarks(amplifier, limits),
            *cycle.transient_remarks(amplifier),
        ),
        also=_junction_also(amplifier, found),
        next="read the heatsink beside the hottest device; case and junction are above it",
        method=PEAK_METHOD if _has_transient(amplifier) else METHOD,
    )


def _hottest(amplifier: Amplifier) -> _Junction:
    quiet, loud = thermal.no_signal(amplifier), thermal.at_level(amplifier, thermal.ONE_THIRD)
    one, other = (_junction(amplifier, quiet, loud, side) for side in ("upper", "lower"))
    above, other_above = np.asarray(one.value) - one.limit, np.asarray(other.value) - other.limit
    worse = np.isnan(above) | (above >= other_above)  # of two sides the unknown one is shown
    return _Junction(
        np.where(worse, one.value, other.value),
        np.where(worse, one.mean, other.mean),
        np.where(worse, one.limit, other.limit),
        np.maximum(one.case, other.case),
    )


def _junction(
    amplifier: Amplifier, quiet: thermal.Dissipation, loud: thermal.Dissipation, side: str
) -> _Junction:
    cold, hot = thermal.temperatures(amplifier, quiet, side), thermal.temperatures(amplifier, loud, side)
    peak = hot.junction + cycle.peak_over_mean(amplifier, side, thermal.ONE_THIRD, hot)
    return _Junction(
        np.maximum(cold.junction, peak),
        np.maximum(cold.junction, hot.junction),
        thermal.device_value(amplifier, side, "junction_limit"),
        np.maximum(cold.case, hot.case),
    )


def _has_transient(amplifier: Amplifier) -> bool:
    sides = ("upper", "lower")
    return any(operating.device_of(amplifier, side).transient is not None for side in sides)


def _junction_text(amplifier: Amplifier, found: _Junction) -> str:
    said = f"{text(found.value, TEMPERATURE)}, allowed {text(found.limit, TEMPERATURE)}"
    if not _has_transient(amplifier):
        return f"junction {said}"
    (note,) = needed(amplifier, cycle.NOTE)
    return f"junction peaks at {said}, in every cycle of {text(note, FREQUENCY)}"


def _junction_also(amplifier: Amplifier, found: _Junction) -> tuple[Also, ...]:
    mean = Also("mean over a cycle", nominal(found.mean), TEMPERATURE)
    return (
        Also("case", nominal(found.case), TEMPERATURE),
        *((mean,) if _has_transient(amplifier) else ()),
        *one_open_also(amplifier, lambda less: _hottest(less).value, TEMPERATURE),
    )


@finding("heat.reading", Step.SOAK, RATIO, at_bench=True)
def check_reading(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Read rise of the heatsink over the computed one; the read temperature itself counts as that of the heatsink."""
    if thermal.stands_free(amplifier):
        return NotApplicable(FREE_AIR)
    read, air = needed(amplifier, "readings.heatsink_temperature", "readings.heatsink_air")
    played, own = amplifier.readings.heatsink_level, limits["heat.reading"]
    if played is None:
        miss(amplifier, "readings.heatsink_level")
    dissipated = (
        thermal.at_level(amplifier, LEVELS[played]) if played in LEVELS else thermal.no_signal(amplifier)
    )
    computed = thermal.sink_temperature(amplifier, dissipated, air=air)
    rise, expected = read - air, (computed - air if played in LEVELS or played == "idle" else np.nan)
    small = np.where(rise < own.extra["small_rise_below"], np.inf, level(own, "stop"))
    return Measure(
        rise / np.where(np.asarray(expected) > 0.0, expected, np.nan),
        f"read {text(rise, TEMPERATURE_DIFFERENCE)} above air, computed {text(expected, TEMPERATURE_DIFFERENCE)}",
        go=np.where(read > level(limits["heat.heatsink"], "go"), -np.inf, level(own, "go")),
        stop=np.where(read > level(limits["heat.heatsink"], "stop"), -np.inf, small),
        remarks=(
            *heat_remarks(amplifier),
            *idle_remarks(amplifier),
            *_too_cool(rise, expected, limits),
            *_read_remarks(amplifier, read, air, limits),
        ),
        next="read heatsink and air beside it once both have settled, and say at which level",
        method="read rise over computed rise at the same level",
    )


def _read_remarks(amplifier: Amplifier, read: Number, air: Number, limits: Limits) -> tuple[Remark, ...]:
    """Return what a heatsink says that is hotter than one may be, or that stands in another air than the sheet's."""
    (stated,), found = needed(amplifier, "heatsink.air"), []
    highest = level(limits["heat.heatsink"], "go")
    if nominal(read) > highest:
        said = f"the heatsink itself read {text(read, TEMPERATURE)}, go ends at {text(highest, TEMPERATURE)}"
        found.append(Remark(Verdict.GO, said))
    if nominal(air) > nominal(stated) + limits["heat.reading"].extra["air_above_stated"]:
        said = f"the air beside the heatsink read {text(air, TEMPERATURE)}, heatsink.air is {text(stated, TEMPERATURE)}"
        found.append(
            Remark(Verdict.UNVERIFIED, f"{said}: write it as hot as it gets, and all is computed for that")
        )
    return tuple(found)


def _too_cool(rise: Number, expected: Number, limits: Limits) -> tuple[Remark, ...]:
    """Return what a heatsink that stays cool says: the heat of the devices does not reach it."""
    extra = limits["heat.reading"].extra
    worth = nominal(expected) >= extra["cool_from_computed"]
    if not worth or not nominal(rise) < extra["cool_below"] * nominal(expected):
        return ()
    because = (
        "the heatsink stays far cooler than computed: does the device touch it, is the stage at that level?"
    )
    return (Remark(Verdict.CAUTION, because),)
