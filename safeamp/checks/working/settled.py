"""The settled idle current in each condition: found by solving the loop, proved by putting it in."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating
from safeamp.checks import runaway as checks
from safeamp.checks.thermal import ONE_EIGHTH
from safeamp.checks.working.chain import air_of, end_of, sink, stage_heat
from safeamp.checks.working.paper import Paper
from safeamp.quantities import RATIO, TEMPERATURE_DIFFERENCE, VOLTAGE, Number

SOLVED = "by solving the loop to equilibrium; the two lines below it must agree"
LOST = "by solving the loop: no equilibrium within the junction's limit"


def settles(paper: Paper, side: str, loop: checks._Loop, current: str) -> None:
    """Write down the settled current in each condition with its proof."""
    amplifier, end = paper.amplifier, end_of(paper, side)
    warmer = paper.limits["bias.runaway"].extra["air_warmer_by"]
    idle = operating.idle_current(amplifier)
    ratios = checks._conditions(amplifier, loop, idle, warmer)
    _proved(paper, (f"_now{end}", "now"), loop, ratios["now"], "0")
    name = f"in air {warmer:.0f} K warmer"
    paper.taken("dT_air", "air so much warmer", warmer, TEMPERATURE_DIFFERENCE, "limit of bias.runaway")
    _proved(paper, (f"_warm{end}", name), loop, ratios[name], "dT_air")
    name = "on a heatsink at one eighth of power"
    rise = checks._rise_at_one_eighth(amplifier, loop, idle)
    hot = sink(paper, stage_heat(paper, ONE_EIGHTH))
    air_of(paper)
    formula = f"max({hot} - T_air - R_hs * {_volts(paper)} * {current}, 0)"
    paper.put(
        f"dT_music{end}",
        "heatsink above what the idle alone makes of it",
        formula,
        rise,
        TEMPERATURE_DIFFERENCE,
    )
    _proved(paper, (f"_music{end}", name), loop, ratios[name], f"dT_music{end}")


def _volts(paper: Paper) -> str:
    return "V_half" if paper.has("V_half") else "V_rail"


def _proved(paper: Paper, name: tuple[str, str], loop: checks._Loop, ratio: Number, rise: str) -> None:
    """Write down a settled ratio; then control voltage that it takes, and what the warmth gives."""
    (end, words), found = name, float(np.asarray(ratio).flat[0])
    said = f"settled over set idle current, {words}"
    paper.found(f"u{end}", said, ratio, RATIO, SOLVED if np.isfinite(found) else LOST)
    if not np.isfinite(found):
        return
    takes, value = _taken(paper, f"u{end}", loop), _value_taken(paper, found, loop)
    paper.put(f"V_takes{end}", "control voltage that this current takes", takes, value, VOLTAGE)
    formula, value = _given(paper, f"u{end}", loop, rise)
    paper.put(f"V_gives{end}", "control voltage that its warmth gives", formula, value, VOLTAGE)


def _taken(paper: Paper, ratio: str, loop: checks._Loop) -> str:
    resistor = f"R_e * I_idle * ({ratio} - 1)"
    if "mosfet" in str(loop.device.kind):
        parameter = next(name for name in ("K", "K_upper", "K_lower") if paper.has(name))
        return f"sqrt(2 * I_idle / {parameter}) * (sqrt({ratio}) - 1) + {resistor}"
    control = "V_T2" if loop.device.kind == "darlington" else "V_T"
    return f"{control} * ln({ratio}) + {resistor}"


def _value_taken(paper: Paper, ratio: float, loop: checks._Loop) -> float:
    current = paper.value("I_idle")
    resistor = paper.value("R_e") * current * (ratio - 1.0)
    if "mosfet" in str(loop.device.kind):
        overdrive = np.sqrt(2.0 * current / np.asarray(loop.device.transconductance_parameter))
        return float(np.asarray(overdrive * (np.sqrt(ratio) - 1.0)).flat[0]) + resistor
    return float(checks._thermal_voltage(loop) * np.log(ratio) + resistor)


def _given(paper: Paper, ratio: str, loop: checks._Loop, rise: str) -> tuple[str, float]:
    """Return what the warmth gives, with the heatsink settled or still as it was, whichever is larger."""
    end = ratio.rpartition("_")[2]
    end = f"_{end}" if end in ("upper", "lower") else ""
    warm = paper.amplifier.stage.idle_at == "warm"
    inner, whole = f"(R_jc{end} + c * R_cs)", f"(R_jc{end} + c * R_cs + s * R_hs)"
    drift, volts = f"D{end}", _volts(paper)
    set_part = f" - {whole} * {volts} * I_idle" if warm else ""
    sign = -1.0 if warm else 0.0
    resistances = [
        paper.value(f"R_jc{end}") + paper.value("c") * paper.value("R_cs"),
        paper.value(f"R_jc{end}")
        + paper.value("c") * paper.value("R_cs")
        + paper.value("s") * paper.value("R_hs"),
    ]
    above = paper.value("s") * (0.0 if rise == "0" else paper.value(rise))
    power = paper.value(volts) * paper.value("I_idle")
    values = [
        paper.value(drift) * (above + resistance * power * paper.value(ratio) + sign * resistances[1] * power)
        for resistance in resistances
    ]
    aim = _value_taken(paper, paper.value(ratio), loop)
    settled = abs(values[1] - aim) <= abs(values[0] - aim)
    chain = whole if settled else inner
    lead = "" if rise == "0" else f"s * {rise} + "
    formula = f"{drift} * ({lead}{chain} * {volts} * I_idle * {ratio}{set_part})"
    return formula, values[1] if settled else values[0]
