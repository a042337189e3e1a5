"""DC at the output: offset, drift, midpoint."""

from __future__ import annotations

from functools import reduce

import numpy as np

from safeamp.amplifier import Amplifier, value_at
from safeamp.checks import operating
from safeamp.checks.driver import switch_on_travel
from safeamp.checks.registry import finding
from safeamp.checks.trace import aside, needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Also, Measure, NotApplicable, Step
from safeamp.limits import Limits
from safeamp.physics import capacitor, offset
from safeamp.quantities import ENERGY, LENGTH, PERCENT, POWER, RATIO, TIME, VOLTAGE, Number

COUPLED = 'stage.coupling is "capacitor"'
DIRECT = 'stage.coupling is "direct"'


def _across(amplifier: Amplifier, path: str, value: Number) -> Number:
    """Return the magnitude that a reading means for the loudspeaker; bridged sides without signs add up."""
    other = amplifier.readings.offset_other_side
    if not amplifier.stage.bridged or other is None:
        return np.abs(value)
    unsigned = amplifier.readings.unsigned or frozenset()
    if path in unsigned or "readings.offset_other_side" in unsigned:
        return np.abs(value) + np.abs(other)
    return np.abs(value - other)


@finding("offset.output", Step.BIAS, VOLTAGE, at_bench=True)
def check_output(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """DC at the output: the worst of cold, warm and with signal."""
    if operating.is_capacitor_coupled(amplifier):
        return NotApplicable(COUPLED)
    needed(amplifier, "readings.offset_cold", "readings.offset_warm")
    paths = ("readings.offset_cold", "readings.offset_warm", "readings.offset_with_signal")
    found = {path: value_at(amplifier, path) for path in paths}
    # A reading that was not given is noted as missing above; one that is no number makes the worst no number.
    given = [_across(amplifier, path, value) for path, value in found.items() if value is not None]
    worst = reduce(np.maximum, given, np.nan if not given else 0.0)
    return Measure(
        worst,
        _says(worst, limits),
        also=_coil(amplifier, worst),
        next="read again after 40 minutes and with signal, no loudspeaker connected",
        method="largest magnitude of the readings",
    )


def _says(worst: Number, limits: Limits) -> str:
    said = f"{text(worst, VOLTAGE)} of DC at the output"
    if nominal(worst) > limits["offset.output"].extra["switch_off_above"]:
        return f"{said}: switch off, the stage is stuck towards a rail"
    return said


def _coil(amplifier: Amplifier, volts: Number) -> tuple[Also, ...]:
    table = amplifier.loudspeaker
    if table.dc_resistance is None:
        return ()
    volts = volts / needed(amplifier, "loudspeaker.series")[0]
    power = offset.coil_power(voltage=volts, dc_resistance=table.dc_resistance)
    found = [Also("power in the coil", nominal(power), POWER)]
    if table.force_factor is not None and table.compliance is not None:
        shift = offset.cone_displacement(
            voltage=volts,
            dc_resistance=table.dc_resistance,
            force_factor=table.force_factor,
            compliance=table.compliance,
        )
        found.append(Also("cone displacement", nominal(shift), LENGTH))
        if table.linear_excursion is not None:
            found.append(Also("of the linear excursion", nominal(shift / table.linear_excursion), PERCENT))
    return tuple(found)


@finding("offset.drift", Step.BIAS, VOLTAGE, at_bench=True)
def check_drift(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Warm minus cold."""
    if operating.is_capacitor_coupled(amplifier):
        return NotApplicable(COUPLED)
    cold, warm = needed(amplifier, "readings.offset_cold", "readings.offset_warm")
    return Measure(
        np.abs(warm - cold),
        f"{text(cold, VOLTAGE)} cold, {text(warm, VOLTAGE)} warm",
        next="read at 0, 10, 20 and 40 minutes; it must settle",
        method="magnitude of warm minus cold",
    )


@finding("offset.midpoint", Step.BIAS, RATIO, at_bench=True)
def check_midpoint(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Departure of the midpoint from half the rail."""
    if not operating.is_capacitor_coupled(amplifier):
        return NotApplicable(DIRECT)
    (middle,) = needed(amplifier, "readings.midpoint")
    share = operating.midpoint_share(amplifier) + 0.0 * middle
    error = 2.0 * share - 1.0
    return Measure(
        np.abs(error),
        f"midpoint {text(middle, VOLTAGE)}, {text(error, PERCENT)} from half the rail",
        also=() if np.ndim(error) else (*_turn_on(amplifier), *_settling(amplifier)),
        next="set the midpoint to half the rail, warm, then read it again",
        method="(midpoint - half the rail) over half the rail",
    )


def _turn_on(amplifier: Amplifier) -> tuple[Also, ...]:
    amplifier = aside(amplifier)
    table = amplifier.output_capacitor
    if table.rise_time is None or table.capacitance is None:
        return ()
    charging = {
        "capacitance": table.capacitance,
        "load_resistance": operating.nominal_load(amplifier)[0],
        "midpoint": operating.midpoint(amplifier),
        "rise_time": table.rise_time,
    }
    peak, energy = capacitor.turn_on_peak(**charging), capacitor.turn_on_energy(**charging)
    shared = peak / needed(amplifier, "loudspeaker.series")[0]
    return (
        Also("peak across the loudspeaker at switch-on", nominal(peak), VOLTAGE),
        Also("energy into the loudspeaker at switch-on", nominal(energy), ENERGY),
        *switch_on_travel(amplifier, shared),
    )


def _settling(amplifier: Amplifier) -> tuple[Also, ...]:
    """Return how long the output capacitor takes to charge through the load, and to empty through its bleeder."""
    table = aside(amplifier).output_capacitor
    if table.capacitance is None:
        return ()
    ohms = operating.nominal_load(amplifier)[0]
    charged = capacitor.settling_time(capacitance=table.capacitance, resistance=ohms)
    rise = 0.0 if table.rise_time is None else table.rise_time
    found = [Also("output settles after switch-on in", nominal(charged + rise), TIME)]
    if table.bleeder is not None:
        emptied = capacitor.settling_time(capacitance=table.capacitance, resistance=table.bleeder)
        found.append(Also("capacitor empties through the bleeder in", nominal(emptied), TIME))
    return tuple(found)
