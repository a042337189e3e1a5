"""Coercion and range checks that every formula of this package shares."""

from typing import cast

import numpy as np
from numpy.typing import ArrayLike, NDArray

Array = NDArray[np.float64]


def array(value: ArrayLike) -> Array:
    """Return `value` as floats; foreign arrays (units, masks) pass through untouched.

    Parameters
    ----------
    value : array_like
        A number, a sequence, or any object that takes part in numpy's function protocol.

    Returns
    -------
    numpy.ndarray
        Float array of the same shape, or the foreign array itself.
    """
    foreign = hasattr(value, "__array_function__") and not isinstance(value, np.ndarray)
    return cast(Array, value) if foreign else np.asarray(value, dtype=float)


def first_bad(value: ArrayLike, bad: ArrayLike) -> object:
    """Return the first element of `value` that `bad` marks, for an error message."""
    values, marks = np.broadcast_arrays(np.asarray(value), np.asarray(bad))
    return values[marks.astype(bool)].flat[0]


def refuse(name: str, value: ArrayLike, bad: ArrayLike, rule: str) -> None:
    """Raise ValueError naming the first bad element; nan is never bad, it passes on as nan."""
    # A single number is asked thousands of times in one verdict, and its truth costs a hundredth of np.any.
    if bad if isinstance(bad, np.bool_) else np.any(bad):
        raise ValueError(f"{name} must be {rule}, got {first_bad(value, bad)}")


def positive(**values: ArrayLike) -> None:
    """Raise ValueError unless every value is greater than zero."""
    for name, value in values.items():
        refuse(name, value, array(value) <= 0, "greater than zero")


def non_negative(**values: ArrayLike) -> None:
    """Raise ValueError unless no value is below zero."""
    for name, value in values.items():
        refuse(name, value, array(value) < 0, "zero or more")


def within(low: float, high: float, **values: ArrayLike) -> None:
    """Raise ValueError unless every value lies from `low` to `high`, both included."""
    for name, value in values.items():
        given = array(value)
        refuse(name, value, (given < low) | (given > high), f"between {low:g} and {high:g}")
