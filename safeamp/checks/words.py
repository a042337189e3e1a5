"""Small words that several checks share: numbers as text, nominal values, remarks on origins."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.findings import Remark, Verdict
from safeamp.limits import Limit, Limits
from safeamp.quantities import Kind, Number, Origin, show

#: How far the thermal resistance of fins by ruler may be off, and for what it is computed.
RULER = "-30/+70 %, for fins that stand upright in free air"

#: A printed power this much above what free air carries away is that of a cooled case; sheets round by less.
AT_A_CASE = 1.15


def nominal(value: Number) -> float:
    """Return the nominal of a value over the cases: its first."""
    return float(np.asarray(value, dtype=float).flat[0])


def text(value: Number, kind: Kind) -> str:
    """Return the nominal as text with its unit."""
    return show(nominal(value), kind)


def heat_remarks(amplifier: Amplifier) -> tuple[Remark, ...]:
    """Return what keeps every heat finding at caution: thermal resistances that nobody measured."""
    path = "heatsink.sink_to_air"
    if thermal.by_ruler(amplifier):
        because = f"{path} is computed from its fins by ruler, {RULER}: a soak with a thermometer settles it"
        return (Remark(Verdict.CAUTION, because),)
    if amplifier.origin(path) is not Origin.GUESS:
        return ()
    return (Remark(Verdict.CAUTION, f"{path} is a guess: a soak with a thermometer settles it"),)


def idle_remarks(amplifier: Amplifier) -> tuple[Remark, ...]:
    """Return what keeps a finding of heat from being judged: without idle, class A looks like class B."""
    readings = amplifier.readings
    if amplifier.stage.idle is None and not readings.idle_upper and not readings.idle_lower:
        return (Remark(Verdict.UNVERIFIED, "without the idle current class A cannot be told from class B"),)
    return ()


def sharing_remarks(amplifier: Amplifier, limits: Limits) -> tuple[Remark, ...]:
    """Return what keeps a finding of each device from being judged: more devices counted than carry current."""
    readable = limits["bias.imbalance"].extra["small_reading_below"]
    counted, found = nominal(operating.conducting(amplifier)), []
    for path in ("readings.idle_upper", "readings.idle_lower"):
        side = getattr(amplifier.readings, path.partition(".")[2])
        if not isinstance(side, tuple) or max(nominal(one) for one in side) < readable:
            continue
        carry = nominal(operating.carrying(side))
        if carry < counted:
            because = f"by {path} {carry:.0f} of {counted:.0f} devices carry current"
            found.append(
                Remark(
                    Verdict.UNVERIFIED, f"{because}: write stage.pairs_conducting = {carry:.0f}, or mend it"
                )
            )
    return tuple(found)


def free_air_remarks(amplifier: Amplifier) -> tuple[Remark, ...]:
    """Return what keeps a safe area in free air from being judged: a power that holds at a cooled case alone."""
    found = []
    for side in ("upper", "lower"):
        device = operating.device_of(amplifier, side)
        ratings = (device.power, device.power_at, device.junction_limit, device.junction_to_ambient)
        if not thermal.in_free_air(amplifier, device) or any(one is None for one in ratings):
            continue
        power, at, most, to_air = (nominal(one) for one in ratings if one is not None)
        if power > AT_A_CASE * (most - at) / to_air:
            name = amplifier.stage.upper if side == "upper" else amplifier.stage.lower
            because = f"device.{name}.power holds at a cooled case: in free air {(most - at) / to_air:.3g} W are left"
            found.append(Remark(Verdict.UNVERIFIED, because))
    return tuple(dict.fromkeys(found))


def level(limit: Limit, name: str) -> float:
    """Return a single level of a limit, go or stop; nan where it has none."""
    found = getattr(limit, name)
    return float(found) if isinstance(found, (int, float)) else float("nan")
