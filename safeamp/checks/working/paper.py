"""A sheet of paper on which a calculation is written down line by line, from the values that the checks use."""

from __future__ import annotations

import re
from typing import Any

import numpy as np

from safeamp.amplifier import Amplifier, value_at, written_key
from safeamp.answers import Line
from safeamp.limits import Limits
from safeamp.quantities import RATIO, Kind, Number, Origin

#: What a formula may hold besides symbols of lines above.
FUNCTIONS = frozenset({"sqrt", "ln", "exp", "sin", "cos", "tan", "max", "min", "abs", "atan", "pi"})
SYMBOL = re.compile(r"[A-Za-z][A-Za-z0-9_]*")


class Paper:
    """The lines written so far; a symbol is written once and keeps its value."""

    def __init__(self, amplifier: Amplifier, limits: Limits) -> None:
        self.amplifier = amplifier
        self.limits = limits
        self.lines: list[Line] = []
        self._values: dict[str, float | None] = {}

    def has(self, symbol: str) -> bool:
        """Whether a symbol stands on the paper."""
        return symbol in self._values

    def given(self, symbol: str, path: str, kind: Kind, words: str = "") -> str:
        """Write down a value of the sheet with its key and origin."""
        key = written_key(path)
        where = f"{key}, {self._origin(path)}" if words else self._origin(path)
        return self._write(Line(symbol, words or key, _number(self._at(path)), kind, origin=where))

    def taken(self, symbol: str, words: str, value: Number | None, kind: Kind, why: str) -> str:
        """Write down a number that no sheet holds: a level, a constant, a rating that a limit says."""
        return self._write(Line(symbol, words, _number(value), kind, origin=why))

    def found(self, symbol: str, words: str, value: Number | None, kind: Kind, how: str) -> str:
        """Write down a value that no single formula gives: looked up, searched, averaged over a cycle."""
        return self._write(Line(symbol, words, _number(value), kind, origin=f"found {how}"))

    def put(self, symbol: str, words: str, formula: str, value: Number | None, kind: Kind = RATIO) -> str:
        """Write down a formula in symbols of lines above, with the value that the program has for it.

        Raises
        ------
        KeyError
            If the formula holds a symbol that no line above explains.
        """
        names = dict.fromkeys(SYMBOL.findall(formula))
        terms = tuple((name, self._values[name]) for name in names if name not in FUNCTIONS)
        return self._write(Line(symbol, words, _number(value), kind, formula, terms=terms))

    def value(self, symbol: str) -> float:
        """Return the value of a symbol, nan where it is not known."""
        found = self._values[symbol]
        return float("nan") if found is None else found

    def _write(self, line: Line) -> str:
        if line.symbol not in self._values:
            self._values[line.symbol] = line.value
            self.lines.append(line)
        return line.symbol

    def _at(self, path: str) -> Any:
        return value_at(self.amplifier, path)

    def _origin(self, path: str) -> str:
        head, _, tail = path.rpartition(".")
        found = self.amplifier.origin(path) or (self.amplifier.origin(head) if tail.isdigit() else None)
        if found is None and self._at(path) is None:
            return "not given"
        return (found or Origin.STATED).value


def _number(value: Number | None) -> float | None:
    """Return the nominal of a value, None where it is not known."""
    if value is None:
        return None
    found = float(np.asarray(value, dtype=float).flat[0])
    return None if np.isnan(found) else found
