"""A value written anew at another number: its unit, its tolerance and its origin stay the user's own."""

from __future__ import annotations

from decimal import Context, Decimal

from safeamp.quantities.grammar import Written, parse
from safeamp.quantities.nouns import Kind, Origin
from safeamp.quantities.units import scale

#: A float has no more digits than the first, a tolerance needs no more than the second.
_DIGITS, _TOLERANCE_DIGITS = Context(prec=17), Context(prec=12)


def rewrite(text: str, kind: Kind, value: float) -> str:
    """Return a text that says the same as `text`, but of another number.

    Parameters
    ----------
    text : str
        As a user wrote it, ``"34.8 V ±2 %, measured"``.
    kind : Kind
        What it is read as.
    value : float
        The new nominal value, in the unit of `kind`.

    Returns
    -------
    str
        A tolerance stays the share of the value that it was; that of a temperature, an angle or a level, where a
        share says nothing, stays as wide as it was. A sign that was written is written again.

    Raises
    ------
    QuantityError
        If `text` is not read.
    """
    written = parse(text, kind)
    factor, offset = scale(kind.spellings[written.unit], kind.base)
    number = (Decimal(repr(float(value))) - offset) / factor
    origin = "" if written.origin is Origin.STATED else f", {written.origin.value}"
    signed = text.lstrip()[:1] in ("+", "-", "\u2212")
    return f"{_body(written, kind, number, signed=signed)}{origin}"


def plain_text(kind: Kind, value: float) -> str:
    """Return a number in the first unit of its kind, without tolerance and origin."""
    return rewrite(f"1 {next(iter(kind.spellings))}", kind, value)


def _body(written: Written, kind: Kind, number: Decimal, *, signed: bool) -> str:
    share = _share(written, kind, number)
    unit = f" {written.unit}".rstrip()
    if written.low is not None and written.high is not None:
        half = (written.high - written.low) / 2 * share
        return f"{_plain(number - half)}..{_plain(number + half)}{unit}"
    sign = "+" if signed and number >= 0 else ""
    head = f"{sign}{_plain(number)}{unit}"
    if written.minus is None or written.plus is None:
        return head
    share = Decimal(1) if written.tolerance_unit == "%" else share
    minus, plus = (_plain(_TOLERANCE_DIGITS.plus(part * share)) for part in (written.minus, written.plus))
    sides = f"±{plus}" if minus == f"-{plus}" else f"{_signed(minus)}/{_signed(plus)}"
    return f"{head} {sides} {written.tolerance_unit}".rstrip()


def _share(written: Written, kind: Kind, number: Decimal) -> Decimal:
    """Return by how much a tolerance in units grows with the value."""
    of_zero = written.number == 0 or number == 0
    from_zero = kind.percent_tolerance or kind.difference == {}
    return abs(number / written.number) if from_zero and not of_zero else Decimal(1)


def _signed(number: str) -> str:
    return number if number.startswith("-") else f"+{number}"


def _plain(number: Decimal) -> str:
    text = f"{_DIGITS.plus(number):f}"
    return (text.rstrip("0").rstrip(".") if "." in text else text) if number else "0"
