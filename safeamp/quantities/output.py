"""An SI float as text: the prefix chosen after rounding, no exponents, no noise of zeros."""

import math
from decimal import ROUND_HALF_UP, Context, Decimal
from functools import lru_cache

from safeamp.quantities.nouns import Kind, Reading
from safeamp.quantities.units import scale

_FULL = 9  # digits of a value in full
_SHORT = 5  # longest percentage, in characters, that is not better said in the unit


def show(value: float | None, kind: Kind, digits: int = 3) -> str:
    """Return a value as people write it.

    Parameters
    ----------
    value : float or None
        In the unit of `kind`.
    kind : Kind
        The kind of quantity.
    digits : int
        Significant digits, 1 to 15.

    Returns
    -------
    str
        ``'2.1 mV'``, ``'2200 µF'``; ``'unbounded'`` when infinite, ``'unknown'`` when nan or None.

    Raises
    ------
    ValueError
        If `digits` is outside its range.
    """
    if not 1 <= digits <= 15:
        raise ValueError(f"digits must be 1 to 15, not {digits}")
    if value is None or math.isnan(value):
        return "unknown"
    if math.isinf(value):
        return "unbounded"
    return _shown(float(value), kind, digits)


@lru_cache(maxsize=1024)  # a report says the same few hundred numbers again and again
def _shown(value: float, kind: Kind, digits: int) -> str:
    exact = Decimal(repr(value))
    symbol, unit = _printing_unit(_round(exact, digits), kind)
    return f"{_plain(_round(_in_unit(exact, unit, kind), digits))} {symbol}".strip()


def _round(number: Decimal, digits: int) -> Decimal:
    return Context(prec=digits, rounding=ROUND_HALF_UP).plus(number)


def _in_unit(value: Decimal, unit: str, kind: Kind) -> Decimal:
    factor, offset = scale(unit, kind.base)
    return (value - offset) / factor


def _printing_unit(rounded: Decimal, kind: Kind) -> tuple[str, str]:
    if rounded == 0:
        units = [(symbol, unit) for symbol, unit, _ in kind.shown]
        return next((pair for pair in units if pair[1] == kind.base), units[-1])
    return [(symbol, unit) for symbol, unit, least in kind.shown if abs(rounded) >= Decimal(repr(least))][-1]


def _plain(number: Decimal) -> str:
    if number == 0:
        return "0"
    if not -6 <= number.adjusted() <= 9:
        return f"{number.normalize():e}".replace("e+", "e")
    text = f"{number:f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def show_reading(reading: Reading) -> str:
    """Return a reading in full: ``'34.8 V ±2 %, measured'``.

    The tolerance is printed as it stands between the bounds, whichever way it was written; without
    origins that nobody writes (stated, assumed) and a dropped sign the text reads as the same value.
    """
    sign = " (sign dropped)" if reading.sign_dropped else ""
    value = _with_tolerance(reading) if reading.toleranced else show(reading.nominal, reading.kind, _FULL)
    return f"{value}, {reading.origin.value}{sign}"


def _with_tolerance(reading: Reading) -> str:
    kind = reading.kind
    nominal, low, high = (Decimal(repr(end)) for end in (reading.nominal, reading.low, reading.high))
    symbol, unit = _printing_unit(_round(nominal, _FULL), kind)
    if kind.difference == {}:
        ends = "..".join(_plain(_round(_in_unit(end, unit, kind), _FULL)) for end in (low, high))
        return f"{ends} {symbol}"
    head = show(reading.nominal, kind, _FULL)
    if kind.percent_tolerance and nominal:
        below, above = sorted(100 * (end - nominal) / nominal for end in (low, high))
        if max(len(_plain(_round(abs(part), _FULL))) for part in (below, above)) <= _SHORT:
            return f"{head} {_sides(below, above)} %"
    factor = scale(unit, kind.base)[0]
    symbol = next(iter(kind.difference)) if kind.difference else symbol
    return f"{head} {_sides((low - nominal) / factor, (high - nominal) / factor)} {symbol}".strip()


def _sides(below: Decimal, above: Decimal) -> str:
    minus, plus = (_plain(_round(abs(part), _FULL)) for part in (below, above))
    if minus == plus:
        return f"±{plus}"
    return f"-{minus}/+{plus}"
