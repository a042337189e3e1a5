"""What music and a clipped sine do to coil, magnet and cone of one loudspeaker: numbers shown beside its power."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks.driver import travel_also
from safeamp.checks.trace import aside
from safeamp.checks.words import nominal
from safeamp.findings import Also
from safeamp.physics import loudspeaker
from safeamp.physics.coil_heating import settled_coil_temperature
from safeamp.quantities import POWER, TEMPERATURE, Number

#: Room in which the loudspeaker stands, degC.
ROOM = 25.0
#: Crest factor of a sine that is clipped to a square wave: twice the power.
CLIPPED = loudspeaker.CREST_FACTORS["square"]


def programme_also(amplifier: Amplifier, sine_power: Number) -> tuple[Also, ...]:
    """Return what programme and a fully clipped sine do; `sine_power` is that at clipping into one loudspeaker, W."""
    if np.ndim(sine_power):
        return ()
    amplifier = aside(amplifier)
    crest, found = amplifier.loudspeaker.crest_factor, []
    if crest is not None:
        power = loudspeaker.programme_power(power=sine_power, crest_factor=10.0 ** (crest / 20.0))
        found += [Also("power of the programme at clipping", nominal(power), POWER)]
        found += _warm(amplifier, power, "the programme")
    clipped = loudspeaker.programme_power(power=sine_power, crest_factor=CLIPPED)
    found += _warm(amplifier, clipped, "a fully clipped sine")
    return (*found, *travel_also(amplifier))


def _warm(amplifier: Amplifier, power: Number, what: str) -> list[Also]:
    """Return where coil and magnet settle in the end; `power` is that into a coil of 20 degC, and falls as it warms."""
    table = amplifier.loudspeaker
    if table.coil_to_magnet is None or table.magnet_to_air is None:
        return []
    coil = settled_coil_temperature(
        voltage=np.sqrt(power),  # into 1 ohm: only the power and the rise of the resistance count
        dc_resistance=1.0,
        coil_to_magnet=table.coil_to_magnet,
        magnet_to_air=table.magnet_to_air,
        air=ROOM,
    )
    magnet = ROOM + (coil - ROOM) * table.magnet_to_air / (table.coil_to_magnet + table.magnet_to_air)
    return [
        Also(f"coil in the end with {what}", nominal(coil), TEMPERATURE),
        Also(f"magnet in the end with {what}", nominal(magnet), TEMPERATURE),
    ]
