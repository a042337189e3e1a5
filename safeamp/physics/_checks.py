"""Coercion and range checks that every formula of this package shares."""

from typing import Any

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def array(value: Any) -> Any:
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
    return value if foreign else np.asarray(value, dtype=float)


def first_bad(value: Any, bad: Any) -> Any:
    """Return the first element of `value` that `bad` marks, for an error message."""
    values, marks = np.broadcast_arrays(np.asarray(value), np.asarray(bad))
    return values[marks].flat[0]


def refuse(name: str, value: Any, bad: Any, rule: str) -> None:
    """Raise ValueError naming the first bad element; nan is never bad, it passes on as nan."""
    if np.any(bad):
        raise ValueError(f"{name} must be {rule}, got {first_bad(value, bad)}")


def positive(**values: Any) -> None:
    """Raise ValueError unless every value is greater than zero."""
    for name, value in values.items():
        refuse(name, value, array(value) <= 0, "greater than zero")


def non_negative(**values: Any) -> None:
    """Raise ValueError unless no value is below zero."""
    for name, value in values.items():
        refuse(name, value, array(value) < 0, "zero or more")


def within(low: float, high: float, **values: Any) -> None:
    """Raise ValueError unless every value lies from `low` to `high`, both included."""
    for name, value in values.items():
        given = array(value)
        refuse(name, value, (given < low) | (given > high), f"between {low:g} and {high:g}")
