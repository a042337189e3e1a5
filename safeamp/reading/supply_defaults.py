"""Defaults of mains and supply."""

from __future__ import annotations

from safeamp.limits import Limits
from safeamp.quantities import RATIO, VOLTAGE, Origin, show
from safeamp.reading.draft import Draft

#: Declared voltages of public supplies; the older 220 and 240 V count as 230 V, which is the nearest to both.
DECLARED = (100.0, 120.0, 127.0, 230.0)

#: Where the mains at a rail's reading stands, by whether the rail was measured.
MAINS_OF = {True: "mains.actual", False: "mains.rated"}


def declared_voltage(actual: float) -> float:
    """Return the declared voltage of the public supply that lies nearest to a reading, V; of two the higher."""
    return min(DECLARED, key=lambda declared: (abs(declared - actual), -declared))


def fill_supply(draft: Draft, limits: Limits) -> None:
    """Fill in what mains and supply leave open."""
    if draft.word("supply.source") != "mains":
        return
    _nominal(draft)
    _highest(draft, limits)
    _present(draft)
    _at_mains(draft)
    if "supply.full_load" not in draft.written:
        share = limits.default("supply.full_load")
        spread = (share.low, share.high)
        draft.fill("supply.full_load_share", share.nominal, RATIO, spread=spread, text="share of no_load")
        text = f"{share.nominal:g} of no_load ({share.low:.2f} to {share.high:.2f})"
        draft.assume("supply.full_load", text, share.says)


def _nominal(draft: Draft) -> None:
    actual = draft.number("mains.actual")
    if actual is not None and "mains.nominal" not in draft.written:
        nominal = declared_voltage(actual)
        text = show(nominal, VOLTAGE)
        draft.fill("mains.nominal", nominal, VOLTAGE, text=text)
        draft.assume("mains.nominal", text, "the declared voltage nearest to mains.actual")


def _highest(draft: Draft, limits: Limits) -> None:
    nominal, actual = draft.number("mains.nominal"), draft.number("mains.actual")
    if nominal is None or "mains.highest" in draft.written:
        return
    band = limits.default("mains.present")
    highest = max(band.high * nominal, actual or 0.0)
    text = show(highest, VOLTAGE, digits=4)
    # A public supply does reach this voltage: it is a fact to be borne, not a guess to be settled.
    origin = _unless_example(draft, "mains.nominal", Origin.STATED)
    draft.fill("mains.highest", highest, VOLTAGE, origin=origin, text=text)
    draft.assume(
        "mains.highest", text, f"{band.high:g} times nominal ({band.source}), never below mains.actual"
    )


def _unless_example(draft: Draft, source: str, origin: Origin) -> Origin:
    """Return the origin of a number that follows from another: from an example follows an example."""
    return Origin.EXAMPLE if draft.origins.get(source) is Origin.EXAMPLE else origin


def _present(draft: Draft) -> None:
    actual, highest = draft.entries.get("mains.actual"), draft.entries.get("mains.highest")
    if actual is None or highest is None:
        return
    spread = (actual.low, max(highest.high, actual.high))
    draft.fill(
        "mains.present", actual.nominal, VOLTAGE, spread=spread, origin=actual.origin, text=actual.text
    )


def _at_mains(draft: Draft) -> None:
    if "supply.at_mains" in draft.written or not draft.has("supply.no_load"):
        return
    rails = range(len(draft.numbers("supply.no_load")))
    measured = {draft.origins[f"supply.no_load.{place}"] is Origin.MEASURED for place in rails}
    found = {name: draft.number(name) for name in (MAINS_OF[one] for one in measured)}
    volts = min((one for one in found.values() if one is not None), default=None)
    if volts is None or None in found.values():
        return
    # Of two rails read at different mains the lower mains makes both the larger.
    source = next(name for name, one in found.items() if one == volts)
    measured_today = source == MAINS_OF[True]
    origin = _unless_example(draft, source, Origin.ASSUMED)
    draft.fill("supply.at_mains", volts, VOLTAGE, origin=origin, text=show(volts, VOLTAGE, digits=4))
    why = "the rail was measured today" if measured_today else "the rail is that of the plate's mains"
    draft.assume("supply.at_mains", f"{source}, {show(volts, VOLTAGE, digits=4)}", why)
