"""Questions about mains and rails: readings that contradict one another, or that no sound supply has."""

from __future__ import annotations

from collections.abc import Callable

from safeamp.amplifier.rails import deepest_sag, is_too_deep, rail_pairs
from safeamp.quantities import PERCENT, VOLTAGE, Origin, show
from safeamp.reading.draft import Draft


def ask_supply(draft: Draft) -> None:
    """Complain of mains and rails that contradict one another."""
    for question in SUPPLY_QUESTIONS:
        question(draft)


def _mains(draft: Draft) -> None:
    highest, actual = draft.number("mains.highest"), draft.number("mains.actual")
    if highest is not None and actual is not None and highest < actual:
        text = f"{show(highest, VOLTAGE)} is below mains.actual, {show(actual, VOLTAGE)}"
        draft.complain(
            "mains.highest", f"{text}; write the highest mains that may come, or leave the key out"
        )


def _rails(draft: Draft) -> None:
    most = 1 if draft.word("supply.rails") == "single" else 2
    for name in ("no_load", "full_load"):
        rails = draft.numbers(f"supply.{name}")
        if len(rails) > most and draft.word("supply.rails"):
            has = "a single supply has one rail" if most == 1 else "a split supply has two rails"
            draft.complain(f"supply.{name}", f"{len(rails)} values are given; {has}: write {most} at most")


def _sag(draft: Draft) -> None:
    for free, under in rail_pairs(draft.numbers("supply.no_load"), draft.numbers("supply.full_load")):
        if under > free:
            text = f"{show(under, VOLTAGE)} is above no_load, {show(free, VOLTAGE)}"
            draft.complain("supply.full_load", f"{text}; a rail falls under load: read both again")
            return


def _deep_sag(draft: Draft) -> None:
    """Ask of a rail that falls by nearly half unless it was measured: the findings then say so themselves."""
    loaded = draft.numbers("supply.full_load")
    deepest = deepest_sag(draft.numbers("supply.no_load"), loaded)
    if draft.word("supply.source") != "mains" or deepest is None or not is_too_deep(*deepest):
        return
    if all(draft.origins[f"supply.full_load.{place}"] is Origin.MEASURED for place in range(len(loaded))):
        return
    free, under = deepest
    text = f"{show(under, VOLTAGE)} is {show(under / free, PERCENT)} of no_load, {show(free, VOLTAGE)}"
    ask = "is it the rail under load, at the same mains, off the limiter?"
    draft.complain("supply.full_load", f'{text}: {ask} if it was read so, add ", measured"')


#: Asked in this order; each looks at what is there and is silent about what is missing.
SUPPLY_QUESTIONS: tuple[Callable[[Draft], None], ...] = (_mains, _rails, _sag, _deep_sag)
