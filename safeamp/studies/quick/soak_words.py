"""What is said of a soak: why it says nothing, what to read next, when to switch off."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from safeamp.checks.words import level
from safeamp.quantities import RATIO, TEMPERATURE, TEMPERATURE_DIFFERENCE, TIME, show
from safeamp.studies.quick.desk import Desk, shown
from safeamp.studies.quick.soak_told import Told

#: A reading this many reading errors above the curve is no chance any more.
ABOVE = 3.0


def says(found: Told) -> str:
    """Return what the readings say of the end."""
    hottest = f"hottest reading {shown(found.hottest, TEMPERATURE)}"
    if found.accelerating:
        return f"it rises faster and faster, beyond the reading error; {hottest}"
    if found.trend <= 0:
        return f"no warm-up; {hottest}"
    if not np.isfinite(found.low):
        return f"where it settles cannot be told yet; {hottest}"
    low, high = shown(found.low, TEMPERATURE), shown(found.high, TEMPERATURE)
    if not found.known:
        return f"settles at {low} or more; {hottest}"
    return f"settles at {shown(found.end, TEMPERATURE)}, between {low} and {high}; {hottest}"


def why_not(desk: Desk, found: Told) -> Iterator[str]:
    """Yield what keeps the forecast from being judged."""
    said = desk.entries["reading_error"].high
    error, factor = shown(said, TEMPERATURE_DIFFERENCE), desk.limits.default("soak.scatter").nominal
    if found.trend < 0:
        yield "the readings fall: a soak is read while the heatsink warms up, not while it cools"
    elif found.trend == 0:
        yield f"the readings do not rise beyond the reading error of {error}"
    elif found.rising and not found.known:
        yield "the readings still look like a straight line: where it ends cannot be told yet"
    if found.lagging:
        yield (
            "the later readings rise more steeply than one time constant explains: something slower, such as the air "
            "of the cabinet, still warms"
        )
    if found.error > factor * said and found.error == found.scatter:
        scatter = f"{shown(found.scatter, TEMPERATURE_DIFFERENCE)} around the best curve"
        yield (
            f"the readings scatter by {scatter}, more than {shown(factor, RATIO)} times the reading error: "
            "not one undisturbed warm-up"
        )


def switch_off(found: Told) -> str:
    """Return what to do when the readings are a stop."""
    if found.accelerating:
        return "switch off; look for what heats more as it warms, the idle current first"
    return "switch off; less heat, a larger heatsink or more air past it"


def next_reading(desk: Desk, found: Told) -> str:
    """Return what to do next."""
    if found.trend <= 0:
        return "let it cool down, switch on and read from the first minute on, every few minutes"
    if found.lagging:
        return "read on until the readings stand still"
    within = shown(desk.limits.default("soak.end_uncertainty").nominal, TEMPERATURE_DIFFERENCE)
    if not np.isfinite(found.more_time):
        return "read on; a thermometer with a smaller --reading-error tells sooner"
    if found.more_time > 0.0:
        return f"read on for {show(found.more_time, TIME)}: then the end is known within {within}"
    return "less heat, a larger heatsink or more air past it"


def cautions(desk: Desk, found: Told) -> Iterator[str]:
    """Yield when to switch off, and what the numbers do not say."""
    yield from _switch_off(desk, found)
    air = (
        f"of {shown(desk.entries['air'].nominal, TEMPERATURE)}"
        if desk.has("air")
        else "as it was, which is not given"
    )
    yield f"The forecast is for this heat and for air {air}: on a hotter day the heatsink is as much hotter."
    if found.rise is not None:
        moves = shown(desk.limits.default("soak.air_moves").nominal, TEMPERATURE_DIFFERENCE)
        yield (
            f"The air moved by more than {moves}, which makes the fit of the heatsink alone wrong: its rise above "
            "air was fitted too, and the hotter end of both counts."
        )
    yield (
        "One time constant is fitted. A closed cabinet warms more slowly than its heatsink: read with the lid on, and "
        "read on until nothing moves."
    )
    yield "Fix the thermometer to the heatsink beside the devices, and leave heat, mains and lid as they are."


def _switch_off(desk: Desk, found: Told) -> Iterator[str]:
    stop = level(desk.limits["heat.heatsink"], "stop")
    yield f"Switch off when the heatsink reaches {shown(stop, TEMPERATURE)}, whatever is forecast."
    if found.expected is not None and found.rising:
        due, expected = found.expected
        most = expected + ABOVE * found.error
        if most < stop:
            yield (
                f"By the curve it is at {shown(expected, TEMPERATURE)} {shown(due, TIME)} into the log: switch off "
                f"when it is above {shown(most, TEMPERATURE)} then."
            )
