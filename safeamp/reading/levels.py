"""Numbers of the limits data: text with a unit, or a bare ratio, to an SI float and its kind."""

from collections.abc import Mapping
from math import inf
from typing import Final

from safeamp.limits import Level
from safeamp.quantities import (
    KINDS,
    PERCENT,
    RATIO,
    TEMPERATURE,
    TEMPERATURE_DIFFERENCE,
    Kind,
    QuantityError,
    Sign,
    read,
)

_KINDS = tuple(kind for kind in KINDS.values() if kind not in (PERCENT, TEMPERATURE_DIFFERENCE))
BY_UNIT: Final[Mapping[str, Kind]] = {kind.unit: kind for kind in (*_KINDS, TEMPERATURE_DIFFERENCE)}
"""Kind of the unit that a limit names; a ratio is "1"."""

# In the data a K is a difference; a temperature is written in degC.
_BY_SPELLING = {
    spelling: kind for kind in (*_KINDS, TEMPERATURE_DIFFERENCE) for spelling in kind.spellings if spelling
}


def kind_of(value: object) -> Kind:
    """Return the kind that a value of the data has by its unit.

    Raises
    ------
    QuantityError
        If the text ends in no known unit.
    """
    if not isinstance(value, str):
        return RATIO
    unit = value.split()[-1] if value.split() else ""
    if unit not in _BY_SPELLING:
        raise QuantityError(f'"{value}" has no known unit', 'write number and unit, such as "50 mV"')
    return _BY_SPELLING[unit]


def number(value: object, kind: Kind, *, signed: bool = False) -> float:
    """Return one exact number of a kind in SI units (degC, deg).

    A limit may lie far outside what is believable of a reading, so no believable range is asked for.

    Raises
    ------
    QuantityError
        If it is no number of that kind, not finite, has a tolerance, or is negative where it must not be.
    """
    sign = Sign.ANY if signed or kind == TEMPERATURE else Sign.NON_NEGATIVE
    reading = read(value, kind, sign=sign, believable=(-inf if kind == TEMPERATURE else 0.0, inf))
    if reading.toleranced or reading.low != reading.high:
        raise QuantityError(f'"{value}" has a tolerance', "write one number")
    return reading.nominal


def level(value: object, kind: Kind, sense: str) -> Level:
    """Return a level of a limit: one number, or a pair of rising ones where the sense is "between".

    Raises
    ------
    QuantityError
        If it is neither, or a pair with another sense.
    """
    if not isinstance(value, list):
        return number(value, kind)
    if sense != "between":
        raise QuantityError(f'two numbers do not go with "{sense}"', "write one number")
    if len(value) != 2:
        raise QuantityError(f"{len(value)} numbers stand here", "write the lower and the upper one")
    low, high = (number(one, kind) for one in value)
    return low, high


def check_order(sense: str, go: Level | None, stop: Level | None) -> None:
    """Refuse levels that contradict each other.

    Raises
    ------
    QuantityError
        If a value could be within the go level and beyond the stop level at once.
    """
    outward = [*_upper(go), *_upper(stop)] if sense != "at least" else [*_upper(stop), *_upper(go)]
    inward = [*_lower(stop), *_lower(go)]
    if sorted(outward) != outward or sorted(inward) != inward or _empty(go):
        order = "the stop level must not lie inside the go level"
        raise QuantityError(f'go and stop contradict each other with the sense "{sense}"', order)


def _upper(value: Level | None) -> tuple[float, ...]:
    return () if value is None else (value[1],) if isinstance(value, tuple) else (value,)


def _lower(value: Level | None) -> tuple[float, ...]:
    return (value[0],) if isinstance(value, tuple) else ()


def _empty(value: Level | None) -> bool:
    return isinstance(value, tuple) and value[0] >= value[1]
