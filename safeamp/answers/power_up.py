"""The card for the first power-up: what to look for, what a healthy amplifier shows, when to switch off."""

from __future__ import annotations

from dataclasses import dataclass, field

from safeamp.amplifier import Assumption
from safeamp.findings import Finding, Verdict
from safeamp.quantities import Kind, show


@dataclass(frozen=True)
class Extent:
    """A number with the ends that it may reach inside tolerances and assumptions."""

    nominal: float
    low: float
    high: float

    def text(self, kind: Kind) -> str:
        """Return both ends with their units, or one where they read the same or nothing is the least."""
        low, high = show(self.low, kind), show(self.high, kind)
        if self.low == 0.0 < self.high:
            return f"up to {high}"
        return low if low == high else f"{low} to {high}"


@dataclass(frozen=True)
class Expected:
    """One reading that is expected: how far it may lie, and what is said of it.

    `extent` is None where no number can be given; `says` then tells what is seen.
    """

    what: str
    kind: Kind | None
    extent: Extent | None
    says: str = ""

    @property
    def text(self) -> str:
        """Both ends, and what is said of them."""
        numbers = "" if self.extent is None or self.kind is None else self.extent.text(self.kind)
        return ", ".join(part for part in (numbers, self.says) if part)


@dataclass(frozen=True, kw_only=True)
class State:
    """What the amplifier shows behind the limiter in one state, healthy or sick.

    `needs` are the keys without which it is unverified, `because` why it is so besides.
    """

    name: str
    healthy: bool
    readings: tuple[Expected, ...]
    needs: tuple[str, ...] = ()
    because: tuple[str, ...] = ()

    @property
    def unverified(self) -> bool:
        """Whether nothing may be expected by it."""
        return bool(self.needs or self.because)

    def reading(self, what: str) -> Expected:
        """Return one reading by its name."""
        return next(one for one in self.readings if one.what == what)


@dataclass(frozen=True, kw_only=True)
class Choice:
    """A limiter that could be used: share of the rails that a healthy idle keeps, most heat of a fault, W.

    `looks` is how a lamp looks behind the idle current as set, `looks_at_lowest` with it at its lowest; empty for what
    does not glow.
    """

    text: str
    rails_left: Extent
    looks: str
    looks_at_lowest: str
    most_heat: float
    recommended: bool = False


@dataclass(frozen=True, kw_only=True)
class SeriesLimiter:
    """What limits the current: kind ("lamp", "resistor", "bench", or "" where none can be said), text, and why."""

    kind: str
    text: str
    recommended: bool
    why: tuple[str, ...]
    choices: tuple[Choice, ...] = ()


@dataclass(frozen=True)
class SwitchOff:
    """One reading at which to switch off, with the limit that says so; an empty id where it is common practice."""

    when: str
    says: str
    id: str = ""
    source: str = ""


@dataclass(frozen=True)
class Pattern:
    """What is seen, what it means, what to do."""

    seen: str
    means: str
    do: str


@dataclass(frozen=True, kw_only=True)
class PowerUp:
    """The whole card. It clears nothing: `verdict` is that of the cold checks before it.

    Raises
    ------
    ValueError
        If it tells to switch on while the cold checks do not clear that.
    """

    title: str
    verdict: Verdict
    cold: tuple[Finding, ...]
    limiter: SeriesLimiter
    states: tuple[State, ...]
    switch_off: tuple[SwitchOff, ...]
    patterns: tuple[Pattern, ...]
    cautions: tuple[str, ...]
    steps: tuple[str, ...] = ()
    afterwards: tuple[str, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    remarks: tuple[str, ...] = ()
    overridden: tuple[str, ...] = field(default=())
    source: str = ""
    digest: str = ""

    def __post_init__(self) -> None:
        if not self.verdict.clears and (self.steps or self.afterwards):
            raise ValueError(f"no step may follow cold checks that are {self.verdict.word}")

    @property
    def missing(self) -> tuple[str, ...]:
        """The keys that would settle what is unverified."""
        return tuple(dict.fromkeys(key for state in self.states for key in state.needs))
