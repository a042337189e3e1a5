"""DC at the output: offset, drift, midpoint."""

from __future__ import annotations

from safeamp.amplifier import value_at
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import many, midpoint
from safeamp.checks.working.register import working
from safeamp.quantities import VOLTAGE, Number

READINGS = {"V_cold": "offset_cold", "V_warm": "offset_warm", "V_signal": "offset_with_signal"}


def _across(paper: Paper, symbol: str, path: str) -> str:
    """Return what a reading means for the loudspeaker; the sides of a bridge may add up."""
    readings = paper.amplifier.readings
    if not paper.amplifier.stage.bridged or readings.offset_other_side is None:
        return f"abs({symbol})"
    paper.given("V_other", "readings.offset_other_side", VOLTAGE, "the other side of the bridge")
    unsigned = readings.unsigned or frozenset()
    if path in unsigned or "readings.offset_other_side" in unsigned:
        return f"(abs({symbol}) + abs(V_other))"
    return f"abs({symbol} - V_other)"


@working("offset.output")
def write_output(paper: Paper, value: Number) -> None:
    """Largest magnitude of the readings."""
    parts = []
    for symbol, name in READINGS.items():
        path = f"readings.{name}"
        if value_at(paper.amplifier, path) is not None:
            paper.given(symbol, path, VOLTAGE)
            parts.append(_across(paper, symbol, path))
    if parts:
        paper.put("V", "largest magnitude of the readings", many(parts, "max"), value, VOLTAGE)
    else:
        paper.taken("V", "DC at the output", None, VOLTAGE, "no reading is given")


@working("offset.drift")
def write_drift(paper: Paper, value: Number) -> None:
    """Warm minus cold."""
    paper.given("V_cold", "readings.offset_cold", VOLTAGE)
    paper.given("V_warm", "readings.offset_warm", VOLTAGE)
    paper.put("V", "magnitude of warm minus cold", "abs(V_warm - V_cold)", value, VOLTAGE)


@working("offset.midpoint")
def write_midpoint(paper: Paper, value: Number) -> None:
    """Departure from half the rail."""
    midpoint(paper)
    paper.put("d", "departure from half the rail, over half the rail", "abs(2 * m - 1)", value)
