"""The readings at which to switch off: by the limits of the first power-up, and by nose and finger."""

from __future__ import annotations

from collections.abc import Iterator

from safeamp.answers.power_up import Extent, State, SwitchOff
from safeamp.checks import operating
from safeamp.limits import Limit
from safeamp.quantities import PERCENT, VOLTAGE, Kind, show
from safeamp.studies.power_up.states import ACROSS, LOWEST, SET, SHORTED, Desk

PRACTICE = "common practice, no source"
STATES = ("dark", "dim", "bright", "rising")


def switch_off(desk: Desk, states: tuple[State, ...]) -> Iterator[SwitchOff]:
    """Yield each reading at which to switch off."""
    yield _draw(desk)
    yield from _volts(states)
    if not operating.is_single(desk.sheet.amplifier):
        yield _rails(desk.limits["power_up.rails"])
    yield _output(desk)
    yield SwitchOff(
        "the volts across the limiter, or the current, rise while you watch",
        "a healthy stage settles; one that runs away does not",
        source=PRACTICE,
    )
    yield SwitchOff(
        "smell, smoke, a hiss, a loud hum, a part that swells",
        "never look for the cause while it is live",
        source=PRACTICE,
    )
    yield SwitchOff(
        "any part is hot to the finger after 1 min: feel with the cord out and the capacitors discharged",
        "at idle behind a limiter nothing but a resistor or a lamp may be hot",
        source=PRACTICE,
    )


def _draw(desk: Desk) -> SwitchOff:
    limit = desk.limits["power_up.draw"]
    level = _single(limit)
    states = [state for state in STATES if limit.extra[state] > level]
    wait = show(desk.limits.default("power_up.wait").nominal, desk.limits.default("power_up.wait").kind)
    if desk.limiter.kind == "lamp":
        return _by(
            limit, f"the lamp is {' or '.join(states)} after its first flash, at the latest after {wait}"
        )
    if desk.limiter.kind == "bench":
        return _by(limit, f"the supply still stands in its current limit after {wait}")
    if desk.limiter.kind == "resistor":
        return _by(limit, f"most of the mains still stands across the resistor after {wait}")
    return _by(limit, f"the limiter still carries all that it can after {wait}")


def _volts(states: tuple[State, ...]) -> Iterator[SwitchOff]:
    """Yield the volts that no healthy stage leaves across the limiter, unless a short may leave as few."""
    shorted, lowest, as_set = (across(states, name) for name in (SHORTED, LOWEST, SET))
    if shorted is not None and lowest is not None and told_apart(states):
        more = "" if as_set is None else f"; set, or without a preset, more than {show(as_set.high, VOLTAGE)}"
        yield SwitchOff(
            f"more than {show(lowest.high, VOLTAGE)} across the limiter once the flash is over, with the idle current "
            f"at its lowest{more}",
            f"a healthy one of this sheet leaves no more there, a shorted stage {shorted.text(VOLTAGE)}",
            source="computed for this sheet",
        )


def told_apart(states: tuple[State, ...]) -> bool:
    """Tell whether the volts across the limiter show a shorted stage; true where nothing is known of them."""
    shorted, most = across(states, SHORTED), across(states, SET) or across(states, LOWEST)
    return shorted is None or most is None or shorted.low > most.high


def across(states: tuple[State, ...], name: str) -> Extent | None:
    """Return the volts across the limiter in a state; None where they are not known."""
    found = [one for state in states if state.name == name for one in state.readings if one.what == ACROSS]
    return found[0].extent if found else None


def _rails(limit: Limit) -> SwitchOff:
    return _by(
        limit,
        f"the rails are more than {_stop(limit, PERCENT)} of their mean apart{_cautious(limit, PERCENT)}",
    )


def _output(desk: Desk) -> SwitchOff:
    if operating.is_single(desk.sheet.amplifier):
        limit = desk.limits["power_up.output.midpoint"]
        off = f"the output is more than {_stop(limit, PERCENT)} off half the rail, once it has settled"
        return _by(limit, f"{off}{_cautious(limit, PERCENT)}")
    limit = desk.limits["power_up.output"]
    return _by(limit, f"more than {_stop(limit, VOLTAGE)} DC at the output{_cautious(limit, VOLTAGE)}")


def _stop(limit: Limit, kind: Kind) -> str:
    return show(_single(limit), kind)


def _cautious(limit: Limit, kind: Kind) -> str:
    go = limit.go if isinstance(limit.go, float) else None
    return "" if go is None else f" (up to {show(go, kind)} is go; find out why it is more)"


def _single(limit: Limit) -> float:
    """Return beyond what a limit says stop."""
    if not isinstance(limit.stop, float):
        raise TypeError(f"the limit {limit.id} has no single level beyond which it is stop")
    return limit.stop


def _by(limit: Limit, when: str) -> SwitchOff:
    said = "changed by your limits file: " if limit.overridden else ""
    return SwitchOff(when, limit.says, limit.id, f"{said}{limit.source}")
