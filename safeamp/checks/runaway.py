"""Thermal feedback of the idle current."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks.registry import finding
from safeamp.findings import Measure, Step, Verdict
from safeamp.limits import Limits
from safeamp.quantities import RATIO


@finding("bias.runaway", Step.BIAS, RATIO)
def check_runaway(amplifier: Amplifier, limits: Limits) -> Measure:
    """Loop index of the thermal feedback: not assessed by this version."""
    return Measure(
        np.nan,
        "thermal runaway is not assessed by this version",
        word=Verdict.UNVERIFIED,
        next="watch the idle current for 40 minutes with the lid on; if it still rises, switch off",
    )
