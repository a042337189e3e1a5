"""The amplifier as it stands at the present mains: rails, sides, load, peaks, idle current.

Every function takes an amplifier of floats or of arrays over the cases and returns the same.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier, Device
from safeamp.checks.trace import miss, needed
from safeamp.physics import bias, stage, supply
from safeamp.physics.stage import Law
from safeamp.quantities import Number, Origin

#: Sources that hold the rails fixed, whatever the mains does.
FIXED_SOURCES = ("regulated", "battery", "bench")
#: Below this ratio of DC resistance to nominal impedance the label is not believed.
LABEL_FLOOR = 0.65
#: Usual ratio of DC resistance to nominal impedance.
COIL_SHARE = 0.75
#: Without a measured curve no smaller angle is believed, deg.
LEAST_ANGLE = 45.0
#: A device that reads less than this share of the largest reading of its group carries nothing (common practice).
CARRIES_ABOVE = 0.1
LAWS = {
    "bipolar": Law.BIPOLAR,
    "darlington": Law.DARLINGTON,
    "vertical mosfet": Law.MOSFET,
    "lateral mosfet": Law.MOSFET,
}


def is_fixed(amplifier: Amplifier) -> bool:
    """Whether the rails do not follow the mains."""
    return amplifier.supply.source in FIXED_SOURCES


def mains_factor(amplifier: Amplifier, at: str = "mains.present") -> Number:
    """Return the mains at key path `at` over the mains at which the rails were read."""
    if is_fixed(amplifier):
        return 1.0
    mains, read_at = needed(amplifier, at, "supply.at_mains")
    return mains / read_at


def highest_factor(amplifier: Amplifier) -> Number:
    """Return the same at the highest mains; what the mains is today must be known."""
    if not is_fixed(amplifier):
        needed(amplifier, "mains.actual")
    return mains_factor(amplifier, "mains.highest")


def _larger(values: tuple[Number, ...]) -> Number:
    return reduce(np.maximum, values)


def _smaller(values: tuple[Number, ...]) -> Number:
    return reduce(np.minimum, values)


def rails_as_read(amplifier: Amplifier) -> tuple[Number, ...]:
    """Return the no-load rails as they were read, V."""
    return tuple(needed(amplifier, "supply.no_load")[0])


def no_load_rail(amplifier: Amplifier) -> Number:
    """Return the larger no-load rail at the present mains, V."""
    return _larger(rails_as_read(amplifier)) * mains_factor(amplifier)


def full_load_rail(amplifier: Amplifier) -> Number:
    """Return the smaller full-load rail at the present mains, V."""
    table = amplifier.supply
    if is_fixed(amplifier):
        return _smaller(rails_as_read(amplifier))
    if table.full_load is not None:
        return _smaller(table.full_load) * mains_factor(amplifier)
    (share,) = needed(amplifier, "supply.full_load_share")
    return share * _smaller(rails_as_read(amplifier)) * mains_factor(amplifier)


def is_single(amplifier: Amplifier) -> bool:
    """Whether there is one rail and 0 V."""
    return amplifier.supply.rails == "single"


def rail_to_rail_at_highest(amplifier: Amplifier) -> Number:
    """Return the volts from rail to rail without load at the highest mains."""
    rails = rails_as_read(amplifier)
    total = rails[0] if is_single(amplifier) else rails[0] + rails[-1]
    return total * highest_factor(amplifier)


def is_capacitor_coupled(amplifier: Amplifier) -> bool:
    """Whether the loudspeaker hangs on an output capacitor."""
    return amplifier.stage.coupling == "capacitor"


def half(amplifier: Amplifier, rail: Number) -> Number:
    """Return half the supply: a rail of a split supply, half the rail of a single one."""
    return rail / 2.0 if is_single(amplifier) else rail


def level_half_supply(amplifier: Amplifier, fraction: Number) -> Number:
    """Return half the supply while a fraction of clipping power is played, V."""
    rail = supply.level_rail(
        no_load=no_load_rail(amplifier), full_load=full_load_rail(amplifier), fraction=fraction
    )
    return half(amplifier, rail)


def midpoint_share(amplifier: Amplifier) -> Number:
    """Return the share of the rail at which the midpoint of a single-rail stage stands."""
    given = amplifier.readings.midpoint
    if given is not None:
        return given / _rail_beside_midpoint(amplifier)
    if not is_capacitor_coupled(amplifier):
        return 0.5
    found: Number = needed(amplifier, "readings.midpoint_share")[0]
    return found


def _rail_beside_midpoint(amplifier: Amplifier) -> Number:
    """Return the rail at the moment of the midpoint reading: on the limiter it was a lower one, V."""
    if amplifier.readings.taken_on != "limiter":
        return rails_as_read(amplifier)[0]
    (rails,) = needed(amplifier, "readings.limiter_rails")
    return _larger(rails) if isinstance(rails, tuple) else rails


def midpoint(amplifier: Amplifier) -> Number:
    """Return the midpoint of a single-rail stage without load at the present mains, V."""
    return midpoint_share(amplifier) * no_load_rail(amplifier)


@dataclass(frozen=True, eq=False)
class Side:
    """One side of the stage: volts from the output's rest to its rail (burst and loaded), loss, device."""

    name: str
    burst: Number
    loaded: Number
    loss: Number
    device: Device


def device_of(amplifier: Amplifier, side: str) -> Device:
    """Return the device of a side, or of a driver by its name."""
    name = amplifier.stage.upper if side == "upper" else amplifier.stage.lower
    device: Device = (
        getattr(amplifier.device, str(name)) if hasattr(amplifier, "trace") else amplifier.device[str(name)]
    )
    return device


def _side_volts(amplifier: Amplifier) -> tuple[tuple[Number, Number], tuple[Number, Number]]:
    burst, loaded = no_load_rail(amplifier), full_load_rail(amplifier)
    if not is_single(amplifier):
        return (burst, loaded), (burst, loaded)
    middle = midpoint(amplifier)
    sagged = middle * loaded / burst
    return (burst - middle, loaded - sagged), (middle, sagged)


def _losses(amplifier: Amplifier, loaded: tuple[Number, Number]) -> tuple[Number, Number]:
    table = amplifier.stage
    if table.clipped_peak is not None:
        return (_implied_loss(amplifier, loaded[0]), _implied_loss(amplifier, loaded[1]))
    if table.swing_loss_up is not None or table.swing_loss_down is not None:
        up, down = needed(amplifier, "stage.swing_loss_up", "stage.swing_loss_down")
        return up, down
    (loss,) = needed(amplifier, "stage.swing_loss")
    return loss, loss


def _implied_loss(amplifier: Amplifier, loaded: Number) -> Number:
    """Return the loss that a clipped peak measured into the nominal load stands for, at the mains of its reading."""
    (peak,) = needed(amplifier, "stage.clipped_peak")
    magnitude, _ = nominal_load(amplifier)
    at_reading = loaded / _mains_since(amplifier, "stage.clipped_peak")
    shared = 1.0 + needed(amplifier, "stage.emitter_resistor")[0] / conducting(amplifier) / magnitude
    return np.maximum(at_reading - peak * shared, 0.0)


def _mains_since(amplifier: Amplifier, path: str) -> Number:
    """Return the present mains over that at a reading: today's where it was measured, else that of the rails."""
    if is_fixed(amplifier) or amplifier.origin(path) is not Origin.MEASURED:
        return mains_factor(amplifier)
    present, actual = needed(amplifier, "mains.present", "mains.actual")
    return present / actual


def sides(amplifier: Amplifier) -> tuple[Side, Side]:
    """Return the upper and the lower side."""
    upper, lower = _side_volts(amplifier)
    loss_up, loss_down = _losses(amplifier, (upper[1], lower[1]))
    return (
        Side("upper", *upper, loss_up, device_of(amplifier, "upper")),
        Side("lower", *lower, loss_down, device_of(amplifier, "lower")),
    )


def conducting(amplifier: Amplifier) -> Number:
    """Return how many devices of a side carry current."""
    given = amplifier.stage.pairs_conducting
    found: Number = given if given is not None else needed(amplifier, "stage.pairs")[0]
    return found


def believed_nominal(amplifier: Amplifier) -> Number:
    """Return the nominal impedance of one loudspeaker; a label that the coil contradicts is not believed, ohm."""
    (nominal,) = needed(amplifier, "loudspeaker.nominal_impedance")
    coil = amplifier.loudspeaker.dc_resistance
    if coil is None:
        return nominal
    believed: Number = np.where(coil / nominal < LABEL_FLOOR, coil / COIL_SHARE, nominal)
    return np.where(np.isnan(coil), np.nan, believed)  # a coil that is no number leaves nothing to believe


def believed_minimum(amplifier: Amplifier) -> Number:
    """Return the minimum impedance of one loudspeaker, ohm."""
    table, nominal = amplifier.loudspeaker, believed_nominal(amplifier)
    if table.minimum_impedance is None:
        return needed(amplifier, "loudspeaker.minimum_share")[0] * nominal
    if table.dc_resistance is None:
        return table.minimum_impedance
    doubted = nominal < needed(amplifier, "loudspeaker.nominal_impedance")[0]
    believed: Number = np.where(
        doubted, np.minimum(table.minimum_impedance, 0.8 * nominal), table.minimum_impedance
    )
    return np.where(np.isnan(nominal), np.nan, believed)


def together(amplifier: Amplifier) -> Number:
    """Return the impedance of all loudspeakers together over that of one: in series more, in parallel less."""
    parallel, series = needed(amplifier, "loudspeaker.parallel", "loudspeaker.series")
    share: Number = series / parallel
    return share


def of_loudspeaker(amplifier: Amplifier, impedance: Number, angle: Number) -> tuple[Number, Number]:
    """Return magnitude (ohm) and angle (deg) that one side sees of loudspeakers of an impedance each.

    Loudspeakers in parallel and in series, a series resistor and the halves of a bridge count.
    """
    magnitude, turned = impedance * together(amplifier), angle
    if amplifier.stage.series_resistor is not None:
        magnitude, turned = stage.load_combination(
            impedance=magnitude, phase_angle=angle, series_resistor=amplifier.stage.series_resistor
        )
    return (magnitude / 2.0 if amplifier.stage.bridged else magnitude), turned


def nominal_load(amplifier: Amplifier, angle: Number = 0.0) -> tuple[Number, Number]:
    """Return the nominal load of one side as magnitude (ohm) and angle (deg)."""
    return of_loudspeaker(amplifier, believed_nominal(amplifier), angle)


def minimum_load(amplifier: Amplifier, angle: Number = 0.0) -> tuple[Number, Number]:
    """Return the minimum load of one side as magnitude (ohm) and angle (deg)."""
    return of_loudspeaker(amplifier, believed_minimum(amplifier), angle)


def behind_capacitor(
    amplifier: Amplifier, magnitude: Number, angle: Number, most: float
) -> tuple[Number, Number]:
    """Return a load of one side with the output capacitor in series, at the note that turns it to an angle.

    `most` is the angle looked for, deg, held between the least and the largest that notes from the lowest one up can
    give. On the inductive side of the load the capacitor takes reactance away, down to none where both resonate; on
    the capacitive side it adds. Loads within the largest angle stay behind these: at the same reactance they have
    more resistance.
    """
    farads, note = needed(amplifier, "output_capacitor.capacitance", "loudspeaker.lowest_note")
    esr = amplifier.output_capacitor.esr
    turn = np.deg2rad(angle)
    resistance = magnitude * np.cos(turn) + (0.0 if esr is None else esr)
    own = magnitude * np.sin(turn)
    reactance = 1.0 / (2.0 * np.pi * note * farads)
    least, largest = np.maximum(own - reactance, 0.0), own + reactance
    turned = np.clip(np.tan(np.deg2rad(min(most, 89.9))), least / resistance, largest / resistance)
    return resistance * np.hypot(1.0, turned), np.rad2deg(np.arctan(turned))


def phase_angle(amplifier: Amplifier) -> Number:
    """Return the largest angle that counts, deg: that of the curve, never below 45 without one."""
    curve = amplifier.loudspeaker.impedance_curve
    if curve is not None:
        return float(np.max(np.abs(curve.phases)))
    (angle,) = needed(amplifier, "loudspeaker.phase_angle")
    return np.maximum(angle, LEAST_ANGLE)


def peak_into(amplifier: Amplifier, side_voltage: Number, loss: Number, magnitude: Number) -> Number:
    """Return the clipped peak of a side at the load, V."""
    return stage.clipped_peak(
        side_voltage=side_voltage,
        swing_loss=loss,
        load_magnitude=magnitude,
        emitter_resistor=needed(amplifier, "stage.emitter_resistor")[0],
        conducting=conducting(amplifier),
    )


def clipping_peak(amplifier: Amplifier, magnitude: Number | None = None) -> Number:
    """Return the peak at clipping of the smaller side at full-load rails, V; nominal load unless another is given."""
    ohms = nominal_load(amplifier)[0] if magnitude is None else magnitude
    upper, lower = sides(amplifier)
    return np.minimum(
        peak_into(amplifier, upper.loaded, upper.loss, ohms),
        peak_into(amplifier, lower.loaded, lower.loss, ohms),
    )


def clipping_power(amplifier: Amplifier) -> Number:
    """Return the sine power of one stage at clipping into the nominal load (bridged: into its half), W."""
    return stage.load_power(peak=clipping_peak(amplifier), load_magnitude=nominal_load(amplifier)[0])


def output_power(amplifier: Amplifier) -> Number:
    """Return the sine power at clipping into the loudspeaker, both bridged sides together, W."""
    return clipping_power(amplifier) * (2.0 if amplifier.stage.bridged else 1.0)


def loudspeaker_power(amplifier: Amplifier) -> Number:
    """Return the sine power at clipping into each loudspeaker, W; a series resistor takes its share of the output."""
    parallel, series = needed(amplifier, "loudspeaker.parallel", "loudspeaker.series")
    each = output_power(amplifier) / parallel / series
    if amplifier.stage.series_resistor is None:
        return each
    whole = believed_nominal(amplifier) * together(amplifier)
    return each * whole / (whole + amplifier.stage.series_resistor)


def as_current(amplifier: Amplifier, value: Number, unit: str | None) -> Number:
    """Return an idle reading as a current, A: volts across ONE emitter resistor, or amperes."""
    if unit == "A":
        return value
    resistor = needed(amplifier, "stage.emitter_resistor")[0]
    return bias.idle_current(drop=value, emitter_resistor=resistor)


def read_idle(amplifier: Amplifier) -> Number | None:
    """Return the larger mean of the readings across the emitter resistors of a side, V; None without readings.

    A device that carries nothing is left out of the mean: its neighbours carry its share.
    """
    means = [
        sum(side) / carrying(side)
        for side in (amplifier.readings.idle_upper, amplifier.readings.idle_lower)
        if side
    ]
    return reduce(np.maximum, means) if means else None


def carrying(side: tuple[Number, ...]) -> Number:
    """Return how many devices of a group carry current by the readings across their resistors."""
    largest = _larger(side)
    count: Number = sum(np.where(np.asarray(one) >= CARRIES_ABOVE * largest, 1.0, 0.0) for one in side)
    return count


def idle_current(amplifier: Amplifier) -> Number:
    """Return the idle current of each device, A: the larger of the value stated and the mean reading."""
    found = []
    if amplifier.stage.idle is not None:
        found.append(as_current(amplifier, amplifier.stage.idle, amplifier.stage.idle_unit))
    read = read_idle(amplifier)
    if read is not None:
        found.append(as_current(amplifier, read, "V"))
    if not found:
        miss(amplifier, "stage.idle")
        return float("nan")
    return reduce(np.maximum, found)


def imbalance_at(amplifier: Amplifier, current: Number) -> Number:
    """Return the excess of the worst of parallel devices at a mean current of each, as a ratio."""
    count = conducting(amplifier)
    if amplifier.stage.imbalance is not None:
        excess = amplifier.stage.imbalance
    else:
        resistor = needed(amplifier, "stage.emitter_resistor")[0]
        excess = bias.current_imbalance(current=current, emitter_resistor=resistor)
    return np.where(np.asarray(count) > 1, excess, 0.0)


def law_of(device: Device) -> Law:
    """Return the law by which a device hands the current over."""
    return LAWS[str(device.kind)]
