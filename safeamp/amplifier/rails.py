"""Rails held against each other: each loaded one against its own without load, and one against its other."""

from __future__ import annotations

from collections.abc import Sequence

#: Below this share of its rail without load no loaded rail is believed unasked: regulation is 5 to 15 %.
LEAST_LOADED = 0.6


def rail_pairs(no_load: Sequence[float], full_load: Sequence[float]) -> list[tuple[float, float]]:
    """Return each rail without load and the same under load, V; one value stands for both rails."""
    if not no_load or not full_load or max(len(no_load), len(full_load)) > 2:
        return []
    wide = max(len(no_load), len(full_load))
    free, under = list(no_load) * (wide // len(no_load)), list(full_load) * (wide // len(full_load))
    return list(zip(free, under, strict=True))


def deepest_sag(no_load: Sequence[float], full_load: Sequence[float]) -> tuple[float, float] | None:
    """Return the rail without load and under load, V, that falls deepest; None where one is not known."""
    found = [(free, under) for free, under in rail_pairs(no_load, full_load) if free > 0.0]
    return min(found, key=lambda pair: pair[1] / pair[0], default=None)


def is_too_deep(free: float, under: float) -> bool:
    """Whether a loaded rail lies so far below its rail without load that nobody believes it."""
    return under < LEAST_LOADED * free * (1.0 - 1e-9)


def share_apart(rails: Sequence[float]) -> float:
    """Return by how much two rails differ, over their mean; nothing for one rail alone."""
    if len(rails) != 2:
        return 0.0
    return abs(rails[0] - rails[1]) / (sum(rails) / 2.0)
