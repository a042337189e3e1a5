"""Heat over the drive level: the sine that heats most, and programme, shown beside the heatsink's temperature."""

from __future__ import annotations

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.checks.beside import plain
from safeamp.checks.words import nominal
from safeamp.findings import Also
from safeamp.physics import stage
from safeamp.quantities import POWER, RATIO, TEMPERATURE, Number

Levels = npt.NDArray[np.float64]

_ROUNDS = 4
_STEPS = np.linspace(-1.0, 1.0, 9)


def worst_level(amplifier: Amplifier) -> float:
    """Return the share of clipping power at which a sine heats the nominal stage most; 0 where no signal heats more.

    The worst level of class B in closed form and a grid start the search; the grid is then refined around its best
    point. With much idle current every sine heats less than no signal.
    """
    levels = np.append(np.linspace(0.02, 1.0, 50), _class_b(amplifier))
    step, best = 0.02, _hottest(amplifier, levels)
    for _ in range(_ROUNDS):
        best = _hottest(amplifier, np.clip(best + step * _STEPS, 1e-4, 1.0))
        step = step / 4.0
    quiet = nominal(thermal.no_signal(amplifier).stage_power)
    return 0.0 if quiet >= nominal(thermal.at_level(amplifier, best).stage_power) else best


def _class_b(amplifier: Amplifier) -> float:
    """Return where class B without resistors has its worst level, as a share of clipping power."""
    clipping = nominal(operating.clipping_peak(amplifier))
    worst = stage.worst_sine_peak(
        half_supply=nominal(operating.half(amplifier, operating.full_load_rail(amplifier))),
        phase_angle=0.0,
        clipping_peak=clipping,
    )
    return float((worst / clipping) ** 2)


def _hottest(amplifier: Amplifier, levels: Levels) -> float:
    heat = thermal.at_level(amplifier, levels).stage_power
    return float(levels[int(np.argmax(heat))])


def programme_heat(amplifier: Amplifier, fraction: float) -> Number:
    """Return the heat of a stage in class B for programme like noise at a share of clipping power, W."""
    clipping = operating.clipping_peak(amplifier)
    heat: Number = stage.noise_heat(
        half_supply=operating.level_half_supply(amplifier, fraction),
        rms=clipping * np.sqrt(fraction / 2.0),
        load=operating.nominal_load(amplifier)[0],
        clipping_peak=clipping,
    )
    return heat


def level_also(amplifier: Amplifier) -> tuple[Also, ...]:
    """Return the worst level of a sine with its heat and heatsink temperature, and the heat of programme."""
    whole = plain(amplifier)
    if whole is None or np.isnan(nominal(thermal.at_level(whole, thermal.ONE_THIRD).stage_power)):
        return ()
    return (
        *_worst_also(whole, worst_level(whole)),
        Also(
            "heat of programme like noise at one eighth of clipping power, class B",
            nominal(programme_heat(whole, thermal.ONE_EIGHTH)),
            POWER,
        ),
    )


def _worst_also(amplifier: Amplifier, level: float) -> tuple[Also, ...]:
    """Return what the worst level of a sine does, or that no signal is worse than any."""
    if level == 0.0:
        quiet = nominal(thermal.no_signal(amplifier).stage_power)
        return (Also("most heat of the stage, without signal: any sine heats less", quiet, POWER),)
    heat = thermal.at_level(amplifier, level)
    return (
        Also("worst level of a sine, share of clipping power", level, RATIO),
        Also("heat of the stage at the worst level of a sine", nominal(heat.stage_power), POWER),
        Also(
            "heatsink at the worst level of a sine",
            nominal(thermal.sink_temperature(amplifier, heat)),
            TEMPERATURE,
        ),
    )
