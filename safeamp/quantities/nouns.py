"""The nouns of the border between text and number: origin, sign, kind, reading and refusal."""

import enum
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

#: A float, or an array over the flat case axis.
Number = Any


class Origin(enum.Enum):
    """Where a value comes from; the first six are words that a user writes."""

    MEASURED = "measured"
    MARKED = "marked"
    DATA_SHEET = "data sheet"
    MANUAL = "manual"
    GUESS = "guess"
    EXAMPLE = "example"
    STATED = "stated"
    ASSUMED = "assumed"


class Sign(enum.Enum):
    """Which signs a place allows; with MAGNITUDE a minus is dropped and the reading says so."""

    POSITIVE = "above zero"
    NON_NEGATIVE = "zero or above"
    ANY = "either sign"
    MAGNITUDE = "magnitude"


class QuantityError(ValueError):
    """A value that is not read.

    Parameters
    ----------
    found : str
        What stands there and why it is not read.
    write : str
        What to write instead.
    """

    def __init__(self, found: str, write: str) -> None:
        super().__init__(found, write)
        self.found = found
        self.write = write

    def __str__(self) -> str:
        """Return one sentence for the user."""
        return f"{self.found}; {self.write}"


class NotOfKindError(QuantityError):
    """A text whose form or unit is not one of the kind asked for; `hint` when what to write is concrete."""

    def __init__(self, found: str, write: str, *, hint: bool = False) -> None:
        super().__init__(found, write)
        self.hint = hint


@dataclass(frozen=True)
class Kind:
    """One kind of quantity: what it is called, how it is written, what is believable.

    Two kinds are equal when their names are.

    Parameters
    ----------
    name : str
        Trade word with the meaning of the quantity, such as ``voltage``.
    unit : str
        Symbol of the unit of all floats of this kind: SI base, but degC and deg; ``1`` without unit.
    base : str
        The same unit by its name in units.txt.
    spellings : Mapping[str, str]
        What a user may write -> unit of units.txt; empty where the kind is only printed.
    shown : tuple of (str, str, float)
        Units for printing, small to large: symbol, unit of units.txt, smallest float it is used for.
    believable : (float, float)
        Lowest and highest magnitude that is taken without a question (signed when the lowest is negative).
    example : str
        A text that is read.
    sign : Sign
        The signs allowed where the caller does not say.
    possible : (float, float)
        What no tolerance may pass.
    iec60062 : bool
        Whether codes such as ``4R7`` are read.
    percent_tolerance : bool
        Whether a tolerance may be a percentage.
    difference : Mapping[str, str]
        Units of an absolute tolerance, where they are not those of the kind.
    guess : float or None
        Half width of a guess in the unit of the kind; None: a quarter of the value.
    """

    name: str
    unit: str = field(compare=False)
    base: str = field(compare=False)
    spellings: Mapping[str, str] = field(compare=False, repr=False)
    shown: tuple[tuple[str, str, float], ...] = field(compare=False, repr=False)
    believable: tuple[float, float] = field(compare=False)
    example: str = field(compare=False)
    sign: Sign = field(default=Sign.POSITIVE, compare=False)
    possible: tuple[float, float] = field(default=(float("-inf"), float("inf")), compare=False, repr=False)
    iec60062: bool = field(default=False, compare=False, repr=False)
    percent_tolerance: bool = field(default=True, compare=False, repr=False)
    difference: Mapping[str, str] | None = field(default=None, compare=False, repr=False)
    guess: float | None = field(default=None, compare=False, repr=False)

    @property
    def article(self) -> str:
        """The name with its indefinite article."""
        return f"{'an' if self.name[0] in 'aeiou' else 'a'} {self.name}"


@dataclass(frozen=True)
class Reading:
    """A value with its lower and upper bound, its origin, and the text it was read from.

    Parameters
    ----------
    nominal, low, high : float
        In the unit of `kind`; low <= nominal <= high.
    origin : Origin
        Where the value comes from.
    toleranced : bool
        Whether a tolerance or a range was written, or a guess was widened.
    kind : Kind
        The kind of quantity.
    text : str
        As the user wrote it.
    sign_dropped : bool
        Whether a minus was dropped (`Sign.MAGNITUDE`).
    """

    nominal: float
    low: float
    high: float
    origin: Origin
    toleranced: bool
    kind: Kind
    text: str
    sign_dropped: bool = False
