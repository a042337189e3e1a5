"""The first power-up from a bench supply with a current limit: what it shows, and where to set it."""

from __future__ import annotations

from collections.abc import Iterator
from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.answers.power_up import Expected, Extent, State
from safeamp.physics.preferred import next_preferred
from safeamp.quantities import CURRENT, POWER, VOLTAGE, show
from safeamp.studies.power_up import draw
from safeamp.studies.power_up.extents import Compute, Extents
from safeamp.studies.power_up.states import (
    EACH,
    HEAT,
    LOWEST,
    ONE_DEVICE,
    OUTPUT,
    RUNAWAY,
    SET,
    SHORTED,
    Desk,
    healthy_output,
    state_of,
    together,
)

DRAWN = "from each rail"


def bench_states(desk: Desk) -> tuple[State, ...]:
    """Return the states on a bench supply of the rails without load."""
    lowest, as_set = (desk.extents(_healthy(desk, idle=idle)) for idle in (False, True))
    known = as_set if as_set.found else lowest
    return (
        state_of(LOWEST, lowest, _readings(desk, lowest), healthy=True),
        state_of(SET, as_set, _readings(desk, as_set), healthy=True),
        *(state_of(name, known, _limited(desk, known)) for name in (SHORTED, RUNAWAY)),
        state_of(ONE_DEVICE, lowest, _one_device(lowest)),
    )


def _healthy(desk: Desk, *, idle: bool) -> Compute:
    ends = draw.Ends.of(desk.limits)

    def compute(amplifier: Amplifier) -> dict[str, draw.Array]:
        rails = draw.rails_at(amplifier)
        whole = reduce(np.add, rails)
        power = ends.rails + (draw.idle_power(amplifier) if idle else 0.0 * whole)
        found = {"current": power / whole, "heat": power, "whole": whole * np.ones(5)}
        return {**found, **{f"rail {place}": rail * np.ones(5) for place, rail in enumerate(rails)}}

    return compute


def limit_current(desk: Desk) -> float | None:
    """Return where to set the current limit, A; None where the draw is not known."""
    for idle in (True, False):
        found = desk.extents(_healthy(desk, idle=idle)).found
        if found:
            times = desk.limits.default("power_up.bench_limit").nominal
            return float(next_preferred(times * found["current"].high, "E12", "up"))
    return None


def _readings(desk: Desk, found: Extents) -> Iterator[Expected]:
    yield Expected(DRAWN, CURRENT, found.found["current"])
    rails = together(found)
    yield Expected(EACH, VOLTAGE, rails, "as you set them, slowly from 0 V")
    yield healthy_output(desk, rails)
    yield Expected(HEAT, POWER, found.found["heat"])


def _limited(desk: Desk, found: Extents) -> Iterator[Expected]:
    limit = limit_current(desk)
    if limit is None:
        return
    yield Expected(DRAWN, None, None, f"the supply stands in its limit of {show(limit, CURRENT)}")
    yield Expected(EACH, None, None, "falling or near 0 V")
    whole = found.found["whole"]
    yield Expected(HEAT, POWER, Extent(0.0, 0.0, limit * whole.high), "rail to rail times the limit")


def _one_device(found: Extents) -> Iterator[Expected]:
    yield Expected(DRAWN, CURRENT, found.found["current"], "as in a healthy one: nothing loads the output")
    yield Expected(OUTPUT, VOLTAGE, together(found), "near a rail, of its sign")
