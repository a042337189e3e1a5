"""What the studies return, one file a question."""

from safeamp.answers.chances import Chance, FindingChances, Histogram, StepChances, Tolerance
from safeamp.answers.overview import Overview, OverviewRow
from safeamp.answers.plane import Path, Plane
from safeamp.answers.quick import Amount, Formula, PutIn, QuickAnswer
from safeamp.answers.report import NotApplying, Report, StepVerdict
from safeamp.answers.solution import Edge, Forbidding, Interval, Solution
from safeamp.answers.substitute import AtWork, Compared, LoadLine, Pair, Range, Ratings, Substitute
from safeamp.answers.working import Line, Working

__all__ = [
    "Amount",
    "AtWork",
    "Chance",
    "Compared",
    "Edge",
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
    "Plane",
    "PutIn",
    "QuickAnswer",
    "Range",
    "Ratings",
    "Report",
    "Solution",
    "StepChances",
    "StepVerdict",
    "Substitute",
    "Tolerance",
    "Working",
]
