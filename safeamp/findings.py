"""What a check yields (a measure) and what judging makes of it (a finding)."""

from __future__ import annotations

import enum
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal, NamedTuple

from safeamp.quantities import Kind, Number, Origin

Sense = Literal["at most", "at least", "between"]


class Verdict(enum.IntEnum):
    """The four words, worst last."""

    GO = 0
    CAUTION = 1
    UNVERIFIED = 2
    STOP = 3

    @property
    def word(self) -> str:
        """The word as users see it."""
        return self.name.lower()

    @property
    def clears(self) -> bool:
        """Whether a step with this verdict may be left for the next one."""
        return self <= Verdict.CAUTION

    @property
    def exit_status(self) -> int:
        """The exit status that scripts rely on: 0 go, 3 caution, 4 unverified, 5 stop."""
        return 0 if self is Verdict.GO else int(self) + 2

    @classmethod
    def from_word(cls, word: str) -> Verdict:
        """Return the verdict of a word; ValueError for any other word."""
        for verdict in cls:
            if verdict.word == word:
                return verdict
        raise ValueError(f"{word!r} is not a verdict; the words are go, caution, unverified, stop")


class Step(enum.Enum):
    """The steps of the job, in their order."""

    COLD_CHECKS = "cold checks"
    FIRST_POWER_UP = "first power-up"
    BIAS = "bias"
    SOAK = "soak"
    LOAD_TEST = "load test"
    LOUDSPEAKER = "loudspeaker"
    HAND_OVER = "hand-over"

    @property
    def place(self) -> int:
        """Place in the order of the job, from 0."""
        return list(Step).index(self)


class Remark(NamedTuple):
    """A fact that holds a finding at a word or worse: "at best caution, because ..."."""

    at_best: Verdict
    because: str


class Also(NamedTuple):
    """A further number shown beside a finding."""

    at: str
    value: float
    kind: Kind


@dataclass(frozen=True, eq=False)
class Measure:
    """What a check yields: one number per case with its bounds, before judging.

    `value`, `go` and `stop` are floats or arrays over the flat case axis (index 0 nominal); `go` and `stop`
    are None where the limit of the same id holds as it stands, and `without_stop` says that no number is a
    stop here. `word` is a verdict that follows from structure alone; `unknown` marks the cases in which
    nothing can be said; with `everywhere` go must hold in every case; `kind` replaces the kind of the
    register; `needs` are keys that would settle a remark; `corner` says what the cases are, for the text.
    """

    value: Number
    says: str
    next: str = ""
    go: Number | tuple[float, float] | None = None
    stop: Number | None = None
    without_stop: bool = False
    remarks: tuple[Remark, ...] = ()
    also: tuple[Also, ...] = ()
    at: Mapping[str, float | str] = field(default_factory=dict)
    method: str = ""
    as_built: AsBuilt | None = None
    kind: Kind | None = None
    word: Verdict | None = None
    unknown: Number | None = None
    everywhere: bool = False
    needs: tuple[str, ...] = ()
    corner: str = "a corner of the tolerances or at the highest mains"


class AsBuilt(NamedTuple):
    """Whether the maker's own ratings cover this amplifier, and which key would say so."""

    holds: bool
    ceiling: float
    missing: tuple[str, ...] = ()


class NotApplicable(NamedTuple):
    """A finding that cannot apply, with the stated key that says so."""

    because: str


@dataclass(frozen=True)
class Input:
    """One value that a finding read."""

    key: str
    value: float | str | bool | None
    unit: str
    origin: Origin


@dataclass(frozen=True)
class Bound:
    """The limit a finding was judged by."""

    go: float | tuple[float, float] | None
    stop: float | None
    sense: Sense
    source: str
    evidence: str
    overridden: bool = False


@dataclass(frozen=True)
class Finding:
    """A judged measure."""

    id: str
    step: Step
    verdict: Verdict
    kind: Kind
    says: str
    nominal: float | None
    worst: float | None
    unbounded: bool = False
    bound: Bound | None = None
    because: tuple[str, ...] = ()
    overturned_by: str = ""
    also: tuple[Also, ...] = ()
    worst_case: Mapping[str, float] = field(default_factory=dict)
    at: Mapping[str, float | str] = field(default_factory=dict)
    inputs: tuple[Input, ...] = ()
    needs: tuple[str, ...] = ()
    next: str = ""
    method: str = ""
    explanation: str = ""
    to_be_read: bool = False
