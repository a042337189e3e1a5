"""First power-up behind a limiter: draw, rails, output."""

from __future__ import annotations

from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.registry import finding
from safeamp.checks.trace import miss, needed
from safeamp.checks.words import text
from safeamp.findings import Measure, NotApplicable, Step
from safeamp.limits import Limits
from safeamp.quantities import PERCENT, RATIO, VOLTAGE, Number


@finding("power_up.draw", Step.FIRST_POWER_UP, RATIO, at_bench=True)
def check_draw(amplifier: Amplifier, limits: Limits) -> Measure:
    """State of the limiter after the first flash, in rising order of alarm."""
    state = amplifier.readings.limiter_state
    following = "a lamp flashes once while the reservoirs charge; if it stays bright or brightens, switch off"
    if state is None:
        miss(amplifier, "readings.limiter_state")
        return Measure(np.nan, "the state of the limiter is not given", next=following)
    return Measure(
        limits["power_up.draw"].extra[state], f"the limiter is {state} after the first flash", next=following
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
        method="difference over mean",
    )


@finding("power_up.output", Step.FIRST_POWER_UP, VOLTAGE, at_bench=True)
def check_output(amplifier: Amplifier, limits: Limits) -> Measure:
    """Output volts on the limiter (split), or midpoint error (single)."""
    (output,) = needed(amplifier, "readings.limiter_output")
    if operating.is_single(amplifier):
        return _midpoint(amplifier, output, limits)
    return Measure(
        np.abs(output),
        f"{text(output, VOLTAGE)} at the output on the limiter",
        next="a volt or more at the output means a stage stuck at a rail: switch off",
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
        method="departure from half the rail, over half the rail",
    )
