"""From what was written to nominal, low and high in the unit of the kind."""

from decimal import Decimal

from safeamp.quantities.grammar import Written
from safeamp.quantities.nouns import Kind, Origin, QuantityError
from safeamp.quantities.text import quote
from safeamp.quantities.units import difference_to_base, to_base

GUESS_SHARE = Decimal("0.25")
"""Half width of a guess without a tolerance, as a share of the value (common practice)."""

Bounds = tuple[Decimal, Decimal, Decimal]


def bounds(written: Written, kind: Kind) -> tuple[Bounds, bool]:
    """Return nominal, low and high, and whether the last two were written or widened.

    Raises
    ------
    QuantityError
        If the tolerance does not fit the kind or the value.
    """
    nominal = to_base(written.number, kind.spellings[written.unit], kind)
    if written.low is not None and written.high is not None:
        low, high = (to_base(end, kind.spellings[written.unit], kind) for end in (written.low, written.high))
        return (nominal, low, high), True
    if written.minus is not None and written.plus is not None:
        return _toleranced(nominal, written, written.minus, written.plus, kind), True
    if written.origin is Origin.GUESS:
        return _widened(nominal, written, kind), True
    return (nominal, nominal, nominal), False


def _toleranced(nominal: Decimal, written: Written, minus: Decimal, plus: Decimal, kind: Kind) -> Bounds:
    unit = written.tolerance_unit
    if unit == "%" and kind.percent_tolerance:
        if nominal == 0:
            raise QuantityError(
                f"{quote(written.text)} is a percentage of zero", f"write the tolerance in {kind.unit}"
            )
        low, high = sorted((nominal * (1 + minus / 100), nominal * (1 + plus / 100)))
        return nominal, low, high
    units = kind.spellings if kind.difference is None else kind.difference
    if unit not in units:
        raise _wrong_unit(written, unit, kind)
    below, above = (difference_to_base(number, units[unit], kind) for number in (minus, plus))
    return nominal, nominal + below, nominal + above


def _wrong_unit(written: Written, unit: str, kind: Kind) -> QuantityError:
    found = f"{quote(written.text)} has a tolerance {f'in {unit}' if unit else 'without unit'}"
    if kind.difference == {}:
        return QuantityError(found, 'write a range with two dots instead, such as "70..90 %"')
    allowed = [
        *(["%"] if kind.percent_tolerance else []),
        *(kind.spellings if kind.difference is None else kind.difference),
    ]
    return QuantityError(
        found, f"write the tolerance of {kind.article} in {' or '.join(filter(None, allowed))}"
    )


def _widened(nominal: Decimal, written: Written, kind: Kind) -> Bounds:
    half = abs(nominal) * GUESS_SHARE if kind.guess is None else Decimal(repr(kind.guess))
    if half == 0:
        raise QuantityError(
            f"{quote(written.text)} guesses zero, which no share of it can widen",
            f"write how far off it may be, as a tolerance in {kind.unit}",
        )
    return nominal, nominal - half, nominal + half
