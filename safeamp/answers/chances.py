"""The answer to "how likely, and which unknown matters most?"."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from safeamp.amplifier import Entry
from safeamp.findings import Step, Verdict
from safeamp.quantities import Kind

if TYPE_CHECKING:
    from pandas import DataFrame


@dataclass(frozen=True)
class Chance:
    """Share of the samples, with its 95 % interval; both ends equal it where every sample must agree."""

    share: float
    low: float
    high: float


@dataclass(frozen=True)
class Histogram:
    """Numbers of samples in bins of one width from `low` up, and of those outside them or without bound."""

    low: float
    width: float
    counts: tuple[int, ...]
    outside: int = 0


@dataclass(frozen=True, kw_only=True)
class FindingChances:
    """How likely each word of a finding is, where its value lies, and what moves it.

    Parameters
    ----------
    sampled : bool
        False where nothing that varies is read: the word is the same in every sample.
    quantiles : mapping of float to float
        Share -> value that this share does not exceed, in the unit of `kind`, right to `resolution`; infinite where
        that many samples are without bound.
    histogram : Histogram or None
        Where the values lie, in the unit of `kind`; None where they do not vary.
    unknown : int
        Samples without a value.
    shares : mapping of str to float
        Key path -> its part of the variance of the value, largest first; together `linear`, the part that a
        straight line explains (None where nothing could be fitted).
    """

    id: str
    step: Step
    kind: Kind
    words: Mapping[Verdict, Chance]
    sampled: bool
    quantiles: Mapping[float, float] = field(default_factory=dict)
    resolution: float | None = None
    histogram: Histogram | None = None
    unknown: int = 0
    shares: Mapping[str, float] = field(default_factory=dict)
    linear: float | None = None


@dataclass(frozen=True)
class StepChances:
    """How likely each word of a step is, and that it clears the step; `sampled` as for a finding."""

    step: Step
    words: Mapping[Verdict, Chance]
    cleared: Chance
    sampled: bool


@dataclass(frozen=True, kw_only=True)
class Tolerance:
    """Chances over random samples inside the tolerances.

    Parameters
    ----------
    varied : tuple of Entry
        What was drawn at random.
    steps : tuple of StepChances
        Steps with a finding, in their order.
    every_step : StepChances or None
        All steps at once, under the last of them; None when nothing was judged.
    measure_next : tuple of (str, float)
        Key path -> weight, largest first, together 1: shares of the variance, each finding weighted by how uncertain
        it is that it clears its step. Without what no reading can narrow.
    """

    title: str
    samples: int
    seed: int
    distribution: str
    interval: str
    method: str
    varied: tuple[Entry, ...]
    findings: tuple[FindingChances, ...]
    steps: tuple[StepChances, ...]
    every_step: StepChances | None
    measure_next: tuple[tuple[str, float], ...]
    source: str = ""
    digest: str = ""

    def frame(self) -> DataFrame:
        """Return one row a finding: chances with their intervals, quantiles, shares of the variance by key."""
        from pandas import DataFrame

        return DataFrame(self.rows()).set_index("id") if self.findings else DataFrame()

    def rows(self) -> list[dict[str, object]]:
        """Return the rows of `frame` as mappings from column to value."""
        return [_row(finding) for finding in self.findings]


def _row(finding: FindingChances) -> dict[str, object]:
    row: dict[str, object] = {"id": finding.id, "step": finding.step.value, "sampled": finding.sampled}
    for word, chance in finding.words.items():
        row |= {word.word: chance.share, f"{word.word} low": chance.low, f"{word.word} high": chance.high}
    row |= {"unit": finding.kind.unit, "unknown": finding.unknown, "resolution": finding.resolution}
    row |= {f"quantile {share:g}": value for share, value in finding.quantiles.items()}
    return row | {"linear": finding.linear} | {f"share {key}": share for key, share in finding.shares.items()}
