"""Check a transistor audio power amplifier before power is applied and before a loudspeaker is connected."""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

from safeamp._version import __version__

if TYPE_CHECKING:
    from collections.abc import Mapping
    from pathlib import Path

    from safeamp.amplifier import Sheet
    from safeamp.answers import Report
    from safeamp.findings import Step
    from safeamp.limits import Limits
    from safeamp.quantities import quantity, read, show
    from safeamp.reading import load_sheet, sheet_from
    from safeamp.reading.limits import load_limits

__all__ = ["__version__", "check", "load_limits", "load_sheet", "quantity", "read", "sheet_from", "show"]

# Rooms are imported by the first use of a name: "import safeamp" alone must cost nothing.
_ROOMS = {
    "load_limits": "safeamp.reading.limits",
    "load_sheet": "safeamp.reading",
    "quantity": "safeamp.quantities",
    "read": "safeamp.quantities",
    "sheet_from": "safeamp.reading",
    "show": "safeamp.quantities",
}


def __getattr__(name: str) -> Any:
    if name not in _ROOMS:
        raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
    return getattr(import_module(_ROOMS[name]), name)


def __dir__() -> list[str]:
    return sorted({*globals(), *__all__})


def check(
    sheet: Sheet | Mapping[str, Any] | str | Path,
    *,
    limits: Limits | None = None,
    device_folder: str | Path | None = None,
    on_paper: bool = False,
    up_to: Step | None = None,
) -> Report:
    """Judge every step of the job.

    Parameters
    ----------
    sheet : Sheet, mapping, str or Path
        A sheet as read, its tables as nested mappings, or the file it stands in.
    limits : Limits, optional
        As `load_limits` returns them; the shipped ones when left out.
    device_folder : str or Path, optional
        Folder of device files; not used with a sheet that is read already.
    on_paper : bool
        Judge only what is computed; clears no power.
    up_to : Step, optional
        The last step to judge.

    Raises
    ------
    ReadingError
        If the sheet or a device cannot be read; carries every complaint.
    """
    from pathlib import Path

    from safeamp.amplifier import Sheet
    from safeamp.reading import load_sheet, sheet_from
    from safeamp.reading.limits import load_limits
    from safeamp.studies.verdict import verdict

    rules = load_limits() if limits is None else limits
    folder = None if device_folder is None else Path(device_folder)
    if isinstance(sheet, str | Path):
        sheet = load_sheet(Path(sheet), device_folder=folder, limits=rules)
    elif not isinstance(sheet, Sheet):
        sheet = sheet_from(sheet, device_folder=folder, limits=rules)
    return verdict(sheet, rules, on_paper=on_paper, up_to=up_to)
