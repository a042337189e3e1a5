"""What a report says, whatever it is printed on: each number and sentence worded once for all formats."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from safeamp._version import __version__
from safeamp.amplifier import Assumption, written_key
from safeamp.answers import Report, StepVerdict
from safeamp.findings import Bound, Finding, Input, Step, Verdict
from safeamp.quantities import RATIO, show
from safeamp.report.amounts import kind_of, limit_text, number_text
from safeamp.report.finding_text import details_of, way_out
from safeamp.report.safety import SAFETY

PAPER = "on paper: clears no power"
#: Internal share -> of what it is one; the key beside it is that of the value it stands for.
SHARES = {
    "supply.full_load_share": " of supply.no_load",
    "heatsink.fins_share": " of the computed rise",
    "loudspeaker.minimum_share": " of loudspeaker.nominal_impedance",
    "loudspeaker.power_share": " of loudspeaker.rated_power",
    "readings.midpoint_share": " of supply.no_load",
}
INVENTED = "Demonstration: this amplifier is invented; its readings clear nothing."


@dataclass(frozen=True)
class Note:
    """A head with its sentences."""

    head: str
    texts: tuple[str, ...]


@dataclass(frozen=True)
class StepLine:
    """One step: its word (None: nothing to judge), its name, and what else is to be said."""

    verdict: Verdict | None
    name: str
    note: str
    reached: bool


@dataclass(frozen=True)
class Given:
    """One value that a finding read, as text, with where it comes from."""

    key: str
    value: str
    origin: str


@dataclass(frozen=True)
class Entry:
    """One finding in words: what is always shown, and what may be folded away."""

    finding: Finding
    number: str
    limit: str
    source: str
    details: tuple[tuple[str, str], ...]
    inputs: tuple[Given, ...]


@dataclass(frozen=True)
class Section:
    """The findings of one step."""

    head: str
    entries: tuple[Entry, ...]


@dataclass(frozen=True)
class Page:
    """A whole report in words."""

    version: str
    title: str
    source: str
    digest: str
    demo: str
    verdict: Verdict
    scope: str
    decided: tuple[str, ...]
    steps: tuple[StepLine, ...]
    sections: tuple[Section, ...]
    notes: tuple[Note, ...]
    own_words: Note | None
    safety: tuple[str, ...]
    way_on: Note | None
    last: str

    @property
    def entries(self) -> tuple[Entry, ...]:
        """All findings in their order."""
        return tuple(entry for section in self.sections for entry in section.entries)

    @property
    def inputs(self) -> tuple[Given, ...]:
        """Every value that any finding read, once."""
        return tuple(dict.fromkeys(given for entry in self.entries for given in entry.inputs))


def page_of(report: Report) -> Page:
    """Return a report in words."""
    return Page(
        version=__version__,
        title=report.title,
        source=report.source,
        digest=report.digest,
        demo=INVENTED if report.demo else "",
        verdict=report.verdict,
        scope=what_for(report),
        decided=decided_by(report),
        steps=tuple(_step(entry, report) for entry in report.steps),
        sections=tuple(_sections(report)),
        notes=tuple(note for note in _notes(report) if note.texts),
        own_words=_own_words(report),
        safety=SAFETY,
        way_on=_way_on(report),
        last=_last(report),
    )


def what_for(report: Report) -> str:
    """Return what the verdict holds for; the scope alone only when every step was asked for."""
    text = f"{report.scope} (an invented amplifier)" if report.demo else report.scope
    if report.up_to is not None and report.up_to is not Step.HAND_OVER:
        text = f"the steps up to {report.up_to.value} and nothing after it ({text})"
    return f"{text}; {PAPER}" if report.on_paper and PAPER not in text else text


def asked(report: Report) -> list[Finding]:
    """Return the findings of the steps that were asked for."""
    steps = {entry.step for entry in report.asked}
    return [finding for finding in report.findings if finding.step in steps]


def decided_by(report: Report) -> tuple[str, ...]:
    """Return the ids of the findings whose word is the verdict; none of a go."""
    if report.verdict is Verdict.GO:
        return ()
    return tuple(item.id for item in asked(report) if item.verdict is report.verdict)


def _step(entry: StepVerdict, report: Report) -> StepLine:
    name = entry.step.value
    if entry.verdict is None:
        return StepLine(None, name, "nothing to judge", entry.reached)
    if not entry.reached:
        return StepLine(entry.verdict, name, f"its findings alone: {entry.verdict.word}", reached=False)
    first = entry == report.first_blocked
    return StepLine(entry.verdict, name, "the first step not cleared" if first else "", reached=True)


def _sections(report: Report) -> Iterator[Section]:
    for entry in report.steps:
        found = tuple(_entry(finding) for finding in report.findings if finding.step is entry.step)
        if found:
            mark = "" if entry.reached else " (not reached)"
            yield Section(entry.step.value.capitalize() + mark, found)


def _entry(finding: Finding) -> Entry:
    return Entry(
        finding,
        number_text(finding),
        limit_text(finding),
        source_text(finding.bound),
        tuple(details_of(finding)),
        tuple(dict.fromkeys(_given(item) for item in finding.inputs)),
    )


def source_text(bound: Bound | None) -> str:
    """Return where a limit comes from and how well it is known."""
    if bound is None:
        return ""
    known = "" if bound.evidence in bound.source else f" ({bound.evidence})"
    return f"{bound.source}{known}"


def _given(item: Input) -> Given:
    return Given(written_key(item.key), input_text(item), item.origin.value)


def input_text(item: Input) -> str:
    """Return a value that a finding read as text."""
    if isinstance(item.value, bool):
        return "true" if item.value else "false"
    if item.value is None or isinstance(item.value, str):
        return item.value or "not known"
    key = written_key(item.key)
    return show(item.value, kind_of(item.key, {key: item.unit}) or RATIO) + SHARES.get(item.key, "")


def _notes(report: Report) -> Iterator[Note]:
    inapplicable = (f"{entry.id}: {entry.because}" for entry in report.not_applicable)
    unassessed = (
        f"{key} is not assessed" + (f", which leaves unverified: {', '.join(ids)}" if ids else "")
        for key, ids in report.unassessed.items()
    )
    yield Note("Still to be read at the bench", report.still_to_read)
    yield Note("Does not apply", tuple(inapplicable))
    yield Note("Assumed, because the sheet does not say", tuple(map(assumed_text, report.assumptions)))
    yield Note("Remarks", (*report.remarks, *unassessed))
    yield Note("Limits changed by your own file", report.overridden)


def _own_words(report: Report) -> Note | None:
    """Return what the sheet notes, line by line; None where it notes nothing."""
    lines = tuple(line.strip() for line in report.notes.splitlines() if line.strip())
    return Note("Notes", lines) if lines else None


def assumed_text(assumption: Assumption) -> str:
    """Return a default that stepped in, with its reason."""
    return f"{assumption.key} = {assumption.value}: {assumption.why}"


def blocking(report: Report) -> list[Finding]:
    """Return the findings that hold the first step not cleared, the worst first."""
    first = report.first_blocked
    if first is None:
        return []
    found = [item for item in report.findings if item.step is first.step and not item.verdict.clears]
    return sorted(found, key=lambda item: -item.verdict)


def _way_on(report: Report) -> Note | None:
    first = report.first_blocked
    if first is None:
        held = [item for item in asked(report) if item.verdict is Verdict.CAUTION]
        texts = tuple(f"{item.id}: {'; '.join(item.because) or item.says}" for item in held)
        return Note("Cleared only with these cautions", texts) if texts else None
    texts = tuple(f"{item.id} ({item.verdict.word}): {way_out(item)}" for item in blocking(report))
    return Note(f"What clears the step {first.step.value}", texts)


def _last(report: Report) -> str:
    first = report.first_blocked
    if first is not None and first.verdict is not None:
        ids = ", ".join(item.id for item in blocking(report))
        return f"First step not cleared: {first.step.value} ({first.verdict.word}); to clear: {ids}"
    if not report.verdict.clears:
        return f"Nothing is cleared: {report.verdict.word} for {what_for(report)}"
    if report.on_paper:
        return f"On paper no step is held up, which clears no power: {what_for(report)}"
    with_care = " with the cautions above" if report.verdict is Verdict.CAUTION else ""
    return f"All steps cleared{with_care} for: {what_for(report)}"
