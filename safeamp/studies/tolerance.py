"""How likely: the checks at many random samples inside the tolerances."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass, field
from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier, Entry, Sheet, with_values
from safeamp.answers import Chance, FindingChances, StepChances, Tolerance
from safeamp.checks import CHECKS, Check
from safeamp.checks.judging import each_word, missing_word
from safeamp.checks.words import nominal
from safeamp.findings import Measure, Step, Verdict
from safeamp.limits import Limits
from safeamp.studies import corners, tallies
from safeamp.studies.findings import Bench, again, look
from safeamp.studies.sampling import DESCRIPTIONS, Distribution, Sampler
from safeamp.studies.tallies import Batch, Histogram, LinearTally, Values, Words, WordTally

#: Samples at a time, with the nominal case a power of two: with a dozen inputs some 14 MiB are held at once.
BATCH = 16383
FEWEST = 100
SHARES = (0.05, 0.5, 0.95)
METHOD = (
    "squared standardized regression coefficients: each input's part of the variance along a straight line"
)
#: What varies by itself, so that no reading narrows it.
NOT_READABLE = ("mains.present",)


@dataclass
class _Subject:
    """One finding: its check, its nominal measure, what varies in it, and what is kept of the samples."""

    check: Check
    measure: Measure
    missing: bool
    columns: tuple[int, ...]
    line: LinearTally
    words: WordTally = field(default_factory=WordTally)
    histogram: Histogram = field(default_factory=Histogram)
    unknown: int = 0

    @property
    def sampled(self) -> bool:
        """Whether the samples can differ."""
        return bool(self.columns) and not self.missing and self.measure.word is None

    def add(self, values: Values, words: Words, batch: Batch) -> None:
        """Take in what some samples gave."""
        self.words.add(words)
        self.histogram.add(values)
        self.unknown += int(np.isnan(values).sum())
        self.line.add(batch, values)


@dataclass
class _Stage:
    """The worst word of some findings: first of those that never differ, then of each sample."""

    step: Step
    floor: Verdict
    sampled: bool
    tally: WordTally = field(default_factory=WordTally)

    def add(self, words: list[Words]) -> None:
        """Take in the words of the findings that differ."""
        if self.sampled:
            self.tally.add(reduce(np.maximum, words, np.asarray(int(self.floor))))

    @property
    def chances(self) -> StepChances:
        """What is known in the end."""
        if self.sampled:
            return StepChances(self.step, self.tally.chances, self.tally.cleared, sampled=True)
        clears = float(self.floor.clears)
        return StepChances(
            self.step, tallies.certain(self.floor), Chance(clears, clears, clears), sampled=False
        )


def tolerance(
    sheet: Sheet,
    limits: Limits,
    *,
    samples: int = 100_000,
    seed: int = 1,
    distribution: Distribution = "uniform",
    progress: Callable[[int], None] | None = None,
) -> Tolerance:
    """Return how likely each word of each finding is, and which unknown matters most.

    Each sample is judged as if it were the nominal amplifier: by its own value, with all that holds the finding back
    whatever its value. Inputs are drawn independently of each other.

    Parameters
    ----------
    sheet : Sheet
        As read.
    limits : Limits
        What the findings are judged by.
    samples : int
        At least 100.
    seed : int
        Not negative; the same seed draws the same samples.
    distribution : {"uniform", "normal"}
        How the values lie inside their tolerances.
    progress : callable, optional
        Called with the number of samples done since the last call.

    Raises
    ------
    ValueError
        If there are too few samples, the seed is negative, or the distribution has another name.

    References
    ----------
    Sensitivities: A. Saltelli et al., Global Sensitivity Analysis: The Primer, Wiley, 2008; memory.
    """
    _refuse(samples, seed, distribution)
    bench = Bench(sheet, limits)
    subjects, varied = _subjects(bench)
    stages, whole = _stages(subjects, limits)
    sampler = Sampler.of(varied, distribution, seed)
    for start in range(0, samples if varied else 0, BATCH):
        count = min(BATCH, samples - start)
        _sample(subjects, (*stages, *whole), sampler, count, bench)
        if progress is not None:
            progress(count)
    return _answer(bench, subjects, stages, whole, sampler, samples, seed)


def _refuse(samples: int, seed: int, distribution: str) -> None:
    if samples < FEWEST:
        raise ValueError(f"samples must be at least {FEWEST}, got {samples}")
    if seed < 0:
        raise ValueError(f"seed must be zero or more, got {seed}")
    if distribution not in DESCRIPTIONS:
        raise ValueError(f"distribution must be uniform or normal, got {distribution}")


def _subjects(bench: Bench) -> tuple[tuple[_Subject, ...], tuple[Entry, ...]]:
    """Return every finding that applies, and the inputs that at least one of them reads and that vary."""
    looked = []
    for check in CHECKS.values():
        measure, trace = look(check, bench)
        if isinstance(measure, Measure):
            settled = bool(trace.missing) or measure.word is not None
            read = () if settled else corners.read_by(bench.sheet.entries.values(), trace.reads)
            looked.append((check, measure, bool(trace.missing), read))
    varied = tuple({entry.path: entry for *_, read in looked for entry in read}.values())
    places = {entry.path: place for place, entry in enumerate(varied)}
    subjects = tuple(
        _Subject(
            check,
            measure,
            missing,
            tuple(places[entry.path] for entry in read),
            LinearTally(len(varied), nominal(measure.value)),
        )
        for check, measure, missing, read in looked
    )
    return tuple(sorted(subjects, key=lambda subject: subject.check.step.place)), varied


def _settled_word(subject: _Subject, limits: Limits) -> Verdict:
    """Return the word of a finding that is the same in every sample."""
    limit = limits[subject.check.id]
    if subject.missing:
        return missing_word(subject.measure, limit)
    return Verdict(int(each_word(subject.measure, limit, 1)[0]))


def _stages(subjects: tuple[_Subject, ...], limits: Limits) -> tuple[tuple[_Stage, ...], tuple[_Stage, ...]]:
    """Return a stage for each step with findings, and one for all of them."""
    steps = [step for step in Step if any(subject.check.step is step for subject in subjects)]
    of_step = {step: [one for one in subjects if one.check.step is step] for step in steps}
    stages = tuple(_stage(step, found, limits) for step, found in of_step.items())
    return stages, tuple(_stage(step, subjects, limits) for step in steps[-1:])


def _stage(step: Step, subjects: Iterable[_Subject], limits: Limits) -> _Stage:
    found = list(subjects)
    settled = [_settled_word(one, limits) for one in found if not one.sampled]
    return _Stage(step, max(settled, default=Verdict.GO), any(one.sampled for one in found))


def _sample(
    subjects: tuple[_Subject, ...], stages: tuple[_Stage, ...], sampler: Sampler, count: int, bench: Bench
) -> None:
    """Draw some samples and take them in."""
    rows = sampler.draw(count)
    batch = Batch((rows - sampler.spread.nominal) / sampler.spread.width)
    amplifier = _moved(bench, sampler, rows)
    words: dict[str, Words] = {}
    for subject in subjects:
        if subject.sampled:
            values, words[subject.check.id] = _judged(subject, amplifier, rows, sampler, bench)
            subject.add(values, words[subject.check.id], batch)
    for stage in stages[:-1]:
        stage.add([words[one.check.id] for one in subjects if one.sampled and one.check.step is stage.step])
    stages[-1].add(list(words.values()))


def _moved(bench: Bench, sampler: Sampler, rows: Values) -> Amplifier:
    """Return the amplifier with the samples as cases; the first case is the nominal one, as everywhere."""
    cases = np.vstack([sampler.spread.nominal, rows])
    columns = {
        entry.path: np.ascontiguousarray(cases[:, place]) for place, entry in enumerate(sampler.entries)
    }
    return with_values(bench.sheet.amplifier, columns)


def _judged(
    subject: _Subject, amplifier: Amplifier, rows: Values, sampler: Sampler, bench: Bench
) -> tuple[Values, Words]:
    """Return value and word of each sample; one that cannot be computed must not hide the others."""
    found = again(subject.check, subject.measure, amplifier, bench)
    if found.word is None:
        cases = len(rows) + 1
        words = each_word(found, bench.limits[subject.check.id], cases)
        return np.broadcast_to(np.asarray(found.value, dtype=float), (cases,))[1:], words[1:]
    if len(rows) == 1:
        return np.array([np.nan]), np.array([int(Verdict.UNVERIFIED)])
    halves = np.array_split(rows, 2)
    parts = [_judged(subject, _moved(bench, sampler, half), half, sampler, bench) for half in halves]
    values, words_of = zip(*parts, strict=True)
    return np.concatenate(values), np.concatenate(words_of)


def _answer(
    bench: Bench,
    subjects: tuple[_Subject, ...],
    stages: tuple[_Stage, ...],
    whole: tuple[_Stage, ...],
    sampler: Sampler,
    samples: int,
    seed: int,
) -> Tolerance:
    deviations = sampler.deviations / sampler.spread.width
    findings = tuple(_chances(one, bench.limits, sampler.entries, deviations) for one in subjects)
    return Tolerance(
        title=bench.sheet.amplifier.title,
        samples=samples,
        seed=seed,
        distribution=DESCRIPTIONS[sampler.distribution],
        interval=tallies.INTERVAL,
        method=METHOD,
        varied=sampler.entries,
        findings=findings,
        steps=tuple(stage.chances for stage in stages),
        every_step=next((stage.chances for stage in whole), None),
        measure_next=_measure_next(findings),
        source=bench.sheet.source,
        digest=bench.sheet.digest,
    )


def _chances(
    subject: _Subject, limits: Limits, varied: tuple[Entry, ...], deviations: Values
) -> FindingChances:
    check, kind = subject.check, subject.measure.kind or subject.check.kind
    if not subject.sampled:
        word = _settled_word(subject, limits)
        return FindingChances(
            id=check.id, step=check.step, kind=kind, words=tallies.certain(word), sampled=False
        )
    fitted = subject.line.shares(subject.columns, deviations)
    shares = {} if fitted is None else dict(zip(subject.columns, fitted[0].tolist(), strict=True))
    quantiles = {share: subject.histogram.quantile(share) for share in SHARES}
    return FindingChances(
        id=check.id,
        step=check.step,
        kind=kind,
        words=subject.words.chances,
        sampled=True,
        quantiles={share: value for share, value in quantiles.items() if value is not None},
        resolution=subject.histogram.width,
        histogram=subject.histogram.bins,
        unknown=subject.unknown,
        shares={varied[place].path: share for place, share in sorted(shares.items(), key=lambda x: -x[1])},
        linear=None if fitted is None else fitted[1],
    )


def _measure_next(findings: tuple[FindingChances, ...]) -> tuple[tuple[str, float], ...]:
    """Return which input to narrow first: shares, weighted by the variance of "this finding clears its step"."""
    found: dict[str, float] = {}
    for one in findings:
        clears = sum(chance.share for word, chance in one.words.items() if word.clears)
        for path, share in one.shares.items():
            if path not in NOT_READABLE:
                found[path] = found.get(path, 0.0) + clears * (1.0 - clears) * share
    total = sum(found.values())
    ordered = sorted(found.items(), key=lambda item: -item[1])
    return tuple((path, weight / total) for path, weight in ordered if weight > 0.0)
