"""A V-I limiter against the safe area, and the voltage at the terminals."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating, safe_area, thermal
from safeamp.checks.working.area import allowed
from safeamp.checks.working.chain import hotter_case
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import clipping
from safeamp.checks.working.register import working
from safeamp.physics.safe_area import Use, limiter_use
from safeamp.quantities import CURRENT, RATIO, VOLTAGE, Number

WORST = "by comparing both lines voltage by voltage, up to rail to rail"


@working("protection.short")
def write_short(paper: Paper, value: Number) -> None:
    """The limiter's line over the allowed current at the worst voltage."""
    amplifier = paper.amplifier
    points = amplifier.protection.vi_limiter
    if points is None:
        absent = "protection.vi_limiter" in amplifier.absent
        why = 'protection.vi_limiter is "none"' if absent else "protection.vi_limiter is not given"
        paper.taken("u", "nothing is compared", None, RATIO, why)
        return
    uses = {side: _use(paper, side) for side in safe_area.sides_to_judge(amplifier)}
    side = max(uses, key=lambda one: float(np.asarray(uses[one].use).flat[0]))
    worst = uses[side]
    for place, (volts, amperes) in enumerate(points, 1):
        paper.taken(
            f"V_acts{place}", f"point {place} of the limiter", volts, VOLTAGE, "protection.vi_limiter"
        )
        paper.taken(f"I_acts{place}", "at a current of", amperes, CURRENT, "protection.vi_limiter")
    paper.found(
        "V", "device voltage at which it lets through most of what is allowed", worst.voltage, VOLTAGE, WORST
    )
    _on_the_line(paper, points, worst)
    limit = allowed(paper, side, hotter_case(paper, side, thermal.ONE_THIRD))
    paper.put("u", "what the limiter lets through over what the safe area allows", f"I / {limit}", value)


def _on_the_line(paper: Paper, points: tuple[tuple[Number, Number], ...], worst: Use) -> None:
    """Write down the current at which the limiter acts, between the two points around the voltage."""
    volts = [float(np.asarray(at).flat[0]) for at, _ in points]
    after = int(np.searchsorted(volts, paper.value("V")))
    if after in (0, len(volts)):
        end = min(after + 1, len(volts))
        paper.put(
            "I", "current at which it acts: that of the nearest point", f"I_acts{end}", worst.current, CURRENT
        )
        return
    one, other = after, after + 1
    share = f"(V - V_acts{one}) / (V_acts{other} - V_acts{one})"
    formula = f"I_acts{one} + (I_acts{other} - I_acts{one}) * {share}"
    paper.put("I", "current at which it acts, between the points", formula, worst.current, CURRENT)


def _use(paper: Paper, side: str) -> Use:
    amplifier = paper.amplifier
    rail = operating.no_load_rail(amplifier)
    return limiter_use(
        points=amplifier.protection.vi_limiter or (),
        case_temperature=thermal.hotter_case(amplifier, side, thermal.ONE_THIRD),
        rating=safe_area.rating_of(amplifier, side),
        highest_voltage=rail if operating.is_single(amplifier) else 2.0 * rail,
    )


@working("touch.voltage")
def write_voltage(paper: Paper, value: Number) -> None:
    """Clipped peak over the square root of two."""
    both = "2 * " if paper.amplifier.stage.bridged else ""
    words = "rms at clipping" + (", between the two outputs of the bridge" if both else "")
    paper.put("V", words, f"{both}{clipping(paper)} / sqrt(2)", value, VOLTAGE)
