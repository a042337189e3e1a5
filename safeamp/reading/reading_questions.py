"""Questions about what was read at the bench: whether it was read at the right place."""

from __future__ import annotations

from collections.abc import Callable

from safeamp.quantities import RESISTANCE, TEMPERATURE, VOLTAGE, show
from safeamp.reading.draft import Draft

OFFSETS = ("offset_cold", "offset_warm", "offset_with_signal", "offset_other_side")
NEXT_TO_NOTHING = 0.5e-3
FAR_MIDPOINT = 0.3
ROUNDING = 1e-9
LARGEST_LEAKAGE_RESISTOR = 10e3


def ask_readings(draft: Draft) -> None:
    """Complain of readings that were taken at the wrong place or contradict the stage."""
    for question in READING_QUESTIONS:
        question(draft)


def _offset(draft: Draft) -> None:
    """Ask of each reading alone: a relay may open between two of them."""
    if not (draft.has("protection.trip_voltage") or draft.has("protection.trip_delay")):
        return
    for path in (f"readings.{name}" for name in OFFSETS):
        volts = draft.number(path)
        if volts is None or path in draft.toleranced or abs(volts) > NEXT_TO_NOTHING:
            continue
        text = f"{show(volts, VOLTAGE)} with protection fitted"
        ask = "was it read before or behind the relay, and did it close?"
        write = 'read before the relay; what stays is written with its tolerance, "0.3 mV ±0.1 mV, measured"'
        draft.complain(path, f"{text}: {ask} {write}")


def _bridge(draft: Draft) -> None:
    """Complain of a second output that the stage does not have: a bridge halves the load of each side."""
    path = "readings.offset_other_side"
    if draft.number(path) is not None and draft.values.get("stage.bridged") is False:
        text = "a second output was read, and stage.bridged is false"
        draft.complain(
            path, f"{text}; write bridged = true, or leave the key out: the other channel has its own sheet"
        )


def _midpoint(draft: Draft) -> None:
    midpoint, rails = draft.number("readings.midpoint"), draft.numbers("supply.no_load")
    if midpoint is None or draft.word("readings.taken_on") == "limiter":
        return
    if draft.word("supply.rails") == "split":
        draft.remarks.append('readings.midpoint is not used: supply.rails is "split"')
    elif rails and abs(2 * midpoint / rails[0] - 1) > FAR_MIDPOINT + ROUNDING:
        text = f"{show(midpoint, VOLTAGE)} is far from half the rail, {show(rails[0] / 2, VOLTAGE)}"
        ask = "was it read before the output capacitor, and had it settled?"
        draft.complain("readings.midpoint", f"{text}: {ask} if so, switch off: the stage is at fault")


def _leakage(draft: Draft) -> None:
    resistor = draft.number("readings.capacitor_leakage_resistor")
    if resistor is not None and resistor > LARGEST_LEAKAGE_RESISTOR:
        text = f"{show(resistor, RESISTANCE)} is above {show(LARGEST_LEAKAGE_RESISTOR, RESISTANCE)}"
        draft.complain(
            "readings.capacitor_leakage_resistor",
            f"{text}: across so much, as across open terminals, a good capacitor shows volts too;"
            " read across 100 ohm",
        )
    if (
        draft.has("readings.capacitor_leakage_drop")
        and "readings.capacitor_leakage_resistor" not in draft.seats
    ):
        text = 'is missing: volts alone are no leakage; write capacitor_leakage_resistor = "100 ohm"'
        draft.complain("readings.capacitor_leakage_resistor", text)


def _leakage_drop(draft: Draft) -> None:
    """Complain of more volts than stand across capacitor and resistor together."""
    path, rails = "readings.capacitor_leakage_drop", draft.numbers("supply.no_load")
    drop, midpoint = draft.number(path), draft.number("readings.midpoint")
    if drop is None or not rails or draft.word("stage.coupling") != "capacitor":
        return
    most = midpoint or rails[0] / 2 * (1 + FAR_MIDPOINT)
    if abs(drop) <= most * (1 + ROUNDING):
        return
    holds = "holds" if midpoint else "can hold"
    text = (
        f"{show(drop, VOLTAGE)} across the resistor is more than the midpoint {holds}, {show(most, VOLTAGE)}"
    )
    draft.complain(path, f"{text}: did you mean {show(drop / 1e3, VOLTAGE)}? read both again")


def _heatsink(draft: Draft) -> None:
    sink, air = draft.number("readings.heatsink_temperature"), draft.number("readings.heatsink_air")
    if sink is not None and air is not None and sink < air:
        text = f"{show(sink, TEMPERATURE)} is below heatsink_air, {show(air, TEMPERATURE)}"
        draft.complain(
            "readings.heatsink_temperature", f"{text}; no heatsink cools below its air: read both again"
        )


def _limiter_rails(draft: Draft) -> None:
    given, rails = len(draft.numbers("readings.limiter_rails")), draft.word("supply.rails")
    needed = {"split": 2, "single": 1}.get(rails or "", given)
    if given and given != needed:
        text = f"{given} given, and supply.rails is {rails}"
        draft.complain("readings.limiter_rails", f"{text}; write {needed}: each rail on the limiter")


def _idle(draft: Draft) -> None:
    pairs, resistor = draft.number("stage.pairs"), draft.number("stage.emitter_resistor")
    for side in ("idle_upper", "idle_lower"):
        drops, path = draft.numbers(f"readings.{side}"), f"readings.{side}"
        if drops and pairs is not None and len(drops) != pairs:
            draft.complain(
                path, f"{len(drops)} given, and stage.pairs is {pairs:g}; write one for each device"
            )
        for place, volts in enumerate(drops):
            _drop(draft, f"{path}.{place}", volts, resistor)
    cold = draft.number("readings.idle_cold")
    if cold is not None:
        _drop(draft, "readings.idle_cold", cold, resistor)


def _drop(draft: Draft, path: str, volts: float, resistor: float | None) -> None:
    if resistor == 0:
        draft.complain(
            path, 'volts are read across a resistor, and emitter_resistor is "none"; leave the key out'
        )
    elif resistor is not None and volts > 10.0 * resistor:
        across = f"{show(volts, VOLTAGE)} across {show(resistor, RESISTANCE)} means {volts / resistor:.3g} A"
        draft.complain(path, f"{across}: did you mean {show(volts / 1e3, VOLTAGE)}?")


#: Asked in this order; each looks at what is there and is silent about what is missing.
READING_QUESTIONS: tuple[Callable[[Draft], None], ...] = (
    _offset,
    _bridge,
    _midpoint,
    _leakage,
    _leakage_drop,
    _heatsink,
    _limiter_rails,
    _idle,
)
