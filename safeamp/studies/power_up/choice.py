"""Which limiter to use: the one that the sheet names, else the smallest that still shows a healthy stage."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

from safeamp.amplifier import Limiter
from safeamp.answers.power_up import Choice, Extent, SeriesLimiter
from safeamp.checks import operating
from safeamp.physics.preferred import next_preferred
from safeamp.quantities import PERCENT, POWER, RESISTANCE, show
from safeamp.studies.power_up import draw
from safeamp.studies.power_up.extents import Extents
from safeamp.studies.power_up.limiters import looks
from safeamp.studies.power_up.states import Desk

BENCH = "bench supply with a current limit, in place of the amplifier's own supply"
OF_THE_MAINS = "it stands in series with the mains of an unregulated supply"
#: A resistor so small in ohms that its share of a healthy draw says nothing yet.
_TRIAL = 1.0


def chosen(desk: Desk) -> tuple[SeriesLimiter, Limiter | None]:
    """Return what is said of the limiter, and the limiter that numbers can be computed for."""
    named, amplifier = desk.sheet.amplifier.readings.limiter, desk.sheet.amplifier
    if operating.is_fixed(amplifier):
        return _fixed(named, str(amplifier.supply.source))
    if named is not None and named.kind == "bench":
        return _of(named, "bench", BENCH, ("named by readings.limiter",)), named
    choices = tuple(_choices(desk))
    if named is not None:
        why = ("named by readings.limiter", *_own(desk, named))
        return _of(named, named.kind, _label(named), why, choices), _labelled(named)
    return _recommended(desk, choices)


def _of(
    limiter: Limiter | None, kind: str, text: str, why: tuple[str, ...], choices: tuple[Choice, ...] = ()
) -> SeriesLimiter:
    return SeriesLimiter(kind=kind, text=text, recommended=limiter is None, why=why, choices=choices)


def _label(limiter: Limiter) -> str:
    """Return a limiter in words, however it was written."""
    kind = RESISTANCE if limiter.kind == "resistor" else POWER
    return f"{show(limiter.value, kind)} {limiter.kind}"


def _labelled(limiter: Limiter) -> Limiter:
    return Limiter(limiter.kind, limiter.value, _label(limiter))


def _fixed(named: Limiter | None, source: str) -> tuple[SeriesLimiter, Limiter | None]:
    said = f'supply.source is "{source}"'
    if named is None or named.kind == "bench":
        why = f"{said}: a lamp is no limiter for it, {OF_THE_MAINS}"
        return _of(named, "bench", BENCH, (why,)), Limiter("bench", None, "bench")
    why = f"{said}: what shows behind a {named.text} is not computed, {OF_THE_MAINS}; use a bench supply"
    return _of(named, "", named.text, (why,)), None


def _choices(desk: Desk) -> Iterator[Choice]:
    """Yield each usual lamp and a resistor; none where the mains is not known."""
    usual = desk.limits.series["series_lamps"].values
    lamps = [_labelled(Limiter("lamp", watts)) for watts in usual]
    resistor = _resistor(desk)
    for limiter in (*lamps, *([resistor] if resistor else [])):
        found = _draw(desk, limiter)
        if found.found:
            yield _choice(desk, limiter, found)


def _draw(desk: Desk, limiter: Limiter) -> Extents:
    """Return a healthy amplifier behind a limiter; at its lowest idle where none is known."""
    found = desk.extents(draw.healthy(limiter, desk.limits, idle=True))
    return found if found.found else desk.extents(draw.healthy(limiter, desk.limits, idle=False))


def _choice(desk: Desk, limiter: Limiter, found: Extents) -> Choice:
    most = desk.extents(draw.most(limiter, desk.limits)).found["most"].high
    lowest = desk.extents(draw.healthy(limiter, desk.limits, idle=False))
    return Choice(
        text=limiter.text,
        rails_left=found.found["left"],
        looks=_looks(desk, found),
        looks_at_lowest=_looks(desk, lowest),
        most_heat=most,
    )


def _looks(desk: Desk, found: Extents) -> str:
    share = found.found.get("share")
    return looks(share.low, share.high, desk.limits) if share else ""


def _resistor(desk: Desk) -> Limiter | None:
    """Return the next smaller preferred resistor at which a healthy idle keeps its share of the rails."""
    found = _draw(desk, Limiter("resistor", _TRIAL)).found
    if not found:
        return None
    keeps = desk.limits.default("power_up.rails_left").nominal
    # The draw is all but that of the whole mains: nothing is lost across so small a resistor.
    per_ohm = (1.0 - found["left"].nominal) / _TRIAL
    ohms = float(next_preferred((1.0 - keeps) / per_ohm, "E6", "down"))
    return _labelled(Limiter("resistor", ohms))


def _own(desk: Desk, limiter: Limiter) -> Iterator[str]:
    """Yield what is said of a limiter that the sheet names: how much of the rails it leaves, and how much heat."""
    found = _draw(desk, limiter)
    if not found.found:
        return
    choice = _choice(desk, limiter, found)
    keeps = desk.limits.default("power_up.rails_left").nominal
    yield f"it leaves {_left(choice.rails_left)} and lets a fault have up to {show(choice.most_heat, POWER)}"
    if choice.rails_left.nominal < keeps:
        yield f"it is small for this idle current: under {show(keeps, PERCENT)} of the rails are left"
    if limiter.kind == "resistor":
        yield _heat_of(desk, limiter)


def _heat_of(desk: Desk, limiter: Limiter) -> str:
    """Return what a resistor has to stand while a short lasts: the whole mains."""
    watts = 4.0 * desk.extents(draw.most(limiter, desk.limits)).found["most"].high
    return (
        f"into a short the resistor itself gets {show(watts, POWER)} until you switch off; it must stand that"
    )


def _left(extent: Extent) -> str:
    return f"{extent.text(PERCENT)} of the rails (about {show(extent.nominal, PERCENT, 2)})"


def _recommended(desk: Desk, choices: tuple[Choice, ...]) -> tuple[SeriesLimiter, Limiter | None]:
    keeps = desk.limits.default("power_up.rails_left")
    lamps = [
        (watts, one)
        for watts, one in zip(desk.limits.series["series_lamps"].values, choices, strict=False)
        if one.looks
    ]
    if not lamps:
        nothing = "none can be recommended: what the amplifier draws from the mains is not known"
        return _of(None, "", "not known", (nothing,)), None
    enough = [
        (watts, one)
        for watts, one in lamps
        if one.rails_left.nominal >= keeps.nominal and "bright" not in one.looks_at_lowest
    ]
    watts, best = enough[0] if enough else lamps[-1]
    marked = tuple(replace(one, recommended=one is best) for one in choices)
    why = tuple(_reasons(desk, best, enough=bool(enough)))
    return _of(None, "lamp", best.text, why, marked), Limiter("lamp", watts, best.text)


def _reasons(desk: Desk, best: Choice, *, enough: bool) -> Iterator[str]:
    keeps = show(desk.limits.default("power_up.rails_left").nominal, PERCENT)
    yield "recommended, because readings.limiter names none; a rule of this project"
    if enough:
        yield (
            f"it is the smallest usual lamp that leaves a healthy idle about {keeps} of the rails and is not bright "
            "behind a healthy one with the idle current at its lowest"
        )
    else:
        yield f"no usual lamp leaves a healthy idle {keeps} of the rails: begin with the idle current at its lowest"
    heat = show(best.most_heat, POWER)
    yield f"it leaves {_left(best.rails_left)} and lets a fault have up to {heat}; a larger one lets more through"
