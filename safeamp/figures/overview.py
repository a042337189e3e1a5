"""All findings as bars of how much of their limit is used, grouped by step."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import groupby
from typing import Any

import numpy as np
from matplotlib.axes import Axes

from safeamp.figures.look import BLACK, BLUE, GREY, PALE, VERMILLION, NotDrawnError
from safeamp.findings import Bound, Finding, Verdict
from safeamp.quantities import TEMPERATURE, show

TITLE = "How much of each limit is used"
#: Temperatures count as rise above this room, degC.
ROOM = 25.0
#: The bars end here; a longer one carries an arrow, its number stands beside it.
END = 1.5
ROW = 0.205
FILLS: dict[Verdict, dict[str, Any]] = {
    Verdict.GO: {"facecolor": PALE, "hatch": ""},
    Verdict.CAUTION: {"facecolor": BLUE, "hatch": ""},
    Verdict.UNVERIFIED: {"facecolor": "white", "hatch": "////"},
    Verdict.STOP: {"facecolor": VERMILLION, "hatch": "xxx"},
}


@dataclass(frozen=True)
class Used:
    """Shares of the last level of a limit: by the nominal value, by the worst one, and where go ends."""

    nominal: float | None = None
    worst: float | None = None
    go: float | None = None


def used(finding: Finding) -> Used:
    """Return how much a finding uses of its stop level, or of its go level where it has no stop."""
    bound = finding.bound
    if bound is None or (bound.go is None and bound.stop is None):
        return Used()
    share = _Share(bound, temperature=finding.kind == TEMPERATURE)
    worst = np.inf if finding.unbounded else finding.worst
    high = bound.go[1] if isinstance(bound.go, tuple) else bound.go
    go = None if bound.stop is None or high is None else share(high)
    return Used(share(np.inf if finding.unbounded else finding.nominal), share(worst), go)


@dataclass(frozen=True)
class _Share:
    """A value as a share of the last level."""

    bound: Bound
    temperature: bool

    def __call__(self, value: float | None) -> float | None:
        if value is None:
            return None
        zero, level = self._scale()
        if self.bound.sense == "at least":
            return level / value if value > 0.0 else np.inf
        distance = abs(value - zero) if self.bound.sense == "between" else max(value - zero, 0.0)
        return distance / (level - zero) if level > zero else None

    def _scale(self) -> tuple[float, float]:
        go, stop = self.bound.go, self.bound.stop
        zero = ROOM if self.temperature else 0.0
        if isinstance(go, tuple):
            zero = (go[0] + go[1]) / 2.0
            return zero, go[1] if stop is None else stop
        last = go if stop is None else stop
        return zero, np.nan if last is None else last


def height_of(findings: Sequence[Finding]) -> float:
    """Return how high the picture must be, inches."""
    return 1.1 + ROW * (len(findings) + len({finding.step for finding in findings}))


def draw(axes: Axes, findings: Sequence[Finding]) -> str:
    """Draw one bar a finding; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If there is no finding.
    """
    if not findings:
        raise NotDrawnError("nothing was judged")
    place, ticks = 0.0, {}
    for step, group in groupby(sorted(findings, key=lambda one: one.step.place), key=lambda one: one.step):
        axes.text(0.0, place, step.value, fontweight="bold", va="center", clip_on=False)
        axes.texts[-1].set_transform(axes.get_yaxis_transform())
        axes.texts[-1].set(x=-0.012, ha="right")
        place += 1.0
        for finding in group:
            _row(axes, place, finding)
            ticks[place] = finding.id
            place += 1.0
    axes.axvline(1.0, color=BLACK, lw=1.2, zorder=3)
    axes.set_yticks(list(ticks), list(ticks.values()))
    axes.tick_params(axis="y", length=0)
    axes.grid(visible=False, axis="y")
    axes.set(xlim=(0.0, END), ylim=(place - 0.4, -0.7))
    axes.set_xticks([0.0, 0.25, 0.5, 0.75, 1.0, 1.25, END], ["0", "25", "50", "75", "100", "125", "150"])
    axes.set_xlabel(
        "Share of the stop level, of the go level where there is no stop (%)\n"
        "bar: nominal; line: worst corner; tick: go ends; temperatures as rise above 25 °C"
    )
    return _words(findings)


def _row(axes: Axes, place: float, finding: Finding) -> None:
    found = used(finding)
    if found.nominal is not None:
        axes.barh(place, min(found.nominal, END), 0.62, edgecolor=BLACK, lw=0.6, **FILLS[finding.verdict])
    if found.worst is not None and found.nominal is not None and found.worst > found.nominal:
        axes.plot([min(found.nominal, END), min(found.worst, END)], [place, place], color=BLACK, lw=1.4)
        axes.plot(
            [min(found.worst, END)], [place], "|" if found.worst <= END else ">", color=BLACK, clip_on=False
        )
    elif found.nominal is not None and found.nominal > END:
        axes.plot([END], [place], ">", color=BLACK, clip_on=False)
    if found.nominal is not None and found.go is not None and found.go < 1.0:
        axes.plot([found.go, found.go], [place - 0.42, place + 0.42], color=GREY, lw=1.6, zorder=4)
    value = "unbounded" if finding.unbounded else show(finding.nominal, finding.kind)
    for points, said in ((9, finding.verdict.word), (64, "" if value == "unknown" else value)):
        axes.annotate(
            said, (END, place), (points, 0), textcoords="offset points", va="center", annotation_clip=False
        )


def _words(findings: Sequence[Finding]) -> str:
    said = [
        f"{sum(one.verdict is verdict for one in findings)} {verdict.word}" for verdict in reversed(Verdict)
    ]
    over = [one.id for one in findings if (used(one).nominal or 0.0) > 1.0]
    beyond = f" Beyond the last level: {', '.join(over)}." if over else " None is beyond its last level."
    return f"{len(findings)} findings by step, {', '.join(said)}.{beyond}"
