"""What is said of a key of the sheet: its kind, its bounds, its default, its words."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import Field, dataclass, field, fields
from functools import cache
from types import MappingProxyType
from typing import Any

from safeamp.quantities import RATIO, Kind, Sign


@dataclass(frozen=True)
class Key:
    """Everything that reader, key tables, starters and schema say of one key.

    `kinds` is empty for words and flags; `shape` is "one", "list" (one value or several), "points" (pairs of
    quantities) or "curves" (points by duration); `default` is the text a user would write for the default.
    """

    help: str
    kinds: tuple[Kind, ...] = ()
    shape: str = "one"
    required: bool = False
    choices: tuple[str, ...] = ()
    flag: bool = False
    special: str = ""
    sign: Sign = Sign.POSITIVE
    believable: tuple[float, float] | None = None
    default: str = ""
    why: str = ""
    none: str = ""
    symbol: str = ""
    internal: bool = False
    whole: bool = False


def number(kind: Kind | tuple[Kind, ...], text: str, **more: Any) -> Any:
    """Return a dataclass field for a quantity that may be missing."""
    kinds = kind if isinstance(kind, tuple) else (kind,)
    return field(default=None, metadata={"key": Key(help=text, kinds=kinds, **more)})


def count(text: str, **more: Any) -> Any:
    """Return a dataclass field for a whole number."""
    return number(RATIO, text, whole=True, **more)


def word(text: str, *choices: str, **more: Any) -> Any:
    """Return a dataclass field for one of several words, or for free text without choices."""
    return field(default=None, metadata={"key": Key(help=text, choices=choices, **more)})


def flag(text: str, **more: Any) -> Any:
    """Return a dataclass field for true or false."""
    return field(default=None, metadata={"key": Key(help=text, flag=True, **more)})


def special(form: str, text: str, **more: Any) -> Any:
    """Return a dataclass field with a form of its own: a fuse, a limiter, a file."""
    return field(default=None, metadata={"key": Key(help=text, special=form, **more)})


def internal(**more: Any) -> Any:
    """Return a dataclass field that the program fills and the file cannot."""
    return field(default=None, metadata={"key": Key(help="", internal=True, **more)})


def key_of(item: Field[Any]) -> Key | None:
    """Return what is said of a field, None for a table."""
    return item.metadata.get("key")


def keys_of(table: Any) -> Mapping[str, Key]:
    """Return name -> Key of a noun class or instance, internal keys left out."""
    return _keys_of(table if isinstance(table, type) else type(table))


@cache
def _keys_of(noun: Any) -> Mapping[str, Key]:
    found = {item.name: key_of(item) for item in fields(noun)}
    return MappingProxyType(
        {name: key for name, key in found.items() if key is not None and not key.internal}
    )
