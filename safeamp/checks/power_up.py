"""First power-up behind a limiter: draw, rails, output."""

from __future__ import annotations

from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.registry import finding
from safeamp.checks.trace import aside, miss, needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import lamp, power_up
from safeamp.quantities import PERCENT, POWER, RATIO, VOLTAGE, Number, show


@finding("power_up.draw", Step.FIRST_POWER_UP, RATIO, at_bench=True)
def check_draw(amplifier: Amplifier, limits: Limits) -> Measure:
    """State of the limiter after the first flash, in rising order of alarm."""
    state = amplifier.readings.limiter_state
    following = "a lamp flashes once while the reservoirs charge; if it stays bright or brightens, switch off"
    if state is None:
        miss(amplifier, "readings.limiter_state")
        return Measure(np.nan, "the state of the limiter is not given", next=following)
    needed(amplifier, "readings.limiter_rails")  # dark is a lamp that has blown, too: the rails tell it
    return Measure(
        limits["power_up.draw"].extra[state],
        f"the limiter is {state} after the first flash",
        next=following,
        remarks=(*_powered_remarks(amplifier, limits), *_size_remarks(amplifier, limits)),
        needs=_missing_for_the_size(amplifier),
    )


@finding("power_up.rails", Step.FIRST_POWER_UP, RATIO, at_bench=True)
def check_rails(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Difference of the rails over their mean."""
    if operating.is_single(amplifier):
        return NotApplicable('supply.rails is "single"')
    (rails,) = needed(amplifier, "readings.limiter_rails")
    following = "read both rails on the limiter, with the sign of each, and enter the two as a list"
    if not isinstance(rails, tuple):
        return Measure(np.nan, "the rails on the limiter are not given", next=following)
    one, other = rails[0], rails[-1]
    value = np.abs(one - other) / ((one + other) / 2.0)
    return Measure(
        value,
        f"rails {text(one, VOLTAGE)} and {text(other, VOLTAGE)} on the limiter, {text(value, PERCENT)} apart",
        next=following,
        remarks=_powered_remarks(amplifier, limits),
        word=_word_of_a_ratio(amplifier, limits),
        method="difference over mean",
    )


@finding("power_up.output", Step.FIRST_POWER_UP, VOLTAGE, at_bench=True)
def check_output(amplifier: Amplifier, limits: Limits) -> Measure:
    """Output volts on the limiter (split), or midpoint error (single)."""
    (output,) = needed(amplifier, "readings.limiter_output")
    if operating.is_single(amplifier):
        return _midpoint(amplifier, output, limits)
    needed(amplifier, "readings.limiter_rails")  # without a rail every output reads 0 V
    return Measure(
        np.abs(output),
        f"{text(output, VOLTAGE)} at the output on the limiter",
        next="a volt or more at the output means a stage stuck at a rail: switch off",
        remarks=_powered_remarks(amplifier, limits),
        method="magnitude of the reading",
    )


def _midpoint(amplifier: Amplifier, output: Number, limits: Limits) -> Measure:
    (rails,) = needed(amplifier, "readings.limiter_rails")
    rail = reduce(np.maximum, rails) if isinstance(rails, tuple) else rails
    bounds = limits["power_up.output.midpoint"]
    return Measure(
        np.abs(output - rail / 2.0) / (rail / 2.0),
        f"{text(output, VOLTAGE)} at the midpoint on a rail of {text(rail, VOLTAGE)}",
        go=bounds.go,
        stop=bounds.stop if not isinstance(bounds.stop, tuple) else None,
        kind=RATIO,
        next="read the midpoint and the rail behind the limiter; they must stand near two to one",
        remarks=_powered_remarks(amplifier, limits),
        word=_word_of_a_ratio(amplifier, limits),
        method="departure from half the rail, over half the rail",
    )


def _read(amplifier: Amplifier) -> float:
    """Return the larger rail on the limiter, V; nan where none was read."""
    rails = aside(amplifier).readings.limiter_rails
    return max(map(nominal, rails)) if rails else float("nan")


def _expected(amplifier: Amplifier, limits: Limits) -> tuple[float, float]:
    """Return the rail without load at the mains of today and at its highest, V.

    Where the mains is not given the rail stands as it was read, and what a public supply may rise to above it: that
    is near enough to tell a rail from none, and from one that cannot be.
    """
    whole = aside(amplifier)
    rail = max(map(nominal, operating.rails_as_read(whole)))
    today, highest = (nominal(operating.mains_factor(whole, at)) for at in ("mains.present", "mains.highest"))
    rise = limits.default("mains.present").high
    return rail * (1.0 if np.isnan(today) else today), rail * (rise if np.isnan(highest) else highest)


def _hardly_any(amplifier: Amplifier, limits: Limits) -> bool:
    """Whether so little of the rail came up that nothing was tested."""
    least = limits["power_up.rails"].extra["nothing_below"] * _expected(amplifier, limits)[0]
    return _read(amplifier) < least * (1.0 - 1e-9)


def _word_of_a_ratio(amplifier: Amplifier, limits: Limits) -> Verdict | None:
    """Return the word of a ratio of readings: near 0 V it is noise, and a stop by it as little worth as a go."""
    return Verdict.UNVERIFIED if _hardly_any(amplifier, limits) else None


def _powered_remarks(amplifier: Amplifier, limits: Limits) -> tuple[Remark, ...]:
    """Return what keeps all readings on the limiter from being judged: no rail, or one that cannot be."""
    read, (today, highest) = _read(amplifier), _expected(amplifier, limits)
    said = f"{show(read, VOLTAGE)} on the limiter"
    if _hardly_any(amplifier, limits):
        because = (
            f"hardly any rail: nothing was tested; {said} where {show(today, VOLTAGE)} is expected without it: "
            "look for a blown lamp or fuse, a switch that is off, or too small a lamp"
        )
        return (Remark(Verdict.UNVERIFIED, because),)
    if read > limits["power_up.rails"].extra["contradicts_above"] * highest * (1.0 + 1e-9):
        most = f"at most {show(highest, VOLTAGE)} at the highest mains"
        because = f"{said} contradicts supply.no_load, {most}: read both again"
        return (Remark(Verdict.UNVERIFIED, because),)
    return ()


def _size_remarks(amplifier: Amplifier, limits: Limits) -> tuple[Remark, ...]:
    """Return what keeps the draw at caution: a limiter that lets a fault draw too much, or nobody knows how much."""
    limiter, most = amplifier.readings.limiter, _most_of_a_fault(amplifier, limits)
    if limiter is None or np.isnan(most):
        missing = _missing_for_the_size(amplifier)[0]
        because = f"{missing} is not given: how much a fault could have drawn is not known"
        return (Remark(Verdict.CAUTION, because),)
    if most <= limits["power_up.draw"].extra["fault_power_caution_above"] * (1.0 + 1e-9):
        return ()
    better = "a lamp of 60 W to 100 W" if limiter.kind == "lamp" else "a resistor of more ohms, or a lamp,"
    because = (
        f"{limiter.text} lets a fault draw up to {show(most, POWER)}: {better} limits, this one hardly does"
    )
    return (Remark(Verdict.CAUTION, because),)


def _most_of_a_fault(amplifier: Amplifier, limits: Limits) -> float:
    """Return the most heat, W, that a fault can draw through the limiter; nan where that is not known.

    A lamp and a resistor stand in the mains, a resistor before rails that the mains does not set in those; a bench
    supply limits by itself.
    """
    limiter = amplifier.readings.limiter
    if limiter is None:
        return float("nan")
    if limiter.value is None:
        return 0.0
    if limiter.kind == "lamp":
        return float(lamp.worst_fault_power(rated_power=limiter.value))
    mains = aside(amplifier).mains.nominal
    volts = _expected(amplifier, limits)[0] if operating.is_fixed(aside(amplifier)) else mains
    if volts is None:
        return float("nan")
    return float(power_up.most_through_resistor(mains=nominal(volts), resistance=limiter.value))


def _missing_for_the_size(amplifier: Amplifier) -> tuple[str, ...]:
    """Return which key would tell how much a fault can draw."""
    limiter = amplifier.readings.limiter
    if limiter is None:
        return ("readings.limiter",)
    in_mains = limiter.kind == "resistor" and not operating.is_fixed(aside(amplifier))
    return ("mains.nominal",) if in_mains and aside(amplifier).mains.nominal is None else ()
