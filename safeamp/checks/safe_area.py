"""Use of the safe area into a resistor and into a loudspeaker."""

from __future__ import annotations

from dataclasses import dataclass
from functools import reduce
from typing import Any

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import curve, cycle, operating, thermal
from safeamp.checks.beside import limiter_remarks, load_remarks, one_open_also, uncut_also, usable_also
from safeamp.checks.driver import any_signal_also
from safeamp.checks.registry import finding
from safeamp.checks.trace import needed
from safeamp.checks.words import free_air_remarks, idle_remarks, nominal, sharing_remarks, text
from safeamp.findings import Also, Measure, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import safe_area
from safeamp.physics.safe_area import ZONES, Rating, Use
from safeamp.quantities import (
    CURRENT,
    FREQUENCY,
    RATIO,
    RESISTANCE,
    TEMPERATURE,
    VOLTAGE,
    Number,
    Origin,
    show,
)

#: Angle at which the minimum impedance is judged, deg.
MINIMUM_ANGLE = 30.0
#: Angle shown beside the one that is judged, deg.
SHOWN_ANGLE = 60.0
#: Angles at which a load behind the output capacitor is looked at, as far as notes reach them, deg: the least has the
#: most current, the power line is used most in the middle, a steep second-breakdown line moves it on. Of 700 random
#: devices none was used more than 0.6 % above these anywhere between.
LOW_NOTE_ANGLES = (0.0, 44.0, 50.0, 56.0, 62.0, 90.0)
#: From this share of the peak current on an idle current makes an unloaded output worth a look.
OPEN_LOAD_IDLE = 0.25
OPEN_LOAD = 1e6
SIDES = ("upper", "lower")
METHOD = "DC safe area at case temperature, closed-form envelope of all angles, class-AB law"
CURVE_METHOD = "DC safe area at case temperature, every point of the impedance curve, class-AB law"
NEXT = (
    "a load of higher impedance, lower mains, a cooler heatsink or stronger devices clear it; "
    "no loudspeaker while it is unverified or stop"
)


@dataclass(frozen=True, eq=False)
class Load:
    """A load of one side: magnitude (ohm), largest angle (deg), and how it is called."""

    magnitude: Number
    angle: Number
    name: str


def rating_of(amplifier: Amplifier, side: str) -> Rating:
    """Return the ratings of the device of a side."""
    device = operating.device_of(amplifier, side)
    return Rating(
        current=thermal.device_value(amplifier, side, "current"),
        power=thermal.device_value(amplifier, side, "power"),
        power_at=thermal.device_value(amplifier, side, "power_at"),
        junction_limit=thermal.device_value(amplifier, side, "junction_limit"),
        junction_to_case=device.junction_to_case,
        voltage=thermal.device_value(amplifier, side, "voltage"),
        points=device.safe_area or (),
    )


def _drive(amplifier: Amplifier, side: str, load: Load) -> dict[str, Any]:
    """Return what drives the devices of a side into a load, and what they are."""
    table = operating.sides(amplifier)[SIDES.index(side)]
    return {
        "half_supply": table.burst,
        "peak": operating.peak_into(amplifier, table.burst, table.loss, load.magnitude),
        "load_magnitude": load.magnitude,
        "phase_angle": load.angle,
        "conducting": operating.conducting(amplifier),
        "emitter_resistor": needed(amplifier, "stage.emitter_resistor")[0],
        "idle_current": operating.idle_current(amplifier),
        "law": operating.law_of(table.device),
        "imbalance": _imbalance(amplifier),
        "transconductance_parameter": table.device.transconductance_parameter,
    }


def use_of(
    amplifier: Amplifier, side: str, load: Load, case: Number, rating: Rating, cut: cycle.Cut = cycle.UNCUT
) -> Use:
    """Return the use of the safe area of a side into a load, at a case temperature (degC)."""
    driven = {**_drive(amplifier, side, load), "case_temperature": case, "rating": rating}
    if cut.is_none:
        return safe_area.envelope_use(**driven)
    return safe_area.cut_use(**driven, pulse=cut.pulse, limiter=cut.limiter)


def path_of(
    amplifier: Amplifier, side: str, load: Load, output_angle: Number, *, one_angle: bool = False
) -> tuple[Number, Number]:
    """Return the voltages and currents through which a load takes the worst device of a side, one case."""
    path = safe_area.angle_path if one_angle else safe_area.envelope_path
    return path(output_angle=output_angle, **_drive(amplifier, side, load))


def _imbalance(amplifier: Amplifier) -> Number | None:
    """Return the stated excess, None for the spread of a batch; a single device has none."""
    single = np.asarray(operating.conducting(amplifier)) <= 1
    if amplifier.stage.imbalance is not None:
        return np.where(single, 0.0, amplifier.stage.imbalance)
    return np.zeros(np.shape(single)) if np.all(single) else None


def sides_to_judge(amplifier: Amplifier) -> tuple[str, ...]:
    """Return the sides that differ in structure: equal devices on a split supply are one."""
    table = amplifier.stage
    split_loss = table.swing_loss_up is not None or table.swing_loss_down is not None
    same = table.upper == table.lower and not operating.is_single(amplifier) and not split_loss
    return ("upper",) if same else SIDES


@dataclass(frozen=True, eq=False)
class Worst:
    """The worst use over sides and loads, with the structure of the nominal worst point."""

    use: Number
    unknown: Number
    point: Use
    case: Number
    side: str
    load: Load
    cut: cycle.Cut
    frequency: float = np.nan
    """Hz of the worst point of a curve; nan without one."""


def _worst(amplifier: Amplifier, loads: tuple[Load, ...], fraction: float, angle: Number) -> Worst:
    found = []
    for side in sides_to_judge(amplifier):
        case = thermal.hotter_case(amplifier, side, fraction, angle)
        rating, cut = rating_of(amplifier, side), cycle.cut_of(amplifier, side, fraction, angle)
        found += [(use_of(amplifier, side, load, case, rating, cut), case, side, load, cut) for load in loads]
    point, case, side, load, cut = max(found, key=lambda one: _sortable(one[0].use))
    use = reduce(np.maximum, [one[0].use for one in found])
    unknown = reduce(np.logical_or, [one[0].enters_unknown for one in found])
    return Worst(use, unknown, point, case, side, load, cut)


def _worst_of_curve(amplifier: Amplifier, points: curve.Points) -> Worst:
    """Return the worst use over sides and over every point of a measured curve."""
    heating, found = curve.heating_load(amplifier, points, thermal.ONE_EIGHTH), []
    for side in sides_to_judge(amplifier):
        case = thermal.hotter_case(amplifier, side, thermal.ONE_EIGHTH, load=heating)
        found.append((_of_curve(amplifier, points, side, case), case, side))
    worst, case, side = max(found, key=lambda one: _sortable(one[0].point.use))
    use = reduce(np.maximum, [one[0].use for one in found])
    unknown = reduce(np.logical_or, [one[0].unknown for one in found])
    point = points.at(worst.place)
    load = _curve_load(amplifier, point)
    cut = cycle.cut_of(amplifier, side, thermal.ONE_EIGHTH, load=heating)
    return Worst(use, unknown, worst.point, case, side, load, cut, float(point.frequency))


def _of_curve(amplifier: Amplifier, points: curve.Points, side: str, case: Number) -> curve.OfCurve:
    def use_into(one: Amplifier, magnitude: Number, angle: Number, warm: Number) -> Use:
        heating = curve.heating_load(one, points, thermal.ONE_EIGHTH)
        cut = cycle.cut_of(one, side, thermal.ONE_EIGHTH, load=heating)
        return use_of(one, side, Load(magnitude, angle, ""), warm, rating_of(one, side), cut)

    return curve.worst_use(amplifier, points, case, use_into)


def _curve_load(amplifier: Amplifier, point: curve.Points) -> Load:
    magnitude, angle = curve.seen(amplifier, point)
    turned = f"{text(magnitude, RESISTANCE)} at {nominal(angle):.0f} deg"
    return Load(magnitude, angle, f"{turned}, {show(float(point.frequency), FREQUENCY)} of the curve")


def _sortable(use: Number) -> float:
    value = nominal(use)
    return np.inf if np.isnan(value) else value


def device_remarks(amplifier: Amplifier, limits: Limits) -> tuple[Remark, ...]:
    """Return what keeps every finding of the safe area from being judged: idle, sharing, typical data, no curve."""
    found = [*idle_remarks(amplifier), *sharing_remarks(amplifier, limits), *free_air_remarks(amplifier)]
    for side in dict.fromkeys((amplifier.stage.upper, amplifier.stage.lower)):
        found += _remarks_on(amplifier, str(side))
    return tuple(found)


def _remarks_on(amplifier: Amplifier, name: str) -> list[Remark]:
    side = "upper" if amplifier.stage.upper == name else "lower"
    device, found = operating.device_of(amplifier, side), []
    if amplifier.origin(f"device.{name}.voltage") is Origin.ASSUMED:
        because = f"the ratings of {name} are typical ones of its class: enter your data sheet's"
        found.append(Remark(Verdict.UNVERIFIED, because))
    if not device.safe_area and device.kind != "lateral mosfet":
        because = f"device.{name}.safe_area is not given: second breakdown is not judged"
        found.append(Remark(Verdict.UNVERIFIED, because))
    problem = safe_area.points_problem(rating_of(amplifier, side))
    if problem is not None:
        found.append(Remark(Verdict.UNVERIFIED, problem))
    return [*found, *cycle.pulse_remarks(amplifier, side, rating_of(amplifier, side))]


def _needs(amplifier: Amplifier) -> tuple[str, ...]:
    names = dict.fromkeys((str(amplifier.stage.upper), str(amplifier.stage.lower)))
    sides = {str(amplifier.stage.lower): "lower", str(amplifier.stage.upper): "upper"}
    devices = {name: operating.device_of(amplifier, sides[name]) for name in names}
    return tuple(
        f"device.{name}.safe_area"
        for name, device in devices.items()
        if not device.safe_area and device.kind != "lateral mosfet"
    )


def _point(worst: Worst) -> dict[str, float | str]:
    zone = int(nominal(worst.point.zone))
    found: dict[str, float | str] = {
        "voltage": nominal(worst.point.voltage),
        "current": nominal(worst.point.current),
        "zone": ZONES[zone],
    }
    return found if np.isnan(worst.frequency) else {**found, "frequency": worst.frequency}


def _says(worst: Worst, use: Number) -> str:
    point = _point(worst)
    value = nominal(use)
    if np.isnan(value):
        return f"what the {worst.side} device uses of its safe area into {worst.load.name} cannot be computed"
    amount = (
        f"uses {value:.0%} of the safe area" if np.isfinite(value) else "current flows where none is allowed"
    )
    return (
        f"{worst.side} device {amount} into {worst.load.name}, at {show(float(point['voltage']), VOLTAGE)} and "
        f"{show(float(point['current']), CURRENT)} ({point['zone']}), case {text(worst.case, TEMPERATURE)}"
    )


def resistors(amplifier: Amplifier) -> tuple[Load, ...]:
    """Return the loads that count for a resistor of the nominal impedance."""
    magnitude, turned = operating.nominal_load(amplifier)
    load = Load(magnitude, turned, f"a resistor of {text(magnitude, RESISTANCE)}")
    return (load, *_low_notes(amplifier, load))


def worst_into_resistor(amplifier: Amplifier) -> Worst:
    """Return the worst use into a resistor of the nominal impedance."""
    return _worst(amplifier, resistors(amplifier), thermal.ONE_THIRD, 0.0)


def into_resistor(amplifier: Amplifier) -> Number:
    """Return the worst use into a resistor of the nominal impedance as a number."""
    return worst_into_resistor(amplifier).use


@finding("soa.resistive_load", Step.LOAD_TEST, RATIO)
def check_resistive_load(amplifier: Amplifier, limits: Limits) -> Measure:
    """Use of the safe area into a resistor of the nominal impedance."""
    worst = worst_into_resistor(amplifier)
    uncut = uncut_also(amplifier, worst.cut, into_resistor)
    return Measure(
        worst.use,
        _says(worst, worst.use),
        remarks=(*device_remarks(amplifier, limits), *_limiter_remarks(amplifier, worst, uncut)),
        unknown=worst.unknown,
        needs=_needs(amplifier),
        at=_point(worst),
        also=(*uncut, *one_open_also(amplifier, into_resistor, RATIO), *_usable(amplifier, worst)),
        next="passing with a resistor says nothing about a loudspeaker",
        method=f"{METHOD}{cycle.method(worst.cut)}",
    )


def _limiter_remarks(amplifier: Amplifier, worst: Worst, uncut: tuple[Also, ...]) -> tuple[Remark, ...]:
    return limiter_remarks(amplifier, worst.point, uncut, worst.case, rating_of(amplifier, worst.side))


def _usable(amplifier: Amplifier, worst: Worst) -> tuple[Also, ...]:
    return usable_also(rating_of(amplifier, worst.side), worst.case)


def worst_into_loudspeaker(amplifier: Amplifier) -> Worst:
    """Return the worst use into the loudspeaker: with a measured curve every point counts, and nothing else."""
    points = curve.points_of(amplifier)
    if points is not None:
        return _worst_of_curve(amplifier, points)
    angle = operating.phase_angle(amplifier)
    return _worst(amplifier, loads(amplifier, angle), thermal.ONE_EIGHTH, angle)


def into_loudspeaker(amplifier: Amplifier) -> Number:
    """Return the worst use into the loudspeaker as a number."""
    return worst_into_loudspeaker(amplifier).use


@finding("soa.loudspeaker", Step.LOUDSPEAKER, RATIO)
def check_loudspeaker(amplifier: Amplifier, limits: Limits) -> Measure:
    """Use of the safe area into the loudspeaker: nominal at its angle, minimum at 30 deg, the worse counts."""
    from safeamp.checks.as_built import as_built  # alone it needs all that is known of loudspeakers

    worst = worst_into_loudspeaker(amplifier)
    open_load = _open_load(amplifier, worst)
    uncut = uncut_also(amplifier, worst.cut, into_loudspeaker)
    return Measure(
        worst.use,
        _says(worst, worst.use),
        remarks=(
            *device_remarks(amplifier, limits),
            *_open_remarks(open_load),
            *_limiter_remarks(amplifier, worst, uncut),
            *load_remarks(amplifier),
        ),
        unknown=worst.unknown,
        needs=_needs(amplifier),
        at=_point(worst),
        also=(
            *_beside(amplifier, worst),
            *uncut,
            *one_open_also(amplifier, into_loudspeaker, RATIO),
            *open_load,
            *_usable(amplifier, worst),
        ),
        next=NEXT,
        method=f"{METHOD if np.isnan(worst.frequency) else CURVE_METHOD}{cycle.method(worst.cut)}",
        as_built=as_built(amplifier, limits["soa.loudspeaker"], limits["loudspeaker.label"]),
    )


def loads(amplifier: Amplifier, angle: Number) -> tuple[Load, ...]:
    """Return the loads that count for the loudspeaker."""
    nominal_ohms, turned = operating.nominal_load(amplifier, angle)
    lowest, lowest_turned = operating.minimum_load(amplifier, MINIMUM_ANGLE)
    said = f"{text(nominal_ohms, RESISTANCE)} at up to {nominal(angle):.0f} deg"
    said_lowest = f"{text(lowest, RESISTANCE)} (minimum) at up to {MINIMUM_ANGLE:.0f} deg"
    return (
        Load(nominal_ohms, turned, said),
        Load(lowest, lowest_turned, said_lowest),
        *_low_notes(amplifier, Load(nominal_ohms, turned, said)),
        *_low_notes(amplifier, Load(lowest, lowest_turned, said_lowest)),
    )


def _low_notes(amplifier: Amplifier, load: Load) -> tuple[Load, ...]:
    """Return a load with the output capacitor in series, from its own angle to that at the lowest note."""
    if not operating.is_capacitor_coupled(amplifier):
        return ()
    name = f"{load.name} behind the output capacitor at low notes"
    seen = [
        operating.behind_capacitor(amplifier, load.magnitude, load.angle, most) for most in LOW_NOTE_ANGLES
    ]
    return tuple(Load(magnitude, turned, name) for magnitude, turned in seen)


def _beside(amplifier: Amplifier, worst: Worst) -> tuple[Also, ...]:
    if np.ndim(worst.use):  # only the nominal figure is shown: over the corners it would be work for nothing
        return ()
    sixty = _at_sixty(amplifier, worst) if np.isnan(worst.frequency) else ()
    return (*sixty, *any_signal_also(amplifier))


def _at_sixty(amplifier: Amplifier, worst: Worst) -> tuple[Also, ...]:
    magnitude, turned = operating.nominal_load(amplifier, SHOWN_ANGLE)
    load = Load(magnitude, turned, "60 deg")
    use = use_of(amplifier, worst.side, load, worst.case, rating_of(amplifier, worst.side), worst.cut)
    return (Also("60 deg", nominal(use.use), RATIO),)


def _open_load(amplifier: Amplifier, worst: Worst) -> tuple[Also, ...]:
    """Return the use without a load: a large idle current then flows at nearly rail to rail."""
    if np.ndim(worst.use):
        return ()
    peak = operating.clipping_peak(amplifier) / worst.load.magnitude / operating.conducting(amplifier)
    if not nominal(operating.idle_current(amplifier)) > OPEN_LOAD_IDLE * nominal(peak):
        return ()
    rating = rating_of(amplifier, worst.side)
    use = use_of(amplifier, worst.side, Load(OPEN_LOAD, 0.0, "no load"), worst.case, rating, worst.cut)
    return (Also("driven without a load", nominal(use.use), RATIO),)


def _open_remarks(open_load: tuple[Also, ...]) -> tuple[Remark, ...]:
    if not any(one.value > 1.0 for one in open_load):
        return ()
    return (
        Remark(
            Verdict.CAUTION, "driven without a load, or where its impedance is high, it leaves the safe area"
        ),
    )
