"""Factors of two-sided intervals: of the normal distribution, and of Student's."""

from __future__ import annotations

from functools import lru_cache
from math import atan, cos, pi, sin, sqrt
from statistics import NormalDist

#: From so many degrees of freedom on the normal distribution is as good (2 parts in 1000 at 95 %).
MANY = 1000


@lru_cache(maxsize=256)
def two_sided(level: float, freedom: int | None = None) -> float:
    """Return how many standard errors hold a share of all values; `freedom` is None where the error is known.

    References
    ----------
    Memory: Student's distribution of whole degrees of freedom is a finite sum; W. Gosset, 1908.
    """
    normal = NormalDist().inv_cdf(0.5 + level / 2.0)
    if freedom is None or freedom > MANY:
        return normal
    low, high = normal, 1.0
    while _share(high, freedom) < level:
        high *= 2.0
    while high - low > 1e-12 * high:
        middle = (low + high) / 2.0
        low, high = (middle, high) if _share(middle, freedom) < level else (low, middle)
    return (low + high) / 2.0


def _share(factor: float, freedom: int) -> float:
    """Return the share of values within a factor, either side."""
    angle = atan(factor / sqrt(freedom))
    odd = freedom % 2
    term = cos(angle) if odd else 1.0
    total = term if freedom > 1 else 0.0
    for place in range(3 if odd else 2, freedom - 1, 2):
        term *= (place - 1) / place * cos(angle) ** 2
        total += term
    return 2.0 / pi * (angle + sin(angle) * total) if odd else sin(angle) * total
