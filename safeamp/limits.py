"""The limits that findings are judged by, as frozen nouns; the numbers stand in data files."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from difflib import get_close_matches
from math import inf
from types import MappingProxyType
from typing import Literal, NamedTuple, TypeVar

from safeamp.quantities import Kind

Sense = Literal["at most", "at least", "between"]
_Noun = TypeVar("_Noun")
Level = float | tuple[float, float]

SENSES: tuple[Sense, ...] = ("at most", "at least", "between")
NOT_GIVEN = ("caution", "unverified")
EVIDENCE = ("seen", "transcript", "quoted", "memory", "derived", "common practice", "this project")
"""How well a shipped number is known; an overriding file is `stated` instead."""


@dataclass(frozen=True)
class Limit:
    """One limit: up to where a finding is `go`, beyond what it is `stop`.

    Parameters
    ----------
    id : str
        Id of the finding, or that id with a further word where a finding has a second number.
    go, stop : float or tuple of float or None
        SI units of `kind` (degC, deg). None: no such level, so that nothing is `go` (or `stop`) by
        this number alone. A pair only with the sense "between"; a single `stop` there is the upper one.
    sense : {"at most", "at least", "between"}
        Which side of the level is good.
    kind : Kind
        Kind of quantity of `go` and `stop`.
    not_given : {"caution", "unverified"} or None
        Verdict when the input is missing; None where the column is empty, which means unverified.
    source, evidence, says : str
        Where the number comes from, how well it is known, and one sentence for the user.
    extra : mapping of str to float
        Further numbers of the same rule by name, SI units.
    extra_kinds : mapping of str to Kind
        Kind of quantity of each of them, for the report.
    overridden : bool
        True when the user's own file replaced a level.
    """

    id: str
    go: Level | None
    stop: Level | None
    sense: Sense
    kind: Kind
    not_given: Literal["caution", "unverified"] | None
    source: str
    evidence: str
    says: str
    extra: Mapping[str, float] = field(default_factory=lambda: MappingProxyType({}))
    extra_kinds: Mapping[str, Kind] = field(default_factory=lambda: MappingProxyType({}))
    overridden: bool = False


@dataclass(frozen=True)
class Default:
    """A value filled in where the user gives none, with its spread.

    Parameters
    ----------
    id : str
        Key of the sheet that it stands for, with a further word where it is a share or a rise.
    nominal, low, high : float
        SI units of `kind`; low <= nominal <= high.
    """

    id: str
    nominal: float
    low: float
    high: float
    kind: Kind
    source: str
    evidence: str
    says: str


class Interface(NamedTuple):
    """Thermal resistance from case to heatsink, K/W, of one package and insulator, with its spread."""

    name: str
    nominal: float
    low: float
    high: float
    source: str
    evidence: str


class Gate(NamedTuple):
    """Pre-arcing time of a fuse, s, at one multiple of its rating; inf where it may never open."""

    times_rating: float
    shortest: float
    longest: float = inf


class FuseGates(NamedTuple):
    """Gates of one fuse characteristic, by rising multiples of the rating."""

    letter: str
    gates: tuple[Gate, ...]
    source: str
    evidence: str
    says: str


class Series(NamedTuple):
    """A series of preferred or declared values, rising; SI units of `kind`, the E series over one decade."""

    name: str
    values: tuple[float, ...]
    kind: Kind
    source: str
    evidence: str


@dataclass(frozen=True)
class Limits:
    """Everything that the data files say; ``limits["offset.output"]`` is one `Limit`.

    `replaced` holds the ids of the limits that the user's own file replaced.
    """

    entries: Mapping[str, Limit]
    defaults: Mapping[str, Default]
    interfaces: Mapping[str, Interface]
    fuse_gates: Mapping[str, FuseGates]
    series: Mapping[str, Series]
    levels: Mapping[str, Default]
    replaced: tuple[str, ...] = ()

    def __getitem__(self, id: str) -> Limit:
        """Return the limit of one id; KeyError names the nearest known one."""
        return _find(self.entries, id, "limit")

    def default(self, id: str) -> Default:
        """Return the default of one id; KeyError names the nearest known one."""
        return _find(self.defaults, id, "default")

    def level(self, id: str) -> Default:
        """Return a test level or crest factor; KeyError names the nearest known one."""
        return _find(self.levels, id, "level")

    def interface(self, name: str) -> Interface:
        """Return an interface, typed with hyphens or blanks; KeyError names the nearest known one."""
        known = {plain(key): key for key in self.interfaces}
        return self.interfaces[_find(known, plain(name), "interface between case and heatsink")]

    @property
    def overridden(self) -> tuple[Limit, ...]:
        """The limits that the user's own file replaced, for the report to name."""
        return tuple(self.entries[id] for id in self.replaced)


def plain(name: str) -> str:
    """Return a name in lower case with single blanks in place of hyphens and runs of blanks."""
    return " ".join(name.lower().replace("-", " ").split())


def nearest(name: str, known: Iterable[str]) -> str:
    """Return ``; did you mean X?`` for the nearest known name, or an empty text when none is near."""
    found = get_close_matches(name, list(known), n=1)
    return f"; did you mean {found[0]}?" if found else ""


def _find(table: Mapping[str, _Noun], name: str, what: str) -> _Noun:
    if name not in table:
        raise KeyError(f"{name} is not a known {what}{nearest(name, table)}")
    return table[name]
