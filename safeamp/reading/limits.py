"""The limits data that come with the program, and the user's own limits file, to nouns."""

from collections.abc import Callable, Iterator, Mapping
from functools import lru_cache, partial
from math import inf
from pathlib import Path
from types import MappingProxyType
from typing import Any, TypeVar

from safeamp.complaints import Complaint, ReadingError
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
from safeamp.reading.document import Document, read_document
from safeamp.reading.levels import BY_UNIT, check_order, kind_of, level, number
from safeamp.reading.overrides import apply_override

TABLE_FILES = ("defaults", "fuses", "interface", "levels", "preferred")
"""Files that hold other tables than limits."""

_WORDS = frozenset({"unit", "sense", "go", "stop", "not_given", "source", "evidence", "says"})
_Noun = TypeVar("_Noun")


def load_limits(override: Path | None = None, *, folder: Path | None = None) -> Limits:
    """Return every limit, default and table.

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
    return shipped if override is None else apply_override(shipped, read_document(override))


@lru_cache(maxsize=4)
def _shipped(folder: Path) -> Limits:
    tables = {stem: read_document(folder / f"{stem}.toml") for stem in TABLE_FILES}
    topics = [path for path in sorted(folder.glob("*.toml")) if path.stem not in TABLE_FILES]
    complaints: list[Complaint] = []
    entries: dict[str, Limit] = {}
    for path in topics:
        entries |= _nouns(read_document(path), "sense", _limit, complaints)
    defaults = _nouns(tables["defaults"], "value", _default, complaints)
    spread = defaults.get("heatsink.insulator")
    interface = partial(_interface, (spread.low, spread.high) if spread else (1.0, inf))
    limits = Limits(
        entries=MappingProxyType(entries),
        defaults=MappingProxyType(defaults),
        interfaces=_named(_nouns(tables["interface"], "resistance", interface, complaints)),
        fuse_gates=_named(_nouns(tables["fuses"], "gates", _fuse, complaints)),
        series=_named(_nouns(tables["preferred"], "values", _series, complaints)),
        levels=MappingProxyType(_nouns(tables["levels"], "value", _default, complaints)),
    )
    if complaints:
        raise ReadingError(tuple(complaints))
    return limits


def _nouns(
    document: Document, mark: str, make: Callable[[str, dict[str, Any]], _Noun], complaints: list[Complaint]
) -> dict[str, _Noun]:
    """Make a noun of each row of a file; what cannot be made becomes a complaint."""
    nouns: dict[str, _Noun] = {}
    for path, row in _rows(document.data, mark):
        id = ".".join(path)
        try:
            nouns[id] = make(id, row)
        except QuantityError as trouble:
            complaints.append(document.complaint(str(trouble), *path))
        except KeyError as trouble:
            complaints.append(document.complaint(f"{trouble.args[0]} is missing", *path))
    return nouns


def _rows(
    table: Mapping[str, Any], mark: str, path: tuple[str, ...] = ()
) -> Iterator[tuple[Any, dict[str, Any]]]:
    """Walk to every table that holds the mark, and to every innermost one, so that none is passed over."""
    inner = {key: value for key, value in table.items() if isinstance(value, dict)}
    row = {key: value for key, value in table.items() if key not in inner}
    if path and (mark in row or not inner):
        yield path, row
    for key, value in inner.items():
        yield from _rows(value, mark, (*path, key))


def _named(nouns: Mapping[str, _Noun]) -> Mapping[str, _Noun]:
    """Drop the word that the rows of a table share."""
    return MappingProxyType({id.partition(".")[2]: noun for id, noun in nouns.items()})


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


def _interface(spread: tuple[float, float], id: str, row: dict[str, Any]) -> Interface:
    nominal = number(row["resistance"], THERMAL_RESISTANCE)
    low, high = (nominal * factor for factor in spread)
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
