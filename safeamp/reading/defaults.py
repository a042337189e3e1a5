"""Defaults: what stands where the sheet says nothing, each listed with its reason."""

from __future__ import annotations

from typing import Any

from safeamp.amplifier import TABLES, Curve, Key, keys_of
from safeamp.limits import Limits
from safeamp.quantities import PERCENT, RATIO, RESISTANCE, VOLTAGE, Origin, read, show
from safeamp.reading.draft import Draft
from safeamp.reading.heat_defaults import fill_heat
from safeamp.reading.midpoint import fill_midpoint
from safeamp.reading.parts import written_devices
from safeamp.reading.supply_defaults import fill_supply

#: Share of the printed power that is rated noise power, by the word beside it (AES2).
POWER_WORDS = {"rated noise": 1.0, "programme": 0.5, "peak": 0.25}


def fill_defaults(draft: Draft, limits: Limits) -> None:
    """Fill in every default that applies to this amplifier."""
    fill_plain(draft)
    for fill in (fill_supply, _stage, _swing, _capacitor, fill_midpoint, _loudspeaker, fill_heat):
        fill(draft, limits)


def fill_plain(draft: Draft) -> None:
    """Fill in the defaults that the nouns themselves carry."""
    for table, noun in TABLES.items():
        paths = [f"device.{name}" for name in written_devices(draft)] if table == "device" else [table]
        for path in paths:
            if _applies(draft, table):
                for name, key in keys_of(noun).items():
                    _plain(draft, f"{path}.{name}", key)


def _applies(draft: Draft, table: str) -> bool:
    return table != "output_capacitor" or draft.word("stage.coupling") == "capacitor"


def _plain(draft: Draft, path: str, key: Key) -> None:
    if not key.default or path in draft.values or path in draft.written or _replaced(draft, path):
        return
    if not key.kinds:
        draft.put(path, key.default == "true" if key.flag else key.default, Origin.ASSUMED)
    else:
        value: Any = float(key.default) if key.kinds[0] == RATIO else key.default
        draft.fill(path, read(value, key.kinds[0], sign=key.sign).nominal, key.kinds[0], text=key.default)
    draft.assume(path, key.default, key.why)


def _replaced(draft: Draft, path: str) -> bool:
    """Whether something measured stands in place of a default."""
    return path == "loudspeaker.phase_angle" and draft.has("loudspeaker.impedance_curve")


def _stage(draft: Draft, limits: Limits) -> None:
    pairs = draft.number("stage.pairs")
    if pairs is not None and "stage.pairs_conducting" not in draft.written:
        draft.fill("stage.pairs_conducting", pairs, RATIO, text=f"{pairs:g}")
        if pairs > 1:
            draft.assume("stage.pairs_conducting", f"{pairs:g}", "every device was said to carry current")
    if pairs is not None and pairs > 1 and "stage.imbalance" not in draft.written:
        text = "50 mV/(Re + Vt/I)"
        draft.assume("stage.imbalance", text, limits.default("stage.imbalance.device_spread").says)
    if draft.has("stage.idle") and "stage.idle_at" not in draft.written:
        measured = draft.origins["stage.idle"] is Origin.MEASURED
        word, why = ("warm", "idle was measured") if measured else ("cold", "idle was not measured")
        draft.put("stage.idle_at", word, Origin.ASSUMED)
        draft.assume("stage.idle_at", word, why)
    if draft.word("stage.bias_sensor") in ("heatsink", "device"):
        _standard(draft, limits, "stage.bias_tracking", PERCENT)


def _standard(draft: Draft, limits: Limits, path: str, kind: Any) -> None:
    """Fill in one key from the table of defaults."""
    if path in draft.written:
        return
    default = limits.default(path)
    text = show(default.nominal, kind)
    if default.low < default.high:
        text += f" ({show(default.low, kind)} to {show(default.high, kind)})"
    draft.fill(path, default.nominal, kind, spread=(default.low, default.high), text=text)
    draft.assume(path, text, default.says)


def _swing(draft: Draft, limits: Limits) -> None:
    given = [f"stage.{name}" for name in ("swing_loss", "swing_loss_up", "swing_loss_down", "clipped_peak")]
    if not any(path in draft.written for path in given):
        _standard(draft, limits, "stage.swing_loss", VOLTAGE)


def _capacitor(draft: Draft, limits: Limits) -> None:
    path = "output_capacitor.capacitance"
    if draft.word("stage.coupling") != "capacitor" or not draft.has(path):
        return
    if path not in draft.toleranced and draft.origins[path] is not Origin.MEASURED:
        default, nominal = limits.default(path), draft.values[path]
        draft.widen(path, nominal * default.low, nominal * default.high)
        draft.assume(path, spread_text(default.low, default.high), default.says)


def spread_text(low: float, high: float) -> str:
    """Return two factors as a tolerance, such as ``±20 %`` or ``-30/+70 %``."""
    below, above = round(100 * (1 - low), 6), round(100 * (high - 1), 6)
    return f"±{above:g} %" if below == above else f"-{below:g}/+{above:g} %"


def _loudspeaker(draft: Draft, limits: Limits) -> None:
    curve = draft.values.get("loudspeaker.impedance_curve")
    if isinstance(curve, Curve):
        _by_curve(draft, curve)
    elif "loudspeaker.minimum_impedance" not in draft.written:
        share = limits.default("loudspeaker.minimum_impedance")
        draft.fill("loudspeaker.minimum_share", share.nominal, RATIO, text="80 % of nominal")
        draft.assume("loudspeaker.minimum_impedance", f"{100 * share.nominal:g} % of nominal", share.says)
    angle = draft.number("loudspeaker.phase_angle")
    least = limits.default("loudspeaker.phase_angle").nominal
    if angle is not None and angle < least and curve is None:
        draft.remarks.append(
            f"loudspeaker.phase_angle of {angle:g} deg counts as {least:g} deg: there is no curve"
        )
    if draft.has("loudspeaker.rated_power"):
        _power_share(draft, limits)


def _by_curve(draft: Draft, curve: Curve) -> None:
    """Take from a measured curve what it says better than a rule: its lowest point, and every angle."""
    if "loudspeaker.minimum_impedance" not in draft.written:
        lowest = min(curve.impedances)
        draft.fill("loudspeaker.minimum_impedance", lowest, RESISTANCE, origin=Origin.STATED, text=curve.text)
    if draft.has("loudspeaker.phase_angle"):
        draft.remarks.append("loudspeaker.phase_angle does not count: the impedance curve has every angle")


def _power_share(draft: Draft, limits: Limits) -> None:
    word = draft.word("loudspeaker.power_word")
    if word is not None:
        origin = draft.origins["loudspeaker.power_word"]
        draft.fill("loudspeaker.power_share", POWER_WORDS[word], RATIO, origin=origin, text=word)
    elif "loudspeaker.power_word" not in draft.written:
        share = limits.default("loudspeaker.rated_power")
        spread = (share.low, share.high)
        draft.fill(
            "loudspeaker.power_share", share.nominal, RATIO, spread=spread, text="no word beside the power"
        )
        text = f"rated noise power is {share.nominal:g} of the printed power, down to {share.low:g}"
        draft.assume("loudspeaker.power_word", text, share.says)
