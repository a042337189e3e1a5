"""Output capacitor without a sheet: value, cutoff, rated voltage, ripple."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from safeamp.answers import Bass, QuickAnswer
from safeamp.checks.thermal import ONE_THIRD
from safeamp.complaints import OptionsError
from safeamp.findings import Measure
from safeamp.physics import capacitor, preferred
from safeamp.quantities import (
    CAPACITANCE,
    CURRENT,
    FREQUENCY,
    PERCENT,
    POWER,
    RATIO,
    RESISTANCE,
    VOLTAGE,
    Number,
    Origin,
)
from safeamp.studies.quick.desk import HIGHEST, Cases, Desk, Page, shown

TRIPLE = ("cutoff", "load", "capacitance")
CAUTIONS = (
    "Give the lowest impedance of the loudspeaker as --load: 80 % of nominal when nobody has measured it.",
    "The rating must stand the whole rail: half of it at rest, all of it when an upper device shorts.",
    "Only a discharged capacitor may be touched: discharge it through a resistor and measure first.",
)


def capacitor_answer(desk: Desk) -> QuickAnswer:
    """Return what is left out of cutoff, load and capacitance, with rated voltage and ripple where they are asked for.

    Raises
    ------
    OptionsError
        If too little is given or options contradict one another.
    """
    _ask(desk)
    _fill(desk)
    page = Page(desk.cases())
    bass = _value(page)
    if desk.has("single_rail"):
        _rating(page)
    if desk.has("power"):
        _ripple(page)
    return replace(page.answer("Output capacitor", "the bass cutoff alone", CAUTIONS), bass=bass)


def _ask(desk: Desk) -> None:
    bass = desk.has("cutoff") or desk.has("capacitance")
    if not bass and not desk.has("power") and not desk.has("single_rail"):
        add = "--cutoff and --load, or --capacitance and --load, or --single-rail"
        raise OptionsError(f"too little is given; add {add}")
    if bass and sum(desk.has(name) for name in TRIPLE) < 2:
        other = "--capacitance" if desk.has("cutoff") else "--cutoff"
        raise OptionsError(f"too little is given; add --load, or {other}")
    if desk.has("power"):
        desk.need("load")
    desk.only_with("highest", "single_rail")
    desk.only_with("tolerance", "cutoff", "capacitance")
    if desk.has("tolerance", "capacitance") and desk.entries["capacitance"].spread:
        raise OptionsError("the tolerance is given twice; leave out --tolerance, or that of --capacitance")


def _fill(desk: Desk) -> None:
    default = desk.limits.default("output_capacitor.capacitance")
    if desk.has("single_rail"):
        why = "highest mains over that of the reading (EN 50160)"
        desk.assume("highest", HIGHEST, RATIO, why, origin=Origin.STATED)
    if desk.has("capacitance"):
        low = 1.0 - desk.entries["tolerance"].nominal if desk.has("tolerance") else default.low
        desk.widen("capacitance", low, 2.0 - low, f"may be {1.0 - low:.0%} off")
    elif desk.has("cutoff"):
        desk.assume("tolerance", 1.0 - default.low, PERCENT, "usual low end of an electrolytic")


def _value(page: Page) -> Bass | None:
    """Add what is left out of the three, and return what can be drawn of them."""
    cases = page.cases
    if cases.desk.has("capacitance", "load"):
        _cutoff(page, cases["capacitance"])
        return _bass(cases, cases["capacitance"], cases["load"])
    if cases.desk.has("capacitance", "cutoff"):
        return _bass(cases, cases["capacitance"], _load(page))
    if cases.desk.has("cutoff"):
        return _bass(cases, _size(page), cases["load"])
    return None


def _bass(cases: Cases, farads: Number, load: Number) -> Bass:
    all_of = np.atleast_1d(np.asarray(farads, dtype=float))
    target = float(np.ravel(cases["cutoff"])[0]) if cases.desk.has("cutoff") else None
    return Bass(
        capacitance=float(all_of[0]),
        low=float(np.min(all_of)),
        high=float(np.max(all_of)),
        load=float(np.ravel(load)[0]),
        target=target,
    )


def _cutoff(page: Page, farads: Number) -> None:
    """Add where a capacitance cuts off, and judge it where a cutoff is aimed at."""
    cases = page.cases
    found = capacitor.cutoff_frequency(capacitance=farads, load_resistance=cases["load"])
    page.add("cutoff", found, FREQUENCY)
    page.add_one("cutoff_worst", float(np.max(found)), FREQUENCY)
    load, value, hertz = _ohms(cases), shown(farads, CAPACITANCE), shown(found, FREQUENCY)
    page.say("cutoff (-3 dB) = 1 / (2 pi x load x capacitance)", f"1 / (2 pi x {load} x {value}) = {hertz}")
    if not cases.desk.has("cutoff"):
        return
    measure = Measure(
        found,
        f"-3 dB at {hertz} with {value} into {load}",
        go=cases["cutoff"],
        without_stop=True,
        everywhere=True,
        next="it costs bass, not the amplifier; fit the next larger value if the bass is thin",
    )
    page.judge("capacitor.cutoff", measure, TRIPLE)


def _ohms(cases: Cases) -> str:
    return shown(cases["load"], RESISTANCE)


def _load(page: Page) -> Number:
    """Add the lowest load and return it."""
    cases = page.cases
    ohms = 1.0 / (2.0 * np.pi * cases["cutoff"] * cases["capacitance"])
    page.add("load", ohms, RESISTANCE)
    page.add_one("load_worst", float(np.max(ohms)), RESISTANCE)
    put = f"1 / (2 pi x {shown(cases['cutoff'], FREQUENCY)} x {shown(cases['capacitance'], CAPACITANCE)})"
    page.say("lowest load = 1 / (2 pi x cutoff x capacitance)", f"{put} = {shown(ohms, RESISTANCE)}")
    found: Number = ohms
    return found


def _size(page: Page) -> Number:
    """Add what to buy and where it cuts off; return it with the low end of its tolerance."""
    cases = page.cases
    bare = capacitor.capacitance_for_cutoff(cutoff=cases["cutoff"], load_resistance=cases["load"])
    left = 1.0 - cases["tolerance"]
    exact = bare / left
    # Bought for the worst of what was put in: a tolerance of load or cutoff counts too.
    bought = float(preferred.next_preferred(np.max(exact), "E6"))
    page.add("capacitance_exact", exact, CAPACITANCE)
    page.add("capacitance_without_tolerance", bare, CAPACITANCE)
    page.add_one("capacitance_preferred", bought, CAPACITANCE)
    put = f"1 / (2 pi x {shown(cases['cutoff'], FREQUENCY)} x {_ohms(cases)})"
    page.say(
        "capacitance = 1 / (2 pi x cutoff x load), over what the tolerance leaves of it; next E6 value up",
        f"{put} / {float(np.min(left)):.4g} = {shown(exact, CAPACITANCE)}; {shown(bought, CAPACITANCE)}",
    )
    corners = np.arange(len(cases.design.rows)) > 0
    fitted: Number = np.where(corners, bought * left, bought)
    _cutoff(page, fitted)
    return fitted


def _rating(page: Page) -> None:
    cases = page.cases
    whole = cases["single_rail"] * cases["highest"]
    most = float(np.max(whole))
    known = most <= max(preferred.RATED_VOLTAGES)
    rating = float(preferred.next_rated_voltage(most)) if known else None
    page.add("rail_at_highest_mains", whole, VOLTAGE)
    page.add_one("rated_voltage", rating, VOLTAGE)
    said = "above every usual rating" if rating is None else shown(rating, VOLTAGE)
    put = f"{shown(cases['single_rail'], VOLTAGE)} x {shown(cases['highest'], RATIO)}"
    page.say(
        "rated voltage = the next above the rail x highest over actual mains",
        f"{put} = {shown(whole, VOLTAGE)}; {said}",
    )


def _ripple(page: Page) -> None:
    cases = page.cases
    rms = np.sqrt(cases["power"] / np.asarray(cases["load"]))
    page.add("ripple", rms, CURRENT)
    page.add("ripple_one_third", rms * np.sqrt(ONE_THIRD), CURRENT)
    put = f"root of ({shown(cases['power'], POWER)} / {_ohms(cases)})"
    page.say(
        "ripple, rms = root of (power / load); at one third of power 0.577 of it",
        f"{put} = {shown(rms, CURRENT)}",
    )
