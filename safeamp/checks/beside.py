"""Numbers shown beside a finding: worked out at the nominal amplifier, over the corners it would be for nothing."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, cast

from safeamp.amplifier import Amplifier, with_values
from safeamp.checks import operating
from safeamp.checks.words import nominal
from safeamp.findings import Also
from safeamp.quantities import Kind, Number

ONE_OPEN = "with one device of each side open"


def plain(amplifier: Amplifier) -> Amplifier | None:
    """Return the amplifier behind a watched one, so that what is shown moves no corner; None over the corners."""
    if getattr(amplifier, "trace", None) is None:
        return None
    return cast(Amplifier, cast(Any, amplifier)._node)


def one_open_also(amplifier: Amplifier, value: Callable[[Amplifier], Number], kind: Kind) -> tuple[Also, ...]:
    """Return the value of a finding with one device less of each side; nothing with one pair.

    Nothing outside shows an open device: its neighbours carry its share.
    """
    whole = plain(amplifier)
    if whole is None:
        return ()
    count = nominal(operating.conducting(whole))
    if not count > 1.0:
        return ()
    less = with_values(whole, {"stage.pairs_conducting": count - 1.0})
    return (Also(ONE_OPEN, nominal(value(less)), kind),)
