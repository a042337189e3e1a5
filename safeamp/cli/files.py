"""Which files a command reads: a result is never written over one of them."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import Any


class FilesRead:
    """Sheets, what they name beside them, limits and devices; looked for anew each time something is written."""

    def __init__(self, *sheets: Path, limits: Path | None = None, device_folder: Path | None = None) -> None:
        self._sheets, self._limits, self._device_folder = sheets, limits, device_folder

    def __iter__(self) -> Iterator[Path]:
        """Yield each file."""
        for sheet in self._sheets:
            yield sheet
            yield from _beside(sheet)
        if self._limits is not None:
            yield self._limits
        if self._device_folder is not None:
            yield from self._device_folder.glob("*.toml")


def _beside(sheet: Path) -> Iterator[Path]:
    """Yield the files that any text of a sheet names, such as a measured curve; a broken sheet names none."""
    import tomllib

    try:
        content = tomllib.loads(sheet.read_text(encoding="utf-8"))
    except (OSError, ValueError, RecursionError):
        return
    for text in _texts(content):
        path = sheet.parent / text
        try:
            if path.is_file():
                yield path
        except (OSError, ValueError):  # too long for a name, or with letters that no name has
            continue


def _texts(value: Any) -> Iterator[str]:
    if isinstance(value, str):
        yield value
    elif isinstance(value, (dict, list)):
        for item in value.values() if isinstance(value, dict) else value:
            yield from _texts(item)
