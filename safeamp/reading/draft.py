"""A sheet while it is read: what was found so far, and every complaint with its place."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from dataclasses import replace as changed
from typing import Any, Protocol

from safeamp.amplifier import Assumption, Entry
from safeamp.complaints import Complaint
from safeamp.quantities import Kind, Origin, QuantityError, Reading

#: From what speaks least for a value to what speaks most: the origin of a list is that of its weakest part.
WEAKEST_FIRST = (
    Origin.EXAMPLE,
    Origin.ASSUMED,
    Origin.GUESS,
    Origin.STATED,
    Origin.MARKED,
    Origin.MANUAL,
    Origin.DATA_SHEET,
    Origin.MEASURED,
)


class Places(Protocol):
    """What knows the file and the line of a key."""

    @property
    def path(self) -> str:
        """The file as the user named it."""

    def line(self, *key: str | int) -> int | None:
        """Return the line of a key, or of the nearest table around it."""


@dataclass
class Draft:
    """Everything by key path, ``supply.no_load.0``; `values` holds whole keys, ``supply.no_load``."""

    places: Places
    allow_si: bool = False
    folder: str = ""
    values: dict[str, Any] = field(default_factory=dict)
    entries: dict[str, Entry] = field(default_factory=dict)
    origins: dict[str, Origin] = field(default_factory=dict)
    seats: dict[str, tuple[str, int | None]] = field(default_factory=dict)
    written: set[str] = field(default_factory=set)
    absent: set[str] = field(default_factory=set)
    toleranced: set[str] = field(default_factory=set)
    unsigned: set[str] = field(default_factory=set)
    dropped: list[str] = field(default_factory=list)
    assumptions: list[Assumption] = field(default_factory=list)
    remarks: list[str] = field(default_factory=list)
    complaints: list[Complaint] = field(default_factory=list)
    #: Key path -> what is read in place of what the file says there.
    instead: Mapping[str, Any] = field(default_factory=dict)

    def complain(self, path: str, trouble: str | QuantityError) -> None:
        """Add a complaint at a key path, with the file and line where it stands."""
        file, line = self.seat(path)
        complaint = Complaint(file, line, _printable(path), _printable(str(trouble)))
        # What two questions find in one way is said once.
        if complaint not in self.complaints:
            self.complaints.append(complaint)

    def sit(self, path: str) -> None:
        """Note where a key path stands in the file that is being read."""
        parts = [int(part) if part.isdigit() else part for part in path.split(".")]
        self.seats[path] = (self.places.path, self.places.line(*parts))

    def seat(self, path: str) -> tuple[str, int | None]:
        """Return file and line of a written key path or of the list it is in; no line for a missing key."""
        if path in self.seats:
            return self.seats[path]
        outer, _, last = path.rpartition(".")
        file, line = self.seat(outer) if outer else (self.places.path, None)
        return file, line if last.isdigit() else None

    def overlaid(self, path: str, data: Mapping[str, Any]) -> dict[str, Any]:
        """Return a table as the file has it, with what is read in its place."""
        own = {key.removeprefix(f"{path}."): value for key, value in self.instead.items() if _in(key, path)}
        return {**data, **own}

    def put(self, path: str, value: Any, origin: Origin = Origin.STATED) -> None:
        """Give a key path its value."""
        self.values[path] = value
        self.origins[path] = origin

    def put_reading(self, path: str, reading: Reading) -> float:
        """Enter a number that was read at a key path and return it."""
        line = self.seat(path)[1]
        self.entries[path] = Entry.of(path, reading, line)
        self.origins[path] = reading.origin
        if reading.toleranced:
            self.toleranced.add(path)
        if reading.sign_dropped:
            self.dropped.append(path)
        return reading.nominal

    def assume(self, path: str, value: str, why: str) -> None:
        """List a default that stepped in."""
        self.assumptions.append(Assumption(path, value, why))

    def fill(
        self,
        path: str,
        nominal: float,
        kind: Kind,
        *,
        spread: tuple[float, float] | None = None,
        origin: Origin = Origin.ASSUMED,
        text: str = "",
    ) -> None:
        """Enter a number that the program found itself."""
        low, high = spread or (nominal, nominal)
        self.put(path, nominal, origin)
        self.entries[path] = Entry(path, nominal, low, high, origin, kind, text)

    def widen(self, path: str, low: float, high: float) -> None:
        """Give an entry another interval; its origin stays."""
        self.entries[path] = changed(self.entries[path], low=low, high=high)

    def number(self, path: str) -> float | None:
        """Return one number, None when it is not known."""
        value = self.values.get(path)
        return value if isinstance(value, float) else None

    def word(self, path: str) -> str | None:
        """Return one word, None when it is not known."""
        value = self.values.get(path)
        return value if isinstance(value, str) else None

    def numbers(self, path: str) -> tuple[float, ...]:
        """Return the numbers of a list, none when it is not known."""
        return tuple(self.values.get(path) or ())

    def has(self, path: str) -> bool:
        """Whether a key path has a value (a part written as not fitted has none)."""
        return self.values.get(path) is not None

    def outputs(self) -> tuple[str, ...]:
        """Return the names of the output devices that are known, each once."""
        names = (self.word("stage.upper"), self.word("stage.lower"))
        return tuple(dict.fromkeys(name for name in names if name and self.has(f"device.{name}.kind")))

    def drop(self, table: str) -> None:
        """Forget everything under a table."""
        under = f"{table}."
        stores: tuple[dict[str, Any], ...] = (self.values, self.entries, self.origins)
        for store in stores:
            for path in [path for path in store if path.startswith(under)]:
                del store[path]
        self.absent = {path for path in self.absent if not path.startswith(under)}
        self.dropped = [path for path in self.dropped if not path.startswith(under)]
        self.assumptions = [assumed for assumed in self.assumptions if not assumed.key.startswith(under)]


def _in(key: str, path: str) -> bool:
    return key.rpartition(".")[0] == path


def weakest(origins: Iterable[Origin]) -> Origin:
    """Return the origin that speaks least for a value made of several."""
    return min(origins, key=WEAKEST_FIRST.index, default=Origin.STATED)


def _printable(text: str) -> str:
    """Return a text without what would move the cursor of a terminal."""
    return "".join(sign if sign.isprintable() else "\ufffd" for sign in text)


def in_order(complaints: Iterable[Complaint], first: str) -> tuple[Complaint, ...]:
    """Return the complaints by file, one file first, and by line, those without a line last."""
    listed = list(complaints)
    files = {name: place for place, name in enumerate(dict.fromkeys((first, *(c.path for c in listed))))}
    return tuple(sorted(listed, key=lambda c: (files[c.path], c.line is None, c.line or 0)))
