"""Numbers of a finding as people read them: amount, limit, place."""

from __future__ import annotations

import math
from collections.abc import Mapping
from decimal import Decimal

from safeamp.amplifier import TABLES, Fins, keys_of, written_key
from safeamp.checks.amounts import USES, amount, is_known, levels_in, shown_kind, value_text
from safeamp.findings import Bound, Finding
from safeamp.quantities import (
    ANGLE,
    CURRENT,
    FREQUENCY,
    KINDS,
    PERCENT,
    POWER,
    RATIO,
    TEMPERATURE,
    TIME,
    VOLTAGE,
    Kind,
    show,
)

#: Findings that rest on a word; a number would say nothing.
WORDS = {"power_up.draw": "go when dark or dim, stop when bright or rising"}
_AT_KINDS = {
    "voltage": VOLTAGE,
    "current": CURRENT,
    "power": POWER,
    "angle": ANGLE,
    "phase": ANGLE,
    "phase_angle": ANGLE,
    "frequency": FREQUENCY,
    "temperature": TEMPERATURE,
    "case": TEMPERATURE,
    "time": TIME,
}
_BY_UNIT = {kind.unit: kind for kind in reversed(tuple(KINDS.values()))}


def number_text(finding: Finding) -> str:
    """Return the value of a finding in words: nominal, worst, and how much is used."""
    if not is_known(finding) or finding.unbounded:
        return value_text(finding)
    if finding.id in WORDS:
        return finding.says
    text = value_text(finding)
    if finding.id in USES:
        text = f"uses {text} {USES[finding.id]}, {_left(text)}"
    if finding.worst is not None and finding.worst != finding.nominal:
        worst = amount(finding.worst, shown_kind(finding), levels_in(finding.bound))
        text += f"; worst case {worst}"
    return text


def _left(used: str) -> str:
    # From the printed digits: what is used and what is left must add up to 100 %.
    left = 100 - Decimal(used.removesuffix(" %"))
    return f"{left} % left" if left >= 0 else f"{-left} % too much"


def limit_text(finding: Finding) -> str:
    """Return the limit in words, such as "go up to 50 mV, stop above 100 mV"."""
    bound = finding.bound
    if bound is None or finding.id in WORDS:
        return WORDS.get(finding.id, "")
    kind = shown_kind(finding)
    up, beyond = ("from", "below") if bound.sense == "at least" else ("up to", "above")
    parts = []
    if isinstance(bound.go, tuple):
        parts.append(f"go from {show(bound.go[0], kind)} to {show(bound.go[1], kind)}")
    elif bound.go is not None:
        parts.append(f"go {up} {show(_effective(bound.go, bound), kind)}")
    if bound.stop is not None and math.isfinite(bound.stop):
        parts.append(f"stop {beyond} {show(bound.stop, kind)}")
    changed = [f"changed by your limits file: {bound.source}"] if bound.overridden else []
    return ", ".join(parts + changed)


def shortfall_text(finding: Finding) -> str:
    """Return how far a value must move to leave stop; empty where no finite level says so."""
    bound = finding.bound
    if bound is None or bound.stop is None or not math.isfinite(bound.stop) or finding.id in WORDS:
        return ""
    kind = shown_kind(finding)
    now = "without bound" if finding.unbounded else amount(finding.nominal, kind, [bound.stop])
    most = "at least" if bound.sense == "at least" else "at most"
    return f"now {now}, must be {most} {show(bound.stop, kind)}"


def _effective(go: float, bound: Bound) -> float:
    """Return up to where a finding is go: where both levels contradict each other, stop wins."""
    if bound.stop is None or not math.isfinite(bound.stop):
        return go
    return max(go, bound.stop) if bound.sense == "at least" else min(go, bound.stop)


def kind_of(path: str, units: Mapping[str, str] | None = None) -> Kind | None:
    """Return the kind of the value at a key path; None for words, flags and unknown keys."""
    if path.endswith("_share"):
        return PERCENT
    key = written_key(path)
    *tables, name = key.split(".")
    table = tables[0] if tables else ""
    noun = Fins if ".fins." in key else TABLES.get(table)
    found = keys_of(noun).get(name) if noun else None
    if found is not None and len(found.kinds) == 1:
        only: Kind = found.kinds[0]
        return only
    return _BY_UNIT.get((units or {}).get(key, ""))


def place_text(finding: Finding) -> str:
    """Return the worst corner in words, such as "supply.no_load 38.5 V, mains 253 V"."""
    units = {written_key(item.key): item.unit for item in finding.inputs}
    parts = []
    for path, value in finding.worst_case.items():
        parts.append(f"{_place_name(path)} {show(value, kind_of(path, units) or RATIO)}")
    return ", ".join(parts)


def _place_name(path: str) -> str:
    if path == "mains.present":
        return "mains"
    return f"{written_key(path)}, share" if path.endswith("_share") else written_key(path)


def at_text(finding: Finding) -> str:
    """Return where in the cycle or chain the value stands, such as "voltage 36.4 V, zone power"."""
    parts = []
    for name, value in finding.at.items():
        kind = _AT_KINDS.get(name.rpartition(" ")[2], RATIO)
        parts.append(f"{name} {value if isinstance(value, str) else show(value, kind)}")
    return ", ".join(parts)


def also_text(finding: Finding) -> str:
    """Return the further numbers, such as "at 60 deg 155 %"."""
    use = finding.id in USES
    kinds = [PERCENT if use and item.kind == RATIO else item.kind for item in finding.also]
    return ", ".join(
        f"{item.at} {show(item.value, kind)}" for item, kind in zip(finding.also, kinds, strict=True)
    )
