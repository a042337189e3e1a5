"""The ladder of temperatures from junction to air at four levels."""

from __future__ import annotations

import numpy as np
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier
from safeamp.checks import cycle, thermal
from safeamp.checks.trace import needed
from safeamp.checks.words import level, nominal, text
from safeamp.figures.levels import Level, levels_of, of_what
from safeamp.figures.look import BLACK, BLUE, GREY, VERMILLION, NotDrawnError, apart
from safeamp.limits import Limits
from safeamp.quantities import POWER, TEMPERATURE

TITLE = "Temperatures from junction to air"
RUNG = 0.12
#: Least distance of two labels, of the height drawn.
LEAST = 0.048
COLOURS = {"air": GREY, "heatsink": BLUE, "case": BLACK, "junction": VERMILLION, "peak": VERMILLION}
WIDTHS = {"air": 1.2, "heatsink": 2.6, "case": 1.2, "junction": 2.6, "peak": 1.0}


def ladder(amplifier: Amplifier, at: Level) -> dict[str, float]:
    """Return the temperatures of the hotter side at a level, degC, from air to junction."""
    sides = {side: thermal.temperatures(amplifier, at.heat, side) for side in ("upper", "lower")}
    side = max(sides, key=lambda one: nominal(sides[one].junction))
    hot = sides[side]
    rungs = {"air": needed(amplifier, "heatsink.air")[0]}
    if not np.isnan(nominal(hot.sink)):  # in free air the device is its own heatsink
        rungs |= {"heatsink": hot.sink, "case": hot.case}
    rungs["junction"] = hot.junction
    lifted = cycle.peak_over_mean(amplifier, side, at.fraction, hot) if at.fraction else 0.0
    if nominal(lifted) > 0.0:
        rungs["peak"] = hot.junction + lifted
    return {name: nominal(value) for name, value in rungs.items()}


def draw(axes: Axes, amplifier: Amplifier, limits: Limits) -> str:
    """Draw the ladder of each level and the limits; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If a temperature cannot be computed.
    """
    levels = levels_of(amplifier)
    ladders = [ladder(amplifier, at) for at in levels]
    if any(np.isnan(value) for rungs in ladders for value in rungs.values()):
        raise NotDrawnError("the temperatures cannot be computed")
    lines = _limits_of(amplifier, limits, ladders)
    values = [*lines.values(), *(value for rungs in ladders for value in rungs.values())]
    height = max(values) - min(values)
    lowest = [_rungs(axes, place, rungs, LEAST * height) for place, rungs in enumerate(ladders)]
    axes.set(xlim=(-0.35, len(levels) - 0.1))
    axes.set(ylim=(min(lowest) - LEAST * height, max(values) + 2.0 * LEAST * height))
    for name, limit in lines.items():
        axes.axhline(limit, color=VERMILLION, linestyle=(0, (5, 3)), lw=1.0, zorder=1)
        axes.annotate(name, (-0.32, limit), (0, 3), textcoords="offset points", fontsize=8)
    names = [f"{at.name}\n{text(at.heat.stage_power, POWER)}" for at in levels]
    axes.set_xticks(range(len(levels)), names)
    axes.grid(visible=False, axis="x")
    of = of_what(amplifier)
    further = f"\n{of}" if of else ""
    axes.set(
        ylabel="Temperature (°C)",
        xlabel=f"Level of a sine, share of the power at clipping; heat of the stage (W){further}",
    )
    return _words(levels, ladders)


def _limits_of(amplifier: Amplifier, limits: Limits, ladders: list[dict[str, float]]) -> dict[str, float]:
    both = [nominal(thermal.device_value(amplifier, side, "junction_limit")) for side in ("upper", "lower")]
    found = {f"junction limit {text(min(both), TEMPERATURE)}": min(both)}
    stop = level(limits["heat.heatsink"], "stop")
    if "heatsink" in ladders[0] and np.isfinite(stop):
        found[f"heatsink: stop above {text(stop, TEMPERATURE)}"] = stop
    return found


def _rungs(axes: Axes, place: int, rungs: dict[str, float], least: float) -> float:
    """Draw one ladder; return where its lowest label stands."""
    values = list(rungs.values())
    axes.plot([place, place], [min(values), max(values)], color=GREY, lw=1.0, zorder=2)
    labels = apart(values, least)
    for (name, value), beside in zip(rungs.items(), labels, strict=True):
        ends = [place - RUNG, place + RUNG]
        axes.plot(
            ends, [value, value], color=COLOURS[name], lw=WIDTHS[name], solid_capstyle="butt", label=name
        )
        axes.plot([place + RUNG, place + 1.6 * RUNG], [value, beside], color=GREY, lw=0.6)
        axes.text(
            place + 1.7 * RUNG, beside, f"{name} {value:.0f} °C", va="center_baseline", fontsize=8, zorder=4,
            bbox={"facecolor": "white", "edgecolor": "none", "pad": 0.5},
        )  # fmt: skip
    return min(labels)


def _words(levels: tuple[Level, ...], ladders: list[dict[str, float]]) -> str:
    said = [
        f"{at.name}: " + ", ".join(f"{name} {value:.0f} °C" for name, value in reversed(rungs.items()))
        for at, rungs in zip(levels, ladders, strict=True)
    ]
    return "Temperatures of the hotter side for a sine into the nominal load. " + "; ".join(said) + "."
