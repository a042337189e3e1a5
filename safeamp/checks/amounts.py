"""The value of a finding as people read it: its kind, its digits, its word; and a share."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Protocol

from safeamp.findings import Bound, Finding
from safeamp.quantities import PERCENT, RATIO, Kind, show

#: Findings whose value is how much of a rating is used, and the rating.
USES = {
    "supply.rail_to_rail": "of the rated voltage",
    "supply.reservoir_voltage": "of the rated voltage",
    "capacitor.voltage": "of the rated voltage",
    "capacitor.ripple": "of the rated ripple current",
    "soa.resistive_load": "of the safe area",
    "soa.loudspeaker": "of the safe area",
}
#: Ratios that people read as a percentage.
PERCENTAGES = frozenset(
    {
        "power_up.rails",
        "power_up.output",
        "bias.imbalance",
        "bias.balance",
        "offset.midpoint",
        "protection.short",
    }
)
#: Findings that rest on a state, and its words; a number would say nothing.
STATES = {"power_up.draw": ("dark", "dim", "bright", "rising")}
#: A percentage is rounded by less than this part of its distance from 0 or 100.
ROUNDING = 0.05


class Valued(Protocol):
    """What has a value of a kind under an id."""

    @property
    def id(self) -> str:
        """Id of the finding."""

    @property
    def kind(self) -> Kind:
        """Kind of its value."""


def shown_kind(finding: Valued) -> Kind:
    """Return the kind a finding is printed in: a use as a percentage."""
    ratio = finding.id in PERCENTAGES and finding.kind == RATIO
    return PERCENT if finding.id in USES or ratio else finding.kind


def is_known(finding: Finding) -> bool:
    """Return whether a finding has a value; one without bound has none."""
    return finding.nominal is not None and not math.isnan(finding.nominal)


def levels_in(bound: Bound | None) -> list[float]:
    """Return the levels that a bound has."""
    if bound is None:
        return []
    go = bound.go if isinstance(bound.go, tuple) else (bound.go,)
    return [level for level in (*go, bound.stop) if level is not None]


def amount(value: float | None, kind: Kind, apart_from: Sequence[float] = ()) -> str:
    """Return a value with enough digits to look different from the limits it differs from."""
    if value is None or not math.isfinite(value):
        return show(value, kind)
    others = [level for level in apart_from if level != value]
    for digits in range(3, 9):
        text = show(value, kind, digits)
        if all(text != show(level, kind, digits) for level in others):
            return text
    return show(value, kind, 9)


def value_text(finding: Finding) -> str:
    """Return the nominal value of a finding, or in words why there is none."""
    if finding.unbounded:
        return "without bound"
    if not is_known(finding):
        return "not read" if finding.to_be_read else "not known"
    if finding.id in STATES:
        said = finding.says.split()
        return next((state for state in STATES[finding.id] if state in said), finding.says)
    return amount(finding.nominal, shown_kind(finding), levels_in(finding.bound))


def percent(share: float) -> str:
    """Return a share as a percentage that reads 0 or 100 only where it is just that."""
    if share in (0.0, 1.0):
        return f"{100.0 * share:.0f} %"
    exact, rest = 100.0 * share, 100.0 * min(share, 1.0 - share)
    texts = (f"{exact:.{digits}f}" for digits in range(1, 13))
    return next((f"{text} %" for text in texts if abs(float(text) - exact) < ROUNDING * rest), f"{exact} %")
