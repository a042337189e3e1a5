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
from safeamp.quantities import CURRENT, TEMPERATURE, TIME, VOLTAGE, Number

TITLE = "Voice coil with a rail on it"
HEIGHT = 4.8
POINTS = 300
#: Times left and right of the first and the last event, as a ratio.
MARGIN = 6.0
#: So many of the longest time constants until nothing is seen to move.
SETTLED = 6.0


@dataclass(frozen=True)
class Fault:
    """A direct voltage on the coil: what is drawn of it, nominal; s, degC."""

    volts: float
    limit: float
    burns: float
    relay: float
    fuse: float
    fuse_earliest: float
    fuse_name: str
    settles: float

    @property
    def span(self) -> tuple[float, float]:
        """The times between which everything happens, s; to the end state where the limit is never reached."""
        happens = (self.burns, self.relay, self.fuse, self.fuse_earliest)
        events = [one for one in happens if np.isfinite(one) and one > 0.0] or [1.0]
        last = max(events) * MARGIN
        return min(events) / MARGIN, last if np.isfinite(self.burns) else max(last, self.settles)


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
    fitted = amplifier.protection.loudspeaker_fuse
    return Fault(
        volts=nominal(found.volts),
        limit=nominal(needed(amplifier, "loudspeaker.coil_limit")[0]),
        burns=burns,
        relay=nominal(relay),
        fuse=nominal(fuse),
        fuse_earliest=_earliest(amplifier, found, limits),
        fuse_name="" if fitted is None else f"{fitted.letter} {text(fitted.rating, CURRENT)}",
        settles=SETTLED * nominal(_slowest(amplifier)),
    )


def _slowest(amplifier: Amplifier) -> Number:
    """Return about the longest time constant of a coil on its magnet, s."""
    coil, fast, magnet, slow = needed(amplifier, *check.THERMAL[:4])
    longest: Number = slow + (1.0 + magnet / coil) * fast
    return longest


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
    first, last = fault.span
    seconds = np.geomspace(first, last, POINTS)
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
    else:
        axes.plot([], [], linestyle="none", label="Limit never reached")
    _protection(axes, fault)
    logarithmic(axes, "x", first, last, steps=(1.0, 3.0))
    axes.set(ylim=(start - 0.05 * (top - start), max(top, start + 5.0)))
    axes.set(xlabel="Time after the fault (s)", ylabel="Temperature of the coil (°C)")
    axes.legend(**BELOW)
    return _words(fault)


def _protection(axes: Axes, fault: Fault) -> None:
    if np.isfinite(fault.relay):
        axes.axvline(
            fault.relay, color=BLUE, linestyle="--", label=f"Relay opens after {text(fault.relay, TIME)}"
        )
    if not fault.fuse_name or np.isnan(fault.fuse):
        return
    first, last = fault.span
    may = "Fuse may act"
    if np.isfinite(fault.fuse):
        label = f"Fuse at the latest after {text(fault.fuse, TIME)}"
        axes.axvline(fault.fuse, color=GREY, linestyle="-.", label=label)
        last = fault.fuse
    elif np.isfinite(fault.fuse_earliest):
        may = f"Fuse {fault.fuse_name}: not for certain"
    else:
        axes.plot([], [], linestyle="none", label=f"Fuse {fault.fuse_name}: does not act")
    earliest = max(fault.fuse_earliest, first)
    if earliest < last:
        axes.axvspan(earliest, last, facecolor=WASH, edgecolor="none", zorder=0, label=may)


def _words(fault: Fault) -> str:
    reached = f"after {text(fault.burns, TIME)}" if np.isfinite(fault.burns) else "never"
    acting = {"the relay": fault.relay, "the fuse at the latest": fault.fuse}
    acts = [f"{name} acts after {text(after, TIME)}" for name, after in acting.items() if np.isfinite(after)]
    if not acts:
        acts = ["nothing stops it"]
    if np.isinf(fault.fuse) and fault.fuse_name:
        how = "acts not for certain" if np.isfinite(fault.fuse_earliest) else "does not act"
        acts.append(f"the fuse {fault.fuse_name} {how}")
    return (
        f"Temperature of the voice coil after {text(fault.volts, VOLTAGE)} comes on: its limit of "
        f"{text(fault.limit, TEMPERATURE)} is reached {reached}; {', '.join(acts)}."
    )
