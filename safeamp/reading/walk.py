"""From the tables of a file to the keys of the nouns; what is not known is refused with the nearest name."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import MISSING, fields
from typing import Any

from safeamp.amplifier import TABLES, keys_of
from safeamp.limits import nearest
from safeamp.reading.draft import Draft
from safeamp.reading.values import example, read_key

#: Keys that stand before the first table.
TOP = ("title", "notes", "sheet_version")
SHEET_VERSION = 1


def tables_of(noun: type[Any]) -> dict[str, type[Any]]:
    """Return the tables inside a table: the fields whose default is a noun of its own."""
    return {
        item.name: item.default_factory
        for item in fields(noun)
        if item.default_factory is not MISSING and isinstance(item.default_factory, type)
    }


def walk_sheet(draft: Draft, data: Mapping[str, Any]) -> None:
    """Read everything of a sheet but its devices, which `read_devices` finds."""
    _top(draft, data)
    for name, value in data.items():
        if name in TOP or name == "device":
            continue
        draft.sit(name)
        if name not in TABLES:
            draft.complain(name, _unknown_table(name))
        elif not isinstance(value, Mapping):
            draft.complain(name, f"this is no table; write [{name}] and its keys below it")
        else:
            walk_table(draft, name, TABLES[name], value)


def walk_table(draft: Draft, path: str, noun: type[Any], data: Mapping[str, Any]) -> None:
    """Read the keys of one table, and of the tables inside it, that the noun knows."""
    keys, inner = keys_of(noun), tables_of(noun)
    draft.written.add(path)
    for name, value in draft.overlaid(path, data).items():
        place = f"{path}.{name}"
        if name in keys:
            read_key(draft, place, keys[name], value)
            continue
        draft.sit(place)
        if name not in inner:
            draft.complain(place, _unknown_key(name, path, [*keys, *inner]))
        elif not isinstance(value, Mapping):
            draft.complain(place, f"this is no table; write [{place}] and its keys below it")
        else:
            walk_table(draft, place, inner[name], value)


def _top(draft: Draft, data: Mapping[str, Any]) -> None:
    for name in TOP:
        if name in data:
            draft.sit(name)
    title, notes, version = (data.get(name) for name in TOP)
    if title is None:
        draft.complain("title", 'is missing; write title = "..." in the first line')
    elif not isinstance(title, str) or not title.strip():
        draft.complain("title", 'this is not a text; write title = "..."')
    if not isinstance(notes, str | None):
        draft.complain("notes", 'this is not a text; write notes = "..."')
    if version is not None and (isinstance(version, bool) or version != SHEET_VERSION):
        shown = str(version).lower() if isinstance(version, bool) else version
        draft.complain(
            "sheet_version", f"{shown} is not read; this program reads sheet_version = {SHEET_VERSION}"
        )


def _unknown_table(name: str) -> str:
    return f"not a known table or key{_home(name) or nearest(name, [*TABLES, *TOP])}"


def _unknown_key(name: str, path: str, known: Iterable[str]) -> str:
    home = _home(name)
    # The very word in another table is nearer than a like one here.
    listed = f"; [{path}] has {', '.join(known)}"
    return f"not a known key{home or nearest(name, known) or listed}"


def _home(name: str) -> str:
    """Return in which table a word is a key."""
    for table, noun in TABLES.items():
        for path, place in (
            (table, noun),
            *((f"{table}.{word}", inner) for word, inner in tables_of(noun).items()),
        ):
            if name in keys_of(place):
                return f"; {name} belongs into [{path}]"
    return ""


def require(draft: Draft, path: str, noun: type[Any]) -> None:
    """Complain of each required key that is not written in a table."""
    for name, key in keys_of(noun).items():
        if key.required and f"{path}.{name}" not in draft.written:
            draft.complain(f"{path}.{name}", f"is missing: {key.help}; write {example(key)}")
