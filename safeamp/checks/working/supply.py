"""Fuse, rail to rail, reservoir, mains, transformer, and what a hand may meet of the rails."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating, thermal
from safeamp.checks.supply import mean_rail_current
from safeamp.checks.working.load import load
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import (
    clipping,
    mains_ratio,
    many,
    read_rails,
)
from safeamp.checks.working.register import working
from safeamp.checks.working.warmth import level_peak, level_supply, mean_currents
from safeamp.quantities import CURRENT, FREQUENCY, POWER, RATIO, VOLTAGE, Number


@working("supply.fuse")
def write_fuse(paper: Paper, value: Number) -> None:
    """Fitted over printed rating, or over the mean current of a rail."""
    table = paper.amplifier.supply
    fuses = {
        "I_fitted": ("rail_fuse", table.rail_fuse),
        "I_plate": ("rail_fuse_rated", table.rail_fuse_rated),
    }
    for symbol, (name, fuse) in fuses.items():
        path = f"supply.{name}"
        absent = path in paper.amplifier.absent
        said = f'"{fuse.text}"' if fuse is not None else '"none"' if absent else "not given"
        rating, origin = None if fuse is None else fuse.rating, _origin(paper, path)
        paper.taken(symbol, f"{path} is {said}: rating", rating, CURRENT, origin)
    if table.rail_fuse is not None and "supply.rail_fuse_rated" in paper.amplifier.absent:
        paper.put("r", "fitted rating over the mean current of a rail", f"I_fitted / {_mean(paper)}", value)
    else:
        paper.put("r", "fitted over printed rating", "I_fitted / I_plate", value)


def _origin(paper: Paper, path: str) -> str:
    origin = paper.amplifier.origin(path)
    return "" if origin is None else origin.value


def _mean(paper: Paper) -> str:
    clip, (magnitude, _) = clipping(paper), load(paper)
    both = "2 * " if paper.amplifier.stage.bridged else ""
    words = "mean current of one rail for a sine at clipping" + (", both sides of the bridge" if both else "")
    return paper.put(
        "I_rail", words, f"{both}{clip} / {magnitude} / pi", mean_rail_current(paper.amplifier), CURRENT
    )


def rail_to_rail(paper: Paper) -> str:
    """Write down rail to rail without load at the highest mains."""
    rails = read_rails(paper)
    total = rails[0] if operating.is_single(paper.amplifier) else f"({rails[0]} + {rails[-1]})"
    ratio = mains_ratio(paper, "mains.highest")
    found = operating.rails_as_read(paper.amplifier)
    volts = found[0] if operating.is_single(paper.amplifier) else found[0] + found[-1]
    value = volts * operating.highest_factor(paper.amplifier)
    return paper.put(
        "V_span", "rail to rail without load at the highest mains", f"{total}{ratio}", value, VOLTAGE
    )


@working("supply.rail_to_rail")
def write_rail_to_rail(paper: Paper, value: Number) -> None:
    """Rail to rail over the weakest rating."""
    span, table = rail_to_rail(paper), paper.amplifier.stage
    names = dict.fromkeys((str(table.upper), str(table.lower), *(table.drivers or ())))
    ratings = [
        paper.given(f"V_rated{place + 1}", f"device.{name}.voltage", VOLTAGE)
        for place, name in enumerate(names)
    ]
    paper.put("u", "use of the weakest rating", f"{span} / {many(ratings, 'min')}", value)


@working("touch.rails")
def write_touch(paper: Paper, value: Number) -> None:
    """Rail to rail without load at the highest mains."""
    paper.put("V", "what a hand may meet", rail_to_rail(paper), value, VOLTAGE)


@working("supply.reservoir_voltage")
def write_reservoir(paper: Paper, value: Number) -> None:
    """Larger rail at the highest mains over the rated voltage."""
    rails, amplifier = read_rails(paper), paper.amplifier
    larger = many([rails[0], rails[-1]], "max")
    found = operating.rails_as_read(amplifier)
    high = np.maximum(found[0], found[-1]) * operating.highest_factor(amplifier)
    words = "rail without load at the highest mains"
    paper.put("V_most", words, f"{larger}{mains_ratio(paper, 'mains.highest')}", high, VOLTAGE)
    paper.given("V_reservoir", "supply.reservoir_rated_voltage", VOLTAGE)
    paper.put("u", "use of the rated voltage", "V_most / V_reservoir", value)


@working("supply.mains")
def write_mains(paper: Paper, value: Number) -> None:
    """Volts per hertz against the plate."""
    paper.given("U_actual", "mains.actual", VOLTAGE)
    paper.given("U_rated", "mains.rated", VOLTAGE)
    paper.given("f_actual", "mains.frequency", FREQUENCY)
    paper.given("f_rated", "mains.rated_frequency", FREQUENCY)
    paper.put(
        "r", "volts per hertz over those of the plate", "U_actual / U_rated * f_rated / f_actual", value
    )


@working("supply.transformer")
def write_transformer(paper: Paper, value: Number) -> None:
    """Apparent power at one third of clipping power over the rating."""
    amplifier, fraction = paper.amplifier, thermal.ONE_THIRD
    peak, (magnitude, _) = level_peak(paper, fraction), load(paper)
    mean, _ = mean_currents(paper, fraction, (peak, magnitude), "third")
    sides = 2.0 if amplifier.stage.bridged else 1.0
    drawn = thermal.at_level(amplifier, fraction).mean_current * operating.conducting(amplifier) * sides
    both = " * 2" if amplifier.stage.bridged else ""
    paper.put("I_drawn", "mean current drawn from each rail", f"n * {mean}{both}", drawn, CURRENT)
    half = level_supply(paper, fraction)
    power = 2.0 * operating.level_half_supply(amplifier, fraction) * drawn
    paper.put("P_drawn", "power drawn from the rails", f"2 * {half} * I_drawn", power, POWER)
    needs = 1.4 * (power + 2.0 * drawn)
    words = "volt-amperes needed: 1.4 a watt, 2 V in the rectifier (common practice)"
    paper.put("S", words, "1.4 * (P_drawn + 2 * I_drawn)", needs, RATIO)
    paper.given("S_rated", "supply.transformer_power", POWER, "rating of the transformer, VA written as W")
    paper.put("u", "use of the rating", "S / S_rated", value)
