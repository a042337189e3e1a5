"""Loudspeaker without a sheet: power at clipping, heat of the devices, and a rail on the coil."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Fuse
from safeamp.answers import QuickAnswer
from safeamp.checks import operating
from safeamp.checks.fuses import gates_of
from safeamp.findings import Measure
from safeamp.physics import loudspeaker, stage
from safeamp.physics.fuse import slowest_time
from safeamp.quantities import CURRENT, POWER, RATIO, RESISTANCE, TEMPERATURE, TIME, VOLTAGE, Number
from safeamp.studies.quick.desk import Cases, Desk, Page, half_supply, loss_of, shown

#: The hotter the coil, the less current is left to open the fuse; no usual coil is hotter than this (memory), degC.
HOT_COIL = 250.0
#: Where a coil is when its DC resistance is read, degC.
COLD_COIL = 20.0
STAGE = ("split_rail", "single_rail", "swing_loss", "load", "emitter_resistor", "pairs")
CAUTIONS = (
    "Power at clipping asks for the rail at full load, a fault for the rail without load: put in each in turn.",
    "With an output capacitor the whole rail reaches the coil only when the capacitor fails too.",
    "A meter reads the coil cold and still; no loudspeaker belongs on an amplifier whose output was not read.",
)


def loudspeaker_answer(desk: Desk, fuse: Fuse | None, power_word: str | None) -> QuickAnswer:
    """Return clipping power, worst heat of each device, and what a rail does to the coil.

    Raises
    ------
    OptionsError
        If too little is given or options contradict one another.
    """
    rail = desk.one_rail()
    desk.need("load")
    desk.only_with("coil_limit", "dc_resistance")
    _fill(desk, fuse, power_word)
    page = Page(desk.cases())
    load = _believed(page.cases)
    _stage(page, rail, load)
    if desk.has("dc_resistance"):
        _fault(page, rail, fuse)
    if desk.has("rated_power"):
        _power(page, stage.load_power(peak=_peak(page.cases, rail, load), load_magnitude=load))
    return page.answer(
        "Loudspeaker", "what was put in; it clears no loudspeaker", (*_doubt(page.cases, load), *CAUTIONS)
    )


def _fill(desk: Desk, fuse: Fuse | None, power_word: str | None) -> None:
    loss = desk.limits.default("stage.swing_loss")
    desk.assume("swing_loss", loss.nominal, VOLTAGE, "no loss gives the most power")
    desk.assume("emitter_resistor", 0.0, RESISTANCE, "none was given")
    desk.assume("pairs", 1.0, RATIO, "one device on each side")
    if desk.has("rated_power"):
        share = desk.limits.default("loudspeaker.rated_power")
        ends = (share.low, share.high)
        if power_word is None:
            desk.assume("rated_noise_share", share.nominal, RATIO, share.says, ends)
        else:
            said = loudspeaker.POWER_WORDS[power_word]
            desk.assume("rated_noise_share", said, RATIO, f"the label says {power_word}")
    if fuse is not None:
        desk.need("dc_resistance")
        desk.assume("coil_limit", HOT_COIL, TEMPERATURE, "a hot coil lets less current through the fuse")


def _believed(cases: Cases) -> Number:
    """Return the load; a label that the coil contradicts is not believed, ohm."""
    if not cases.desk.has("dc_resistance"):
        return cases["load"]
    coil, printed = cases["dc_resistance"], cases["load"]
    return np.where(np.asarray(coil) / printed < operating.LABEL_FLOOR, coil / operating.COIL_SHARE, printed)


def _doubt(cases: Cases, load: Number) -> tuple[str, ...]:
    if float(np.asarray(load).flat[0]) == cases.desk.entries["load"].nominal:
        return ()
    return (f"The coil contradicts the label; everything is computed for {shown(load, RESISTANCE)}.",)


def _peak(cases: Cases, rail: str, load: Number) -> Number:
    return stage.clipped_peak(
        side_voltage=half_supply(cases, rail),
        swing_loss=loss_of(cases, rail),
        load_magnitude=load,
        emitter_resistor=cases["emitter_resistor"],
        conducting=cases["pairs"],
    )


def _stage(page: Page, rail: str, load: Number) -> None:
    cases = page.cases
    peak, half = _peak(cases, rail, load), half_supply(cases, rail)
    power = stage.load_power(peak=peak, load_magnitude=load)
    each = stage.worst_resistive_heat(half_supply=half, load=load) / (2.0 * cases["pairs"])
    page.add("clipping_power", power, POWER)
    page.add("peak_voltage", peak, VOLTAGE)
    page.add("peak_current", peak / load, CURRENT)
    page.add("worst_dissipation_each", each, POWER)
    ohms, volts, pairs = shown(load, RESISTANCE), shown(peak, VOLTAGE), shown(cases["pairs"], RATIO)
    supply, resistor = shown(half, VOLTAGE), shown(cases["emitter_resistor"], RESISTANCE)
    page.say(
        "peak = (half supply - loss) x load / (load + emitter resistor / pairs)",
        f"({supply} - {shown(cases['swing_loss'], VOLTAGE)}) x {ohms} / ({ohms} + {resistor} / {pairs}) = {volts}",
    )
    page.say(
        "power at clipping = peak squared / (2 x load)", f"({volts})^2 / (2 x {ohms}) = {shown(power, POWER)}"
    )
    page.say(
        "worst heat of each device = half supply squared / (pi squared x load x pairs), into a resistor",
        f"({supply})^2 / (pi^2 x {ohms} x {pairs}) = {shown(each, POWER)}",
    )


def _fault(page: Page, rail: str, fuse: Fuse | None) -> None:
    volts, coil = page.cases[rail], page.cases["dc_resistance"]
    current = loudspeaker.dc_fault_current(voltage=volts, dc_resistance=coil)
    power = loudspeaker.dc_fault_power(voltage=volts, dc_resistance=coil)
    page.add("dc_fault_power", power, POWER)
    page.add("dc_fault_current", current, CURRENT)
    put = f"({shown(volts, VOLTAGE)})^2 / {shown(coil, RESISTANCE)}"
    page.say(
        "power of a DC fault = rail squared / DC resistance, coil still cold",
        f"{put} = {shown(power, POWER)}",
    )
    stops = "nothing that was put in stops it" if fuse is None else _fuse(page, volts, fuse)
    _label(page)
    measure = Measure(
        power,
        f"one device shorted: {shown(power, POWER)} in the coil; {stops}",
        go=-np.inf,
        without_stop=True,
        next="a relay with a DC detector, or a loudspeaker fuse, must act before the coil reaches its limit",
    )
    page.judge("loudspeaker.dc_fault", measure, ("dc_resistance", rail))


def _fuse(page: Page, volts: Number, fuse: Fuse) -> str:
    """Add when the fuse has acted for certain, and return it in words."""
    cases = page.cases
    ratio = loudspeaker.copper_ratio(rise=cases["coil_limit"] - COLD_COIL)
    through = volts / (cases["dc_resistance"] * ratio)
    times = through / fuse.rating
    longest = float(np.max(slowest_time(times_rating=times, gates=gates_of(fuse, cases.desk.limits))))
    certain = np.isfinite(longest)
    page.add_one("fuse_time", longest if certain else None, TIME)
    said = shown(longest, TIME) if certain else "never for certain"
    page.say(
        "fuse: slowest gate at rail / (DC resistance of the hot coil) / rating",
        f"{shown(through, CURRENT)} / {shown(fuse.rating, CURRENT)} = {shown(times, RATIO)} times its rating: {said}",
    )
    name = f"the fuse {fuse.letter} {shown(fuse.rating, CURRENT)}"
    return (
        f"{name} has acted after {said}, what the coil stands is not known"
        if certain
        else f"{name} may never act"
    )


def _label(page: Page) -> None:
    coil, printed = page.cases["dc_resistance"], page.cases["load"]
    says = f"the coil reads {shown(coil, RESISTANCE)}, the label says {shown(printed, RESISTANCE)}"
    measure = Measure(np.asarray(coil) / printed, says, next="read the coil at the terminals, cable off")
    page.judge("loudspeaker.label", measure, ("dc_resistance", "load"))


def _power(page: Page, power: Number) -> None:
    noise = page.cases["rated_power"] * page.cases["rated_noise_share"]
    says = f"{shown(power, POWER)} sine power at clipping, {shown(noise, POWER)} rated noise power"
    measure = Measure(power / noise, says, next="look up which kind of power the label means: --power-word")
    page.judge("loudspeaker.power", measure, ("rated_power", "rated_noise_share", *STAGE))
