"""An SI float as text: the prefix chosen after rounding, no exponents, no noise of zeros."""

import math
from decimal import Context, Decimal

from safeamp.quantities.nouns import Kind, Reading
from safeamp.quantities.units import scale

_FULL = 9


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
    rounded = Context(prec=digits).create_decimal(Decimal(repr(float(value))))
    symbol, number = _in_unit(rounded, kind, digits)
    return f"{_plain(number)} {symbol}".strip()


def _in_unit(value: Decimal, kind: Kind, digits: int) -> tuple[str, Decimal]:
    symbol, unit = _printing_unit(value, kind)
    factor, offset = scale(unit, kind.base)
    return symbol, Context(prec=digits).divide(value - offset, factor)


def _printing_unit(value: Decimal, kind: Kind) -> tuple[str, str]:
    if value == 0:
        units = [(symbol, unit) for symbol, unit, _ in kind.shown]
        return next((pair for pair in units if pair[1] == kind.base), units[-1])
    return [(symbol, unit) for symbol, unit, least in kind.shown if abs(value) >= Decimal(repr(least))][-1]


def _plain(number: Decimal) -> str:
    if number == 0:
        return "0"
    if not -6 <= number.adjusted() <= 9:
        return f"{number.normalize():e}".replace("e+", "e")
    text = f"{number:f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def show_reading(reading: Reading) -> str:
    """Return a reading in full: ``'34.8 V ±2 %, measured'``.

    The tolerance is printed as it stands between the bounds, whichever way it was written.
    """
    sign = " (sign dropped)" if reading.sign_dropped else ""
    return f"{show(reading.nominal, reading.kind, _FULL)}{_tolerance(reading)}, {reading.origin.value}{sign}"


def _tolerance(reading: Reading) -> str:
    if not reading.toleranced:
        return ""
    kind = reading.kind
    nominal, low, high = (Decimal(repr(value)) for value in (reading.nominal, reading.low, reading.high))
    if kind.percent_tolerance and nominal:
        minus, plus = (_plain(_full(abs(end - nominal) / abs(nominal) * 100)) for end in (low, high))
        if max(len(minus), len(plus)) <= 5:
            return f" ±{plus} %" if minus == plus else f" -{minus}/+{plus} %"
    return f" ({show(reading.low, kind, _FULL)} to {show(reading.high, kind, _FULL)})"


def _full(number: Decimal) -> Decimal:
    return Context(prec=_FULL).plus(number)
