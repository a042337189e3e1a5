"""What limits the current into a short-circuited output."""

from __future__ import annotations

from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, safe_area, thermal
from safeamp.checks.registry import finding
from safeamp.checks.trace import miss, needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Also, Measure, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics.safe_area import Use, limiter_reach, limiter_use
from safeamp.quantities import CURRENT, RATIO, VOLTAGE, Number

NEXT = "never short the output to try it; a V-I limiter's points belong in protection.vi_limiter"


@finding("protection.short", Step.HAND_OVER, RATIO)
def check_short(amplifier: Amplifier, limits: Limits) -> Measure:
    """What limits a short-circuited output: the V-I limiter's line against the safe area."""
    if "protection.vi_limiter" in amplifier.absent:
        return Measure(
            np.nan,
            "nothing limits a short-circuited output but the rail fuses",
            word=Verdict.CAUTION,
            next=NEXT,
        )
    if amplifier.protection.vi_limiter is None:
        miss(amplifier, "protection.vi_limiter")
        return Measure(np.nan, "what limits a short-circuited output is not given", next=NEXT)
    found = [_limiter(amplifier, side) for side in safe_area.sides_to_judge(amplifier)]
    use = reduce(np.maximum, [one.use for one in found])
    worst = max(found, key=lambda one: nominal(one.use))
    at = f"{text(worst.voltage, VOLTAGE)} and {text(worst.current, CURRENT)}"
    finite = np.isfinite(nominal(use))
    let = f"{nominal(use):.0%} of what the safe area allows" if finite else "current where none is allowed"
    return Measure(
        use,
        f"the V-I limiter lets through {let}, at {at}",
        remarks=safe_area.device_remarks(amplifier, limits),
        unknown=reduce(np.logical_or, [one.enters_unknown for one in found]),
        everywhere=True,
        also=_reach(amplifier),
        next="set the limiter so that its line stays inside the safe area at the hot case temperature",
        method="limiter line over allowed current up to rail to rail, at the case temperature of one third of power",
    )


def _limiter(amplifier: Amplifier, side: str) -> Use:
    return limiter_use(
        points=needed(amplifier, "protection.vi_limiter")[0],
        case_temperature=thermal.hotter_case(amplifier, side, thermal.ONE_THIRD),
        rating=safe_area.rating_of(amplifier, side),
        highest_voltage=_rail_to_rail(amplifier),
    )


def _rail_to_rail(amplifier: Amplifier) -> Number:
    rail = operating.no_load_rail(amplifier)
    return rail if operating.is_single(amplifier) else 2.0 * rail


def _reach(amplifier: Amplifier) -> tuple[Also, ...]:
    """Return what the loudspeaker asks for over where the limiter acts: above 1 it cuts into music."""
    angle = operating.phase_angle(amplifier)
    magnitude, turned = operating.nominal_load(amplifier, angle)
    side = operating.sides(amplifier)[0]
    asked = limiter_reach(
        points=needed(amplifier, "protection.vi_limiter")[0],
        half_supply=side.burst,
        peak=operating.peak_into(amplifier, side.burst, side.loss, magnitude),
        load_magnitude=magnitude,
        phase_angle=turned,
        conducting=operating.conducting(amplifier),
        emitter_resistor=needed(amplifier, "stage.emitter_resistor")[0],
        idle_current=operating.idle_current(amplifier),
        law=operating.law_of(side.device),
        transconductance_parameter=side.device.transconductance_parameter,
    )
    return (Also("what the loudspeaker asks for over where the limiter acts", nominal(asked), RATIO),)
