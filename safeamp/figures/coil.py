"""Temperature of the voice coil with a device shorted, and what stops it in what time."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier
from safeamp.checks import loudspeaker as check
from safeamp.checks import operating
from safeamp.checks.fault_also import fault_current
from safeamp.checks.fuses import gates_of
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal, text
from safeamp.figures.look import BELOW, BLACK, BLUE, GREY, VERMILLION, WASH, NotDrawnError, logarithmic
from safeamp.limits import Limits
from safeamp.physics.coil_heating import fault_coil_temperature
from safeamp.physics.fuse import fastest_time
from safeamp.quantities import TEMPERATURE, TIME, VOLTAGE

TITLE = "Voice coil with a rail on it"
HEIGHT = 4.8
POINTS = 300
#: Times left and right of the first and the last event, as a ratio.
MARGIN = 6.0


@dataclass(frozen=True)
class Fault:
    """A direct voltage on the coil: what is drawn of it, nominal; s, degC."""

    volts: float
    limit: float
    burns: float
    relay: float
    fuse: float
    fuse_earliest: float

    @property
    def events(self) -> list[float]:
        """The times at which something happens, s."""
        return [one for one in (self.burns, self.relay, self.fuse) if np.isfinite(one) and one > 0.0]


def fault_of(amplifier: Amplifier, limits: Limits) -> Fault:
    """Return the fault of an amplifier.

    Raises
    ------
    NotDrawnError
        If the output capacitor blocks it, or the coil's heating is not known.
    """
    coupled = operating.is_capacitor_coupled(amplifier)
    if coupled and np.all(np.asarray(check.capacitor_holds(amplifier))):
        raise NotDrawnError("the output capacitor blocks the whole rail")
    found = check.fault_of(amplifier)
    burns = nominal(check.time_to_limit(amplifier, found))
    if np.isnan(burns):
        raise NotDrawnError("the heating of the coil cannot be computed")
    relay, fuse = check.relay_time(amplifier), check.fuse_time(amplifier, found, limits)
    return Fault(
        volts=nominal(found.volts),
        limit=nominal(needed(amplifier, "loudspeaker.coil_limit")[0]),
        burns=burns,
        relay=nominal(relay),
        fuse=nominal(fuse),
        fuse_earliest=_earliest(amplifier, found, limits),
    )


def _earliest(amplifier: Amplifier, found: check.Fault, limits: Limits) -> float:
    """Return the time before which the fuse does not act with the coil still cold, s; nan without one."""
    fitted = amplifier.protection.loudspeaker_fuse
    if fitted is None:
        return np.nan
    (coil,) = needed(amplifier, "loudspeaker.dc_resistance")
    times = fault_current(amplifier, found.volts, coil) / fitted.rating
    return nominal(fastest_time(times_rating=times, gates=gates_of(fitted, limits)))


def draw(axes: Axes, amplifier: Amplifier, limits: Limits) -> str:
    """Draw temperature over time with what acts; return in words what it shows.

    Raises
    ------
    NotDrawnError
        As `fault_of`.
    """
    fault = fault_of(amplifier, limits)
    events = fault.events or [1.0]
    seconds = np.geomspace(min(events) / MARGIN, max(events) * MARGIN, POINTS)
    heated = check.heating(amplifier, check.fault_of(amplifier))
    degrees = fault_coil_temperature(**heated, time=seconds)
    start = nominal(heated["start"])
    top = fault.limit + 0.3 * (fault.limit - start)
    axes.plot(seconds, degrees, color=BLACK, lw=2.2, label=f"Coil at {text(fault.volts, VOLTAGE)}")
    axes.axhline(fault.limit, color=VERMILLION, linestyle=(0, (5, 3)), lw=1.0)
    axes.lines[-1].set_label(f"Coil limit {text(fault.limit, TEMPERATURE)}")
    if np.isfinite(fault.burns):
        axes.plot([fault.burns], [fault.limit], "D", color=VERMILLION, markeredgecolor=BLACK, zorder=5)
        axes.lines[-1].set_label(f"Limit reached after {text(fault.burns, TIME)}")
    _protection(axes, fault, (float(seconds[0]), float(seconds[-1])))
    logarithmic(axes, "x", float(seconds[0]), float(seconds[-1]), steps=(1.0, 3.0))
    axes.set(ylim=(start - 0.05 * (top - start), max(top, start + 5.0)))
    axes.set(xlabel="Time after the fault (s)", ylabel="Temperature of the coil (°C)")
    axes.legend(**BELOW)
    return _words(fault)


def _protection(axes: Axes, fault: Fault, span: tuple[float, float]) -> None:
    if np.isfinite(fault.relay):
        axes.axvline(
            fault.relay, color=BLUE, linestyle="--", label=f"Relay opens after {text(fault.relay, TIME)}"
        )
    if np.isfinite(fault.fuse):
        label = f"Fuse at the latest after {text(fault.fuse, TIME)}"
        axes.axvline(fault.fuse, color=GREY, linestyle="-.", label=label)
        earliest = max(fault.fuse_earliest, span[0])
        if earliest < fault.fuse:
            axes.axvspan(
                earliest, fault.fuse, facecolor=WASH, edgecolor="none", zorder=0, label="Fuse may act"
            )


def _words(fault: Fault) -> str:
    reached = f"after {text(fault.burns, TIME)}" if np.isfinite(fault.burns) else "never"
    acting = {"the relay": fault.relay, "the fuse at the latest": fault.fuse}
    acts = [f"{name} acts after {text(after, TIME)}" for name, after in acting.items() if np.isfinite(after)]
    return (
        f"Temperature of the voice coil after {text(fault.volts, VOLTAGE)} comes on: its limit of "
        f"{text(fault.limit, TEMPERATURE)} is reached {reached}; {', '.join(acts) or 'nothing stops it'}."
    )
