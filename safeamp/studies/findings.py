"""Run one check at the nominal amplifier and at its corners, and judge it."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field, replace

import numpy as np

from safeamp.amplifier import Amplifier, Curve, Entry, Fuse, Limiter, Sheet, value_at, written_key
from safeamp.checks import Check
from safeamp.checks.judging import Cases, Judgement, badness, bounds_of, judge, missing_word, nominal_bound
from safeamp.checks.rails import rail_remarks
from safeamp.checks.trace import Trace, watched
from safeamp.findings import Bound, Finding, Input, Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limit, Limits
from safeamp.quantities import Kind, Origin, show
from safeamp.studies import corners
from safeamp.studies.corners import Design

#: Keys without which no rail is known at the mains of today.
MAINS = frozenset({"mains.actual", "mains.highest", "supply.at_mains"})

#: Origins of a value that nobody read at the bench.
NOT_READ = (Origin.GUESS, Origin.MANUAL, Origin.DATA_SHEET)

#: What stands beside the readings and is printed on a part.
NO_READING = ("readings.limiter", "readings.capacitor_leakage_resistor")

#: In which unit a value was written: no key of the sheet, and said by the unit of the value itself.
UNITS = ("stage.idle_unit", "stage.idle_specified_unit")


@dataclass
class Bench:
    """A sheet under judgement: the sheet, the limits, and designs that findings share."""

    sheet: Sheet
    limits: Limits
    demo: bool = False
    designs: dict[tuple[str, ...], tuple[Design, Amplifier]] = field(default_factory=dict)

    def cases(self, entries: tuple[Entry, ...]) -> tuple[Design, Amplifier]:
        """Return the complete design of some entries with its amplifier of cases, made once."""
        key = tuple(entry.path for entry in entries)
        if key not in self.designs:
            design = corners.complete_design(entries)
            self.designs[key] = (design, design.applied_to(self.sheet.amplifier))
        return self.designs[key]


def find(check: Check, bench: Bench) -> Finding | NotApplicable | None:
    """Return the judged finding of one check."""
    measure, trace = look(check, bench)
    if measure is None or isinstance(measure, NotApplicable):
        return measure
    limit = bench.limits[check.id]
    if trace.missing:
        return _unsettled(check, measure, limit, bench, trace)
    design, over_cases = _over_corners(check, measure, bench, trace)
    words = tuple(dict.fromkeys(written_key(e.path) for e in design.entries if corners.is_estimated(e)))
    judgement = judge(over_cases, limit, design.guessed, words)
    return _finding(check, measure, over_cases, design, judgement, bench, trace)


def look(check: Check, bench: Bench) -> tuple[Measure | NotApplicable | None, Trace]:
    """Return what a check yields at the nominal values, with all that holds it back, and what it reads."""
    trace = Trace()
    measure = _run(check, watched(bench.sheet.amplifier, trace), bench.limits)
    if isinstance(measure, Measure):
        measure = replace(measure, remarks=(*measure.remarks, *_remarks(check, bench, trace)))
    return measure, trace


def _run(check: Check, amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable | None:
    """Run a check; values that no amplifier can have make it unverified, never a crash and never go."""
    try:
        with np.errstate(all="ignore"):
            return check.run(amplifier, limits)
    except (ValueError, ArithmeticError) as problem:
        return Measure(np.nan, f"cannot be computed: {problem}", word=Verdict.UNVERIFIED)


def _remarks(check: Check, bench: Bench, trace: Trace) -> list[Remark]:
    """Return what holds a finding back whatever its number: examples, keys not assessed, rails, load, a limiter."""
    amplifier = bench.sheet.amplifier
    found = list(rail_remarks(amplifier, bench.limits, trace.reads))
    invented = [
        path for path in _with_items(bench.sheet, trace.inputs()) if amplifier.origin(path) is Origin.EXAMPLE
    ]
    if invented and not bench.demo:
        keys = ", ".join(dict.fromkeys(written_key(path) for path in invented[:3]))
        found.append(Remark(Verdict.UNVERIFIED, f"example values are still in the sheet: {keys}"))
    if check.at_bench:
        found += _not_read(amplifier, trace)
    for key, ids in bench.sheet.unassessed.items():
        if check.id in ids:
            found.append(Remark(Verdict.UNVERIFIED, f"{key} is not assessed by this version"))
    if check.step is Step.LOUDSPEAKER and amplifier.loudspeaker.load == "resistor":
        found.append(
            Remark(
                Verdict.UNVERIFIED,
                'loudspeaker.load is "resistor": a bench load says nothing of a loudspeaker',
            )
        )
    if (
        check.at_bench
        and not check.unpowered
        and check.step.place > Step.FIRST_POWER_UP.place
        and amplifier.readings.taken_on == "limiter"
    ):
        found.append(
            Remark(Verdict.UNVERIFIED, "the readings were taken on the limiter: read again on full mains")
        )
    return found


def _not_read(amplifier: Amplifier, trace: Trace) -> list[Remark]:
    """Return which readings of a bench finding nobody read: a guess is none, nor is what a manual or a print says."""
    keys = [
        written_key(path)
        for path in trace.reads
        if path.startswith("readings.") and path not in NO_READING and amplifier.origin(path) in NOT_READ
    ]
    said = ", ".join(dict.fromkeys(keys))
    return [Remark(Verdict.UNVERIFIED, f"nobody read it at the bench: {said}")] if keys else []


def _with_items(sheet: Sheet, reads: Iterable[str]) -> list[str]:
    """Return the key paths read, lists with the paths of their items."""
    found = []
    for path in reads:
        value = value_at(sheet.amplifier, path)
        found.append(path)
        if isinstance(value, tuple):
            found += [f"{path}.{place}" for place in range(len(value))]
    return found


def _over_corners(check: Check, measure: Measure, bench: Bench, trace: Trace) -> tuple[Design, Measure]:
    entries = corners.read_by(bench.sheet.entries.values(), trace.reads)
    if measure.word is not None:
        entries = ()
    if len(entries) > corners.COMPLETE:
        return _searched(check, measure, bench, entries)
    design, amplifier = bench.cases(entries)
    return design, again(check, measure, amplifier, bench)


def again(check: Check, measure: Measure, amplifier: Amplifier, bench: Bench) -> Measure:
    """Return the measure over the cases, with the words and remarks of the nominal one."""
    found = _run(check, amplifier, bench.limits)
    if not isinstance(found, Measure):
        raise TypeError(f"{check.id} differs in structure between its cases")
    if found.word is not None and measure.word is None:
        # The nominal values stand: what is a stop by them stays one, whatever its corners would say.
        return replace(measure, remarks=(Remark(Verdict.UNVERIFIED, found.says), *measure.remarks))
    return replace(
        measure,
        value=found.value,
        go=found.go,
        stop=found.stop,
        without_stop=found.without_stop or measure.without_stop,
        unknown=found.unknown,
        everywhere=found.everywhere or measure.everywhere,
    )


def _searched(
    check: Check, measure: Measure, bench: Bench, entries: tuple[Entry, ...]
) -> tuple[Design, Measure]:
    """Return the corners found by screening when there are too many inputs for all of them."""
    screen = corners.screening_design(entries)
    first = again(check, measure, screen.applied_to(bench.sheet.amplifier), bench)
    design = corners.searched_design(screen, _badness_of(first, bench.limits[check.id], len(screen.rows)))
    remark = Remark(
        Verdict.GO,
        f"{len(entries)} toleranced inputs: corners complete over the {corners.COMPLETE} that matter most",
    )
    second = again(check, measure, design.applied_to(bench.sheet.amplifier), bench)
    return design, replace(second, remarks=(*second.remarks, remark))


def _badness_of(measure: Measure, limit: Limit, count: int) -> Cases:
    value = np.broadcast_to(np.asarray(measure.value, dtype=float), (count,))
    return badness(value, bounds_of(measure, limit, count))


def _at(value: object, case: int) -> float | None:
    """Return one case of a value as a finite number, None where it is unknown or without bound."""
    flat = np.asarray(value, dtype=float).ravel()
    number = float(flat[case if flat.size > 1 else 0])
    return number if np.isfinite(number) else None


def _bound(measure: Measure, limit: Limit) -> Bound:
    go = limit.go if measure.go is None else measure.go
    stop = limit.stop if measure.stop is None else measure.stop
    upper = stop[1] if isinstance(stop, tuple) else stop
    return Bound(
        go if isinstance(go, tuple) else nominal_bound(go),
        None if measure.without_stop else nominal_bound(upper),
        limit.sense,
        limit.source,
        limit.evidence,
        limit.overridden,
    )


def _missing_word(measure: Measure, limit: Limit, trace: Trace) -> Verdict:
    """Return the word of a finding whose input is missing; all that scales with an unknown mains is unverified."""
    word = missing_word(measure, limit)
    return max(word, Verdict.UNVERIFIED) if MAINS & trace.missing.keys() else word


def _unsettled(check: Check, measure: Measure, limit: Limit, bench: Bench, trace: Trace) -> Finding:
    """Return the finding of a check whose input is missing."""
    return Finding(
        id=check.id,
        step=check.step,
        verdict=_missing_word(measure, limit, trace),
        kind=measure.kind or check.kind,
        says=measure.says,
        nominal=_at(measure.value, 0),
        worst=None,  # the corners of what is not complete are not computed
        bound=_bound(measure, limit),
        because=tuple(remark.because for remark in measure.remarks),
        also=tuple(one for one in measure.also if np.isfinite(one.value)),
        inputs=_inputs(bench.sheet, trace),
        needs=tuple(dict.fromkeys((*trace.missing, *measure.needs))),
        next=measure.next,
        method=measure.method,
        explanation=limit.says,
    )


def _finding(
    check: Check,
    measure: Measure,
    over_cases: Measure,
    design: Design,
    judgement: Judgement,
    bench: Bench,
    trace: Trace,
) -> Finding:
    limit, kind = bench.limits[check.id], measure.kind or check.kind
    return Finding(
        id=check.id,
        step=check.step,
        verdict=judgement.verdict,
        kind=kind,
        says=measure.says,
        nominal=_at(measure.value, 0),
        # Of a single case and of an array the last digit may differ: the nominal is one number.
        worst=_at(over_cases.value, judgement.worst) if judgement.worst else _at(measure.value, 0),
        unbounded=judgement.unbounded,
        bound=_bound(measure, limit),
        because=judgement.because,
        overturned_by=_overturned_by(over_cases, kind, design, limit, bench),
        also=tuple(one for one in measure.also if np.isfinite(one.value)),
        worst_case=_worst_case(over_cases, design, judgement.worst),
        at=measure.at,
        inputs=_inputs(bench.sheet, trace),
        needs=measure.needs,
        next=measure.next,
        method=measure.method,
        explanation=limit.says,
    )


def _values(measure: Measure, design: Design) -> Cases:
    return np.broadcast_to(np.asarray(measure.value, dtype=float), (len(design.rows),))


def _worst_case(measure: Measure, design: Design, worst: int) -> dict[str, float]:
    """Return the moved values of the worst case, without those that change nothing when moved alone."""
    values, moved = _values(measure, design), design.moved(worst)
    found = {}
    for row in range(1, 1 + design.alone):
        changed = not np.isclose(values[row], values[0], rtol=1e-9, atol=0.0, equal_nan=True)
        for path, value in design.moved(row).items():
            if changed and moved.get(path) == value:
                found[path] = value
    return found or moved


def _overturned_by(measure: Measure, kind: Kind, design: Design, limit: Limit, bench: Bench) -> str:
    """Return which guess or assumption, moved alone, makes the finding most worse."""
    values = _values(measure, design)
    bad = _badness_of(measure, limit, len(design.rows))
    worst, text = bad[0], ""
    for row in range(1, 1 + design.alone):
        if design.guessed[row] and bad[row] > worst + 1e-12:
            ((path, value),) = design.moved(row).items()
            entry = bench.sheet.entries[path]
            moved = f"{written_key(path)} ({entry.origin.value}) at {show(value, entry.kind)}"
            worst, text = bad[row], f"{moved} makes it {show(values[row], kind)}"
    return text


def _inputs(sheet: Sheet, trace: Trace) -> tuple[Input, ...]:
    found = []
    for path in _with_items(sheet, trace.inputs()):
        value = value_at(sheet.amplifier, path)
        if value is None or isinstance(value, (tuple, frozenset)) or path in UNITS:
            continue
        if isinstance(value, (Curve, Fuse, Limiter)):
            value = value.text
        entry = sheet.entries.get(path)
        origin = entry.origin if entry else sheet.amplifier.origin(path) or Origin.STATED
        unit = entry.kind.unit if entry else ""
        found.append(Input(path, value, unit, origin))
    return tuple(found)
