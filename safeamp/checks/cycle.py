"""Within a cycle of the lowest note: how far the junction rises above its mean, and the pulse that a device sees."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Remark, Verdict
from safeamp.physics import stage
from safeamp.physics.safe_area import Pulse, Rating, curves_problem
from safeamp.physics.transient import cycle_dissipation, peak_ripple
from safeamp.quantities import THERMAL_RESISTANCE, Number, Origin

#: Pairs that add up to another thermal resistance than the printed one by more than this contradict it.
APART = 0.15
NOTE = "loudspeaker.lowest_note"

Seen = tuple[Number, Number] | None
"""Magnitude (ohm) and angle (deg) of a load in place of the nominal one."""


def devices_of(amplifier: Amplifier) -> dict[str, str]:
    """Return the side of each device by its name; a device of both sides once."""
    return {str(amplifier.stage.lower): "lower", str(amplifier.stage.upper): "upper"}


def peak_over_mean(amplifier: Amplifier, side: str, fraction: float, hot: thermal.Temperatures) -> Number:
    """Return how far a sine at a fraction of clipping power lifts the hottest junction above its mean, K.

    Nothing where the device's `transient` is not given: then the mean is all that can be said.
    """
    pairs = operating.device_of(amplifier, side).transient
    if pairs is None:
        return 0.0
    power = _dissipation(amplifier, side, fraction)
    constants = np.asarray(pairs, dtype=float)
    ripple = peak_ripple(
        resistances=constants[:, 0],
        time_constants=constants[:, 1],
        power=power,
        period=1.0 / np.asarray(needed(amplifier, NOTE)[0]),
    )
    lifted: Number = ripple / np.mean(power, axis=-1) * hot.device_power
    return lifted


def _dissipation(amplifier: Amplifier, side: str, fraction: float) -> Number:
    """Return the dissipation of the mean device of a side through a cycle, W, phases last."""
    device = operating.device_of(amplifier, side)
    magnitude, turned = operating.nominal_load(amplifier)
    found: Number = cycle_dissipation(
        half_supply=operating.level_half_supply(amplifier, fraction),
        peak=stage.level_peak(clipping_peak=operating.clipping_peak(amplifier), fraction=fraction),
        load_magnitude=magnitude,
        phase_angle=turned,
        conducting=operating.conducting(amplifier),
        emitter_resistor=needed(amplifier, "stage.emitter_resistor")[0],
        idle_current=operating.idle_current(amplifier),
        law=operating.law_of(device),
        transconductance_parameter=device.transconductance_parameter,
    )
    return found


def transient_remarks(amplifier: Amplifier) -> tuple[Remark, ...]:
    """Return what keeps a peak from being judged: pairs that contradict the printed thermal resistance."""
    found = []
    for name, side in devices_of(amplifier).items():
        device = operating.device_of(amplifier, side)
        if device.transient is None or device.junction_to_case is None:
            continue
        whole, printed = sum(pair[0] for pair in device.transient), device.junction_to_case
        if abs(nominal(whole) / nominal(printed) - 1.0) > APART:
            because = (
                f"the pairs of device.{name}.transient add up to {text(whole, THERMAL_RESISTANCE)}, junction_to_case "
                f"is {text(printed, THERMAL_RESISTANCE)}: read both again"
            )
            found.append(Remark(Verdict.UNVERIFIED, because))
    return tuple(found)


@dataclass(frozen=True, eq=False)
class Cut:
    """What bounds the use of the safe area beyond the DC curve: pulse curves, and a V-I limiter's line."""

    pulse: Pulse | None = None
    limiter: tuple[tuple[float, float], ...] = ()

    @property
    def is_none(self) -> bool:
        """Whether the DC curve and the load's own locus say everything."""
        return self.pulse is None and not self.limiter


UNCUT = Cut()


def cut_of(amplifier: Amplifier, side: str, fraction: float, angle: Number = 0.0, load: Seen = None) -> Cut:
    """Return what bounds the use of a side's devices, warm from a fraction of clipping power.

    Only a limiter that was measured cuts the locus: another may act later than its points say.
    """
    points = amplifier.protection.vi_limiter if limiter_measured(amplifier) else None
    return Cut(_pulse(amplifier, side, fraction, angle, load), points or ())


def limiter_measured(amplifier: Amplifier) -> bool:
    """Whether the points of the V-I limiter were measured."""
    return amplifier.origin("protection.vi_limiter") in (Origin.MEASURED, Origin.EXAMPLE)


def method(cut: Cut) -> str:
    """Return what a finding of the safe area adds to its method."""
    pulse = "; pulse curves for half a cycle of the lowest note, from the mean junction" if cut.pulse else ""
    return f"{pulse}; cut at the V-I limiter" if cut.limiter else pulse


def _pulse(amplifier: Amplifier, side: str, fraction: float, angle: Number, load: Seen) -> Pulse | None:
    """Return half a cycle of the lowest note with the curves of a side's device, None where there are none.

    Every pulse starts from the mean temperature of the junction.
    """
    device = operating.device_of(amplifier, side)
    if device.pulse is None:
        return None
    return Pulse(
        duration=0.5 / np.asarray(needed(amplifier, NOTE)[0]),
        junction=_hotter_junction(amplifier, side, fraction, angle, load),
        curves=device.pulse,
        transient=device.transient or (),
    )


def pulse_remarks(amplifier: Amplifier, side: str, rating: Rating) -> tuple[Remark, ...]:
    """Return what keeps a finding of the safe area from being judged: pulse curves that cannot be."""
    device = operating.device_of(amplifier, side)
    problem = None if device.pulse is None else curves_problem(rating=rating, curves=device.pulse)
    if problem is None:
        return ()
    name = amplifier.stage.upper if side == "upper" else amplifier.stage.lower
    return (Remark(Verdict.UNVERIFIED, f"device.{name}.pulse: {problem}: read both again"),)


def _hotter_junction(amplifier: Amplifier, side: str, fraction: float, angle: Number, load: Seen) -> Number:
    """Return the mean junction temperature of a side's hottest device, the hotter of no signal and a level, degC."""
    quiet = thermal.temperatures(amplifier, thermal.no_signal(amplifier), side)
    loud = thermal.temperatures(amplifier, thermal.at_level(amplifier, fraction, angle, load), side)
    return np.maximum(quiet.junction, loud.junction)
