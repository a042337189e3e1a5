"""Within a cycle of the lowest note: how far the junction rises above its mean, and the pulse that a device sees."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Remark, Verdict
from safeamp.physics import stage
from safeamp.physics.safe_area import Pulse, Rating, curves_problem
from safeamp.physics.transient import cycle_dissipation, peak_ripple
from safeamp.quantities import THERMAL_RESISTANCE, Number

#: Pairs that add up to another thermal resistance than the printed one by more than this contradict it.
APART = 0.15
NOTE = "loudspeaker.lowest_note"


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


def pulse_of(amplifier: Amplifier, side: str, junction: Number) -> Pulse | None:
    """Return half a cycle of the lowest note with the curves of a side's device, None where there are none.

    Every pulse starts from the mean temperature of the junction, degC.
    """
    device = operating.device_of(amplifier, side)
    if device.pulse is None:
        return None
    return Pulse(
        duration=0.5 / np.asarray(needed(amplifier, NOTE)[0]),
        junction=junction,
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


def hotter_junction(
    amplifier: Amplifier,
    side: str,
    fraction: float,
    angle: Number = 0.0,
) -> Number:
    """Return the mean junction temperature of a side's hottest device, the hotter of no signal and a level, degC."""
    quiet = thermal.temperatures(amplifier, thermal.no_signal(amplifier), side)
    loud = thermal.temperatures(amplifier, thermal.at_level(amplifier, fraction, angle), side)
    return np.maximum(quiet.junction, loud.junction)
