"""Numbers as sources print them: value in the units of physics, and half a unit of the last printed place."""

import math
from dataclasses import dataclass

import numpy as np

UNITS = {
    "": 1.0, "V": 1.0, "mV": 1e-3, "A": 1.0, "mA": 1e-3, "uA": 1e-6, "W": 1.0, "J": 1.0, "ohm": 1.0, "kohm": 1e3,
    "Hz": 1.0, "kHz": 1e3, "F": 1.0, "uF": 1e-6, "nF": 1e-9, "s": 1.0, "ms": 1e-3, "K": 1.0, "degC": 1.0,
    "K/W": 1.0, "W/K": 1.0, "/K": 1.0, "%": 0.01, "dB": 1.0, "N/A": 1.0, "mm": 1e-3, "mm/N": 1e-3, "mV/K": 1e-3,
}  # fmt: skip


@dataclass(frozen=True)
class Printed:
    value: float
    half_unit: float


def printed(text: str) -> Printed:
    """Split "0.068 uA" into 0.068e-6 and half of 0.001e-6."""
    number, _, unit = text.partition(" ")
    mantissa, _, exponent = number.partition("e")
    places = len(mantissa.partition(".")[2])
    scale = UNITS[unit]
    return Printed(float(number) * scale, 0.5 * 10.0 ** (int(exponent or 0) - places) * scale)


def values(given):
    """Turn one printed number or a list of them into what physics takes."""
    if isinstance(given, list):
        return np.array([printed(text).value for text in given])
    return printed(given).value


def agrees(computed, expected, relative: float | None = None) -> bool:
    """Whether every number agrees with the printed one to its printed digits (or to `relative`)."""
    texts = expected if isinstance(expected, list) else [expected]
    numbers = np.atleast_1d(computed)
    assert numbers.shape == (len(texts),), f"{numbers} against {texts}"
    for number, text in zip(numbers, texts, strict=True):
        want = printed(text)
        allowed = want.half_unit if relative is None else relative * abs(want.value)
        # A hair for the rounding of the printed decimals themselves.
        if not math.isclose(number, want.value, rel_tol=1e-9, abs_tol=allowed):
            raise AssertionError(f"computed {number}, printed {text}")
    return True
