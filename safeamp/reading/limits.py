"""The limits data that come with the program, and the user's own limits file, to nouns."""

from collections.abc import Mapping
from dataclasses import fields
from functools import lru_cache, partial
from math import inf
from pathlib import Path
from types import MappingProxyType
from typing import Any

from safeamp.complaints import ReadingError
from safeamp.limits import (
    EVIDENCE,
    NOT_GIVEN,
    SENSES,
    Default,
    FuseGates,
    Gate,
    Interface,
    Limit,
    Limits,
    Series,
)
from safeamp.quantities import THERMAL_RESISTANCE, TIME, QuantityError
from safeamp.reading.data import limits_folder
from safeamp.reading.document import read_document
from safeamp.reading.levels import BY_UNIT, check_order, kind_of, level, number
from safeamp.reading.overrides import apply_override
from safeamp.reading.rows import Rows

TABLE_FILES = ("defaults", "fuses", "interface", "levels", "preferred")
"""Files that hold other tables than limits."""

_WORDS = frozenset({"unit", "sense", "go", "stop", "not_given", "source", "evidence", "says"})


def load_limits(override: Path | None = None, *, folder: Path | None = None) -> Limits:
    """Return every limit, default and table.

    What comes with the program is read when it is first asked for, as no answer needs all of it; with `override` or
    `folder` all of it is read at once.

    Parameters
    ----------
    override : Path, optional
        The user's own file; it replaces single levels, and each replaced limit is marked `overridden`.
    folder : Path, optional
        Folder of the data; the default is the one that comes with the program.

    Raises
    ------
    ReadingError
        With every problem of the files.
    """
    shipped = _shipped(folder or limits_folder())
    if override is None and folder is None:
        return shipped
    check_all(shipped)
    return shipped if override is None else apply_override(shipped, read_document(override))


def check_all(limits: Limits) -> None:
    """Read every row of limits that were loaded.

    Raises
    ------
    ReadingError
        With every problem of the files.
    """
    tables = [getattr(limits, table.name) for table in fields(limits)]
    found = [complaint for rows in tables if isinstance(rows, Rows) for complaint in rows.complaints()]
    if found:
        raise ReadingError(tuple(dict.fromkeys(found)))


@lru_cache(maxsize=4)
def _shipped(folder: Path) -> Limits:
    topics = {path.stem: path for path in sorted(folder.glob("*.toml")) if path.stem not in TABLE_FILES}
    defaults, fuses, interface, levels, preferred = ({"": folder / f"{stem}.toml"} for stem in TABLE_FILES)
    spreads = Rows(defaults, "value", _default)
    return Limits(
        entries=Rows(topics, "sense", _limit),
        defaults=spreads,
        interfaces=Rows(interface, "resistance", partial(_interface, spreads), named=True),
        fuse_gates=Rows(fuses, "gates", _fuse, named=True),
        series=Rows(preferred, "values", _series, named=True),
        levels=Rows(levels, "value", _default),
    )


def _limit(id: str, row: dict[str, Any]) -> Limit:
    sense = _choice(row["sense"], SENSES)
    kind = BY_UNIT[_choice(row["unit"], tuple(BY_UNIT))]
    go, stop = (level(row[word], kind, sense) if word in row else None for word in ("go", "stop"))
    check_order(sense, go, stop)
    not_given = _choice(row["not_given"], NOT_GIVEN) if "not_given" in row else None
    kinds = {key: kind_of(value) for key, value in row.items() if key not in _WORDS}
    extra = {key: number(row[key], kinds[key]) for key in kinds}
    return Limit(
        id, go, stop, sense, kind, not_given, *_words(row), MappingProxyType(extra), MappingProxyType(kinds)
    )


def _default(id: str, row: dict[str, Any]) -> Default:
    kind = kind_of(row["value"])
    nominal, low, high = (
        number(row.get(key, row["value"]), kind, signed=True) for key in ("value", "low", "high")
    )
    if not low <= nominal <= high:
        raise QuantityError(
            f"{low} to {high} does not hold {nominal}", "write low, value and high in rising order"
        )
    return Default(id, nominal, low, high, kind, *_words(row))


def _interface(defaults: Mapping[str, Default], id: str, row: dict[str, Any]) -> Interface:
    nominal = number(row["resistance"], THERMAL_RESISTANCE)
    spread = defaults.get("heatsink.insulator")
    low, high = (nominal * factor for factor in ((spread.low, spread.high) if spread else (1.0, inf)))
    return Interface(
        id.partition(".")[2], nominal, low, high, row["source"], _choice(row["evidence"], EVIDENCE)
    )


def _fuse(id: str, row: dict[str, Any]) -> FuseGates:
    gates = tuple(
        Gate(
            float(gate["times_rating"]),
            number(gate["shortest"], TIME),
            number(gate["longest"], TIME) if "longest" in gate else inf,
        )
        for gate in row["gates"]
    )
    return FuseGates(id.partition(".")[2], gates, *_words(row))


def _series(id: str, row: dict[str, Any]) -> Series:
    kind = kind_of(row["values"][0])
    values = tuple(number(value, kind) for value in row["values"])
    return Series(id.partition(".")[2], values, kind, row["source"], _choice(row["evidence"], EVIDENCE))


def _words(row: dict[str, Any]) -> tuple[str, str, str]:
    return row["source"], _choice(row["evidence"], EVIDENCE), row["says"]


def _choice(value: Any, choices: tuple[Any, ...]) -> Any:
    if value not in choices:
        raise QuantityError(f'"{value}" is not known here', f"write one of {', '.join(choices)}")
    return value
