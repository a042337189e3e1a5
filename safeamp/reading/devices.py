"""Device files: one or more tables [device.NAME] each, as raw data for the reader of sheets."""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from safeamp.complaints import Complaint, ReadingError
from safeamp.reading.data import device_folder
from safeamp.reading.document import Document, read_document


@dataclass(frozen=True)
class DeviceTable:
    """The raw table of one device and the file that it stands in."""

    name: str
    data: Mapping[str, Any]
    document: Document

    @property
    def path(self) -> str:
        """The file as the user named it."""
        return self.document.path

    def line(self, *key: str | int) -> int | None:
        """Return the line of a key of this device, or of its table when the key is missing."""
        return self.document.line("device", self.name, *key)


def device_files(folder: Path) -> dict[str, DeviceTable]:
    """Return every device of a folder by name.

    Parameters
    ----------
    folder : Path
        Its ``*.toml`` files are read in the order of their names, folders inside it are not.

    Raises
    ------
    ReadingError
        With every problem of every file: not TOML, something else than ``[device.NAME]``, a name twice.
    """
    if not folder.is_dir():
        raise ReadingError((Complaint(str(folder), None, "", "is not a folder of device files"),))
    devices: dict[str, DeviceTable] = {}
    complaints: list[Complaint] = []
    for path in sorted(folder.glob("*.toml")):
        try:
            document = read_document(path)
        except ReadingError as trouble:
            complaints += trouble.complaints
            continue
        complaints += _collect(document, devices)
    if complaints:
        raise ReadingError(tuple(complaints))
    return devices


class _OneByOne(Mapping[str, DeviceTable]):
    """The devices of a folder whose files bear the names of their devices: a file is read when it is asked for."""

    def __init__(self, folder: Path) -> None:
        self._paths = {path.stem: path for path in sorted(folder.glob("*.toml"))}

    def __getitem__(self, name: str) -> DeviceTable:
        found: dict[str, DeviceTable] = {}
        complaints = _collect(read_document(self._paths[name]), found)
        if complaints:
            raise ReadingError(tuple(complaints))
        return found[name]

    def __iter__(self) -> Iterator[str]:
        return iter(self._paths)

    def __len__(self) -> int:
        return len(self._paths)


def generic_devices() -> Mapping[str, DeviceTable]:
    """Return the generic types that come with the program; a look-up raises as `device_files`."""
    return _OneByOne(device_folder())


def _collect(document: Document, devices: dict[str, DeviceTable]) -> list[Complaint]:
    complaints = [
        document.complaint("is not a device; write a table such as [device.fitted]", key)
        for key in document.data
        if key != "device"
    ]
    tables = document.data.get("device", {})
    if not isinstance(tables, dict) or not tables:
        text = "holds no device; write a table such as [device.fitted]"
        return [*complaints, document.complaint(text, *(("device",) if "device" in document.data else ()))]
    for name, data in tables.items():
        if not isinstance(data, dict):
            text = "is not a table; give the device a name, such as [device.fitted]"
            complaints.append(document.complaint(text, "device", name))
        elif name in devices:
            text = f"stands in {devices[name].path} too; rename one of them"
            complaints.append(document.complaint(text, "device", name))
        else:
            devices[name] = DeviceTable(name, data, document)
    return complaints
