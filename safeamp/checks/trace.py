"""Which values a check reads, and which it would need: recorded while it runs, never listed by hand."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, is_dataclass
from functools import cache
from typing import Any, cast

from safeamp.amplifier import Amplifier, is_mapping, value_at, written_key

NAN = float("nan")


@dataclass
class Trace:
    """Key paths read, key paths found missing, and key paths read for numbers that are only shown, in order."""

    reads: dict[str, None] = field(default_factory=dict)
    missing: dict[str, None] = field(default_factory=dict)
    shown: dict[str, None] = field(default_factory=dict)

    def inputs(self) -> tuple[str, ...]:
        """Return every key path that was read, for the value or for what is shown beside it."""
        return tuple(dict.fromkeys((*self.reads, *self.shown)))


class _Watched:
    """An amplifier, a table or a mapping that notes what is read of it."""

    def __init__(self, node: Any, path: str, trace: Trace) -> None:
        self._node, self._path, self.trace = node, path, trace

    def __getattr__(self, name: str) -> Any:
        node = self._node
        found = node[name] if is_mapping(node) else getattr(node, name)
        if callable(found) or name in {"absent", "origins"}:
            return found
        path = f"{self._path}.{name}" if self._path else name
        kind: Any = type(found)
        if _is_table(kind):
            return _Watched(found, path, self.trace)
        self.trace.reads[path] = None
        return found


def aside(amplifier: Amplifier) -> Amplifier:
    """Return the amplifier for numbers shown beside a value: what they read moves no corner, and nothing is missing."""
    trace = getattr(amplifier, "trace", None)
    if trace is None:
        return amplifier
    return cast(Amplifier, _Watched(cast(Any, amplifier)._node, "", Trace(reads=trace.shown)))


@cache
def _is_table(kind: Any) -> bool:
    """Tell the type of a table from that of a leaf such as a fuse: tables hold arrays and compare by identity alone."""
    return issubclass(kind, Mapping) or (is_dataclass(kind) and kind.__eq__ is object.__eq__)


def watched(amplifier: Amplifier, trace: Trace) -> Amplifier:
    """Return the amplifier so that every read is noted in `trace`."""
    return cast(Amplifier, _Watched(amplifier, "", trace))


def needed(amplifier: Amplifier, *paths: str) -> list[Any]:
    """Return the values at key paths; a missing one is noted and stands as nan, which never reaches go."""
    return [_value(amplifier, path) for path in paths]


def _value(amplifier: Amplifier, path: str) -> Any:
    found = value_at(amplifier, path)
    if found is None:
        miss(amplifier, path)
        return NAN
    return found


def miss(amplifier: Amplifier, *paths: str) -> None:
    """Note that a check would need the values at these key paths."""
    trace = getattr(amplifier, "trace", None)
    if trace is not None:
        trace.missing.update(dict.fromkeys(written_key(path) for path in paths))
