"""Defaults of the heatsink: how far a thermal resistance may lie from what is written."""

from __future__ import annotations

from math import isclose

from safeamp.limits import Default, Limits
from safeamp.quantities import LENGTH, RATIO, TEMPERATURE_DIFFERENCE, THERMAL_RESISTANCE, Origin, show
from safeamp.reading.draft import Draft


def fill_heat(draft: Draft, limits: Limits) -> None:
    """Widen what was not measured, and take a mounting from the table of interfaces."""
    _air(draft, limits)
    _interface(draft, limits)
    _fins(draft, limits)
    for path in ("heatsink.sink_to_air", "heatsink.case_to_sink"):
        if path in draft.written and draft.has(path):
            _widen(draft, path, limits)


def _air(draft: Draft, limits: Limits) -> None:
    path = "heatsink.air"
    if not draft.has(path) or path in draft.toleranced:
        return
    rise, air = limits.default(path), draft.values[path]
    draft.widen(path, air + rise.low, air + rise.high)
    draft.assume(path, f"+{show(rise.high, TEMPERATURE_DIFFERENCE)} in the worst case", rise.says)


def _fins(draft: Draft, limits: Limits) -> None:
    """Say how far fins by ruler may be off, and what stands in for a surface and a plate that nobody described."""
    fins, given = "heatsink.fins", "heatsink.sink_to_air"
    if fins not in draft.written:
        return
    if given in draft.written:
        draft.remarks.append(f"{given} is given, so {fins} is not used")
        return
    spread, surface = limits.default(given), limits.default(f"{fins}.emissivity")
    draft.fill(f"{fins}_share", spread.nominal, RATIO, spread=(spread.low, spread.high), text="by ruler")
    why = "true over computed thermal resistance; fins stand upright, free above and below, without a fan"
    draft.assume(fins, _text(spread), why)
    if f"{fins}.emissivity" not in draft.written:
        draft.fill(f"{fins}.emissivity", surface.nominal, RATIO, text="bare metal")
        draft.assume(f"{fins}.emissivity", f"{surface.nominal:g}", surface.says)
    if f"{fins}.plate" not in draft.written:
        draft.fill(f"{fins}.plate", 0.0, LENGTH, text="not counted")
        draft.assume(
            f"{fins}.plate", "not counted", "its edges radiate a little; leaving them out is cautious"
        )


def _widen(draft: Draft, path: str, limits: Limits) -> None:
    origin = draft.origins[path]
    if origin is Origin.MEASURED or (path in draft.toleranced and not _plain_guess(draft, path, limits)):
        return
    name = "heatsink.sink_to_air.data_sheet" if origin is Origin.DATA_SHEET else "heatsink.sink_to_air"
    spread, nominal = limits.default(name), draft.values[path]
    draft.widen(path, nominal * spread.low, nominal * spread.high)
    draft.assume(path, _text(spread), "true over written thermal resistance, which was not measured")


def _plain_guess(draft: Draft, path: str, limits: Limits) -> bool:
    """Whether the interval is only the one that every guess gets: a guessed K/W may lie further off."""
    entry, guess = draft.entries[path], limits.default("guess.value")
    return (
        entry.origin is Origin.GUESS
        and isclose(entry.low, guess.low * entry.nominal)
        and isclose(entry.high, guess.high * entry.nominal)
    )


def _text(spread: Default) -> str:
    return f"-{100 * (1 - spread.low):.0f}/+{100 * (spread.high - 1):.0f} %"


def _interface(draft: Draft, limits: Limits) -> None:
    name, path = draft.word("heatsink.insulator"), "heatsink.case_to_sink"
    if name is None:
        return
    try:
        interface = limits.interface(name)
    except KeyError as trouble:
        draft.complain("heatsink.insulator", str(trouble.args[0]))
        return
    draft.values["heatsink.insulator"] = interface.name
    if path in draft.written:
        draft.remarks.append(f"{path} is given, so heatsink.insulator is not used")
        return
    spread = (interface.low, interface.high)
    draft.fill(path, interface.nominal, THERMAL_RESISTANCE, spread=spread, text=interface.name)
    text = f"{show(interface.nominal, THERMAL_RESISTANCE)} ({_text(limits.default('heatsink.insulator'))})"
    draft.assume(path, text, f"{interface.name} in the table of interfaces ({interface.evidence})")
