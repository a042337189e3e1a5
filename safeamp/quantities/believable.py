"""What no value may be (sign, impossible) and what is not believed without a question."""

import math
from decimal import Decimal

from safeamp.quantities.nouns import Kind, QuantityError, Sign
from safeamp.quantities.output import show
from safeamp.quantities.text import such_as
from safeamp.quantities.units import to_base

Range = tuple[float, float]
_STAY_POSSIBLE = "write a value with a tolerance or a range that stays possible"


def check_finite(name: str, values: tuple[float, ...], kind: Kind) -> None:
    """Raise QuantityError when a value is nan or without bound."""
    if not all(math.isfinite(value) for value in values):
        raise QuantityError(f"{name} is no finite number", such_as(kind))


def check_sign(name: str, reach: str, nominal: float, low: float, sign: Sign, kind: Kind) -> None:
    """Raise QuantityError when a sign is not allowed; `reach` names the value with its bounds."""
    if sign is Sign.ANY:
        return
    allowed = Sign.POSITIVE if sign is Sign.POSITIVE else Sign.NON_NEGATIVE
    if _too_low(nominal, sign):
        raise QuantityError(f"{name} is not {allowed.value}", f"write {kind.article} {allowed.value}")
    if _too_low(low, sign):
        raise QuantityError(
            f"{reach} reaches down to {show(low, kind)}, which is not {allowed.value}", _STAY_POSSIBLE
        )


def _too_low(value: float, sign: Sign) -> bool:
    return value <= 0 if sign is Sign.POSITIVE else value < 0


def check_possible(name: str, low: float, high: float, kind: Kind) -> None:
    """Raise QuantityError when the value or its tolerance passes what `kind` can be."""
    for end in (low, high):
        if not kind.possible[0] <= end <= kind.possible[1]:
            raise QuantityError(
                f"{name} reaches {show(end, kind)}, which is impossible for {kind.article}",
                _STAY_POSSIBLE,
            )


def check_believable(
    name: str, nominal: float, number: Decimal | None, kind: Kind, believable: Range | None
) -> None:
    """Raise QuantityError, with a question, when `nominal` is outside the believable range.

    Parameters
    ----------
    name : str
        The value as the message calls it.
    nominal : float
        In the unit of `kind`.
    number : Decimal or None
        As written; looked at in the other units of `kind` for a slip of the prefix.
    believable : (float, float) or None
        None: that of the kind, which zero always passes.
    """
    allowed = believable or kind.believable
    if _within(nominal, allowed) or (nominal == 0 and believable is None):
        return
    found = f"{name} is not believable here ({show(allowed[0], kind)} to {show(allowed[1], kind)})"
    meant = [] if number is None else _other_prefixes(number, kind, allowed)
    if meant:
        raise QuantityError(found, f"did you mean {' or '.join(meant)}?")
    raise QuantityError(found, f"write {kind.article} in that range")


def _within(value: float, allowed: Range) -> bool:
    return allowed[0] <= (abs(value) if allowed[0] >= 0 else value) <= allowed[1]


def _other_prefixes(number: Decimal, kind: Kind, allowed: Range) -> list[str]:
    values = dict.fromkeys(float(to_base(number, unit, kind)) for unit in kind.spellings.values())
    return [show(value, kind) for value in values if value and _within(value, allowed)]
