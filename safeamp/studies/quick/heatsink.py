"""Heatsink without a sheet: one device, what is left out of its heat, its way and its temperatures."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from safeamp.answers import QuickAnswer
from safeamp.checks import thermal
from safeamp.checks.words import RULER
from safeamp.complaints import OptionsError
from safeamp.findings import Measure, Remark, Verdict
from safeamp.physics import convection, fins, heat
from safeamp.physics.air import air_at
from safeamp.quantities import LENGTH, POWER, RATIO, TEMPERATURE, THERMAL_RESISTANCE, Number, Origin
from safeamp.studies.quick.desk import Cases, Desk, Page, dashed, shown

FINS = ("width", "height", "depth")
DEVICE = ("case_to_sink", "junction_to_case")
CAUTIONS = (
    "The heat put in is that of one device; a heatsink that more devices share is hotter by the heat of all.",
    "Air inside the cabinet counts, lid on, not that of the room.",
)
FIN_CAUTIONS = (
    f"By ruler: {RULER}. Fins that lie, stand across the draught or are shut in shed less.",
    "Prefer a soak: two thermometers and an hour say more than any ruler.",
)


@dataclass(frozen=True, eq=False)
class _Chain:
    """Temperatures, degC, heat, W, and K/W of the heatsink; nan where nothing was put in to know them."""

    air: Number
    power: Number
    sink_to_air: Number
    sink: Number
    solved: str


def heatsink_answer(desk: Desk) -> QuickAnswer:
    """Return what is left out of heat, air, thermal resistances and junction, or what fins by ruler shed.

    Raises
    ------
    OptionsError
        If too little is given or options contradict one another.
    """
    by_ruler = desk.has("width")
    _ask_device(desk)
    solved = _ask_ruler(desk) if by_ruler else _ask(desk)
    _fill(desk, by_ruler=by_ruler)
    page = Page(desk.cases())
    chain = _ruled(page, solved) if by_ruler else _solved(page, solved)
    case, junction = _device(page, chain)
    _add(page, chain, case, junction)
    if by_ruler:
        _add_fins(page, chain)
    _judge(page, chain, junction, by_ruler=by_ruler)
    return page.answer(
        "Heatsink", "one device at this heat", (*(FIN_CAUTIONS if by_ruler else ()), *CAUTIONS)
    )


def _fill(desk: Desk, *, by_ruler: bool) -> None:
    for name in ("sink_to_air", "case_to_sink"):
        printed = desk.has(name) and desk.entries[name].origin is Origin.DATA_SHEET
        found = desk.limits.default("heatsink.sink_to_air" + (".data_sheet" if printed else ""))
        desk.widen(name, found.low, found.high, "not measured: the true one may be far off")
    air, rise = desk.entries.get("air"), desk.limits.default("heatsink.air").high
    if air is not None and not air.spread and air.origin is not Origin.MEASURED:
        desk.move("air", high=air.nominal + rise, why=f"the worst case adds {rise:g} K")
    if by_ruler:
        surface, spread = (
            desk.limits.default("heatsink.fins.emissivity"),
            desk.limits.default("heatsink.sink_to_air"),
        )
        ends = (spread.low, spread.high)
        desk.assume("fins_share", spread.nominal, RATIO, f"true over computed K/W by ruler, {RULER}", ends)
        desk.assume("emissivity", surface.nominal, RATIO, surface.says)
        desk.assume("plate", 0.0, LENGTH, "its edges are not counted")


def _add(page: Page, chain: _Chain, case: Number, junction: Number) -> None:
    """Add what is known of the chain; a heatsink that none is large enough for is said to be none."""
    of_sink = np.where(np.asarray(chain.sink_to_air) > 0.0, chain.sink_to_air, np.nan)
    if np.isfinite(_first(junction)):
        page.add("junction", junction, TEMPERATURE)
    if np.isfinite(_first(case)):
        page.add("case", case, TEMPERATURE)
    page.add("sink", chain.sink, TEMPERATURE)
    page.add("sink_to_air", of_sink, THERMAL_RESISTANCE)
    page.add("power", chain.power, POWER)
    if chain.solved == "air":
        page.add("air", chain.air, TEMPERATURE)


def _ask_device(desk: Desk) -> None:
    """Refuse what names a junction that cannot be computed: left out unsaid, it would pass for judged."""
    for name in ("junction_limit", "junction_to_case"):
        lacks = [one for one in DEVICE if not desk.has(one)]
        if desk.has(name) and lacks:
            raise OptionsError(f"{dashed(name)} says nothing alone; add {dashed(*lacks)}")


def _ask_ruler(desk: Desk) -> str:
    desk.need("thickness", "count", "air")
    for other in ("sink_to_air", "junction"):
        if desk.has(other):
            raise OptionsError(f"--fins and {dashed(other)} contradict each other; leave one of them out")
    if desk.has("power") == desk.has("sink_temperature"):
        both = "--power and --sink-temperature contradict each other; leave one of them out"
        raise OptionsError(
            both if desk.has("power") else "too little is given; add --power or --sink-temperature"
        )
    return "sink" if desk.has("power") else "power"


def _ask(desk: Desk) -> str:
    """Return which of junction, sink, air, power and sink_to_air is solved for."""
    for name in ("thickness", "count", "plate", "emissivity"):
        desk.only_with(name, "fins")
    if desk.has("junction", "sink_temperature"):
        raise OptionsError("--junction and --sink-temperature contradict each other; leave one of them out")
    known = [name for name in ("air", "power", "sink_to_air") if desk.has(name)]
    end = next((name for name in ("junction", "sink_temperature") if desk.has(name)), None)
    if end is None:
        desk.need("air", "power", "sink_to_air")
        return "junction" if desk.has(*DEVICE) else "sink"
    if end == "junction":
        desk.need(*DEVICE)
    missing = [name for name in ("air", "power", "sink_to_air") if not desk.has(name)]
    if len(known) < 2:
        raise OptionsError(f"too little is given; add all but one of {dashed(*missing)}")
    if not missing:
        raise OptionsError(f"nothing is left to solve for; leave out {dashed(end)}, or what is to be found")
    return missing[0]


def _solved(page: Page, solved: str) -> _Chain:
    """Return the chain with what was left out solved for."""
    cases = page.cases
    if solved in ("junction", "sink"):
        sink = heat.sink_temperature(
            air=cases["air"], stage_power=cases["power"], shared_by=1.0, sink_to_air=cases["sink_to_air"]
        )
        put = f"{_t(cases['air'])} + {_w(cases['power'])} x {_r(cases['sink_to_air'])}"
        page.say("heatsink = air + heat x sink to air", f"{put} = {_t(sink)}")
        return _Chain(cases["air"], cases["power"], cases["sink_to_air"], sink, solved)
    end, inner = _end(cases)
    name = "junction" if cases.desk.has("junction") else "heatsink"
    rest = " + case to sink + junction to case" if name == "junction" else ""
    air, power, outer = (
        cases[key] if cases.desk.has(key) else np.nan for key in ("air", "power", "sink_to_air")
    )
    if solved == "air":
        air = end - power * (outer + inner)
        put = f"{_t(end)} - {_w(power)} x {_r(outer + inner)} = {_t(air)}"
        page.say(f"highest air = {name} - heat x (sink to air{rest})", put)
    elif solved == "power":
        power = heat.allowed_power(junction_limit=end, air=air, resistance=outer + inner)
        _refuse_cold(power)
        put = f"({_t(end)} - {_t(air)}) / {_r(outer + inner)} = {_w(power)}"
        page.say(f"heat = ({name} - air) / (sink to air{rest})", put)
    else:
        outer = (end - air) / power - inner
        put = f"({_t(end)} - {_t(air)}) / {_w(power)} - {_r(inner)} = {shown(outer, THERMAL_RESISTANCE)}"
        page.say(f"sink to air = ({name} - air) / heat{rest.replace('+', '-')}", put)
    return _Chain(air, power, outer, end - power * inner, solved)


def _end(cases: Cases) -> tuple[Number, Number]:
    """Return the temperature at the inner end of the chain, degC, and what lies between it and the heatsink, K/W."""
    if cases.desk.has("junction"):
        return cases["junction"], cases["case_to_sink"] + cases["junction_to_case"]
    return cases["sink_temperature"], 0.0


def _refuse_cold(power: Number) -> None:
    if float(np.asarray(power).flat[0]) <= 0.0:
        raise OptionsError("the air is as hot as what it should cool; read --air again")


def _t(value: Number) -> str:
    return shown(value, TEMPERATURE)


def _w(value: Number) -> str:
    return shown(value, POWER)


def _r(value: Number) -> str:
    return shown(value, THERMAL_RESISTANCE)


def _geometry(cases: Cases) -> fins.Geometry:
    width, thickness, count = cases["width"], cases["thickness"], cases["count"]
    if np.any(np.asarray(count * thickness) >= np.asarray(width)):
        filled = f"{shown(count, RATIO)} fins of {shown(thickness, LENGTH)} fill {shown(width, LENGTH)}"
        raise OptionsError(f"--fins: {filled}; give the width across the fins first, and one fin alone")
    return fins.Geometry(**{name: cases[name] for name in thermal.FINS})


def _ruled(page: Page, solved: str) -> _Chain:
    """Return the chain of fins by ruler, solved to balance."""
    cases = page.cases
    geometry, air, share = _geometry(cases), cases["air"], cases["fins_share"]
    if solved == "sink":
        power: Any = cases["power"]
        sink = air + share * fins.sink_rise(geometry=geometry, heat=power, air=air)
    else:
        sink = cases["sink_temperature"]
        _refuse_cold(sink - _first(air))
        # In air as hot as the heatsink nothing is shed; the corner of a hotter cabinet may reach that far.
        rise = np.maximum((sink - np.asarray(air)) / share, 0.0)
        power = fins.fins_heat(geometry=geometry, rise=rise, air=air).total
    resistance = (sink - np.asarray(air)) / np.where(np.asarray(power) > 0.0, power, np.nan)
    return _Chain(air, power, resistance, sink, solved)


def _first(value: Any) -> float:
    return float(np.asarray(value, dtype=float).flat[0])


def _add_fins(page: Page, chain: _Chain) -> None:
    geometry, air = _geometry(page.cases), np.asarray(chain.air)
    rise = (chain.sink - air) / page.cases["fins_share"]
    if not np.isfinite(_first(rise)):
        return
    tall = convection.rayleigh_number(
        rise=_first(rise),
        length=_first(geometry.height),
        air=air_at(temperature=_first(air) + _first(rise) / 2.0),
    )
    nominal = replace(geometry, **{name: _first(getattr(geometry, name)) for name in thermal.FINS})
    parts = fins.fins_heat(geometry=nominal, rise=_first(rise), air=_first(air))
    page.add_one("power_of_fins", float(parts.channels), POWER)
    page.add_one("power_of_back", float(parts.back), POWER)
    page.add_one("power_radiated", float(parts.radiated), POWER)
    page.add_one("gap", float(nominal.gap), LENGTH)
    page.add_one("best_gap", float(convection.best_gap(rayleigh=tall, height=nominal.height)), LENGTH)
    put = f"{_w(parts.channels)} + {_w(parts.back)} + {_w(parts.radiated)} = {_w(parts.total)} at {_t(chain.sink)}"
    page.say("heat = fins as parallel upright plates + back of the plate + radiation, in balance", put)


def _device(page: Page, chain: _Chain) -> tuple[Number, Number]:
    """Return case and junction, degC; nan where their thermal resistance was not put in."""
    cases, desk = page.cases, page.cases.desk
    if not desk.has("case_to_sink"):
        return np.nan, np.nan
    case = heat.case_temperature(
        sink=chain.sink, device_power=chain.power, case_to_sink=cases["case_to_sink"]
    )
    if not desk.has("junction_to_case"):
        return case, np.nan
    junction = heat.junction_temperature(
        case=case, device_power=chain.power, junction_to_case=cases["junction_to_case"]
    )
    put = f"{_t(chain.sink)} + {_w(chain.power)} x ({_r(cases['case_to_sink'])} + {_r(cases['junction_to_case'])})"
    page.say("junction = heatsink + heat x (case to sink + junction to case)", f"{put} = {_t(junction)}")
    return case, junction


def _judge(page: Page, chain: _Chain, junction: Number, *, by_ruler: bool) -> None:
    because = f"sink to air is computed from its fins by ruler, {RULER}"
    remarks = (Remark(Verdict.CAUTION, because),) if by_ruler else ()
    none = _first(chain.sink_to_air) <= 0.0
    measure = Measure(
        chain.sink,
        f"heatsink at {_t(chain.sink)}" + ("; no heatsink is large enough" if none else ""),
        remarks=remarks,
        word=Verdict.STOP if none else None,
        next="less heat, or a better way from the case to the air",
    )
    used = tuple(page.cases.desk.entries)
    page.judge("heat.heatsink", measure, used)
    if np.isfinite(_first(junction)):
        page.judge("heat.junction", _junction(page.cases, junction, remarks), used)


def _junction(cases: Cases, junction: Number, remarks: tuple[Remark, ...]) -> Measure:
    """Return the junction against its limit; a junction that was put in as the aim is taken for the limit."""
    name = next((one for one in ("junction_limit", "junction") if cases.desk.has(one)), None)
    if name is None:
        return Measure(
            junction,
            f"junction at {_t(junction)}; what it stands was not put in",
            remarks=(
                *remarks,
                Remark(Verdict.UNVERIFIED, "the junction limit is not known: add --junction-limit"),
            ),
            without_stop=True,
            go=np.inf,
        )
    extra, limit = cases.desk.limits["heat.junction"].extra, cases[name]
    start = extra["span_from"]
    return Measure(
        junction,
        f"junction at {_t(junction)}, allowed {_t(limit)}",
        go=start + extra["go_share_of_span"] * (np.asarray(limit) - start),
        stop=limit,
        remarks=remarks,
        next="the limit leaves nothing to spare: aim for a cooler junction",
    )
