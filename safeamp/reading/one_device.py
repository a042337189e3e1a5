"""One device by its name, from a folder or among the generic types, without a sheet."""

from __future__ import annotations

from dataclasses import fields
from pathlib import Path

from safeamp.amplifier import Amplifier, Device, Sheet, Stage
from safeamp.complaints import Complaint, ReadingError
from safeamp.limits import nearest, plain
from safeamp.reading.defaults import fill_plain
from safeamp.reading.device_questions import ask_devices
from safeamp.reading.devices import device_files, generic_devices
from safeamp.reading.draft import Draft, in_order
from safeamp.reading.parts import read_devices


class _Option:
    """Places of an option of the command line."""

    path = "--device"

    def line(self, *_: str | int) -> int | None:
        return None


def read_device(name: str, folder: Path | None) -> Sheet:
    """Return a sheet that holds nothing but one device, on both sides of the stage.

    Parameters
    ----------
    name : str
        Typed with hyphens or blanks.
    folder : Path or None
        Folder of device files; they come before the generic types.

    Raises
    ------
    ReadingError
        If there is no such device, or something is wrong with its data.
    """
    known = _known(name, folder)
    draft = Draft(_Option())
    draft.values["stage.upper"] = known
    read_devices(draft, {}, folder)
    fill_plain(draft)
    ask_devices(draft)
    if draft.complaints:
        raise ReadingError(in_order(draft.complaints, "--device"))
    prefix = f"device.{known}."
    device = Device(**{item.name: draft.values.get(f"{prefix}{item.name}") for item in fields(Device)})
    amplifier = Amplifier(
        stage=Stage(upper=known, lower=known), device={known: device}, origins=draft.origins
    )
    entries = {path: entry for path, entry in draft.entries.items() if path.startswith(prefix)}
    return Sheet(amplifier=amplifier, entries=entries, assumptions=tuple(draft.assumptions))


def _known(name: str, folder: Path | None) -> str:
    names = [*(device_files(folder) if folder else {}), *generic_devices()]
    typed = {plain(known): known for known in reversed(names)}
    if plain(name) in typed:
        return name if name in names else typed[plain(name)]
    text = f'"{name}" is not a known device{nearest(name, names)}; "safeamp devices" lists them, or add --device-folder'
    raise ReadingError((Complaint("--device", None, "", text),))
