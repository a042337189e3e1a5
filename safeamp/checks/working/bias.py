"""Idle current: reading, sharing, balance, drift."""

from __future__ import annotations

from safeamp.checks import operating
from safeamp.checks.bias import bench_idle, set_was_measured
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import many, resistors
from safeamp.checks.working.register import working
from safeamp.checks.working.warmth import mean_reading, readings
from safeamp.quantities import CURRENT, VOLTAGE, Number

NOT_READ = "nobody read it: readings.idle_upper, readings.idle_lower"


def warm(paper: Paper, *, settled: bool = False) -> str:
    """Write down the idle current read at the bench, as volts across one resistor where there is one.

    `settled`: one that was set and read cold does not count.
    """
    amplifier = paper.amplifier
    resistors(paper)
    bare = "stage.emitter_resistor" in amplifier.absent
    current = bench_idle(amplifier)
    if operating.read_idle(amplifier) is not None:
        volts = mean_reading(paper)
        if bare:
            return paper.put("I_idle", "idle current", f"{volts} / R_e", current, CURRENT)
        return _larger(paper, volts, settled=settled)
    if amplifier.stage.idle is None or current != current:
        return paper.taken("V_idle", "idle, read at the bench", None, VOLTAGE, NOT_READ)
    if amplifier.stage.idle_unit != "A":
        return paper.given("V_idle", "stage.idle", VOLTAGE, "V across one emitter resistor")
    paper.given("I_idle", "stage.idle", CURRENT, "current of each device")
    if bare:
        return "I_idle"
    return paper.put(
        "V_idle", "V across one emitter resistor", "I_idle * R_e", current * paper.value("R_e"), VOLTAGE
    )


def _larger(paper: Paper, volts: str, *, settled: bool) -> str:
    """Write down the larger of the mean reading and a measured `stage.idle`."""
    amplifier = paper.amplifier
    if not set_was_measured(amplifier) or (settled and amplifier.stage.idle_at == "cold"):
        return volts
    if amplifier.stage.idle_unit == "A":
        paper.given("I_set", "stage.idle", CURRENT, "current of each device")
        own, value = "I_set * R_e", paper.value("I_set") * paper.value("R_e")
    else:
        own = paper.given("V_set", "stage.idle", VOLTAGE, "V across one emitter resistor")
        value = paper.value(own)
    return paper.put(
        "V_idle", "the larger of both", f"max({volts}, {own})", max(paper.value(volts), value), VOLTAGE
    )


@working("bias.idle")
def write_idle(paper: Paper, value: Number) -> None:
    """The larger mean of the readings."""
    read = warm(paper)
    kind = CURRENT if read == "I_idle" else VOLTAGE
    if kind is VOLTAGE and paper.value("R_e") > 0.0:
        current = bench_idle(paper.amplifier)
        paper.put("I_each", "current of each device", f"{read} / R_e", current, CURRENT)
    paper.put("x", "held against the limit", read, value, kind)


def _groups(paper: Paper) -> list[list[str]]:
    found = [readings(paper, side) for side in ("upper", "lower")]
    if not all(found):
        paper.taken("V_missing", "readings of both sides", None, VOLTAGE, NOT_READ)
        return []
    return found


@working("bias.imbalance")
def write_imbalance(paper: Paper, value: Number) -> None:
    """Largest departure from the mean of a group."""
    departures = []
    for side, group in zip(("upper", "lower"), _groups(paper), strict=False):
        read = getattr(paper.amplifier.readings, f"idle_{side}")
        mean = paper.put(
            f"V_{side}_mean", f"mean of the {side} side", f"({' + '.join(group)}) / {len(group)}",
            sum(read) / len(read), VOLTAGE,
        )  # fmt: skip
        departures += [f"abs({one} / {mean} - 1)" for one in group]
    if departures:
        paper.put("e", "largest departure of one device from its group", many(departures, "max"), value)


@working("bias.balance")
def write_balance(paper: Paper, value: Number) -> None:
    """Difference of the sums over their mean."""
    groups = _groups(paper)
    for side, group in zip(("upper", "lower"), groups, strict=False):
        total = sum(getattr(paper.amplifier.readings, f"idle_{side}"))
        paper.put(f"S_{side}", f"sum of the {side} side", " + ".join(group), total, VOLTAGE)
    if groups:
        formula = "abs(S_upper - S_lower) / ((S_upper + S_lower) / 2)"
        paper.put("d", "difference of the sums over their mean", formula, value)


@working("bias.drift")
def write_drift(paper: Paper, value: Number) -> None:
    """Warm over cold."""
    paper.given("V_cold", "readings.idle_cold", VOLTAGE, "V across one resistor just after switch-on")
    paper.put("r", "warm reading over cold reading", f"{warm(paper, settled=True)} / V_cold", value)
