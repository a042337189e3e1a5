"""The answer to "may I take the next step?"."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from safeamp.amplifier import Assumption
from safeamp.findings import Finding, Step, Verdict


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
    notes : str
        What the sheet says in words of its own.
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
    notes: str = ""
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
