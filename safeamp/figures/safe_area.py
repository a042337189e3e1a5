"""The plane of voltage and current: what a device stands, where a load takes it, and the worst point."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.answers import Plane
from safeamp.checks.words import nominal, text
from safeamp.figures.look import BELOW, BLACK, BLUE, GREY, PALE, VERMILLION, logarithmic
from safeamp.figures.names import Piece, name_pieces
from safeamp.physics.safe_area import ZONES, Rating, allowed_current, limiter_current
from safeamp.physics.safe_area.boundary import boundary
from safeamp.physics.safe_area.pulse import pulsed
from safeamp.quantities import CURRENT, TEMPERATURE, VOLTAGE

Values = npt.NDArray[np.float64]

TITLE = "Safe area of the output device"
HEIGHT = 5.2
POINTS = 400
#: The scale of voltages begins at this part of the rated one at the latest: it has no place for 0 V.
EDGE = 1000.0
DASHES = ("--", "-.", (0, (1, 1)))


def draw(axes: Axes, plane: Plane, corner: float | None = None) -> str:
    """Draw the plane; return in words what it shows. `corner` is the use at the worst corner of the tolerances."""
    low, high = _span(plane)
    voltage = np.geomspace(low[0], nominal(plane.rating.voltage), POINTS)
    _boundaries(axes, plane, voltage)
    *others, worst = plane.paths
    for path, dashes in zip(others, DASHES, strict=False):
        axes.plot(
            path.voltage, path.current, linestyle=dashes, color=GREY, lw=1.2, label=_sentence(path.name)
        )
    axes.plot(worst.voltage, worst.current, color=BLUE, lw=2.0, label=_sentence(worst.name))
    _mark(axes, plane, low[0], corner)
    _cuts(axes, plane, voltage)
    logarithmic(axes, "x", low[0], high[0])
    logarithmic(axes, "y", low[1], high[1])
    axes.set(xlabel="Voltage across the device (V)", ylabel="Current of the device (A)")
    axes.legend(**BELOW)
    name_pieces(axes, _zones(plane.rating, voltage, low[1]))
    return _words(plane)


def _sentence(name: str) -> str:
    return name[0].upper() + name[1:]


def _span(plane: Plane) -> tuple[tuple[float, float], tuple[float, float]]:
    """Return the lower left and the upper right corner of what is worth drawing, V and A; both above nought."""
    voltages = np.concatenate([path.voltage for path in plane.paths])
    most = max(float(np.max(path.current)) for path in plane.paths)
    rated = nominal(plane.rating.voltage), nominal(plane.rating.current)
    edge = nominal(allowed_current(voltage=rated[0], case_temperature=plane.case, rating=plane.rating))
    least = max(0.8 * float(np.min(voltages)), rated[0] / 200.0)
    lowest = min(0.5 * edge if edge > 0.0 else np.inf, 0.2 * most, 0.5 * plane.current)
    top = 1.6 * max(rated[1], most)
    right = 1.4 * max(rated[0], float(np.max(voltages)))
    left = max(min(least, 0.8 * plane.voltage), rated[0] / EDGE)
    return (left, max(lowest, top / 1e4)), (right, top)


def _boundaries(axes: Axes, plane: Plane, voltage: Values) -> None:
    rating, rated_at = plane.rating, nominal(plane.rating.power_at)
    cold = allowed_current(voltage=voltage, case_temperature=rated_at, rating=rating)
    warm = allowed_current(voltage=voltage, case_temperature=plane.case, rating=rating)
    known = voltage <= (nominal(rating.points[-1][0]) if rating.points else np.inf)
    said = f"case at {text(rated_at, TEMPERATURE)}", f"case at {text(plane.case, TEMPERATURE)}"
    for current, label, colour, width in ((cold, said[0], GREY, 1.0), (warm, said[1], BLACK, 2.2)):
        if not np.any(current > 0.0):
            axes.plot([], [], linestyle="none", label=f"Nothing allowed, {label}")
            continue
        line = np.append(current[known], 0.0 if known.all() else np.nan)
        axes.plot(np.append(voltage[known], voltage[-1]), np.maximum(line, 1e-12), color=colour, lw=width)
        axes.lines[-1].set_label(f"Allowed, {label}")
        axes.plot(voltage[~known], current[~known], color=colour, lw=width, linestyle=":")
    if not known.all():
        axes.axvspan(voltage[known][-1], voltage[-1], facecolor="none", edgecolor=PALE, hatch="///", lw=0.0)


def _zones(rating: Rating, voltage: Values, floor: float) -> Iterator[Piece]:
    """Yield each zone and its piece of the cold boundary, the last one down to the lowest current drawn."""
    power_at = nominal(rating.power_at)
    allowed = allowed_current(voltage=voltage, case_temperature=power_at, rating=rating)
    bare = allowed_current(voltage=voltage, case_temperature=power_at, rating=replace(rating, points=()))
    zone = np.where(allowed < nominal(rating.current), ZONES.index("power"), ZONES.index("current"))
    zone = np.where(allowed < bare * (1.0 - 1e-9), ZONES.index("second breakdown"), zone)
    if rating.points:
        zone = np.where(voltage > nominal(rating.points[-1][0]), ZONES.index("unknown"), zone)
    for index in np.unique(zone):
        yield Piece(ZONES[index], voltage[zone == index], allowed[zone == index])
    end = float(allowed[-1])
    goes_down = end > floor and ZONES.index("unknown") not in zone
    down = np.geomspace(end, floor, POINTS) if goes_down else np.array([end])
    yield Piece(ZONES[ZONES.index("voltage")], np.full(len(down), voltage[-1]), down)


def _mark(axes: Axes, plane: Plane, left: float, corner: float | None) -> None:
    """Mark the worst point, at the edge where the scale does not reach down to its voltage."""
    allowed = nominal(
        allowed_current(voltage=plane.voltage, case_temperature=plane.case, rating=plane.rating)
    )
    place = max(plane.voltage, left)
    if allowed > 0.0 and plane.pulse is None:
        axes.plot([place] * 2, [plane.current, allowed], color=VERMILLION, lw=1.0, linestyle=":")
    used = f"{plane.use:.0%} used" if np.isfinite(plane.use) else "current where none is allowed"
    at = f"{text(plane.voltage, VOLTAGE)}, {text(plane.current, CURRENT)}"
    edge = "\nmarked at the left edge: this scale has no 0 V" if plane.voltage < left else ""
    further = "" if corner is None else f"; {corner:.0%} at the worst corner of the tolerances"
    axes.plot([place], [plane.current], "D", color=VERMILLION, markeredgecolor=BLACK, ms=7, zorder=5)
    axes.lines[-1].set(label=f"Worst point: {used} ({at}){further}{edge}", clip_on=False)


def _cuts(axes: Axes, plane: Plane, voltage: Values) -> None:
    """Draw what else bounds the current: pulse curves, and a V-I limiter."""
    if plane.pulse is not None:
        area = pulsed(boundary(plane.rating, plane.case), plane.pulse, plane.steady)
        axes.plot(voltage, area.pulse_allowed(voltage), color=BLACK, lw=1.2, linestyle=(0, (4, 2)))
        axes.lines[-1].set_label(
            "Allowed for half a cycle of the lowest note, beside what flows all the time"
        )
    if plane.limiter:
        current = limiter_current(voltage=voltage, points=plane.limiter)
        axes.plot(voltage, current, color=BLACK, lw=1.2, linestyle=(0, (5, 1, 1, 1, 1, 1)))
        axes.lines[-1].set_label("V-I limiter acts")


def _words(plane: Plane) -> str:
    used = f"{plane.use:.0%}" if np.isfinite(plane.use) else "more than all"
    return (
        f"Voltage and current of the {plane.device}, on logarithmic scales. Into {plane.paths[-1].name} the worst "
        f"point is {text(plane.voltage, VOLTAGE)} and {text(plane.current, CURRENT)}: {used} of what is allowed with "
        f"the case at {text(plane.case, TEMPERATURE)}."
    )
