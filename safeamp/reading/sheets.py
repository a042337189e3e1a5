"""A sheet, from a file or from a program, to the nouns; every complaint at once."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, fields
from pathlib import Path
from typing import Any

from safeamp.amplifier import TABLES, Amplifier, Device, Sheet
from safeamp.complaints import ReadingError
from safeamp.limits import Limits
from safeamp.reading.defaults import fill_defaults
from safeamp.reading.document import read_document
from safeamp.reading.draft import Draft, Places, in_order
from safeamp.reading.limits import load_limits
from safeamp.reading.parts import read_devices, set_aside_unused
from safeamp.reading.questions import ask
from safeamp.reading.requirements import ask_for_missing, say_signs
from safeamp.reading.unassessed import unassessed
from safeamp.reading.walk import tables_of, walk_sheet


def load_sheet(
    path: str | Path, *, device_folder: str | Path | None = None, limits: Limits | None = None
) -> Sheet:
    """Read one sheet.

    Parameters
    ----------
    path : str or Path
        The TOML file.
    device_folder : str or Path, optional
        Folder of device files; a device of the sheet itself comes first, a generic one last.
    limits : Limits, optional
        Where the defaults and the table of interfaces come from; those of the program when left out.

    Raises
    ------
    ReadingError
        With every complaint, in the order of the lines.
    """
    return open_sheet(path, device_folder=device_folder, limits=limits).sheet()


def open_sheet(
    path: str | Path, *, device_folder: str | Path | None = None, limits: Limits | None = None
) -> Source:
    """Open one sheet that is read several times, with another value at some key; as `load_sheet`."""
    document = read_document(Path(path))
    folder = str(Path(path).parent)
    return Source(
        document.data, document, device_folder, limits, folder, Path(path).name, digest=document.digest
    )


def sheet_from(
    mapping: Mapping[str, Any],
    *,
    device_folder: str | Path | None = None,
    limits: Limits | None = None,
    folder: str | Path = ".",
    source: str = "python",
) -> Sheet:
    """Read a sheet from nested mappings, the tables of the file.

    Parameters
    ----------
    mapping : Mapping
        As the file, but a value may also be a float in SI units (degC, deg) or a pint quantity.
    device_folder, limits
        As for `load_sheet`.
    folder : str or Path
        Where the names of further files are looked up.
    source : str
        What complaints name in place of the file.

    Raises
    ------
    ReadingError
        With every complaint.
    """
    return open_mapping(
        mapping, device_folder=device_folder, limits=limits, folder=folder, source=source
    ).sheet()


def open_mapping(
    mapping: Mapping[str, Any],
    *,
    device_folder: str | Path | None = None,
    limits: Limits | None = None,
    folder: str | Path = ".",
    source: str = "python",
) -> Source:
    """Open nested mappings that are read several times, with another value at some key; as `sheet_from`."""
    return Source(mapping, _NoLines(source), device_folder, limits, str(folder), source, allow_si=True)


@dataclass(frozen=True)
class Source:
    """A sheet as written, to be read any number of times."""

    data: Mapping[str, Any]
    places: Places
    device_folder: str | Path | None
    limits: Limits | None
    folder: str
    name: str
    allow_si: bool = False
    digest: str = ""

    def sheet(self, instead: Mapping[str, Any] | None = None) -> Sheet:
        """Read the sheet.

        Parameters
        ----------
        instead : mapping, optional
            Key path -> what is read in place of what is written there, or as if it were written there.

        Raises
        ------
        ReadingError
            With every complaint.
        """
        changes = dict(instead or {})
        draft = Draft(self.places, allow_si=self.allow_si, folder=self.folder, instead=changes)
        data = _with_tables(self.data, changes)
        return _sheet(draft, _read(draft, data, self.device_folder, self.limits), self.name, self.digest)


def _with_tables(data: Mapping[str, Any], changes: Mapping[str, Any]) -> Mapping[str, Any]:
    """Return a sheet with an empty table for each change in a table that is not written, inner ones included.

    A device is left to the reader: it may come from a file of its own.
    """
    for path in changes:
        table, *below = path.split(".")[:-1]
        if table == "device":
            continue
        inside = data.get(table, {})
        if below and isinstance(inside, Mapping):
            inside = {below[0]: {}, **inside}
        data = {**data, table: inside}
    return data


class _NoLines:
    """Places of a sheet that is no file."""

    def __init__(self, path: str) -> None:
        self._path = path

    @property
    def path(self) -> str:
        return self._path

    def line(self, *_: str | int) -> int | None:
        return None


def _read(
    draft: Draft, data: Mapping[str, Any], device_folder: str | Path | None, limits: Limits | None
) -> Amplifier:
    rules = limits or load_limits()
    walk_sheet(draft, data)
    try:
        read_devices(draft, data, Path(device_folder) if device_folder is not None else None)
    except ReadingError as trouble:
        draft.complaints += trouble.complaints
    fill_defaults(draft, rules)
    ask_for_missing(draft)
    ask(draft)
    if draft.complaints:
        raise ReadingError(in_order(draft.complaints, draft.places.path))
    set_aside_unused(draft)
    say_signs(draft)
    draft.values["readings.unsigned"] = frozenset(draft.unsigned)
    return _amplifier(draft, data)


def _amplifier(draft: Draft, data: Mapping[str, Any]) -> Amplifier:
    tables = {name: _noun(draft, name, noun) for name, noun in TABLES.items() if name != "device"}
    devices = {path.split(".")[1]: None for path in draft.values if path.startswith("device.")}
    return Amplifier(
        title=data["title"],
        notes=data.get("notes", ""),
        **tables,
        device={name: _noun(draft, f"device.{name}", Device) for name in devices},
        absent=frozenset(draft.absent),
        origins=draft.origins,
    )


def _noun(draft: Draft, path: str, noun: type[Any]) -> Any:
    """Return a noun filled with what the draft holds under its key path."""
    inner = {name: _noun(draft, f"{path}.{name}", table) for name, table in tables_of(noun).items()}
    plain = {
        item.name: draft.values.get(f"{path}.{item.name}") for item in fields(noun) if item.name not in inner
    }
    return noun(**plain, **inner)


def _sheet(draft: Draft, amplifier: Amplifier, source: str, digest: str) -> Sheet:
    return Sheet(
        amplifier=amplifier,
        entries=draft.entries,
        assumptions=tuple(draft.assumptions),
        remarks=tuple(draft.remarks),
        unassessed=unassessed(draft),
        source=source,
        digest=digest,
    )
