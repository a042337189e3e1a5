"""Idle current: level, sharing, balance, drift."""

from __future__ import annotations

from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.beside import plain
from safeamp.checks.registry import finding
from safeamp.checks.trace import miss, needed
from safeamp.checks.words import level, nominal, text
from safeamp.findings import Also, Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limit, Limits
from safeamp.physics import bias
from safeamp.quantities import CURRENT, POWER, RATIO, VOLTAGE, Number, Origin

#: Junctions from base to emitter, by kind of device.
JUNCTIONS = {"bipolar": 1.0, "darlington": 2.0}
NEXT_IDLE = (
    "read mV across ONE emitter resistor of each device, warm, input shorted, no load; enter each as a list"
)


def _measured(amplifier: Amplifier, path: str) -> bool:
    return amplifier.origin(path) in (Origin.MEASURED, Origin.EXAMPLE)


def _has_resistor(amplifier: Amplifier) -> bool:
    return "stage.emitter_resistor" not in amplifier.absent


def set_was_measured(amplifier: Amplifier) -> bool:
    """Whether `stage.idle` is a measured value."""
    return amplifier.stage.idle is not None and _measured(amplifier, "stage.idle")


def bench_idle(amplifier: Amplifier) -> Number:
    """Return the idle current of each device as read at the bench, A; noted as missing when nobody read it.

    Of readings and a measured `stage.idle` the larger counts, as for heat and safe area.
    """
    found, read = [], operating.read_idle(amplifier)
    if read is not None:
        found.append(operating.as_current(amplifier, read, "V"))
    if set_was_measured(amplifier):
        found.append(operating.as_current(amplifier, amplifier.stage.idle, amplifier.stage.idle_unit))
    if not found:
        miss(amplifier, "readings.idle_upper", "readings.idle_lower")
        return np.nan
    return reduce(np.maximum, found)


def _warm_idle(amplifier: Amplifier) -> Number:
    """Return the idle current as read warm, A: one that was set and read cold says nothing of a drift."""
    if amplifier.stage.idle_at != "cold":
        return bench_idle(amplifier)
    read = operating.read_idle(amplifier)
    if read is None:
        miss(amplifier, "readings.idle_upper", "readings.idle_lower")
        return np.nan
    return operating.as_current(amplifier, read, "V")


def _shown(amplifier: Amplifier, current: Number) -> Number:
    """Return a current as volts across one emitter resistor, or as it is where there is none."""
    return current * needed(amplifier, "stage.emitter_resistor")[0] if _has_resistor(amplifier) else current


def _is_class_ab_bipolar(amplifier: Amplifier, idle: Number, limits: Limits) -> bool:
    """Return whether junctions carry the idle current and let go within a cycle; an unknown idle may be either."""
    kinds = {operating.device_of(amplifier, side).kind for side in ("upper", "lower")}
    peak = operating.clipping_peak(amplifier) / operating.nominal_load(amplifier)[0]
    share = limits["bias.idle"].extra["class_ab_share_of_peak"]
    high = nominal(idle) >= share * nominal(peak) / nominal(operating.conducting(amplifier))
    return not high and kinds <= {"bipolar", "darlington"}


@finding("bias.idle", Step.BIAS, VOLTAGE, at_bench=True)
def check_idle(amplifier: Amplifier, limits: Limits) -> Measure:
    """V across one emitter resistor (A where there is none)."""
    idle = bench_idle(amplifier)
    go, stop, remarks = _idle_bounds(amplifier, idle, limits)
    value = _shown(amplifier, idle)
    return Measure(
        value,
        _idle_text(amplifier, idle, limits),
        go=go,
        stop=stop,
        without_stop=stop is None,
        remarks=remarks,
        also=_idle_also(amplifier, idle, limits),
        kind=VOLTAGE if _has_resistor(amplifier) else CURRENT,
        next=NEXT_IDLE,
        method="reading across one emitter resistor; the larger of both sides and of a measured stage.idle",
    )


def _idle_bounds(
    amplifier: Amplifier, idle: Number, limits: Limits
) -> tuple[Number | tuple[float, float] | None, Number | None, tuple[Remark, ...]]:
    extra, specified = limits["bias.idle"].extra, _specified(amplifier)
    if np.isnan(nominal(idle)):
        return None, None, ()
    class_ab = _is_class_ab_bipolar(amplifier, idle, limits) and _has_resistor(amplifier)
    stop = None if specified is None else extra["stop_times_specified"] * specified
    if class_ab:
        return limits["bias.idle"].go, stop, ()
    if specified is not None:
        return extra["go_times_specified"] * specified, stop, ()
    because = "class A, a MOSFET or no emitter resistor: only stage.idle_specified says what is right"
    return np.inf, None, (Remark(Verdict.CAUTION, because),)


def _specified(amplifier: Amplifier) -> Number | None:
    table = amplifier.stage
    if table.idle_specified is None:
        return None
    current = operating.as_current(amplifier, table.idle_specified, table.idle_specified_unit)
    return _shown(amplifier, current)


def _idle_text(amplifier: Amplifier, idle: Number, limits: Limits) -> str:
    if not _has_resistor(amplifier):
        return f"{text(idle, CURRENT)} of each device"
    drop = _shown(amplifier, idle)
    said = f"{text(drop, VOLTAGE)} across one emitter resistor is {text(idle, CURRENT)} of each device"
    if (
        _is_class_ab_bipolar(amplifier, idle, limits)
        and nominal(drop) < limits["bias.idle"].extra["dead_zone_below"]
    ):
        return f"{said}; so little leaves a dead zone around zero: crossover distortion, no danger"
    return said


def _idle_also(amplifier: Amplifier, idle: Number, limits: Limits) -> tuple[Also, ...]:
    half = operating.half(amplifier, operating.no_load_rail(amplifier))
    resistor = needed(amplifier, "stage.emitter_resistor")[0]
    found = [
        Also("current of each device", nominal(idle), CURRENT),
        Also("heat of each device without signal", nominal(idle * (half - idle * resistor)), POWER),
    ]
    if _has_resistor(amplifier) and _is_class_ab_bipolar(amplifier, idle, limits):
        best = bias.oliver_idle(emitter_resistor=resistor)
        found.append(Also("Oliver's optimum for this resistor", nominal(best), CURRENT))
    return tuple(found)


def _sides_read(amplifier: Amplifier) -> list[tuple[Number, ...]]:
    upper, lower = needed(amplifier, "readings.idle_upper", "readings.idle_lower")
    return [side for side in (upper, lower) if isinstance(side, tuple)]


@finding("bias.imbalance", Step.BIAS, RATIO, at_bench=True)
def check_imbalance(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Largest departure of one device from the mean of its group."""
    if nominal(needed(amplifier, "stage.pairs")[0]) == 1:
        if amplifier.origin("stage.pairs") is not Origin.ASSUMED:
            return NotApplicable("stage.pairs = 1")
        miss(amplifier, "stage.pairs")
    groups = _sides_read(amplifier)
    if len(groups) < 2:
        return Measure(np.nan, "how the parallel devices share is not given", next=NEXT_IDLE)
    means = [sum(group) / len(group) for group in groups]
    departures = [
        np.abs(one / mean - 1.0) for group, mean in zip(groups, means, strict=True) for one in group
    ]
    return Measure(
        reduce(np.maximum, departures),
        f"{len(groups[0])} devices a side, mean {text(means[0], VOLTAGE)} above and {text(means[1], VOLTAGE)} below",
        stop=_stop_unless_small(reduce(np.minimum, means), limits["bias.imbalance"]),
        also=_odd_device(amplifier, groups),
        next="compare each resistor's reading; the odd one out has another gain, or is open",
        method="largest departure from the mean of its group, over that mean",
    )


def _stop_unless_small(reading: Number, limit: Limit) -> Number:
    """Return the stop level of a ratio; none while the reading, V, is so small that the meter's own error rules."""
    return np.where(reading < limit.extra["small_reading_below"], np.inf, level(limit, "stop"))


def _odd_device(amplifier: Amplifier, groups: list[tuple[Number, ...]]) -> tuple[Also, ...]:
    """Return by how much the base-emitter voltage of the odd device would have to differ to carry what it does.

    A few tens of mV are the spread of a batch; more is another type, another temperature, or a bad joint.
    """
    whole, found = plain(amplifier), []
    if whole is None:
        return ()
    resistor = nominal(needed(whole, "stage.emitter_resistor")[0])
    for side, group in zip(("upper", "lower"), groups, strict=True):
        junctions = JUNCTIONS.get(str(operating.device_of(whole, side).kind))
        read = np.array([nominal(one) for one in group]) / resistor if resistor > 0.0 else np.zeros(1)
        if junctions is None or not np.all(read > 0.0):
            continue
        apart = bias.control_difference(
            current=read, mean=np.mean(read), emitter_resistor=resistor, junctions=junctions
        )
        found.append(float(apart[np.argmax(np.abs(apart))]))
    if not found:
        return ()
    return (Also("base-emitter voltage by which the odd device differs", max(found, key=abs), VOLTAGE),)


@finding("bias.balance", Step.BIAS, RATIO, at_bench=True)
def check_balance(amplifier: Amplifier, limits: Limits) -> Measure:
    """Upper sum against lower sum."""
    groups = _sides_read(amplifier)
    if len(groups) < 2:
        return Measure(np.nan, "upper and lower readings are not both given", next=NEXT_IDLE)
    upper, lower = sum(groups[0]), sum(groups[1])
    each = np.maximum(upper / len(groups[0]), lower / len(groups[1]))
    return Measure(
        np.abs(upper - lower) / ((upper + lower) / 2.0),
        f"upper side {text(upper, VOLTAGE)}, lower side {text(lower, VOLTAGE)} in sum",
        stop=_stop_unless_small(each, limits["bias.balance"]),
        next="a difference flows through the load, a driver or a leak: read the output's DC with it",
        method="difference of the sums over their mean",
    )


@finding("bias.drift", Step.BIAS, RATIO, at_bench=True)
def check_drift(amplifier: Amplifier, limits: Limits) -> Measure:
    """Idle warm over cold."""
    (cold,) = needed(amplifier, "readings.idle_cold")
    warm = _shown(amplifier, _warm_idle(amplifier))
    return Measure(
        warm / np.where(np.asarray(cold) > 0.0, cold, np.nan),
        f"idle {text(cold, VOLTAGE)} just after switch-on, {text(warm, VOLTAGE)} warm",
        stop=_stop_unless_small(warm, limits["bias.drift"]),
        next="read again after ten and twenty minutes; a reading that still rises after that is a fault: switch off",
        method="warm reading over cold reading",
    )
