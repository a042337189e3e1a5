"""Rails that no sound supply has: what is computed from them is not judged by its number alone."""

from __future__ import annotations

from collections.abc import Collection

from safeamp.amplifier import Amplifier
from safeamp.amplifier.rails import deepest_sag, is_too_deep, share_apart
from safeamp.checks import operating
from safeamp.findings import Remark, Verdict
from safeamp.limits import Limits
from safeamp.quantities import PERCENT, VOLTAGE, show

FREE = "supply.no_load"
FULL = "supply.full_load"


def rail_remarks(amplifier: Amplifier, limits: Limits, reads: Collection[str]) -> tuple[Remark, ...]:
    """Return what holds back a finding that reads some keys: a rail lower than it should be hides heat and stress."""
    found = [
        *(_apart(amplifier, limits, FREE) if FREE in reads else ()),
        *(_apart(amplifier, limits, FULL) if FULL in reads else ()),
        *(_sag(amplifier) if FULL in reads and not operating.is_fixed(amplifier) else ()),
    ]
    return tuple(Remark(Verdict.UNVERIFIED, because) for because in found)


def _apart(amplifier: Amplifier, limits: Limits, key: str) -> list[str]:
    """Return what is said of two rails that the first power-up would stop: a low one has lost a part of its supply."""
    rails = (amplifier.supply.no_load if key == FREE else amplifier.supply.full_load) or ()
    most, apart = limits["power_up.rails"].stop, share_apart(rails)
    if isinstance(most, tuple) or most is None or not apart > most * (1.0 + 1e-9):
        return []
    read = " and ".join(show(rail, VOLTAGE) for rail in rails)
    says = f"{key}, {read}, lie {show(apart, PERCENT)} apart: beyond the stop level of power_up.rails"
    return [f"{says}; look for a lost rectifier, fuse or reservoir of the lower rail, then read both again"]


def _sag(amplifier: Amplifier) -> list[str]:
    deepest = deepest_sag(amplifier.supply.no_load or (), amplifier.supply.full_load or ())
    if deepest is None or not is_too_deep(*deepest):
        return []
    free, under = deepest
    says = f"{FULL}, {show(under, VOLTAGE)}, is {show(under / free, PERCENT)} of its rail without load"
    hides = "so low a rail hides power, heat and stress"
    return [f"{says}: {hides}; look for the fault in the supply, read again"]
