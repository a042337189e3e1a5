"""A soak without a sheet: where a heatsink settles by its readings, and which K/W that makes."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np

from safeamp.amplifier import Entry, SoakLog
from safeamp.answers import Amount, PutIn, QuickAnswer
from safeamp.complaints import OptionsError
from safeamp.findings import Measure, Remark, Verdict
from safeamp.physics.soak import soak_resistance
from safeamp.quantities import (
    PERCENT,
    POWER,
    TEMPERATURE,
    TEMPERATURE_DIFFERENCE,
    THERMAL_RESISTANCE,
    TIME,
    Origin,
    show,
)
from safeamp.studies.quick.desk import Desk, Page, dashed, shown
from safeamp.studies.quick.soak_told import Told, told
from safeamp.studies.quick.soak_words import cautions, next_reading, says, switch_off, why_not

END, RISE = "end_temperature", "rise"
NOT_YET = "cannot be told yet"
UNCHECKED = "three readings lie on some curve whatever they are: a fourth tells whether this one holds"


def soak_answer(desk: Desk, log: SoakLog) -> QuickAnswer:
    """Return where the readings say that a heatsink settles, how certain that is, and its K/W.

    Raises
    ------
    OptionsError
        If an option says again what a column of the log says.
    """
    power_moves = _fill(desk, log)
    found = told(desk, log)
    page = Page(desk.cases(*_entries(found)))
    _judge(page, found, power_moves)
    _add(page, found)
    _say(page, found)
    air = (
        f"air of {shown(desk.entries['air'].nominal, TEMPERATURE)}"
        if desk.has("air")
        else "the air as it was"
    )
    return page.answer(
        "Soak of a heatsink",
        f"this heatsink at the heat of this log, in {air}",
        tuple(cautions(desk, found)),
        (PutIn("log", _log_text(log)),),
    )


def _log_text(log: SoakLog) -> str:
    first, last = (show(log.sink[place], TEMPERATURE, 4) for place in (0, -1))
    span = show(log.time[-1] - log.time[0], TIME)
    return f"{log.text}: {len(log.time)} readings in {span}, from {first} to {last}"


def _fill(desk: Desk, log: SoakLog) -> bool:
    """Fill in what the columns say and the reading error; return whether the heat moved too far."""
    error = desk.limits.default("soak.reading_error")
    desk.assume(
        "reading_error", error.nominal, TEMPERATURE_DIFFERENCE, "assumed: a usual thermometer, well fixed"
    )
    for name, column in (("air", log.air), ("power", log.power)):
        if column is not None and desk.has(name):
            raise OptionsError(f"the log has a column {name}; leave {dashed(name)} out")
    if log.air is not None:
        _air_of(desk, log.air)
    elif desk.has("air") and not desk.entries["air"].spread:
        air, off = desk.entries["air"], desk.entries["reading_error"].high
        desk.entries["air"] = replace(air, low=air.nominal - off, high=air.nominal + off)
        desk.whys["air"] = (air.text, "read once: it may be off by the reading error")
    return log.power is not None and _power_of(desk, log.time, log.power)


def _air_of(desk: Desk, column: tuple[float, ...]) -> None:
    low, high = min(column), max(column)
    moves = high - low > desk.limits.default("soak.air_moves").nominal
    nominal, low = (high, high) if moves else (float(np.mean(column)), low)
    desk.entries["air"] = Entry("air", nominal, low, high, Origin.MEASURED, TEMPERATURE)
    why = "highest of the log: it moved too much for its mean" if moves else "mean of the log"
    desk.whys["air"] = (shown(nominal, TEMPERATURE), why)


def _power_of(desk: Desk, time: tuple[float, ...], column: tuple[float, ...]) -> bool:
    steps, watts = np.diff(time), np.asarray(column)
    mean = float(np.sum(steps * (watts[1:] + watts[:-1]) / 2.0) / np.sum(steps))
    desk.entries["power"] = Entry("power", mean, mean, mean, Origin.MEASURED, POWER)
    desk.whys["power"] = (shown(mean, POWER), "mean of the log over time")
    return bool(np.max(np.abs(watts / mean - 1.0)) > desk.limits.default("soak.power_moves").nominal)


def _entries(found: Told) -> list[Entry]:
    """Return the ends of the intervals with their spread; where nothing bounds one, its low end is the nominal."""
    values = [(END, found.end, found.low, found.high, TEMPERATURE)]
    if found.rise is not None:
        values.append((RISE, *found.rise, TEMPERATURE_DIFFERENCE))
    return [
        Entry(name, best if np.isfinite(high) else low, low, high, Origin.ASSUMED, kind)
        for name, best, low, high, kind in values
        if np.isfinite(low)
    ]


def _finite(value: float) -> float | None:
    return float(value) if np.isfinite(value) else None


def _add(page: Page, found: Told) -> None:
    def add(name: str, value: float, kind: Any, unknown: str = NOT_YET) -> None:
        page.results.append(Amount(name, _finite(value), kind, unknown=unknown))

    missing = NOT_YET if found.rising else "not known"
    add(END, found.end if found.known else np.nan, TEMPERATURE, missing)
    add(f"{END}_low", found.low, TEMPERATURE, missing)
    add(f"{END}_high", found.high, TEMPERATURE, missing)
    constant = "shorter than these readings can tell" if found.known else missing
    add("time_constant", found.time_constant if found.known else np.nan, TIME, constant)
    rise = _rise(page, found)
    without = missing if page.cases.desk.has("air") else "air is not given"
    add(RISE, rise[0] if found.known else np.nan, TEMPERATURE_DIFFERENCE, without)
    _add_resistance(page, found, rise, without)
    if page.judged[0].verdict is Verdict.STOP:
        add("more_time", np.nan, TIME, "none: switch off")
    elif found.more_time == 0.0:
        add("more_time", np.nan, TIME, "none needed")
    else:
        add("more_time", found.more_time, TIME, "not to be foreseen")


def _rise(page: Page, found: Told) -> Any:
    """Return the rise above air over the cases, K; nan where air or end are not known."""
    cases = page.cases
    if not cases.desk.has("air") or not np.isfinite(found.low):
        return np.array([np.nan])
    return np.atleast_1d(np.asarray(cases[RISE] if RISE in cases.columns else cases[END] - cases["air"]))


def _add_resistance(page: Page, found: Told, rise: Any, without: str) -> None:
    cases, name = page.cases, "sink_to_air"
    if not cases.desk.has("power"):
        without, values = "power is not given", np.array([np.nan])
    else:
        values = np.atleast_1d(soak_resistance(sink=rise, air=0.0, power=cases["power"]))
    ends = (values[0] if found.known else np.nan, values.min(), values.max())
    for end, value in zip(("", "_low", "_high"), ends, strict=True):
        kept = _finite(value) if value > 0.0 else None
        page.results.append(Amount(f"{name}{end}", kept, THERMAL_RESISTANCE, unknown=without))
    if np.isfinite(ends[0]):
        put = f"{shown(rise, TEMPERATURE_DIFFERENCE)} / {shown(cases['power'], POWER)}"
        page.say("sink to air = rise / mean heat put in", f"{put} = {shown(values, THERMAL_RESISTANCE)}")


def _say(page: Page, found: Told) -> None:
    page.formulas[:0] = found.formulas
    if found.known and found.rise is None and page.cases.desk.has("air"):
        air = shown(page.cases["air"], TEMPERATURE)
        rise = shown(_rise(page, found), TEMPERATURE_DIFFERENCE)
        place = len(found.formulas)
        page.say("rise = end - air", f"{shown(found.end, TEMPERATURE)} - {air} = {rise}")
        page.formulas.insert(place, page.formulas.pop())


def _judge(page: Page, found: Told, power_moves: bool) -> None:
    remarks = [Remark(Verdict.UNVERIFIED, text) for text in why_not(page.cases.desk, found)]
    if power_moves:
        share = show(page.cases.desk.limits.default("soak.power_moves").nominal, PERCENT)
        because = f"the heat moved by more than {share} from its mean: a forecast needs steady heat"
        remarks.append(Remark(Verdict.UNVERIFIED, because))
    if np.isnan(found.scatter):
        remarks.append(Remark(Verdict.CAUTION, UNCHECKED))
    measure = Measure(
        _value(page, found),
        says(found),
        remarks=tuple(remarks),
        next=next_reading(page.cases.desk, found),
        everywhere=True,
        corner="the upper end of the interval",
    )
    page.judge("heat.heatsink", measure, tuple(page.cases.desk.entries))
    [finding] = page.judged
    stopped = finding.verdict is Verdict.STOP
    # Nobody may be told to read on beyond the stop level.
    page.judged = [replace(finding, worst_case={}, next=switch_off(found) if stopped else finding.next)]


def _value(page: Page, found: Told) -> Any:
    """Return what is judged, degC: the end over its interval, never below a reading; no bound where it accelerates."""
    if found.accelerating:
        return np.inf
    return np.maximum(page.cases[END], found.hottest) if np.isfinite(found.low) else found.hottest
