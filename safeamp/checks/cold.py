"""Cold checks by ohmmeter: devices and insulation."""

from __future__ import annotations

from safeamp.amplifier import Amplifier
from safeamp.checks.registry import finding
from safeamp.checks.trace import needed
from safeamp.checks.words import text
from safeamp.findings import Measure, Step
from safeamp.limits import Limits
from safeamp.quantities import RESISTANCE


@finding("cold.devices", Step.COLD_CHECKS, RESISTANCE, at_bench=True)
def check_devices(amplifier: Amplifier, limits: Limits) -> Measure:
    """Lowest ohms across outputs and drivers."""
    (ohms,) = needed(amplifier, "readings.device_ohms")
    return Measure(
        ohms,
        f"lowest reading across outputs and drivers {text(ohms, RESISTANCE)}",
        next="with the cords out and the reservoirs discharged read collector-emitter and collector-base of every "
        "output and driver, both ways, and enter the lowest as readings.device_ohms",
        method="ohmmeter reading against the level of a shorted device",
    )


@finding("cold.insulation", Step.COLD_CHECKS, RESISTANCE, at_bench=True)
def check_insulation(amplifier: Amplifier, limits: Limits) -> Measure:
    """Ohms from case to heatsink with the links lifted."""
    (ohms,) = needed(amplifier, "readings.insulation")
    return Measure(
        ohms,
        f"case to heatsink {text(ohms, RESISTANCE)}",
        next="lift the links and read from each case to the heatsink; with the links in place it says nothing",
        method="ohmmeter reading of the insulator",
    )
