"""What is done at the first power-up, in its order, and what comes after it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from safeamp.answers.power_up import Extent, State
from safeamp.checks import operating
from safeamp.limits import Limits
from safeamp.quantities import CURRENT, TIME, VOLTAGE, show
from safeamp.studies.power_up import draw
from safeamp.studies.power_up.bench import limit_current
from safeamp.studies.power_up.states import LOOK, LOWEST, Desk

CAUTIONS = (
    "Mains: inside only with the cord out; on a live amplifier meters clipped on before, one hand away, never alone.",
    "Stored charge: the reservoirs hold it after switch-off. Discharge them through a resistor, then measure.",
    "A limiter in series protects parts, not people: all behind it and its own contacts are as live as before.",
    "The lamp is an incandescent or halogen one for the mains; an LED or energy-saving lamp limits nothing.",
    "A variable transformer is no current limiter and does not isolate; it does not take the place of the limiter.",
    "No loudspeaker and no headphones connected; no signal, the input shorted.",
)
#: Behind this many times the flash a lamp that is still bright is no longer charging anything.
_MARGIN = 2.0


@dataclass(frozen=True)
class Timing:
    """How long the limiter carries the charging current, and after what time is read, s."""

    flash: Extent | None
    wait: float

    @classmethod
    def of(cls, desk: Desk) -> Timing:
        """Return the times: of the reservoirs where they are known, never shorter than usual."""
        usual = desk.limits.default("power_up.wait").nominal
        if desk.limiter.kind == "bench":
            return cls(None, usual)
        flash = desk.extents(draw.flash(desk.limiter, desk.limits)).found.get("time")
        return cls(flash, usual if flash is None else max(usual, _MARGIN * flash.high))


def wait_text(timing: Timing) -> str:
    """Return after what time is read."""
    return show(timing.wait, TIME, 2)


def steps(desk: Desk, states: tuple[State, ...], timing: Timing) -> Iterator[str]:
    """Yield the steps of switching on, for cold checks that are cleared."""
    yield "Set the preset of the idle current, if there is one, to its lowest. Nothing at the output; input shorted."
    yield _connect(desk)
    yield (
        "With the cord out, clip one meter to the output and one to a rail; a third across the limiter only if its "
        "leads are made for the mains, for that is what stands there."
    )
    yield f"Stand back, eyes protected, a hand at the switch. Switch on. {_flash(desk, timing)}"
    yield f"After {wait_text(timing)} read what a healthy one shows with its idle current at the lowest{_look(states)}."
    yield "Any of the switch-off readings below: switch off at once, cord out, discharge; then look for the cause."
    yield (
        "All as expected: read each rail with its sign, the output and the state of the limiter; after 1 min switch "
        "off, cord out, discharge, and feel whether any part is hot."
    )
    yield (
        "Write them down as readings.limiter, limiter_state, limiter_rails and limiter_output; "
        "`safeamp check` judges them. This card does not."
    )


def _connect(desk: Desk) -> str:
    if desk.limiter.kind != "bench":
        return (
            f"With the cord out, put the {desk.limiter.text}{_voltage(desk)} in series with the live conductor of the "
            "mains; the protective earth stays connected."
        )
    amperes = limit_current(desk)
    limit = "as low as it goes" if amperes is None else f"to {show(amperes, CURRENT)}"
    return (
        "Disconnect the amplifier's own supply from the rails, discharge, connect the bench supply, and set its "
        f"current limit {limit}."
    )


def _voltage(desk: Desk) -> str:
    """Return for which voltage a lamp must be made."""
    nominal = desk.sheet.amplifier.mains.nominal
    return (
        f" for {show(float(nominal), VOLTAGE)}" if desk.limiter.kind == "lamp" and nominal is not None else ""
    )


def _flash(desk: Desk, timing: Timing) -> str:
    if desk.limiter.kind == "bench":
        return "Raise the volts slowly from 0 V; the current must fall back wherever you stop."
    what = (
        "The lamp flashes"
        if desk.limiter.kind == "lamp"
        else "The volts across the resistor jump up and fall"
    )
    if timing.flash is None:
        return f"{what} while the reservoirs charge; how long is unverified: supply.reservoir is not known."
    return f"{what} while the reservoirs charge, for about {timing.flash.text(TIME)}, then it settles."


def _look(states: tuple[State, ...]) -> str:
    state = next((one for one in states if one.name == LOWEST and one.readings), None)
    if state is None:
        return ": unverified, see there"
    return next((f": the lamp {one.says}" for one in state.readings if one.what == LOOK), "")


def afterwards(desk: Desk, limits: Limits) -> Iterator[str]:
    """Yield when the limiter may come out, and what is read again then."""
    single = operating.is_single(desk.sheet.amplifier)
    output = "half the rail" if single else f"0 V, within {_output(limits)}"
    rails = "" if single else "the rails alike, "
    yield (
        f"Not before all of this holds together: the limiter steady at what a healthy one shows, {rails}the output at "
        f"{output}, nothing hot. A dark lamp alone is not enough."
    )
    yield "Only when `safeamp check` clears the step first power-up; this card clears nothing."
    yield (
        "Then on the full mains, still without loudspeaker and signal, read again: the rails, "
        f"{'the midpoint' if single else 'the offset'} cold and warm, and the idle current across each emitter "
        "resistor. What was read on the limiter may be wrong, because the rails were low."
    )
    yield (
        "Set the idle current only on the full mains, slowly, warm. Behind a lamp it pulls its own rails down, and is "
        "far too high when the lamp comes out."
    )


def _output(limits: Limits) -> str:
    go = limits["power_up.output"].go
    return show(go if isinstance(go, float) else None, VOLTAGE)
