"""At which values of one key the findings that read it hold."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from contextlib import suppress
from dataclasses import replace
from itertools import groupby
from typing import Any

from safeamp.answers import Forbidding, Interval, Solution
from safeamp.checks import CHECKS, Check
from safeamp.findings import Finding, NotApplicable, Verdict
from safeamp.limits import Limits, nearest
from safeamp.studies.edges import Asked, NotAloneError, edge_at
from safeamp.studies.findings import Bench, find, look
from safeamp.studies.search import (
    Field,
    Movable,
    Trial,
    first_values,
    holds,
    look_closer,
    look_everywhere,
    sharpen,
)

#: A number with its unit, as it stands in a sentence.
AMOUNT = re.compile(r"-?\d[\d.e+-]* ?[^\s,;:)]*")


class QuestionError(ValueError):
    """A question that has no answer; its text says why in one line."""


def solve(
    key: Movable,
    limits: Limits,
    *,
    findings: Sequence[str] = (),
    until: Verdict = Verdict.GO,
    on_paper: bool = False,
) -> Solution:
    """Return where the findings that read a key hold, over its whole believable range.

    Parameters
    ----------
    key : Movable
        The number that is moved; its tolerance goes with it.
    limits : Limits
        What the findings are judged by.
    findings : sequence of str
        Ids; all that read the key when empty.
    until : Verdict
        The worst word that counts as holding: go or caution.
    on_paper : bool
        Leave out what is read at the bench.

    Raises
    ------
    KeyError
        If there is no such finding.
    ValueError
        If `until` clears nothing.
    QuestionError
        If a finding asked for does not apply, or does not read the key.
    ReadingError
        If the sheet can have no value at all there.
    """
    if not until.clears:
        raise ValueError(f"a finding is held at go or caution, not at {until.word}")
    named = [_named(id) for id in findings]
    field = Field(key, limits, until)
    field.read(first_values(key))
    readable = [trial for trial in field.ordered if trial.bench is not None]
    if not readable:
        raise _refusal(field)
    _refuse_unread(key, named, readable)
    field.checks = [
        check for check in (named or _reading(key, readable)) if not (on_paper and check.at_bench)
    ]
    return _answer(field, on_paper=on_paper)


def _named(id: str) -> Check:
    if id not in CHECKS:
        raise KeyError(f"{id} is not a finding{nearest(id, CHECKS)}")
    return CHECKS[id]


def _refusal(field: Field) -> BaseException:
    """Return what the sheet says of the first value, or which keys it lacks beside this one."""
    trouble = next(trial.trouble for trial in field.ordered if trial.trouble is not None)
    lacking = [one.key for one in trouble.complaints if one.text.startswith("is missing")]
    if len(lacking) < len(trouble.complaints):
        return trouble
    return QuestionError(
        f"{field.key.path} alone is refused: write {', '.join(lacking)} into the sheet first"
    )


def _reading(key: Movable, trials: list[Trial]) -> list[Check]:
    """Return the checks that read the key, or what the sheet fills in after it."""
    moved = _moved(trials) | {_list_of(key.path)}
    middle = min(range(len(trials)), key=lambda place: abs(trials[place].value - (key.now or 0.0)))
    seen = [trials[place].bench for place in dict.fromkeys((0, middle, len(trials) - 1))]
    return [
        check
        for check in CHECKS.values()
        if any(_list_of(path) in moved for bench in seen if bench for path in look(check, bench)[1].reads)
    ]


def _refuse_unread(key: Movable, named: list[Check], trials: list[Trial]) -> None:
    """Refuse a finding asked for that applies at no value, or whose word no value can change."""
    moved = _moved(trials) | {_list_of(key.path)}
    for check in named:
        seen = [look(check, trial.bench) for trial in trials if trial.bench]
        idle = [measure for measure, _ in seen if isinstance(measure, NotApplicable)]
        if len(idle) == len(seen):
            raise QuestionError(f"{check.id} does not apply: {idle[0].because}")
        # What lacks a reading may stop before it comes to the key: it says itself what to give.
        if not any(trace.missing or not moved.isdisjoint(map(_list_of, trace.reads)) for _, trace in seen):
            raise QuestionError(f"{check.id} does not read {key.path}")


def _moved(trials: list[Trial]) -> set[str]:
    """Return the paths, lists without the places of their items, whose values differ between trials."""
    first, *others = [trial.bench.sheet.entries for trial in trials if trial.bench is not None]
    return {
        _list_of(path)
        for entries in others
        for path in first.keys() | entries.keys()
        if (first[path].nominal if path in first else None)
        != (entries[path].nominal if path in entries else None)
    }


def _list_of(path: str) -> str:
    head, _, tail = path.rpartition(".")
    return head if tail.isdigit() else path


def _answer(field: Field, *, on_paper: bool) -> Solution:
    """Return the solution for the checks of a field whose trials are read."""
    field.judge(field.ordered)
    key, sheet = field.key, next(trial.bench.sheet for trial in field.ordered if trial.bench is not None)
    solution = Solution(
        title=sheet.amplifier.title,
        key=key.path,
        kind=key.kind,
        until=field.until,
        findings=tuple(check.id for check in field.checks),
        span=key.span,
        now=key.now,
        written=key.in_sheet,
        items=len(key.entries),
        on_paper=on_paper,
        source=sheet.source,
        digest=sheet.digest,
    )
    if not field.checks:
        return replace(solution, **_counted(field))
    never = [check for check in field.checks if not _holding(field, check.id)]
    if not never:
        look_closer(field)
        sharpen(field)
        look_everywhere(field)
    now = None if key.now is None else field.trials.get(key.now)
    return replace(
        solution,
        now_holds=now is not None and now.holds,
        intervals=tuple(_intervals(field, on_paper=on_paper)),
        **_counted(field),
        forbidden=_forbidden(field),
        otherwise=_otherwise(field, never, on_paper=on_paper),
    )


def _counted(field: Field) -> dict[str, Any]:
    """Return how many values were tried and refused, and the commonest reason where it is nearest to the sheet."""
    groups: dict[str, list[Trial]] = {}
    for trial in field.ordered:
        if trial.refused:
            # The same sentence with other numbers is the same reason.
            groups.setdefault(AMOUNT.sub("#", trial.refused), []).append(trial)
    found = {"tried": len(field.trials), "refused": sum(len(group) for group in groups.values())}
    if not groups:
        return found
    now = field.key.now or 0.0
    commonest = max(groups.values(), key=len)
    nearest_one = min(commonest, key=lambda trial: abs(trial.value - now))
    return found | {"refusal": nearest_one.refused}


def _holding(field: Field, id: str) -> list[float]:
    """Return the trial values at which one finding holds."""
    return [trial.value for trial in field.ordered if trial.bench and holds(trial.words[id], field.until)]


def _intervals(field: Field, *, on_paper: bool) -> Iterator[Interval]:
    ordered, place = field.ordered, 0
    asked = Asked(field.key, field.limits, field.checks, field.until, on_paper)
    for good, group in groupby(ordered, key=lambda trial: trial.holds):
        run = list(group)
        before, after = ordered[:place][::-1], ordered[place + len(run) :]
        place += len(run)
        if not good:
            continue
        # An interval of which no value holds alone is none: it is left out.
        with suppress(NotAloneError):
            yield Interval(
                edge_at(asked, run, _failing_alone(field, before)) if before else None,
                edge_at(asked, run[::-1], _failing_alone(field, after)) if after else None,
            )


def _failing_alone(field: Field, outside: list[Trial]) -> list[Trial]:
    """Return the trials beyond an end without the first ones that rounding alone keeps from holding."""
    checks = {check.id: check for check in field.checks}
    for place, trial in enumerate(outside):
        if trial.refused or any(
            _finding(checks[id], trial).verdict > field.until for id in trial.failing if id in checks
        ):
            return outside[place:]
    return outside


def _forbidden(field: Field) -> tuple[Forbidding, ...]:
    """Return what keeps every value from holding; nothing where one does."""
    if any(trial.holds for trial in field.ordered):
        return ()
    field.judge(field.ordered)  # where one finding fails, the search left the others unasked
    read = [trial for trial in field.ordered if trial.bench is not None]
    where = {check.id: _holding(field, check.id) for check in field.checks}
    never = [check for check in field.checks if not where[check.id]]
    shown = never or [check for check in field.checks if len(where[check.id]) < len(read)]
    return tuple(
        Forbidding(
            _finding(check, trial),
            trial.value,
            (where[check.id][0], where[check.id][-1]) if where[check.id] else None,
        )
        for check in shown
        for trial in [_shown_at(field, read, check.id)]
    )


def _shown_at(field: Field, trials: list[Trial], id: str) -> Trial:
    """Return the trial at which a finding is shown that does not hold: the value of the sheet, or a narrow miss."""
    failing = [trial for trial in trials if id in trial.failing]
    return min(failing, key=lambda trial: (trial.value != field.key.now, trial.words[id].excess))


def _finding(check: Check, trial: Trial) -> Finding:
    assert trial.bench is not None
    found = find(check, Bench(trial.bench.sheet, trial.bench.limits))
    assert isinstance(found, Finding)
    return found


def _otherwise(field: Field, never: list[Check], *, on_paper: bool) -> Solution | None:
    """Return the answer for the findings that hold somewhere, where others never do."""
    rest = [check for check in field.checks if check not in never]
    if not never or not rest:
        return None
    fresh = Field(field.key, field.limits, field.until, rest)
    fresh.trials = {
        value: replace(
            trial, words={check.id: trial.words[check.id] for check in rest if check.id in trial.words}
        )
        for value, trial in field.trials.items()
    }
    return _answer(fresh, on_paper=on_paper)
