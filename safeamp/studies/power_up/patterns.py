"""What is seen behind the limiter, what it means, what to do."""

from __future__ import annotations

from collections.abc import Iterator

from safeamp.answers.power_up import Pattern, State
from safeamp.checks import operating
from safeamp.limits import Limits
from safeamp.quantities import PERCENT, show
from safeamp.studies.power_up.states import (
    ACROSS,
    EACH,
    HEAT,
    ONE_DEVICE,
    ONE_RAIL,
    OTHER,
    OUTPUT,
    RUNAWAY,
    SET,
    SHORTED,
    Desk,
)

OFF = "Switch off, cord out, discharge."


def patterns(desk: Desk, states: tuple[State, ...]) -> Iterator[Pattern]:
    """Yield the sick patterns, with the numbers of this sheet where they are known."""
    by_name = {state.name: state for state in states}
    yield from _shorts(desk, by_name)
    yield from _at_the_output(desk, by_name)
    yield from _draw(desk, by_name)


def _shorts(desk: Desk, states: dict[str, State]) -> Iterator[Pattern]:
    yield Pattern(
        f"{_bright(desk)}{_numbers(states, SHORTED, ACROSS)}, rails near 0 V",
        "A short across the whole supply: output devices, reservoir, rectifier or transformer.",
        f"{OFF} Measure the devices and both ways across the rails; never try a larger limiter.",
    )
    if operating.is_single(desk.sheet.amplifier):
        return
    other = _numbers(states, ONE_RAIL, OTHER) or " some volts"
    yield Pattern(
        f"{_bright(desk)}, one rail near 0 V, the other at{other}",
        "That rail is shorted to 0 V: its reservoir, a rectifier, or the devices of one side.",
        f"{OFF} Look on that side first.",
    )
    yield Pattern(
        f"{_quiet(desk)}, rails {_apart(desk.limits)} of their mean apart",
        "One rail feeds a fault, or has lost its rectifier, fuse or reservoir.",
        f"{OFF} Measure fuses and rectifier before anything else.",
    )


def _at_the_output(desk: Desk, states: dict[str, State]) -> Iterator[Pattern]:
    single = operating.is_single(desk.sheet.amplifier)
    where = "near the whole rail or near 0 V" if single else "near a rail"
    yield Pattern(
        f"{_quiet(desk)}, output {where}{_numbers(states, ONE_DEVICE, OUTPUT)}",
        "One device conducts fully or the feedback is broken. Without a load it draws nothing: no limiter shows it.",
        f"{OFF} A loudspeaker here would burn. Measure devices and drivers of that side, then the feedback.",
    )
    if single:
        yield Pattern(
            f"{_quiet(desk)}, output away from half the rail for longer than its capacitor needs to charge",
            "The divider that sets the midpoint, a leaky capacitor there, or a device.",
            f"{OFF} Measure the divider and the capacitors on it.",
        )


def _draw(desk: Desk, states: dict[str, State]) -> Iterator[Pattern]:
    kind = desk.limiter.kind
    rising = "Lamp dim at first, then brighter" if kind == "lamp" else "The current rises"
    yield Pattern(
        f"{rising} while you watch",
        "Both sides conduct, the bias string is open or its sensor is off: "
        f"heat{_numbers(states, RUNAWAY, HEAT) or ' without end'} in the devices.",
        f"{OFF} Check the bias generator; set the preset to its lowest.",
    )
    yield Pattern(
        f"{_quiet(desk)}, but the rails lie under those of a healthy one{_numbers(states, SET, EACH)}",
        "It draws more than the sheet says: the other channel, class A, the preset, or a beginning fault.",
        "No full mains before you know what draws: preset to its lowest, then one channel after the other.",
    )
    yield Pattern(
        "No current at all, rails as set" if kind == "bench" else "No flash, no rails",
        "The way in is open: fuse, switch, transformer, or the limiter itself.",
        f"{OFF} A dark limiter alone is no good sign.",
    )
    yield Pattern(
        f"{'Lamp lights' if kind == 'lamp' else 'Current comes'} again and again",
        "Something starts and gives up: oscillation, a protection circuit, a breakdown.",
        f"{OFF} Do not let it go on to see more.",
    )


def _bright(desk: Desk) -> str:
    words = {
        "lamp": "Lamp stays bright",
        "resistor": "Nearly all of the mains across the resistor",
        "bench": "The supply stays in its limit",
    }
    return words.get(desk.limiter.kind, "The limiter carries all that it can")


def _quiet(desk: Desk) -> str:
    words = {"lamp": "Lamp dark or dim", "resistor": "Few volts across the resistor"}
    return words.get(desk.limiter.kind, "Little current")


def _apart(limits: Limits) -> str:
    limit = limits["power_up.rails"]
    return f"more than {show(limit.go if isinstance(limit.go, float) else None, PERCENT)}"


def _numbers(states: dict[str, State], name: str, what: str) -> str:
    """Return the extent of a reading in a state, with a blank before it; nothing where it is not known."""
    state = states.get(name)
    if state is None:
        return ""
    for one in state.readings:
        if one.what == what and one.extent is not None and one.kind is not None:
            text = one.extent.text(one.kind)
            across = f" ({text} across it)" if what == ACROSS else f" {text}"
            return f" ({text})" if what in (OUTPUT, EACH) else across
    return ""
