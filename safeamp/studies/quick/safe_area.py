"""Safe area without a sheet: how much of it one device uses into a load at an angle."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import reduce
from typing import Any

import numpy as np

from safeamp.amplifier import Amplifier, Sheet, with_values
from safeamp.answers import Path, Plane, PutIn, QuickAnswer
from safeamp.checks import operating, safe_area
from safeamp.complaints import OptionsError
from safeamp.findings import Measure, Remark, Verdict
from safeamp.limits import Limits
from safeamp.physics import safe_area as physics
from safeamp.physics import stage
from safeamp.physics.safe_area import ZONES, Use
from safeamp.quantities import ANGLE, CURRENT, POWER, RATIO, RESISTANCE, VOLTAGE, Number, Origin
from safeamp.studies.quick.desk import Cases, Desk, Page, half_supply, loss_of, shown

CAUTIONS = (
    "Put in the rail without load, and the case as hot as one eighth of power makes it (a resistor: one third).",
    "A loudspeaker whose angle nobody has measured may reach 60 deg: put that in too.",
    "Both sides count: put in the device of the other side as well.",
)

#: Angles of the output voltage through which the paths of a picture are drawn, deg.
ANGLES = np.linspace(-90.0, 90.0, 361)


@dataclass(frozen=True, eq=False)
class _Load:
    magnitude: Number
    angle: float


def safe_area_answer(desk: Desk, sheet: Sheet | None) -> QuickAnswer:
    """Return the use of the safe area of the device in a sheet that holds nothing else.

    Raises
    ------
    OptionsError
        If too little is given or options contradict one another.
    """
    rail = desk.one_rail()
    desk.need("load", "case_temperature")
    if sheet is None:
        raise OptionsError('too little is given; add --device; "safeamp devices" lists names')
    class_b = not desk.has("idle")
    _fill(desk, rail)
    angle = _angle(desk)
    page = Page(desk.cases(*sheet.entries.values()))
    amplifier = _amplifier(page.cases, sheet)
    loads = _loads(page.cases, angle, desk.limits)
    uses = [_use(page.cases, amplifier, rail, load) for load in loads]
    _add(page, rail, angle, uses)
    judged = list(zip(loads, uses, strict=True))
    _judge(page, amplifier, judged, class_b=class_b)
    answer = page.answer("Safe area", _holds_for(page.cases, angle), CAUTIONS, _device_put_in(sheet))
    return replace(answer, plane=_plane(page.cases, sheet, rail, judged))


def _fill(desk: Desk, rail: str) -> None:
    loss, angle = desk.limits.default("stage.swing_loss"), desk.limits.default("loudspeaker.phase_angle")
    desk.assume("phase_angle", angle.nominal, ANGLE, angle.says)
    desk.assume("emitter_resistor", 0.0, RESISTANCE, "none was given")
    desk.assume("pairs", 1.0, RATIO, "one device on each side")
    desk.assume("swing_loss", loss.nominal, VOLTAGE, loss.says)
    desk.assume("idle", 0.0, CURRENT, "none was given: class B")
    desk.assume(
        "highest", 1.1, RATIO, "highest mains over that of the reading (EN 50160)", origin=Origin.STATED
    )
    high = desk.entries[rail].high * desk.entries["highest"].nominal
    desk.move(rail, high=high, why="up to the highest mains")


def _angle(desk: Desk) -> float:
    """Return the angle that counts, deg: zero is a resistor, anything else at least 45 without a measured curve."""
    given = abs(desk.entries["phase_angle"].nominal)
    if given == 0.0 and not desk.entries["phase_angle"].spread:
        return 0.0
    ends = [abs(end) for end in (desk.entries["phase_angle"].low, desk.entries["phase_angle"].high)]
    counts = max(operating.LEAST_ANGLE, *ends)
    if counts > given:
        entry = desk.entries["phase_angle"]
        why = f"counts as {counts:g} deg: a smaller one needs a measured curve"
        desk.entries["phase_angle"] = replace(entry, nominal=counts, low=counts, high=counts)
        desk.whys["phase_angle"] = (entry.text, why)
    return counts


def _amplifier(cases: Cases, sheet: Sheet) -> Amplifier:
    """Return the device over the cases, in a stage that says nothing but its idle current."""
    moved = {path: value for path, value in cases.columns.items() if path.startswith("device.")}
    amplifier = with_values(sheet.amplifier, moved)
    return replace(
        amplifier, stage=replace(amplifier.stage, idle=cases["idle"], idle_unit="A", pairs=cases["pairs"])
    )


def _loads(cases: Cases, angle: float, limits: Limits) -> tuple[_Load, ...]:
    """Return the load as put in, and for a loudspeaker its lowest impedance near resistance."""
    load = _Load(cases["load"], angle)
    if angle == 0.0:
        return (load,)
    share = limits.default("loudspeaker.minimum_impedance").nominal
    return load, _Load(
        cases["load"] * share, limits.default("loudspeaker.minimum_impedance.phase_angle").nominal
    )


def _peak(cases: Cases, rail: str, magnitude: Number) -> Number:
    return stage.clipped_peak(
        side_voltage=half_supply(cases, rail),
        swing_loss=loss_of(cases, rail),
        load_magnitude=magnitude,
        emitter_resistor=cases["emitter_resistor"],
        conducting=cases["pairs"],
    )


def _drive(cases: Cases, amplifier: Amplifier, rail: str, load: _Load) -> dict[str, Any]:
    """Return what drives the device into a load, and what it is."""
    device = operating.device_of(amplifier, "upper")
    single = bool(np.all(np.asarray(cases["pairs"]) <= 1))
    return {
        "half_supply": half_supply(cases, rail),
        "peak": _peak(cases, rail, load.magnitude),
        "load_magnitude": load.magnitude,
        "phase_angle": load.angle,
        "conducting": cases["pairs"],
        "emitter_resistor": cases["emitter_resistor"],
        "idle_current": cases["idle"],
        "law": operating.law_of(device),
        "imbalance": 0.0 if single else None,
        "transconductance_parameter": device.transconductance_parameter,
    }


def _use(cases: Cases, amplifier: Amplifier, rail: str, load: _Load) -> Use:
    rating = safe_area.rating_of(amplifier, "upper")
    driven = _drive(cases, amplifier, rail, load)
    return physics.envelope_use(**driven, case_temperature=cases["case_temperature"], rating=rating)


def _plane(cases: Cases, sheet: Sheet, rail: str, judged: list[tuple[_Load, Use]]) -> Plane:
    """Return what can be drawn: the nominal device, the load of the worst use last."""
    ordered = sorted(judged, key=lambda one: _sortable(one[1].use))
    use = ordered[-1][1]
    return Plane(
        device=f"device, a {operating.device_of(sheet.amplifier, 'upper').kind}",
        rating=safe_area.rating_of(sheet.amplifier, "upper"),
        case=_first(cases["case_temperature"]),
        use=_first(use.use),
        voltage=_first(use.voltage),
        current=_first(use.current),
        paths=tuple(_path(cases, sheet, rail, load) for load, _ in ordered),
    )


def _path(cases: Cases, sheet: Sheet, rail: str, load: _Load) -> Path:
    driven: dict[str, Any] = {
        name: _first(value) if isinstance(value, np.ndarray) else value
        for name, value in _drive(cases, sheet.amplifier, rail, load).items()
    }
    voltage, current = physics.envelope_path(output_angle=ANGLES, **driven)
    return Path(f"{shown(load.magnitude, RESISTANCE)} at up to {load.angle:g} deg", voltage, current)


def _first(value: Number) -> float:
    return float(np.asarray(value, dtype=float).flat[0])


def _zone(use: Use) -> str:
    return ZONES[int(_first(use.zone))]


def _add(page: Page, rail: str, angle: float, uses: list[Use]) -> None:
    """Add the use at the angle put in, beside it that at the lowest impedance, and what it compares with."""
    cases, use, half = page.cases, uses[0], half_supply(page.cases, rail)
    load = {"load_magnitude": cases["load"], "phase_angle": angle}
    resistance = physics.equivalent_resistance(**load)
    peak = physics.peak_dissipation(half_supply=half, **load)
    page.add("use", use.use, RATIO)
    page.add_one("voltage", _first(use.voltage), VOLTAGE)
    page.add_one("current", _first(use.current), CURRENT)
    page.add("peak_dissipation", peak, POWER)
    page.add("equivalent_resistance", resistance, RESISTANCE)
    page.add_one("zone", _zone(use))
    for other in uses[1:]:
        page.add("use_at_minimum_impedance", other.use, RATIO)
    page.say(
        "use = device current / current allowed there, the largest over cycle, angle and level",
        f"{shown(use.current, CURRENT)} at {shown(use.voltage, VOLTAGE)} ({_zone(use)}): {shown(use.use, RATIO)}",
    )
    tilt = (90.0 - 2.0 * angle) / 3.0
    page.say(
        "equivalent resistance = load / (4 x (1 - sin t) x sin(t + angle)), t = (90 deg - 2 x angle) / 3",
        f"{shown(cases['load'], RESISTANCE)} / (4 x (1 - sin {shown(tilt, ANGLE)}) x sin {shown(tilt + angle, ANGLE)}) "
        f"= {shown(resistance, RESISTANCE)}",
    )
    page.say(
        "peak dissipation of one side = half supply squared / (4 x equivalent resistance)",
        f"({shown(half, VOLTAGE)})^2 / (4 x {shown(resistance, RESISTANCE)}) = {shown(peak, POWER)}",
    )


def _holds_for(cases: Cases, angle: float) -> str:
    load = shown(cases["load"], RESISTANCE)
    if angle == 0.0:
        return f"a resistor of {load} alone; it says nothing about a loudspeaker"
    return f"one device into a loudspeaker of {load} at up to {angle:g} deg"


def _judge(page: Page, amplifier: Amplifier, found: list[tuple[_Load, Use]], *, class_b: bool) -> None:
    load, point = max(found, key=lambda one: _sortable(one[1].use))
    use = reduce(np.maximum, [one.use for _, one in found])
    amount = (
        f"uses {_first(use):.0%} of the safe area"
        if np.isfinite(_first(use))
        else "current where none is allowed"
    )
    because = "without --idle the stage is taken for class B"
    measure = Measure(
        use,
        f"{amount} into {shown(load.magnitude, RESISTANCE)} at up to {load.angle:g} deg, at "
        f"{shown(point.voltage, VOLTAGE)} and {shown(point.current, CURRENT)} ({_zone(point)})",
        remarks=(
            *safe_area.device_remarks(amplifier, page.cases.desk.limits),
            *((Remark(Verdict.CAUTION, because),) if class_b else ()),
        ),
        unknown=reduce(np.logical_or, [one.enters_unknown for _, one in found]),
        next=safe_area.NEXT,
    )
    identity = "soa.loudspeaker" if len(found) > 1 else "soa.resistive_load"
    page.judge(identity, measure, tuple(page.cases.desk.entries))


def _sortable(use: Number) -> float:
    value = _first(use)
    return np.inf if np.isnan(value) else value


def _device_put_in(sheet: Sheet) -> tuple[PutIn, ...]:
    name = str(sheet.amplifier.stage.upper)
    typical = sheet.amplifier.origin(f"device.{name}.voltage") is Origin.ASSUMED
    return (
        PutIn("device", name, "typical ratings of its class: enter your data sheet's" if typical else ""),
    )
