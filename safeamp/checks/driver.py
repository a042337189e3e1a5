"""The driver of the sheet as a circuit, and the numbers that only a driver's parameters can tell.

Few sheets have such parameters: the formulas are imported by the first that does.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.trace import aside, needed
from safeamp.checks.words import nominal
from safeamp.findings import Also
from safeamp.quantities import CURRENT, LENGTH, PERCENT, Number

if TYPE_CHECKING:
    from safeamp.physics.driver import Driver

#: Keys that stand for nothing but a driver as a circuit.
STARTED = ("resonance", "q_mechanical", "q_electrical", "inductance", "moving_mass")
#: From this note up the travel of the cone at clipping is looked for, Hz.
LOWEST = 20.0


@dataclass(frozen=True, eq=False)
class Parameters:
    """Small-signal parameters of one driver; None where neither given nor following from others."""

    coil: Number
    resonance: Number
    q_mechanical: Number
    q_electrical: Number
    inductance: Number

    def missing(self) -> tuple[str, ...]:
        """Return the keys that are missing."""
        given = {
            "dc_resistance": self.coil,
            "resonance": self.resonance,
            "q_mechanical": self.q_mechanical,
            "q_electrical": self.q_electrical,
        }
        return tuple(f"loudspeaker.{name}" for name, value in given.items() if value is None)


def parameters_of(amplifier: Amplifier) -> Parameters:
    """Return the parameters of the sheet; resonance and electrical Q also from mass, compliance and force factor."""
    table = amplifier.loudspeaker
    resonance: Number = table.resonance
    electrical: Number = table.q_electrical
    mass, compliance, force = table.moving_mass, table.compliance, table.force_factor
    if resonance is None and mass is not None and compliance is not None:
        from safeamp.physics.driver import free_resonance

        resonance = free_resonance(moving_mass=mass, compliance=compliance)
    known: tuple[Number, ...] = (table.dc_resistance, force, mass, resonance)
    if electrical is None and all(value is not None for value in known):
        from safeamp.physics.driver import electrical_q

        electrical = electrical_q(
            dc_resistance=known[0], force_factor=known[1], moving_mass=known[2], resonance=known[3]
        )
    return Parameters(table.dc_resistance, resonance, table.q_mechanical, electrical, table.inductance)


def is_started(amplifier: Amplifier) -> bool:
    """Whether the sheet says anything of the driver as a circuit."""
    return any(getattr(amplifier.loudspeaker, name) is not None for name in STARTED)


def driver_of(amplifier: Amplifier) -> Driver | None:
    """Return one driver, None when the sheet says too little."""
    found = parameters_of(amplifier)
    if found.missing():
        return None
    from safeamp.physics.driver import Driver, motional_elements

    parts = motional_elements(
        dc_resistance=found.coil,
        resonance=found.resonance,
        q_mechanical=found.q_mechanical,
        q_electrical=found.q_electrical,
    )
    return Driver(found.coil, parts, 0.0 if found.inductance is None else found.inductance)


def seen_driver(amplifier: Amplifier) -> Driver | None:
    """Return all drivers together as one side sees them, what stands in series left out; None without parameters."""
    one = driver_of(amplifier)
    halves = 0.5 if amplifier.stage.bridged else 1.0
    return None if one is None else one.scaled(operating.together(amplifier) * halves)


def in_series(amplifier: Amplifier) -> Number:
    """Return the resistance between one side and its drivers: series resistor and ESR, ohm."""
    resistor = amplifier.stage.series_resistor
    total: Number = 0.0 if resistor is None else resistor * (0.5 if amplifier.stage.bridged else 1.0)
    if operating.is_capacitor_coupled(amplifier) and amplifier.output_capacitor.esr is not None:
        total = total + amplifier.output_capacitor.esr
    return total


def any_signal_also(amplifier: Amplifier) -> tuple[Also, ...]:
    """Return the largest current of a sine and of any signal within the clipped peak, and its use of the limit."""
    amplifier = aside(amplifier)
    seen = seen_driver(amplifier)
    if seen is None:
        return ()
    coupled = operating.is_capacitor_coupled(amplifier)
    farads = needed(amplifier, "output_capacitor.capacitance")[0] if coupled else np.inf
    from safeamp.physics.any_signal import admittance_norm

    norm = admittance_norm(driver=seen, series_resistor=in_series(amplifier), capacitance=farads)
    found = [_of_side(amplifier, place, norm) for place in (0, 1)]
    return (
        Also("largest current of a sine", max(sine for sine, _, _ in found), CURRENT),
        Also("largest current of any signal", max(current for _, current, _ in found), CURRENT),
        Also("any signal, of the current limit", max(use for _, _, use in found), PERCENT),
    )


def _of_side(amplifier: Amplifier, place: int, norm: Number) -> tuple[float, float, float]:
    """Return current of a sine, current of any signal, and the use of the device's current limit."""
    side = operating.sides(amplifier)[place]
    ohms, lowest = operating.nominal_load(amplifier)[0], operating.minimum_load(amplifier)[0]
    current = operating.peak_into(amplifier, side.burst, side.loss, ohms) * norm
    sine = operating.peak_into(amplifier, side.burst, side.loss, lowest) / lowest
    each = current / operating.conducting(amplifier)
    use = each * (1.0 + operating.imbalance_at(amplifier, each)) / side.device.current
    return nominal(sine), nominal(current), nominal(use)


def travel_also(amplifier: Amplifier) -> tuple[Also, ...]:
    """Return the largest travel of the cone for a sine at clipping, from 20 Hz to twice the resonance."""
    amplifier = aside(amplifier)
    one, force = driver_of(amplifier), amplifier.loudspeaker.force_factor
    if one is None or force is None:
        return ()
    resonance = parameters_of(amplifier).resonance
    across = 2.0 if amplifier.stage.bridged else 1.0
    from safeamp.physics.driver import largest_excursion

    travel = largest_excursion(
        driver=one,
        force_factor=force,
        peak=operating.clipping_peak(amplifier) * across / needed(amplifier, "loudspeaker.series")[0],
        lowest=np.minimum(LOWEST, resonance),
        highest=2.0 * np.asarray(resonance),
    )
    return _travel(amplifier, "cone travel at clipping, sine from 20 Hz", travel)


def _travel(amplifier: Amplifier, at: str, travel: Number) -> tuple[Also, ...]:
    found = [Also(at, nominal(travel), LENGTH)]
    linear = amplifier.loudspeaker.linear_excursion
    if linear is not None:
        found.append(Also(f"{at}, of the linear excursion", nominal(travel / linear), PERCENT))
    return tuple(found)


def switch_on_travel(amplifier: Amplifier, static: Number) -> tuple[Also, ...]:
    """Return the travel of the cone while the output capacitor charges.

    With the driver's parameters its motion is followed; with force factor and compliance alone the peak voltage counts
    as if it stood (`static`, V across one loudspeaker).
    """
    amplifier = aside(amplifier)
    table, force = amplifier.loudspeaker, amplifier.loudspeaker.force_factor
    seen, at = seen_driver(amplifier), "cone displacement at switch-on"
    if force is None:
        return ()
    if seen is not None:
        rise, farads = needed(amplifier, "output_capacitor.rise_time", "output_capacitor.capacitance")
        from safeamp.physics.coupling import turn_on_displacement

        whole = turn_on_displacement(
            driver=seen,
            force_factor=nominal(force),
            capacitance=nominal(farads),
            midpoint=nominal(operating.midpoint(amplifier)),
            rise_time=nominal(rise),
            series_resistor=nominal(in_series(amplifier)),
        )
        return _travel(amplifier, at, whole / needed(amplifier, "loudspeaker.series")[0])
    if table.compliance is None or table.dc_resistance is None:
        return ()
    return _travel(amplifier, at, force * static / table.dc_resistance * table.compliance)
