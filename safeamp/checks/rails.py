"""Rails that no sound supply has: what is computed from them is not judged by its number alone."""

from __future__ import annotations

from collections.abc import Collection

from safeamp.amplifier import Amplifier
from safeamp.amplifier.rails import deepest_sag, is_too_deep
from safeamp.checks import operating
from safeamp.findings import Remark, Verdict
from safeamp.quantities import PERCENT, VOLTAGE, show

FULL = "supply.full_load"


def rail_remarks(amplifier: Amplifier, reads: Collection[str]) -> tuple[Remark, ...]:
    """Return what holds back a finding that reads some keys: a rail lower than it should be hides heat and stress."""
    if operating.is_fixed(amplifier) or FULL not in reads:
        return ()
    return _sag_remarks(amplifier)


def _sag_remarks(amplifier: Amplifier) -> tuple[Remark, ...]:
    deepest = deepest_sag(amplifier.supply.no_load or (), amplifier.supply.full_load or ())
    if deepest is None or not is_too_deep(*deepest):
        return ()
    free, under = deepest
    says = f"{FULL}, {show(under, VOLTAGE)}, is {show(under / free, PERCENT)} of its rail without load"
    because = (
        f"{says}: so low a rail hides power, heat and stress; look for the fault in the supply, read again"
    )
    return (Remark(Verdict.UNVERIFIED, because),)
