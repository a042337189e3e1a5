"""An amplifier of arrays over the cases: how many there are, and one of them alone."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import fields, is_dataclass, replace
from typing import Any, TypeVar

from safeamp.amplifier.load import Curve
from safeamp.amplifier.tree import TABLES, Amplifier

Node = TypeVar("Node")


def number_of_cases(amplifier: Amplifier) -> int | None:
    """Return how many cases an amplifier holds, None when it is a single one."""
    for name in TABLES:
        for leaf in _leaves(getattr(amplifier, name)):
            if leaf.ndim == 1:
                return len(leaf)
    return None


def at_case(amplifier: Amplifier, case: int) -> Amplifier:
    """Return the amplifier of one case, its arrays replaced by numbers."""
    return replace(amplifier, **{name: _picked(getattr(amplifier, name), case) for name in TABLES})


def _is_array(node: Any) -> bool:
    import numpy as np  # here, because lists of keys must not wait for it

    return isinstance(node, np.ndarray) and node.ndim > 0


def _leaves(node: Any) -> Iterator[Any]:
    """Yield the arrays of a table."""
    if isinstance(node, Curve):
        return
    if isinstance(node, Mapping):
        for item in node.values():
            yield from _leaves(item)
    elif isinstance(node, tuple):
        for item in node:
            yield from _leaves(item)
    elif is_dataclass(node):
        for item in fields(node):
            yield from _leaves(getattr(node, item.name))
    elif _is_array(node):
        yield node


def _picked(node: Any, case: int) -> Any:
    """Return a table, or a part of it, at one case."""
    if isinstance(node, Curve):
        return node
    if isinstance(node, Mapping):
        return {name: _picked(item, case) for name, item in node.items()}
    if isinstance(node, tuple):
        return tuple(_picked(item, case) for item in node)
    if is_dataclass(node) and not isinstance(node, type):
        return replace(node, **{item.name: _picked(getattr(node, item.name), case) for item in fields(node)})
    return float(node[case]) if _is_array(node) else node
