"""The states of the amplifier that the card tells of: two healthy ones and the faults that a limiter is there for."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field

from safeamp.amplifier import Limiter, Sheet
from safeamp.answers.power_up import Expected, Extent, State
from safeamp.checks import operating
from safeamp.limits import Limits
from safeamp.quantities import CURRENT, POWER, VOLTAGE
from safeamp.studies.power_up import draw
from safeamp.studies.power_up.extents import Compute, Extents, extents
from safeamp.studies.power_up.limiters import looks

LOWEST = "healthy, preset for the idle current at its lowest"
SET = "healthy, idle current as set"
SHORTED = "output stage shorted from rail to rail"
ONE_RAIL = "one rail shorted to 0 V"
ONE_DEVICE = "one output device conducting fully"
RUNAWAY = "both sides conducting, idle current without limit"
OTHER = "other rail"
ACROSS, CURRENT_DRAWN, LOOK, EACH, OUTPUT, HEAT = (
    "across the limiter", "from the mains", "lamp", "each rail", "output, DC", "heat in the amplifier",
)  # fmt: skip


@dataclass
class Desk:
    """A sheet with the limiter that is looked at, and what was read on the way."""

    sheet: Sheet
    limits: Limits
    limiter: Limiter
    reads: dict[str, None] = field(default_factory=dict)

    def extents(self, compute: Compute) -> Extents:
        """Return how far numbers reach, and note what they read."""
        found = extents(self.sheet, compute)
        self.reads.update(dict.fromkeys(found.reads))
        return found


def states_of(desk: Desk) -> tuple[State, ...]:
    """Return every state behind a lamp or resistor."""
    single = operating.is_single(desk.sheet.amplifier)
    lowest = desk.extents(draw.healthy(desk.limiter, desk.limits, idle=False))
    as_set = desk.extents(draw.healthy(desk.limiter, desk.limits, idle=True))
    found = [_healthy(desk, LOWEST, lowest), _healthy(desk, SET, as_set)]
    shorted = desk.extents(draw.shorted_stage(desk.limiter, desk.limits))
    found.append(state_of(SHORTED, shorted, _shorted(desk, shorted)))
    if not single:
        one = desk.extents(draw.shorted_rail(desk.limiter, desk.limits))
        found.append(state_of(ONE_RAIL, one, _one_rail(desk, one)))
    found.append(state_of(ONE_DEVICE, lowest, _one_device(desk, lowest)))
    found.append(state_of(RUNAWAY, lowest, _runaway(desk, lowest)))
    return tuple(found)


def state_of(name: str, found: Extents, readings: Iterator[Expected], *, healthy: bool = False) -> State:
    """Return a state with its readings, or what makes it unverified."""
    known = tuple(readings) if found.found else ()
    return State(name=name, healthy=healthy, readings=known, needs=found.needs, because=found.because)


def _healthy(desk: Desk, name: str, found: Extents) -> State:
    return state_of(name, found, _healthy_readings(desk, found), healthy=True)


def _healthy_readings(desk: Desk, found: Extents) -> Iterator[Expected]:
    yield from _of_limiter(desk, found)
    rails = together(found)
    yield Expected(EACH, VOLTAGE, rails)
    yield healthy_output(desk, rails)
    yield Expected(HEAT, POWER, _up_to(found))


def _of_limiter(desk: Desk, found: Extents) -> Iterator[Expected]:
    if "share" in found.found:
        share = found.found["share"]
        yield Expected(LOOK, None, None, looks(share.low, share.high, desk.limits))
    yield Expected(ACROSS, VOLTAGE, found.found["across"])
    yield Expected(CURRENT_DRAWN, CURRENT, found.found["current"])


def _rails(found: Extents) -> list[Extent]:
    return [one for name, one in found.found.items() if name.startswith("rail ")]


def together(found: Extents) -> Extent:
    """Return how far the rails reach, whichever of them."""
    rails = _rails(found)
    return Extent(rails[0].nominal, min(one.low for one in rails), max(one.high for one in rails))


def _up_to(found: Extents) -> Extent:
    """Return the heat, its upper end the bound of all that lies between the corners."""
    heat = found.found["heat"]
    return Extent(heat.nominal, heat.low, max(heat.high, found.found["most"].high))


def healthy_output(desk: Desk, rails: Extent) -> Expected:
    """Return what stands at the output of a healthy one: as far as its limit says go."""
    if operating.is_single(desk.sheet.amplifier):
        share = _level(desk.limits, "power_up.output.midpoint")
        extent = Extent(rails.nominal / 2, rails.low / 2 * (1 - share), rails.high / 2 * (1 + share))
        return Expected(OUTPUT, VOLTAGE, extent, "half the rail that is read at the same moment")
    volts = _level(desk.limits, "power_up.output")
    return Expected(OUTPUT, VOLTAGE, Extent(0.0, -volts, volts), "of either sign")


def _level(limits: Limits, id: str) -> float:
    go = limits[id].go
    if not isinstance(go, float):
        raise TypeError(f"the limit {id} has no single level up to which it is go")
    return go


def _shorted(desk: Desk, found: Extents) -> Iterator[Expected]:
    yield from _of_limiter(desk, found)
    yield Expected(EACH, VOLTAGE, together(found))
    yield Expected(OUTPUT, None, None, "says nothing: there are no rails")
    yield Expected(HEAT, POWER, _up_to(found), "the most where the short is a poor one")


def _one_rail(desk: Desk, found: Extents) -> Iterator[Expected]:
    yield from _of_limiter(desk, found)
    shorted, other = _rails(found)
    yield Expected("shorted rail", VOLTAGE, shorted)
    yield Expected(OTHER, VOLTAGE, other)
    yield Expected(OUTPUT, None, None, "towards the rail that is left, or near 0 V")
    yield Expected(HEAT, POWER, _up_to(found), "the most where the short is a poor one")


def _one_device(desk: Desk, found: Extents) -> Iterator[Expected]:
    yield from _of_limiter(desk, found)
    rails = together(found)
    yield Expected(EACH, VOLTAGE, rails, "as in a healthy one: nothing loads them")
    single = operating.is_single(desk.sheet.amplifier)
    says = "near the whole rail, or near 0 V" if single else "near one rail, of its sign"
    yield Expected(OUTPUT, VOLTAGE, rails, says)


def _runaway(desk: Desk, found: Extents) -> Iterator[Expected]:
    if "share" in found.found:
        yield Expected(LOOK, None, None, "rising, up to bright")
    yield Expected(EACH, None, None, "falling")
    # Of a healthy amplifier the bound is its own draw; here it is that of the limiter alone.
    most = desk.extents(draw.most(desk.limiter, desk.limits)).found["most"]
    yield Expected(HEAT, POWER, Extent(most.nominal, 0.0, most.high), "and most of it in the output devices")


def unknown_states(desk: Desk, why: tuple[str, ...]) -> tuple[State, ...]:
    """Return the healthy states where no limiter can be reckoned with: unverified, with what is missing or else why."""
    fixed = operating.is_fixed(desk.sheet.amplifier)
    found = Extents(because=why) if fixed else desk.extents(draw.known_draw)
    because = () if found.needs else found.because or why
    return tuple(
        State(name=name, healthy=True, readings=(), needs=found.needs, because=because)
        for name in (LOWEST, SET)
    )
