"""The whole card: cold checks first, then limiter, expected readings, switch-off readings, sick patterns."""

from __future__ import annotations

from collections.abc import Iterator

from safeamp.amplifier import Assumption, Limiter, Sheet, written_key
from safeamp.answers.power_up import PowerUp, State
from safeamp.findings import Step
from safeamp.limits import Limits
from safeamp.quantities import show
from safeamp.studies.power_up.bench import bench_states
from safeamp.studies.power_up.choice import chosen
from safeamp.studies.power_up.levels import switch_off, told_apart
from safeamp.studies.power_up.patterns import patterns
from safeamp.studies.power_up.states import LOOK, Desk, states_of, unknown_states
from safeamp.studies.power_up.steps import CAUTIONS, Timing, afterwards, steps
from safeamp.studies.verdict import verdict

#: Defaults of the card itself; those of a bench supply and of a lamp among them.
OWN = ("other_draw", "channels", "apparent", "idle_exponent", "cold_ratio", "dark_up_to", "dim_up_to")
OF_BENCH = ("rails_draw", "bench_limit")
NO_LIMITER = Limiter("", None, "limiter")


def power_up(sheet: Sheet, limits: Limits) -> PowerUp:
    """Return the card for the first power-up.

    Parameters
    ----------
    sheet : Sheet
        As read; `readings.limiter` names the limiter, else one is recommended.
    limits : Limits
        What the cold checks are judged by, and where the switch-off readings stand.
    """
    report = verdict(sheet, limits, up_to=Step.COLD_CHECKS)
    desk = Desk(sheet, limits, NO_LIMITER)
    series, limiter = chosen(desk)
    desk.limiter = limiter or NO_LIMITER
    states = _states(desk, limiter, series.why)
    timing = Timing.of(desk) if limiter else None
    goes_on = report.verdict.clears and timing is not None
    return PowerUp(
        title=report.title,
        verdict=report.verdict,
        cold=tuple(one for one in report.findings if one.step is Step.COLD_CHECKS),
        limiter=series,
        states=states,
        switch_off=tuple(switch_off(desk, states)),
        patterns=tuple(patterns(desk, states)),
        cautions=CAUTIONS,
        steps=tuple(steps(desk, states, timing)) if goes_on and timing else (),
        afterwards=tuple(afterwards(desk, limits)) if goes_on else (),
        assumptions=tuple(_assumptions(desk)),
        remarks=tuple(_remarks(sheet, states)),
        overridden=report.overridden,
        source=report.source,
        digest=report.digest,
    )


def _states(desk: Desk, limiter: Limiter | None, why: tuple[str, ...]) -> tuple[State, ...]:
    if limiter is None:
        return unknown_states(desk, why)
    return bench_states(desk) if limiter.kind == "bench" else states_of(desk)


def _assumptions(desk: Desk) -> Iterator[Assumption]:
    """Yield what the numbers rest on: defaults of the sheet that were read, and those of the card."""
    read = {written_key(path) for path in desk.reads}
    yield from (one for one in desk.sheet.assumptions if one.key in read)
    for name in OF_BENCH if desk.limiter.kind == "bench" else OWN:
        one = desk.limits.default(f"power_up.{name}")
        ends = (
            "" if one.low == one.high else f", from {show(one.low, one.kind)} to {show(one.high, one.kind)}"
        )
        yield Assumption(one.id, f"{show(one.nominal, one.kind)}{ends}", f"{one.says} Source: {one.source}.")


def _remarks(sheet: Sheet, states: tuple[State, ...]) -> Iterator[str]:
    if not told_apart(states):
        yield (
            "behind this limiter the volts across it cannot tell a healthy idle from a shorted stage: take a larger "
            "lamp or a smaller resistor, or begin with the idle current at its lowest"
        )
    if any(
        one.what == LOOK and "bright" in one.says
        for state in states
        if state.healthy
        for one in state.readings
    ):
        yield (
            "a healthy one may look bright behind this lamp where it draws the most that is assumed: begin with the "
            "idle current at its lowest, and set it on the full mains only"
        )
    readings = sheet.amplifier.readings
    given = (readings.limiter_state, readings.limiter_rails, readings.limiter_output)
    if any(one is not None for one in given):
        yield "the sheet holds readings taken on the limiter: `safeamp check` judges them"
    yield from sheet.remarks
