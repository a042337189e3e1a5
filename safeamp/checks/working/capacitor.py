"""The output capacitor: wear, cutoff, voltage, ripple, leakage."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating, thermal
from safeamp.checks.driver import seen_driver
from safeamp.checks.working.load import load
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import mains_ratio, midpoint, read_rails
from safeamp.checks.working.register import working
from safeamp.checks.working.warmth import level_peak
from safeamp.physics import capacitor
from safeamp.quantities import CAPACITANCE, CURRENT, FREQUENCY, RATIO, RESISTANCE, VOLTAGE, Number, Origin


def _farads(paper: Paper) -> str:
    return paper.given("C", "output_capacitor.capacitance", CAPACITANCE, "output capacitor")


@working("capacitor.wear")
def write_wear(paper: Paper, value: Number) -> None:
    """Measured over marked capacitance."""
    origin = paper.amplifier.origin("output_capacitor.capacitance")
    paper.given("C_marked", "output_capacitor.marked_capacitance", CAPACITANCE, "printed")
    if origin in (Origin.MEASURED, Origin.EXAMPLE):
        paper.put("r", "measured over printed capacitance", f"{_farads(paper)} / C_marked", value)
    else:
        paper.taken("r", "measured over printed capacitance", None, RATIO, "the capacitance was not measured")


@working("capacitor.cutoff")
def write_cutoff(paper: Paper, value: Number) -> None:
    """Cutoff into the minimum impedance, or into the driver."""
    farads, (magnitude, _) = _farads(paper), load(paper, lowest=True)
    ohms = operating.minimum_load(paper.amplifier)[0]
    plain = capacitor.cutoff_frequency(capacitance=paper.value(farads), load_resistance=ohms)
    words = "-3 dB frequency into the minimum impedance"
    name = paper.put("f_c", words, f"1 / (2 * pi * {magnitude} * {farads})", plain, FREQUENCY)
    if seen_driver(paper.amplifier) is None:
        return
    how = "by following the response through coil and motional impedance down to half of the power"
    found = paper.found(
        "f_driver", "-3 dB frequency into the driver with its resonance", value, FREQUENCY, how
    )
    ratio = np.asarray(value) / plain
    paper.put("r", "for comparison: over that into the minimum impedance", f"{found} / {name}", ratio)
    paper.put("f", "held against the target", found, value, FREQUENCY)


@working("capacitor.voltage")
def write_voltage(paper: Paper, value: Number) -> None:
    """Larger part of the rail at the highest mains over the rated voltage."""
    amplifier = paper.amplifier
    (rail, *_), ratio = read_rails(paper), mains_ratio(paper, "mains.highest")
    high = operating.rails_as_read(amplifier)[0] * operating.highest_factor(amplifier)
    paper.put("V_whole", "whole rail without load at the highest mains", f"{rail}{ratio}", high, VOLTAGE)
    midpoint(paper)
    share = operating.midpoint_share(amplifier)
    part = np.maximum(share, 1.0 - share) * high
    paper.put("V_part", "larger part by the midpoint", "max(m, 1 - m) * V_whole", part, VOLTAGE)
    paper.given("V_rated", "output_capacitor.rated_voltage", VOLTAGE)
    paper.put("u", "use of the rated voltage", "V_part / V_rated", value)


@working("capacitor.ripple")
def write_ripple(paper: Paper, value: Number) -> None:
    """Rms of the load current over the rated ripple current."""
    peak, (magnitude, _) = level_peak(paper, thermal.ONE_THIRD), load(paper)
    rms = paper.value(peak) / paper.value(magnitude) / np.sqrt(2.0)
    paper.put(
        "I_rms",
        "current at one third of clipping power, rms",
        f"{peak} / {magnitude} / sqrt(2)",
        rms,
        CURRENT,
    )
    paper.given("I_rated", "output_capacitor.ripple_current", CURRENT)
    paper.put("u", "use of the rated ripple current", "I_rms / I_rated", value)


@working("capacitor.leakage")
def write_leakage(paper: Paper, value: Number) -> None:
    """Leakage over 0.01 C V."""
    table = paper.amplifier.readings
    paper.given("V_drop", "readings.capacitor_leakage_drop", VOLTAGE)
    paper.given("R_drop", "readings.capacitor_leakage_resistor", RESISTANCE)
    current = _over(table.capacitor_leakage_drop, table.capacitor_leakage_resistor)
    paper.put("I_leak", "leakage current", "V_drop / R_drop", current, CURRENT)
    farads, rate = _farads(paper), paper.limits["capacitor.leakage"].extra["leakage_per_charge"]
    paper.given("V_rated", "output_capacitor.rated_voltage", VOLTAGE)
    paper.taken(
        "k", "usual leakage in A for each F and V", rate, RATIO, "general line of data sheets: 0.01 CV in µA"
    )
    usual = rate * paper.value(farads) * paper.value("V_rated")
    paper.put("I_usual", "usual leakage", f"k * {farads} * V_rated", usual, CURRENT)
    paper.put("r", "leakage over what is usual", "I_leak / I_usual", value)


def _over(one: Number | None, other: Number | None) -> Number | None:
    return None if one is None or other is None else one / other
