"""The load into which the safe area is used most: nominal, minimum, behind the output capacitor, a point of a curve."""

from __future__ import annotations

import numpy as np

from safeamp.checks import curve, operating, thermal
from safeamp.checks import safe_area as checks
from safeamp.checks.working.load import counts, load
from safeamp.checks.working.paper import Paper
from safeamp.quantities import ANGLE, CAPACITANCE, FREQUENCY, RESISTANCE, Number

CURVE = "in loudspeaker.impedance_curve"


def load_of(paper: Paper, worst: checks.Worst) -> tuple[str, str]:
    """Write down magnitude and angle of the worst load of one side; return both symbols."""
    if not np.isnan(worst.frequency):
        return _of_curve(paper, worst)
    nominal = _own_angle(paper, worst)
    for angle, lowest in ((nominal, False), (checks.MINIMUM_ANGLE, True)):
        seen = operating.minimum_load if lowest else operating.nominal_load
        magnitude, turned = seen(paper.amplifier, angle)
        if _same(worst, magnitude, turned):
            return load(paper, angle, lowest=lowest)
        for most in checks.LOW_NOTE_ANGLES if operating.is_capacitor_coupled(paper.amplifier) else ():
            behind = operating.behind_capacitor(paper.amplifier, magnitude, turned, most)
            if _same(worst, *behind):
                return _behind(paper, load(paper, angle, lowest=lowest), most, worst)
    return _unknown(paper, worst)


def _own_angle(paper: Paper, worst: checks.Worst) -> float:
    """Return the angle of the nominal load: none of a resistor, else that of the loudspeaker."""
    for angle in (0.0, float(np.asarray(operating.phase_angle(paper.amplifier)).flat[0])):
        if worst.load.name.startswith("a resistor") or angle:
            return angle
    return 0.0


def _same(worst: checks.Worst, magnitude: Number, angle: Number) -> bool:
    return bool(
        np.isclose(worst.load.magnitude, magnitude, rtol=1e-12)
        and np.isclose(worst.load.angle, angle, rtol=1e-12)
    )


def _unknown(paper: Paper, worst: checks.Worst) -> tuple[str, str]:
    paper.taken("Z", worst.load.name, worst.load.magnitude, RESISTANCE, "")
    return "Z", paper.taken("phi", "its angle", worst.load.angle, ANGLE, "")


def _behind(paper: Paper, seen: tuple[str, str], most: float, worst: checks.Worst) -> tuple[str, str]:
    """Write down a load behind the output capacitor, at the low note that turns it to an angle."""
    magnitude, turn = seen
    paper.given("C", "output_capacitor.capacitance", CAPACITANCE, "output capacitor")
    paper.given("f_low", "loudspeaker.lowest_note", FREQUENCY)
    esr = _esr(paper)
    angle = np.deg2rad(paper.value(turn))
    real = paper.value(magnitude) * np.cos(angle) + (paper.value("R_esr") if esr else 0.0)
    own = paper.value(magnitude) * np.sin(angle)
    paper.put("R_real", "real part of the load", f"{magnitude} * cos({turn}){esr}", real, RESISTANCE)
    paper.put("X_own", "reactance of the loudspeaker", f"{magnitude} * sin({turn})", own, RESISTANCE)
    reactance = 1.0 / (2.0 * np.pi * paper.value("f_low") * paper.value("C"))
    paper.put(
        "X_C",
        "reactance of the capacitor at the lowest note",
        "1 / (2 * pi * f_low * C)",
        reactance,
        RESISTANCE,
    )
    words = "least reactance of both, on the inductive side of the loudspeaker"
    paper.put("X_least", words, "max(X_own - X_C, 0)", np.maximum(own - reactance, 0.0), RESISTANCE)
    paper.put("X_most", "largest, on its capacitive side", "X_own + X_C", own + reactance, RESISTANCE)
    turned = np.tan(np.deg2rad(worst.load.angle))
    asked = min(most, 89.9)
    formula = f"min(max(tan({asked:g}), X_least / R_real), X_most / R_real)"
    words = f"tangent of the angle at a low note, {asked:g} deg where the notes reach it"
    paper.put("t", words, formula, turned)
    name = paper.put("Z_low", "load at that note", "R_real * sqrt(1 + t^2)", worst.load.magnitude, RESISTANCE)
    return name, paper.put("phi_low", "its angle", "atan(t)", worst.load.angle, ANGLE)


def _esr(paper: Paper) -> str:
    if paper.amplifier.output_capacitor.esr is None:
        return ""
    return f" + {paper.given('R_esr', 'output_capacitor.esr', RESISTANCE)}"


def heating(paper: Paper) -> tuple[str, str]:
    """Write down the point of the curve that heats most, as one side sees it; return both symbols."""
    points = curve.points_of(paper.amplifier)
    if points is None:
        raise ValueError("there is no impedance curve")
    magnitude, angle = curve.heating_load(paper.amplifier, points, thermal.ONE_EIGHTH)
    how = f"{CURVE}: the point that heats most, not below the nominal load, as one side sees it"
    name = paper.found("Z_heat", "load that heats most", magnitude, RESISTANCE, how)
    return name, paper.found("phi_heat", "its angle", angle, ANGLE, how)


def _of_curve(paper: Paper, worst: checks.Worst) -> tuple[str, str]:
    """Write down the worst point of a curve as one side sees it."""
    amplifier, points = paper.amplifier, curve.points_of(paper.amplifier)
    if points is None:
        raise ValueError("there is no impedance curve")
    place = int(np.argmin(np.abs(points.frequency - worst.frequency)))
    paper.taken("f_point", "frequency of the worst point", points.frequency[place], FREQUENCY, CURVE)
    paper.taken("Z_point", "impedance there", points.impedance[place], RESISTANCE, CURVE)
    paper.taken("phi_point", "angle there", points.angle[place], ANGLE, CURVE)
    counts(paper)
    whole, halves = "(Z_point * n_series / n_parallel)", " / 2" if amplifier.stage.bridged else ""
    resistor = ""
    if amplifier.stage.series_resistor is not None:
        resistor = f" + {paper.given('R_series', 'stage.series_resistor', RESISTANCE)}"
    real, imaginary = f"({whole} * cos(phi_point){resistor}){halves}", f"{whole} * sin(phi_point){halves}"
    if operating.is_capacitor_coupled(amplifier):
        paper.given("C", "output_capacitor.capacitance", CAPACITANCE, "output capacitor")
        real, imaginary = f"{real}{_esr(paper)}", f"{imaginary} - 1 / (2 * pi * f_point * C)"
    turn = np.deg2rad(np.asarray(worst.load.angle))
    paper.put(
        "R_real", "real part of the load of one side", real, worst.load.magnitude * np.cos(turn), RESISTANCE
    )
    paper.put("X_seen", "its reactance", imaginary, worst.load.magnitude * np.sin(turn), RESISTANCE)
    name = paper.put(
        "Z_seen", "load of one side", "sqrt(R_real^2 + X_seen^2)", worst.load.magnitude, RESISTANCE
    )
    words = "its angle; the sign does not matter"
    return name, paper.put("phi_seen", words, "abs(atan(X_seen / R_real))", abs(worst.load.angle), ANGLE)
