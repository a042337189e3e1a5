"""Another device against the fitted one: along the same load lines, each at its own case temperature."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from functools import reduce

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier, Sheet
from safeamp.answers.substitute import AtWork, Compared, LoadLine, Pair, Range, Ratings, Substitute
from safeamp.checks import curve, operating, safe_area, thermal
from safeamp.checks.safe_area import Load
from safeamp.checks.words import nominal
from safeamp.findings import Finding, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics.safe_area import allowed_current
from safeamp.quantities import VOLTAGE, show
from safeamp.studies.verdict import verdict

SIDES = ("upper", "lower")
SCOPE = (
    "voltage, temperature and safe area of the output devices on these load lines; "
    "speed, gain and genuineness are not judged"
)
DOUBTS = (
    "speed: with another one the stage may oscillate; watch the output at high frequency without load",
    "gain: whether the drivers feed it at the peak current is not computed here",
    "genuineness: a counterfeit holds none of its data; prove the power of one piece with DC on a heatsink",
    "polarity, order of the pins and whether the mounting face is live: compare both data sheets",
    "the idle current: set it anew from its lowest, and read it until it has settled warm",
)
#: V between the voltages of the table, and of the search for where one device is the weaker.
STEP, FINE = 1.0, 0.01
#: Less than this part under the fitted device is rounding.
CLOSE = 1e-6
#: Of the current rating: what is less counts as leakage.
LEAKAGE = 1e-5
_ANGLES = np.linspace(-90.0, 90.0, 721)

Values = npt.NDArray[np.float64]


class SameDeviceError(ValueError):
    """Both sheets have the same output devices."""


@dataclass(frozen=True)
class _Both:
    """The amplifier with the fitted and with the other device."""

    fitted: Amplifier
    other: Amplifier


def changes(device: str, side: str) -> dict[str, object]:
    """Return what a sheet says with the device on a side, "upper", "lower" or "both": no longer the maker's types."""
    sides = SIDES if side == "both" else (side,)
    return {**{f"stage.{one}": device for one in sides}, "stage.original_devices": False}


def substitute(fitted: Sheet, other: Sheet, limits: Limits) -> Substitute:
    """Return the comparison of two sheets that differ in an output device.

    Parameters
    ----------
    fitted, other : Sheet
        As read; the second one with `changes` in place of what is written.
    limits : Limits
        What the findings are judged by.

    Raises
    ------
    SameDeviceError
        If both have the same output devices.
    """
    both = _Both(fitted.amplifier, other.amplifier)
    sides = [side for side in SIDES if _name(both.fitted, side) != _name(both.other, side)]
    if not sides:
        raise SameDeviceError(f"{_name(both.other, 'upper')} is what is fitted; name another device")
    pairs = tuple(_pair(both, side) for side in sides)
    lines = tuple(_line(both, *one) for one in _asked(both, sides))
    findings = _findings(verdict(fitted, limits).findings, verdict(other, limits).findings, both, sides)
    because = (*_kinds(pairs), *_weaker(lines, pairs), *_nothing(findings))
    words = [*(one.other.verdict for one in findings), *(word for word, _ in because)]
    return Substitute(
        title=both.other.title,
        scope=SCOPE,
        verdict=max(words),
        pairs=pairs,
        lines=lines,
        findings=findings,
        because=because,
        doubts=DOUBTS,
        source=fitted.source,
        digest=fitted.digest,
        remarks=tuple(one for one in other.remarks if not _of_fitted(one, both, sides)),
    )


def _name(amplifier: Amplifier, side: str) -> str:
    return str(amplifier.stage.upper if side == "upper" else amplifier.stage.lower)


def _of_fitted(remark: str, both: _Both, sides: list[str]) -> bool:
    """Whether reading says that a device taken out is not used: here it is compared."""
    return any(remark.startswith(f"device.{_name(both.fitted, side)} is not used") for side in sides)


def _nothing(findings: tuple[Compared, ...]) -> Iterator[tuple[Verdict, str]]:
    if not findings:
        yield Verdict.UNVERIFIED, "no finding reads the data of the other device"


def _pair(both: _Both, side: str) -> Pair:
    fitted, other = _ratings(both.fitted, side), _ratings(both.other, side)
    sizes = [(getattr(fitted, name), getattr(other, name)) for name in ("voltage", "current", "power")]
    no_smaller = all(theirs >= ours for ours, theirs in sizes)
    return Pair(side, fitted, other, no_smaller and any(theirs > ours for ours, theirs in sizes))


def _ratings(amplifier: Amplifier, side: str) -> Ratings:
    device = operating.device_of(amplifier, side)
    names = ("voltage", "current", "power", "junction_limit")
    numbers = [nominal(thermal.device_value(amplifier, side, name)) for name in names]
    return Ratings(_name(amplifier, side), str(device.kind), *numbers)


def _kinds(pairs: tuple[Pair, ...]) -> Iterator[tuple[Verdict, str]]:
    for pair in pairs:
        if pair.fitted.kind != pair.other.kind:
            swapped = f"{pair.side}: a {pair.other.kind} where a {pair.fitted.kind} was"
            yield Verdict.UNVERIFIED, f"{swapped}; bias generator and drive must suit"


def _weaker(lines: tuple[LoadLine, ...], pairs: tuple[Pair, ...]) -> Iterator[tuple[Verdict, str]]:
    """Yield that the other device is the weaker where the load line goes, once a side."""
    for side in dict.fromkeys(line.side for line in lines):
        found = [one for line in lines if line.side == side for one in line.weaker_in_use]
        if found:
            larger = any(pair.larger for pair in pairs if pair.side == side)
            although = "although none of its ratings is smaller, " if larger else ""
            low, high = (
                show(volts, VOLTAGE)
                for volts in (min(one.low for one in found), max(one.high for one in found))
            )
            weaker = f"{although}it allows less current than the fitted device from {low} on"
            yield Verdict.CAUTION, f"{side}: {weaker}; the load goes there, up to {high}"


def _asked(both: _Both, sides: list[str]) -> Iterator[tuple[str, Step, Load]]:
    """Yield the load lines: into a resistor, and the loudspeaker loads that are worst for either device."""
    judged = {
        side for one in (both.fitted, both.other) for side in safe_area.sides_to_judge(one) if side in sides
    }
    for side in sorted(judged, reverse=True):
        resistor = safe_area.resistors(both.fitted)[0]
        yield side, Step.LOAD_TEST, resistor
        worst = [safe_area.worst_into_loudspeaker(one).load for one in (both.fitted, both.other)]
        for load in {load.name: load for load in worst}.values():
            yield side, Step.LOUDSPEAKER, load


def _line(both: _Both, side: str, step: Step, load: Load) -> LoadLine:
    paths = [_path(one, side, load) for one in (both.fitted, both.other)]
    top = max(nominal(thermal.device_value(one, side, "voltage")) for one in (both.fitted, both.other))
    voltages = np.arange(STEP, top + STEP / 2.0, STEP)
    fitted, other = (
        _at_work(one, side, step, load, voltages, path)
        for one, path in zip((both.fitted, both.other), paths, strict=True)
    )
    weaker = _ranges(both, side, (fitted.case, other.case), top)
    flowing = [_flowing(path) for path in paths]
    reached = Range(min(one.low for one in flowing), max(one.high for one in flowing))
    return LoadLine(
        side,
        load.name,
        step.value,
        tuple(voltages.tolist()),
        fitted,
        other,
        weaker,
        tuple(_within(one, reached) for one in weaker if one.low < reached.high and one.high > reached.low),
    )


def _path(amplifier: Amplifier, side: str, load: Load) -> tuple[Values, Values]:
    """Return voltages, rising, and currents of a load line."""
    one = Load(nominal(load.magnitude), nominal(load.angle), load.name)
    voltage, current = safe_area.path_of(amplifier, side, one, _ANGLES)
    order = np.argsort(voltage)
    return np.asarray(voltage, dtype=float)[order], np.asarray(current, dtype=float)[order]


def _flowing(path: tuple[Values, Values]) -> Range:
    """Return the voltages at which more than a thousandth of the peak current flows."""
    voltage, current = path
    where = voltage[current > 1e-3 * np.max(current)]
    return Range(float(where[0]), float(where[-1])) if where.size else Range(np.nan, np.nan)


def _within(one: Range, limits: Range) -> Range:
    return Range(max(one.low, limits.low), min(one.high, limits.high))


def _at_level(amplifier: Amplifier, step: Step) -> thermal.Dissipation:
    """Return the heat at the level at which the check of a step judges the safe area."""
    if step is Step.LOAD_TEST:
        return thermal.at_level(amplifier, thermal.ONE_THIRD)
    points = curve.points_of(amplifier)
    if points is None:
        return thermal.at_level(amplifier, thermal.ONE_EIGHTH, operating.phase_angle(amplifier))
    heating = curve.heating_load(amplifier, points, thermal.ONE_EIGHTH)
    return thermal.at_level(amplifier, thermal.ONE_EIGHTH, load=heating)


def _at_work(
    amplifier: Amplifier,
    side: str,
    step: Step,
    load: Load,
    voltages: Values,
    path: tuple[Values, Values],
) -> AtWork:
    levels = (thermal.no_signal(amplifier), _at_level(amplifier, step))
    warm = [thermal.temperatures(amplifier, level, side) for level in levels]
    case = reduce(np.maximum, [one.case for one in warm])
    rating = safe_area.rating_of(amplifier, side)
    use = safe_area.use_of(amplifier, side, load, case, rating)
    carried = np.where(path[1] > LEAKAGE * nominal(rating.current), path[1], 0.0)
    asked = np.interp(voltages, path[0], carried, left=np.nan, right=np.nan)
    allowed = allowed_current(voltage=voltages, case_temperature=nominal(case), rating=rating)
    return AtWork(
        case=nominal(case),
        junction=nominal(reduce(np.maximum, [one.junction for one in warm])),
        use=nominal(use.use),
        voltage=nominal(use.voltage),
        current=nominal(use.current),
        enters_unknown=bool(nominal(use.enters_unknown)),
        asked=tuple(asked.tolist()),
        allowed=tuple(allowed.tolist()),
    )


def _ranges(both: _Both, side: str, cases: tuple[float, float], top: float) -> tuple[Range, ...]:
    """Return the ranges of voltage in which the other device allows less current."""
    voltages = np.arange(FINE, top + FINE / 2.0, FINE)
    fitted, other = (
        allowed_current(voltage=voltages, case_temperature=case, rating=safe_area.rating_of(one, side))
        for one, case in zip((both.fitted, both.other), cases, strict=True)
    )
    less = np.concatenate([[False], other < fitted * (1.0 - CLOSE), [False]]).astype(int)
    edges = np.diff(less)
    starts, ends = np.flatnonzero(edges == 1), np.flatnonzero(edges == -1)
    return tuple(
        Range(float(voltages[start]), float(voltages[end - 1]))
        for start, end in zip(starts, ends, strict=True)
    )


def _findings(
    fitted: tuple[Finding, ...], other: tuple[Finding, ...], both: _Both, sides: list[str]
) -> tuple[Compared, ...]:
    """Return the findings that read, or would need, a rating of the other device."""
    names = {_name(both.other, side) for side in sides}
    before = {one.id: one for one in fitted}
    return tuple(Compared(one.id, before.get(one.id), one) for one in other if _reads(one, names))


def _reads(finding: Finding, names: set[str]) -> bool:
    keys = [*(one.key for one in finding.inputs), *finding.needs]
    return any(key.startswith(f"device.{name}.") for key in keys for name in names)
