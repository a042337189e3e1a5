"""Numbers shown beside a finding: worked out at the nominal amplifier, over the corners it would be for nothing."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, cast

import numpy as np

from safeamp.amplifier import Amplifier, with_values
from safeamp.checks import curve, cycle, operating
from safeamp.checks.words import nominal
from safeamp.findings import Also, Remark, Verdict
from safeamp.physics.safe_area import Rating, Use, derating, limiter_use, usable_power
from safeamp.quantities import POWER, RATIO, Kind, Number

ONE_OPEN = "with one device of each side open"
BY_DC = "by the DC curve alone"
UNLIMITED = "without the V-I limiter"
LIMITER = "protection.vi_limiter"


def plain(amplifier: Amplifier) -> Amplifier | None:
    """Return the amplifier behind a watched one, so that what is shown moves no corner; None over the corners."""
    if getattr(amplifier, "trace", None) is None:
        return None
    return cast(Amplifier, cast(Any, amplifier)._node)


def one_open_also(amplifier: Amplifier, value: Callable[[Amplifier], Number], kind: Kind) -> tuple[Also, ...]:
    """Return the value of a finding with one device less of each side; nothing with one pair.

    Nothing outside shows an open device: its neighbours carry its share.
    """
    whole = plain(amplifier)
    if whole is None:
        return ()
    count = nominal(operating.conducting(whole))
    if not count > 1.0:
        return ()
    less = with_values(whole, {"stage.pairs_conducting": count - 1.0})
    return (Also(ONE_OPEN, nominal(value(less)), kind),)


def uncut_also(
    amplifier: Amplifier, cut: cycle.Cut, value: Callable[[Amplifier], Number]
) -> tuple[Also, ...]:
    """Return the use of the safe area by the DC curve alone and without the V-I limiter, where they count."""
    whole, found = plain(amplifier), []
    if whole is None or cut.is_none:
        return ()
    pulses = {f"device.{name}.pulse": None for name in cycle.devices_of(whole)}
    if any(operating.device_of(whole, side).pulse for side in cycle.devices_of(whole).values()):
        found.append(Also(BY_DC, nominal(value(with_values(whole, pulses))), RATIO))
    if cut.limiter:
        found.append(Also(UNLIMITED, nominal(value(with_values(whole, {LIMITER: None}))), RATIO))
    return tuple(found)


def usable_also(rating: Rating, case: Number) -> tuple[Also, ...]:
    """Return the power that a device is allowed at a case temperature (degC)."""
    left = derating(case_temperature=case, power_at=rating.power_at, junction_limit=rating.junction_limit)
    power = usable_power(
        power=rating.power,
        power_at=rating.power_at,
        junction_limit=rating.junction_limit,
        junction_to_case=rating.junction_to_case,
    )
    return (Also("power allowed at this case temperature", nominal(left * power), POWER),)


def limiter_remarks(
    amplifier: Amplifier, found: Use, uncut: tuple[Also, ...], case: Number, rating: Rating
) -> tuple[Remark, ...]:
    """Return what follows from a limiter that acts into the load: it cuts into music, and its whole line counts.

    Where it acts the output no longer follows the load's own locus, a coil can throw it to the other rail: what the
    limiter lets through there must lie inside the safe area as well.
    """
    if not any(one.at == UNLIMITED and one.value > nominal(found.use) * (1.0 + 1e-6) for one in uncut):
        return ()
    rail = operating.no_load_rail(amplifier)
    line = limiter_use(
        points=amplifier.protection.vi_limiter or (),
        case_temperature=case,
        rating=rating,
        highest_voltage=rail if operating.is_single(amplifier) else 2.0 * rail,
    )
    acts = Remark(Verdict.CAUTION, "the V-I limiter acts into this load and cuts into music")
    if nominal(line.use) <= 1.0 and not np.any(line.enters_unknown):
        return (acts,)
    because = (
        "and lets through more than the safe area allows elsewhere on its line, where a load can throw it"
    )
    return (acts, Remark(Verdict.UNVERIFIED, because))


def load_remarks(amplifier: Amplifier) -> tuple[Remark, ...]:
    """Return what to mind of a load: a curve with gaps holds back; that a bridge needs both terminals free does not."""
    gap = curve.gap(amplifier)
    found = () if not gap else (Remark(Verdict.UNVERIFIED, gap),)
    if not amplifier.stage.bridged:
        return found
    return (*found, Remark(Verdict.GO, "bridged: neither loudspeaker terminal may touch chassis or 0 V"))
