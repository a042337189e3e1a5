"""The midpoint of a capacitor-coupled stage: its default, and where between its ends the power is largest."""

from __future__ import annotations

from dataclasses import replace

from safeamp.amplifier import Entry
from safeamp.limits import Limits
from safeamp.quantities import RATIO
from safeamp.reading.draft import Draft

READ = "readings.midpoint"
SHARE = "readings.midpoint_share"


def fill_midpoint(draft: Draft, _: Limits) -> None:
    """Fill in half the rail where nobody read the midpoint, and the levels at which it may be worst."""
    if draft.word("stage.coupling") != "capacitor":
        return
    if READ not in draft.written:
        draft.fill(SHARE, 0.5, RATIO, spread=(0.45, 0.55), text="half the rail")
        draft.assume(READ, "half the rail (45 to 55 %)", "the midpoint was not read")
        _add_levels(draft, SHARE, [_best_share(draft, "nominal"), _best_share(draft, "high")])
    elif READ in draft.entries and "supply.no_load.0" in draft.entries:
        rail = draft.entries["supply.no_load.0"]
        volts = [rail.nominal * _best_share(draft, "nominal"), rail.high * _best_share(draft, "high")]
        _add_levels(draft, READ, volts)


def _add_levels(draft: Draft, path: str, levels: list[float]) -> None:
    entry = draft.entries[path]
    inside = sorted({level for level in levels if entry.low < level < entry.high})
    draft.entries[path] = replace(entry, middle=tuple(inside))


def _best_share(draft: Draft, rails: str) -> float:
    """Return the share of the rail at which both sides clip at the same peak.

    The smaller side sets the power, so that power and heat are largest there, not at an end. With rails at their high
    end the losses stand at their low one, for that is where power and heat are largest.
    """
    loaded = _loaded(draft, rails)
    up, down = (_loss(draft, name, rails) for name in ("swing_loss_up", "swing_loss_down"))
    return 0.5 * (1.0 + (down - up) / loaded) if loaded > 0.0 else 0.5


def _loaded(draft: Draft, rails: str) -> float:
    """Return the loaded rail at its nominal value or its high end, V."""
    for path in ("supply.full_load.0", "supply.no_load.0"):
        if path in draft.entries:
            return _end(draft.entries[path], rails)
    return 0.0


def _loss(draft: Draft, name: str, rails: str) -> float:
    entry = draft.entries.get(f"stage.{name}")
    return 0.0 if entry is None else _end(entry, "nominal" if rails == "nominal" else "low")


def _end(entry: Entry, name: str) -> float:
    found: float = getattr(entry, name)
    return found
