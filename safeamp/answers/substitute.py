"""What a comparison of two devices on the same load lines returns."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from safeamp.findings import Finding, Verdict

if TYPE_CHECKING:
    from pandas import DataFrame

Values = tuple[float, ...]


@dataclass(frozen=True)
class Ratings:
    """What the data of one device print, and its name; W with the case at the temperature of the rating."""

    name: str
    kind: str
    voltage: float
    current: float
    power: float
    junction_limit: float


@dataclass(frozen=True)
class AtWork:
    """One device on a load line: degC of its case and junction, its worst point, and the current that it allows.

    `use` is the current over the allowed one at the worst point (`voltage`, `current`); `enters_unknown` says that
    current flows where its data say nothing. `asked` (nan where the load line has no such voltage) and `allowed`
    belong to the voltages of the line.
    """

    case: float
    junction: float
    use: float
    voltage: float
    current: float
    enters_unknown: bool
    asked: Values
    allowed: Values


@dataclass(frozen=True)
class Range:
    """V across the device, from and to."""

    low: float
    high: float


@dataclass(frozen=True)
class LoadLine:
    """Both devices on one load line of one side.

    `weaker` are the voltages at which the other device allows less current than the fitted one; `weaker_in_use`
    those of them at which current flows.
    """

    side: str
    load: str
    step: str
    voltages: Values
    fitted: AtWork
    other: AtWork
    weaker: tuple[Range, ...]
    weaker_in_use: tuple[Range, ...]


@dataclass(frozen=True)
class Pair:
    """One side: the fitted device, the other one, and whether no rating of the other is smaller and one is larger."""

    side: str
    fitted: Ratings
    other: Ratings
    larger: bool


@dataclass(frozen=True)
class Compared:
    """A finding that reads the data of the output devices, with each device; None where it does not apply."""

    id: str
    fitted: Finding | None
    other: Finding


@dataclass(frozen=True, kw_only=True)
class Substitute:
    """Another device against the fitted one.

    Parameters
    ----------
    verdict : Verdict
        For what `scope` says and for nothing else.
    because : tuple of (Verdict, str)
        What the verdict rests on besides the findings.
    doubts : tuple of str
        What no data given here can settle.

    Raises
    ------
    ValueError
        If the verdict is better than what it rests on, or clears while nothing was judged.
    """

    title: str
    scope: str
    verdict: Verdict
    pairs: tuple[Pair, ...]
    lines: tuple[LoadLine, ...]
    findings: tuple[Compared, ...]
    because: tuple[tuple[Verdict, str], ...]
    doubts: tuple[str, ...]
    source: str = ""
    digest: str = ""
    remarks: tuple[str, ...] = field(default=())

    def __post_init__(self) -> None:
        judged = [one.other.verdict for one in self.findings]
        worst = max([*judged, *(word for word, _ in self.because)], default=Verdict.UNVERIFIED)
        if self.verdict < worst or (self.verdict.clears and not judged):
            raise ValueError(f"the verdict {self.verdict.word} is better than what it rests on, {worst.word}")

    @property
    def exit_status(self) -> int:
        """0 go, 3 caution, 4 unverified, 5 stop."""
        return self.verdict.exit_status

    def rows(self) -> list[dict[str, object]]:
        """Return the rows of `frame` as mappings from column to value, None for what is not known."""
        return [row for line in self.lines for row in _rows(line)]

    def frame(self) -> DataFrame:
        """Return one row a volt of every load line: current asked, allowed current and use, V and A."""
        from pandas import DataFrame

        return DataFrame(self.rows())


def _rows(line: LoadLine) -> list[dict[str, object]]:
    found: list[dict[str, object]] = []
    for place, volts in enumerate(line.voltages):
        row: dict[str, object] = {"side": line.side, "load": line.load, "voltage": volts}
        for name, device in (("fitted", line.fitted), ("other", line.other)):
            asked, allowed = device.asked[place], device.allowed[place]
            row |= {f"{name} asked": _known(asked), f"{name} allowed": _known(allowed)}
            row[f"{name} use"] = share(asked, allowed)
        row["other allows less"] = line.other.allowed[place] < line.fitted.allowed[place]
        found.append(row)
    return found


def _known(value: float) -> float | None:
    return None if math.isnan(value) else value


def share(asked: float, allowed: float) -> float | None:
    """Return asked over allowed current; infinite where none is allowed, None where it is not known."""
    if math.isnan(asked) or math.isnan(allowed):
        return None
    if asked <= 0.0:
        return 0.0
    return asked / allowed if allowed > 0.0 else math.inf
