"""The register of workings: one function a finding, under the id of its check."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.answers import Working
from safeamp.checks import CHECKS
from safeamp.checks.working.paper import Paper
from safeamp.findings import Measure
from safeamp.limits import Limits
from safeamp.quantities import Number

#: Writes the lines down; the last one is the value of the finding, as the check has it.
Writer = Callable[[Paper, Number], None]

WORKINGS: dict[str, Writer] = {}


def working(identity: str) -> Callable[[Writer], Writer]:
    """Register how the value of a finding is written down."""

    def register(function: Writer) -> Writer:
        if identity in WORKINGS:
            raise ValueError(f"{identity} is worked out twice")
        WORKINGS[identity] = function
        return function

    return register


def working_of(
    identity: str, amplifier: Amplifier, limits: Limits, value: float | None = None
) -> Working | None:
    """Return how the nominal value of a finding comes about; None where the check has none for this amplifier.

    Parameters
    ----------
    value : float, optional
        The nominal value where a report has it already; the check is run once more where it is unknown or unbounded.

    Raises
    ------
    KeyError
        If there is no such finding.
    """
    check = CHECKS[identity]
    paper = Paper(amplifier, limits)
    with np.errstate(all="ignore"):
        try:
            if value is None:
                measure = check.run(amplifier, limits)
                if not isinstance(measure, Measure):
                    return None
                value = measure.value
            WORKINGS[identity](paper, value)
        except (ValueError, ArithmeticError) as problem:
            paper.taken("value", f"cannot be computed: {problem}", None, check.kind, "no further line")
    return Working(identity, tuple(paper.lines))
