"""What the amplifier draws through the limiter, healthy and with a fault, over the cases."""

from __future__ import annotations

from dataclasses import dataclass
from functools import reduce

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier, Limiter
from safeamp.checks import operating
from safeamp.checks.trace import miss, needed
from safeamp.limits import Limits
from safeamp.physics import capacitor, power_up
from safeamp.quantities import Number
from safeamp.studies.power_up.extents import Compute, column
from safeamp.studies.power_up.limiters import InSeries, Lamp, Resistor

Array = npt.NDArray[np.float64]
#: Time constants after which a reservoir behind a resistor counts as charged.
CHARGED = 5.0


@dataclass(frozen=True, eq=False)
class Ends:
    """What is assumed of the amplifier and the lamp: nominal, the least draw twice, the most draw twice.

    Each end stands twice, with either end of the cold filament. What the limiter leaves falls with the draw, so that
    these are the ends of all of it.
    """

    other: Array
    rails: Array
    channels: Array
    apparent: Array
    exponent: Array
    cold_ratio: Array

    @classmethod
    def of(cls, limits: Limits) -> Ends:
        """Return the ends of the defaults."""
        names = ("other_draw", "rails_draw", "channels", "apparent")
        other, rails, channels, apparent = (_ends(limits, name) for name in names)
        falling = _ends(limits, "idle_exponent")[[0, 3, 4, 1, 2]]
        cold = limits.default("power_up.cold_ratio")
        ratios = np.array([cold.nominal, cold.low, cold.high, cold.low, cold.high])
        return cls(other, rails, channels, apparent, falling, ratios)


def _ends(limits: Limits, name: str) -> Array:
    one = limits.default(f"power_up.{name}")
    return np.array([one.nominal, one.low, one.low, one.high, one.high])


def in_series(limiter: Limiter, amplifier: Amplifier, limits: Limits) -> InSeries:
    """Return a lamp, for the declared voltage of the mains, or a resistor."""
    if limiter.value is None:
        raise ValueError(f"{limiter.text} is not in series with the mains")
    if limiter.kind == "resistor":
        return Resistor(limiter.value)
    (nominal,) = needed(amplifier, "mains.nominal")
    return Lamp(limiter.value, column(nominal), Ends.of(limits).cold_ratio)


def rails_at(amplifier: Amplifier) -> tuple[Array, ...]:
    """Return every rail without load at the present mains, V."""
    factor = operating.mains_factor(amplifier)
    rails = [column(rail * factor) for rail in operating.rails_as_read(amplifier)]
    return tuple(rails) if operating.is_single(amplifier) or len(rails) == 2 else (rails[0], rails[0])


def expected_idle(amplifier: Amplifier) -> Number:
    """Return the idle current of each device, A: as set, else as its maker prescribes it."""
    table, readings = amplifier.stage, amplifier.readings
    if table.idle is not None or readings.idle_upper or readings.idle_lower:
        return operating.idle_current(amplifier)
    if table.idle_specified is None:
        miss(amplifier, "stage.idle_specified")
        return float("nan")
    return operating.as_current(amplifier, table.idle_specified, table.idle_specified_unit)


def idle_power(amplifier: Amplifier) -> Array:
    """Return what the output devices of one channel draw from the rails at idle, W."""
    rails = reduce(np.add, rails_at(amplifier))
    both = 2.0 if amplifier.stage.bridged else 1.0
    return both * rails * column(operating.conducting(amplifier) * expected_idle(amplifier))


def healthy(limiter: Limiter, limits: Limits, *, idle: bool) -> Compute:
    """Return what computes a healthy amplifier behind a limiter, with its idle current set or at its lowest."""
    ends = Ends.of(limits)

    def compute(amplifier: Amplifier) -> dict[str, Array]:
        mains = column(needed(amplifier, "mains.present")[0])
        set_ = idle_power(amplifier) if idle else 0.0 * reduce(np.add, rails_at(amplifier))
        apparent = ends.apparent * (ends.channels * set_ + ends.other)
        series = in_series(limiter, amplifier, limits)
        left = series.idle(mains, apparent, ends.exponent)
        found = _shared(series, mains, left, rails_at(amplifier))
        # Between the ends of the draw the heat may pass through the most that the limiter lets through.
        return {**found, "most": np.minimum(apparent, series.most(mains))}

    return compute


def _shared(series: InSeries, mains: Array, left: Array, rails: tuple[Array, ...]) -> dict[str, Array]:
    """Return what limiter and rails show where the amplifier keeps a part of the mains."""
    across = mains - left
    current = series.current(across)
    found = {"across": across, "current": current, "left": left / mains, "heat": current * left}
    if isinstance(series, Lamp):
        found["share"] = series.share(across)
    for place, rail in enumerate(rails):
        found[f"rail {place}"] = rail * left / mains
    return found


def _winding(amplifier: Amplifier, ends: Ends) -> Array:
    """Return the resistance behind one rail, ohm, from how it sags while all channels are driven to clipping."""
    magnitude = operating.nominal_load(amplifier)[0]
    peak = operating.clipping_peak(amplifier, magnitude)
    mean = peak / magnitude / np.pi  # of each half wave of a sine
    both = 2.0 if amplifier.stage.bridged else 1.0
    smaller = reduce(np.minimum, rails_at(amplifier))
    return power_up.winding_resistance(
        no_load=smaller,
        full_load=column(operating.full_load_rail(amplifier)),
        mean_current=both * ends.channels * column(mean),
    )


def shorted_stage(limiter: Limiter, limits: Limits) -> Compute:
    """Return what computes devices shorted from rail to rail; their emitter resistors are all that is left."""
    ends = Ends.of(limits)

    def compute(amplifier: Amplifier) -> dict[str, Array]:
        rails = rails_at(amplifier)
        (resistor,) = needed(amplifier, "stage.emitter_resistor")
        pairs = np.where(np.arange(5) > 2, column(operating.conducting(amplifier)), 1.0)
        fault = 2.0 * column(resistor) / pairs
        windings = len(rails) * _winding(amplifier, ends)
        return _faulty(limiter, amplifier, limits, (fault, windings, rails, rails))

    return compute


def shorted_rail(limiter: Limiter, limits: Limits) -> Compute:
    """Return what computes one rail shorted to 0 V: the windings are all that is left."""
    ends = Ends.of(limits)

    def compute(amplifier: Amplifier) -> dict[str, Array]:
        rails = rails_at(amplifier)
        windings = _winding(amplifier, ends)
        return _faulty(limiter, amplifier, limits, (0.0 * windings, windings, rails[:1], rails))

    return compute


def _faulty(
    limiter: Limiter,
    amplifier: Amplifier,
    limits: Limits,
    fault: tuple[Array, Array, tuple[Array, ...], tuple[Array, ...]],
) -> dict[str, Array]:
    """Return what is seen of a resistance across some of the rails, with the windings before it."""
    ohms, windings, shorted, rails = fault
    (present,) = needed(amplifier, "mains.present")
    mains, series = column(present), in_series(limiter, amplifier, limits)
    seen = power_up.seen_from_mains(resistance=ohms + windings, mains=mains, no_load=reduce(np.add, shorted))
    left = series.fault(mains, seen)
    kept = np.where(ohms + windings > 0, ohms / (ohms + windings), 0.0)
    found = {**_shared(series, mains, left, rails), "most": series.most(mains)}
    for place in range(len(rails)):
        if len(shorted) == len(rails) or place == 0:
            found[f"rail {place}"] = found[f"rail {place}"] * kept
    return found


def most(limiter: Limiter, limits: Limits) -> Compute:
    """Return what computes the most heat that any resistive fault can draw through a limiter."""

    def compute(amplifier: Amplifier) -> dict[str, Array]:
        (present,) = needed(amplifier, "mains.present")
        return {"most": in_series(limiter, amplifier, limits).most(column(present))}

    return compute


def flash(limiter: Limiter, limits: Limits) -> Compute:
    """Return what computes how long the limiter carries the charging current of the reservoirs."""
    ends = Ends.of(limits)

    def compute(amplifier: Amplifier) -> dict[str, Array]:
        rails = rails_at(amplifier)
        present, farads = needed(amplifier, "mains.present", "supply.reservoir")
        mains, whole = column(present), reduce(np.add, rails)
        # In series as far as the rails together are concerned; a second channel may have reservoirs of its own.
        together = ends.channels * column(farads) / len(rails)
        seen = together / power_up.seen_from_mains(resistance=1.0, mains=mains, no_load=whole)
        series = in_series(limiter, amplifier, limits)
        return {"time": _charging(series, mains, seen)}

    return compute


def _charging(series: InSeries, mains: Array, capacitance: Array) -> Array:
    if isinstance(series, Lamp):
        return power_up.flash_time(
            mains=mains,
            capacitance=capacitance,
            rated_power=series.rated_power,
            rated_voltage=series.rated_voltage,
        )
    resistance = 1.0 / series.current(np.ones(1))
    return capacitor.settling_time(capacitance=capacitance, resistance=resistance, time_constants=CHARGED)


def known_draw(amplifier: Amplifier) -> dict[str, Array]:
    """Return what a draw from the mains is reckoned from, so that what is missing of it is noted."""
    mains, nominal = needed(amplifier, "mains.present", "mains.nominal")
    return {"power": idle_power(amplifier), "mains": column(mains), "nominal": column(nominal)}
