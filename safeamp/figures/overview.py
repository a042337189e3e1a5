"""All findings as bars of how much of their limit is used, grouped by step."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import groupby
from typing import Any

import numpy as np
from matplotlib.axes import Axes

from safeamp.checks.amounts import STATES, value_text
from safeamp.figures.look import BLACK, BLUE, GREY, PALE, VERMILLION, Margins, NotDrawnError
from safeamp.findings import Bound, Finding, Verdict
from safeamp.quantities import TEMPERATURE

TITLE = "How much of each limit is used"
#: Temperatures count as rise above this room, degC.
ROOM = 25.0
#: The bars end here; a longer one carries an arrow, its number stands beside it.
END = 1.5
ROW = 0.205
#: The longest id on the left, the longest value on the right; to measure each text would take half of the drawing.
MARGINS = Margins(left=1.58, right=1.88, bottom=0.66, top=0.28)
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
    """Return how much a finding uses of its stop level, or of its go level where it has no stop; a state uses none."""
    bound = finding.bound
    if finding.id in STATES or bound is None or (bound.go is None and bound.stop is None):
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
    return (
        MARGINS.bottom
        + MARGINS.top
        + 0.2
        + ROW * (len(findings) + len({finding.step for finding in findings}))
    )


def draw(axes: Axes, findings: Sequence[Finding]) -> str:
    """Draw one bar a finding; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If there is no finding.
    """
    if not findings:
        raise NotDrawnError("nothing was judged")
    place, rows = 0.0, []
    for step, group in groupby(sorted(findings, key=lambda one: one.step.place), key=lambda one: one.step):
        _left(axes, place, step.value, fontweight="bold")
        place += 1.0
        for finding in group:
            rows.append((place, finding))
            place += 1.0
    for at, finding in rows:
        _words_beside(axes, at, finding)
    _bars(axes, [(at, used(finding), finding.verdict) for at, finding in rows])
    axes.axvline(1.0, color=BLACK, lw=1.2, zorder=3)
    axes.set_yticks([])
    axes.grid(visible=False, axis="y")
    axes.set(xlim=(0.0, END), ylim=(place - 0.4, -0.7))
    axes.set_xticks([0.0, 0.25, 0.5, 0.75, 1.0, 1.25, END], ["0", "25", "50", "75", "100", "125", "150"])
    axes.set_xlabel(
        "Share of the stop level, of the go level where there is no stop (%)\n"
        "bar: nominal; line: worst corner; tick: go ends; temperatures as rise above 25 °C"
    )
    return _words(findings)


def _left(axes: Axes, place: float, said: str, **how: Any) -> None:
    """Write in front of a row; a tick of the axis would take ten times as long to make."""
    axes.annotate(
        said, (0.0, place), (-5, 0), textcoords="offset points", ha="right", va="center",
        annotation_clip=False, **how,
    )  # fmt: skip


def _words_beside(axes: Axes, place: float, finding: Finding) -> None:
    """Write id, word and value of a row."""
    _left(axes, place, finding.id)
    for points, said in ((9, finding.verdict.word), (60, value_text(finding))):
        axes.annotate(
            said, (END, place), (points, 0), textcoords="offset points", va="center", annotation_clip=False
        )


def _bars(axes: Axes, rows: Sequence[tuple[float, Used, Verdict]]) -> None:
    """Draw what has a nominal share: its bar, the line to its worst corner, the tick where go ends."""
    barred = [(at, one, one.nominal, word) for at, one, word in rows if one.nominal is not None]
    for verdict, how in FILLS.items():
        own = {at: min(share, END) for at, _, share, word in barred if word is verdict}
        if own:
            axes.barh(list(own), list(own.values()), 0.62, edgecolor=BLACK, lw=0.6, **how)
    worse = [
        (at, share, one.worst) for at, one, share, _ in barred if one.worst is not None and one.worst > share
    ]
    for at, share, worst in worse:
        axes.plot([min(share, END), min(worst, END)], [at, at], color=BLACK, lw=1.4)
    ends = [(at, worst) for at, _, worst in worse if worst <= END]
    beyond = [at for at, one, share, _ in barred if max(share, one.worst or 0.0) > END]
    for marker, points in (("|", [(worst, at) for at, worst in ends]), (">", [(END, at) for at in beyond])):
        if points:
            axes.plot(*zip(*points, strict=True), marker, color=BLACK, clip_on=False)
    ticks = [(at, one.go) for at, one, _, _ in barred if one.go is not None and one.go < 1.0]
    if ticks:
        places = np.array([at for at, _ in ticks])
        axes.vlines([go for _, go in ticks], places - 0.42, places + 0.42, color=GREY, lw=1.6, zorder=4)


def _words(findings: Sequence[Finding]) -> str:
    said = [
        f"{sum(one.verdict is verdict for one in findings)} {verdict.word}" for verdict in reversed(Verdict)
    ]
    over = [one.id for one in findings if (used(one).nominal or 0.0) > 1.0]
    beyond = f" Beyond the last level: {', '.join(over)}." if over else " None is beyond its last level."
    return f"{len(findings)} findings by step, {', '.join(said)}.{beyond}"
