"""The only place that calls pint: one small registry, and the scale of each unit as exact decimals.

pint is loaded by the first unit that is more than a prefix before the unit of its kind, or a minute or an hour: it
costs a start more than all else together, and a prefix is only a shift of the decimal point.
"""

from __future__ import annotations

import sys
from decimal import Decimal
from functools import cache
from importlib import import_module
from pathlib import Path
from typing import TYPE_CHECKING, Any

from safeamp.quantities.nouns import Kind, NotOfKindError, QuantityError

if TYPE_CHECKING:
    import pint

#: Prefix -> places by which it shifts the decimal point; "percent" stands before no unit.
_PLACES = {
    "pico": -12,
    "nano": -9,
    "micro": -6,
    "milli": -3,
    "centi": -2,
    "percent": -2,
    "": 0,
    "kilo": 3,
    "mega": 6,
}
#: What a log is kept in: not decimal, and yet no reason to load pint.
_SECONDS = {"minute": Decimal(60), "hour": Decimal(3600)}


@cache
def registry() -> pint.UnitRegistry[Any]:
    """Return the pint registry of units.txt, built at the first call and kept.

    Examples
    --------
    >>> ureg = registry()
    >>> (ureg.Quantity(2.0, "volt") / ureg.Quantity(4.0, "ohm")).to("ampere").magnitude
    0.5
    """
    # No cache folder: a cache that outlives its environment breaks the next start.
    made: pint.UnitRegistry[Any] = _pint().UnitRegistry(
        str(Path(__file__).with_name("units.txt")), cache_folder=None
    )
    return made


def _pint() -> Any:
    """Import pint without scipy, which it asks for only to choose preferred units: no start here needs that.

    A module that is None in `sys.modules` counts as not installed while pint looks for it; afterwards scipy can be
    imported as ever.
    """
    hidden = "scipy" not in sys.modules and "pint" not in sys.modules
    if hidden:
        sys.modules["scipy"] = None  # type: ignore[assignment]
    try:
        return import_module("pint")
    finally:
        if hidden:
            del sys.modules["scipy"]


@cache
def scale(unit: str, base: str) -> tuple[Decimal, Decimal]:
    """Return factor and offset that turn a number in `unit` into one in `base`.

    As decimals (1e-6, not its nearest float) they make the product with the user's digits correctly rounded.
    """
    if base == "second" and unit in _SECONDS:
        return _SECONDS[unit], Decimal(0)
    places = _PLACES.get(unit.removesuffix(base)) if unit.endswith(base) else None
    return scale_of_pint(unit, base) if places is None else (Decimal(1).scaleb(places), Decimal(0))


def scale_of_pint(unit: str, base: str) -> tuple[Decimal, Decimal]:
    """Return factor and offset of `scale` as pint has them, to 15 digits."""
    ureg = registry()
    at_zero, at_one = (
        Decimal(f"{ureg.Quantity(number, unit).to(base).magnitude:.15g}") for number in (0.0, 1.0)
    )
    return at_one - at_zero, at_zero


def to_base(number: Decimal, unit: str, kind: Kind) -> Decimal:
    """Return `number` of `unit` in the unit of `kind`."""
    factor, offset = scale(unit, kind.base)
    return number * factor + offset


def difference_to_base(number: Decimal, unit: str, kind: Kind) -> Decimal:
    """Return a difference of `number` of `unit` in the unit of `kind` (a temperature loses no zero point)."""
    base = "kelvin" if kind.base == "degree_Celsius" else kind.base  # apart from the zero point they are one
    return number * scale(unit, base)[0]


def quantity(value: Any, kind: Kind) -> pint.Quantity[Any]:
    """Return a pint quantity.

    Parameters
    ----------
    value : float or array_like
        In the unit of `kind` (SI base; degC, deg).
    kind : Kind
        The kind of quantity.

    Returns
    -------
    pint.Quantity
        Same shape, in the registry of this package.
    """
    return registry().Quantity(value, kind.base or "dimensionless")


def is_quantity(value: object) -> bool:
    """Return whether `value` is a quantity of pint, without importing pint."""
    return hasattr(value, "magnitude") and hasattr(value, "dimensionality")


def magnitude(value: Any, kind: Kind) -> float:
    """Return a scalar pint quantity as a float in the unit of `kind`.

    Raises
    ------
    QuantityError
        If it has another dimension, or is no single number.
    """
    import pint

    write = f"give {kind.article} in {kind.unit}"
    try:
        return float(value.to(kind.base or "dimensionless").magnitude)
    except pint.errors.PintError as error:
        raise NotOfKindError(f"a quantity in {value.units} is not {kind.article}", write) from error
    except (TypeError, ValueError) as error:
        raise QuantityError(f"a quantity of several values is not one {kind.name}", write) from error
