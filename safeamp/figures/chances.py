"""Where a finding lies over many samples inside the tolerances, with its limits."""

from __future__ import annotations

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.answers import FindingChances
from safeamp.figures.look import BELOW, BLACK, BLUE, PALE, VERMILLION, NotDrawnError
from safeamp.findings import Bound
from safeamp.quantities import show

Values = npt.NDArray[np.float64]

HEIGHT = 4.8
#: So many bars at most.
BARS = 50
#: A limit further from the samples than this many times their own range is named beside the picture, not drawn.
FAR = 2.0
UNITS = {"1": "ratio", "degC": "°C", "deg": "°", "ohm": "Ω"}


def title_of(chances: FindingChances) -> str:
    """Return the title of a picture."""
    return f"{chances.id} inside the tolerances"


def draw(axes: Axes, chances: FindingChances, bound: Bound | None) -> str:
    """Draw the histogram of a finding; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If nothing that varies is read, or every sample is without a finite value.
    """
    edges, shares = _bars(chances)
    axes.stairs(100.0 * shares, edges, fill=True, facecolor=PALE, edgecolor=BLACK, lw=0.8)
    span = (float(edges[0]), float(edges[-1]))
    drawn = _limits(axes, chances, bound, span)
    styles = (":", "-.", ":")
    for (share, value), style in zip(sorted(chances.quantiles.items()), styles, strict=False):
        if np.isfinite(value):
            axes.axvline(value, color=BLUE, linestyle=style, lw=1.3)
            axes.lines[-1].set_label(f"{share:.0%} of the samples up to {show(value, chances.kind)}")
    low, high = min([span[0], *drawn]), max([span[1], *drawn])
    room = 0.04 * (high - low)
    axes.set(xlim=(low - room, high + room), ylim=(0.0, 108.0 * float(shares.max())))
    unit = UNITS.get(chances.kind.unit, chances.kind.unit)
    axes.set(xlabel=f"{chances.id} ({unit})", ylabel="Samples (%)")
    axes.legend(**BELOW, title=_chances_text(chances), alignment="left")
    return f"Histogram of {chances.id}: {_chances_text(chances)}."


def _bars(chances: FindingChances) -> tuple[Values, Values]:
    found = chances.histogram
    if found is None or not sum(found.counts):
        raise NotDrawnError("it has the same value, or none, in every sample")
    counts = np.array(found.counts, dtype=float)
    filled = np.flatnonzero(counts)
    first, last = int(filled[0]), int(filled[-1]) + 1
    each = max(1, -(-(last - first) // BARS))
    padded = np.zeros(-(-(last - first) // each) * each)
    padded[: last - first] = counts[first:last]
    bars = padded.reshape(-1, each).sum(axis=1)
    edges = np.asarray(found.low + found.width * (first + each * np.arange(len(bars) + 1)), dtype=float)
    shares: Values = bars / (counts.sum() + found.outside + chances.unknown)
    return edges, shares


def _limits(
    axes: Axes, chances: FindingChances, bound: Bound | None, span: tuple[float, float]
) -> list[float]:
    """Draw the levels that are near enough; name the others in the legend. Return those drawn."""
    drawn = []
    for name, level, style in _levels(bound):
        said = f"{name} {show(level, chances.kind)}"
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
    return ", ".join(f"{word.word} {_percent(share)}" for word, share in words.items())


def _percent(share: float) -> str:
    """Return a share that is neither nought nor whole so that it does not look like either."""
    if 0.0 < share < 0.0005:
        return "under 0.1%"
    return "over 99.9%" if 0.9995 <= share < 1.0 else f"{share:.1%}"
