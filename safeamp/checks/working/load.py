"""The load that one side sees: label or coil, several loudspeakers, a series resistor, the halves of a bridge."""

from __future__ import annotations

import numpy as np

from safeamp.checks import operating
from safeamp.checks.working.paper import Paper
from safeamp.quantities import ANGLE, PERCENT, RATIO, RESISTANCE, Number


def load(paper: Paper, angle: float = 0.0, *, lowest: bool = False) -> tuple[str, str]:
    """Write down magnitude and angle of the nominal load (or of the minimum) of one side; return both symbols."""
    one = minimum(paper) if lowest else believed(paper)
    amplifier = paper.amplifier
    seen = operating.minimum_load if lowest else operating.nominal_load
    magnitude, turned = seen(amplifier, angle)
    name, turn = "_min" if lowest else "", _angle(paper, angle)
    whole = _together(paper, one, name)
    if amplifier.stage.series_resistor is not None:
        return _in_series(paper, whole, turn, (magnitude, turned), f"{name}{_end(angle)}")
    formula = f"{whole} / 2" if amplifier.stage.bridged else whole
    words = "load of one side" + (": half of it, for a bridge" if amplifier.stage.bridged else "")
    return paper.put(f"Z{name}", words, formula, magnitude, RESISTANCE), turn


def _end(angle: float) -> str:
    return "" if angle == 0.0 else f"_{angle:g}".replace(".", "p").replace("-", "m")


def _angle(paper: Paper, angle: float) -> str:
    return paper.taken(
        f"phi{_end(angle)}", "angle of the load", angle, ANGLE, "at this angle it is looked at"
    )


def believed(paper: Paper) -> str:
    """Write down the impedance of one loudspeaker that is believed."""
    label = paper.given("Z_label", "loudspeaker.nominal_impedance", RESISTANCE)
    amplifier = paper.amplifier
    value = operating.believed_nominal(amplifier)
    if amplifier.loudspeaker.dc_resistance is None:
        return label
    paper.given("R_dc", "loudspeaker.dc_resistance", RESISTANCE)
    ratio = amplifier.loudspeaker.dc_resistance / amplifier.loudspeaker.nominal_impedance
    if not np.asarray(ratio).flat[0] < operating.LABEL_FLOOR:
        return label
    words = f"impedance by the coil: below {operating.LABEL_FLOOR:g} of the label that is not believed"
    return paper.put("Z_coil", words, f"R_dc / {operating.COIL_SHARE:g}", value, RESISTANCE)


def minimum(paper: Paper) -> str:
    """Write down the minimum impedance of one loudspeaker."""
    amplifier, nominal = paper.amplifier, believed(paper)
    value = operating.believed_minimum(amplifier)
    if amplifier.loudspeaker.minimum_impedance is None:
        paper.given("k_min", "loudspeaker.minimum_share", PERCENT, "minimum over nominal impedance")
        return paper.put("Z_least", "minimum impedance", f"k_min * {nominal}", value, RESISTANCE)
    given = paper.given("Z_printed", "loudspeaker.minimum_impedance", RESISTANCE)
    formula = f"min({given}, 0.8 * {nominal})" if nominal == "Z_coil" else given
    return paper.put("Z_least", "minimum impedance", formula, value, RESISTANCE)


def counts(paper: Paper) -> None:
    """Write down how many loudspeakers there are."""
    paper.given("n_parallel", "loudspeaker.parallel", RATIO)
    paper.given("n_series", "loudspeaker.series", RATIO)


def _together(paper: Paper, one: str, name: str) -> str:
    share = operating.together(paper.amplifier)
    if float(np.asarray(share).flat[0]) == 1.0:
        return one
    counts(paper)
    value = paper.value(one) * share
    words = "impedance of all loudspeakers together"
    return paper.put(f"Z_all{name}", words, f"{one} * n_series / n_parallel", value, RESISTANCE)


def _in_series(paper: Paper, whole: str, turn: str, seen: tuple[Number, Number], end: str) -> tuple[str, str]:
    """Write down a load with the series resistor, and half of it for a bridge."""
    paper.given("R_series", "stage.series_resistor", RESISTANCE)
    halves = " / 2" if paper.amplifier.stage.bridged else ""
    real, imaginary = f"({whole} * cos({turn}) + R_series)", f"({whole} * sin({turn}))"
    words = "load of one side with the series resistor" + (", half of it for a bridge" if halves else "")
    name = paper.put(f"Z{end}", words, f"sqrt({real}^2 + {imaginary}^2){halves}", seen[0], RESISTANCE)
    if turn == "phi":
        return name, turn
    formula = f"atan({imaginary} / {real})"
    return name, paper.put(f"phi_seen{end}", "angle with the series resistor", formula, seen[1], ANGLE)
