"""What a hand may meet: rails, mains insulation, output voltage, hot metal."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.checks.registry import finding
from safeamp.checks.trace import needed
from safeamp.checks.words import heat_remarks, idle_remarks, level, nominal, text
from safeamp.findings import Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limit, Limits
from safeamp.quantities import RESISTANCE, TEMPERATURE, VOLTAGE, Number


@finding("touch.rails", Step.COLD_CHECKS, VOLTAGE)
def check_rails(amplifier: Amplifier, limits: Limits) -> Measure:
    """Sum of the rails at the highest mains."""
    value = operating.rail_to_rail_at_highest(amplifier)
    return Measure(
        value,
        f"{text(value, VOLTAGE)} between the rails at the highest mains",
        next="discharge the reservoirs through a resistor and measure before you touch; one hand",
        method="sum of the no-load rails scaled to the highest mains",
    )


@finding("touch.mains", Step.HAND_OVER, RESISTANCE, at_bench=True, unpowered=True)
def check_mains(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Insulation from mains to metal, and protective earth; what was read all the same on a battery is judged."""
    if amplifier.supply.source == "battery" and amplifier.readings.mains_insulation is None:
        return NotApplicable('supply.source is "battery": no mains comes near the metal')
    (insulation,) = needed(amplifier, "readings.mains_insulation")
    earthless = "readings.earth_resistance" in amplifier.absent
    limit, earth_limit = limits["touch.mains"], limits["touch.mains.earth"]
    if earthless:
        earth: Number = 0.0
        said = "no protective earth: the insulation alone stands between mains and hand"
    else:
        (earth,) = needed(amplifier, "readings.earth_resistance")
        said = f"protective earth {text(earth, RESISTANCE)}"
    return Measure(
        insulation,
        f"{text(insulation, RESISTANCE)} from mains to metal; {said}",
        go=np.where(
            np.isnan(earth), np.nan, np.where(_above(earth, earth_limit, "go"), np.inf, level(limit, "go"))
        ),
        stop=np.where(_above(earth, earth_limit, "stop"), np.inf, level(limit, "stop")),
        next="test insulation and earth by your local rules; a licensed person's measurement decides",
        method="readings against levels; local code outranks them",
    )


def _above(value: Number, limit: Limit, name: str) -> Number:
    above: Number = np.asarray(value) > level(limit, name) * (1.0 + 1e-9)
    return above


@finding("touch.voltage", Step.HAND_OVER, VOLTAGE)
def check_voltage(amplifier: Amplifier, limits: Limits) -> Measure:
    """Rms output voltage at clipping (bridged: across the loudspeaker)."""
    peak = operating.clipping_peak(amplifier) * (2.0 if amplifier.stage.bridged else 1.0)
    rms = peak / np.sqrt(2.0)
    return Measure(
        rms,
        f"{text(rms, VOLTAGE)} rms at the loudspeaker terminals at clipping",
        next="above the go level the terminals must be covered",
        method="clipped peak over the square root of two",
    )


@finding("touch.temperature", Step.HAND_OVER, TEMPERATURE)
def check_temperature(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Accessible heatsink in a room of 25 degC, the hotter of no signal and one eighth."""
    if amplifier.heatsink.accessible is False:
        return NotApplicable("heatsink.accessible = false")
    extra = limits["touch.temperature"].extra
    (air,) = needed(amplifier, "heatsink.air")
    value = _hotter(amplifier) - air + extra["room"]
    guard = nominal(value) > extra["guard_above"]
    return Measure(
        value,
        f"metal within reach at {text(value, TEMPERATURE)} in a room of {text(extra['room'], TEMPERATURE)}"
        + ("; it needs a guard" if guard else ""),
        remarks=(*heat_remarks(amplifier), *idle_remarks(amplifier), *_guard(guard)),
        next="read the heatsink after an hour at ordinary level",
        method="heatsink temperature less air, on 25 degC; in free air the junction stands for the case",
    )


def _guard(guard: bool) -> tuple[Remark, ...]:
    return (Remark(Verdict.CAUTION, "too hot to touch: fit a guard"),) if guard else ()


def _hotter(amplifier: Amplifier) -> Number:
    quiet, loud = thermal.no_signal(amplifier), thermal.at_level(amplifier, thermal.ONE_EIGHTH)
    if not thermal.stands_free(amplifier):
        return np.maximum(
            thermal.sink_temperature(amplifier, quiet), thermal.sink_temperature(amplifier, loud)
        )
    hot = [
        thermal.temperatures(amplifier, dissipated, side).junction
        for dissipated in (quiet, loud)
        for side in ("upper", "lower")
    ]
    return np.maximum.reduce(hot)
