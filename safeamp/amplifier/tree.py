"""The whole amplifier, and reaching or moving one value in it by its key path."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, replace
from functools import cache
from typing import Any

from safeamp.amplifier.load import Loudspeaker, Readings
from safeamp.amplifier.power import Heatsink, Mains, Protection, Supply
from safeamp.amplifier.stage import Device, OutputCapacitor, Stage
from safeamp.quantities import Origin

#: Tables of the sheet in the order in which they are shown.
TABLES: Mapping[str, type[Any]] = {
    "mains": Mains,
    "supply": Supply,
    "stage": Stage,
    "output_capacitor": OutputCapacitor,
    "heatsink": Heatsink,
    "loudspeaker": Loudspeaker,
    "protection": Protection,
    "readings": Readings,
    "device": Device,
}

#: Internal values and the key under which a user knows them.
STANDS_FOR = {
    "mains.present": "mains.actual",
    "supply.full_load_share": "supply.full_load",
    "heatsink.fins_share": "heatsink.fins",
    "loudspeaker.minimum_share": "loudspeaker.minimum_impedance",
    "loudspeaker.power_share": "loudspeaker.power_word",
    "readings.midpoint_share": "readings.midpoint",
}


@dataclass(frozen=True, eq=False, kw_only=True)
class Amplifier:
    """One channel of one amplifier.

    `absent` holds the key paths written "none"; `origins` where each value comes from.
    """

    title: str = ""
    notes: str = ""
    sheet_version: int = 1
    mains: Mains = field(default_factory=Mains)
    supply: Supply = field(default_factory=Supply)
    stage: Stage = field(default_factory=Stage)
    output_capacitor: OutputCapacitor = field(default_factory=OutputCapacitor)
    heatsink: Heatsink = field(default_factory=Heatsink)
    loudspeaker: Loudspeaker = field(default_factory=Loudspeaker)
    protection: Protection = field(default_factory=Protection)
    readings: Readings = field(default_factory=Readings)
    device: Mapping[str, Device] = field(default_factory=dict)
    absent: frozenset[str] = frozenset()
    origins: Mapping[str, Origin] = field(default_factory=dict)

    def origin(self, path: str) -> Origin | None:
        """Return where the value of a key path comes from, None when it is not given."""
        return self.origins.get(path)


def is_mapping(node: Any) -> bool:
    """Whether a node is a mapping; thousands of reads in one verdict ask it of a dozen types."""
    kind: Any = type(node)
    return _are_mappings(kind)


@cache
def _are_mappings(kind: Any) -> bool:
    return issubclass(kind, Mapping)


def value_at(node: Any, path: str) -> Any:
    """Return the value at a key path such as `device.fitted.power` or `supply.no_load.0`.

    Raises
    ------
    AttributeError, KeyError, IndexError
        If there is no such place.
    """
    for name in path.split("."):
        if isinstance(node, tuple):
            node = node[int(name)]
        elif is_mapping(node):
            node = node[name]
        else:
            node = getattr(node, name)
    return node


def _placed(node: Any, names: list[str], value: Any) -> Any:
    if not names:
        return value
    name, rest = names[0], names[1:]
    if isinstance(node, Mapping):
        return {**node, name: _placed(node[name], rest, value)}
    if isinstance(node, tuple):
        place = int(name)
        return (*node[:place], _placed(node[place], rest, value), *node[place + 1 :])
    return replace(node, **{name: _placed(getattr(node, name), rest, value)})


def with_values(amplifier: Amplifier, values: Mapping[str, Any]) -> Amplifier:
    """Return the amplifier with each key path moved to a new value (a float or an array over the cases)."""
    for path, value in values.items():
        amplifier = _placed(amplifier, path.split("."), value)
    return amplifier


@cache
def written_key(path: str) -> str:
    """Return the key as a user writes it, for the path of a value inside the program."""
    path = STANDS_FOR.get(path, path)
    return ".".join(part for part in path.split(".") if not part.isdigit())
