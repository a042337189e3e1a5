"""What the studies return, one file a question; a file is imported by the first use of one of its names."""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from safeamp.answers.chances import Chance, FindingChances, Histogram, StepChances, Tolerance
    from safeamp.answers.overview import Overview, OverviewRow
    from safeamp.answers.plane import Path, Plane
    from safeamp.answers.power_up import (
        Choice,
        Expected,
        Extent,
        Pattern,
        PowerUp,
        SeriesLimiter,
        State,
        SwitchOff,
    )
    from safeamp.answers.quick import Amount, Bass, Formula, PutIn, QuickAnswer
    from safeamp.answers.report import NotApplying, Report, StepVerdict
    from safeamp.answers.solution import Edge, Forbidding, Interval, Solution
    from safeamp.answers.substitute import AtWork, Compared, LoadLine, Pair, Range, Ratings, Substitute
    from safeamp.answers.working import Line, Working

__all__ = [
    "Amount",
    "AtWork",
    "Bass",
    "Chance",
    "Choice",
    "Compared",
    "Edge",
    "Expected",
    "Extent",
    "FindingChances",
    "Forbidding",
    "Formula",
    "Histogram",
    "Interval",
    "Line",
    "LoadLine",
    "NotApplying",
    "Overview",
    "OverviewRow",
    "Pair",
    "Path",
    "Pattern",
    "Plane",
    "PowerUp",
    "PutIn",
    "QuickAnswer",
    "Range",
    "Ratings",
    "Report",
    "SeriesLimiter",
    "Solution",
    "State",
    "StepChances",
    "StepVerdict",
    "Substitute",
    "SwitchOff",
    "Tolerance",
    "Working",
]

_FILES = {
    "chances": ("Chance", "FindingChances", "Histogram", "StepChances", "Tolerance"),
    "overview": ("Overview", "OverviewRow"),
    "plane": ("Path", "Plane"),
    "power_up": (
        "Choice",
        "Expected",
        "Extent",
        "Pattern",
        "PowerUp",
        "SeriesLimiter",
        "State",
        "SwitchOff",
    ),
    "quick": ("Amount", "Bass", "Formula", "PutIn", "QuickAnswer"),
    "report": ("NotApplying", "Report", "StepVerdict"),
    "solution": ("Edge", "Forbidding", "Interval", "Solution"),
    "substitute": ("AtWork", "Compared", "LoadLine", "Pair", "Range", "Ratings", "Substitute"),
    "working": ("Line", "Working"),
}


def __getattr__(name: str) -> Any:
    for file, names in _FILES.items():
        if name in names:
            return getattr(import_module(f"{__name__}.{file}"), name)
    raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
