"""Questions the reader asks: values that contradict one another, or what the trade knows of such stages."""

from __future__ import annotations

from collections.abc import Callable

from safeamp.quantities import (
    CAPACITANCE,
    CURRENT,
    LENGTH,
    RESISTANCE,
    TEMPERATURE,
    VOLTAGE,
    Kind,
    Origin,
    show,
)
from safeamp.reading.curve_questions import ask_curve
from safeamp.reading.device_questions import ask_devices
from safeamp.reading.draft import Draft
from safeamp.reading.reading_questions import ask_readings
from safeamp.reading.supply_questions import ask_supply

MOST_IDLE = {"V": 5.0, "A": 3.0}
MOST_IDLE_ACROSS_RESISTOR = 10.0


def ask(draft: Draft) -> None:
    """Complain of every contradiction."""
    for question in (ask_supply, *QUESTIONS, ask_curve, ask_devices, ask_readings):
        question(draft)


def _below(draft: Draft, path: str, other: str, kind: Kind, write: str) -> None:
    """Complain when one value lies above another that must not be smaller."""
    value, bound = draft.number(path), draft.number(other)
    if value is not None and bound is not None and value > bound:
        draft.complain(path, f"{show(value, kind)} is above {other}, {show(bound, kind)}; {write}")


def _swing(draft: Draft) -> None:
    given = {
        name
        for name in ("swing_loss", "swing_loss_up", "swing_loss_down", "clipped_peak")
        if _set(draft, name)
    }
    halves = given & {"swing_loss_up", "swing_loss_down"}
    if len(halves) == 1:
        other = "swing_loss_down" if "swing_loss_up" in halves else "swing_loss_up"
        draft.complain(
            f"stage.{halves.pop()}", f"stands without {other}; write both, or swing_loss for both sides"
        )
    elif len(given) > max(1, len(halves)):
        text = f"{' and '.join(sorted(given))} say the same thing twice"
        draft.complain(f"stage.{max(given)}", f"{text}; write one of them, clipped_peak if it was measured")
    _room(draft, sorted(given))


def _set(draft: Draft, name: str) -> bool:
    return f"stage.{name}" in draft.written


def _room(draft: Draft, given: list[str]) -> None:
    """Complain of a loss or a peak that the rail has no room for."""
    rails = draft.numbers("supply.no_load")
    if not rails:
        return
    single = draft.word("supply.rails") == "single"
    side = max(rails) / (2 if single else 1)
    # A peak may stand above half the rail when the midpoint is off, and above a rail read at lower mains.
    most = {"clipped_peak": 1.5 if single else 1.1}
    for name in given:
        volts = draft.number(f"stage.{name}") or 0.0
        if volts >= side * most.get(name, 1.0):
            text = f"{show(volts, VOLTAGE)} leaves nothing of {show(side, VOLTAGE)} from rail to midpoint"
            draft.complain(f"stage.{name}", f"{text}; read both again")


def _coupling(draft: Draft) -> None:
    """Complain of an output that would stand on half the rail, and of a capacitor that has nothing to hold."""
    rails, coupling = draft.word("supply.rails"), draft.word("stage.coupling")
    if rails == "single" and coupling == "direct" and draft.values.get("stage.bridged") is False:
        text = "a single rail, no output capacitor and no bridge put half the rail across the loudspeaker"
        write = 'write coupling = "capacitor", bridged = true, or supply.rails = "split", whichever it is'
        draft.complain("stage.coupling", f"{text}; {write}")
    elif rails == "split" and coupling == "capacitor":
        text = "an output capacitor holds half of a single rail; between split rails it has nothing to hold"
        draft.complain(
            "stage.coupling", f'{text}; write "direct", or supply.rails = "single" with the whole rail'
        )


def _pairs(draft: Draft) -> None:
    conducting, pairs = draft.number("stage.pairs_conducting"), draft.number("stage.pairs")
    if conducting is not None and pairs is not None and conducting > pairs:
        draft.complain(
            "stage.pairs_conducting",
            f"{conducting:g} is more than the {pairs:g} pairs; write {pairs:g} or less",
        )


def _idle(draft: Draft) -> None:
    for name in ("idle", "idle_specified"):
        volts_or_amperes, unit = draft.number(f"stage.{name}"), draft.word(f"stage.{name}_unit")
        if volts_or_amperes is not None and unit is not None:
            ask_idle(draft, f"stage.{name}", volts_or_amperes, unit)


def ask_idle(draft: Draft, path: str, value: float, unit: str) -> None:
    """Complain of an idle current that no output device has."""
    resistor = draft.number("stage.emitter_resistor")
    if unit == "A":
        if value > MOST_IDLE["A"]:
            small = show(value / 1e3, CURRENT)
            draft.complain(
                path, f"{show(value, CURRENT)} of idle current in each device: did you mean {small}?"
            )
    elif resistor == 0:
        draft.complain(
            path, 'volts are read across a resistor, and emitter_resistor is "none"; write amperes'
        )
    elif resistor is not None and value / resistor > MOST_IDLE_ACROSS_RESISTOR:
        across = f"{show(value, VOLTAGE)} across {show(resistor, RESISTANCE)}"
        means = f"means {show(value / resistor, CURRENT)}"
        draft.complain(path, f"{across} {means}: did you mean {show(value / 1e3, VOLTAGE)}?")
    elif value > MOST_IDLE["V"]:
        draft.complain(
            path, f"{show(value, VOLTAGE)} across one resistor: did you mean {show(value / 1e3, VOLTAGE)}?"
        )


def _capacitor(draft: Draft) -> None:
    value = draft.number("output_capacitor.capacitance")
    marked = draft.number("output_capacitor.marked_capacitance")
    if value is not None and marked is not None and not 0.2 <= value / marked <= 5.0:
        text = f"{show(marked, CAPACITANCE)} is marked and {show(value, CAPACITANCE)} is there"
        draft.complain("output_capacitor.marked_capacitance", f"{text}: read the print and the unit again")


def _air(draft: Draft) -> None:
    air = draft.number("heatsink.air")
    if air is not None and air < 30.0 and draft.origins["heatsink.air"] is not Origin.MEASURED:
        text = f"{show(air, TEMPERATURE)} inside a cabinet with its lid on is cold"
        draft.complain(
            "heatsink.air", f'{text}: is it the air of the room? read it at the heatsink and add ", measured"'
        )


def _fins(draft: Draft) -> None:
    fins = "heatsink.fins"
    width, count, thick = (draft.number(f"{fins}.{name}") for name in ("width", "count", "thickness"))
    if width is not None and count is not None and thick is not None and count * thick >= width:
        text = f"{count:g} fins of {show(thick, LENGTH)} fill a width of {show(width, LENGTH)}"
        draft.complain(f"{fins}.width", f"{text}; measure the width across the fins, and one fin alone")


def _impedance(draft: Draft) -> None:
    # The lowest point of a curve may lie above the label: only what is written is asked about.
    if "loudspeaker.minimum_impedance" not in draft.written:
        return
    write = "read the label again"
    _below(draft, "loudspeaker.minimum_impedance", "loudspeaker.nominal_impedance", RESISTANCE, write)


#: Asked in this order; each looks at what is there and is silent about what is missing.
QUESTIONS: tuple[Callable[[Draft], None], ...] = (
    _swing,
    _coupling,
    _pairs,
    _idle,
    _capacitor,
    _air,
    _fins,
    _impedance,
)
