"""Levels of a sine and the heat of the stage at each."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier
from safeamp.checks import thermal
from safeamp.checks.thermal import Dissipation
from safeamp.checks.words import nominal

Values = npt.NDArray[np.float64]

#: Levels at which a worst one is looked for, and that a curve is drawn through: shares of the power at clipping.
FRACTIONS = np.linspace(0.0, 1.0, 201)


@dataclass(frozen=True, eq=False)
class Level:
    """A level of the stage: its name, its share of the power at clipping, its heat."""

    name: str
    fraction: float
    heat: Dissipation

    @property
    def watts(self) -> float:
        """Heat of the stage, W."""
        return nominal(self.heat.stage_power)


def heat_over_level(amplifier: Amplifier, angle: float = 0.0) -> Values:
    """Return the heat of the stage at each of `FRACTIONS`, W; the first one is without signal."""
    fractions: Any = FRACTIONS[1:]
    sine = thermal.at_level(amplifier, fractions, angle)
    quiet = nominal(thermal.no_signal(amplifier).stage_power)
    return np.append(quiet, np.broadcast_to(sine.stage_power, fractions.shape))


def worst_fraction(heat: Values) -> float:
    """Return the level of the most heat among `FRACTIONS`, the first one left out."""
    return float(FRACTIONS[1:][int(np.argmax(heat[1:]))])


def levels_of(amplifier: Amplifier) -> tuple[Level, ...]:
    """Return no signal, one eighth, one third and the worst sine into the nominal load."""
    worst = worst_fraction(heat_over_level(amplifier))
    sines = {
        "one eighth": thermal.ONE_EIGHTH,
        "one third": thermal.ONE_THIRD,
        f"worst sine ({worst:.0%})": worst,
    }
    found = [Level(name, fraction, thermal.at_level(amplifier, fraction)) for name, fraction in sines.items()]
    return (Level("no signal", 0.0, thermal.no_signal(amplifier)), *found)
