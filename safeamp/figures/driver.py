"""The loudspeaker: its impedance over frequency, and the travel of its cone at clipping."""

from __future__ import annotations

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier, Curve
from safeamp.checks import driver as circuit
from safeamp.checks import operating
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal, text
from safeamp.figures.look import BELOW, BLACK, BLUE, GREY, VERMILLION, NotDrawnError, logarithmic
from safeamp.physics import driver
from safeamp.physics.driver import Driver
from safeamp.quantities import FREQUENCY, LENGTH, RESISTANCE, VOLTAGE

Values = npt.NDArray[np.float64]

IMPEDANCE = "Impedance of the loudspeaker"
EXCURSION = "Travel of the cone at clipping"
HEIGHT = 4.8
LOWEST, HIGHEST = 10.0, 20e3
POINTS = 800


def _driver(amplifier: Amplifier) -> Driver:
    found = circuit.driver_of(amplifier)
    if found is None:
        raise NotDrawnError(f"not given: {', '.join(circuit.parameters_of(amplifier).missing())}")
    return found


def draw_impedance(axes: Axes, amplifier: Amplifier) -> str:
    """Draw magnitude and angle, measured or from the driver's parameters; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If neither a curve nor the parameters are given.
    """
    curve = amplifier.loudspeaker.impedance_curve
    if isinstance(curve, Curve):
        said, hertz = "measured", np.array(curve.frequencies)
        ohms, degrees = np.array(curve.impedances), np.array(curve.phases)
    else:
        said, hertz = "from the driver's parameters", np.geomspace(LOWEST, HIGHEST, POINTS)
        ohms, degrees = driver.impedance(driver=_driver(amplifier), frequency=hertz)
    angles = axes.twinx()
    angles.plot(hertz, degrees, color=BLUE, linestyle="--", lw=1.1)
    axes.plot([], [], color=BLUE, linestyle="--", lw=1.1, label="Angle (right)")
    axes.plot(hertz, ohms, color=BLACK, lw=2.0, label=f"Magnitude, {said}")
    least = _mark_least(axes, hertz, ohms)
    counted = nominal(operating.believed_nominal(amplifier))
    axes.axhline(counted, color=GREY, linestyle=":", lw=1.4, zorder=1)
    axes.lines[-1].set_label(f"Nominal {text(counted, RESISTANCE)}")
    logarithmic(axes, "x", float(hertz[0]), float(hertz[-1]))
    axes.set(
        ylim=(0.0, 1.25 * float(max(ohms.max(), counted))), xlabel="Frequency (Hz)", ylabel="Magnitude (Ω)"
    )
    angles.set(ylim=(-95.0, 95.0), ylabel="Angle (°)", yticks=[-90.0, -45.0, 0.0, 45.0, 90.0])
    angles.grid(visible=False)
    angles.spines["right"].set_visible(True)
    axes.legend(**BELOW)
    return (
        f"Impedance of one loudspeaker over frequency, {said}: {least}; "
        f"largest angle {np.abs(degrees).max():.0f} deg."
    )


def _mark_least(axes: Axes, hertz: Values, ohms: Values) -> str:
    place = int(np.argmin(ohms))
    said = f"lowest {text(ohms[place], RESISTANCE)} at {text(hertz[place], FREQUENCY)}"
    axes.plot([hertz[place]], [ohms[place]], "v", color=VERMILLION, markeredgecolor=BLACK, zorder=5)
    axes.lines[-1].set_label(said[0].upper() + said[1:])
    return said


def draw_excursion(axes: Axes, amplifier: Amplifier) -> str:
    """Draw the travel of the cone for a sine at clipping; return in words what it shows.

    Raises
    ------
    NotDrawnError
        If the driver's parameters or its force factor are not given, or the clipped peak is not known.
    """
    one, force = _driver(amplifier), amplifier.loudspeaker.force_factor
    if force is None:
        raise NotDrawnError("not given: loudspeaker.force_factor")
    across = 2.0 if amplifier.stage.bridged else 1.0
    peak = nominal(operating.clipping_peak(amplifier) * across / needed(amplifier, "loudspeaker.series")[0])
    if np.isnan(peak):
        raise NotDrawnError("the clipped peak cannot be computed")
    resonance = nominal(circuit.parameters_of(amplifier).resonance)
    hertz = np.geomspace(min(circuit.LOWEST, resonance), max(500.0, resonance * 8.0), POINTS)
    travel = 1e3 * driver.excursion(driver=one, force_factor=force, peak=peak, frequency=hertz)
    axes.plot(
        hertz, travel, color=BLACK, lw=2.0, label=f"Sine of {text(peak, VOLTAGE)} peak at its terminals"
    )
    most = _mark_most(axes, hertz, travel)
    top = float(travel.max())
    linear = amplifier.loudspeaker.linear_excursion
    if linear is not None:
        axes.axhline(1e3 * nominal(linear), color=VERMILLION, linestyle=(0, (5, 3)), lw=1.0, zorder=1)
        axes.lines[-1].set_label(f"Linear up to {text(linear, LENGTH)}")
        top = max(top, 1e3 * nominal(linear))
    logarithmic(axes, "x", float(hertz[0]), float(hertz[-1]))
    axes.set(ylim=(0.0, 1.15 * top), xlabel="Frequency (Hz)", ylabel="Travel of the cone, one way (mm)")
    axes.legend(**BELOW)
    return f"Travel of the cone one way over frequency for a sine at clipping at its terminals: {most}."


def _mark_most(axes: Axes, hertz: Values, travel: Values) -> str:
    place = int(np.argmax(travel))
    said = f"most {text(1e-3 * travel[place], LENGTH)} at {text(hertz[place], FREQUENCY)}"
    at = [hertz[place]], [travel[place]]
    axes.plot(*at, "D", color=VERMILLION, markeredgecolor=BLACK, zorder=5, clip_on=False)
    axes.lines[-1].set_label(said[0].upper() + said[1:])
    return said
