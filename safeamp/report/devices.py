"""Which devices are known by name, with their ratings as their files write them."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from safeamp.amplifier import Device, keys_of
from safeamp.report.layout import paragraph

_INTRODUCTION = (
    "Write a name from this list as stage.upper, stage.lower or in stage.drivers. Generic devices hold "
    "invented typical values: they are assumed, and nothing judged by their safe area is ever go. "
    "Write the ratings of the device in hand into [device.NAME] of the sheet, or into a folder given "
    "by --device-folder."
)


def render_devices(devices: Mapping[str, Mapping[str, Any]], *, width: int = 80) -> str:
    """Return name and ratings of each device; the data are the tables of the files."""
    lines = paragraph(_INTRODUCTION, width)
    for name, data in devices.items():
        lines += ["", name]
        for key in keys_of(Device):
            if key in data:
                lines += paragraph(f"{key.replace('_', ' ')}: {_text(data[key])}", width, "    ", "      ")
    return "\n".join(lines) + "\n"


def _text(value: Any) -> str:
    """Return a written value; points as "40 V 3.75 A", several apart by semicolons."""
    if not isinstance(value, list | tuple):
        return str(value)
    deep = any(isinstance(item, list | tuple) for item in value)
    return ("; " if deep else " ").join(_text(item) for item in value)
