"""Oscillation: it cannot be computed, only read."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.registry import finding
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Also, Measure, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import zobel
from safeamp.quantities import POWER, VOLTAGE

#: Top of the audio band, Hz.
BAND_TOP = 20e3


@finding("stability.output", Step.LOAD_TEST, VOLTAGE, at_bench=True)
def check_output(amplifier: Amplifier, limits: Limits) -> Measure:
    """AC at the output without signal."""
    (volts,) = needed(amplifier, "readings.output_ac")
    hot = amplifier.readings.zobel_hot
    if hot is None and "stage.zobel_resistor" in amplifier.absent:
        hot = False  # there is none that could get hot
    return Measure(
        volts,
        f"{text(volts, VOLTAGE)} AC at the output without signal"
        + ("; the resistor across the output is hot" if hot else ""),
        remarks=_zobel_remarks(hot),
        needs=() if hot is not None else ("readings.zobel_hot",),
        also=_zobel(amplifier),
        next="look with a scope or an AC millivoltmeter, input shorted; touch no resistor",
        method="reading; oscillation cannot be computed here",
    )


def _zobel_remarks(hot: bool | None) -> tuple[Remark, ...]:
    if hot is None:
        return (Remark(Verdict.CAUTION, "whether the resistor across the output gets hot is not given"),)
    if hot:
        return (Remark(Verdict.STOP, "a hot resistor across the output means oscillation: switch off"),)
    return ()


def _zobel(amplifier: Amplifier) -> tuple[Also, ...]:
    table = amplifier.stage
    if table.zobel_resistor is None or table.zobel_capacitor is None:
        return ()
    rms = operating.clipping_peak(amplifier) / np.sqrt(2.0)
    heat = zobel.dissipation(
        voltage_rms=rms,
        resistance=table.zobel_resistor,
        capacitance=table.zobel_capacitor,
        frequency=BAND_TOP,
    )
    most = rms**2 / table.zobel_resistor  # at high frequency the capacitor is no obstacle
    return (
        Also("heat in the resistor across the output at 20 kHz and clipping", nominal(heat), POWER),
        Also("the same when it oscillates at clipping, at most", nominal(most), POWER),
    )
