"""Heat of the stage against output level."""

from __future__ import annotations

import numpy as np
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.words import nominal, text
from safeamp.figures.levels import FRACTIONS, Level, heat_over_level, levels_of, of_what
from safeamp.figures.look import BLACK, BLUE, VERMILLION, NotDrawnError
from safeamp.quantities import POWER, RESISTANCE

TITLE = "Heat against output level"


def draw(axes: Axes, amplifier: Amplifier) -> str:
    """Draw the heat into a resistor and into a turned load; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If the heat cannot be computed.
    """
    heat, levels = heat_over_level(amplifier), levels_of(amplifier)
    if np.isnan(heat).any():
        raise NotDrawnError("the heat of the stage cannot be computed")
    ohms = text(operating.nominal_load(amplifier)[0], RESISTANCE)
    beside = "" if amplifier.stage.series_resistor is None else ", the load with its series resistor"
    axes.plot(100.0 * FRACTIONS, heat, color=BLACK, label=f"Into a resistor of {ohms}{beside}")
    top = heat
    if amplifier.loudspeaker.load != "resistor":
        angle = nominal(operating.phase_angle(amplifier))
        top = heat_over_level(amplifier, angle)
        label = f"Same voltage into {ohms} at {angle:.0f} deg"
        axes.plot(100.0 * FRACTIONS, top, color=BLUE, linestyle="--", label=label)
    _mark(axes, levels)
    axes.set(xlim=(-2.0, 102.0), ylim=(0.0, 1.15 * max(float(top.max()), float(heat.max()))))
    whole = text(operating.clipping_power(amplifier), POWER)
    of = of_what(amplifier)
    further = f"\n{whole}: {of}" if of else ""
    axes.set(xlabel=f"Level of a sine: share of the {whole} at clipping (%){further}")
    axes.set(ylabel="Heat of the stage (W)")
    axes.legend(loc="lower right")
    said = ", ".join(f"{text(at.watts, POWER)} at {at.name}" for at in levels)
    own = f" ({of})" if of else ""
    return f"Heat of one stage against the level of a sine, {whole} at clipping into {ohms}{own}: {said}."


def _mark(axes: Axes, levels: tuple[Level, ...]) -> None:
    for at, marker in zip(levels, "os^D", strict=False):
        fill = VERMILLION if at.hottest else "white"
        axes.plot([100.0 * at.fraction], [at.watts], marker, color=fill, markeredgecolor=BLACK, zorder=5)
        axes.lines[-1].set_label(f"{at.name[0].upper()}{at.name[1:]}: {text(at.watts, POWER)}")
