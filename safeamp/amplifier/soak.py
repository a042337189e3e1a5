"""The log of a soak: what was read while a heatsink warmed up."""

from __future__ import annotations

from dataclasses import dataclass, field


@dataclass(frozen=True)
class SoakLog:
    """Readings in the order of their time: s (rising), degC of heatsink and air, W of heat put in.

    `air` and `power` are None where the log has no such column; `text` is the file as the user named it.
    """

    time: tuple[float, ...] = field(repr=False)
    sink: tuple[float, ...] = field(repr=False)
    air: tuple[float, ...] | None = field(default=None, repr=False)
    power: tuple[float, ...] | None = field(default=None, repr=False)
    text: str = ""
