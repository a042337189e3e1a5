"""The end of an interval of values: rounded to the inside, judged in full, with what binds there."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from decimal import ROUND_CEILING, ROUND_FLOOR, ROUND_HALF_EVEN, Context
from itertools import takewhile

import numpy as np

from safeamp.answers import Edge, Report
from safeamp.checks import Check
from safeamp.complaints import ReadingError
from safeamp.findings import Finding, Verdict
from safeamp.limits import Limits
from safeamp.physics.preferred import RATED_VOLTAGES, SAME, next_preferred
from safeamp.quantities import CAPACITANCE, RESISTANCE
from safeamp.studies.findings import Bench, find
from safeamp.studies.search import Movable, Trial
from safeamp.studies.verdict import verdict

#: Significant digits tried for a rounded end, fewest first.
DIGITS = (4, 6, 8, 12)
#: Preferred values tried beyond an end, and what takes one on to the next of any series.
BEYOND, NEXT = 3, 0.01
#: Two values this far apart look different in a message.
PLAIN = 0.01


class NotAloneError(RuntimeError):
    """Values hold among the trials, but none does when its sheet is judged alone."""


@dataclass(frozen=True)
class Asked:
    """What is solved for."""

    key: Movable
    limits: Limits
    checks: Sequence[Check]
    until: Verdict
    on_paper: bool

    def judged(self, value: float, *, bought: bool = False) -> Report | None:
        """Return the whole report at a value, or with a new part of it; None where a finding does not hold in it."""
        try:
            sheet = self.key.bought(value) if bought else self.key.at(value)
        except ReadingError:
            return None
        report = verdict(sheet, self.limits, on_paper=self.on_paper)
        words = {finding.id: finding.verdict for finding in report.findings}
        held = all(words.get(check.id, Verdict.GO) <= self.until for check in self.checks)
        return report if held else None


def edge_at(asked: Asked, inside: Sequence[Trial], outside: Sequence[Trial]) -> Edge:
    """Return the end of an interval.

    Parameters
    ----------
    asked : Asked
        Key and findings.
    inside : sequence of Trial
        The values that hold, from this end on.
    outside : sequence of Trial
        Those beyond it, the nearest first; that one does not hold, alone either.

    Raises
    ------
    NotAloneError
        If no value holds when its sheet is judged in full: none must be handed on.
    """
    bad, far = outside[0], inside[-1].value
    upward = bad.value < far
    value, report = _rounded(asked, inside, bad.value)
    ends = (min(value, far), max(value, far))
    preferred, series = _preferred(asked, value, ends, upward=upward)
    return Edge(
        value=value,
        written=_text(asked.key, value),
        beyond=bad.value,
        verdict=report.verdict,
        binds=tuple(_binding(asked, bad)),
        refused=_refused(value, outside),
        preferred=preferred,
        series=series,
    )


def _rounded(asked: Asked, inside: Sequence[Trial], bad: float) -> tuple[float, Report]:
    """Return the shortest number near the end that holds when judged in full, and its report."""
    low, high = sorted((bad, inside[-1].value))
    for good in inside:
        exact = good.value
        for candidate in dict.fromkeys((*_shorter(exact, upward=bad < exact), exact)):
            report = asked.judged(candidate) if low <= candidate <= high and candidate != bad else None
            if report is not None:
                return candidate, report
    raise NotAloneError(f"{asked.key.path}: values hold among the trials, but not when judged alone")


def _shorter(exact: float, *, upward: bool) -> Iterator[float]:
    """Return shorter numbers: the nearest one, which may be the very end, and the one on the inside."""
    for digits in DIGITS:
        for rounding in (ROUND_HALF_EVEN, ROUND_CEILING if upward else ROUND_FLOOR):
            yield float(Context(prec=digits, rounding=rounding).create_decimal_from_float(exact))


def _text(key: Movable, value: float) -> str:
    """Return what stands in the sheet for a value, as TOML."""
    written = key.written(value)
    items = [f'"{item}"' if isinstance(item, str) else f"{item}" for item in _items(written)]
    return f"[{', '.join(items)}]" if isinstance(written, list) else items[0]


def _items(written: object) -> list[object]:
    return written if isinstance(written, list) else [written]


def _refused(value: float, outside: Sequence[Trial]) -> str:
    """Return why the sheet is refused beyond an end, at a value that looks different from it when printed."""
    if not outside[0].refused:
        return ""
    refused = list(takewhile(lambda trial: trial.refused, outside))
    return next(
        (trial for trial in refused if abs(trial.value - value) > PLAIN * abs(value)), refused[-1]
    ).refused


def _binding(asked: Asked, bad: Trial) -> Iterator[Finding]:
    if bad.bench is None:
        return
    for check in asked.checks:
        if check.id in bad.failing:
            found = find(check, Bench(bad.bench.sheet, bad.bench.limits))
            if isinstance(found, Finding):
                yield found


def _preferred(
    asked: Asked, value: float, ends: tuple[float, float], *, upward: bool
) -> tuple[float | None, str]:
    """Return the next value on the safe side that holds when a part of it is bought, and its series.

    The part that is fitted may be measured; a new one has the tolerance of what is sold, which takes its low end over
    a limit that the value itself keeps. Then the one beyond it is taken.
    """
    found, series = next_value(asked.key, value, upward=upward)
    for _ in range(BEYOND):
        if found is None or not ends[0] <= found <= ends[1]:
            break
        if asked.judged(found) is not None and asked.judged(found, bought=True) is not None:
            return found, series
        found, _ = next_value(asked.key, found * (1.0 + NEXT if upward else 1.0 - NEXT), upward=upward)
    return None, series


def next_value(key: Movable, value: float, *, upward: bool) -> tuple[float | None, str]:
    """Return the preferred value at or next to a value, None where there is none, and the series it is from.

    References
    ----------
    IEC 60063 for resistors (E24) and capacitors (E6); ratings printed on electrolytic capacitors (memory).
    """
    name = key.path.rpartition(".")[2]
    if key.path.startswith("readings.") or value <= 0:
        return None, ""
    if name.endswith("rated_voltage"):
        return _rated(value, upward=upward), "rated voltages of electrolytic capacitors"
    if key.kind == CAPACITANCE:
        return _series(value, "E6", upward=upward), "E6"
    if key.kind == RESISTANCE and (name.endswith("resistor") or name == "bleeder"):
        return _series(value, "E24", upward=upward), "E24"
    return None, ""


def _series(value: float, series: str, *, upward: bool) -> float:
    return float(np.asarray(next_preferred(value, series, "up" if upward else "down")))


def _rated(value: float, *, upward: bool) -> float | None:
    if upward:
        return next((volts for volts in RATED_VOLTAGES if volts >= value * (1 - SAME)), None)
    return next((volts for volts in reversed(RATED_VOLTAGES) if volts <= value * (1 + SAME)), None)
