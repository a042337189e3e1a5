"""Levels of a sine and the heat of the stage at each."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier
from safeamp.checks import thermal
from safeamp.checks.levels import worst_level
from safeamp.checks.thermal import Dissipation
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal

COUNTS = ("loudspeaker.parallel", "loudspeaker.series")

Values = npt.NDArray[np.float64]

#: Levels that a curve is drawn through: shares of the power at clipping.
FRACTIONS = np.linspace(0.0, 1.0, 201)


@dataclass(frozen=True, eq=False)
class Level:
    """A level of the stage: its name, its share of the power at clipping, its heat, and whether none heats more."""

    name: str
    fraction: float
    heat: Dissipation
    hottest: bool = False

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


def levels_of(amplifier: Amplifier) -> tuple[Level, ...]:
    """Return no signal, one eighth, one third and the worst sine into the nominal load, unless no signal is worse."""
    worst = worst_level(amplifier)
    quiet = "no signal" if worst else "no signal, the hottest"
    sines = {"one eighth": thermal.ONE_EIGHTH, "one third": thermal.ONE_THIRD}
    if worst:
        sines[f"worst sine ({worst:.0%})"] = worst
    found = [
        Level(name, fraction, thermal.at_level(amplifier, fraction), hottest=fraction == worst)
        for name, fraction in sines.items()
    ]
    return (Level(quiet, 0.0, thermal.no_signal(amplifier), hottest=not worst), *found)


def of_what(amplifier: Amplifier) -> str:
    """Return of what the heat and the power at clipping of a stage are, where that is not the one loudspeaker."""
    parallel, series = (nominal(count) for count in needed(amplifier, *COUNTS))
    said = ["one side of the bridge"] if amplifier.stage.bridged else []
    if amplifier.stage.series_resistor is not None:
        said.append("load with its series resistor")
    elif parallel * series > 1.0:
        said.append(f"all {parallel * series:.0f} loudspeakers together")
    return ", ".join(said)
