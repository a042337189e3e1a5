"""Responses of a linear circuit from its transfer function: a direct part and a sum of exponentials."""

from __future__ import annotations

from dataclasses import dataclass
from typing import cast

import numpy as np
from numpy.typing import ArrayLike, NDArray

Coefficients = NDArray[np.float64]
"""Of a polynomial in s, highest power first."""
Array = NDArray[np.float64]
Complex = NDArray[np.complex128]

NEAR = 1e-6
"""Poles nearer than this part of their size are parted by it: a double pole has no partial fractions."""
AWAY = 30.0
"""Time constants after which an exponential is gone: e^-30 is 1e-13."""
EACH = 6000
"""Times looked at for each pole."""
DENSE = 30.0
"""Times a radian of the fastest turn, at least."""


@dataclass(frozen=True, eq=False)
class Fractions:
    """direct + sum of residue/(s - pole); every pole left of the axis."""

    direct: float
    poles: Complex
    residues: Complex

    def impulse(self, time: Array) -> Array:
        """Return the impulse response after the direct part, per second."""
        return self._sum(self.residues, np.exp(self.poles * time[:, None]))

    def step(self, time: Array) -> Array:
        """Return the integral of the impulse response, the direct part left out."""
        return self._sum(self.residues / self.poles, np.expm1(self.poles * time[:, None]))

    def ramp(self, time: Array) -> Array:
        """Return the response to a slope of one a second that starts at zero, the direct part left out."""
        grown = self.poles * time[:, None]
        return self._sum(self.residues / self.poles**2, np.expm1(grown) - grown)

    def _sum(self, shares: Complex, waves: Complex) -> Array:
        found: Array = np.real(waves @ shares)
        return found

    def times(self) -> Array:
        """Return rising times, s, from zero to where every pole is gone, dense enough for each of them."""
        grids = [np.zeros(1)]
        for pole in self.poles:
            last = AWAY / -pole.real
            count = max(EACH, int(DENSE * abs(pole.imag) * last))
            grids.append(last * np.linspace(0.0, 1.0, count) ** 2 if pole.imag == 0 else last * _even(count))
        return np.unique(np.concatenate(grids))


def _even(count: int) -> Array:
    return np.linspace(0.0, 1.0, count)


def fractions(numerator: ArrayLike, denominator: ArrayLike) -> Fractions:
    """Return the partial fractions of a proper transfer function with stable poles.

    Raises
    ------
    ValueError
        If the numerator has the higher degree, or a pole does not die away.
    """
    top, bottom = np.trim_zeros(np.asarray(numerator), "f"), np.trim_zeros(np.asarray(denominator), "f")
    if len(top) > len(bottom):
        raise ValueError("the degree of the numerator must not exceed that of the denominator")
    direct = float(top[0] / bottom[0]) if len(top) == len(bottom) else 0.0
    rest = np.polysub(top, direct * bottom) if direct else top
    if direct:
        rest[0] = 0.0  # what is left of it is rounding
    poles = _parted(np.roots(bottom))
    if np.any(poles.real >= 0):
        raise ValueError("every pole must die away")
    gaps = poles[:, None] - poles[None, :]
    np.fill_diagonal(gaps, 1.0)
    residues = np.polyval(rest, poles) / (bottom[0] * np.prod(gaps, axis=1))
    return Fractions(direct, poles, residues)


def _parted(poles: NDArray[np.generic]) -> Complex:
    """Return the poles with none so near to another that the fractions would cancel."""
    found = np.sort_complex(np.asarray(poles, dtype=complex))
    for place in range(1, len(found)):
        if np.min(np.abs(found[place] - found[:place])) < NEAR * abs(found[place]):
            found[place] = found[place] * (1.0 + NEAR * (1 + place))
    return cast(Complex, found)
