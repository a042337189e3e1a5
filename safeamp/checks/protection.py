"""What limits the current into a short-circuited output."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks.registry import finding
from safeamp.checks.trace import miss
from safeamp.findings import Measure, Step, Verdict
from safeamp.limits import Limits
from safeamp.quantities import RATIO


@finding("protection.short", Step.HAND_OVER, RATIO)
def check_short(amplifier: Amplifier, limits: Limits) -> Measure:
    """What limits a short-circuited output; the limiter's points are not assessed yet."""
    following = "never short the output; a V-I limiter's points belong in protection.vi_limiter"
    if "protection.vi_limiter" in amplifier.absent:
        return Measure(
            np.nan,
            "nothing limits a short-circuited output but the rail fuses",
            word=Verdict.CAUTION,
            next=following,
        )
    if amplifier.protection.vi_limiter is None:
        miss(amplifier, "protection.vi_limiter")
        return Measure(np.nan, "what limits a short-circuited output is not given", next=following)
    return Measure(
        np.nan, "the V-I limiter is not assessed by this version", word=Verdict.UNVERIFIED, next=following
    )
