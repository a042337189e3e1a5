"""One number of a sheet that may be written otherwise: which it is, how it is written, what the sheet then is."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass, replace
from decimal import Context, Decimal
from typing import Any

from safeamp.amplifier import TABLES, Entry, Key, Sheet, keys_of
from safeamp.limits import nearest, plain
from safeamp.quantities import CURRENT, RATIO, Kind, Origin, QuantityError, Sign, plain_text, rewrite
from safeamp.reading.sheets import Source
from safeamp.reading.walk import tables_of

#: Plus, and the two characters written as minus.
SIGNS = ("+", "-", "\u2212")
#: Significant digits of an item of a list that is scaled with its largest.
FEWEST_DIGITS, MOST_DIGITS = 4, 12
#: An item of a list: its place behind a point, or in brackets, which is told how to write it.
ITEM = re.compile(r"(?P<list>.+?)(?:\.(?P<point>\d+)|\[(?P<bracket>\d+)\])")


@dataclass(frozen=True)
class Movable:
    """A key of a sheet whose number can be moved; `entries` hold it as written, several for a list.

    Of a list one item can be moved alone: `path` then ends with its place, and `whole_list` holds all items.
    """

    source: Source
    path: str
    key: Key
    kind: Kind
    entries: tuple[Entry, ...] = ()
    whole_list: tuple[Entry, ...] = ()

    @property
    def now(self) -> float | None:
        """The number that the sheet has, the largest of a list; None where it has none.

        What stands for a number that nobody wrote counts only where it could be written.
        """
        found = max((entry.nominal for entry in self.entries), key=abs, default=None)
        low, high = self.span
        return None if found is None or (not self.in_sheet and not low <= found <= high) else found

    @property
    def in_sheet(self) -> bool:
        """Whether somebody wrote it."""
        return any(entry.origin is not Origin.ASSUMED for entry in self.entries)

    @property
    def whole(self) -> bool:
        """Whether only whole numbers count."""
        return self.key.whole

    @property
    def span(self) -> tuple[float, float]:
        """The lowest and the highest number that is believed of this key."""
        low, high = self.key.believable or self.kind.believable
        return (-high, high) if low >= 0 and self._either_sign else (low, high)

    @property
    def _either_sign(self) -> bool:
        # A reading without a sign counts as either: it is moved as a magnitude.
        return self.key.sign is Sign.ANY and all(entry.text[:1] in SIGNS for entry in self.entries)

    def written(self, value: float) -> Any:
        """Return what stands in the file for a value: its tolerance in proportion, its origin as it was.

        The items of a list keep their proportions to the largest, which becomes `value`: with as many digits as
        `value` has, as rounding of floats is nothing to be copied.
        """
        if self.whole_list:
            return [
                self._one(item, value if item in self.entries else item.nominal) for item in self.whole_list
            ]
        if len(self.entries) < 2:
            return self._one(self.entries[0] if self.entries else None, value)
        largest = self.now or 0.0
        return [
            self._one(item, _scaled(item.nominal, value, largest) if largest else value)
            for item in self.entries
        ]

    def _one(self, entry: Entry | None, value: float) -> Any:
        if self.key.whole:
            return int(value)
        if self.kind == RATIO:
            return float(value)
        if entry is not None:
            minus = self.key.sign is Sign.MAGNITUDE and entry.text.lstrip()[:1] in SIGNS[1:]
            try:
                return rewrite(entry.text, self.kind, -value if minus else value)
            except QuantityError:
                # What a default says of itself, such as "half the rail", is not what a user would write.
                pass
        return plain_text(self.kind, value)

    def bought(self, value: float) -> Sheet:
        """Return the sheet with a new part of a value: printed on it, with the tolerance of what is sold so.

        Raises
        ------
        ReadingError
            If no amplifier has such a value.
        """
        return self.source.sheet({self.path: f"{plain_text(self.kind, value)}, marked"})

    def at(self, value: float) -> Sheet:
        """Return the sheet with another value at this key.

        Raises
        ------
        ReadingError
            If the sheet cannot have that value.
        """
        return self.source.sheet({_key_of(self.path): self.written(value)})


def _scaled(nominal: float, value: float, largest: float) -> float:
    """Return a number in proportion, with the digits of the numbers that it comes from, within bounds."""
    if value == largest:
        return nominal
    digits = max(_digits(value), _digits(nominal))
    kept = min(max(digits, FEWEST_DIGITS), MOST_DIGITS)
    exact = Decimal(repr(nominal)) * Decimal(repr(value)) / Decimal(repr(largest))
    return float(Context(prec=kept).plus(exact)) if abs(nominal) != abs(largest) else float(exact)


def _digits(number: float) -> int:
    return len(Decimal(repr(number)).normalize().as_tuple().digits)


def movable(source: Source, typed: str) -> Movable:
    """Return the number that a key of a sheet names.

    Parameters
    ----------
    source : Source
        The sheet.
    typed : str
        Key path, ``supply.no_load`` or ``device.NAME.power``; ``supply.no_load.1`` for the second item of a list.

    Raises
    ------
    KeyError
        If there is no such key; its text names the nearest one.
    ValueError
        If the key holds no single number.
    ReadingError
        If the sheet cannot be read.
    """
    sheet = source.sheet()
    known = dict(_keys(sheet))
    path = typed.strip()
    item = ITEM.fullmatch(path)
    if item and item["list"] in known and known[item["list"]].shape == "list":
        return _item(source, sheet, item, known[item["list"]])
    if path not in known:
        same = {plain(name): name for name in known}
        path = same.get(plain(path), path)
    if path not in known:
        raise KeyError(f"{typed} is not a key of this sheet{nearest(typed, known)}")
    key = known[path]
    if not key.kinds or key.shape not in ("one", "list"):
        what = "holds a word" if not key.kinds else "holds a curve"
        raise ValueError(f"{path} {what}, not a number that can be moved")
    return _movable(source, sheet, path, key)


def _item(source: Source, sheet: Sheet, item: re.Match[str], key: Key) -> Movable:
    """Return one item of a list, the others as they are."""
    name, place = item["list"], int(item["point"] or item["bracket"])
    if item["point"] is None:
        raise KeyError(f"{item[0]} is not how an item is named; write {name}.{place}, counted from 0")
    every = _movable(source, sheet, name, key)
    if place >= len(every.entries):
        raise KeyError(
            f"{item[0]} is not there: {name} has {len(every.entries)} in the sheet, counted from 0"
        )
    return replace(
        every, path=f"{name}.{place}", entries=every.entries[place : place + 1], whole_list=every.entries
    )


def movable_keys(sheet: Sheet) -> tuple[str, ...]:
    """Return every key of a sheet that holds a number, written or not."""
    return tuple(path for path, key in _keys(sheet) if key.kinds and key.shape in ("one", "list"))


def _movable(source: Source, sheet: Sheet, path: str, key: Key) -> Movable:
    entries = tuple(
        replace(entry, text=entry.text.strip())
        for place, entry in sheet.entries.items()
        if _key_of(place) == path
    )
    kind = entries[0].kind if entries else key.kinds[0]
    if not entries and len(key.kinds) > 1 and sheet.amplifier.stage.emitter_resistor == 0:
        kind = CURRENT
    return Movable(source, path, key, kind, entries)


def _key_of(place: str) -> str:
    """Return the key path of an entry, an item of a list without its place."""
    head, _, tail = place.rpartition(".")
    return head if tail.isdigit() else place


def _keys(sheet: Sheet) -> Iterator[tuple[str, Key]]:
    for table, noun in TABLES.items():
        places = [f"device.{name}" for name in sheet.amplifier.device] if table == "device" else [table]
        for place in places:
            for name, key in keys_of(noun).items():
                yield f"{place}.{name}", key
            for inner, below in tables_of(noun).items():
                for name, key in keys_of(below).items():
                    yield f"{place}.{inner}.{name}", key
