"""Work through many cases piece by piece, so that the working memory stays in the processor's cache."""

from collections.abc import Callable, Iterator
from dataclasses import fields, is_dataclass, replace
from functools import wraps
from itertools import pairwise
from typing import Any, ParamSpec, TypeVar

import numpy as np

from safeamp.physics._checks import array

CHUNK = 512
"""Cases at a time; with some fifty angles each, one array takes 200 KiB."""

P = ParamSpec("P")
R = TypeVar("R")


def _leaves(value: object) -> Iterator[Any]:
    """Yield the numbers and arrays inside an argument or a result."""
    if isinstance(value, tuple):
        for item in value:
            yield from _leaves(item)
    elif is_dataclass(value):
        for field in fields(value):
            yield from _leaves(getattr(value, field.name))
    else:
        yield value


def _changed(value: Any, change: Callable[[Any], Any]) -> Any:
    """Return `value` with `change` made to every number and array inside; itself where that changes nothing."""
    if isinstance(value, tuple):
        items = [_changed(item, change) for item in value]
        if all(new is old for new, old in zip(items, value, strict=True)):
            return value
        return type(value)(*items) if hasattr(value, "_fields") else tuple(items)
    if is_dataclass(value) and not isinstance(value, type):
        given = {field.name: getattr(value, field.name) for field in fields(value)}
        parts = {name: _changed(old, change) for name, old in given.items()}
        # What is the same for all cases need not be checked anew for every piece of them.
        return value if all(parts[name] is old for name, old in given.items()) else replace(value, **parts)
    return change(value)


def _joined(results: list[Any]) -> Any:
    """Return the results of the pieces as one result."""
    columns = iter(zip(*(_leaves(result) for result in results), strict=True))
    return _changed(results[0], lambda _: np.concatenate(next(columns)))


def _part(value: Any, shape: tuple[int, ...], piece: slice) -> Any:
    """Return the cases of one piece, or the value itself when it is the same for all cases."""
    if np.ndim(value) != len(shape) or np.shape(value)[0] != shape[0]:
        return value
    return array(value)[piece]


def _call(function: Callable[..., R], given: dict[str, Any], shape: tuple[int, ...], piece: slice) -> R:
    """Call `function` with the cases of one piece."""
    cut = {name: _changed(value, lambda x: _part(x, shape, piece)) for name, value in given.items()}
    return function(**cut)


def chunks_of(size: int) -> Callable[[Callable[P, R]], Callable[P, R]]:
    """Let a function of cases along the first axis work on so many at a time."""

    def decorate(function: Callable[P, R]) -> Callable[P, R]:
        @wraps(function)
        def chunked(*args: P.args, **kwargs: P.kwargs) -> R:
            shape = np.broadcast_shapes(*(np.shape(leaf) for leaf in _leaves(tuple(kwargs.values()))))
            if args or not shape or shape[0] <= size:
                return function(*args, **kwargs)
            ends = np.linspace(0, shape[0], -(-shape[0] // size) + 1).astype(
                int
            )  # even: no piece of a few cases
            pieces = [slice(*both) for both in pairwise(ends.tolist())]
            whole: R = _joined([_call(function, kwargs, shape, piece) for piece in pieces])
            return whole

        return chunked

    return decorate


def in_chunks(function: Callable[P, R]) -> Callable[P, R]:
    """Let a function of cases along the first axis work on a few hundred at a time."""
    return chunks_of(CHUNK)(function)
