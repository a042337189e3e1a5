"""The loudspeaker: its label, its power, a rail on its coil."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.fault_also import fault_current, rail_fuse_also, until_stopped
from safeamp.checks.fuses import gates_of
from safeamp.checks.programme import ROOM, programme_also
from safeamp.checks.registry import finding
from safeamp.checks.trace import aside, miss, needed
from safeamp.checks.words import level, nominal, text
from safeamp.findings import Also, Measure, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import capacitor, loudspeaker
from safeamp.physics.coil_heating import time_to_temperature
from safeamp.physics.fuse import slowest_time
from safeamp.quantities import CURRENT, ENERGY, POWER, RATIO, RESISTANCE, TIME, VOLTAGE, Number, show

Marks = npt.NDArray[np.bool_]

COPPER = 0.00393
THERMAL = (
    "loudspeaker.coil_to_magnet",
    "loudspeaker.coil_time_constant",
    "loudspeaker.magnet_to_air",
    "loudspeaker.magnet_time_constant",
    "loudspeaker.coil_limit",
)


def label_ratio(amplifier: Amplifier) -> Number:
    """Return DC resistance over nominal impedance as printed."""
    coil, printed = needed(amplifier, "loudspeaker.dc_resistance", "loudspeaker.nominal_impedance")
    ratio: Number = coil / printed
    return ratio


@finding("loudspeaker.label", Step.LOUDSPEAKER, RATIO)
def check_label(amplifier: Amplifier, limits: Limits) -> Measure:
    """DC resistance over nominal impedance."""
    ratio = label_ratio(amplifier)
    return Measure(
        ratio,
        _label_text(amplifier, ratio),
        next="read the DC resistance at the loudspeaker's terminals, cable off",
        method="DC resistance over nominal impedance",
    )


def _label_text(amplifier: Amplifier, ratio: Number) -> str:
    coil, printed = needed(amplifier, "loudspeaker.dc_resistance", "loudspeaker.nominal_impedance")
    said = f"the coil reads {text(coil, RESISTANCE)}, the label says {text(printed, RESISTANCE)}"
    if nominal(ratio) < operating.LABEL_FLOOR:
        believed = text(operating.believed_nominal(amplifier), RESISTANCE)
        return f"{said}: not believed, everything is computed for {believed}"
    return said


@finding("loudspeaker.power", Step.LOUDSPEAKER, RATIO)
def check_power(amplifier: Amplifier, limits: Limits) -> Measure:
    """Power at clipping into the nominal impedance over the rated noise power."""
    rated, share = needed(amplifier, "loudspeaker.rated_power", "loudspeaker.power_share")
    each = operating.loudspeaker_power(amplifier)
    noise = rated * share
    return Measure(
        each / noise,
        f"{text(each, POWER)} sine power at clipping, {text(noise, POWER)} rated noise power",
        also=(Also("power at clipping", nominal(each), POWER), *programme_also(amplifier, each)),
        next="look up which kind of power the label means (loudspeaker.power_word); turn back when it sounds strained",
        method="sine power at clipping into the nominal impedance over rated noise power",
    )


@dataclass(frozen=True, eq=False)
class Fault:
    """A direct voltage on each coil, V, and how it gets there."""

    volts: Number
    how: str


def fault_of(amplifier: Amplifier) -> Fault:
    """Return the direct voltage that one shorted device of each side puts on the coil."""
    rail, (series,) = operating.no_load_rail(amplifier), needed(amplifier, "loudspeaker.series")
    if amplifier.stage.bridged:
        total = rail if operating.is_single(amplifier) else 2.0 * rail
        return Fault(total / series, "one device of each side shorted")
    return Fault(rail / series, "one device shorted")


def capacitor_holds(amplifier: Amplifier) -> Number:
    """Return where the output capacitor stands the whole rail at the highest mains."""
    (rated,) = needed(amplifier, "output_capacitor.rated_voltage")
    rail = operating.rails_as_read(amplifier)[0] * operating.highest_factor(amplifier)
    holds: Number = np.asarray(rail) <= rated
    return holds


@finding("loudspeaker.dc_fault", Step.LOUDSPEAKER, POWER)
def check_dc_fault(amplifier: Amplifier, limits: Limits) -> Measure:
    """Power in the coil with one device shorted, and what stops it in what time."""
    (coil,) = needed(amplifier, "loudspeaker.dc_resistance")
    fault = fault_of(amplifier)
    current = loudspeaker.dc_fault_current(voltage=fault.volts, dc_resistance=coil)
    power = loudspeaker.dc_fault_power(voltage=fault.volts, dc_resistance=coil)
    also = (Also("current in the coil", nominal(current), CURRENT), *_step_also(amplifier))
    if operating.is_capacitor_coupled(amplifier):
        holds = capacitor_holds(amplifier)
        if np.all(np.asarray(holds)):
            return _blocked(fault, power, also)
    return _stopped_in_time(amplifier, fault, power, also, limits)


def _blocked(fault: Fault, power: Number, also: tuple[Also, ...]) -> Measure:
    return Measure(
        power,
        f"{fault.how}: the output capacitor blocks the whole rail; without it {text(power, POWER)} in the coil",
        go=np.inf,
        without_stop=True,
        also=also,
        method="rail over the DC resistance; whole rail against the capacitor's rated voltage",
    )


def _step_also(amplifier: Amplifier) -> tuple[Also, ...]:
    farads = amplifier.output_capacitor.capacitance
    if not operating.is_capacitor_coupled(amplifier) or farads is None:
        return ()
    rail, middle = operating.no_load_rail(amplifier), operating.midpoint(amplifier)
    coil = amplifier.loudspeaker.dc_resistance
    step = np.maximum(rail - middle, middle)
    found = [
        Also(
            "energy of the midpoint's step",
            nominal(capacitor.step_energy(capacitance=farads, step=step)),
            ENERGY,
        )
    ]
    if coil is not None:
        volts = middle / needed(amplifier, "loudspeaker.series")[0]
        found.append(Also("current with only the capacitor shorted", nominal(volts / coil), CURRENT))
        found.append(Also("power with only the capacitor shorted", nominal(volts**2 / coil), POWER))
    return tuple(found)


def _stopped_in_time(
    amplifier: Amplifier, fault: Fault, power: Number, also: tuple[Also, ...], limits: Limits
) -> Measure:
    burns_after = time_to_limit(amplifier, fault)
    relay, fuse = relay_time(amplifier), fuse_time(amplifier, fault, limits)
    acts_after = np.fmin(relay, fuse)
    if np.all(np.isnan(acts_after)):
        acts_after = np.where(_nothing_fitted(amplifier), np.inf, acts_after)
    leans = _leans_on_relay(relay, fuse, burns_after)
    holds = (np.asarray(acts_after) < burns_after) & ~(
        leans & (_whole(amplifier, fault) > _breaks_up_to(limits, "contacts_caution_above_at_highest"))
    )
    return Measure(
        power,
        _fault_text(fault, power, acts_after, burns_after, relay),
        go=np.where(holds & ~_trips_late(amplifier, limits), np.inf, -np.inf),
        without_stop=True,
        everywhere=True,
        remarks=(
            *_trip_remarks(amplifier, limits),
            *(_contact_remarks(amplifier, fault, limits) if np.ravel(leans)[0] else ()),
        ),
        also=(
            *also,
            *_times(acts_after, burns_after),
            *until_stopped(power, acts_after),
            *rail_fuse_also(amplifier, fault.volts, lambda fuse: gates_of(fuse, limits)),
        ),
        next="a relay with a DC detector, or a loudspeaker fuse, must act before the coil reaches its limit",
        method="two-stage heating of the coil, copper's resistance rise, relay delay, slowest fuse gate",
    )


def _times(acts_after: Number, burns_after: Number) -> tuple[Also, ...]:
    return (
        Also("protection acts after", nominal(acts_after), TIME),
        Also("coil reaches its limit after", nominal(burns_after), TIME),
    )


def _nothing_fitted(amplifier: Amplifier) -> bool:
    fitted = ("protection.trip_delay", "protection.loudspeaker_fuse")
    return all(path in amplifier.absent for path in fitted)


def heating(amplifier: Amplifier, fault: Fault) -> dict[str, Number]:
    """Return what heats the coil of one loudspeaker, from where one eighth of clipping power has warmed it."""
    coil, to_magnet, fast, to_air, slow, limit = needed(amplifier, "loudspeaker.dc_resistance", *THERMAL)
    start = ROOM + operating.loudspeaker_power(amplifier) / 8.0 * (to_magnet + to_air)
    return {
        "voltage": fault.volts,
        "dc_resistance": coil,
        "coil_to_magnet": to_magnet,
        "coil_time_constant": fast,
        "magnet_to_air": to_air,
        "magnet_time_constant": slow,
        "start": np.minimum(start, limit),
        "air": ROOM,
    }


def time_to_limit(amplifier: Amplifier, fault: Fault) -> Number:
    """Return the time to the coil limit, s, from where one eighth of clipping power has warmed the coil."""
    heated, (limit,) = heating(amplifier, fault), needed(amplifier, "loudspeaker.coil_limit")
    if any(np.any(np.isnan(value)) for value in (*heated.values(), limit)):
        return np.nan
    return time_to_temperature(**heated, limit=limit)


def relay_time(amplifier: Amplifier) -> Number:
    """Return the time after which the relay has acted, s; inf without one, nan where nothing is said of it."""
    if "protection.trip_delay" in amplifier.absent:
        return np.inf
    if amplifier.protection.trip_delay is None and amplifier.protection.loudspeaker_fuse is None:
        miss(amplifier, "protection.trip_delay", "protection.loudspeaker_fuse")
    return np.nan if amplifier.protection.trip_delay is None else amplifier.protection.trip_delay


def fuse_time(amplifier: Amplifier, fault: Fault, limits: Limits) -> Number:
    """Return the slowest acting time of the loudspeaker fuse with the coil as hot as its limit, s."""
    fitted = amplifier.protection.loudspeaker_fuse
    if fitted is None:
        return np.inf if "protection.loudspeaker_fuse" in amplifier.absent else np.nan
    coil, limit = needed(amplifier, "loudspeaker.dc_resistance", "loudspeaker.coil_limit")
    hot = coil * (1.0 + COPPER * (np.fmax(limit, 20.0) - 20.0))
    times = fault_current(amplifier, fault.volts, hot) / fitted.rating
    return slowest_time(times_rating=times, gates=gates_of(fitted, limits))


def _fault_text(fault: Fault, power: Number, acts: Number, burns: Number, relay: Number) -> str:
    said = f"{fault.how}: {text(power, POWER)} in the coil from {text(fault.volts, VOLTAGE)}"
    acting, burning = nominal(acts), nominal(burns)
    if np.isinf(acting):
        return f"{said}; nothing stops it"
    if np.isnan(acting):
        return f"{said}; what stops it is not given"
    what = "the relay" if np.isfinite(nominal(relay)) and nominal(relay) <= acting else "the fuse"
    if np.isnan(burning):
        return f"{said}; {what} stops it after {text(acts, TIME)}, what the coil stands is not given"
    return f"{said}; {what} stops it after {text(acts, TIME)}, the coil reaches its limit after {text(burns, TIME)}"


def _trips_late(amplifier: Amplifier, limits: Limits) -> Marks:
    """Return where the relay opens only above the level of a detector that protects."""
    trip = amplifier.protection.trip_voltage
    if amplifier.protection.trip_delay is None or trip is None:
        return np.asarray(False)
    late: Marks = np.asarray(trip) > level(limits["loudspeaker.dc_fault.trip_voltage"], "go") * (1.0 + 1e-9)
    return late


def _trip_remarks(amplifier: Amplifier, limits: Limits) -> tuple[Remark, ...]:
    if amplifier.protection.trip_delay is None:
        return ()
    trip = amplifier.protection.trip_voltage
    if trip is None:
        return (Remark(Verdict.CAUTION, "protection.trip_voltage is not given: at what DC the relay opens"),)
    if np.ravel(_trips_late(amplifier, limits))[0]:
        return (Remark(Verdict.CAUTION, f"the relay opens only above {text(trip, VOLTAGE)}"),)
    return ()


def _leans_on_relay(relay: Number, fuse: Number, burns_after: Number) -> Marks:
    """Return where a relay is all that acts in time."""
    leans: Marks = np.isfinite(relay) & ~(np.asarray(fuse) < burns_after)
    return leans


def _whole(amplifier: Amplifier, fault: Fault) -> Number:
    """Return the direct voltage that the contacts must break, V: that of all loudspeakers in series."""
    whole: Number = np.asarray(fault.volts) * needed(amplifier, "loudspeaker.series")[0]
    return whole


def _breaks_up_to(limits: Limits, name: str) -> float:
    """Return up to what direct voltage relay contacts are believed to break the current, V."""
    return limits["loudspeaker.dc_fault"].extra[name] * (1.0 + 1e-9)


def _contact_remarks(amplifier: Amplifier, fault: Fault, limits: Limits) -> tuple[Remark, ...]:
    today, name, asks = _whole(amplifier, fault), "contacts_caution_above", "are they rated to break it?"
    if nominal(today) > _breaks_up_to(limits, name):
        above = show(limits["loudspeaker.dc_fault"].extra[name], VOLTAGE)
        return (Remark(Verdict.CAUTION, f"relay contacts on more than {above} DC: {asks}"),)
    whole = aside(amplifier)
    highest = today / operating.mains_factor(whole) * operating.mains_factor(whole, "mains.highest")
    if nominal(highest) > _breaks_up_to(limits, f"{name}_at_highest"):
        said = f"relay contacts on {text(highest, VOLTAGE)} DC at the highest mains"
        return (Remark(Verdict.CAUTION, f"{said}: {asks}"),)
    return ()
