"""A sheet as read: the nominal amplifier, where each value comes from, and what was assumed."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from safeamp.amplifier.tree import Amplifier
from safeamp.quantities import Kind, Origin, Reading


@dataclass(frozen=True)
class Assumption:
    """A default that stepped in."""

    key: str
    value: str
    why: str


@dataclass(frozen=True)
class Entry:
    """One quantity of the sheet with the interval in which it may lie.

    `middle` are further levels between `low` and `high` at which a result may be worst.
    """

    path: str
    nominal: float
    low: float
    high: float
    origin: Origin
    kind: Kind
    text: str = ""
    line: int | None = None
    middle: tuple[float, ...] = ()

    @property
    def spread(self) -> bool:
        """Whether the value may lie anywhere but at its nominal."""
        return self.low < self.nominal or self.high > self.nominal

    @classmethod
    def of(cls, path: str, reading: Reading, line: int | None = None) -> Entry:
        """Return the entry of a reading at a key path."""
        return cls(
            path, reading.nominal, reading.low, reading.high, reading.origin, reading.kind, reading.text, line
        )


@dataclass(frozen=True, eq=False)
class Sheet:
    """What reading a sheet yields."""

    amplifier: Amplifier
    entries: Mapping[str, Entry]
    assumptions: tuple[Assumption, ...] = ()
    remarks: tuple[str, ...] = ()
    unassessed: Mapping[str, tuple[str, ...]] = field(default_factory=dict)
    source: str = ""
    digest: str = ""
