"""Defaults of the heatsink: how far a thermal resistance may lie from what is written."""

from __future__ import annotations

from math import isclose

from safeamp.limits import Default, Limits
from safeamp.quantities import TEMPERATURE_DIFFERENCE, THERMAL_RESISTANCE, Origin, show
from safeamp.reading.draft import Draft


def fill_heat(draft: Draft, limits: Limits) -> None:
    """Widen what was not measured, and take a mounting from the table of interfaces."""
    _air(draft, limits)
    _interface(draft, limits)
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
