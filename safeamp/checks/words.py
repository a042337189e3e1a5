"""Small words that several checks share: numbers as text, nominal values, remarks on origins."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import thermal
from safeamp.findings import Remark, Verdict
from safeamp.limits import Limit
from safeamp.quantities import Kind, Number, Origin, show

#: How far the thermal resistance of fins by ruler may be off, and for what it is computed.
RULER = "-30/+70 %, for fins that stand upright in free air"


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


def level(limit: Limit, name: str) -> float:
    """Return a single level of a limit, go or stop; nan where it has none."""
    found = getattr(limit, name)
    return float(found) if isinstance(found, (int, float)) else float("nan")
