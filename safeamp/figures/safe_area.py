"""The plane of voltage and current: what a device stands, where a load takes it, and the worst point."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks import safe_area as check
from safeamp.checks.words import nominal, text
from safeamp.figures.look import BELOW, BLACK, BLUE, GREY, PALE, VERMILLION, NotDrawnError, logarithmic
from safeamp.physics.safe_area import ZONES, Rating, allowed_current, limiter_current
from safeamp.quantities import CURRENT, TEMPERATURE, VOLTAGE

Values = npt.NDArray[np.float64]

TITLE = "Safe area of the output device"
ANGLES = np.linspace(-90.0, 90.0, 721)
POINTS = 400
HEIGHT = 5.2


@dataclass(frozen=True, eq=False)
class Plane:
    """What is drawn: ratings, case temperature, and the loads with the worst one among them."""

    amplifier: Amplifier
    finding: str
    rating: Rating
    worst: check.Worst
    loads: tuple[check.Load, ...]

    @property
    def use(self) -> float:
        """Share of the safe area that is used, nominal."""
        return nominal(self.worst.point.use)

    @property
    def case(self) -> float:
        """Case temperature, degC."""
        return nominal(self.worst.case)

    def path(self, load: check.Load) -> tuple[Values, Values]:
        """Return the path of a load, V and A."""
        one_angle = load is self.worst.load and np.isfinite(self.worst.frequency)
        voltage, current = check.path_of(
            self.amplifier, self.worst.side, load, ANGLES, one_angle=bool(one_angle)
        )
        return np.asarray(voltage), np.asarray(current)


def plane_of(amplifier: Amplifier) -> Plane:
    """Return what is drawn of an amplifier: its loudspeaker, or the resistor where one is connected.

    Raises
    ------
    NotDrawnError
        If the use of the safe area cannot be computed.
    """
    resistor = check.resistors(amplifier)[0]
    finding, worst, loads = _judged(amplifier)
    if np.isnan(nominal(worst.point.use)):
        raise NotDrawnError("the use of the safe area cannot be computed")
    others = {load.name: load for load in (resistor, *loads) if load.name != worst.load.name}
    rating = check.rating_of(amplifier, worst.side)
    return Plane(amplifier, finding, rating, worst, (*others.values(), worst.load))


def _judged(amplifier: Amplifier) -> tuple[str, check.Worst, tuple[check.Load, ...]]:
    """Return the finding that is drawn, its worst point, and the loads that count besides."""
    if amplifier.loudspeaker.load == "resistor":
        return "soa.resistive_load", check.worst_into_resistor(amplifier), ()
    worst = check.worst_into_loudspeaker(amplifier)
    of_curve = amplifier.loudspeaker.impedance_curve is not None
    loads = () if of_curve else check.loads(amplifier, operating.phase_angle(amplifier))[:2]
    return "soa.loudspeaker", worst, loads


def draw(axes: Axes, plane: Plane, corner: float | None = None) -> str:
    """Draw the plane; return in words what it shows. `corner` is the use at the worst corner of the tolerances."""
    low, high = _span(plane)
    _boundaries(axes, plane, np.geomspace(low[0], nominal(plane.rating.voltage), POINTS))
    for load, style in zip(plane.loads, ("--", "-.", (0, (1, 1)), "-"), strict=False):
        worst = load is plane.worst.load
        axes.plot(*plane.path(load), linestyle="-" if worst else style, color=BLUE if worst else GREY)
        axes.lines[-1].set(label=load.name[0].upper() + load.name[1:], linewidth=2.0 if worst else 1.2)
    _mark(axes, plane, corner)
    _limiter(axes, plane, high[0])
    logarithmic(axes, "x", low[0], high[0])
    logarithmic(axes, "y", low[1], high[1])
    axes.set(xlabel="Voltage across the device (V)", ylabel="Current of the device (A)")
    axes.legend(**BELOW)
    return _words(plane)


def _limiter(axes: Axes, plane: Plane, most: float) -> None:
    points = plane.amplifier.protection.vi_limiter
    if not points:
        return
    voltage = np.geomspace(0.5, most, POINTS)
    current = limiter_current(voltage=voltage, points=points)
    axes.plot(
        voltage, current, color=BLACK, lw=1.2, linestyle=(0, (5, 1, 1, 1, 1, 1)), label="V-I limiter acts"
    )


def _span(plane: Plane) -> tuple[tuple[float, float], tuple[float, float]]:
    """Return the lower left and the upper right corner of what is worth drawing, V and A."""
    voltages, currents = zip(*(plane.path(load) for load in plane.loads), strict=True)
    rated = nominal(plane.rating.voltage), nominal(plane.rating.current)
    point = nominal(plane.worst.point.voltage), nominal(plane.worst.point.current)
    least = max(0.8 * float(np.min(voltages)), rated[0] / 200.0)
    edge = nominal(allowed_current(voltage=rated[0], case_temperature=plane.case, rating=plane.rating))
    lowest = min(0.5 * edge if edge > 0.0 else np.inf, 0.2 * float(np.max(currents)), 0.5 * point[1])
    top = 1.6 * max(rated[1], float(np.max(currents)))
    right = 1.4 * max(rated[0], float(np.max(voltages)))
    return (min(least, 0.8 * point[0]), max(lowest, top / 1e4)), (right, top)


def _boundaries(axes: Axes, plane: Plane, voltage: Values) -> None:
    rating, rated_at = plane.rating, nominal(plane.rating.power_at)
    cold = allowed_current(voltage=voltage, case_temperature=rated_at, rating=rating)
    warm = allowed_current(voltage=voltage, case_temperature=plane.case, rating=rating)
    known = voltage <= (nominal(rating.points[-1][0]) if rating.points else np.inf)
    said = f"case at {text(rated_at, TEMPERATURE)}", f"case at {text(plane.case, TEMPERATURE)}"
    for current, label, colour, width in ((cold, said[0], GREY, 1.0), (warm, said[1], BLACK, 2.2)):
        line = np.append(current[known], 0.0 if known.all() else np.nan)
        axes.plot(np.append(voltage[known], voltage[-1]), np.maximum(line, 1e-12), color=colour, lw=width)
        axes.lines[-1].set_label(f"Allowed, {label}")
        axes.plot(voltage[~known], current[~known], color=colour, lw=width, linestyle=":")
    if not known.all():
        axes.axvspan(voltage[known][-1], voltage[-1], facecolor="none", edgecolor=PALE, hatch="///", lw=0.0)
    for name, at, current_at in _zones(plane, voltage, cold):
        axes.annotate(name, (at, current_at), (5, 3), textcoords="offset points", color=GREY, fontsize=8)


def _zones(plane: Plane, voltage: Values, allowed: Values) -> Iterator[tuple[str, float, float]]:
    """Yield the name of each zone and a point in the middle of its piece of the cold boundary."""
    rating = plane.rating
    bare = allowed_current(
        voltage=voltage, case_temperature=nominal(rating.power_at), rating=replace(rating, points=())
    )
    zone = np.where(allowed < nominal(rating.current), ZONES.index("power"), ZONES.index("current"))
    zone = np.where(allowed < bare * (1.0 - 1e-9), ZONES.index("second breakdown"), zone)
    if rating.points:
        zone = np.where(voltage > nominal(rating.points[-1][0]), ZONES.index("unknown"), zone)
    for index in np.unique(zone):
        places = np.flatnonzero(zone == index)
        middle = places[len(places) // 2]
        yield ZONES[index], float(voltage[middle]), float(allowed[middle])
    yield ZONES[ZONES.index("voltage")], float(voltage[-1]), float(allowed[-1])


def _mark(axes: Axes, plane: Plane, corner: float | None) -> None:
    voltage, current = nominal(plane.worst.point.voltage), nominal(plane.worst.point.current)
    allowed = nominal(allowed_current(voltage=voltage, case_temperature=plane.case, rating=plane.rating))
    used = f"{plane.use:.0%} used" if np.isfinite(plane.use) else "current where none is allowed"
    if allowed > 0.0:
        axes.plot([voltage, voltage], [current, allowed], color=VERMILLION, lw=1.0, linestyle=":")
    axes.plot([voltage], [current], "D", color=VERMILLION, markeredgecolor=BLACK, markersize=7, zorder=5)
    at = f"{text(voltage, VOLTAGE)}, {text(current, CURRENT)}"
    further = "" if corner is None else f"; {corner:.0%} at the worst corner of the tolerances"
    axes.lines[-1].set_label(f"Worst point: {used} ({at}){further}")


def _words(plane: Plane) -> str:
    point, device = plane.worst.point, operating.device_of(plane.amplifier, plane.worst.side)
    used = f"{plane.use:.0%}" if np.isfinite(plane.use) else "more than all"
    return (
        f"Voltage and current of the {plane.worst.side} device, a {device.kind}, on logarithmic scales. Into "
        f"{plane.worst.load.name} the worst point is {text(point.voltage, VOLTAGE)} and "
        f"{text(point.current, CURRENT)}: {used} of what is allowed with the case at {text(plane.case, TEMPERATURE)}."
    )
