"""Checks: an amplifier of cases and the limits in, measures out. They print nothing and judge nothing."""

from safeamp.checks import (
    bias,
    capacitor,
    cold,
    heat,
    loudspeaker,
    offset,
    power_up,
    protection,
    runaway,
    safe_area,
    stability,
    supply,
    touch,
)
from safeamp.checks.registry import CHECKS, Check

TOPICS = (
    bias,
    capacitor,
    cold,
    heat,
    loudspeaker,
    offset,
    power_up,
    protection,
    runaway,
    safe_area,
    stability,
    supply,
    touch,
)

__all__ = ["CHECKS", "TOPICS", "Check"]
