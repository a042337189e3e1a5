"""The loudspeaker: its label, its power, a rail on its coil."""

from __future__ import annotations

from typing import Any

import numpy as np

from safeamp.checks import loudspeaker as checks
from safeamp.checks import operating
from safeamp.checks.fault_also import fault_current
from safeamp.checks.programme import ROOM
from safeamp.checks.working.load import believed, counts, load
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import clipping, no_load
from safeamp.checks.working.register import working
from safeamp.quantities import CURRENT, PERCENT, POWER, RESISTANCE, TEMPERATURE, TIME, VOLTAGE, Number

GATES = "in the table of the slowest times of this fuse (IEC 60127-2)"
HEATING = "by following coil and magnet through time, copper's resistance rising"


@working("loudspeaker.label")
def write_label(paper: Paper, value: Number) -> None:
    """DC resistance over nominal impedance."""
    paper.given("R_dc", "loudspeaker.dc_resistance", RESISTANCE)
    paper.given("Z_label", "loudspeaker.nominal_impedance", RESISTANCE)
    paper.put("r", "DC resistance over nominal impedance", "R_dc / Z_label", value)


@working("loudspeaker.power")
def write_power(paper: Paper, value: Number) -> None:
    """Power at clipping of each loudspeaker over its rated noise power."""
    each = _each(paper)
    paper.given("P_rated", "loudspeaker.rated_power", POWER)
    paper.given("k_noise", "loudspeaker.power_share", PERCENT, "rated noise power over the power printed")
    paper.put("r", "power at clipping over rated noise power", f"{each} / (P_rated * k_noise)", value)


def _each(paper: Paper) -> str:
    """Write down the sine power at clipping of each loudspeaker, what a series resistor takes left out."""
    amplifier, clip, (magnitude, _) = paper.amplifier, clipping(paper), load(paper)
    counts(paper)
    both = "2 * " if amplifier.stage.bridged else ""
    formula = f"{both}{clip}^2 / (2 * {magnitude}) / n_parallel / n_series"
    if amplifier.stage.series_resistor is not None:
        whole = f"{believed(paper)} * n_series / n_parallel"
        formula = f"{formula} * {whole} / ({whole} + R_series)"
    value = operating.loudspeaker_power(amplifier)
    return paper.put("P_each", "sine power at clipping of each loudspeaker", formula, value, POWER)


@working("loudspeaker.dc_fault")
def write_fault(paper: Paper, value: Number) -> None:
    """What stops a rail on the coil in what time, then the power in the coil."""
    amplifier, fault = paper.amplifier, checks.fault_of(paper.amplifier)
    rail = no_load(paper)
    counts(paper)
    both = "2 * " if amplifier.stage.bridged and not operating.is_single(amplifier) else ""
    paper.put("V_coil", f"on each coil, {fault.how}", f"{both}{rail} / n_series", fault.volts, VOLTAGE)
    paper.given("R_dc", "loudspeaker.dc_resistance", RESISTANCE)
    current = paper.value("V_coil") / paper.value("R_dc")
    paper.put("I_coil", "current in the cold coil", "V_coil / R_dc", current, CURRENT)
    held = operating.is_capacitor_coupled(amplifier) and bool(np.all(checks.capacitor_holds(amplifier)))
    if not held:
        _burns(paper, fault)
        _acts(paper, fault)
    paper.put("P", "power in the cold coil", "V_coil^2 / R_dc", value, POWER)


def _burns(paper: Paper, fault: Any) -> None:
    """Write down where the coil starts and when it reaches its limit."""
    table = paper.amplifier.loudspeaker
    paper.given("T_coil_limit", "loudspeaker.coil_limit", TEMPERATURE, "limit of the coil")
    if table.coil_to_magnet is not None and table.magnet_to_air is not None:
        each = _each(paper)
        paper.taken("T_room", "room", ROOM, TEMPERATURE, "common practice")
        paper.given("R_cm", "loudspeaker.coil_to_magnet", _thermal(), "coil to magnet")
        paper.given("R_ma", "loudspeaker.magnet_to_air", _thermal(), "magnet to air")
        start = checks.heating(paper.amplifier, fault)["start"]
        formula = f"T_room + {each} / 8 * (R_cm + R_ma)"
        if table.coil_limit is not None:
            formula = f"min({formula}, T_coil_limit)"
        paper.put("T_start", "coil at one eighth of clipping power", formula, start, TEMPERATURE)
    burns = checks.time_to_limit(paper.amplifier, fault)
    paper.found("t_limit", "the coil reaches its limit after", burns, TIME, HEATING)


def _thermal() -> Any:
    from safeamp.quantities import THERMAL_RESISTANCE

    return THERMAL_RESISTANCE


def _acts(paper: Paper, fault: Any) -> None:
    """Write down when relay and fuse act."""
    amplifier = paper.amplifier
    if "protection.trip_delay" not in amplifier.absent:
        paper.given("t_relay", "protection.trip_delay", TIME, "the relay has opened after")
    fuse = amplifier.protection.loudspeaker_fuse
    if fuse is None or amplifier.loudspeaker.coil_limit is None:
        return
    paper.taken(
        "I_fuse", f'rating of the fuse "{fuse.text}"', fuse.rating, CURRENT, "protection.loudspeaker_fuse"
    )
    hot = amplifier.loudspeaker.dc_resistance * (
        1.0 + checks.COPPER * (np.fmax(amplifier.loudspeaker.coil_limit, 20.0) - 20.0)
    )
    formula = f"R_dc * (1 + {checks.COPPER:g} * (max(T_coil_limit, 20) - 20))"
    paper.put("R_hot", "the coil at its limit: copper", formula, hot, RESISTANCE)
    formula = "V_coil / R_hot * n_parallel"
    if amplifier.stage.series_resistor is not None:
        paper.given("R_series", "stage.series_resistor", RESISTANCE)
        whole = "R_hot * n_series / n_parallel"
        formula = f"{formula} * {whole} / ({whole} + R_series)"
    times = fault_current(amplifier, fault.volts, hot) / fuse.rating
    formula = f"{formula} / I_fuse"
    paper.put("x", "current with hot coils over the rating of the fuse", formula, times)
    paper.found(
        "t_fuse", "the fuse has acted after", checks.fuse_time(amplifier, fault, paper.limits), TIME, GATES
    )
