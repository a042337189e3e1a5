"""What the studies return: a report is the answer to "may I take the next step?"."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from safeamp.amplifier import Assumption, Entry
from safeamp.findings import Finding, Step, Verdict
from safeamp.quantities import Kind

if TYPE_CHECKING:
    from pandas import DataFrame


@dataclass(frozen=True)
class StepVerdict:
    """One step of the job with its worst finding; a verdict of None means nothing to judge."""

    step: Step
    verdict: Verdict | None
    reached: bool

    @property
    def holds(self) -> bool:
        """Whether this step keeps the next one from being taken."""
        return self.verdict is not None and not self.verdict.clears


@dataclass(frozen=True)
class NotApplying:
    """A finding that cannot apply to this amplifier, with the stated key that says so."""

    id: str
    because: str


@dataclass(frozen=True, kw_only=True)
class Report:
    """Every finding of one sheet, in the order of the steps, and what follows from them.

    Parameters
    ----------
    scope : str
        For what the verdict holds, such as "8 ohm loudspeaker, phase up to 45 deg, mains up to 253 V".
    still_to_read : tuple of str
        On paper: the ids of the findings that are read at the bench.
    up_to : Step or None
        The last step asked for; None asks for all.
    source, digest : str
        The file as the user named it, and the SHA-256 of its bytes.
    overridden : tuple of str
        The limit entries that a file of the user changed.
    unassessed : mapping of str to tuple of str
        Key that this version does not use -> ids of the findings it would change.

    Raises
    ------
    ValueError
        If the verdict is better than a step it speaks for, or clears while nothing was judged.
    """

    title: str
    scope: str
    verdict: Verdict
    steps: tuple[StepVerdict, ...]
    findings: tuple[Finding, ...]
    not_applicable: tuple[NotApplying, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    remarks: tuple[str, ...] = ()
    still_to_read: tuple[str, ...] = ()
    on_paper: bool = False
    demo: bool = False
    up_to: Step | None = None
    source: str = ""
    digest: str = ""
    overridden: tuple[str, ...] = ()
    unassessed: Mapping[str, tuple[str, ...]] = field(default_factory=dict)

    def __post_init__(self) -> None:
        judged = [entry.verdict for entry in self.asked if entry.verdict is not None]
        asked = {entry.step for entry in self.asked}
        judged += [finding.verdict for finding in self.findings if finding.step in asked]
        worst = max(judged, default=Verdict.UNVERIFIED)
        if self.verdict < worst:
            raise ValueError(
                f"the verdict {self.verdict.word} is better than what it stands on, {worst.word}"
            )

    @property
    def asked(self) -> tuple[StepVerdict, ...]:
        """The steps that verdict and exit status speak for."""
        if self.up_to is None:
            return self.steps
        return tuple(entry for entry in self.steps if entry.step.place <= self.up_to.place)

    @property
    def first_blocked(self) -> StepVerdict | None:
        """The first step, of those asked for, that is not cleared; None when all are."""
        return next((entry for entry in self.asked if entry.holds), None)

    @property
    def exit_status(self) -> int:
        """0 go, 3 caution, 4 unverified, 5 stop; the demo could answer and returns 0."""
        return 0 if self.demo else self.verdict.exit_status


@dataclass(frozen=True)
class Chance:
    """Share of the samples, with its 95 % interval; both ends equal it where every sample must agree."""

    share: float
    low: float
    high: float


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


@dataclass(frozen=True)
class PutIn:
    """A value that a quick answer was computed with; `why` is empty for one that the user gave."""

    option: str
    text: str
    why: str = ""


@dataclass(frozen=True)
class Amount:
    """One result of a quick answer, SI unit of its kind, with its ends when an input had a tolerance; or a word."""

    name: str
    value: float | str | None
    kind: Kind | None = None
    low: float | None = None
    high: float | None = None


@dataclass(frozen=True)
class Formula:
    """A formula in words, and with the numbers put in."""

    words: str
    numbers: str


@dataclass(frozen=True, kw_only=True)
class QuickAnswer:
    """What a quick answer without a sheet says.

    Parameters
    ----------
    holds_for : str
        For what a verdict holds: never more than what was put in.
    judged : tuple of Finding
        Everything among the results that has a limit; empty where nothing has.
    cautions : tuple of str
        What the numbers do not say.
    """

    command: str
    title: str
    put_in: tuple[PutIn, ...]
    results: tuple[Amount, ...]
    formulas: tuple[Formula, ...]
    holds_for: str = ""
    judged: tuple[Finding, ...] = ()
    cautions: tuple[str, ...] = ()

    @property
    def verdict(self) -> Verdict | None:
        """The worst word; None where nothing was judged."""
        return max((finding.verdict for finding in self.judged), default=None)

    @property
    def exit_status(self) -> int:
        """0 go or nothing to judge, 3 caution, 4 unverified, 5 stop."""
        return 0 if self.verdict is None else self.verdict.exit_status
