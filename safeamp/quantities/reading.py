"""Values in, readings out: text of a user, floats and pint quantities of a program."""

from collections.abc import Mapping
from decimal import Decimal
from numbers import Real
from typing import Any

from safeamp.quantities.believable import Range, check_believable, check_finite, check_possible, check_sign
from safeamp.quantities.grammar import Written, parse
from safeamp.quantities.nouns import Kind, Origin, QuantityError, Reading, Sign
from safeamp.quantities.output import show
from safeamp.quantities.text import quote, such_as
from safeamp.quantities.tolerance import bounds
from safeamp.quantities.units import is_quantity, magnitude


def read(
    value: object,
    kind: Kind,
    *,
    sign: Sign | None = None,
    believable: Range | None = None,
    allow_si: bool = False,
) -> Reading:
    """Return what a text says, in the unit of its kind.

    Parameters
    ----------
    value : str, or a bare number for a ratio
        ``"34.8 V ±2 %, measured"``. With `allow_si` also a float in the unit of `kind`, or a pint quantity.
    kind : Kind
        What the place where it stands asks for.
    sign : Sign or None
        Which signs are allowed; None: what is usual for the kind (temperature, level, angle and
        temperature coefficient either, percentage zero or above, all others above zero).
    believable : (float, float) or None
        A narrower range for the nominal value, in the unit of `kind`; a lowest value of zero or above
        makes it a range of magnitudes.
    allow_si : bool
        For callers that are programs.

    Returns
    -------
    Reading

    Raises
    ------
    QuantityError
        If it is not read, not possible or not believable.
    """
    sign = sign or kind.sign
    if isinstance(value, str):
        return _read_text(value, kind, sign, believable)
    number = _bare_number(value, kind, allow_si)
    return _finish((number, number, number), show(number, kind), None, Origin.STATED, kind, sign, believable)


def _bare_number(value: object, kind: Kind, allow_si: bool) -> float:
    if allow_si and is_quantity(value):
        return magnitude(value, kind)
    if isinstance(value, bool) or not isinstance(value, Real):
        raise QuantityError(f"{_named(value)} is not {kind.article}", _in_quotes(kind))
    if not (allow_si or "" in kind.spellings):
        raise QuantityError(f"{value} has no unit", _in_quotes(kind))
    try:
        return float(value)
    except OverflowError as error:
        raise QuantityError("the number is beyond all use", such_as(kind)) from error


def _named(value: object) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, (list, tuple)):
        return "a list"
    return "a table" if isinstance(value, Mapping) else "nothing" if value is None else "what stands here"


def _in_quotes(kind: Kind) -> str:
    if "" in kind.spellings:
        return f"write a bare number, such as {kind.example}"
    return f'write {kind.article} in quotes, such as "{kind.example}"'


def _read_text(text: str, kind: Kind, sign: Sign, believable: Range | None) -> Reading:
    written = parse(text, kind)
    decimals, toleranced = bounds(written, kind)
    nominal, low, high = (float(value) for value in decimals)
    if written.number and not nominal and not decimals[0].is_zero():
        raise QuantityError(f"{quote(text)} is nearer to zero than any number here", such_as(kind))
    number = abs(written.number) if sign is Sign.MAGNITUDE else written.number
    ends = (nominal, low, high)
    return _finish(ends, quote(text), number, written.origin, kind, sign, believable, toleranced, written)


def _finish(
    ends: tuple[float, float, float],
    name: str,
    number: Decimal | None,
    origin: Origin,
    kind: Kind,
    sign: Sign,
    believable: Range | None,
    toleranced: bool = False,
    written: Written | None = None,
) -> Reading:
    check_finite(name, ends, kind)
    dropped = sign is Sign.MAGNITUDE and ends[0] < 0
    nominal, low, high = (-ends[0], -ends[2], -ends[1]) if dropped else ends
    check_sign(name, nominal, low, sign, kind)
    check_possible(name, low, high, kind)
    check_believable(name, nominal, number, kind, believable)
    text = written.text if written else name
    return Reading(nominal, low, high, origin, toleranced, kind, text, dropped)


def read_any(
    value: object,
    kinds: tuple[Kind, ...],
    *,
    sign: Sign | None = None,
    believable: Mapping[str, Range] | None = None,
    allow_si: bool = False,
) -> Reading:
    """Return a reading of the first of `kinds` whose unit stands in the text.

    Parameters
    ----------
    value : str or pint.Quantity
        A bare float is refused: nothing tells its kind.
    kinds : tuple of Kind
        At least one.
    sign, allow_si
        As for `read`.
    believable : Mapping[str, (float, float)] or None
        Name of a kind -> narrower range.

    Raises
    ------
    QuantityError
        If the text is of none of them; the sentence names all.
    """
    ranges = believable or {}
    if not isinstance(value, str) and not is_quantity(value):
        raise QuantityError(f"{_named_or_number(value)} has no unit", _write_one_of(kinds))
    for kind in kinds:
        if _fits(value, kind):
            return read(value, kind, sign=sign, believable=ranges.get(kind.name), allow_si=allow_si)
    try:
        return read(value, kinds[0], sign=sign, allow_si=allow_si)
    except QuantityError as error:
        raise QuantityError(error.found, _write_one_of(kinds)) from error


def _named_or_number(value: object) -> str:
    return str(value) if isinstance(value, Real) and not isinstance(value, bool) else _named(value)


def _write_one_of(kinds: tuple[Kind, ...]) -> str:
    return "write " + " or ".join(f'{kind.article}, such as "{kind.example}"' for kind in kinds)


def _fits(value: Any, kind: Kind) -> bool:
    try:
        if isinstance(value, str):
            parse(value, kind)
        else:
            magnitude(value, kind)
    except QuantityError:
        return False
    return True


def convert(value: object, kind: Kind, *, sign: Sign = Sign.ANY) -> float:
    """Return one plain number in the unit of `kind`.

    Parameters
    ----------
    value : str, float or pint.Quantity
        A float is taken to be in the unit of `kind` already.
    kind : Kind
        The kind of quantity.
    sign : Sign
        Which signs are allowed.

    Raises
    ------
    QuantityError
        As for `read`; also if the text has a tolerance or is a guess, which one number cannot carry.
    """
    reading = read(value, kind, sign=sign, allow_si=True)
    if reading.toleranced:
        raise QuantityError(
            f"{quote(reading.text)} has a tolerance or is a guess, which is not used here",
            f'write one number, such as "{show(reading.nominal, kind)}"',
        )
    return reading.nominal
