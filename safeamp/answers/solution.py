"""The answer to "at which values of one key?"."""

from __future__ import annotations

from dataclasses import dataclass

from safeamp.findings import Finding, Verdict
from safeamp.quantities import Kind


@dataclass(frozen=True, kw_only=True)
class Edge:
    """One end of an interval in which a value holds, rounded to the inside and judged in full.

    Parameters
    ----------
    value : float
        The last value that holds; `written` is what stands in the sheet for it.
    beyond : float
        A value past the end that does not hold.
    binds : tuple of Finding
        What no longer holds there, with its worst corner; empty where the sheet itself refuses: `refused` says why.
    verdict : Verdict
        The word of the whole sheet at `value`.
    preferred : float or None
        The next value that can be bought, inside the interval and judged in full; `series` names where it is from.
    """

    value: float
    written: str
    beyond: float
    verdict: Verdict
    binds: tuple[Finding, ...] = ()
    refused: str = ""
    preferred: float | None = None
    series: str = ""


@dataclass(frozen=True)
class Interval:
    """Values that hold; an end of None means that the believable range ends first."""

    smallest: Edge | None
    largest: Edge | None


@dataclass(frozen=True)
class Forbidding:
    """A finding that keeps every value from holding, as it is at one of them; where it holds alone, if anywhere."""

    finding: Finding
    at: float
    holds: tuple[float, float] | None = None


@dataclass(frozen=True, kw_only=True)
class Solution:
    """At which values of one key the chosen findings hold.

    Parameters
    ----------
    findings : tuple of str
        What was asked for; empty where no finding reads the key.
    span : (float, float)
        The believable range, which was searched.
    now : float or None
        What the sheet has, and whether that holds; `written` is false where it stands for what nobody wrote.
    items : int
        How many items of a list move together, in proportion; the values are those of the largest.
    refused : int
        How many of the values tried the sheet cannot have; `refusal` is the commonest reason, at one of them.
    intervals : tuple of Interval
        From the lowest up; empty where no value will do: `forbidden` says why.
    otherwise : Solution or None
        Where some findings hold at no value: the answer for the others.
    """

    title: str
    key: str
    kind: Kind
    until: Verdict
    findings: tuple[str, ...]
    span: tuple[float, float]
    now: float | None = None
    now_holds: bool = False
    written: bool = True
    items: int = 1
    tried: int = 0
    refused: int = 0
    refusal: str = ""
    intervals: tuple[Interval, ...] = ()
    forbidden: tuple[Forbidding, ...] = ()
    otherwise: Solution | None = None
    on_paper: bool = False
    source: str = ""
    digest: str = ""

    @property
    def outcome(self) -> str:
        """One word: unread, none, any, bounded."""
        if not self.findings:
            return "unread"
        if not self.intervals:
            return "none"
        edges = [edge for one in self.intervals for edge in (one.smallest, one.largest) if edge is not None]
        return "bounded" if edges else "any"
