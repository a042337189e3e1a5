"""From the heat of the stage to heatsink, case and junction of the hottest device."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating, thermal
from safeamp.checks.thermal import Dissipation
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.warmth import idle, loud, quiet
from safeamp.physics.stage import THERMAL_VOLTAGE
from safeamp.quantities import (
    PERCENT,
    POWER,
    RATIO,
    TEMPERATURE,
    TEMPERATURE_DIFFERENCE,
    THERMAL_RESISTANCE,
    VOLTAGE,
)

#: Spread of the control voltage in one batch, V, common practice.
SPREAD = 0.050
QUIET = "quiet"
Seen = tuple[str, str] | None
"""Symbols of magnitude and angle of a load in place of the nominal one."""


def name_of(paper: Paper, side: str) -> str:
    """Return the name of the device of a side."""
    return str(paper.amplifier.stage.upper if side == "upper" else paper.amplifier.stage.lower)


def end_of(paper: Paper, side: str) -> str:
    """Return what tells the symbols of a side apart; nothing where one device serves both sides."""
    same = paper.amplifier.stage.upper == paper.amplifier.stage.lower
    return "" if same else f"_{side}"


def stage_heat(
    paper: Paper, fraction: float | None, angle: float = 0.0, seen: Seen = None
) -> tuple[str, str, Dissipation]:
    """Write down the heat without signal (None) or at a level; return its symbol, its tag and the program's value."""
    if fraction is None:
        return quiet(paper), QUIET, thermal.no_signal(paper.amplifier)
    symbol = loud(paper, fraction, angle, seen)
    load = None if seen is None else (paper.value(seen[0]), paper.value(seen[1]))
    return symbol, symbol.removeprefix("P_"), thermal.at_level(paper.amplifier, fraction, angle, load)


def hottest(paper: Paper, heat: tuple[str, str, Dissipation]) -> str:
    """Write down the heat of the hottest device."""
    symbol, tag, dissipated = heat
    value = thermal.hottest_power(paper.amplifier, dissipated)
    excess = _imbalance(paper, tag, dissipated)
    more = f"(1 + {excess}) * " if excess else ""
    return paper.put(f"P_hot_{tag}", "heat of the hottest device", f"{more}{symbol} / (2 * n)", value, POWER)


def _imbalance(paper: Paper, tag: str, dissipated: Dissipation) -> str:
    """Write down the excess of the worst of parallel devices; nothing for a single one."""
    if not paper.value("n") > 1.0:
        return ""
    if paper.amplifier.stage.imbalance is not None:
        return paper.given("e", "stage.imbalance", PERCENT, "excess current of the worst of parallel devices")
    current = idle(paper) if tag == QUIET else f"I_mean_{tag}"
    return spread(
        paper, current, f"e_{tag}", operating.imbalance_at(paper.amplifier, dissipated.mean_current)
    )


def spread(paper: Paper, current: str, symbol: str, value: object) -> str:
    """Write down what the spread of a batch makes of parallel devices at a current."""
    words = "excess current of the worst of parallel devices"
    if paper.value("R_e") == 0.0:
        return paper.taken(symbol, words, 1.0, RATIO, "without emitter resistors twice the mean")
    paper.taken("V_spread", "spread of the control voltage in one batch", SPREAD, VOLTAGE, "common practice")
    thermal_voltage(paper)
    return paper.put(symbol, words, f"V_spread / (R_e * {current} + V_T)", value)


def thermal_voltage(paper: Paper) -> str:
    """Write down kT/q."""
    return paper.taken(
        "V_T", "thermal voltage kT/q at 25 degC", THERMAL_VOLTAGE, VOLTAGE, "constants of nature"
    )


def sink(paper: Paper, heat: tuple[str, str, Dissipation], air: str = "T_air") -> str:
    """Write down the heatsink temperature, in the air of the sheet or in another that stands on the paper."""
    symbol, tag, dissipated = heat
    air_of(paper)
    amplifier = paper.amplifier
    value = thermal.sink_temperature(amplifier, dissipated, air=None if air == "T_air" else paper.value(air))
    if amplifier.heatsink.each:
        source = hottest(paper, heat)
    else:
        shared = paper.given("n_shared", "heatsink.shared_by", RATIO, "stages on the whole heatsink")
        source = f"{shared} * {symbol}"
    paper.given("P_other", "heatsink.other_heat", POWER)
    words = f"heatsink at this heat ({tag.replace('_', ' ')})"
    end = "" if air == "T_air" else f"_{air.removeprefix('T_')}"
    if thermal.by_ruler(amplifier):
        rise = paper.found(
            f"dT_{tag}{end}", f"rise at which the fins shed {source} + P_other", value - paper.value(air),
            TEMPERATURE_DIFFERENCE, "by the balance of convection and radiation of fins by ruler",
        )  # fmt: skip
        return paper.put(f"T_sink_{tag}{end}", words, f"{air} + {rise}", value, TEMPERATURE)
    paper.given("R_sa", "heatsink.sink_to_air", THERMAL_RESISTANCE, "heatsink to air")
    formula = f"{air} + ({source} + P_other) * R_sa"
    return paper.put(f"T_sink_{tag}{end}", words, formula, value, TEMPERATURE)


def air_of(paper: Paper) -> str:
    """Write down the air at the heatsink."""
    return paper.given("T_air", "heatsink.air", TEMPERATURE, "air at the heatsink")


def case(paper: Paper, heat: tuple[str, str, Dissipation], side: str) -> str:
    """Write down the case temperature of the hottest device of a side."""
    tag, amplifier = heat[1], paper.amplifier
    if thermal.in_free_air(amplifier, operating.device_of(amplifier, side)):
        return air_of(paper)
    hot, below = hottest(paper, heat), sink(paper, heat)
    paper.given("R_cs", "heatsink.case_to_sink", THERMAL_RESISTANCE, "case to heatsink")
    value = thermal.temperatures(amplifier, heat[2], side).case
    return paper.put(
        f"T_case_{tag}", "case of the hottest device", f"{below} + {hot} * R_cs", value, TEMPERATURE
    )


def junction(paper: Paper, heat: tuple[str, str, Dissipation], side: str) -> str:
    """Write down the mean junction temperature of the hottest device of a side."""
    tag, amplifier = heat[1], paper.amplifier
    below, hot, end = case(paper, heat, side), hottest(paper, heat), end_of(paper, side)
    free = thermal.in_free_air(amplifier, operating.device_of(amplifier, side))
    path = f"device.{name_of(paper, side)}.{'junction_to_ambient' if free else 'junction_to_case'}"
    resistance = paper.given(
        f"R_ja{end}" if free else f"R_jc{end}",
        path,
        THERMAL_RESISTANCE,
        f"junction to {'air' if free else 'case'}",
    )
    value = thermal.temperatures(amplifier, heat[2], side).junction
    formula = f"{below} + {hot} * {resistance}"
    return paper.put(f"T_j_{tag}{end}", "junction of the hottest device", formula, value, TEMPERATURE)


def hotter_case(paper: Paper, side: str, fraction: float, angle: float = 0.0, seen: Seen = None) -> str:
    """Write down the case temperature at the hotter of no signal and a level."""
    cases = [case(paper, stage_heat(paper, level, angle, seen), side) for level in (None, fraction)]
    if cases[0] == cases[1]:
        return cases[0]
    value = np.max([paper.value(symbol) for symbol in cases])
    name = f"T_case{end_of(paper, side)}"
    return paper.put(name, "case, the hotter of both", f"max({', '.join(cases)})", value, TEMPERATURE)
