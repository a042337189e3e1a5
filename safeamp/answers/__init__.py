"""What the studies return, one file a question."""

from safeamp.answers.chances import Chance, FindingChances, Histogram, StepChances, Tolerance
from safeamp.answers.overview import Overview, OverviewRow
from safeamp.answers.quick import Amount, Formula, PutIn, QuickAnswer
from safeamp.answers.report import NotApplying, Report, StepVerdict
from safeamp.answers.solution import Edge, Forbidding, Interval, Solution

__all__ = [
    "Amount",
    "Chance",
    "Edge",
    "FindingChances",
    "Forbidding",
    "Formula",
    "Histogram",
    "Interval",
    "NotApplying",
    "Overview",
    "OverviewRow",
    "PutIn",
    "QuickAnswer",
    "Report",
    "Solution",
    "StepChances",
    "StepVerdict",
    "Tolerance",
]
