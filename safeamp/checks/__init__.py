"""Checks: an amplifier of cases and the limits in, measures out. They print nothing and judge nothing.

The topics are imported when the register is asked for: an answer about one topic does not wait for all.
"""

from __future__ import annotations

from functools import cache
from importlib import import_module
from types import ModuleType
from typing import TYPE_CHECKING, Any

from safeamp.checks import registry
from safeamp.checks.registry import Check

if TYPE_CHECKING:
    CHECKS: dict[str, Check]
    TOPICS: tuple[ModuleType, ...]

__all__ = ["CHECKS", "TOPICS", "Check"]

# Findings of one step stand in this order.
_TOPICS = (
    "bias",
    "offset",
    "capacitor",
    "cold",
    "heat",
    "loudspeaker",
    "power_up",
    "safe_area",
    "protection",
    "runaway",
    "stability",
    "supply",
    "touch",
)


@cache
def _topics() -> tuple[ModuleType, ...]:
    return tuple(import_module(f"{__name__}.{name}") for name in _TOPICS)


@cache
def _all() -> dict[str, Check]:
    """Return every check, in an order that does not hang on what was imported first."""
    places = {topic.__name__: place for place, topic in enumerate(_topics())}
    return {
        check.id: check
        for check in sorted(registry.CHECKS.values(), key=lambda check: places[check.run.__module__])
    }


def __getattr__(name: str) -> Any:
    found = {"CHECKS": _all, "TOPICS": _topics}.get(name)
    if found is None:
        raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
    return found()
