"""What the quick answers share: options with their defaults, cases over their tolerances, judging."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field, replace
from typing import Any

import numpy as np

from safeamp.amplifier import Entry
from safeamp.answers import Amount, Formula, PutIn, QuickAnswer
from safeamp.checks.judging import bounds_of, judge, nominal_bound
from safeamp.checks.words import nominal
from safeamp.complaints import OptionsError
from safeamp.findings import Bound, Finding, Input, Measure, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.quantities import FREQUENCY, POWER, RATIO, TEMPERATURE, VOLTAGE, Kind, Number, Origin, show
from safeamp.studies import corners
from safeamp.studies.corners import Design

#: Highest over actual mains where nothing else is said (EN 50160).
HIGHEST = 1.1

#: Id of each finding that a quick answer may hold -> its step and kind, as the register of checks has them: to look
#: there, an answer about one thing would import the formulas of all.
JUDGED = {
    "capacitor.cutoff": (Step.COLD_CHECKS, FREQUENCY),
    "offset.output": (Step.BIAS, VOLTAGE),
    "heat.heatsink": (Step.SOAK, TEMPERATURE),
    "heat.junction": (Step.SOAK, TEMPERATURE),
    "soa.resistive_load": (Step.LOAD_TEST, RATIO),
    "loudspeaker.label": (Step.LOUDSPEAKER, RATIO),
    "soa.loudspeaker": (Step.LOUDSPEAKER, RATIO),
    "loudspeaker.power": (Step.LOUDSPEAKER, RATIO),
    "loudspeaker.dc_fault": (Step.LOUDSPEAKER, POWER),
}


#: Assumed shares that are no options, and what settles them.
STANDS_FOR = {"fins_share": "the K/W by ruler", "rated_noise_share": "--power-word"}


def dashed(*names: str) -> str:
    """Return option names as they are typed."""
    found = [f"--{name.replace('_', '-')}" for name in names]
    return found[0] if len(found) == 1 else f"{', '.join(found[:-1])} and {found[-1]}"


def shown(value: Number, kind: Kind) -> str:
    """Return the nominal as text with the digits that a formula deserves."""
    return show(nominal(value), kind, 4)


@dataclass
class Desk:
    """The options of one quick answer, with what was filled in for those left out."""

    command: str
    limits: Limits
    entries: dict[str, Entry]
    whys: dict[str, tuple[str, str]] = field(default_factory=dict)

    def has(self, *names: str) -> bool:
        """Whether all of these options were given."""
        return all(name in self.entries for name in names)

    def need(self, *names: str) -> None:
        """Raise OptionsError naming those of the options that are missing."""
        missing = [name for name in names if name not in self.entries]
        if missing:
            raise OptionsError(f"too little is given; add {dashed(*missing)}")

    def only_with(self, name: str, *others: str) -> None:
        """Raise OptionsError when an option stands without any of those that it belongs to."""
        if self.has(name) and not any(self.has(other) for other in others):
            raise OptionsError(f"{dashed(name)} says nothing alone; add {dashed(*others)}")

    def one_rail(self) -> str:
        """Return which of the two rail options was given.

        Raises
        ------
        OptionsError
            If neither or both were.
        """
        if self.has("split_rail", "single_rail"):
            raise OptionsError("--split-rail and --single-rail contradict each other; leave one of them out")
        if not self.has("split_rail") and not self.has("single_rail"):
            raise OptionsError("too little is given; add --split-rail or --single-rail")
        return "split_rail" if self.has("split_rail") else "single_rail"

    def assume(
        self,
        name: str,
        value: float,
        kind: Kind,
        why: str,
        spread: tuple[float, float] | None = None,
        origin: Origin = Origin.ASSUMED,
    ) -> None:
        """Fill in an option that was left out."""
        if name in self.entries:
            return
        low, high = spread or (value, value)
        self.entries[name] = Entry(name, value, low, high, origin, kind)
        self.whys[name] = (show(value, kind), why)

    def widen(self, name: str, low: float, high: float, why: str) -> None:
        """Let an option lie between two shares of it, if nobody measured it or said how far off it may be."""
        entry = self.entries.get(name)
        if (
            entry is None
            or entry.origin is Origin.MEASURED
            or (entry.spread and entry.origin is not Origin.GUESS)
        ):
            return
        ends = min(entry.low, entry.nominal * low), max(entry.high, entry.nominal * high)
        self.entries[name] = replace(entry, low=ends[0], high=ends[1])
        self.whys[name] = (entry.text, why)

    def move(self, name: str, *, high: float, why: str) -> None:
        """Let an option reach up to a higher end."""
        entry = self.entries[name]
        self.entries[name] = replace(entry, high=max(entry.high, high))
        self.whys[name] = (entry.text, why)

    def cases(self, *more: Entry) -> Cases:
        """Return the values over all corners of the tolerances; `more` are entries that are no options."""
        spread = [entry for entry in (*self.entries.values(), *more) if entry.spread]
        if len(spread) > corners.COMPLETE:
            raise OptionsError(
                f"{len(spread)} values have a tolerance; {corners.COMPLETE} at most can be judged"
            )
        return Cases(self, corners.complete_design(spread))

    def put_in(self) -> tuple[PutIn, ...]:
        """Return every value that was used, with the reason of those that nobody gave."""
        return tuple(self._put_in(name, entry) for name, entry in self.entries.items())

    def _put_in(self, name: str, entry: Entry) -> PutIn:
        text, why = self.whys.get(name, (entry.text, ""))
        return PutIn(name, text or show(entry.nominal, entry.kind), why)


@dataclass(frozen=True, eq=False)
class Cases:
    """The options as numbers over the cases: index 0 nominal, then the corners."""

    desk: Desk
    design: Design

    def __getitem__(self, name: str) -> Any:
        """Return one option: a float, or an array over the cases where it has a tolerance."""
        columns = self.columns
        return columns[name] if name in columns else self.desk.entries[name].nominal

    @property
    def columns(self) -> Mapping[str, Any]:
        """Values by path of everything that moves."""
        return {path: self.design.rows[:, place] for place, path in enumerate(self.design.paths)}

    def amount(self, name: str, value: Number, kind: Kind) -> Amount:
        """Return a result: its nominal, and its ends where they differ."""
        found = np.asarray(value, dtype=float).ravel()
        if not np.isfinite(found[0]):
            return Amount(name, None, kind)
        if np.ptp(found) <= 1e-12 * abs(found[0]) or not np.all(np.isfinite(found)):
            return Amount(name, float(found[0]), kind)
        return Amount(name, float(found[0]), kind, float(found.min()), float(found.max()))

    def finding(self, identity: str, measure: Measure, used: tuple[str, ...]) -> Finding:
        """Return a judged measure, by the limit and the kind of the finding of the same id."""
        (step, kind), limit = JUDGED[identity], self.desk.limits[identity]
        inputs = tuple(self._input(name) for name in used if self.desk.has(name))
        measure = replace(measure, remarks=(*measure.remarks, *self._invented(used)))
        judgement = judge(measure, limit, self.design.guessed, self._moved())
        values = np.broadcast_to(np.asarray(measure.value, dtype=float), (len(self.design.rows),))
        bounds = bounds_of(measure, limit, len(self.design.rows))
        go = limit.go if measure.go is None and isinstance(limit.go, tuple) else nominal_bound(bounds.go)
        return Finding(
            id=identity,
            step=step,
            verdict=judgement.verdict,
            kind=kind,
            says=measure.says,
            nominal=_finite(values[0]),
            worst=_finite(values[judgement.worst]),
            unbounded=judgement.unbounded,
            bound=Bound(
                go, nominal_bound(bounds.stop), limit.sense, limit.source, limit.evidence, limit.overridden
            ),
            because=judgement.because,
            worst_case={_spoken(path): value for path, value in self.design.moved(judgement.worst).items()},
            inputs=inputs,
            next=measure.next,
            explanation=limit.says,
        )

    def _input(self, name: str) -> Input:
        entry = self.desk.entries[name]
        return Input(_spoken(name), entry.nominal, entry.kind.unit, entry.origin)

    def _invented(self, used: Iterable[str]) -> tuple[Remark, ...]:
        names = [
            name for name in used if self.desk.has(name) and self.desk.entries[name].origin is Origin.EXAMPLE
        ]
        if not names:
            return ()
        return (Remark(Verdict.UNVERIFIED, f"{dashed(*names)}: an example value clears nothing"),)

    def _moved(self) -> tuple[str, ...]:
        moved = [entry.path for entry in self.design.entries if corners.is_estimated(entry)]
        return tuple(_named(path) if path in self.desk.entries else _spoken(path) for path in moved)


def _named(path: str) -> str:
    """Return an assumed share as what it stands for; any other value as its option is typed."""
    return STANDS_FOR.get(path) or dashed(path)


def _spoken(path: str) -> str:
    """Return an option as people say it; a key path as it is."""
    return path if "." in path else path.replace("_", " ")


def _finite(value: float) -> float | None:
    return float(value) if np.isfinite(value) else None


def half_supply(cases: Cases, rail: str) -> Number:
    """Return half the supply: a rail of a split supply, half the rail of a single one, V."""
    return cases[rail] / 2.0 if rail == "single_rail" else cases[rail]


def loss_of(cases: Cases, rail: str) -> Number:
    """Return the swing loss, V.

    Raises
    ------
    OptionsError
        If it leaves nothing of the way from rail to midpoint.
    """
    half, loss = half_supply(cases, rail), cases["swing_loss"]
    if np.any(np.asarray(loss) >= np.asarray(half)):
        text = f"{shown(loss, VOLTAGE)} leaves nothing of {shown(half, VOLTAGE)} from rail to midpoint"
        raise OptionsError(f"{dashed('swing_loss')}: {text}; read both again")
    return loss


@dataclass
class Page:
    """A quick answer while it is written: results, formulas and findings in the order in which they are found."""

    cases: Cases
    results: list[Amount] = field(default_factory=list)
    formulas: list[Formula] = field(default_factory=list)
    judged: list[Finding] = field(default_factory=list)

    def add(self, name: str, value: Number, kind: Kind, *, through_zero: bool = False) -> None:
        """Add a result over the cases; one that falls to zero between its ends starts there."""
        found = self.cases.amount(name, value, kind)
        if through_zero and found.low is not None:
            found = replace(found, low=0.0)
        self.results.append(found)

    def add_one(self, name: str, value: float | str | None, kind: Kind | None = None) -> None:
        """Add a result that has no ends of its own: a worst one, a purchase, a word."""
        self.results.append(Amount(name, value, kind))

    def say(self, words: str, numbers: str) -> None:
        """Add a formula in words and with the numbers put in."""
        self.formulas.append(Formula(words, numbers))

    def judge(self, identity: str, measure: Measure, used: Iterable[str]) -> None:
        """Add a judged finding; `used` are the options that it rests on."""
        self.judged.append(self.cases.finding(identity, measure, tuple(used)))

    def answer(
        self, title: str, holds_for: str, cautions: tuple[str, ...], more: tuple[PutIn, ...] = ()
    ) -> QuickAnswer:
        """Return the finished answer."""
        desk = self.cases.desk
        return QuickAnswer(
            command=desk.command,
            title=title,
            put_in=(*desk.put_in(), *more),
            results=tuple(self.results),
            formulas=tuple(self.formulas),
            holds_for=holds_for,
            judged=tuple(self.judged),
            cautions=cautions,
        )
