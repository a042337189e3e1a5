"""Files to nouns: sheets, limits, devices; every complaint at once."""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from safeamp.reading.sheets import Source, load_sheet, open_mapping, open_sheet, sheet_from

__all__ = ["Source", "load_sheet", "open_mapping", "open_sheet", "sheet_from"]


def __getattr__(name: str) -> Any:
    # Whoever reads limits or options alone does not wait for what reads sheets.
    if name not in __all__:
        raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
    return getattr(import_module(f"{__name__}.sheets"), name)
