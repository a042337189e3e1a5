"""A calculation line by line, so that a person can redo it with a pocket calculator."""

from __future__ import annotations

from dataclasses import dataclass

from safeamp.quantities import Kind


@dataclass(frozen=True)
class Line:
    """One line of a calculation.

    Parameters
    ----------
    symbol, words : str
        What the value is called in the formulas below it, and in words.
    value : float or None
        In the unit of `kind`; None where it is not known.
    formula : str
        In symbols of lines above; empty where the value is given or was found by a search.
    origin : str
        Where a value without a formula comes from: its key and origin, or how it was found.
    terms : tuple of (str, float or None)
        The symbols of the formula with their values.
    """

    symbol: str
    words: str
    value: float | None
    kind: Kind
    formula: str = ""
    origin: str = ""
    terms: tuple[tuple[str, float | None], ...] = ()


@dataclass(frozen=True)
class Working:
    """How the nominal value of a finding comes about; the last line is that value."""

    id: str
    lines: tuple[Line, ...]
