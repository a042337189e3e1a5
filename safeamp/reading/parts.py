"""The devices of a sheet: found in the sheet, in a folder, or among the generic types."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from pathlib import Path
from typing import Any

from safeamp.amplifier import Device
from safeamp.limits import nearest, plain
from safeamp.quantities import Origin
from safeamp.reading.devices import DeviceTable, device_files, generic_devices
from safeamp.reading.draft import Draft
from safeamp.reading.walk import require, walk_table

GENERIC = "generic typical values"
REPLACE = "a generic type is no data sheet: replace it by the data of your device"


class _Within:
    """The lines of one device table in the file of its own."""

    def __init__(self, table: DeviceTable) -> None:
        self._document = table.document

    @property
    def path(self) -> str:
        return self._document.path

    def line(self, *key: str | int) -> int | None:
        return self._document.line(*key)


def read_devices(draft: Draft, data: Mapping[str, Any], folder: Path | None) -> None:
    """Read every device of the sheet, and those of folder and generic types that the stage names."""
    inline = _inline(draft, data)
    files = device_files(folder) if folder else {}
    generic: Mapping[str, DeviceTable] | None = None
    for path, name in _named(draft):
        if plain(name) in {plain(known) for known in inline}:
            _rename(draft, path, name, inline)
            continue
        if generic is None and plain(name) not in {plain(known) for known in files}:
            generic = generic_devices()
        found = _rename(draft, path, name, [*inline, *files, *(generic or {})])
        if found is not None:
            _from_file(draft, found, files, generic or {})


def _inline(draft: Draft, data: Mapping[str, Any]) -> list[str]:
    tables = data.get("device", {})
    draft.sit("device")
    if not isinstance(tables, Mapping):
        draft.complain("device", "this is no table; write [device.NAME] and its keys below it")
        return []
    for name, table in tables.items():
        path = f"device.{name}"
        draft.seats[path] = (draft.places.path, draft.places.line("device", name))
        if not _is_name(draft, path, name):
            continue
        if not isinstance(table, Mapping):
            draft.complain(path, f"this is no table; write [{path}] and its keys below it")
        else:
            walk_table(draft, path, Device, table)
            require(draft, path, Device)
    return list(tables)


def _is_name(draft: Draft, path: str, name: str) -> bool:
    """Whether a name can stand in a key path; complain if not."""
    good = "." not in name and not name.isdigit() and bool(name.strip())
    if not good:
        draft.complain(path, "is no name for a device; write letters, digits and hyphens, without a point")
    return good


def _named(draft: Draft) -> list[tuple[str, str]]:
    """Return key path and name of each device that the stage names."""
    drivers = draft.values.get("stage.drivers") or ()
    single = [(f"stage.{side}", draft.word(f"stage.{side}")) for side in ("upper", "lower")]
    many = [(f"stage.drivers.{place}", name) for place, name in enumerate(drivers)]
    return [(path, name) for path, name in (*single, *many) if name]


def _rename(draft: Draft, path: str, name: str, known: list[str]) -> str | None:
    """Put the name of a known device in place of what was typed; complain of an unknown one."""
    typed = {plain(word): word for word in reversed(known)}
    found = name if name in known else typed.get(plain(name))
    if found is None:
        near = nearest(name, known)
        draft.complain(path, f'"{name}" is not a known device{near}; write a table [device.{name}]')
    elif path.startswith("stage.drivers."):
        place = int(path.rpartition(".")[2])
        drivers = draft.values["stage.drivers"]
        draft.values["stage.drivers"] = (*drivers[:place], found, *drivers[place + 1 :])
    else:
        draft.values[path] = found
    return found


def _from_file(
    draft: Draft, name: str, files: Mapping[str, DeviceTable], generic: Mapping[str, DeviceTable]
) -> None:
    if f"device.{name}" in draft.written:
        return
    table = files.get(name) or generic[name]
    here, draft.places = draft.places, _Within(table)
    path = f"device.{name}"
    draft.seats[path] = (table.path, table.line())
    if _is_name(draft, path, name):
        walk_table(draft, path, Device, table.data)
        require(draft, path, Device)
    draft.places = here
    if name not in files:
        _call_assumed(draft, name)


def _call_assumed(draft: Draft, name: str) -> None:
    """Mark everything of a generic device as assumed, and as not written by the user."""
    prefix = f"device.{name}."
    for path in [path for path in draft.origins if path.startswith(prefix)]:
        draft.origins[path] = Origin.ASSUMED
    for path in [path for path in draft.entries if path.startswith(prefix)]:
        draft.entries[path] = replace(draft.entries[path], origin=Origin.ASSUMED)
    draft.written -= {path for path in draft.written if path.startswith(prefix)}
    draft.assume(f"device.{name}", GENERIC, REPLACE)


def set_aside_unused(draft: Draft) -> None:
    """Forget the devices that the stage does not name, and say so."""
    used = {name for _, name in _named(draft)}
    for name in written_devices(draft):
        if name not in used:
            draft.remarks.append(f"device.{name} is not used: stage names other devices")
            draft.drop(f"device.{name}")


def written_devices(draft: Draft) -> tuple[str, ...]:
    """Return the names of all devices that have a table, in the order of the files."""
    tables = [path for path in draft.seats if path.startswith("device.") and path.count(".") == 1]
    return tuple(path.removeprefix("device.") for path in tables if path in draft.written)
