"""What is read and held against a level as it is: cold checks, first power-up, oscillation, mains insulation."""

from __future__ import annotations

from safeamp.checks import operating
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import limiter_rails, many
from safeamp.checks.working.register import working
from safeamp.quantities import RATIO, RESISTANCE, VOLTAGE, Number


@working("cold.devices")
def write_devices(paper: Paper, value: Number) -> None:
    """The reading itself."""
    paper.given("R_lowest", "readings.device_ohms", RESISTANCE, "lowest reading across outputs and drivers")
    paper.put("R", "held against the limit as it is", "R_lowest", value, RESISTANCE)


@working("cold.insulation")
def write_insulation(paper: Paper, value: Number) -> None:
    """The reading itself."""
    paper.given("R_case", "readings.insulation", RESISTANCE, "case to heatsink")
    paper.put("R", "held against the limit as it is", "R_case", value, RESISTANCE)


@working("power_up.draw")
def write_draw(paper: Paper, value: Number) -> None:
    """The place of the limiter's state in the order of alarm."""
    state = paper.amplifier.readings.limiter_state
    why = "readings.limiter_state is not given" if state is None else f'readings.limiter_state is "{state}"'
    paper.taken(
        "s", "state of the limiter in the order of alarm: dark, dim, bright, rising", value, RATIO, why
    )


@working("power_up.rails")
def write_rails(paper: Paper, value: Number) -> None:
    """Difference of the rails over their mean."""
    rails = limiter_rails(paper)
    if not rails:
        paper.taken("V_limiter", "rails on the limiter", None, VOLTAGE, "readings.limiter_rails is not given")
        return
    one, other = rails[0], rails[-1]
    paper.put("d", "difference over mean", f"abs({one} - {other}) / (({one} + {other}) / 2)", value)


@working("power_up.output")
def write_output(paper: Paper, value: Number) -> None:
    """Magnitude of the reading; of a single rail its departure from half the rail."""
    paper.given("V_out", "readings.limiter_output", VOLTAGE, "output on the limiter")
    if not operating.is_single(paper.amplifier):
        paper.put("V", "magnitude of the reading", "abs(V_out)", value, VOLTAGE)
        return
    rails = limiter_rails(paper)
    if not rails:
        paper.taken("V_limiter", "rail on the limiter", None, VOLTAGE, "readings.limiter_rails is not given")
        return
    half = f"({many(rails, 'max')} / 2)"
    paper.put("d", "departure from half the rail, over half the rail", f"abs(V_out - {half}) / {half}", value)


@working("stability.output")
def write_stability(paper: Paper, value: Number) -> None:
    """The reading itself."""
    paper.given("V_ac", "readings.output_ac", VOLTAGE, "AC at the output without signal")
    paper.put("V", "held against the limit as it is: oscillation cannot be computed", "V_ac", value, VOLTAGE)


@working("touch.mains")
def write_mains(paper: Paper, value: Number) -> None:
    """The reading of the insulation; the earth is held against a limit of its own."""
    paper.given("R_mains", "readings.mains_insulation", RESISTANCE, "mains pins to metal")
    if "readings.earth_resistance" not in paper.amplifier.absent:
        paper.given("R_earth", "readings.earth_resistance", RESISTANCE, "protective earth pin to metal")
        limit = paper.limits["touch.mains.earth"]
        said = f"go up to {limit.go} ohm, stop above {limit.stop} ohm; both readings must hold"
        paper.taken("R_earth_stop", "the earth's own limit", _single(limit.stop), RESISTANCE, said)
    paper.put("R", "held against the limit as it is", "R_mains", value, RESISTANCE)


def _single(level: object) -> float | None:
    return float(level) if isinstance(level, (int, float)) else None
