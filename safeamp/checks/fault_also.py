"""A rail on the coil: the energy until something acts, and whether the rail fuse would."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from safeamp.amplifier import Amplifier, Fuse
from safeamp.checks.beside import plain
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal
from safeamp.findings import Also
from safeamp.physics.coil_heating import copper_ratio
from safeamp.physics.fuse import Gates, slowest_time
from safeamp.quantities import CURRENT, ENERGY, RATIO, TIME, Number

ENERGY_AT = "energy into the coil until then, at most"
FUSE_AT = "current of the rail fuse over its rating, coil at its limit"
FUSE_AFTER = "the rail fuse acts after at most"


def until_stopped(power: Number, acts_after: Number) -> tuple[Also, ...]:
    """Return the energy of a fault; heat only raises the coil's resistance, so the first power bounds the rest."""
    return (Also(ENERGY_AT, nominal(power) * nominal(acts_after), ENERGY),)


def fault_current(amplifier: Amplifier, volts: Number, coil: Number) -> Number:
    """Return the current, A, of all loudspeakers together at a direct voltage on each coil, alone on the rail.

    A series resistor counts, for it slows every fuse down; the heat of the coil is judged as if it were not there.
    """
    parallel, series = needed(amplifier, "loudspeaker.parallel", "loudspeaker.series")
    resistor = amplifier.stage.series_resistor
    alone: Number = volts / coil * parallel
    if resistor is None:
        return alone
    whole = coil * series / parallel
    return alone * whole / (whole + resistor)


def rail_fuse_also(
    amplifier: Amplifier, volts: Number, gates_of: Callable[[Fuse], Gates]
) -> tuple[Also, ...]:
    """Return what the fault asks of the rail fuse: the coil limits the current, so it often stands it for good."""
    whole = plain(amplifier)
    fitted = None if whole is None else whole.supply.rail_fuse
    if whole is None or not isinstance(fitted, Fuse):
        return ()
    coil, limit = needed(whole, "loudspeaker.dc_resistance", "loudspeaker.coil_limit")
    hottest = 1.0 if np.isnan(nominal(limit)) else copper_ratio(rise=nominal(limit) - 20.0)
    current = nominal(fault_current(whole, volts, coil))
    if np.isnan(current):
        return ()
    times = nominal(fault_current(whole, volts, coil * hottest)) / fitted.rating
    return (
        Also("current of the rail fuse, coil cold", current, CURRENT),
        Also(FUSE_AT, float(times), RATIO),
        Also(FUSE_AFTER, float(slowest_time(times_rating=times, gates=gates_of(fitted))), TIME),
    )
