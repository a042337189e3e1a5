"""The worst point of the load's locus, and what the safe area allows there."""

from __future__ import annotations

from typing import Any

import numpy as np

from safeamp.checks import operating, thermal
from safeamp.checks import safe_area as checks
from safeamp.checks.working.area import allowed
from safeamp.checks.working.chain import SPREAD, hotter_case, spread
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import burst, peak_into, resistors
from safeamp.checks.working.register import working
from safeamp.checks.working.seen import heating, load_of
from safeamp.checks.working.warmth import idle
from safeamp.physics.safe_area.device import Device, device_of
from safeamp.physics.stage import THERMAL_VOLTAGE
from safeamp.quantities import ANGLE, CURRENT, PERCENT, RATIO, VOLTAGE, Number

WORST = "by looking along the whole cycle; at any other phase less is used"
PARTNER = (
    "by the class-AB law: n V_T ln(x y / I_idle^2) + R_e (x + y - 2 I_idle) = 0 for one device x and its partner y "
    "of n junctions, or the square law of a MOSFET"
)
CUT = "by looking along the whole cycle with pulse curves and limiter"


@working("soa.resistive_load")
def write_resistor(paper: Paper, value: Number) -> None:
    """The worst point into a resistor."""
    worst = checks.worst_into_resistor(paper.amplifier)
    case = hotter_case(paper, worst.side, thermal.ONE_THIRD)
    _use(paper, worst, case, value)


@working("soa.loudspeaker")
def write_loudspeaker(paper: Paper, value: Number) -> None:
    """The worst point into the loudspeaker."""
    worst = checks.worst_into_loudspeaker(paper.amplifier)
    if np.isnan(worst.frequency):
        angle = float(np.asarray(operating.phase_angle(paper.amplifier)).flat[0])
        case = hotter_case(paper, worst.side, thermal.ONE_EIGHTH, angle)
    else:
        case = hotter_case(paper, worst.side, thermal.ONE_EIGHTH, seen=heating(paper))
    _use(paper, worst, case, value)


def _use(paper: Paper, worst: checks.Worst, case: str, value: Number) -> None:
    magnitude, turn = load_of(paper, worst)
    if worst.cut.is_none:
        current = _point(paper, worst, (magnitude, turn))
    else:
        paper.found("V", "device voltage at the worst point", worst.point.voltage, VOLTAGE, CUT)
        current = paper.found("I", "current of the worst device there", worst.point.current, CURRENT, CUT)
    limit = allowed(paper, worst.side, case)
    if worst.cut.pulse is not None:
        _pulsed(paper, worst, (current, limit), value)
    else:
        paper.put("u", "use of the safe area", f"{current} / {limit}", value)


def _pulsed(paper: Paper, worst: checks.Worst, at: tuple[str, str], value: Number) -> None:
    """Write down the use by the DC curve, and the part of it that counts for a pulse."""
    for_good = paper.value(at[0]) / paper.value(at[1])
    paper.put("u_dc", "use at this point if the current flowed for good", f"{at[0]} / {at[1]}", for_good)
    part = np.asarray(value) / for_good
    how = "by the pulse curves between which half a cycle of the lowest note lies, from the mean junction"
    paper.found("k_pulse", "what counts of that for half a cycle of the lowest note", part, RATIO, how)
    paper.put("u", "use of the safe area", "u_dc * k_pulse", value)


def _point(paper: Paper, worst: checks.Worst, load: tuple[str, str]) -> str:
    """Write down voltage and current of the worst device at the worst phase; return the symbol of the current."""
    side, (magnitude, turn) = worst.side, load
    half, peak = burst(paper, side), peak_into(paper, side, magnitude, sagged=False)
    idle(paper)
    resistors(paper)
    device = _device(paper, worst, peak)
    phase = _phase(device, worst)
    sine = np.sin(np.deg2rad(phase))
    paper.found("psi", "phase of the load's current at the worst point", phase, ANGLE, WORST)
    out = paper.value(peak) * np.sin(np.deg2rad(phase - paper.value(turn)))
    paper.put("V_out", "output voltage there", f"{peak} * sin(psi - {turn})", out, VOLTAGE)
    load_current = f"{peak} / {magnitude} / n * sin(psi)"
    paper.put("I_load", "load current there, per device", load_current, device.each * sine, CURRENT)
    mean = _mean(paper, device, sine)
    voltage = paper.value(half) - out - paper.value(mean) * paper.value("R_e")
    paper.put("V", "device voltage there", f"{half} - V_out - {mean} * R_e", voltage, VOLTAGE)
    return _worst_device(paper, mean, worst)


def _device(paper: Paper, worst: checks.Worst, peak: str) -> Device:
    amplifier = paper.amplifier
    side = operating.sides(amplifier)[checks.SIDES.index(worst.side)]
    return device_of(
        half_supply=side.burst,
        peak=paper.value(peak),
        load_magnitude=worst.load.magnitude,
        phase_angle=worst.load.angle,
        conducting=operating.conducting(amplifier),
        emitter_resistor=paper.value("R_e"),
        idle_current=operating.idle_current(amplifier),
        law=operating.law_of(side.device),
        imbalance=None,
        transconductance_parameter=side.device.transconductance_parameter,
        thermal_voltage=THERMAL_VOLTAGE,
    )


def _phase(device: Device, worst: checks.Worst) -> float:
    """Return the phase of the worst point in deg: the device voltage falls while the load current rises."""
    goal = float(np.asarray(worst.point.voltage).flat[0])
    low, high = float(np.asarray(device.angle).flat[0]) - 90.0, 90.0
    if np.isnan(goal + low):
        return float("nan")
    for _ in range(60):
        middle = (low + high) / 2.0
        voltage = float(np.asarray(device.at(np.sin(np.deg2rad(middle)))[0]).flat[0])
        low, high = (middle, high) if voltage > goal else (low, middle)
    return high


def _mean(paper: Paper, device: Device, sine: Any) -> str:
    """Write down the current of the mean device: the load's, and what the partner carries against it."""
    mean = float(np.asarray(device.mean_current(sine)).flat[0])
    partner = mean - paper.value("I_load")
    if not abs(partner) > 1e-6 * abs(mean):
        return paper.put(
            "I_mean", "current of the device: its partner carries nothing", "I_load", mean, CURRENT
        )
    paper.found("I_partner", "current of its partner on the other side", partner, CURRENT, PARTNER)
    return paper.put("I_mean", "current of the device", "I_load + I_partner", mean, CURRENT)


def _worst_device(paper: Paper, mean: str, worst: checks.Worst) -> str:
    """Write down the current of the worst of parallel devices."""
    if not paper.value("n") > 1.0:
        return mean
    current = worst.point.current
    if paper.amplifier.stage.imbalance is not None:
        excess = paper.given(
            "e", "stage.imbalance", PERCENT, "excess current of the worst of parallel devices"
        )
    else:
        share = SPREAD / (paper.value("R_e") * paper.value(mean) + THERMAL_VOLTAGE)
        excess = spread(paper, mean, "e_worst", share)
    return paper.put("I", "current of the worst device", f"{mean} * (1 + {excess})", current, CURRENT)
