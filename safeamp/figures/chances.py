"""Where a finding lies over many samples inside the tolerances, with its limits."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes
from matplotlib.ticker import FuncFormatter

from safeamp.answers import FindingChances
from safeamp.checks.amounts import percent, shown_kind
from safeamp.figures.look import BELOW, BLACK, BLUE, PALE, VERMILLION, NotDrawnError, plain_number
from safeamp.findings import Bound
from safeamp.quantities import PERCENT, show

Values = npt.NDArray[np.float64]

HEIGHT = 4.8
#: So many bars at most.
BARS = 50
#: A limit further from the samples than this many times their own range is named beside the picture, not drawn.
FAR = 2.0
#: A tail is cut this many times the last level from nought.
REACH = 10.0
UNITS = {"1": "ratio", "degC": "°C", "deg": "°", "ohm": "Ω"}


def title_of(chances: FindingChances) -> str:
    """Return the title of a picture."""
    return f"{chances.id} inside the tolerances"


def draw(axes: Axes, chances: FindingChances, bound: Bound | None, *, alone: bool = True) -> str:
    """Draw the histogram of a finding; return in words what it shows.

    Parameters
    ----------
    bound : Bound or None
        Its levels.
    alone : bool
        Whether these levels alone make its word.

    Raises
    ------
    NotDrawnError
        If nothing that varies is read, or every sample is without a finite value.
    """
    bars = _bars(chances, bound)
    edges, kind = bars.edges, shown_kind(chances)
    axes.stairs(100.0 * bars.shares, edges, fill=True, facecolor=PALE, edgecolor=BLACK, lw=0.8)
    span = (float(edges[0]), float(edges[-1]))
    drawn = _limits(axes, chances, bound, span)
    _quantiles(axes, chances, span)
    for said in (*_not_drawn(chances, bars), *(() if alone else ("the word rests on more than this value",))):
        axes.plot([], [], linestyle="none", label=said)
    low, high = min([span[0], *drawn]), max([span[1], *drawn])
    room = 0.04 * (high - low)
    axes.set(xlim=(low - room, high + room), ylim=(0.0, 108.0 * float(bars.shares.max())))
    unit = "%" if kind == PERCENT else UNITS.get(kind.unit, kind.unit)
    axes.set(xlabel=f"{chances.id} ({unit})", ylabel="Samples (%)")
    if kind == PERCENT:
        axes.xaxis.set_major_formatter(FuncFormatter(lambda share, _: plain_number(100.0 * share)))
    axes.legend(**BELOW, title=_chances_text(chances), alignment="left")
    return f"Histogram of {chances.id}: {_chances_text(chances)}."


class _Bars(NamedTuple):
    """Bars with their edges: shares of all samples; the share beyond the last one, where a long tail is cut."""

    edges: Values
    shares: Values
    beyond: float


def _bars(chances: FindingChances, bound: Bound | None) -> _Bars:
    found = chances.histogram
    if found is None or not sum(found.counts):
        raise NotDrawnError("it has the same value, or none, in every sample")
    counts = np.array(found.counts, dtype=float)
    filled = np.flatnonzero(counts)
    first, last = int(filled[0]), int(filled[-1]) + 1
    cut = (_end(chances, bound) - found.low) / found.width
    last = max(first + 1, min(last, round(cut) if cut < last else last))
    each = max(1, -(-(last - first) // BARS))
    padded = np.zeros(-(-(last - first) // each) * each)
    padded[: last - first] = counts[first:last]
    bars = padded.reshape(-1, each).sum(axis=1)
    edges = np.asarray(found.low + found.width * (first + each * np.arange(len(bars) + 1)), dtype=float)
    whole = _samples(chances)
    return _Bars(edges, bars / whole, float(counts[last:].sum()) / whole)


def _end(chances: FindingChances, bound: Bound | None) -> float:
    """Return where a long tail is cut: many times the last level, but beyond half of the samples."""
    levels = [level for _, level, _ in _levels(bound) if np.isfinite(level) and level > 0.0]
    median = chances.quantiles.get(0.5, np.inf)
    if not levels:
        return np.inf
    return max(REACH * max(levels), 2.0 * median if np.isfinite(median) else 0.0)


def _samples(chances: FindingChances) -> float:
    found = chances.histogram
    return float(chances.unknown + (0 if found is None else sum(found.counts) + found.outside))


def _not_drawn(chances: FindingChances, bars: _Bars) -> list[str]:
    """Return how many samples have no place in the bars, and why."""
    outside = 0 if chances.histogram is None else chances.histogram.outside
    why = [f"beyond {show(float(bars.edges[-1]), shown_kind(chances), 4)}"] if bars.beyond else []
    if outside:
        why += ["without bound"] if bars.beyond else ["outside these bars", "without bound"]
    if chances.unknown:
        why.append("without a value")
    if not why:
        return []
    share = bars.beyond + (outside + chances.unknown) / _samples(chances)
    return [f"{percent(share)} of the samples not drawn: {' or '.join(why)}"]


def _quantiles(axes: Axes, chances: FindingChances, span: tuple[float, float]) -> None:
    """Draw the values that some shares of the samples do not exceed; name those beyond the cut."""
    for (share, value), style in zip(sorted(chances.quantiles.items()), (":", "-.", ":"), strict=False):
        if np.isfinite(value):
            said = f"{share:.0%} of the samples up to {show(value, shown_kind(chances), 4)}"
            if value > span[1]:
                axes.plot([], [], color=BLUE, linestyle=style, lw=1.3, label=f"{said} (far to the right)")
            else:
                axes.axvline(value, color=BLUE, linestyle=style, lw=1.3, label=said)


def _limits(
    axes: Axes, chances: FindingChances, bound: Bound | None, span: tuple[float, float]
) -> list[float]:
    """Draw the levels that are near enough; name the others in the legend. Return those drawn."""
    drawn = []
    for name, level, style in _levels(bound):
        said = f"{name} {show(level, shown_kind(chances))}"
        reach = FAR * (span[1] - span[0])
        if span[0] - reach <= level <= span[1] + reach:
            axes.axvline(level, color=VERMILLION, linestyle=style, lw=2.4, label=said)
            drawn.append(level)
        else:
            side = "left" if level < span[0] else "right"
            axes.plot([], [], color=VERMILLION, linestyle=style, lw=2.4, label=f"{said} (far to the {side})")
    return drawn


def _levels(bound: Bound | None) -> list[tuple[str, float, str]]:
    if bound is None:
        return []
    go = bound.go if isinstance(bound.go, tuple) else (bound.go,)
    word = {"at least": "from", "at most": "up to", "between": "within"}[bound.sense]
    found = [(f"go {word}", level, "--") for level in go if level is not None]
    if bound.stop is not None:
        found.append(("stop below" if bound.sense == "at least" else "stop above", bound.stop, "-"))
    return found


def _chances_text(chances: FindingChances) -> str:
    words = {word: chance.share for word, chance in sorted(chances.words.items()) if chance.share > 0.0}
    return ", ".join(f"{word.word} {percent(share)}" for word, share in words.items())
