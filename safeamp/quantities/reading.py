"""Values in, readings out: text of a user, floats and pint quantities of a program."""

import math
from collections.abc import Mapping
from numbers import Real
from typing import NamedTuple

from safeamp.quantities.believable import Range, check_believable, check_finite, check_possible, check_sign
from safeamp.quantities.grammar import Written, parse
from safeamp.quantities.nouns import Kind, NotOfKindError, Origin, QuantityError, Reading, Sign
from safeamp.quantities.output import show
from safeamp.quantities.text import quote, such_as
from safeamp.quantities.tolerance import bounds
from safeamp.quantities.units import is_quantity, magnitude

_DIGITS_OF_A_FLOAT = 12
_PRINTED = 1e15


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
    ValueError
        If a caller asks for the magnitude of a temperature.
    """
    sign = sign or kind.sign
    if sign is Sign.MAGNITUDE and kind.believable[0] < 0:
        raise ValueError(f"{kind.article} has no magnitude: its zero is a point on a scale")
    if isinstance(value, str):
        return _read_text(value, kind, sign, believable)
    number = _bare_number(value, kind, allow_si)
    text = show(number, kind, _DIGITS_OF_A_FLOAT) if math.isfinite(number) else str(number)
    return _finish(_Ends(number, number, number), text, sign, believable, kind)


def _bare_number(value: object, kind: Kind, allow_si: bool) -> float:
    if allow_si and is_quantity(value):
        return magnitude(value, kind)
    if isinstance(value, bool) or not isinstance(value, Real):
        raise QuantityError(f"{_named(value)} is not {kind.article}", _in_quotes(kind))
    if not (allow_si or "" in kind.spellings):
        raise QuantityError(f"{_named(value)} has no unit", _in_quotes(kind))
    try:
        return float(value)
    except OverflowError as error:
        raise QuantityError("the number is beyond all use", _in_quotes(kind)) from error


def _named(value: object) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, (int, float)):
        return str(value) if -_PRINTED < value < _PRINTED else "the number"
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
    ends = _Ends(*(float(value) for value in decimals))
    if ends.nominal == 0 and decimals[0] != 0:
        raise QuantityError(f"{quote(text)} is nearer to zero than any number here", such_as(kind))
    return _finish(ends, text, sign, believable, kind, written, toleranced)


class _Ends(NamedTuple):
    nominal: float
    low: float
    high: float


def _finish(
    ends: _Ends,
    text: str,
    sign: Sign,
    believable: Range | None,
    kind: Kind,
    written: Written | None = None,
    toleranced: bool = False,
) -> Reading:
    name = quote(text) if written else text
    check_finite(name, ends, kind)
    dropped = sign is Sign.MAGNITUDE and ends.nominal < 0
    nominal, low, high = (-ends.nominal, -ends.high, -ends.low) if dropped else ends
    widened = written is not None and toleranced and written.low is None and written.minus is None
    reach = f"{name}, widened as a guess," if widened else name
    # A magnitude that is never believed to be zero cannot reach zero either.
    above = sign is Sign.MAGNITUDE and believable is not None and believable[0] > 0
    check_sign(name, reach, nominal, low, Sign.POSITIVE if above else sign, kind)
    check_possible(reach, low, high, kind)
    number = None if written is None else abs(written.number) if dropped else written.number
    check_believable(name, nominal, number, kind, believable)
    origin = written.origin if written else Origin.STATED
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
    if not isinstance(value, str) and not (allow_si and is_quantity(value)):
        raise QuantityError(f"{_named(value)} has no unit", _write_one_of(kinds))
    errors = []
    for kind in kinds:
        try:
            return read(value, kind, sign=sign, believable=ranges.get(kind.name), allow_si=allow_si)
        except NotOfKindError as error:
            errors.append(error)
    hints = [error for error in errors if error.hint]
    raise hints[0] if hints else QuantityError(errors[0].found, _write_one_of(kinds))


def _write_one_of(kinds: tuple[Kind, ...]) -> str:
    return "write " + " or ".join(f'{kind.article}, such as "{kind.example}"' for kind in kinds)


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
