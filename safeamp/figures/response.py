"""Low-frequency response through the output capacitor, with the -3 dB points marked."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier, Entry
from safeamp.answers import Bass
from safeamp.checks import driver as circuit
from safeamp.checks import operating
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal, text
from safeamp.figures.look import BLACK, BLUE, GREY, VERMILLION, NotDrawnError, logarithmic
from safeamp.physics import capacitor, coupling
from safeamp.quantities import CAPACITANCE, FREQUENCY, RESISTANCE

Values = npt.NDArray[np.float64]

TITLE = "Low notes through the output capacitor"
HALF_POWER = -10.0 * np.log10(2.0)
FLOOR = -18.0
POINTS = 400
STYLES: dict[str, tuple[Any, str, str]] = {
    "": ("-", BLACK, "o"),
    "minimum": ("--", BLACK, "s"),
    "low end": (":", VERMILLION, "v"),
    "high end": ("-.", BLUE, "^"),
    "driver": ((0, (6, 1, 1, 1, 1, 1)), GREY, "D"),
}


@dataclass(frozen=True, eq=False)
class Line:
    """One response: which one, its name, its -3 dB frequency (Hz), and its level (dB) at frequencies."""

    which: str
    name: str
    cutoff: float
    levels: Values


def _into(farads: float, ohms: float, hertz: Values, which: str = "") -> Line:
    cutoff = nominal(capacitor.cutoff_frequency(capacitance=farads, load_resistance=ohms))
    gain = capacitor.gain(frequency=hertz, capacitance=farads, load_resistance=ohms)
    said = f" ({which})" if which else ""
    name = f"{text(farads, CAPACITANCE)} into {text(ohms, RESISTANCE)}{said}"
    return Line(which, name, cutoff, 20.0 * np.log10(gain))


def lines_of(amplifier: Amplifier, entries: Mapping[str, Entry], hertz: Values) -> Iterator[Line]:
    """Yield the responses: nominal, into the minimum, at the ends of the tolerance, into the driver."""
    farads = nominal(amplifier.output_capacitor.capacitance)
    ohms, lowest = (nominal(load(amplifier)[0]) for load in (operating.nominal_load, operating.minimum_load))
    yield _into(farads, ohms, hertz)
    if lowest != ohms:
        yield _into(farads, lowest, hertz, "minimum")
    entry = entries.get("output_capacitor.capacitance")
    if entry is not None and entry.spread:
        yield _into(entry.low, lowest, hertz, "low end")
        yield _into(entry.high, ohms, hertz, "high end")
    yield from _driver_line(amplifier, farads, hertz)


def _driver_line(amplifier: Amplifier, farads: float, hertz: Values) -> Iterator[Line]:
    seen, series = circuit.seen_driver(amplifier), circuit.in_series(amplifier)
    if seen is None:
        return
    cutoff = coupling.cutoff_frequency(driver=seen, capacitance=farads, series_resistor=series)
    gain = coupling.response(driver=seen, frequency=hertz, capacitance=farads, series_resistor=series)
    yield Line(
        "driver", f"{text(farads, CAPACITANCE)} into the driver", nominal(cutoff), 20.0 * np.log10(gain)
    )


def draw(axes: Axes, amplifier: Amplifier, entries: Mapping[str, Entry]) -> str:
    """Draw the responses and the target; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If there is no output capacitor, or its capacitance is not known.
    """
    if not operating.is_capacitor_coupled(amplifier):
        raise NotDrawnError('stage.coupling = "direct": there is no output capacitor')
    (farads,) = needed(amplifier, "output_capacitor.capacitance")
    ohms = operating.nominal_load(amplifier)[0]
    middle = nominal(capacitor.cutoff_frequency(capacitance=farads, load_resistance=ohms))
    if np.isnan(middle):
        raise NotDrawnError("its cutoff cannot be computed")
    hertz = _around(middle)
    target = amplifier.output_capacitor.target_cutoff
    return _drawn(axes, list(lines_of(amplifier, entries, hertz)), hertz, target)


def draw_bass(axes: Axes, bass: Bass) -> str:
    """Draw what was computed without a sheet: the response, and that at each end of the tolerance."""
    cutoff = capacitor.cutoff_frequency(capacitance=bass.capacitance, load_resistance=bass.load)
    hertz = _around(nominal(cutoff))
    lines = [_into(bass.capacitance, bass.load, hertz)]
    ends = {"low end": bass.low, "high end": bass.high}
    lines += [_into(end, bass.load, hertz, which) for which, end in ends.items() if end != bass.capacitance]
    return _drawn(axes, lines, hertz, bass.target)


def _around(middle: float) -> Values:
    return np.geomspace(middle / 8.0, middle * 30.0, POINTS)


def _drawn(axes: Axes, lines: list[Line], hertz: Values, target: Any) -> str:
    for line in lines:
        style, colour, marker = STYLES[line.which]
        axes.plot(hertz, line.levels, linestyle=style, color=colour)
        axes.plot([line.cutoff], [HALF_POWER], marker, color=colour, markeredgecolor=BLACK, zorder=5)
        axes.plot([], [], linestyle=style, color=colour, marker=marker)
        axes.lines[-1].set_label(f"{line.name}: {text(line.cutoff, FREQUENCY)}")
    _frame(axes, target, hertz, max(float(line.levels.max()) for line in lines))
    said = "; ".join(f"{line.name}: {text(line.cutoff, FREQUENCY)}" for line in lines)
    return f"Level at the load against frequency through the output capacitor. -3 dB at: {said}."


def _frame(axes: Axes, target: Any, hertz: Values, top: float) -> None:
    logarithmic(axes, "x", float(hertz[0]), float(hertz[-1]))
    axes.axhline(HALF_POWER, color=GREY, lw=0.8, zorder=1)
    axes.annotate(
        "−3 dB", (hertz[-1], HALF_POWER), (0, -10), textcoords="offset points", ha="right", color=GREY
    )
    if target is not None:
        wanted = nominal(target)
        axes.axvline(wanted, color=GREY, lw=1.0, linestyle=(0, (5, 3)), zorder=1)
        axes.lines[-1].set_label(f"Target: {text(wanted, FREQUENCY)}")
    axes.set_yticks(np.arange(FLOOR, 0.1, 3.0))
    axes.set(ylim=(FLOOR, max(1.5, top + 1.0)), xlabel="Frequency (Hz)", ylabel="Level at the load (dB)")
    axes.legend(loc="lower right", title="−3 dB at", alignment="left")
